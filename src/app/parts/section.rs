//! A part of a screen under its own heading: open where there is room, folded to one line with its state on a phone.

use yew::{AttrValue, Children, Html, Properties, component, html, use_memo};

/// From this width on sections stand open.
const WIDE: &str = "(min-width: 47.5rem)";

/// Properties of [`Section`].
#[derive(Clone, PartialEq, Properties)]
pub struct SectionProps {
    /// DOM id; unique on the page. Also the test id.
    pub id: AttrValue,
    /// Heading.
    pub title: AttrValue,
    /// How it stands, in a few words: "6 of 14 answered".
    #[prop_or_default]
    pub state: AttrValue,
    /// Open on a phone too.
    #[prop_or_default]
    pub is_open: bool,
    /// What is in it.
    #[prop_or_default]
    pub children: Children,
}

fn is_wide() -> bool {
    web_sys::window()
        .and_then(|window| window.match_media(WIDE).ok().flatten())
        .is_none_or(|query| query.matches())
}

/// The section.
#[component]
pub fn Section(props: &SectionProps) -> Html {
    // Decided once: afterwards it is the person's.
    let is_open = use_memo((), |()| props.is_open || is_wide());
    html! {
        <details class="section panel" id={props.id.clone()} open={*is_open} data-testid={props.id.clone()}>
            <summary>
                <h2>{ props.title.clone() }</h2>
                if !props.state.is_empty() {
                    <span class="section-state">{ props.state.clone() }</span>
                }
            </summary>
            <div class="stack">{ props.children.clone() }</div>
        </details>
    }
}
