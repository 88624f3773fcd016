//! How long the page's own thread is held while sets of readings are added and readings are typed, on a processor four times as
//! slow: `bash .ci/bench`.
//! Prints and asserts nothing about time, so it only runs when asked for.

use serde_json::json;

use crate::hands::{paste, press, tick_all, type_in};
use crate::journeys_bench::table;
use crate::rig::{PHONE, Rig};

/// A slow phone beside this machine.
const THROTTLE: u32 = 4;
/// Readings that are typed over, of a demo call with six of them.
const FIELDS: [&str; 3] = ["value-0", "value-1", "value-5"];
/// Sets added to it.
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
/// Puts the long tasks so far aside, as those of coming to a field.
const COME: &str = "(window.paceComing ??= []).push(...window.paceTasks.splice(0)); return true;";
/// What was typed has been drawn.
const SEEN: &str = "requestAnimationFrame(() => requestAnimationFrame(() => arguments[0](true)));";

/// Every row stands as the engine answered.
const ANSWERED: &str = "!document.querySelector('.is-stale')";

/// No sheet waits to be worked out.
const WORKED_OUT: &str = "!document.querySelector('[aria-busy=\"true\"]')";

/// Runs of a tracking sheet: lever and way.
const RUNS: [(&str, &str); 4] = [
    ("half", "forward"),
    ("half", "reverse"),
    ("full", "forward"),
    ("full", "reverse"),
];

/// Brings a control to the middle and tells where to touch it.
const AIM: &str = "const target = document.querySelector(`[data-testid=\"${arguments[0]}\"]`);
    target.scrollIntoView({ block: 'center', behavior: 'instant' });
    const box = target.getBoundingClientRect();
    return [box.x + box.width / 2, box.y + box.height / 2];";

#[tokio::test]
#[ignore = "a benchmark; bash .ci/bench"]
async fn pace() {
    let rig = Rig::open(PHONE).await;
    rig.click("load-demo").await;
    rig.by_id("unit-card").await;
    starts(&rig).await;
    rig.go("/call/demo-v-27").await;
    rig.wait_until(
        "the advice is there",
        "document.querySelector('.next-body')",
    )
    .await;
    rig.wait_until("the answer is there", ANSWERED).await;
    rig.js(WATCH, vec![]).await;
    rig.cdp("Performance.enable", json!({ "timeDomain": "threadTicks" }))
        .await;
    throttle(&rig, THROTTLE).await;
    // As many readings as a long call has.
    let before = work(&rig).await;
    for set in SETS {
        touch(&rig, &format!("quick-{set}")).await;
        rig.wait_until(
            "the set is there",
            &format!("document.querySelector('[data-testid=\"quick-{set}\"]').disabled"),
        )
        .await;
        rig.js_async(SEEN, vec![]).await;
        rig.wait_until("their windows are there", ANSWERED).await;
        rig.js_async(SEEN, vec![]).await;
    }
    let per_set = (work(&rig).await - before) / SETS.len() as f64;
    tell(&rig, "sets of readings added", "a set", per_set).await;

    type_over(&rig, "readings typed", &FIELDS, ANSWERED).await;

    throttle(&rig, 1).await;
    rig.go("/call/demo-v-27/neutral").await;
    rig.by_id("neutral-screen").await;
    tick_all(&rig).await;
    for (field, text) in [("neutral-CreepTurns", "3"), ("neutral-CreepTime", "60")] {
        type_in(&rig, field, text).await;
    }
    press(&rig, "creep-way-forward").await;
    throttle(&rig, THROTTLE).await;
    let fields = ["neutral-CreepTurns", "neutral-Oil"];
    type_over(&rig, "a neutral sheet filled in", &fields, WORKED_OUT).await;

    throttle(&rig, 1).await;
    rig.go("/call/demo-v-14/tracking").await;
    rig.by_id("tracking-screen").await;
    for (at, (lever, travel)) in RUNS.into_iter().enumerate() {
        rig.click("add-run").await;
        rig.by_id(&format!("run-{at}")).await;
        press(&rig, &format!("run-{at}-lever-{lever}")).await;
        press(&rig, &format!("run-{at}-travel-{travel}")).await;
        press(&rig, &format!("run-{at}-load-nothing:-wheels-clear")).await;
        type_in(&rig, &format!("run-{at}-left"), "49,25").await;
        type_in(&rig, &format!("run-{at}-right"), "50,75").await;
    }
    throttle(&rig, THROTTLE).await;
    let fields = ["run-0-left", "run-1-right"];
    type_over(&rig, "tracking runs filled in", &fields, WORKED_OUT).await;

    throttle(&rig, 1).await;
    rig.go("/call/demo-v-14/bench").await;
    rig.by_id("bench-screen").await;
    press(&rig, "bench-paste-text").await;
    paste(&rig, "bench-paste-text", table()).await;
    rig.wait_for_text("Take 12 rows").await;
    rig.click("bench-take").await;
    press(&rig, "bench-charge-none").await;
    press(&rig, "bench-meter-high").await;
    type_in(&rig, "bench-viscosity", "46").await;
    rig.wait_for_text("Derived displacement").await;
    throttle(&rig, THROTTLE).await;
    let fields = ["cell-0-flow", "cell-3-flow"];
    type_over(&rig, "a bench table filled in", &fields, WORKED_OUT).await;
    throttle(&rig, 1).await;
}

/// Loads the page anew and tells when its parts were there. Milliseconds of the clock: to be compared on a quiet machine only.
async fn starts(rig: &Rig) {
    throttle(rig, THROTTLE).await;
    rig.reload().await;
    rig.by_id("unit-card").await;
    let told = rig
        .js(
            "const paint = performance.getEntriesByName('first-contentful-paint')[0];
             const drawn = performance.getEntriesByName('drawn')[0];
             return [Math.round(paint ? paint.startTime : 0), Math.round(drawn ? drawn.startTime : 0)];",
            vec![],
        )
        .await;
    println!(
        "page: start at {THROTTLE} times slower: shell after {} ms, first screen after {} ms",
        told[0], told[1]
    );
    throttle(rig, 1).await;
}

/// Types over fields key by key and tells how long the page was held.
async fn type_over(rig: &Rig, what: &str, fields: &[&str], settled: &str) {
    let before = work(rig).await;
    for field in fields {
        touch(rig, field).await;
        rig.js_async(SEEN, vec![]).await;
        // Scrolling to a field of a long page and touching it is not typing: told apart.
        rig.js(COME, vec![]).await;
        for key in KEYS.chars() {
            press_key(rig, key).await;
            // The next key comes when this one is seen: no thumb is faster.
            rig.js_async(SEEN, vec![]).await;
        }
        // What was worked out is drawn too.
        rig.wait_until("the answer is there", settled).await;
        rig.js_async(SEEN, vec![]).await;
    }
    let keys = (fields.len() * KEYS.len()) as f64;
    let per_key = (work(rig).await - before) / keys;
    tell(rig, what, "a key", per_key).await;
}

async fn throttle(rig: &Rig, rate: u32) {
    let rate = json!({ "rate": rate });
    rig.cdp("Emulation.setCPUThrottlingRate", rate).await;
}

/// Touches a control as a finger does. Not the driver's own click: what that looks for in the page takes longer than the page.
async fn touch(rig: &Rig, testid: &str) {
    rig.js(AIM, vec![json!(testid)]).await;
    // What was scrolled to is drawn, and what is drawn late has taken its place.
    rig.js_async(SEEN, vec![]).await;
    let at = rig.js(AIM, vec![json!(testid)]).await;
    for kind in ["mousePressed", "mouseReleased"] {
        let event =
            json!({ "type": kind, "x": at[0], "y": at[1], "button": "left", "clickCount": 1 });
        rig.cdp("Input.dispatchMouseEvent", event).await;
    }
}

/// Presses a key of the keyboard where the focus is.
async fn press_key(rig: &Rig, key: char) {
    let text = key.to_string();
    for event in [
        json!({ "type": "keyDown", "key": text, "text": text }),
        json!({ "type": "keyUp", "key": text }),
    ] {
        rig.cdp("Input.dispatchKeyEvent", event).await;
    }
}

/// Prints the long tasks since the last time, and what one step took.
async fn tell(rig: &Rig, what: &str, step: &str, per_step: f64) {
    let told = rig
        .js(
            "const most = (list) => Math.round(Math.max(0, ...list));
             const tasks = window.paceTasks.splice(0), events = window.paceEvents.splice(0);
             const coming = (window.paceComing ?? []).splice(0);
             return [tasks.length, most(tasks), most(events), coming.length, most(coming)];",
            vec![],
        )
        .await;
    let number = |place: usize| told[place].as_u64().unwrap_or_default();
    // Tasks are told by the clock, and other programs on the machine lengthen them; processor time is the page's own.
    println!(
        "page: {what} at {THROTTLE} times slower: {} tasks over 50 ms, the longest {} ms; longest event {} ms; {step} takes \
         {per_step:.1} ms of processor time; coming to the fields: {}, the longest {} ms",
        number(0),
        number(1),
        number(2),
        number(3),
        number(4)
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
