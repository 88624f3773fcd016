//! What is done with something from outside, and what must hold whatever it was. The fuzz targets under `tests/fuzz` read this file too.

use lowside::bench::stand::{Subject as Stood, paste};
use lowside::quantity::{Kind, Unit as InUnit, UnitPrefs, parse};
use lowside::record::{Envelope, Export, RecordKind, Stamp, Visit};
use lowside::report::{Report, Subject};
use lowside::store::{MemoryStore, RecordKey, Shelf, Store};
use lowside::unit::Unit;
use lowside::{pack, tag, tracking};

const NOW: &str = "2026-01-01T00:00:00Z";

/// A file: what is taken goes out again and is read back, so that no half-checked record stays behind. None where it is refused.
pub fn file(text: &[u8]) -> Option<Export> {
    let export = Export::read(text).ok()?;
    let again = export.texts().is_ok_and(|texts| {
        texts
            .iter()
            .all(|text| Export::read(text.as_bytes()).is_ok())
    });
    assert!(again, "taken once and refused when it came back");
    for unit in &export.units {
        // Too long for a tag is told; anything else must come back as it went.
        if let Ok(back) = tag::read(&tag::digits(unit)) {
            assert_eq!(back.units.first(), Some(unit), "changed by its tag");
        }
    }
    Some(export)
}

/// Works out every call of a file whose unit is in it; how many there were.
pub fn calls(export: &Export) -> usize {
    export
        .visits
        .iter()
        .filter_map(|visit| {
            let unit = export.units.iter().find(|unit| unit.id == visit.unit)?;
            work_out(unit, visit, export);
            Some(())
        })
        .count()
}

/// The text of a record where a browser keeps records, once as it is and once in a sound envelope of the given format: it is read, or
/// it stands there untouched, and what was read is the same when it is read again. Whether a record was read.
pub fn kept(body: &str, schema: u64) -> bool {
    let id = serde_json::from_str::<serde_json::Value>(body)
        .ok()
        .and_then(|value| Some(value.get("id")?.as_str()?.to_owned()))
        .filter(|id| lowside::record::is_id(id))
        .unwrap_or_else(|| String::from("r1"));
    let envelope = |kind| {
        Envelope {
            kind,
            schema,
            stamp: Stamp {
                rev: 3,
                tab: String::from("t1"),
                sum: String::new(),
            },
            saved_at: NOW.to_owned(),
            body: body.to_owned(),
        }
        .write()
        .unwrap_or_else(|_| body.to_owned())
    };
    let texts = [
        (RecordKey::Settings, body.to_owned()),
        (RecordKey::Unit(id.clone()), envelope(RecordKind::Unit)),
        (RecordKey::Visit(id.clone()), envelope(RecordKind::Visit)),
    ];
    let store = MemoryStore::new();
    for (key, text) in &texts {
        store.put(&key.path(), text).expect("memory takes it");
    }
    let book = Shelf::new(store.clone(), "t1").load(NOW).book;
    let there = store.texts();
    for (key, text) in &texts {
        let read = match key {
            RecordKey::Settings => false,
            RecordKey::Unit(id) => book.unit(id).is_some(),
            RecordKey::Visit(id) => book.visit(id).is_some(),
        };
        assert!(
            read || there.values().any(|kept| kept == text),
            "{} is gone: {text}",
            key.words()
        );
    }
    let mut second = Shelf::new(store.clone(), "t2");
    second.load(NOW);
    let _ = second.save_book(&book, NOW);
    let again = Shelf::new(store, "t3").load(NOW).book;
    assert_eq!(again, book, "not the same when it is read again");
    book.unit(&id).is_some() || book.visit(&id).is_some()
}

/// A text of the local storage, packed: it comes back as some text, and that is read as a file is. Whether it was one.
pub fn packed(text: String) -> bool {
    Export::read(pack::text_of(text).as_bytes()).is_ok()
}

/// A table pasted into the bench sheet. Whether it gave a row.
pub fn table(text: &str) -> bool {
    paste::read(text, Stood::Pump).is_ok_and(|pasted| !pasted.rows(String::new).0.is_empty())
}

/// The digits of a unit's tag. Whether they were read.
pub fn tag(text: &str) -> bool {
    tag::read(text).is_ok()
}

/// A typed figure, in a field for one kind of quantity after the other. Whether it was taken.
pub fn figure(text: &str, of: usize) -> bool {
    let kinds = [
        (Kind::Pressure, InUnit::Bar),
        (Kind::Angle, InUnit::Turn),
        (Kind::Temperature, InUnit::DegreeCelsius),
        (Kind::RotationalSpeed, InUnit::RevolutionPerMinute),
        (Kind::Volume, InUnit::Litre),
    ];
    let (kind, unit) = kinds[of % kinds.len()];
    let parsed = parse(text, kind, unit, None);
    if let Ok(parsed) = &parsed {
        assert!(parsed.measure.base().is_finite(), "{text:?}");
    }
    parsed.is_ok()
}

/// Everything that the app works out of a call. A probability is one, and nothing that is printed is "not a number".
fn work_out(unit: &Unit, visit: &Visit, export: &Export) {
    let instruments = &export.instruments;
    let assessment = lowside::ranking::assess(unit, visit, instruments);
    for cause in &assessment.causes {
        assert!(
            (0.0..=1.0 + 1e-9).contains(&cause.probability),
            "{}",
            cause.probability
        );
    }
    let prefs = UnitPrefs::default();
    let text = Report::of(&Subject {
        unit,
        visit,
        instruments,
        assessment: &assessment,
        prefs: &prefs,
        made_at: NOW,
    })
    .text();
    assert!(!text.contains("NaN") && !text.contains("inf "), "{text}");
    let _ = lowside::yard::report(unit, visit, &[], instruments, &prefs);
    let visits: Vec<&Visit> = export.visits.iter().collect();
    let _ = lowside::yard::outlook(unit, &visits, instruments);
    if let Some(sheet) = &visit.neutral {
        let _ = lowside::neutral::report::report(unit, sheet);
    }
    if let Some(sheet) = &visit.tracking {
        let machine = sheet.machine(tracking::usual_undercarriage(unit.class));
        let runs: Vec<tracking::Run> = sheet.runs(&machine).into_iter().flatten().collect();
        let _ = tracking::find(&machine, &runs, &sheet.screws());
    }
    if let Some(sheet) = &visit.bench {
        let _ = lowside::bench::stand::report(sheet, Some(unit));
    }
}
