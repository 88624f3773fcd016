//! The first screen: the units of the yard, and the way to a call.

mod card;
mod first_steps;
mod new_unit;
mod welcome;

pub use self::card::{closing_words, standing_words, yard_words};
pub use self::first_steps::FirstSteps;
pub use self::new_unit::{class_options, forget_draft};

use yew::{AttrValue, Callback, Html, MouseEvent, Properties, component, html, use_state};

use self::card::UnitCard;
use self::first_steps::read_a_tag;
use self::new_unit::NewUnit;
use self::welcome::{Demo, Welcome};
use super::settings::data::Data;
use crate::app::deed::{Deed, Snapshot};
use crate::app::parts::{Choice, Icon, Opt, Shape, TextField};
use crate::app::route::Route;
use crate::app::state::Action;
use crate::record::{Settings, UnitOrder};

/// So many units are drawn at first, and with every "show more".
const PAGE: usize = 24;
/// From this many units on there is a field to find one.
const SEARCH_FROM: usize = 9;

/// Properties of [`Units`].
#[derive(Clone, PartialEq, Properties)]
pub struct UnitsProps {
    /// The state.
    pub state: Snapshot,
    /// Wishes.
    pub deed: Callback<Deed>,
}

/// The screen.
#[component]
pub fn Units(props: &UnitsProps) -> Html {
    let adding = use_state(|| false);
    let search = use_state(String::new);
    let most = use_state(|| PAGE);
    let state = &props.state;
    let is_empty = state.units.is_empty();
    let wanted = search.trim().to_lowercase();
    let listed = state.listed(&wanted);
    let count = state.units.len();
    let on_add = {
        let adding = adding.clone();
        Callback::from(move |_: yew::MouseEvent| adding.set(!*adding))
    };
    let on_close = {
        let adding = adding.clone();
        Callback::from(move |()| adding.set(false))
    };
    let on_search = {
        let (search, most) = (search.clone(), most.clone());
        Callback::from(move |text: String| {
            most.set(PAGE);
            search.set(text);
        })
    };
    let on_more = {
        let most = most.clone();
        Callback::from(move |_: MouseEvent| most.set(*most + PAGE))
    };
    let on_order = {
        let (settings, deed) = (state.settings.clone(), props.deed.clone());
        Callback::from(move |unit_order: UnitOrder| {
            deed.emit(Deed::Put(Action::PutSettings(Settings {
                unit_order,
                ..(*settings).clone()
            })));
        })
    };
    html! {
        <main class="page" id="main" data-testid="units-screen">
            <div class="page-head">
                <h1 id="title" tabindex="-1">{ "Units" }</h1>
                if !is_empty {
                    <button
                        type="button"
                        class="button"
                        onclick={on_add}
                        aria-expanded={adding.to_string()}
                        data-testid="new-unit"
                    >
                        <Icon shape={Shape::Plus} />
                        { "New unit" }
                    </button>
                }
            </div>
            if is_empty {
                <FirstSteps state={state.clone()} deed={props.deed.clone()}>
                    <Data state={state.clone()} deed={props.deed.clone()} is_folded={true} />
                </FirstSteps>
            } else {
                <Welcome state={state.clone()} deed={props.deed.clone()} />
                if *adding {
                    <NewUnit is_first={false} deed={props.deed.clone()} on_close={Some(on_close)} />
                }
                <Demo state={state.clone()} deed={props.deed.clone()} />
            }
            if count >= SEARCH_FROM {
                <TextField
                    id="unit-search"
                    label="Find a unit"
                    hint="part of its name or class"
                    value={AttrValue::from((*search).clone())}
                    on_input={on_search}
                    testid="unit-search"
                />
                <Choice<UnitOrder>
                    name="unit-order"
                    label="First"
                    options={UnitOrder::ALL.map(|order| Opt::new(order, order.words(), format!("{order:?}"))).to_vec()}
                    value={Some(state.settings.unit_order)}
                    on_change={on_order}
                />
            }
            if !is_empty {
                <ul class="tiles is-three unit-list" data-testid="unit-list">
                    { for listed.iter().take(*most).map(|one| html! {
                        <li key={one.unit.id.clone()}>
                            <UnitCard
                                listed={one.clone()}
                                state={state.clone()}
                                deed={props.deed.clone()}
                            />
                        </li>
                    }) }
                </ul>
                if listed.len() > *most {
                    <button type="button" class="button is-wide" onclick={on_more} data-testid="more-units">
                        { format!("Show more: {} of {} shown", *most, listed.len()) }
                    </button>
                }
                if listed.is_empty() {
                    <p data-testid="no-unit-found">{ format!("No unit is called “{}”.", search.trim()) }</p>
                }
            }
            if !is_empty {
                <div class="actions">
                    <a class="button is-quiet" href={Route::Tags(None).href()} data-testid="to-tags">{ "Print tags" }</a>
                    { read_a_tag() }
                </div>
                <Data state={state.clone()} deed={props.deed.clone()} is_folded={true} />
            }
        </main>
    }
}
