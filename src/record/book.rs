//! Everything that is kept, in memory.

use super::{Settings, Visit};
use crate::unit::Unit;
use std::cmp::Reverse;
use std::collections::BTreeMap;

/// Units, visits and settings as they stand in memory. Keyed by id.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Book {
    /// Units by id.
    pub units: BTreeMap<String, Unit>,
    /// Visits by id.
    pub visits: BTreeMap<String, Visit>,
    /// Settings and instruments.
    pub settings: Settings,
}

impl Book {
    /// The unit of this id.
    #[must_use]
    pub fn unit(&self, id: &str) -> Option<&Unit> {
        self.units.get(id)
    }

    /// The visit of this id.
    #[must_use]
    pub fn visit(&self, id: &str) -> Option<&Visit> {
        self.visits.get(id)
    }

    /// Puts a unit in its place; the one that stood there is handed back.
    pub fn put_unit(&mut self, unit: Unit) -> Option<Unit> {
        self.units.insert(unit.id.clone(), unit)
    }

    /// Puts a visit in its place; the one that stood there is handed back.
    pub fn put_visit(&mut self, visit: Visit) -> Option<Visit> {
        self.visits.insert(visit.id.clone(), visit)
    }

    /// Takes a visit out.
    pub fn remove_visit(&mut self, id: &str) -> Option<Visit> {
        self.visits.remove(id)
    }

    /// Takes a unit out, with its visits: all of them are handed back, oldest first, for the trash or for "undo".
    pub fn remove_unit(&mut self, id: &str) -> Option<(Unit, Vec<Visit>)> {
        let unit = self.units.remove(id)?;
        let ids: Vec<String> = self
            .visits_of(id)
            .rev()
            .map(|visit| visit.id.clone())
            .collect();
        let visits = ids.iter().filter_map(|id| self.visits.remove(id)).collect();
        Some((unit, visits))
    }

    /// Units by name: "T-9" before "T-14".
    #[must_use]
    pub fn units_by_name(&self) -> Vec<&Unit> {
        let mut units: Vec<&Unit> = self.units.values().collect();
        units.sort_by_cached_key(|unit| (natural(&unit.name), unit.id.clone()));
        units
    }

    /// Visits to a unit, newest first.
    pub fn visits_of<'a>(&'a self, unit: &'a str) -> impl DoubleEndedIterator<Item = &'a Visit> {
        self.newest_first()
            .into_iter()
            .filter(move |visit| visit.unit == unit)
    }

    /// Every visit, newest first.
    #[must_use]
    pub fn newest_first(&self) -> Vec<&Visit> {
        let mut visits: Vec<&Visit> = self.visits.values().collect();
        visits.sort_by_key(|visit| Reverse((visit.opened.as_str(), visit.id.as_str())));
        visits
    }

    /// Visits whose unit is not in the book.
    pub fn without_unit(&self) -> impl Iterator<Item = &Visit> {
        self.visits
            .values()
            .filter(|visit| !self.units.contains_key(&visit.unit))
    }

    /// True where nothing was entered yet.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.units.is_empty() && self.visits.is_empty()
    }
}

/// Key that sorts runs of digits by their value and letters regardless of case.
#[must_use]
pub fn natural(name: &str) -> Vec<(u8, String)> {
    let mut parts: Vec<(u8, String)> = Vec::new();
    for c in name.chars() {
        let rank = u8::from(!c.is_ascii_digit());
        match parts.last_mut() {
            Some((last, text)) if *last == rank => text.extend(c.to_lowercase()),
            _ => parts.push((rank, c.to_lowercase().collect())),
        }
    }
    for (rank, digits) in &mut parts {
        if *rank == 0 {
            let bare = digits.trim_start_matches('0');
            // A longer run of digits is a larger number: its length goes in front.
            *digits = format!("{:08}{bare}", bare.len());
        }
    }
    parts
}

#[cfg(test)]
mod tests {
    use super::*;

    fn unit(id: &str, name: &str) -> Unit {
        Unit {
            id: id.into(),
            name: name.into(),
            ..Unit::default()
        }
    }

    fn visit(id: &str, unit: &str, opened: &str) -> Visit {
        Visit {
            id: id.into(),
            unit: unit.into(),
            opened: opened.into(),
            ..Visit::default()
        }
    }

    #[test]
    fn yard_numbers_sort_by_their_value() {
        let mut book = Book::default();
        for (id, name) in [
            ("a", "T-14"),
            ("b", "t-9"),
            ("c", "T-014"),
            ("d", "Roller"),
            ("e", "27"),
        ] {
            book.put_unit(unit(id, name));
        }
        let names: Vec<&str> = book
            .units_by_name()
            .iter()
            .map(|u| u.name.as_str())
            .collect();
        assert_eq!(names, ["27", "Roller", "t-9", "T-14", "T-014"]);
    }

    #[test]
    fn a_unit_leaves_with_its_visits_and_no_others() {
        let mut book = Book::default();
        book.put_unit(unit("a", "T-14"));
        book.put_visit(visit("v1", "a", "2025-03-01T08:00:00Z"));
        book.put_visit(visit("v2", "a", "2025-02-01T08:00:00Z"));
        book.put_visit(visit("v3", "b", "2025-01-01T08:00:00Z"));
        let (gone, visits) = book.remove_unit("a").expect("it is there");
        assert_eq!(gone.name, "T-14");
        assert_eq!(
            visits.iter().map(|v| v.id.as_str()).collect::<Vec<_>>(),
            ["v2", "v1"]
        );
        assert_eq!(book.visits.keys().collect::<Vec<_>>(), ["v3"]);
        assert_eq!(book.without_unit().count(), 1);
        assert!(book.remove_unit("a").is_none());
    }

    #[test]
    fn newest_first() {
        let mut book = Book::default();
        book.put_visit(visit("v1", "a", "2025-02-01T08:00:00Z"));
        book.put_visit(visit("v2", "a", "2025-03-01T08:00:00Z"));
        let ids: Vec<&str> = book.visits_of("a").map(|v| v.id.as_str()).collect();
        assert_eq!(ids, ["v2", "v1"]);
    }
}
