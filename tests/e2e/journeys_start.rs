//! Starting: the shell, the first screen, the day it fails, the worker.

use std::fs;

use serde_json::{Value, json};

use crate::hands::{look, new_call};
use crate::rig::{NARROW, PHONE, Rig};

#[tokio::test]
async fn the_app_takes_the_place_of_the_shell() {
    let rig = Rig::open(PHONE).await;
    let children = rig
        .js(
            "return document.getElementById('app').childElementCount;",
            vec![],
        )
        .await;
    assert!(children.as_u64() > Some(0), "the app's root is empty");
    assert!(!rig.has("failure-screen").await);
    let facts = rig
        .js("return { ...document.documentElement.dataset };", vec![])
        .await;
    assert!(
        facts["version"]
            .as_str()
            .is_some_and(|version| version.starts_with(env!("CARGO_PKG_VERSION")))
    );
    assert_eq!(facts["worker"], "yes");
    rig.close().await;
}

#[tokio::test]
async fn the_first_screen_fits_the_narrowest_phone() {
    let rig = Rig::open(NARROW).await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    rig.close().await;
}

/// Without wasm the person still gets out what is stored, untouched.
#[tokio::test]
async fn a_broken_app_says_so_and_hands_out_what_is_stored() {
    let rig = Rig::new(PHONE).await;
    let wasm = rig.site.files_ending(".wasm");
    fs::write(rig.site.dir().join(&wasm[0]), "not wasm").expect("writable");
    rig.load().await;
    rig.by_id("failure-screen").await;
    assert!(rig.page_text().await.contains("Lowside could not start"));
    assert!(rig.page_text().await.contains(env!("CARGO_PKG_VERSION")));

    rig.js(
        "localStorage.setItem('lowside/one', '{\"a\":1'); localStorage.setItem('other', 'x');",
        vec![],
    )
    .await;
    rig.click("failure-save").await;
    let file: Value = serde_json::from_str(&rig.downloaded("lowside-rescue-").await).expect("JSON");
    assert_eq!(file["stored"], json!({ "lowside/one": "{\"a\":1" }));
    assert_eq!(file["kind"], "rescue");
    rig.wait_for_text("1 stored record ").await;
    let kept = rig
        .js("return localStorage.getItem('lowside/one');", vec![])
        .await;
    assert_eq!(kept, "{\"a\":1");
}

/// "Try again" loads the page anew; with the file mended the app starts.
#[tokio::test]
async fn trying_again_starts_the_mended_app() {
    let rig = Rig::new(PHONE).await;
    let wasm = rig.site.files_ending(".wasm");
    rig.site.break_off(&wasm[0]);
    rig.load().await;
    rig.by_id("failure-screen").await;
    rig.site.mend();
    rig.click("failure-retry").await;
    rig.wait_for_app().await;
    assert!(!rig.has("failure-screen").await);
}

/// What stands in the fields when the app stops stays visible and goes into the file.
#[tokio::test]
async fn a_stopped_app_keeps_what_was_typed() {
    let rig = Rig::open(PHONE).await;
    let add_field = "const label = document.createElement('label');
        label.textContent = 'Charge pressure';
        const field = document.createElement('input');
        label.append(field);
        document.getElementById('app').append(label);
        field.value = '17,5 bar';
        window.lowsideFailed('tried out');";
    rig.js(add_field, vec![]).await;
    rig.by_id("failure-screen").await;
    assert!(rig.page_text().await.contains("Lowside has stopped"));
    assert!(rig.page_text().await.contains("tried out"));
    rig.click("failure-save").await;
    let file: Value = serde_json::from_str(&rig.downloaded("lowside-rescue-").await).expect("JSON");
    let fields = file["fields_on_screen"].as_array().expect("a list");
    assert!(
        fields.contains(&json!({ "label": "Charge pressure", "value": "17,5 bar" })),
        "{fields:?}"
    );
    rig.close().await;
}

/// What stands in the field for the name.
const NAME: &str = "return document.querySelector('[data-testid=\"new-unit-name\"]').value;";

/// A first visit on which nothing comes after the first screen, until the site is mended.
async fn first_screen_alone() -> Rig {
    let rig = Rig::new(PHONE).await;
    let house = rig.site.file_below("snippets", "split_house.wasm");
    rig.site.break_off(&house);
    rig.load().await;
    rig.by_id("front-screen").await;
    rig
}

/// On a first visit the first screen stands before the rest of the app has come. Where that breaks off, what was typed stays, and
/// pressing again goes on.
#[tokio::test]
async fn a_first_screen_waits_for_the_rest_of_the_app() {
    let rig = first_screen_alone().await;
    rig.fill("new-unit-name", "T-99").await;
    rig.click_text("Roller").await;
    rig.click("start-call").await;
    rig.by_id("front-trouble").await;
    assert_eq!(rig.js(NAME, vec![]).await, "T-99");
    look(&rig, "front-trouble", PHONE).await;

    rig.site.mend();
    rig.click("start-call").await;
    rig.by_id("call-screen").await;
    assert!(rig.page_text().await.contains("T-99"));
    rig.wait_for_app().await;
}

/// Nothing but the first screen's own files is needed for it.
#[tokio::test]
async fn what_is_typed_on_the_first_screen_goes_along_into_the_app() {
    let rig = first_screen_alone().await;
    rig.fill("new-unit-name", "T-98").await;
    rig.site.mend();
    // Another screen is asked for by its address; coming back, the name still stands.
    rig.go("/settings").await;
    rig.by_id("settings-screen").await;
    rig.go("/units").await;
    rig.by_id("units-screen").await;
    assert_eq!(rig.js(NAME, vec![]).await, "T-98");
}

/// A link whose screen did not come is pressed again: the address stands there already, and it is followed all the same.
#[tokio::test]
async fn a_link_pressed_again_on_the_first_screen_is_followed() {
    let rig = first_screen_alone().await;
    rig.click("settings-link").await;
    rig.by_id("front-trouble").await;
    rig.site.mend();
    rig.click("settings-link").await;
    rig.by_id("settings-screen").await;
}

/// The road call works while the rest of the first download has broken off; a screen that has not come says so and how to go on.
#[tokio::test]
async fn a_screen_that_did_not_come_is_fetched_when_it_is_asked_for_again() {
    let rig = Rig::new(PHONE).await;
    let rooms = rig.site.file_below("snippets", "split_rooms.wasm");
    rig.site.break_off(&rooms);
    rig.load().await;
    rig.wait_for_app().await;
    new_call(&rig, "T-97").await;
    rig.click("settings-link").await;
    rig.by_id("room-trouble").await;
    look(&rig, "room-trouble", PHONE).await;
    rig.site.mend();
    rig.click("room-again").await;
    rig.by_id("settings-screen").await;
}

/// What is chosen on the first screen is shown at once and goes along, also what was chosen before the connection was back; and
/// whoever opens the fold for files comes to where they are taken in.
#[tokio::test]
async fn what_is_chosen_on_the_first_screen_goes_along_into_the_app() {
    let rig = first_screen_alone().await;
    rig.fill("new-unit-name", "T-96").await;
    rig.click("cautions-read").await;
    rig.by_id("front-trouble").await;
    assert!(!rig.has("general-caution").await, "it was read");
    rig.site.mend();
    let open = "document.querySelector('details.fold').open = true; return true;";
    rig.js(open, vec![]).await;
    rig.by_id("units-screen").await;
    assert!(!rig.has("general-caution").await, "it was read before");
    assert_eq!(rig.js(NAME, vec![]).await, "T-96");
    assert!(rig.has("data-fold").await);
}

/// Messages sent before the worker is up are neither lost nor put out of order.
#[tokio::test]
async fn the_worker_keeps_early_messages() {
    let rig = Rig::open(PHONE).await;
    let glue = "export default async function () {
        await (await fetch(self.location.href)).text();
        self.onmessage = (event) => self.postMessage(event.data * 10);
        self.lowsideListens();
    }";
    fs::write(rig.site.dir().join("try.js"), glue).expect("writable");
    let answers = rig
        .js_async(
            "const done = arguments[0];
            const worker = new Worker('worker.js?js=try.js&wasm=boot.js', { type: 'module' });
            const answers = [];
            worker.onerror = (event) => done(event.message);
            worker.onmessage = (event) => { answers.push(event.data); if (answers.length === 4) done(answers); else if (answers.length === 3) worker.postMessage(4); };
            [1, 2, 3].forEach((n) => worker.postMessage(n));",
            vec![],
        )
        .await;
    assert_eq!(answers, json!([10, 20, 30, 40]));
    rig.close().await;
}

/// A worker that cannot start says so to the page, which can then calculate without it.
#[tokio::test]
async fn a_worker_that_cannot_start_reports_an_error() {
    let rig = Rig::open(PHONE).await;
    let answer = rig
        .js_async(
            "const done = arguments[0];
            const worker = new Worker('worker.js?js=missing.js&wasm=missing.wasm', { type: 'module' });
            worker.onerror = (event) => { event.preventDefault(); done('error'); };",
            vec![],
        )
        .await;
    assert_eq!(answer, "error");
}
