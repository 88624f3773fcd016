//! The shelf, fault by fault: what was typed is in the store, or the person is told that it is not.

mod record_support;

use lowside::record::{
    Book, Envelope, Ladder, RecordKind, SCHEMA, Settings, Stamp, Step, Visit, checksum,
};
use lowside::store::{
    Fault, FaultyStore, LoadProblem, MemoryStore, NotSaved, RecordKey, SaveOutcome, SaveState,
    Shelf, Store, StoreError, Usage,
};
use lowside::unit::Unit;
use record_support::Dice;
use std::rc::Rc;

type Faulty = Rc<FaultyStore<MemoryStore>>;

const NOW: &str = "2025-12-01T13:28:00Z";
const LATER: &str = "2025-12-01T13:29:00Z";

fn faulty() -> Faulty {
    Rc::new(FaultyStore::new(MemoryStore::new()))
}

fn opened<S: Store>(store: S, tab: &str) -> Shelf<S> {
    let mut shelf = Shelf::new(store, tab);
    let loaded = shelf.load(NOW);
    assert!(loaded.problems.is_empty(), "{:?}", loaded.problems);
    shelf
}

fn visit(note: &str) -> Visit {
    Visit {
        id: "v1".into(),
        unit: "u1".into(),
        complaint: "weak".into(),
        note: note.into(),
        ..Visit::default()
    }
}

fn unit(name: &str) -> Unit {
    Unit {
        id: "u1".into(),
        name: name.into(),
        ..Unit::default()
    }
}

fn v1() -> RecordKey {
    RecordKey::Visit("v1".into())
}

#[track_caller]
fn saved(outcome: SaveOutcome) -> u64 {
    match outcome {
        SaveOutcome::Saved { rev, .. } => rev,
        other => panic!("not saved: {other:?}"),
    }
}

#[track_caller]
fn refused(outcome: SaveOutcome) -> NotSaved {
    match outcome {
        SaveOutcome::NotSaved { why, .. } => why,
        other => panic!("not refused: {other:?}"),
    }
}

/// All that is stored, in one text.
fn everything(store: &MemoryStore) -> String {
    store
        .texts()
        .into_iter()
        .map(|(key, text)| format!("{key}\n{text}\n"))
        .collect()
}

#[test]
fn a_book_is_written_and_read_back_as_it_is() {
    for seed in 0..200 {
        let store = MemoryStore::new();
        let book = Dice(seed).book();
        let mut shelf = opened(store.clone(), "t1");
        for outcome in shelf.save_book(&book, NOW) {
            saved(outcome);
        }
        assert!(
            shelf.save_book(&book, LATER).is_empty(),
            "what stands there is not written again"
        );
        let mut other = opened(store, "t2");
        assert_eq!(other.load(LATER).book, book);
        assert!(
            other.save_book(&book, LATER).is_empty(),
            "what was read is not written again"
        );
    }
}

#[test]
fn a_device_without_anything_starts_with_the_usual_gauges() {
    let mut shelf = Shelf::new(MemoryStore::new(), "t1");
    let loaded = shelf.load(NOW);
    assert_eq!(
        loaded.book,
        Book {
            settings: Settings::start(),
            ..Book::default()
        }
    );
    assert!(loaded.book.settings.instrument("gauge-60").is_some());
}

#[test]
fn revisions_count_the_saves() {
    let mut shelf = opened(MemoryStore::new(), "t1");
    assert_eq!(saved(shelf.save_visit(&visit("a"), NOW)), 1);
    assert_eq!(shelf.save_visit(&visit("a"), NOW), SaveOutcome::Unchanged);
    assert_eq!(saved(shelf.save_visit(&visit("b"), NOW)), 2);
}

#[test]
fn nothing_is_written_before_the_store_was_read() {
    let store = faulty();
    let mut shelf = Shelf::new(store.clone(), "t1");
    assert_eq!(
        refused(shelf.save_visit(&visit("a"), NOW)),
        NotSaved::NotLoaded
    );
    store.arm(0, Fault::Fails(StoreError::Denied));
    let loaded = shelf.load(NOW);
    assert_eq!(loaded.problems, [LoadProblem::Listing(StoreError::Denied)]);
    assert_eq!(
        refused(shelf.save_visit(&visit("a"), NOW)),
        NotSaved::NotLoaded
    );
    assert!(store.inner().texts().is_empty());
    shelf.load(NOW);
    saved(shelf.save_visit(&visit("a"), NOW));
}

#[test]
fn a_full_store_keeps_the_old_text_and_says_what_to_do() {
    let store = faulty();
    let mut shelf = opened(store.clone(), "t1");
    saved(shelf.save_visit(&visit("old"), NOW));
    let used: usize = store
        .inner()
        .texts()
        .iter()
        .map(|(key, text)| key.len() + text.len())
        .sum();
    store.arm(0, Fault::Quota(used));
    let outcome = shelf.save_visit(&visit(&"new ".repeat(500)), NOW);
    let state = SaveState::Waiting.after(&outcome);
    assert_eq!(refused(outcome), NotSaved::Store(StoreError::Full));
    assert!(state.is_at_risk());
    assert!(
        state.words().contains("storage is full") && state.words().contains("Export now"),
        "{}",
        state.words()
    );
    let loaded = Shelf::new(store.inner().clone(), "t2").load(NOW);
    assert_eq!(loaded.book.visit("v1"), Some(&visit("old")));
    // What needs no more room than there is goes through, with or without the slot.
    saved(shelf.save_visit(&visit("nEw"), NOW));
    store.heal();
    saved(shelf.save_visit(&visit(&"new ".repeat(500)), NOW));
}

#[test]
fn the_nth_call_that_fails_loses_nothing() {
    for fault in [
        Fault::Fails(StoreError::Full),
        Fault::Fails(StoreError::Failed("x".into())),
        Fault::Torn(0),
        Fault::Torn(50),
        Fault::Torn(99),
        Fault::TornAndFails(70),
    ] {
        for ahead in 0..16 {
            let store = faulty();
            let mut shelf = opened(store.clone(), "t1");
            saved(shelf.save_unit(&unit("T-14"), NOW));
            saved(shelf.save_visit(&visit("old"), NOW));
            store.arm(ahead, fault.clone());
            let outcome = shelf.save_visit(&visit("old new"), NOW);
            let is_safe = outcome.is_safe();
            assert!(
                is_safe || matches!(outcome, SaveOutcome::NotSaved { .. }),
                "{outcome:?}"
            );
            store.heal();
            // The page crashes here. The next one must find the new text where it was promised, else at least the old one.
            let loaded = Shelf::new(store.clone(), "t2").load(LATER);
            let note = loaded.book.visit("v1").map(|visit| visit.note.as_str());
            assert!(
                note == Some("old new") || (!is_safe && note == Some("old")),
                "{fault:?} at {ahead}: {note:?}, {loaded:?}"
            );
            assert!(loaded.book.unit("u1").is_some());
            // Or it does not crash, and tries again.
            shelf.save_visit(&visit("old new"), LATER);
            let again = Shelf::new(store.clone(), "t3").load(LATER);
            assert_eq!(
                again.book.visit("v1").map(|visit| visit.note.as_str()),
                Some("old new"),
                "{fault:?} at {ahead}"
            );
        }
    }
}

#[test]
fn a_crash_in_the_middle_of_a_write_is_completed() {
    let store = faulty();
    let mut shelf = opened(store.clone(), "t1");
    saved(shelf.save_visit(&visit("old"), NOW));
    // Slot read, own state read, slot written and read back; then the record tears.
    let torn = (0..12).find(|ahead| {
        store.arm(*ahead, Fault::Torn(40));
        let outcome = shelf.save_visit(&visit(&format!("new {ahead}")), NOW);
        store.heal();
        let text = store
            .inner()
            .texts()
            .remove(&v1().path())
            .expect("there is a text");
        outcome != SaveOutcome::Unchanged && Envelope::open(&text).is_err()
    });
    let torn = torn.expect("some write is the record's");
    let loaded = Shelf::new(store.clone(), "t2").load(LATER);
    assert_eq!(loaded.recovered, [v1()]);
    assert_eq!(
        loaded.book.visit("v1").map(|visit| visit.note.clone()),
        Some(format!("new {torn}"))
    );
    assert!(
        matches!(
            loaded.problems.as_slice(),
            [LoadProblem::Quarantined { .. }]
        ),
        "the torn text is kept as well"
    );
    assert!(Shelf::new(store, "t3").load(LATER).recovered.is_empty());
}

#[test]
fn two_tabs_on_one_record() {
    let store = MemoryStore::new();
    let mut mine = opened(store.clone(), "mine");
    saved(mine.save_visit(&visit("first"), NOW));
    let mut theirs = opened(store.clone(), "theirs");
    saved(theirs.save_visit(&visit("theirs"), NOW));

    let told = mine.foreign_changes(&v1().path()).expect("read");
    assert_eq!(told.len(), 1);
    assert_eq!(told[0].saved_at.as_deref(), Some(NOW));
    let outcome = mine.save_visit(&visit("mine"), LATER);
    assert_eq!(outcome, SaveOutcome::Conflict(told[0].clone()));
    assert!(SaveState::Waiting.after(&outcome).is_at_risk());
    assert!(everything(&store).contains("theirs"));

    // Keep mine as a copy, and go on with theirs.
    let copy = Visit {
        id: "v2".into(),
        ..visit("mine")
    };
    saved(mine.save_visit(&copy, LATER));
    assert_eq!(mine.reload_visit("v1"), Ok(Some(visit("theirs"))));
    saved(mine.save_visit(&visit("theirs and mine"), LATER));

    // Or write over it: theirs goes to the trash.
    let outcome = theirs.save_visit(&visit("again"), LATER);
    assert!(matches!(outcome, SaveOutcome::Conflict(_)));
    saved(theirs.overwrite_visit(&visit("again"), LATER));
    let trash = theirs.trashed().expect("read");
    assert_eq!(trash.len(), 1);
    assert_eq!(
        (trash[0].key.clone(), trash[0].name.as_str()),
        (v1(), "weak")
    );
    assert!(everything(&store).contains("theirs and mine"));
}

#[test]
fn the_same_words_in_two_tabs_are_no_conflict() {
    let store = MemoryStore::new();
    let mut one = opened(store.clone(), "one");
    saved(one.save_visit(&visit("a"), NOW));
    let mut two = opened(store, "two");
    saved(one.save_visit(&visit("b"), NOW));
    assert_eq!(two.save_visit(&visit("b"), NOW), SaveOutcome::Unchanged);
    saved(two.save_visit(&visit("c"), NOW));
}

#[test]
fn a_record_that_another_tab_took_out() {
    let store = MemoryStore::new();
    let mut one = opened(store.clone(), "one");
    saved(one.save_visit(&visit("a"), NOW));
    let mut two = opened(store.clone(), "two");
    two.trash(&v1(), NOW).expect("in the trash");
    let SaveOutcome::Conflict(foreign) = one.save_visit(&visit("b"), NOW) else {
        panic!("a conflict")
    };
    assert_eq!(foreign.saved_at, None);
    saved(one.overwrite_visit(&visit("b"), NOW));
    assert_eq!(
        opened(store, "three").load(NOW).book.visit("v1"),
        Some(&visit("b"))
    );
    // Everything cleared: each record is told of.
    let cleared = one.foreign_changes("").expect("read");
    assert!(cleared.is_empty());
    one.store().remove(&v1().path()).expect("removed");
    assert_eq!(one.foreign_changes("").expect("read").len(), 1);
}

#[test]
fn what_two_tabs_write_in_the_same_moment_is_both_kept() {
    // The other tab writes, slot and record, after this tab looked and before it writes.
    for ahead in 0..10 {
        let store = faulty();
        let mut mine = opened(store.clone(), "mine");
        saved(mine.save_visit(&visit("first"), NOW));
        let first = store
            .inner()
            .get(&v1().path())
            .expect("read")
            .expect("there");
        let base = Envelope::open(&first).expect("opened").stamp.sum;
        let body = serde_json::to_string(&visit("first, theirs")).expect("JSON");
        let stamp = Stamp {
            rev: 2,
            tab: "theirs".into(),
            sum: checksum(&body),
        };
        let text = Envelope {
            kind: RecordKind::Visit,
            schema: 1,
            stamp,
            saved_at: NOW.into(),
            body,
        }
        .write()
        .expect("written");
        let slot = format!("visit/v1 {base}\n{text}");
        store.arm(
            ahead,
            Fault::Foreign(vec![
                ("lowside/v1/slot/theirs".into(), Some(slot)),
                (v1().path(), Some(text)),
            ]),
        );
        let before = store.calls();
        let outcome = mine.save_visit(&visit("first, mine"), NOW);
        let is_armed = store.calls() - before > ahead;
        store.heal();
        let loaded = Shelf::new(store.clone(), "later").load(LATER);
        let all = everything(store.inner());
        assert!(
            !is_armed || all.contains("first, theirs"),
            "at {ahead}: {outcome:?}"
        );
        assert!(
            !outcome.is_safe() || all.contains("first, mine"),
            "at {ahead}: {outcome:?} {loaded:?}"
        );
    }
}

#[test]
fn what_cannot_be_read_is_moved_not_deleted() {
    let store = MemoryStore::new();
    let mut shelf = opened(store.clone(), "t1");
    saved(shelf.save_visit(&visit("old"), NOW));
    saved(shelf.save_unit(&unit("T-14"), NOW));
    store.put(&v1().path(), "{\"broken").expect("put");
    store.remove("lowside/v1/slot/t1").expect("removed");
    let mut other = Shelf::new(store.clone(), "t2");
    let loaded = other.load("2025-12-02T08:00:00Z");
    assert!(loaded.book.visits.is_empty() && loaded.book.unit("u1").is_some());
    assert!(
        matches!(
            loaded.problems.as_slice(),
            [LoadProblem::Quarantined { .. }]
        ),
        "{:?}",
        loaded.problems
    );
    let kept = other.quarantined().expect("read");
    assert_eq!(kept.len(), 1);
    assert_eq!(
        (kept[0].was.clone(), kept[0].when.as_str()),
        (v1().path(), "2025-12-02T08:00:00Z")
    );
    assert_eq!(
        other.quarantined_text(&kept[0]),
        Ok(Some("{\"broken".into()))
    );
    assert!(other.load(LATER).problems.is_empty(), "told once");
    other.discard_quarantined(&kept[0]).expect("gone");
    assert!(other.quarantined().expect("read").is_empty());
}

#[test]
fn a_record_that_breaks_while_the_page_is_open_is_put_aside_before_the_next_save() {
    let store = MemoryStore::new();
    let mut shelf = opened(store.clone(), "t1");
    saved(shelf.save_visit(&visit("old"), NOW));
    store.put(&v1().path(), "scribble").expect("put");
    saved(shelf.save_visit(&visit("new"), NOW));
    assert!(everything(&store).contains("scribble"));
}

#[test]
fn the_wrong_kind_under_a_key_and_a_foreign_program_are_put_aside() {
    let store = MemoryStore::new();
    let mut shelf = opened(store.clone(), "t1");
    saved(shelf.save_unit(&unit("T-14"), NOW));
    let text = store
        .get("lowside/v1/unit/u1")
        .expect("read")
        .expect("there");
    store.put("lowside/v1/visit/u1", &text).expect("put");
    store
        .put("lowside/v1/settings", "{\"volume\":11}")
        .expect("put");
    let loaded = Shelf::new(store, "t2").load(NOW);
    assert_eq!(loaded.problems.len(), 2, "{:?}", loaded.problems);
    assert_eq!(loaded.book.settings, Settings::start());
    assert_eq!(loaded.book.units.len(), 1);
}

#[test]
fn a_newer_format_can_be_looked_at_and_is_never_written() {
    let store = MemoryStore::new();
    let body = "{\"id\":\"u1\",\"name\":\"T-14\",\"wings\":2}".to_owned();
    let stamp = Stamp {
        rev: 4,
        tab: "new".into(),
        sum: checksum(&body),
    };
    let envelope = Envelope {
        kind: RecordKind::Unit,
        schema: 9,
        stamp,
        saved_at: NOW.into(),
        body,
    };
    let text = envelope.write().expect("written");
    store.put("lowside/v1/unit/u1", &text).expect("put");
    let mut shelf = Shelf::new(store.clone(), "t1");
    let loaded = shelf.load(NOW);
    let key = RecordKey::Unit("u1".into());
    assert_eq!(loaded.read_only, std::slice::from_ref(&key));
    assert_eq!(
        loaded.problems,
        [LoadProblem::Newer {
            key: key.clone(),
            schema: 9
        }]
    );
    assert_eq!(
        loaded.book.unit("u1").map(|unit| unit.name.as_str()),
        Some("T-14")
    );
    assert_eq!(
        refused(shelf.save_unit(&unit("mine"), NOW)),
        NotSaved::Newer(9)
    );
    assert_eq!(
        refused(shelf.overwrite_unit(&unit("mine"), NOW)),
        NotSaved::Newer(9)
    );
    assert_eq!(shelf.trash(&key, NOW), Err(NotSaved::Newer(9)));
    assert_eq!(store.get("lowside/v1/unit/u1"), Ok(Some(text)));
}

#[test]
fn a_tab_of_the_older_version_stops_writing_when_a_newer_one_has_written() {
    let store = MemoryStore::new();
    let mut old = opened(store.clone(), "old");
    saved(old.save_unit(&unit("T-14"), NOW));
    let body = "{\"id\":\"u1\",\"title\":\"T-14\"}".to_owned();
    let stamp = Stamp {
        rev: 2,
        tab: "new".into(),
        sum: checksum(&body),
    };
    let text = Envelope {
        kind: RecordKind::Unit,
        schema: u64::from(SCHEMA) + 1,
        stamp,
        saved_at: NOW.into(),
        body,
    }
    .write()
    .expect("written");
    store.put("lowside/v1/unit/u1", &text).expect("put");
    assert_eq!(
        refused(old.save_unit(&unit("T-15"), NOW)),
        NotSaved::Newer(u64::from(SCHEMA) + 1)
    );
    assert_eq!(store.get("lowside/v1/unit/u1"), Ok(Some(text)));
}

const LOUDER: &[Step] = &[Step {
    from: SCHEMA,
    apply: |_, mut value| {
        if let Some(name) = value.get_mut("name") {
            *name = name
                .as_str()
                .map(str::to_uppercase)
                .ok_or("no name")?
                .into();
        }
        Ok(value)
    },
}];

#[test]
fn before_an_older_format_is_replaced_its_text_is_kept_once() {
    let store = MemoryStore::new();
    saved(opened(store.clone(), "old").save_unit(&unit("t-14"), NOW));
    let before = store
        .get("lowside/v1/unit/u1")
        .expect("read")
        .expect("there");
    let mut shelf = Shelf::with_ladder(
        store.clone(),
        "new",
        Ladder {
            top: SCHEMA + 1,
            steps: LOUDER,
        },
    );
    let loaded = shelf.load(NOW);
    let mut unit = loaded.book.unit("u1").expect("there").clone();
    assert_eq!(unit.name, "T-14");
    assert!(
        shelf
            .save_book(&loaded.book, NOW)
            .iter()
            .all(SaveOutcome::is_safe),
        "settings only"
    );
    assert_eq!(
        store.get("lowside/v1/unit/u1"),
        Ok(Some(before.clone())),
        "looking changes nothing"
    );
    for note in ["a", "b"] {
        unit.note = note.into();
        saved(shelf.save_unit(&unit, NOW));
    }
    assert_eq!(
        store.get(&format!("lowside/backup/v{SCHEMA}/unit/u1")),
        Ok(Some(before))
    );
    let now = Envelope::open(
        &store
            .get("lowside/v1/unit/u1")
            .expect("read")
            .expect("there"),
    )
    .expect("opened");
    assert_eq!((now.schema, now.stamp.rev), (u64::from(SCHEMA) + 1, 3));
}

#[test]
fn into_the_trash_and_back() {
    let store = MemoryStore::new();
    let mut shelf = opened(store.clone(), "t1");
    saved(shelf.save_visit(&visit("a"), NOW));
    shelf.trash(&v1(), NOW).expect("in the trash");
    assert_eq!(shelf.trash(&v1(), NOW), Err(NotSaved::Gone));
    let loaded = shelf.load(NOW);
    assert!(
        loaded.book.visits.is_empty() && loaded.problems.is_empty(),
        "{:?}",
        loaded.problems
    );
    // A second one of the same id at the same moment does not push the first one out.
    saved(shelf.save_visit(&visit("b"), NOW));
    shelf.trash(&v1(), NOW).expect("in the trash");
    let trash = shelf.trashed().expect("read");
    assert_eq!(trash.len(), 2);
    for (entry, note) in trash.iter().zip(["b", "a"]) {
        shelf.restore(entry).expect("back");
        assert_eq!(shelf.restore(entry), Err(NotSaved::Gone));
        assert_eq!(shelf.reload_visit("v1"), Ok(Some(visit(note))));
        shelf.delete(&v1()).expect("deleted");
    }
    saved(shelf.save_visit(&visit("c"), NOW));
    shelf.trash(&v1(), NOW).expect("in the trash");
    let entry = shelf.trashed().expect("read").remove(0);
    saved(shelf.save_visit(&visit("d"), NOW));
    assert_eq!(shelf.restore(&entry), Err(NotSaved::Taken));
    assert_eq!(shelf.empty_trash(), Ok(1));
    assert!(shelf.trashed().expect("read").is_empty());
    assert_eq!(shelf.reload_visit("v1"), Ok(Some(visit("d"))));
}

#[test]
fn a_failure_on_the_way_to_the_trash_leaves_at_least_one_copy() {
    for fault in [Fault::Fails(StoreError::Full), Fault::Torn(50)] {
        for ahead in 0..12 {
            let store = faulty();
            let mut shelf = opened(store.clone(), "t1");
            saved(shelf.save_visit(&visit("precious"), NOW));
            store.arm(ahead, fault.clone());
            let _ = shelf.trash(&v1(), NOW);
            store.heal();
            let loaded = Shelf::new(store.clone(), "t2").load(NOW);
            let in_trash = shelf.trashed().expect("read").len();
            assert!(
                loaded.book.visit("v1").is_some() || in_trash > 0,
                "{fault:?} at {ahead}"
            );
            assert!(everything(store.inner()).contains("precious"));
        }
    }
}

#[test]
fn an_import_comes_in_whole_or_not_at_all() {
    let mut book = Book {
        settings: Settings::start(),
        ..Book::default()
    };
    lowside::demo::load(&mut book).expect("the demo");
    let units: Vec<Unit> = book.units.values().cloned().collect();
    let visits: Vec<Visit> = book.visits.values().cloned().collect();
    let mut was_refused = 0;
    for ahead in 0..70 {
        let store = faulty();
        let mut shelf = opened(store.clone(), "t1");
        saved(shelf.save_unit(&unit("mine"), NOW));
        store.arm(ahead, Fault::Fails(StoreError::Full));
        let added = shelf.add(&units, &visits, NOW);
        store.heal();
        let loaded = Shelf::new(store, "t2").load(NOW);
        let count = loaded.book.units.len() + loaded.book.visits.len();
        match added {
            Ok(()) => assert_eq!(count, 1 + units.len() + visits.len(), "at {ahead}"),
            Err(_) => {
                was_refused += 1;
                assert_eq!(count, 1, "at {ahead}");
            }
        }
        assert!(loaded.book.unit("u1").is_some());
    }
    assert!(was_refused > 10, "{was_refused}");
    // What is there already is not written over.
    let mut shelf = opened(MemoryStore::new(), "t1");
    saved(shelf.save_unit(&units[2], NOW));
    let why = shelf.add(&units, &visits, NOW).expect_err("refused");
    assert_eq!(why, (RecordKey::Unit(units[2].id.clone()), NotSaved::Taken));
    assert_eq!(shelf.load(NOW).book.units.len(), 1);
}

#[test]
fn what_the_browser_took_away_is_told() {
    let store = MemoryStore::new();
    let mut shelf = opened(store.clone(), "t1");
    saved(shelf.save_visit(&visit("a"), NOW));
    saved(shelf.save_unit(&unit("T-14"), NOW));
    store.remove(&v1().path()).expect("removed");
    let loaded = Shelf::new(store.clone(), "t2").load(NOW);
    assert_eq!(loaded.problems, [LoadProblem::Missing { key: v1() }]);
    assert!(
        Shelf::new(store, "t3").load(NOW).problems.is_empty(),
        "told once"
    );
}

#[test]
fn without_an_index_everything_is_still_found() {
    let store = MemoryStore::new();
    let mut shelf = opened(store.clone(), "t1");
    saved(shelf.save_visit(&visit("a"), NOW));
    for text in [None, Some("[\"visit/"), Some("7")] {
        match text {
            None => store.remove("lowside/v1/index").expect("removed"),
            Some(text) => store.put("lowside/v1/index", text).expect("put"),
        }
        let loaded = Shelf::new(store.clone(), "t2").load(NOW);
        assert_eq!((loaded.book.visits.len(), loaded.problems.len()), (1, 0));
        assert_eq!(
            store.get("lowside/v1/index"),
            Ok(Some("[\"visit/v1\"]".into()))
        );
    }
}

#[test]
fn a_record_that_cannot_be_written_is_refused_with_the_reason() {
    use lowside::readings::{Condition, Port, Reading, Seen};
    let mut shelf = opened(MemoryStore::new(), "t1");
    let bad = Visit {
        id: "a/b".into(),
        ..Visit::default()
    };
    assert!(matches!(
        refused(shelf.save_visit(&bad, NOW)),
        NotSaved::Unwritable(_)
    ));
    let share = Seen::ShareOf {
        share: f64::NAN,
        other: Box::new(Condition::start()),
    };
    let reading = Reading {
        id: "r1".into(),
        port: Port::Charge,
        path: lowside::readings::Path::Left,
        condition: Condition::start(),
        rigging: String::new(),
        seen: Some(share),
        typed: String::new(),
        note: String::new(),
    };
    let bad = Visit {
        readings: vec![reading],
        ..visit("a")
    };
    assert!(matches!(
        refused(shelf.save_visit(&bad, NOW)),
        NotSaved::Unwritable(_)
    ));
}

#[test]
fn usage_counts_as_browsers_do_and_warns_early() {
    let store = MemoryStore::new();
    store.put("lowside/v1/x", "🔧é").expect("put");
    store.put("other", "not ours").expect("put");
    let shelf = opened(store, "t1");
    // 12 of the key, two for the spanner, one for the letter; the index that the load wrote is not there.
    assert_eq!(shelf.usage(), Ok(Usage { characters: 15 }));
    assert!(
        !Usage {
            characters: 2_069_999
        }
        .is_high()
    );
    assert!(
        Usage {
            characters: 2_070_000
        }
        .is_high()
    );
    assert!(
        (Usage {
            characters: 1_150_000
        }
        .share()
            - 0.5)
            .abs()
            < 1e-12
    );
}

#[test]
fn the_rescue_file_brings_everything_back() {
    let store = MemoryStore::new();
    let mut shelf = opened(store.clone(), "t1");
    let book = Dice(5).book();
    shelf.save_book(&book, NOW);
    store.put("lowside/v1/visit/broken", "{").expect("put");
    let file = shelf.rescue_file(LATER).expect("read");
    let export = lowside::record::Export::read(file.as_bytes()).expect("taken");
    let mut back = Book::default();
    lowside::record::ImportPlan::of(&export, &back).apply(&mut back, true);
    assert_eq!(back, book);
    assert!(
        export
            .remarks
            .iter()
            .any(|remark| remark.contains("visit/broken"))
    );
}

#[test]
fn the_status_line() {
    let conflict = SaveState::Waiting.after(&SaveOutcome::Saved {
        rev: 1,
        at: NOW.into(),
    });
    assert_eq!(
        (conflict.words().as_str(), conflict.is_at_risk()),
        ("saved", false)
    );
    assert_eq!(conflict.after(&SaveOutcome::Unchanged), conflict);
    assert_eq!(
        SaveState::Waiting.after(&SaveOutcome::Unchanged),
        SaveState::Clean
    );
    assert!(SaveState::Waiting.is_at_risk());
}
