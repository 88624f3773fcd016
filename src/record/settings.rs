//! The person's choices and the shop's instruments.

use crate::quantity::UnitPrefs;
use crate::readings::instrument::{Instrument, usual_instruments};
use serde::{Deserialize, Serialize};
use std::collections::BTreeMap;

/// How the screen looks.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Theme {
    /// Dark on light.
    Light,
    /// Light on dark.
    Dark,
    /// Black on white with heavy lines, for a screen in the sun.
    Sun,
    /// As the device is set. A theme of a newer version reads as this one.
    #[default]
    #[serde(other)]
    System,
}

impl Theme {
    /// Every theme, in the order in which a screen offers them.
    pub const ALL: [Theme; 4] = [Theme::System, Theme::Light, Theme::Dark, Theme::Sun];

    /// The code under which it is kept.
    #[must_use]
    pub fn code(self) -> &'static str {
        match self {
            Theme::System => "system",
            Theme::Light => "light",
            Theme::Dark => "dark",
            Theme::Sun => "sun",
        }
    }
}

/// In which order units are listed.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum UnitOrder {
    /// By yard number or name.
    Name,
    /// The one called last first.
    LastCall,
    /// What presses first. An order of a newer version reads as this one.
    #[default]
    #[serde(other)]
    Attention,
}

impl UnitOrder {
    /// Every order, as a screen offers them.
    pub const ALL: [UnitOrder; 3] = [UnitOrder::Attention, UnitOrder::LastCall, UnitOrder::Name];

    /// Words for a screen.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            UnitOrder::Attention => "What presses",
            UnitOrder::LastCall => "Last call",
            UnitOrder::Name => "Name",
        }
    }

    /// True for the order of a device where nobody chose.
    #[must_use]
    pub fn is_usual(&self) -> bool {
        *self == UnitOrder::default()
    }
}

/// What a person has been shown or asked once.
#[derive(Clone, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(default)]
pub struct FirstRun {
    /// The general cautions were read and taken.
    pub cautions_read: bool,
    /// Units of measure were chosen.
    pub units_chosen: bool,
    /// The demo yard was offered.
    pub demo_offered: bool,
    /// How to put the app on the home screen was shown.
    pub install_shown: bool,
    /// The browser was asked to keep the data.
    pub keeping_asked: bool,
    /// Hints put away, by the id of the hint.
    pub hints_done: Vec<String>,
}

/// Settings of this device, and the shop's instruments.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Settings {
    /// Units of measure and decimal mark.
    pub units: UnitPrefs,
    /// Theme.
    pub theme: Theme,
    /// Order of the list of units.
    #[serde(skip_serializing_if = "UnitOrder::is_usual")]
    pub unit_order: UnitOrder,
    /// Large keys of the app's own under the screen while a figure is entered.
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    pub own_keys: bool,
    /// Instruments of the shop.
    pub instruments: Vec<Instrument>,
    /// First-run flags.
    pub first_run: FirstRun,
    /// What is learned from closed cases, and what is left out.
    #[serde(skip_serializing_if = "crate::yard::learn::Learning::is_untouched")]
    pub learning: crate::yard::learn::Learning,
    /// When an export was last made (ISO 8601 text); empty: never.
    pub last_export: String,
    /// Fields written by a newer version: kept as they are.
    #[serde(flatten)]
    pub extra: BTreeMap<String, serde_json::Value>,
}

impl Settings {
    /// Settings of a device that has none yet: metric units and the instruments that are found in most service vans.
    #[must_use]
    pub fn start() -> Self {
        Settings {
            instruments: usual_instruments(),
            ..Settings::default()
        }
    }

    /// The instrument of this id.
    #[must_use]
    pub fn instrument(&self, id: &str) -> Option<&Instrument> {
        self.instruments
            .iter()
            .find(|instrument| instrument.id == id)
    }
}
