//! The rescue file: every stored text under its key, readable or not. It is written without this program's help when the app
//! cannot start, and read back here as far as each text can be read.

use super::error::RecordError;
use super::migrate::{Ladder, RecordKind};
use super::{APP, Envelope, Export, SCHEMA, check, checksum, id, mend};
use serde_json::Value;
use std::collections::BTreeMap;

/// Kind that a rescue file names.
pub(super) const KIND: &str = "rescue";

/// True where the file begins as a rescue file does: these may be larger than an export.
pub(super) fn begins(bytes: &[u8]) -> bool {
    let head: Vec<u8> = bytes
        .iter()
        .take(200)
        .copied()
        .filter(|byte| !byte.is_ascii_whitespace())
        .collect();
    head.starts_with(format!("{{\"app\":\"{APP}\",\"kind\":\"{KIND}\"").as_bytes())
}

/// Collects the records of a rescue file. What cannot be read is named in the remarks. Trash and backups stay behind.
pub(super) fn collect(value: &Value, ladder: &Ladder) -> Export {
    let text_of = |field: &str| value.get(field).and_then(Value::as_str).unwrap_or_default();
    let mut export = Export {
        format: SCHEMA,
        made_at: text_of("saved_at").to_owned(),
        program: format!("lowside {}", text_of("version")),
        ..Export::default()
    };
    let mut bodies = BTreeMap::new();
    let stored = value.get("stored").and_then(Value::as_object);
    for (key, text) in stored.into_iter().flatten() {
        let Some(text) = text.as_str().filter(|_| holds_record(key)) else {
            continue;
        };
        let text = crate::pack::text_of(text.to_owned());
        let text = text.as_str();
        // A slot names its record in the first line.
        let text = if key.contains("/slot/") {
            text.split_once('\n').map_or("", |(_, text)| text)
        } else {
            text
        };
        if let Err(error) = take(text, ladder, &mut export, &mut bodies) {
            export.remarks.push(format!("{key}: {error}"));
        }
    }
    export
}

fn holds_record(key: &str) -> bool {
    ["lowside/v1/unit/", "lowside/v1/visit/", "lowside/v1/slot/"]
        .iter()
        .any(|prefix| key.starts_with(prefix))
        || key == "lowside/v1/settings"
}

/// Bodies taken so far, by kind and id, so that a slot that repeats its record is not taken twice.
type Taken = BTreeMap<(RecordKind, String), Vec<String>>;

fn take(
    text: &str,
    ladder: &Ladder,
    export: &mut Export,
    taken: &mut Taken,
) -> Result<(), RecordError> {
    let envelope = Envelope::open(text)?;
    let mut fresh_id = |id: &str| {
        let bodies = taken.entry((envelope.kind, id.to_owned())).or_default();
        if bodies.contains(&envelope.stamp.sum) {
            return None;
        }
        bodies.push(envelope.stamp.sum.clone());
        let is_first = bodies.len() == 1;
        Some(if is_first {
            id.to_owned()
        } else {
            id::with_ending(id, &ending(&envelope.body))
        })
    };
    match envelope.kind {
        RecordKind::Unit => {
            let unit: crate::unit::Unit = envelope.record(ladder)?;
            let mut unit = mend::unit(&unit);
            check::unit("record", &mut unit)?;
            if let Some(id) = fresh_id(&unit.id) {
                unit.id = id;
                export.units.push(unit);
            }
        }
        RecordKind::Visit => {
            let visit: super::Visit = envelope.record(ladder)?;
            let mut visit = mend::visit(&visit);
            check::visit("record", &mut visit)?;
            if let Some(id) = fresh_id(&visit.id) {
                visit.id = id;
                export.visits.push(visit);
            }
        }
        RecordKind::Settings => {
            let mut settings: super::Settings = envelope.record(ladder)?;
            if export.settings.is_none() {
                export.instruments.append(&mut settings.instruments);
                export.settings = Some(settings);
            }
        }
    }
    Ok(())
}

/// Ending of the id of a copy: the same content always gets the same one.
pub(super) fn ending(content: &str) -> String {
    let mut sum = checksum(content);
    sum.truncate(8);
    format!("-{sum}")
}
