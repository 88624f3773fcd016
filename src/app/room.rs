//! A screen beside the road call, which may have to be fetched first: after the first visit it comes from the device, and on the first
//! it is fetched as soon as the app stands, so that one rarely waits here.

use std::cell::Cell;

use yew::{Callback, Html, MouseEvent, Properties, component, html, use_effect_with, use_state};

use super::deed::{Deed, Snapshot};
use super::later::{self, Draw, Unreachable};
use super::parts::{Caution, Grade};
use super::platform::focus;
use super::route::Route;

thread_local! {
    static DRAW: Cell<Option<Draw>> = const { Cell::new(None) };
}

/// Fetches the rooms, unless they are there.
///
/// # Errors
/// They cannot be fetched; why stands in the browser's console. It is tried again at the next call.
pub async fn fetch() -> Result<(), Unreachable> {
    if DRAW.get().is_none() {
        DRAW.set(Some(later::rooms().await?));
    }
    Ok(())
}

/// Properties of [`Room`].
#[derive(Clone, PartialEq, Properties)]
pub struct RoomProps {
    /// The state.
    pub state: Snapshot,
    /// Wishes.
    pub deed: Callback<Deed>,
}

/// The screen of the address.
#[component]
pub fn Room(props: &RoomProps) -> Html {
    // Counts the attempts; what came of the last one.
    let attempt = use_state(|| 0_u32);
    let outcome = use_state(|| None::<Result<(), Unreachable>>);
    {
        let outcome = outcome.clone();
        use_effect_with(*attempt, move |_| {
            if DRAW.get().is_none() {
                yew::platform::spawn_local(async move { outcome.set(Some(fetch().await)) });
            }
        });
    }
    use_effect_with(outcome.is_some(), |came| {
        if *came {
            focus::heading("title");
        }
    });
    if let Some(draw) = DRAW.get() {
        return draw(&props.state, &props.deed);
    }
    let on_again = {
        let (attempt, outcome) = (attempt.clone(), outcome.clone());
        Callback::from(move |_: MouseEvent| {
            outcome.set(None);
            attempt.set(attempt.wrapping_add(1));
        })
    };
    html! {
        <main class="page" id="main" data-testid="room-waiting" aria-busy={outcome.is_none().to_string()}>
            <h1 id="title" tabindex="-1">{ if outcome.is_none() { "Fetching this screen…" } else { "This screen is not here yet" } }</h1>
            if matches!(&*outcome, Some(Err(_))) {
                <Caution grade={Grade::Caution} title="could not be fetched" role="alert" testid="room-trouble">
                    <p>{ "This part of the app is not on the device yet. What you typed is kept. Find a connection, then try again." }</p>
                    <div class="actions">
                        <button type="button" class="button is-main" onclick={on_again} data-testid="room-again">{ "Try again" }</button>
                        <a class="button" href={Route::Units.href()}>{ "To the units" }</a>
                    </div>
                </Caution>
            }
        </main>
    }
}
