//! The neutral of a call: from the creep to the null, with nothing typed lost.

use crate::hands::press;
use crate::rig::{NARROW, PHONE, Rig};

/// A call of the demonstration yard on a unit with a manual spool and feedback.
const CALL: &str = "/call/demo-v-27/neutral";

/// Ticks every precaution in sight, as somebody would who has seen each.
async fn tick_all(rig: &Rig) {
    rig.wait_until(
        "every precaution is ticked",
        "(() => { const open = [...document.querySelectorAll('[data-testid^=precaution-]')].find((box) => !box.checked); \
         if (open) { open.click(); } return !open; })()",
    )
    .await;
}

async fn open_steps(rig: &Rig) {
    rig.js(
        "document.querySelectorAll('.neutral-step').forEach((step) => { step.open = true; });",
        vec![],
    )
    .await;
}

async fn start(rig: &Rig) {
    rig.click("load-demo").await;
    rig.wait_for_text("T-27").await;
    rig.go(CALL).await;
    rig.by_id("neutral-screen").await;
    open_steps(rig).await;
}

#[tokio::test]
async fn creep_is_asked_after_the_precautions_and_gives_an_offset() {
    let rig = Rig::open(PHONE).await;
    start(&rig).await;
    assert!(
        rig.has("shut-linkage-off").await,
        "open without precautions"
    );
    assert!(!rig.has("neutral-CreepTurns").await);
    tick_all(&rig).await;
    rig.fill("neutral-CreepTurns", "3x").await;
    rig.fill("neutral-CreepTime", "60").await;
    rig.wait_for_text("Saved").await;
    rig.reload().await;
    rig.by_id("neutral-screen").await;
    open_steps(&rig).await;
    let kept = rig
        .js(
            "return document.querySelector('[data-testid=neutral-CreepTurns]').value;",
            vec![],
        )
        .await;
    assert_eq!(kept, "3x", "what cannot be read is gone");
    rig.fill("neutral-CreepTurns", "3").await;
    open_steps(&rig).await;
    press(&rig, "creep-way-forward").await;
    rig.wait_for_text("The swash stands off by").await;
    rig.by_id("offset-scale").await;
    let problems = rig.problems().await;
    assert!(problems.is_empty(), "{}", problems.join("\n"));
    rig.close().await;
}

#[tokio::test]
async fn starts_both_ways_give_the_turns_to_the_null() {
    let rig = Rig::open(NARROW).await;
    start(&rig).await;
    tick_all(&rig).await;
    for (place, turns, way) in [(1, "0,5", "starts-forward"), (2, "-0,1", "starts-reverse")] {
        rig.click("add-place").await;
        rig.fill(&format!("place-{place}-turns"), turns).await;
        press(&rig, &format!("place-{place}-seen-{way}")).await;
    }
    rig.wait_for_text("Turn 0.30 turns in from the last place")
        .await;
    rig.by_id("adjuster-plot").await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    rig.close().await;
}
