//! The screen: oil and engine once, then the steps of this control kind in order.

use std::cell::Cell;
use std::rc::Rc;

use yew::{
    Callback, Html, Properties, component, html, use_context, use_effect_with, use_memo,
    use_mut_ref, use_state,
};

use super::edit::{sheet, use_edits};
use super::figures::SheetField;
use super::step::StepPart;
use crate::app::call::alerts::runs_on;
use crate::app::call::cautions;
use crate::app::engine::client::Engine;
use crate::app::parts::{Caution, Choice, Grade, Icon, Opt, Shape, SoundSwitch};
use crate::app::platform::timer::Timer;
use crate::app::route::Route;
use crate::caution::Stands;
use crate::neutral::report::{Report, report};
use crate::neutral::steps::steps;
use crate::quantity::UnitPrefs;
use crate::readings::{EngineSpeed, Path};
use crate::record::Visit;
use crate::record::neutral::Field;
use crate::unit::{Paths, Unit};

/// Quiet time after which a changed sheet is worked out, ms.
const QUIET_MS: i32 = 250;
/// A minute, ms.
const MINUTE_MS: i32 = 60_000;

/// Properties of [`NeutralScreen`].
#[derive(Clone, PartialEq, Properties)]
pub struct NeutralScreenProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// The visit.
    pub visit: Rc<Visit>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// The visit was edited: the whole of it.
    pub on_visit: Callback<Visit>,
}

/// The screen.
#[component]
pub fn NeutralScreen(props: &NeutralScreenProps) -> Html {
    let path = use_state(Path::default);
    let has_two = props.unit.ticks.paths != Paths::One;
    let now_path = if has_two { *path } else { Path::Left };
    let edits = use_edits(&props.visit, now_path, &props.on_visit);
    let kept = sheet(&props.visit, now_path);
    let kept = use_memo(kept, |kept| kept.clone());
    let minute = use_state(|| 0_u32);
    {
        let minute = minute.clone();
        use_effect_with(*minute, move |now| {
            let next = now.wrapping_add(1);
            let timer = Timer::once(MINUTE_MS, move || minute.set(next));
            move || drop(timer)
        });
    }
    // Worked out after a quiet moment, in the worker; the last answer stays until then.
    let answer = use_state(|| Rc::new(Report::default()));
    let is_stale = use_state(|| true);
    let is_first = use_mut_ref(|| true);
    let engine = use_context::<Engine>();
    {
        let (answer, is_stale) = (answer.clone(), is_stale.clone());
        use_effect_with((props.unit.clone(), kept.clone()), move |(unit, kept)| {
            let (unit, kept) = (unit.clone(), kept.clone());
            is_stale.set(true);
            let quiet = if std::mem::take(&mut *is_first.borrow_mut()) {
                0
            } else {
                QUIET_MS
            };
            // An answer to a sheet that has changed since, or is gone, is not shown.
            let is_wanted = Rc::new(Cell::new(true));
            let still = is_wanted.clone();
            let timer = Timer::once(quiet, move || {
                let tell = move |found: Report| {
                    if still.get() {
                        answer.set(Rc::new(found));
                        is_stale.set(false);
                    }
                };
                match engine {
                    Some(engine) => engine.neutral(unit, kept, tell),
                    None => tell(report(&unit, &kept)),
                }
            });
            move || {
                is_wanted.set(false);
                drop(timer);
            }
        });
    }
    let on_engine = {
        let edits = edits.clone();
        Callback::from(move |engine: EngineSpeed| edits.make(|sheet| sheet.engine = engine))
    };
    let on_path = {
        let path = path.clone();
        Callback::from(move |chosen: Path| path.set(chosen))
    };
    let steps = steps(props.unit.ticks.control);
    let done = steps
        .iter()
        .filter(|step| kept.done.iter().any(|done| done == step.id))
        .count();
    let first_open = steps
        .iter()
        .position(|step| !kept.done.iter().any(|done| done == step.id))
        .unwrap_or(0);
    html! {
        <main class="page neutral" id="main" data-testid="neutral-screen" aria-busy={is_stale.then_some("true")}>
            <div class="page-head">
                <h1 id="title" tabindex="-1">{ format!("Neutral, {}", props.unit.name) }</h1>
                <a class="button is-quiet" href={Route::Call(props.visit.id.clone()).href()} data-testid="back-to-call">
                    <Icon shape={Shape::Back} />{ "To the call" }
                </a>
            </div>
            if runs_on(&props.visit) {
                <Caution grade={Grade::Danger} title="stop work" testid="neutral-runs-on">
                    <p>{ "It keeps going with the lever in neutral. Engine off, chock both ways. Nothing is turned before it stands on stands." }</p>
                </Caution>
            }
            { cautions::at(Stands::Call) }
            <section class="panel" aria-labelledby="neutral-basis">
                <h2 id="neutral-basis">{ "For all readings on this sheet" }</h2>
                <p>
                    { format!("Control: {}. ", props.unit.ticks.control.words()) }
                    <a href={Route::Unit(props.unit.id.clone()).href()}>{ "Change it in the profile" }</a>
                </p>
                if has_two {
                    <Choice<Path>
                        name="neutral-path"
                        label="Which side?"
                        options={vec![Opt::new(Path::Left, "Left", "left"), Opt::new(Path::Right, "Right", "right")]}
                        value={Some(now_path)}
                        on_change={on_path}
                    />
                }
                <Choice<EngineSpeed>
                    name="neutral-engine"
                    label="Engine"
                    options={vec![
                        Opt::new(EngineSpeed::LowIdle, "Low idle", "low"),
                        Opt::new(EngineSpeed::HighIdle, "High idle", "high"),
                    ]}
                    value={Some(kept.engine)}
                    on_change={on_engine}
                />
                <div class="neutral-pair">
                    <SheetField
                        field={Field::Engine}
                        label="Engine speed, measured"
                        stands_in="Until then the idle chosen above, as the profile has it."
                        sheet={kept.clone()}
                        prefs={props.prefs.clone()}
                        edits={edits.clone()}
                    />
                    <SheetField
                        field={Field::Oil}
                        label="Oil temperature"
                        hint="at the motor drain hose"
                        stands_in="Until then warm oil, and wide intervals."
                        sheet={kept.clone()}
                        prefs={props.prefs.clone()}
                        edits={edits.clone()}
                    />
                </div>
                <SoundSwitch />
            </section>
            <h2>{ format!("Steps, in this order: {done} of {} done", steps.len()) }</h2>
            // Another path is another sheet: everything in it is made anew.
            <div class="stack" key={now_path.words()}>
                { for steps.iter().enumerate().map(|(i, step)| html! {
                    <StepPart
                        key={step.id}
                        id={step.id}
                        number={i + 1}
                        is_open={i == first_open}
                        unit={props.unit.clone()}
                        visit={props.visit.clone()}
                        sheet={kept.clone()}
                        report={(*answer).clone()}
                        prefs={props.prefs.clone()}
                        edits={edits.clone()}
                        told={steps.iter().take(i).flat_map(|step| step.stands.iter().copied()).collect::<Vec<_>>()}
                        minute={*minute}
                    />
                }) }
            </div>
        </main>
    }
}
