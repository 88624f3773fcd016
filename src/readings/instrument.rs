//! Instruments and their accuracy.
//!
//! The error of an instrument has two parts, and they must be kept apart: its **bias** (class, calibration) is the same for
//! every reading taken with it, so that it cancels from a difference; the **reading** part (needle, last digit) is drawn anew
//! each time. Taking both as fresh each time throws away the sharpest evidence there is: forward against reverse, neutral
//! against drive on one gauge that nobody moved.

mod accuracy;
pub mod gum;
pub mod timed;
mod usual;

pub use accuracy::{Accuracy, AsmeGrade, En837Class, NOT_KNOWN_SHARE};
pub use usual::usual_instruments;

use crate::quantity::{DecimalMark, Decimals, Kind, Measure, MeasureError, format_with_unit};
use serde::{Deserialize, Serialize};
use thiserror::Error;

/// Coverage factor behind "by chance" in sentences: about 95 %.
const COVERAGE: f64 = 2.0;
/// Divisions of a dial whose division nobody noted. Common practice.
const USUAL_DIVISIONS: f64 = 50.0;

/// What sort of instrument it is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum InstrumentKind {
    /// Pressure gauge with a dial.
    PressureGauge,
    /// Vacuum or compound gauge.
    VacuumGauge,
    /// Pressure transducer or digital gauge.
    PressureTransducer,
    /// Flow meter in the line.
    FlowMeter,
    /// Jug and stopwatch.
    Jug,
    /// Tachometer.
    Tachometer,
    /// Counted turns and stopwatch.
    CountedTurns,
    /// Thermometer that touches.
    Thermometer,
    /// Infrared thermometer.
    InfraredThermometer,
    /// Meter in the lead of a coil.
    CurrentMeter,
    /// Stopwatch.
    Stopwatch,
    /// Tape measure.
    Tape,
    /// Ground speed by satellite or from the machine's display.
    GroundSpeed,
}

impl InstrumentKind {
    /// What it measures.
    #[must_use]
    pub const fn measures(self) -> Kind {
        match self {
            InstrumentKind::PressureGauge
            | InstrumentKind::VacuumGauge
            | InstrumentKind::PressureTransducer => Kind::Pressure,
            InstrumentKind::FlowMeter | InstrumentKind::Jug => Kind::Flow,
            InstrumentKind::Tachometer | InstrumentKind::CountedTurns => Kind::RotationalSpeed,
            InstrumentKind::Thermometer | InstrumentKind::InfraredThermometer => Kind::Temperature,
            InstrumentKind::CurrentMeter => Kind::Current,
            InstrumentKind::Stopwatch => Kind::Time,
            InstrumentKind::Tape => Kind::Length,
            InstrumentKind::GroundSpeed => Kind::GroundSpeed,
        }
    }
}

/// How the figure is shown.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Indication {
    /// A needle over divisions, read to a quarter of one.
    #[default]
    Needle,
    /// Digits.
    Digital,
}

/// An instrument of the shop.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct Instrument {
    /// Stable id within the shop's list.
    pub id: String,
    /// What the shop calls it.
    pub name: String,
    /// What sort it is.
    pub what: InstrumentKind,
    /// Foot of the scale.
    pub span_low: Measure,
    /// Top of the scale.
    pub span_high: Measure,
    /// How far it may be wrong.
    #[serde(default)]
    pub accuracy: Accuracy,
    /// How it shows the figure.
    #[serde(default)]
    pub indication: Indication,
    /// One division of the dial, or one step of the last digit; for temperatures a difference. Where nobody noted it, a
    /// fiftieth of the span is taken.
    #[serde(default)]
    pub resolution: Option<Measure>,
}

/// What is wrong with the description of an instrument.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum InstrumentError {
    /// A figure of the wrong kind.
    #[error("{name}: the {what} must be a {wanted}, not a {found}")]
    OtherKind {
        /// The instrument.
        name: String,
        /// Which figure.
        what: &'static str,
        /// The kind it must have.
        wanted: Kind,
        /// The kind it has.
        found: Kind,
    },
    /// The scale has no length.
    #[error("{name}: the top of the scale must lie above its foot")]
    NoSpan {
        /// The instrument.
        name: String,
    },
    /// A division that the scale cannot have.
    #[error("{name}: one division must be more than zero and less than the scale")]
    Resolution {
        /// The instrument.
        name: String,
    },
    /// An accuracy that no instrument states.
    #[error("{name}: a limit of error lies between 0 and 50 %; {percent} % is stated")]
    Accuracy {
        /// The instrument.
        name: String,
        /// What is stated, in per cent.
        percent: f64,
    },
}

impl Instrument {
    /// Length of the scale, in the base unit of what it measures.
    #[must_use]
    pub fn span(&self) -> f64 {
        self.span_high.base() - self.span_low.base()
    }

    /// Checks a description that came from a person or a file.
    ///
    /// # Errors
    /// [`InstrumentError`].
    pub fn check(&self) -> Result<(), InstrumentError> {
        let kind = self.what.measures();
        let step_kind = difference_of(kind);
        let name = || self.name.clone();
        let wrong = |what, wanted, found| InstrumentError::OtherKind {
            name: name(),
            what,
            wanted,
            found,
        };
        for (what, end) in [
            ("foot of the scale", self.span_low),
            ("top of the scale", self.span_high),
        ] {
            if end.kind() != kind {
                return Err(wrong(what, kind, end.kind()));
            }
        }
        if self.span() <= 0.0 {
            return Err(InstrumentError::NoSpan { name: name() });
        }
        if let Some(step) = self.resolution {
            if step.kind() != step_kind {
                return Err(wrong("division", step_kind, step.kind()));
            }
            if step.base() <= 0.0 || step.base() >= self.span() {
                return Err(InstrumentError::Resolution { name: name() });
            }
        }
        match self.accuracy {
            Accuracy::OfSpan { share } | Accuracy::OfReading { share }
                if !(0.0..=0.5).contains(&share) =>
            {
                Err(InstrumentError::Accuracy {
                    name: name(),
                    percent: 100.0 * share,
                })
            }
            Accuracy::Fixed { limit } if limit.kind() != step_kind => {
                Err(wrong("limit of error", step_kind, limit.kind()))
            }
            _ => Ok(()),
        }
    }

    /// Limit of error at a reading, ±, in the base unit of what it measures (K for temperatures).
    #[must_use]
    pub fn limit_of_error(&self, reading: Measure) -> f64 {
        self.accuracy
            .limit(reading.base(), self.span_low.base(), self.span())
    }

    /// Standard uncertainty of the bias at a reading: one draw for all readings with this instrument. Rectangular over the
    /// limit of error (JCGM 100, 4.3.7). In the base unit of what it measures (K for temperatures).
    #[must_use]
    pub fn bias_standard_uncertainty(&self, reading: Measure) -> f64 {
        gum::rectangular(self.limit_of_error(reading))
    }

    /// Standard uncertainty of one reading: needle or last digit, drawn anew each time. In the base unit of what it
    /// measures (K for temperatures).
    #[must_use]
    pub fn reading_standard_uncertainty(&self) -> f64 {
        let step = self
            .resolution
            .map_or(self.span() / USUAL_DIVISIONS, Measure::base);
        match self.indication {
            Indication::Needle => gum::needle_division(step),
            Indication::Digital => gum::digital_step(step),
        }
    }

    /// Standard uncertainty of one reading on its own, bias and reading together.
    #[must_use]
    pub fn standard_uncertainty(&self, reading: Measure) -> f64 {
        gum::combined(&[
            self.bias_standard_uncertainty(reading),
            self.reading_standard_uncertainty(),
        ])
    }

    /// The difference that two readings with this instrument, unmoved, show by chance (about 95 %): its bias cancels, the
    /// reading part counts twice.
    #[must_use]
    pub fn chance_difference(&self) -> f64 {
        COVERAGE * core::f64::consts::SQRT_2 * self.reading_standard_uncertainty()
    }

    /// Can two readings with this instrument tell a difference of this size? In the base unit the difference must be larger
    /// than [`Instrument::chance_difference`].
    ///
    /// # Errors
    /// The reason, naming the instrument and what would do instead.
    pub fn can_answer(&self, wanted_difference: Measure) -> Result<(), String> {
        let kind = self.what.measures();
        let wanted = wanted_difference.base().abs();
        if wanted_difference.kind() != difference_of(kind) && wanted_difference.kind() != kind {
            return Err(format!(
                "{} measures {kind}, not {}.",
                self.name,
                wanted_difference.kind()
            ));
        }
        let chance = self.chance_difference();
        if chance <= wanted {
            return Ok(());
        }
        let limit = self.limit_of_error(self.span_high);
        let mut text = format!(
            "{} cannot answer this: it is good to ±{} ({}), and two readings on it differ by {} by chance; {} is looked for.",
            self.name,
            in_words(limit, kind),
            self.accuracy,
            in_words(chance, kind),
            in_words(wanted, kind),
        );
        if kind == Kind::Pressure
            && let Some(span) = standard_span_under(self.span() * wanted / chance)
        {
            text.push_str(&format!(
                " Use a gauge of {span} bar or less, on a port that never sees more or behind a gauge protector."
            ));
        }
        Err(text)
    }

    /// Can this instrument judge a value by itself against a window of this half-width? Its own expanded uncertainty must be
    /// smaller.
    ///
    /// # Errors
    /// The reason, naming the instrument.
    pub fn can_judge(&self, reading: Measure, half_width: f64) -> Result<(), String> {
        let kind = self.what.measures();
        let own = gum::expanded(self.standard_uncertainty(reading), COVERAGE);
        if own <= half_width.abs() {
            return Ok(());
        }
        Err(format!(
            "{} reads this to ±{} at best ({}), the window is only ±{} wide.",
            self.name,
            in_words(own, kind),
            self.accuracy,
            in_words(half_width.abs(), kind),
        ))
    }

    /// May it stand on a port that can see `highest`?
    ///
    /// # Errors
    /// The warning, naming the instrument.
    pub fn can_stand(&self, highest: Measure) -> Result<(), String> {
        if highest.kind() != self.what.measures() || highest <= self.span_high {
            return Ok(());
        }
        Err(format!(
            "{} ends at {}; this port can see {}. A burst gauge throws hot oil and glass: use a larger one or a gauge \
             protector.",
            self.name,
            print(self.span_high),
            print(highest),
        ))
    }
}

/// The kind of a difference of two figures of `kind`.
#[must_use]
pub const fn difference_of(kind: Kind) -> Kind {
    match kind {
        Kind::Temperature => Kind::TemperatureDifference,
        other => other,
    }
}

fn print(measure: Measure) -> String {
    format_with_unit(
        measure,
        measure.kind().base_unit(),
        Decimals::Reading,
        DecimalMark::Point,
    )
}

fn in_words(base: f64, kind: Kind) -> String {
    let measure: Result<Measure, MeasureError> = Measure::from_base(base, difference_of(kind));
    measure.map_or_else(|error| error.to_string(), print)
}

/// The largest usual span of a gauge in bar (EN 837-1, scale ranges) that is not over this.
fn standard_span_under(span: f64) -> Option<f64> {
    const SPANS: [f64; 17] = [
        0.6, 1.0, 1.6, 2.5, 4.0, 6.0, 10.0, 16.0, 25.0, 40.0, 60.0, 100.0, 160.0, 250.0, 400.0,
        600.0, 1000.0,
    ];
    SPANS.iter().rev().copied().find(|usual| *usual <= span)
}

#[cfg(test)]
mod tests;
