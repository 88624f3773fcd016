//! The Tamarisk plant-hire yard: three invented units with one call each, to look round with before anything of one's own is
//! typed. No such yard, unit or machine exists; the figures are made up to hang together.
//!
//! * T-14, compact machine on tracks: weak in one direction.
//! * T-27, roller: weak both ways when hot, at low revs.
//! * T-33, compact machine on wheels of which hardly a figure is known: creeps in neutral.
//!
//! The yard is a file in the export format, read by the same code as any file. It comes in only when asked for, and every
//! unit and visit of it has an id that begins with [`PREFIX`], so that it goes again in one step.

use crate::record::{Book, Export, ImportPlan, RecordError, Taken, Visit};
use crate::unit::Unit;

/// The yard as a file.
pub const TAMARISK: &str = include_str!("tamarisk.json");
/// Beginning of the ids of demo units and visits.
pub const PREFIX: &str = "demo-";

/// What left with the demo.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Removed {
    /// Demo units that left.
    pub units: Vec<Unit>,
    /// Demo visits that left.
    pub visits: Vec<Visit>,
    /// Demo units that stayed, because a visit of the person's own was made to them: ids.
    pub kept: Vec<String>,
}

/// True for an id of the demo.
#[must_use]
pub fn is_demo(id: &str) -> bool {
    id.starts_with(PREFIX)
}

/// True while any demo unit or visit is in the book.
#[must_use]
pub fn is_loaded(book: &Book) -> bool {
    book.units
        .keys()
        .chain(book.visits.keys())
        .any(|id| is_demo(id))
}

/// Brings the yard into the book. What is there stays as it is. The gauges are those that a new shop starts with; the shop's
/// list is not touched.
///
/// # Errors
/// [`RecordError`] where the file within the program cannot be read; a test makes sure that it can.
pub fn load(book: &mut Book) -> Result<Taken, RecordError> {
    let mut yard = Export::read(TAMARISK.as_bytes())?;
    yard.instruments.clear();
    yard.settings = None;
    let mut plan = ImportPlan::of(&yard, book);
    // A demo record that the person has changed is their own by now: no second one is put beside it.
    plan.units
        .retain(|planned| planned.fate == crate::record::Fate::New);
    plan.visits
        .retain(|planned| planned.fate == crate::record::Fate::New);
    Ok(plan.apply(book, false))
}

/// Takes the yard out of the book. Visits that the person made to a demo unit are theirs: they stay, and their unit with
/// them.
pub fn remove(book: &mut Book) -> Removed {
    let mut removed = Removed::default();
    let visits: Vec<String> = book
        .visits
        .keys()
        .filter(|id| is_demo(id))
        .cloned()
        .collect();
    removed
        .visits
        .extend(visits.iter().filter_map(|id| book.remove_visit(id)));
    let units: Vec<String> = book
        .units
        .keys()
        .filter(|id| is_demo(id))
        .cloned()
        .collect();
    for id in units {
        if book.visits.values().any(|visit| visit.unit == id) {
            removed.kept.push(id);
        } else if let Some((unit, _)) = book.remove_unit(&id) {
            removed.units.push(unit);
        }
    }
    removed
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::readings::instrument::usual_instruments;
    use crate::record::Settings;

    fn book() -> Book {
        Book {
            settings: Settings::start(),
            ..Book::default()
        }
    }

    #[test]
    fn the_yard_comes_and_goes_in_one_step() {
        let mut book = book();
        let empty = book.clone();
        let taken = load(&mut book).expect("the file within the program");
        assert_eq!(
            (
                taken.units.len(),
                taken.visits.len(),
                taken.settings_changed
            ),
            (4, 11, false)
        );
        assert!(
            book.units
                .keys()
                .chain(book.visits.keys())
                .all(|id| is_demo(id))
        );
        assert!(
            book.without_unit().next().is_none(),
            "every visit has its unit"
        );
        assert!(is_loaded(&book));
        let removed = remove(&mut book);
        assert_eq!(
            (
                removed.units.len(),
                removed.visits.len(),
                removed.kept.len()
            ),
            (4, 11, 0)
        );
        assert_eq!(book, empty);
    }

    #[test]
    fn a_second_load_and_a_changed_record_are_left_alone() {
        let mut book = book();
        load(&mut book).expect("the file within the program");
        if let Some(unit) = book.units.get_mut("demo-t-27") {
            unit.note = String::from("mine");
        }
        let before = book.clone();
        let taken = load(&mut book).expect("the file within the program");
        assert_eq!(taken, Taken::default());
        assert_eq!(book, before);
    }

    #[test]
    fn a_visit_of_ones_own_keeps_its_unit() {
        let mut book = book();
        load(&mut book).expect("the file within the program");
        book.put_visit(Visit {
            id: "v1".into(),
            unit: "demo-t-33".into(),
            ..Visit::default()
        });
        let removed = remove(&mut book);
        assert_eq!(removed.kept, ["demo-t-33"]);
        assert!(book.unit("demo-t-33").is_some() && book.visit("v1").is_some());
        assert_eq!(book.units.len() + book.visits.len(), 2);
    }

    #[test]
    fn the_gauges_are_those_a_new_shop_starts_with() {
        let yard = Export::read(TAMARISK.as_bytes()).expect("the file within the program");
        assert!(yard.remarks.is_empty(), "{:?}", yard.remarks);
        let usual = usual_instruments();
        assert!(
            yard.instruments
                .iter()
                .all(|instrument| usual.contains(instrument))
        );
        for visit in &yard.visits {
            let readings = if visit.is_yard_check() { 0..=0 } else { 5..=7 };
            assert!(readings.contains(&visit.readings.len()), "{}", visit.id);
            for rigging in &visit.riggings {
                assert!(
                    yard.instruments.iter().any(|i| i.id == rigging.instrument),
                    "{}",
                    rigging.instrument
                );
            }
            for reading in visit
                .readings
                .iter()
                .filter(|reading| !reading.rigging.is_empty())
            {
                let rigging = visit
                    .riggings
                    .iter()
                    .find(|rigging| rigging.id == reading.rigging);
                assert_eq!(
                    rigging.map(|rigging| rigging.port),
                    Some(reading.port),
                    "{}",
                    reading.id
                );
            }
        }
    }

    #[test]
    fn what_was_typed_says_what_is_kept() {
        use crate::quantity::parse;
        use crate::readings::Seen;
        let yard = Export::read(TAMARISK.as_bytes()).expect("the file within the program");
        for reading in yard.visits.iter().flat_map(|visit| &visit.readings) {
            if let Some(Seen::Value { value }) = &reading.seen {
                let kind = reading.port.kind();
                let typed =
                    parse(&reading.typed, kind, kind.base_unit(), None).expect("it is read");
                assert_eq!(typed.measure, *value, "{}", reading.typed);
            }
        }
        for (id, figure) in yard.units.iter().flat_map(|unit| &unit.figures) {
            let kind = figure.value.expect("it is known").kind();
            let typed = parse(&figure.typed, kind, kind.base_unit(), None).expect("it is read");
            assert_eq!(Some(typed.measure), figure.value, "{id:?}");
        }
    }
}
