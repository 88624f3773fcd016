//! Rooms of their own beside the call: work that is no hunt for a cause.

use crate::app::parts::{Icon, Shape};
use crate::app::route::Route;
use yew::{Html, html};

/// Links to the rooms of this visit.
pub fn links(visit: &str) -> Html {
    let rooms = [(
        Route::Tracking(visit.to_owned()),
        "Straight tracking",
        "a machine with two sides that does not run straight",
        "to-tracking",
    )];
    html! {
        <nav class="panel stack" aria-label="Adjusting">
            { for rooms.into_iter().map(|(route, words, what, testid)| html! {
                <a key={testid} class="button is-quiet" href={route.href()} data-testid={testid}>
                    <span>{ words }<span class="soft">{ format!(": {what}") }</span></span>
                    <Icon shape={Shape::Forward} />
                </a>
            }) }
        </nav>
    }
}
