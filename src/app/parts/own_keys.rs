//! Whether figures are entered with the app's own large keys, and the key beside a field that says so.

use yew::{Callback, Html, MouseEvent, html};

/// Handed down to every field.
#[derive(Clone, Debug, PartialEq)]
pub struct OwnKeys {
    /// They are wanted.
    pub on: bool,
    /// They are wanted from now on, or no more.
    pub on_change: Callback<bool>,
}

impl OwnKeys {
    /// The key beside a field. It is shown where a finger types, or while the keys are on.
    pub fn toggle(&self, label: &str, testid: &str) -> Html {
        let on = self.on;
        let on_click = self.on_change.reform(move |_: MouseEvent| !on);
        html! {
            <button
                type="button"
                class={if on { "field-keys is-on" } else { "field-keys" }}
                aria-pressed={if on { "true" } else { "false" }}
                aria-label={format!("Large keys for {label}")}
                data-testid={format!("keys-{testid}")}
                onmousedown={Callback::from(|event: MouseEvent| {
                    // The field keeps the focus.
                    event.prevent_default();
                })}
                onclick={on_click}
            >
                <svg class="icon" viewBox="0 0 24 24" width="24" height="24" aria-hidden="true" focusable="false">
                    <path class="fill" d="M4 4h4v4H4ZM10 4h4v4h-4ZM16 4h4v4h-4ZM4 10h4v4H4ZM10 10h4v4h-4ZM16 10h4v4h-4ZM10 16h4v4h-4Z" />
                </svg>
            </button>
        }
    }
}
