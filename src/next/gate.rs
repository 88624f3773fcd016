//! Gates: what may be offered at all. Hazard is never weighed against information.

use crate::assessment::{Assessment, Standing};
use crate::checks::{self, Check};
use crate::readings::{Doing, Port};
use crate::record::{Answer, Visit};
use crate::unit::{Tick, Unit};

/// Hazard of a check: the worst of what its readings ask the machine to do.
pub fn hazard(check: &Check) -> u8 {
    check
        .yields
        .iter()
        .map(|y| checks::hazard(check, y.doing))
        .max()
        .unwrap_or_else(|| checks::hazard(check, Doing::Neutral))
}

/// Why a check of the highest hazard may not be offered yet; none where it may.
pub fn held_back(visit: &Visit, assessment: &Assessment, check: &Check) -> Option<String> {
    if hazard(check) < checks::HIGHEST_HAZARD {
        return None;
    }
    match visit.alone {
        Some(false) => {}
        Some(true) => return Some("Not alone on site.".to_string()),
        None => return Some("Say first whether you are alone on site.".to_string()),
    }
    let answer = |id: &str| visit.observations.get(id);
    if answer("level-low") != Some(&Answer::NotSeen) {
        return Some("Oil level first: looked at, and on the mark.".to_string());
    }
    let good = |port: Port| {
        visit
            .readings
            .iter()
            .zip(&assessment.windows)
            .any(|(r, w)| {
                r.port == port
                    && r.condition.doing.is_neutral()
                    && matches!(w.standing, Standing::Within | Standing::Edge)
            })
    };
    if !good(Port::Charge) {
        return Some("Charge pressure first: read in neutral, and good.".to_string());
    }
    let warm = super::probe::oil_now(visit).map(|t| t.value.base());
    match warm {
        None => Some("Oil temperature first.".to_string()),
        Some(t) if t < 40.0 => Some(format!(
            "Oil at {t:.0} °C is too cold for it: warm it to 40 °C."
        )),
        Some(t) if t > 80.0 => Some(format!(
            "Oil at {t:.0} °C is too hot for it: let it cool to 80 °C."
        )),
        Some(_) => None,
    }
}

/// True where a check can be made on this unit and has something left to say.
pub fn possible(unit: &Unit, visit: &Visit, check: &Check) -> bool {
    if check.two_path {
        return false;
    }
    if check.yields.iter().any(|y| y.flushing_blocked) && unit.ticks.flushing == Tick::No {
        return false;
    }
    if check.id == "pull-the-shuttle" && unit.ticks.flushing == Tick::No {
        return false;
    }
    // Swapping or a part's change waits until debris has been looked for and not found.
    if check.after.is_empty() {
        return true;
    }
    checks::find(check.after).is_none_or(|first| {
        first
            .answers
            .iter()
            .all(|a| visit.observations.get(*a) == Some(&Answer::NotSeen))
    })
}

/// Minutes of a check on this unit now: rigging once, access once.
pub fn minutes(unit: &Unit, visit: &Visit, check: &Check) -> f64 {
    let ports: Vec<Port> = check.yields.iter().map(|y| y.port).collect();
    let rigged = !ports.is_empty()
        && ports.iter().all(|p| {
            visit
                .readings
                .iter()
                .any(|r| r.port == *p && r.seen.is_some())
        });
    if rigged {
        return check.minutes_again.max(0.5);
    }
    let access = ports
        .iter()
        .filter_map(|p| unit.ports.get(p))
        .filter_map(|n| n.access_minutes)
        .filter(|m| m.is_finite() && *m > 0.0)
        .fold(0.0, f64::max);
    (check.minutes_first + access).max(0.5)
}
