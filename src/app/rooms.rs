//! The screens beside units, profile and call: settings, tags, the sheets for neutral, tracking, yard and bench, wear, reports. They
//! come in a module of their own (`later.rs`) and are drawn by [`draw`].

use std::rc::Rc;

use yew::{Callback, Html, html};

use super::app_screen::missing;
use super::bench::BenchScreen;
use super::deed::{Deed, Snapshot};
use super::neutral::NeutralScreen;
use super::route::Route;
use super::screens::report::{CheckReportScreen, ReportScreen};
use super::screens::settings::SettingsScreen;
use super::screens::tag::{TagReader, TagSheet};
use super::state::Action;
use super::tracking::TrackingScreen;
use super::yard::{LearnedScreen, Others, WearScreen, YardScreen};
use crate::record::Visit;
use crate::unit::Unit;

/// A visit, its unit, and the other visits to that.
fn with_others(state: &Snapshot, id: &str) -> Option<(Rc<Unit>, Rc<Visit>, Others)> {
    let visit = state.visits.get(id)?;
    let unit = state.units.get(&visit.unit)?;
    let mut others = state.visits_of(&visit.unit);
    others.retain(|other| other.id != visit.id);
    Some((unit.clone(), visit.clone(), Others(others)))
}

fn yard(state: &Snapshot, deed: &Callback<Deed>, id: &str) -> Option<Html> {
    let (unit, visit, others) = with_others(state, id)?;
    Some(html! {
        <YardScreen
            key={format!("{id}-yard")}
            {unit}
            {visit}
            {others}
            instruments={state.instruments.clone()}
            prefs={state.settings.units.clone()}
            on_visit={deed.reform(|visit| Deed::Put(Action::PutVisit(Box::new(visit))))}
        />
    })
}

fn check_report(state: &Snapshot, deed: &Callback<Deed>, id: &str) -> Option<Html> {
    let (unit, visit, others) = with_others(state, id)?;
    Some(html! {
        <CheckReportScreen
            key={format!("{id}-report")}
            {unit}
            {visit}
            {others}
            instruments={state.instruments.clone()}
            prefs={state.settings.units.clone()}
            on_say={deed.reform(|words| Deed::Put(Action::Say(words)))}
        />
    })
}

/// The screen of the address, where it is one of these.
pub fn draw(state: &Snapshot, deed: &Callback<Deed>) -> Html {
    match &state.route {
        // Drawn by the house itself.
        Route::Units | Route::Unit(_) => Html::default(),
        Route::Settings => html! { <SettingsScreen state={state.clone()} deed={deed.clone()} /> },
        Route::Learned => html! { <LearnedScreen state={state.clone()} deed={deed.clone()} /> },
        Route::Wear(id) => match state.units.get(id) {
            Some(unit) => html! {
                <WearScreen
                    key={format!("{id}-wear")}
                    unit={unit.clone()}
                    visits={Others(state.visits_of(id))}
                    instruments={state.instruments.clone()}
                    prefs={state.settings.units.clone()}
                />
            },
            None => missing("unit"),
        },
        Route::Yard(id) => yard(state, deed, id).unwrap_or_else(|| missing("yard check")),
        // A yard check is no call: whoever links to it as one comes to its sheet.
        Route::Call(id) => yard(state, deed, id).unwrap_or_else(|| missing("yard check")),
        Route::Tags(unit) => html! {
            <TagSheet key={unit.clone().unwrap_or_default()} unit={unit.clone()} state={state.clone()} />
        },
        Route::Tag(scanned) => html! {
            <TagReader key={scanned.clone()} scanned={scanned.clone()} state={state.clone()} deed={deed.clone()} />
        },
        Route::Report(id)
            if state
                .visits
                .get(id)
                .is_some_and(|visit| visit.is_yard_check()) =>
        {
            check_report(state, deed, id).unwrap_or_else(|| missing("yard check"))
        }
        Route::Report(id) => {
            let visit = state.visits.get(id);
            match visit.and_then(|visit| Some((visit, state.units.get(&visit.unit)?))) {
                Some((visit, unit)) => {
                    let (assessment, updating) = state.answer(id);
                    html! {
                        <ReportScreen
                            key={format!("{id}-report")}
                            unit={unit.clone()}
                            visit={visit.clone()}
                            instruments={state.instruments.clone()}
                            prefs={state.settings.units.clone()}
                            {assessment}
                            {updating}
                            trouble={state.engine_trouble.clone()}
                            on_visit={deed.reform(|visit| Deed::Put(Action::PutVisit(Box::new(visit))))}
                            on_say={deed.reform(|words| Deed::Put(Action::Say(words)))}
                        />
                    }
                }
                None => missing("call"),
            }
        }
        Route::Neutral(id) => {
            let visit = state.visits.get(id);
            match visit.and_then(|visit| Some((visit, state.units.get(&visit.unit)?))) {
                Some((visit, unit)) => html! {
                    <NeutralScreen
                        key={format!("{id}-neutral")}
                        unit={unit.clone()}
                        visit={visit.clone()}
                        prefs={state.settings.units.clone()}
                        on_visit={deed.reform(|visit| Deed::Put(Action::PutVisit(Box::new(visit))))}
                    />
                },
                None => missing("call"),
            }
        }
        Route::Bench(id) => {
            let visit = state.visits.get(id);
            match visit.and_then(|visit| Some((visit, state.units.get(&visit.unit)?))) {
                Some((visit, unit)) => html! {
                    <BenchScreen
                        key={format!("{id}-bench")}
                        unit={unit.clone()}
                        visit={visit.clone()}
                        prefs={state.settings.units.clone()}
                        on_visit={deed.reform(|visit| Deed::Put(Action::PutVisit(Box::new(visit))))}
                        on_unit={deed.reform(|unit| Deed::Put(Action::PutUnit(unit)))}
                    />
                },
                None => missing("call"),
            }
        }
        Route::Tracking(id) => {
            let visit = state.visits.get(id);
            match visit.and_then(|visit| Some((visit, state.units.get(&visit.unit)?))) {
                Some((visit, unit)) => html! {
                    <TrackingScreen
                        key={id.clone()}
                        unit={unit.clone()}
                        visit={visit.clone()}
                        prefs={state.settings.units.clone()}
                        on_visit={deed.reform(|visit| Deed::Put(Action::PutVisit(Box::new(visit))))}
                    />
                },
                None => missing("call"),
            }
        }
    }
}
