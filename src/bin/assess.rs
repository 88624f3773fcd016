//! Reads an export on standard input and writes one line of JSON for each visit: what a healthy unit would show, and the
//! causes with their probabilities and reasons. For an office that keeps the exports of many phones.
//!
//! Exit codes: 0 all visits assessed; 2 the input or the command line cannot be taken (the reason, with its place, on standard
//! error); 3 some visits could not be assessed (each has its line, with the reason).

use lowside::assessment::Assessment;
use lowside::quantity::UnitPrefs;
use lowside::ranking::Session;
use lowside::readings::instrument::Instrument;
use lowside::record::{Export, Visit, limits};
use lowside::report::{Check, Report, Sheet, Subject, csv};
use lowside::unit::Unit;
use lowside::yard::learn::{self, Case, Learning, Rates};
use serde::Serialize;
use std::collections::BTreeMap;
use std::io::{self, ErrorKind, Read, Write};
use std::process::ExitCode;

const HELP: &str = "\
assess: from readings to causes, for every visit of a Lowside export

Usage: assess < export.json > assessments.jsonl
       assess --report < export.json > report.txt
       assess --csv < export.json > readings.csv

Reads one export file on standard input and writes one line of JSON for each visit to standard output:
  visit, unit, unit_name   ids and the yard number
  windows                  what a healthy unit would show at each reading, and where the reading stands
  causes                   ids, title, probability (0 to 1), evidence for and against
  notes, withheld, trust   what to know before acting on it
  verdict, reasons,        instead of the above, where the visit is a yard check
  not_checked
  error                    instead of all of it, where the visit cannot be assessed
Values are in bar, L/min, rpm, °C, s, mA and km/h.

With --report it writes the hand-over report of each visit as plain text (of a yard check: its paper), the same as the app
makes from that file; with
--csv all readings with their windows as one table. Both in the units of measure of the file, metric where it names none.

Options: --report, --csv, --help, --version

Exit codes: 0 all visits assessed; 2 bad input or command line; 3 some visits could not be assessed.

A ranking is no proof. Prove a cause on the machine before parts are ordered; the unit's manual and the cautions of the
app come first.
";

/// Why the program ends early.
enum End {
    /// Input or command line: exit code 2.
    Bad(String),
    /// Whoever reads our output went away: nothing more to do.
    Unread,
}

/// One line of the output.
#[derive(Serialize)]
struct Line<'a> {
    visit: &'a str,
    unit: &'a str,
    unit_name: &'a str,
    #[serde(flatten)]
    outcome: Outcome,
}

/// What was found, or why nothing can be said.
#[derive(Serialize)]
#[serde(untagged)]
enum Outcome {
    Assessed(Box<Assessment>),
    /// A yard check has a verdict and no causes.
    Checked {
        verdict: &'static str,
        reasons: Vec<String>,
        not_checked: Vec<String>,
    },
    Failed {
        error: String,
    },
}

fn main() -> ExitCode {
    match run() {
        Ok(code) => ExitCode::from(code),
        Err(End::Unread) => ExitCode::SUCCESS,
        Err(End::Bad(why)) => {
            // Nobody may be there to read this either.
            let _ = writeln!(io::stderr(), "assess: {why}");
            ExitCode::from(2)
        }
    }
}

/// What is to be written.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Wanted {
    Lines,
    Reports,
    Table,
}

fn run() -> Result<u8, End> {
    let mut arguments = std::env::args_os().skip(1);
    let mut wanted = Wanted::Lines;
    if let Some(first) = arguments.next() {
        let text = match (first.to_str(), arguments.next()) {
            (Some("--report"), None) => {
                wanted = Wanted::Reports;
                None
            }
            (Some("--csv"), None) => {
                wanted = Wanted::Table;
                None
            }
            (Some("--help"), None) => Some(HELP.to_owned()),
            (Some("--version"), None) => Some(format!("assess {}\n", env!("CARGO_PKG_VERSION"))),
            _ => {
                let first = first.to_string_lossy();
                return Err(End::Bad(format!(
                    "unknown argument {first:?}; the export comes on standard input. Try --help"
                )));
            }
        };
        if let Some(text) = text {
            return write(&text).map(|()| 0);
        }
    }
    let export = Export::read(&input()?).map_err(|error| End::Bad(error.to_string()))?;
    for remark in &export.remarks {
        let _ = writeln!(io::stderr(), "assess: {remark}");
    }
    match wanted {
        Wanted::Lines => assess_all(&export),
        Wanted::Reports => report_all(&export),
        Wanted::Table => table(&export),
    }
}

fn write(text: &str) -> Result<(), End> {
    let mut out = io::stdout().lock();
    out.write_all(text.as_bytes())
        .and_then(|()| out.flush())
        .map_err(|error| unwritten(&error))
}

/// Standard input, up to just over the largest file that is read: the reader then says that it is too large.
fn input() -> Result<Vec<u8>, End> {
    let mut bytes = Vec::new();
    let most = u64::try_from(limits::FILE_BYTES)
        .unwrap_or(u64::MAX)
        .saturating_add(1);
    io::stdin()
        .lock()
        .take(most)
        .read_to_end(&mut bytes)
        .map_err(|error| End::Bad(format!("standard input cannot be read: {error}")))?;
    if bytes.is_empty() {
        return Err(End::Bad(String::from(
            "standard input is empty; it must be an export: assess < export.json",
        )));
    }
    Ok(bytes)
}

fn assess_all(export: &Export) -> Result<u8, End> {
    let units: BTreeMap<&str, &Unit> = export
        .units
        .iter()
        .map(|unit| (unit.id.as_str(), unit))
        .collect();
    let learning = export.settings.clone().unwrap_or_default().learning;
    let cases = learn::cases(&export.units, &export.visits, &learning);
    let mut out = io::stdout().lock();
    let mut code = 0;
    for visit in &export.visits {
        let unit = units.get(visit.unit.as_str()).copied();
        let rates = rates(unit, visit, &cases, &learning);
        let outcome = match unit {
            Some(unit) if visit.is_yard_check() => checked(export, unit, visit),
            unit => outcome(unit, visit, &export.instruments, rates, false),
        };
        if let Outcome::Failed { error } = &outcome {
            code = 3;
            let _ = writeln!(io::stderr(), "assess: visit {}: {error}", visit.id);
        }
        let line = Line {
            visit: &visit.id,
            unit: &visit.unit,
            unit_name: unit.map_or("", |unit| &unit.name),
            outcome,
        };
        let mut text = serde_json::to_string(&line).map_err(|error| End::Bad(error.to_string()))?;
        text.push('\n');
        out.write_all(text.as_bytes())
            .and_then(|()| out.flush())
            .map_err(|error| unwritten(&error))?;
    }
    Ok(code)
}

/// Base rates for a visit: the file's own closed cases teach as they do in the app.
fn rates(unit: Option<&Unit>, visit: &Visit, cases: &[Case], learning: &Learning) -> Rates {
    unit.map_or_else(Rates::default, |unit| {
        learn::rates_for(&visit.id, unit.class, cases, learning)
    })
}

/// The units of measure of a file.
fn prefs(export: &Export) -> UnitPrefs {
    let settings = export.settings.as_ref();
    settings.map_or_else(UnitPrefs::metric, |settings| settings.units.clone())
}

/// Each visit of the file with its unit and its assessment, advice included; what cannot be assessed is told on standard error.
fn each<'a>(
    export: &'a Export,
    mut take: impl FnMut(&'a Unit, &'a Visit, Assessment) -> Result<(), End>,
) -> Result<u8, End> {
    let learning = export.settings.clone().unwrap_or_default().learning;
    let cases = learn::cases(&export.units, &export.visits, &learning);
    let mut code = 0;
    for visit in &export.visits {
        let unit = export.units.iter().find(|unit| unit.id == visit.unit);
        // A check without readings has nothing to be ranked.
        if let Some(unit) = unit.filter(|_| visit.is_yard_check() && visit.readings.is_empty()) {
            take(unit, visit, Assessment::default())?;
            continue;
        }
        let rates = rates(unit, visit, &cases, &learning);
        match (unit, outcome(unit, visit, &export.instruments, rates, true)) {
            (Some(unit), Outcome::Assessed(assessment)) => take(unit, visit, *assessment)?,
            (_, Outcome::Failed { error }) => {
                code = 3;
                let _ = writeln!(io::stderr(), "assess: visit {}: {error}", visit.id);
            }
            (None, Outcome::Assessed(_)) | (_, Outcome::Checked { .. }) => {}
        }
    }
    Ok(code)
}

fn report_all(export: &Export) -> Result<u8, End> {
    let prefs = prefs(export);
    let mut is_first = true;
    each(export, |unit, visit, assessment| {
        let instruments = &export.instruments;
        let made_at = &export.made_at;
        let report = if visit.is_yard_check() {
            let others = others(export, visit);
            Report::of_check(&Check {
                unit,
                visit,
                others: &others,
                instruments,
                prefs: &prefs,
                made_at,
            })
        } else {
            Report::of(&Subject {
                unit,
                visit,
                instruments,
                assessment: &assessment,
                prefs: &prefs,
                made_at,
            })
        };
        let rule = if is_first { "" } else { "\n\n" };
        is_first = false;
        write(&format!("{rule}{}", report.text()))
    })
}

fn table(export: &Export) -> Result<u8, End> {
    let mut assessed = Vec::new();
    let code = each(export, |unit, visit, assessment| {
        assessed.push((unit, visit, assessment));
        Ok(())
    })?;
    let sheets: Vec<Sheet> = assessed
        .iter()
        .map(|(unit, visit, assessment)| Sheet {
            unit,
            visit,
            assessment,
        })
        .collect();
    write(&csv(&sheets, &export.instruments, &prefs(export)))?;
    Ok(code)
}

/// The other visits to the unit of a visit.
fn others<'a>(export: &'a Export, visit: &Visit) -> Vec<&'a Visit> {
    export
        .visits
        .iter()
        .filter(|other| other.unit == visit.unit && other.id != visit.id)
        .collect()
}

fn checked(export: &Export, unit: &Unit, visit: &Visit) -> Outcome {
    let others = others(export, visit);
    let found = lowside::yard::report(unit, visit, &others, &export.instruments, &prefs(export));
    Outcome::Checked {
        verdict: found.verdict.words(),
        reasons: found.reasons.into_iter().map(|(_, why)| why).collect(),
        not_checked: found.not_checked,
    }
}

fn outcome(
    unit: Option<&Unit>,
    visit: &Visit,
    instruments: &[Instrument],
    rates: Rates,
    with_advice: bool,
) -> Outcome {
    let Some(unit) = unit else {
        return Outcome::Failed {
            error: format!(
                "its unit {:?} is not in this file: export the unit with it",
                visit.unit
            ),
        };
    };
    let mut session = Session::default();
    session.learn(rates);
    let mut assessment = session.assess(unit, visit, instruments);
    if with_advice {
        assessment.advice = Some(lowside::next::advise(
            unit,
            visit,
            instruments,
            &assessment,
            session.heavy(),
        ));
    }
    if is_finite(&assessment) {
        Outcome::Assessed(Box::new(assessment))
    } else {
        Outcome::Failed {
            error: String::from(
                "the calculation gave no figure; nothing can be said of this visit",
            ),
        }
    }
}

/// JSON has no word for a figure that is none, and a reader would take the gap for zero.
fn is_finite(assessment: &Assessment) -> bool {
    let windows = assessment
        .windows
        .iter()
        .flat_map(|w| [w.low, w.middle, w.high, w.instrument, w.read.unwrap_or(0.0)]);
    let causes = assessment.causes.iter().flat_map(|c| {
        let evidence = c.evidence.iter().map(|e| e.weight);
        let would_read = c.would_read.iter().flat_map(|w| [w.value, w.spread]);
        [c.probability]
            .into_iter()
            .chain(c.shares.iter().copied())
            .chain(evidence)
            .chain(would_read)
    });
    let trust = [
        assessment.trust.heaviest,
        assessment.trust.change,
        assessment.trust.wrong_reading,
    ];
    let hold = assessment
        .hold
        .into_iter()
        .flat_map(|(time, rise)| [time, rise]);
    windows
        .chain(causes)
        .chain(trust)
        .chain(hold)
        .all(f64::is_finite)
}

fn unwritten(error: &io::Error) -> End {
    if error.kind() == ErrorKind::BrokenPipe {
        End::Unread
    } else {
        End::Bad(format!("the output cannot be written: {error}"))
    }
}
