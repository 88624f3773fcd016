//! A catch in a jug: stopwatch, litres, seconds, and the flow that goes into the reading.

use super::change::Change;
use super::entry;
use super::words;
use crate::app::parts::{Entry, MeasureField, Stopwatch};
use crate::assessment::upper_first;
use crate::quantity::{self, Kind, Measure, Typed, Unit, UnitPrefs};
use crate::readings::jug::{CatchError, LONG_ENOUGH_S, MOST, TIME, VOLUME, rounded};
use crate::readings::{JugCatch, Reading, Seen};
use yew::{AttrValue, Callback, Html, MouseEvent, Properties, component, html, use_memo};

/// Properties of [`JugPanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct JugPanelProps {
    /// The reading: a flow.
    pub reading: Reading,
    /// What is read, in a word or two.
    pub short: AttrValue,
    /// Place in the list, for test ids.
    pub number: usize,
    /// What was caught so far.
    pub caught: JugCatch,
    /// Units.
    pub prefs: UnitPrefs,
    /// An edit.
    pub on_change: Callback<Change>,
}

/// Litres and seconds of one side of the panel.
#[derive(Clone, Copy, PartialEq)]
enum Part {
    Volume,
    Time,
}

/// The panel, folded until it is used.
#[component]
pub fn JugPanel(props: &JugPanelProps) -> Html {
    let id = format!("jug-{}", props.reading.id);
    // Open where something stands in it already; afterwards it is the person's.
    let is_open = use_memo((), |()| !props.caught.is_empty());
    let set = |part: Part| {
        let props = props.clone();
        Callback::from(move |typed: Typed| {
            let mut jug = props.caught.clone();
            match part {
                Part::Volume => jug.volume = typed,
                Part::Time => jug.time = typed,
            }
            props.on_change.emit(change(&props, jug));
        })
    };
    let on_time = {
        let set = set(Part::Time);
        Callback::from(move |stopped: Option<f64>| {
            // Set back to zero for the next try: what was taken stays until there is another time.
            if let Some(seconds) = stopped {
                set.emit(Typed::shown(seconds, Unit::Second, 1));
            }
        })
    };
    let field = |part: Part| {
        let (code, label, typed, unit, span) = match part {
            Part::Volume => {
                let unit = props.prefs.unit(Kind::Volume);
                (
                    "volume",
                    "Oil in the jug",
                    &props.caught.volume,
                    unit,
                    (VOLUME, Unit::Litre),
                )
            }
            Part::Time => (
                "time",
                "Time",
                &props.caught.time,
                Unit::Second,
                (TIME, Unit::Second),
            ),
        };
        let ((low, high), of) = span;
        let range = Measure::new(low, of).ok().zip(Measure::new(high, of).ok());
        html! {
            <MeasureField
                id={format!("{id}-{code}")}
                {label}
                {unit}
                typed={AttrValue::from(typed.typed.clone())}
                value={typed.value}
                {range}
                mark={props.prefs.mark()}
                on_entry={set(part).reform(|entry: Entry| entry)}
                testid={format!("jug-{code}-{}", props.number)}
                class="jug-value"
            />
        }
    };
    html! {
        <details class="advice jug" open={*is_open} data-testid={format!("jug-{}", props.number)}>
            <summary>{ "Caught in a jug: litres and seconds" }</summary>
            <div class="stack is-tight">
                <Stopwatch id={format!("{id}-watch")} label={format!("Jug under {}", props.short)} {on_time} />
                <div class="entry-pair">
                    { field(Part::Volume) }
                    { field(Part::Time) }
                </div>
                <div role="status" data-testid={format!("jug-result-{}", props.number)}>{ result(props) }</div>
            </div>
        </details>
    }
}

/// The edit that one of the figures makes.
fn change(props: &JugPanelProps, jug: JugCatch) -> Change {
    let unit = words::unit_of(props.reading.port, &props.prefs);
    let flow = jug.flow().ok().and_then(|made| rounded(made.value, unit));
    let was_its_figure = props.caught.behind(&props.reading).is_some();
    let said = match flow {
        Some(value) => Some((
            quantity::edit_text(value, unit, props.prefs.mark()),
            Some(Seen::Value { value }),
        )),
        // A figure that came from the jug goes with it; one typed by hand stays.
        None if was_its_figure => Some((String::new(), None)),
        None => None,
    };
    Change::Caught {
        id: props.reading.id.clone(),
        jug,
        said,
    }
}

/// What the catch comes to, or what is wrong with it and what to do.
fn result(props: &JugPanelProps) -> Html {
    let (jug, port) = (&props.caught, props.reading.port);
    match jug.flow() {
        Ok(made) => {
            let flow = words::value(port, made.value.base(), &props.prefs);
            let spread = words::spread(port, 2.0 * made.combined(), &props.prefs);
            html! { <>
                <p class="jug-flow">
                    <strong class="figure">{ flow }</strong>
                    { format!(" {spread} (95 in 100): marks of the jug, level in it, hand on the watch; common practice.") }
                </p>
                if jug.is_short() {
                    <p>{ format!("Under {LONG_ENOUGH_S:.0} s the hand on the watch counts for much: catch for {LONG_ENOUGH_S:.0} s or more \
                        where the jug holds it.") }</p>
                }
                if jug.behind(&props.reading).is_none() {
                    <p class="field-read">{ "Another figure stands in the reading. Change litres or seconds to take the jug’s." }</p>
                }
            </> }
        }
        Err(CatchError::Missing) => html! {
            <p class="field-hint">{ "Hose tied into the jug first. Start as the oil runs in, stop as it reaches a mark; then type the litres." }</p>
        },
        Err(why) => {
            let too_much = matches!(why, CatchError::TooMuch { .. });
            html! { <>
                <p class="field-error" data-testid={format!("jug-error-{}", props.number)}>{ upper_first(&why.to_string()) }{ "." }</p>
                if too_much { { over(props) } }
            </> }
        }
    }
}

/// What a catch over the limit still says: more than a jug is for.
fn over(props: &JugPanelProps) -> Html {
    let Ok(top) = Measure::new(MOST, Unit::LitrePerMinute) else {
        return Html::default();
    };
    let (typed, seen) = entry::off_scale(Entry {
        typed: props.prefs.print(top),
        value: Some(top),
    });
    let id = props.reading.id.clone();
    let on_click = props.on_change.reform(move |_: MouseEvent| Change::Entry {
        id: id.clone(),
        typed: typed.clone(),
        seen: seen.clone(),
    });
    html! {
        <button type="button" class="button" onclick={on_click} data-testid={format!("jug-over-{}", props.number)}>
            { format!("Take it as over {}", props.prefs.print(top)) }
        </button>
    }
}
