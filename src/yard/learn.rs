//! What the shop's own closed cases teach about base rates: Dirichlet counts over the catalogue's starting values.
//!
//! The catalogue's rates, per hundred calls, count as [`STRENGTH`] calls of one's own: α_i = STRENGTH · p_i. A case with proof adds
//! 1 to its cause; one in which something was changed and the cause stayed unproved adds [`UNPROVED`], since everything else was
//! disturbed too, oil and filter with it. What is expected of cause i is then (α_i + c_i) / (Σα + Σc). For a class of machine the
//! cases of the other classes move the starting values, and weigh no more than the catalogue did; its own cases count in full.

use crate::demo;
use crate::faults::{self, FaultId};
use crate::record::{Afterwards, Closing, Visit};
use crate::unit::{MachineClass, Unit};
use serde::{Deserialize, Serialize};
use std::collections::{BTreeMap, BTreeSet};

/// Calls of one's own that the catalogue's rates count for.
pub const STRENGTH: f64 = 100.0;
/// What a case without proof counts, where something was changed.
pub const UNPROVED: f64 = 0.5;

/// The person's choices about learning. Kept in the settings, so that it goes out with the record.
#[derive(Clone, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(default)]
pub struct Learning {
    /// Nothing is learned: the catalogue's rates stand.
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    pub is_off: bool,
    /// Cases left out, by visit id.
    #[serde(skip_serializing_if = "BTreeSet::is_empty")]
    pub left_out: BTreeSet<String>,
}

impl Learning {
    /// True where nothing was chosen yet.
    #[must_use]
    pub fn is_untouched(&self) -> bool {
        *self == Learning::default()
    }
}

/// A closed case that can teach.
#[derive(Clone, Debug, PartialEq)]
pub struct Case {
    /// Visit id.
    pub visit: String,
    /// Unit's name.
    pub unit: String,
    /// Its class.
    pub class: MachineClass,
    /// When it was opened.
    pub opened: String,
    /// Causes, one or two.
    pub causes: Vec<FaultId>,
    /// Proved on the machine.
    pub is_proved: bool,
    /// Left out by the person.
    pub is_left_out: bool,
}

impl Case {
    /// What it counts, for all its causes together.
    #[must_use]
    pub fn weight(&self) -> f64 {
        match (self.is_left_out, self.is_proved) {
            (true, _) => 0.0,
            (false, true) => 1.0,
            (false, false) => UNPROVED,
        }
    }
}

fn cause(code: &str) -> Option<FaultId> {
    serde_json::from_value(serde_json::Value::String(code.to_owned())).ok()
}

fn is_proved(closing: &Closing) -> bool {
    closing.is_proved || !closing.proof.trim().is_empty()
}

/// Closed visits that can teach, newest first. The demo yard teaches nothing; neither does a case closed without a cause, nor one
/// without proof unless something was changed and the trouble was gone, nor any after which it was still there.
pub fn cases<'a>(
    units: impl IntoIterator<Item = &'a Unit>,
    visits: impl IntoIterator<Item = &'a Visit>,
    learning: &Learning,
) -> Vec<Case> {
    let units: BTreeMap<&str, &Unit> = units.into_iter().map(|u| (u.id.as_str(), u)).collect();
    let mut out: Vec<Case> = visits
        .into_iter()
        .filter(|visit| !demo::is_demo(&visit.id))
        .filter_map(|visit| {
            let closed = visit.closed.as_ref()?;
            let unit = units.get(visit.unit.as_str())?;
            let mut causes = vec![cause(&closed.cause)?];
            causes.extend(cause(&closed.also).filter(|also| *also != causes[0]));
            let proved = is_proved(closed);
            let changed_and_gone =
                closed.afterwards == Afterwards::Gone && !closed.done.trim().is_empty();
            let still_there = closed.afterwards == Afterwards::StillThere;
            (changed_and_gone || proved && !still_there).then(|| Case {
                visit: visit.id.clone(),
                unit: unit.name.clone(),
                class: unit.class,
                opened: visit.opened.clone(),
                causes,
                is_proved: proved,
                is_left_out: learning.left_out.contains(&visit.id),
            })
        })
        .collect();
    out.sort_by(|a, b| (&b.opened, &b.visit).cmp(&(&a.opened, &a.visit)));
    out
}

/// Base rates learned, per hundred calls, and what they were learned from.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Rates {
    /// Rate of every cause; empty where nothing was learned.
    pub per_hundred: BTreeMap<FaultId, f64>,
    /// Weight of all cases.
    pub cases: f64,
    /// Weight of those on the same class of machine.
    pub own_class: f64,
}

impl Rates {
    /// True where nothing was learned.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.per_hundred.is_empty()
    }

    /// One sentence for wherever these rates are used: learning is never silent. None where nothing was learned.
    #[must_use]
    pub fn words(&self) -> Option<String> {
        if self.is_empty() {
            return None;
        }
        let count = |n: f64| {
            let text = format!("{n:.1}");
            text.strip_suffix(".0").map_or(text.clone(), str::to_owned)
        };
        let cases = if (self.cases - 1.0).abs() < 1e-9 {
            "case"
        } else {
            "cases"
        };
        Some(format!(
            "How often each cause is met comes from the catalogue and {} {cases} of your own, {} on this class of machine (changed and \
             gone, without proof, counts half). Settings show it, case by case, and take it back.",
            count(self.cases),
            count(self.own_class),
        ))
    }
}

/// Rates for a class of machine, or over all classes.
#[must_use]
pub fn rates(cases: &[Case], class: Option<MachineClass>, learning: &Learning) -> Rates {
    let counted: Vec<&Case> = cases.iter().filter(|case| case.weight() > 0.0).collect();
    if learning.is_off || counted.is_empty() {
        return Rates::default();
    }
    let is_own = |case: &Case| class.is_none_or(|class| case.class == class);
    let mut own: BTreeMap<FaultId, f64> = BTreeMap::new();
    let mut others: BTreeMap<FaultId, f64> = BTreeMap::new();
    for case in &counted {
        let into = if is_own(case) { &mut own } else { &mut others };
        for id in &case.causes {
            *into.entry(*id).or_default() += case.weight() / case.causes.len() as f64;
        }
    }
    let sum = |counts: &BTreeMap<FaultId, f64>| counts.values().sum::<f64>();
    let (own_sum, other_sum) = (sum(&own), sum(&others));
    let total: f64 = faults::all().iter().map(|f| f.per_hundred).sum();
    let of = |counts: &BTreeMap<FaultId, f64>, id| counts.get(&id).copied().unwrap_or_default();
    let per_hundred = faults::all()
        .iter()
        .map(|fault| {
            let catalogue = STRENGTH * fault.per_hundred / total;
            let start = (catalogue + of(&others, fault.id)) / (STRENGTH + other_sum);
            let share = (STRENGTH * start + of(&own, fault.id)) / (STRENGTH + own_sum);
            (fault.id, total * share)
        })
        .collect();
    Rates {
        per_hundred,
        cases: own_sum + other_sum,
        own_class: own_sum,
    }
}

/// Rates that hold for a visit to a machine of this class. A case is no evidence about itself: where the visit is one of the
/// cases, the others alone count.
#[must_use]
pub fn rates_for(visit: &str, class: MachineClass, cases: &[Case], learning: &Learning) -> Rates {
    if cases.iter().any(|case| case.visit == visit) {
        let others: Vec<Case> = cases
            .iter()
            .filter(|case| case.visit != visit)
            .cloned()
            .collect();
        rates(&others, Some(class), learning)
    } else {
        rates(cases, Some(class), learning)
    }
}

/// The learned rates as a table to hand on: one line a cause, RFC 4180.
#[must_use]
pub fn table(cases: &[Case], learning: &Learning) -> String {
    let overall = rates(cases, None, learning);
    let classes: Vec<MachineClass> = MachineClass::ALL
        .into_iter()
        .filter(|class| cases.iter().any(|case| case.class == *class))
        .collect();
    let by_class: Vec<Rates> = classes
        .iter()
        .map(|class| rates(cases, Some(*class), learning))
        .collect();
    let quoted = |text: &str| format!("\"{}\"", text.replace('"', "\"\""));
    let mut head = vec![
        "cause".to_owned(),
        "title".to_owned(),
        "cases (proved 1, not proved 0.5)".to_owned(),
        "catalogue, per 100 calls".to_owned(),
        "all classes, per 100 calls".to_owned(),
    ];
    head.extend(
        classes
            .iter()
            .map(|c| format!("{}, per 100 calls", c.words())),
    );
    let mut out = head.iter().map(|h| quoted(h)).collect::<Vec<_>>().join(",");
    out.push_str("\r\n");
    for fault in faults::all() {
        let count = counted(cases, fault.id);
        let of = |rates: &Rates| {
            rates
                .per_hundred
                .get(&fault.id)
                .copied()
                .unwrap_or(fault.per_hundred)
        };
        let mut line = vec![
            fault.id.code(),
            quoted(fault.title),
            format!("{count}"),
            format!("{}", fault.per_hundred),
            format!("{:.3}", of(&overall)),
        ];
        line.extend(by_class.iter().map(|rates| format!("{:.3}", of(rates))));
        out.push_str(&line.join(","));
        out.push_str("\r\n");
    }
    out
}

/// Weight of the cases of a cause.
#[must_use]
pub fn counted(cases: &[Case], id: FaultId) -> f64 {
    cases
        .iter()
        .filter(|case| case.causes.contains(&id))
        .map(|case| case.weight() / case.causes.len() as f64)
        .sum()
}
