//! What keeps a part from being drawn anew for nothing: callbacks that stay the same from one drawing to the next, answers
//! compared by identity, folds whose inside is only made once they are opened.

use crate::assessment::Assessment;
use std::ops::Deref;
use std::rc::Rc;
use web_sys::HtmlDetailsElement;
use yew::{
    AttrValue, Callback, Classes, Event, Html, Properties, TargetCast, component, hook, html,
    use_memo, use_mut_ref, use_state,
};

/// An answer of the engine, equal to itself alone: every answer is a new one, and comparing two field by field costs more
/// than it saves.
#[derive(Clone, Debug)]
pub struct Answer(pub Rc<Assessment>);

impl PartialEq for Answer {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

impl Deref for Answer {
    type Target = Assessment;
    fn deref(&self) -> &Assessment {
        &self.0
    }
}

/// The same callback at every drawing, that does what `callback` did at the last.
#[hook]
pub fn use_steady<In: 'static>(callback: Callback<In>) -> Callback<In> {
    let latest = use_mut_ref(|| callback.clone());
    latest.replace(callback);
    let steady = use_memo((), move |()| {
        Callback::from(move |input: In| {
            let now = latest.borrow().clone();
            now.emit(input);
        })
    });
    (*steady).clone()
}

/// Properties of [`Fold`].
#[derive(Clone, PartialEq, Properties)]
pub struct FoldProps {
    /// What stands in the open.
    pub head: Html,
    /// Makes the inside.
    pub body: Callback<(), Html>,
    /// Open at the start.
    #[prop_or_default]
    pub is_open: bool,
    /// Classes.
    #[prop_or_default]
    pub class: Classes,
    /// Classes of the head.
    #[prop_or_default]
    pub head_class: Classes,
    /// For the end-to-end tests: of the head.
    #[prop_or_default]
    pub testid: Option<AttrValue>,
}

/// A fold; its inside is made when it is first opened, and stays from then on.
#[component]
pub fn Fold(props: &FoldProps) -> Html {
    let starts_open = *use_memo((), |()| props.is_open);
    let was_opened = use_state(|| starts_open);
    let on_toggle = {
        let was_opened = was_opened.clone();
        Callback::from(move |event: Event| {
            let is_open = event
                .target_dyn_into::<HtmlDetailsElement>()
                .is_some_and(|fold| fold.open());
            if is_open && !*was_opened {
                was_opened.set(true);
            }
        })
    };
    html! {
        <details class={props.class.clone()} open={starts_open} ontoggle={on_toggle}>
            <summary class={props.head_class.clone()} data-testid={props.testid.clone()}>{ props.head.clone() }</summary>
            if *was_opened {
                { props.body.emit(()) }
            }
        </details>
    }
}
