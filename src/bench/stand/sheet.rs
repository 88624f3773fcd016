//! The bench sheet as it is kept: every text as typed, so that even what cannot be read comes back.

use super::channel::{Channel, Gauged, MeasuringClass, Subject};
use super::items::ItemId;
use super::layout::Layout;
use crate::fluid::{IsoGrade, Oil, OilProperties, OilViscosity, USUAL_INDEX};
use crate::quantity::Typed;
use crate::quantity::{Measure, Unit};
use crate::readings::Path;
use serde::{Deserialize, Serialize};
use std::collections::BTreeMap;

/// Most rows of one table.
pub const ROWS: usize = 400;
/// Usual spread of an oil about its grade, 1 sigma, where no viscosity was measured: half of the grade's ±10 % as a
/// rectangular distribution, with ageing. Common practice.
pub const GRADE_SPREAD: f64 = 0.07;
/// The same where the viscosity at 40 °C was measured.
pub const MEASURED_SPREAD: f64 = 0.02;

/// A row of the table: one reading of all channels.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Row {
    /// Stable id.
    pub id: String,
    /// Name of the point; rows of one name are repeated readings of one point.
    pub name: String,
    /// What was typed.
    pub cells: BTreeMap<Channel, Typed>,
    /// Left out of the reckoning, though it stays on the sheet.
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    pub is_left_out: bool,
}

impl Row {
    /// A row of figures in the channels' units, for tests and examples.
    ///
    /// # Panics
    /// Where a figure is not finite.
    #[must_use]
    pub fn of(name: &str, cells: &[(Channel, f64)]) -> Row {
        let cell = |(channel, value): &(Channel, f64)| {
            let (unit, ..) = channel.asks();
            let typed = Typed {
                typed: format!("{value}"),
                value: Some(Measure::literal(*value, unit)),
            };
            (*channel, typed)
        };
        Row {
            name: name.to_owned(),
            cells: cells.iter().map(cell).collect(),
            ..Row::default()
        }
    }

    /// A cell in the channel's unit; none where it is empty or cannot be read.
    #[must_use]
    pub fn value(&self, channel: Channel) -> Option<f64> {
        let (unit, ..) = channel.asks();
        self.cells.get(&channel)?.value?.try_in_unit(unit).ok()
    }

    /// True where it is reckoned with.
    #[must_use]
    pub fn counts(&self) -> bool {
        !self.is_left_out && self.cells.values().any(|cell| cell.value.is_some())
    }
}

/// How an instrument's limit of error is stated.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Of {
    /// By the class of the stand.
    #[default]
    Class,
    /// Per cent of the reading.
    Reading,
    /// Per cent of the span.
    Span,
}

/// The instrument of a channel.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Meter {
    /// How its limit is stated.
    pub of: Of,
    /// Limit of error, per cent.
    pub limit: Typed,
    /// Span, in the channel's unit.
    pub span: Typed,
    /// Its mark or number.
    pub mark: String,
    /// When it was calibrated, as it stands on its tag.
    pub calibrated: String,
}

/// A figure of the head.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Head {
    /// Displacement on the plate.
    Displacement,
    /// Displacement of the charge pump.
    ChargeDisplacement,
    /// Displacement in use over largest, where it was not at full stroke.
    Stroke,
    /// Rated speed.
    RatedSpeed,
    /// Rated pressure difference.
    RatedPressure,
    /// Viscosity at 40 °C: the grade, or measured.
    Viscosity,
    /// Viscosity index.
    Index,
    /// Water or air that carries heat away is not metered: outside losses, kW.
    HeatLost,
}

impl Head {
    /// Every figure.
    pub const ALL: [Head; 8] = [
        Head::Displacement,
        Head::ChargeDisplacement,
        Head::Stroke,
        Head::RatedSpeed,
        Head::RatedPressure,
        Head::Viscosity,
        Head::Index,
        Head::HeatLost,
    ];

    /// Unit in which it is asked for, lowest and highest taken, in that unit.
    #[must_use]
    pub const fn asks(self) -> (Unit, f64, f64) {
        match self {
            Head::Displacement => (Unit::CubicCentimetrePerRevolution, 1.0, 10_000.0),
            Head::ChargeDisplacement => (Unit::CubicCentimetrePerRevolution, 0.5, 500.0),
            Head::Stroke => (Unit::Percent, 10.0, 100.0),
            Head::RatedSpeed => (Unit::RevolutionPerMinute, 20.0, 8_000.0),
            Head::RatedPressure => (Unit::Bar, 20.0, 700.0),
            Head::Viscosity => (Unit::SquareMillimetrePerSecond, 5.0, 400.0),
            Head::Index => (Unit::Fraction, 20.0, 350.0),
            Head::HeatLost => (Unit::Kilowatt, 0.0, 200.0),
        }
    }

    /// Label.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Head::Displacement => "Displacement on the plate",
            Head::ChargeDisplacement => "Charge pump displacement",
            Head::Stroke => "Stroke during the run",
            Head::RatedSpeed => "Rated speed",
            Head::RatedPressure => "Rated pressure difference",
            Head::Viscosity => "Viscosity at 40 °C",
            Head::Index => "Viscosity index",
            Head::HeatLost => "Heat lost to the room",
        }
    }
}

/// A line of text of the sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum TextId {
    /// Serial number.
    Serial,
    /// Code letters on the plate.
    Code,
    /// Rotation.
    Rotation,
    /// Shaft and control.
    Control,
    /// What the customer asks for.
    Customer,
    /// Cleanliness before.
    CleanBefore,
    /// Cleanliness after.
    CleanAfter,
    /// Who ran it.
    Name,
    /// Note.
    Note,
}

impl TextId {
    /// Every line.
    pub const ALL: [TextId; 9] = [
        TextId::Serial,
        TextId::Code,
        TextId::Rotation,
        TextId::Control,
        TextId::Customer,
        TextId::CleanBefore,
        TextId::CleanAfter,
        TextId::Name,
        TextId::Note,
    ];

    /// Label.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            TextId::Serial => "Serial number",
            TextId::Code => "Code letters on the plate",
            TextId::Rotation => "Rotation, seen on the shaft",
            TextId::Control => "Shaft end and control",
            TextId::Customer => "What the customer asks for",
            TextId::CleanBefore => "Cleanliness before (ISO 4406)",
            TextId::CleanAfter => "Cleanliness after (ISO 4406)",
            TextId::Name => "Run by",
            TextId::Note => "Note",
        }
    }
}

/// How an item of the sheet came out.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct ItemEntry {
    /// Figure found.
    pub found: Typed,
    /// Lowest allowed, where the manual or customer states one.
    pub low: Typed,
    /// Highest allowed.
    pub high: Typed,
    /// For items that are done or not: done and good, or not good.
    pub is_good: Option<bool>,
    /// Not tested on purpose, and why.
    pub skipped: Option<String>,
    /// Note.
    pub note: String,
}

/// The sheet.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct BenchSheet {
    /// What stands on the bench.
    pub subject: Subject,
    /// Of which side it is, on a machine with two.
    pub path: Option<Path>,
    /// Lines of text.
    pub texts: BTreeMap<TextId, String>,
    /// Figures of the head.
    pub head: BTreeMap<Head, Typed>,
    /// True where the viscosity at 40 °C was measured, not read off the drum.
    pub is_viscosity_measured: bool,
    /// Layout.
    pub layout: Layout,
    /// Class of the stand.
    pub class: MeasuringClass,
    /// Instruments that are stated on their own.
    pub meters: BTreeMap<Channel, Meter>,
    /// Columns in use beside the usual ones.
    pub columns: Vec<Channel>,
    /// The table.
    pub rows: Vec<Row>,
    /// Items of the sheet.
    pub items: BTreeMap<ItemId, ItemEntry>,
    /// Limits that were typed for the run as a whole, per item of [`super::judge::Measurand`].
    pub limits: BTreeMap<super::judge::Measurand, super::judge::TypedLimit>,
    /// Limits at points and along curves.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub acceptance: Vec<super::acceptance::Acceptance>,
    /// When what it found was taken into the profile (ISO 8601 text).
    pub taken_over: Option<String>,
    /// Fields written by a newer version: kept as they are.
    #[serde(flatten)]
    pub extra: BTreeMap<String, serde_json::Value>,
}

impl BenchSheet {
    /// A figure of the head in the unit that it is asked in.
    #[must_use]
    pub fn head(&self, head: Head) -> Option<f64> {
        let (unit, ..) = head.asks();
        self.head.get(&head)?.value?.try_in_unit(unit).ok()
    }

    /// The instrument of a channel.
    #[must_use]
    pub fn gauged(&self, channel: Channel) -> Gauged {
        let class = Gauged::Class(self.class);
        let Some(meter) = self.meters.get(&channel) else {
            return class;
        };
        let (unit, ..) = channel.asks();
        let limit = meter
            .limit
            .value
            .and_then(|m| m.try_in_unit(Unit::Fraction).ok());
        let span = meter.span.value.and_then(|m| m.try_in_unit(unit).ok());
        match (meter.of, limit, span) {
            (Of::Reading, Some(share), _) => Gauged::OfReading(share),
            (Of::Span, Some(share), Some(span)) => Gauged::Fixed(share * span),
            _ => class,
        }
    }

    /// The oil, with the 1-sigma share by which its viscosity may differ; none where no viscosity is given or no oil has it.
    #[must_use]
    pub fn oil(&self) -> Option<(OilProperties, f64)> {
        let kv40 = self.head(Head::Viscosity)?;
        let index = self.head(Head::Index).unwrap_or(USUAL_INDEX);
        let oil = Oil {
            viscosity: OilViscosity::Index {
                kv40: Measure::new(kv40, Unit::SquareMillimetrePerSecond).ok()?,
                index,
            },
            density_15: None,
        };
        let spread = if self.is_viscosity_measured {
            MEASURED_SPREAD
        } else {
            GRADE_SPREAD
        };
        Some((oil.properties().ok()?, spread))
    }

    /// The nearest grade of its oil, for words.
    #[must_use]
    pub fn grade(&self) -> Option<IsoGrade> {
        IsoGrade::of_viscosity(self.head(Head::Viscosity)?)
    }

    /// Columns of the table: the usual ones, those added, and those that hold something.
    #[must_use]
    pub fn table_columns(&self) -> Vec<Channel> {
        let holds = |channel: &Channel| {
            self.rows
                .iter()
                .any(|row| row.cells.get(channel).is_some_and(|cell| !cell.is_blank()))
        };
        Channel::ALL
            .into_iter()
            .filter(|channel| {
                (Channel::usual(self.subject).contains(channel)
                    || self.columns.contains(channel)
                    || holds(channel))
                    && (channel.belongs(self.subject) || holds(channel))
            })
            .collect()
    }

    /// True where nothing was entered.
    #[must_use]
    pub fn is_blank(&self) -> bool {
        *self
            == BenchSheet {
                subject: self.subject,
                path: self.path,
                class: self.class,
                ..BenchSheet::default()
            }
    }
}
