//! Straight tracking of a machine on tracks: steps, runs, what may be said and what not, and what is kept.

use crate::hands::{look, open, press, type_in};
use crate::rig::{PHONE, Rig};

/// A count of both sides in this setting, as the next run.
async fn count(rig: &Rig, at: usize, lever: &str, travel: &str, left: &str, right: &str) {
    rig.click("add-run").await;
    rig.by_id(&format!("run-{at}")).await;
    press(rig, &format!("run-{at}-lever-{lever}")).await;
    press(rig, &format!("run-{at}-travel-{travel}")).await;
    press(rig, &format!("run-{at}-load-nothing:-wheels-clear")).await;
    type_in(rig, &format!("run-{at}-left"), left).await;
    type_in(rig, &format!("run-{at}-right"), right).await;
}

#[tokio::test]
async fn a_null_is_told_from_a_bend_once_turns_are_counted() {
    let rig = Rig::open(PHONE).await;
    rig.click("load-demo").await;
    rig.wait_for_text("T-14").await;
    rig.go("/call/demo-v-14").await;
    rig.by_id("call-screen").await;
    rig.click("to-tracking").await;
    rig.by_id("tracking-screen").await;
    rig.wait_for_text("No run counts yet").await;
    look(&rig, "tracking-empty", PHONE).await;

    // A path without a width does not count, and says why; with it one bend proves nothing.
    rig.click("add-run").await;
    rig.by_id("run-0").await;
    open(&rig, "run-0-what").await;
    rig.choose("run-0-what", "Path on a lane").await;
    type_in(&rig, "run-0-distance", "10 m").await;
    type_in(&rig, "run-0-aside", "45 cm").await;
    rig.wait_for_text("say to which side it went").await;
    press(&rig, "run-0-hand-left").await;
    rig.wait_for_text("needs the track width").await;
    type_in(&rig, "tracking-track", "1,5").await;
    rig.wait_for_text("1 of 1 count").await;
    rig.wait_for_text("Nothing is proved yet").await;
    assert!(rig.has("next-run").await);

    // Turns: right 0.6 more than half of it forward, 0.6 less in reverse, at any lever.
    press(&rig, "run-0-remove").await;
    count(&rig, 0, "half", "forward", "49,25", "50,75").await;
    count(&rig, 1, "half", "reverse", "50.75", "49.25").await;
    count(&rig, 2, "full", "forward", "99.25", "100.75").await;
    count(&rig, 3, "full", "reverse", "100.75", "99.25").await;
    count(&rig, 4, "low", "forward", "24.25", "25.75").await;
    rig.wait_for_text("5 of 5 count").await;
    rig.by_id("do-Null").await;
    assert!(rig.text("do-Null").await.contains("right faster"));
    assert!(rig.has("plan-view").await);
    look(&rig, "tracking-null", PHONE).await;

    // Counted by thumb: both counts become a run of their own.
    for side in ["left", "right"] {
        for _ in 0..3 {
            press(&rig, &format!("count-{side}-tap")).await;
        }
    }
    press(&rig, "take-counts").await;
    rig.by_id("run-5").await;
    press(&rig, "run-5-remove").await;
    rig.wait_for_text("5 of 5 count").await;

    // What cannot be read stays as it was typed, over a reload too.
    type_in(&rig, "run-4-left", "24 and a bit").await;
    rig.wait_for_text("4 of 5 count").await;
    rig.wait_for_text("Saved").await;
    rig.reload().await;
    rig.by_id("tracking-screen").await;
    let kept = rig
        .js(
            "return document.querySelector('[data-testid=\"run-4-left\"]').value;",
            vec![],
        )
        .await;
    assert_eq!(kept.as_str(), Some("24 and a bit"));
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    rig.close().await;
}
