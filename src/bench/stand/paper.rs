//! The sheet as text and as a table for a spreadsheet.

use super::analysis::Quantity;
use super::channel::Channel;
use super::flaw::told;
use super::items::{Entry, of};
use super::report::{BenchReport, Judged, Span};
use super::sheet::{BenchSheet, Head, TextId};
use super::uncertain::Uncertain;
use crate::quantity::{DecimalMark, Decimals, Measure, Unit, UnitPrefs, format_with_unit};
use crate::report::csv;
use core::fmt::Write;

const CAUTION: &str = "The unit’s manual, local rules and licensed practice come first. Limits marked common practice are no substitute for the maker’s.";

/// A figure with its expanded uncertainty and its unit, to as many decimals as two digits of the doubt need, four at most.
#[must_use]
pub fn number(value: f64, expanded: f64, unit: &str, mark: DecimalMark) -> String {
    let digits = (1.0 - crate::math::log10(expanded.max(1e-4))).ceil();
    let places = digits.clamp(0.0, 4.0) as usize;
    let text = format!("{value:.places$} ± {expanded:.places$} {unit}").replace('-', "−");
    let text = text.trim_end();
    match mark {
        DecimalMark::Comma => text.replace('.', ","),
        DecimalMark::Point => text.to_owned(),
    }
}

/// The unit in which the shop wants a figure.
#[must_use]
pub fn shown(prefs: &UnitPrefs, unit: Unit) -> Unit {
    match unit {
        // A count of seconds, a share and a shaft's rpm read alike everywhere.
        Unit::Percent | Unit::Second | Unit::Fraction | Unit::RevolutionPerMinute => unit,
        other => prefs.unit(other.kind()),
    }
}

/// A figure in a base unit, with its expanded uncertainty, in the unit the shop wants.
#[must_use]
pub fn in_unit(value: f64, expanded: f64, base: Unit, prefs: &UnitPrefs) -> String {
    let unit = shown(prefs, base);
    let of = |value: f64| {
        Measure::new(value, base)
            .ok()
            .and_then(|m| m.try_in_unit(unit).ok())
    };
    match (of(value), of(value + expanded)) {
        (Some(here), Some(there)) => {
            number(here, (there - here).abs(), unit.symbol(), prefs.mark())
        }
        _ => "not to be told".to_owned(),
    }
}

/// A figure alone in the unit the shop wants.
#[must_use]
pub fn plain(value: f64, base: Unit, prefs: &UnitPrefs) -> String {
    Measure::new(value, base).map_or_else(
        |_| "not to be told".to_owned(),
        |m| format_with_unit(m, shown(prefs, base), Decimals::Reading, prefs.mark()),
    )
}

fn with_doubt(figure: Uncertain, factor: f64, unit: &str, mark: DecimalMark) -> String {
    number(
        figure.value * factor,
        figure.expanded() * factor,
        unit,
        mark,
    )
}

/// The sheet in plain words, as it is printed or sent.
#[must_use]
pub fn text(sheet: &BenchSheet, report: &BenchReport, unit: &str, prefs: &UnitPrefs) -> String {
    let mut out = String::new();
    let mut line = |text: String| {
        out.push_str(text.trim_end());
        out.push('\n');
    };
    line(format!(
        "BENCH SHEET: {}, {}",
        unit,
        sheet.subject.words().to_lowercase()
    ));
    for id in TextId::ALL {
        if let Some(text) = sheet.texts.get(&id).filter(|text| !text.trim().is_empty()) {
            line(format!("{}: {}", id.words(), text.trim()));
        }
    }
    for head in Head::ALL {
        if let Some(value) = sheet.head.get(&head).and_then(|typed| typed.value) {
            let (asked, ..) = head.asks();
            let shown = match asked {
                Unit::Percent | Unit::Fraction => asked,
                other => prefs.unit(other.kind()),
            };
            let text = format_with_unit(value, shown, Decimals::Reading, prefs.mark());
            line(format!("{}: {text}", head.words()));
        }
    }
    let gaps = sheet.layout.open(sheet.subject);
    line(String::new());
    line(match report.verdict() {
        None => "VERDICT: nothing was judged".to_owned(),
        Some(decision) => format!("VERDICT: {}", decision.words()),
    });
    for judged in &report.judged {
        line(format!(
            "- {}: {}",
            judged.decision.words().to_uppercase(),
            judged_words(judged, prefs)
        ));
    }
    for words in told(&report.left_out, sheet.subject) {
        line(format!("- {words}"));
    }
    line(
        "Decision rule: guard band of the expanded uncertainty, coverage factor 2 (JCGM 106)."
            .to_owned(),
    );
    line(String::new());
    if let Some(derived) = report.evaluated.derived {
        line(format!(
            "Derived displacement: {}",
            with_doubt(derived, 1.0, "cm³/rev", prefs.mark())
        ));
    }
    for (at, point) in report.points.iter().enumerate() {
        let figures = &report.evaluated.points[at];
        let share = |quantity: Quantity, words: &str| {
            let figure = figures.get(&quantity)?;
            Some(format!(
                "{words} {}",
                with_doubt(*figure, 100.0, "%", prefs.mark())
            ))
        };
        let parts: Vec<String> = [
            share(Quantity::Volumetric, "volumetric"),
            share(Quantity::HydroMechanical, "hydro-mechanical"),
            share(Quantity::Overall, "overall"),
        ]
        .into_iter()
        .flatten()
        .collect();
        if !parts.is_empty() {
            let out = if point.left_out.is_empty() {
                ""
            } else {
                " (left out)"
            };
            line(format!("Point {}{out}: {}", point.name, parts.join(", ")));
        }
    }
    if !gaps.is_empty() {
        let words: Vec<String> = gaps.iter().map(ToString::to_string).collect();
        line(format!("No loss fit: {}.", words.join("; ")));
    }
    line(String::new());
    line("NOT TESTED".to_owned());
    if report.not_tested.is_empty() {
        line("- nothing was left out".to_owned());
    }
    for (what, why) in &report.not_tested {
        line(match why {
            Some(why) => format!("- {what}: {why}"),
            None => format!("- {what}"),
        });
    }
    line(String::new());
    line(format!(
        "Computed by Lowside {}; efficiencies by ISO 4391, uncertainty by JCGM 100, measuring class {:?} (limits after ISO 4409, from memory).",
        env!("CARGO_PKG_VERSION"),
        sheet.class
    ));
    line(CAUTION.to_owned());
    out
}

/// Where on a curve something was judged: "100 to 300 bar at 2000 rpm, decided at 250 bar".
#[must_use]
pub fn span_words(span: &Span, prefs: &UnitPrefs) -> String {
    let bar = |value: f64| plain(value, Unit::Bar, prefs);
    let speed = span
        .speed
        .map_or_else(|| "at any speed".to_owned(), |n| format!("at {n:.0} rpm"));
    let at = span
        .at
        .map_or_else(String::new, |at| format!(", decided at {}", bar(at)));
    format!("{} to {} {speed}{at}", bar(span.from), bar(span.to))
}

/// The figure of what was judged, with its doubt.
#[must_use]
pub fn figure_words(judged: &Judged, prefs: &UnitPrefs) -> Option<String> {
    let figure = judged.figure?;
    Some(if judged.unit == Unit::Percent {
        with_doubt(figure, 100.0, "%", prefs.mark())
    } else {
        let base = judged.unit.kind().base_unit();
        in_unit(figure.value, figure.expanded(), base, prefs)
    })
}

/// What is allowed and who says so: "allowed 84 % and more (common practice)".
#[must_use]
pub fn limits_words(judged: &Judged, prefs: &UnitPrefs) -> Option<String> {
    let limits = judged.limits.as_ref()?;
    let one = |value: f64| {
        if judged.unit == Unit::Percent {
            plain(value * 100.0, Unit::Percent, prefs)
        } else {
            plain(value, judged.unit.kind().base_unit(), prefs)
        }
    };
    let span = match (limits.low, limits.high) {
        (Some(low), Some(high)) => format!("{} to {}", one(low), one(high)),
        (Some(low), None) => format!("{} and more", one(low)),
        (None, Some(high)) => format!("{} and less", one(high)),
        (None, None) => return None,
    };
    Some(format!("allowed {span} ({})", limits.from))
}

/// What was judged, with the place on its curve.
#[must_use]
pub fn what_words(judged: &Judged, prefs: &UnitPrefs) -> String {
    match &judged.span {
        Some(span) => format!("{}, {}", judged.words, span_words(span, prefs)),
        None => judged.words.clone(),
    }
}

/// What was judged in one line, without the decision.
#[must_use]
pub fn judged_words(judged: &Judged, prefs: &UnitPrefs) -> String {
    let figure = figure_words(judged, prefs).map(|figure| format!(": {figure}"));
    let limits = limits_words(judged, prefs).map(|limits| format!(", {limits}"));
    let why = (!judged.why.is_empty()).then(|| format!(" [{}]", judged.why));
    [Some(what_words(judged, prefs)), figure, limits, why]
        .into_iter()
        .flatten()
        .collect()
}

/// A cell that a spreadsheet takes as a figure or as text, and never as a formula.
fn cell(text: &str) -> String {
    if text.parse::<f64>().is_ok() {
        csv::quoted(text.to_owned())
    } else {
        csv::quoted(csv::text(text))
    }
}

/// Readings and results as CSV (RFC 4180, decimal points, units in the heads); the readings can be pasted back.
#[must_use]
pub fn table(sheet: &BenchSheet, report: &BenchReport, prefs: &UnitPrefs) -> String {
    let columns = sheet.table_columns();
    let unit = |channel: Channel| {
        let (own, ..) = channel.asks();
        if own == Unit::RevolutionPerMinute {
            own
        } else {
            prefs.unit(own.kind())
        }
    };
    let mut out = String::from("Point");
    for channel in &columns {
        let head = format!(
            "{} ({})",
            channel.words(sheet.subject),
            unit(*channel).symbol()
        );
        let _ = write!(out, ",{}", cell(&head));
    }
    out.push_str("\r\n");
    for row in &sheet.rows {
        out.push_str(&cell(&row.name));
        for channel in &columns {
            let value = row.cells.get(channel).and_then(|typed| {
                typed
                    .value
                    .and_then(|m: Measure| m.try_in_unit(unit(*channel)).ok())
            });
            let text = row
                .cells
                .get(channel)
                .map_or("", |typed| typed.typed.as_str());
            let _ = match value {
                Some(value) => write!(out, ",{}", significant(value)),
                None => write!(out, ",{}", cell(text)),
            };
        }
        out.push_str("\r\n");
    }
    out.push_str("\r\nResult of point,Quantity,Unit,Value,Expanded uncertainty (k = 2)\r\n");
    for (at, point) in report.points.iter().enumerate() {
        for (quantity, figure) in &report.evaluated.points[at] {
            let (words, unit, factor) = quantity_words(*quantity);
            let symbol = unit.symbol();
            let _ = write!(
                out,
                "{},{words},{symbol},{},{}\r\n",
                cell(&point.name),
                significant(figure.value * factor),
                significant(figure.expanded() * factor)
            );
        }
    }
    out.push_str(
        "\r\nJudged,Where,Unit,Found,Expanded uncertainty (k = 2),Lowest allowed,Highest allowed,Limits from,Decision,Why\r\n",
    );
    for judged in &report.judged {
        let (symbol, factor) = judged.printed();
        let figure =
            |value: Option<f64>| value.map_or_else(String::new, |v| significant(v * factor));
        let limits = judged.limits.as_ref();
        let cells = [
            cell(&judged.words),
            cell(
                &judged
                    .span
                    .map_or_else(String::new, |span| span_words(&span, prefs)),
            ),
            symbol.to_owned(),
            figure(judged.figure.map(|f| f.value)),
            figure(judged.figure.map(|f| f.expanded())),
            figure(limits.and_then(|l| l.low)),
            figure(limits.and_then(|l| l.high)),
            cell(limits.map_or("", |l| l.from.as_str())),
            judged.decision.words().to_owned(),
            cell(&judged.why),
        ];
        out.push_str(&cells.join(","));
        out.push_str("\r\n");
    }
    out.push_str("\r\nItem,Unit,Found,Note\r\n");
    for item in of(sheet.subject) {
        let Some(entry) = sheet.items.get(&item.id) else {
            continue;
        };
        let (symbol, found) = match item.entry {
            Entry::Figure(unit) => (
                unit.symbol(),
                entry
                    .found
                    .value
                    .and_then(|m| m.try_in_unit(unit).ok())
                    .map_or(String::new(), significant),
            ),
            Entry::Tick => (
                "",
                match (entry.is_good, &entry.skipped) {
                    (Some(true), _) => "good".to_owned(),
                    (Some(false), _) => "not good".to_owned(),
                    (None, Some(why)) => format!("not tested: {why}"),
                    (None, None) => String::new(),
                },
            ),
        };
        let _ = write!(
            out,
            "{},{symbol},{},{}\r\n",
            cell(item.words),
            cell(&found),
            cell(&entry.note)
        );
    }
    out
}

/// Six significant digits with a decimal point, without an exponent and without empty zeros.
#[must_use]
pub fn significant(value: f64) -> String {
    if value == 0.0 {
        return "0".to_owned();
    }
    let digits = 5.0 - crate::math::log10(value.abs()).floor();
    let places = digits.clamp(0.0, 9.0) as usize;
    let text = format!("{value:.places$}");
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// Words, base unit and factor of a quantity.
#[must_use]
pub const fn quantity_words(quantity: Quantity) -> (&'static str, Unit, f64) {
    match quantity {
        Quantity::Volumetric => ("Volumetric efficiency", Unit::Percent, 100.0),
        Quantity::HydroMechanical => ("Hydro-mechanical efficiency", Unit::Percent, 100.0),
        Quantity::Overall => ("Overall efficiency", Unit::Percent, 100.0),
        Quantity::FlowLost => ("Flow lost", Unit::LitrePerMinute, 1.0),
        Quantity::CaseLeakage => ("Case leakage", Unit::LitrePerMinute, 1.0),
        Quantity::TorqueLost => ("Torque lost", Unit::NewtonMetre, 1.0),
        Quantity::ShaftPower => ("Shaft power", Unit::Kilowatt, 1.0),
        Quantity::OutPower => ("Oil or output power", Unit::Kilowatt, 1.0),
        Quantity::Flow => ("Flow at the high port", Unit::LitrePerMinute, 1.0),
    }
}

/// A figure of a point with its expanded uncertainty, in the unit the shop wants.
#[must_use]
pub fn quantity_text(quantity: Quantity, figure: Uncertain, prefs: &UnitPrefs) -> String {
    let (_, unit, factor) = quantity_words(quantity);
    in_unit(
        figure.value * factor,
        figure.expanded() * factor,
        unit,
        prefs,
    )
}

/// A coefficient of the loss fit with its expanded uncertainty, with as many decimals as two digits of the doubt need.
#[must_use]
pub fn coefficient(value: f64, expanded: f64, unit: &str, mark: DecimalMark) -> String {
    let (factor, prefix) = if value.abs() >= 0.1 || unit.starts_with("cm³") {
        (1.0, "")
    } else if value.abs() >= 1e-4 {
        (1e3, "thousandths of ")
    } else {
        (1e6, "millionths of ")
    };
    let unit = format!("{prefix}{unit}");
    number(value * factor, expanded * factor, &unit, mark)
}
