//! The bench screen as a whole.

use super::hand_over::{HandOver, HandOverProps};
use super::head::HeadForm;
use super::items::{self, ItemsForm, ItemsFormProps};
use super::layout::LayoutForm;
use super::paste::PasteBox;
use super::plot::{Pictures, PicturesProps};
use super::results::{self, Results, ResultsProps};
use super::table::PointTable;
use super::take_over::{TakeOver, TakeOverProps};
use crate::app::parts::{Caution, Grade, Icon, Late, Section, Shape};
use crate::app::platform::{focus, timer::Timer};
use crate::app::route::Route;
use crate::bench::stand::{BenchReport, BenchSheet, report};
use crate::quantity::UnitPrefs;
use crate::record::Visit;
use crate::unit::Unit;
use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html};
use yew::{use_effect_with, use_memo, use_mut_ref, use_state};

/// Properties of [`BenchScreen`].
#[derive(Clone, PartialEq, Properties)]
pub struct BenchScreenProps {
    /// The unit that the pump or motor belongs to.
    pub unit: Rc<Unit>,
    /// The visit.
    pub visit: Rc<Visit>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// The visit was edited: the whole of it.
    pub on_visit: Callback<Visit>,
    /// The unit was edited: what the bench found goes into its profile.
    pub on_unit: Callback<Unit>,
}

/// One edit of the sheet.
pub type Edit = Box<dyn FnOnce(&mut BenchSheet)>;

/// What the sheet comes to, equal to itself alone.
#[derive(Clone, Debug)]
pub struct Told(pub Rc<BenchReport>);

impl PartialEq for Told {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

/// From the last key in a cell to what the sheet comes to.
const QUIET_MS: i32 = 150;

/// True where two sheets have the same rows and differ in nothing but what stands in their cells.
fn differ_in_cells_alone(one: &BenchSheet, other: &BenchSheet) -> bool {
    let bare = |sheet: &BenchSheet| {
        let mut sheet = sheet.clone();
        sheet.rows.iter_mut().for_each(|row| row.cells.clear());
        sheet
    };
    bare(one) == bare(other)
}

/// The screen.
#[component]
pub fn BenchScreen(props: &BenchScreenProps) -> Html {
    // Two quick edits build on one another, also between two drawings.
    let newest = use_mut_ref(|| props.visit.clone());
    newest.replace(props.visit.clone());
    let on_visit = use_mut_ref(|| props.on_visit.clone());
    on_visit.replace(props.on_visit.clone());
    // The same at every drawing: what nothing has changed for is not drawn anew.
    let on_edit = use_memo((), move |()| {
        Callback::from(move |edit: Edit| {
            let mut visit = (**newest.borrow()).clone();
            edit(visit.bench.get_or_insert_default());
            newest.replace(Rc::new(visit.clone()));
            let on_visit = on_visit.borrow().clone();
            on_visit.emit(visit);
        })
    });
    let on_edit = (*on_edit).clone();
    let sheet = props.visit.bench.clone().unwrap_or_default();
    // While cells are typed it is worked out after a quiet moment; the last answer stays until then. Whatever else is changed is
    // answered at once: what is told of a row must not be told beside another.
    let settled = use_state(|| sheet.clone());
    let waits = *settled != sheet && differ_in_cells_alone(&settled, &sheet);
    {
        let settled = settled.clone();
        use_effect_with(sheet.clone(), move |sheet| {
            let sheet = sheet.clone();
            let timer =
                (*settled != sheet).then(|| Timer::once(QUIET_MS, move || settled.set(sheet)));
            move || drop(timer)
        });
    }
    let about = if waits {
        (*settled).clone()
    } else {
        sheet.clone()
    };
    let told = use_memo((about, props.unit.clone()), |(sheet, unit)| {
        Told(Rc::new(report(sheet, Some(unit))))
    });
    let told = (*told).clone();
    let points = told.0.points.len();
    let state = match points {
        0 => "no point yet".to_owned(),
        1 => "1 point".to_owned(),
        many => format!("{many} points"),
    };
    let sheet = Rc::new(sheet);
    let within = focus::within();
    // Where somebody types, the part is drawn at once.
    let at_hand = |sections: &[&str]| within.iter().any(|id| sections.contains(&id.as_str()));
    html! {
        <main class="page bench" id="main" data-testid="bench-screen" aria-busy={waits.then_some("true")}>
            <div class="page-head">
                <h1 id="title" tabindex="-1">{ "Bench stand" }</h1>
                <a class="button is-quiet" href={Route::Call(props.visit.id.clone()).href()} data-testid="back-to-call">
                    <Icon shape={Shape::Back} />{ "To the call" }
                </a>
            </div>
            <p class="soft">{ "The unit’s manual and the stand’s own rules come before anything here." }</p>
            <Caution grade={Grade::Danger} title="On the stand">
                <p>{ "Guard over shaft and coupling before the first jog; nobody in the plane of the coupling. Never shut a case drain: the \
                    housing bursts or the seal is thrown. Hoses under full pressure are tied down. Prove the stop before the first load. \
                    A pinhole you cannot feel can inject oil: card or stick, never a hand." }</p>
            </Caution>
            <LayoutForm sheet={sheet.clone()} on_edit={on_edit.clone()} />
            <HeadForm sheet={sheet.clone()} unit={props.unit.clone()} prefs={props.prefs.clone()} on_edit={on_edit.clone()} />
            <Section id="bench-points" title="Points" {state} is_open=true>
                <PasteBox subject={sheet.subject} rows={sheet.rows.len()} on_edit={on_edit.clone()} />
                <PointTable sheet={sheet.clone()} told={told.clone()} prefs={props.prefs.clone()} on_edit={on_edit.clone()} />
            </Section>
            <Late<Results> now={at_hand(&results::SECTIONS)} of={ResultsProps {
                sheet: sheet.clone(),
                told: told.clone(),
                unit: props.unit.clone(),
                prefs: props.prefs.clone(),
                on_edit: on_edit.clone(),
            }} />
            <Late<Pictures> of={PicturesProps { told: told.clone(), sheet: sheet.clone(), prefs: props.prefs.clone() }} />
            <Late<ItemsForm> now={at_hand(&[items::SECTION])} of={ItemsFormProps {
                sheet: sheet.clone(),
                told: told.clone(),
                prefs: props.prefs.clone(),
                on_edit: on_edit.clone(),
            }} />
            <Late<TakeOver> of={TakeOverProps {
                told: told.clone(),
                sheet: sheet.clone(),
                unit: props.unit.clone(),
                opened: props.visit.opened.clone().into(),
                prefs: props.prefs.clone(),
                on_unit: props.on_unit.clone(),
                on_edit,
            }} />
            <Late<HandOver> of={HandOverProps { sheet, told, unit: props.unit.clone(), prefs: props.prefs.clone() }} />
        </main>
    }
}
