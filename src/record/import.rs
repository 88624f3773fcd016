//! Reading a file: any bytes in, checked records or an error with its place out. Nothing is changed by reading.

use super::error::{Problem, RecordError, content};
use super::{APP, Export, Ladder, check, envelope, limits, rescue};
use serde::Serialize;
use serde_json::Value;
use std::collections::BTreeSet;

/// Field that tells an export from any other JSON.
const MARK: &str = "lowside_export";
/// Most remarks about fields that are not kept.
const REMARKS: usize = 20;

impl Export {
    /// Reads an export, or a rescue file (every stored text as it was).
    ///
    /// In this order: size, UTF-8, JSON, what it is, its format, migration, types, counts, ids, texts, spans.
    ///
    /// # Errors
    /// [`RecordError`], with the place.
    pub fn read(bytes: &[u8]) -> Result<Export, RecordError> {
        Self::read_with(bytes, &Ladder::default())
    }

    /// As [`Export::read`], with other migration steps.
    ///
    /// # Errors
    /// As [`Export::read`].
    pub fn read_with(bytes: &[u8], ladder: &Ladder) -> Result<Export, RecordError> {
        let value = json(bytes)?;
        let is_rescue = value.get("app").and_then(Value::as_str) == Some(APP)
            && value.get("kind").and_then(Value::as_str) == Some(rescue::KIND);
        let mut export = if is_rescue {
            rescue::collect(&value, ladder)
        } else {
            typed(value, ladder)?
        };
        settle(&mut export)?;
        Ok(export)
    }
}

fn json(bytes: &[u8]) -> Result<Value, RecordError> {
    let limit = if rescue::begins(bytes) {
        limits::RESCUE_BYTES
    } else {
        limits::FILE_BYTES
    };
    if bytes.len() > limit {
        return Err(RecordError::TooLarge {
            bytes: bytes.len(),
            limit,
        });
    }
    let text = core::str::from_utf8(bytes).map_err(|error| RecordError::NotText {
        at: error.valid_up_to(),
    })?;
    // Some editors put a byte order mark in front.
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    serde_json::from_str(text).map_err(|error| envelope::not_json(&error))
}

fn typed(value: Value, ladder: &Ladder) -> Result<Export, RecordError> {
    let format = match value.get(MARK) {
        None => {
            return Err(RecordError::NotOurs {
                why: format!("the field {MARK:?} is missing"),
            });
        }
        Some(format) => format.as_u64().ok_or_else(|| RecordError::Shape {
            path: MARK.to_owned(),
            why: String::from("must be a whole number"),
        })?,
    };
    let mut value = ladder.climb_export(format, value)?;
    if let Some(mark) = value.get_mut(MARK) {
        *mark = Value::from(ladder.top);
    }
    let mut export: Export = envelope::from_value(&value)?;
    export.remarks = dropped(&value, &export);
    // Instruments have a list of their own; a file that keeps them with the settings is taken as well.
    if let Some(settings) = &mut export.settings {
        export.instruments.append(&mut settings.instruments);
    }
    Ok(export)
}

/// Checks everything and cleans the texts.
fn settle(export: &mut Export) -> Result<(), RecordError> {
    check::clean_line(&mut export.made_at);
    check::clean_line(&mut export.program);
    check::count("units", export.units.len(), limits::UNITS)?;
    check::count("visits", export.visits.len(), limits::VISITS)?;
    check::count("instruments", export.instruments.len(), limits::INSTRUMENTS)?;
    let mut met = BTreeSet::new();
    for (index, unit) in export.units.iter_mut().enumerate() {
        let path = format!("units[{index}]");
        check::id_once(&path, &unit.id, &mut met)?;
        check::unit(&path, unit)?;
    }
    let mut met_visits = BTreeSet::new();
    for (index, visit) in export.visits.iter_mut().enumerate() {
        let path = format!("visits[{index}]");
        check::id_once(&path, &visit.id, &mut met_visits)?;
        check::visit(&path, visit)?;
        if !met.contains(&visit.unit) {
            export.remarks.push(format!(
                "{path}: its unit {:?} is not in this file",
                visit.unit
            ));
        }
    }
    let mut met_instruments = BTreeSet::new();
    for (index, instrument) in export.instruments.iter_mut().enumerate() {
        let path = format!("instruments[{index}]");
        check::id_once(&path, &instrument.id, &mut met_instruments)?;
        check::instrument(&path, instrument)?;
    }
    if let Some(settings) = &mut export.settings {
        check::settings("settings", settings)?;
    }
    let text_length = |text: &str| text.chars().count();
    for (path, text) in [("made_at", &export.made_at), ("program", &export.program)] {
        let length = text_length(text);
        if length > limits::LINE_CHARACTERS {
            return Err(content(
                path,
                Problem::TooLong {
                    length,
                    limit: limits::LINE_CHARACTERS,
                },
            ));
        }
    }
    Ok(())
}

/// Fields of the file that this version does not know and does not keep.
fn dropped(before: &Value, export: &impl Serialize) -> Vec<String> {
    let mut paths = Vec::new();
    if let Ok(after) = serde_json::to_value(export) {
        compare(before, &after, &mut String::new(), &mut paths);
    }
    let more = paths.len().saturating_sub(REMARKS);
    paths.truncate(REMARKS);
    let mut remarks: Vec<String> = paths
        .into_iter()
        .map(|path| format!("{path}: not known to this version, and not kept"))
        .collect();
    if more > 0 {
        remarks.push(format!("{more} more fields are not known to this version"));
    }
    remarks
}

fn compare(before: &Value, after: &Value, path: &mut String, paths: &mut Vec<String>) {
    let length = path.len();
    match (before, after) {
        (Value::Object(before), Value::Object(after)) => {
            for (key, old) in before {
                let dot = if length == 0 { "" } else { "." };
                path.push_str(dot);
                path.extend(key.chars().filter(|c| !c.is_control()).take(80));
                match after.get(key) {
                    Some(new) => compare(old, new, path, paths),
                    None if old.is_null() => {}
                    None => paths.push(path.clone()),
                }
                path.truncate(length);
            }
        }
        (Value::Array(before), Value::Array(after)) => {
            for (index, (old, new)) in before.iter().zip(after).enumerate() {
                path.push_str(&format!("[{index}]"));
                compare(old, new, path, paths);
                path.truncate(length);
            }
        }
        _ => {}
    }
}
