//! Straight tracking: examples worked by hand, the table of what is seen, and what may not be said.
#![cfg(not(target_arch = "wasm32"))]
#![allow(clippy::disallowed_methods)] // the platform's own functions: an outside check

use lowside::tracking::*;

fn machine() -> Machine {
    Machine {
        track: Some(1.5),
        low: Some(0.25),
        half: Some(0.5),
        ..Machine::default()
    }
}

fn at(travel: Travel, lever: Lever, load: Load) -> Setting {
    Setting {
        travel,
        lever,
        load,
        ..Setting::default()
    }
}

fn turns(travel: Travel, lever: Lever, load: Load, left: f64, right: f64) -> Run {
    Run {
        setting: at(travel, lever, load),
        seen: Seen::Turns {
            left,
            right,
            seconds: Some(60.0),
        },
        uncertainty: Some(0.03),
    }
}

fn path(travel: Travel, lever: Lever, facing: Facing, left: f64) -> Run {
    Run {
        setting: Setting {
            facing,
            ..at(travel, lever, Load::Level)
        },
        seen: Seen::Path {
            distance: 10.0,
            left,
        },
        uncertainty: Some(0.03),
    }
}

fn of(outcome: &Outcome, kind: Kind) -> Found {
    *outcome
        .found
        .iter()
        .find(|found| found.kind == kind)
        .expect("every kind is told")
}

fn look(runs: &[Run]) -> Outcome {
    find(&machine(), runs, &Screws::default())
}

const F: Travel = Travel::Forward;
const R: Travel = Travel::Reverse;

/// Both ways at half and full lever with wheels free; then turns at low lever.
fn all_round(mut counted: impl FnMut(Travel, Lever) -> (f64, f64)) -> Vec<Run> {
    let mut runs = Vec::new();
    for lever in [Lever::Low, Lever::Half, Lever::Full] {
        for travel in [F, R] {
            let (left, right) = counted(travel, lever);
            runs.push(turns(travel, lever, Load::Free, left, right));
        }
    }
    runs
}

fn full(lever: Lever) -> f64 {
    match lever {
        Lever::Low => 25.0,
        Lever::Half => 50.0,
        Lever::Full => 100.0,
    }
}

fn level_and_loaded(left: [f64; 2], right: [f64; 2]) -> Vec<Run> {
    [Load::Level, Load::Loaded]
        .into_iter()
        .zip(left.into_iter().zip(right))
        .map(|(load, (left, right))| turns(F, Lever::Half, load, left, right))
        .collect()
}

/// Null of 1.2 % of full stroke: each side 0.6 turns of 100 off, whatever the lever. At half lever forward 50 ± 0.6: the
/// right 50.6, the left 49.4; in reverse the other way round.
#[test]
fn a_null_gives_a_constant_difference_that_changes_sides() {
    let mut runs = all_round(|travel, lever| {
        let off = if travel == F { 0.6 } else { -0.6 };
        (full(lever) - off, full(lever) + off)
    });
    runs.extend(level_and_loaded([49.4, 49.4], [50.6, 50.6]));
    let outcome = look(&runs);
    let null = of(&outcome, Kind::Null);
    assert!((null.value - 0.012).abs() < 0.0006, "{null:?}");
    assert!(null.half < 0.004, "{null:?}");
    assert_eq!(null.verdict, Verdict::RightFaster);
    for other in [Kind::Gain, Kind::Stop, Kind::Loss] {
        assert!(of(&outcome, other).value.abs() < 0.002, "{other:?}");
    }
    let lead = &outcome.alone[0];
    assert_eq!((lead.kind, lead.share > 0.95), (Some(Kind::Null), true));
    let adjustment = &outcome.adjustments[0];
    assert_eq!((adjustment.kind, adjustment.is_right), (Kind::Null, true));
    // Half a per cent of full stroke at an eighth of a turn: 0.012 / 0.04 = 0.3 turns.
    let screws = Screws {
        null: Some(0.04),
        stop: None,
    };
    let (by, _) = find(&machine(), &runs, &screws).adjustments[0]
        .turns
        .expect("a turn is known");
    assert!((by - 0.3).abs() < 0.015, "{by}");
}

/// Gain of 2 %: 49.5 and 50.5 at half, 99 and 101 at full, both ways; on 1.5 m the arc has κ = 2/1.5 × 0.01 = 1/75 per metre,
/// so the middle ends 75 − √(75² − 10²) = 0.6696 m to the left after 10 m of lane.
#[test]
fn a_gain_is_in_proportion_and_bends_as_the_arc_does() {
    let mut runs = all_round(|_, lever| (0.99 * full(lever), 1.01 * full(lever)));
    runs.extend(level_and_loaded([49.5, 49.5], [50.5, 50.5]));
    runs.push(path(F, Lever::Half, Facing::Out, 0.6696));
    runs.push(path(R, Lever::Half, Facing::Back, 0.6696));
    let outcome = look(&runs);
    let gain = of(&outcome, Kind::Gain);
    assert!((gain.value - 0.02).abs() < 0.0008, "{gain:?}");
    assert_eq!(gain.verdict, Verdict::RightFaster);
    assert_eq!(outcome.alone[0].kind, Some(Kind::Gain));
    assert_eq!(outcome.agreement, Agreement::Agree);
    let plan = &outcome.plans[0];
    let (low, end, high) = plan.before.end();
    // The plan runs 10 m along the path: 75 (1 − cos(10/75)) = 0.6657 m.
    assert!((end - 0.6657).abs() < 0.03, "{end}");
    assert!(low < end && end < high);
    let (low, _, high) = plan.after.end();
    assert!(
        low < 0.0 && high > 0.0,
        "straight within its band: {low} {high}"
    );
}

/// In reverse a faster right side also ends to the left of the seat, and further back.
#[test]
fn reverse_is_drawn_backwards_to_the_same_side() {
    let runs = all_round(|_, lever| (0.99 * full(lever), 1.01 * full(lever)));
    let outcome = look(&runs);
    let plan = outcome
        .plans
        .iter()
        .find(|plan| plan.setting.travel == R)
        .expect("both ways are drawn");
    let last = plan.before.middle.last().expect("points");
    assert!(last.along < -9.0 && last.left > 0.3, "{last:?}");
}

#[test]
fn a_stop_shows_at_full_lever_only() {
    let mut runs = all_round(|_, lever| match lever {
        Lever::Full => (98.5, 101.5),
        _ => (full(lever), full(lever)),
    });
    runs.extend(level_and_loaded([50.0, 50.0], [50.0, 50.0]));
    let outcome = look(&runs);
    let stop = of(&outcome, Kind::Stop);
    assert!((stop.value - 0.03).abs() < 0.002, "{stop:?}");
    assert_eq!(stop.verdict, Verdict::RightFaster);
    assert_eq!(of(&outcome, Kind::Gain).verdict, Verdict::Equal);
    assert_eq!(outcome.alone[0].kind, Some(Kind::Stop));
    let words = &outcome.adjustments[0].words;
    assert!(words.contains("Never screw the left side past"), "{words}");
}

/// The left side loses 2 % of full speed on level ground, 0.8 % free, 5 % loaded.
#[test]
fn leakage_grows_with_load_and_is_no_adjustment() {
    let lost = |left: f64| left - 0.8;
    let mut runs = all_round(|_, lever| (lost(full(lever)), full(lever)));
    runs.extend(level_and_loaded([48.0, 45.0], [50.0, 50.0]));
    let outcome = look(&runs);
    let loss = of(&outcome, Kind::Loss);
    assert_eq!(loss.verdict, Verdict::RightFaster, "{loss:?}");
    assert!((loss.value - 0.02).abs() < loss.half, "{loss:?}");
    assert_eq!(outcome.alone[0].kind, Some(Kind::Loss));
    assert!(!outcome.adjustments[0].is_adjusted);
    // The path after adjusting keeps what is to be repaired.
    let plan = &outcome.plans[0];
    assert!((plan.before.curvature - plan.after.curvature).abs() < 1e-12);
}

/// Wheel turns equal, the same bend both ways and turned round: 1 % of rolling radius is κ = 2/1.5 × 0.005 = 1/150, and
/// 150 − √(150² − 10²) = 0.3337 m.
#[test]
fn rolling_radius_bends_though_the_wheels_turn_alike() {
    let mut runs = all_round(|_, lever| (full(lever), full(lever)));
    for travel in [F, R] {
        // Counted on the ground too: with the wheels clear a leak would hide.
        runs.push(turns(travel, Lever::Full, Load::Level, 100.0, 100.0));
        for facing in [Facing::Out, Facing::Back] {
            runs.push(path(travel, Lever::Full, facing, 0.3337));
        }
    }
    let outcome = look(&runs);
    let rolling = of(&outcome, Kind::Rolling);
    assert!((rolling.value - 0.01).abs() < 0.001, "{rolling:?}");
    assert_eq!(rolling.verdict, Verdict::RightFaster);
    assert_eq!(outcome.alone[0].kind, Some(Kind::Rolling));
}

/// The lane turned round: it bends downhill each time, and that is the lane.
#[test]
fn camber_drops_out_when_the_machine_is_turned_round() {
    let mut runs = all_round(|_, lever| (full(lever), full(lever)));
    for travel in [F, R] {
        runs.push(path(travel, Lever::Full, Facing::Out, 0.2));
        runs.push(path(travel, Lever::Full, Facing::Back, -0.2));
    }
    let outcome = look(&runs);
    assert!(of(&outcome, Kind::Rolling).value.abs() < 0.0005);
    // κ = 2 × 0.2 / (10² + 0.2²) = 0.0039984, times the track width.
    assert!((outcome.fit.x[Latent::Camber as usize] - 0.0060).abs() < 0.0004);
    assert!(outcome.adjustments.is_empty());
}

/// Without turning round nobody knows whether it is the tyres or the lane.
#[test]
fn one_bend_alone_accuses_nobody() {
    let outcome = look(&[path(F, Lever::Full, Facing::Out, 0.7)]);
    assert!(
        outcome
            .found
            .iter()
            .all(|f| f.verdict == Verdict::CannotTell),
        "{:?}",
        outcome.found
    );
    assert!(outcome.adjustments.is_empty());
    assert!(!outcome.pairs.is_empty());
    assert!(outcome.advice.is_some_and(|advice| advice.takes > 0.1));
    assert_eq!(outcome.agreement, Agreement::TooFew);
}

/// Gain and stop are one at full lever; a run at half lever parts them, and that is the run that is named.
#[test]
fn gain_and_stop_are_parted_by_half_lever() {
    let runs: Vec<Run> = [F, R, F, R]
        .into_iter()
        .map(|travel| turns(travel, Lever::Full, Load::Free, 98.5, 101.5))
        .collect();
    let outcome = look(&runs);
    let is_named = outcome.pairs.iter().any(|pair| {
        matches!(
            (pair.one, pair.other),
            (Kind::Gain, Some(Kind::Stop)) | (Kind::Stop, Some(Kind::Gain))
        )
    });
    assert!(is_named, "{:?}", outcome.pairs);
    let advice = outcome.advice.expect("something is open");
    assert_eq!(advice.run.setting.lever, Lever::Half, "{advice:?}");
    assert!(matches!(advice.run.seen, Seen::Turns { .. }), "{advice:?}");
}

#[test]
fn runs_that_disagree_say_so_and_widen_everything() {
    let side = [0.5, -0.5, 0.4, -0.3, 0.6, -0.6];
    let runs: Vec<Run> = side
        .into_iter()
        .map(|left| path(F, Lever::Half, Facing::Out, left))
        .collect();
    let outcome = look(&runs);
    assert!(matches!(outcome.agreement, Agreement::Disagree { .. }));
    assert!(outcome.fit.widening() > 2.0);
    assert!(outcome.adjustments.is_empty());
}

#[test]
fn without_runs_nothing_is_said_and_tyres_come_first() {
    let outcome = look(&[]);
    assert!(outcome.found.iter().all(|f| !f.is_seen));
    assert!(outcome.plans.is_empty() && outcome.adjustments.is_empty() && outcome.pairs.is_empty());
    let advice = outcome.advice.expect("there is a first step");
    assert!(matches!(advice.run.seen, Seen::RollOut { .. }));
}

#[test]
fn what_cannot_be_is_refused_with_its_reason() {
    let bad = |seen, why| {
        let run = Run {
            setting: Setting::default(),
            seen,
            uncertainty: None,
        };
        assert_eq!(run.check(&machine()), Err(why));
        let outcome = look(&[run]);
        assert_eq!(outcome.refused, vec![(0, why)]);
        assert_eq!(outcome.fit.figures, 0);
    };
    let path = |distance, left| Seen::Path { distance, left };
    bad(path(10.0, 9.0), RunError::TooFarAside);
    bad(path(900.0, 9.0), RunError::LaneTooLong);
    bad(path(f64::NAN, 0.0), RunError::NotFinite);
    bad(path(10.0, f64::INFINITY), RunError::NotFinite);
    bad(
        Seen::WheelSpeeds {
            left: 10.0,
            right: 60.0,
        },
        RunError::TooUneven,
    );
    bad(
        Seen::RollOut {
            left: 0.0,
            right: 2.0,
        },
        RunError::NotPositive {
            what: "the left roll-out",
        },
    );
    let run = Run {
        setting: Setting::default(),
        seen: path(10.0, 0.3),
        uncertainty: None,
    };
    assert_eq!(run.check(&Machine::default()), Err(RunError::NoTrack));
}

/// Left and right exchanged is everything mirrored.
#[test]
fn mirrored_runs_give_mirrored_answers() {
    let runs = |flip: bool| {
        let pair = |a: f64, b: f64| if flip { (b, a) } else { (a, b) };
        let sign = if flip { -1.0 } else { 1.0 };
        let mut runs = all_round(|_, lever| pair(0.98 * full(lever), full(lever)));
        runs.push(path(F, Lever::Full, Facing::Out, sign * 0.8));
        runs
    };
    let (one, other) = (look(&runs(false)), look(&runs(true)));
    for (a, b) in one.found.iter().zip(&other.found) {
        assert!((a.value + b.value).abs() < 1e-9, "{a:?} {b:?}");
        assert!((a.half - b.half).abs() < 1e-9, "{a:?} {b:?}");
    }
}

#[test]
fn a_sheet_keeps_every_text_and_reads_what_it_can() {
    let text = r#"{"head":{"track":{"typed":"1,5 m","value":{"value":1.5,"unit":"m"}},"low":{"typed":"a bit","value":null}},
        "runs":[{"id":"a","what":"path","fields":{"distance":{"typed":"10","value":{"value":10,"unit":"m"}},
        "aside":{"typed":"30 cm","value":{"value":0.3,"unit":"m"}}}},
        {"id":"b","what":"turns","fields":{"left":{"typed":"fifty","value":null},"right":{"typed":"50","value":{"value":50,"unit":"turn"}}}}],
        "later":"kept"}"#;
    let mut sheet: TrackingSheet = serde_json::from_str(text).expect("reads");
    let machine = sheet.machine(Undercarriage::Swivel);
    assert_eq!((machine.track, machine.low), (Some(1.5), None));
    let runs = sheet.runs(&machine);
    assert_eq!(runs[0], Err(LineProblem::NoHand));
    assert_eq!(runs[1], Err(LineProblem::Unread));
    sheet.runs[0].hand = Some(Hand::Right);
    let run = sheet.runs(&machine)[0].expect("a run");
    assert_eq!(
        run.seen,
        Seen::Path {
            distance: 10.0,
            left: -0.3
        }
    );
    let again: TrackingSheet =
        serde_json::from_str(&serde_json::to_string(&sheet).expect("writes")).expect("reads");
    assert_eq!(again, sheet);
    assert_eq!(again.head[&Head::Low].typed, "a bit");
    assert_eq!(again.extra["later"], "kept");
}
