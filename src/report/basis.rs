//! What the report rests on: the profile, the versions and the assumptions, and how to make it again.

use super::{Fact, Subject, moment, one_line};
use crate::quantity::Kind;
use crate::record::{SCHEMA, checksum};
use crate::unit::{Control, FIGURES, Filter, Source, Tick};

/// Chance of a wrong gauge or port from which it is told.
const DOUBT: f64 = 0.05;
/// Change of a chance in the last refinement above which it is told.
const UNSETTLED: f64 = 0.02;

/// Checksum over everything that the report is made from: unit, call, the instruments used, units of measure.
#[must_use]
pub fn record_sum(subject: &Subject) -> String {
    let mut export = subject.export();
    export.made_at.clear();
    export.program.clear();
    export
        .text()
        .map_or_else(|_| String::new(), |text| checksum(&text))
}

/// What is known of the unit, in one line each: build, and figures with their source.
pub(super) fn profile(subject: &Subject) -> Vec<Fact> {
    let mut facts = Vec::new();
    let build = build(subject);
    if !build.is_empty() {
        facts.push(Fact {
            name: "Build",
            words: build.join(", "),
        });
    }
    let figures = figures(subject);
    if !figures.is_empty() {
        facts.push(Fact {
            name: "Figures",
            words: figures.join("; "),
        });
    }
    facts
}

fn build(subject: &Subject) -> Vec<String> {
    let ticks = &subject.unit.ticks;
    let mut build = Vec::new();
    if !ticks.paths.is_one() {
        build.push(crate::assessment::lower_first(ticks.paths.words()));
    }
    if ticks.control != Control::Unknown {
        build.push(format!(
            "control: {}",
            crate::assessment::lower_first(ticks.control.words())
        ));
    }
    for (tick, yes, no) in [
        (ticks.flushing, "loop flushing", "no loop flushing"),
        (ticks.limiter, "pressure limiter", "no pressure limiter"),
        (ticks.two_speed, "two-speed motor", "one-speed motor"),
    ] {
        match tick {
            Tick::Yes => build.push(yes.to_owned()),
            Tick::No => build.push(no.to_owned()),
            Tick::Unknown => {}
        }
    }
    match ticks.filter {
        Filter::Suction => build.push(String::from("suction filter")),
        Filter::PressureGaugeBefore => {
            build.push(String::from("charge gauge before the filter"));
        }
        Filter::PressureGaugeAfter => build.push(String::from("charge gauge after the filter")),
        Filter::Unknown => {}
    }
    build
}

fn figures(subject: &Subject) -> Vec<String> {
    let figures = FIGURES.iter().filter_map(|ask| {
        let figure = subject.unit.figures.get(&ask.id)?;
        let value = figure.value?;
        let value = match ask.kind {
            // A ratio of gears is no per cent.
            Kind::Ratio => format!("{}", (value.base() * 1000.0).round() / 1000.0),
            _ => subject.prefs.print(value),
        };
        let words = crate::assessment::lower_first(ask.words);
        let source = match figure.source {
            Source::Practice => "common practice or a guess",
            other => other.words(),
        };
        Some(format!("{words} {value} ({source})"))
    });
    figures.collect()
}

/// Versions, assumptions, how to make the report again.
pub(super) fn lines(subject: &Subject) -> Vec<String> {
    let assessment = subject.assessment;
    let known = FIGURES
        .iter()
        .filter(|ask| subject.unit.known(ask.id).is_some())
        .count();
    let mut lines = vec![
        String::from(
            "Expected windows: where 95 of 100 healthy machines of this profile would read in the same condition, from the \
             unit's manual where it gives one. “±” is the instrument's standard uncertainty.",
        ),
        String::from(
            "Chances weigh everything that was read and seen against common-practice base rates. A ranking is no proof: prove a \
             cause on the machine before parts are ordered.",
        ),
    ];
    if known < FIGURES.len() {
        lines.push(format!(
            "Taken from common practice for the class, with its width: {} of {} figures.",
            FIGURES.len() - known,
            FIGURES.len()
        ));
    }
    lines.extend(assessment.notes.iter().map(|note| one_line(note)));
    let trust = &assessment.trust;
    if trust.wrong_reading >= DOUBT {
        lines.push(format!(
            "Chance that a gauge or port was wrong: {}.",
            crate::call::words::percent(trust.wrong_reading)
        ));
    }
    if trust.change > UNSETTLED {
        lines.push(format!(
            "Chances are good to about ±{} (last refinement).",
            crate::call::words::percent(trust.change)
        ));
    }
    lines.push(format!(
        "Lowside {}, record format {SCHEMA}, {}. Record {}. The call's export file gives this report again: \
         assess --report < file.json",
        env!("CARGO_PKG_VERSION"),
        moment(subject.made_at),
        record_sum(subject)
    ));
    lines
}
