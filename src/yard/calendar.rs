//! Days of the calendar, without a clock: for spans between checks and the day of the next one.

/// Days from 1970-01-01 of a day in the proleptic Gregorian calendar. The text is ISO 8601; only its first ten characters
/// (year, month, day) are read. None where they are no day.
#[must_use]
pub fn day(text: &str) -> Option<i64> {
    let head = text.get(..10)?;
    let mut parts = head.split('-');
    let (year, month, day) = (parts.next()?, parts.next()?, parts.next()?);
    if year.len() != 4 || month.len() != 2 || day.len() != 2 || parts.next().is_some() {
        return None;
    }
    let (year, month, day): (i64, i64, i64) =
        (year.parse().ok()?, month.parse().ok()?, day.parse().ok()?);
    if !(1..=12).contains(&month) || day < 1 {
        return None;
    }
    let days = from_civil(year, month, day);
    // A day that no month has comes back as another one.
    (to_civil(days) == (year, month, day)).then_some(days)
}

/// The text of a day, as `2026-03-01`.
#[must_use]
pub fn text(days: i64) -> String {
    let (year, month, day) = to_civil(days);
    format!("{year:04}-{month:02}-{day:02}")
}

/// A day in words, as `1 Mar 2026`.
#[must_use]
pub fn words(days: i64) -> String {
    const MONTHS: [&str; 12] = [
        "Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec",
    ];
    let (year, month, day) = to_civil(days);
    let month = usize::try_from(month - 1)
        .ok()
        .and_then(|at| MONTHS.get(at))
        .copied()
        .unwrap_or_default();
    format!("{day} {month} {year}")
}

/// Years begin in March here, so that the day that leap years add is their last. (Counting by eras of 400 years.)
fn from_civil(year: i64, month: i64, day: i64) -> i64 {
    let year = if month <= 2 { year - 1 } else { year };
    let era = year.div_euclid(400);
    let of_era = year.rem_euclid(400);
    let of_year = (153 * ((month + 9) % 12) + 2) / 5 + day - 1;
    era * 146_097 + of_era * 365 + of_era / 4 - of_era / 100 + of_year - 719_468
}

fn to_civil(days: i64) -> (i64, i64, i64) {
    let days = days + 719_468;
    let era = days.div_euclid(146_097);
    let of_era = days.rem_euclid(146_097);
    let year = (of_era - of_era / 1_460 + of_era / 36_524 - of_era / 146_096) / 365;
    let of_year = of_era - (365 * year + year / 4 - year / 100);
    let month = (5 * of_year + 2) / 153;
    let day = of_year - (153 * month + 2) / 5 + 1;
    let month = if month < 10 { month + 3 } else { month - 9 };
    (year + era * 400 + i64::from(month <= 2), month, day)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn known_days() {
        for (text, days) in [
            ("1970-01-01", 0),
            ("1970-01-02T08:00:00Z", 1),
            ("2000-02-29", 11_016),
            ("2026-12-01", 20_788),
            ("1969-12-31", -1),
        ] {
            assert_eq!(day(text), Some(days), "{text}");
            assert_eq!(super::text(days), text[..10]);
        }
        assert_eq!(words(20_788), "1 Dec 2026");
        for wrong in [
            "",
            "2026-02-30",
            "2026-13-01",
            "26-1-1",
            "yesterday",
            "2026-00-10",
            "2100-02-29",
        ] {
            assert_eq!(day(wrong), None, "{wrong}");
        }
    }

    #[test]
    fn every_day_comes_back() {
        for days in -200_000..200_000 {
            assert_eq!(day(&text(days)), Some(days));
        }
    }
}
