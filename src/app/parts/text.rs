//! Fields for words.

use yew::{AttrValue, Callback, Classes, Html, InputEvent, Properties, TargetCast};
use yew::{classes, component, html};

/// Properties of [`TextField`].
#[derive(Clone, PartialEq, Properties)]
pub struct TextFieldProps {
    /// DOM id; unique on the page.
    pub id: AttrValue,
    /// Visible label.
    pub label: AttrValue,
    /// What it means.
    #[prop_or_default]
    pub hint: AttrValue,
    /// The text.
    pub value: AttrValue,
    /// Every edit.
    pub on_input: Callback<String>,
    /// Several lines.
    #[prop_or_default]
    pub lines: bool,
    /// What is wrong with it; empty where nothing is.
    #[prop_or_default]
    pub error: AttrValue,
    /// Keyboard of the phone: `decimal` for plain figures.
    #[prop_or("text".into())]
    pub inputmode: AttrValue,
    /// Longest text taken by the field.
    #[prop_or(2000)]
    pub maxlength: u32,
    /// For the end-to-end tests.
    #[prop_or_default]
    pub testid: AttrValue,
    /// Extra classes.
    #[prop_or_default]
    pub class: Classes,
}

/// The field.
#[component]
pub fn TextField(props: &TextFieldProps) -> Html {
    let (hint_id, error_id) = (format!("{}-hint", props.id), format!("{}-error", props.id));
    let wrong = !props.error.is_empty();
    let described = [
        (!props.hint.is_empty()).then_some(hint_id.as_str()),
        wrong.then_some(error_id.as_str()),
    ];
    let described = described
        .into_iter()
        .flatten()
        .collect::<Vec<_>>()
        .join(" ");
    let described = (!described.is_empty()).then_some(described);
    let on_line = props.on_input.reform(|event: InputEvent| {
        event
            .target_unchecked_into::<web_sys::HtmlInputElement>()
            .value()
    });
    let on_lines = props.on_input.reform(|event: InputEvent| {
        event
            .target_unchecked_into::<web_sys::HtmlTextAreaElement>()
            .value()
    });
    let maxlength = props.maxlength.to_string();
    html! {
        <div class={classes!("field", wrong.then_some("is-wrong"), props.class.clone())}>
            <label class="field-label" for={props.id.clone()}>{ props.label.clone() }</label>
            if !props.hint.is_empty() {
                <span class="field-hint" id={hint_id.clone()}>{ props.hint.clone() }</span>
            }
            <span class="field-box">
                if props.lines {
                    <textarea
                        class="field-input field-lines"
                        id={props.id.clone()}
                        rows="3"
                        {maxlength}
                        aria-describedby={described}
                        data-testid={props.testid.clone()}
                        value={props.value.clone()}
                        oninput={on_lines}
                    />
                } else {
                    <input
                        class="field-input"
                        id={props.id.clone()}
                        type="text"
                        inputmode={props.inputmode.clone()}
                        enterkeyhint="next"
                        autocomplete="off"
                        {maxlength}
                        aria-describedby={described}
                        aria-invalid={wrong.then_some("true")}
                        data-testid={props.testid.clone()}
                        value={props.value.clone()}
                        oninput={on_line}
                    />
                }
            </span>
            if wrong {
                <span class="field-note" id={error_id} role="status">
                    <span class="field-error" data-testid="field-error">{ props.error.clone() }</span>
                </span>
            }
        </div>
    }
}
