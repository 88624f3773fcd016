//! One reading at a time over the whole screen.

use super::dial;
use super::hold_timer::{HoldTimer, Kept};
use crate::app::call::gate_panel::{RESTARTED, first_stop, stop_at};
use crate::app::call::side::Sides;
use crate::app::parts::{Icon, Shape};
use crate::app::platform::awake::Awake;
use crate::app::platform::focus;
use crate::assessment::Window;
use crate::call::{hold, watch, words};
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::readings::{Doing, Reading};
use crate::unit::Unit;
use std::rc::Rc;
use web_sys::HtmlDialogElement;
use yew::{
    AttrValue, Callback, Event, Html, MouseEvent, Properties, component, html, use_effect_with,
    use_node_ref, use_state,
};

/// One reading to be watched.
#[derive(Clone, Debug, PartialEq)]
pub struct Watched {
    /// The reading.
    pub reading: Reading,
    /// What a healthy unit shows.
    pub window: Option<Window>,
    /// What stands on the port.
    pub instrument: Option<Instrument>,
    /// Why it must not be taken now; none where it may.
    pub closed: Option<AttrValue>,
}

/// Properties of [`WatchView`].
#[derive(Clone, PartialEq, Properties)]
pub struct WatchViewProps {
    /// The readings of one condition, in the order of their rows.
    pub watched: Vec<Watched>,
    /// Ports that are there twice.
    pub sides: Sides,
    /// Unit.
    pub unit: Rc<Unit>,
    /// Clock of the holds of this call.
    pub clock: Kept,
    /// Units.
    pub prefs: UnitPrefs,
    /// To the fields: they are filled in now.
    pub on_write: Callback<()>,
    /// Back to the call, at this reading.
    pub on_close: Callback<String>,
    /// The engine was stopped and started again.
    pub on_restarted: Callback<()>,
}

/// The view.
#[component]
pub fn WatchView(props: &WatchViewProps) -> Html {
    let at = use_state(|| 0_usize);
    let dialog = use_node_ref();
    {
        let dialog = dialog.clone();
        use_effect_with((), move |()| {
            // Lit as long as it is open.
            let awake = Awake::ask();
            if let Some(dialog) = dialog.cast::<HtmlDialogElement>() {
                // Where the browser cannot, it stands in the page like any other part.
                let _ = dialog.show_modal();
            }
            focus::to("watch-title");
            move || drop(awake)
        });
    }
    let last = props.watched.len().saturating_sub(1);
    let place = (*at).min(last);
    let Some(now) = props.watched.get(place) else {
        return Html::default();
    };
    let go = |to: usize| {
        let at = at.clone();
        Callback::from(move |_: MouseEvent| {
            at.set(to);
            focus::to("watch-title");
        })
    };
    let id = now.reading.id.clone();
    let on_close = props.on_close.reform(move |_: MouseEvent| id.clone());
    let on_cancel = {
        let (on_close, id) = (props.on_close.clone(), now.reading.id.clone());
        Callback::from(move |event: Event| {
            event.prevent_default();
            on_close.emit(id.clone());
        })
    };
    let (reading, condition) = (&now.reading, &now.reading.condition);
    let before = place
        .checked_sub(1)
        .and_then(|before| props.watched.get(before));
    let is_new = before.is_some_and(|before| before.reading.condition != *condition);
    html! {
        <dialog ref={dialog} class={if condition.doing == Doing::Held { "watch is-held" } else { "watch" }} aria-labelledby="watch-title" oncancel={on_cancel} data-testid="watch">
            <header class="watch-head">
                <div>
                    <h2 id="watch-title" tabindex="-1">{ props.sides.name(reading) }</h2>
                    <p class={if is_new { "watch-condition is-new" } else { "watch-condition" }} data-testid="watch-condition">
                        { if is_new { "Change to: " } else { "" } }{ words::condition(condition, &props.prefs) }
                    </p>
                </div>
                <button type="button" class="button is-quiet watch-close" onclick={on_close} data-testid="watch-close">
                    <Icon shape={Shape::Cross} /><span class="watch-word">{ "Close" }</span>
                </button>
            </header>
            <p class="watch-safety" data-testid="watch-safety"><Icon shape={Shape::Warning} /><span>{ watch::safety(condition) }</span></p>
            <div class="watch-body">
                if let Some(why) = &now.closed {
                    <p class="watch-refused" role="alert" data-testid="watch-closed"><Icon shape={Shape::Danger} /><span>{ why.clone() }</span></p>
                } else {
                    { held(props, now) }
                    { target(props, now) }
                }
                <button type="button" class="button is-quiet" onclick={props.on_restarted.reform(|_: MouseEvent| ())} data-testid="watch-restarted">
                    { RESTARTED }
                </button>
            </div>
            <footer class="watch-foot">
                if last > 0 {
                    <div class="watch-keys">
                        <button type="button" class="button watch-key" disabled={place == 0} onclick={go(place.saturating_sub(1))} data-testid="watch-back">
                            <Icon shape={Shape::Back} /><span class="watch-word">{ "Back" }</span>
                        </button>
                        <p class="watch-count" role="status" data-testid="watch-count">{ format!("{} of {}", place + 1, last + 1) }</p>
                        <button type="button" class="button watch-key" disabled={place == last} onclick={go((place + 1).min(last))} data-testid="watch-next">
                            <span class="watch-word">{ "Next" }</span><Icon shape={Shape::Forward} />
                        </button>
                    </div>
                }
                <button type="button" class="button is-main is-wide watch-write" onclick={props.on_write.reform(|_: MouseEvent| ())} data-testid="watch-write">
                    { "Write them down" }
                </button>
            </footer>
        </dialog>
    }
}

/// The dial, the band in words, the instrument.
fn target(props: &WatchViewProps, now: &Watched) -> Html {
    let port = now.reading.port;
    let on = watch::instrument(port, now.instrument.as_ref());
    let is_held = now.reading.condition.doing == Doing::Held;
    let stop = first_stop(&props.unit).filter(|_| is_held);
    let Some(window) = now
        .window
        .as_ref()
        .filter(|window| window.low.is_finite() && window.high.is_finite())
    else {
        return html! { <>
            if is_held {
                <p class="watch-stop" data-testid="watch-stop">{ stop_at(&props.unit, &props.prefs) }</p>
            }
            <p class="watch-band" data-testid="watch-words">{ "Nothing foretold here: read what stands." }</p>
            <p class="watch-instrument">{ on }</p>
        </> };
    };
    let (low, high) = words::ends(port, window.low, window.high, &props.prefs);
    html! { <>
        { dial::draw(window, port, now.instrument.as_ref(), stop, &props.prefs).unwrap_or_default() }
        <p class="watch-band" data-testid="watch-words">
            <strong class="figure">{ format!("{low} to {high}") }</strong>
            <span>
                { if window.swings { "about this; a healthy needle swings here, " } else { "a healthy unit, " } }
                { words::source(window.source) }
            </span>
        </p>
        if is_held {
            <p class="watch-stop" data-testid="watch-stop">{ stop_at(&props.unit, &props.prefs) }</p>
        }
        <p class="watch-instrument" data-testid="watch-instrument">{ on }</p>
    </> }
}

/// The timer, for a held machine and with flushing blocked.
fn held(props: &WatchViewProps, now: &Watched) -> Html {
    let condition = &now.reading.condition;
    let plan = match hold::plan(&props.unit, condition) {
        Ok(None) => return Html::default(),
        Ok(Some(plan)) => Ok(plan),
        Err(why) => Err(why),
    };
    html! {
        <HoldTimer
            key={now.reading.id.clone()}
            name={format!("{:?}/{:?}", now.reading.port, condition.direction)}
            {plan}
            clock={props.clock.clone()}
            prefs={props.prefs.clone()}
        />
    }
}
