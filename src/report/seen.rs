//! What was seen, heard and felt without a gauge, and what the neutral and the tracking of the call came to.

use super::{Section, Subject};
use crate::neutral::report::report;
use crate::neutral::words::Writer;
use crate::observations;
use crate::record::{Answer, NeutralSheet};

/// What was seen without a gauge, by who says so.
fn lines(subject: &Subject) -> Vec<String> {
    let words_of = |wanted: Answer| -> Vec<String> {
        let answers = subject.visit.observations.iter();
        answers
            .filter(|(_, answer)| **answer == wanted)
            .map(|(id, _)| {
                observations::find(id).map_or_else(|| id.clone(), |o| o.words.to_owned())
            })
            .collect()
    };
    [
        (Answer::Seen, "Seen"),
        (Answer::NotSeen, "Looked for and not there"),
        (Answer::OperatorSays, "The operator says"),
        (Answer::OperatorSaysNot, "The operator says it is not so"),
    ]
    .into_iter()
    .filter_map(|(answer, name)| {
        let words = words_of(answer);
        (!words.is_empty()).then(|| format!("{name}: {}", words.join("; ")))
    })
    .chain(subject.visit.after_repair.and_then(|after| {
        after.then(|| String::from("A repair was made just before the trouble began"))
    }))
    .collect()
}

pub(super) fn section(subject: &Subject) -> Option<Section> {
    super::section("seen", "Seen without a gauge", lines(subject))
}

/// What the sheets of the neutral and of the tracking come to.
pub(super) fn adjusting(subject: &Subject) -> Option<Section> {
    let visit = subject.visit;
    let two = visit.neutral_right.is_some() || !subject.unit.ticks.paths.is_one();
    let mut lines = Vec::new();
    for (side, sheet) in [("left", &visit.neutral), ("right", &visit.neutral_right)] {
        let name = if two {
            format!("Neutral, {side}")
        } else {
            String::from("Neutral")
        };
        let found = sheet.iter().flat_map(|sheet| neutral(subject, sheet));
        lines.extend(found.map(|text| format!("{name}: {text}")));
    }
    lines.extend(tracking(subject));
    super::section("adjusting", "Neutral and tracking", lines)
}

fn neutral(subject: &Subject, sheet: &NeutralSheet) -> Vec<String> {
    let report = report(subject.unit, sheet);
    let writer = Writer::new(subject.prefs);
    let mut lines = Vec::new();
    lines.extend(
        report
            .offset
            .as_ref()
            .map(|offset| writer.offset(offset).text),
    );
    if let Some(nulls) = &report.nulls {
        lines.extend(writer.nulls(nulls).into_iter().map(|line| line.text));
    }
    if let Some(series) = &report.series {
        lines.extend(writer.series(series).into_iter().map(|line| line.text));
    }
    if let Some(judged) = &report.currents {
        lines.extend(writer.currents(judged).into_iter().map(|line| line.text));
    }
    lines
}

fn tracking(subject: &Subject) -> Vec<String> {
    let Some(sheet) = &subject.visit.tracking else {
        return Vec::new();
    };
    let machine = sheet.machine(crate::tracking::usual_undercarriage(subject.unit.class));
    let runs: Vec<_> = sheet.runs(&machine).into_iter().flatten().collect();
    if runs.is_empty() {
        return vec![String::from("Tracking: begun, no run that can be read yet")];
    }
    let outcome = crate::tracking::find(&machine, &runs, &sheet.screws());
    let mut lines: Vec<String> = outcome
        .adjustments
        .iter()
        .map(|adjustment| format!("Tracking: {}", adjustment.words))
        .collect();
    if lines.is_empty() {
        lines.push(format!(
            "Tracking: {} runs, and no difference of the sides that is sure",
            runs.len()
        ));
    }
    lines
}
