//! What goes out is what would be taken in again: a figure that the checks would refuse is written as the text that was
//! typed, never dropped. Screens keep such figures out; this is the second lock.

use super::{Visit, check};
use crate::quantity::{DecimalMark, Decimals, Measure, format_with_unit};
use crate::readings::{Condition, EngineSpeed, Lever, Reading, Seen};
use crate::unit::Unit;

/// The unit as an export writes it.
pub(super) fn unit(unit: &Unit) -> Unit {
    let mut unit = unit.clone();
    for (id, figure) in &mut unit.figures {
        if let Some(value) = figure
            .value
            .filter(|value| check::figure(*id, *value).is_err())
        {
            keep(&mut figure.typed, &words(value));
            figure.value = None;
        }
    }
    unit.bench
        .retain(|id, found| check::on_bench(*id, found).is_ok());
    let mut aside = Vec::new();
    for note in unit.ports.values_mut() {
        if let Some(minutes) = note
            .access_minutes
            .filter(|minutes| check::access(*minutes).is_err())
        {
            aside.push(format!("minutes of access to {}: {minutes}", note.place));
            note.access_minutes = None;
        }
    }
    unit.manual.retain(|window| {
        let is_good = check::manual(window).is_ok();
        if !is_good {
            let (low, high) = (words(window.low), words(window.high));
            aside.push(format!(
                "{}: {low} to {high}, {}",
                window.port.words(),
                window.reference
            ));
        }
        is_good
    });
    if check::motors(unit.ticks.motors).is_err() {
        aside.push(format!("motors: {}", unit.ticks.motors));
        unit.ticks.motors = 1;
    }
    note(&mut unit.note, &aside);
    unit
}

/// The visit as an export writes it.
pub(super) fn visit(visit: &Visit) -> Visit {
    let mut visit = visit.clone();
    visit.readings.iter_mut().for_each(reading);
    for reading in &visit.readings {
        let values = visit.earlier.get_mut(&reading.id).into_iter().flatten();
        for value in values {
            // The text says it too.
            value
                .seen
                .take_if(|seen| check::seen(reading.port, seen).is_err());
        }
    }
    visit.bench.iter_mut().for_each(super::bench::mend);
    visit.tracking.iter_mut().for_each(super::tracking::mend);
    visit.yard.iter_mut().for_each(super::yard::mend);
    super::yard::mend_hours(&mut visit.hours);
    super::jug::mend(&mut visit);
    visit
}

fn reading(reading: &mut Reading) {
    let mut aside = condition(&mut reading.condition);
    if let Some(Seen::ShareOf { other, .. }) = &mut reading.seen {
        aside.extend(condition(other));
    }
    note(&mut reading.note, &aside);
    let Some(seen) = reading
        .seen
        .take_if(|seen| check::seen(reading.port, seen).is_err())
    else {
        return;
    };
    keep(
        &mut reading.typed,
        &match seen {
            Seen::Value { value } | Seen::OffScale { top: value } => words(value),
            Seen::Swing { low, high } => format!("{} to {}", words(low), words(high)),
            Seen::ShareOf { share, .. } if share.is_finite() => format!("{share}"),
            Seen::ShareOf { .. } => String::new(),
            Seen::Nothing => String::from("nothing"),
            Seen::NotPossible { why } => why,
        },
    );
}

/// Puts what cannot stay into words.
fn condition(condition: &mut Condition) -> Vec<String> {
    let mut aside = Vec::new();
    while let Err((field, _)) = check::condition(condition) {
        match field {
            ".lever.share" => {
                if let Lever::Share(share) = condition.lever {
                    aside.push(format!("lever: {share} of full travel"));
                }
                condition.lever = Lever::Full;
            }
            ".engine.measured" => {
                if let EngineSpeed::Measured(speed) = condition.engine {
                    aside.push(format!("engine speed: {}", words(speed)));
                }
                condition.engine = EngineSpeed::HighIdle;
            }
            _ => {
                if let Some(oil) = condition.oil.take() {
                    aside.push(format!("oil temperature: {}", words(oil.value)));
                }
            }
        }
    }
    aside
}

fn words(value: Measure) -> String {
    format_with_unit(
        value,
        value.kind().base_unit(),
        Decimals::Edit,
        DecimalMark::Point,
    )
}

/// Keeps what was typed; where nothing was, the value in words.
fn keep(typed: &mut String, words: &str) {
    if typed.trim().is_empty() {
        words.clone_into(typed);
    }
}

fn note(note: &mut String, aside: &[String]) {
    for line in aside {
        if !note.is_empty() {
            note.push('\n');
        }
        note.push_str(line);
    }
}
