//! Moments in words. A report says the same wherever it is made, so it tells them in UTC and not by the clock of a device.

const MONTHS: [&str; 12] = [
    "Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec",
];

/// An ISO 8601 moment in UTC as `4 Mar 2025, 07:40 UTC`. What is no such moment stands as it is; nothing is "not noted".
#[must_use]
pub fn moment(text: &str) -> String {
    let text = text.trim();
    if text.is_empty() {
        return String::from("not noted");
    }
    told(text).unwrap_or_else(|| text.to_owned())
}

fn told(text: &str) -> Option<String> {
    let (day, time) = text.split_once('T')?;
    let time = time.strip_suffix('Z')?;
    let mut parts = day.splitn(3, '-');
    let year: u16 = number(parts.next()?, 4)?;
    let month: usize = number(parts.next()?, 2)?.into();
    let date: u16 = number(parts.next()?, 2).filter(|date| (1..=31).contains(date))?;
    let month = MONTHS.get(month.checked_sub(1)?)?;
    let mut parts = time.splitn(3, ':');
    let hour = number(parts.next()?, 2).filter(|hour| *hour < 24)?;
    let minute = number(parts.next()?, 2).filter(|minute| *minute < 60)?;
    Some(format!("{date} {month} {year}, {hour:02}:{minute:02} UTC"))
}

/// A run of digits of this length.
fn number(text: &str, length: usize) -> Option<u16> {
    let is_number = text.len() == length && text.bytes().all(|b| b.is_ascii_digit());
    text.parse().ok().filter(|_| is_number)
}

#[cfg(test)]
mod tests {
    use super::moment;

    #[test]
    fn moments_in_words() {
        for (text, words) in [
            ("2025-03-04T07:40:00Z", "4 Mar 2025, 07:40 UTC"),
            ("2025-12-31T23:59Z", "31 Dec 2025, 23:59 UTC"),
            ("2025-13-04T07:40:00Z", "2025-13-04T07:40:00Z"),
            ("2025-03-04T07:40:00+02:00", "2025-03-04T07:40:00+02:00"),
            ("2025-03-04T+7:40:00Z", "2025-03-04T+7:40:00Z"),
            ("last week", "last week"),
            (" ", "not noted"),
        ] {
            assert_eq!(moment(text), words);
        }
    }
}
