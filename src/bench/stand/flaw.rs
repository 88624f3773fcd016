//! What keeps a point out of displacement, fit and verdict: it moved while it was read, or it shows what no machine can do.
//!
//! A point that moved says nothing of any figure. One that is impossible says that an instrument lies: it is left out of what
//! rests on that instrument, and as long as it stands in the table nothing of that kind is judged at all, because the same
//! instrument read the other points. Whoever finds a slip of the pen corrects the row or leaves it out.

use super::analysis::Quantity;
use super::channel::{Channel, Subject};
use super::layout::{Layout, Meter};
use super::point::{Point, Steadiness};
use super::uncertain::{Evaluated, Uncertain};
use std::collections::BTreeSet;

/// Rounds in which the worst impossible flow is taken out alone, before all that are left go at once.
const ROUNDS: usize = 12;

/// A kind of figure that stands or falls together.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Part {
    /// Flow at the high port, and the displacement derived of it.
    Flow,
    /// Torque and shaft power.
    Torque,
    /// Leakage out of the case.
    Case,
}

impl Part {
    /// Every part.
    pub const ALL: [Part; 3] = [Part::Flow, Part::Torque, Part::Case];

    /// Words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Part::Flow => "flow",
            Part::Torque => "torque",
            Part::Case => "case flow",
        }
    }

    /// What a figure rests on.
    #[must_use]
    pub const fn of(quantity: Quantity) -> &'static [Part] {
        match quantity {
            Quantity::Volumetric | Quantity::FlowLost | Quantity::Flow => &[Part::Flow],
            Quantity::HydroMechanical | Quantity::TorqueLost | Quantity::ShaftPower => {
                &[Part::Torque]
            }
            Quantity::CaseLeakage => &[Part::Case],
            Quantity::Overall | Quantity::OutPower => &[Part::Flow, Part::Torque],
        }
    }
}

/// Why a point is left out.
#[derive(Clone, Debug, PartialEq)]
pub enum Flaw {
    /// Not steady: which channels, half their range, and what is allowed (both in the channel's unit).
    Moved(Vec<(Channel, f64, f64)>),
    /// The high line lies under the low one by more than the doubt; the difference, bar.
    Reversed(f64),
    /// An efficiency over 1 by more than its doubt.
    OverOne(Quantity, Uncertain),
    /// A flow, leakage or efficiency below zero by more than its doubt.
    BelowZero(Quantity, Uncertain),
}

impl Flaw {
    /// True where an instrument or its line lies, not the machine's rest.
    #[must_use]
    pub const fn is_impossible(&self) -> bool {
        !matches!(self, Flaw::Moved(_))
    }

    /// What of the point is left out.
    fn spoils(&self, subject: Subject, layout: &Layout) -> Vec<Part> {
        match self {
            Flaw::Moved(_) | Flaw::Reversed(_) => Part::ALL.to_vec(),
            // From a leakage that cannot be, a flow metered in the low line cannot be closed either.
            Flaw::OverOne(Quantity::CaseLeakage, _) | Flaw::BelowZero(Quantity::CaseLeakage, _)
                if layout.meter == Some(Meter::Low) && subject != Subject::Transmission =>
            {
                vec![Part::Case, Part::Flow]
            }
            Flaw::OverOne(quantity, _) | Flaw::BelowZero(quantity, _) => {
                Part::of(*quantity).to_vec()
            }
        }
    }

    /// Why, in a few words, without figures.
    #[must_use]
    pub fn words(&self, subject: Subject) -> String {
        let of = |quantity: &Quantity| match quantity {
            Quantity::Volumetric => "volumetric efficiency",
            Quantity::HydroMechanical => "hydro-mechanical efficiency",
            Quantity::CaseLeakage => "case leakage after correction",
            _ => "overall efficiency",
        };
        match self {
            Flaw::Moved(channels) => {
                let names: Vec<String> = channels
                    .iter()
                    .map(|(channel, ..)| channel.words(subject).to_lowercase())
                    .collect();
                format!("was not steady ({})", names.join(", "))
            }
            Flaw::Reversed(_) => {
                "has less pressure in the high line than in the low one".to_owned()
            }
            Flaw::OverOne(quantity, _) => {
                format!(
                    "is impossible: {} over 100 % by more than its doubt",
                    of(quantity)
                )
            }
            Flaw::BelowZero(quantity, _) => {
                format!(
                    "is impossible: {} below zero by more than its doubt",
                    of(quantity)
                )
            }
        }
    }
}

/// A point that is left out, or part of it.
#[derive(Clone, Debug, PartialEq)]
pub struct LeftOut {
    /// Which point.
    pub at: usize,
    /// Its name.
    pub name: String,
    /// Why.
    pub flaw: Flaw,
    /// What of it.
    pub parts: Vec<Part>,
}

impl LeftOut {
    /// "point 3 was not steady (flow)".
    #[must_use]
    pub fn words(&self, subject: Subject) -> String {
        format!("point {} {}", self.name, self.flaw.words(subject))
    }
}

/// Every point that is left out, a line a point: what, why, and of what it is left out.
#[must_use]
pub fn told(left_out: &[LeftOut], subject: Subject) -> Vec<String> {
    left_out
        .iter()
        .map(|one| {
            let of = if one.parts.len() == Part::ALL.len() || subject == Subject::Transmission {
                "left out of verdict, displacement and fit".to_owned()
            } else {
                let names: Vec<&str> = one.parts.iter().map(|part| part.words()).collect();
                format!("its {} is left out of verdict and fit", names.join(" and "))
            };
            format!("Point {} {}: {of}", one.name, one.flaw.words(subject))
        })
        .collect()
}

/// Why nothing that rests on these parts is judged: the first impossible point, in words.
#[must_use]
pub fn lies<'a>(left_out: &'a [LeftOut], parts: &[Part]) -> Option<&'a LeftOut> {
    left_out
        .iter()
        .find(|one| one.flaw.is_impossible() && parts.iter().any(|part| one.parts.contains(part)))
}

/// Marks the points that are left out and evaluates the rest. `evaluate` computes a run.
pub(super) fn sorted(
    points: &mut [Point],
    subject: Subject,
    layout: &Layout,
    doubt_of_difference: impl Fn(&Point) -> f64,
    evaluate: impl Fn(&[Point]) -> Evaluated,
) -> (Evaluated, Vec<LeftOut>) {
    let mut found: Vec<LeftOut> = Vec::new();
    for (at, point) in points.iter_mut().enumerate() {
        let difference = point.means.difference().unwrap_or(0.0);
        let flaw = match &point.steadiness {
            Steadiness::Moving(channels) => Flaw::Moved(channels.clone()),
            _ if difference < -doubt_of_difference(point) => Flaw::Reversed(difference),
            _ => continue,
        };
        found.push(mark(at, point, flaw, subject, layout));
    }
    let mut evaluated = evaluate(points);
    for round in 0..=Part::ALL.len() * points.len() {
        let mut flaws = impossible(points, &evaluated);
        if flaws.is_empty() {
            break;
        }
        // A flow that is wrong drags the derived displacement along, and that makes good points look impossible: so the worst
        // goes first, and the rest is looked at again without it. Torque and leakage drag nothing.
        if round < ROUNDS
            && let Some(worst) = flaws
                .iter()
                .filter(|(_, flaw)| flaw.spoils(subject, layout).contains(&Part::Flow))
                .max_by(|a, b| excess(&a.1).total_cmp(&excess(&b.1)))
                .map(|(at, _)| *at)
        {
            flaws.retain(|(at, flaw)| {
                *at == worst || !flaw.spoils(subject, layout).contains(&Part::Flow)
            });
        }
        for (at, flaw) in flaws {
            found.push(mark(at, &mut points[at], flaw, subject, layout));
        }
        evaluated = evaluate(points);
    }
    found.sort_by_key(|one| one.at);
    (evaluated, found)
}

fn mark(at: usize, point: &mut Point, flaw: Flaw, subject: Subject, layout: &Layout) -> LeftOut {
    let parts = flaw.spoils(subject, layout);
    point.left_out.extend(parts.iter().copied());
    LeftOut {
        at,
        name: point.name.clone(),
        flaw,
        parts,
    }
}

/// How far beyond what can be, in standard uncertainties.
fn excess(flaw: &Flaw) -> f64 {
    let over = |past: f64, figure: &Uncertain| past / figure.standard.max(1e-9);
    match flaw {
        Flaw::OverOne(_, figure) => over(figure.value - 1.0, figure),
        Flaw::BelowZero(_, figure) => over(-figure.value, figure),
        Flaw::Moved(_) | Flaw::Reversed(_) => 0.0,
    }
}

/// Points that still count and show what cannot be.
fn impossible(points: &[Point], evaluated: &Evaluated) -> Vec<(usize, Flaw)> {
    let mut found = Vec::new();
    for (at, (point, figures)) in points.iter().zip(&evaluated.points).enumerate() {
        let flaw = |quantity: Quantity| {
            let figure = *figures.get(&quantity)?;
            let counts: BTreeSet<Part> = Part::of(quantity).iter().copied().collect();
            if !point.left_out.is_disjoint(&counts) {
                return None;
            }
            let is_share = quantity != Quantity::CaseLeakage;
            if is_share && figure.value - figure.expanded() > 1.0 {
                Some(Flaw::OverOne(quantity, figure))
            } else if figure.value + figure.expanded() < 0.0 {
                Some(Flaw::BelowZero(quantity, figure))
            } else {
                None
            }
        };
        let own: Vec<Flaw> = [
            Quantity::Volumetric,
            Quantity::HydroMechanical,
            Quantity::CaseLeakage,
        ]
        .into_iter()
        .filter_map(flaw)
        .collect();
        // The product is told alone only where neither factor says which instrument it is.
        let whole = if own
            .iter()
            .any(|f| !matches!(f, Flaw::BelowZero(Quantity::CaseLeakage, _)))
        {
            None
        } else {
            flaw(Quantity::Overall)
        };
        found.extend(own.into_iter().chain(whole).map(|flaw| (at, flaw)));
    }
    found
}
