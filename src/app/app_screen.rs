//! The whole: one state, the shell round the screen that the address names.

use std::cell::RefCell;
use std::rc::Rc;

use wasm_bindgen::JsCast;
use web_sys::StorageEvent;
use yew::{
    Callback, ContextProvider, Html, Properties, component, html, use_effect_with, use_memo,
    use_mut_ref, use_reducer,
};

use super::call::{CallScreen, EarlierCalls};
use super::deed::{Deed, Snapshot};
use super::engine::client::Engine;
use super::hands::Hands;
use super::keypad::Keypad;
use super::parts::{Icon, OwnKeys, Same, Shape};
use super::persist::Keeper;
use super::platform::listen::Listener;
use super::platform::{focus, offline, persistence, theme};
use super::room::Room;
use super::route::Route;
use super::screens::unit::Profile;
use super::screens::units::Units;
use super::shell::{Bar, Notices};
use super::state::{Action, State};
use crate::quantity::UnitPrefs;
use crate::record::Visit;
use crate::unit::Unit;

/// The state at the start: what is on the shelf, and where the address points.
fn first_state(keeper: &RefCell<Keeper>) -> State {
    let mut state = State::default();
    for action in keeper.borrow_mut().load() {
        state = state.after(action);
    }
    state
        .after(Action::Offline(offline::state()))
        .after(Action::Go(address()))
}

fn address() -> Route {
    let hash = web_sys::window().and_then(|window| window.location().hash().ok());
    Route::read(&hash.unwrap_or_default())
}

/// Everything that the browser tells from outside, until the app is gone.
fn listen(hands: &Rc<Hands>) -> Vec<Option<Listener>> {
    let mut listeners = Vec::new();
    let on = |call: fn(&Rc<Hands>)| {
        let hands = hands.clone();
        move |_| call(&hands)
    };
    listeners.push(Listener::at_window(
        "hashchange",
        on(|hands| {
            hands.put(Action::Offline(offline::state()));
            hands.put(Action::Go(address()));
        }),
    ));
    // A phone may never tell more than these before it drops the page.
    listeners.push(Listener::at_document("visibilitychange", on(Hands::flush)));
    listeners.push(Listener::at_window("pagehide", on(Hands::flush)));
    listeners.push(Listener::at_window("blur", on(Hands::flush)));
    let leaving = hands.clone();
    listeners.push(Listener::at_window("beforeunload", move |event| {
        leaving.flush();
        if leaving.would_lose() {
            event.prevent_default();
            // Older browsers ask only when this is set; where it cannot be, the newer way has been used.
            let _ = js_sys::Reflect::set(&event, &"returnValue".into(), &true.into());
        }
    }));
    for event in offline::EVENTS {
        let hands = hands.clone();
        listeners.push(Listener::at_window(event, move |event| {
            hands.put(Action::Offline(offline::state()));
            if offline::update_waits() {
                hands.put(Action::UpdateWaits);
            }
            if offline::is_first_ready(&event) {
                hands.put(Action::JustReady);
            }
        }));
    }
    let foreign = hands.clone();
    listeners.push(Listener::at_window("storage", move |event| {
        let event: &StorageEvent = event.unchecked_ref();
        let key = event.key().unwrap_or_default();
        let actions = foreign.keeper().borrow_mut().foreign(&key, &foreign.now());
        for action in actions {
            foreign.put(action);
        }
    }));
    listeners
}

fn title(state: &State) -> String {
    let unit = |id: &str, what: &str| {
        let unit = state.units.get(id)?;
        Some(if what.is_empty() {
            unit.name.clone()
        } else {
            format!("{what}, {}", unit.name)
        })
    };
    let visit = |id: &str, what: &str| Some(format!("{what}, {}", state.visit(id)?.1.name));
    let what = match &state.route {
        Route::Units => None,
        Route::Settings => Some("Settings".to_owned()),
        Route::Learned => Some("Learned".to_owned()),
        Route::Tags(_) => Some("Tags".to_owned()),
        Route::Tag(_) => Some("Read a tag".to_owned()),
        Route::Unit(id) => unit(id, ""),
        Route::Wear(id) => unit(id, "Wear"),
        Route::Yard(id) => visit(id, "Yard check"),
        Route::Call(id) => visit(id, "Call"),
        Route::Neutral(id) => visit(id, "Neutral"),
        Route::Tracking(id) => visit(id, "Tracking"),
        Route::Report(id) => visit(id, "Report"),
        Route::Bench(id) => visit(id, "Bench"),
    };
    what.map_or_else(|| "Lowside".to_owned(), |what| format!("{what}: Lowside"))
}

/// Properties of [`App`].
#[derive(Clone, PartialEq, Properties)]
struct AppProps {
    /// What was asked before the app was there. Taken once.
    first: Same<RefCell<Vec<Deed>>>,
}

/// Draws the app into an element of the page and does what was asked of it first.
pub fn move_in(root: web_sys::Element, first: Vec<Deed>) {
    let first = Same(Rc::new(RefCell::new(first)));
    yew::Renderer::<App>::with_root_and_props(root, AppProps { first }).render();
}

/// The app.
#[component]
fn App(props: &AppProps) -> Html {
    let keeper = use_memo((), |()| RefCell::new(Keeper::open()));
    let state = {
        let keeper = keeper.clone();
        use_reducer(move || Snapshot(Rc::new(first_state(&keeper))))
    };
    let hands = {
        let (dispatcher, now) = (state.dispatcher(), state.0.clone());
        use_memo((), move |()| Hands::new(keeper.clone(), dispatcher, now))
    };
    let hands: Rc<Hands> = (*hands).clone();
    {
        let (hands, first) = (hands.clone(), props.first.clone());
        use_effect_with((), move |()| {
            let listeners = listen(&hands);
            let asked = first.0.take();
            for deed in asked {
                hands.act(deed);
            }
            let telling = hands.clone();
            persistence::look(move |keeping| telling.put(Action::Keeping(keeping)));
            if offline::update_waits() {
                hands.put(Action::UpdateWaits);
            }
            move || drop(listeners)
        });
    }
    {
        let hands = hands.clone();
        use_effect_with((*state).clone(), move |state| hands.look(state.0.clone()));
    }
    use_effect_with(state.settings.theme, |chosen| theme::show(*chosen));
    let is_first = use_mut_ref(|| true);
    use_effect_with(state.route.clone(), move |_| {
        // The first screen keeps the focus where the browser put it.
        if !std::mem::take(&mut *is_first.borrow_mut()) {
            focus::heading("title");
        }
    });
    use_effect_with(title(&state), |title| {
        if let Some(document) = web_sys::window().and_then(|window| window.document()) {
            document.set_title(title);
        }
    });
    let engine = hands.engine();
    let undo = hands.undoable(&state.route);
    let deed = use_memo((), move |()| {
        Callback::from(move |deed: Deed| hands.act(deed))
    });
    let snapshot = (*state).clone();
    // The same at every drawing: all fields hang on it.
    let keys = {
        let deed = (*deed).clone();
        use_memo(state.settings.own_keys, move |on| OwnKeys {
            on: *on,
            on_change: deed.reform(Deed::OwnKeys),
        })
    };
    html! {
        <ContextProvider<OwnKeys> context={(*keys).clone()}>
            <a class="skip" href="#main" onclick={Callback::from(|event: yew::MouseEvent| {
                // The address is taken by the route.
                event.prevent_default();
                focus::to("title");
            })}>{ "To the content" }</a>
            <Bar state={snapshot.clone()} />
            <Notices state={snapshot.clone()} deed={(*deed).clone()} />
            <p class="hidden-text" role="status" aria-live="polite" data-testid="said">
                <span key={state.said.0}>{ &state.said.1 }</span>
            </p>
            <ContextProvider<Engine> context={engine}>
                <ContextProvider<UnitPrefs> context={snapshot.settings.units.clone()}>
                    { screen(&snapshot, &deed) }
                </ContextProvider<UnitPrefs>>
            </ContextProvider<Engine>>
            if let Some(words) = undo {
                <button
                    type="button"
                    class="button is-quiet app-undo"
                    data-testid="undo-here"
                    onclick={deed.reform(|_: yew::MouseEvent| Deed::Undo)}
                >
                    <Icon shape={Shape::Back} />{ "Undo: " }{ words }
                </button>
            }
            <Keypad on={state.settings.own_keys} mark={state.settings.units.mark()} />
        </ContextProvider<OwnKeys>>
    }
}

/// Where a record that the address names should be.
pub fn missing(what: &str) -> Html {
    html! {
        <main class="page" id="main" data-testid="missing-screen">
            <h1 id="title" tabindex="-1">{ format!("This {what} is not here") }</h1>
            <p>{ "It was removed, or it was made on another device." }</p>
            <div class="actions"><a class="button is-main" href={Route::Units.href()}>{ "To the units" }</a></div>
        </main>
    }
}

fn screen(state: &Snapshot, deed: &Callback<Deed>) -> Html {
    match &state.route {
        Route::Units => html! { <Units state={state.clone()} deed={deed.clone()} /> },
        Route::Unit(id) => match state.units.get(id) {
            Some(unit) => html! {
                <Profile key={id.clone()} unit={unit.clone()} state={state.clone()} deed={deed.clone()} />
            },
            None => missing("unit"),
        },
        Route::Call(id) if !state.is_yard_check(id) => match state.visit(id) {
            Some((visit, unit)) => {
                let (assessment, updating) = state.answer(id);
                html! {
                    <CallScreen
                        key={id.clone()}
                        unit={unit.clone()}
                        visit={visit.clone()}
                        earlier={EarlierCalls(state.visits_before(visit))}
                        instruments={state.instruments.clone()}
                        prefs={state.settings.units.clone()}
                        {assessment}
                        {updating}
                        on_visit={put_visit(deed)}
                        on_unit={put_unit(deed)}
                        on_instruments={deed.reform(|list| Deed::Put(Action::PutInstruments(list)))}
                    />
                }
            }
            None => missing("call"),
        },
        _ => html! { <Room state={state.clone()} deed={deed.clone()} /> },
    }
}

/// An edited visit goes to the state.
pub fn put_visit(deed: &Callback<Deed>) -> Callback<Visit> {
    deed.reform(|visit| Deed::Put(Action::PutVisit(Box::new(visit))))
}

/// An edited unit goes to the state.
pub fn put_unit(deed: &Callback<Deed>) -> Callback<Unit> {
    deed.reform(|unit| Deed::Put(Action::PutUnit(unit)))
}
