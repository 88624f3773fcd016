//! The tracking sheet as it comes from outside and goes out.

use super::check::{self, Checked};
use super::limits::ENTRIES;
use crate::quantity::Measure;
use crate::quantity::Typed;
use crate::tracking::{LINES, TrackingSheet};
use std::collections::BTreeSet;

/// Checks a sheet and cleans its texts.
pub(super) fn check(path: &str, sheet: &mut TrackingSheet) -> Checked {
    for (head, typed) in &mut sheet.head {
        let (unit, low, high) = head.asks();
        let asked = (Measure::literal(low, unit), Measure::literal(high, unit));
        check::typed(&format!("{path}.head"), typed, asked)?;
    }
    check::count(&format!("{path}.steps"), sheet.steps.len(), ENTRIES)?;
    for step in sheet.steps.keys() {
        check::key_text(&format!("{path}.steps"), step)?;
    }
    check::count(&format!("{path}.runs"), sheet.runs.len(), LINES)?;
    let mut met = BTreeSet::new();
    for (index, run) in sheet.runs.iter_mut().enumerate() {
        let path = format!("{path}.runs[{index}]");
        check::id_once(&path, &run.id, &mut met)?;
        let what = run.what;
        for (field, typed) in &mut run.fields {
            let (unit, high) = what.asks(*field);
            let asked = (Measure::literal(0.0, unit), Measure::literal(high, unit));
            check::typed(&format!("{path}.fields"), typed, asked)?;
        }
    }
    check::unknown_fields(path, &sheet.extra)
}

/// A figure that the checks would refuse goes out as its text alone.
pub(super) fn mend(sheet: &mut TrackingSheet) {
    for (head, typed) in &mut sheet.head {
        let (unit, low, high) = head.asks();
        let asked = (Measure::literal(low, unit), Measure::literal(high, unit));
        drop_wrong(typed, asked);
    }
    for run in &mut sheet.runs {
        let what = run.what;
        for (field, typed) in &mut run.fields {
            let (unit, high) = what.asks(*field);
            let asked = (Measure::literal(0.0, unit), Measure::literal(high, unit));
            drop_wrong(typed, asked);
        }
    }
}

fn drop_wrong(typed: &mut Typed, asked: (Measure, Measure)) {
    typed
        .value
        .take_if(|value| check::within(*value, asked).is_err());
}

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests {
    use super::*;
    use crate::quantity::Unit;
    use crate::tracking::{Field, Head, Line, What};

    fn typed(text: &str, value: f64, unit: Unit) -> Typed {
        Typed {
            typed: text.to_owned(),
            value: Some(Measure::literal(value, unit)),
        }
    }

    fn sheet(track: f64, turns: f64) -> TrackingSheet {
        let mut sheet = TrackingSheet::default();
        sheet
            .head
            .insert(Head::Track, typed("a", track, Unit::Metre));
        let mut line = Line {
            id: "run-1".to_owned(),
            ..Line::default()
        };
        line.fields
            .insert(Field::Left, typed("b", turns, Unit::Turn));
        sheet.runs.push(line);
        sheet
    }

    #[test]
    fn figures_beyond_their_fields_are_refused_with_their_path_and_go_out_as_text() {
        assert!(check("visit.tracking", &mut sheet(1.5, 50.0)).is_ok());
        for (mut wrong, path) in [
            (sheet(150.0, 50.0), "visit.tracking.head"),
            (sheet(1.5, -1.0), "visit.tracking.runs[0].fields"),
        ] {
            let why = check("visit.tracking", &mut wrong).expect_err("out of range");
            assert!(why.to_string().contains(path), "{why}");
            mend(&mut wrong);
            assert!(check("visit.tracking", &mut wrong).is_ok());
            assert_eq!(wrong.head[&Head::Track].typed, "a");
            assert_eq!(wrong.runs[0].fields[&Field::Left].typed, "b");
        }
    }

    #[test]
    fn a_run_measured_otherwise_keeps_its_texts_and_reads_them_anew() {
        let mut sheet = sheet(1.5, 50.0);
        let line = &mut sheet.runs[0];
        line.fields
            .insert(Field::Left, typed("50", 50.0, Unit::Turn));
        line.choose(What::WheelSpeeds);
        let left = line.fields[&Field::Left].clone();
        assert_eq!(left, typed("50", 50.0, Unit::RevolutionPerMinute));
        assert!(check("visit.tracking", &mut sheet).is_ok());
    }

    #[test]
    fn two_runs_of_one_id_are_refused() {
        let mut sheet = sheet(1.5, 50.0);
        sheet.runs.push(sheet.runs[0].clone());
        assert!(check("visit.tracking", &mut sheet).is_err());
    }
}
