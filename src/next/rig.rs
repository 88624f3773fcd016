//! What a check still asks of this unit on this call: readings and answers that are open, whether it can be made at all, and its
//! minutes with what is rigged already.

use crate::checks::{self, Check, Yield};
use crate::observations;
use crate::ranking::has_sides;
use crate::readings::{Condition, Path, Port};
use crate::record::{Answer, Visit};
use crate::unit::{Control, Tick, Unit};

/// The port that a reading's instrument stands on: the knee is read on the charge gauge.
fn stands_on(port: Port) -> Port {
    match port {
        Port::Knee => Port::Charge,
        p => p,
    }
}

/// True where an instrument stands on a path's port: something was read there.
fn is_rigged(visit: &Visit, (path, port): (Path, Port)) -> bool {
    visit
        .readings
        .iter()
        .any(|r| r.seen.is_some() && r.path == path && stands_on(r.port) == stands_on(port))
}

/// A reading that is open, and the path it is open on.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Open {
    /// What is read, and how.
    pub what: Yield,
    /// On which path; left where there is one.
    pub path: Path,
}

impl core::ops::Deref for Open {
    type Target = Yield;

    fn deref(&self) -> &Yield {
        &self.what
    }
}

/// True where a reading was taken in a condition, whatever the temperature of the day. What proved not to be possible counts too:
/// nobody is sent there twice.
pub fn is_taken(visit: &Visit, path: Path, port: Port, condition: &Condition) -> bool {
    visit.readings.iter().any(|r| {
        let c = &r.condition;
        r.seen.is_some()
            && r.port == port
            && r.path == path
            && c.stroked == condition.stroked
            && c.doing == condition.doing
            && (c.doing.is_neutral()
                || (c.direction == condition.direction && c.lever == condition.lever))
            && core::mem::discriminant(&c.engine) == core::mem::discriminant(&condition.engine)
            && c.flushing_blocked == condition.flushing_blocked
            && c.consumers_capped == condition.consumers_capped
    })
}

/// Readings of a check that this unit can give and that were not taken yet.
pub fn open_readings(unit: &Unit, visit: &Visit, check: &Check) -> Vec<Open> {
    let oil = super::probe::oil_now(visit);
    let both = [Path::Left, Path::Right];
    check
        .yields
        .iter()
        .flat_map(|what| {
            let paths = if has_sides(unit, what.port) {
                &both[..]
            } else {
                &both[..1]
            };
            paths.iter().map(|path| Open {
                what: *what,
                path: *path,
            })
        })
        // Nothing is read on a side that stands still while the other is stroked alone.
        .filter(|y| y.stroked.has(y.path) || y.port.is_common())
        .filter(|y| unit.ticks.may_have(y.port))
        // Slip is counted without opening a port; charge is read along where its gauge is on.
        .filter(|y| {
            !(check.id == "slip-light-to-loaded" && y.port == Port::Charge)
                || is_rigged(visit, (Path::Left, Port::Charge))
        })
        .filter(|y| !is_taken(visit, y.path, y.port, &y.condition(oil)))
        .collect()
}

/// A check whose answers come from the operator's mouth.
pub fn is_hearsay(check: &Check) -> bool {
    check.id == "ask-the-operator"
}

/// True where an observation is an operator's word and nobody's own look.
pub fn is_heard(visit: &Visit, id: &str) -> bool {
    matches!(
        visit.observations.get(id),
        Some(Answer::OperatorSays | Answer::OperatorSaysNot)
    )
}

/// Observations that a check answers and that nobody has answered yet, or only the operator: one's own look counts for more.
pub fn open_answers(
    unit: &Unit,
    visit: &Visit,
    check: &Check,
) -> Vec<&'static observations::Observation> {
    check
        .answers
        .iter()
        .filter(|id| {
            !visit.observations.contains_key(**id) || (!is_hearsay(check) && is_heard(visit, id))
        })
        .filter_map(|id| observations::find(id))
        .filter(|o| !o.two_path || !unit.ticks.paths.is_one())
        .collect()
}

/// True where a check can be made on this unit and has something left to say.
pub fn possible(unit: &Unit, visit: &Visit, check: &Check) -> bool {
    let ticks = &unit.ticks;
    let fits = match check.id {
        "pull-the-shuttle" => ticks.flushing != Tick::No,
        "roll-by-hand" => ticks.bypass != Tick::No,
        "coil-current" | "swap-plugs" => ticks.may_have(Port::CoilCurrent),
        "bridge-the-servo" => ticks.may_have(Port::Servo),
        "stroke-arm-by-hand" => matches!(
            ticks.control,
            Control::DirectManual | Control::ManualFeedback | Control::Unknown
        ),
        _ => true,
    };
    if (check.two_path && ticks.paths.is_one()) || !fits {
        return false;
    }
    if check.yields.iter().any(|y| y.flushing_blocked) && ticks.flushing == Tick::No {
        return false;
    }
    // A check that was marked as made has no open question left, only readings.
    let asks = !open_answers(unit, visit, check).is_empty()
        && !visit.made.iter().any(|made| made == check.id);
    if open_readings(unit, visit, check).is_empty() && !asks {
        return false;
    }
    // What must come before was made, and nothing was found: swapping waits for a clean debris check, the plateau for the steps.
    checks::find(check.after).is_none_or(|first| {
        let clean = |a: &&str| visit.observations.get(*a) == Some(&Answer::NotSeen);
        let made = first.yields.is_empty()
            || first.yields.iter().any(|y| {
                let condition = y.condition(super::probe::oil_now(visit));
                let on = |path| is_taken(visit, path, y.port, &condition);
                on(Path::Left) || on(Path::Right)
            });
        made && first.answers.iter().all(clean)
    })
}

/// Minutes of a check on this unit now: rigging once, access once.
pub fn minutes(unit: &Unit, visit: &Visit, check: &Check) -> f64 {
    minutes_once_rigged(unit, visit, check, &[])
}

/// Ports that an instrument must be fitted to for a check.
pub fn rigs(unit: &Unit, visit: &Visit, check: &Check) -> Vec<(Path, Port)> {
    let mut ports: Vec<(Path, Port)> = open_readings(unit, visit, check)
        .iter()
        .map(|y| (y.path, stands_on(y.port)))
        .collect();
    if check.id == "work-another-function" {
        ports.push((Path::Left, Port::Charge));
    }
    ports.sort_unstable();
    ports.dedup();
    ports
}

/// Minutes to block flushing as the unit's manual says, once the drain is rigged. Common practice.
const BLOCK_FLUSHING: f64 = 11.0;

/// As [`minutes`], with instruments standing on further ports.
pub fn minutes_once_rigged(
    unit: &Unit,
    visit: &Visit,
    check: &Check,
    also: &[(Path, Port)],
) -> f64 {
    let ports = rigs(unit, visit, check);
    // The second side is read after the first, with everything laid out.
    let sides = |path| ports.iter().any(|(p, _)| *p == path);
    let second_side = if sides(Path::Left) && sides(Path::Right) {
        check.minutes_again
    } else {
        0.0
    };
    let rigged = !ports.is_empty()
        && ports
            .iter()
            .all(|p| is_rigged(visit, *p) || also.contains(p));
    if rigged {
        let blocks = check.yields.iter().any(|y| y.flushing_blocked)
            && !visit.readings.iter().any(|r| r.condition.flushing_blocked);
        let extra = if blocks { BLOCK_FLUSHING } else { 0.0 };
        return (check.minutes_again + second_side + extra).max(0.5);
    }
    let access = ports
        .iter()
        .filter(|p| !is_rigged(visit, **p) && !also.contains(p))
        .filter_map(|(_, p)| unit.ports.get(p))
        .filter_map(|n| n.access_minutes)
        .filter(|m| m.is_finite() && *m > 0.0)
        .fold(0.0, f64::max);
    (check.minutes_first + second_side + access).max(0.5)
}
