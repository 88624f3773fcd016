//! Everything that can happen to the state.

use super::{About, Answer, Bins, Records, Written};
use crate::app::platform::offline::Offline;
use crate::app::platform::persistence::Keeping;
use crate::app::route::Route;
use crate::readings::instrument::Instrument;
use crate::record::{Settings, Visit};
use crate::store::RecordKey as Key;
use crate::unit::Unit;

/// Everything that can happen.
#[derive(Clone, Debug)]
pub enum Action {
    /// Another screen.
    Go(Route),
    /// A unit is new or was edited.
    PutUnit(Unit),
    /// A visit is new or was edited.
    PutVisit(Box<Visit>),
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
