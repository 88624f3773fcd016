//! The one state of the app and everything that can happen to it. `reduce` is pure: no browser, no clock, no storage.

use std::collections::{BTreeMap, BTreeSet};
use std::rc::Rc;

use super::platform::offline::Offline;
use super::platform::persistence::Keeping;
use super::route::Route;
use crate::assessment::Assessment;
use crate::demo;
use crate::readings::instrument::Instrument;
use crate::record::{Settings, Visit};
use crate::store::{Quarantined, RecordKey as Key, Trashed};
use crate::unit::Unit;

/// Whether everything typed is on the shelf.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub enum Save {
    /// Everything is.
    #[default]
    Saved,
    /// Not yet: it is written in a moment.
    Pending,
    /// Not, and why. It is tried again.
    Failed(String),
}

/// Something to tell the person that stays until it is answered or put away.
#[derive(Clone, Debug, PartialEq)]
pub struct Notice {
    /// Number of the notice.
    pub number: u32,
    /// Text.
    pub text: String,
    /// What it is about; some kinds bring buttons.
    pub about: About,
}

/// What a notice is about.
#[derive(Clone, Debug, PartialEq)]
pub enum About {
    /// Just to know.
    Note,
    /// Something went wrong.
    Trouble,
    /// The record stands otherwise on the shelf; the person must choose.
    Conflict(Key),
}

/// An assessment and what it was made for.
#[derive(Clone, Debug, PartialEq)]
pub struct Answer {
    /// What was handed to the engine.
    pub asked: Question,
    /// What came back.
    pub assessment: Rc<Assessment>,
}

/// What the engine is asked.
#[derive(Clone, Debug)]
pub struct Question {
    /// Unit.
    pub unit: Rc<Unit>,
    /// Visit.
    pub visit: Rc<Visit>,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
}

impl PartialEq for Question {
    /// Same objects: every edit makes a new one.
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.unit, &other.unit)
            && Rc::ptr_eq(&self.visit, &other.visit)
            && Rc::ptr_eq(&self.instruments, &other.instruments)
    }
}

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

/// Everything that can happen.
#[derive(Clone, Debug)]
pub enum Action {
    /// Another screen.
    Go(Route),
    /// A unit is new or was edited.
    PutUnit(Unit),
    /// A visit is new or was edited.
    PutVisit(Visit),
    /// The instruments were edited.
    PutInstruments(Vec<Instrument>),
    /// The settings were edited.
    PutSettings(Settings),
    /// Records as they now stand on the shelf: read at the start, after an import, or changed by another window.
    Loaded(Box<Records>),
    /// Records that are gone from the shelf.
    Gone(Vec<Key>),
    /// These were written, as they stood.
    Saved(Vec<Written>),
    /// Writing failed, and why.
    SaveFailed(String),
    /// This record cannot be written as it stands here, and the person must choose: the key, and why in words.
    Contested(Key, String),
    /// The conflict about this record is settled.
    Settled(Key),
    /// Nothing can be kept in this browser.
    MemoryOnly,
    /// Whether the storage is close to full.
    NearlyFull(bool),
    /// What is in the trash and in the quarantine.
    Bins(Bins),
    /// Something to tell until it is put away.
    Tell(About, String),
    /// A notice was put away.
    PutAway(u32),
    /// A short message for the live region.
    Say(String),
    /// The engine answered.
    Answered(Box<Answer>),
    /// The engine cannot run.
    EngineFailed(String),
    /// The offline copy changed.
    Offline(Offline),
    /// The first offline copy is complete.
    JustReady,
    /// A newer version waits.
    UpdateWaits,
    /// The browser's word on keeping the data.
    Keeping(Keeping),
}

/// A record that was written, as it stood then.
#[derive(Clone, Debug)]
pub enum Written {
    /// A unit.
    Unit(Rc<Unit>),
    /// A visit.
    Visit(Rc<Visit>),
    /// The settings.
    Settings(Rc<Settings>),
}

impl Written {
    /// Its key.
    pub fn key(&self) -> Key {
        match self {
            Written::Unit(unit) => Key::Unit(unit.id.clone()),
            Written::Visit(visit) => Key::Visit(visit.id.clone()),
            Written::Settings(_) => Key::Settings,
        }
    }

    fn is_as_in(&self, state: &State) -> bool {
        match self {
            Written::Unit(unit) => state
                .units
                .get(&unit.id)
                .is_some_and(|now| Rc::ptr_eq(now, unit)),
            Written::Visit(visit) => state
                .visits
                .get(&visit.id)
                .is_some_and(|now| Rc::ptr_eq(now, visit)),
            Written::Settings(settings) => Rc::ptr_eq(&state.settings, settings),
        }
    }
}

/// What the shelf has put aside.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Bins {
    /// Removed records.
    pub trashed: Vec<Trashed>,
    /// Texts that could not be read.
    pub quarantined: Vec<Quarantined>,
}

/// Records as they came from the shelf.
#[derive(Clone, Debug, Default)]
pub struct Records {
    /// Units.
    pub units: Vec<Unit>,
    /// Visits.
    pub visits: Vec<Visit>,
    /// Settings, where they were read.
    pub settings: Option<Settings>,
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
            Action::PutVisit(visit) => next.put_visit(visit),
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

    /// Plain words for a record.
    pub fn name_of(&self, key: &Key) -> String {
        let unit = |id: &str| {
            self.units
                .get(id)
                .map_or_else(|| "A unit".to_owned(), |unit| format!("Unit {}", unit.name))
        };
        match key {
            Key::Unit(id) => unit(id),
            Key::Visit(id) => self.visits.get(id).map_or_else(
                || "A call".to_owned(),
                |visit| format!("The call on {}", unit(&visit.unit)),
            ),
            Key::Settings => "The list of instruments and settings".to_owned(),
        }
    }

    /// True where a write would do something: something is dirty that waits for no choice.
    pub fn is_write_due(&self) -> bool {
        self.dirty.iter().any(|key| !self.contested.contains(key))
    }

    /// True while there is something of the demo yard that "remove the demo" would take away.
    pub fn has_demo(&self) -> bool {
        let is_own_call_on = |unit: &str| {
            let mut calls = self.visits.values().filter(|visit| visit.unit == unit);
            calls.any(|visit| !demo::is_demo(&visit.id))
        };
        self.visits.keys().any(|id| demo::is_demo(id))
            || self
                .units
                .keys()
                .any(|id| demo::is_demo(id) && !is_own_call_on(id))
    }

    /// Visits of a unit, latest first.
    pub fn visits_of(&self, unit: &str) -> Vec<Rc<Visit>> {
        let mut visits: Vec<_> = self
            .visits
            .values()
            .filter(|visit| visit.unit == unit)
            .cloned()
            .collect();
        visits.sort_by(|a, b| (&b.opened, &b.id).cmp(&(&a.opened, &a.id)));
        visits
    }

    /// Units, the one called last first, those without a call by name behind them.
    pub fn units_by_last_call(&self) -> Vec<Rc<Unit>> {
        let last = |unit: &Rc<Unit>| {
            let visits = self.visits.values().filter(|visit| visit.unit == unit.id);
            visits.map(|visit| visit.opened.clone()).max()
        };
        let mut units: Vec<Rc<Unit>> = self.units.values().cloned().collect();
        units.sort_by_cached_key(|unit| {
            (
                std::cmp::Reverse(last(unit)),
                unit.name.to_lowercase(),
                unit.id.clone(),
            )
        });
        units
    }

    /// What to ask the engine about a visit; none where visit or unit are not there.
    pub fn question(&self, visit: &str) -> Option<Question> {
        let visit = self.visits.get(visit)?.clone();
        let unit = self.units.get(&visit.unit)?.clone();
        Some(Question {
            unit,
            visit,
            instruments: self.instruments.clone(),
        })
    }

    /// The last assessment of a visit, and whether something was edited since.
    pub fn answer(&self, visit: &str) -> (Option<Rc<Assessment>>, bool) {
        let answer = self.answers.get(visit);
        let is_current = answer
            .zip(self.question(visit))
            .is_some_and(|(answer, question)| answer.asked == question);
        (
            answer.map(|answer| answer.assessment.clone()),
            !is_current && self.engine_trouble.is_none(),
        )
    }
}
