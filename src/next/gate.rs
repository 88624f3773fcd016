//! Gates: what may be offered at all. Hazard is never weighed against information.

use crate::assessment::{Assessment, Standing};
use crate::checks::{self, Check};
use crate::faults::{self, FaultId};
use crate::observations;
use crate::readings::{Doing, Port};
use crate::record::{Answer, Visit};

/// Hazard of a check: the worst of what its readings ask the machine to do.
pub fn hazard(check: &Check) -> u8 {
    check
        .yields
        .iter()
        .map(|y| checks::hazard(check, y.doing))
        .max()
        .unwrap_or_else(|| checks::hazard(check, Doing::Neutral))
}

/// Oil temperatures (°C) between which a machine is held or overrun: thinner or thicker oil is no test. Common practice.
const WARM: (f64, f64) = (40.0, 80.0);

/// Why a check may not be offered yet, and the check that would let it be, where there is one.
pub struct Waits {
    /// The reason, in words.
    pub why: String,
    /// Id of the check to make first.
    pub first: Option<&'static str>,
}

/// Why a check may not be offered yet; none where it may.
pub fn held_back(visit: &Visit, assessment: &Assessment, check: &Check) -> Option<String> {
    waits(visit, assessment, check).map(|w| w.why)
}

/// What a check waits for. Before the engine is started it is asked whether the machine keeps going in neutral; before it moves
/// somebody has walked round it and looked at the level (readings show that it was run, or driven, already); before it is held, bridged, overrun or taken off its brake, level,
/// charge and temperature are good and nobody is alone.
pub fn waits(visit: &Visit, assessment: &Assessment, check: &Check) -> Option<Waits> {
    let wait = |why: &str, first: Option<&'static str>| {
        Some(Waits {
            why: why.to_string(),
            first,
        })
    };
    let answer = |id: &str| visit.observations.get(id);
    let has_run = |moved: bool| {
        visit
            .readings
            .iter()
            .any(|r| r.seen.is_some() && !(moved && r.condition.doing.is_neutral()))
    };
    if runs_engine(check) && !has_run(false) && answer(observations::RUNS_ON).is_none() {
        return wait(
            "Ask first whether it keeps going with the lever in neutral: then nobody starts it.",
            Some("ask-the-operator"),
        );
    }
    if (moves(check) && !has_run(true) || hazard(check) == checks::HIGHEST_HAZARD)
        && answer("level-low").is_none()
    {
        return wait(
            "Walk round it first: oil level, tow valve.",
            Some("walk-round"),
        );
    }
    if moves(check) && may_run_on(assessment, LIKELY) {
        return wait(RUNS_ON_WORDS, None);
    }
    if hazard(check) < checks::HIGHEST_HAZARD {
        return None;
    }
    match visit.alone {
        Some(false) => {}
        Some(true) => return wait("Not alone on site.", None),
        None => return wait("Say first whether you are alone on site.", None),
    }
    if may_run_on(assessment, RUNS_ON) {
        return wait(RUNS_ON_WORDS, None);
    }
    if on_a_slope(check) && may_roll(assessment) {
        return wait(
            "A drive that may not hold is not tried on a slope: bypass and charge first.",
            None,
        );
    }
    if answer("level-low") != Some(&Answer::NotSeen) {
        return wait("Oil level first: looked at, and on the mark.", None);
    }
    // The last one counts: what was good an hour ago need not be so now.
    let last = visit
        .readings
        .iter()
        .zip(&assessment.windows)
        .rfind(|(r, _)| {
            r.port == Port::Charge && r.condition.doing.is_neutral() && r.seen.is_some()
        });
    if !last.is_some_and(|(_, w)| matches!(w.standing, Standing::Within | Standing::Edge)) {
        return wait(
            "Charge pressure first: read in neutral, and good.",
            Some("charge-two-speeds").filter(|_| last.is_none()),
        );
    }
    match super::probe::oil_now(visit).map(|t| t.value.base()) {
        None => wait("Oil temperature first.", None),
        Some(t) if t < WARM.0 => wait(
            &format!(
                "Oil at {t:.0} °C is too cold for it: warm it to {:.0} °C.",
                WARM.0
            ),
            None,
        ),
        Some(t) if t > WARM.1 => wait(
            &format!(
                "Oil at {t:.0} °C is too hot for it: let it cool to {:.0} °C.",
                WARM.1
            ),
            None,
        ),
        Some(_) => None,
    }
}

/// Checks without a reading that run the engine all the same.
const RUN_WITHOUT_READING: [&str; 5] = [
    "swap-plugs",
    "stroke-arm-by-hand",
    "work-another-function",
    "slope-hold",
    "isolate-the-pump",
];

/// True where the engine runs in a check.
fn runs_engine(check: &Check) -> bool {
    !check.yields.is_empty() || RUN_WITHOUT_READING.contains(&check.id)
}

/// True where wheels or tracks turn in a check.
fn moves(check: &Check) -> bool {
    check.yields.iter().any(|y| y.doing != Doing::Neutral)
        || matches!(check.id, "swap-plugs" | "stroke-arm-by-hand")
}

/// Probability of a cause that forbids driving from which nothing is held or driven hard.
const RUNS_ON: f64 = 0.1;
/// The same, from which it is not driven at all.
const LIKELY: f64 = 0.25;
const RUNS_ON_WORDS: &str =
    "It may not come back to neutral: find that out with the engine stopped.";

/// True where a cause that forbids moving the machine is likely enough to be reckoned with.
fn may_run_on(assessment: &Assessment, least: f64) -> bool {
    assessment.causes.iter().any(|c| {
        c.probability >= least
            && c.ids
                .iter()
                .any(|id| faults::find(*id).is_some_and(|f| f.stop_work))
    })
}

/// Checks that trust the drive to hold the machine on a slope.
fn on_a_slope(check: &Check) -> bool {
    matches!(check.id, "slope-hold" | "hold-back")
}

/// True where a drive may well not hold: bypass open, no charge, a side that lets go.
fn may_roll(assessment: &Assessment) -> bool {
    use FaultId::{BypassOpen, ChargeDriveFailed, DrivetrainSlipping, LoopReliefBLow};
    let lets_go = [
        BypassOpen,
        ChargeDriveFailed,
        DrivetrainSlipping,
        LoopReliefBLow,
    ];
    assessment
        .causes
        .iter()
        .any(|c| c.probability >= RUNS_ON && c.ids.iter().any(|id| lets_go.contains(id)))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::assessment::Cause;

    fn suspects(id: FaultId, probability: f64) -> Assessment {
        Assessment {
            causes: vec![Cause {
                ids: vec![id],
                paths: Vec::new(),
                title: String::new(),
                probability,
                shares: vec![probability],
                pair: None,
                action: String::new(),
                split: String::new(),
                evidence: Vec::new(),
                would_read: Vec::new(),
            }],
            ..Assessment::default()
        }
    }

    #[test]
    fn a_stroke_that_may_not_come_back_is_not_driven() {
        let mut visit = Visit::default();
        for id in ["runs-on", "level-low"] {
            visit.observations.insert(id.into(), Answer::NotSeen);
        }
        let wheel = checks::find("wheel-turns").expect("listed");
        let charge = checks::find("charge-two-speeds").expect("listed");
        for (p, driven) in [(0.05, true), (0.3, false)] {
            let a = suspects(FaultId::StrokeStuck, p);
            assert_eq!(held_back(&visit, &a, wheel).is_none(), driven, "{p}");
            assert!(held_back(&visit, &a, charge).is_none(), "{p}");
        }
    }

    #[test]
    fn a_drive_that_may_let_go_is_not_tried_on_a_slope() {
        let mut visit = Visit {
            alone: Some(false),
            ..Visit::default()
        };
        for id in ["runs-on", "level-low"] {
            visit.observations.insert(id.into(), Answer::NotSeen);
        }
        let slope = checks::find("slope-hold").expect("listed");
        let why = |id, p| held_back(&visit, &suspects(id, p), slope).expect("charge is not read");
        assert!(why(FaultId::BypassOpen, 0.2).contains("slope"));
        assert!(why(FaultId::BypassOpen, 0.05).contains("Charge pressure first"));
        assert!(why(FaultId::PumpWorn, 0.2).contains("Charge pressure first"));
    }
}
