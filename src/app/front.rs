//! The first screen of a first visit, drawn from what little has come by then, while the house is still on its way. It does nothing
//! by itself: what is asked of it is handed to the house, and what was typed stays for it.
//!
//! Whoever has been here before comes straight into the house: their device has all of it.

use std::cell::{Cell, RefCell};
use std::mem::discriminant;
use std::rc::Rc;

use wasm_bindgen::JsCast;
use web_sys::{Element, Window};
use yew::{
    AppHandle, Callback, Event, Html, Properties, component, html, use_effect_with, use_state,
};

use super::deed::{Deed, Snapshot};
use super::later;
use super::parts::{Caution, Grade, Same};
use super::platform::listen::Listener;
use super::route::Route;
use super::screens::units::FirstSteps;
use super::shell::Bar;
use super::state::{Action, State};
use crate::store::PREFIX;

/// Set on the page while nothing can be drawn before the house has come.
const FETCHING: &str = "data-fetching";
/// Set on the page when the house stands and its rooms have come: from then on nothing is fetched for it any more.
const WHOLE: &str = "data-whole";

fn page() -> Option<Element> {
    web_sys::window()?.document()?.document_element()
}

fn mark(name: &str) {
    if let Some(page) = page()
        && let Err(error) = page.set_attribute(name, "yes")
    {
        web_sys::console::warn_1(&error);
    }
}

/// True where nothing of ours is stored and the address asks for no other screen. A storage that cannot be read is the house's to tell.
pub fn is_first_visit(window: &Window) -> bool {
    let hash = window.location().hash().unwrap_or_default();
    let Ok(Some(storage)) = window.local_storage() else {
        return false;
    };
    let count = storage.length().unwrap_or(0);
    let mut keys = (0..count).filter_map(|index| storage.key(index).ok().flatten());
    Route::read(&hash) == Route::Units && !keys.any(|key| key.starts_with(PREFIX))
}

/// Fetches the house and moves in.
pub fn straight_in(root: Element) {
    mark(FETCHING);
    yew::platform::spawn_local(async move {
        match later::house().await {
            Ok(move_in) => enter(move_in, root, Vec::new()),
            Err(_) => super::fail(
                "A part of the app could not be fetched. Check the connection, then try again.",
            ),
        }
    });
}

fn enter(move_in: later::MoveIn, root: Element, asked: Vec<Deed>) {
    move_in(root, asked);
    if let Some(page) = page()
        && let Err(error) = page.remove_attribute(FETCHING)
    {
        web_sys::console::warn_1(&error);
    }
    yew::platform::spawn_local(async {
        // Where they cannot be fetched now, whoever opens one of them is told.
        let _ = super::room::fetch().await;
        mark(WHOLE);
    });
}

/// The front, and what is needed to leave it.
struct Standing {
    root: Element,
    handle: RefCell<Option<AppHandle<Front>>>,
    /// Somebody has touched or typed something: from then on it goes only when it is asked for something.
    is_touched: Cell<bool>,
    listeners: RefCell<Vec<Option<Listener>>>,
    /// What was asked and not done yet.
    asked: RefCell<Vec<Deed>>,
}

impl Standing {
    /// Takes note of what is asked: the latest of each kind. Pressed twice in impatience, one unit is wanted and not two.
    fn note(&self, deed: Deed) {
        let mut asked = self.asked.borrow_mut();
        asked.retain(|before| discriminant(before) != discriminant(&deed));
        asked.push(deed);
    }

    /// It could not be done. What is to be pressed again is forgotten; settings stand on the screen as they were chosen.
    fn put_off(&self) {
        let mut asked = self.asked.borrow_mut();
        asked.retain(|deed| matches!(deed, Deed::Put(_)));
    }

    /// Leaves the front for the house, with all that was asked; a front that is gone already stays gone.
    fn leave(&self, move_in: later::MoveIn) {
        let Some(handle) = self.handle.borrow_mut().take() else {
            return;
        };
        drop(self.listeners.take());
        handle.destroy();
        enter(move_in, self.root.clone(), self.asked.take());
    }
}

/// True where a link was pressed that leads to another screen whose address stands there already: no change of address will follow.
fn is_asked_again(event: &Event) -> bool {
    let here = web_sys::window().and_then(|window| window.location().hash().ok());
    let link = event
        .target()
        .and_then(|target| target.dyn_into::<Element>().ok())
        .and_then(|element| element.closest("a[href]").ok().flatten())
        .and_then(|link| link.get_attribute("href"));
    here.is_some_and(|here| link.as_deref() == Some(&here) && Route::read(&here) != Route::Units)
}

/// Shows the front, fetches the house, and moves in when nobody is disturbed by it.
pub fn show(root: Element) {
    let standing = Rc::new(Standing {
        root: root.clone(),
        handle: RefCell::default(),
        is_touched: Cell::new(false),
        listeners: RefCell::default(),
        asked: RefCell::default(),
    });
    let door = Same(standing.clone());
    let handle = yew::Renderer::<Front>::with_root_and_props(root, FrontProps { door }).render();
    *standing.handle.borrow_mut() = Some(handle);
    let touched = |name| {
        let standing = standing.clone();
        Listener::at_document(name, move |_| standing.is_touched.set(true))
    };
    *standing.listeners.borrow_mut() = vec![touched("pointerdown"), touched("keydown")];
    yew::platform::spawn_local(async move {
        // Where it cannot be fetched now, it is tried again when something is asked.
        if let Ok(move_in) = later::house().await
            && !standing.is_touched.get()
        {
            standing.leave(move_in);
        }
    });
}

/// Goes in with what is asked; tells where that cannot be. Then it is to be asked again.
fn ask(standing: &Rc<Standing>, deed: Option<Deed>, tell: impl FnOnce() + 'static) {
    let standing = standing.clone();
    if let Some(deed) = deed {
        standing.note(deed);
    }
    yew::platform::spawn_local(async move {
        match later::house().await {
            Ok(move_in) => standing.leave(move_in),
            // Why stands in the browser's console.
            Err(_) => {
                standing.put_off();
                tell();
            }
        }
    });
}

/// Properties of [`Front`].
#[derive(Clone, PartialEq, Properties)]
struct FrontProps {
    door: Same<Standing>,
}

/// The first screen, of an empty yard.
#[component]
fn Front(props: &FrontProps) -> Html {
    let has_failed = use_state(|| false);
    let waits = use_state(|| false);
    let state = use_state(|| Snapshot(Rc::new(State::default())));
    let go_in = {
        let (door, has_failed, waits) = (props.door.clone(), has_failed.clone(), waits.clone());
        Callback::from(move |deed: Option<Deed>| {
            let (failed, done) = (has_failed.clone(), waits.clone());
            waits.set(true);
            has_failed.set(false);
            ask(&door.0, deed, move || {
                done.set(false);
                failed.set(true);
            });
        })
    };
    let deed = {
        let (go_in, state) = (go_in.clone(), state.clone());
        Callback::from(move |deed: Deed| {
            // Shown at once, and what is chosen next builds on it.
            if let Deed::Put(Action::PutSettings(settings)) = &deed {
                state.set(Snapshot(Rc::new(State {
                    settings: Rc::new(settings.clone()),
                    ..State::default()
                })));
            }
            go_in.emit(Some(deed));
        })
    };
    let on_data = go_in.reform(|_: Event| None);
    use_effect_with((), move |()| {
        // Another screen is asked for by its address.
        let elsewhere = {
            let go_in = go_in.clone();
            Listener::at_window("hashchange", move |_| go_in.emit(None))
        };
        let again = Listener::at_document("click", move |event| {
            if is_asked_again(&event) {
                go_in.emit(None);
            }
        });
        move || drop((elsewhere, again))
    });
    use_effect_with((), |()| super::platform::theme::show(Default::default()));
    html! {
        <>
            <Bar state={(*state).clone()} />
            if *has_failed {
                <div class="notices">
                    <Caution grade={Grade::Caution} title="not all of the app is here yet" role="alert" testid="front-trouble">
                        <p>{ "The rest of the app could not be fetched. What you typed is kept: find a connection and press again." }</p>
                    </Caution>
                </div>
            }
            <div role="status" aria-live="polite">
                if *waits {
                    <div class="notices">
                        <Caution title="One moment" testid="front-waits">
                            <p>{ "The rest of the app is being fetched. It goes on by itself." }</p>
                        </Caution>
                    </div>
                }
            </div>
            <main class="page" id="main" data-testid="front-screen" aria-busy={waits.to_string()}>
                <div class="page-head"><h1 id="title" tabindex="-1">{ "Units" }</h1></div>
                <FirstSteps state={(*state).clone()} {deed}>
                    // Whoever opens it wants in: the house has what belongs here.
                    <details class="fold panel" ontoggle={on_data}>
                        <summary>{ "Your data, as a file" }</summary>
                        <p>{ "The rest of the app is still being fetched." }</p>
                    </details>
                </FirstSteps>
            </main>
        </>
    }
}
