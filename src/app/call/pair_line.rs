//! Left and right beside each other: the difference in a line. Whether it means anything is the ranking's word.

use super::side::{Against, against};
use super::words;
use crate::quantity::UnitPrefs;
use crate::readings::{Reading, Seen};

/// Right against left: `Right 1.4 rpm lower (−3.2 %)`; none where either is no plain value.
pub fn words(left: &Reading, right: &Reading, prefs: &UnitPrefs) -> Option<String> {
    let value = |reading: &Reading| match &reading.seen {
        Some(Seen::Value { value }) => Some(value.base()),
        _ => None,
    };
    let Against { difference, share } = against(left.port, value(left)?, value(right)?)?;
    let Some(size) = words::difference(left.port, difference, prefs) else {
        return Some(String::from("Left and right read the same"));
    };
    let way = if difference > 0.0 { "higher" } else { "lower" };
    let share = share.map(|share| format!(" ({})", words::signed_percent(share, prefs.mark())));
    Some(format!("Right {size} {way}{}", share.unwrap_or_default()))
}
