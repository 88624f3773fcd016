//! What several journeys do: look, open, press, type.

use std::path::PathBuf;

use crate::rig::{LAPTOP, PHONE, Rig, Scheme, Size, TABLET};

/// With `LOWSIDE_SHOTS` set, the screen as it is now, at three sizes, light and dark.
pub async fn look(rig: &Rig, name: &str, back_to: Size) {
    let Some(folder) = std::env::var_os("LOWSIDE_SHOTS").map(PathBuf::from) else {
        return;
    };
    std::fs::create_dir_all(&folder).expect("writable");
    for size in [PHONE, TABLET, LAPTOP] {
        for scheme in [Scheme::Light, Scheme::Dark] {
            rig.set_size(size).await;
            rig.set_scheme(scheme).await;
            let height = rig
                .js(
                    // What lies over the whole screen is as high as the screen.
                    "return document.querySelector('dialog[open]') ? window.innerHeight : document.documentElement.scrollHeight;",
                    vec![],
                )
                .await;
            let height = height
                .as_u64()
                .and_then(|h| u32::try_from(h).ok())
                .unwrap_or(size.height);
            rig.set_size(Size { height, ..size }).await;
            let file = format!("{name}-{}-{}.png", size.name, scheme.name());
            rig.screenshot(&folder.join(file)).await;
        }
    }
    rig.set_size(back_to).await;
}

/// Opens every fold round an element.
pub async fn open(rig: &Rig, testid: &str) {
    let script = "for (let at = document.querySelector(`[data-testid=\"${arguments[0]}\"]`); at; at = at.parentElement) {
            if (at.tagName === 'DETAILS') { at.open = true; }
        }
        return true;";
    rig.js(script, vec![testid.into()]).await;
}

/// Presses what may stand in a fold.
pub async fn press(rig: &Rig, testid: &str) {
    open(rig, testid).await;
    // The radio button itself is not drawn: its label is.
    let script =
        "document.querySelector(`[data-testid=\"${arguments[0]}\"]`).click(); return true;";
    rig.js(script, vec![testid.into()]).await;
}

/// Types into a field that may stand in a fold.
pub async fn type_in(rig: &Rig, testid: &str, text: &str) {
    open(rig, testid).await;
    rig.fill(testid, text).await;
}

/// Ticks every fact that a gate asks for, as a person would: one after the other.
pub async fn tick_all(rig: &Rig) {
    loop {
        let script = "const open = [...document.querySelectorAll('[data-testid^=\"precaution-\"]')].find((box) => !box.checked);
            if (!open) { return false; }
            open.click();
            return open.dataset.testid;";
        let ticked = rig.js(script, vec![]).await;
        let Some(id) = ticked.as_str() else { return };
        rig.wait_until(
            &format!("{id} is ticked"),
            &format!("(document.querySelector('[data-testid=\"{id}\"]')?.checked ?? true)"),
        )
        .await;
    }
}

/// Puts a text into a text area as the clipboard does.
pub async fn paste(rig: &Rig, testid: &str, text: String) {
    let fill = "const box = document.querySelector(`[data-testid=\"${arguments[0]}\"]`);
        Object.getOwnPropertyDescriptor(HTMLTextAreaElement.prototype, 'value').set.call(box, arguments[1]);
        box.dispatchEvent(new InputEvent('input', { bubbles: true }));
        return true;";
    rig.js(fill, vec![testid.into(), text.into()]).await;
}

/// A call on a new unit.
pub async fn new_call(rig: &Rig, name: &str) {
    if rig.has("cautions-read").await {
        rig.click("cautions-read").await;
    }
    if rig.has("new-unit").await {
        rig.click("new-unit").await;
    }
    rig.fill("new-unit-name", name).await;
    rig.click_text("Roller").await;
    rig.click("start-call").await;
    rig.by_id("call-screen").await;
}
