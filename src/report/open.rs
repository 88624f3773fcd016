//! What was not checked, and what the next one should bring.

use super::groups::read;
use super::{Section, Subject, section, typed};
use crate::assessment::lower_first;
use crate::call::put_back;
use crate::call::words::{self, Verdict};
use crate::checks;
use crate::readings::{Port, Seen};
use std::collections::BTreeSet;

/// Most checks that are named as left.
const CHECKS: usize = 3;
/// Most checks that are named as held back.
const HELD: usize = 3;

/// Everything that was left open, so that nobody takes it for looked at.
pub(super) fn not_checked(subject: &Subject) -> Option<Section> {
    let mut lines = readings(subject);
    lines.extend(conditions(subject));
    lines.extend(checks_left(subject));
    let assessment = subject.assessment;
    lines.extend(
        assessment
            .withheld
            .iter()
            .map(|words| format!("Withheld: {words}")),
    );
    let split = assessment
        .causes
        .first()
        .filter(|cause| cause.ids.len() > 1 && cause.pair.is_none() && !cause.split.is_empty());
    if let Some(lead) = split.filter(|_| words::verdict(assessment) != Verdict::TooLittle) {
        lines.push(format!(
            "Not told apart: {}. What would: {}",
            lower_first(&lead.title),
            lead.split
        ));
    }
    section("not-checked", "Not checked", lines)
}

fn readings(subject: &Subject) -> Vec<String> {
    let numbered = subject.visit.readings.iter().enumerate();
    numbered
        .filter(|(_, reading)| matches!(reading.seen, None | Some(Seen::NotPossible { .. })))
        .map(|(at, reading)| {
            format!(
                "No. {}, {}: {}",
                at + 1,
                lower_first(&subject.sides().name(reading)),
                read(subject, reading)
            )
        })
        .collect()
}

/// Oil and instruments that nobody noted.
fn conditions(subject: &Subject) -> Vec<String> {
    let taken = || {
        let readings = subject.visit.readings.iter();
        readings.filter(|r| !matches!(r.seen, None | Some(Seen::NotPossible { .. })))
    };
    let count = taken().count();
    let mut lines = Vec::new();
    if count == 0 {
        lines.push(String::from(if super::bench::is_there(subject) {
            "No reading was taken on the machine, beside the bench sheet"
        } else {
            "No reading was taken"
        }));
        return lines;
    }
    let cold = taken().filter(|r| r.condition.oil.is_none()).count();
    if cold > 0 {
        lines.push(format!(
            "Oil temperature: not taken with {}; the windows are wider for it",
            of_readings(cold, count)
        ));
    }
    let unnamed = taken()
        .filter(|r| super::groups::instrument(subject, r).is_none())
        .count();
    if unnamed > 0 {
        lines.push(format!(
            "Instrument: not named with {}; a usual one is taken",
            of_readings(unnamed, count)
        ));
    }
    lines
}

fn of_readings(some: usize, all: usize) -> String {
    match (some, all) {
        (1, 1) => String::from("the reading"),
        (some, all) if some == all => format!("all {all} readings"),
        (some, all) => format!("{some} of {all} readings"),
    }
}

fn checks_left(subject: &Subject) -> Vec<String> {
    let Some(advice) = &subject.assessment.advice else {
        return Vec::new();
    };
    let made: BTreeSet<&str> = put_back::made(subject.visit).iter().map(|c| c.id).collect();
    let left = advice
        .checks
        .iter()
        .filter(|offer| !made.contains(offer.id.as_str()))
        .take(CHECKS)
        .map(|offer| {
            format!(
                "Check not made: {} (about {})",
                lower_first(&offer.title),
                words::minutes(offer.minutes)
            )
        });
    let held = advice
        .held_back
        .iter()
        .take(HELD)
        .map(|(title, why)| format!("Held back: {}. {why}", lower_first(title)));
    left.chain(held).collect()
}

/// What to bring, as the call has it: instruments and adapters for the next check, and what the repair will take. Nothing where
/// the call is closed.
#[must_use]
pub fn proposals(subject: &Subject) -> Vec<String> {
    let Some(advice) = subject
        .assessment
        .advice
        .as_ref()
        .filter(|_| subject.visit.closed.is_none())
    else {
        return Vec::new();
    };
    let mut lines = Vec::new();
    let next = advice.checks.first().filter(|_| advice.stop.is_none());
    if let Some(offer) = next {
        if let Some(check) = checks::find(&offer.id).filter(|check| check.instruments != "none") {
            lines.push(format!(
                "For the next check ({}): {}",
                lower_first(&offer.title),
                check.instruments
            ));
        }
        let ports: BTreeSet<Port> = offer.foretold.iter().map(|told| told.port).collect();
        for port in ports {
            let adapter = subject
                .unit
                .ports
                .get(&port)
                .map_or("", |note| note.adapter.trim());
            if !adapter.is_empty() {
                lines.push(format!("For {}: {adapter}", lower_first(port.words())));
            }
        }
    }
    if let Some(repair) = &advice.repair {
        lines.push(format!(
            "For the repair, if it proves out ({}): {}",
            words::chance(repair.probability, &subject.assessment.trust),
            repair.repair
        ));
        if !repair.proof.is_empty() {
            lines.push(format!(
                "Prove it before parts are ordered: {}",
                repair.proof
            ));
        }
    }
    lines
}

/// What the person typed, and what the call asks for.
pub(super) fn to_bring(subject: &Subject) -> Option<Section> {
    let mut lines: Vec<String> = typed(&subject.visit.bring).collect();
    lines.extend(proposals(subject));
    section("bring", "To bring", lines)
}
