//! Where the ports are on this machine: what saves the next one the search.

use std::collections::BTreeSet;
use yew::{AttrValue, Callback, Html, MouseEvent, component, html, use_state};

use super::PartProps;
use crate::app::parts::{Choice, Lay, Opt, Section, Select, TextField};
use crate::quantity::parse;
use crate::quantity::{Kind, Measure, Unit as MeasureUnit};
use crate::readings::{Port, SideNaming};
use crate::record::limits;
use crate::unit::{PortNote, Unit};

/// The code of a port in ids and lists: stable, lower case.
pub fn code(port: Port) -> String {
    serde_json::to_value(port)
        .ok()
        .and_then(|value| value.as_str().map(str::to_owned))
        .unwrap_or_default()
}

/// Ports as options.
pub fn port_options(ports: impl Iterator<Item = Port>) -> Vec<Opt<Port>> {
    ports
        .map(|port| Opt::new(port, port.words(), code(port)))
        .collect()
}

/// Reads minutes as typed.
fn minutes(text: &str) -> Result<Option<f64>, String> {
    if text.trim().is_empty() {
        return Ok(None);
    }
    let limit = |minutes: f64| Measure::new(minutes, MeasureUnit::Minute).ok();
    let range = limit(0.0)
        .zip(limit(limits::ACCESS_MINUTES))
        .map(|(low, high)| low..=high);
    parse(text, Kind::Time, MeasureUnit::Minute, range)
        .map(|parsed| Some(parsed.measure.in_unit(MeasureUnit::Minute)))
        .map_err(|error| error.to_string())
}

/// The ports.
#[component]
pub fn Ports(props: &PartProps) -> Html {
    let opened = use_state(BTreeSet::<Port>::new);
    let unit = &props.unit;
    let shown: Vec<Port> = Port::ALL
        .into_iter()
        .filter(|port| unit.ports.contains_key(port) || opened.contains(port))
        .collect();
    let rest = Port::ALL
        .into_iter()
        .filter(|port| !shown.contains(port) && has_a_place(*port));
    let mut options = vec![Opt::new(None, "Choose a port…", "none")];
    options.extend(rest.map(|port| Opt::new(Some(port), port.words(), code(port))));
    let on_open = {
        let opened = opened.clone();
        Callback::from(move |port: Option<Port>| {
            let mut next = (*opened).clone();
            next.extend(port);
            opened.set(next);
        })
    };
    html! {
        <Section id="ports" title="Ports on this machine" state={format!("{} noted", unit.ports.len())}>
            <p class="soft small">{ "Shown at the check, so that nobody searches twice." }</p>
            <Choice<SideNaming>
                name="sides"
                label="Loop ports A and B"
                hint="Here A is the side that is high going forward."
                options={vec![
                    Opt::new(SideNaming::Known, "Known: A is high going forward", "known"),
                    Opt::new(SideNaming::AsMarked, "As marked here; may be the other way round", "marked"),
                ]}
                value={unit.sides}
                on_change={props.change(|unit: &mut Unit, sides| unit.sides = sides)}
                lay={Lay::List}
            />
            { for shown.iter().map(|port| {
                let opened = opened.clone();
                html! {
                    <OnePort
                        key={code(*port)}
                        port={*port}
                        note={unit.ports.get(port).cloned().unwrap_or_default()}
                        on_note={props.change(|unit: &mut Unit, (port, note): (Port, Option<PortNote>)| {
                            match note {
                                Some(note) => unit.ports.insert(port, note),
                                None => unit.ports.remove(&port),
                            };
                        })}
                        on_close={Callback::from(move |port: Port| {
                            let mut next = (*opened).clone();
                            next.remove(&port);
                            opened.set(next);
                        })}
                    />
                }
            }) }
            <Select<Option<Port>>
                id="port-add"
                label="Note a port"
                {options}
                value={Some(None)}
                on_change={on_open}
                testid="port-add"
            />
        </Section>
    }
}

/// Ports that a gauge or meter is fitted to; speeds and times have no place to note.
fn has_a_place(port: Port) -> bool {
    matches!(
        port.kind(),
        Kind::Pressure | Kind::Flow | Kind::Current | Kind::Temperature
    )
}

/// Properties of [`OnePort`].
#[derive(Clone, PartialEq, yew::Properties)]
struct OnePortProps {
    port: Port,
    note: PortNote,
    on_note: Callback<(Port, Option<PortNote>)>,
    on_close: Callback<Port>,
}

#[component]
fn OnePort(props: &OnePortProps) -> Html {
    let port = props.port;
    let id = code(port);
    // What was typed stands while the form is open; text that cannot be read stands in the record too, and is said to be wrong.
    let typed = use_state(|| {
        let minutes = props.note.access_minutes.map(|minutes| minutes.to_string());
        minutes.unwrap_or_else(|| props.note.access_typed.clone())
    });
    let change = |set: fn(&mut PortNote, String)| {
        let (note, on_note) = (props.note.clone(), props.on_note.clone());
        Callback::from(move |text: String| {
            let mut note = note.clone();
            set(&mut note, text);
            on_note.emit((port, Some(note)));
        })
    };
    let on_minutes = {
        let (typed, note, on_note) = (typed.clone(), props.note.clone(), props.on_note.clone());
        Callback::from(move |text: String| {
            let read = minutes(&text);
            on_note.emit((
                port,
                Some(PortNote {
                    access_typed: read
                        .as_ref()
                        .map_or_else(|_| text.clone(), |_| String::new()),
                    access_minutes: read.ok().flatten(),
                    ..note.clone()
                }),
            ));
            typed.set(text);
        })
    };
    let on_remove = {
        let (on_note, on_close) = (props.on_note.clone(), props.on_close.clone());
        Callback::from(move |_: MouseEvent| {
            on_note.emit((port, None));
            on_close.emit(port);
        })
    };
    html! {
        <fieldset class="sub" data-testid={format!("port-{id}")}>
            <legend>{ port.words() }</legend>
            <TextField
                id={format!("port-place-{id}")}
                label="Where it is"
                value={AttrValue::from(props.note.place.clone())}
                on_input={change(|note, text| note.place = text)}
                maxlength=400
                testid={format!("port-place-{id}")}
            />
            <TextField
                id={format!("port-adapter-{id}")}
                label="Thread and adapter"
                value={AttrValue::from(props.note.adapter.clone())}
                on_input={change(|note, text| note.adapter = text)}
                maxlength=400
                testid={format!("port-adapter-{id}")}
            />
            <TextField
                id={format!("port-minutes-{id}")}
                label="Extra minutes to reach it"
                hint="belly plate off, cab tilted"
                value={AttrValue::from((*typed).clone())}
                on_input={on_minutes}
                inputmode="decimal"
                maxlength=20
                error={minutes(&typed).err().unwrap_or_default()}
                testid={format!("port-minutes-{id}")}
            />
            <div class="actions">
                <button type="button" class="button is-quiet" onclick={on_remove} data-testid={format!("port-remove-{id}")}>
                    { "Remove this port" }
                </button>
            </div>
        </fieldset>
    }
}
