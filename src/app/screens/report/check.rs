//! The paper of a yard check: on the screen as it comes out of the printer, and the ways to hand it over.

use super::file_name;
use super::send::Send;
use super::sheet::sheet;
use crate::app::parts::{Icon, Shape};
use crate::app::platform::clock;
use crate::app::route::Route;
use crate::app::yard::Others;
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::record::Visit;
use crate::report::{Check, Report};
use crate::unit::Unit;
use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html, use_memo};

/// Properties of [`CheckReportScreen`].
#[derive(Clone, PartialEq, Properties)]
pub struct CheckReportProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// The check.
    pub visit: Rc<Visit>,
    /// The other visits to the unit.
    pub others: Others,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Something to say in the live region.
    pub on_say: Callback<String>,
}

/// The screen.
#[component]
pub fn CheckReportScreen(props: &CheckReportProps) -> Html {
    // One moment for the page, the text and the file.
    let made_at = use_memo((), |()| clock::now());
    let others: Vec<&Visit> = props.others.0.iter().map(|visit| &**visit).collect();
    let check = Check {
        unit: &props.unit,
        visit: &props.visit,
        others: &others,
        instruments: &props.instruments,
        prefs: &props.prefs,
        made_at: &made_at,
    };
    let report = Report::of_check(&check);
    html! {
        <main class="page report-page" id="main" data-testid="check-report-screen">
            <div class="page-head no-print">
                <h1 id="title" tabindex="-1">{ format!("Yard check, {}", props.unit.name) }</h1>
                <a class="button is-quiet" href={Route::Yard(props.visit.id.clone()).href()} data-testid="back-to-check">
                    <Icon shape={Shape::Back} />{ "To the check" }
                </a>
            </div>
            <Send
                name={file_name(&props.unit.name)}
                title={report.title.clone()}
                text={report.text()}
                table={format!("\u{feff}{}", check.csv())}
                file={check.export().text().unwrap_or_default()}
                what="check"
                on_say={props.on_say.clone()}
            />
            { sheet(&report) }
        </main>
    }
}
