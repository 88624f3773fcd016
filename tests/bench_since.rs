//! A motor's drain on the machine against what the bench measured: made with the circuit's own machine, whose leak is known.
#![cfg(not(target_arch = "wasm32"))]

use lowside::assessment::SinceBench;
use lowside::bench::since::since;
use lowside::call::words;
use lowside::circuit::{Network, Param};
use lowside::machine::{apply, base, builds, layout_for};
use lowside::quantity::{DecimalMark, Kind, Measure, UnitPrefs};
use lowside::ranking::assess;
use lowside::readings::{
    Condition, Doing, EngineSpeed, Lever, OilTemperature, Path, Place, Port, Reading, Seen,
};
use lowside::record::{Book, Export, Visit};
use lowside::unit::{Figure, FigureId, MachineClass, OnBench, Source, Tick, Unit};

const LEAKAGE: f64 = 1.4;

fn measured(value: f64, kind: Kind) -> Measure {
    Measure::from_base(value, kind).expect("finite")
}

/// A unit whose motor leaks 1.4 L/min at 200 bar and 27.5 mPa·s, as a bench measured it with 6 % of doubt.
fn unit() -> Unit {
    let mut unit = Unit {
        id: "u".into(),
        name: "T-14".into(),
        class: MachineClass::Roller,
        ..Unit::default()
    };
    unit.ticks.flushing = Tick::Yes;
    for (id, value, kind, source) in [
        (
            FigureId::PumpDisplacement,
            75.0,
            Kind::Displacement,
            Source::Plate,
        ),
        (
            FigureId::MotorDisplacement,
            75.0,
            Kind::Displacement,
            Source::Plate,
        ),
        (
            FigureId::HighIdle,
            2400.0,
            Kind::RotationalSpeed,
            Source::Manual,
        ),
        (
            FigureId::ChargeSetting,
            22.0,
            Kind::Pressure,
            Source::Manual,
        ),
        (
            FigureId::OilGrade,
            46.0,
            Kind::KinematicViscosity,
            Source::Plate,
        ),
        (
            FigureId::MotorCaseLeakage,
            LEAKAGE,
            Kind::Flow,
            Source::Measured,
        ),
    ] {
        let value = Some(measured(value, kind));
        let figure = Figure {
            value,
            typed: String::new(),
            source,
        };
        unit.figures.insert(id, figure);
    }
    unit.bench.insert(
        FigureId::MotorCaseLeakage,
        OnBench {
            on: "2025-03-04T07:40:00Z".into(),
            value: measured(LEAKAGE, Kind::Flow),
            share: 0.06,
            path: None,
        },
    );
    unit
}

fn condition(doing: Doing, celsius: f64, blocked: bool) -> Condition {
    Condition {
        doing,
        lever: Lever::Share(0.3),
        engine: EngineSpeed::HighIdle,
        oil: Some(OilTemperature {
            value: measured(celsius, Kind::Temperature),
            place: Place::DrainHose,
        }),
        flushing_blocked: blocked,
        ..Condition::start()
    }
}

fn reading(id: &str, port: Port, condition: Condition, value: f64) -> Reading {
    Reading {
        id: id.into(),
        port,
        path: Path::Left,
        condition,
        seen: Some(Seen::Value {
            value: measured(value, port.kind()),
        }),
        typed: format!("{value}"),
        rigging: String::new(),
        note: String::new(),
    }
}

/// What a machine whose motor leaks so many times what the bench found shows in a condition.
fn shown(unit: &Unit, times: f64, condition: &Condition, ports: &[Port]) -> Vec<Reading> {
    let build = builds(unit).into_iter().next().expect("a build");
    let net = Network::new(layout_for(&build, condition));
    let mut theta = apply(&build, &base(&build), condition);
    theta[Param::MotorLeak as usize] *= times;
    let solution = net.solve(&theta, None).expect("a state");
    ports
        .iter()
        .map(|port| {
            let value = net.reading_on(Path::Left, *port, &solution, &theta);
            reading(&format!("{port:?}"), *port, *condition, value)
        })
        .collect()
}

fn visit(readings: Vec<Reading>) -> Visit {
    Visit {
        id: "v".into(),
        unit: "u".into(),
        readings,
        ..Visit::default()
    }
}

fn told(unit: &Unit, visit: &Visit) -> Option<SinceBench> {
    let drain = visit.readings.iter().find(|r| r.port == Port::MotorDrain);
    since(unit, visit, drain.expect("a drain"), &[])
}

fn times(since: Option<SinceBench>) -> (f64, f64, f64) {
    match since {
        Some(SinceBench::Times {
            ratio, low, high, ..
        }) => (low, ratio, high),
        other => panic!("{other:?}"),
    }
}

/// The circuit leaks as the bench told it; at whatever oil, the machine's drain in neutral comes back to what it is. A flushing
/// shuttle in the middle lets a little past, which the interval holds.
#[test]
fn a_drain_in_neutral_comes_back_to_the_bench_at_any_oil() {
    for (flushing, within) in [(Tick::No, 0.03), (Tick::Yes, 0.2)] {
        let mut unit = unit();
        unit.ticks.flushing = flushing;
        for factor in [1.0, 1.6, 4.0] {
            for celsius in [45.0, 60.0, 75.0] {
                let condition = condition(Doing::Neutral, celsius, false);
                let ports = [Port::MotorDrain, Port::Charge, Port::MotorCase];
                let visit = visit(shown(&unit, factor, &condition, &ports));
                let (low, ratio, high) = times(told(&unit, &visit));
                let off = (ratio / factor - 1.0).abs();
                assert!(off < within, "{factor} at {celsius} °C: {ratio}");
                assert!(
                    low < factor && factor < high && high / low < 2.5,
                    "{low} to {high}"
                );
                // Without the pressures beside it the profile's charge stands in, and the interval is wider.
                let alone = Visit {
                    readings: visit.readings[..1].to_vec(),
                    ..visit.clone()
                };
                let (wide_low, _, wide_high) = times(told(&unit, &alone));
                assert!(wide_high / wide_low > high / low);
                assert!(
                    wide_low < factor && factor < wide_high,
                    "{wide_low} to {wide_high}"
                );
            }
        }
    }
}

/// Under load it takes both loop pressures and no flushing oil; the same motor then says the same.
#[test]
fn under_load_it_takes_both_loop_pressures_and_no_flushing_oil() {
    let unit = unit();
    let ports = [Port::MotorDrain, Port::LoopA, Port::LoopB, Port::MotorCase];
    let blocked = condition(Doing::Loaded, 60.0, true);
    let mut no_flushing = unit.clone();
    no_flushing.ticks.flushing = Tick::No;
    let whole = visit(shown(&no_flushing, 1.6, &blocked, &ports));
    let (low, ratio, high) = times(told(&unit, &whole));
    assert!((ratio / 1.6 - 1.0).abs() < 0.05, "{low} {ratio} {high}");
    let cannot = |visit: &Visit, part: &str| match told(&unit, visit) {
        Some(SinceBench::Cannot { why }) => assert!(why.contains(part), "{why}"),
        other => panic!("{other:?}"),
    };
    let bare = Visit {
        readings: whole.readings[..1].to_vec(),
        ..whole.clone()
    };
    cannot(&bare, "both loop pressures");
    let open = condition(Doing::Loaded, 60.0, false);
    cannot(&visit(shown(&unit, 1.6, &open, &ports)), "flushing oil");
    let cold = condition(Doing::Neutral, 20.0, false);
    cannot(&visit(shown(&unit, 1.6, &cold, &ports)), "not comparable");
    let mut untaken = visit(shown(
        &unit,
        1.6,
        &condition(Doing::Neutral, 60.0, false),
        &ports,
    ));
    untaken.readings[0].condition.oil = None;
    cannot(&untaken, "no oil temperature");
}

#[test]
fn nothing_is_said_where_no_bench_measured_it() {
    let condition = condition(Doing::Neutral, 60.0, false);
    let ports = [Port::MotorDrain, Port::Charge];
    let visit = visit(shown(&unit(), 1.6, &condition, &ports));
    let mut practice = unit();
    let figure = practice.figures.get_mut(&FigureId::MotorCaseLeakage);
    figure.expect("given").source = Source::Practice;
    assert_eq!(told(&practice, &visit), None);
    // Typed over since: it is held against what stands there, without the bench's day and with the usual width.
    let mut typed_over = unit();
    let figure = typed_over.figures.get_mut(&FigureId::MotorCaseLeakage);
    figure.expect("given").value = Some(measured(2.8, Kind::Flow));
    let Some(SinceBench::Times {
        ratio,
        low,
        high,
        on,
    }) = told(&typed_over, &visit)
    else {
        panic!("comparable");
    };
    assert!((ratio / 0.8 - 1.0).abs() < 0.04 && on.is_empty());
    let (own_low, _, own_high) = times(told(&unit(), &visit));
    assert!(high / low > own_high / own_low);
    // Of the other side's motor it says nothing.
    let mut right = unit();
    right.ticks.paths = lowside::unit::Paths::TwoOwnCharge;
    if let Some(bench) = right.bench.get_mut(&FigureId::MotorCaseLeakage) {
        bench.path = Some(Path::Right);
    }
    assert_eq!(told(&right, &visit), None);
    let charge = visit.readings.iter().find(|r| r.port == Port::Charge);
    assert_eq!(since(&unit(), &visit, charge.expect("read"), &[]), None);
}

/// It stands with the reading's window, in the notes where it is sure, and it goes through a file with its day.
#[test]
fn it_stands_beside_the_reading_and_in_the_notes() {
    let unit = unit();
    let condition = condition(Doing::Neutral, 60.0, false);
    let ports = [Port::MotorDrain, Port::Charge];
    let mut visit = visit(shown(&unit, 3.0, &condition, &ports));
    visit.opened = "2025-06-01T08:00:00Z".into();
    let mut book = Book::default();
    book.put_unit(unit.clone());
    book.put_visit(visit.clone());
    let file = Export::of_visit(&book, "v", "2025-06-01T09:00:00Z").expect("a call");
    let back = Export::read(file.text().expect("written").as_bytes()).expect("read");
    assert_eq!(back.units[0].bench, unit.bench);
    let assessment = assess(&back.units[0], &back.visits[0], &[]);
    let window = &assessment.windows[0];
    let since = window.since_bench.as_ref().expect("held against the bench");
    let prefs = UnitPrefs::metric();
    let words = words::since_bench(since, &prefs);
    assert!(
        words.contains("times what the bench measured on 4 Mar 2025"),
        "{words}"
    );
    let mark = if prefs.mark() == DecimalMark::Comma {
        ','
    } else {
        '.'
    };
    assert!(
        words.starts_with(['2', '3']) && words.contains(mark),
        "{words}"
    );
    assert!(
        assessment
            .notes
            .iter()
            .any(|note| note.contains("more into its case than the bench")),
        "{:?}",
        assessment.notes
    );
    let report = lowside::report::Report::of(&lowside::report::Subject {
        unit: &back.units[0],
        visit: &back.visits[0],
        instruments: &[],
        assessment: &assessment,
        prefs: &prefs,
        made_at: "2025-06-01T09:00:00Z",
    });
    assert!(report.text().contains(&words[1..]), "{}", report.text());
    // A drain that is as it was makes no note.
    let sound = Visit {
        readings: shown(&unit, 1.0, &condition, &ports),
        ..visit
    };
    let assessment = assess(&unit, &sound, &[]);
    assert!(assessment.windows[0].since_bench.is_some());
    assert!(
        !assessment
            .notes
            .iter()
            .any(|note| note.contains("than the bench"))
    );
}
