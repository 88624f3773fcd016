//! Which instrument stands on a port. One gauge, one error: its bias is shared by all readings taken with it, so it is said
//! once per port and stays until the gauge is swapped.

use super::change::Change;
use super::new_gauge::NewGauge;
use super::rigging::rigging_on;
use crate::app::parts::{Caution, Grade};
use crate::quantity::{Kind, Measure, UnitPrefs};
use crate::readings::instrument::{Instrument, InstrumentKind};
use crate::readings::{Port, Reading};
use crate::record::Visit;
use crate::unit::{FigureId, Unit};
use std::rc::Rc;
use yew::{
    Callback, Event, Html, MouseEvent, Properties, TargetCast, UseStateHandle, component, html,
    use_state,
};

/// Value of the list entry that makes a new instrument.
const NEW: &str = "+";

/// Properties of [`Rig`].
#[derive(Clone, PartialEq, Properties)]
pub struct RigProps {
    /// The reading it is shown with.
    pub reading: Reading,
    /// Place in the list, for test ids.
    pub number: usize,
    /// True where an instrument that is said and stands right is only named.
    pub short: bool,
    /// Unit: what the port can see.
    pub unit: Rc<Unit>,
    /// What stands on the port.
    pub rigged: Rigged,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units.
    pub prefs: UnitPrefs,
    /// An edit.
    pub on_change: Callback<Change>,
    /// The shop's list was added to.
    pub on_instruments: Callback<Vec<Instrument>>,
}

/// What stands on the port of a reading.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Rigged {
    /// The instrument that the reading was taken with.
    pub current: Option<Instrument>,
    /// Id of the instrument that stands there now.
    pub stands: Option<String>,
    /// Other readings were taken at the port, on this side.
    pub read_before: bool,
}

/// What stands on the port of a reading.
pub fn on_port(reading: &Reading, visit: &Visit, instruments: &[Instrument]) -> Rigged {
    Rigged {
        current: instrument_of(reading, visit, instruments).cloned(),
        stands: rigging_on(visit, reading.port, reading.path)
            .map(|rigging| rigging.instrument.clone()),
        read_before: visit.readings.iter().any(|other| {
            (other.port, other.path) == (reading.port, reading.path)
                && other.id != reading.id
                && other.seen.is_some()
        }),
    }
}

/// The instrument that a reading was taken with.
fn instrument_of<'a>(
    reading: &Reading,
    visit: &Visit,
    instruments: &'a [Instrument],
) -> Option<&'a Instrument> {
    let rigging = visit
        .riggings
        .iter()
        .find(|rigging| rigging.id == reading.rigging)?;
    instruments
        .iter()
        .find(|instrument| instrument.id == rigging.instrument)
}

/// The warning where an instrument must not stand on this port, naming it. The loop relief and charge setting are those of the
/// profile, or common practice for the class where it has none.
pub fn too_small(instrument: &Instrument, port: Port, unit: &Unit) -> Option<String> {
    let figure = |id| {
        unit.known(id)
            .unwrap_or_else(|| unit.class.spread(id).value)
    };
    let highest = port.highest_bar(
        figure(FigureId::LoopRelief),
        figure(FigureId::ChargeSetting),
    )?;
    let highest = Measure::from_base(highest, Kind::Pressure).ok()?;
    instrument.can_stand(highest).err()
}

/// True where this sort of instrument can answer at this port.
fn fits(instrument: &Instrument, port: Port) -> bool {
    let is_vacuum = instrument.what == InstrumentKind::VacuumGauge;
    instrument.what.measures() == port.kind() && (!is_vacuum || port == Port::InletPull)
}

/// The line "Read with …".
#[component]
pub fn Rig(props: &RigProps) -> Html {
    let swapped_to = use_state(|| None::<String>);
    let is_new = use_state(|| false);
    let port = props.reading.port;
    let current = props.rigged.current.as_ref();
    let chosen = current
        .map(|instrument| instrument.id.clone())
        .unwrap_or_default();
    let choose = {
        let (props, swapped_to, is_new) = (props.clone(), swapped_to.clone(), is_new.clone());
        Callback::from(move |id: String| {
            is_new.set(false);
            let stands = props
                .rigged
                .stands
                .as_ref()
                .is_some_and(|other| *other != id);
            if stands && props.rigged.read_before {
                swapped_to.set(Some(id));
            } else {
                props.on_change.emit(Change::Rig {
                    port: props.reading.port,
                    path: props.reading.path,
                    instrument: id,
                    from: None,
                });
            }
        })
    };
    let on_pick = {
        let (choose, is_new) = (choose.clone(), is_new.clone());
        Callback::from(move |event: Event| {
            let value = event
                .target_unchecked_into::<web_sys::HtmlSelectElement>()
                .value();
            match value.as_str() {
                NEW => is_new.set(true),
                "" => {}
                _ => choose.emit(value),
            }
        })
    };
    let on_new = {
        let (instruments, on_instruments) =
            (props.instruments.clone(), props.on_instruments.clone());
        let is_new = is_new.clone();
        Callback::from(move |made: Option<Instrument>| {
            is_new.set(false);
            if let Some(made) = made {
                let id = made.id.clone();
                let mut all = (*instruments).clone();
                all.push(made);
                on_instruments.emit(all);
                choose.emit(id);
            }
        })
    };
    let id = format!("rig-{}", props.reading.id);
    let warning = current.and_then(|instrument| too_small(instrument, port, &props.unit));
    if let Some(instrument) =
        current.filter(|_| props.short && warning.is_none() && swapped_to.is_none() && !*is_new)
    {
        return html! { <p class="rig-said">{ "Read with " }{ instrument.name.clone() }</p> };
    }
    html! {
        <div class="rig">
            <label class="rig-label" for={id.clone()}>{ "Read with" }</label>
            <select class="rig-select" {id} onchange={on_pick} data-testid={format!("rig-{}", props.number)}>
                <option value="" selected={chosen.is_empty()}>{ "instrument not said" }</option>
                <>{ for props.instruments.iter().filter(|instrument| fits(instrument, port)).map(|instrument| html! {
                    <option key={instrument.id.clone()} value={instrument.id.clone()} selected={instrument.id == chosen}>
                        { instrument.name.clone() }
                    </option>
                }) }</>
                <option value={NEW}>{ "another one…" }</option>
            </select>
            if *is_new {
                <NewGauge {port} name={format!("new-{}", props.reading.id)} prefs={props.prefs.clone()} on_made={on_new} />
            }
            if let Some(to) = &*swapped_to {
                { ask_swap(props, to, &swapped_to) }
            }
            if let Some(warning) = warning {
                <Caution grade={Grade::Danger} title="this gauge is too small here" role="alert" testid={format!("too-small-{}", props.number)}>
                    <p>{ warning }</p>
                </Caution>
            }
        </div>
    }
}

/// A second instrument on a port that has readings: a swap is an event, a slip of the hand is not.
fn ask_swap(props: &RigProps, to: &str, swapped_to: &UseStateHandle<Option<String>>) -> Html {
    let answer = |from: Option<String>| {
        let (on_change, port, path, instrument, swapped_to) = (
            props.on_change.clone(),
            props.reading.port,
            props.reading.path,
            to.to_owned(),
            swapped_to.clone(),
        );
        Callback::from(move |_: MouseEvent| {
            swapped_to.set(None);
            on_change.emit(Change::Rig {
                port,
                path,
                instrument: instrument.clone(),
                from: from.clone(),
            });
        })
    };
    let name = props
        .instruments
        .iter()
        .find(|instrument| instrument.id == to)
        .map(|instrument| instrument.name.clone());
    html! {
        <div class="ask" role="group" aria-label="Gauge swapped?">
            <p>{ format!("{}: since when?", name.unwrap_or_default()) }</p>
            <div class="actions">
                <button type="button" class="button" onclick={answer(Some(props.reading.id.clone()))} data-testid="rig-swapped">
                    { "Swapped: from this reading on" }
                </button>
                <button type="button" class="button" onclick={answer(None)} data-testid="rig-corrected">
                    { "All along on this port" }
                </button>
            </div>
        </div>
    }
}
