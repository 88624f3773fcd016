//! When the last file with everything is so old that a lost phone would hurt.

use super::Visit;
use crate::demo;
use crate::yard::calendar;

/// Calls since the last file from which on the app reminds.
pub const MANY: usize = 5;
/// Days after which it reminds of a single call.
pub const OLD_DAYS: i64 = 30;

/// What a lost device would take along.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct AtRisk {
    /// Calls that no file holds.
    pub calls: usize,
    /// Days since the last file; none where there never was one.
    pub days: Option<i64>,
}

/// What is at risk now, where it is enough to remind of it. Demo calls do not count.
pub fn at_risk<'a>(
    last_export: &str,
    visits: impl Iterator<Item = &'a Visit>,
    now: &str,
) -> Option<AtRisk> {
    let calls: Vec<&Visit> = visits
        .filter(|visit| !demo::is_demo(&visit.id))
        .filter(|visit| last_export.is_empty() || visit.opened.as_str() > last_export)
        .collect();
    let today = calendar::day(now)?;
    let days = calendar::day(last_export).map(|then| (today - then).max(0));
    // Where no file was ever written the first call is what ages.
    let oldest = calls
        .iter()
        .filter_map(|visit| calendar::day(&visit.opened))
        .min();
    let age = days
        .or(oldest.map(|then| (today - then).max(0)))
        .unwrap_or(0);
    let due = calls.len() >= MANY || (!calls.is_empty() && age >= OLD_DAYS);
    due.then_some(AtRisk {
        calls: calls.len(),
        days,
    })
}

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests {
    use super::*;

    fn visit(id: &str, opened: &str) -> Visit {
        Visit {
            id: id.to_owned(),
            opened: opened.to_owned(),
            ..Visit::default()
        }
    }

    #[test]
    fn days_are_counted_over_months_and_leap_years() {
        let between = |from, to| Some(calendar::day(to)? - calendar::day(from)?);
        assert_eq!(between("2024-02-28", "2024-03-01"), Some(2));
        assert_eq!(between("2025-02-28", "2025-03-01"), Some(1));
        assert_eq!(
            between("2025-12-31T23:59:00Z", "2026-01-01T00:00:00Z"),
            Some(1)
        );
        assert_eq!(between("2000-01-01", "2100-01-01"), Some(36_525));
        assert_eq!(calendar::day("soon"), None);
        assert_eq!(calendar::day("2025-13-01"), None);
    }

    #[test]
    fn one_old_call_or_many_new_ones_are_reminded_of() {
        let old = [visit("a", "2026-01-02T08:00:00Z")];
        assert_eq!(
            at_risk("2026-01-01T00:00:00Z", old.iter(), "2026-01-20T00:00:00Z"),
            None
        );
        let due = at_risk("2026-01-01T00:00:00Z", old.iter(), "2026-02-01T00:00:00Z");
        assert_eq!(
            due,
            Some(AtRisk {
                calls: 1,
                days: Some(31)
            })
        );
        let many: Vec<Visit> = (0..5)
            .map(|i| visit(&format!("v{i}"), "2026-01-02"))
            .collect();
        let due = at_risk("", many.iter(), "2026-01-02T12:00:00Z");
        assert_eq!(
            due,
            Some(AtRisk {
                calls: 5,
                days: None
            })
        );
    }

    #[test]
    fn what_a_file_holds_and_the_demo_are_no_risk() {
        let many: Vec<Visit> = (0..9)
            .map(|i| visit(&format!("v{i}"), "2026-01-02"))
            .collect();
        assert_eq!(
            at_risk("2026-01-03T00:00:00Z", many.iter(), "2026-06-01"),
            None
        );
        let demo: Vec<Visit> = (0..9)
            .map(|i| visit(&format!("demo-v-{i}"), "2026-01-02"))
            .collect();
        assert_eq!(at_risk("", demo.iter(), "2026-06-01"), None);
    }
}
