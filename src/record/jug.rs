//! Jug catches of a visit: checked on the way in, mended on the way out.

use super::Visit;
use super::check::{Checked, count, key_text, typed, within};
use super::limits;
use crate::quantity::{Measure, Typed, Unit};
use crate::readings::jug::{TIME, VOLUME};

/// What the two fields take.
fn asked() -> Option<[(Measure, Measure); 2]> {
    let span = |unit, (low, high)| {
        Some((
            Measure::new(low, unit).ok()?,
            Measure::new(high, unit).ok()?,
        ))
    };
    Some([span(Unit::Litre, VOLUME)?, span(Unit::Second, TIME)?])
}

/// Checks them and cleans their texts.
pub(super) fn check(path: &str, visit: &mut Visit) -> Checked {
    let path = format!("{path}.caught");
    count(&path, visit.caught.len(), limits::READINGS)?;
    let Some([volume, time]) = asked() else {
        return Ok(());
    };
    for (id, jug) in &mut visit.caught {
        key_text(&path, id)?;
        typed(&format!("{path}.volume"), &mut jug.volume, volume)?;
        typed(&format!("{path}.time"), &mut jug.time, time)?;
    }
    Ok(())
}

/// A figure that the check would refuse stays as its text.
pub(super) fn mend(visit: &mut Visit) {
    let Some([volume, time]) = asked() else {
        return;
    };
    let good = |typed: &mut Typed, asked| {
        typed.value.take_if(|value| within(*value, asked).is_err());
    };
    for jug in visit.caught.values_mut() {
        good(&mut jug.volume, volume);
        good(&mut jug.time, time);
    }
}
