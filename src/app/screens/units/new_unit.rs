//! A new unit: a name and a class, and the call can begin.

use std::cell::RefCell;

use yew::{AttrValue, Callback, Html, MouseEvent, Properties, SubmitEvent};
use yew::{component, html, use_state};

use crate::app::deed::Deed;
use crate::app::parts::{Choice, Opt, TextField};
use crate::unit::MachineClass;

/// Properties of [`NewUnit`].
#[derive(Clone, PartialEq, Properties)]
pub struct NewUnitProps {
    /// There is no unit yet.
    pub is_first: bool,
    /// Wishes.
    pub deed: Callback<Deed>,
    /// Puts the form away; none where it stays.
    pub on_close: Option<Callback<()>>,
}

/// Classes as options.
pub fn class_options() -> Vec<Opt<MachineClass>> {
    MachineClass::ALL
        .iter()
        .enumerate()
        .map(|(at, class)| Opt::new(*class, class.words(), at.to_string()))
        .collect()
}

thread_local! {
    /// What was typed and chosen, until it is a unit or put away: the form may go from the screen in between.
    static DRAFT: RefCell<(String, Option<MachineClass>)> = const { RefCell::new((String::new(), None)) };
}

/// The draft has become a unit, or is not wanted.
pub fn forget_draft() {
    DRAFT.take();
}

/// The form.
#[component]
pub fn NewUnit(props: &NewUnitProps) -> Html {
    let name = use_state(|| DRAFT.with_borrow(|draft| draft.0.clone()));
    let class = use_state(|| DRAFT.with_borrow(|draft| draft.1));
    let asked_too_soon = use_state(|| false);

    let make = {
        let (name, class, asked_too_soon) = (name.clone(), class.clone(), asked_too_soon.clone());
        let (deed, on_close) = (props.deed.clone(), props.on_close.clone());
        move |start: bool| {
            let Some(class) = *class else {
                asked_too_soon.set(true);
                return;
            };
            deed.emit(Deed::NewUnit {
                name: (*name).clone(),
                class,
                start,
            });
            if let Some(on_close) = &on_close {
                on_close.emit(());
            }
        }
    };
    let on_submit = {
        let make = make.clone();
        Callback::from(move |event: SubmitEvent| {
            event.prevent_default();
            make(true);
        })
    };
    let on_profile = Callback::from(move |_: MouseEvent| make(false));
    let on_name = {
        let name = name.clone();
        Callback::from(move |text: String| {
            DRAFT.with_borrow_mut(|draft| draft.0.clone_from(&text));
            name.set(text);
        })
    };
    let on_class = {
        let class = class.clone();
        Callback::from(move |chosen: MachineClass| {
            DRAFT.with_borrow_mut(|draft| draft.1 = Some(chosen));
            class.set(Some(chosen));
        })
    };
    let close = props
        .on_close
        .clone()
        .map(|on_close| on_close.reform(|_: MouseEvent| forget_draft()));
    html! {
        <form class="panel new-unit" onsubmit={on_submit} aria-labelledby="new-unit-title" data-testid="new-unit-form">
            <div class="stack is-tight">
                <h2 id="new-unit-title">
                    { if props.is_first { "Which machine is in front of you?" } else { "New unit" } }
                </h2>
                <p class="soft">
                    { "A class is enough to start. What you do not know can wait." }
                </p>
            </div>
            <TextField
                id="new-unit-name"
                label="Yard number or name"
                hint="can wait"
                value={AttrValue::from((*name).clone())}
                on_input={on_name}
                maxlength=80
                testid="new-unit-name"
            />
            <Choice<MachineClass>
                name="new-unit-class"
                class="is-grid"
                label="Class of machine"
                options={class_options()}
                value={*class}
                on_change={on_class}
            />
            if *asked_too_soon && class.is_none() {
                <p class="field-error" role="alert" data-testid="new-unit-error">
                    { "Choose the class of machine: it decides what is expected." }
                </p>
            }
            <div class="actions">
                <button type="submit" class="button is-main" data-testid="start-call">{ "Start the call" }</button>
                <button type="button" class="button" onclick={on_profile} data-testid="open-profile">
                    { "Fill in its profile first" }
                </button>
                if let Some(close) = close {
                    <button type="button" class="button is-quiet" onclick={close} data-testid="new-unit-close">
                        { "Not now" }
                    </button>
                }
            </div>
        </form>
    }
}
