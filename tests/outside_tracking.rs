//! Straight tracking against scipy: the same runs by its least squares, and the arc by numerical integration. Inputs and printed
//! figures stand in `fixtures/outside/scipy_tracking.{py,json}`.
#![cfg(not(target_arch = "wasm32"))]

use lowside::tracking::{
    Facing, Gear, Latent, Lever, Load, Machine, Prior, Run, SIZE, Seen, Setting, Travel,
    Undercarriage, fit,
};
use serde::Deserialize;
use std::collections::BTreeMap;

#[derive(Deserialize)]
struct Printed {
    cases: BTreeMap<String, Case>,
    arcs: Vec<Arc>,
}

#[derive(Deserialize)]
struct Case {
    machine: Sheet,
    runs: Vec<Row>,
    solved: Solved,
}

#[derive(Deserialize)]
struct Sheet {
    track: f64,
    undercarriage: Undercarriage,
    low: Option<f64>,
    half: Option<f64>,
}

#[derive(Deserialize)]
struct Row {
    what: String,
    left: f64,
    right: f64,
    travel: Travel,
    lever: Lever,
    load: Load,
    gear: Gear,
    facing: Facing,
    seconds: Option<f64>,
}

#[derive(Deserialize)]
struct Solved {
    x: Vec<f64>,
    covariance: Vec<Vec<f64>>,
    residual: f64,
}

#[derive(Deserialize)]
struct Arc {
    left: f64,
    right: f64,
    track: f64,
    x: f64,
    y: f64,
}

fn printed() -> Printed {
    serde_json::from_str(include_str!("fixtures/outside/scipy_tracking.json"))
        .expect("the fixture reads")
}

fn run(row: &Row) -> Run {
    let (left, right) = (row.left, row.right);
    Run {
        setting: Setting {
            travel: row.travel,
            lever: row.lever,
            load: row.load,
            gear: row.gear,
            facing: row.facing,
        },
        seen: match row.what.as_str() {
            "path" => Seen::Path {
                distance: left,
                left: right,
            },
            "turns" => Seen::Turns {
                left,
                right,
                seconds: row.seconds,
            },
            "roll_out" => Seen::RollOut { left, right },
            other => panic!("{other}"),
        },
        uncertainty: None,
    }
}

/// scipy stops at its own rounding, not at ours: a millionth of each unknown's standard uncertainty is far under both.
#[test]
fn least_squares_gives_what_scipy_gives() {
    for (name, case) in printed().cases {
        let machine = Machine {
            track: Some(case.machine.track),
            undercarriage: case.machine.undercarriage,
            low: case.machine.low,
            half: case.machine.half,
            rolling: None,
        };
        let runs: Vec<Run> = case.runs.iter().map(run).collect();
        let ours = fit(&machine, &runs, &Prior::of(&machine));
        let spread: Vec<f64> = (0..SIZE)
            .map(|i| case.solved.covariance[i][i].sqrt())
            .collect();
        for (i, theirs) in case.solved.x.iter().enumerate() {
            let off = (ours.x[i] - theirs) / spread[i];
            assert!(
                off.abs() < 2e-6,
                "{name}, unknown {i}: {} {theirs}",
                ours.x[i]
            );
            for (j, theirs) in case.solved.covariance[i].iter().enumerate() {
                let off = (ours.covariance[i * SIZE + j] - theirs) / (spread[i] * spread[j]);
                assert!(off.abs() < 2e-6, "{name}, covariance {i} {j}: {off}");
            }
        }
        let off = (ours.residual - case.solved.residual).abs();
        assert!(off < 1e-6 * (1.0 + case.solved.residual), "{name}: {off}");
    }
}

/// The end of an integrated drive, taken as a path run, gives back the two speeds.
#[test]
fn integrated_arcs_give_back_the_speeds() {
    for arc in printed().arcs {
        let machine = Machine {
            track: Some(arc.track),
            ..Machine::default()
        };
        let mut prior = Prior::of(&machine);
        for width in &mut prior.width {
            *width = 1e-12;
        }
        prior.width[Latent::Gain as usize] = 1.0;
        let run = Run {
            setting: Setting {
                travel: if arc.left < 0.0 {
                    Travel::Reverse
                } else {
                    Travel::Forward
                },
                lever: Lever::Full,
                ..Setting::default()
            },
            seen: Seen::Path {
                distance: arc.x.abs(),
                left: arc.y,
            },
            uncertainty: None,
        };
        let found = fit(&machine, &[run], &prior).x[Latent::Gain as usize];
        let truth = 2.0 * (arc.right - arc.left) / (arc.right + arc.left);
        // The width of one leaves a pull of a few hundred-thousandths towards nothing.
        assert!(
            (found - truth).abs() < 3e-4 * truth.abs(),
            "{found} {truth}"
        );
    }
}
