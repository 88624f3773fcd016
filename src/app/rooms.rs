//! The screens beside units, profile and call: settings, tags, the sheets for neutral, tracking, yard and bench, wear, reports. They
//! come in a module of their own (`later.rs`) and are drawn by [`draw`].

use std::rc::Rc;

use yew::{Callback, Html, html};

use super::app_screen::{missing, put_unit, put_visit};
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
    let (visit, unit) = state.visit(id)?;
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
            on_visit={put_visit(deed)}
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
            on_say={say(deed)}
        />
    })
}

fn wear(state: &Snapshot, id: &str) -> Option<Html> {
    let unit = state.units.get(id)?;
    Some(html! {
        <WearScreen
            key={format!("{id}-wear")}
            unit={unit.clone()}
            visits={Others(state.visits_of(id))}
            instruments={state.instruments.clone()}
            prefs={state.settings.units.clone()}
        />
    })
}

fn report(state: &Snapshot, deed: &Callback<Deed>, id: &str) -> Option<Html> {
    let (visit, unit) = state.visit(id)?;
    let (assessment, updating) = state.answer(id);
    Some(html! {
        <ReportScreen
            key={format!("{id}-report")}
            unit={unit.clone()}
            visit={visit.clone()}
            instruments={state.instruments.clone()}
            prefs={state.settings.units.clone()}
            {assessment}
            {updating}
            trouble={state.engine_trouble.clone()}
            on_visit={put_visit(deed)}
            on_say={say(deed)}
        />
    })
}

/// The sheets of a call: neutral, tracking, bench.
fn sheet(state: &Snapshot, deed: &Callback<Deed>, id: &str) -> Option<Html> {
    let (visit, unit) = state.visit(id)?;
    let (unit, visit, prefs) = (unit.clone(), visit.clone(), state.settings.units.clone());
    let on_visit = put_visit(deed);
    Some(match &state.route {
        Route::Neutral(_) => {
            html! { <NeutralScreen key={format!("{id}-neutral")} {unit} {visit} {prefs} {on_visit} /> }
        }
        Route::Tracking(_) => {
            html! { <TrackingScreen key={id.to_owned()} {unit} {visit} {prefs} {on_visit} /> }
        }
        _ => {
            let on_unit = put_unit(deed);
            html! { <BenchScreen key={format!("{id}-bench")} {unit} {visit} {prefs} {on_visit} {on_unit} /> }
        }
    })
}

fn say(deed: &Callback<Deed>) -> Callback<String> {
    deed.reform(|words| Deed::Put(Action::Say(words)))
}

/// The screen of the address, where it is one of these.
pub fn draw(state: &Snapshot, deed: &Callback<Deed>) -> Html {
    let or_missing = |screen: Option<Html>, what: &str| screen.unwrap_or_else(|| missing(what));
    match &state.route {
        // Drawn by the house itself.
        Route::Units | Route::Unit(_) => Html::default(),
        Route::Settings => html! { <SettingsScreen state={state.clone()} deed={deed.clone()} /> },
        Route::Learned => html! { <LearnedScreen state={state.clone()} deed={deed.clone()} /> },
        Route::Wear(id) => or_missing(wear(state, id), "unit"),
        // A yard check is no call: whoever links to it as one comes to its sheet.
        Route::Yard(id) | Route::Call(id) => or_missing(yard(state, deed, id), "yard check"),
        Route::Tags(unit) => html! {
            <TagSheet key={unit.clone().unwrap_or_default()} unit={unit.clone()} state={state.clone()} />
        },
        Route::Tag(scanned) => html! {
            <TagReader key={scanned.clone()} scanned={scanned.clone()} state={state.clone()} deed={deed.clone()} />
        },
        Route::Report(id) if state.is_yard_check(id) => {
            or_missing(check_report(state, deed, id), "yard check")
        }
        Route::Report(id) => or_missing(report(state, deed, id), "call"),
        Route::Neutral(id) | Route::Tracking(id) | Route::Bench(id) => {
            or_missing(sheet(state, deed, id), "call")
        }
    }
}
