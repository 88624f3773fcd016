//! The sheet of a yard check.

use std::rc::Rc;
use yew::{Callback, Html, MouseEvent, Properties, component, html, use_memo, use_mut_ref};

use super::change::ChangePanel;
use super::counters::Counters;
use super::head::Head;
use super::step::StepPart;
use super::verdict::VerdictPanel;
use crate::app::call::cautions;
use crate::app::parts::{Icon, Shape, TextField};
use crate::app::platform::clock;
use crate::app::route::Route;
use crate::caution::Stands;
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::record::{Closing, Visit, limits};
use crate::unit::Unit;
use crate::yard::{MINUTES, report, steps};

/// The other visits to the unit; equal where they are the same ones.
#[derive(Clone, Debug)]
pub struct Others(pub Vec<Rc<Visit>>);

impl PartialEq for Others {
    fn eq(&self, other: &Self) -> bool {
        self.0.len() == other.0.len() && self.0.iter().zip(&other.0).all(|(a, b)| Rc::ptr_eq(a, b))
    }
}

/// Properties of [`YardScreen`].
#[derive(Clone, PartialEq, Properties)]
pub struct YardScreenProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// The visit.
    pub visit: Rc<Visit>,
    /// The other visits to the unit.
    pub others: Others,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// The visit was edited: the whole of it.
    pub on_visit: Callback<Visit>,
}

/// One edit of the visit.
pub type Edit = Box<dyn FnOnce(&mut Visit)>;

/// The screen.
#[component]
pub fn YardScreen(props: &YardScreenProps) -> Html {
    // Two quick edits build on one another, also between two drawings.
    let newest = use_mut_ref(|| props.visit.clone());
    newest.replace(props.visit.clone());
    let on_edit = {
        let on_visit = props.on_visit.clone();
        use_memo((), move |()| {
            Callback::from(move |edit: Edit| {
                let mut visit = (**newest.borrow()).clone();
                edit(&mut visit);
                newest.replace(Rc::new(visit.clone()));
                on_visit.emit(visit);
            })
        })
    };
    let on_edit = (*on_edit).clone();
    let made = use_memo(
        (
            props.visit.clone(),
            props.others.clone(),
            props.unit.clone(),
            props.prefs.clone(),
        ),
        |(visit, others, unit, prefs)| {
            let others: Vec<&Visit> = others.0.iter().map(|visit| &**visit).collect();
            report(unit, visit, &others, &props.instruments, prefs)
        },
    );
    let sheet = props.visit.yard.clone().unwrap_or_default();
    let leg = sheet.leg;
    let on_note =
        on_edit.reform(|text: String| -> Edit { Box::new(move |visit| visit.note = text) });
    let on_finish = on_edit.reform(|_: MouseEvent| -> Edit {
        let when = clock::now();
        Box::new(move |visit| {
            visit.closed = Some(Closing {
                when,
                ..Closing::default()
            });
        })
    });
    let on_reopen =
        on_edit.reform(|_: MouseEvent| -> Edit { Box::new(|visit| visit.closed = None) });
    html! {
        <main class="page yard" id="main" data-testid="yard-screen">
            <div class="page-head">
                <h1 id="title" tabindex="-1">{ format!("Yard check, {}", props.unit.name) }</h1>
                <div class="actions">
                    <a class="button is-quiet" href={Route::Unit(props.unit.id.clone()).href()} data-testid="back-to-unit">
                        <Icon shape={Shape::Back} />{ "To the unit" }
                    </a>
                    <a class="button is-quiet" href={Route::Wear(props.unit.id.clone()).href()} data-testid="to-wear">
                        { "Wear over the hours" }
                    </a>
                    <a class="button is-quiet" href={Route::Report(props.visit.id.clone()).href()} data-testid="to-report">
                        { "Hand over" }
                    </a>
                </div>
            </div>
            <p class="soft">
                { format!("Begun {}. Under {MINUTES:.0} minutes with test couplings fitted. It covers the drive alone.", clock::tell(&props.visit.opened)) }
            </p>
            <div class="yard-columns">
                <div class="yard-side">
                    <VerdictPanel report={(*made).clone()} />
                    <ChangePanel {leg} change={made.change.clone()} />
                </div>
                <div class="yard-main">
                    { cautions::at(Stands::Call) }
                    <Head
                        visit={props.visit.clone()}
                        instruments={props.instruments.clone()}
                        prefs={props.prefs.clone()}
                        on_edit={on_edit.clone()}
                    />
                    { for steps(&props.unit).iter().enumerate().map(|(at, step)| html! {
                        <StepPart
                            key={step.id}
                            number={at + 1}
                            {step}
                            unit={props.unit.clone()}
                            sheet={sheet.clone()}
                            judged={made.judged.iter().filter(|j| j.step == step.id).cloned().collect::<Vec<_>>()}
                            prefs={props.prefs.clone()}
                            on_edit={on_edit.clone()}
                        />
                    }) }
                    <Counters two={!props.unit.ticks.paths.is_one()} on_edit={on_edit.clone()} />
                    <section class="panel stack" aria-label="End of the check">
                        <TextField
                            id="yard-note"
                            label="Note"
                            value={props.visit.note.clone()}
                            on_input={on_note}
                            lines={true}
                            maxlength={u32::try_from(limits::TEXT_CHARACTERS).unwrap_or(u32::MAX)}
                            testid="yard-note"
                        />
                        if let Some(closed) = &props.visit.closed {
                            <p data-testid="yard-finished">{ format!("Finished {}. What is changed now is kept too.", clock::tell(&closed.when)) }</p>
                            <button type="button" class="button" onclick={on_reopen} data-testid="yard-reopen">{ "Open it again" }</button>
                        } else {
                            <button type="button" class="button is-main is-wide" onclick={on_finish} data-testid="yard-finish">
                                { "Finish the check" }
                            </button>
                        }
                    </section>
                </div>
            </div>
        </main>
    }
}
