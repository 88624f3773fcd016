//! The yard sheet and the hour meter as they come from outside and go out.

use super::check::{self, Checked};
use super::error::content;
use super::limits::ENTRIES;
use super::neutral::Typed;
use crate::quantity::{Kind, Measure};
use crate::yard::{Field, YardSheet};

/// Highest hour meter reading, h.
const MOST_HOURS: f64 = 200_000.0;
/// The same, s.
const HOURS_SPAN: (f64, f64) = (0.0, MOST_HOURS * 3_600.0 * 1.000_01);

/// Checks a sheet and cleans its texts.
pub(super) fn check(path: &str, sheet: &mut YardSheet) -> Checked {
    for (field, typed) in &mut sheet.fields {
        let path = format!("{path}.fields.{}", field.code());
        check::line(&path, "typed", &mut typed.typed)?;
        if let Some(value) = typed.value {
            within(*field, value).map_err(|why| content(format!("{path}.value"), why))?;
        }
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

/// Screens take a limit as it is shown, so a hair beyond it is the limit.
fn within(field: Field, value: Measure) -> Result<(), super::error::Problem> {
    let (low, high) = field.range();
    let slack = |limit: f64| 1e-5 * limit.abs();
    let span = (
        low.base() - slack(low.base()),
        high.base() + slack(high.base()),
    );
    check::measure(value, field.kind(), span)
}

/// A figure that the checks would refuse goes out as its text alone.
pub(super) fn mend(sheet: &mut YardSheet) {
    for (field, typed) in &mut sheet.fields {
        typed.value.take_if(|value| within(*field, *value).is_err());
    }
}

/// The same for the hour meter.
pub(super) fn mend_hours(typed: &mut Typed) {
    typed
        .value
        .take_if(|value| check::measure(*value, Kind::Time, HOURS_SPAN).is_err());
}
