//! ISO 4406 cleanliness codes, and what a filter takes out.

use serde::{Deserialize, Serialize};
use std::fmt;
use std::str::FromStr;
use thiserror::Error;

/// Upper limits in particles per mL of the scale numbers 0 to 28, upper limit included (ISO 4406:1999, Table 1).
const UPPER: [f64; 29] = [
    0.01,
    0.02,
    0.04,
    0.08,
    0.16,
    0.32,
    0.64,
    1.3,
    2.5,
    5.0,
    10.0,
    20.0,
    40.0,
    80.0,
    160.0,
    320.0,
    640.0,
    1300.0,
    2500.0,
    5000.0,
    10_000.0,
    20_000.0,
    40_000.0,
    80_000.0,
    160_000.0,
    320_000.0,
    640_000.0,
    1_300_000.0,
    2_500_000.0,
];
/// A count of fewer particles than this is marked "at least" (ISO 4406:1999).
const FEWEST_RAW: u32 = 20;

/// What is wrong with a cleanliness code.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
pub enum CleanlinessError {
    /// Not three numbers.
    #[error("“{text}” is no cleanliness code; type three numbers from 0 to 29, as 19/16/13")]
    Form {
        /// What was typed.
        text: String,
    },
    /// Larger particles cannot be more than smaller ones.
    #[error(
        "{code}: each number counts larger particles than the one before it, so it cannot be higher"
    )]
    Order {
        /// The code.
        code: String,
    },
}

/// One scale number of ISO 4406. 29 stands for more than 2.5 million per mL.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct ScaleNumber(u8);

impl ScaleNumber {
    /// The scale number, 0 to 29.
    #[must_use]
    pub const fn new(number: u8) -> Option<Self> {
        if number <= 29 {
            Some(Self(number))
        } else {
            None
        }
    }

    /// The number.
    #[must_use]
    pub const fn number(self) -> u8 {
        self.0
    }

    /// The scale number of a count per mL. None for a count that is no count.
    #[must_use]
    pub fn of_count(per_ml: f64) -> Option<Self> {
        if per_ml.is_nan() || per_ml < 0.0 {
            return None;
        }
        let number = UPPER
            .iter()
            .position(|upper| per_ml <= *upper)
            .unwrap_or(UPPER.len());
        u8::try_from(number).ok().and_then(Self::new)
    }

    /// More than the first and up to the second of these counts per mL.
    #[must_use]
    pub fn range(self) -> (f64, f64) {
        let at = usize::from(self.0);
        let above = at
            .checked_sub(1)
            .and_then(|below| UPPER.get(below))
            .copied()
            .unwrap_or(0.0);
        (above, UPPER.get(at).copied().unwrap_or(f64::INFINITY))
    }
}

/// A cleanliness code: particles per mL above 4, 6 and 14 µm(c). Stored as it is written, `"19/16/13"`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Serialize, Deserialize)]
#[serde(into = "String", try_from = "String")]
pub struct CleanlinessCode {
    numbers: [ScaleNumber; 3],
    /// Fewer than 20 particles were counted, so the true number can be higher.
    at_least: [bool; 3],
}

impl CleanlinessCode {
    /// From counts per mL above 4, 6 and 14 µm(c), and the particles that were really counted for each where known.
    ///
    /// # Errors
    /// [`CleanlinessError`].
    pub fn from_counts(
        per_ml: [f64; 3],
        counted: Option<[u32; 3]>,
    ) -> Result<Self, CleanlinessError> {
        let mut numbers = [ScaleNumber(0); 3];
        for (number, count) in numbers.iter_mut().zip(per_ml) {
            *number = ScaleNumber::of_count(count).ok_or_else(|| CleanlinessError::Form {
                text: format!("{count} per mL"),
            })?;
        }
        let at_least = counted.map_or([false; 3], |raw| raw.map(|count| count < FEWEST_RAW));
        Self { numbers, at_least }.in_order()
    }

    /// The three scale numbers, small particles first.
    #[must_use]
    pub const fn numbers(&self) -> [ScaleNumber; 3] {
        self.numbers
    }

    /// For each number, whether too few particles were counted for it to be more than a lower bound.
    #[must_use]
    pub const fn at_least(&self) -> [bool; 3] {
        self.at_least
    }

    /// True where no number is higher than that of `target`. A lower bound that meets the target does not prove it.
    #[must_use]
    pub fn meets(&self, target: &CleanlinessCode) -> bool {
        self.numbers
            .iter()
            .zip(&target.numbers)
            .all(|(have, want)| have <= want)
    }

    fn in_order(self) -> Result<Self, CleanlinessError> {
        let [small, middle, large] = self.numbers;
        if small >= middle && middle >= large {
            Ok(self)
        } else {
            Err(CleanlinessError::Order {
                code: self.to_string(),
            })
        }
    }
}

impl fmt::Display for CleanlinessCode {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        for (index, (number, at_least)) in self.numbers.iter().zip(self.at_least).enumerate() {
            let slash = if index > 0 { "/" } else { "" };
            let mark = if at_least { "≥" } else { "" };
            write!(f, "{slash}{mark}{}", number.0)?;
        }
        Ok(())
    }
}

impl FromStr for CleanlinessCode {
    type Err = CleanlinessError;

    fn from_str(text: &str) -> Result<Self, CleanlinessError> {
        let wrong = || CleanlinessError::Form {
            text: text.trim().to_owned(),
        };
        let mut parts = text
            .split(['/', '-', ' '])
            .map(str::trim)
            .filter(|part| !part.is_empty());
        let mut numbers = [ScaleNumber(0); 3];
        let mut at_least = [false; 3];
        for (number, at_least) in numbers.iter_mut().zip(&mut at_least) {
            let part = parts.next().ok_or_else(wrong)?;
            let digits = part.trim_start_matches(['≥', '>', '=']);
            *at_least = digits.len() < part.len();
            *number = digits
                .parse()
                .ok()
                .and_then(ScaleNumber::new)
                .ok_or_else(wrong)?;
        }
        if parts.next().is_some() {
            return Err(wrong());
        }
        Self { numbers, at_least }.in_order()
    }
}

impl From<CleanlinessCode> for String {
    fn from(code: CleanlinessCode) -> Self {
        code.to_string()
    }
}

impl TryFrom<String> for CleanlinessCode {
    type Error = CleanlinessError;

    fn try_from(text: String) -> Result<Self, CleanlinessError> {
        text.parse()
    }
}

/// Filtration ratio β of a filter: particles above a size upstream over those downstream (ISO 16889). None where nothing
/// was counted downstream.
#[must_use]
pub fn filtration_ratio(upstream: f64, downstream: f64) -> Option<f64> {
    let ratio = upstream / downstream;
    (upstream >= 0.0 && downstream > 0.0 && ratio.is_finite()).then_some(ratio)
}

/// Share of the particles that a filter of this filtration ratio keeps: 1 − 1/β.
#[must_use]
pub fn filtration_efficiency(ratio: f64) -> f64 {
    1.0 - 1.0 / ratio
}

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests {
    use super::*;
    use proptest::prelude::*;

    #[test]
    fn wrong_codes_are_refused_in_words() {
        for text in ["", "19/16", "19/16/13/9", "a/b/c", "30/16/13", "19/16/x"] {
            assert!(
                matches!(
                    text.parse::<CleanlinessCode>(),
                    Err(CleanlinessError::Form { .. })
                ),
                "{text}"
            );
        }
        assert!(matches!(
            "13/16/19".parse::<CleanlinessCode>(),
            Err(CleanlinessError::Order { .. })
        ));
        assert!(CleanlinessCode::from_counts([f64::NAN, 1.0, 1.0], None).is_err());
        assert!(CleanlinessCode::from_counts([-1.0, 1.0, 1.0], None).is_err());
    }

    #[test]
    fn a_target_is_met_number_by_number() {
        let code = |text: &str| text.parse::<CleanlinessCode>().expect("a code");
        assert!(code("18/15/12").meets(&code("18/16/13")));
        assert!(!code("18/17/12").meets(&code("18/16/13")));
    }

    proptest! {
        #[test]
        fn any_text_is_answered(text in ".{0,20}") {
            if let Ok(code) = text.parse::<CleanlinessCode>() {
                prop_assert_eq!(code.to_string().parse::<CleanlinessCode>(), Ok(code));
            }
        }

        #[test]
        fn counts_lie_in_the_range_of_their_number(count in 0.0_f64..3e6) {
            let (above, upto) = ScaleNumber::of_count(count).expect("a count").range();
            prop_assert!((count > above || count == 0.0) && count <= upto);
        }
    }
}
