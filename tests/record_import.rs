//! Files in and out: nothing that is not understood gets in, nothing that is there is lost, and any bytes give an answer.
#![cfg(not(target_arch = "wasm32"))]

mod record_support;

use lowside::record::{
    Book, Export, Fate, ImportPlan, Problem, RecordError, SCHEMA, Settings, Visit, limits,
};
use lowside::unit::Unit;
use proptest::prelude::*;
use record_support::Dice;
use serde_json::{Value, json};

const NOW: &str = "2025-03-18T17:00:00Z";

fn read(value: &Value) -> Result<Export, RecordError> {
    Export::read(value.to_string().as_bytes())
}

fn file() -> Value {
    serde_json::from_str(lowside::demo::TAMARISK).expect("the demo is JSON")
}

/// The demo with one field set to something else.
fn with(pointer: &str, new: Value) -> Value {
    let mut value = file();
    *value
        .pointer_mut(pointer)
        .unwrap_or_else(|| panic!("{pointer} is there")) = new;
    value
}

#[track_caller]
fn refused(value: &Value) -> (String, String) {
    match read(value) {
        Err(RecordError::Shape { path, why }) => (path, why),
        Err(RecordError::Content { path, problem }) => (path, problem.to_string()),
        other => panic!("not refused with a place: {other:?}"),
    }
}

#[test]
fn each_refusal_names_the_place_and_what_is_accepted() {
    let reading = "/visits/1/readings/2";
    for (pointer, new, path, says) in [
        (
            "/units/1/figures/pump_displacement/value/value",
            json!(1e9),
            "units[1].figures.pump_displacement.value",
            "5 to 1000 cm³/rev",
        ),
        (
            "/units/1/figures/pump_displacement/value/value",
            json!("75"),
            "units[1].figures.pump_displacement.value.value",
            "expected f64",
        ),
        (
            "/units/1/figures/pump_displacement/value/unit",
            json!("bar"),
            "units[1].figures.pump_displacement.value",
            "a pressure stands where a displacement belongs",
        ),
        (
            "/units/0/ticks/motors",
            json!(9),
            "units[0].ticks.motors",
            "1 to 4",
        ),
        (
            "/units/0/ticks/motors",
            json!(-1),
            "units[0].ticks.motors",
            "expected u8",
        ),
        (
            "/units/0/class",
            json!("spaceship"),
            "units[0].class",
            "unknown variant `spaceship`",
        ),
        (
            "/units/0/ports/charge/access_minutes",
            json!(-3.0),
            "units[0].ports.charge.access_minutes",
            "0 to 1440 min",
        ),
        (
            "/units/1/manual/0/low/value",
            json!(30.0),
            "units[1].manual[0]",
            "the low end 30 bar is above the high end 26 bar",
        ),
        (
            "/units/2/id",
            json!("demo-t-14"),
            "units[2].id",
            "stands twice",
        ),
        ("/units/2/id", json!("a/b"), "units[2].id", "is no id"),
        ("/visits/0/unit", json!("a b"), "visits[0].unit", "is no id"),
        (
            &format!("{reading}/port"),
            json!("tail_light"),
            "visits[1].readings[2].port",
            "unknown variant",
        ),
        (
            &format!("{reading}/seen/value/value"),
            json!(-40.0),
            "visits[1].readings[2].seen.value",
            "-1.1 to 1500 bar",
        ),
        (
            &format!("{reading}/seen/value"),
            json!(null),
            "visits[1].readings[2].seen",
            "",
        ),
        (
            &format!("{reading}/condition/lever"),
            json!({ "share": 1.5 }),
            "visits[1].readings[2].condition.lever.share",
            "0 to 1",
        ),
        (
            &format!("{reading}/condition/oil/value/value"),
            json!(900.0),
            "visits[1].readings[2].condition.oil.value",
            "-60 to 250 °C",
        ),
        (
            &format!("{reading}/id"),
            json!("r1"),
            "visits[1].readings[2].id",
            "stands twice",
        ),
        (
            "/visits/0/complaint",
            json!("x".repeat(limits::TEXT_CHARACTERS + 1)),
            "visits[0].complaint",
            "up to 20000",
        ),
        (
            "/units/0/name",
            json!("x".repeat(limits::LINE_CHARACTERS + 1)),
            "units[0].name",
            "up to 400",
        ),
        (
            "/instruments/0/span_high/value",
            json!(-1.0),
            "instruments[0]",
            "top of the scale must lie above its foot",
        ),
        (
            "/lowside_export",
            json!("one"),
            "lowside_export",
            "whole number",
        ),
        ("/visits", json!(7), "visits", "expected a sequence"),
    ] {
        let (at, why) = refused(&with(pointer, new));
        assert_eq!(at, path, "{pointer}: {why}");
        assert!(
            why.contains(says),
            "{pointer}: {why:?} does not say {says:?}"
        );
    }
}

#[test]
fn what_is_no_export_says_what_to_choose() {
    let error = |bytes: &[u8]| Export::read(bytes).expect_err("refused");
    assert!(matches!(error(b""), RecordError::NotJson { .. }));
    assert!(matches!(
        error(&[0x7b, 0xff, 0xfe]),
        RecordError::NotText { at: 1 }
    ));
    assert!(matches!(
        error(b"{\"lowside_export\": 1, \"units\": [NaN]}"),
        RecordError::NotJson { .. }
    ));
    assert!(matches!(
        error(b"{\"lowside_export\": 1e999}"),
        RecordError::NotJson { .. }
    ));
    assert!(matches!(
        error(&[b'['; 400_000]),
        RecordError::NotJson { .. }
    ));
    for text in ["{}", "[]", "7", "null", "{\"app\":\"lowside\"}"] {
        assert!(
            matches!(error(text.as_bytes()), RecordError::NotOurs { .. }),
            "{text}"
        );
    }
    let newer = format!("{{\"lowside_export\":{}}}", SCHEMA + 1);
    let large = vec![b' '; limits::FILE_BYTES + 1];
    assert_eq!(
        error(&large),
        RecordError::TooLarge {
            bytes: large.len(),
            limit: limits::FILE_BYTES
        }
    );
    assert_eq!(
        error(newer.as_bytes()),
        RecordError::Newer {
            found: u64::from(SCHEMA) + 1,
            known: SCHEMA
        }
    );
    assert!(matches!(
        error(b"{\"lowside_export\":0}"),
        RecordError::NotOurs { .. }
    ));
    assert!(
        error(newer.as_bytes())
            .to_string()
            .contains("Update this app")
    );
}

#[test]
fn a_file_with_nothing_in_it_is_an_export_with_nothing_in_it() {
    let export = read(&json!({ "lowside_export": 1 })).expect("taken");
    assert!(export.units.is_empty() && export.visits.is_empty() && export.settings.is_none());
    // An editor's byte order mark does no harm.
    assert!(Export::read("\u{feff}{\"lowside_export\":1}".as_bytes()).is_ok());
}

#[test]
fn too_many_and_too_deep() {
    let visits: Vec<Value> = (0..=limits::VISITS)
        .map(|i| json!({ "id": format!("v{i}") }))
        .collect();
    let (path, why) = refused(&json!({ "lowside_export": 1, "visits": visits }));
    assert_eq!(path, "visits");
    assert!(why.contains("10001 entries; up to 10000"), "{why}");
    let mut deep = json!(1);
    for _ in 0..limits::DEPTH + 1 {
        deep = json!([deep]);
    }
    let (path, _) =
        refused(&json!({ "lowside_export": 1, "units": [{ "id": "u1", "later": deep }] }));
    assert_eq!(path, "units[0].later");
}

#[test]
fn control_characters_are_taken_out_and_lines_stay() {
    let value = json!({ "lowside_export": 1, "units": [
        { "id": "u1", "name": "T\u{0}-\u{1b}[31m14\n\u{202e}x", "note": "a\r\nb\tc\u{7}\u{85}" }] });
    let export = read(&value).expect("taken");
    assert_eq!(export.units[0].name, "T-[31m14 x");
    assert_eq!(export.units[0].note, "a\nb\tc");
}

#[test]
fn fields_of_a_later_version_are_kept_or_named() {
    let mut value = file();
    value["units"][0]["paint"] = json!({ "colour": "green" });
    value["later"] = json!([1]);
    value["visits"][0]["readings"][1]["photo"] = json!("data");
    let export = read(&value).expect("taken");
    assert_eq!(export.units[0].extra["paint"]["colour"], "green");
    assert_eq!(export.extra["later"], json!([1]));
    assert_eq!(
        export.remarks,
        ["visits[0].readings[1].photo: not known to this version, and not kept"]
    );
    let again: Value = serde_json::from_str(&export.text().expect("written")).expect("JSON");
    assert_eq!(again["units"][0]["paint"]["colour"], "green");
}

#[test]
fn other_units_of_measure_are_taken() {
    let value = with(
        "/visits/1/readings/0/seen/value",
        json!({ "value": 340.0, "unit": "psi" }),
    );
    let export = read(&value).expect("taken");
    let Some(lowside::readings::Seen::Value { value }) = &export.visits[1].readings[0].seen else {
        panic!("a value")
    };
    // 1 psi = 0.068 947 6 bar (NIST SP 811).
    assert!((value.base() - 340.0 * 0.068_947_573).abs() < 1e-4);
}

#[test]
fn a_visit_without_its_unit_is_taken_and_named() {
    let mut value = file();
    value["units"].as_array_mut().expect("a list").remove(0);
    let export = read(&value).expect("taken");
    assert_eq!(
        export.remarks,
        ["visits[0]: its unit \"demo-t-14\" is not in this file"]
    );
}

fn yard() -> Export {
    Export::read(lowside::demo::TAMARISK.as_bytes()).expect("the demo is an export")
}

#[test]
fn a_plan_never_writes_over_what_is_there() {
    let mut book = Book {
        settings: Settings::start(),
        ..Book::default()
    };
    let plan = ImportPlan::of(&yard(), &book);
    assert!(
        plan.units.iter().all(|p| p.fate == Fate::New)
            && plan.instruments.iter().all(|p| p.fate == Fate::Same)
    );
    plan.apply(&mut book, true);
    let again = ImportPlan::of(&yard(), &book);
    assert!(again.is_empty(), "the same file again changes nothing");

    // The unit and one of its visits were changed here since.
    let unit = book.units.get_mut("demo-t-27").expect("there");
    unit.note = String::from("mine");
    let visit = book.visits.get_mut("demo-v-27").expect("there");
    visit.note = String::from("mine too");
    let before = book.clone();
    let plan = ImportPlan::of(&yard(), &book);
    let copy = plan
        .units
        .iter()
        .find(|p| p.fate != Fate::Same)
        .expect("a copy");
    assert_eq!(
        copy.fate,
        Fate::Copy {
            of: "demo-t-27".into()
        }
    );
    assert_eq!(copy.item.name, "T-27 (copy)");
    let taken = plan.apply(&mut book, true);
    assert_eq!((taken.units.len(), taken.visits.len()), (1, 1));
    assert_eq!(
        taken.visits[0].unit, taken.units[0].id,
        "the copied visit goes with the copied unit"
    );
    for (id, unit) in &before.units {
        assert_eq!(book.unit(id), Some(unit));
    }
    for (id, visit) in &before.visits {
        assert_eq!(book.visit(id), Some(visit));
    }
    assert!(
        ImportPlan::of(&yard(), &book).is_empty(),
        "a second time, the copies are recognised"
    );
}

#[test]
fn an_instrument_that_differs_comes_in_beside_ours_and_its_readings_follow() {
    let mut book = Book {
        settings: Settings::start(),
        ..Book::default()
    };
    book.settings.instruments[0].name = String::from("Our own gauge");
    let plan = ImportPlan::of(&yard(), &book);
    let copy = plan
        .instruments
        .iter()
        .find(|p| p.fate != Fate::Same)
        .expect("a copy");
    let id = copy.item.id.clone();
    assert_ne!(id, "gauge-60");
    plan.apply(&mut book, false);
    let visit = book.visit("demo-v-27").expect("it came in");
    assert_eq!(visit.riggings[0].instrument, id);
    assert_eq!(
        book.settings
            .instrument("gauge-60")
            .map(|i| i.name.as_str()),
        Some("Our own gauge")
    );
    assert!(ImportPlan::of(&yard(), &book).is_empty());
}

#[test]
fn settings_come_in_only_when_asked() {
    let mut theirs = Book::default();
    theirs.settings.theme = lowside::record::Theme::Sun;
    theirs.settings.first_run.cautions_read = true;
    let export = read(
        &serde_json::from_str(&Export::of(&theirs, NOW).text().expect("written")).expect("JSON"),
    )
    .expect("taken");
    let mut book = Book::default();
    let plan = ImportPlan::of(&export, &book);
    assert!(plan.settings.is_some());
    plan.apply(&mut book, false);
    assert_eq!(book.settings.theme, lowside::record::Theme::System);
    plan.apply(&mut book, true);
    assert_eq!(book.settings.theme, lowside::record::Theme::Sun);
    assert!(
        !book.settings.first_run.cautions_read,
        "what was read on another device was not read here"
    );
}

#[test]
fn a_plan_that_is_out_of_date_writes_over_nothing() {
    let mut book = Book::default();
    let plan = ImportPlan::of(&yard(), &book);
    let mine = Unit {
        id: "demo-t-14".into(),
        name: "mine".into(),
        ..Unit::default()
    };
    book.put_unit(mine.clone());
    let taken = plan.apply(&mut book, false);
    assert_eq!(taken.units.len() + 1, yard().units.len());
    assert_eq!(book.unit("demo-t-14"), Some(&mine));
}

#[test]
fn much_goes_out_as_several_files_that_hold_everything() {
    let mut book = Book {
        settings: Settings::start(),
        ..Book::default()
    };
    for u in 0..30 {
        book.put_unit(Unit {
            id: format!("u{u}"),
            name: format!("T-{u}"),
            note: "n".repeat(15_000),
            ..Unit::default()
        });
    }
    for v in 0..300 {
        let unit = if v % 40 == 0 {
            String::from("gone")
        } else {
            format!("u{}", v % 25)
        };
        book.put_visit(Visit {
            id: format!("v{v:03}"),
            unit,
            note: "x".repeat(19_000),
            ..Visit::default()
        });
    }
    let texts = Export::of(&book, NOW).texts().expect("written");
    assert!(texts.len() > 3, "{}", texts.len());
    let mut back = Book::default();
    for text in &texts {
        assert!(text.len() <= limits::FILE_BYTES);
        let export = Export::read(text.as_bytes()).expect("each is read alone");
        for visit in export.visits.iter().filter(|visit| visit.unit != "gone") {
            assert!(
                export.units.iter().any(|unit| unit.id == visit.unit),
                "a visit stands with its unit"
            );
        }
        ImportPlan::of(&export, &back).apply(&mut back, true);
    }
    assert_eq!(back, book);
}

#[test]
fn one_visit_goes_out_with_its_unit_and_its_gauges() {
    let mut book = Book {
        settings: Settings::start(),
        ..Book::default()
    };
    ImportPlan::of(&yard(), &book).apply(&mut book, false);
    let export = Export::of_visit(&book, "demo-v-33", NOW).expect("it is there");
    assert_eq!(
        export
            .units
            .iter()
            .map(|u| u.name.as_str())
            .collect::<Vec<_>>(),
        ["T-33"]
    );
    assert_eq!(
        export
            .instruments
            .iter()
            .map(|i| i.id.as_str())
            .collect::<Vec<_>>(),
        ["gauge-60"]
    );
    assert!(export.settings.is_none());
    assert_eq!(
        Export::read(export.text().expect("written").as_bytes()),
        Ok(export)
    );
    assert!(Export::of_visit(&book, "v-none", NOW).is_none());
}

#[test]
fn figures_that_would_be_refused_go_out_as_text() {
    use lowside::quantity::{Measure, Unit as U};
    use lowside::readings::{Condition, EngineSpeed, Port, Reading, Seen};
    use lowside::unit::{Figure, FigureId, Source};
    let mut book = Book::default();
    let bar = |value| Measure::new(value, U::Bar).expect("finite");
    let mut unit = Unit {
        id: "u1".into(),
        ..Unit::default()
    };
    unit.ticks.motors = 200;
    for (id, typed) in [
        (FigureId::LoopRelief, "9e9 bar"),
        (FigureId::ChargeSetting, ""),
    ] {
        unit.figures.insert(
            id,
            Figure {
                value: Some(bar(9e9)),
                typed: typed.into(),
                source: Source::Plate,
            },
        );
    }
    book.put_unit(unit);
    let engine = EngineSpeed::Measured(bar(3.0));
    let reading = |id: &str, seen| Reading {
        id: id.into(),
        port: Port::Charge,
        path: lowside::readings::Path::Left,
        condition: Condition {
            engine,
            ..Condition::start()
        },
        rigging: String::new(),
        seen: Some(seen),
        typed: String::new(),
        note: String::from("n"),
    };
    let share = Seen::ShareOf {
        share: f64::NAN,
        other: Box::new(Condition::start()),
    };
    let readings = vec![
        reading("r1", Seen::Value { value: bar(7e8) }),
        reading(
            "r2",
            Seen::Swing {
                low: bar(30.0),
                high: bar(20.0),
            },
        ),
        reading("r3", share),
    ];
    book.put_visit(Visit {
        id: "v1".into(),
        unit: "u1".into(),
        readings,
        ..Visit::default()
    });
    let export = Export::read(Export::of(&book, NOW).text().expect("written").as_bytes())
        .expect("taken back");
    let unit = &export.units[0];
    assert_eq!((unit.ticks.motors, unit.note.as_str()), (1, "motors: 200"));
    assert_eq!(unit.figures[&FigureId::LoopRelief].typed, "9e9 bar");
    assert_eq!(
        unit.figures[&FigureId::ChargeSetting].typed,
        "9000000000\u{202f}bar"
    );
    let typed: Vec<&str> = export.visits[0]
        .readings
        .iter()
        .map(|r| r.typed.as_str())
        .collect();
    assert_eq!(
        typed,
        ["700000000\u{202f}bar", "30\u{202f}bar to 20\u{202f}bar", ""]
    );
    assert!(
        export.visits[0]
            .readings
            .iter()
            .all(|r| r.seen.is_none() && r.note == "n\nengine speed: 3\u{202f}bar")
    );
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 20_000, failure_persistence: None, ..ProptestConfig::default() })]

    /// Any bytes give records or an error, never a panic.
    #[test]
    fn any_bytes(bytes in proptest::collection::vec(any::<u8>(), 0..300)) {
        let _ = Export::read(&bytes);
    }

    /// Almost an export: JSON of the right look with anything anywhere.
    #[test]
    fn almost_an_export(text in "\\{\"lowside_export\":1,\"(units|visits|instruments|settings)\":[\\[{][\\PC\\[\\]{}\",:0-9.e-]{0,60}[\\]}]\\}") {
        let _ = Export::read(text.as_bytes());
    }

    /// A good file with some bytes changed, cut out or doubled.
    #[test]
    fn a_damaged_file(edits in proptest::collection::vec((any::<usize>(), any::<u8>(), 0u8..3), 1..6)) {
        let mut bytes = lowside::demo::TAMARISK.as_bytes().to_vec();
        for (at, byte, edit) in edits {
            let at = at % bytes.len();
            match edit {
                0 => bytes[at] = byte,
                1 => bytes.truncate(at.max(1)),
                _ => bytes.insert(at, bytes[at]),
            }
        }
        if let Ok(export) = Export::read(&bytes) {
            // What was taken can be taken again, as it is.
            let again = Export::read(export.text().expect("written").as_bytes());
            prop_assert_eq!(again.map(|e| e.units), Ok(export.units));
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 1_000, failure_persistence: None, ..ProptestConfig::default() })]

    /// One value anywhere in a good file replaced by any other.
    #[test]
    fn a_strange_value_anywhere(at in any::<prop::sample::Index>(), new in strange()) {
        let mut value = file();
        let pointers = pointers(&value);
        let pointer = &pointers[at.index(pointers.len())];
        *value.pointer_mut(pointer).expect("it is there") = new;
        match read(&value) {
            Ok(export) => prop_assert!(Export::read(export.text().expect("written").as_bytes()).is_ok()),
            Err(error) => prop_assert!(error.to_string().len() > 20),
        }
    }

    /// Whatever the app can hold goes out and comes back the same.
    #[test]
    fn out_and_in_again(seed in any::<u64>()) {
        let book = Dice(seed).book();
        let texts = Export::of(&book, NOW).texts().expect("written");
        let mut back = Book::default();
        for text in texts {
            let export = Export::read(text.as_bytes()).expect("taken back");
            ImportPlan::of(&export, &back).apply(&mut back, true);
        }
        prop_assert_eq!(back, book);
    }
}

fn strange() -> impl Strategy<Value = Value> {
    prop_oneof![
        Just(Value::Null),
        any::<bool>().prop_map(Value::from),
        any::<f64>().prop_map(Value::from),
        any::<i64>().prop_map(Value::from),
        any::<u64>().prop_map(Value::from),
        "\\PC{0,12}".prop_map(Value::from),
        Just(json!([])),
        Just(json!({})),
        Just(json!([{ "id": "x" }])),
        Just(json!({ "value": 1.0, "unit": "bar" })),
        Just(json!({ "share": 0.5 })),
    ]
}

fn pointers(value: &Value) -> Vec<String> {
    fn walk(value: &Value, at: &str, all: &mut Vec<String>) {
        all.push(at.to_owned());
        match value {
            Value::Object(fields) => fields
                .iter()
                .for_each(|(key, v)| walk(v, &format!("{at}/{key}"), all)),
            Value::Array(items) => items
                .iter()
                .enumerate()
                .for_each(|(i, v)| walk(v, &format!("{at}/{i}"), all)),
            _ => {}
        }
    }
    let mut all = Vec::new();
    walk(value, "", &mut all);
    all
}

#[test]
fn a_problem_reads_as_a_sentence() {
    let problem = Problem::OutOfRange {
        value: 1e9,
        low: 5.0,
        high: 1000.0,
        unit: "cm³/rev",
    };
    let error = RecordError::Content {
        path: "units[0].figures.pump_displacement.value".into(),
        problem,
    };
    assert_eq!(
        error.to_string(),
        "units[0].figures.pump_displacement.value: 1000000000 cm³/rev is outside what is accepted: 5 to 1000 cm³/rev"
    );
}
