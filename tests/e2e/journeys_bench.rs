//! The bench on a laptop: layout, a pasted table, what it comes to, into the profile, and out as a file.

use crate::hands::{look, paste, press, type_in};
use crate::rig::{LAPTOP, PHONE, Rig};

/// A pump of 75 cm³/rev at three speeds and four pressures, as a spreadsheet gives it: tabs, decimal commas, a row of units.
pub fn table() -> String {
    let mut text =
        "Point\tSpeed\tInlet pressure\tOutlet pressure\tFlow\tCase flow\tTorque\tOil temperature\n\
                    \trpm\tbar\tbar\tL/min\tL/min\tNm\t°C\n"
            .to_owned();
    let mut point = 0;
    for n in [900.0_f64, 1500.0, 2200.0] {
        for dp in [60.0_f64, 140.0, 220.0, 300.0] {
            point += 1;
            let flow = 75.0 * n * 1e-3 * (1.0 - 9e-5 * dp) - 0.011 * dp;
            let case = 0.0068 * (dp + 40.0);
            let torque = 75.0 * dp * 0.1 / std::f64::consts::TAU + 3.0 + 0.03 * dp + 0.004 * n;
            let row = format!(
                "{point}\t{n:.0}\t20,0\t{:.0}\t{flow:.2}\t{case:.2}\t{torque:.1}\t50,2\n",
                20.0 + dp
            );
            text.push_str(&row.replace('.', ","));
        }
    }
    text
}

#[tokio::test]
async fn a_pasted_run_becomes_a_judged_sheet_and_goes_into_the_profile() {
    let rig = Rig::open(LAPTOP).await;
    rig.click("load-demo").await;
    rig.wait_for_text("T-14").await;
    rig.go("/call/demo-v-14").await;
    rig.by_id("call-screen").await;
    rig.click("to-bench").await;
    rig.by_id("bench-screen").await;
    rig.wait_for_text("Nothing was judged").await;
    look(&rig, "bench-empty", LAPTOP).await;

    // The table comes first: without a layout no efficiency and no fit.
    press(&rig, "bench-paste-text").await;
    paste(&rig, "bench-paste-text", table()).await;
    rig.wait_for_text("Take 12 rows").await;
    rig.click("bench-take").await;
    rig.wait_for_text("12 points").await;
    rig.wait_for_text("say in which line the flow meter stands")
        .await;

    press(&rig, "bench-charge-none").await;
    press(&rig, "bench-meter-high").await;
    rig.wait_for_text("Derived displacement").await;
    let derived = rig.text("bench-derived").await;
    assert!(
        derived.contains("± ") && derived.contains("cm³/rev"),
        "{derived}"
    );
    assert!(rig.text("bench-fit-flow").await.contains("viscosity"));
    type_in(&rig, "bench-viscosity", "46").await;
    type_in(&rig, "bench-displacement", "75").await;
    rig.wait_for_text("Laminar slip").await;
    type_in(&rig, "bench-rated-speed", "2200").await;
    type_in(&rig, "bench-rated-pressure", "220 bar").await;
    rig.wait_for_text("nearest to the rated one").await;
    assert!(rig.has("bench-map").await);
    look(&rig, "bench-run", LAPTOP).await;

    // A limit of the manual along a curve: it fails, and with the figures read right it passes.
    rig.click("bench-accept-add").await;
    rig.wait_for_text("Not judged yet: choose the point").await;
    rig.choose("bench-accept-0-of", "Case leakage").await;
    press(&rig, "bench-accept-0-scope-curve").await;
    type_in(&rig, "bench-accept-0-from", "60").await;
    type_in(&rig, "bench-accept-0-to", "30").await;
    type_in(&rig, "bench-accept-0-limit", "0,5").await;
    rig.wait_for_text("the higher pressure has to lie over the lower one")
        .await;
    type_in(&rig, "bench-accept-0-to", "300 bar").await;
    type_in(&rig, "bench-accept-0-limit-to", "1,5 L/min").await;
    type_in(&rig, "bench-accept-0-source", "manual, page 31").await;
    rig.wait_for_text("Fails: a figure lies outside its limit")
        .await;
    let came = rig.text("bench-accept-0-came").await;
    assert!(came.starts_with("fail") && came.contains("300"), "{came}");
    type_in(&rig, "bench-accept-0-limit", "1").await;
    type_in(&rig, "bench-accept-0-limit-to", "2,8").await;
    rig.wait_for_text("Passes in what was tested").await;
    let came = rig.text("bench-accept-0-came").await;
    assert!(came.starts_with("pass"), "{came}");
    look(&rig, "bench-limits", LAPTOP).await;

    // A torque that no pump can have: that point is named, and what rests on torque is not judged.
    type_in(&rig, "cell-6-torque", "20").await;
    rig.wait_for_text("Cannot tell: something on the sheet decides nothing")
        .await;
    let out = rig.text("bench-left-out").await;
    assert!(out.contains("Point 7") && out.contains("torque"), "{out}");
    press(&rig, "row-6-out").await;
    rig.wait_for_text("Passes in what was tested").await;

    // A cell that cannot be read is named, and kept over a reload.
    type_in(&rig, "cell-0-flow", "about 60").await;
    rig.wait_for_text("Row 1, Flow").await;
    rig.wait_for_text("Saved").await;
    rig.reload().await;
    rig.by_id("bench-screen").await;
    let kept = "return document.querySelector('[data-testid=\"cell-0-flow\"]').value;";
    assert_eq!(rig.js(kept, vec![]).await.as_str(), Some("about 60"));
    type_in(&rig, "cell-0-flow", "66,5").await;

    // An item of the sheet, judged against the trade's limit.
    type_in(&rig, "bench-item-responseout-found", "3,5 s").await;
    rig.wait_for_text("Fails").await;
    type_in(&rig, "bench-item-responseout-found", "1,2 s").await;
    rig.wait_for_text("Passes in what was tested").await;
    assert!(rig.text("bench-not-tested").await.contains("Loop relief A"));

    press(&rig, "bench-into-profile").await;
    rig.wait_for_text("In the profile, marked as measured")
        .await;
    press(&rig, "bench-csv").await;
    let csv = rig.downloaded("bench-").await;
    assert!(csv.contains("Outlet pressure (bar)"), "{csv}");
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    // With the whole table, a phone does not either.
    rig.set_size(PHONE).await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    rig.set_size(LAPTOP).await;

    // The hand-over report carries the sheet.
    rig.wait_for_text("Saved").await;
    rig.go("/call/demo-v-14/report").await;
    rig.by_id("report-bench").await;
    let section = rig.text("report-bench").await;
    for words in [
        "Verdict: passes in what was tested",
        "Case leakage",
        "manual, page 31",
        "Derived displacement",
        "Not tested",
        "Taken into the unit",
    ] {
        assert!(section.contains(words), "{words:?} is not in {section}");
    }
    look(&rig, "bench-report", LAPTOP).await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    let problems = rig.problems().await;
    assert!(problems.is_empty(), "{problems:?}");
    rig.close().await;
}
