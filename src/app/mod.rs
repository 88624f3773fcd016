//! The app above the pure core: state, screens, the engine in its worker, and what the browser gives.

pub mod parts;
pub mod platform;
pub mod route;

use yew::{Html, component, html};

/// The first screen.
#[component]
fn App() -> Html {
    html! { <main data-testid="app"><h1>{ "Lowside" }</h1></main> }
}

/// Mounts the app. In a worker, where there is no window, nothing is drawn.
pub fn start() {
    let Some(root) = web_sys::window()
        .and_then(|window| window.document())
        .and_then(|document| document.get_element_by_id("app"))
    else {
        return;
    };
    yew::Renderer::<App>::with_root(root).render();
}
