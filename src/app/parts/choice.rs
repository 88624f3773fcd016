//! One of a few: big touch targets in a row or a list, on native radio buttons, so that arrow keys and screen readers work.

use yew::{AttrValue, Callback, Classes, Html, Properties, classes, component, html};

use super::Icon;
use super::icon::Shape;
use crate::unit::Tick;

/// How the options stand.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Lay {
    /// Side by side, wrapping where they do not fit.
    #[default]
    Row,
    /// One under the other.
    List,
}

/// One option.
#[derive(Clone, Debug, PartialEq)]
pub struct Opt<T> {
    /// What is chosen.
    pub value: T,
    /// Words.
    pub words: AttrValue,
    /// Suffix of the test id.
    pub code: AttrValue,
}

impl<T> Opt<T> {
    /// An option whose test id ends in `code`.
    pub fn new(value: T, words: impl Into<AttrValue>, code: impl Into<AttrValue>) -> Self {
        Opt {
            value,
            words: words.into(),
            code: code.into(),
        }
    }
}

/// Properties of [`Choice`].
#[derive(Clone, PartialEq, Properties)]
pub struct ChoiceProps<T: PartialEq + Clone> {
    /// Name of the group; unique on the page. Also the start of the test ids: `<name>-<code>`.
    pub name: AttrValue,
    /// The question, always visible.
    pub label: AttrValue,
    /// What it means, where to look.
    #[prop_or_default]
    pub hint: AttrValue,
    /// The options.
    pub options: Vec<Opt<T>>,
    /// Chosen; none where nothing is chosen yet.
    pub value: Option<T>,
    /// A choice was made.
    pub on_change: Callback<T>,
    /// How the options stand.
    #[prop_or_default]
    pub lay: Lay,
    /// Extra classes.
    #[prop_or_default]
    pub class: Classes,
}

/// The group.
#[component]
pub fn Choice<T: PartialEq + Clone + 'static>(props: &ChoiceProps<T>) -> Html {
    let hint_id = format!("{}-hint", props.name);
    let lay = match props.lay {
        Lay::Row => "is-row",
        Lay::List => "is-list",
    };
    html! {
        <fieldset
            class={classes!("choice", lay, props.class.clone())}
            aria-describedby={(!props.hint.is_empty()).then(|| hint_id.clone())}
            data-testid={props.name.clone()}
        >
            <legend class="choice-label">{ props.label.clone() }</legend>
            if !props.hint.is_empty() {
                <span class="choice-hint" id={hint_id.clone()}>{ props.hint.clone() }</span>
            }
            <span class="choice-options">
                { for props.options.iter().map(|option| {
                    let on_change = props.on_change.clone();
                    let value = option.value.clone();
                    let is_chosen = props.value.as_ref() == Some(&option.value);
                    html! {
                        <label key={option.code.to_string()} class={classes!("choice-option", is_chosen.then_some("is-chosen"))}>
                            <input
                                class="choice-radio"
                                type="radio"
                                name={props.name.clone()}
                                checked={is_chosen}
                                data-testid={format!("{}-{}", props.name, option.code)}
                                onchange={Callback::from(move |_| on_change.emit(value.clone()))}
                            />
                            <span class="choice-words">
                                <Icon shape={if is_chosen { Shape::RadioOn } else { Shape::RadioOff }} />
                                { option.words.clone() }
                            </span>
                        </label>
                    }
                }) }
            </span>
        </fieldset>
    }
}

/// Yes, no, don't know.
pub fn tick_options() -> Vec<Opt<Tick>> {
    vec![
        Opt::new(Tick::Yes, "Yes", "yes"),
        Opt::new(Tick::No, "No", "no"),
        Opt::new(Tick::Unknown, "Don’t know", "unknown"),
    ]
}
