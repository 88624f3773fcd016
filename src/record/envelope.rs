//! The envelope round a stored record: what it is, which format, which state of it, who wrote it, and a checksum.

use super::migrate::{Ladder, RecordKind, Subject};
use super::{RecordError, checksum};
use serde::de::DeserializeOwned;
use serde::{Deserialize, Serialize};
use serde_json::Value;
use serde_json::value::RawValue;

/// Name that stands in every envelope.
pub const APP: &str = "lowside";

/// Which state of a record: changes with every save, and names the tab that wrote it.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Stamp {
    /// Counts the saves of this record.
    pub rev: u64,
    /// Tab (one loading of the page) that wrote it.
    pub tab: String,
    /// Checksum of the body text.
    pub sum: String,
}

/// An envelope that was opened: its body is still text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Envelope {
    /// Kind of record.
    pub kind: RecordKind,
    /// Format number.
    pub schema: u64,
    /// State.
    pub stamp: Stamp,
    /// When it was saved (ISO 8601 text).
    pub saved_at: String,
    /// The record as JSON text, byte for byte as it was written.
    pub body: String,
}

/// How an envelope stands in storage.
#[derive(Serialize, Deserialize)]
struct Stored<'a> {
    app: String,
    kind: String,
    schema: u64,
    rev: u64,
    #[serde(default)]
    saved_at: String,
    #[serde(default)]
    tab: String,
    #[serde(default)]
    sum: String,
    #[serde(borrow)]
    body: &'a RawValue,
}

impl Envelope {
    /// Text for storage.
    ///
    /// # Errors
    /// [`RecordError::NotJson`] where the body is no JSON.
    pub fn write(&self) -> Result<String, RecordError> {
        let body: &RawValue = serde_json::from_str(&self.body).map_err(|e| not_json(&e))?;
        serde_json::to_string(&Stored {
            app: APP.to_owned(),
            kind: self.kind.code().to_owned(),
            schema: self.schema,
            rev: self.stamp.rev,
            saved_at: self.saved_at.clone(),
            tab: self.stamp.tab.clone(),
            sum: checksum(&self.body),
            body,
        })
        .map_err(|e| not_json(&e))
    }

    /// Opens a stored text and checks its checksum. The body is not looked into, so that records of newer versions open too.
    ///
    /// # Errors
    /// [`RecordError::NotJson`], [`RecordError::NotOurs`], [`RecordError::Damaged`].
    pub fn open(text: &str) -> Result<Envelope, RecordError> {
        let stored: Stored = serde_json::from_str(text).map_err(|e| match e.classify() {
            serde_json::error::Category::Data => RecordError::NotOurs { why: e.to_string() },
            _ => not_json(&e),
        })?;
        let kind = RecordKind::from_code(&stored.kind)
            .filter(|_| stored.app == APP)
            .ok_or_else(|| RecordError::NotOurs {
                why: format!("app {:?}, kind {:?}", stored.app, stored.kind),
            })?;
        let found = checksum(stored.body.get());
        if found != stored.sum {
            return Err(RecordError::Damaged {
                found,
                expected: stored.sum,
            });
        }
        Ok(Envelope {
            kind,
            schema: stored.schema,
            stamp: Stamp {
                rev: stored.rev,
                tab: stored.tab,
                sum: found,
            },
            saved_at: stored.saved_at,
            body: stored.body.get().to_owned(),
        })
    }

    /// The record in it, brought to today's format.
    ///
    /// # Errors
    /// [`RecordError::Newer`], [`RecordError::Migration`], [`RecordError::Shape`] with the path.
    pub fn record<T: DeserializeOwned>(&self, ladder: &Ladder) -> Result<T, RecordError> {
        // Nearly every record is of today's format, and thousands are read at the start: the way by a tree of values, which also
        // tells the place of an error, is taken only where this one fails.
        if self.schema == u64::from(ladder.top)
            && let Ok(record) = serde_json::from_str(&self.body)
        {
            return Ok(record);
        }
        let value = serde_json::from_str(&self.body).map_err(|e| not_json(&e))?;
        let value = ladder.climb(Subject::Record(self.kind), self.schema, value)?;
        from_value(&value)
    }

    /// The record in it as far as this version understands a newer one; none where it cannot be read at all.
    #[must_use]
    pub fn glimpse<T: DeserializeOwned>(&self) -> Option<T> {
        serde_json::from_str(&self.body).ok()
    }
}

/// A JSON error in our words, with line and column.
pub(super) fn not_json(error: &serde_json::Error) -> RecordError {
    RecordError::NotJson {
        why: error.to_string(),
    }
}

/// Turns a JSON value into a record, with the path where it cannot be done.
pub(super) fn from_value<T: DeserializeOwned>(value: &Value) -> Result<T, RecordError> {
    serde_path_to_error::deserialize(value).map_err(|error| {
        let path = error.path().to_string();
        RecordError::Shape {
            path: match path.find(UNNAMED) {
                _ if path == "." => String::from("the file"),
                Some(at) => name_key::<T>(value, &path, at).unwrap_or(path),
                None => path,
            },
            why: error.into_inner().to_string(),
        }
    })
}

/// How a key that is not a plain text (a port, a figure) stands in a path.
const UNNAMED: &str = ".?";

/// Puts the name of the faulty key in its place in the path, found by halving the table that it stands in.
fn name_key<T: DeserializeOwned>(value: &Value, path: &str, at: usize) -> Option<String> {
    let (table_path, rest) = path.split_at_checked(at)?;
    let pointer = format!("/{}", table_path.replace(['.', '['], "/").replace(']', ""));
    let table = value.pointer(&pointer)?.as_object()?;
    let mut keys: Vec<&String> = table.keys().collect();
    let mut trial = value.clone();
    while keys.len() > 1 {
        let other = keys.split_off(keys.len() / 2);
        let some = keys
            .iter()
            .filter_map(|key| Some(((*key).clone(), table.get(*key)?.clone())))
            .collect();
        *trial.pointer_mut(&pointer)? = Value::Object(some);
        let error = serde_path_to_error::deserialize::<_, T>(&trial).err();
        if error.is_none_or(|error| error.path().to_string() != path) {
            keys = other;
        }
    }
    Some(format!(
        "{table_path}.{}{}",
        keys.first()?,
        rest.get(UNNAMED.len()..)?
    ))
}
