//! A sentence of ours, its figures in the reader's units too.

use crate::quantity::{UnitPrefs, retold};
use yew::{AttrValue, Html, Properties, component, html, use_context};

/// Properties of [`Retold`].
#[derive(Clone, PartialEq, Properties)]
pub struct RetoldProps {
    /// The sentence.
    pub text: AttrValue,
}

/// The sentence. The units come from the app round it; without one it stands as it is written.
#[component]
pub fn Retold(props: &RetoldProps) -> Html {
    match use_context::<UnitPrefs>() {
        Some(prefs) => html! { { retold(&props.text, &prefs).into_owned() } },
        None => html! { { props.text.clone() } },
    }
}
