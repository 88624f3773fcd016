//! The export file: one JSON text with units, visits, instruments and settings.
//!
//! ```json
//! { "lowside_export": 1, "made_at": "2025-03-04T07:40:00Z", "program": "lowside 0.1.0",
//!   "units": [ … ], "visits": [ … ], "instruments": [ … ], "settings": { … } }
//! ```

use super::error::RecordError;
use super::{Book, FirstRun, SCHEMA, Settings, Visit, limits, mend};
use crate::readings::instrument::Instrument;
use crate::unit::Unit;
use serde::{Deserialize, Serialize};
use serde_json::Value;
use std::collections::{BTreeMap, BTreeSet};

/// An export, as it goes out and as it comes in. What [`Export::read`] gives has been checked: ids are ids and stand once,
/// figures are finite and within their spans, texts are short enough and free of control characters.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Export {
    /// Format number.
    #[serde(rename = "lowside_export")]
    pub format: u32,
    /// When it was made (ISO 8601 text).
    pub made_at: String,
    /// Program and version that made it.
    pub program: String,
    /// Units.
    pub units: Vec<Unit>,
    /// Visits.
    pub visits: Vec<Visit>,
    /// Instruments of the shop.
    pub instruments: Vec<Instrument>,
    /// Settings, without what concerns one device only.
    pub settings: Option<Settings>,
    /// Fields written by a newer version.
    #[serde(flatten)]
    pub extra: BTreeMap<String, Value>,
    /// What a person should know about this file: fields that are not kept, records that could not be read.
    #[serde(skip)]
    pub remarks: Vec<String>,
}

impl Export {
    /// The whole book.
    #[must_use]
    pub fn of(book: &Book, made_at: &str) -> Self {
        let mut settings = book.settings.clone();
        let instruments = std::mem::take(&mut settings.instruments);
        settings.first_run = FirstRun::default();
        settings.last_export.clear();
        Export {
            units: book.units.values().map(mend::unit).collect(),
            visits: book.visits.values().map(mend::visit).collect(),
            instruments,
            settings: Some(settings),
            ..Export::empty(made_at)
        }
    }

    /// One visit with its unit and the instruments that were used: to hand a call on. None where it is not in the book.
    #[must_use]
    pub fn of_visit(book: &Book, id: &str, made_at: &str) -> Option<Self> {
        let visit = book.visit(id)?;
        let used: BTreeSet<&str> = visit
            .riggings
            .iter()
            .map(|rigging| rigging.instrument.as_str())
            .collect();
        let instruments = &book.settings.instruments;
        Some(Export {
            units: book.unit(&visit.unit).map(mend::unit).into_iter().collect(),
            visits: vec![mend::visit(visit)],
            instruments: instruments
                .iter()
                .filter(|i| used.contains(i.id.as_str()))
                .cloned()
                .collect(),
            ..Export::empty(made_at)
        })
    }

    fn empty(made_at: &str) -> Self {
        Export {
            format: SCHEMA,
            made_at: made_at.to_owned(),
            program: format!("lowside {}", env!("CARGO_PKG_VERSION")),
            ..Export::default()
        }
    }

    /// The file, or several where one would be larger than what is read again. Each holds the units of its visits and all
    /// instruments, so that each can be used alone.
    ///
    /// # Errors
    /// [`RecordError::NotJson`] where a record cannot be written; the screens let none come about.
    pub fn texts(&self) -> Result<Vec<String>, RecordError> {
        let whole = self.text()?;
        if whole.len() <= limits::FILE_BYTES {
            return Ok(vec![whole]);
        }
        self.parts()?.iter().map(Export::text).collect()
    }

    /// One JSON text, whatever its size.
    ///
    /// # Errors
    /// As [`Export::texts`].
    pub fn text(&self) -> Result<String, RecordError> {
        to_text(self)
    }

    fn parts(&self) -> Result<Vec<Export>, RecordError> {
        let units: BTreeMap<&str, (&Unit, usize)> = self
            .units
            .iter()
            .map(|unit| Ok((unit.id.as_str(), (unit, to_text(unit)?.len() + 1))))
            .collect::<Result<_, RecordError>>()?;
        let head = Export {
            units: Vec::new(),
            visits: Vec::new(),
            ..self.clone()
        };
        let room = limits::FILE_BYTES.saturating_sub(to_text(&head)?.len());
        let mut parts = Vec::new();
        let mut part = Part {
            export: head.clone(),
            room,
        };
        let mut next = |part: &mut Part| {
            // Settings and fields of a newer version stand in the first part alone.
            let fresh = Export {
                settings: None,
                extra: BTreeMap::new(),
                ..head.clone()
            };
            parts.push(std::mem::replace(&mut part.export, fresh));
            part.room = room;
        };
        let mut placed = BTreeSet::new();
        for visit in &self.visits {
            let own = to_text(visit)?.len() + 1;
            let unit = units.get(visit.unit.as_str());
            let unit_size = if part.holds(&visit.unit) {
                0
            } else {
                unit.map_or(0, |(_, size)| *size)
            };
            if own + unit_size > part.room && !part.is_empty() {
                next(&mut part);
            }
            if let Some((unit, size)) = unit.filter(|_| !part.holds(&visit.unit)) {
                part.export.units.push((*unit).clone());
                part.room = part.room.saturating_sub(*size);
                placed.insert(unit.id.as_str());
            }
            part.export.visits.push(visit.clone());
            part.room = part.room.saturating_sub(own);
        }
        for (unit, size) in units
            .values()
            .filter(|(unit, _)| !placed.contains(unit.id.as_str()))
        {
            if *size > part.room && !part.is_empty() {
                next(&mut part);
            }
            part.export.units.push((*unit).clone());
            part.room = part.room.saturating_sub(*size);
        }
        parts.push(part.export);
        Ok(parts)
    }
}

/// A file that is being filled.
struct Part {
    export: Export,
    room: usize,
}

impl Part {
    fn is_empty(&self) -> bool {
        self.export.units.is_empty() && self.export.visits.is_empty()
    }

    fn holds(&self, unit: &str) -> bool {
        self.export.units.iter().any(|there| there.id == unit)
    }
}

fn to_text(value: &impl Serialize) -> Result<String, RecordError> {
    serde_json::to_string(value).map_err(|error| super::envelope::not_json(&error))
}
