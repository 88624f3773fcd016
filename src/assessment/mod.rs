//! What an assessment hands to a screen, to the report and to the office command: windows, causes, reasons, doubts.
//! Plain data, so that it can cross from a worker to the page.

use crate::faults::FaultId;
use crate::next::Advice;
use crate::readings::Path;
use serde::{Deserialize, Serialize};

/// Where an expected window comes from.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum WindowSource {
    /// The unit's own manual, as entered.
    Manual,
    /// Computed from the unit's figures.
    Computed,
    /// Computed, but resting mostly on common practice for the class.
    Practice,
}

/// Where a reading stands against its window.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Standing {
    /// Inside.
    Within,
    /// Inside the outer tenth, or outside by less than the instrument's own uncertainty.
    Edge,
    /// Below.
    Low,
    /// Above.
    High,
    /// The instrument cannot answer, or the reading says nothing in this condition.
    CannotTell,
    /// No value.
    Open,
}

/// Expected window of one reading. Values in the base unit of the port's kind (bar, L/min, rpm, °C, s, mA, km/h).
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Window {
    /// Reading id.
    pub reading: String,
    /// Lower end of the central 95 %.
    pub low: f64,
    /// Median.
    pub middle: f64,
    /// Upper end of the central 95 %.
    pub high: f64,
    /// Value read, where there is one.
    pub read: Option<f64>,
    /// Standard uncertainty of the reading from the instrument alone.
    pub instrument: f64,
    /// Source.
    pub source: WindowSource,
    /// The input that widens this window most, in words.
    pub widest: String,
    /// What the window was computed for: speed, temperature, lever, in words.
    pub basis: String,
    /// Where the reading stands.
    pub standing: Standing,
    /// A remark: gauge cannot answer, cold oil, side empties.
    pub remark: Option<String>,
    /// True where the healthy machine's needle would swing or there is no steady state.
    pub swings: bool,
    /// Of a case flow: what it says against the bench.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub since_bench: Option<SinceBench>,
}

/// A case flow taken on the machine, held against what the bench measured of the same part.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum SinceBench {
    /// So many times the bench's leakage, at the same oil and pressure.
    Times {
        /// How many times.
        ratio: f64,
        /// Lower end of about 95 %.
        low: f64,
        /// Upper end.
        high: f64,
        /// When the bench measured it (ISO 8601); empty where nobody noted it.
        on: String,
    },
    /// Not comparable.
    Cannot {
        /// Why, in words.
        why: String,
    },
}

/// A reading or observation that speaks for or against a cause.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Evidence {
    /// Reading id or observation id.
    pub of: String,
    /// What it is, in words.
    pub words: String,
    /// Weight of evidence: natural log of how much this item, added to all others, favours the cause over the rest.
    /// Positive speaks for.
    pub weight: f64,
}

/// What a cause would make a port read.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct WouldRead {
    /// Reading id.
    pub reading: String,
    /// Expected value under the cause, base unit.
    pub value: f64,
    /// Standard spread, base unit.
    pub spread: f64,
}

/// One row of the ranking: a cause, or a set that the readings cannot split.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Cause {
    /// Members; one, or several that no reading taken can tell apart.
    pub ids: Vec<FaultId>,
    /// Title.
    pub title: String,
    /// Joint probability, 0 to 1.
    pub probability: f64,
    /// Probabilities of the members, same order as `ids`; where the row joins twins they are no more than base rates.
    /// Empty for a pair: its two causes are at work together.
    pub shares: Vec<f64>,
    /// On a machine with two paths the side of each member, same order as `ids`; empty where no member has a side.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub paths: Vec<Option<Path>>,
    /// Set where the row is two causes at work at the same time (`ids` holds both).
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub pair: Option<Pair>,
    /// For a set: the one action that serves all members; empty for a single cause.
    #[serde(default)]
    pub action: String,
    /// For a set: what splits the members; empty for a single cause.
    #[serde(default)]
    pub split: String,
    /// Readings and observations for and against, heaviest first.
    pub evidence: Vec<Evidence>,
    /// What the readings taken would be under it.
    pub would_read: Vec<WouldRead>,
}

impl Cause {
    /// Members with their sides.
    pub fn members(&self) -> impl Iterator<Item = At> + '_ {
        self.ids.iter().enumerate().map(|(i, id)| At {
            id: *id,
            path: self.paths.get(i).copied().flatten(),
        })
    }

    /// A name of its own among the rows of an assessment.
    pub fn key(&self) -> String {
        let members: Vec<String> = self.members().map(|m| m.key()).collect();
        members.join("+")
    }
}

/// A cause, and on a machine with two paths the side it is on.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct At {
    /// Cause.
    pub id: FaultId,
    /// Side; none where there is one path, or where the part is common to both.
    pub path: Option<Path>,
}

impl At {
    /// A cause on a machine with one path.
    pub fn only(id: FaultId) -> At {
        At { id, path: None }
    }

    /// Its title, the side first.
    pub fn title(&self) -> String {
        let title = crate::faults::find(self.id).map_or("", |f| f.title);
        sided(self.path, title)
    }

    /// Its stable id, with the side.
    pub fn key(&self) -> String {
        match self.path {
            Some(path) => format!("{}@{}", self.id.code(), path.words()),
            None => self.id.code(),
        }
    }
}

/// A title with the side in front of it.
pub fn sided(path: Option<Path>, title: &str) -> String {
    match path {
        Some(Path::Left) => format!("Left: {}", lower_first(title)),
        Some(Path::Right) => format!("Right: {}", lower_first(title)),
        None => title.to_string(),
    }
}

/// A title as it stands within a sentence.
pub fn lower_first(words: &str) -> String {
    let mut letters = words.chars();
    letters
        .next()
        .map_or(String::new(), |c| c.to_lowercase().chain(letters).collect())
}

/// Words as they stand at the head of a sentence.
pub fn upper_first(words: &str) -> String {
    let mut letters = words.chars();
    letters
        .next()
        .map_or(String::new(), |c| c.to_uppercase().chain(letters).collect())
}

/// Two causes at work at the same time: what each of them explains that the other does not.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
pub struct Pair {
    /// Titles, in the order of the row's ids.
    pub titles: [String; 2],
    /// Reading and observation ids that each explains, in the order of the row's ids.
    pub explains: [Vec<String>; 2],
}

/// How far the ranking can be trusted.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
pub struct Trust {
    /// Share of weight on the heaviest integration node of the leading cause (near 1: the integral hangs on one node).
    pub heaviest: f64,
    /// Largest change of any probability in the last refinement.
    pub change: f64,
    /// Circuit solves used.
    pub solves: u64,
    /// Probability that at least one rigging (gauge or port) is wrong.
    pub wrong_reading: f64,
    /// A first look, over what carried the last assessment: the full one follows.
    #[serde(default)]
    pub first_look: bool,
    /// Reading ids that do not fit and should be taken again, with the words why.
    pub retake: Vec<(String, String)>,
}

/// Outcome of an assessment.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
pub struct Assessment {
    /// Windows, one per reading, in the order of the readings.
    pub windows: Vec<Window>,
    /// Causes, most probable first; probabilities sum to 1.
    pub causes: Vec<Cause>,
    /// What is withheld, and why.
    pub withheld: Vec<String>,
    /// Remarks: tank level first, assumption made, low side empties.
    pub notes: Vec<String>,
    /// How far to trust it.
    pub trust: Trust,
    /// Longest time (s) a full-stroke held check may last on this unit, and the temperature rise per second (K/s).
    pub hold: Option<(f64, f64)>,
    /// What to do next; none while it is not worked out yet.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub advice: Option<Advice>,
}
