//! The app above the pure core: state, screens, the engine in its worker, and what the browser gives.
//!
//! [`state`] holds everything and is changed by [`state::Action`]s alone; a screen asks for a [`deed::Deed`]; [`hands`] does
//! it. [`persist`] writes the state to the shelf, [`engine`] calculates in a worker.

pub mod call;
pub mod deed;
pub mod engine;
pub mod parts;
pub mod persist;
pub mod platform;
pub mod route;
pub mod state;

use yew::{Html, component, html};

/// The first screen.
#[component]
fn App() -> Html {
    html! { <main data-testid="app"><h1>{ "Lowside" }</h1></main> }
}

/// Starts the app on the page. In a worker, where there is no page, starts answering calculations.
pub fn start() {
    let Some(window) = web_sys::window() else {
        engine::worker::install();
        return;
    };
    let root = window.document().and_then(|document| document.get_element_by_id("app"));
    if let Some(root) = root {
        yew::Renderer::<App>::with_root(root).render();
    }
}
