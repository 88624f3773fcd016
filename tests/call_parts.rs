//! The pure parts of the call screen: scale, groups, quick sets, words. They know no browser, so they are tried here natively,
//! though the screen itself is built for the browser alone.
#![cfg(not(target_arch = "wasm32"))]
#![allow(dead_code)] // what only the screen uses

pub use lowside::{assessment, checks, faults, quantity, ranking, readings, record, unit};

#[path = "../src/app/call"]
mod call {
    pub mod bands;
    pub mod group;
    pub mod pair_line;
    pub mod quick;
    pub mod scale;

    pub use lowside::call::{put_back, side, words};
}

use assessment::{Assessment, Cause, Evidence, Trust};
use call::side::{Sides, Wanted};
use call::{bands, group, pair_line, put_back, quick, scale, side, words};
use faults::FaultId;
use proptest::prelude::*;
use quantity::{Measure, Unit, UnitPrefs};
use readings::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Path, Place, Port, Reading,
    Seen, Stroked,
};
use record::{Answer, Earlier, PutBack, Visit};

fn reading(id: &str, port: Port, condition: Condition) -> Reading {
    Reading {
        id: id.to_owned(),
        port,
        path: Path::Left,
        condition,
        rigging: String::new(),
        seen: None,
        typed: String::new(),
        note: String::new(),
    }
}

fn there(readings: &[Reading]) -> impl Iterator<Item = (Port, Path, &Condition)> + Clone {
    readings
        .iter()
        .map(|reading| (reading.port, reading.path, &reading.condition))
}

fn sides(paths: unit::Paths) -> Sides {
    let mut machine = unit::Unit::default();
    machine.ticks.paths = paths;
    Sides::of(&machine)
}

/// A wanted reading as it stands once added.
fn added(place: usize, wanted: &Wanted) -> Reading {
    Reading {
        path: wanted.path,
        ..reading(&format!("r{place}"), wanted.port, wanted.condition)
    }
}

fn driven(direction: Direction) -> Condition {
    Condition {
        doing: Doing::Free,
        direction,
        lever: Lever::Half,
        ..Condition::start()
    }
}

proptest! {
    #[test]
    fn a_scale_keeps_everything_in_order_and_on_the_paper(
        low in -50.0..500.0_f64,
        width in 0.0..400.0_f64,
        share in 0.0..1.0_f64,
        read in proptest::option::of(-100.0..1000.0_f64),
        instrument in 0.0..20.0_f64,
    ) {
        let high = low + width;
        let drawn = scale::lay_out(low, low + share * width, high, read, instrument).expect("finite");
        prop_assert!(drawn.low < drawn.high);
        prop_assert!(drawn.low <= drawn.middle && drawn.middle <= drawn.high);
        // Room for the figures outside the band on both sides.
        prop_assert!(drawn.low > 15.0 && drawn.high < 85.0);
        if let (Some(read), Some(at)) = (read, drawn.read) {
            prop_assert!((0.0..=100.0).contains(&at));
            // Inside stays inside, outside stays outside, but for the band's least width.
            if read < low - 0.05 * (high - low).max(1.0) - 0.05 * low.abs() {
                prop_assert!(at < drawn.low);
            }
            if read > low && read < high {
                prop_assert!(drawn.low <= at && at <= drawn.high);
            }
        }
        if let Some((from, to)) = drawn.whisker {
            prop_assert!(from < to && from >= 0.0 && to <= 100.0);
        }
    }

    #[test]
    fn a_per_cent_is_never_a_certainty(share in 0.0..=1.0_f64) {
        let text = words::percent(share);
        prop_assert!(text != "0\u{202f}%" && text != "100\u{202f}%", "{}", text);
        prop_assert!(!text.contains("NaN"));
    }
}

#[test]
fn a_scale_is_not_drawn_from_what_is_no_figure() {
    for (low, middle, high, read) in [
        (f64::NAN, 1.0, 2.0, None),
        (1.0, f64::INFINITY, 2.0, None),
        (1.0, 1.5, 2.0, Some(f64::NAN)),
        (2.0, 1.5, 1.0, None),
    ] {
        assert_eq!(scale::lay_out(low, middle, high, read, 0.1), None);
    }
    assert!(scale::lay_out(1.0, 1.5, 2.0, Some(1.2), f64::NAN).is_some());
}

#[test]
fn readings_of_one_condition_stand_under_one_heading() {
    let warm = Condition {
        oil: Measure::new(55.0, Unit::DegreeCelsius)
            .ok()
            .map(|value| OilTemperature {
                value,
                place: Place::DrainHose,
            }),
        ..Condition::start()
    };
    let readings = [
        reading("r1", Port::Charge, Condition::start()),
        reading("r2", Port::Charge, driven(Direction::Forward)),
        // In neutral the direction says nothing.
        reading(
            "r3",
            Port::PumpCase,
            Condition {
                direction: Direction::Reverse,
                ..Condition::start()
            },
        ),
        reading("r4", Port::Charge, driven(Direction::Reverse)),
        reading("r5", Port::MotorCase, warm),
    ];
    let groups: Vec<Vec<usize>> = group::groups(&readings, &[])
        .into_iter()
        .map(|group| group.at)
        .collect();
    assert_eq!(groups, [vec![0, 2], vec![1], vec![3], vec![4]]);

    // While a heading is edited its readings stay apart, whatever it reads at the moment.
    let pinned = vec!["r3".to_owned()];
    let groups: Vec<Vec<usize>> = group::groups(&readings, &pinned)
        .into_iter()
        .map(|group| group.at)
        .collect();
    assert_eq!(groups, [vec![0], vec![1], vec![2], vec![3], vec![4]]);
}

#[test]
fn a_quick_set_adds_what_is_missing_and_nothing_twice() {
    for (set, paths) in quick::SETS
        .iter()
        .flat_map(|set| unit::Paths::ALL.map(|paths| (set, paths)))
    {
        let sides = sides(paths);
        let all = set.missing(sides, there(&[]));
        assert!(!all.is_empty(), "{}", set.id);
        let taken: Vec<Reading> = all
            .iter()
            .enumerate()
            .map(|(place, wanted)| added(place, wanted))
            .collect();
        assert!(set.missing(sides, there(&taken)).is_empty(), "{}", set.id);
        let (_, rest) = taken.split_first().expect("one at least");
        assert_eq!(set.missing(sides, there(rest)).len(), 1, "{}", set.id);
        // A temperature and a speed read off since do not make another reading of it.
        let measured: Vec<Reading> = taken
            .iter()
            .cloned()
            .map(|mut reading| {
                reading.condition.engine = EngineSpeed::Measured(
                    Measure::new(1400.0, Unit::RevolutionPerMinute).expect("finite"),
                );
                reading
            })
            .collect();
        assert!(
            set.missing(sides, there(&measured)).is_empty(),
            "{}",
            set.id
        );
    }
}

#[test]
fn on_two_paths_a_set_reads_left_and_right_in_turn_and_on_one_nothing_has_a_side() {
    let case = quick::SETS
        .iter()
        .find(|set| set.id == "case")
        .expect("a set");
    let read = |paths| -> Vec<(Port, Path)> {
        let wanted = case.missing(sides(paths), there(&[]));
        wanted.iter().map(|w| (w.port, w.path)).collect()
    };
    let pump = (Port::PumpCase, Path::Left);
    let motors = [
        (Port::MotorCase, Path::Left),
        (Port::MotorCase, Path::Right),
    ];
    assert_eq!(read(unit::Paths::One), [pump, motors[0]]);
    // A tandem has one pump case, two pumps apart have two.
    assert_eq!(
        read(unit::Paths::TwoSharedCharge),
        [pump, motors[0], motors[1]]
    );
    assert_eq!(read(unit::Paths::TwoOwnCharge).len(), 4);

    let offered = |paths| quick::sets(sides(paths)).any(|set| set.id == "speeds");
    assert!(offered(unit::Paths::TwoSharedCharge) && !offered(unit::Paths::One));
    assert!(!sides(unit::Paths::One).any());

    let mut right = reading("r1", Port::MotorCase, Condition::start());
    right.path = Path::Right;
    assert_eq!(
        sides(unit::Paths::TwoSharedCharge).name(&right),
        "Right motor case pressure"
    );
    // What was noted stays when the profile says one path, and is not named any more.
    assert_eq!(sides(unit::Paths::One).name(&right), "Motor case pressure");
    assert_eq!(
        side::named(Some(Path::Left), words::port_short(Port::LoopDifference)),
        "Left A − B"
    );
}

#[test]
fn a_side_that_stands_still_is_not_read() {
    let both = sides(unit::Paths::TwoSharedCharge);
    let alone = Condition {
        stroked: Stroked::Right,
        ..driven(Direction::Forward)
    };
    assert_eq!(both.paths(Port::Wheel, &alone), [Path::Right]);
    assert_eq!(both.paths(Port::Charge, &alone), [Path::Left]);
    // In neutral nothing is stroked at all.
    let neutral = Condition {
        doing: Doing::Neutral,
        ..alone
    };
    assert_eq!(both.paths(Port::Wheel, &neutral), Path::BOTH);
    assert!(group::same(&neutral, &Condition::start()));
    assert!(!group::same(&alone, &driven(Direction::Forward)));
}

#[test]
fn right_stands_under_left_and_is_paired_with_it() {
    let right = |id: &str, port| Reading {
        path: Path::Right,
        ..reading(id, port, Condition::start())
    };
    let readings = [
        reading("r1", Port::MotorCase, Condition::start()),
        reading("r2", Port::MotorDrain, Condition::start()),
        right("r3", Port::MotorDrain),
        right("r4", Port::MotorCase),
        right("r5", Port::MotorCase),
        reading("r6", Port::MotorCase, Condition::start()),
        right("r7", Port::LoopA),
    ];
    let groups = group::groups(&readings, &[]);
    let [only] = groups.as_slice() else {
        panic!("{groups:?}")
    };
    assert_eq!(only.at, [0, 3, 1, 2, 4, 5, 6]);
    assert_eq!(group::pairs(&readings, &only.at), [(0, 3), (1, 2), (5, 4)]);
}

#[test]
fn right_is_told_against_left_with_the_share_where_one_makes_sense() {
    let at = |port: Port, value: f64| Reading {
        seen: Measure::from_base(value, port.kind())
            .ok()
            .map(|value| Seen::Value { value }),
        ..reading("r", port, driven(Direction::Forward))
    };
    let told = |port, left, right, prefs: &UnitPrefs| {
        pair_line::words(&at(port, left), &at(port, right), prefs)
            .map(|words| words.replace('\u{202f}', " "))
    };
    let metric = UnitPrefs::metric();
    let told_metric = |port, left, right| told(port, left, right, &metric).unwrap_or_default();
    assert_eq!(
        told_metric(Port::Wheel, 43.2, 41.8),
        "Right 1.4 rpm lower (−3.2 %)"
    );
    assert_eq!(
        told_metric(Port::MotorDrain, 1.0, 2.5),
        "Right 1.5 L/min higher (+150.0 %)"
    );
    assert_eq!(
        told_metric(Port::Wheel, 43.2, 43.2),
        "Left and right read the same"
    );
    // No share of nothing, none of what runs through nought.
    assert_eq!(told_metric(Port::Wheel, 0.0, 2.0), "Right 2.0 rpm higher");
    assert_eq!(
        told_metric(Port::MotorCase, 1.0, 1.8),
        "Right 0.80 bar higher"
    );
    assert_eq!(
        told(Port::LoopA, 200.0, 190.0, &UnitPrefs::us()).as_deref(),
        Some("Right 145 psi lower (−5.0 %)")
    );
    let nothing = Reading {
        seen: Some(Seen::Nothing),
        ..at(Port::Wheel, 1.0)
    };
    assert_eq!(
        pair_line::words(&at(Port::Wheel, 43.0), &nothing, &metric),
        None
    );
}

#[test]
fn held_readings_come_last_and_by_small_steps() {
    let first_held = quick::SETS
        .iter()
        .position(|set| {
            (set.readings)()
                .iter()
                .any(|(_, condition)| condition.doing == Doing::Held)
        })
        .expect("a held set");
    for set in quick::SETS.iter().skip(first_held) {
        let steps: Vec<f64> = (set.readings)()
            .iter()
            .map(|(_, condition)| {
                assert_eq!(condition.doing, Doing::Held);
                condition.lever.share().0
            })
            .collect();
        assert_eq!(steps, [0.05, 0.1, 0.2, 0.4], "{}", set.id);
    }
}

fn judged(probability: f64, informed: bool, trust: Trust, id: FaultId) -> words::Verdict {
    let evidence = Evidence {
        of: "r1".to_owned(),
        words: "charge low".to_owned(),
        weight: 1.0,
    };
    words::verdict(&Assessment {
        causes: vec![Cause {
            pair: None,
            ids: vec![id],
            paths: Vec::new(),
            title: "cause".to_owned(),
            probability,
            shares: vec![probability],
            action: String::new(),
            split: String::new(),
            evidence: if informed { vec![evidence] } else { Vec::new() },
            would_read: Vec::new(),
        }],
        trust,
        ..Assessment::default()
    })
}

#[test]
fn no_percentage_without_evidence_or_trust() {
    use words::Verdict::{SoFar, TooLittle, Uncertain};
    let sure = Trust::default();
    let shaky = Trust {
        change: 0.4,
        ..Trust::default()
    };
    let doubted = Trust {
        wrong_reading: 0.5,
        ..Trust::default()
    };
    let worn = FaultId::ChargePumpWorn;
    assert_eq!(words::verdict(&Assessment::default()), TooLittle);
    assert_eq!(judged(0.8, false, sure.clone(), worn), TooLittle);
    assert_eq!(judged(0.8, true, shaky, worn), TooLittle);
    assert_eq!(judged(0.8, true, doubted, worn), Uncertain);
    assert_eq!(judged(0.4, true, sure.clone(), worn), Uncertain);
    assert_eq!(
        judged(0.8, true, sure.clone(), FaultId::NotListed),
        Uncertain
    );
    assert_eq!(judged(0.8, true, sure, worn), SoFar);
}

#[test]
fn a_chance_is_told_no_finer_than_it_is_known() {
    let told = |probability, change| {
        let trust = Trust {
            change,
            ..Trust::default()
        };
        words::chance(probability, &trust).replace('\u{202f}', " ")
    };
    assert_eq!(told(0.57, 0.01), "57 %");
    assert_eq!(told(0.57, 0.08), "55 %");
    assert_eq!(told(0.02, 0.08), "<5 %");
    assert_eq!(told(0.99, 0.08), ">95 %");
    assert_eq!(told(0.003, 0.0), "<1 %");
    assert_eq!(told(0.998, 0.0), ">99 %");
}

#[test]
fn values_are_told_in_the_unit_of_the_shop() {
    let (metric, us) = (UnitPrefs::metric(), UnitPrefs::us());
    let plain = |text: String| text.replace('\u{202f}', " ");
    assert_eq!(
        plain(words::value(Port::Charge, 24.13, &metric)),
        "24.1 bar"
    );
    assert_eq!(plain(words::value(Port::Charge, 24.13, &us)), "350 psi");
    // A pull is held as positive below the air; its own unit is one of vacuum.
    assert_eq!(
        plain(words::value(Port::InletPull, 0.2, &metric)),
        "0.20 bar"
    );
    assert_eq!(
        plain(words::value(Port::InletPull, 0.2, &us)),
        "5.9 inHg vacuum"
    );
    assert_eq!(
        plain(words::spread(Port::InletPull, 0.1, &us)),
        "±3.0 inHg vacuum"
    );
    // A spread of temperature has no zero point: 5 K are 9 °F, not 41.
    assert_eq!(
        plain(words::spread(Port::SettledTemperature, 5.0, &us)),
        "±9 °F"
    );
    let (low, high) = words::ends(Port::Charge, 17.5, 23.0, &metric);
    assert_eq!((low.as_str(), plain(high).as_str()), ("17.5", "23.0 bar"));
    assert_eq!(
        plain(words::rough(Port::Charge, 8.56, 10.0, &metric)),
        "about 9 ±10 bar"
    );
}

#[test]
fn heavier_evidence_has_more_marks() {
    let marks: Vec<usize> = [0.05, -0.5, 1.0, -2.0, 4.0]
        .map(|weight| words::weight(weight).0)
        .to_vec();
    assert_eq!(marks, [0, 1, 2, 3, 4]);
    assert_eq!(words::weight(f64::NAN).0, 0);
}

#[test]
fn a_scale_of_bands_begins_and_ends_on_round_figures() {
    let axis = bands::axis(&[(14.2, 18.5), (21.0, 22.4)]).expect("finite");
    assert_eq!(axis.ticks(), [10.0, 15.0, 20.0, 25.0]);
    assert_eq!(axis.decimals(), 0);
    assert!((axis.place(20.0) - 200.0 / 3.0).abs() < 1e-9);
    let small = bands::axis(&[(0.31, 0.42), (0.4, 0.55)]).expect("finite");
    assert_eq!(small.decimals(), 1);
    // Nothing at all under every cause still makes a scale.
    assert!(bands::axis(&[(0.0, 0.0)]).expect("finite").ticks().len() > 1);
    assert!(bands::axis(&[]).is_none());
    assert!(bands::axis(&[(f64::NAN, 1.0)]).is_none());
}

proptest! {
    #[test]
    fn bands_lie_on_their_scale(spans in prop::collection::vec((-800.0..800.0_f64, 0.0..400.0_f64), 1..6)) {
        let spans: Vec<(f64, f64)> = spans.into_iter().map(|(low, width)| (low, low + width)).collect();
        let axis = bands::axis(&spans).expect("finite");
        let ticks = axis.ticks();
        prop_assert!((2..=8).contains(&ticks.len()), "{ticks:?}");
        for (low, high) in spans {
            let (left, width) = axis.band(low, high);
            prop_assert!(left >= 0.0 && width > 0.0 && left + width <= 100.0 + 1e-9);
            // The band covers what it stands for.
            prop_assert!(left <= axis.place(low) + 1e-9 && left + width >= axis.place(high) - 1e-9);
            prop_assert!(ticks[0] <= low + 1e-9 && ticks[ticks.len() - 1] >= high - 1e-9);
        }
    }
}

#[test]
fn minutes_are_whole_and_never_too_few() {
    for (minutes, said) in [
        (0.4, "1"),
        (1.0, "1"),
        (3.2, "4"),
        (40.0, "40"),
        (f64::NAN, "?"),
    ] {
        assert_eq!(
            words::minutes(minutes)
                .chars()
                .take_while(|c| c.is_ascii_digit() || *c == '?')
                .collect::<String>(),
            said
        );
    }
}

fn read(port: Port, condition: Condition, bar: f64) -> Reading {
    let mut reading = reading(&format!("{port:?}"), port, condition);
    reading.seen = Measure::from_base(bar, quantity::Kind::Pressure)
        .ok()
        .map(|value| readings::Seen::Value { value });
    reading
}

#[test]
fn what_was_opened_is_asked_once_however_many_checks_opened_it() {
    let mut visit = Visit::default();
    assert!(put_back::lines(&visit).is_empty());
    // Planned is not opened.
    visit
        .readings
        .push(reading("r1", Port::Charge, Condition::start()));
    assert!(put_back::lines(&visit).is_empty());
    // Neutral and driven are two checks on one port.
    visit.readings = vec![
        read(Port::Charge, Condition::start(), 24.0),
        read(Port::Charge, driven(Direction::Forward), 22.0),
    ];
    let lines = put_back::lines(&visit);
    assert_eq!(lines.len(), 1, "{lines:?}");
    assert_eq!(lines[0].1.len(), 2, "{lines:?}");
    assert_eq!(put_back::open(&visit), 1);

    let line = lines[0].0.to_owned();
    let struck = |why: &str| PutBack::Struck(why.to_owned());
    for (answer, open) in [
        (struck(" "), 1),
        (struck("gauge stays"), 0),
        (PutBack::Done, 0),
    ] {
        visit.put_back.insert(line.clone(), answer);
        assert_eq!(put_back::open(&visit), open);
    }
}

#[test]
fn a_line_to_put_back_names_the_sides_that_were_opened() {
    let both = sides(unit::Paths::TwoSharedCharge);
    let left = read(Port::MotorCase, Condition::start(), 1.0);
    let right = Reading {
        path: Path::Right,
        id: "right".to_owned(),
        ..left.clone()
    };
    let told = |readings: Vec<Reading>, sides| {
        let visit = Visit {
            readings,
            ..Visit::default()
        };
        let lines = put_back::lines(&visit);
        put_back::with_sides(lines[0].1[0], &visit, sides)
    };
    let title = checks::for_reading(&left.condition, left.port).map_or("", |check| check.title);
    assert_eq!(told(vec![right.clone()], both), format!("{title}, right"));
    assert_eq!(
        told(vec![left.clone(), right], both),
        format!("{title}, left and right")
    );
    assert_eq!(told(vec![left], sides(unit::Paths::One)), title);
}

#[test]
fn a_reading_taken_again_or_out_of_reach_opened_what_it_opened() {
    let mut taken = reading("r1", Port::Charge, Condition::start());
    taken.seen = Some(readings::Seen::NotPossible {
        why: "no port".to_owned(),
    });
    let mut visit = Visit {
        readings: vec![taken],
        ..Visit::default()
    };
    assert!(
        put_back::lines(&visit).is_empty(),
        "nothing could be opened"
    );
    let before = Earlier {
        seen: read(Port::Charge, Condition::start(), 24.0).seen,
        ..Earlier::default()
    };
    visit.earlier.insert("r1".to_owned(), vec![before]);
    assert_eq!(put_back::open(&visit), 1);
}

#[test]
fn an_answer_tells_of_a_check_only_where_nothing_else_could_have_given_it() {
    let with = |id: &str, answer: Answer| Visit {
        observations: [(id.to_owned(), answer)].into(),
        ..Visit::default()
    };
    assert_eq!(put_back::open(&with("metal", Answer::NotSeen)), 1);
    assert_eq!(put_back::open(&with("metal", Answer::OperatorSays)), 0);
    for check in checks::all().filter(|check| check.yields.is_empty()) {
        for id in check.answers {
            let asked_by = checks::all().filter(|other| other.answers.contains(id));
            if asked_by.count() > 1 {
                assert_eq!(put_back::open(&with(id, Answer::Seen)), 0, "{id}");
            }
        }
    }
    // Marked as made, it counts whatever was found.
    let visit = Visit {
        made: vec!["pull-the-shuttle".to_owned()],
        ..Visit::default()
    };
    assert_eq!(put_back::open(&visit), 1);
}
