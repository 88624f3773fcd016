//! Beside the running machine: a needle is watched, a held step timed, oil caught in a jug, a figure entered with large keys, and the way
//! back taken.

use serde_json::Value;

use crate::hands::{look, new_call, open, press, tick_all};
use crate::rig::{PHONE, Rig};

/// Lets the page's clock, on which stopwatches and holds run, jump ahead. Nothing waits.
async fn skip(rig: &Rig, seconds: u32) {
    let script = "const then = performance.now.bind(performance), ahead = arguments[0] * 1000;
        performance.now = () => then() + ahead;
        return true;";
    rig.js(script, vec![Value::from(seconds)]).await;
}

async fn focused(rig: &Rig) -> String {
    let at = rig
        .js("return document.activeElement?.id ?? '';", vec![])
        .await;
    at.as_str().unwrap_or_default().to_owned()
}

#[tokio::test]
async fn a_needle_is_watched_and_written_down_afterwards() {
    let rig = Rig::open(PHONE).await;
    new_call(&rig, "T-41").await;
    rig.click("quick-charge-drive").await;
    rig.by_id("reading-row-1").await;
    assert!(!rig.has("watch-0").await, "nothing is ticked yet");
    tick_all(&rig).await;
    rig.click("watch-0").await;
    rig.wait_until(
        "the expected band stands on the dial, with where it comes from",
        "/\\d+\\.\\d to \\d+\\.\\d.bar/.test(document.querySelector('[data-testid=watch-words]')?.innerText ?? '') \
         && document.querySelector('[data-testid=watch-words]').innerText.includes('practice') \
         && !!document.querySelector('[data-testid=watch-band]')",
    )
    .await;
    assert_eq!(focused(&rig).await, "watch-title");
    look(&rig, "watch", PHONE).await;
    assert_eq!(rig.text("watch-count").await, "1 of 2");
    rig.click("watch-next").await;
    rig.wait_until(
        "the next condition is told",
        "document.querySelector('[data-testid=watch-condition]').innerText.startsWith('Change to: ')",
    )
    .await;
    // What is pressed can be reached by the thumb, and everything is on the screen.
    let reach = rig
        .js(
            "const keys = [...document.querySelectorAll('.watch-foot .button')].map(key => key.getBoundingClientRect());
            return [Math.min(...keys.map(key => key.height)), Math.max(...keys.map(key => key.bottom)), window.innerHeight,
                document.querySelector('.watch').scrollWidth - document.querySelector('.watch').clientWidth];",
            vec![],
        )
        .await;
    let (least, lowest) = (
        reach[0].as_f64().expect("px"),
        reach[1].as_f64().expect("px"),
    );
    assert!(least >= 48.0, "a key of {least} px");
    assert!(
        lowest <= reach[2].as_f64().expect("px"),
        "a key at {lowest} px is under the edge: {reach}"
    );
    assert_eq!(reach[3].as_f64(), Some(0.0), "one has to scroll sideways");

    rig.click("watch-write").await;
    rig.wait_until(
        "the first field has the keyboard",
        "document.activeElement?.dataset.testid === 'value-0'",
    )
    .await;
    rig.fill("value-0", "20,5").await;
    rig.fill("value-1", "20,4").await;
    rig.reload().await;
    rig.by_id("reading-row-1").await;
    let kept = rig
        .js(
            "return document.querySelector('[data-testid=value-1]').value;",
            vec![],
        )
        .await;
    assert_eq!(kept, "20,4");
    rig.close().await;
}

#[tokio::test]
async fn a_held_step_ends_by_itself_and_rests_before_the_next() {
    let rig = Rig::open(PHONE).await;
    new_call(&rig, "T-41").await;
    rig.click("quick-held-forward").await;
    rig.by_id("reading-row-3").await;
    press(&rig, "alone-pressure-build-up-no").await;
    rig.wait_until(
        "the precautions are there",
        "!!document.querySelector('[data-testid^=\"precaution-\"]')",
    )
    .await;
    tick_all(&rig).await;
    rig.click("watch-0").await;
    rig.by_id("hold-start").await;
    assert!(rig.text("hold-basis").await.contains("common practice"));
    look(&rig, "watch-held", PHONE).await;
    rig.click("hold-start").await;
    rig.by_id("hold-left").await;
    skip(&rig, 6).await;
    rig.by_id("hold-rest").await;
    look(&rig, "watch-rest", PHONE).await;
    rig.click("watch-next").await;
    rig.by_id("hold-rest").await;
    assert!(
        !rig.has("hold-start").await,
        "no hold before the rest is over"
    );
    skip(&rig, 61).await;
    rig.by_id("hold-start").await;
    // A restart takes the ticks back in one touch, here too.
    rig.click("watch-restarted").await;
    rig.by_id("watch-closed").await;
    rig.click("watch-close").await;
    rig.wait_until(
        "its fields are closed",
        "!document.querySelector('[data-testid=value-0]')",
    )
    .await;
    rig.close().await;
}

#[tokio::test]
async fn a_jug_gives_a_flow_that_the_report_tells_with_litres_and_seconds() {
    let rig = Rig::open(PHONE).await;
    new_call(&rig, "T-41").await;
    rig.click("quick-motor-drain").await;
    rig.by_id("reading-row-0").await;
    tick_all(&rig).await;
    open(&rig, "jug-volume-0").await;
    rig.fill("jug-volume-0", "2").await;
    rig.fill("jug-time-0", "31").await;
    rig.wait_until(
        "the flow stands in the reading",
        "document.querySelector('[data-testid=value-0]').value === '3.87'",
    )
    .await;
    look(&rig, "jug", PHONE).await;
    rig.fill("jug-time-0", "8").await;
    rig.by_id("jug-error-0").await;
    rig.wait_until(
        "what overflows is no reading",
        "document.querySelector('[data-testid=value-0]').value === ''",
    )
    .await;
    rig.fill("jug-time-0", "31").await;
    rig.wait_until(
        "it is saved",
        "document.querySelector('[data-testid=save-state]').innerText.includes('Saved')",
    )
    .await;
    rig.reload().await;
    rig.by_id("reading-row-0").await;
    let time = rig
        .js(
            "return document.querySelector('[data-testid=jug-time-0]').value;",
            vec![],
        )
        .await;
    assert_eq!(time, "31");
    let call = rig.js("return location.hash;", vec![]).await;
    let call = call
        .as_str()
        .unwrap_or_default()
        .trim_start_matches('#')
        .to_owned();
    rig.go(&format!("{call}/report")).await;
    rig.wait_for_text("jug and watch: 2").await;
    rig.close().await;
}

#[tokio::test]
async fn figures_go_in_with_large_keys_and_every_screen_has_its_way_back() {
    let rig = Rig::open(PHONE).await;
    new_call(&rig, "T-41").await;
    rig.click("quick-charge-neutral").await;
    rig.by_id("reading-row-1").await;
    let call = rig.js("return location.hash;", vec![]).await;
    let call = call
        .as_str()
        .unwrap_or_default()
        .trim_start_matches('#')
        .to_owned();

    rig.go("/settings").await;
    rig.by_id("settings-screen").await;
    press(&rig, "own-keys-here").await;
    rig.by_id("undo-here").await;
    rig.click("undo-here").await;
    rig.wait_until(
        "the setting is taken back",
        "document.querySelector('[data-testid=own-keys-device]').checked",
    )
    .await;
    press(&rig, "own-keys-here").await;

    rig.go(&call).await;
    rig.click("value-0").await;
    rig.by_id("keypad").await;
    let keys = rig
        .js(
            "const keys = [...document.querySelectorAll('.pad-key')].map(key => key.getBoundingClientRect());
            const field = document.querySelector('[data-testid=value-0]').getBoundingClientRect();
            const pad = document.querySelector('.pad').getBoundingClientRect();
            return [Math.min(...keys.map(key => Math.min(key.width, key.height))), Math.max(...keys.map(key => key.bottom)) - window.innerHeight,
                pad.top - field.bottom];",
            vec![],
        )
        .await;
    assert!(keys[0].as_f64() >= Some(56.0), "keys of {keys} px");
    assert!(
        keys[1].as_f64() <= Some(0.0) && keys[2].as_f64() >= Some(0.0),
        "keys or field out of sight: {keys}"
    );
    look(&rig, "keys", PHONE).await;
    for key in ["pad-2", "pad-1", "pad-mark", "pad-5"] {
        rig.click(key).await;
    }
    rig.wait_until(
        "the figure stands there",
        "document.querySelector('[data-testid=value-0]').value === '21.5'",
    )
    .await;
    rig.click("pad-next").await;
    rig.wait_until(
        "the next field has them",
        "document.activeElement?.dataset.testid === 'value-1'",
    )
    .await;
    rig.click("pad-nothing").await;
    rig.wait_until(
        "one touch says nothing",
        "document.querySelector('[data-testid=nothing-1]')?.getAttribute('aria-pressed') === 'true'",
    )
    .await;
    rig.close().await;
}
