//! Rooms of their own beside the call: work that is no hunt for a cause, and the report of it all.

use crate::app::parts::{Icon, Shape};
use crate::app::route::Route;
use crate::app::screens::unit::usual_paths;
use crate::record::Visit;
use crate::unit::Unit;
use yew::{Html, html};

/// Links to the rooms of this visit. Tracking is for machines with two sides: by its ticks, by its class where the ticks
/// were never looked at, or because a sheet was begun.
pub fn links(unit: &Unit, visit: &Visit) -> Html {
    let id = &visit.id;
    let two_sides =
        !unit.ticks.paths.is_one() || !usual_paths(unit.class).is_one() || visit.tracking.is_some();
    let neutral = (
        Route::Neutral(id.clone()),
        "Set the neutral",
        "creep, null, dead band",
        "to-neutral",
    );
    let tracking = (
        Route::Tracking(id.clone()),
        "Straight tracking",
        "a machine with two sides that does not run straight",
        "to-tracking",
    );
    let bench = (
        Route::Bench(id.clone()),
        "Bench stand",
        "a sheet for its pump or motor",
        "to-bench",
    );
    let report = (
        Route::Report(id.clone()),
        "Hand-over report",
        "on paper, as text, as a table",
        "to-report",
    );
    let rooms = [
        Some(neutral),
        two_sides.then_some(tracking),
        Some(bench),
        Some(report),
    ];
    html! {
        <nav class="panel stack" aria-label="Adjusting and report">
            { for rooms.into_iter().flatten().map(|(route, words, what, testid)| html! {
                <a key={testid} class="button is-quiet" href={route.href()} data-testid={testid}>
                    <span>{ words }<span class="soft">{ format!(": {what}") }</span></span>
                    <Icon shape={Shape::Forward} />
                </a>
            }) }
        </nav>
    }
}
