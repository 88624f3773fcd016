//! The end of a call: nothing is left open on the machine, what was found is kept, and the next call shows what was read.

use crate::hands::new_call;
use crate::rig::{PHONE, Rig};

/// A unit and its call, with one charge pressure typed in.
async fn a_call_with_one_reading(rig: &Rig) {
    new_call(rig, "T-52").await;
    rig.click("quick-charge-neutral").await;
    rig.fill("value-0", "21.5").await;
}

async fn wait_until_saved(rig: &Rig) {
    rig.wait_until(
        "it is saved",
        "document.querySelector('[data-testid=\"save-state\"]').innerText.includes('Saved')",
    )
    .await;
}

#[tokio::test]
async fn a_call_is_closed_with_everything_put_back_and_the_next_one_knows_what_was_read() {
    let rig = Rig::open(PHONE).await;
    a_call_with_one_reading(&rig).await;
    rig.wait_for_text("Charge port plugged").await;
    let disabled = "document.querySelector('[data-testid=\"close-call\"]').disabled";
    rig.wait_until("it cannot be closed yet", disabled).await;

    rig.click("put-back-0").await;
    rig.choose("close-cause", "Charge pump worn").await;
    rig.click_text("Proved").await;
    rig.fill("close-proof", "Return flow low at both speeds")
        .await;
    rig.fill("close-done", "Charge pump changed").await;
    rig.fill("close-parts", "Charge pump, shaft seal").await;
    wait_until_saved(&rig).await;

    // Half-way through, the phone drops the page.
    rig.reload().await;
    rig.wait_for_app().await;
    rig.wait_until(
        "what was entered is there again",
        "document.querySelector('[data-testid=\"close-parts\"]')?.value === 'Charge pump, shaft seal'",
    )
    .await;
    rig.wait_until("it can be closed", &format!("!{disabled}"))
        .await;
    rig.click("close-call").await;
    rig.by_id("closed").await;
    let told = rig.text("close").await;
    for words in ["Charge pump worn, proved", "Charge pump changed"] {
        assert!(told.contains(words), "{words}: {told}");
    }
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    wait_until_saved(&rig).await;

    // The next call on the unit.
    rig.go("/units").await;
    rig.wait_for_text("Found: Charge pump worn").await;
    rig.click("start-call").await;
    rig.click("quick-charge-neutral").await;
    let last = rig.text("last-time-0").await;
    assert!(last.contains("21.5"), "{last}");
    rig.close().await;
}
