//! How far an instrument may be wrong: accuracy classes of gauges and the ways other instruments state it.

use crate::quantity::Measure;
use serde::{Deserialize, Serialize};
use std::fmt;

/// Accuracy class of a Bourdon gauge: limit of error in ± per cent of span, everywhere on the dial (EN 837-1, Table 11).
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
pub enum En837Class {
    /// Class 0.1.
    #[serde(rename = "0.1")]
    C0_1,
    /// Class 0.25.
    #[serde(rename = "0.25")]
    C0_25,
    /// Class 0.6.
    #[serde(rename = "0.6")]
    C0_6,
    /// Class 1.0.
    #[serde(rename = "1")]
    C1,
    /// Class 1.6, the commonest on the trade's gauges.
    #[serde(rename = "1.6")]
    C1_6,
    /// Class 2.5.
    #[serde(rename = "2.5")]
    C2_5,
    /// Class 4.
    #[serde(rename = "4")]
    C4,
}

impl En837Class {
    /// Every class, sharpest first.
    pub const ALL: [En837Class; 7] = [
        En837Class::C0_1,
        En837Class::C0_25,
        En837Class::C0_6,
        En837Class::C1,
        En837Class::C1_6,
        En837Class::C2_5,
        En837Class::C4,
    ];

    /// Limit of error in per cent of span.
    #[must_use]
    pub const fn percent_of_span(self) -> f64 {
        match self {
            En837Class::C0_1 => 0.1,
            En837Class::C0_25 => 0.25,
            En837Class::C0_6 => 0.6,
            En837Class::C1 => 1.0,
            En837Class::C1_6 => 1.6,
            En837Class::C2_5 => 2.5,
            En837Class::C4 => 4.0,
        }
    }
}

/// Accuracy grade of a gauge (ASME B40.100). The split grades are sharper in the middle half of the dial. All but A from
/// memory.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
pub enum AsmeGrade {
    /// 0.1 % of span.
    #[serde(rename = "4A")]
    G4A,
    /// 0.25 % of span.
    #[serde(rename = "3A")]
    G3A,
    /// 0.5 % of span.
    #[serde(rename = "2A")]
    G2A,
    /// 1 % of span.
    #[serde(rename = "1A")]
    G1A,
    /// 2-1-2 % of span.
    A,
    /// 3-2-3 % of span.
    B,
    /// 4-3-4 % of span.
    C,
    /// 5 % of span.
    D,
}

impl AsmeGrade {
    /// Every grade, sharpest first.
    pub const ALL: [AsmeGrade; 8] = [
        AsmeGrade::G4A,
        AsmeGrade::G3A,
        AsmeGrade::G2A,
        AsmeGrade::G1A,
        AsmeGrade::A,
        AsmeGrade::B,
        AsmeGrade::C,
        AsmeGrade::D,
    ];

    /// Limit of error in per cent of span in the outer quarters and in the middle half of the dial.
    #[must_use]
    pub const fn percent_of_span(self) -> (f64, f64) {
        match self {
            AsmeGrade::G4A => (0.1, 0.1),
            AsmeGrade::G3A => (0.25, 0.25),
            AsmeGrade::G2A => (0.5, 0.5),
            AsmeGrade::G1A => (1.0, 1.0),
            AsmeGrade::A => (2.0, 1.0),
            AsmeGrade::B => (3.0, 2.0),
            AsmeGrade::C => (4.0, 3.0),
            AsmeGrade::D => (5.0, 5.0),
        }
    }

    /// Limit of error in per cent of span at a place on the dial, 0 at its foot and 1 at its top.
    #[must_use]
    pub fn percent_at(self, place: f64) -> f64 {
        let (outer, middle) = self.percent_of_span();
        // On the line between two parts the wider limit holds.
        if place > 0.25 && place < 0.75 {
            middle
        } else {
            outer
        }
    }
}

/// How an instrument's accuracy is stated.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize, Deserialize)]
#[serde(tag = "by", rename_all = "snake_case")]
pub enum Accuracy {
    /// Class on the dial (EN 837-1).
    #[serde(rename = "en_837_1")]
    En837 {
        /// The class.
        class: En837Class,
    },
    /// Grade on the dial (ASME B40.100).
    #[serde(rename = "asme_b40_100")]
    Asme {
        /// The grade.
        grade: AsmeGrade,
    },
    /// Share of the span, as most transducers state it.
    OfSpan {
        /// Limit of error as a share of the span: 0.005 for 0.5 %.
        share: f64,
    },
    /// Share of the reading, as tachometers and flow meters state it.
    OfReading {
        /// Limit of error as a share of the reading: 0.02 for 2 %.
        share: f64,
    },
    /// A fixed limit, as thermometers state it.
    Fixed {
        /// Limit of error, ±. For temperatures a temperature difference.
        limit: Measure,
    },
    /// Nothing is stated, or nobody looked: taken as 2.5 % of span, a worn class 1.6 gauge (common practice).
    #[default]
    NotKnown,
}

/// Share of the span taken where nothing is stated. Common practice.
pub const NOT_KNOWN_SHARE: f64 = 0.025;

impl Accuracy {
    /// Limit of error at a place on the scale, in the base unit of the instrument's kind.
    #[must_use]
    pub fn limit(&self, reading: f64, span_low: f64, span: f64) -> f64 {
        match self {
            Accuracy::En837 { class } => 0.01 * class.percent_of_span() * span,
            Accuracy::Asme { grade } => 0.01 * grade.percent_at((reading - span_low) / span) * span,
            Accuracy::OfSpan { share } => share * span,
            Accuracy::OfReading { share } => share * reading.abs(),
            Accuracy::Fixed { limit } => limit.base().abs(),
            Accuracy::NotKnown => NOT_KNOWN_SHARE * span,
        }
    }
}

impl fmt::Display for Accuracy {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let percent = |share: &f64| {
            let text = format!("{:.3}", share * 100.0);
            text.trim_end_matches('0').trim_end_matches('.').to_owned()
        };
        match self {
            Accuracy::En837 { class } => write!(f, "class {}", class.percent_of_span()),
            Accuracy::Asme { grade } => write!(f, "grade {}", grade_name(*grade)),
            Accuracy::OfSpan { share } => write!(f, "±{} % of span", percent(share)),
            Accuracy::OfReading { share } => write!(f, "±{} % of reading", percent(share)),
            Accuracy::Fixed { limit } => {
                write!(f, "±{} {}", limit.base().abs(), limit.kind().base_unit())
            }
            Accuracy::NotKnown => write!(
                f,
                "accuracy not known, taken as ±{} % of span",
                NOT_KNOWN_SHARE * 100.0
            ),
        }
    }
}

const fn grade_name(grade: AsmeGrade) -> &'static str {
    match grade {
        AsmeGrade::G4A => "4A",
        AsmeGrade::G3A => "3A",
        AsmeGrade::G2A => "2A",
        AsmeGrade::G1A => "1A",
        AsmeGrade::A => "A",
        AsmeGrade::B => "B",
        AsmeGrade::C => "C",
        AsmeGrade::D => "D",
    }
}
