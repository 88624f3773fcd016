//! What a screen can ask the app to do.

use std::ops::Deref;
use std::rc::Rc;

use super::state::{Action, State};
use crate::record::ImportPlan;
use crate::store::{Quarantined, RecordKey as Key, Trashed};
use crate::unit::MachineClass;
use crate::yard::Leg;

/// A wish of the person, from a screen to the app.
#[derive(Clone, Debug)]
pub enum Deed {
    /// An edit or a message: goes to the state as it is.
    Put(Action),
    /// Takes the last edit of this screen back.
    Undo,
    /// Figures are entered with the app's own large keys from now on, or no more.
    OwnKeys(bool),
    /// A new unit; a call on it is begun at once, or its profile is opened.
    NewUnit {
        /// Yard number or name; a blank one gets a name.
        name: String,
        /// Class.
        class: MachineClass,
        /// Begin a call at once.
        start: bool,
    },
    /// A new call on a unit, by the id of the unit.
    StartCall(String),
    /// A new yard check of a unit, by the id of the unit.
    StartYardCheck(String, Leg),
    /// Takes a unit away with its calls.
    RemoveUnit(String),
    /// Takes a call away.
    RemoveVisit(String),
    /// Writes the closed calls opened before this year to a file.
    Archive(u16),
    /// Takes calls away for good: they are in an archive.
    RemoveArchived(Vec<String>),
    /// Settles a conflict: keep what was typed here as a copy, then show what the other window saved.
    KeepMineAsCopy(Key),
    /// Settles a conflict: drop what was typed here, show what the other window saved.
    LoadTheirs(Key),
    /// Writes everything to a file.
    Export,
    /// Takes in what a file brings, as it was shown; its settings too where that was asked for.
    Import(Rc<ImportPlan>, bool),
    /// Brings a removed record back.
    Restore(Trashed),
    /// Empties the trash for good.
    EmptyTrash,
    /// Hands a text that could not be read over as a file.
    HandOverUnread(Quarantined),
    /// Brings the demo yard in.
    LoadDemo,
    /// Takes the demo yard away.
    RemoveDemo,
    /// Asks the browser to promise to keep the data.
    AskToKeep,
    /// Lets the waiting version take over.
    Update,
}

/// The state as a property of a component: two are the same when nothing happened in between.
#[derive(Clone, Debug)]
pub struct Snapshot(pub Rc<State>);

impl PartialEq for Snapshot {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

impl yew::Reducible for Snapshot {
    type Action = Action;

    fn reduce(self: Rc<Self>, action: Action) -> Rc<Self> {
        Rc::new(Snapshot(Rc::new(self.0.after(action))))
    }
}

impl Deref for Snapshot {
    type Target = State;

    fn deref(&self) -> &State {
        &self.0
    }
}
