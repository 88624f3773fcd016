//! Without a network: the first copy, the update, the update that breaks off.

use serde_json::{Value, json};

use crate::rig::{PHONE, Rig};

const VERSION: &str = "return document.documentElement.dataset.version;";
const LOOK_FOR_UPDATE: &str =
    "navigator.serviceWorker.ready.then((registration) => registration.update())
    .then(() => arguments[0]('looked'), (error) => arguments[0](String(error)));";
/// Resolves once an update that was under way has ended, well or not.
const UPDATE_ENDED: &str = "navigator.serviceWorker.ready.then((registration) => {
    const done = arguments[0];
    const worker = registration.installing;
    if (!worker) { done(registration.waiting ? 'installed' : 'none'); return; }
    worker.addEventListener('statechange', () => done(worker.state));
});";
const NEXT_VERSION: &str =
    "document.querySelector('meta[name=description]').content.startsWith('Next version')";
const CACHES: &str = "caches.keys().then(arguments[0]);";

#[tokio::test]
async fn after_one_visit_the_app_works_without_its_server() {
    let mut rig = Rig::open(PHONE).await;
    rig.wait_for_offline_copy().await;
    let worker = "fetch('worker.js?js=a&wasm=b').then((response) => arguments[0](response.status), () => arguments[0](0));";
    rig.site.stop();

    rig.reload().await;
    rig.wait_for_app().await;
    assert_eq!(
        rig.js_async(worker, vec![]).await,
        200,
        "the worker is part of the copy"
    );
    // A page that is not there leads to the app's start.
    rig.driver
        .goto(format!("{}some/old/link?x=1", rig.site.url()))
        .await
        .expect("the copy answers");
    rig.wait_for_app().await;
    let place = rig
        .js("return location.origin + location.pathname;", vec![])
        .await;
    assert_eq!(place, rig.site.url());
    let problems = rig.problems().await;
    assert!(
        !problems
            .iter()
            .any(|problem| problem.contains("policy breach")),
        "{problems:?}"
    );
}

/// The connection breaks during the first visit: the app says that it is not stored yet, and the next visit stores it.
#[tokio::test]
async fn a_first_copy_that_breaks_off_is_made_at_the_next_start() {
    let rig = Rig::new(PHONE).await;
    rig.site.break_off("worker.js");
    rig.load().await;
    rig.wait_for_app().await;
    rig.wait_until(
        "the app says so",
        "document.documentElement.dataset.offline === 'failed'",
    )
    .await;
    let caches = rig.js_async(CACHES, vec![]).await;
    assert_eq!(caches, json!([]), "half a copy was kept");
    rig.site.mend();
    rig.reload().await;
    rig.wait_for_offline_copy().await;
}

#[tokio::test]
async fn an_update_waits_until_it_is_asked_for() {
    let rig = Rig::open(PHONE).await;
    rig.wait_for_offline_copy().await;
    let first = rig.js(VERSION, vec![]).await;

    rig.site.publish_new_version();
    assert_eq!(rig.js_async(LOOK_FOR_UPDATE, vec![]).await, "looked");
    rig.wait_until(
        "an update is offered",
        "document.documentElement.dataset.update === 'ready'",
    )
    .await;
    // A reload does not bring it: a half-filled visit must not change under the hands.
    rig.reload().await;
    rig.wait_for_app().await;
    assert_eq!(rig.js(VERSION, vec![]).await, first);
    rig.wait_until(
        "the update is still offered",
        "document.documentElement.dataset.update === 'ready'",
    )
    .await;

    rig.js(
        "window.dispatchEvent(new Event('lowside-apply-update'));",
        vec![],
    )
    .await;
    rig.wait_until("the new version is there", NEXT_VERSION)
        .await;
    rig.wait_for_app().await;
    assert_ne!(rig.js(VERSION, vec![]).await, first);
    let caches = rig.js_async(CACHES, vec![]).await;
    assert_eq!(
        caches.as_array().map(Vec::len),
        Some(1),
        "old copies are removed: {caches}"
    );
    rig.close().await;
}

#[tokio::test]
async fn an_update_that_breaks_off_leaves_the_old_version_serving() {
    let mut rig = Rig::open(PHONE).await;
    rig.wait_for_offline_copy().await;
    let first = rig.js(VERSION, vec![]).await;

    rig.site.publish_new_version();
    rig.site.break_off("index.html");
    rig.js_async(LOOK_FOR_UPDATE, vec![]).await;
    let ended = rig.js_async(UPDATE_ENDED, vec![]).await;
    assert!(
        ended == "redundant" || ended == "none",
        "the broken update became {ended}"
    );
    assert_eq!(
        rig.js(
            "return document.documentElement.dataset.update ?? null;",
            vec![]
        )
        .await,
        Value::Null
    );

    rig.site.stop();
    rig.reload().await;
    rig.wait_for_app().await;
    assert_eq!(rig.js(VERSION, vec![]).await, first);
}

/// The log-in page of a guest network answers every address with its own page and "200 OK".
#[tokio::test]
async fn a_foreign_page_does_not_pass_for_a_file_of_the_app() {
    let mut rig = Rig::open(PHONE).await;
    rig.wait_for_offline_copy().await;
    let first = rig.js(VERSION, vec![]).await;

    rig.site.publish_new_version();
    std::fs::write(
        rig.site.dir().join("index.html"),
        "<title>Please log in</title>",
    )
    .expect("writable");
    rig.js_async(LOOK_FOR_UPDATE, vec![]).await;
    let ended = rig.js_async(UPDATE_ENDED, vec![]).await;
    assert!(
        ended == "redundant" || ended == "none",
        "the foreign page became {ended}"
    );

    rig.site.stop();
    rig.reload().await;
    rig.wait_for_app().await;
    assert_eq!(rig.js(VERSION, vec![]).await, first);
}

/// A second tab is not reloaded under the hands of whoever types there.
#[tokio::test]
async fn the_other_tab_is_told_and_left_alone() {
    let rig = Rig::open(PHONE).await;
    rig.wait_for_offline_copy().await;
    let first = rig.js(VERSION, vec![]).await;
    let first_tab = rig.driver.window().await.expect("a tab");
    let second_tab = rig.driver.new_tab().await.expect("a second tab");
    rig.driver
        .switch_to_window(second_tab)
        .await
        .expect("switched");
    rig.load().await;
    rig.wait_for_app().await;

    rig.site.publish_new_version();
    rig.js_async(LOOK_FOR_UPDATE, vec![]).await;
    rig.wait_until(
        "an update is offered",
        "document.documentElement.dataset.update === 'ready'",
    )
    .await;
    rig.js(
        "window.dispatchEvent(new Event('lowside-apply-update'));",
        vec![],
    )
    .await;
    rig.wait_until("the new version is there", NEXT_VERSION)
        .await;

    rig.driver
        .switch_to_window(first_tab)
        .await
        .expect("switched");
    rig.wait_until(
        "the first tab was told",
        "document.documentElement.dataset.update === 'reload'",
    )
    .await;
    assert_eq!(rig.js(VERSION, vec![]).await, first);
    rig.close().await;
}
