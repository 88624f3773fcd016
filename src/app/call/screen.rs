//! The call screen as a whole: every edit goes through one place, so that it can be undone, and the newest answer of the
//! engine stands beside what it was computed from.

use super::add_panel::AddPanel;
use super::alerts::{LeadStatus, StopWork, runs_on};
use super::causes::{Causes, CausesProps};
use super::cautions;
use super::change::Change;
use super::close::{self, ClosePanel, ClosePanelProps};
use super::edits::use_edits;
use super::entry;
use super::entry_field::field_id;
use super::gate_panel::RESTARTED;
use super::group::groups;
use super::last_time::EarlierCalls;
use super::map::{LoopMap, LoopMapProps};
use super::next::{NextPanel, NextPanelProps};
use super::quick_panel::QuickPanel;
use super::reading_group::{ReadingGroup, ReadingGroupProps, gate_id};
use super::reading_row::row_id;
use super::rooms;
use super::seen_panel::SeenPanel;
use super::side::Sides;
use super::slices::{use_apart, use_slices};
use super::steady::{Answer, use_steady};
use super::taken::Taken;
use super::told::told_before;
use super::watch::{Kept, WatchView};
use super::watching::{watched, with_following};
use crate::app::parts::{Icon, Late, Shape};
use crate::app::platform::clock;
use crate::app::platform::focus;
use crate::app::platform::timer::Timer;
use crate::assessment::Assessment;
use crate::caution::Stands;
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::readings::{Condition, Doing, Port, Reading};
use crate::record::Visit;
use crate::unit::Unit;
use std::rc::Rc;
use web_sys::HtmlInputElement;
use yew::{
    Callback, Html, KeyboardEvent, MouseEvent, Properties, TargetCast, component, html, use_effect,
};
use yew::{use_effect_with, use_memo, use_mut_ref, use_state};

/// A minute, ms.
const MINUTE_MS: i32 = 60_000;

/// Properties of [`CallScreen`].
#[derive(Clone, PartialEq, Properties)]
pub struct CallScreenProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// The visit.
    pub visit: Rc<Visit>,
    /// Calls on the unit before this one, latest first.
    #[prop_or_default]
    pub earlier: EarlierCalls,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Last answer of the engine.
    pub assessment: Option<Rc<Assessment>>,
    /// True while a newer one is being worked out.
    pub updating: bool,
    /// The visit was edited: the whole of it.
    pub on_visit: Callback<Visit>,
    /// The unit was edited: the whole of it.
    pub on_unit: Callback<Unit>,
    /// The shop's instruments were edited: the whole list.
    pub on_instruments: Callback<Vec<Instrument>>,
}

/// The screen.
#[component]
pub fn CallScreen(props: &CallScreenProps) -> Html {
    let sides = Sides::of(&props.unit);
    let edits = use_edits(&props.visit, &props.on_visit);
    let to_focus = use_mut_ref(|| None::<String>);
    let editing = use_state(Vec::<String>::new);
    let chosen = use_state(|| None::<Port>);
    let minute = use_state(|| 0_u32);
    // What is watched now, by reading; and the clock of the holds, which outlives the view: the rest goes on behind it.
    let watching = use_state(Vec::<String>::new);
    let holds = use_memo((), |()| Kept::default());
    let to_row = use_mut_ref(|| None::<String>);
    {
        let minute = minute.clone();
        use_effect_with(*minute, move |now| {
            let next = now.wrapping_add(1);
            let timer = Timer::once(MINUTE_MS, move || minute.set(next));
            move || drop(timer)
        });
    }
    {
        let (to_focus, to_row) = (to_focus.clone(), to_row.clone());
        use_effect(move || {
            if let Some(reading) = to_row.take() {
                focus::to(&row_id(&reading));
            }
            if let Some(reading) = to_focus.take() {
                // The row first: the field of a closed reading is not there.
                focus::to(&row_id(&reading));
                focus::to(&field_id(&reading));
                focus::to_head(&gate_id(&reading));
            }
        });
    }
    let make = {
        let (edits, to_focus, editing) = (edits.clone(), to_focus.clone(), editing.clone());
        Callback::from(move |change: Change| {
            let made = edits.make(&change);
            if let (Change::Add(_), Some((before, after))) = (&change, made) {
                editing.set(Vec::new());
                let added = after.readings.get(before.readings.len());
                to_focus.replace(added.map(|reading| reading.id.clone()));
            }
        })
    };
    let make = use_steady(make);
    let on_change = use_apart(make, |change| matches!(change, Change::Add(_)));
    let on_undo = {
        let edits = edits.clone();
        Callback::from(move |_: MouseEvent| edits.undo())
    };
    let on_port = {
        let (chosen, on_change, edits) = (chosen.clone(), on_change.clone(), edits.clone());
        let to_focus = to_focus.clone();
        Callback::from(move |port: Port| {
            chosen.set(Some(port));
            let visit = edits.visit();
            match next_at(port, &visit.readings) {
                Some(reading) => {
                    to_focus.replace(Some(reading.id.clone()));
                }
                None => on_change.emit(Change::Add(
                    sides
                        .wanted(port, harmless(last_condition(&visit)))
                        .collect(),
                )),
            }
        })
    };
    let on_port = use_steady(on_port);
    let on_reading = {
        let (edits, chosen, to_focus) = (edits.clone(), chosen.clone(), to_focus.clone());
        Callback::from(move |id: String| {
            let visit = edits.visit();
            if let Some(reading) = visit.readings.iter().find(|reading| reading.id == id) {
                to_focus.replace(Some(reading.id.clone()));
                chosen.set(Some(reading.port));
            }
        })
    };
    let on_reading = use_steady(on_reading);
    let on_edit = {
        let editing = editing.clone();
        Callback::from(move |ids: Vec<String>| editing.set(ids))
    };
    let on_edit = use_steady(on_edit);
    let on_watch = {
        let (watching, edits) = (watching.clone(), edits.clone());
        Callback::from(move |ids: Vec<String>| watching.set(with_following(ids, &edits.visit())))
    };
    let on_watch = use_steady(on_watch);
    let on_write = {
        let (watching, to_focus, edits) = (watching.clone(), to_focus.clone(), edits.clone());
        Callback::from(move |()| {
            to_focus.replace(first_to_write(&edits.visit(), &watching));
            watching.set(Vec::new());
        })
    };
    let on_unwatch = {
        let watching = watching.clone();
        Callback::from(move |reading: String| {
            to_row.replace(Some(reading));
            watching.set(Vec::new());
        })
    };
    let on_restarted = on_change.reform(|()| Change::Restarted);
    let on_instruments = use_steady(props.on_instruments.clone());
    let answer = props.assessment.clone().map(Answer);
    let taken: Vec<Taken> = props
        .visit
        .readings
        .iter()
        .map(|reading| Taken::of(reading, sides))
        .collect();
    let undo = edits.undoable();
    let visit = &props.visit;
    let grouped = groups(&visit.readings, &editing);
    let told = told_before(&grouped, visit);
    // Somebody is brought to a reading only once it is drawn.
    let wanted = to_focus.borrow().as_ref().and_then(|id| {
        let at = visit
            .readings
            .iter()
            .position(|reading| reading.id == *id)?;
        grouped.iter().position(|group| group.at.contains(&at))
    });
    let at_hand = focus::within();
    let drawn = use_slices(grouped.len(), wanted.map_or(0, |place| place + 1));
    let on_key = {
        let order: Vec<String> = grouped
            .iter()
            .flat_map(|group| &group.at)
            .filter_map(|place| visit.readings.get(*place))
            .map(|reading| reading.id.clone())
            .collect();
        Callback::from(move |event: KeyboardEvent| on_enter(&event, &order))
    };
    html! {
        <main class="page" id="main" data-testid="call-screen">
        <h1 class="hidden-text" id="title" tabindex="-1">{ format!("Call on {}", props.unit.name) }</h1>
        <div class="call" data-testid="call" onkeydown={on_key}>
            <LeadStatus assessment={answer.clone()} said={edits.said()} />
            <div class="call-side">
            <div class="call-causes">
                <Late<Causes> of={CausesProps {
                    assessment: answer.clone(),
                    updating: props.updating,
                    readings: visit.readings.clone(),
                    sides,
                    prefs: props.prefs.clone(),
                    on_reading: on_reading.clone(),
                }} />
            </div>
            <div class="call-map">
                <Late<LoopMap> of={LoopMapProps {
                    ticks: props.unit.ticks.clone(),
                    taken: taken.clone(),
                    sides,
                    assessment: answer.clone(),
                    chosen: *chosen,
                    on_port,
                }} />
            </div>
            </div>
            <div class="call-main">
                { closed(visit) }
                <StopWork runs_on={runs_on(visit)} assessment={answer.clone()} />
                <nav class="jump" aria-label="On this screen">
                    { for [("seen", "Seen"), ("next", "Next"), ("quick", "Usual"), ("readings", "Read"), ("add", "Add"), (close::ID, "Close")].map(|(id, words)| html! {
                        <button key={id} type="button" class="jump-to" onclick={jump(id)}>{ words }</button>
                    }) }
                </nav>
                { before_all(visit) }
                <SeenPanel
                    complaint={visit.complaint.clone()}
                    hours={visit.hours.clone()}
                    mark={props.prefs.mark()}
                    alone={visit.alone}
                    after_repair={visit.after_repair}
                    observations={visit.observations.clone()}
                    paths={props.unit.ticks.paths}
                    on_change={on_change.clone()}
                />
                <Late<NextPanel> of={NextPanelProps {
                    assessment: answer.clone(),
                    updating: props.updating,
                    taken: taken.clone(),
                    sides,
                    observations: visit.observations.clone(),
                    made: visit.made.clone(),
                    prefs: props.prefs.clone(),
                    on_change: on_change.clone(),
                    on_reading: on_reading.clone(),
                }} />
                { restarted(visit, &on_change) }
                <QuickPanel {taken} {sides} on_change={on_change.clone()} />
                <h2 id="readings" tabindex="-1" class="hidden-text">{ "Readings" }</h2>
                // In a list of its own: among its neighbours, one more group would have all above it made anew.
                <>{ for grouped.into_iter().zip(told).take(drawn).map(|(group, told)| {
                    let first = group.at.first().and_then(|place| visit.readings.get(*place));
                    let first = first.map(|reading| reading.id.clone()).unwrap_or_default();
                    let is_at_hand = |reading: &Reading| {
                        at_hand.contains(&row_id(&reading.id)) || at_hand.contains(&gate_id(&reading.id))
                    };
                    let now = editing.contains(&first)
                        || to_focus.borrow().is_some()
                        || group.at.iter().filter_map(|place| visit.readings.get(*place)).any(is_at_hand);
                    html! {
                        <Late<ReadingGroup> key={first.clone()} {now} of={ReadingGroupProps {
                            condition: group.condition,
                            at: group.at,
                            editing: editing.contains(&first),
                            on_edit: on_edit.clone(),
                            on_watch: on_watch.clone(),
                            assessment: answer.clone(),
                            updating: props.updating,
                            minute: *minute,
                            told: told.checks,
                            told_places: told.places,
                            sides,
                            chosen: *chosen,
                            unit: props.unit.clone(),
                            visit: visit.clone(),
                            earlier: props.earlier.clone(),
                            instruments: props.instruments.clone(),
                            prefs: props.prefs.clone(),
                            on_change: on_change.clone(),
                            on_instruments: on_instruments.clone(),
                        }} />
                    }
                }) }</>
                <AddPanel
                    ticks={props.unit.ticks.clone()}
                    {sides}
                    last={last_condition(visit)}
                    prefs={props.prefs.clone()}
                    on_change={on_change.clone()}
                />
                { rooms::links(&props.unit, visit) }
                <Late<ClosePanel> now={at_hand.iter().any(|id| id == close::ID)} of={ClosePanelProps {
                    visit: visit.clone(),
                    sides,
                    assessment: answer,
                    on_change: on_change.clone(),
                }} />
                if let Some(words) = undo {
                    <button type="button" class="button is-quiet call-undo" data-testid="undo" onclick={on_undo}>
                        <Icon shape={Shape::Back} />{ "Undo: " }{ words }
                    </button>
                }
            </div>
        </div>
        if !watching.is_empty() {
            <WatchView
                watched={watched(&watching, visit, &props.instruments, props.assessment.as_deref())}
                {sides}
                unit={props.unit.clone()}
                clock={(*holds).clone()}
                prefs={props.prefs.clone()}
                {on_write}
                on_close={on_unwatch}
                {on_restarted}
            />
        }
        </main>
    }
}

/// The reading whose field comes first once the needles are written down: the first without an answer.
fn first_to_write(visit: &Visit, ids: &[String]) -> Option<String> {
    let open = ids.iter().find(|id| {
        let reading = visit.readings.iter().find(|reading| reading.id == **id);
        reading.is_some_and(entry::is_open)
    });
    open.or_else(|| ids.first()).cloned()
}

/// One touch makes every tick void, once there are any.
fn restarted(visit: &Visit, on_change: &Callback<Change>) -> Html {
    if visit.precautions.is_empty() {
        return Html::default();
    }
    html! {
        <div class="restarted">
            <button type="button" class="button is-quiet" onclick={on_change.reform(|_: MouseEvent| Change::Restarted)} data-testid="engine-restarted">
                <Icon shape={Shape::Warning} />{ RESTARTED }
            </button>
            <span class="soft small">{ "Takes every tick back: it may stand differently now." }</span>
        </div>
    }
}

/// "Next" on the keyboard goes from one reading's field to the next, whatever condition that stands in.
fn on_enter(event: &KeyboardEvent, order: &[String]) {
    let field = event
        .target_dyn_into::<HtmlInputElement>()
        .map(|field| field.id())
        .unwrap_or_default();
    let at = order.iter().position(|id| field_id(id) == field);
    if let Some(next) = at
        .filter(|_| event.key() == "Enter")
        .and_then(|at| order.get(at + 1))
    {
        event.prevent_default();
        focus::to(&row_id(next));
        focus::to(&field_id(next));
    }
}

/// A closed call says so before anything else.
fn closed(visit: &Visit) -> Html {
    let Some(closing) = &visit.closed else {
        return Html::default();
    };
    html! {
        <p class="call-closed" data-testid="call-closed">
            { format!("This call was closed, {}. ", clock::tell(&closing.when)) }
            <button type="button" class="link" onclick={jump("close")}>{ "How it ended" }</button>
        </p>
    }
}

/// What holds for the whole call: in full until the first reading, folded after it.
fn before_all(visit: &Visit) -> Html {
    if visit.readings.is_empty() {
        return cautions::at(Stands::Call);
    }
    html! {
        <details class="advice call-advice">
            <summary>{ "Manual first; engine off is not pressure off" }</summary>
            { cautions::at(Stands::Call) }
        </details>
    }
}

/// Brings a part of the screen into view.
fn jump(id: &'static str) -> Callback<MouseEvent> {
    Callback::from(move |_: MouseEvent| focus::to(id))
}

/// The reading to go to at a port: the first without an answer, else the last; none where there is none yet.
fn next_at(port: Port, readings: &[Reading]) -> Option<&Reading> {
    let mut here = readings.iter().filter(|reading| reading.port == port);
    here.clone()
        .find(|reading| entry::is_open(reading))
        .or_else(|| here.next_back())
}

/// The condition of the last reading, to go on from.
fn last_condition(visit: &Visit) -> Condition {
    visit
        .readings
        .last()
        .map_or_else(Condition::start, |reading| reading.condition)
}

/// The condition to read a port in that was only touched: nobody asked for a held or bridged machine by that.
fn harmless(last: Condition) -> Condition {
    match last.doing {
        Doing::Held | Doing::NeutralBridged | Doing::Overrun => Condition {
            oil: last.oil,
            engine: last.engine,
            ..Condition::start()
        },
        _ => last,
    }
}
