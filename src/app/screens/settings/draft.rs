//! An instrument while it is typed. What is not complete yet is kept with the settings, so that nothing typed is lost.

use serde::{Deserialize, Serialize};

use crate::app::parts::{Entry, Opt};
use crate::quantity::{Kind, Measure, UnitPrefs};
use crate::readings::instrument::{
    Accuracy, AsmeGrade, En837Class, Indication, Instrument, InstrumentKind, difference_of,
};
use crate::record::Settings;

/// Under this name the draft is kept with the settings.
const DRAFT: &str = "draft_instrument";

/// How the accuracy is stated, before its figure.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum AccuracyAsk {
    /// Nobody knows.
    #[default]
    NotKnown,
    /// A class on the dial.
    En837(En837Class),
    /// A grade on the dial.
    Asme(AsmeGrade),
    /// A share of the span.
    OfSpan,
    /// A share of the reading.
    OfReading,
    /// A fixed limit.
    Fixed,
}

impl AccuracyAsk {
    /// True where a figure in per cent goes with it.
    pub fn wants_share(self) -> bool {
        matches!(self, AccuracyAsk::OfSpan | AccuracyAsk::OfReading)
    }
}

/// Accuracies as options; classes and grades are for pressure alone.
pub fn accuracy_options(kind: Kind) -> Vec<Opt<AccuracyAsk>> {
    let mut options = vec![Opt::new(AccuracyAsk::NotKnown, "Not known", "not-known")];
    if kind == Kind::Pressure {
        options.extend(En837Class::ALL.iter().map(|class| {
            let percent = class.percent_of_span();
            let words = format!("Class {percent} (EN 837-1)");
            Opt::new(
                AccuracyAsk::En837(*class),
                words,
                format!("class-{percent}"),
            )
        }));
        options.extend(AsmeGrade::ALL.iter().map(|grade| {
            let name = Accuracy::Asme { grade: *grade }.to_string();
            let words = format!("{} (ASME B40.100)", name.replacen('g', "G", 1));
            Opt::new(AccuracyAsk::Asme(*grade), words, name.replace(' ', "-"))
        }));
    }
    options.extend([
        Opt::new(AccuracyAsk::OfSpan, "Per cent of span", "of-span"),
        Opt::new(AccuracyAsk::OfReading, "Per cent of reading", "of-reading"),
        Opt::new(AccuracyAsk::Fixed, "A fixed limit", "fixed"),
    ]);
    options
}

/// The draft.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Draft {
    /// Id of the instrument that is changed; empty for a new one.
    pub id: String,
    /// Name.
    pub name: String,
    /// Sort.
    pub what: Option<InstrumentKind>,
    /// Foot of the scale.
    pub low: Entry,
    /// Top of the scale.
    pub high: Entry,
    /// How the accuracy is stated.
    pub accuracy: AccuracyAsk,
    /// The accuracy in per cent.
    pub share: Entry,
    /// The fixed limit of error.
    pub limit: Entry,
    /// Needle or digits.
    pub indication: Indication,
    /// One division or step.
    pub step: Entry,
}

impl Draft {
    /// The draft that is kept with the settings; an empty one where none is.
    pub fn of(settings: &Settings) -> Draft {
        settings
            .extra
            .get(DRAFT)
            .and_then(|value| serde_json::from_value(value.clone()).ok())
            .unwrap_or_default()
    }

    /// Keeps it with the settings.
    pub fn keep(self, settings: &mut Settings) {
        match serde_json::to_value(&self) {
            Ok(value) if self.is_begun() => settings.extra.insert(DRAFT.to_owned(), value),
            _ => settings.extra.remove(DRAFT),
        };
    }

    /// Takes the draft out of the settings.
    pub fn drop_from(settings: &mut Settings) {
        settings.extra.remove(DRAFT);
    }

    /// True where anything was entered.
    pub fn is_begun(&self) -> bool {
        *self != Draft::default()
    }

    /// True where an instrument of the list is being changed.
    pub fn is_change(&self) -> bool {
        !self.id.is_empty()
    }

    /// A draft that starts from an instrument of the list.
    pub fn from_instrument(instrument: &Instrument, prefs: &UnitPrefs) -> Draft {
        let entry = |measure: Measure| Entry {
            typed: prefs.edit_text(measure),
            value: Some(measure),
        };
        let mut draft = Draft {
            id: instrument.id.clone(),
            name: instrument.name.clone(),
            what: Some(instrument.what),
            low: entry(instrument.span_low),
            high: entry(instrument.span_high),
            indication: instrument.indication,
            step: instrument.resolution.map(entry).unwrap_or_default(),
            ..Draft::default()
        };
        let share = |share: f64| {
            Measure::from_base(share, Kind::Ratio)
                .map(entry)
                .unwrap_or_default()
        };
        match instrument.accuracy {
            Accuracy::NotKnown => {}
            Accuracy::En837 { class } => draft.accuracy = AccuracyAsk::En837(class),
            Accuracy::Asme { grade } => draft.accuracy = AccuracyAsk::Asme(grade),
            Accuracy::OfSpan { share: of_span } => {
                draft.accuracy = AccuracyAsk::OfSpan;
                draft.share = share(of_span);
            }
            Accuracy::OfReading { share: of_reading } => {
                draft.accuracy = AccuracyAsk::OfReading;
                draft.share = share(of_reading);
            }
            Accuracy::Fixed { limit } => {
                draft.accuracy = AccuracyAsk::Fixed;
                draft.limit = entry(limit);
            }
        }
        draft
    }

    /// The instrument, under its own id or a new one.
    ///
    /// # Errors
    /// What is missing or wrong, in words.
    pub fn instrument(&self, new_id: impl FnOnce() -> String) -> Result<Instrument, String> {
        let what = self.what.ok_or("Choose what it is.")?;
        let kind = what.measures();
        let name = self.name.trim();
        if name.is_empty() {
            return Err("Give it a name: it stands beside the readings.".to_owned());
        }
        let given = |entry: &Entry, kind: Kind, what: &str| {
            let value = entry.value.filter(|value| value.kind() == kind);
            value.ok_or_else(|| format!("Type {what}."))
        };
        let share =
            || given(&self.share, Kind::Ratio, "the accuracy in per cent").map(Measure::base);
        let accuracy = match self.accuracy {
            AccuracyAsk::NotKnown => Accuracy::NotKnown,
            AccuracyAsk::En837(class) => Accuracy::En837 { class },
            AccuracyAsk::Asme(grade) => Accuracy::Asme { grade },
            AccuracyAsk::OfSpan => Accuracy::OfSpan { share: share()? },
            AccuracyAsk::OfReading => Accuracy::OfReading { share: share()? },
            AccuracyAsk::Fixed => Accuracy::Fixed {
                limit: given(&self.limit, difference_of(kind), "the limit of error")?,
            },
        };
        let resolution = if self.step.typed.trim().is_empty() {
            None
        } else {
            Some(given(
                &self.step,
                difference_of(kind),
                "one division or step, or leave it empty",
            )?)
        };
        let instrument = Instrument {
            id: if self.id.is_empty() {
                new_id()
            } else {
                self.id.clone()
            },
            name: name.to_owned(),
            what,
            span_low: given(&self.low, kind, "the foot of the scale")?,
            span_high: given(&self.high, kind, "the top of the scale")?,
            accuracy,
            indication: self.indication,
            resolution,
        };
        instrument.check().map_err(|error| format!("{error}."))?;
        Ok(instrument)
    }
}
