//! Whether the screen is as the style sheets ask, for what is not worth making where it would not be shown.

use super::listen::Listener;
use web_sys::MediaQueryList;
use yew::{hook, use_effect_with, use_state};

fn query(text: &str) -> Option<MediaQueryList> {
    web_sys::window()?.match_media(text).ok()?
}

/// Whether a media query holds, followed while the component lives. What cannot be asked counts as holding: rather made for
/// nothing than missing.
#[hook]
pub fn use_media(text: &'static str) -> bool {
    let holds = use_state(|| query(text).is_none_or(|list| list.matches()));
    let told = holds.clone();
    use_effect_with(text, move |text| {
        let listener = query(text).and_then(|list| {
            let asked = list.clone();
            Listener::at(list, "change", move |_| told.set(asked.matches()))
        });
        move || drop(listener)
    });
    *holds
}
