//! Limits of a run as the unit's manual or the customer states them: at a point of the table, or along a curve over pressure.

use super::analysis::Quantity;
use super::channel::Subject;
use crate::quantity::{Measure, Typed, Unit};
use serde::{Deserialize, Serialize};

/// Most limits of one sheet.
pub const LIMITS: usize = 60;

/// What is limited. The serde codes stand in files that people keep: they never change.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Limited {
    /// Overall efficiency, at least.
    #[default]
    Overall,
    /// Volumetric efficiency, at least.
    Volumetric,
    /// Hydro-mechanical efficiency, at least.
    HydroMechanical,
    /// Leakage out of the case, at most.
    CaseLeakage,
    /// Flow at the high port: a pump's at least, a motor's at most.
    Flow,
}

impl Limited {
    /// Every one.
    pub const ALL: [Limited; 5] = [
        Limited::Overall,
        Limited::Volumetric,
        Limited::HydroMechanical,
        Limited::CaseLeakage,
        Limited::Flow,
    ];

    /// The figure of a point that it limits.
    #[must_use]
    pub const fn quantity(self) -> Quantity {
        match self {
            Limited::Overall => Quantity::Overall,
            Limited::Volumetric => Quantity::Volumetric,
            Limited::HydroMechanical => Quantity::HydroMechanical,
            Limited::CaseLeakage => Quantity::CaseLeakage,
            Limited::Flow => Quantity::Flow,
        }
    }

    /// Unit in which a limit is asked for, lowest and highest taken, in that unit.
    #[must_use]
    pub const fn asks(self) -> (Unit, f64, f64) {
        match self {
            Limited::CaseLeakage | Limited::Flow => (Unit::LitrePerMinute, 0.0, 5_000.0),
            _ => (Unit::Percent, 1.0, 100.0),
        }
    }

    /// True where a limit is the highest allowed, not the lowest.
    #[must_use]
    pub const fn is_most(self, subject: Subject) -> bool {
        match self {
            Limited::CaseLeakage => true,
            Limited::Flow => matches!(subject, Subject::Motor),
            _ => false,
        }
    }

    /// Words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Limited::Overall => "Overall efficiency",
            Limited::Volumetric => "Volumetric efficiency",
            Limited::HydroMechanical => "Hydro-mechanical efficiency",
            Limited::CaseLeakage => "Case leakage",
            Limited::Flow => "Flow at the high port",
        }
    }

    /// True where a sheet of this subject can carry it.
    #[must_use]
    pub const fn belongs(self, subject: Subject) -> bool {
        !matches!(subject, Subject::Transmission) || matches!(self, Limited::Overall)
    }
}

/// Where a limit holds.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Scope {
    /// At one point of the table.
    #[default]
    Point,
    /// From one pressure difference to another, at one speed.
    Curve,
}

/// A figure of a limit.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Part {
    /// Speed of a curve.
    Speed,
    /// Lower pressure difference of a curve.
    From,
    /// Higher pressure difference of a curve.
    To,
    /// The limit; of a curve at the lower pressure.
    Limit,
    /// The limit at the higher pressure, where it is another one: straight in between.
    LimitTo,
}

impl Part {
    /// Every figure.
    pub const ALL: [Part; 5] = [
        Part::Speed,
        Part::From,
        Part::To,
        Part::Limit,
        Part::LimitTo,
    ];

    /// Unit in which it is asked for, lowest and highest taken, in that unit.
    #[must_use]
    pub const fn asks(self, of: Limited) -> (Unit, f64, f64) {
        match self {
            Part::Speed => (Unit::RevolutionPerMinute, 1.0, 10_000.0),
            Part::From | Part::To => (Unit::Bar, 0.0, 1_000.0),
            Part::Limit | Part::LimitTo => of.asks(),
        }
    }
}

/// A limit as typed.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Acceptance {
    /// Stable id.
    pub id: String,
    /// What is limited.
    pub of: Limited,
    /// Where.
    pub scope: Scope,
    /// Name of the point.
    pub point: String,
    /// Speed of a curve; empty for case leakage at whatever speed.
    pub speed: Typed,
    /// Lower pressure difference of a curve.
    pub from: Typed,
    /// Higher pressure difference.
    pub to: Typed,
    /// Limit; of a curve at the lower pressure.
    pub limit: Typed,
    /// Limit of a curve at the higher pressure; empty where it is the same.
    pub limit_to: Typed,
    /// Where it is from: the manual with its page, the customer.
    pub source: String,
}

/// A curve of a limit: rpm, bar, and the limit as a share or in L/min.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Line {
    /// Speed, rpm; none where any will do.
    pub speed: Option<f64>,
    /// Pressure differences, bar.
    pub span: (f64, f64),
    /// Limit at each end.
    pub ends: (f64, f64),
}

impl Line {
    /// The limit at a pressure difference, bar: straight between the ends.
    #[must_use]
    pub fn at(&self, difference: f64) -> f64 {
        let (from, to) = self.span;
        let share = ((difference - from) / (to - from)).clamp(0.0, 1.0);
        self.ends.0 + share * (self.ends.1 - self.ends.0)
    }
}

impl Acceptance {
    /// A figure as typed.
    #[must_use]
    pub fn typed(&self, part: Part) -> &Typed {
        match part {
            Part::Speed => &self.speed,
            Part::From => &self.from,
            Part::To => &self.to,
            Part::Limit => &self.limit,
            Part::LimitTo => &self.limit_to,
        }
    }

    /// The same, to write.
    pub fn typed_mut(&mut self, part: Part) -> &mut Typed {
        match part {
            Part::Speed => &mut self.speed,
            Part::From => &mut self.from,
            Part::To => &mut self.to,
            Part::Limit => &mut self.limit,
            Part::LimitTo => &mut self.limit_to,
        }
    }

    /// A figure: a share for per cent, else in the unit that it is asked in.
    #[must_use]
    pub fn value(&self, part: Part) -> Option<f64> {
        let (unit, ..) = part.asks(self.of);
        let unit = if unit == Unit::Percent {
            Unit::Fraction
        } else {
            unit
        };
        let value: Measure = self.typed(part).value?;
        value.try_in_unit(unit).ok()
    }

    /// Limits something else from now on. A limit typed for another kind of quantity stays as text and has to be typed again.
    pub fn limit_of(&mut self, of: Limited) {
        let is_same = self.of.asks().0 == of.asks().0;
        self.of = of;
        if !is_same {
            self.limit.value = None;
            self.limit_to.value = None;
        }
    }

    /// Where it is from.
    #[must_use]
    pub fn from_words(&self) -> String {
        match self.source.trim() {
            "" => "as entered".to_owned(),
            source => source.to_owned(),
        }
    }

    /// The curve.
    ///
    /// # Errors
    /// What is still to be entered, in a few words.
    pub fn line(&self) -> Result<Line, &'static str> {
        let limit = self.limit()?;
        let need = |part, words| {
            let typed = self.typed(part);
            match self.value(part) {
                Some(value) => Ok(Some(value)),
                None if typed.is_blank() => Ok(None),
                None => Err(words),
            }
        };
        let speed = need(Part::Speed, "the speed cannot be read")?;
        if speed.is_none() && self.of != Limited::CaseLeakage {
            return Err("give the speed");
        }
        let from = need(Part::From, "the lower pressure cannot be read")?;
        let to = need(Part::To, "the higher pressure cannot be read")?;
        let (Some(from), Some(to)) = (from, to) else {
            return Err("give both pressure differences");
        };
        if to <= from {
            return Err("the higher pressure has to lie over the lower one");
        }
        let end = need(
            Part::LimitTo,
            "the limit at the higher pressure cannot be read",
        )?;
        Ok(Line {
            speed,
            span: (from, to),
            ends: (limit, end.unwrap_or(limit)),
        })
    }

    /// The limit itself.
    ///
    /// # Errors
    /// What is still to be entered.
    pub fn limit(&self) -> Result<f64, &'static str> {
        match self.value(Part::Limit) {
            Some(limit) => Ok(limit),
            None if self.limit.is_blank() => Err("give the limit"),
            None => Err("the limit cannot be read"),
        }
    }

    /// What is still to be entered; none where it can be judged.
    #[must_use]
    pub fn missing(&self) -> Option<&'static str> {
        match self.scope {
            Scope::Point if self.point.trim().is_empty() => Some("choose the point"),
            Scope::Point => self.limit().err(),
            Scope::Curve => self.line().err(),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn typed(value: f64, unit: Unit) -> Typed {
        Typed {
            typed: format!("{value}"),
            value: Some(Measure::literal(value, unit)),
        }
    }

    #[test]
    fn a_line_is_straight_between_its_ends_and_level_beyond() {
        let mut leak = Acceptance {
            of: Limited::CaseLeakage,
            scope: Scope::Curve,
            limit: typed(2.0, Unit::LitrePerMinute),
            ..Acceptance::default()
        };
        assert_eq!(leak.missing(), Some("give both pressure differences"));
        leak.from = typed(100.0, Unit::Bar);
        leak.to = typed(50.0, Unit::Bar);
        assert!(
            leak.missing()
                .is_some_and(|why| why.contains("over the lower"))
        );
        leak.to = typed(300.0, Unit::Bar);
        leak.limit_to = typed(6.0, Unit::LitrePerMinute);
        let line = leak.line().expect("whole");
        assert_eq!(line.speed, None);
        for (difference, limit) in [(50.0, 2.0), (100.0, 2.0), (150.0, 3.0), (300.0, 6.0)] {
            assert!((line.at(difference) - limit).abs() < 1e-12);
        }
        // An efficiency is judged at a speed.
        leak.limit_of(Limited::Overall);
        assert_eq!(leak.missing(), Some("the limit cannot be read"));
        assert_eq!(leak.limit.typed, "2");
    }
}
