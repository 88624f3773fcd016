//! Neutral: hand-worked examples, dead zones, which null is off, the adjuster, the brake.
#![cfg(not(target_arch = "wasm32"))]
#![allow(clippy::disallowed_methods)] // the platform's own functions: an outside check

use lowside::circuit::{Network, Param};
use lowside::machine::{apply, base, builds, layout_for};
use lowside::neutral::adjust::{NoFit, Point, Reach, Seen, Sense, fit, halves};
use lowside::neutral::brake;
use lowside::neutral::nulls::{Sits, nulls, servo_push};
use lowside::neutral::offset::{Says, Taken, offset, would_show};
use lowside::neutral::report::{Report, report};
use lowside::neutral::response::{Machine, Shows, machines};
use lowside::quantity::{Kind, Measure, Typed, Unit as InUnit};
use lowside::readings::{Condition, Direction, EngineSpeed, OilTemperature, Place, Port};
use lowside::record::NeutralSheet;
use lowside::record::neutral::{AdjusterRow, Field};
use lowside::unit::{Control, FIGURES, Figure, FigureId, Source, Tick, Ticks, Unit};
use proptest::prelude::*;
use serde::Deserialize;
use std::collections::BTreeMap;

/// A machine whose figures are all known: pump and motor 75 cm³/rev, 2400 rpm, charge 22 bar, 20 motor turns a wheel turn.
fn unit(control: Control) -> Unit {
    let mut unit = Unit {
        ticks: Ticks {
            control,
            flushing: Tick::Yes,
            limiter: Tick::No,
            ..Ticks::default()
        },
        ..Unit::default()
    };
    for (id, value) in [
        (FigureId::PumpDisplacement, 75.0),
        (FigureId::ChargeDisplacement, 15.0),
        (FigureId::HighIdle, 2400.0),
        (FigureId::LowIdle, 900.0),
        (FigureId::ChargeSetting, 22.0),
        (FigureId::LoopRelief, 380.0),
        (FigureId::MotorDisplacement, 75.0),
        (FigureId::OilGrade, 46.0),
        (FigureId::GearRatio, 20.0),
    ] {
        let ask = FIGURES.iter().find(|f| f.id == id).expect("listed");
        let figure = Figure {
            value: Measure::from_base(value, ask.kind).ok(),
            typed: String::new(),
            source: Source::Manual,
        };
        unit.figures.insert(id, figure);
    }
    unit
}

fn at(celsius: f64) -> Condition {
    Condition {
        engine: EngineSpeed::HighIdle,
        oil: Measure::from_base(celsius, Kind::Temperature)
            .ok()
            .map(|value| OilTemperature {
                value,
                place: Place::DrainHose,
            }),
        ..Condition::start()
    }
}

/// Median over the ensemble of what is shown at an offset.
fn median(unit: &Unit, shows: Shows, condition: Condition, offset: f64) -> f64 {
    let mut shown: Vec<f64> = machines(unit, &[(shows, condition)])
        .iter()
        .map(|machine| machine.curves[0].value(offset))
        .collect();
    shown.sort_by(f64::total_cmp);
    shown[shown.len() / 2]
}

fn taken(shows: Shows, condition: Condition, value: f64, uncertainty: f64) -> Taken {
    Taken {
        shows,
        condition,
        value,
        uncertainty,
    }
}

/// By hand, oil at 48.5 °C (27.5 mPa·s for VG 46), swash 2 % off:
/// delivery 0.02 × 75 cm³ × 2400 rpm = 3.60 L/min. The loop rises by breakaway and drag, 12 bar, over a charge of 22.5:
/// the high side leaks to both cases (0.0065 + 0.0065) × 34.5 = 0.45 L/min and across (0.004 + 0.004) × 12 = 0.10 L/min.
/// Left: 3.05 L/min ÷ 75 cm³ = 40.7 rpm of the motor, ÷ 20 = 2.03 rpm of the wheel.
#[test]
fn creep_by_hand() {
    let unit = unit(Control::ManualFeedback);
    let shown = median(&unit, Shows::Creep, at(48.5), 0.02);
    assert!((shown - 2.03).abs() < 0.08 * 2.03, "{shown}");
    let found = offset(&unit, &[taken(Shows::Creep, at(48.5), 2.03, 0.02)]).expect("fits");
    assert_eq!(found.says, Says::Off);
    assert!(found.low < 0.02 && 0.02 < found.high, "{found:?}");
    assert!(found.high - found.low < 0.01, "{found:?}");
    let back = offset(&unit, &[taken(Shows::Creep, at(48.5), -2.03, 0.02)]).expect("fits");
    assert!((back.mean + found.mean).abs() < 1e-6);
}

/// Motor held: 1 % off delivers 0.01 × 75 × 2400 = 1.80 L/min, which the high side leaks: to the cases 0.013 × (22.5 + Δp) and
/// across 0.008 × Δp. 1.80 = 0.2925 + 0.021 Δp, so Δp = 71.8 bar.
#[test]
fn held_difference_by_hand() {
    let unit = unit(Control::ManualFeedback);
    let shown = median(&unit, Shows::Difference, at(48.5), 0.01);
    assert!((shown - 71.8).abs() < 0.12 * 71.8, "{shown}");
}

/// The held difference at half a per cent: high with cold oil, little warm, nothing to speak of hot. It is no measure of the
/// swash alone, and its dead zone grows with heat.
#[test]
fn the_dead_zone_grows_with_heat() {
    let unit = unit(Control::ManualFeedback);
    let shown = |celsius| median(&unit, Shows::Difference, at(celsius), 0.005);
    let (cold, warm, hot) = (shown(15.0), shown(48.5), shown(80.0));
    assert!(cold > 3.0 * warm && warm > 3.0 * hot, "{cold} {warm} {hot}");
    let under = |celsius| {
        let none = taken(Shows::Difference, at(celsius), 0.0, 1.0);
        match offset(&unit, &[none]).expect("fits").says {
            Says::Within { under } => under,
            other => panic!("{other:?}"),
        }
    };
    assert!(under(80.0) > 1.5 * under(15.0));
}

/// No creep does not prove null, and more creep than the circuit gives at any small offset is "at least".
#[test]
fn statements_are_one_sided_where_they_must_be() {
    let unit = unit(Control::ManualFeedback);
    let one = |shows, value, u| offset(&unit, &[taken(shows, at(60.0), value, u)]).expect("fits");
    let stands = one(Shows::Creep, 0.0, 0.14);
    assert!(matches!(stands.says, Says::Within { under } if under > 0.003 && under < 0.02));
    let relief = one(Shows::Difference, 384.0, 2.0);
    assert!(relief.low > 0.03, "{:?}", (relief.low, relief.high));
    assert_eq!(relief.says, Says::AtLeast);
}

#[test]
fn two_readings_tell_more_than_either() {
    let unit = unit(Control::ManualFeedback);
    let shown = |shows| median(&unit, shows, at(60.0), 0.012);
    let creep = taken(Shows::Creep, at(60.0), shown(Shows::Creep), 0.1);
    let held = taken(Shows::Difference, at(60.0), shown(Shows::Difference), 1.0);
    let wide = |list: &[Taken]| {
        let found = offset(&unit, list).expect("fits");
        found.high - found.low
    };
    let (one, other, both) = (wide(&[creep]), wide(&[held]), wide(&[creep, held]));
    assert!(
        both < one.max(other) && both < 1.1 * one.min(other),
        "{one} {other} {both}"
    );
}

/// The share of a servo offset that feedback leaves is the circuit's: 5 % in the servo shows what 1 % in the control does.
#[test]
fn feedback_leaves_what_the_circuit_leaves() {
    for control in Control::ALL.into_iter().filter(|c| *c != Control::Unknown) {
        let unit = unit(control);
        let left = machines(&unit, &[])
            .first()
            .map(|machine: &Machine| machine.left_by_feedback)
            .expect("a machine");
        let build = builds(&unit).into_iter().next().expect("a build");
        let condition = Condition {
            doing: Shows::Creep.doing(),
            ..at(60.0)
        };
        let network = Network::new(layout_for(&build, &condition));
        let shown = |control: f64, servo: f64| {
            let mut theta = apply(&build, &base(&build), &condition);
            theta[Param::NullControl as usize] = control;
            theta[Param::NullServo as usize] = servo;
            let solution = network.solve(&theta, None).expect("a state");
            network.reading(Port::Wheel, &solution, &theta)
        };
        let (one, other) = (shown(0.05 * left, 0.0), shown(0.0, 0.05));
        assert!(
            (one - other).abs() < 0.005 * one,
            "{control:?}: {one} {other}"
        );
    }
}

#[test]
fn the_bridge_tells_control_from_servo() {
    let unit = unit(Control::ManualFeedback);
    let creep = |offset| median(&unit, Shows::Creep, at(60.0), offset);
    let both = |open: f64, bridged: f64| {
        let list = [
            taken(Shows::Creep, at(60.0), open, 0.05),
            taken(Shows::CreepBridged, at(60.0), bridged, 0.05),
        ];
        nulls(&unit, &list).expect("both read")
    };
    // 3 % in the control alone.
    let control = both(creep(0.03), 0.0);
    assert_eq!(control.sits, Sits::Control);
    assert!(control.control.low < 0.03 && 0.03 < control.control.high);
    // 3 % in the servo alone: feedback leaves 0.6 % of it without the bridge.
    let servo = both(creep(0.006), creep(0.03));
    assert_eq!(servo.sits, Sits::Servo, "{servo:?}");
    assert!(servo.servo.low < 0.03 && 0.03 < servo.servo.high);
    // Nothing to part without the bridge.
    assert_eq!(
        nulls(&unit, &[taken(Shows::Creep, at(60.0), 1.0, 0.1)]),
        None
    );
}

/// Servo springs start at 0.16 × 22 = 3.5 bar and are down at 0.5 × 22 = 11 bar: 5 bar ask (5 − 3.5) ÷ (11 − 3.5) = 20 %.
#[test]
fn servo_pressures_by_hand() {
    let unit = unit(Control::ManualFeedback);
    let none = servo_push(&unit, 1.0, 0.15).expect("a servo");
    assert!(none.rests > 0.95 && none.stroke.low == 0.0);
    let asks = servo_push(&unit, -5.0, 0.15).expect("a servo");
    assert!((asks.stroke.mean + 0.20).abs() < 0.06, "{asks:?}");
    assert!((asks.preload - 3.52).abs() < 0.4);
}

fn value(turns: f64, value: f64, uncertainty: f64) -> Point {
    Point {
        turns,
        from: None,
        seen: Seen::Value { value, uncertainty },
    }
}

/// By hand: 12 rpm a turn past ± 0.2 turns round 0.3: at 0.75 turns (0.45 − 0.2) × 12 = 3.0; at −0.25 turns −(0.55 − 0.2) × 12 =
/// −4.2. The last place is 0.75, so 0.45 turns out.
#[test]
fn an_adjuster_by_hand() {
    let rows = [
        (-0.5, -7.2),
        (-0.25, -4.2),
        (0.2, 0.0),
        (0.4, 0.0),
        (1.0, 6.0),
        (0.75, 3.0),
    ];
    let points: Vec<Point> = rows.iter().map(|(x, y)| value(*x, *y, 0.1)).collect();
    let found = fit(&points).expect("fits");
    assert_eq!(found.reach, Reach::BothSides);
    assert!((found.null.mean - 0.3).abs() < 0.02, "{found:?}");
    assert!((found.dead.mean - 0.2).abs() < 0.03);
    assert!((found.to_go.mean + 0.45).abs() < 0.02);
    assert!((found.slope.expect("read") - 12.0).abs() < 0.6);
    assert_eq!(found.turn(), Some(Sense::Out));
    assert!(found.in_is_forward && !found.scattered);
    assert_eq!(found.play, None);
}

/// Starts at 0.5 forward and −0.1 in reverse: the middle is 0.2, the dead band 0.3 either way.
#[test]
fn two_starts_give_their_middle() {
    let start = |turns, direction| Point {
        turns,
        from: None,
        seen: Seen::Starts(direction),
    };
    let points = [
        start(0.5, Direction::Forward),
        start(-0.1, Direction::Reverse),
    ];
    let found = fit(&points).expect("fits");
    assert!((found.null.mean - 0.2).abs() < 0.01);
    assert!((found.dead.mean - 0.3).abs() < 0.01);
    assert!((found.to_go.mean - 0.3).abs() < 0.01);
    assert!(found.null.half() > 0.05 && found.null.half() < 0.1);
    assert_eq!((found.slope, found.reach), (None, Reach::BothSides));
}

/// Every start 0.2 turns later from the one side than from the other: play of 0.2, the null between.
#[test]
fn two_values_from_two_sides_are_play() {
    let start = |turns, direction, from| Point {
        turns,
        from: Some(from),
        seen: Seen::Starts(direction),
    };
    let mut points = Vec::new();
    for slip in [0.0, 0.02, -0.02] {
        points.push(start(0.5 + slip, Direction::Forward, Sense::In));
        points.push(start(0.3 + slip, Direction::Forward, Sense::Out));
        points.push(start(-0.1 + slip, Direction::Reverse, Sense::In));
        points.push(start(-0.3 + slip, Direction::Reverse, Sense::Out));
    }
    let found = fit(&points).expect("fits");
    let play = found.play.expect("both sides");
    assert!((play.mean - 0.2).abs() < 0.03 && found.has_play());
    assert!((found.null.mean - 0.1).abs() < 0.02);
}

#[test]
fn a_series_says_what_it_cannot_tell() {
    assert_eq!(fit(&[value(0.0, 1.0, 0.1)]), Err(NoFit::TooFew(1)));
    assert_eq!(
        fit(&[value(0.0, 1.0, 0.1), value(0.0, 1.1, 0.1)]),
        Err(NoFit::SamePlace)
    );
    assert_eq!(
        fit(&[value(0.0, 1.0, 0.1), value(f64::NAN, 1.0, 0.1)]),
        Err(NoFit::OutOfRange)
    );
    let still = fit(&[value(0.0, 0.0, 0.1), value(0.5, 0.1, 0.1)]).expect("fits");
    assert_eq!((still.reach, still.turn()), (Reach::NoMotion, None));
    let one = fit(&[
        value(0.0, 2.0, 0.1),
        value(0.5, 5.0, 0.1),
        value(1.0, 8.0, 0.1),
    ])
    .expect("fits");
    assert_eq!(one.reach, Reach::OneSide);
    assert!(one.null.half() > 0.3, "{one:?}");
}

/// Starts at 0.6 and −0.2 about equal servo pressures at 0.0: halves 0.6 and 0.2, apart by 0.4 of their mean 0.4.
#[test]
fn uneven_halves_are_told() {
    let uneven = halves(0.6, -0.2, 0.0).expect("inside");
    assert!((uneven.differ - 1.0).abs() < 1e-12 && (uneven.apart - 0.2).abs() < 1e-12);
    assert_eq!(halves(0.6, 0.2, 0.0), None);
}

/// 300 N·m on 75 cm³/rev hold 20 π × 300 ÷ 75 = 251 bar; 0.6 of it is 151 bar. Unknown: 0.6 × 0.5 × 380 = 114 bar.
#[test]
fn the_brake_by_hand() {
    let mut unit = unit(Control::ManualFeedback);
    let stop = brake::stop(&unit);
    assert!((stop.bar - 114.0).abs() < 1e-9 && !stop.is_known);
    unit.figures.insert(
        FigureId::BrakeTorque,
        Figure {
            value: Measure::from_base(300.0, Kind::Torque).ok(),
            typed: "300".into(),
            source: Source::Manual,
        },
    );
    let stop = brake::stop(&unit);
    assert!((stop.bar - 150.8).abs() < 0.1 && stop.is_known && stop.may_release);
    let risk = |rpm: f64| {
        let found = offset(&unit, &[taken(Shows::Creep, at(60.0), rpm, 0.1)]).expect("fits");
        brake::risk(&unit, &at(60.0), &found.belief)
            .expect("a state")
            .says
    };
    assert_eq!(risk(0.0), brake::Says::Under);
    assert_eq!(risk(8.0), brake::Says::Passes);
    assert!(risk(0.0) < risk(2.5) || risk(2.5) < risk(8.0));
}

#[test]
fn what_is_foretold_rises_with_the_offset() {
    let unit = unit(Control::ElectricProportional);
    let small = offset(&unit, &[taken(Shows::Creep, at(60.0), 0.5, 0.1)]).expect("fits");
    let large = offset(&unit, &[taken(Shows::Creep, at(60.0), 2.0, 0.1)]).expect("fits");
    let builds = |o: &lowside::neutral::offset::Offset| {
        would_show(&unit, Shows::Difference, &at(60.0), &o.belief).expect("a state")
    };
    let (s, l) = (builds(&small), builds(&large));
    assert!(s.low <= s.middle && s.middle <= s.high);
    assert!(l.middle > s.middle && l.high > s.high);
}

#[derive(Deserialize)]
struct Outside {
    series: BTreeMap<String, Fit>,
}

#[derive(Deserialize)]
struct Fit {
    turns: Vec<f64>,
    shown: Vec<f64>,
    uncertainty: Vec<f64>,
    null: f64,
    null_sigma: f64,
    dead: f64,
    dead_sigma: f64,
    slope: f64,
}

/// Against scipy's weighted least squares on the same data (`fixtures/outside/scipy_adjuster.{py,json}`).
#[test]
fn the_adjuster_against_scipy() {
    let outside: Outside =
        serde_json::from_str(include_str!("fixtures/outside/scipy_adjuster.json")).expect("reads");
    assert_eq!(outside.series.len(), 2);
    for (name, theirs) in &outside.series {
        let points: Vec<Point> = (0..theirs.turns.len())
            .map(|i| value(theirs.turns[i], theirs.shown[i], theirs.uncertainty[i]))
            .collect();
        let ours = fit(&points).expect("fits");
        let sigma = |t: lowside::neutral::adjust::Turns| t.half() / 1.96;
        assert!(
            (ours.null.mean - theirs.null).abs() < 0.3 * theirs.null_sigma,
            "{name}: {ours:?}"
        );
        assert!(
            (sigma(ours.null) / theirs.null_sigma - 1.0).abs() < 0.15,
            "{name}: {ours:?}"
        );
        assert!(
            (ours.dead.mean - theirs.dead).abs() < 0.6 * theirs.dead_sigma,
            "{name}: {ours:?}"
        );
        assert!(
            (ours.slope.expect("read") / theirs.slope - 1.0).abs() < 0.05,
            "{name}: {ours:?}"
        );
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(24))]

    /// Whatever is read, an answer is a number with its ends in order, or a reason.
    #[test]
    fn any_reading_gives_numbers_or_nothing(rpm in -200.0..200.0_f64, u in 0.0..5.0_f64, celsius in -30.0..120.0_f64) {
        let unit = unit(Control::ManualFeedback);
        if let Some(found) = offset(&unit, &[taken(Shows::Creep, at(celsius), rpm, u)]) {
            prop_assert!(found.low <= found.high && found.mean.is_finite());
            prop_assert!(found.low >= -0.2001 && found.high <= 0.2001);
        }
    }

    #[test]
    fn any_series_gives_numbers_or_a_reason(
        rows in proptest::collection::vec((-5.0..5.0_f64, -50.0..50.0_f64, 0.0..3.0_f64), 0..7)
    ) {
        let points: Vec<Point> = rows.iter().map(|(x, y, u)| value(*x, *y, *u)).collect();
        if let Ok(found) = fit(&points) {
            for t in [found.null, found.dead, found.to_go] {
                prop_assert!(t.low <= t.high && t.mean.is_finite(), "{found:?}");
            }
        }
    }
}

/// The report crosses from the worker to the page as JSON, which has no infinities and no "not a number".
#[test]
fn a_report_survives_the_way_from_the_worker_to_the_page() {
    let typed = |value: f64, unit: InUnit| Typed {
        typed: format!("{value}"),
        value: Some(Measure::literal(value, unit)),
    };
    let mut sheet = NeutralSheet::default();
    let unit = unit(Control::ElectricProportional);
    let there_and_back = |sheet: &NeutralSheet| {
        let told = report(&unit, sheet);
        let json = serde_json::to_string(&told).expect("writes");
        let back: Report = serde_json::from_str(&json).expect("reads");
        assert_eq!(back, told);
        told
    };
    let empty = there_and_back(&sheet);
    assert!(empty.offset.is_none() && !empty.fits_none);
    // Turns without their time are told as missing.
    sheet.set(Field::CreepTurns, typed(3.0, InUnit::Turn));
    assert_eq!(there_and_back(&sheet).missing.len(), 1);
    sheet.set(Field::CreepTime, typed(60.0, InUnit::Second));
    sheet.set(Field::BridgedTurns, typed(1.0, InUnit::Turn));
    sheet.set(Field::BridgedTime, typed(60.0, InUnit::Second));
    (sheet.creeps, sheet.creeps_bridged) = (Some(Direction::Forward), Some(Direction::Forward));
    for (field, value) in [
        (Field::ServoForward, 2.5),
        (Field::ServoReverse, 2.0),
        (Field::Difference, 40.0),
    ] {
        sheet.set(field, typed(value, InUnit::Bar));
    }
    for (field, value) in [
        (Field::ThresholdForward, 300.0),
        (Field::ThresholdReverse, 320.0),
        (Field::EndForward, 900.0),
        (Field::EndReverse, 910.0),
    ] {
        sheet.set(field, typed(value, InUnit::Milliampere));
    }
    for (turns, shown) in [(0.0, 3.0), (0.25, 1.0), (-0.25, 5.0)] {
        sheet.series.push(AdjusterRow {
            turns: typed(turns, InUnit::Turn),
            shown: typed(shown, InUnit::Turn),
            time: typed(60.0, InUnit::Second),
            going: Some(Direction::Forward),
            ..AdjusterRow::default()
        });
    }
    let full = there_and_back(&sheet);
    assert!(full.offset.is_some() && full.nulls.is_some() && full.servo.is_some());
    assert!(full.currents.is_some() && full.risk.is_some() && full.missing.is_empty());
    assert!(matches!(full.series, Some(Ok(_))), "{:?}", full.series);
    // A series without an answer crosses too.
    sheet.series.truncate(1);
    assert!(matches!(there_and_back(&sheet).series, Some(Err(_))));
}
