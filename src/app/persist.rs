//! Between the state and the shelf: reads at the start, writes what is dirty, notices what another window did.

use std::rc::Rc;

use super::platform::clock;
use super::state::{About, Action, Bins, Records, State, Written};
use crate::assessment::upper_first;
use crate::record::{Book, IdOf, Visit};
use crate::store::{
    Foreign, LoadProblem, NotSaved, Quarantined, RecordKey, SaveOutcome, Shelf, Store, StoreError,
    Trashed, open_browser,
};
use crate::unit::Unit;

/// Keeps the shelf. One per loading of the page.
pub struct Keeper {
    shelf: Shelf<Box<dyn Store>>,
    /// Why nothing is kept beyond this page; none where the browser stores.
    no_storage: Option<StoreError>,
    /// Writes since the storage was last counted.
    writes: u32,
    /// It was close to full then.
    is_high: bool,
}

/// Writes after which the storage is counted again: together they are far less than what is left when it is called full.
const COUNT_AFTER: u32 = 20;

/// What is in the way of a write, for the state.
#[derive(Default)]
struct Outcome {
    written: Vec<Written>,
    contested: Vec<(RecordKey, String)>,
    failed: Option<String>,
}

impl Outcome {
    fn take(&mut self, record: Written, outcome: SaveOutcome) {
        match outcome {
            SaveOutcome::Saved { .. } | SaveOutcome::Unchanged => self.written.push(record),
            SaveOutcome::Conflict(foreign) => {
                self.contested.push((record.key(), foreign_words(&foreign)));
            }
            SaveOutcome::NotSaved { key, why } => match why {
                NotSaved::Newer(_) => self.contested.push((
                    key,
                    "a newer version of this app wrote it, so it can be read here but not changed. Keep what you typed as a \
                     copy, or drop it."
                        .to_owned(),
                )),
                other => self.failed = Some(other.to_string()),
            },
        }
    }
}

fn foreign_words(foreign: &Foreign) -> String {
    match foreign.saved_at {
        Some(_) => {
            "another window changed it while you were changing it here. Your changes here are not saved until you choose."
        }
        None => "another window removed it while you were changing it here. Yours is not saved until you choose.",
    }
    .to_owned()
}

impl Keeper {
    /// Opens the browser's storage, or memory where there is none.
    pub fn open() -> Keeper {
        let (store, no_storage) = open_browser();
        let tab = super::platform::ids::fresh(IdOf::Visit);
        Keeper {
            shelf: Shelf::new(store, tab),
            no_storage,
            writes: 0,
            is_high: false,
        }
    }

    /// Reads everything. What happened on the way is handed over as actions.
    pub fn load(&mut self) -> Vec<Action> {
        let loaded = self.shelf.load(&clock::now());
        let mut actions = vec![Action::Loaded(Box::new(records_of(loaded.book)))];
        if self.no_storage.is_some() {
            actions.push(Action::MemoryOnly);
        }
        if !loaded.recovered.is_empty() {
            actions.push(note(
                "The last time the app was cut off while saving. What was being saved has been completed.",
            ));
        }
        for problem in &loaded.problems {
            let about = match problem {
                LoadProblem::Newer { .. } => About::Note,
                _ => About::Trouble,
            };
            actions.push(Action::Tell(about, upper_first(&problem.to_string())));
        }
        actions.push(self.count());
        actions.push(self.bins());
        actions
    }

    /// Counts what is stored. With thousands of records that takes a while, so it is not done at every write.
    fn count(&mut self) -> Action {
        self.writes = 0;
        let usage = self.shelf.usage();
        self.is_high = usage.is_ok_and(|usage| usage.is_high());
        Action::NearlyFull(self.is_high)
    }

    /// As it was at the last count; counted anew after some writes.
    fn fullness(&mut self) -> Action {
        self.writes += 1;
        if self.writes >= COUNT_AFTER {
            return self.count();
        }
        Action::NearlyFull(self.is_high)
    }

    /// Writes what is dirty and not contested.
    pub fn flush(&mut self, state: &State) -> Vec<Action> {
        let now = clock::now();
        let mut outcome = Outcome::default();
        for key in state
            .dirty
            .iter()
            .filter(|key| !state.contested.contains(key))
        {
            match key {
                RecordKey::Settings => {
                    let saved = self.shelf.save_settings(&state.settings, &now);
                    outcome.take(Written::Settings(state.settings.clone()), saved);
                }
                RecordKey::Unit(id) => {
                    if let Some(unit) = state.units.get(id) {
                        let saved = self.shelf.save_unit(unit, &now);
                        outcome.take(Written::Unit(unit.clone()), saved);
                    }
                }
                RecordKey::Visit(id) => {
                    if let Some(visit) = state.visits.get(id) {
                        let saved = self.shelf.save_visit(visit, &now);
                        outcome.take(Written::Visit(visit.clone()), saved);
                    }
                }
            }
        }
        let mut actions = Vec::new();
        for (key, why) in outcome.contested {
            actions.push(Action::Contested(key, why));
        }
        if !outcome.written.is_empty() {
            actions.push(Action::Saved(outcome.written));
            actions.push(self.fullness());
        }
        if let Some(why) = outcome.failed {
            actions.push(Action::SaveFailed(why));
        }
        actions
    }

    /// What another window did to a key of the storage (the `storage` event); an empty key: everything was cleared.
    pub fn foreign(&mut self, path: &str, state: &State) -> Vec<Action> {
        let Ok(changes) = self.shelf.foreign_changes(path) else {
            return Vec::new();
        };
        let mut actions = Vec::new();
        for change in changes {
            if state.dirty.contains(&change.key) {
                actions.push(Action::Contested(
                    change.key.clone(),
                    foreign_words(&change),
                ));
            } else {
                actions.push(self.theirs(&change.key));
            }
        }
        actions
    }

    /// The record as it stands on the shelf now.
    pub fn theirs(&mut self, key: &RecordKey) -> Action {
        let gone = || Action::Gone(vec![key.clone()]);
        let mut records = Records::default();
        let found = match key {
            RecordKey::Unit(id) => match self.shelf.reload_unit(id) {
                Ok(unit) => {
                    records.units.extend(unit);
                    !records.units.is_empty()
                }
                Err(problem) => return trouble(upper_first(&problem.to_string())),
            },
            RecordKey::Visit(id) => match self.shelf.reload_visit(id) {
                Ok(visit) => {
                    records.visits.extend(visit);
                    !records.visits.is_empty()
                }
                Err(problem) => return trouble(upper_first(&problem.to_string())),
            },
            RecordKey::Settings => match self.shelf.reload_settings() {
                Ok(settings) => {
                    records.settings = settings;
                    records.settings.is_some()
                }
                Err(problem) => return trouble(upper_first(&problem.to_string())),
            },
        };
        if found {
            Action::Loaded(Box::new(records))
        } else {
            gone()
        }
    }

    /// Writes the settings over what another window wrote.
    pub fn overwrite_settings(&mut self, state: &State) -> Vec<Action> {
        let mut outcome = Outcome::default();
        let saved = self
            .shelf
            .overwrite_settings(&state.settings, &clock::now());
        outcome.take(Written::Settings(state.settings.clone()), saved);
        match outcome.failed {
            Some(why) => vec![Action::SaveFailed(why)],
            None => vec![Action::Saved(outcome.written)],
        }
    }

    /// Puts records in the trash. Those that were never written are simply gone.
    pub fn trash(&mut self, keys: &[RecordKey]) -> Vec<Action> {
        // One moment for all: what was removed together is brought back together.
        let now = clock::now();
        self.take_out(keys, |shelf, key| shelf.trash(key, &now))
    }

    /// Takes records away for good.
    pub fn delete(&mut self, keys: &[RecordKey]) -> Vec<Action> {
        self.take_out(keys, |shelf, key| shelf.delete(key))
    }

    fn take_out(
        &mut self,
        keys: &[RecordKey],
        act: impl Fn(&mut Shelf<Box<dyn Store>>, &RecordKey) -> Result<(), NotSaved>,
    ) -> Vec<Action> {
        let mut gone = Vec::new();
        let mut actions = Vec::new();
        self.shelf.many(|shelf| {
            for key in keys {
                match act(shelf, key) {
                    Ok(()) | Err(NotSaved::Gone) => gone.push(key.clone()),
                    Err(why) => actions.push(trouble(format!(
                        "{}: not removed. {}",
                        key.words(),
                        upper_first(&why.to_string())
                    ))),
                }
            }
        });
        actions.push(Action::Gone(gone));
        actions.push(self.bins());
        actions.push(self.count());
        actions
    }

    fn bins(&self) -> Action {
        Action::Bins(Bins {
            trashed: self.shelf.trashed().unwrap_or_default(),
            quarantined: self.shelf.quarantined().unwrap_or_default(),
        })
    }

    /// Brings a removed record back; a unit with the calls that were removed with it.
    pub fn restore(&mut self, trashed: &Trashed) -> Vec<Action> {
        let mut all = vec![trashed.clone()];
        if matches!(trashed.key, RecordKey::Unit(_)) {
            let others = self.shelf.trashed().unwrap_or_default().into_iter();
            all.extend(others.filter(|other| {
                other.when == trashed.when && matches!(other.key, RecordKey::Visit(_))
            }));
        }
        let mut actions = Vec::new();
        for one in all {
            actions.push(match self.shelf.restore(&one) {
                Ok(()) => self.theirs(&one.key),
                Err(why) => trouble(format!(
                    "{}: not brought back. {}",
                    one.name,
                    upper_first(&why.to_string())
                )),
            });
        }
        actions.push(self.bins());
        actions
    }

    /// Empties the trash for good.
    pub fn empty_trash(&mut self) -> Vec<Action> {
        match self.shelf.empty_trash() {
            Ok(_) => vec![self.bins(), self.count()],
            Err(why) => vec![trouble(upper_first(&why.to_string())), self.bins()],
        }
    }

    /// Adds records that came from a file, all or none.
    ///
    /// # Errors
    /// Which record could not be written, and why.
    pub fn add(&mut self, units: &[Unit], visits: &[Visit]) -> Result<(), String> {
        self.writes = COUNT_AFTER;
        self.shelf
            .add(units, visits, &clock::now())
            .map_err(|(key, why)| format!("{}: {why}", key.words()))
    }

    /// A text that could not be read, as it was.
    pub fn quarantined_text(&self, entry: &Quarantined) -> Option<String> {
        self.shelf.quarantined_text(entry).ok().flatten()
    }
}

fn trouble(text: String) -> Action {
    Action::Tell(About::Trouble, text)
}

fn note(text: &str) -> Action {
    Action::Tell(About::Note, text.to_owned())
}

/// The book of the state, for an export.
pub fn book_of(state: &State) -> Book {
    let mut book = Book {
        settings: (*state.settings).clone(),
        ..Book::default()
    };
    for unit in state.units.values() {
        book.put_unit(Rc::unwrap_or_clone(unit.clone()));
    }
    for visit in state.visits.values() {
        book.put_visit(Rc::unwrap_or_clone(visit.clone()));
    }
    book
}

fn records_of(book: Book) -> Records {
    Records {
        units: book.units.into_values().collect(),
        visits: book.visits.into_values().collect(),
        settings: Some(book.settings),
    }
}
