//! Every storage key, in one table. These names stand on people's phones: they change only with a migration.
//!
//! | key | what stands there |
//! | --- | --- |
//! | `lowside/v1/index` | list of the records there are; rebuilt from the keys |
//! | `lowside/v1/settings` | settings and instruments |
//! | `lowside/v1/unit/<id>` | a unit |
//! | `lowside/v1/visit/<id>` | a visit |
//! | `lowside/v1/slot/<tab>` | the record that this tab wrote last: survives a crash between two writes |
//! | `lowside/v1/trash/<time>/<kind>/<id>` | a record put in the trash |
//! | `lowside/backup/v<format>/<kind>/<id>` | the text of a record as it was before its format was changed |
//! | `lowside/quarantine/<time>/<key>` | a text that could not be read, as it was |

use crate::record::{RecordKind, is_id};

/// Beginning of every key of this app.
pub const PREFIX: &str = "lowside/";
pub(super) const INDEX: &str = "lowside/v1/index";
pub(super) const SLOT: &str = "lowside/v1/slot/";
pub(super) const TRASH: &str = "lowside/v1/trash/";
pub(super) const QUARANTINE: &str = "lowside/quarantine/";
const BACKUP: &str = "lowside/backup/";
const SETTINGS: &str = "lowside/v1/settings";
const UNIT: &str = "lowside/v1/unit/";
const VISIT: &str = "lowside/v1/visit/";

/// Names one record.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum RecordKey {
    /// The settings.
    Settings,
    /// The unit of this id.
    Unit(String),
    /// The visit of this id.
    Visit(String),
}

impl RecordKey {
    /// Kind of the record.
    #[must_use]
    pub fn kind(&self) -> RecordKind {
        match self {
            RecordKey::Settings => RecordKind::Settings,
            RecordKey::Unit(_) => RecordKind::Unit,
            RecordKey::Visit(_) => RecordKind::Visit,
        }
    }

    /// Id of the record; empty for the settings.
    #[must_use]
    pub fn id(&self) -> &str {
        match self {
            RecordKey::Settings => "",
            RecordKey::Unit(id) | RecordKey::Visit(id) => id,
        }
    }

    /// The storage key.
    #[must_use]
    pub fn path(&self) -> String {
        match self {
            RecordKey::Settings => SETTINGS.to_owned(),
            RecordKey::Unit(id) => format!("{UNIT}{id}"),
            RecordKey::Visit(id) => format!("{VISIT}{id}"),
        }
    }

    /// The record of a storage key; none where the key is not a record's.
    #[must_use]
    pub fn from_path(path: &str) -> Option<RecordKey> {
        if path == SETTINGS {
            return Some(RecordKey::Settings);
        }
        let id = |prefix| {
            path.strip_prefix(prefix)
                .filter(|id| is_id(id))
                .map(str::to_owned)
        };
        id(UNIT)
            .map(RecordKey::Unit)
            .or_else(|| id(VISIT).map(RecordKey::Visit))
    }

    /// Name for a message: "unit u12ab".
    #[must_use]
    pub fn words(&self) -> String {
        match self {
            RecordKey::Settings => String::from("settings"),
            RecordKey::Unit(id) => format!("unit {id}"),
            RecordKey::Visit(id) => format!("visit {id}"),
        }
    }

    /// `kind/id`, as it stands in the index and at the end of other keys.
    pub(super) fn tail(&self) -> String {
        match self {
            RecordKey::Settings => String::from("settings"),
            RecordKey::Unit(id) => format!("unit/{id}"),
            RecordKey::Visit(id) => format!("visit/{id}"),
        }
    }

    pub(super) fn from_tail(tail: &str) -> Option<RecordKey> {
        RecordKey::from_path(&format!("lowside/v1/{tail}"))
    }
}

/// Key of a tab's slot.
pub(super) fn slot(tab: &str) -> String {
    format!("{SLOT}{tab}")
}

/// Key of a backup taken before a record of format `schema` is written in a newer one.
pub(super) fn backup(schema: u64, key: &RecordKey) -> String {
    format!("{BACKUP}v{schema}/{}", key.tail())
}

/// Key in the trash.
pub(super) fn trash(now: &str, key: &RecordKey) -> String {
    format!("{TRASH}{}/{}", moment(now), key.tail())
}

/// Time and record of a key in the trash.
pub(super) fn from_trash(path: &str) -> Option<(String, RecordKey)> {
    let (when, tail) = path.strip_prefix(TRASH)?.split_once('/')?;
    Some((when.to_owned(), RecordKey::from_tail(tail)?))
}

/// Key in the quarantine.
pub(super) fn quarantine(now: &str, path: &str) -> String {
    format!(
        "{QUARANTINE}{}/{}",
        moment(now),
        path.strip_prefix(PREFIX).unwrap_or(path)
    )
}

/// Time and former key of a key in the quarantine.
pub(super) fn from_quarantine(path: &str) -> Option<(String, String)> {
    let (when, rest) = path.strip_prefix(QUARANTINE)?.split_once('/')?;
    Some((when.to_owned(), format!("{PREFIX}{rest}")))
}

/// A moment as part of a key: without the separator.
fn moment(now: &str) -> String {
    if now.is_empty() {
        String::from("unknown")
    } else {
        now.replace('/', "-")
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn keys_lead_back_to_their_records() {
        for key in [
            RecordKey::Settings,
            RecordKey::Unit("u1".into()),
            RecordKey::Visit("demo-v.2".into()),
        ] {
            assert_eq!(RecordKey::from_path(&key.path()), Some(key.clone()));
            assert_eq!(
                from_trash(&trash("2025/x", &key)),
                Some((String::from("2025-x"), key.clone()))
            );
            assert_eq!(
                from_quarantine(&quarantine("", &key.path())),
                Some((String::from("unknown"), key.path()))
            );
        }
        for path in [
            "lowside/v1/unit/",
            "lowside/v1/unit/a/b",
            "lowside/v2/settings",
            "lowside/v1/index",
            "x",
        ] {
            assert_eq!(RecordKey::from_path(path), None, "{path}");
        }
    }
}
