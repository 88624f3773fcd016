//! One of many: the browser's own list, which every phone shows well.

use yew::{AttrValue, Callback, Classes, Event, Html, Properties, TargetCast};
use yew::{classes, component, html};

use super::choice::Opt;

/// Properties of [`Select`].
#[derive(Clone, PartialEq, Properties)]
pub struct SelectProps<T: PartialEq + Clone> {
    /// DOM id; unique on the page.
    pub id: AttrValue,
    /// Visible label.
    pub label: AttrValue,
    /// What it means.
    #[prop_or_default]
    pub hint: AttrValue,
    /// The options; their codes are the values of the list.
    pub options: Vec<Opt<T>>,
    /// Chosen.
    pub value: Option<T>,
    /// A choice was made.
    pub on_change: Callback<T>,
    /// For the end-to-end tests.
    #[prop_or_default]
    pub testid: AttrValue,
    /// Extra classes.
    #[prop_or_default]
    pub class: Classes,
}

/// The list.
#[component]
pub fn Select<T: PartialEq + Clone + 'static>(props: &SelectProps<T>) -> Html {
    let on_change = {
        let (options, on_change) = (props.options.clone(), props.on_change.clone());
        Callback::from(move |event: Event| {
            let code = event
                .target_unchecked_into::<web_sys::HtmlSelectElement>()
                .value();
            if let Some(option) = options.iter().find(|option| option.code == code) {
                on_change.emit(option.value.clone());
            }
        })
    };
    let hint_id = format!("{}-hint", props.id);
    html! {
        <div class={classes!("field", props.class.clone())}>
            <label class="field-label" for={props.id.clone()}>{ props.label.clone() }</label>
            if !props.hint.is_empty() {
                <span class="field-hint" id={hint_id.clone()}>{ props.hint.clone() }</span>
            }
            <span class="field-box">
                <select
                    class="field-select"
                    id={props.id.clone()}
                    aria-describedby={(!props.hint.is_empty()).then(|| hint_id.clone())}
                    data-testid={props.testid.clone()}
                    onchange={on_change}
                >
                    { for props.options.iter().map(|option| html! {
                        <option
                            key={option.code.to_string()}
                            value={option.code.clone()}
                            selected={props.value.as_ref() == Some(&option.value)}
                        >
                            { option.words.clone() }
                        </option>
                    }) }
                </select>
            </span>
        </div>
    }
}
