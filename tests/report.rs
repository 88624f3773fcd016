//! The hand-over report: what must stand in it, that it can be made again, and that its table is read by others.
#![cfg(not(target_arch = "wasm32"))]

mod record_support;

use lowside::assessment::Assessment;
use lowside::call::put_back;
use lowside::quantity::{DecimalMark, Measure, Typed, Unit as QuantityUnit, UnitPrefs};
use lowside::ranking::Session;
use lowside::readings::instrument::{Instrument, usual_instruments};
use lowside::readings::{JugCatch, Port, Reading, Seen};
use lowside::record::{Closing, Export, PutBack, Visit};
use lowside::report::{Report, Sheet, Subject, Sure, csv, record_sum};
use lowside::unit::Unit;
use proptest::prelude::*;
use record_support::Dice;

const NOW: &str = "2025-03-18T17:00:00Z";

struct Case {
    unit: Unit,
    visit: Visit,
    instruments: Vec<Instrument>,
    assessment: Assessment,
    prefs: UnitPrefs,
}

impl Case {
    fn subject(&self) -> Subject<'_> {
        Subject {
            unit: &self.unit,
            visit: &self.visit,
            instruments: &self.instruments,
            assessment: &self.assessment,
            prefs: &self.prefs,
            made_at: NOW,
        }
    }

    fn report(&self) -> Report {
        Report::of(&self.subject())
    }
}

/// As the app's worker and the office command do it.
fn assessed(unit: &Unit, visit: &Visit, instruments: &[Instrument]) -> Assessment {
    let mut session = Session::default();
    let mut assessment = session.assess(unit, visit, instruments);
    let advice = lowside::next::advise(unit, visit, instruments, &assessment, session.heavy());
    assessment.advice = Some(advice);
    assessment
}

fn demo(place: usize) -> Case {
    let export = Export::read(lowside::demo::TAMARISK.as_bytes()).expect("the demo");
    let visit = export.visits[place].clone();
    let unit = export.units.iter().find(|unit| unit.id == visit.unit);
    let unit = unit.expect("its unit").clone();
    let assessment = assessed(&unit, &visit, &export.instruments);
    Case {
        unit,
        visit,
        instruments: export.instruments,
        assessment,
        prefs: UnitPrefs::metric(),
    }
}

/// A random record with an empty assessment: everything that can be written down must be told without one.
fn random(seed: u64) -> Case {
    let mut dice = Dice(seed);
    let unit = dice.unit();
    let instruments = usual_instruments();
    let visit = dice.visit(&unit.id, &instruments);
    Case {
        unit,
        visit,
        instruments,
        assessment: Assessment::default(),
        prefs: if seed.is_multiple_of(2) {
            UnitPrefs::metric()
        } else {
            UnitPrefs::us()
        },
    }
}

#[test]
fn every_reading_stands_with_window_source_and_instrument() {
    let case = demo(1);
    let report = case.report();
    let rows: Vec<_> = report.groups.iter().flat_map(|group| &group.rows).collect();
    assert_eq!(rows.len(), case.visit.readings.len());
    let text = report.text();
    for words in [
        "2. Charge pressure: 17.5\u{202f}bar. LOW, expected 20.9 to 24.8\u{202f}bar, computed from these inputs. Gauge 0 to 60",
        "expected 22.0 to 26.0\u{202f}bar, from the unit's manual",
        "- Charge pump worn: >99",
        "The operator says: Weak or slow in both directions",
        "Machine: T-27, Roller",
        "The unit's own manual, local rules and licensed practice come first.",
    ] {
        assert!(text.contains(words), "{words:?} is not in\n{text}");
    }
    assert!(report.groups.iter().all(|group| !group.oil.is_empty()));
}

#[test]
fn a_jug_is_told_with_its_litres_and_seconds_as_long_as_its_figure_stands() {
    let mut case = demo(1);
    let reading = &mut case.visit.readings[0];
    reading.port = Port::MotorDrain;
    let jug = JugCatch {
        volume: Typed::shown(2.0, QuantityUnit::Litre, 1),
        time: Typed::shown(31.0, QuantityUnit::Second, 0),
    };
    let flow = jug.flow().expect("a flow").value;
    reading.seen = Some(Seen::Value { value: flow });
    case.visit.caught.insert(reading.id.clone(), jug);
    case.assessment = assessed(&case.unit, &case.visit, &case.instruments);
    let row = |case: &Case| case.report().groups[0].rows[0].clone();
    let told = row(&case).instrument;
    assert!(
        told.starts_with("jug and watch: 2") && told.contains("in 31"),
        "{told}"
    );
    // The spread that the ranking takes is that of this jug: marks, level and watch of 2 L in 31 s, 3.2 % of 3.87 L/min.
    let spread = case.assessment.windows[0].instrument;
    assert!((spread - 0.1221).abs() < 0.0005, "{spread}");

    let other = Measure::new(5.0, QuantityUnit::LitrePerMinute).expect("a flow");
    case.visit.readings[0].seen = Some(Seen::Value { value: other });
    let told = row(&case).instrument;
    assert!(!told.contains("jug and watch"), "{told}");
}

#[test]
fn readings_of_one_condition_stand_together_and_keep_their_numbers() {
    let report = demo(0).report();
    let numbers: Vec<Vec<usize>> = report
        .groups
        .iter()
        .map(|group| group.rows.iter().map(|row| row.number).collect())
        .collect();
    assert_eq!(
        numbers,
        [vec![1], vec![2], vec![3, 5], vec![4], vec![6], vec![7]]
    );
    // A reason names the reading by the number that it has in the table.
    let lead = &report.causes[0];
    assert!(
        lead.reasons_for
            .iter()
            .any(|why| why.starts_with("no. 4, loop side A")),
        "{lead:?}"
    );
}

#[test]
fn the_exported_call_gives_the_same_report_again() {
    for place in 0..3 {
        let mut case = demo(place);
        case.prefs = UnitPrefs::us();
        case.prefs.choose_mark(DecimalMark::Comma);
        let file = case.subject().export().text().expect("a text");
        let back = Export::read(file.as_bytes()).expect("it reads back");
        let settings = back.settings.clone().expect("the units of measure");
        let (unit, visit) = (back.units[0].clone(), back.visits[0].clone());
        let again = Case {
            assessment: assessed(&unit, &visit, &back.instruments),
            unit,
            visit,
            instruments: back.instruments.clone(),
            prefs: settings.units,
        };
        assert_eq!(back.made_at, NOW);
        assert_eq!(again.report().text(), case.report().text());
        assert!(case.report().text().contains(&record_sum(&again.subject())));
    }
}

#[test]
fn another_figure_is_another_record() {
    let mut case = demo(0);
    let before = record_sum(&case.subject());
    case.visit.readings[0].note.push('x');
    assert_ne!(record_sum(&case.subject()), before);
    let before = record_sum(&case.subject());
    case.prefs = UnitPrefs::us();
    assert_ne!(record_sum(&case.subject()), before);
}

#[test]
fn units_of_measure_are_the_persons() {
    let mut case = demo(1);
    case.prefs = UnitPrefs::us();
    let text = case.report().text();
    assert!(text.contains("psi") && text.contains("°F"), "{text}");
    assert!(
        !text.contains("\u{202f}bar") && !text.contains("\u{202f}L/min"),
        "{text}"
    );
}

#[test]
fn the_finding_says_no_more_than_was_proved() {
    let mut case = demo(1);
    assert_eq!(case.report().finding.sure, Sure::Leads);
    let mut closing = Closing {
        cause: "charge-pump-worn".into(),
        when: "2025-03-11T16:00:00Z".into(),
        ..Closing::default()
    };
    case.visit.closed = Some(closing.clone());
    let report = case.report();
    assert_eq!(report.finding.sure, Sure::NotProved);
    assert!(report.finding.words.contains("not proved"));
    assert!(
        report
            .text()
            .contains("Nothing is written down that proves it.")
    );
    closing.is_proved = true;
    closing.proof = "Return flow low at both speeds, pull good".into();
    closing.done = "Charge pump changed".into();
    closing.parts = "Charge pump 15 cm³, joint".into();
    case.visit.closed = Some(closing);
    let report = case.report();
    assert_eq!(report.finding.sure, Sure::Proved);
    let done = &report.section("done").expect("what was done").lines;
    assert_eq!(done.len(), 3);
    assert!(done[1].starts_with("Proved by: Return flow"));
    case.visit.closed = Some(Closing::default());
    assert_eq!(case.report().finding.sure, Sure::NoCause);
    // Closed: nothing is proposed any more.
    assert!(case.report().section("bring").is_none());
    case.visit.bring = "Seal kit\n\n  two filters ".into();
    let report = case.report();
    assert_eq!(
        report.section("bring").expect("typed").lines,
        ["Seal kit", "two filters"]
    );
}

#[test]
fn too_little_gives_no_cause() {
    let mut case = demo(1);
    case.visit.readings.clear();
    case.visit.observations.clear();
    case.assessment = assessed(&case.unit, &case.visit, &case.instruments);
    let report = case.report();
    assert_eq!(report.finding.sure, Sure::TooLittle);
    assert!(report.causes.is_empty());
    let open = report.section("not-checked").expect("it says so");
    assert!(
        open.lines.contains(&"No reading was taken".to_owned()),
        "{open:?}"
    );
}

#[test]
fn what_was_not_taken_is_told() {
    let mut case = demo(1);
    case.visit.readings[0].seen = None;
    case.visit.readings[0].typed = "24x".into();
    case.visit.readings[1].seen = Some(Seen::NotPossible {
        why: "port seized".into(),
    });
    case.visit.readings[2].condition.oil = None;
    case.visit.riggings.clear();
    let report = case.report();
    let open = report
        .section("not-checked")
        .expect("it says so")
        .lines
        .join("\n");
    for words in [
        "No. 1, charge pressure: not readable as a figure: 24x",
        "No. 2, charge pressure: not possible: port seized",
        "Oil temperature: not taken with 1 of 4 readings",
        "Instrument: not named with all 4 readings",
    ] {
        assert!(open.contains(words), "{words:?} is not in\n{open}");
    }
}

#[test]
fn an_open_put_back_list_comes_first_among_the_cautions() {
    let mut case = demo(1);
    let lines = put_back::lines(&case.visit).len();
    assert!(lines >= 3);
    let report = case.report();
    assert_eq!(
        report.cautions[0],
        format!(
            "Not to be put to work: {lines} of {lines} lines of the put-back list are not answered for."
        )
    );
    let of = report.section("put-back").expect("the list");
    assert!(
        of.lines
            .iter()
            .all(|line| line.contains("NOT ANSWERED FOR"))
    );
    for (line, _) in put_back::lines(&case.visit) {
        case.visit.put_back.insert(line.to_owned(), PutBack::Done);
    }
    case.visit.put_back.insert(
        put_back::lines(&case.visit)[0].0.to_owned(),
        PutBack::Struck("never opened".into()),
    );
    let report = case.report();
    assert!(!report.cautions[0].starts_with("Not to be put to work"));
    let text = report.text();
    assert!(text.contains("seen to be so") && text.contains("does not apply, never opened"));
    assert!(!text.contains("NOT ANSWERED FOR"));
}

#[test]
fn a_machine_that_runs_on_says_stop() {
    let mut case = demo(1);
    case.visit
        .observations
        .insert("runs-on".into(), lowside::record::Answer::OperatorSays);
    let text = case.report().text();
    assert!(
        text.contains("Keeps moving with the lever in neutral: do not test."),
        "{text}"
    );
}

/// A table as a reader from outside takes it.
fn table(case: &Case) -> (Vec<String>, Vec<Vec<String>>) {
    let sheet = Sheet {
        unit: &case.unit,
        visit: &case.visit,
        assessment: &case.assessment,
    };
    let text = csv(&[sheet], &case.instruments, &case.prefs);
    assert!(text.ends_with("\r\n"));
    let mut reader = ::csv::ReaderBuilder::new()
        .flexible(false)
        .from_reader(text.as_bytes());
    let header = reader.headers().expect("a header");
    let header = header.iter().map(str::to_owned).collect();
    let rows = reader.records().map(|row| {
        let row = row.expect("as many cells as the header has");
        row.iter().map(str::to_owned).collect()
    });
    (header, rows.collect())
}

#[test]
fn the_table_has_the_units_in_its_header_and_the_figures_under_them() {
    let case = demo(1);
    let (header, rows) = table(&case);
    let at = |name: &str| {
        header
            .iter()
            .position(|h| h == name)
            .unwrap_or_else(|| panic!("{name}"))
    };
    assert_eq!(rows.len(), 6);
    assert_eq!(rows[1][at("Read (bar)")], "17.5");
    assert_eq!(rows[1][at("Read (L/min)")], "");
    assert_eq!(rows[3][at("Read (L/min)")], "20.2");
    assert_eq!(rows[0][at("Expected from (bar)")], "22");
    assert_eq!(rows[1][at("Standing")], "low");
    assert_eq!(rows[1][at("Oil (°C)")], "62");
    assert_eq!(rows[3][at("Typed")], "20,2 L/min");
}

#[test]
fn a_pull_is_told_as_vacuum_where_the_unit_is_one() {
    let mut case = demo(1);
    case.prefs = UnitPrefs::us();
    let (header, rows) = table(&case);
    let at = header
        .iter()
        .position(|h| h == "Read (inHg vac)" || h.starts_with("Read (inHg"));
    let at = at.unwrap_or_else(|| panic!("{header:?}"));
    let pull: f64 = rows[5][at].parse().expect("a figure");
    // 0.08 bar below the air; 1 inHg is 0.0338639 bar.
    assert!((pull - 0.08 / 0.033_863_9).abs() < 0.01, "{pull}");
}

fn taken(reading: &Reading) -> bool {
    matches!(reading.seen, Some(Seen::Value { .. } | Seen::Swing { .. }))
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(300))]

    #[test]
    fn any_record_gives_a_report_and_a_table(seed: u64) {
        let case = random(seed);
        let text = case.report().text();
        prop_assert!(!text.contains("NaN") && !text.contains("inf "), "{}", text);
        prop_assert!(text.lines().all(|line| !line.chars().any(char::is_control)));
        for (at, _) in case.visit.readings.iter().enumerate() {
            let line = format!("\n{}. ", at + 1);
            prop_assert!(text.contains(&line), "reading {} is not told", at + 1);
        }
        if case.visit.readings.is_empty() {
            return Ok(());
        }
        let (header, rows) = table(&case);
        prop_assert_eq!(rows.len(), case.visit.readings.len());
        let mut once: Vec<&String> = header.iter().collect();
        once.sort();
        once.dedup();
        prop_assert_eq!(once.len(), header.len(), "{:?}", header);
        for (row, reading) in rows.iter().zip(&case.visit.readings) {
            for (name, cell) in header.iter().zip(row) {
                let is_number = cell.parse::<f64>().is_ok_and(f64::is_finite);
                prop_assert!(is_number || !cell.trim_start().starts_with(['=', '+', '-', '@']), "{}: {}", name, cell);
                if name.starts_with("Read (") && !cell.is_empty() {
                    prop_assert!(is_number, "{}: {}", name, cell);
                }
            }
            let read = header.iter().zip(row).filter(|(name, cell)| name.starts_with("Read (") && !cell.is_empty());
            prop_assert_eq!(read.count(), usize::from(taken(reading) || matches!(reading.seen, Some(Seen::OffScale { .. } | Seen::Nothing))));
        }
    }
}

#[test]
fn what_looks_like_a_formula_is_text() {
    let mut case = demo(1);
    case.unit.name = "=1+2".into();
    case.visit.readings[0].note = "@SUM(A1), \"quoted\"\nsecond line".into();
    case.visit.readings[0].typed = "  +5".into();
    let (header, rows) = table(&case);
    assert_eq!(rows[0][0], "'=1+2");
    let note = header.iter().position(|h| h == "Note").expect("a note");
    assert_eq!(rows[0][note], "'@SUM(A1), \"quoted\" / second line");
    let typed = header.iter().position(|h| h == "Typed").expect("typed");
    assert_eq!(rows[0][typed], "'+5");
}

mod bench {
    use super::*;
    use lowside::bench::stand::acceptance::{Acceptance, Limited};
    use lowside::bench::stand::items::ItemId;
    use lowside::bench::stand::sheet::{Head, ItemEntry, Meter as Instrument, Of, TextId};
    use lowside::bench::stand::{BenchSheet, Channel, Charge, Layout, Meter, Row, report};
    use lowside::quantity::{Measure, Typed, Unit as In};

    fn typed(value: f64, unit: In) -> Typed {
        Typed {
            typed: format!("{value}"),
            value: Some(Measure::literal(value, unit)),
        }
    }

    /// A pump of 75 cm³/rev at three speeds and four pressures; a leak of 0.0068 L/min per bar of each side.
    fn sheet() -> BenchSheet {
        let mut rows = Vec::new();
        for n in [900.0_f64, 1500.0, 2200.0] {
            for dp in [60.0_f64, 140.0, 220.0, 300.0] {
                let at = rows.len() + 1;
                let flow = 0.075 * n * (1.0 - 9e-5 * dp) - 0.011 * dp;
                let torque = 7.5 * dp / std::f64::consts::TAU + 3.0 + 0.03 * dp + 0.004 * n;
                let id = format!("row-{at}");
                let row = Row::of(
                    &at.to_string(),
                    &[
                        (Channel::Speed, n),
                        (Channel::Low, 20.0),
                        (Channel::High, 20.0 + dp),
                        (Channel::Flow, flow),
                        (Channel::Case, 0.0068 * (dp + 40.0)),
                        (Channel::Torque, torque),
                        (Channel::Inlet, 50.0),
                    ],
                );
                rows.push(Row { id, ..row });
            }
        }
        let head = [
            (Head::Displacement, 75.0, In::CubicCentimetrePerRevolution),
            (Head::Viscosity, 46.0, In::SquareMillimetrePerSecond),
            (Head::RatedSpeed, 2200.0, In::RevolutionPerMinute),
            (Head::RatedPressure, 220.0, In::Bar),
        ];
        let leak = |id: &str, point: &str, limit: f64| Acceptance {
            id: id.to_owned(),
            of: Limited::CaseLeakage,
            point: point.to_owned(),
            limit: typed(limit, In::LitrePerMinute),
            source: "manual, page 31".to_owned(),
            ..Acceptance::default()
        };
        BenchSheet {
            layout: Layout {
                charge: Some(Charge::None),
                meter: Some(Meter::High),
                ..Layout::default()
            },
            head: head
                .into_iter()
                .map(|(head, value, unit)| (head, typed(value, unit)))
                .collect(),
            rows,
            texts: [(TextId::Serial, "A 7731\t0".to_owned())].into(),
            meters: [(
                Channel::Flow,
                Instrument {
                    of: Of::Reading,
                    limit: typed(0.5, In::Percent),
                    mark: "FM-3".to_owned(),
                    calibrated: "2025-02-11".to_owned(),
                    ..Instrument::default()
                },
            )]
            .into(),
            items: [
                (
                    ItemId::ResponseOut,
                    ItemEntry {
                        found: typed(3.5, In::Second),
                        ..ItemEntry::default()
                    },
                ),
                (
                    ItemId::Debris,
                    ItemEntry {
                        skipped: Some("no patch at hand".to_owned()),
                        ..ItemEntry::default()
                    },
                ),
            ]
            .into(),
            acceptance: vec![leak("l-1", "11", 3.0), leak("l-2", "12", 1.5)],
            ..BenchSheet::default()
        }
    }

    fn case() -> Case {
        let mut case = random(4);
        case.visit = Visit {
            bench: Some(sheet()),
            readings: case.visit.readings.clone(),
            id: case.visit.id.clone(),
            unit: case.unit.id.clone(),
            opened: NOW.to_owned(),
            ..Visit::default()
        };
        case
    }

    #[test]
    fn a_bench_sheet_has_its_section_with_verdict_figures_and_what_was_not_tested() {
        let case = case();
        let report = case.report();
        let section = report.section("bench").expect("a bench sheet");
        let all = section.lines.join("\n");
        for words in [
            "Pump; serial number: A 7731 0",
            "Verdict: fails. Guard band of the expanded uncertainty",
            "Fails: Case leakage at point 12: 2.31",
            "allowed 1.5",
            "(manual, page 31)",
            "Fails: Time to full stroke",
            "Pass: Case leakage at point 11: 1.768",
            "common practice, rebuilt unit",
            "Derived displacement (after ISO 8426): 7",
            "Point 11, 2200 rpm, 220",
            "Losses of flow, at 27.5 mPa·s: displacement",
            "laminar slip",
            "Not tested: ",
            "(no patch at hand)",
            "Instrument, flow: ± 0.5 % of the reading, FM-3, calibrated 2025-02-11",
            "No calibration date is noted for: speed, ",
            "Stand: measuring class B",
        ] {
            assert!(all.contains(words), "{words:?} is not in\n{all}");
        }
        let text = report.text();
        assert!(text.contains("BENCH SHEET\n") && text.contains(&section.lines[1]));
        assert!(!text.contains("NaN"), "{text}");
        let mut once = section.lines.clone();
        once.sort();
        once.dedup();
        assert_eq!(once.len(), section.lines.len());
        // Made again from the call's own export: the same words.
        let export = case.subject().export();
        let again = Export::read(export.text().expect("written").as_bytes()).expect("read");
        let again = Subject {
            unit: &again.units[0],
            visit: &again.visits[0],
            instruments: &again.instruments,
            assessment: &case.assessment,
            prefs: &case.prefs,
            made_at: NOW,
        };
        assert_eq!(Report::of(&again).section("bench"), Some(section));
    }

    #[test]
    fn a_call_without_a_sheet_has_no_section_and_many_points_are_told_by_their_ends() {
        let mut case = case();
        let bench = case.visit.bench.take();
        assert!(case.report().section("bench").is_none());
        case.visit.bench = Some(BenchSheet::default());
        assert!(case.report().section("bench").is_none());
        let mut many = bench.expect("given");
        let (rows, again) = (many.rows.clone(), many.rows.clone());
        many.rows.extend(again.into_iter().map(|row| Row {
            name: format!("again {}", row.name),
            ..row
        }));
        case.visit.bench = Some(many);
        let section = case.report().section("bench").cloned().expect("a sheet");
        let all = section.lines.join("\n");
        assert!(
            all.contains(&format!("over {} points", 2 * rows.len())),
            "{all}"
        );
        assert!(
            !section.lines.iter().any(|line| line.starts_with("Point ")),
            "{all}"
        );
    }

    #[test]
    fn the_table_holds_what_was_read_and_computed_at_the_points() {
        let case = case();
        let bench = sheet();
        let found = report(&bench, Some(&case.unit));
        let (header, rows) = table(&case);
        let at = |name: &str| header.iter().position(|h| h == name).expect("a column");
        let of_bench = |row: &&Vec<String>| row[at("Doing")] == "on the bench stand";
        let computed: usize = found.evaluated.points.iter().map(|p| p.len()).sum();
        let points: Vec<&Vec<String>> = rows.iter().filter(of_bench).collect();
        assert_eq!(points.len(), 12 * 7 + computed);
        assert_eq!(rows.len(), points.len() + case.visit.readings.len());
        let row = |name: &str| {
            let row = points.iter().find(|row| row[at("Reading")] == name);
            *row.unwrap_or_else(|| panic!("{name}"))
        };
        let flow = row("Bench, point 1: flow");
        assert_eq!(flow[at("Read (L/min)")], "66.4755");
        assert_eq!(
            flow[at("Instrument")],
            "± 0.5 % of the reading, FM-3, calibrated 2025-02-11"
        );
        assert_eq!(flow[at("Seen as")], "read once");
        let leak = row("Bench, point 12: case leakage");
        assert_eq!(leak[at("Read (L/min)")], "2.312");
        assert_eq!(leak[at("Expected to (L/min)")], "1.5");
        assert_eq!(leak[at("Expected from (L/min)")], "");
        assert_eq!(leak[at("Standing")], "fail");
        assert_eq!(leak[at("Window from")], "manual, page 31");
        assert!(leak[at("Note")].contains("± 0.0"), "{leak:?}");
        let share = row("Bench, point 1: overall efficiency");
        let percent: f64 = share[at("Read (%)")].parse().expect("a figure");
        assert!((50.0..100.0).contains(&percent), "{percent}");
    }
}
