//! The bench sheet of a call: what it was judged to be, what it came to, and what was not tested; its points for the table.

use super::{Section, Subject, moment, one_line, section, typed};
use crate::bench::stand::acceptance::Scope;
use crate::bench::stand::analysis::Quantity;
use crate::bench::stand::fit::{Fit, NoFit};
use crate::bench::stand::judge::Decision;
use crate::bench::stand::report::Judged;
use crate::bench::stand::sheet::{Meter, Of, TextId};
use crate::bench::stand::{BenchReport, BenchSheet, Channel, flaw, paper, report};
use crate::quantity::{Measure, Unit};
use std::collections::BTreeSet;

/// Most points that are told one by one; of more only the ends are.
const POINTS: usize = 12;

/// The sheet, where something was entered.
fn sheet<'a>(subject: &Subject<'a>) -> Option<&'a BenchSheet> {
    subject
        .visit
        .bench
        .as_ref()
        .filter(|sheet| !sheet.is_blank())
}

/// True where the call has a bench sheet.
pub(super) fn is_there(subject: &Subject) -> bool {
    sheet(subject).is_some()
}

/// The section.
pub(super) fn told(subject: &Subject) -> Option<Section> {
    let sheet = sheet(subject)?;
    let report = report(sheet, Some(subject.unit));
    let mut lines = vec![identity(sheet), verdict(&report)];
    lines.extend(judged(&report, subject));
    lines.extend(flaw::told(&report.left_out, sheet.subject));
    lines.extend(figures(&report, subject));
    lines.extend(losses(&report, subject));
    lines.extend(not_tested(&report));
    lines.extend(instruments(sheet));
    if let Some(note) = sheet.texts.get(&TextId::Note) {
        lines.extend(typed(note).map(|note| format!("Note: {note}")));
    }
    if let Some(when) = &sheet.taken_over {
        lines.push(format!(
            "Taken into the unit’s profile as measured on {}",
            moment(when)
        ));
    }
    // A page shows each line once.
    let mut met = BTreeSet::new();
    lines.retain(|line| met.insert(line.clone()));
    section("bench", "Bench sheet", lines)
}

fn identity(sheet: &BenchSheet) -> String {
    let mut parts = vec![sheet.subject.words().to_owned()];
    parts.extend(sheet.path.map(|path| path.words().to_lowercase()));
    for id in TextId::ALL.into_iter().filter(|id| *id != TextId::Note) {
        let text = sheet
            .texts
            .get(&id)
            .map_or_else(String::new, |t| one_line(t));
        if !text.is_empty() {
            parts.push(format!(
                "{}: {text}",
                crate::assessment::lower_first(id.words())
            ));
        }
    }
    parts.join("; ")
}

fn verdict(report: &BenchReport) -> String {
    let words = match report.verdict() {
        None => "nothing was judged",
        Some(Decision::Pass) => "passes in what was tested",
        Some(Decision::Fail) => "fails",
        Some(Decision::CannotTell) => "cannot tell",
    };
    format!(
        "Verdict: {words}. Guard band of the expanded uncertainty, coverage factor 2 (JCGM 106)"
    )
}

/// What fails and what cannot be told, each in a line; what passes in one.
fn judged(report: &BenchReport, subject: &Subject) -> Vec<String> {
    let of = |wanted: Decision| report.judged.iter().filter(move |j| j.decision == wanted);
    let line = |judged: &Judged| one_line(&paper::judged_words(judged, subject.prefs));
    let mut lines: Vec<String> = of(Decision::Fail)
        .map(|judged| format!("Fails: {}", line(judged)))
        .collect();
    lines.extend(of(Decision::CannotTell).map(|judged| format!("Cannot tell: {}", line(judged))));
    let passed: Vec<String> = of(Decision::Pass).map(line).collect();
    if !passed.is_empty() {
        lines.push(format!("Pass: {}", passed.join("; ")));
    }
    lines
}

fn figures(report: &BenchReport, subject: &Subject) -> Vec<String> {
    let prefs = subject.prefs;
    let mut lines = Vec::new();
    if let Some(derived) = report.evaluated.derived {
        let words = paper::in_unit(
            derived.value,
            derived.expanded(),
            Unit::CubicCentimetrePerRevolution,
            prefs,
        );
        lines.push(format!("Derived displacement (after ISO 8426): {words}"));
    }
    let counted = |at: usize| report.points[at].left_out.is_empty();
    let shown = [
        Quantity::Volumetric,
        Quantity::HydroMechanical,
        Quantity::Overall,
        Quantity::CaseLeakage,
    ];
    let one = |at: usize, quantity: Quantity| {
        let figure = report.evaluated.points[at].get(&quantity)?;
        Some(paper::quantity_text(quantity, *figure, prefs))
    };
    let places: Vec<usize> = (0..report.points.len()).filter(|at| counted(*at)).collect();
    if places.len() <= POINTS {
        lines.extend(places.iter().filter_map(|at| {
            let parts: Vec<String> = shown
                .into_iter()
                .filter_map(|quantity| {
                    let name = crate::assessment::lower_first(paper::quantity_words(quantity).0);
                    Some(format!("{name} {}", one(*at, quantity)?))
                })
                .collect();
            (!parts.is_empty())
                .then(|| format!("{}: {}", place(report, *at, subject), parts.join(", ")))
        }));
        return lines;
    }
    for quantity in shown {
        let value = |at: &usize| report.evaluated.points[*at].get(&quantity).map(|f| f.value);
        let carried = || places.iter().copied().filter(|at| value(at).is_some());
        let order =
            |a: &usize, b: &usize| value(a).unwrap_or(0.0).total_cmp(&value(b).unwrap_or(0.0));
        let (Some(low), Some(high)) = (carried().min_by(order), carried().max_by(order)) else {
            continue;
        };
        let tell = |at: usize| {
            let figure = one(at, quantity).unwrap_or_default();
            format!(
                "{figure} ({})",
                crate::assessment::lower_first(&place(report, at, subject))
            )
        };
        lines.push(format!(
            "{}: {} to {} over {} points",
            paper::quantity_words(quantity).0,
            tell(low),
            tell(high),
            carried().count()
        ));
    }
    lines
}

/// "Point 3, 1500 rpm, 220 bar".
fn place(report: &BenchReport, at: usize, subject: &Subject) -> String {
    let point = &report.points[at];
    let speed = point.means.get(Channel::Speed);
    let state = [
        speed.map(|n| format!("{n:.0} rpm")),
        point
            .means
            .difference()
            .map(|dp| paper::plain(dp, Unit::Bar, subject.prefs)),
    ];
    let mut parts = vec![format!("Point {}", one_line(&point.name))];
    parts.extend(state.into_iter().flatten());
    parts.join(", ")
}

fn losses(report: &BenchReport, subject: &Subject) -> Vec<String> {
    if report.points.is_empty() {
        return Vec::new();
    }
    let one = |name: &str, fit: &Result<Fit, NoFit>| match fit {
        Ok(fit) => {
            let terms: Vec<String> = fit
                .losses
                .iter()
                .filter_map(|loss| {
                    let (value, u) = fit.get(*loss)?;
                    let words = crate::assessment::lower_first(loss.words());
                    let figure =
                        paper::coefficient(value, 2.0 * u, loss.unit(), subject.prefs.mark());
                    Some(format!("{words} {figure}"))
                })
                .collect();
            format!("{name}, at 27.5 mPa·s: {}", terms.join(", "))
        }
        Err(why) => format!("{name}: no fit, {why}"),
    };
    let mut lines = vec![
        one("Losses of flow", &report.losses.flow),
        one("Losses of torque", &report.losses.torque),
        one("Case flow", &report.losses.case),
    ];
    // One reason for all three is told once.
    if let (Err(flow), Err(torque), Err(case)) = (
        &report.losses.flow,
        &report.losses.torque,
        &report.losses.case,
    ) && flow == torque
        && torque == case
    {
        lines = vec![format!("No loss fit: {flow}")];
    }
    lines
}

fn not_tested(report: &BenchReport) -> Option<String> {
    let words: Vec<String> = report
        .not_tested
        .iter()
        .map(|(what, why)| match why {
            Some(why) => format!(
                "{} ({})",
                crate::assessment::lower_first(what),
                one_line(why)
            ),
            None => crate::assessment::lower_first(what),
        })
        .collect();
    (!words.is_empty()).then(|| format!("Not tested: {}", words.join("; ")))
}

fn instruments(sheet: &BenchSheet) -> Vec<String> {
    let columns = sheet.table_columns();
    let read = |channel: &Channel| {
        let holds = |row: &crate::bench::stand::Row| row.value(*channel).is_some();
        sheet.rows.iter().any(holds)
    };
    let used: Vec<Channel> = columns.into_iter().filter(read).collect();
    let mut lines = vec![format!(
        "Stand: measuring class {:?} (limits after ISO 4409, from memory)",
        sheet.class
    )];
    let mut undated = Vec::new();
    for channel in used {
        let name = channel.words(sheet.subject);
        let meter = sheet.meters.get(&channel);
        let words = meter.map_or_else(String::new, meter_words);
        if meter.is_none_or(|meter| meter.calibrated.trim().is_empty()) {
            undated.push(crate::assessment::lower_first(name));
        }
        if !words.is_empty() {
            lines.push(format!(
                "Instrument, {}: {words}",
                crate::assessment::lower_first(name)
            ));
        }
    }
    if !undated.is_empty() {
        lines.push(format!(
            "No calibration date is noted for: {}",
            undated.join(", ")
        ));
    }
    lines
}

fn meter_words(meter: &Meter) -> String {
    let limit = one_line(&meter.limit.typed);
    let mut parts = Vec::new();
    match meter.of {
        Of::Reading if meter.limit.value.is_some() => {
            parts.push(format!("± {limit} % of the reading"))
        }
        Of::Span if meter.limit.value.is_some() => parts.push(format!("± {limit} % of the span")),
        _ => {}
    }
    let mark = one_line(&meter.mark);
    if !mark.is_empty() {
        parts.push(mark);
    }
    let calibrated = one_line(&meter.calibrated);
    if !calibrated.is_empty() {
        parts.push(format!("calibrated {calibrated}"));
    }
    parts.join(", ")
}

/// One figure of a point, for the table.
pub(super) struct Cell {
    /// "Bench, point 3: flow".
    pub name: String,
    /// Left or right, where it is said.
    pub side: &'static str,
    /// Oil at the inlet, °C.
    pub oil: Option<f64>,
    /// Read, with how many readings, or computed.
    pub seen: String,
    /// Unit of the figures.
    pub unit: Unit,
    /// Figure and limits of the manual, in that unit.
    pub figures: [Option<f64>; 4],
    /// What a limit came to, or that the point is left out.
    pub standing: String,
    /// Where a limit is from.
    pub from: String,
    /// Instrument of what was read.
    pub instrument: String,
    /// Expanded uncertainty of what was computed, and why the point is left out.
    pub note: String,
}

/// Everything read and computed at the points of the call's sheet.
pub(super) fn cells(subject: &Subject) -> Vec<Cell> {
    let Some(sheet) = sheet(subject) else {
        return Vec::new();
    };
    let report = report(sheet, Some(subject.unit));
    let mut cells = Vec::new();
    for (at, point) in report.points.iter().enumerate() {
        let name = |what: &str| {
            let what = crate::assessment::lower_first(what);
            format!("Bench, point {}: {what}", one_line(&point.name))
        };
        let why: Vec<String> = report
            .left_out
            .iter()
            .filter(|one| one.at == at)
            .map(|one| format!("left out: {}", one.flaw.words(sheet.subject)))
            .collect();
        let standing = if why.is_empty() { "" } else { "left out" };
        let plain = |what: &str, unit: Unit, value: Option<f64>| Cell {
            name: name(what),
            side: sheet.path.map_or("", |path| path.words()),
            oil: point.means.get(Channel::Inlet),
            seen: String::from("computed"),
            unit,
            figures: [value, None, None, None],
            standing: standing.to_owned(),
            from: String::new(),
            instrument: String::new(),
            note: why.join("; "),
        };
        let convert = |value: f64, base: Unit, unit: Unit| {
            Measure::new(value, base)
                .ok()
                .and_then(|m| m.try_in_unit(unit).ok())
        };
        for (channel, value) in point.means.channels() {
            let (base, ..) = channel.asks();
            let unit = paper::shown(subject.prefs, base);
            let meter = sheet.meters.get(&channel);
            let count = point.rows.len();
            cells.push(Cell {
                seen: if count == 1 {
                    String::from("read once")
                } else {
                    format!("mean of {count} readings")
                },
                instrument: meter.map_or_else(String::new, meter_words),
                ..plain(
                    channel.words(sheet.subject),
                    unit,
                    convert(value, base, unit),
                )
            });
        }
        for (quantity, figure) in &report.evaluated.points[at] {
            let (words, base, factor) = paper::quantity_words(*quantity);
            let unit = paper::shown(subject.prefs, base);
            let value = convert(figure.value * factor, base, unit);
            let mut cell = plain(words, unit, value);
            let doubt = paper::quantity_text(*quantity, *figure, subject.prefs);
            let mut note = vec![format!("{doubt} (k = 2)")];
            note.extend(why.clone());
            cell.note = note.join("; ");
            if let Some(judged) = limit_at(sheet, &report, &point.name, *quantity) {
                let limits = judged.limits.as_ref();
                let end = |value: Option<f64>| convert(value? * factor, base, unit);
                cell.figures[2] = end(limits.and_then(|limits| limits.low));
                cell.figures[3] = end(limits.and_then(|limits| limits.high));
                cell.standing = judged.decision.words().to_owned();
                cell.from = limits.map_or_else(String::new, |limits| one_line(&limits.from));
            }
            cells.push(cell);
        }
    }
    cells
}

/// What the first limit of a quantity at a point came to.
fn limit_at<'a>(
    sheet: &BenchSheet,
    report: &'a BenchReport,
    point: &str,
    quantity: Quantity,
) -> Option<&'a Judged> {
    let limits = sheet.acceptance.iter().zip(&report.accepted);
    limits
        .filter(|(limit, _)| {
            limit.scope == Scope::Point
                && limit.point.trim() == point
                && limit.of.quantity() == quantity
        })
        .find_map(|(_, found)| found.judged.as_ref().ok())
}
