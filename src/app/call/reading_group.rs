//! Readings under one heading: what the machine was doing, its precautions, and the rows.

use super::cautions;
use super::change::Change;
use super::condition_editor::ConditionEditor;
use super::condition_parts::FIELDS;
use super::entry;
use super::gate::{self, Gate};
use super::gate_panel::{GatePanel, advice};
use super::group::pairs;
use super::last_time::EarlierCalls;
use super::pair_line;
use super::reading_row::{ReadingRow, row_id};
use super::rig;
use super::side::Sides;
use super::steady::Answer;
use super::watching::watchable;
use super::words;
use crate::app::parts::{Caution, Grade};
use crate::app::platform::clock;
use crate::caution::Stands;
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::readings::{Condition, Port, Reading};
use crate::record::Visit;
use crate::unit::Unit;
use std::rc::Rc;
use yew::{Callback, Html, MouseEvent, Properties, component, html};

/// Properties of [`ReadingGroup`].
#[derive(Clone, PartialEq, Properties)]
pub struct ReadingGroupProps {
    /// Condition they share.
    pub condition: Condition,
    /// Places in the visit's list.
    pub at: Vec<usize>,
    /// True while the heading is being edited.
    pub editing: bool,
    /// Opens or closes the heading: the ids that it holds, none to close.
    pub on_edit: Callback<Vec<String>>,
    /// Opens the watch view of these readings.
    pub on_watch: Callback<Vec<String>>,
    /// Last answer of the engine.
    pub assessment: Option<Answer>,
    /// True while a newer one is being worked out.
    pub updating: bool,
    /// Minutes since the screen was opened: ticks grow old.
    pub minute: u32,
    /// Checks whose precautions stand in full further up.
    pub told: Vec<(&'static str, String)>,
    /// Places whose cautions stand further up.
    pub told_places: Vec<Stands>,
    /// Ports that are there twice.
    pub sides: Sides,
    /// Port touched on the drawing.
    pub chosen: Option<Port>,
    /// Unit.
    pub unit: Rc<Unit>,
    /// Visit.
    pub visit: Rc<Visit>,
    /// Earlier calls on the unit.
    pub earlier: EarlierCalls,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units.
    pub prefs: UnitPrefs,
    /// An edit.
    pub on_change: Callback<Change>,
    /// The shop's list was added to.
    pub on_instruments: Callback<Vec<Instrument>>,
}

/// DOM id of the precautions that stand before a reading.
pub fn gate_id(reading: &str) -> String {
    format!("gate-{reading}")
}

/// The group.
#[component]
pub fn ReadingGroup(props: &ReadingGroupProps) -> Html {
    let readings: Vec<_> = props
        .at
        .iter()
        .filter_map(|place| props.visit.readings.get(*place).map(|r| (*place, r)))
        .collect();
    let ids: Vec<String> = readings
        .iter()
        .map(|(_, reading)| reading.id.clone())
        .collect();
    let Some(first) = ids.first().cloned() else {
        return Html::default();
    };
    let ports: Vec<Port> = readings.iter().map(|(_, reading)| reading.port).collect();
    let gates = Gate::of(&props.condition, &ports, &props.visit, clock::now_ms());
    let on_toggle = {
        let (on_edit, ids, editing) = (props.on_edit.clone(), ids.clone(), props.editing);
        Callback::from(move |_: MouseEvent| {
            on_edit.emit(if editing { Vec::new() } else { ids.clone() })
        })
    };
    let on_condition = {
        let ids = ids.clone();
        props
            .on_change
            .reform(move |condition| Change::Condition(ids.clone(), condition))
    };
    let texts = props
        .visit
        .headings
        .get(&first)
        .cloned()
        .unwrap_or_default();
    let on_text = {
        let ids = ids.clone();
        props
            .on_change
            .reform(move |(field, text)| Change::Heading(ids.clone(), field, text))
    };
    let windows = props
        .assessment
        .as_deref()
        .map(|assessment| assessment.windows.as_slice())
        .unwrap_or_default();
    let retakes = props
        .assessment
        .as_deref()
        .map(|assessment| assessment.trust.retake.as_slice())
        .unwrap_or_default();
    let title_id = format!("group-{first}");
    let is_first = |gate: &Gate, reading: &Reading| {
        let first = readings
            .iter()
            .find(|(_, other)| gate.ports.contains(&other.port));
        (gate.is_gated() || gate.barred.is_some())
            && first.is_some_and(|(_, first)| first.id == reading.id)
    };
    let hold = props
        .assessment
        .as_deref()
        .and_then(|assessment| assessment.hold);
    let pairs: Vec<(usize, usize)> = if props.sides.any() {
        pairs(&props.visit.readings, &props.at)
    } else {
        Vec::new()
    };
    // One flat list in which every item has its key: what is there already stays as it is when a reading is added.
    let mut rows: Vec<Html> = Vec::with_capacity(readings.len());
    for (place, reading) in &readings {
        let guards = gates.iter().filter(|gate| is_first(gate, reading));
        rows.extend(guards.map(|gate| panel(props, gate, hold, &reading.id)));
        rows.push(html! {
            <ReadingRow
                key={row_id(&reading.id)}
                reading={(*reading).clone()}
                number={*place}
                sides={props.sides}
                lacks_other_side={lacks_other_side(props, *place, &pairs)}
                window={windows.iter().find(|window| window.reading == reading.id).cloned()}
                retake={retakes.iter().find(|(id, _)| *id == reading.id).map(|(_, why)| why.clone())}
                last={props.earlier.of(reading, props.sides)}
                closed={gate::closes(&gates, reading)}
                chosen={props.chosen == Some(reading.port)}
                unit={props.unit.clone()}
                rigged={rig::on_port(reading, &props.visit, &props.instruments)}
                caught={props.visit.caught.get(&reading.id).cloned().unwrap_or_default()}
                before={props.visit.earlier.get(&reading.id).cloned().unwrap_or_default()}
                instruments={props.instruments.clone()}
                prefs={props.prefs.clone()}
                on_change={props.on_change.clone()}
                on_instruments={props.on_instruments.clone()}
            />
        });
        let pair = pairs.iter().find(|pair| lower(&props.at, **pair) == *place);
        rows.extend(pair.and_then(|pair| against(props, *pair)));
    }
    html! {
        <section class={if props.updating { "panel group is-stale" } else { "panel group" }} aria-labelledby={title_id.clone()}>
            <div class="group-head">
                <div class="group-words">
                    <h3 id={title_id}>{ words::condition(&props.condition, &props.prefs) }</h3>
                    <p class={if props.condition.oil.is_some() { "soft" } else { "group-missing" }}>
                        { words::oil(&props.condition, &props.prefs) }
                    </p>
                    if !props.editing {
                        <>{ for FIELDS.iter().filter_map(|(field, name)| texts.get(*field).map(|text| html! {
                            <p class="group-missing" data-testid={format!("heading-{field}")}>
                                { format!("Not taken yet, {name}: “{text}”") }
                            </p>
                        })) }</>
                    }
                </div>
                <button
                    type="button"
                    class="button is-quiet"
                    aria-expanded={if props.editing { "true" } else { "false" }}
                    data-testid={format!("condition-{}", props.at.first().copied().unwrap_or_default())}
                    onclick={on_toggle}
                >
                    { if props.editing { "Done" } else { "Change" } }
                </button>
            </div>
            if props.editing {
                <ConditionEditor
                    name={format!("cond-{first}")}
                    condition={props.condition}
                    sides={props.sides}
                    prefs={props.prefs.clone()}
                    on_change={on_condition}
                    texts={texts.clone()}
                    on_text={on_text}
                />
            }
            { alone(props) }
            { cautions::all(&new_places(props)) }
            { advice(&gates) }
            { watch(props, &readings, &gates) }
            <ol class="readings">
                { for rows }
            </ol>
        </section>
    }
}

/// To the watch view, once what must be so before it is ticked.
fn watch(props: &ReadingGroupProps, readings: &[(usize, &Reading)], gates: &[Gate]) -> Html {
    let readings: Vec<&Reading> = readings.iter().map(|(_, reading)| *reading).collect();
    let ids = watchable(&readings, gates);
    if ids.is_empty() || props.editing {
        return Html::default();
    }
    let on_click = props.on_watch.reform(move |_: MouseEvent| ids.clone());
    html! {
        <button
            type="button"
            class="button is-wide group-watch"
            data-testid={format!("watch-{}", props.at.first().copied().unwrap_or_default())}
            onclick={on_click}
        >
            { "Watch while it runs" }
        </button>
    }
}

/// Where cautions belong for what is still to be read here, without the places told further up.
fn new_places(props: &ReadingGroupProps) -> Vec<Stands> {
    let readings = props
        .at
        .iter()
        .filter_map(|place| props.visit.readings.get(*place));
    let ports: Vec<Port> = readings
        .filter(|reading| entry::is_open(reading))
        .map(|reading| reading.port)
        .collect();
    let mut places = cautions::places(&props.condition, ports.iter());
    places.retain(|place| !props.told_places.contains(place));
    places
}

/// The precautions of a check stand before the first reading that it guards.
fn panel(props: &ReadingGroupProps, gate: &Gate, hold: Option<(f64, f64)>, first: &str) -> Html {
    // Somebody who comes for the reading is brought to what must be so before it.
    let asks = gate.barred.is_some() || !(gate.is_ticked() && gate.fresh);
    html! {
        <li class="gate-item" key={format!("check-{}", gate.check.id)} id={asks.then(|| gate_id(first))} tabindex={asks.then_some("-1")}>
            <GatePanel
                gate={gate.clone()}
                told={props.told.contains(&gate.place())}
                unit={props.unit.clone()}
                prefs={props.prefs.clone()}
                {hold}
                on_change={props.on_change.clone()}
            />
        </li>
    }
}

/// The reading of a pair that stands lower in the group.
fn lower(at: &[usize], (left, right): (usize, usize)) -> usize {
    let row = |place: usize| at.iter().position(|other| *other == place);
    if row(left) > row(right) { left } else { right }
}

/// Right against left under a pair of readings.
fn against(props: &ReadingGroupProps, (left, right): (usize, usize)) -> Option<Html> {
    let left = props.visit.readings.get(left)?;
    let right = props.visit.readings.get(right)?;
    if !props.sides.has(left.port) {
        return None;
    }
    let words = pair_line::words(left, right, &props.prefs)?;
    Some(html! {
        <li class="reading-pair" key={format!("pair-{}", right.id)} data-testid={format!("pair-{}", right.id)}>{ words }</li>
    })
}

/// True where nothing is there yet in this group for the other side of a reading.
fn lacks_other_side(props: &ReadingGroupProps, place: usize, pairs: &[(usize, usize)]) -> bool {
    let is_paired = pairs
        .iter()
        .any(|(left, right)| *left == place || *right == place);
    !is_paired && (props.condition.doing.is_neutral() || props.condition.stroked.is_both())
}

/// One side driven alone turns the machine, and that has to be known before anybody stands beside it.
fn alone(props: &ReadingGroupProps) -> Html {
    let condition = &props.condition;
    if condition.doing.is_neutral() || condition.stroked.is_both() {
        return Html::default();
    }
    html! {
        <Caution grade={Grade::Caution} title="one side alone" class="small-caution" testid="one-side-alone">
            <p>{ "One side driven alone turns the machine on the spot. Wheels or tracks of both sides clear of the ground, or nobody \
                  within its swing." }</p>
        </Caution>
    }
}
