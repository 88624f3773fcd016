//! Formats of kept records: every fixture of every format loads, steps follow each other, and nothing newer is touched.

use lowside::record::{
    Book, Envelope, Export, Ladder, RecordError, RecordKind, SCHEMA, STEPS, Settings, Stamp, Step,
    Subject, Visit, checksum,
};
use lowside::unit::Unit;
use serde_json::{Value, json};

/// Frozen texts of each format. To add a format: a folder with the four files, written by the version that made them.
const FIXTURES: &[(u32, &str, &str, &str, &str)] = &[(
    1,
    include_str!("fixtures/v1/unit.json"),
    include_str!("fixtures/v1/visit.json"),
    include_str!("fixtures/v1/settings.json"),
    include_str!("fixtures/v1/export.json"),
)];

#[test]
fn steps_and_fixtures_have_no_gap() {
    assert!(Ladder::default().is_sound());
    assert_eq!(Ladder::default().steps.len(), STEPS.len());
    let formats: Vec<u32> = FIXTURES.iter().map(|fixture| fixture.0).collect();
    let all: Vec<u32> = (1..=SCHEMA).collect();
    assert_eq!(formats, all, "one set of fixtures for each format");
}

#[test]
fn every_fixture_of_every_format_loads() {
    let ladder = Ladder::default();
    for (format, unit, visit, settings, export) in FIXTURES {
        let open = |text: &str| Envelope::open(text.trim_end()).expect("an envelope");
        for text in [unit, visit, settings] {
            assert_eq!(open(text).schema, u64::from(*format));
        }
        let unit: Unit = open(unit).record(&ladder).expect("a unit");
        let visit: Visit = open(visit).record(&ladder).expect("a visit");
        let settings: Settings = open(settings).record(&ladder).expect("settings");
        assert_eq!(unit.name, "T-14 \"Rüttler\"");
        // All that there were when it was frozen; figures that came later are simply not given.
        assert_eq!((unit.figures.len(), unit.extra.len()), (17, 1));
        assert_eq!(visit.readings.len(), 23);
        assert_eq!(
            visit.closed.as_ref().map(|c| c.cause.as_str()),
            Some("charge-pump-worn")
        );
        assert_eq!(settings.extra["voice"], true);
        let export = Export::read(export.as_bytes()).expect("an export");
        assert_eq!((export.units, export.visits), (vec![unit], vec![visit]));
    }
}

/// What today's format holds is written again as it stands in its fixture: no field is renamed or lost by accident.
#[test]
fn todays_format_is_frozen() {
    let (format, unit, visit, settings, _) = FIXTURES.last().expect("a fixture");
    assert_eq!(*format, SCHEMA);
    fn same<T: serde::Serialize + serde::de::DeserializeOwned>(text: &str) {
        let envelope = Envelope::open(text.trim_end()).expect("an envelope");
        let record: T = envelope.record(&Ladder::default()).expect("a record");
        let again: Value = serde_json::to_value(&record).expect("JSON");
        let frozen: Value = serde_json::from_str(&envelope.body).expect("JSON");
        for (field, value) in frozen.as_object().expect("fields") {
            assert_eq!(
                again.get(field),
                Some(value),
                "{field}: a change of format needs a step and a number of its own"
            );
        }
    }
    same::<Unit>(unit);
    same::<Visit>(visit);
    same::<Settings>(settings);
}

#[test]
fn an_empty_record_is_one_with_defaults() {
    assert_eq!(
        serde_json::from_str::<Unit>("{}").expect("a unit"),
        Unit::default()
    );
    assert_eq!(
        serde_json::from_str::<Visit>("{}").expect("a visit"),
        Visit::default()
    );
    assert_eq!(
        serde_json::from_str::<Settings>("{}").expect("settings"),
        Settings::default()
    );
    let theme: Settings =
        serde_json::from_str("{\"theme\":\"of a later version\"}").expect("settings");
    assert_eq!(theme.theme, lowside::record::Theme::System);
}

/// A ladder of three made-up steps: format 2 called the note "remark", format 3 counted motors as text, format 4 has visits
/// with a list of words where the complaint was.
const MADE_UP: &[Step] = &[
    Step {
        from: 1,
        apply: |subject, value| {
            Ok(match subject {
                Subject::Record(RecordKind::Unit) => renamed(value, "remark", "note"),
                Subject::Export => renamed(value, "machines", "units"),
                _ => value,
            })
        },
    },
    Step {
        from: 2,
        apply: |subject, mut value| {
            if subject == Subject::Record(RecordKind::Unit)
                && let Some(motors) = value.pointer_mut("/ticks/motors")
            {
                let text = motors.as_str().ok_or("motors is no text")?;
                *motors = text
                    .parse::<u8>()
                    .map(Value::from)
                    .map_err(|_| format!("motors is {text:?}"))?;
            }
            Ok(value)
        },
    },
    Step {
        from: 3,
        apply: |subject, mut value| {
            if subject == Subject::Record(RecordKind::Visit)
                && let Some(words) = value.get("complaint").and_then(Value::as_array)
            {
                let words: Vec<&str> = words.iter().filter_map(Value::as_str).collect();
                value["complaint"] = Value::from(words.join(" "));
            }
            Ok(value)
        },
    },
];

fn renamed(mut value: Value, from: &str, to: &str) -> Value {
    if let Some(fields) = value.as_object_mut()
        && let Some(old) = fields.remove(from)
    {
        fields.insert(to.to_owned(), old);
    }
    value
}

fn made_up() -> Ladder {
    Ladder {
        top: 4,
        steps: MADE_UP,
    }
}

fn envelope(kind: RecordKind, schema: u64, body: &Value) -> Envelope {
    let stamp = Stamp {
        rev: 3,
        tab: "t1".into(),
        sum: checksum(&body.to_string()),
    };
    Envelope {
        kind,
        schema,
        stamp,
        saved_at: String::new(),
        body: body.to_string(),
    }
}

#[test]
fn a_record_climbs_all_steps_above_its_own_format() {
    let old = json!({ "id": "u1", "remark": "loud", "ticks": { "motors": "2" } });
    let unit: Unit = envelope(RecordKind::Unit, 1, &old)
        .record(&made_up())
        .expect("a unit");
    assert_eq!((unit.note.as_str(), unit.ticks.motors), ("loud", 2));
    // From format 3 on, neither step touches it.
    let newer = json!({ "id": "u1", "remark": "kept as it is", "ticks": { "motors": 2 } });
    let unit: Unit = envelope(RecordKind::Unit, 3, &newer)
        .record(&made_up())
        .expect("a unit");
    assert_eq!(unit.extra["remark"], "kept as it is");
}

#[test]
fn an_export_climbs_head_and_lists() {
    let file = json!({ "lowside_export": 1, "machines": [{ "id": "u1", "remark": "loud", "ticks": { "motors": "2" } }],
        "visits": [{ "id": "v1", "unit": "u1", "complaint": ["weak", "hot"] }] });
    let export = Export::read_with(file.to_string().as_bytes(), &made_up()).expect("an export");
    assert_eq!(export.format, 4);
    assert_eq!(
        (export.units[0].note.as_str(), export.units[0].ticks.motors),
        ("loud", 2)
    );
    assert_eq!(export.visits[0].complaint, "weak hot");
}

#[test]
fn a_step_that_cannot_be_done_says_which_and_why() {
    let old = json!({ "id": "u1", "ticks": { "motors": "two" } });
    let error = envelope(RecordKind::Unit, 2, &old)
        .record::<Unit>(&made_up())
        .expect_err("refused");
    assert_eq!(
        error,
        RecordError::Migration {
            from: 2,
            why: "motors is \"two\"".into()
        }
    );
    assert!(error.to_string().contains("from format 2 to 3"), "{error}");
}

#[test]
fn a_newer_format_is_not_read_but_can_be_looked_into() {
    let newer = envelope(
        RecordKind::Unit,
        9,
        &json!({ "id": "u1", "name": "T-14", "wings": 2 }),
    );
    let opened = Envelope::open(&newer.write().expect("written")).expect("opened");
    assert_eq!(
        opened.record::<Unit>(&Ladder::default()),
        Err(RecordError::Newer {
            found: 9,
            known: SCHEMA
        })
    );
    assert_eq!(opened.glimpse::<Unit>().expect("a look").name, "T-14");
    let file = json!({ "lowside_export": 5 });
    let error = Export::read_with(file.to_string().as_bytes(), &made_up()).expect_err("refused");
    assert!(error.is_newer());
}

#[test]
fn unsound_ladders_are_told_from_sound_ones() {
    const STAY: fn(Subject, Value) -> Result<Value, String> = |_, value| Ok(value);
    const GAP: &[Step] = &[
        Step {
            from: 1,
            apply: STAY,
        },
        Step {
            from: 3,
            apply: STAY,
        },
    ];
    const ZERO: &[Step] = &[Step {
        from: 0,
        apply: STAY,
    }];
    assert!(made_up().is_sound());
    assert!(
        !Ladder {
            top: 5,
            steps: MADE_UP
        }
        .is_sound(),
        "ends below the top"
    );
    assert!(!Ladder { top: 4, steps: GAP }.is_sound());
    assert!(
        !Ladder {
            top: 1,
            steps: ZERO
        }
        .is_sound()
    );
}

#[test]
fn an_envelope_keeps_its_body_to_the_letter() {
    // Spaces, order and the way a figure is written are part of the text that the checksum stands for.
    let body = "{\"b\" : 1.50, \"a\":[ 1e2 ]}";
    let stamp = Stamp {
        rev: 1,
        tab: "t1".into(),
        sum: checksum(body),
    };
    let envelope = Envelope {
        kind: RecordKind::Visit,
        schema: 1,
        stamp,
        saved_at: "2025".into(),
        body: body.into(),
    };
    let text = envelope.write().expect("written");
    assert_eq!(Envelope::open(&text), Ok(envelope));
    let touched = text.replace("1.50", "1.51");
    assert!(matches!(
        Envelope::open(&touched),
        Err(RecordError::Damaged { .. })
    ));
    for cut in 0..text.len() {
        assert!(Envelope::open(&text[..cut]).is_err(), "cut at {cut}");
    }
    for foreign in [
        "{}",
        "{\"app\":\"other\"}",
        "[1]",
        "\"x\"",
        &text.replace("lowside", "others"),
        &text.replace("visit", "ship"),
    ] {
        assert!(
            matches!(Envelope::open(foreign), Err(RecordError::NotOurs { .. })),
            "{foreign}"
        );
    }
}

#[test]
fn a_rescue_file_is_taken_as_far_as_it_can_be_read() {
    let good = envelope(RecordKind::Unit, 1, &json!({ "id": "u1", "name": "T-14" }))
        .write()
        .expect("written");
    let cut = &good[..good.len() - 9];
    let newer = envelope(RecordKind::Visit, 7, &json!({ "id": "v2" }))
        .write()
        .expect("written");
    let slot = envelope(
        RecordKind::Unit,
        1,
        &json!({ "id": "u1", "name": "T-14 b" }),
    )
    .write()
    .expect("written");
    let file = json!({ "app": "lowside", "kind": "rescue", "version": "0.1.0", "saved_at": "2025-12-01T10:00:00Z", "stored": {
        "lowside/v1/unit/u1": good, "lowside/v1/visit/v1": cut, "lowside/v1/visit/v2": newer, "lowside/v1/index": "[]",
        "lowside/v1/slot/t1": format!("unit/u1\n{slot}"), "lowside/v1/slot/t2": format!("unit/u1\n{good}"),
        "lowside/v1/trash/2025/unit/u9": good,
    } });
    let export = Export::read(file.to_string().as_bytes()).expect("taken");
    let names: Vec<&str> = export.units.iter().map(|unit| unit.name.as_str()).collect();
    assert_eq!(
        names,
        ["T-14 b", "T-14"],
        "the record, and the other state of it that a slot held"
    );
    assert_ne!(export.units[0].id, export.units[1].id);
    assert!(export.visits.is_empty());
    assert_eq!(export.remarks.len(), 2, "{:?}", export.remarks);
    assert!(
        export.remarks[0].contains("visit/v1") && export.remarks[1].contains("newer version"),
        "{:?}",
        export.remarks
    );
    let mut book = Book::default();
    lowside::record::ImportPlan::of(&export, &book).apply(&mut book, false);
    assert_eq!(book.units.len(), 2);
}

#[test]
fn a_rescue_file_may_be_large_and_one_bad_record_does_not_hold_up_the_others() {
    let body = |id: &str, note: usize| json!({ "id": id, "note": "n".repeat(note) });
    let text = |id: &str, note| {
        envelope(RecordKind::Unit, 1, &body(id, note))
            .write()
            .expect("written")
    };
    let mut stored = serde_json::Map::new();
    for n in 0..150 {
        let id = format!("u{n}");
        stored.insert(
            format!("lowside/v1/unit/{id}"),
            Value::from(text(&id, 19_000)),
        );
    }
    stored.insert(
        "lowside/v1/unit/long".into(),
        Value::from(text("long", 30_000)),
    );
    let far = json!({ "id": "far", "ticks": { "motors": 77 }, "figures":
        { "loop_relief": { "value": { "value": 9e9, "unit": "bar" }, "typed": "9e9" } } });
    stored.insert(
        "lowside/v1/unit/far".into(),
        Value::from(
            envelope(RecordKind::Unit, 1, &far)
                .write()
                .expect("written"),
        ),
    );
    let file = json!({ "app": "lowside", "kind": "rescue", "stored": stored });
    let file = serde_json::to_string_pretty(&file).expect("written");
    assert!(file.len() > lowside::record::limits::FILE_BYTES);
    let export = Export::read(file.as_bytes()).expect("taken");
    assert_eq!(export.units.len(), 151);
    assert_eq!(export.remarks.len(), 1);
    assert!(
        export.remarks[0].contains("unit/long: record.note: 30000 characters"),
        "{:?}",
        export.remarks
    );
    let far = export
        .units
        .iter()
        .find(|unit| unit.id == "far")
        .expect("taken");
    assert_eq!(
        far.figures[&lowside::unit::FigureId::LoopRelief].typed,
        "9e9"
    );
}
