//! What must be so before a value can be typed: precautions of hazardous checks, tick by tick. A tick names a fact; it lapses
//! with the condition, with a restart of the engine, and after a quarter of an hour. Hazard 3 stays closed for somebody alone, and a machine that keeps
//! going in neutral is not tested at all.

use super::alerts::runs_on;
use super::entry;
use crate::checks::{self, Check};
use crate::readings::{Condition, Direction, Doing, Port, Reading};
use crate::record::Visit;
use yew::AttrValue;

/// Hazard from which a field opens only after its precautions.
pub const GATED_FROM: u8 = 2;
/// Hazard that nobody takes on alone.
pub const NEVER_ALONE: u8 = 3;
/// How long a tick holds, ms.
const HOLDS_MS: f64 = 15.0 * 60_000.0;
/// What the kept stamp of a set of ticks starts with; it reads as a sentence where ticks are printed.
const STAMP: &str = "Ticked ";

/// Why nothing can be taken here now, whatever is ticked.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Barred {
    /// It keeps going with the lever in neutral.
    RunsOn,
    /// Alone on site.
    Alone,
    /// Nobody said whether somebody else is there.
    AloneNotAsked,
}

/// The precautions of one check in one condition.
#[derive(Clone, Debug)]
pub struct Gate {
    /// The check.
    pub check: &'static Check,
    /// What the machine does.
    pub doing: Doing,
    /// Which way it pushes.
    pub direction: Direction,
    /// Ports of the group that the check guards.
    pub ports: Vec<Port>,
    /// Facts to tick.
    pub facts: Vec<&'static str>,
    /// Those ticked in this condition.
    pub ticked: Vec<String>,
    /// False once the ticks are too old for another reading.
    pub fresh: bool,
    /// Why it stays closed whatever is ticked.
    pub barred: Option<Barred>,
}

impl PartialEq for Gate {
    fn eq(&self, other: &Self) -> bool {
        self.check.id == other.check.id
            && self.place() == other.place()
            && (self.fresh, self.barred) == (other.fresh, other.barred)
            && (&self.ports, &self.ticked) == (&other.ports, &other.ticked)
    }
}

impl Gate {
    /// The gates of a group of readings, one per check that guards any of them. `now` in ms since 1970.
    pub fn of(condition: &Condition, ports: &[Port], visit: &Visit, now: f64) -> Vec<Gate> {
        let mut gates: Vec<Gate> = Vec::new();
        for port in ports {
            let Some(check) =
                checks::for_reading(condition, *port).filter(|check| check.hazard > 0)
            else {
                continue;
            };
            match gates.iter_mut().find(|gate| gate.check.id == check.id) {
                Some(gate) => gate.ports.push(*port),
                None => gates.push(Gate::new(check, condition, *port, visit, now)),
            }
        }
        gates
    }

    fn new(
        check: &'static Check,
        condition: &Condition,
        port: Port,
        visit: &Visit,
        now: f64,
    ) -> Gate {
        let facts = checks::facts(check, condition.doing);
        let kept = visit
            .precautions
            .get(check.id)
            .map(Vec::as_slice)
            .unwrap_or_default();
        let at = stamped(kept, condition.doing, condition.direction);
        let ticked = match at {
            Some(_) => kept
                .iter()
                .filter(|fact| facts.contains(&fact.as_str()))
                .cloned()
                .collect(),
            None => Vec::new(),
        };
        Gate {
            check,
            doing: condition.doing,
            direction: condition.direction,
            ports: vec![port],
            facts,
            ticked,
            fresh: at.is_some_and(|at| (0.0..HOLDS_MS).contains(&(now - at))),
            barred: barred(check, condition.doing, visit),
        }
    }

    /// Which round of ticks it is: another place has another one.
    pub fn place(&self) -> (&'static str, String) {
        place(self.check, self.doing, self.direction)
    }

    /// True where it is guarded by ticks and not only by advice.
    pub fn is_gated(&self) -> bool {
        self.check.hazard >= GATED_FROM
    }

    /// True when every fact is ticked, however long ago.
    pub fn is_ticked(&self) -> bool {
        self.facts
            .iter()
            .all(|fact| self.ticked.iter().any(|ticked| ticked == fact))
    }

    /// The entry to keep after one tick was set or taken back. `moment` is this moment in ISO 8601.
    pub fn with(&self, fact: &str, is_set: bool, moment: &str) -> Vec<String> {
        // Stale ticks are not added to: the round is walked anew.
        let mut ticked: Vec<String> = if self.fresh {
            self.ticked.clone()
        } else {
            Vec::new()
        };
        ticked.retain(|other| other != fact);
        if is_set {
            ticked.push(fact.to_owned());
        }
        if !ticked.is_empty() {
            ticked.insert(0, stamp(moment, self.doing, self.direction));
        }
        ticked
    }

    /// Why a reading at one of its ports is closed now; none where it is open. What was taken already stays open while its
    /// ticks stand, however old they are.
    fn closes(&self, is_empty: bool) -> Option<&'static str> {
        if is_empty && let Some(barred) = self.barred {
            return Some(match barred {
                Barred::RunsOn => "Closed: it keeps going in neutral. Stop work.",
                Barred::Alone => "Closed: not for somebody alone on site.",
                Barred::AloneNotAsked => "Closed until you say whether you are alone on site.",
            });
        }
        if !self.is_gated() {
            return None;
        }
        if !self.is_ticked() {
            return Some("Opens when each precaution above is ticked.");
        }
        (is_empty && !self.fresh)
            .then_some("The ticks are more than 15 minutes old. Look again and tick anew.")
    }
}

/// Why the field of a reading is closed; none where it is open.
pub fn closes(gates: &[Gate], reading: &Reading) -> Option<AttrValue> {
    gates
        .iter()
        .filter(|gate| gate.ports.contains(&reading.port))
        .find_map(|gate| gate.closes(entry::is_open(reading)))
        .map(AttrValue::from)
}

/// Why a reading cannot be taken now, whatever was written down of it before; none where it can.
pub fn closes_now(gates: &[Gate], reading: &Reading) -> Option<AttrValue> {
    gates
        .iter()
        .filter(|gate| gate.ports.contains(&reading.port))
        .find_map(|gate| gate.closes(true))
        .map(AttrValue::from)
}

fn barred(check: &Check, doing: Doing, visit: &Visit) -> Option<Barred> {
    let is_clear = matches!(
        doing,
        Doing::NeutralFree | Doing::NeutralBridged | Doing::Free
    );
    if runs_on(visit) && !is_clear {
        return Some(Barred::RunsOn);
    }
    match visit.alone {
        _ if check.hazard < NEVER_ALONE => None,
        Some(true) => Some(Barred::Alone),
        None => Some(Barred::AloneNotAsked),
        Some(false) => None,
    }
}

/// The round of ticks of a check in a condition.
pub fn place(check: &Check, doing: Doing, direction: Direction) -> (&'static str, String) {
    (check.id, code(doing, direction))
}

/// Code of what the machine does, as it stands in a stamp. What holds a machine that pushes forward does not hold it in reverse.
pub fn code(doing: Doing, direction: Direction) -> String {
    match (doing, direction) {
        (Doing::Held, Direction::Reverse) => String::from("HeldReverse"),
        _ => format!("{doing:?}"),
    }
}

fn stamp(moment: &str, doing: Doing, direction: Direction) -> String {
    format!("{STAMP}{moment} for {}", code(doing, direction))
}

/// When ticks were begun for this doing, ms since 1970; none where they are of another condition or bear no stamp.
fn stamped(kept: &[String], doing: Doing, direction: Direction) -> Option<f64> {
    let stamp = kept.iter().find_map(|fact| fact.strip_prefix(STAMP))?;
    let (moment, of) = stamp.split_once(" for ")?;
    let at = js_sys::Date::parse(moment);
    (of == code(doing, direction) && at.is_finite()).then_some(at)
}

/// The ticks that lapse when readings move from one condition to another: those of the checks that guarded them, unless only
/// the oil temperature was put in.
pub fn lapsing(visit: &Visit, ids: &[String], to: &Condition) -> Vec<&'static str> {
    let moved = visit
        .readings
        .iter()
        .filter(|reading| ids.contains(&reading.id));
    let mut lapsed: Vec<&'static str> = Vec::new();
    for reading in moved {
        let was = Condition {
            oil: to.oil,
            ..reading.condition
        };
        if super::group::same(&was, to) {
            continue;
        }
        for condition in [&reading.condition, to] {
            if let Some(check) = checks::for_reading(condition, reading.port)
                && !lapsed.contains(&check.id)
            {
                lapsed.push(check.id);
            }
        }
    }
    lapsed
}
