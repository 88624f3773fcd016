//! A button that asks once more, in place: nothing is laid over the page, and the focus goes to the question.

use web_sys::HtmlElement;
use yew::{AttrValue, Callback, Classes, Html, Properties};
use yew::{classes, component, html, use_effect_with, use_node_ref, use_state};

/// Properties of [`Confirm`].
#[derive(Clone, PartialEq, Properties)]
pub struct ConfirmProps {
    /// Words of the button.
    pub words: AttrValue,
    /// The question, naming what will happen.
    pub question: AttrValue,
    /// Words of the button that does it.
    pub yes: AttrValue,
    /// Words of the button that does not.
    #[prop_or("Keep it".into())]
    pub no: AttrValue,
    /// It was confirmed.
    pub on_yes: Callback<()>,
    /// For the end-to-end tests; the confirming button gets `-yes` behind it.
    #[prop_or_default]
    pub testid: AttrValue,
    /// Extra classes.
    #[prop_or_default]
    pub class: Classes,
}

/// The button and its question.
#[component]
pub fn Confirm(props: &ConfirmProps) -> Html {
    let asking = use_state(|| None::<bool>);
    let (question_ref, button_ref) = (use_node_ref(), use_node_ref());
    {
        let (question_ref, button_ref) = (question_ref.clone(), button_ref.clone());
        use_effect_with(*asking, move |asking| {
            let target = match asking {
                Some(true) => question_ref,
                Some(false) => button_ref,
                None => return,
            };
            if let Some(element) = target.cast::<HtmlElement>() {
                // A focus that cannot be set leaves the page as usable as before.
                let _ = element.focus();
            }
        });
    }
    let set = |to: bool| {
        let asking = asking.clone();
        Callback::from(move |_: yew::MouseEvent| asking.set(Some(to)))
    };
    let on_yes = {
        let (asking, on_yes) = (asking.clone(), props.on_yes.clone());
        Callback::from(move |_: yew::MouseEvent| {
            asking.set(None);
            on_yes.emit(());
        })
    };
    if *asking == Some(true) {
        html! {
            <div class={classes!("confirm", props.class.clone())} role="group" aria-label={props.words.clone()}>
                <p class="confirm-question" tabindex="-1" ref={question_ref}>{ props.question.clone() }</p>
                <div class="actions">
                    <button type="button" class="button is-grave" onclick={on_yes} data-testid={format!("{}-yes", props.testid)}>
                        { props.yes.clone() }
                    </button>
                    <button type="button" class="button" onclick={set(false)} data-testid={format!("{}-no", props.testid)}>
                        { props.no.clone() }
                    </button>
                </div>
            </div>
        }
    } else {
        html! {
            <button
                type="button"
                class={classes!("button", "is-quiet", props.class.clone())}
                ref={button_ref}
                onclick={set(true)}
                data-testid={props.testid.clone()}
            >
                { props.words.clone() }
            </button>
        }
    }
}
