//! Pictures of the built app for looking at: `bash .ci/shots`. Not a test, so it only runs when asked for.

use std::path::{Path, PathBuf};

use crate::rig::{LAPTOP, PHONE, Rig, Scheme, Size, TABLET};

/// `LOWSIDE_SHOTS` names the folder for the pictures; `LOWSIDE_ROUTES` the addresses after `#`, separated by spaces;
/// `LOWSIDE_CLICKS` the `data-testid`s to click first, on the start page (`load-demo`).
#[tokio::test]
#[ignore = "takes pictures; bash .ci/shots"]
async fn shots() {
    let folder =
        PathBuf::from(std::env::var_os("LOWSIDE_SHOTS").expect("LOWSIDE_SHOTS names a folder"));
    std::fs::create_dir_all(&folder).expect("writable");
    let routes = words("LOWSIDE_ROUTES", "/");
    let clicks = words("LOWSIDE_CLICKS", "");

    let rig = Rig::open(PHONE).await;
    for testid in &clicks {
        rig.click(testid).await;
    }
    for route in &routes {
        rig.go(route).await;
        for size in [PHONE, TABLET, LAPTOP] {
            for scheme in [Scheme::Light, Scheme::Dark] {
                shoot(&rig, &folder, route, size, scheme).await;
            }
        }
    }
    let problems = rig.problems().await;
    assert!(
        problems.is_empty(),
        "the browser complains:\n{}",
        problems.join("\n")
    );
}

fn words(variable: &str, default: &str) -> Vec<String> {
    let text = std::env::var(variable).unwrap_or_else(|_| default.to_owned());
    text.split_whitespace().map(str::to_owned).collect()
}

/// One picture of the screen and, where the page goes on below it, one of the whole page.
async fn shoot(rig: &Rig, folder: &Path, route: &str, size: Size, scheme: Scheme) {
    let place = route
        .trim_matches('/')
        .replace(|c: char| !c.is_ascii_alphanumeric(), "-");
    let place = if place.is_empty() {
        "start".to_owned()
    } else {
        place
    };
    let name = |end: &str| folder.join(format!("{place}-{}-{}{end}.png", size.name, scheme.name()));
    rig.set_size(size).await;
    rig.set_scheme(scheme).await;
    rig.js("window.scrollTo(0, 0);", vec![]).await;
    settle(rig).await;
    rig.screenshot(&name("")).await;

    let height = rig
        .js("return document.documentElement.scrollHeight;", vec![])
        .await;
    let height = height
        .as_u64()
        .and_then(|height| u32::try_from(height).ok())
        .unwrap_or(size.height);
    if height > size.height {
        rig.set_size(Size { height, ..size }).await;
        settle(rig).await;
        rig.screenshot(&name("-full")).await;
    }
}

/// Lets the page draw twice, and the app finish what it computes, where it says so with `aria-busy`.
async fn settle(rig: &Rig) {
    let drawn = "requestAnimationFrame(() => requestAnimationFrame(() => arguments[0](true)));";
    rig.js_async(drawn, vec![]).await;
    rig.wait_until(
        "nothing is busy",
        "!document.querySelector('[aria-busy=true]')",
    )
    .await;
}
