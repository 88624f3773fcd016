//! Cautions for whoever goes to the machine next, and what was put back.

use super::{Section, Subject, one_line, section};
use crate::call::closing;
use crate::call::put_back;
use crate::call::words::{self, Verdict};
use crate::caution::{self, Stands};
use crate::faults::{self, Fault};
use crate::observations::RUNS_ON;
use crate::quantity::retold;
use crate::record::{Answer, PutBack};

/// Chance from which a cause that forbids moving the machine is told.
const STOP_FROM: f64 = 0.2;

/// Every line of the put-back list with its answer.
pub(super) fn put_back(subject: &Subject) -> Option<Section> {
    let (visit, sides) = (subject.visit, subject.sides());
    let lines = put_back::lines(visit)
        .into_iter()
        .map(|(line, checks)| {
            let of: Vec<String> = checks
                .iter()
                .map(|check| put_back::with_sides(check, visit, sides))
                .collect();
            let answer = match visit.put_back.get(line) {
                Some(PutBack::Done) => String::from("seen to be so"),
                Some(PutBack::Struck(why)) if !why.trim().is_empty() => {
                    format!("does not apply, {}", one_line(why))
                }
                _ => String::from("NOT ANSWERED FOR"),
            };
            format!("{line}: {answer} ({})", of.join("; "))
        })
        .collect::<Vec<_>>();
    if lines.is_empty() {
        let is_anything = !visit.readings.is_empty() || !visit.observations.is_empty();
        let words = "Nothing on the list: no check that opens anything was made.";
        return section(
            "put-back",
            "Put back",
            is_anything
                .then(|| String::from(words))
                .into_iter()
                .collect(),
        );
    }
    section("put-back", "Put back", lines)
}

/// Cautions, the gravest first, each once.
pub(super) fn cautions(subject: &Subject) -> Vec<String> {
    let visit = subject.visit;
    let mut out: Vec<String> = Vec::new();
    let mut say = |words: String| {
        if !words.is_empty() && !out.contains(&words) {
            out.push(words);
        }
    };
    let stands =
        |place: Stands| caution::at(place).map(|c| retold(c.text, subject.prefs).into_owned());
    let open = put_back::open(visit);
    if open > 0 {
        say(format!(
            "Not to be put to work: {open} of {} lines of the put-back list are not answered for.",
            put_back::lines(visit).len()
        ));
    }
    if matches!(
        visit.observations.get(RUNS_ON),
        Some(Answer::Seen | Answer::OperatorSays)
    ) && visit.closed.is_none()
    {
        stands(Stands::KeepsGoing).for_each(&mut say);
    }
    let suspects = suspects(subject);
    for (fault, chance) in &suspects {
        if fault.stop_work && visit.closed.is_none() {
            say(format!(
                "Stop work until it is ruled out: {} ({chance}). Engine off, chock both ways; do not drive or test it before.",
                fault.title
            ));
        }
    }
    for (fault, _) in &suspects {
        if let Some(place) = caution::of_cause(fault.id) {
            stands(place).for_each(&mut say);
        }
        say(fault.caution.to_owned());
        if fault.needs_manual {
            say(String::from(
                "Settings and repair of this part only as the unit's manual says.",
            ));
        }
    }
    let no_charge = visit.readings.iter().any(|reading| {
        let seen = reading.seen.as_ref();
        seen.is_some_and(|seen| caution::charge_is_dead(reading.port, seen))
    });
    if no_charge && visit.closed.is_none() {
        stands(Stands::NoBraking).for_each(&mut say);
    }
    stands(Stands::Call).for_each(&mut say);
    out
}

/// What the next one has to reckon with: the causes found, or those that lead, with their chance.
fn suspects(subject: &Subject) -> Vec<(&'static Fault, String)> {
    if let Some(closing) = &subject.visit.closed {
        let causes = [closing.cause.as_str(), closing.also.as_str()];
        return causes
            .into_iter()
            .filter_map(closing::cause)
            .map(|fault| (fault, String::from("found")))
            .collect();
    }
    let assessment = subject.assessment;
    if words::verdict(assessment) == Verdict::TooLittle {
        return Vec::new();
    }
    let likely = assessment
        .causes
        .iter()
        .filter(|c| c.probability >= STOP_FROM);
    likely
        .flat_map(|cause| {
            let chance = words::chance(cause.probability, &assessment.trust);
            let faults = cause.ids.iter().filter_map(|id| faults::find(*id));
            faults.map(move |fault| (fault, chance.clone()))
        })
        .collect()
}
