//! How long the page's own thread is held while readings are typed, on a processor four times as slow: `bash .ci/bench`.
//! Prints and asserts nothing about time, so it only runs when asked for.

use serde_json::json;

use crate::rig::{PHONE, Rig};

/// A slow phone beside this machine.
const THROTTLE: u32 = 4;
/// Readings that are typed over, of a demo call with six of them.
const FIELDS: [&str; 3] = ["value-0", "value-1", "value-5"];
/// Sets added to it first.
const SETS: [&str; 4] = ["charge-drive", "knee", "case", "motor-drain"];
/// Typed key by key, as by a thumb.
const KEYS: &str = "123.4";

/// Long tasks (50 ms and more) with their moment, and the longest work on one input event.
const WATCH: &str = "window.paceTasks = []; window.paceEvents = [];
    new PerformanceObserver((list) => { for (const e of list.getEntries()) { window.paceTasks.push(e.duration); } })
        .observe({ type: 'longtask' });
    new PerformanceObserver((list) => { for (const e of list.getEntries()) {
        window.paceEvents.push(e.processingEnd - e.processingStart); } })
        .observe({ type: 'event', durationThreshold: 16 });";
/// What was typed has been drawn.
const SEEN: &str = "requestAnimationFrame(() => requestAnimationFrame(() => arguments[0](true)));";

/// Every row stands as the engine answered.
const ANSWERED: &str = "!document.querySelector('.is-stale')";

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
    // As many readings as a long call has.
    for set in SETS {
        rig.click(&format!("quick-{set}")).await;
    }
    rig.wait_until("their windows are there", ANSWERED).await;
    rig.js(WATCH, vec![]).await;
    rig.cdp("Performance.enable", json!({ "timeDomain": "threadTicks" }))
        .await;
    rig.cdp(
        "Emulation.setCPUThrottlingRate",
        json!({ "rate": THROTTLE }),
    )
    .await;
    let before = work(&rig).await;
    for field in FIELDS {
        let element = rig.by_id(field).await;
        rig.js(
            "arguments[0].scrollIntoView({ block: 'center', behavior: 'instant' });",
            vec![element.to_json().expect("an element")],
        )
        .await;
        element.click().await.expect("the field takes the focus");
        for key in KEYS.chars() {
            element
                .send_keys(key.to_string())
                .await
                .expect("the field takes keys");
            // The next key comes when this one is seen: no thumb is faster.
            rig.js_async(SEEN, vec![]).await;
        }
        // The answer of the worker is drawn too.
        rig.wait_until("the answer is there", ANSWERED).await;
    }
    let keys = (FIELDS.len() * KEYS.len()) as f64;
    let per_key = (work(&rig).await - before) / keys;
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
    // Tasks are told by the clock, and other programs on the machine lengthen them; processor time is the page's own.
    println!(
        "page: readings typed at {THROTTLE} times slower: {} tasks over 50 ms, the longest {} ms; longest event {} ms; a key takes \
         {per_key:.1} ms of processor time",
        number(0),
        number(1),
        number(2)
    );
}

/// Processor time that scripts, styles and layout have taken on the page's own thread so far, ms.
async fn work(rig: &Rig) -> f64 {
    const PARTS: [&str; 3] = ["ScriptDuration", "RecalcStyleDuration", "LayoutDuration"];
    let answer = rig.cdp("Performance.getMetrics", json!({})).await;
    let parts = answer["metrics"].as_array().into_iter().flatten();
    let parts = parts.filter(|part| {
        part["name"]
            .as_str()
            .is_some_and(|name| PARTS.contains(&name))
    });
    parts.filter_map(|part| part["value"].as_f64()).sum::<f64>() * 1000.0
}
