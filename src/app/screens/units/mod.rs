//! The first screen: the units of the yard, and the way to a call.

mod card;
mod new_unit;
mod welcome;

pub use self::card::{closing_words, standing_words};
pub use self::new_unit::class_options;

use yew::{AttrValue, Callback, Html, Properties, component, html, use_state};

use self::card::UnitCard;
use self::new_unit::NewUnit;
use self::welcome::{Demo, Welcome};
use super::settings::data::Data;
use super::settings::measures::Presets;
use crate::app::deed::{Deed, Snapshot};
use crate::app::parts::{Icon, Shape, TextField};
use crate::app::route::Route;

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

fn read_a_tag() -> Html {
    html! {
        <a class="button is-quiet" href={Route::Tag(String::new()).href()} data-testid="to-read-tag">{ "Read a tag" }</a>
    }
}

/// The screen.
#[component]
pub fn Units(props: &UnitsProps) -> Html {
    let adding = use_state(|| false);
    let search = use_state(String::new);
    let state = &props.state;
    let is_empty = state.units.is_empty();
    let units = state.units_by_last_call();
    let wanted = search.trim().to_lowercase();
    let shown: Vec<_> = units
        .iter()
        .filter(|unit| {
            wanted.is_empty()
                || unit.name.to_lowercase().contains(&wanted)
                || unit.class.words().to_lowercase().contains(&wanted)
        })
        .collect();
    let on_add = {
        let adding = adding.clone();
        Callback::from(move |_: yew::MouseEvent| adding.set(!*adding))
    };
    let on_close = {
        let adding = adding.clone();
        Callback::from(move |()| adding.set(false))
    };
    let on_search = {
        let search = search.clone();
        Callback::from(move |text: String| search.set(text))
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
            <Welcome state={state.clone()} deed={props.deed.clone()} />
            if is_empty {
                <div class="columns is-side">
                    <NewUnit is_first={true} deed={props.deed.clone()} on_close={None::<Callback<()>>} />
                    <div class="stack">
                        <Demo state={state.clone()} deed={props.deed.clone()} />
                        <section class="panel" aria-label="Units of measure">
                            <Presets state={state.clone()} deed={props.deed.clone()} />
                        </section>
                        <div class="actions">{ read_a_tag() }</div>
                        <Data state={state.clone()} deed={props.deed.clone()} is_folded={true} />
                    </div>
                </div>
            } else {
                if *adding {
                    <NewUnit is_first={false} deed={props.deed.clone()} on_close={Some(on_close)} />
                }
                <Demo state={state.clone()} deed={props.deed.clone()} />
            }
            if units.len() >= SEARCH_FROM {
                <TextField
                    id="unit-search"
                    label="Find a unit"
                    hint="part of its name or class"
                    value={AttrValue::from((*search).clone())}
                    on_input={on_search}
                    testid="unit-search"
                />
            }
            if !is_empty {
                <ul class="tiles is-three unit-list" data-testid="unit-list">
                    { for shown.iter().map(|unit| html! {
                        <li key={unit.id.clone()}>
                            <UnitCard
                                unit={(**unit).clone()}
                                state={state.clone()}
                                deed={props.deed.clone()}
                            />
                        </li>
                    }) }
                </ul>
                if shown.is_empty() {
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
