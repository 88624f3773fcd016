//! What can be seen, heard and felt without a gauge, and what it says about each cause.
//!
//! Every chance here is *common practice*, from memory of the trade. To add an observation: one row in one table; screens,
//! ranking and reports follow from it. An id stands in files that people keep: never renamed, never reused.

mod complaints;
mod found;
mod signs;
#[cfg(test)]
mod tests;
mod walk_round;
mod weigh;
mod when;

use crate::faults::{self, Column, FaultId};
use crate::readings::Path;

pub use complaints::RUNS_ON;
pub use weigh::{Detail, OPERATOR, detail, kept, log_weights, prior_factor, stop_work};

/// Number of columns of the table: one for each [`Column`], in its order.
pub const COLUMNS: usize = Column::Healthy as usize + 1;

/// Least and greatest chance that an observation is given: nothing seen by a person is certain.
pub const CLIP: (f64, f64) = (0.02, 0.97);

/// Where an observation stands on a screen.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Group {
    /// What the operator complains of.
    Complaint,
    /// When and where it fails.
    WhenItFails,
    /// To be looked at.
    Look,
    /// To be listened to.
    Listen,
    /// To be felt or measured by a probe.
    Feel,
    /// Found when something is opened, swapped or moved by hand.
    Found,
}

impl Group {
    /// Every group, in the order in which screens offer them.
    pub const ALL: [Group; 6] = [
        Group::Complaint,
        Group::WhenItFails,
        Group::Look,
        Group::Listen,
        Group::Feel,
        Group::Found,
    ];

    /// Heading for a screen.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Group::Complaint => "Complaint",
            Group::WhenItFails => "When it fails",
            Group::Look => "Look",
            Group::Listen => "Listen",
            Group::Feel => "Feel, or hold a probe on it",
            Group::Found => "Opened, swapped or moved by hand",
        }
    }
}

/// Observations of one family come together: the second and third count less.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Family {
    /// Noises.
    Noise,
    /// Air in the oil.
    Air,
    /// Weak, slow, no drive.
    Weak,
    /// Heat.
    Heat,
    /// One way or one side.
    Direction,
    /// Metal and filter.
    Debris,
    /// Independent of the others.
    Alone,
}

/// An observation without a gauge.
#[derive(Clone, Copy, Debug)]
pub struct Observation {
    /// Stable id (kebab case).
    pub id: &'static str,
    /// Words of the tick: a fact that is so or not.
    pub words: &'static str,
    /// How to see it, and the caution that belongs there; empty where the words suffice.
    pub how: &'static str,
    /// Group on the screen.
    pub group: Group,
    /// Family.
    pub family: Family,
    /// Offered on two-path machines only.
    pub two_path: bool,
    /// Side that it says drags behind.
    pub pulls: Option<Path>,
    /// Chance that it is seen, by [`Column`]. Common practice.
    pub row: [f64; COLUMNS],
    /// Causes that differ from their column. Common practice.
    pub exceptions: &'static [(FaultId, f64)],
}

impl Observation {
    /// Mean chance over the columns: what is expected where nothing is known of the cause.
    #[must_use]
    pub fn mean(&self) -> f64 {
        self.row.iter().sum::<f64>() / COLUMNS as f64
    }
}

/// What most rows share.
const BASE: Observation = Observation {
    id: "",
    words: "",
    how: "",
    group: Group::Look,
    family: Family::Alone,
    two_path: false,
    pulls: None,
    row: [0.0; COLUMNS],
    exceptions: &[],
};

/// A row where all causes are alike, for finds that belong to one or two causes only.
const fn even(chance: f64) -> [f64; COLUMNS] {
    [chance; COLUMNS]
}

const TABLES: [&[Observation]; 5] = [
    complaints::TABLE,
    when::TABLE,
    signs::TABLE,
    walk_round::TABLE,
    found::TABLE,
];

/// Every observation, in the order in which screens offer them within a group.
pub fn all() -> impl Iterator<Item = &'static Observation> {
    TABLES.into_iter().flatten()
}

/// The observation of an id; none for an id that this version does not know.
#[must_use]
pub fn find(id: &str) -> Option<&'static Observation> {
    all().find(|o| o.id == id)
}

/// Chance that an observation is seen where a fault is the cause, clipped to [`CLIP`].
#[must_use]
pub fn probability(observation: &Observation, fault: FaultId) -> f64 {
    let listed = observation
        .exceptions
        .iter()
        .find(|(id, _)| *id == fault)
        .map(|(_, p)| *p);
    let p = listed.unwrap_or_else(|| match fault {
        // These can look like anything: the mean of all causes, a tenth of the way to "as likely as not".
        FaultId::NotListed | FaultId::AssemblyError => 0.9 * observation.mean() + 0.05,
        _ => column(observation, fault),
    });
    p.clamp(CLIP.0, CLIP.1)
}

fn column(observation: &Observation, fault: FaultId) -> f64 {
    let column = faults::find(fault).map_or(Column::Healthy, |f| f.column);
    observation.row.get(column as usize).copied().unwrap_or(0.0)
}
