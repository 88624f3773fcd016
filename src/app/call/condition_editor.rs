//! What the machine was doing: one form for all readings under a heading, or for the next one.

use super::condition_parts::{Typed, engine, lever, oil};
use super::side::Sides;
use crate::app::parts::{Choice, Entry, Opt, Select};
use crate::quantity::UnitPrefs;
use crate::readings::{Condition, Direction, Doing, Stroked};
use std::collections::BTreeMap;
use yew::{Callback, Event, Html, Properties, TargetCast, component, html, use_state};

/// Properties of [`ConditionEditor`].
#[derive(Clone, PartialEq, Properties)]
pub struct ConditionEditorProps {
    /// Start of names and ids; unique on the page.
    pub name: String,
    /// The condition.
    pub condition: Condition,
    /// Ports that are there twice: asks which side is stroked.
    #[prop_or_default]
    pub sides: Sides,
    /// Units.
    pub prefs: UnitPrefs,
    /// It was changed.
    pub on_change: Callback<Condition>,
    /// Texts that are kept because they are no figure yet, by field.
    #[prop_or_default]
    pub texts: BTreeMap<String, String>,
    /// Text of a field that is no figure (empty: it is one by now), to be kept.
    #[prop_or_default]
    pub on_text: Callback<(&'static str, String)>,
}

impl ConditionEditorProps {
    /// Keeps what is typed as long as it is no figure; lets go of what was kept once it is one.
    pub fn keep(&self, field: &'static str, entry: &Entry) {
        let text = if entry.value.is_some() {
            ""
        } else {
            entry.typed.trim()
        };
        if self.texts.get(field).map_or("", String::as_str) != text {
            self.on_text.emit((field, text.to_owned()));
        }
    }
}

/// The form.
#[component]
pub fn ConditionEditor(props: &ConditionEditorProps) -> Html {
    let typed = use_state(|| Typed::kept(&props.texts));
    let now = props.condition;
    let doings = Doing::ALL
        .into_iter()
        .map(|doing| Opt::new(doing, doing.words(), format!("{doing:?}")))
        .collect::<Vec<_>>();
    let edit = |change: fn(&mut Condition, Doing)| {
        let on_change = props.on_change.clone();
        Callback::from(move |doing: Doing| {
            let mut next = now;
            change(&mut next, doing);
            on_change.emit(next);
        })
    };
    html! {
        <div class="condition-editor stack">
            <Select<Doing>
                id={format!("{}-doing", props.name)}
                label="The machine"
                options={doings}
                value={Some(now.doing)}
                on_change={edit(|next, doing| next.doing = doing)}
                testid={format!("{}-doing", props.name)}
            />
            if !now.doing.is_neutral() {
                { direction(props) }
                { lever(props, &typed) }
                if props.sides.any() {
                    { stroked(props) }
                }
            }
            { engine(props, &typed) }
            { oil(props, &typed) }
            { flags(props) }
        </div>
    }
}

fn direction(props: &ConditionEditorProps) -> Html {
    let (now, on_change) = (props.condition, props.on_change.clone());
    html! {
        <Choice<Direction>
            name={format!("{}-direction", props.name)}
            label="Direction"
            options={vec![Opt::new(Direction::Forward, "Forward", "forward"), Opt::new(Direction::Reverse, "Reverse", "reverse")]}
            value={Some(now.direction)}
            on_change={Callback::from(move |direction| on_change.emit(Condition { direction, ..now }))}
        />
    }
}

fn stroked(props: &ConditionEditorProps) -> Html {
    let (now, on_change) = (props.condition, props.on_change.clone());
    let option = |stroked: Stroked| {
        let (words, code) = match stroked {
            Stroked::Both => ("Both", "both"),
            Stroked::Left => ("Left alone", "left"),
            Stroked::Right => ("Right alone", "right"),
        };
        Opt::new(stroked, words, code)
    };
    html! {
        <Choice<Stroked>
            name={format!("{}-stroked", props.name)}
            label="Sides driven"
            options={Stroked::ALL.map(option).to_vec()}
            value={Some(now.stroked)}
            on_change={Callback::from(move |stroked| on_change.emit(Condition { stroked, ..now }))}
        />
    }
}

fn flags(props: &ConditionEditorProps) -> Html {
    let now = props.condition;
    let tick = |code: &str, words: &'static str, is_on: bool, set: fn(&mut Condition, bool)| {
        let on_change = props.on_change.clone();
        let on_tick = Callback::from(move |event: Event| {
            let mut next = now;
            set(
                &mut next,
                event
                    .target_unchecked_into::<web_sys::HtmlInputElement>()
                    .checked(),
            );
            on_change.emit(next);
        });
        html! {
            <label class="tick">
                <input type="checkbox" checked={is_on} onchange={on_tick} data-testid={format!("{}-{code}", props.name)} />
                <span>{ words }</span>
            </label>
        }
    };
    html! {
        <div class="stack is-tight">
            { tick("flushing-blocked", "Flushing blocked, as the unit’s manual allows", now.flushing_blocked,
                |next, on| next.flushing_blocked = on) }
            { tick("consumers-capped", "Brake, shift and pilot feeds capped off", now.consumers_capped,
                |next, on| next.consumers_capped = on) }
        </div>
    }
}
