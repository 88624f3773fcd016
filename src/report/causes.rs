//! The finding in one line, and the causes with their chance and their reasons.

use super::Subject;
use crate::assessment::{Cause, Evidence, lower_first};
use crate::call::closing;
use crate::call::words::{self, Verdict};

/// Most causes that a page names.
const MOST: usize = 4;
/// Least chance that is worth a line.
const LEAST: f64 = 0.01;
/// Most reasons for a cause, and against it.
const REASONS: (usize, usize) = (4, 2);
/// Least weight (natural log) of a reason that is named.
const LEAST_WEIGHT: f64 = 0.1;

/// How sure the finding is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sure {
    /// Closed, and proved on the machine.
    Proved,
    /// Closed with a cause that was not proved.
    NotProved,
    /// Closed without a cause.
    NoCause,
    /// Open: a cause leads.
    Leads,
    /// Open: an order of causes, but uncertain.
    Uncertain,
    /// Open: too little taken to tell.
    TooLittle,
}

/// What it was, or what leads.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Finding {
    /// How sure.
    pub sure: Sure,
    /// In words.
    pub words: String,
}

/// A cause as the report tells it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Told {
    /// Title.
    pub title: String,
    /// Chance, in words.
    pub chance: String,
    /// Reasons for it, heaviest first.
    pub reasons_for: Vec<String>,
    /// Reasons against it, heaviest first.
    pub reasons_against: Vec<String>,
    /// For a row that no reading taken can split: what would.
    pub split: String,
}

pub(super) fn finding(subject: &Subject) -> Finding {
    if let Some(closing) = &subject.visit.closed {
        return match closing::found(closing) {
            None => Finding {
                sure: Sure::NoCause,
                words: String::from("Closed without a cause found."),
            },
            Some(found) if closing::is_proved(closing) => Finding {
                sure: Sure::Proved,
                words: format!("Found and proved: {found}."),
            },
            Some(found) => Finding {
                sure: Sure::NotProved,
                words: format!("Taken to be, not proved: {found}."),
            },
        };
    }
    let assessment = subject.assessment;
    let lead = assessment.causes.first().map(|cause| {
        let chance = words::chance(cause.probability, &assessment.trust);
        format!("{}, {chance}", words::cause_title(cause))
    });
    match (words::verdict(assessment), lead) {
        (Verdict::SoFar, Some(lead)) => Finding {
            sure: Sure::Leads,
            words: format!("Still open. Leads so far, not proved: {lead}."),
        },
        (Verdict::Uncertain, Some(lead)) => Finding {
            sure: Sure::Uncertain,
            words: format!("Still open and uncertain. First of several: {lead}."),
        },
        _ => Finding {
            sure: Sure::TooLittle,
            words: String::from("Still open. Too little was taken to tell a cause."),
        },
    }
}

pub(super) fn told(subject: &Subject) -> Vec<Told> {
    let assessment = subject.assessment;
    if words::verdict(assessment) == Verdict::TooLittle {
        return Vec::new();
    }
    let worth = |cause: &&Cause| cause.probability >= LEAST;
    assessment
        .causes
        .iter()
        .filter(worth)
        .take(MOST)
        .map(|cause| Told {
            title: words::cause_title(cause),
            chance: words::chance(cause.probability, &assessment.trust),
            reasons_for: reasons(subject, cause, |weight| weight >= LEAST_WEIGHT, REASONS.0),
            reasons_against: reasons(subject, cause, |weight| weight <= -LEAST_WEIGHT, REASONS.1),
            split: cause.split.clone(),
        })
        .collect()
}

fn reasons(
    subject: &Subject,
    cause: &Cause,
    counts: impl Fn(f64) -> bool,
    most: usize,
) -> Vec<String> {
    let one = |evidence: &&Evidence| counts(evidence.weight);
    cause
        .evidence
        .iter()
        .filter(one)
        .take(most)
        .map(|evidence| {
            format!(
                "{} ({})",
                of(subject, evidence),
                words::weight(evidence.weight).1
            )
        })
        .collect()
}

/// What a piece of evidence is: a reading by its name and number, anything else in its own words.
fn of(subject: &Subject, evidence: &Evidence) -> String {
    let readings = &subject.visit.readings;
    match readings
        .iter()
        .position(|reading| reading.id == evidence.of)
    {
        Some(at) => readings.get(at).map_or_else(String::new, |reading| {
            format!(
                "no. {}, {} {}",
                at + 1,
                lower_first(&subject.sides().name(reading)),
                super::groups::read(subject, reading)
            )
        }),
        None => evidence.words.clone(),
    }
}
