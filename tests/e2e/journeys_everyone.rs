//! Every screen by axe-core, the rules of WCAG 2.2 AA with target size, at four widths and in every theme: no violation.

use serde_json::Value;

use crate::hands::press;
use crate::rig::{LAPTOP, NARROW, PHONE, Rig, Scheme, Size, TABLET};

/// A phone held across.
const ON_ITS_SIDE: Size = Size {
    name: "a phone on its side",
    width: 740,
    height: 360,
};
/// A laptop whose browser shows everything twice as large (WCAG 2.2, 1.4.4): half the room.
const ENLARGED: Size = Size {
    name: "a laptop at 200 %",
    width: 683,
    height: 384,
};

/// The script, which `.ci/setup` brings.
fn axe() -> String {
    let path = std::env::var_os("LOWSIDE_AXE")
        .expect("LOWSIDE_AXE names axe.min.js; setup_axe of .ci/setup brings it");
    std::fs::read_to_string(path).expect("axe-core is readable")
}

/// Runs the rules on the page as it stands; gives back what is violated, a line each.
async fn violations(rig: &Rig, script: &str) -> Vec<String> {
    // Loaded anew after each navigation.
    rig.js(
        &format!("if (!window.axe) {{ {script} }} return true;"),
        vec![],
    )
    .await;
    let run = "const done = arguments[arguments.length - 1];
        axe.run(document, {
            runOnly: { type: 'tag', values: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'] },
            rules: { 'target-size': { enabled: true } },
            resultTypes: ['violations'],
        }).then(
            found => done(found.violations.flatMap(rule => rule.nodes.slice(0, 4).map(node =>
                rule.id + ': ' + node.target.join(' ') + ' | ' + (node.any.concat(node.all, node.none)[0] || {}).message))),
            why => done(['axe did not run: ' + why]));";
    let found = rig.js_async(run, vec![]).await;
    let lines = found.as_array().cloned().unwrap_or_default();
    lines
        .iter()
        .map(|line| line.as_str().unwrap_or("not told").to_owned())
        .collect()
}

fn none(violations: &[String]) {
    assert!(
        violations.is_empty(),
        "{} violations:\n{}",
        violations.len(),
        violations.join("\n")
    );
}

/// The page as it stands, at every width and in every theme.
async fn seen_by_everyone(rig: &Rig, script: &str, what: &str) -> Vec<String> {
    let mut all = Vec::new();
    for size in [NARROW, PHONE, TABLET, LAPTOP] {
        rig.set_size(size).await;
        for theme in ["light", "dark", "sun"] {
            let scheme = if theme == "dark" {
                Scheme::Dark
            } else {
                Scheme::Light
            };
            // Colours hang on the theme and not on the width: each theme once, each width once.
            if size.name != PHONE.name && theme != "light" {
                continue;
            }
            rig.set_scheme(scheme).await;
            let set = "if (arguments[0] === 'sun') { document.documentElement.setAttribute('data-theme', 'sun'); }
                else { document.documentElement.removeAttribute('data-theme'); }
                return true;";
            rig.js(set, vec![Value::from(theme)]).await;
            for line in violations(rig, script).await {
                all.push(format!("{what} at {} px, {theme}: {line}", size.width));
            }
        }
    }
    rig.js(
        "document.documentElement.removeAttribute('data-theme'); return true;",
        vec![],
    )
    .await;
    all
}

#[tokio::test]
async fn the_watch_view_and_the_large_keys_shut_nobody_out() {
    let script = axe();
    let rig = Rig::open(PHONE).await;
    rig.click("load-demo").await;
    rig.wait_for_text("T-14").await;
    rig.go("/call/demo-v-14").await;
    rig.by_id("call-screen").await;
    press(&rig, "quick-held-forward").await;
    rig.wait_until(
        "the precautions are there",
        "!!document.querySelector('[data-testid^=\"precaution-\"]')",
    )
    .await;
    // Forward and reverse stand on the page, each with its own round of ticks: those of the first.
    rig.wait_until(
        "the ticks of one round are set",
        "(() => {
            const first = document.querySelector('[data-testid^=\"precaution-pressure-build-up\"]').closest('.gate-item');
            const open = [...first.querySelectorAll('[data-testid^=\"precaution-\"]')].find(box => !box.checked);
            open?.click();
            return !open;
        })()",
    )
    .await;
    let watch = "[...document.querySelectorAll('.group-watch')].at(-1).click(); return true;";
    rig.js(watch, vec![]).await;
    rig.by_id("hold-start").await;
    let mut all = seen_by_everyone(&rig, &script, "the watch view").await;
    rig.click("hold-start").await;
    rig.by_id("hold-left").await;
    all.extend(seen_by_everyone(&rig, &script, "the watch view, held").await);
    rig.set_size(PHONE).await;
    rig.click("watch-close").await;

    rig.go("/settings").await;
    press(&rig, "own-keys-here").await;
    rig.go("/call/demo-v-14").await;
    let field = "[...document.querySelectorAll('[data-figure]')].find(field => field.offsetParent).focus(); return true;";
    rig.js(field, vec![]).await;
    rig.by_id("keypad").await;
    all.extend(seen_by_everyone(&rig, &script, "the large keys").await);
    rig.click("pad-unit").await;
    all.extend(seen_by_everyone(&rig, &script, "the large keys, units").await);
    none(&all);
    rig.close().await;
}

/// What one sees while the rest of the app is on its way, or does not come.
#[tokio::test]
async fn waiting_for_the_rest_of_the_app_shuts_nobody_out() {
    let script = axe();
    let rig = Rig::new(PHONE).await;
    let parts =
        ["split_house.wasm", "split_rooms.wasm"].map(|part| rig.site.file_below("snippets", part));
    for part in &parts {
        rig.site.break_off(part);
    }
    rig.load().await;
    rig.by_id("front-screen").await;
    let mut all = seen_by_everyone(&rig, &script, "the first screen alone").await;
    rig.set_size(PHONE).await;
    rig.click("load-demo").await;
    rig.by_id("front-trouble").await;
    all.extend(seen_by_everyone(&rig, &script, "the first screen, no connection").await);
    rig.set_size(PHONE).await;
    rig.site.mend();
    rig.site.break_off(&parts[1]);
    rig.click("load-demo").await;
    rig.by_id("unit-card").await;
    rig.go("/settings").await;
    rig.by_id("room-trouble").await;
    all.extend(seen_by_everyone(&rig, &script, "a screen that did not come").await);
    none(&all);
}

#[tokio::test]
async fn no_screen_shuts_anybody_out() {
    let script = axe();
    let rig = Rig::open(PHONE).await;
    rig.click("load-demo").await;
    rig.wait_for_text("T-14").await;
    let mut all = Vec::new();
    for route in [
        "/units",
        "/unit/demo-t-14",
        "/call/demo-v-14",
        "/call/demo-v-14/neutral",
        "/call/demo-v-14/tracking",
        "/call/demo-v-14/bench",
        "/unit/demo-t-14/wear",
        "/learned",
        "/settings",
        "/call/demo-v-27/report",
        "/call/demo-y-52-8",
        "/call/demo-y-52-8/report",
        "/unit/demo-t-52/wear",
        "/unit/demo-t-27/tag",
        "/tag",
    ] {
        rig.go(route).await;
        // Everything that is folded is looked at too.
        rig.js(
            "document.querySelectorAll('details').forEach(fold => { fold.open = true; }); return true;",
            vec![],
        )
        .await;
        all.extend(seen_by_everyone(&rig, &script, route).await);
        // Everything is reached without scrolling sideways: on the narrowest phone, on its side, and on a laptop at 200 %.
        for size in [NARROW, ON_ITS_SIDE, ENLARGED] {
            rig.set_size(size).await;
            if rig.scrolls_sideways().await {
                all.push(format!("{route} scrolls sideways, {}", size.name));
            }
        }
        rig.set_size(PHONE).await;
    }
    none(&all);
    rig.close().await;
}
