//! A machine with two drive paths: its profile says so, left and right are read in turn, and the slow side leads the causes.

use crate::hands::{open, tick_all};
use crate::rig::{PHONE, Rig};

/// The form for a new unit of a class, filled in as far as its profile.
async fn to_the_profile(rig: &Rig, name: &str, class: &str) {
    if rig.has("cautions-read").await {
        rig.click("cautions-read").await;
    }
    if rig.has("new-unit").await {
        rig.click("new-unit").await;
    }
    rig.fill("new-unit-name", name).await;
    rig.click_text(class).await;
    rig.click("open-profile").await;
    rig.by_id("unit-screen").await;
    // The questions may be folded.
    open(rig, "paths").await;
}

fn chosen(paths: &str) -> String {
    format!("document.querySelector('[data-testid=\"paths-{paths}\"]')?.checked === true")
}

#[tokio::test]
async fn on_a_machine_with_two_paths_the_side_that_is_slow_leads() {
    let rig = Rig::open(PHONE).await;
    to_the_profile(&rig, "T-58", "Compact machine, wheels").await;
    rig.wait_until("one path where nobody said more", &chosen("one"))
        .await;
    rig.click_text("Left and right, one charge pump").await;
    rig.wait_until("two paths are chosen", &chosen("shared"))
        .await;
    rig.click("start-call").await;
    rig.by_id("call-screen").await;

    rig.click("quick-speeds").await;
    rig.by_id("reading-row-3").await;
    tick_all(&rig).await;
    // Left, right, left, right: forward, then reverse; the right 8 % low both ways.
    for (number, name, value) in [
        (0, "Left wheel speed", "120"),
        (1, "Right wheel speed", "110,4 rpm"),
        (2, "Left wheel speed", "119"),
        (3, "Right wheel speed", "109.5"),
    ] {
        let row = rig.text(&format!("reading-row-{number}")).await;
        assert!(row.contains(name), "{name}: {row}");
        rig.fill(&format!("value-{number}"), value).await;
    }
    for right in ["r2", "r4"] {
        let pair = rig.text(&format!("pair-{right}")).await;
        let pair = pair.replace('\u{202f}', " ");
        assert!(pair.ends_with("rpm lower (−8.0 %)"), "{pair}");
    }
    rig.wait_until(
        "a cause on the right leads",
        "/^Right: /.test(document.querySelector('.causes-lead .causes-name')?.textContent ?? '')",
    )
    .await;
    rig.wait_until(
        "it is saved",
        "document.querySelector('[data-testid=\"save-state\"]').innerText.includes('Saved')",
    )
    .await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");

    rig.reload().await;
    rig.wait_for_app().await;
    rig.by_id("reading-row-3").await;
    let row = rig.text("reading-row-1").await;
    assert!(row.contains("Right wheel speed"), "{row}");
    rig.close().await;
}

#[tokio::test]
async fn a_new_machine_on_tracks_starts_with_two_paths_and_can_be_told_otherwise() {
    let rig = Rig::open(PHONE).await;
    to_the_profile(&rig, "T-59", "Compact machine, tracks").await;
    rig.wait_until("two paths to begin with", &chosen("shared"))
        .await;
    rig.click_text("One pump, one loop").await;
    rig.wait_until("one path is chosen", &chosen("one")).await;
    rig.click("start-call").await;
    rig.by_id("call-screen").await;
    assert!(!rig.has("quick-speeds").await, "asked on one path");
    rig.click("quick-motor-drain").await;
    let row = rig.text("reading-row-0").await;
    assert!(
        !row.contains("Left") && !rig.has("reading-row-1").await,
        "{row}"
    );
    rig.close().await;
}
