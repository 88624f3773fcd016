//! The whole sheet in one pure call: every step judged, the verdict with its reasons, what was not checked.

use super::change::{OutCheck, out_of};
use super::history::oil;
use super::judge::judged;
use super::sheet::{Leg, YardSheet};
use super::steps::steps;
use crate::machine::Warmth;
use crate::quantity::{Kind, Measure, UnitPrefs};
use crate::readings::instrument::Instrument;
use crate::record::Visit;
use crate::unit::Unit;

/// Least oil temperature, °C at the drain hose, from which the whole sheet counts. Common practice.
pub const WARM_ENOUGH: f64 = 45.0;

/// What a step comes to.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Grade {
    /// Nothing found.
    Good,
    /// To be looked after: it goes to the shop before it wears on.
    Watch,
    /// It stays.
    Stop,
}

impl Grade {
    /// Word for a screen.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Grade::Good => "nothing found",
            Grade::Watch => "watch",
            Grade::Stop => "do not send out",
        }
    }
}

/// The verdict. There is no "fit to go out": that is not the sheet's to say.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Verdict {
    /// Nothing counts yet.
    NothingChecked,
    /// Nothing found in what was checked.
    NothingFound,
    /// Watch.
    Watch,
    /// Do not send out.
    DoNotSendOut,
}

impl Verdict {
    /// In words.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Verdict::NothingChecked => "Nothing checked yet",
            Verdict::NothingFound => "Nothing found in what was checked",
            Verdict::Watch => "Watch",
            Verdict::DoNotSendOut => "Do not send out",
        }
    }
}

/// One thing judged.
#[derive(Clone, Debug, PartialEq)]
pub struct Judged {
    /// Step id.
    pub step: &'static str,
    /// What it is.
    pub what: String,
    /// What was found, with its unit; empty for what was looked at.
    pub found: String,
    /// What it comes to; none where it is not judged.
    pub grade: Option<Grade>,
    /// Why, and by which limit; for what is not judged, why not.
    pub why: String,
}

/// What a yard check never covers. It stands with every verdict.
pub const NEVER_CHECKED: [&str; 8] = [
    "Steering",
    "Frame, articulation, hitch",
    "Service brakes",
    "Roll-over protection, seat, belt",
    "Electrics, lights, alarms",
    "Engine, attachments, lifting gear",
    "Loop pressures and reliefs: no gauge at a loop port, no held check in a yard check",
    "Anything that shows only after hours of work",
];

/// Everything the sheet comes to.
#[derive(Clone, Debug, PartialEq)]
pub struct Report {
    /// Verdict.
    pub verdict: Verdict,
    /// Reasons, worst first; empty where nothing was found.
    pub reasons: Vec<(Grade, String)>,
    /// Everything judged, in the order of the steps.
    pub judged: Vec<Judged>,
    /// What was not checked, with the reason where there is one: of the sheet first, then what no yard check covers.
    pub not_checked: Vec<String>,
    /// What changed since it went out; none on the way out, or where no check out is kept.
    pub change: Option<OutCheck>,
    /// Why only part of the sheet counts, where that is so.
    pub cold: Option<String>,
    /// Steps done, and steps there are.
    pub steps: (usize, usize),
}

/// Why a sheet's warm steps do not count; none where they do.
#[must_use]
pub(super) fn not_warm(unit: &Unit, sheet: &YardSheet, prefs: &UnitPrefs) -> Option<String> {
    let print = |celsius: f64| {
        Measure::from_base(celsius, Kind::Temperature).map_or(String::new(), |t| prefs.print(t))
    };
    let warmth = Warmth::of(unit, &oil(sheet));
    if !warmth.taken {
        Some("no oil temperature yet".to_owned())
    } else if warmth.celsius < WARM_ENOUGH {
        Some(format!(
            "oil at {} where it leaks; {} or more is needed (common practice)",
            print(warmth.celsius),
            print(WARM_ENOUGH)
        ))
    } else {
        None
    }
}

/// Judges the sheet of a visit. `others` are the other visits to the unit, in any order; later ones are not looked at.
#[must_use]
pub fn report(
    unit: &Unit,
    visit: &Visit,
    others: &[&Visit],
    instruments: &[Instrument],
    prefs: &UnitPrefs,
) -> Report {
    let empty = YardSheet::default();
    let sheet = visit.yard.as_ref().unwrap_or(&empty);
    let earlier: Vec<&Visit> = others
        .iter()
        .copied()
        .filter(|v| {
            v.unit == visit.unit
                && (v.opened.as_str(), v.id.as_str()) < (visit.opened.as_str(), visit.id.as_str())
        })
        .collect();
    let cold = not_warm(unit, sheet, prefs);
    let judged = judged(
        unit,
        visit,
        sheet,
        &earlier,
        instruments,
        prefs,
        cold.as_deref(),
    );
    let change = (sheet.leg == Leg::In)
        .then(|| out_of(unit, visit, &earlier, instruments, prefs))
        .flatten();
    let mut reasons: Vec<(Grade, String)> = judged
        .iter()
        .filter(|j| j.grade.is_some_and(|g| g > Grade::Good))
        .map(|j| (j.grade.unwrap_or(Grade::Watch), j.why.clone()))
        .collect();
    if let Some(change) = &change {
        reasons.extend(
            change
                .changes
                .iter()
                .filter(|c| c.grade > Grade::Good)
                .map(|c| (c.grade, c.words.clone())),
        );
    }
    reasons.sort_by_key(|(grade, _)| core::cmp::Reverse(*grade));
    let worst = judged
        .iter()
        .filter_map(|j| j.grade)
        .chain(reasons.iter().map(|(g, _)| *g))
        .max();
    let verdict = match worst {
        None => Verdict::NothingChecked,
        Some(Grade::Good) => Verdict::NothingFound,
        Some(Grade::Watch) => Verdict::Watch,
        Some(Grade::Stop) => Verdict::DoNotSendOut,
    };
    let mut not_checked: Vec<String> = judged
        .iter()
        .filter(|j| j.grade.is_none() && !j.why.is_empty())
        .map(|j| format!("{}: {}", j.what, j.why))
        .collect();
    not_checked.extend(NEVER_CHECKED.iter().map(|what| (*what).to_owned()));
    let all = steps(unit);
    let done = all
        .iter()
        .filter(|step| {
            let own: Vec<&Judged> = judged.iter().filter(|j| j.step == step.id).collect();
            !own.is_empty() && own.iter().all(|j| j.grade.is_some() || j.why.is_empty())
        })
        .count();
    Report {
        verdict,
        reasons,
        judged,
        not_checked,
        change,
        cold,
        steps: (done, all.len()),
    }
}
