//! What taking a file in would do, before anything is done. Nothing that is there is ever written over: what differs comes in
//! beside it, as a copy.

use super::rescue::ending;
use super::{Book, Export, Settings, Visit, id, mend};
use crate::readings::instrument::Instrument;
use crate::unit::Unit;
use serde::Serialize;
use std::collections::BTreeMap;

/// What becomes of one record of the file.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Fate {
    /// Comes in.
    New,
    /// Is here already, as it stands in the file.
    Same,
    /// A different one of this id is here: this one comes in beside it under a new id.
    Copy {
        /// Id that it has in the file.
        of: String,
    },
}

/// A record of the file as it would come in.
#[derive(Clone, Debug, PartialEq)]
pub struct Planned<T> {
    /// The record, with its new id where it is a copy.
    pub item: T,
    /// What becomes of it.
    pub fate: Fate,
}

/// What taking a file in would do.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct ImportPlan {
    /// Units.
    pub units: Vec<Planned<Unit>>,
    /// Visits.
    pub visits: Vec<Planned<Visit>>,
    /// Instruments.
    pub instruments: Vec<Planned<Instrument>>,
    /// The file's settings, where they differ from those here: taken only when asked.
    pub settings: Option<Settings>,
    /// When and by what the file was made.
    pub made: String,
    /// What a person should know about the file.
    pub remarks: Vec<String>,
}

/// What came in.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Taken {
    /// Units that are new in the book.
    pub units: Vec<Unit>,
    /// Visits that are new in the book.
    pub visits: Vec<Visit>,
    /// Settings or instruments changed.
    pub settings_changed: bool,
}

impl ImportPlan {
    /// Compares a file with the book.
    #[must_use]
    pub fn of(export: &Export, book: &Book) -> Self {
        let mut instrument_ids = BTreeMap::new();
        let instruments = export
            .instruments
            .iter()
            .map(|item| {
                let here = |id: &str| book.settings.instrument(id);
                let fate = fate(&item.id, item, here(&item.id), |id| here(id).is_some());
                settle(item.clone(), fate, &mut instrument_ids, |item, id| {
                    item.id = id;
                    item.name = format!("{} (copy)", item.name);
                })
            })
            .collect();
        let mut unit_ids = BTreeMap::new();
        let units = export
            .units
            .iter()
            .map(|item| {
                let here = book.unit(&item.id).map(mend::unit);
                let fate = fate(&item.id, item, here.as_ref(), |id| {
                    book.units.contains_key(id)
                });
                settle(item.clone(), fate, &mut unit_ids, |item, id| {
                    item.id = id;
                    item.name = format!("{} (copy)", item.name);
                })
            })
            .collect();
        let visits = export
            .visits
            .iter()
            .map(|item| {
                let mut moved = item.clone();
                point(&mut moved, &unit_ids, &instrument_ids);
                let here = book.visit(&item.id).map(mend::visit);
                // As it stands in the file, or as an earlier reading of this file left it.
                let fate = if here.as_ref() == Some(item) {
                    Decision::Same
                } else {
                    fate(&item.id, &moved, here.as_ref(), |id| {
                        book.visits.contains_key(id)
                    })
                };
                settle(moved, fate, &mut BTreeMap::new(), |item, id| {
                    item.id = id;
                    let gap = if item.note.is_empty() { "" } else { "\n" };
                    item.note = format!(
                        "{}{gap}Copy: a different visit of this id was here already.",
                        item.note
                    );
                })
            })
            .collect();
        ImportPlan {
            units,
            visits,
            instruments,
            settings: export
                .settings
                .clone()
                .filter(|theirs| differs(theirs, &book.settings)),
            made: [export.made_at.as_str(), export.program.as_str()]
                .join(" ")
                .trim()
                .to_owned(),
            remarks: export.remarks.clone(),
        }
    }

    /// Takes the plan's records into a book. The book may have changed since the plan was made: what does not fit any more
    /// (a record of this id has come about meanwhile) stays out, and nothing is written over. Make the plan anew for that.
    pub fn apply(&self, book: &mut Book, with_settings: bool) -> Taken {
        let mut taken = Taken::default();
        for unit in coming(&self.units)
            .filter(|unit| !book.units.contains_key(&unit.id))
            .cloned()
            .collect::<Vec<_>>()
        {
            book.put_unit(unit.clone());
            taken.units.push(unit);
        }
        for visit in coming(&self.visits)
            .filter(|v| !book.visits.contains_key(&v.id))
            .cloned()
            .collect::<Vec<_>>()
        {
            book.put_visit(visit.clone());
            taken.visits.push(visit);
        }
        for instrument in coming(&self.instruments) {
            if book.settings.instrument(&instrument.id).is_none() {
                book.settings.instruments.push(instrument.clone());
                taken.settings_changed = true;
            }
        }
        if let Some(theirs) = self.settings.as_ref().filter(|_| with_settings) {
            book.settings.units = theirs.units.clone();
            book.settings.theme = theirs.theme;
            book.settings.learning.clone_from(&theirs.learning);
            book.settings.extra.extend(theirs.extra.clone());
            taken.settings_changed = true;
        }
        taken
    }

    /// True where nothing would come in.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        coming(&self.units).next().is_none()
            && coming(&self.visits).next().is_none()
            && coming(&self.instruments).next().is_none()
            && self.settings.is_none()
    }
}

/// What comes in, new or as a copy.
fn coming<T>(planned: &[Planned<T>]) -> impl Iterator<Item = &T> {
    planned
        .iter()
        .filter(|planned| planned.fate != Fate::Same)
        .map(|planned| &planned.item)
}

enum Decision {
    New,
    Same,
    /// Was taken in as a copy of this id before.
    SameCopy(String),
    Copy(String),
}

fn fate<T: PartialEq + Serialize>(
    id: &str,
    item: &T,
    here: Option<&T>,
    is_taken: impl Fn(&str) -> bool,
) -> Decision {
    match here {
        None => Decision::New,
        Some(here) if here == item => Decision::Same,
        Some(_) => {
            let content = serde_json::to_string(item).unwrap_or_default();
            let copy = id::with_ending(id, &ending(&content));
            if is_taken(&copy) {
                Decision::SameCopy(copy)
            } else {
                Decision::Copy(copy)
            }
        }
    }
}

fn settle<T>(
    mut item: T,
    decision: Decision,
    ids: &mut BTreeMap<String, String>,
    rename: impl FnOnce(&mut T, String),
) -> Planned<T>
where
    T: HasId,
{
    let fate = match decision {
        Decision::New => Fate::New,
        Decision::Same => Fate::Same,
        Decision::SameCopy(copy) => {
            ids.insert(item.id().to_owned(), copy);
            Fate::Same
        }
        Decision::Copy(copy) => {
            let of = item.id().to_owned();
            ids.insert(of.clone(), copy.clone());
            rename(&mut item, copy);
            Fate::Copy { of }
        }
    };
    Planned { item, fate }
}

trait HasId {
    fn id(&self) -> &str;
}

impl HasId for Unit {
    fn id(&self) -> &str {
        &self.id
    }
}

impl HasId for Visit {
    fn id(&self) -> &str {
        &self.id
    }
}

impl HasId for Instrument {
    fn id(&self) -> &str {
        &self.id
    }
}

/// Points a visit of the file at the copies of its unit and instruments.
fn point(
    visit: &mut Visit,
    units: &BTreeMap<String, String>,
    instruments: &BTreeMap<String, String>,
) {
    if let Some(unit) = units.get(&visit.unit) {
        visit.unit.clone_from(unit);
    }
    for rigging in &mut visit.riggings {
        if let Some(instrument) = instruments.get(&rigging.instrument) {
            rigging.instrument.clone_from(instrument);
        }
    }
}

/// Instruments and what concerns one device only are left out of the comparison.
fn differs(theirs: &Settings, ours: &Settings) -> bool {
    let lacks = theirs
        .extra
        .iter()
        .any(|(key, value)| ours.extra.get(key) != Some(value));
    theirs.units != ours.units
        || theirs.theme != ours.theme
        || theirs.learning != ours.learning
        || lacks
}
