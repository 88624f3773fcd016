//! The hand-over report of a call: on the screen as it comes out of the printer, and the ways to hand it over.

mod check;
mod send;
mod sheet;

pub use self::check::CheckReportScreen;
use self::send::Send;
use self::sheet::sheet;
use crate::app::parts::{Caution, Grade, Icon, Shape, TextField};
use crate::app::platform::{clock, files};
use crate::app::route::Route;
use crate::assessment::Assessment;
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::record::{Visit, limits};
use crate::report::{Report, Subject};
use crate::unit::Unit;
use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html, use_memo};

/// Properties of [`ReportScreen`].
#[derive(Clone, PartialEq, Properties)]
pub struct ReportScreenProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// The call.
    pub visit: Rc<Visit>,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Last answer of the engine.
    pub assessment: Option<Rc<Assessment>>,
    /// True while a newer one is being worked out.
    pub updating: bool,
    /// Why there is none, where the engine cannot run.
    pub trouble: Option<String>,
    /// The visit was edited: the whole of it.
    pub on_visit: Callback<Visit>,
    /// Something to say in the live region.
    pub on_say: Callback<String>,
}

impl ReportScreenProps {
    /// The assessment to report: the whole one with its advice, or an empty one where the engine cannot run.
    fn answer(&self) -> Option<Rc<Assessment>> {
        if self.trouble.is_some() {
            return Some(self.assessment.clone().unwrap_or_default());
        }
        let whole = self.assessment.clone()?;
        (!self.updating && whole.advice.is_some()).then_some(whole)
    }
}

/// The screen.
#[component]
pub fn ReportScreen(props: &ReportScreenProps) -> Html {
    // One moment for the page, the text and the file.
    let made_at = use_memo((), |()| clock::now());
    let on_bring = {
        let (visit, on_visit) = (props.visit.clone(), props.on_visit.clone());
        Callback::from(move |bring: String| {
            on_visit.emit(Visit {
                bring,
                ..(*visit).clone()
            });
        })
    };
    let answer = props.answer();
    let subject = answer.as_deref().map(|assessment| Subject {
        unit: &props.unit,
        visit: &props.visit,
        instruments: &props.instruments,
        assessment,
        prefs: &props.prefs,
        made_at: &made_at,
    });
    html! {
        <main class="page report-page" id="main" data-testid="report-screen" aria-busy={subject.is_none().then_some("true")}>
            <div class="page-head no-print">
                <h1 id="title" tabindex="-1">{ format!("Report, {}", props.unit.name) }</h1>
                <a class="button is-quiet" href={Route::Call(props.visit.id.clone()).href()} data-testid="back-to-call">
                    <Icon shape={Shape::Back} />{ "To the call" }
                </a>
            </div>
            if let Some(why) = &props.trouble {
                <Caution grade={Grade::Caution} title="without windows and causes" testid="report-trouble">
                    <p>{ why }</p>
                </Caution>
            }
            <div class="no-print panel">
                <TextField
                    id="report-bring"
                    label="Parts and tools to bring"
                    hint="a line each; stands in the report under “To bring”"
                    lines={true}
                    value={props.visit.bring.clone()}
                    on_input={on_bring}
                    maxlength={u32::try_from(limits::TEXT_CHARACTERS).unwrap_or(2000)}
                    testid="report-bring"
                />
            </div>
            { match &subject {
                Some(subject) => {
                    let report = Report::of(subject);
                    html! { <>
                        <Send
                            name={file_name(&props.unit.name)}
                            title={report.title.clone()}
                            text={report.text()}
                            table={table(subject)}
                            file={subject.export().text().unwrap_or_default()}
                            what="call"
                            on_say={props.on_say.clone()}
                        />
                        { sheet(&report) }
                    </> }
                }
                None => html! {
                    <p role="status" data-testid="report-waits">{ "Working out windows, causes and what is left to check…" }</p>
                },
            } }
        </main>
    }
}

/// The readings as a table, with the mark that tells a spreadsheet the encoding.
fn table(subject: &Subject) -> String {
    let sheet = crate::report::Sheet {
        unit: subject.unit,
        visit: subject.visit,
        assessment: subject.assessment,
    };
    format!(
        "\u{feff}{}",
        crate::report::csv(&[sheet], subject.instruments, subject.prefs)
    )
}

/// The unit's name as part of the name of a file.
fn file_name(name: &str) -> String {
    format!("lowside-{}-{}", files::name_part(name), clock::file_day())
}
