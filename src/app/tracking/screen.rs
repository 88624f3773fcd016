//! The tracking screen as a whole.

use super::counters::Counters;
use super::head::HeadForm;
use super::line::LineCard;
use super::results::Results;
use super::steps::Steps;
use super::words;
use crate::app::call::cautions;
use crate::app::parts::{Icon, Section, Shape};
use crate::app::platform::focus;
use crate::app::platform::ids;
use crate::app::platform::timer::Timer;
use crate::app::route::Route;
use crate::caution::Stands;
use crate::quantity::UnitPrefs;
use crate::record::{IdOf, Visit};
use crate::tracking::{
    LINES, Line, Outcome, Run, Setting, TrackingSheet, Undercarriage, What, find,
};
use crate::unit::Unit;
use std::rc::Rc;
use yew::{Callback, Html, MouseEvent, Properties, component, html};
use yew::{use_effect, use_effect_with, use_mut_ref, use_state};

/// Properties of [`TrackingScreen`].
#[derive(Clone, PartialEq, Properties)]
pub struct TrackingScreenProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// The visit.
    pub visit: Rc<Visit>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// The visit was edited: the whole of it.
    pub on_visit: Callback<Visit>,
}

/// One edit of the sheet.
pub type Edit = Box<dyn FnOnce(&mut TrackingSheet)>;

/// Quiet time after which a changed sheet is worked out, ms.
const QUIET_MS: i32 = 150;

/// What the runs come to, equal to itself alone.
#[derive(Clone, Debug)]
pub struct Told(pub Rc<Outcome>, pub Rc<Vec<usize>>);

impl Told {
    fn of(sheet: &TrackingSheet, usual: Undercarriage) -> Told {
        let machine = sheet.machine(usual);
        let (places, runs): (Vec<usize>, Vec<Run>) = sheet
            .runs(&machine)
            .into_iter()
            .enumerate()
            .filter_map(|(at, run)| run.ok().map(|run| (at, run)))
            .unzip();
        Told(
            Rc::new(find(&machine, &runs, &sheet.screws())),
            Rc::new(places),
        )
    }
}

impl PartialEq for Told {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

/// DOM id of a run.
pub fn line_id(id: &str) -> String {
    format!("line-{id}")
}

/// The screen.
#[component]
pub fn TrackingScreen(props: &TrackingScreenProps) -> Html {
    // Two quick edits build on one another, also between two drawings.
    let newest = use_mut_ref(|| props.visit.clone());
    newest.replace(props.visit.clone());
    let to_focus = use_mut_ref(|| None::<String>);
    {
        let to_focus = to_focus.clone();
        use_effect(move || {
            if let Some(id) = to_focus.take() {
                focus::to(&id);
            }
        });
    }
    let on_edit = {
        let on_visit = props.on_visit.clone();
        Callback::from(move |edit: Edit| {
            let mut visit = (**newest.borrow()).clone();
            edit(visit.tracking.get_or_insert_default());
            newest.replace(Rc::new(visit.clone()));
            on_visit.emit(visit);
        })
    };
    let on_add = {
        let on_edit = on_edit.clone();
        Callback::from(move |(what, setting): (What, Setting)| {
            let id = ids::fresh(IdOf::Reading);
            to_focus.replace(Some(line_id(&id)));
            on_edit.emit(Box::new(move |sheet| {
                if sheet.runs.len() < LINES {
                    sheet.runs.push(Line {
                        id,
                        what,
                        setting,
                        ..Line::default()
                    });
                }
            }));
        })
    };
    let sheet = props.visit.tracking.clone().unwrap_or_default();
    let usual = words::usual_undercarriage(props.unit.class);
    let machine = sheet.machine(usual);
    let read = sheet.runs(&machine);
    // Worked out after a quiet moment; the last answer stays until then, with the sheet that it is about.
    let answer = use_state(|| ((sheet.clone(), usual), Told::of(&sheet, usual)));
    let is_stale = answer.0 != (sheet.clone(), usual);
    {
        let answer = answer.clone();
        use_effect_with((sheet.clone(), usual), move |about| {
            let about = about.clone();
            let timer = (answer.0 != about).then(|| {
                Timer::once(QUIET_MS, move || {
                    let told = Told::of(&about.0, about.1);
                    answer.set((about, told));
                })
            });
            move || drop(timer)
        });
    }
    let ((known, _), told) = (*answer).clone();
    let used = read.iter().filter(|run| run.is_ok()).count();
    let state = match sheet.runs.len() {
        0 => "none yet".to_owned(),
        all => format!("{used} of {all} count"),
    };
    let on_more = {
        let on_add = on_add.clone();
        let last = sheet.runs.last().map(|line| (line.what, line.setting));
        Callback::from(move |_: MouseEvent| on_add.emit(last.unwrap_or_default()))
    };
    html! {
        <main class="page tracking" id="main" data-testid="tracking-screen" aria-busy={is_stale.then_some("true")}>
            <div class="page-head">
                <h1 id="title" tabindex="-1">{ "Straight tracking" }</h1>
                <a class="button is-quiet" href={Route::Call(props.visit.id.clone()).href()} data-testid="back-to-call">
                    <Icon shape={Shape::Back} />{ "To the call" }
                </a>
            </div>
            <p class="soft">{ "Left and right are always by the seat. The unit’s manual comes before anything here." }</p>
            { cautions::at(Stands::WheelsClear) }
            <Results told={told} sheet={known} prefs={props.prefs.clone()} on_add={on_add.clone()} />
            <Steps sheet={sheet.clone()} visit={props.visit.id.clone()} on_edit={on_edit.clone()} on_add={on_add.clone()} />
            <Section id="tracking-runs" title="Runs" state={state} is_open=true>
                { for sheet.runs.iter().zip(read).enumerate().map(|(at, (line, run))| html! {
                    <LineCard
                        key={line.id.clone()}
                        {at}
                        line={line.clone()}
                        problem={run.err()}
                        prefs={props.prefs.clone()}
                        on_edit={on_edit.clone()}
                    />
                }) }
                <div class="actions">
                    <button
                        type="button"
                        class="button is-main"
                        data-testid="add-run"
                        disabled={sheet.runs.len() >= LINES}
                        onclick={on_more}
                    >
                        <Icon shape={Shape::Plus} />
                        { if sheet.runs.is_empty() { "Add a run" } else { "Add another like the last" } }
                    </button>
                </div>
            </Section>
            <Counters on_edit={on_edit.clone()} />
            <HeadForm {sheet} {usual} prefs={props.prefs.clone()} on_edit={on_edit} />
        </main>
    }
}
