//! Old calls out of the way: into a file that can be taken in again, so that the browser's storage stays roomy.

use super::{Book, Export, Visit, mend};
use crate::call::put_back;
use std::collections::{BTreeMap, BTreeSet};

/// Year of an ISO 8601 moment; none where the text is no moment.
fn year(moment: &str) -> Option<u16> {
    let (year, _) = moment.split_once('-')?;
    let is_year = year.len() == 4 && year.bytes().all(|digit| digit.is_ascii_digit());
    year.parse().ok().filter(|_| is_year)
}

/// True for a call that may leave: closed, with everything put back.
fn is_done(visit: &Visit) -> bool {
    visit.closed.is_some() && put_back::open(visit) == 0
}

/// Calls that may go into an archive: closed, everything put back, opened before this year, and not the last call of their
/// unit, by which the list of units says how it stands.
#[must_use]
pub fn old(book: &Book, before: u16) -> Vec<&Visit> {
    let last = last_calls(book);
    book.visits
        .values()
        .filter(|visit| year(&visit.opened).is_some_and(|year| year < before))
        .filter(|visit| last.get(visit.unit.as_str()) != Some(&visit.id.as_str()))
        .filter(|visit| is_done(visit))
        .collect()
}

/// Last call of each unit.
fn last_calls(book: &Book) -> BTreeMap<&str, &str> {
    let mut last: BTreeMap<&str, &Visit> = BTreeMap::new();
    for visit in book.visits.values() {
        let newest = last.entry(visit.unit.as_str()).or_insert(visit);
        if (&visit.opened, &visit.id) > (&newest.opened, &newest.id) {
            *newest = visit;
        }
    }
    last.into_iter()
        .map(|(unit, visit)| (unit, visit.id.as_str()))
        .collect()
}

/// Years before which calls could be archived, the latest first, each with how many they are; none where it would be no call.
#[must_use]
pub fn choices(book: &Book) -> Vec<(u16, usize)> {
    let years: BTreeSet<u16> = old(book, u16::MAX)
        .into_iter()
        .filter_map(|visit| year(&visit.opened))
        .collect();
    years
        .into_iter()
        .rev()
        .map(|year| year.saturating_add(1))
        .map(|before| (before, old(book, before).len()))
        .collect()
}

impl Export {
    /// An archive: these calls with their units and all instruments.
    #[must_use]
    pub fn of_visits(book: &Book, visits: &[&Visit], made_at: &str) -> Export {
        let units: BTreeSet<&str> = visits.iter().map(|visit| visit.unit.as_str()).collect();
        Export {
            units: units
                .into_iter()
                .filter_map(|id| book.unit(id))
                .map(mend::unit)
                .collect(),
            visits: visits.iter().map(|visit| mend::visit(visit)).collect(),
            instruments: book.settings.instruments.clone(),
            settings: None,
            ..Export::of(&Book::default(), made_at)
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::record::{Closing, ImportPlan};
    use crate::unit::Unit;

    fn visit(id: &str, unit: &str, opened: &str, is_closed: bool) -> Visit {
        Visit {
            id: id.into(),
            unit: unit.into(),
            opened: opened.into(),
            closed: is_closed.then(Closing::default),
            ..Visit::default()
        }
    }

    fn book() -> Book {
        let mut book = Book::default();
        for id in ["a", "b"] {
            book.put_unit(Unit {
                id: id.into(),
                ..Unit::default()
            });
        }
        book.put_visit(visit("v1", "a", "2019-05-01T08:00:00Z", true));
        book.put_visit(visit("v2", "a", "2021-05-01T08:00:00Z", true));
        book.put_visit(visit("v3", "a", "2021-06-01T08:00:00Z", false));
        book.put_visit(visit("v4", "a", "2024-06-01T08:00:00Z", true));
        book.put_visit(visit("v5", "b", "2018-06-01T08:00:00Z", true));
        book.put_visit(visit("v6", "a", "last week", true));
        book
    }

    fn ids(visits: &[&Visit]) -> Vec<String> {
        visits.iter().map(|visit| visit.id.clone()).collect()
    }

    #[test]
    fn what_is_open_or_last_stays() {
        let book = book();
        assert_eq!(ids(&old(&book, 2022)), ["v1", "v2"]);
        assert_eq!(ids(&old(&book, 2021)), ["v1"]);
        assert!(old(&book, 2019).is_empty());
        // "last week" sorts behind all years, and is the last call of its unit.
        assert_eq!(choices(&book), [(2025, 3), (2022, 2), (2020, 1)]);
    }

    #[test]
    fn an_archive_is_a_file_that_brings_them_back() {
        let mut book = book();
        let gone: Vec<Visit> = old(&book, 2022).into_iter().cloned().collect();
        let text = Export::of_visits(&book, &old(&book, 2022), "").text();
        for visit in &gone {
            book.remove_visit(&visit.id);
        }
        let back = Export::read(text.expect("a text").as_bytes()).expect("it reads");
        assert!(back.settings.is_none() && back.units.len() == 1);
        ImportPlan::of(&back, &book).apply(&mut book, false);
        for visit in &gone {
            assert_eq!(book.visit(&visit.id), Some(visit));
        }
    }

    #[test]
    fn a_call_that_is_not_put_back_stays() {
        let yard = Export::read(crate::demo::TAMARISK.as_bytes()).expect("the demo");
        let mut book = Book::default();
        let mut open = yard.visits[1].clone();
        open.closed = Some(Closing::default());
        open.opened = "2019-03-11T13:15:00Z".into();
        let mut later = open.clone();
        later.id = "later".into();
        later.opened = "2024-03-11T13:15:00Z".into();
        book.put_visit(open.clone());
        book.put_visit(later);
        assert!(old(&book, 2024).is_empty());
        for (line, _) in put_back::lines(&open) {
            open.put_back
                .insert(line.into(), crate::record::PutBack::Done);
        }
        book.put_visit(open);
        assert_eq!(old(&book, 2024).len(), 1);
    }
}
