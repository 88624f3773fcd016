//! Pass, fail or cannot tell: a decision rule with a guard band (JCGM 106:2012, 8.3).
//!
//! The guard band is the expanded uncertainty (coverage factor 2). A figure passes where it lies inside the limits by at
//! least the guard band, fails where it lies outside by at least as much, and cannot be told in between. So both a wrong pass
//! and a wrong fail have a chance of at most 2.5 %.

use super::uncertain::Uncertain;
use crate::quantity::Typed;
use serde::{Deserialize, Serialize};

/// What a run is judged by.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Measurand {
    /// Lowest volumetric efficiency at rated speed and rated pressure.
    Volumetric,
    /// Best overall efficiency of the run.
    Overall,
    /// Case leakage at rated pressure, as a share of the rated flow.
    CaseLeakage,
    /// Derived displacement over that of the plate.
    Displacement,
}

/// Limits as typed, in per cent.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct TypedLimit {
    /// Lowest.
    pub low: Typed,
    /// Highest.
    pub high: Typed,
    /// Where it is from: manual, customer.
    pub from: String,
}

/// Limits with where they are from.
#[derive(Clone, Debug, PartialEq)]
pub struct Limits {
    /// Lowest allowed.
    pub low: Option<f64>,
    /// Highest allowed.
    pub high: Option<f64>,
    /// Where they are from.
    pub from: String,
}

/// A decision.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Decision {
    /// Inside by more than the doubt.
    Pass,
    /// Outside by more than the doubt.
    Fail,
    /// The doubt reaches over a limit.
    CannotTell,
}

impl Decision {
    /// Words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Decision::Pass => "pass",
            Decision::Fail => "fail",
            Decision::CannotTell => "cannot tell",
        }
    }
}

/// Decides; none without a limit or without a doubt that is a number.
#[must_use]
pub fn decide(figure: Uncertain, limits: &Limits) -> Option<Decision> {
    if limits.low.is_none() && limits.high.is_none() {
        return None;
    }
    let guard = figure.expanded();
    if !(figure.value.is_finite() && guard.is_finite()) {
        return None;
    }
    let below = |low: f64| figure.value + guard < low;
    let above = |high: f64| figure.value - guard > high;
    let fails = limits.low.is_some_and(below) || limits.high.is_some_and(above);
    if fails {
        return Some(Decision::Fail);
    }
    let clear_below = limits.low.is_none_or(|low| figure.value - guard >= low);
    let clear_above = limits.high.is_none_or(|high| figure.value + guard <= high);
    Some(if clear_below && clear_above {
        Decision::Pass
    } else {
        Decision::CannotTell
    })
}

/// Usual limits of the trade, where the unit's manual states none: new and rebuilt units pass at these. Common practice.
#[must_use]
pub fn usual(measurand: Measurand) -> Limits {
    let (low, high) = match measurand {
        Measurand::Volumetric => (Some(0.92), None),
        Measurand::Overall => (Some(0.84), None),
        Measurand::CaseLeakage => (None, Some(0.05)),
        Measurand::Displacement => (Some(0.97), Some(1.03)),
    };
    Limits {
        low,
        high,
        from: "common practice, rebuilt unit".to_owned(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn at(value: f64, standard: f64) -> Uncertain {
        Uncertain { value, standard }
    }

    fn over(low: f64) -> Limits {
        Limits {
            low: Some(low),
            high: None,
            from: String::new(),
        }
    }

    #[test]
    fn doubt_that_reaches_over_the_limit_decides_nothing() {
        let limit = over(0.92);
        assert_eq!(decide(at(0.95, 0.01), &limit), Some(Decision::Pass));
        assert_eq!(decide(at(0.93, 0.01), &limit), Some(Decision::CannotTell));
        assert_eq!(decide(at(0.91, 0.01), &limit), Some(Decision::CannotTell));
        assert_eq!(decide(at(0.89, 0.01), &limit), Some(Decision::Fail));
    }

    #[test]
    fn a_limit_on_each_side() {
        let limits = Limits {
            low: Some(0.97),
            high: Some(1.03),
            from: String::new(),
        };
        assert_eq!(decide(at(1.0, 0.01), &limits), Some(Decision::Pass));
        assert_eq!(decide(at(1.06, 0.01), &limits), Some(Decision::Fail));
        // A doubt wider than the room between the limits can never pass.
        assert_eq!(decide(at(1.0, 0.02), &limits), Some(Decision::CannotTell));
    }

    #[test]
    fn without_a_limit_or_a_figure_there_is_no_verdict() {
        let none = Limits {
            low: None,
            high: None,
            from: String::new(),
        };
        assert_eq!(decide(at(1.0, 0.0), &none), None);
        assert_eq!(decide(at(f64::NAN, 0.1), &over(0.5)), None);
    }
}
