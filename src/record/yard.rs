//! The yard sheet and the hour meter as they come from outside and go out.

use super::check::{self, Checked};
use super::error::content;
use super::limits::ENTRIES;
use crate::quantity::Kind;
use crate::quantity::Typed;
use crate::yard::YardSheet;

/// The same, s.
const HOURS_SPAN: (f64, f64) = (0.0, super::limits::MOST_HOURS * 3_600.0 * 1.000_01);

/// Checks a sheet and cleans its texts.
pub(super) fn check(path: &str, sheet: &mut YardSheet) -> Checked {
    for (field, typed) in &mut sheet.fields {
        let path = format!("{path}.fields.{}", field.code());
        check::typed(&path, typed, field.range())?;
    }
    check::count(&format!("{path}.looks"), sheet.looks.len(), ENTRIES)?;
    for (look, answer) in &mut sheet.looks {
        check::key_text(&format!("{path}.looks"), look)?;
        check::line(path, "looks", answer)?;
    }
    for (field, text) in [
        ("gauge", &mut sheet.gauge),
        ("tachometer", &mut sheet.tachometer),
        ("meter", &mut sheet.meter),
        ("course", &mut sheet.course),
    ] {
        check::line(path, field, text)?;
    }
    check::unknown_fields(path, &sheet.extra)
}

/// Checks an hour meter reading.
pub(super) fn hours(path: &str, typed: &mut Typed) -> Checked {
    check::line(path, "typed", &mut typed.typed)?;
    match typed.value {
        Some(value) => check::measure(value, Kind::Time, HOURS_SPAN)
            .map_err(|why| content(format!("{path}.value"), why)),
        None => Ok(()),
    }
}

/// A figure that the checks would refuse goes out as its text alone.
pub(super) fn mend(sheet: &mut YardSheet) {
    for (field, typed) in &mut sheet.fields {
        typed
            .value
            .take_if(|value| check::within(*value, field.range()).is_err());
    }
}

/// The same for the hour meter.
pub(super) fn mend_hours(typed: &mut Typed) {
    typed
        .value
        .take_if(|value| check::measure(*value, Kind::Time, HOURS_SPAN).is_err());
}

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests {
    use super::*;
    use crate::quantity::{Measure, Unit};
    use crate::yard::Field;

    fn typed(value: f64, unit: Unit) -> Typed {
        Typed {
            typed: "as typed".to_owned(),
            value: Some(Measure::literal(value, unit)),
        }
    }

    fn sheet(bar: f64) -> YardSheet {
        let mut sheet = YardSheet::default();
        sheet.set(Field::ChargeLow, typed(bar, Unit::Bar));
        sheet
    }

    #[test]
    fn figures_beyond_their_fields_are_refused_with_their_path_and_go_out_as_text() {
        assert!(check("visit.yard", &mut sheet(21.0)).is_ok());
        let mut wrong = sheet(2100.0);
        let why = check("visit.yard", &mut wrong).expect_err("out of range");
        let path = "visit.yard.fields.charge_low";
        assert!(why.to_string().contains(path), "{why}");
        mend(&mut wrong);
        assert!(check("visit.yard", &mut wrong).is_ok());
        assert_eq!(wrong.fields[&Field::ChargeLow].typed, "as typed");
        let mut meter = typed(-5.0, Unit::Hour);
        assert!(hours("visit.hours", &mut meter).is_err());
        mend_hours(&mut meter);
        assert!(hours("visit.hours", &mut meter).is_ok() && meter.typed == "as typed");
    }

    #[test]
    fn every_field_has_a_code_of_its_own_and_a_range() {
        let mut codes: Vec<String> = Field::ALL.iter().map(|f| f.code()).collect();
        codes.sort();
        codes.dedup();
        assert_eq!(codes.len(), Field::ALL.len());
        for field in Field::ALL {
            let (low, high) = field.range();
            assert!(low.base() < high.base() && low.kind() == field.kind());
        }
    }
}
