//! The one state of the app and everything that can happen to it. [`State::after`] is pure: no browser, no clock, no storage.

mod action;
mod ask;
mod kinds;

pub use action::Action;
pub use ask::Listed;
pub use kinds::{About, Answer, Bins, Notice, Question, Records, Save, Written};

use std::collections::{BTreeMap, BTreeSet};
use std::rc::Rc;

use super::platform::offline::Offline;
use super::platform::persistence::Keeping;
use super::route::Route;
use crate::readings::instrument::Instrument;
use crate::record::{Settings, Visit};
use crate::store::RecordKey as Key;
use crate::unit::Unit;

/// Everything the screens show.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct State {
    /// Where one is.
    pub route: Route,
    /// Units by id.
    pub units: BTreeMap<String, Rc<Unit>>,
    /// Visits by id.
    pub visits: BTreeMap<String, Rc<Visit>>,
    /// Instruments of the shop: those of the settings, as the engine takes them.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units of measure, theme, instruments.
    pub settings: Rc<Settings>,
    /// What is not on the shelf yet.
    pub dirty: BTreeSet<Key>,
    /// Records that another window or a newer version changed: not written until the person has chosen.
    pub contested: BTreeSet<Key>,
    /// Counts the edits: each makes a write due.
    pub edits: u64,
    /// Whether everything is saved.
    pub save: Save,
    /// True where nothing can be kept in this browser.
    pub memory_only: bool,
    /// Storage is close to full.
    pub is_nearly_full: bool,
    /// Removed records that can be brought back, and texts that could not be read.
    pub bins: Rc<Bins>,
    /// What stays to be told.
    pub notices: Vec<Notice>,
    /// Last short message for the live region, with a number so that the same words are spoken again.
    pub said: (u32, String),
    /// Last assessment of each visit.
    pub answers: BTreeMap<String, Answer>,
    /// Why there is no assessment, where the engine cannot run.
    pub engine_trouble: Option<String>,
    /// The offline copy.
    pub offline: Offline,
    /// The offline copy has just become complete; said until the next screen.
    pub is_just_ready: bool,
    /// A newer version waits.
    pub update_waits: bool,
    /// The browser's word on keeping the data.
    pub keeping: Keeping,
}

impl State {
    /// The state after `action`.
    pub fn after(&self, action: Action) -> State {
        let mut next = self.clone();
        match action {
            Action::Go(route) => {
                next.route = route;
                next.is_just_ready = false;
            }
            Action::JustReady => {
                next.is_just_ready = true;
                next.say(Offline::Ready.words().to_owned());
            }
            Action::PutUnit(unit) => next.put_unit(unit),
            Action::PutVisit(visit) => next.put_visit(*visit),
            Action::PutInstruments(instruments) => {
                let settings = Settings {
                    instruments,
                    ..(*self.settings).clone()
                };
                next.take_settings(settings);
                next.soil(Key::Settings);
            }
            Action::PutSettings(settings) => {
                next.take_settings(settings);
                next.soil(Key::Settings);
            }
            Action::Loaded(records) => next.take(*records),
            Action::Gone(keys) => keys.iter().for_each(|key| next.forget(key)),
            Action::Saved(written) => {
                for record in written {
                    // What was edited since is still to be written.
                    if record.is_as_in(&next) {
                        next.dirty.remove(&record.key());
                    }
                }
                next.save = if next.dirty.is_empty() {
                    Save::Saved
                } else {
                    Save::Pending
                };
            }
            Action::SaveFailed(why) => next.save = Save::Failed(why),
            Action::Contested(key, why) => next.contest(key, &why),
            Action::Settled(key) => next.settle(&key),
            Action::MemoryOnly => next.memory_only = true,
            Action::Bins(bins) => next.bins = Rc::new(bins),
            Action::NearlyFull(is_nearly_full) => next.is_nearly_full = is_nearly_full,
            Action::Tell(about, text) => next.tell(about, text),
            Action::PutAway(number) => next.notices.retain(|notice| notice.number != number),
            Action::Say(text) => next.say(text),
            Action::Answered(answer) => {
                next.engine_trouble = None;
                next.answers.insert(answer.asked.visit.id.clone(), *answer);
            }
            Action::EngineFailed(why) => next.engine_trouble = Some(why),
            Action::Offline(offline) => next.offline = offline,
            Action::UpdateWaits => next.update_waits = true,
            Action::Keeping(keeping) => next.keeping = keeping,
        }
        next
    }

    fn put_unit(&mut self, unit: Unit) {
        let key = Key::Unit(unit.id.clone());
        self.units.insert(unit.id.clone(), Rc::new(unit));
        self.soil(key);
    }

    fn put_visit(&mut self, visit: Visit) {
        let key = Key::Visit(visit.id.clone());
        self.visits.insert(visit.id.clone(), Rc::new(visit));
        self.soil(key);
    }

    fn soil(&mut self, key: Key) {
        self.dirty.insert(key);
        self.edits = self.edits.wrapping_add(1);
        if !matches!(self.save, Save::Failed(_)) {
            self.save = Save::Pending;
        }
    }

    fn take(&mut self, records: Records) {
        for unit in records.units {
            self.dirty.remove(&Key::Unit(unit.id.clone()));
            self.units.insert(unit.id.clone(), Rc::new(unit));
        }
        for visit in records.visits {
            self.dirty.remove(&Key::Visit(visit.id.clone()));
            self.visits.insert(visit.id.clone(), Rc::new(visit));
        }
        if let Some(settings) = records.settings {
            self.dirty.remove(&Key::Settings);
            self.take_settings(settings);
        }
        self.look_clean();
    }

    fn take_settings(&mut self, settings: Settings) {
        // The same list stays the same object, so that nothing is calculated anew for a change of the theme.
        if *self.instruments != settings.instruments {
            self.instruments = Rc::new(settings.instruments.clone());
        }
        self.settings = Rc::new(settings);
    }

    fn look_clean(&mut self) {
        if self.dirty.is_empty() {
            self.save = Save::Saved;
        }
    }

    fn forget(&mut self, key: &Key) {
        self.dirty.remove(key);
        match key {
            Key::Unit(id) => {
                self.units.remove(id);
            }
            Key::Visit(id) => {
                self.visits.remove(id);
                self.answers.remove(id);
            }
            Key::Settings => {}
        }
        self.settle(key);
        self.look_clean();
    }

    fn contest(&mut self, key: Key, why: &str) {
        if self.contested.insert(key.clone()) {
            let what = self.name_of(&key);
            self.tell(About::Conflict(key), format!("{what}: {why}"));
        }
    }

    fn settle(&mut self, key: &Key) {
        self.contested.remove(key);
        self.notices
            .retain(|notice| notice.about != About::Conflict(key.clone()));
    }

    fn say(&mut self, text: String) {
        self.said = (self.said.0.wrapping_add(1), text);
    }

    fn tell(&mut self, about: About, text: String) {
        if self.notices.iter().any(|notice| notice.text == text) {
            return;
        }
        let number = self.notices.iter().map(|notice| notice.number).max();
        let number = number.map_or(1, |number| number.wrapping_add(1));
        self.notices.push(Notice {
            number,
            text,
            about,
        });
    }
}
