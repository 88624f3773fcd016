//! The browser's own storage. Runs under `wasm-bindgen-test-runner`; elsewhere this file is empty.
#![cfg(target_arch = "wasm32")]

use js_sys::Function;
use lowside::record::{Book, Settings, Visit};
use lowside::store::{
    BrowserStore, NotSaved, PREFIX, SaveOutcome, Shelf, Store, StoreError, open_browser,
};
use wasm_bindgen::JsValue;
use wasm_bindgen_test::{wasm_bindgen_test, wasm_bindgen_test_configure};

wasm_bindgen_test_configure!(run_in_browser);

const NOW: &str = "2025-12-01T13:28:00Z";

fn run(script: &str) {
    Function::new_no_args(script)
        .call0(&JsValue::NULL)
        .expect("the script runs");
}

fn cleared() -> BrowserStore {
    run("window.localStorage.clear()");
    BrowserStore::open().expect("there is storage")
}

#[wasm_bindgen_test]
fn texts_come_back_as_they_were() {
    let store = cleared();
    assert_eq!(
        store.keys(""),
        Ok(Vec::new()),
        "the probe leaves nothing behind"
    );
    let text = "{\"a\":\"é³漢🔧\\u0000 \u{0}\n\"}";
    store.put("lowside/b", text).expect("put");
    store.put("lowside/a", "").expect("put");
    store.put("other", "x").expect("put");
    assert_eq!(store.get("lowside/b"), Ok(Some(text.into())));
    assert_eq!(store.get("lowside/a"), Ok(Some(String::new())));
    assert_eq!(store.get("lowside/c"), Ok(None));
    assert_eq!(
        store.keys(PREFIX),
        Ok(vec!["lowside/a".into(), "lowside/b".into()])
    );
    store.remove("lowside/b").expect("removed");
    store
        .remove("lowside/b")
        .expect("removed again is no fault");
    assert_eq!(store.get("lowside/b"), Ok(None));
}

#[wasm_bindgen_test]
fn two_tabs_and_a_book() {
    let mut book = Book {
        settings: Settings::start(),
        ..Book::default()
    };
    lowside::demo::load(&mut book).expect("the demo");
    let mut one = Shelf::new(cleared(), "one");
    assert!(one.load(NOW).problems.is_empty());
    assert!(one.save_book(&book, NOW).iter().all(SaveOutcome::is_safe));
    let mut two = Shelf::new(opened(), "two");
    assert_eq!(two.load(NOW).book, book);
    let visit = |note: &str| Visit {
        note: note.into(),
        ..book.visits["demo-v-27"].clone()
    };
    assert!(two.save_visit(&visit("theirs"), NOW).is_safe());
    assert!(matches!(
        one.save_visit(&visit("mine"), NOW),
        SaveOutcome::Conflict(_)
    ));
}

fn opened() -> BrowserStore {
    BrowserStore::open().expect("there is storage")
}

#[wasm_bindgen_test]
fn a_full_storage_is_told_from_other_faults_and_loses_nothing() {
    let store = cleared();
    let mut shelf = Shelf::new(store.clone(), "one");
    shelf.load(NOW);
    let old = Visit {
        id: "v1".into(),
        note: "old".into(),
        ..Visit::default()
    };
    assert!(shelf.save_visit(&old, NOW).is_safe());
    let mut size = 1 << 20;
    let mut count = 0;
    while size > 0 {
        match store.put(&format!("filler{count}"), &"x".repeat(size)) {
            Ok(()) => count += 1,
            Err(why) => {
                assert_eq!(why, StoreError::Full);
                size /= 2;
            }
        }
        assert!(count < 1000, "this storage has no end");
    }
    let new = Visit {
        note: "new ".repeat(2000),
        ..old.clone()
    };
    match shelf.save_visit(&new, NOW) {
        SaveOutcome::NotSaved { why, .. } => assert_eq!(why, NotSaved::Store(StoreError::Full)),
        other => panic!("{other:?}"),
    }
    // A page that is loaded now still opens, and finds the old text.
    let mut later = Shelf::new(opened(), "later");
    assert_eq!(later.load(NOW).book.visit("v1"), Some(&old));
    cleared();
}

#[wasm_bindgen_test]
fn a_blocked_storage_gives_memory_and_the_reason() {
    for (script, why) in [
        (
            "throw new DOMException('no', 'SecurityError')",
            StoreError::Denied,
        ),
        ("return null", StoreError::Missing),
    ] {
        run(&format!(
            "window.kept = Object.getOwnPropertyDescriptor(window, 'localStorage');
             Object.defineProperty(window, 'localStorage', {{ configurable: true, get() {{ {script} }} }})"
        ));
        let (store, reason) = open_browser();
        run("Object.defineProperty(window, 'localStorage', window.kept)");
        assert_eq!(reason, Some(why));
        store.put("lowside/a", "x").expect("memory takes it");
        assert_eq!(store.get("lowside/a"), Ok(Some("x".into())));
    }
    assert!(open_browser().1.is_none());
}
