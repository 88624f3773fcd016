//! What this app is, which version, and whether it works without a network.

use yew::{Callback, Html, MouseEvent, component, html};

use super::SettingsProps;
use crate::app::deed::Deed;
use crate::app::parts::{Caution, Grade, Section};
use crate::app::platform::offline;

/// The panel.
#[component]
pub fn About(props: &SettingsProps) -> Html {
    let on_update = {
        let deed = props.deed.clone();
        Callback::from(move |_: MouseEvent| deed.emit(Deed::Update))
    };
    html! {
        <Section id="about" title="About Lowside" state={offline::version()}>
            <p data-testid="offline-state">{ props.state.offline.words() }</p>
            <p>
                { "Version " }
                <span class="figure" data-testid="version">{ offline::version() }</span>
            </p>
            if props.state.update_waits {
                <div class="stack is-tight">
                    <p>{ "A newer version is ready. It takes over when you say so; what you typed is saved first." }</p>
                    <div class="actions">
                        <button type="button" class="button" onclick={on_update} data-testid="update">
                            { "Change to the new version" }
                        </button>
                    </div>
                </div>
            }
            <p class="small">
                { "On a phone, put it on the home screen from the browser’s menu. Some phones keep the data of the app on the \
                   home screen apart from the browser’s: put it there before the first call, or carry the data over with a \
                   file." }
            </p>
            <Caution grade={Grade::Danger} title="this work can kill">
                <p>{ "The unit’s manual, local rules and licensed practice come first, always." }</p>
                <ul>
                    <li>{ "Wheels and tracks can start to turn: chock them, keep people clear, lower everything." }</li>
                    <li>{ "Engine off is not pressure off: the loop can stay loaded and accumulators stay full." }</li>
                    <li>
                        { "Oil from a pinhole goes through the skin. Small dot, little pain: emergency surgery within hours; say \
                           “high-pressure injection”. Card or stick, never a hand." }
                    </li>
                    <li>{ "With the bypass open, a loop line off or charge pressure gone, the drive does not brake." }</li>
                    <li>{ "A gauge stands only on a port that never sees more than its scale." }</li>
                </ul>
            </Caution>
            <p class="small">
                { "Lowside solves the circuit of a closed-loop drive for the condition you read in, and weighs which causes fit. \
                   Figures that you have not given are common practice for the class of machine, with a wide margin; each \
                   window says what it rests on. Everything is calculated on this device; nothing is sent anywhere." }
            </p>
        </Section>
    }
}
