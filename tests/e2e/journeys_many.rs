//! A yard of 500 units and 5,000 calls in the browser's own storage: the list stays short, finds, and saves.

use std::collections::BTreeMap;

use lowside::store::{MemoryStore, PackedStore, Shelf};
use serde_json::{Value, json};

use crate::hands::{open, type_in};
use crate::rig::{PHONE, Rig};
#[path = "../yard_support/mod.rs"]
mod yard_support;

/// So many keys go over in one script.
const AT_ONCE: usize = 250;

/// Everything that a browser with this yard has stored.
fn stored(units: usize, visits: usize) -> BTreeMap<String, String> {
    let book = yard_support::yard(units, visits);
    let behind = MemoryStore::new();
    let mut shelf = Shelf::new(PackedStore::new(behind.clone()), "tab");
    let now = "2026-03-18T17:00:00Z";
    shelf.load(now);
    let units: Vec<_> = book.units.values().cloned().collect();
    let visits: Vec<_> = book.visits.values().cloned().collect();
    shelf.add(&units, &visits, now).expect("there is room");
    behind.texts()
}

async fn put(rig: &Rig, stored: &BTreeMap<String, String>) {
    let all: Vec<(&String, &String)> = stored.iter().collect();
    for part in all.chunks(AT_ONCE) {
        rig.js(
            "for (const [key, text] of arguments[0]) { localStorage.setItem(key, text); }",
            vec![json!(part)],
        )
        .await;
    }
}

/// From the start of the page to the first screen, and what scripts took, ms.
async fn started(rig: &Rig) -> (f64, f64) {
    rig.reload().await;
    rig.wait_for_app().await;
    rig.by_id("unit-list").await;
    let at = rig.js("return performance.now();", vec![]).await;
    let answer = rig.cdp("Performance.getMetrics", json!({})).await;
    let parts = answer["metrics"].as_array().into_iter().flatten();
    let script: f64 = parts
        .filter(|part| part["name"] == "ScriptDuration")
        .filter_map(|part| part["value"].as_f64())
        .sum();
    (at.as_f64().unwrap_or_default(), script * 1000.0)
}

#[tokio::test]
async fn five_hundred_units_are_found_edited_and_kept() {
    let rig = Rig::open(PHONE).await;
    rig.cdp("Performance.enable", json!({ "timeDomain": "threadTicks" }))
        .await;
    let yard = stored(500, 5_000);
    let characters: usize = yard
        .iter()
        .map(|(key, text)| key.chars().count() + text.chars().count())
        .sum();
    put(&rig, &yard).await;
    let (at, script) = started(&rig).await;
    println!(
        "500 units, 5,000 calls: {characters} characters stored; list there after {at:.0} ms by the clock, scripts {script:.0} ms"
    );
    let cards = "document.querySelectorAll('[data-testid=unit-card]').length";
    rig.wait_until("a first page of the list", &format!("{cards} === 24"))
        .await;
    rig.click("more-units").await;
    rig.wait_until("a second one", &format!("{cards} === 48"))
        .await;
    rig.fill("unit-search", "T-377").await;
    rig.wait_until("the one that is looked for", &format!("{cards} === 1"))
        .await;
    assert!(
        !rig.has("nearly-full").await,
        "called full with what it is to carry"
    );
    rig.click("unit-profile").await;
    type_in(&rig, "unit-note", "Found among five hundred").await;
    rig.wait_for_text("Saved").await;
    rig.go("/units").await;
    rig.by_id("unit-list").await;
    let (_, script) = started(&rig).await;
    println!("again: scripts {script:.0} ms");
    rig.fill("unit-search", "T-377").await;
    rig.wait_until("it again", &format!("{cards} === 1")).await;
    rig.click("unit-profile").await;
    open(&rig, "unit-note").await;
    rig.by_id("unit-note").await;
    let note = rig
        .js(
            "return document.querySelector('[data-testid=unit-note]').value;",
            vec![],
        )
        .await;
    assert_eq!(note, Value::from("Found among five hundred"));
    rig.close().await;
}

#[tokio::test]
async fn old_calls_go_into_an_archive_and_out_of_the_browser() {
    let rig = Rig::open(PHONE).await;
    put(&rig, &stored(4, 60)).await;
    started(&rig).await;
    let visits =
        "Object.keys(localStorage).filter((key) => key.startsWith('lowside/v1/visit/')).length";
    rig.wait_until("all calls are there", &format!("{visits} === 60"))
        .await;
    rig.go("/settings").await;
    rig.click("archive-open").await;
    let list = rig.by_id("archive-before").await;
    let options = list.text().await.expect("options");
    let words = options
        .lines()
        .find(|line| line.contains("calls"))
        .expect("a year")
        .trim()
        .to_owned();
    rig.choose("archive-before", &words).await;
    rig.click("archive-file").await;
    let file = rig.downloaded("lowside-archive-before-").await;
    let archive: Value = serde_json::from_str(&file).expect("a file");
    let gone = archive["visits"].as_array().expect("calls").len();
    assert!(
        gone > 0 && words.contains(&gone.to_string()),
        "{words}: {gone}"
    );
    rig.click("archive-remove").await;
    rig.click("archive-remove-yes").await;
    rig.wait_until("they are gone", &format!("{visits} === {}", 60 - gone))
        .await;
    rig.close().await;
}
