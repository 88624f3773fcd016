//! Worked cases on machines with two paths: like compared with like finds the side, also where the profile knows nothing.

mod support;

use lowside::assessment::{Assessment, Cause};
use lowside::faults::FaultId;
use lowside::ranking::assess;
use lowside::readings::{
    Condition, Direction::*, Doing, EngineSpeed::*, Lever, Path, Port, Reading,
};
use lowside::record::Answer;
use lowside::unit::{MachineClass, Paths, Unit};
use support::*;

use Path::{Left, Right};

/// A tracked machine of which nothing is known but its class and its paths.
fn unknown(paths: Paths) -> Unit {
    let mut unit = Unit {
        id: "u".into(),
        class: MachineClass::CompactTracked,
        ..Unit::default()
    };
    unit.ticks.paths = paths;
    unit
}

fn on(path: Path, port: Port, condition: Condition, value: f64) -> Reading {
    let id = format!("{port:?}{path:?}{condition:?}");
    Reading {
        path,
        ..reading(&id, port, condition, value)
    }
}

fn pair(port: Port, condition: Condition, left: f64, right: f64) -> [Reading; 2] {
    [
        on(Left, port, condition, left),
        on(Right, port, condition, right),
    ]
}

fn side(a: &Assessment, path: Path) -> f64 {
    let is = |c: &&Cause| c.members().all(|m| m.path == Some(path));
    a.causes.iter().filter(is).map(|c| c.probability).sum()
}

fn of(a: &Assessment, id: FaultId, path: Path) -> f64 {
    let share = |c: &Cause| {
        let at = c
            .members()
            .position(|m| m.id == id && m.path == Some(path))?;
        c.shares.get(at).copied()
    };
    a.causes.iter().filter_map(share).sum()
}

fn drive(doing: Doing, direction: lowside::readings::Direction, lever: Lever) -> Condition {
    condition(doing, direction, lever, HighIdle)
}

#[test]
fn a_slow_side_is_found_without_a_figure_in_the_profile() {
    for paths in [Paths::TwoSharedCharge, Paths::TwoOwnCharge] {
        let mut readings = Vec::new();
        for direction in [Forward, Reverse] {
            for doing in [Doing::Free, Doing::Loaded] {
                let low = if doing == Doing::Free { 0.93 } else { 0.8 };
                let c = drive(doing, direction, Lever::Full);
                readings.extend(pair(Port::Wheel, c, 60.0, 60.0 * low));
            }
        }
        let a = assess(&unknown(paths), &visit(readings), &[]);
        assert!(
            side(&a, Right) > 10.0 * side(&a, Left),
            "{paths:?} {:?}",
            lead(&a)
        );
    }
}

fn lead(a: &Assessment) -> Vec<(String, f64)> {
    let row = |c: &Cause| (c.title.clone(), c.probability);
    a.causes.iter().take(5).map(row).collect()
}

#[test]
fn like_sides_accuse_neither() {
    let mut readings = Vec::new();
    for direction in [Forward, Reverse] {
        let c = drive(Doing::Free, direction, Lever::Full);
        readings.extend(pair(Port::Wheel, c, 60.0, 60.2));
    }
    let a = assess(&unknown(Paths::TwoSharedCharge), &visit(readings), &[]);
    let (l, r) = (side(&a, Left), side(&a, Right));
    assert!((l - r).abs() < 0.1, "{l} {r} {:?}", lead(&a));
}

#[test]
fn left_and_right_are_mirror_images() {
    let c = drive(Doing::Free, Forward, Lever::Full);
    let held = |d, s| condition(Doing::Held, d, Lever::Share(s), HighIdle);
    let readings: Vec<Reading> = [
        pair(Port::Wheel, c, 60.0, 55.0),
        pair(Port::LoopA, held(Forward, 0.1), 300.0, 120.0),
        pair(Port::LoopB, held(Reverse, 0.1), 300.0, 290.0),
    ]
    .concat();
    let mirrored: Vec<Reading> = readings
        .iter()
        .map(|r| Reading {
            path: r.path.other(),
            ..r.clone()
        })
        .collect();
    let unit = unknown(Paths::TwoSharedCharge);
    let a = assess(&unit, &visit(readings), &[]);
    let b = assess(&unit, &visit(mirrored), &[]);
    for c in &a.causes {
        for m in c.members().filter(|_| c.pair.is_none()) {
            let Some(path) = m.path else { continue };
            let (x, y) = (of(&a, m.id, path), of(&b, m.id, path.other()));
            assert!((x - y).abs() < 0.02, "{} {x} {y}", m.key());
        }
    }
    // One way only, on one side: a cartridge or limiter of that side.
    assert!(side(&a, Right) > 5.0 * side(&a, Left), "{:?}", lead(&a));
    let cartridge = of(&a, FaultId::CheckALeaking, Right)
        + of(&a, FaultId::LoopReliefALow, Right)
        + of(&a, FaultId::PressureLimiterALow, Right);
    assert!(cartridge > 0.35, "{:?}", lead(&a));
}

#[test]
fn a_neutral_that_creeps_on_one_side_is_its_null() {
    let creep = condition(Doing::NeutralFree, Forward, Lever::Full, HighIdle);
    let c = drive(Doing::Free, Forward, Lever::Full);
    let readings = [
        pair(Port::Wheel, creep, 0.0, 2.4),
        pair(Port::Wheel, c, 60.0, 60.1),
    ]
    .concat();
    let a = assess(&unknown(Paths::TwoSharedCharge), &visit(readings), &[]);
    let null: f64 = [
        FaultId::ControlNullOff,
        FaultId::ServoNullOff,
        FaultId::PathsNullMismatch,
        FaultId::FeedbackLinkWorn,
    ]
    .map(|id| of(&a, id, Right))
    .iter()
    .sum();
    assert!(null > 0.8, "{null} {:?}", lead(&a));
}

#[test]
fn what_both_share_is_accused_of_what_both_show() {
    // Charge low for both, both slow alike.
    let mut readings = vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 8.0),
        reading("c-high", Port::Charge, neutral(HighIdle), 14.0),
    ];
    readings.extend(pair(
        Port::Wheel,
        drive(Doing::Free, Forward, Lever::Full),
        52.0,
        52.0,
    ));
    let a = assess(&unknown(Paths::TwoSharedCharge), &visit(readings), &[]);
    let sided = side(&a, Left) + side(&a, Right);
    assert!(sided < 0.35, "{:?}", lead(&a));
}

#[test]
fn the_side_it_pulls_to_and_swapped_signals_count() {
    let seen = |ids: &[&str]| {
        let mut v = visit(Vec::new());
        for id in ids {
            v.observations.insert((*id).into(), Answer::Seen);
        }
        assess(&unknown(Paths::TwoSharedCharge), &v, &[])
    };
    let pulls = seen(&["pulls-left"]);
    assert!(
        side(&pulls, Left) > 2.0 * side(&pulls, Right),
        "{:?}",
        lead(&pulls)
    );
    let swapped = seen(&["pulls-left", "signals-change-sides"]);
    let signal = [
        FaultId::SignalLostForward,
        FaultId::SignalLostReverse,
        FaultId::SignalWeak,
    ];
    let of_signal = |a: &Assessment| -> f64 { signal.map(|id| of(a, id, Left)).iter().sum() };
    assert!(
        of_signal(&swapped) > 3.0 * of_signal(&pulls),
        "{:?}",
        lead(&swapped)
    );
    let tyres = seen(&["hooks", "turns-alike-and-bends"]);
    let tyre = of(&tyres, FaultId::TyreOrTrackMismatch, Left)
        + of(&tyres, FaultId::TyreOrTrackMismatch, Right);
    assert!(
        tyre > 0.2 && lead(&tyres)[0].0.contains("tyre"),
        "{:?}",
        lead(&tyres)
    );
}

#[test]
fn one_path_knows_no_sides() {
    let readings = vec![reading("c", Port::Charge, neutral(LowIdle), 8.0)];
    let a = assess(&roller(), &visit(readings), &[]);
    assert!(a.causes.iter().all(|c| c.paths.is_empty()));
    let two = [
        FaultId::PathsNullMismatch,
        FaultId::PathsStrokeMismatch,
        FaultId::TyreOrTrackMismatch,
    ];
    let share: f64 = a
        .causes
        .iter()
        .filter(|c| c.ids.iter().any(|i| two.contains(i)))
        .map(|c| c.probability)
        .sum();
    assert_eq!(share, 0.0);
}
