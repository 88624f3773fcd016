//! One reading: where, what, with which instrument, and how it stands against a healthy unit.

use super::cautions;
use super::change::Change;
use super::entry::{self, Mode};
use super::entry_field::EntryField;
use super::help;
use super::last_time::{self, LastTime};
use super::mark;
use super::retake;
use super::rig::{Rig, Rigged};
use super::side::{Sides, Wanted, named};
use super::window_scale::WindowScale;
use super::words;
use crate::app::parts::{Choice, Confirm, Opt, TextField};
use crate::assessment::{Standing, Window};
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::readings::{Direction, JugCatch, Path, Reading};
use crate::record::Earlier;
use crate::unit::{PortNote, Unit};
use std::rc::Rc;
use yew::{AttrValue, Callback, Html, MouseEvent, Properties, component, html, use_state};

/// Properties of [`ReadingRow`].
#[derive(Clone, PartialEq, Properties)]
pub struct ReadingRowProps {
    /// The reading.
    pub reading: Reading,
    /// Place in the visit's list.
    pub number: usize,
    /// Ports that are there twice.
    pub sides: Sides,
    /// The same is not there yet on the other side.
    pub lacks_other_side: bool,
    /// Its window, where there is an answer.
    pub window: Option<Window>,
    /// Why it should be taken again.
    pub retake: Option<String>,
    /// The same reading on an earlier call.
    pub last: Option<LastTime>,
    /// Why its field stays closed; none where it is open.
    pub closed: Option<AttrValue>,
    /// True where its port was touched on the drawing.
    pub chosen: bool,
    /// Unit.
    pub unit: Rc<Unit>,
    /// Instruments on its port.
    pub rigged: Rigged,
    /// What was caught in a jug for it.
    #[prop_or_default]
    pub caught: JugCatch,
    /// What it read before it was taken again.
    pub before: Vec<Earlier>,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units.
    pub prefs: UnitPrefs,
    /// An edit.
    pub on_change: Callback<Change>,
    /// The shop's list was added to.
    pub on_instruments: Callback<Vec<Instrument>>,
}

/// DOM id of a row.
pub fn row_id(reading: &str) -> String {
    format!("row-{reading}")
}

/// The row.
#[component]
pub fn ReadingRow(props: &ReadingRowProps) -> Html {
    let more = use_state(|| false);
    let reading = &props.reading;
    let name = props.sides.name(reading);
    let short = named(
        props.sides.side(reading.port, reading.path),
        words::port_short(reading.port),
    );
    let standing = props
        .window
        .as_ref()
        .map_or(Standing::Open, |window| window.standing);
    let is_open = entry::is_open(reading);
    let plain = entry::mode(reading) == Mode::Value;
    let instrument = props.rigged.current.clone();
    let toggle = {
        let more = more.clone();
        Callback::from(move |_: MouseEvent| more.set(!*more))
    };
    // A reading that was emptied has nothing left that could not fit.
    let doubt = props.retake.as_deref().filter(|_| !is_open);
    let earlier = props.before.as_slice();
    let class = format!(
        "reading{}{}{}{}",
        if doubt.is_some() { " is-doubtful" } else { "" },
        if props.chosen { " is-chosen" } else { "" },
        if plain { " is-plain" } else { "" },
        // The keys give way once a value stands; "More" brings them back.
        if plain && reading.seen.is_some() && !*more {
            " is-settled"
        } else {
            ""
        },
    );
    html! {
        <li {class} id={row_id(&reading.id)} tabindex="-1" data-testid={format!("reading-row-{}", props.number)}>
            <div class="reading-head">
                <h4 class="reading-name">{ name.clone() }</h4>
                if doubt.is_some() {
                    { retake::badge() }
                } else if !is_open {
                    <span class="reading-standing">
                        { mark::badge(standing) }
                    </span>
                }
                <button
                    type="button"
                    class="reading-more"
                    aria-expanded={if *more { "true" } else { "false" }}
                    aria-label={format!("More about {name}")}
                    data-testid={format!("more-{}", props.number)}
                    onclick={toggle}
                >
                    { if *more { "Less" } else { "More" } }
                </button>
            </div>
            if let Some(why) = doubt {
                { retake::ask(reading, props.number, why, earlier, &props.on_change) }
            }
            if is_open || *more {
                { props.unit.ports.get(&reading.port).map(port_note) }
            }
            if is_open || *more {
                { help::fold(&reading.condition, reading.port, props.unit.ports.get(&reading.port), props.number) }
            }
            if let Some(why) = &props.closed {
                { closed(reading, why) }
            } else {
                <EntryField
                    reading={reading.clone()}
                    {name}
                    {short}
                    number={props.number}
                    {instrument}
                    caught={props.caught.clone()}
                    last={props.last.clone()}
                    prefs={props.prefs.clone()}
                    on_change={props.on_change.clone()}
                />
            }
            <Rig
                reading={reading.clone()}
                number={props.number}
                short={!is_open && !*more}
                unit={props.unit.clone()}
                rigged={props.rigged.clone()}
                instruments={props.instruments.clone()}
                prefs={props.prefs.clone()}
                on_change={props.on_change.clone()}
                on_instruments={props.on_instruments.clone()}
            />
            { last_time::told(reading, props.last.as_ref(), props.number, &props.prefs) }
            { retake::before(reading, props.number, earlier, &props.prefs) }
            { cautions::of_reading(reading) }
            if let Some(window) = &props.window {
                <WindowScale
                    port={reading.port}
                    window={window.clone()}
                    prefs={props.prefs.clone()}
                    full={*more}
                    number={props.number}
                />
            }
            if *more {
                { extras(props) }
            }
        </li>
    }
}

/// Where the port is on this machine and what it takes to get at it.
fn port_note(note: &PortNote) -> Html {
    let access = note
        .access_minutes
        .filter(|minutes| *minutes > 0.0)
        .map(|minutes| format!("{minutes:.0} min to get at it"));
    let parts: Vec<String> = [note.place.clone(), note.adapter.clone()]
        .into_iter()
        .filter(|text| !text.trim().is_empty())
        .chain(access)
        .collect();
    if parts.is_empty() {
        return Html::default();
    }
    html! { <p class="reading-port">{ parts.join(" · ") }</p> }
}

/// A closed field still shows what stands in it.
fn closed(reading: &Reading, why: &AttrValue) -> Html {
    html! {
        <div class="reading-closed" data-testid="closed">
            if !reading.typed.is_empty() {
                <strong class="figure">{ reading.typed.clone() }</strong>
            }
            <span>{ why.clone() }</span>
        </div>
    }
}

/// Note, the same port the other way, and the way out.
fn extras(props: &ReadingRowProps) -> Html {
    let reading = &props.reading;
    let on_note = {
        let id = reading.id.clone();
        props
            .on_change
            .reform(move |text| Change::Note(id.clone(), text))
    };
    let on_remove = {
        let id = reading.id.clone();
        props.on_change.reform(move |()| Change::Remove(id.clone()))
    };
    let again = (!reading.condition.doing.is_neutral()).then(|| {
        let mut condition = reading.condition;
        condition.direction = match condition.direction {
            Direction::Forward => Direction::Reverse,
            Direction::Reverse => Direction::Forward,
        };
        let (port, path) = (reading.port, reading.path);
        props.on_change.reform(move |_: MouseEvent| {
            Change::Add(vec![Wanted {
                path,
                port,
                condition,
            }])
        })
    });
    html! {
        <div class="reading-extras stack">
            { side(props) }
            <TextField
                id={format!("note-{}", reading.id)}
                label="Note"
                value={reading.note.clone()}
                on_input={on_note}
                testid={format!("note-{}", props.number)}
            />
            <div class="actions">
                if let Some(again) = again {
                    <button type="button" class="button is-quiet" onclick={again}>{ "The same, other direction" }</button>
                }
                { other_side(props) }
                <Confirm
                    words="Remove"
                    question={format!("Remove {} from this call?", props.sides.name(reading))}
                    yes="Remove it"
                    on_yes={on_remove}
                    testid={format!("remove-{}", props.number)}
                />
            </div>
        </div>
    }
}

/// On which side it was taken, where the port is there twice: a slip of the note is put right here.
fn side(props: &ReadingRowProps) -> Html {
    let reading = &props.reading;
    let Some(path) = props.sides.side(reading.port, reading.path) else {
        return Html::default();
    };
    let id = reading.id.clone();
    let on_side = props
        .on_change
        .reform(move |path: Path| Change::Side(id.clone(), path));
    html! {
        <Choice<Path>
            name={format!("side-{}", props.number)}
            label="Taken on which side"
            options={vec![Opt::new(Path::Left, "Left", "left"), Opt::new(Path::Right, "Right", "right")]}
            value={Some(path)}
            on_change={on_side}
        />
    }
}

/// The same on the other side, where that is not there yet.
fn other_side(props: &ReadingRowProps) -> Html {
    let reading = &props.reading;
    if !props.lacks_other_side || !props.sides.has(reading.port) {
        return Html::default();
    }
    let wanted = Wanted {
        path: reading.path.other(),
        port: reading.port,
        condition: reading.condition,
    };
    let on_add = props
        .on_change
        .reform(move |_: MouseEvent| Change::Add(vec![wanted]));
    html! {
        <button type="button" class="button is-quiet" onclick={on_add} data-testid={format!("other-side-{}", props.number)}>
            { format!("The same, {} side", reading.path.other().words()) }
        </button>
    }
}
