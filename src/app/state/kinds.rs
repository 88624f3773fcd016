//! What the state is made of.

use std::rc::Rc;

use super::State;
use crate::assessment::Assessment;
use crate::readings::instrument::Instrument;
use crate::record::{Settings, Visit};
use crate::store::{Quarantined, RecordKey as Key, Trashed};
use crate::unit::Unit;
use crate::yard::learn::Rates;

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
    /// Base rates learned from the shop's closed cases.
    pub rates: Rc<Rates>,
}

impl PartialEq for Question {
    /// Same objects, since every edit makes a new one; or a visit in which only texts and ticks were edited.
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.unit, &other.unit)
            && (Rc::ptr_eq(&self.visit, &other.visit) || self.visit.says_the_same(&other.visit))
            && Rc::ptr_eq(&self.instruments, &other.instruments)
            && (Rc::ptr_eq(&self.rates, &other.rates) || self.rates == other.rates)
    }
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

    /// True where the state still holds this very record.
    pub(super) fn is_as_in(&self, state: &State) -> bool {
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
