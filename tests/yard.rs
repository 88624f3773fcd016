//! The yard check: limits, verdicts, out against in, the unit's own baseline, breaks, projections, learning.
#![cfg(not(target_arch = "wasm32"))]

use lowside::faults::{self, FaultId};
use lowside::quantity::Typed;
use lowside::quantity::{Measure, Unit as InUnit, UnitPrefs};
use lowside::ranking::{Session, assess};
use lowside::readings::Place;
use lowside::record::{Afterwards, Closing, Export, Visit};
use lowside::report::{Check, Report as Paper};
use lowside::unit::{Figure, FigureId, MachineClass, Paths, Source, Tick, Unit};
use lowside::yard::learn::{self, Learning};
use lowside::yard::trend::{Axis, NoProjection, NoTrend, next_check, projection, reach, trend};
use lowside::yard::wear::Wear;
use lowside::yard::{
    Break, Field, Grade, History, LOOKS, Leg, MINUTES, NEVER_CHECKED, Report, Verdict, YardSheet,
    report, steps,
};

fn typed(value: f64, unit: InUnit) -> Typed {
    Typed {
        typed: format!("{value}"),
        value: Some(Measure::literal(value, unit)),
    }
}

fn unit() -> Unit {
    let mut unit = Unit {
        id: "u".into(),
        name: "T-27".into(),
        class: MachineClass::Roller,
        ..Unit::default()
    };
    for (id, value, of) in [
        (FigureId::LowIdle, 900.0, InUnit::RevolutionPerMinute),
        (FigureId::HighIdle, 2400.0, InUnit::RevolutionPerMinute),
        (FigureId::OilGrade, 46.0, InUnit::SquareMillimetrePerSecond),
        (FigureId::ChargeSetting, 22.0, InUnit::Bar),
    ] {
        unit.figures.insert(
            id,
            Figure {
                value: Some(Measure::literal(value, of)),
                typed: format!("{value}"),
                source: Source::Manual,
            },
        );
    }
    unit
}

fn set(sheet: &mut YardSheet, field: Field, value: f64) {
    sheet.set(field, typed(value, field.asks().0));
}

/// A sheet in which all is well.
fn good(unit: &Unit, leg: Leg) -> YardSheet {
    let mut sheet = YardSheet {
        leg,
        gauge: "gauge-60".into(),
        course: "yard ramp".into(),
        ..YardSheet::default()
    };
    for (field, value) in [
        (Field::Oil, 58.0),
        (Field::LowIdle, 905.0),
        (Field::HighIdle, 2390.0),
        (Field::ChargeLow, 21.0),
        (Field::ChargeHigh, 23.5),
        (Field::Knee, 900.0),
        (Field::ForwardTurns, 60.0),
        (Field::ForwardTime, 60.0),
        (Field::ReverseTurns, 59.5),
        (Field::ReverseTime, 60.0),
        (Field::EngineLight, 2380.0),
        (Field::LoadedTurns, 56.0),
        (Field::LoadedTime, 60.0),
        (Field::EngineLoaded, 2320.0),
    ] {
        set(&mut sheet, field, value);
    }
    if unit.ticks.paths.is_one() {
        set(&mut sheet, Field::ChargeForward, 22.0);
        set(&mut sheet, Field::ChargeReverse, 21.8);
    } else {
        for field in [Field::ChargeLeft, Field::ChargeRight, Field::ChargeBoth] {
            set(&mut sheet, field, 22.0);
        }
        for (field, value) in [
            (Field::ForwardTurnsRight, 60.25),
            (Field::ReverseTurnsRight, 59.25),
            (Field::Lane, 10.0),
            (Field::Track, 1.5),
            (Field::AsideForward, 0.1),
            (Field::AsideReverse, 0.0),
            (Field::SpinLeft, 8.0),
            (Field::SpinRight, 8.2),
            (Field::HubLeft, 55.0),
            (Field::HubRight, 58.0),
            (Field::DrainRight, 0.5),
        ] {
            set(&mut sheet, field, value);
        }
    }
    set(&mut sheet, Field::Drain, 0.5);
    for look in LOOKS {
        sheet
            .looks
            .insert(look.id.into(), look.options[0].code.into());
    }
    sheet
}

fn visit(id: &str, opened: &str, hours: f64, sheet: YardSheet) -> Visit {
    Visit {
        id: id.into(),
        unit: "u".into(),
        opened: opened.into(),
        hours: typed(hours, InUnit::Hour),
        yard: Some(sheet),
        ..Visit::default()
    }
}

fn judge(unit: &Unit, visit: &Visit, others: &[&Visit]) -> Report {
    report(unit, visit, others, &[], &UnitPrefs::metric())
}

fn first(unit: &Unit, change: impl FnOnce(&mut YardSheet)) -> Report {
    let mut sheet = good(unit, Leg::Out);
    change(&mut sheet);
    judge(unit, &visit("v", "2026-03-01T08:00:00Z", 100.0, sheet), &[])
}

fn two_paths() -> Unit {
    let mut unit = unit();
    unit.class = MachineClass::CompactTracked;
    unit.ticks.paths = Paths::TwoSharedCharge;
    unit
}

#[test]
fn the_check_is_under_ten_minutes_on_either_machine_and_asks_every_look_once() {
    for unit in [unit(), two_paths()] {
        let minutes: f64 = steps(&unit).iter().map(|s| s.minutes).sum();
        assert!(minutes < MINUTES, "{minutes}");
        for leg in Leg::ALL {
            let mut looks: Vec<&str> = steps(&unit)
                .iter()
                .flat_map(|s| s.looks_of(&unit, leg))
                .map(|l| l.id)
                .collect();
            let all = LOOKS
                .iter()
                .filter(|l| (l.has)(&unit) && l.leg.is_none_or(|only| only == leg));
            let mut wanted: Vec<&str> = all.map(|l| l.id).collect();
            looks.sort_unstable();
            wanted.sort_unstable();
            assert_eq!(looks, wanted);
        }
        // At return the two killers are looked for.
        let back: Vec<&str> = steps(&unit)
            .iter()
            .flat_map(|s| s.looks_of(&unit, Leg::In))
            .map(|l| l.id)
            .collect();
        for look in ["tow-valve", "interlocks", "brake-glazed"] {
            assert!(back.contains(&look), "{look}");
        }
    }
}

#[test]
fn an_empty_sheet_has_no_verdict_and_a_good_one_finds_nothing_but_says_what_was_not_checked() {
    for unit in [unit(), two_paths()] {
        let empty = judge(
            &unit,
            &visit("v", "2026-03-01T08:00:00Z", 1.0, YardSheet::default()),
            &[],
        );
        assert_eq!(empty.verdict, Verdict::NothingChecked);
        assert!(empty.reasons.is_empty());
        let full = first(&unit, |_| ());
        assert_eq!(full.verdict, Verdict::NothingFound, "{:?}", full.reasons);
        assert_eq!(full.verdict.words(), "Nothing found in what was checked");
        for made in [&empty, &full] {
            for never in NEVER_CHECKED {
                assert!(made.not_checked.iter().any(|line| line == never), "{never}");
            }
        }
        assert!(empty.not_checked.len() > full.not_checked.len());
    }
}

#[test]
fn each_limit_of_common_practice_is_told_with_its_source() {
    let unit = unit();
    type Edit = fn(&mut YardSheet);
    let cases: [(Edit, Grade, &str); 12] = [
        (
            |s| set(s, Field::ChargeLow, 17.5),
            Grade::Watch,
            "share of high idle",
        ),
        (|s| set(s, Field::ChargeLow, 14.0), Grade::Stop, "65.0 %"),
        (|s| set(s, Field::Knee, 1250.0), Grade::Watch, "Knee"),
        (|s| set(s, Field::Knee, 1700.0), Grade::Stop, "Knee"),
        (
            |s| set(s, Field::ChargeReverse, 21.2),
            Grade::Watch,
            "forward against reverse",
        ),
        (
            |s| set(s, Field::ChargeReverse, 19.0),
            Grade::Stop,
            "forward against reverse",
        ),
        (
            |s| set(s, Field::ChargeForward, 8.0),
            Grade::Stop,
            "Least charge in drive",
        ),
        (|s| set(s, Field::LoadedTurns, 53.0), Grade::Watch, "Slip"),
        (|s| set(s, Field::LoadedTurns, 48.0), Grade::Stop, "Slip"),
        (
            |s| {
                s.looks.insert("tow-valve".into(), "open".into());
            },
            Grade::Stop,
            "tow valve",
        ),
        (
            |s| {
                s.looks.insert("interlocks".into(), "bridged".into());
            },
            Grade::Stop,
            "interlock",
        ),
        (
            |s| {
                s.looks.insert("level".into(), "low".into());
            },
            Grade::Watch,
            "oil level",
        ),
    ];
    for (edit, grade, words) in cases {
        let made = first(&unit, edit);
        let verdict = if grade == Grade::Stop {
            Verdict::DoNotSendOut
        } else {
            Verdict::Watch
        };
        assert_eq!(made.verdict, verdict, "{words}: {:?}", made.reasons);
        let reason = made
            .reasons
            .iter()
            .find(|(g, why)| *g == grade && why.contains(words));
        assert!(reason.is_some(), "{words}: {:?}", made.reasons);
        // Worst first.
        assert!(
            made.reasons
                .is_sorted_by_key(|(g, _)| core::cmp::Reverse(*g))
        );
    }
    let tracked = two_paths();
    for (field, watch, stop) in [
        (Field::AsideForward, 0.6, 1.0),
        (Field::SpinRight, 8.7, 9.5),
        (Field::HubRight, 72.0, 85.0),
        (Field::ForwardTurnsRight, 61.0, 62.5),
        (Field::DrainRight, 1.7, 2.2),
    ] {
        for (value, verdict) in [(watch, Verdict::Watch), (stop, Verdict::DoNotSendOut)] {
            let made = first(&tracked, |s| set(s, field, value));
            assert_eq!(
                made.verdict, verdict,
                "{field:?} {value}: {:?}",
                made.reasons
            );
        }
    }
}

#[test]
fn low_charge_is_held_against_what_the_brake_needs() {
    let mut unit = unit();
    unit.ticks.brake_from_charge = Tick::Yes;
    unit.figures.insert(
        FigureId::BrakeRelease,
        Figure {
            value: Some(Measure::literal(19.0, InUnit::Bar)),
            typed: "19".into(),
            source: Source::Manual,
        },
    );
    let made = first(&unit, |_| ());
    assert_eq!(made.verdict, Verdict::DoNotSendOut);
    assert!(made.reasons[0].1.contains("brake"), "{:?}", made.reasons);
}

#[test]
fn cold_oil_judges_no_leak_but_a_fault_seen_is_a_fault() {
    let unit = unit();
    let cold = first(&unit, |s| {
        set(s, Field::Oil, 22.0);
        set(s, Field::LoadedTurns, 48.0);
        set(s, Field::ChargeLow, 10.0);
    });
    assert_eq!(cold.verdict, Verdict::NothingFound, "{:?}", cold.reasons);
    assert!(cold.cold.is_some());
    let withheld = cold.not_checked.iter().filter(|l| l.contains("45")).count();
    assert!(withheld >= 5, "{:?}", cold.not_checked);
    // That it stands still on cold oil is no news, that it creeps is.
    assert!(
        cold.not_checked
            .iter()
            .any(|l| l.starts_with("Stands in neutral"))
    );
    let creeps = first(&unit, |s| {
        set(s, Field::Oil, 22.0);
        s.looks.insert("creep".into(), "creeps".into());
    });
    assert_eq!(creeps.verdict, Verdict::DoNotSendOut);
    let untaken = first(&unit, |s| {
        s.fields.remove(&Field::Oil);
        set(s, Field::ChargeLow, 10.0);
    });
    assert_eq!(untaken.verdict, Verdict::NothingFound);
    assert!(
        untaken
            .not_checked
            .iter()
            .any(|l| l.contains("no oil temperature"))
    );
}

#[test]
fn from_the_third_check_on_the_units_own_checks_are_the_yardstick() {
    let unit = unit();
    // A machine that has always slipped over the limit to watch.
    let slips = |turns: f64, oil: f64| {
        let mut sheet = good(&unit, Leg::Between);
        set(&mut sheet, Field::LoadedTurns, turns);
        set(&mut sheet, Field::Oil, oil);
        sheet
    };
    let one = visit("v1", "2026-01-01T08:00:00Z", 100.0, slips(54.0, 58.0));
    let two = visit("v2", "2026-02-01T08:00:00Z", 180.0, slips(53.9, 58.0));
    let now = visit("v3", "2026-03-01T08:00:00Z", 260.0, slips(54.0, 58.0));
    assert_eq!(judge(&unit, &one, &[]).verdict, Verdict::Watch);
    assert_eq!(judge(&unit, &two, &[&one, &now]).verdict, Verdict::Watch);
    assert_eq!(
        judge(&unit, &now, &[&two, &one]).verdict,
        Verdict::NothingFound
    );
    // Hotter oil, more slip, the same wear.
    let hot = visit("v3", "2026-03-01T08:00:00Z", 260.0, slips(53.2, 65.0));
    let by_weather = judge(&unit, &hot, &[&one, &two]);
    assert_eq!(
        by_weather.verdict,
        Verdict::NothingFound,
        "{:?}",
        by_weather.reasons
    );
    let worn = visit("v3", "2026-03-01T08:00:00Z", 260.0, slips(51.7, 58.0));
    let by_wear = judge(&unit, &worn, &[&one, &two]);
    assert!(by_wear.verdict >= Verdict::Watch);
    assert!(
        by_wear.reasons[0].1.contains("this unit’s last 2 checks"),
        "{:?}",
        by_wear.reasons
    );
    // After a repair the count begins anew.
    let mut repair = Visit {
        id: "call".into(),
        unit: "u".into(),
        opened: "2026-02-10T08:00:00Z".into(),
        closed: Some(Closing {
            cause: "pump-worn".into(),
            done: "pump changed".into(),
            ..Closing::default()
        }),
        ..Visit::default()
    };
    assert_eq!(
        judge(&unit, &now, &[&one, &two, &repair]).verdict,
        Verdict::Watch
    );
    repair.closed = Some(Closing::default());
    assert_eq!(
        judge(&unit, &now, &[&one, &two, &repair]).verdict,
        Verdict::NothingFound
    );
}

#[test]
fn out_and_in_are_paired_and_the_change_has_its_uncertainty() {
    let unit = unit();
    let out = visit("v1", "2026-01-01T08:00:00Z", 100.0, good(&unit, Leg::Out));
    let older_in = visit("v0", "2025-12-20T08:00:00Z", 90.0, good(&unit, Leg::In));
    let same = visit("v2", "2026-01-20T08:00:00Z", 190.0, good(&unit, Leg::In));
    let made = judge(&unit, &same, &[&older_in, &out]);
    let change = made.change.expect("there is a check out");
    assert_eq!(change.visit, "v1");
    assert_eq!(change.hours, Some(90.0));
    assert!(
        change.changes.iter().all(|c| c.grade == Grade::Good),
        "{:?}",
        change.changes
    );
    assert!(
        change
            .changes
            .iter()
            .any(|c| c.of == Wear::Slip && c.words.contains('±'))
    );
    let mut worse = good(&unit, Leg::In);
    set(&mut worse, Field::LoadedTurns, 52.0);
    set(&mut worse, Field::ChargeLow, 15.5);
    let worse = visit("v2", "2026-01-20T08:00:00Z", 190.0, worse);
    let made = judge(&unit, &worse, &[&out]);
    let change = made.change.expect("there is a check out");
    let slip = change
        .changes
        .iter()
        .find(|c| c.of == Wear::Slip)
        .expect("read twice");
    assert!(
        slip.grade >= Grade::Watch && slip.figures.2 > 2.0 * slip.figures.3,
        "{slip:?}"
    );
    let low = change
        .changes
        .iter()
        .find(|c| c.of == Wear::LowIdle)
        .expect("read twice");
    assert!(
        low.grade >= Grade::Watch && low.words.contains("at most"),
        "{low:?}"
    );
    assert!(made.verdict >= Verdict::Watch);
    // A check in between them ends the pair; another ramp does not compare.
    let between = visit("v3", "2026-01-25T08:00:00Z", 195.0, good(&unit, Leg::In));
    assert!(judge(&unit, &between, &[&out, &same]).change.is_none());
    let mut elsewhere = good(&unit, Leg::In);
    elsewhere.course = "quarry road".into();
    let elsewhere = visit("v2", "2026-01-20T08:00:00Z", 190.0, elsewhere);
    let change = judge(&unit, &elsewhere, &[&out]).change.expect("paired");
    assert!(change.changes.iter().all(|c| c.of != Wear::Slip));
    assert!(
        change
            .not_compared
            .iter()
            .any(|l| l.contains("another ramp"))
    );
}

/// Checks every 60 h with growing drain at changing temperatures, viscosity taken out by the circuit's own law.
fn worn(count: usize, grows: f64) -> Vec<Visit> {
    let unit = unit();
    let power = lowside::yard::law::power(Wear::Drain, &unit);
    (0..count)
        .map(|k| {
            let hours = 60.0 * k as f64;
            let oil = [46.0, 71.0, 58.0, 66.0, 50.0][k % 5];
            let mu = lowside::yard::wear::viscosity_at(&unit, oil);
            let mut sheet = good(&unit, Leg::Between);
            set(&mut sheet, Field::Oil, oil);
            set(&mut sheet, Field::ChargeHigh, 20.0);
            let wobble = 1.0 + 0.01 * [0.0, 1.0, -1.0][k % 3];
            set(
                &mut sheet,
                Field::Drain,
                0.5 * (1.0 + grows * hours / 1000.0) * wobble / mu.powf(power),
            );
            visit(
                &format!("v{k:02}"),
                &format!("2026-{:02}-{:02}T08:00:00Z", 1 + k / 4, 1 + 7 * (k % 4)),
                1000.0 + hours,
                sheet,
            )
        })
        .collect()
}

fn series(visits: &[Visit]) -> History {
    History::of(
        Wear::Drain,
        &unit(),
        &visits.iter().collect::<Vec<_>>(),
        &[],
    )
}

#[test]
fn a_share_is_told_in_per_cent_once() {
    let prefs = UnitPrefs::metric();
    assert_eq!(
        lowside::yard::value_words(Wear::Slip, 0.045, &prefs),
        "4.5 %"
    );
}

#[test]
fn march_and_july_lie_on_one_line() {
    let visits = worn(10, 0.0);
    let raw: Vec<f64> = visits
        .iter()
        .filter_map(|v| v.yard.as_ref()?.value(Field::Drain))
        .collect();
    let history = series(&visits);
    let values: Vec<f64> = history
        .comparable()
        .iter()
        .filter_map(|g| g.point.is.as_ref().ok().map(|c| c.is.value))
        .collect();
    let spread = |v: &[f64]| {
        v.iter().fold(0.0f64, |a, b| a.max(*b)) / v.iter().fold(f64::MAX, |a, b| a.min(*b))
    };
    assert!(
        spread(&raw) > 2.0 && spread(&values) < 1.03,
        "{raw:?} {values:?}"
    );
}

#[test]
fn a_projection_needs_five_points_over_two_hundred_hours_and_a_rise() {
    let level = 0;
    let few = trend(&series(&worn(4, 2.0))).expect("four points have a line");
    assert!(matches!(
        projection(&few, level, 1.0),
        Err(NoProjection::Thin(4, Some(_)))
    ));
    let flat = trend(&series(&worn(9, 0.0))).expect("a line");
    assert_eq!(projection(&flat, level, 1.0), Err(NoProjection::NotRising));
    let rising = trend(&series(&worn(9, 2.0))).expect("a line");
    let found = projection(&rising, level, 1.3).expect("it rises");
    // 0.5·(1 + 2·h/1000) at 20 bar reaches 1.3 after 800 h.
    assert!((found.middle - 1800.0).abs() < 60.0, "{found:?}");
    assert!(found.earliest < found.middle && found.latest.is_some_and(|l| l > found.middle));
    assert_eq!(projection(&rising, level, 50.0), Err(NoProjection::Far));
    assert_eq!(trend(&series(&worn(2, 2.0))).err(), Some(NoTrend::Few(2)));
    // Without hours the line runs over days, and projects nothing.
    let mut dated = worn(9, 2.0);
    for visit in &mut dated {
        visit.hours = Typed::default();
    }
    let by_days = trend(&series(&dated)).expect("a line");
    assert_eq!(by_days.axis, Axis::Days);
    assert!(matches!(
        projection(&by_days, level, 1.3),
        Err(NoProjection::Thin(9, None))
    ));
}

#[test]
fn another_gauge_steps_the_level_and_a_repair_begins_anew() {
    let mut visits = worn(10, 1.0);
    for visit in visits.iter_mut().skip(6) {
        let sheet = visit.yard.as_mut().expect("a yard check");
        sheet.meter = "other jug".into();
        let flow = sheet.value(Field::Drain).expect("read");
        set(sheet, Field::Drain, 1.2 * flow);
    }
    let history = series(&visits);
    assert_eq!(history.points[6].after, Some(Break::OtherInstrument));
    let stepped = trend(&history).expect("a line");
    let slope = 0.5 * 1.0 / 1000.0;
    assert!(
        (stepped.slope.value / slope - 1.1).abs() < 0.25,
        "{:?}",
        stepped.slope
    );
    let (before, after) = (stepped.at(1300.0, 0).value, stepped.at(1300.0, 1).value);
    assert!((after / before - 1.2).abs() < 0.06, "{before} {after}");
    // A repair in the middle: only what came after counts.
    let mut visits = worn(10, 1.0);
    visits.push(Visit {
        id: "call".into(),
        unit: "u".into(),
        opened: visits[5].opened.replace("08:", "12:"),
        closed: Some(Closing {
            done: "motor changed".into(),
            ..Closing::default()
        }),
        ..Visit::default()
    });
    let history = series(&visits);
    assert_eq!(history.points[6].after, Some(Break::Repair("call".into())));
    assert_eq!(history.comparable().len(), 4);
    visits.last_mut().expect("the call").opened = "2027-01-01T08:00:00Z".into();
    assert_eq!(trend(&series(&visits)).err(), Some(NoTrend::Repaired));
}

#[test]
fn cold_points_are_not_drawn_and_say_why() {
    let mut visits = worn(6, 0.0);
    let sheet = visits[2].yard.as_mut().expect("a yard check");
    set(sheet, Field::Oil, 25.0);
    let history = series(&visits);
    let why = history.points[2]
        .point
        .is
        .as_ref()
        .expect_err("cold")
        .words();
    assert!(why.contains("25 °C"), "{why}");
    assert_eq!(history.comparable().len(), 5);
    // A tank reads cooler than what leaks.
    let sheet = visits[2].yard.as_mut().expect("a yard check");
    set(sheet, Field::Oil, 50.0);
    sheet.place = Place::Tank;
    assert_eq!(series(&visits).comparable().len(), 6);
}

#[test]
fn the_next_check_comes_sooner_where_a_trend_nears_its_limit() {
    let usual = next_check((Some(20_000), Some(500.0)), Some(5.0), &[]);
    assert_eq!((usual.hours, usual.day), (Some(750.0), Some(20_050)));
    let rising = trend(&series(&worn(9, 2.0))).expect("a line");
    let ahead = reach(&rising, 0, 1.2).expect("within two intervals");
    let soon = next_check(
        (Some(20_000), Some(500.0)),
        Some(5.0),
        &[(Axis::Hours, ahead)],
    );
    assert!(soon.hours.is_some_and(|h| h < 750.0) && soon.day.is_some_and(|d| d < 20_050));
    let over = next_check((Some(20_000), Some(500.0)), None, &[(Axis::Hours, 0.0)]);
    assert_eq!(over.hours, Some(510.0));
    assert!(over.day.is_some_and(|d| d > 20_000 && d <= 20_010));
    assert_eq!(next_check((None, None), None, &[]).day, None);
}

fn case(id: &str, unit: &str, cause: &str, proved: bool, done: &str) -> Visit {
    Visit {
        id: id.into(),
        unit: unit.into(),
        opened: format!("2026-01-{:02}T08:00:00Z", 1 + id.len()),
        closed: Some(Closing {
            cause: cause.into(),
            is_proved: proved,
            done: done.into(),
            afterwards: if done.contains("went away") {
                Afterwards::Gone
            } else {
                Afterwards::NotSaid
            },
            ..Closing::default()
        }),
        ..Visit::default()
    }
}

#[test]
fn closed_cases_move_base_rates_by_class_and_can_be_taken_back() {
    let mut other = unit();
    other.id = "w".into();
    other.class = MachineClass::Loader;
    let units = [unit(), other.clone()];
    // Taken for proved, and wrong: the trouble stayed.
    let mut still_there = case("ggggggg", "u", "motor-worn", true, "motor changed");
    if let Some(closed) = &mut still_there.closed {
        closed.afterwards = Afterwards::StillThere;
    }
    let visits = [
        case("a", "u", "pump-worn", true, ""),
        case("bb", "u", "pump-worn", false, "changed it and it went away"),
        case("ccc", "w", "inlet-air", true, ""),
        case("dddd", "u", "", true, "nothing found"),
        case("eeeee", "u", "motor-worn", false, ""),
        case("demo-x", "u", "motor-worn", true, ""),
        // Changed, and nobody said that it was gone.
        case("ffffff", "u", "motor-worn", false, "motor changed"),
        still_there,
    ];
    let mut learning = Learning::default();
    let cases = learn::cases(&units, &visits, &learning);
    assert_eq!(cases.len(), 3);
    let total: f64 = faults::all().iter().map(|f| f.per_hundred).sum();
    let catalogue = |id| faults::find(id).map_or(0.0, |f| f.per_hundred);
    let share = |id| 100.0 * catalogue(id) / total;
    let roller = learn::rates_for("new", units[0].class, &cases, &learning);
    let loader = learn::rates_for("new", units[1].class, &cases, &learning);
    assert_eq!((roller.cases, roller.own_class), (2.5, 1.5));
    assert_eq!((loader.cases, loader.own_class), (2.5, 1.0));
    // Dirichlet by hand: 100 · share of the start, which the loader's case moves, and 1.5 of its own.
    let start = share(FaultId::PumpWorn) / 101.0;
    let by_hand = total * (100.0 * start + 1.5) / 101.5;
    assert!((roller.per_hundred[&FaultId::PumpWorn] - by_hand).abs() < 1e-9);
    assert!(roller.per_hundred[&FaultId::PumpWorn] > loader.per_hundred[&FaultId::PumpWorn]);
    assert!(loader.per_hundred[&FaultId::InletAir] > roller.per_hundred[&FaultId::InletAir]);
    let overall = learn::rates(&cases, None, &learning);
    for rates in [&roller, &loader, &overall] {
        let sum: f64 = rates.per_hundred.values().sum();
        assert!((sum / total - 1.0).abs() < 1e-9);
        assert!(rates.words().is_some_and(|w| w.contains("2.5 cases")));
    }
    // A case is no evidence about itself.
    let own = learn::rates_for("a", units[0].class, &cases, &learning);
    assert_eq!((own.cases, own.own_class), (1.5, 0.5));
    learning.left_out.insert("a".into());
    let fewer = learn::cases(&units, &visits, &learning);
    assert_eq!(
        learn::rates(&fewer, Some(units[0].class), &learning).own_class,
        0.5
    );
    learning.is_off = true;
    let off = learn::rates(&fewer, Some(units[0].class), &learning);
    assert!(off.is_empty() && off.words().is_none());
    let table = learn::table(&cases, &Learning::default());
    assert_eq!(table.lines().count(), faults::all().len() + 1);
    let line = table
        .lines()
        .find(|l| l.starts_with("pump-worn,"))
        .expect("a line a cause");
    assert!(line.contains(",1.5,"), "{line}");
}

#[test]
fn learned_rates_reach_the_ranking_and_are_said() {
    let unit = unit();
    let visit = Visit {
        id: "v".into(),
        unit: "u".into(),
        ..Visit::default()
    };
    let of = |assessment: &lowside::assessment::Assessment, id: FaultId| -> f64 {
        assessment
            .causes
            .iter()
            .flat_map(|c| c.ids.iter().zip(&c.shares))
            .filter(|(i, _)| **i == id)
            .map(|(_, p)| p)
            .sum()
    };
    let plain = assess(&unit, &visit, &[]);
    let cases: Vec<Visit> = (0..20)
        .map(|k| case(&format!("case-{k}"), "u", "motor-worn", true, ""))
        .collect();
    let learning = Learning::default();
    let cases = learn::cases([&unit], &cases, &learning);
    let rates = learn::rates_for("v", unit.class, &cases, &learning);
    let mut session = Session::default();
    session.learn(rates);
    let taught = session.assess(&unit, &visit, &[]);
    let (before, after) = (
        of(&plain, FaultId::MotorWorn),
        of(&taught, FaultId::MotorWorn),
    );
    assert!(after > 2.0 * before, "{before} {after}");
    assert!(
        taught
            .notes
            .iter()
            .any(|n| n.contains("20 cases of your own"))
    );
    assert!(!plain.notes.iter().any(|n| n.contains("of your own")));
    session.learn(learn::Rates::default());
    let again = session.assess(&unit, &visit, &[]);
    assert_eq!(again.causes, plain.causes);
}

/// The paper says the verdict, every reason, everything checked and not checked, and can be made again from its own file.
#[test]
fn the_paper_of_a_check_says_it_all_and_is_made_again_from_its_file() {
    let unit = unit();
    let out = visit("out", "2026-03-01T08:00:00Z", 1210.0, good(&unit, Leg::Out));
    let mut sheet = good(&unit, Leg::In);
    set(&mut sheet, Field::LoadedTurns, 50.0);
    sheet.set(
        Field::Knee,
        Typed {
            typed: "about 900".into(),
            value: None,
        },
    );
    let mut back = visit("in", "2026-03-09T16:00:00Z", 1302.0, sheet);
    back.note = "muddy\n\"left\" hub, 2 bolts".into();
    let later = visit(
        "later",
        "2026-04-01T08:00:00Z",
        1400.0,
        good(&unit, Leg::Out),
    );
    let others = [&out, &later];
    let prefs = UnitPrefs::metric();
    let check = Check {
        unit: &unit,
        visit: &back,
        others: &others,
        instruments: &[],
        prefs: &prefs,
        made_at: "2026-03-09T17:00:00Z",
    };
    let told = judge(&unit, &back, &others);
    assert!(told.verdict > Verdict::NothingFound, "{told:?}");
    let paper = Paper::of_check(&check);
    let text = paper.text();
    assert!(text.contains(told.verdict.words()), "{text}");
    for (_, why) in &told.reasons {
        assert!(text.contains(why.as_str()), "{why}");
    }
    for what in &told.not_checked {
        assert!(text.contains(what.as_str()), "{what}");
    }
    for judged in told.judged.iter().filter(|judged| judged.grade.is_some()) {
        assert!(text.contains(&judged.what), "{}", judged.what);
    }
    assert!(text.contains("92 h on the meter"), "{text}");
    assert!(text.contains("does not say that the machine is fit"));
    assert!(!text.contains("NaN"));

    // Its file holds what it is compared with, nothing later, and gives the same paper.
    let file = check.export().text().expect("writes");
    let read = Export::read(file.as_bytes()).expect("reads");
    let mut ids: Vec<&str> = read.visits.iter().map(|v| v.id.as_str()).collect();
    ids.sort_unstable();
    assert_eq!(ids, ["in", "out"]);
    let others: Vec<&Visit> = read.visits.iter().filter(|v| v.id != "in").collect();
    let again = Paper::of_check(&Check {
        unit: &read.units[0],
        visit: read.visits.iter().find(|v| v.id == "in").expect("there"),
        others: &others,
        prefs: &read.settings.clone().expect("units of measure").units,
        made_at: &read.made_at,
        ..check
    });
    assert_eq!(again.text(), text);

    // A reader from outside sees one line, the unit of each figure in its header, and what was typed where it is no figure.
    let table = check.csv();
    let mut reader = csv::Reader::from_reader(table.as_bytes());
    let header = reader.headers().expect("a header").clone();
    let rows: Vec<csv::StringRecord> = reader.records().map(|row| row.expect("a row")).collect();
    assert_eq!(rows.len(), 1);
    let cell = |name: &str| {
        let at = header.iter().position(|cell| cell == name);
        rows[0][at.unwrap_or_else(|| panic!("{name}: {header:?}"))].to_owned()
    };
    assert_eq!(cell("Charge, low idle (bar)"), "21");
    assert_eq!(cell("Engine speed at the knee (rpm)"), "about 900");
    assert_eq!(cell("Note"), "muddy / \"left\" hub, 2 bolts");
}
