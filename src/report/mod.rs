//! The hand-over report of a call: one page for the customer or the shop, the same words on the screen, on paper, in a message
//! and from the office command. Pure: the same record, assessment and moment give the same report, byte for byte.
//!
//! | file | what it holds |
//! | --- | --- |
//! | [`mod@self`] | what a report is made from, and what it is |
//! | `groups` | readings by condition, with windows and instruments |
//! | `causes` | the finding, and the causes with their reasons |
//! | `seen` | what was seen without a gauge, the neutral and the tracking |
//! | `bench` | the bench sheet |
//! | `open` | what was not checked, what to bring |
//! | `safety` | cautions, and what was put back |
//! | `basis` | versions and assumptions, so that the report can be made again |
//! | `text` | plain text for a message |
//! | `csv` | the readings for a spreadsheet |
//! | `moment` | moments in words that hang on no clock and no place |

mod basis;
mod bench;
mod causes;
pub(crate) mod csv;
mod groups;
mod moment;
mod open;
mod safety;
mod seen;
mod text;

pub use basis::record_sum;
pub use causes::{Finding, Sure};
pub use csv::{Sheet, csv};
pub use groups::{Group, Row};
pub use moment::moment;
pub use open::proposals;

use crate::assessment::Assessment;
use crate::call::side::Sides;
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::record::{Export, Settings, Visit};
use crate::unit::Unit;

/// What a report is made from.
#[derive(Clone, Copy, Debug)]
pub struct Subject<'a> {
    /// The unit.
    pub unit: &'a Unit,
    /// The call.
    pub visit: &'a Visit,
    /// Instruments of the shop.
    pub instruments: &'a [Instrument],
    /// What the engine says of the call, with its advice.
    pub assessment: &'a Assessment,
    /// Units of measure and decimal mark of the report.
    pub prefs: &'a UnitPrefs,
    /// Moment of the report (ISO 8601 text).
    pub made_at: &'a str,
}

/// A short statement under a name: "Complaint", "Weak going forward".
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Fact {
    /// Name.
    pub name: &'static str,
    /// Words.
    pub words: String,
}

/// Lines under a heading.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Section {
    /// Stable id (kebab case).
    pub id: &'static str,
    /// Heading.
    pub heading: &'static str,
    /// Lines; never empty.
    pub lines: Vec<String>,
}

/// The report.
#[derive(Clone, Debug, PartialEq)]
pub struct Report {
    /// Title, with the yard number.
    pub title: String,
    /// Unit, moments, complaint.
    pub facts: Vec<Fact>,
    /// What it was, or what leads.
    pub finding: Finding,
    /// Readings by condition.
    pub groups: Vec<Group>,
    /// Causes with their chance and reasons, likeliest first; empty where too little was taken to tell.
    pub causes: Vec<causes::Told>,
    /// Everything else, in order: seen, done, proof, not checked, to bring, put back.
    pub sections: Vec<Section>,
    /// Cautions for whoever goes to the machine next.
    pub cautions: Vec<String>,
    /// Versions, assumptions, and how to make the report again.
    pub basis: Vec<String>,
}

impl<'a> Subject<'a> {
    fn sides(&self) -> Sides {
        Sides::of(self.unit)
    }

    /// The call as a file from which the office command makes this very report: unit, call, the instruments used, and the
    /// units of measure.
    #[must_use]
    pub fn export(&self) -> Export {
        let mut book = crate::record::Book {
            settings: Settings {
                instruments: self.instruments.to_vec(),
                ..Settings::default()
            },
            ..Default::default()
        };
        book.put_unit(self.unit.clone());
        book.put_visit(self.visit.clone());
        let mut export = Export::of_visit(&book, &self.visit.id, self.made_at).unwrap_or_default();
        export.settings = Some(Settings {
            units: self.prefs.clone(),
            ..Settings::default()
        });
        export
    }
}

impl Report {
    /// The report of a call.
    #[must_use]
    pub fn of(subject: &Subject) -> Report {
        let sections = [
            seen::section(subject),
            seen::adjusting(subject),
            bench::told(subject),
            closing(subject),
            open::not_checked(subject),
            open::to_bring(subject),
            safety::put_back(subject),
            note(subject),
        ];
        Report {
            title: format!("Hand-over: unit {}", name(subject.unit)),
            facts: facts(subject),
            finding: causes::finding(subject),
            groups: groups::groups(subject),
            causes: causes::told(subject),
            sections: sections.into_iter().flatten().collect(),
            cautions: safety::cautions(subject),
            basis: basis::lines(subject),
        }
    }

    /// The section of this id.
    #[must_use]
    pub fn section(&self, id: &str) -> Option<&Section> {
        self.sections.iter().find(|section| section.id == id)
    }
}

/// A section, where it has lines.
fn section(id: &'static str, heading: &'static str, lines: Vec<String>) -> Option<Section> {
    (!lines.is_empty()).then_some(Section { id, heading, lines })
}

/// A typed text as lines, without empty ones and without tabs and the like.
fn typed(text: &str) -> impl Iterator<Item = String> + '_ {
    let plain = |line: &str| line.replace(char::is_control, " ");
    text.lines()
        .map(move |line| plain(line).trim().to_owned())
        .filter(|line| !line.is_empty())
}

/// A typed text in one line.
fn one_line(text: &str) -> String {
    typed(text).collect::<Vec<_>>().join(" / ")
}

fn name(unit: &Unit) -> String {
    let name = one_line(&unit.name);
    if name.is_empty() {
        String::from("without a name")
    } else {
        name
    }
}

fn facts(subject: &Subject) -> Vec<Fact> {
    let (unit, visit) = (subject.unit, subject.visit);
    let mut facts = vec![
        Fact {
            name: "Machine",
            words: format!("{}, {}", name(unit), unit.class.words()),
        },
        Fact {
            name: "Call",
            words: match &visit.closed {
                Some(closing) => format!("{} to {}", moment(&visit.opened), moment(&closing.when)),
                None => format!("{}, still open", moment(&visit.opened)),
            },
        },
    ];
    let complaint = one_line(&visit.complaint);
    if !complaint.is_empty() {
        facts.push(Fact {
            name: "Complaint",
            words: complaint,
        });
    }
    facts.extend(basis::profile(subject));
    facts
}

/// What was done, what proved it, the parts used.
fn closing(subject: &Subject) -> Option<Section> {
    let visit = subject.visit;
    let closing = visit.closed.as_ref().or(visit.closing.as_ref())?;
    let mut lines = Vec::new();
    for (name, text) in [
        ("Done", &closing.done),
        ("Proved by", &closing.proof),
        ("Parts used", &closing.parts),
    ] {
        let words = one_line(text);
        if !words.is_empty() {
            lines.push(format!("{name}: {words}"));
        }
    }
    if visit.closed.is_some() && !closing.cause.is_empty() && closing.proof.trim().is_empty() {
        lines.push(String::from(if closing.is_proved {
            "Proved on the machine; how was not written down."
        } else {
            "Nothing is written down that proves it."
        }));
    }
    section("done", "Done", lines)
}

fn note(subject: &Subject) -> Option<Section> {
    section("note", "Note", typed(&subject.visit.note).collect())
}
