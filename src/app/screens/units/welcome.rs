//! What stands on the first screen before the units: the general caution, once, and the demo yard, when asked for.

use yew::{Callback, Html, MouseEvent, component, html};

use super::UnitsProps;
use crate::app::deed::Deed;
use crate::app::parts::{Caution, Grade};
use crate::app::state::Action;

/// The general caution, until it was read.
#[component]
pub fn Welcome(props: &UnitsProps) -> Html {
    if props.state.settings.first_run.cautions_read {
        return Html::default();
    }
    let on_read = {
        let (settings, deed) = (props.state.settings.clone(), props.deed.clone());
        Callback::from(move |_: MouseEvent| {
            let mut settings = (*settings).clone();
            settings.first_run.cautions_read = true;
            deed.emit(Deed::Put(Action::PutSettings(settings)));
        })
    };
    html! {
        <Caution grade={Grade::Danger} title="this work can kill" testid="general-caution">
            <p>
                { "Moving wheels, hot oil, oil through the skin, a machine that rolls. The unit’s manual, local rules and \
                   licensed practice come first." }
            </p>
            <div class="actions">
                <button type="button" class="button" onclick={on_read} data-testid="cautions-read">{ "Understood" }</button>
            </div>
        </Caution>
    }
}

/// The demo yard: offered while there is nothing else, and removable in one step while it is there.
#[component]
pub fn Demo(props: &UnitsProps) -> Html {
    let wish = |wish: fn() -> Deed| {
        let deed = props.deed.clone();
        Callback::from(move |_: MouseEvent| deed.emit(wish()))
    };
    if props.state.has_demo() {
        html! {
            <Caution title="Demo data" testid="demo-notice">
                <p>{ "The units marked demo belong to Tamarisk, an invented plant-hire yard. Try anything on them." }</p>
                <div class="actions">
                    <button type="button" class="button" onclick={wish(|| Deed::RemoveDemo)} data-testid="remove-demo">
                        { "Remove the demo" }
                    </button>
                </div>
            </Caution>
        }
    } else if props.state.units.is_empty() {
        html! {
            <section class="panel" aria-labelledby="demo-title">
                <h2 id="demo-title">{ "Look round first" }</h2>
                <p>
                    { "The Tamarisk plant-hire yard is invented: a few machines with their calls, to see how a call runs. It \
                       goes away again in one step." }
                </p>
                <div class="actions">
                    <button type="button" class="button" onclick={wish(|| Deed::LoadDemo)} data-testid="load-demo">
                        { "Load the Tamarisk demo" }
                    </button>
                </div>
            </section>
        }
    } else {
        Html::default()
    }
}
