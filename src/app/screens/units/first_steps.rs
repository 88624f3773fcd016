//! What an empty yard shows: the caution, the machine in front of you, a demo to look round in, units of measure.

use yew::{Callback, Children, Html, Properties, component, html};

use super::new_unit::NewUnit;
use super::welcome::{Demo, Welcome};
use crate::app::deed::{Deed, Snapshot};
use crate::app::route::Route;
use crate::app::screens::settings::measures::Presets;

/// Properties of [`FirstSteps`].
#[derive(Clone, PartialEq, Properties)]
pub struct FirstStepsProps {
    /// The state.
    pub state: Snapshot,
    /// Wishes.
    pub deed: Callback<Deed>,
    /// What stands at the end: the way in for a file from another device.
    pub children: Children,
}

/// The way to the screen that reads tags.
pub fn read_a_tag() -> Html {
    html! {
        <a class="button is-quiet" href={Route::Tag(String::new()).href()} data-testid="to-read-tag">{ "Read a tag" }</a>
    }
}

/// The steps.
#[component]
pub fn FirstSteps(props: &FirstStepsProps) -> Html {
    let (state, deed) = (props.state.clone(), props.deed.clone());
    html! {
        <>
            <Welcome state={state.clone()} deed={deed.clone()} />
            <div class="columns is-side">
                <NewUnit is_first={true} deed={deed.clone()} on_close={None::<Callback<()>>} />
                <div class="stack">
                    <Demo state={state.clone()} deed={deed.clone()} />
                    <section class="panel" aria-label="Units of measure">
                        <Presets {state} {deed} />
                    </section>
                    <div class="actions">{ read_a_tag() }</div>
                    { for props.children.iter() }
                </div>
            </div>
        </>
    }
}
