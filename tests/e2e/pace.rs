//! How long the page's own thread is held while readings are typed, on a processor four times as slow: `bash .ci/bench`.
//! Prints and asserts nothing about time, so it only runs when asked for.

use serde_json::json;
use thirtyfour::prelude::*;

use crate::rig::{PHONE, Rig};

/// A slow phone beside this machine.
const THROTTLE: u32 = 4;
/// Readings that are typed over, of a demo call with six of them.
const FIELDS: [&str; 3] = ["value-0", "value-1", "value-3"];
/// Typed key by key, as by a thumb.
const KEYS: &str = "123.4";

/// Long tasks (50 ms and more) with their moment, and the longest work on one input event.
const WATCH: &str = "window.paceTasks = []; window.paceEvents = [];
    new PerformanceObserver((list) => { for (const e of list.getEntries()) { window.paceTasks.push(e.duration); } })
        .observe({ type: 'longtask' });
    new PerformanceObserver((list) => { for (const e of list.getEntries()) {
        window.paceEvents.push(e.processingEnd - e.processingStart); } })
        .observe({ type: 'event', durationThreshold: 16 });";
#[tokio::test]
#[ignore = "a benchmark; bash .ci/bench"]
async fn pace() {
    let rig = Rig::open(PHONE).await;
    rig.click("load-demo").await;
    rig.by_id("unit-card").await;
    rig.go("/call/demo-v-27").await;
    rig.wait_until(
        "the advice is there",
        "document.querySelector('.next-body')",
    )
    .await;
    rig.js(WATCH, vec![]).await;
    rig.cdp(
        "Emulation.setCPUThrottlingRate",
        json!({ "rate": THROTTLE }),
    )
    .await;
    for field in FIELDS {
        let element = rig.by_id(field).await;
        element.click().await.expect("the field takes the focus");
        element
            .send_keys(Key::Control + "a")
            .await
            .expect("the field takes keys");
        for key in KEYS.chars() {
            element
                .send_keys(key.to_string())
                .await
                .expect("the field takes keys");
        }
        // The answer of the worker is drawn too.
        rig.wait_until(
            "the answer is there",
            "!document.querySelector('.causes-updating')",
        )
        .await;
    }
    rig.cdp("Emulation.setCPUThrottlingRate", json!({ "rate": 1 }))
        .await;
    let told = rig
        .js(
            "const most = (list) => Math.round(Math.max(0, ...list));
             return [window.paceTasks.length, most(window.paceTasks), most(window.paceEvents)];",
            vec![],
        )
        .await;
    let number = |place: usize| told[place].as_u64().unwrap_or_default();
    println!(
        "page: readings typed at {THROTTLE} times slower: {} tasks over 50 ms, the longest {} ms; longest event {} ms",
        number(0),
        number(1),
        number(2)
    );
}
