//! Before the hose goes on: what a reading would be under each leading cause, drawn as bands over one scale. Each band has its
//! cause and its figures beside it, so that nothing hangs on a colour.

use super::NextPanelProps;
use crate::app::call::bands::{self, Axis};
use crate::app::call::side::Sides;
use crate::app::call::steady::Fold;
use crate::app::call::words;
use crate::next::{Foretold, Offer, Would};
use crate::quantity::{Kind, UnitPrefs};
use crate::readings::Port;
use yew::{Callback, Html, html};

/// Readings drawn at once; the rest stands behind a fold.
const DRAWN: usize = 1;

/// What the readings of a check would say, the one that parts the causes best first.
pub fn shown(offer: &Offer, props: &NextPanelProps) -> Html {
    let mut order: Vec<&Foretold> = offer
        .foretold
        .iter()
        .filter(|foretold| !foretold.would.is_empty())
        .collect();
    order.sort_by(|one, other| parting(other).total_cmp(&parting(one)));
    let (first, rest) = order.split_at(DRAWN.min(order.len()));
    if first.is_empty() {
        return Html::default();
    }
    let has_gauge = first
        .iter()
        .any(|foretold| matches!(foretold.port.kind(), Kind::Pressure | Kind::Flow));
    let others = {
        let rest: Vec<Foretold> = rest.iter().map(|foretold| (*foretold).clone()).collect();
        let (sides, prefs) = (props.sides, props.prefs.clone());
        Callback::from(move |()| {
            html! { <div>{ for rest.iter().map(|foretold| drawn(foretold, sides, &prefs)) }</div> }
        })
    };
    html! {
        <div class="told" data-testid={format!("told-{}", offer.id)}>
            <h4>{ if has_gauge { "Before the gauge goes on: what it would read" } else { "Before you measure: what it would read" } }</h4>
            { for first.iter().map(|foretold| drawn(foretold, props.sides, &props.prefs)) }
            if !rest.is_empty() {
                <Fold
                    head={html! { { if rest.len() == 1 { String::from("The other reading of it") } else { format!("The other {} readings of it", rest.len()) } } }}
                    body={others}
                    class="advice"
                />
            }
            <p class="soft small">{ "Band: 8 times in 10, gauge included. Mark: most likely." }</p>
        </div>
    }
}

/// What a pair below the two leading causes counts for.
const LESS: f64 = 0.3;

/// How far the reading parts the causes: the two leading ones first, in half-widths of their bands.
fn parting(foretold: &Foretold) -> f64 {
    let apart = |one: &Would, other: &Would| {
        let width = ((one.high - one.low) + (other.high - other.low)) / 2.0;
        let apart = (one.value - other.value).abs() / width.max(1e-9);
        if apart.is_finite() {
            apart.min(10.0)
        } else {
            0.0
        }
    };
    let would = &foretold.would;
    let lead = match would.as_slice() {
        [one, other, ..] => apart(one, other),
        _ => 0.0,
    };
    let pairs = would.iter().enumerate().flat_map(|(place, one)| {
        would
            .iter()
            .skip(place + 1)
            .map(move |other| apart(one, other))
    });
    lead + LESS * pairs.fold(0.0, f64::max)
}

/// One reading: a row a cause over one scale.
fn drawn(foretold: &Foretold, sides: Sides, prefs: &UnitPrefs) -> Html {
    let port = foretold.port;
    let spans: Option<Vec<(f64, f64)>> = foretold
        .would
        .iter()
        .map(|would| {
            words::shown(port, would.low, prefs).zip(words::shown(port, would.high, prefs))
        })
        .collect();
    let axis = spans.as_deref().and_then(bands::axis);
    html! {
        <figure class="told-reading">
            <figcaption>
                <strong>{ sides.port(port, foretold.path) }</strong>
                <span class="soft">{ ", " }{ words::condition(&foretold.condition, prefs) }</span>
            </figcaption>
            <ul class="told-rows">
                { for foretold.would.iter().map(|would| row(port, would, axis, prefs)) }
            </ul>
            { for axis.map(|axis| foot(axis, port, prefs)) }
        </figure>
    }
}

fn row(port: Port, would: &Would, axis: Option<Axis>, prefs: &UnitPrefs) -> Html {
    let (low, high) = words::ends(port, would.low, would.high, prefs);
    let at = |per_cent: f64| format!("{per_cent:.2}%");
    let band = axis.and_then(|axis| {
        let low = words::shown(port, would.low, prefs)?;
        let high = words::shown(port, would.high, prefs)?;
        let value = words::shown(port, would.value, prefs)?;
        Some((axis, axis.band(low, high), axis.place(value)))
    });
    html! {
        <li class="told-row" key={would.title.clone()}>
            <span class="told-cause">{ would.title.clone() }</span>
            <span class="told-range figure">{ format!("{low} to {high}") }</span>
            if let Some((axis, (left, width), value)) = band {
                <svg class="told-band" width="100%" height="20" aria-hidden="true" focusable="false">
                    <rect x="0" y="9" width="100%" height="2" class="scale-track" />
                    { for axis.ticks().into_iter().map(|tick| html! {
                        <line x1={at(axis.place(tick))} x2={at(axis.place(tick))} y1="5" y2="15" class="told-tick" />
                    }) }
                    <rect x={at(left)} y="3" width={at(width)} height="14" rx="2" class="told-span" />
                    <line x1={at(value)} x2={at(value)} y1="0" y2="20" class="told-value" />
                </svg>
            }
        </li>
    }
}

/// Round figures under the bands, the unit with the last of them.
fn foot(axis: Axis, port: Port, prefs: &UnitPrefs) -> Html {
    let ticks = axis.ticks();
    let last = ticks.len().saturating_sub(1);
    let unit = words::unit_of(port, prefs).symbol();
    html! {
        <svg class="told-foot" width="100%" height="18" aria-hidden="true" focusable="false">
            { for ticks.iter().enumerate().map(|(place, tick)| {
                let figure = words::tick(*tick, axis.decimals(), prefs.mark());
                let (text, end) = match place {
                    0 => (figure, "is-start"),
                    place if place == last => (format!("{figure} {unit}"), "is-end"),
                    _ => (figure, "is-middle"),
                };
                html! {
                    <text x={format!("{:.2}%", axis.place(*tick))} y="14" class={format!("told-figure {end}")}>{ text }</text>
                }
            }) }
        </svg>
    }
}
