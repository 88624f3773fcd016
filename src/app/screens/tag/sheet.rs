//! The sheet of tags: which units, how large, and how to hand one over without paper.

use super::card::TagCard;
use crate::app::deed::Snapshot;
use crate::app::parts::{Choice, Icon, Opt, Shape, TextField};
use crate::app::platform::share;
use crate::app::route::Route;
use crate::tag;
use crate::unit::Unit;
use std::collections::BTreeSet;
use std::rc::Rc;
use yew::{
    AttrValue, Callback, Html, MouseEvent, Properties, component, html, use_memo, use_state,
};

/// Sizes of the code with its margin, mm. 40 mm is read at arm's length (common practice).
const SIZES: [u32; 4] = [30, 40, 50, 70];
/// Most tags on one sheet: more of them make a page that no phone draws quickly.
const MOST: usize = 48;
/// Most units offered at a time; the rest is found by typing.
const OFFERED: usize = 40;

/// Properties of [`TagSheet`].
#[derive(Clone, PartialEq, Properties)]
pub struct TagSheetProps {
    /// The unit whose tag is wanted; none where they are to be chosen.
    pub unit: Option<String>,
    /// The state.
    pub state: Snapshot,
}

/// The screen.
#[component]
pub fn TagSheet(props: &TagSheetProps) -> Html {
    let state = &props.state;
    let chosen = use_state(|| props.unit.iter().cloned().collect::<BTreeSet<String>>());
    let size = use_state(|| 40_u32);
    let search = use_state(String::new);
    let address = use_memo((), |()| share::address());
    let units: Vec<Rc<Unit>> = state
        .units_by_name()
        .into_iter()
        .filter(|unit| chosen.contains(&unit.id))
        .take(MOST)
        .collect();
    let on_size = {
        let size = size.clone();
        Callback::from(move |millimetres: u32| size.set(millimetres))
    };
    let sizes = SIZES
        .iter()
        .map(|size| Opt::new(*size, format!("{size} mm"), size.to_string()))
        .collect::<Vec<_>>();
    let back = props
        .unit
        .as_ref()
        .map_or(Route::Units, |id| Route::Unit(id.clone()));
    html! {
        <main class="page tag-page" id="main" data-testid="tag-screen">
            <div class="page-head no-print">
                <h1 id="title" tabindex="-1">{ "Tags" }</h1>
                <a class="button is-quiet" href={back.href()}><Icon shape={Shape::Back} />{ "Back" }</a>
            </div>
            <section class="no-print panel stack" aria-label="What to print">
                <p>
                    { "A tag carries the unit's profile itself. Another phone that has opened this app once reads it with its camera, \
                       without any network: stick it under the seat or inside the cab door." }
                </p>
                <p class="soft small">
                    { "Calls and readings are not on it. Whoever scans the tag reads what is in the profile." }
                </p>
                <Choice<u32> name="tag-size" label="Size of the code" options={sizes} value={Some(*size)} on_change={on_size} />
                if props.unit.is_none() || state.units.len() > 1 {
                    { choose(props, &chosen, &search) }
                }
                <div class="actions">
                    <button
                        type="button"
                        class="button is-main"
                        disabled={units.is_empty()}
                        onclick={Callback::from(|_: MouseEvent| share::print())}
                        data-testid="tag-print"
                    >
                        { match units.len() { 1 => "Print the tag".to_owned(), n => format!("Print {n} tags") } }
                    </button>
                </div>
                if chosen.len() > MOST {
                    <p class="small">{ format!("A sheet takes {MOST} tags; print the others after these.") }</p>
                }
                if let [unit] = units.as_slice() { <AsText unit={unit.clone()} address={(*address).clone()} /> }
            </section>
            if !units.is_empty() {
                <section class="tag-sheet" aria-label="Tags to print" data-testid="tag-sheet">
                    { for units.iter().map(|unit| html! {
                        <TagCard key={unit.id.clone()} unit={unit.clone()} address={(*address).clone()} millimetres={*size} />
                    }) }
                    { ruler() }
                </section>
            }
        </main>
    }
}

/// A line of known length, so that a printer that shrinks the page is found out.
fn ruler() -> Html {
    html! {
        <p class="tag-ruler">
            <svg width="50mm" height="4mm" viewBox="0 0 50 4" aria-hidden="true" focusable="false">
                <path d="M0.2 0v4M0.2 2H49.8M49.8 0v4" fill="none" stroke="currentColor" stroke-width="0.4" />
            </svg>
            <span>{ "50 mm on paper; shorter, and the printer has shrunk the page: print at 100 %." }</span>
        </p>
    }
}

fn choose(
    props: &TagSheetProps,
    chosen: &yew::UseStateHandle<BTreeSet<String>>,
    search: &yew::UseStateHandle<String>,
) -> Html {
    let wanted = search.trim().to_lowercase();
    let all = props.state.units_by_name();
    let found: Vec<&Rc<Unit>> = all
        .iter()
        .filter(|unit| wanted.is_empty() || unit.name.to_lowercase().contains(&wanted))
        .collect();
    let on_search = {
        let search = search.clone();
        Callback::from(move |text: String| search.set(text))
    };
    html! {
        <div class="stack is-tight">
            if all.len() > 9 {
                <TextField
                    id="tag-search"
                    label="Find a unit"
                    value={AttrValue::from((**search).clone())}
                    on_input={on_search}
                    testid="tag-search"
                />
            }
            <fieldset class="tag-choice">
                <legend>{ format!("Units: {} chosen", chosen.len()) }</legend>
                { for found.iter().take(OFFERED).map(|unit| {
                    let is_chosen = chosen.contains(&unit.id);
                    let on_tick = {
                        let (chosen, id) = (chosen.clone(), unit.id.clone());
                        Callback::from(move |_: yew::Event| {
                            let mut next = (*chosen).clone();
                            if !next.remove(&id) {
                                next.insert(id.clone());
                            }
                            chosen.set(next);
                        })
                    };
                    html! {
                        <label key={unit.id.clone()} class="check">
                            <input type="checkbox" checked={is_chosen} onchange={on_tick} data-testid="tag-unit" />
                            <span>{ &unit.name }</span>
                        </label>
                    }
                }) }
            </fieldset>
            if found.len() > OFFERED {
                <p class="small">{ format!("{} more: type part of the name.", found.len() - OFFERED) }</p>
            }
        </div>
    }
}

/// Properties of [`AsText`].
#[derive(Clone, PartialEq, Properties)]
struct AsTextProps {
    unit: Rc<Unit>,
    address: String,
}

/// The same as a text to paste, for a message.
#[component]
fn AsText(props: &AsTextProps) -> Html {
    let text = use_memo(props.unit.clone(), |unit| {
        tag::block(unit, &tag::digits(unit))
    });
    let said = use_state(|| "");
    let on_copy = {
        let (text, said) = (text.clone(), said.clone());
        Callback::from(move |_: MouseEvent| {
            let said = said.clone();
            share::copy(&text, move |is_done| {
                said.set(if is_done {
                    "The text is on the clipboard."
                } else {
                    "The browser does not let the page copy: mark the text and copy it by hand."
                });
            });
        })
    };
    html! {
        <details class="fold">
            <summary>{ "The same as a text to send" }</summary>
            <div class="stack is-tight">
                <p class="small">{ "The other one pastes all of it under “Read a tag”. The whole profile is in it, the note too." }</p>
                <textarea
                    class="field-input field-lines report-text"
                    rows="6"
                    readonly=true
                    aria-label="The tag as text"
                    value={AttrValue::from((*text).clone())}
                    data-testid="tag-text"
                />
                <div class="actions">
                    <button type="button" class="button" onclick={on_copy} data-testid="tag-copy">{ "Copy the text" }</button>
                </div>
                <p class="small" role="status">{ *said }</p>
            </div>
        </details>
    }
}
