//! Where in the app one is, as the part of the address behind `#`.

use crate::record::is_id;

/// A screen.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub enum Route {
    /// The units of the yard.
    #[default]
    Units,
    /// The profile of one unit, by its id.
    Unit(String),
    /// One call, by the id of its visit.
    Call(String),
    /// The neutral of a call's unit, by the id of the visit.
    Neutral(String),
    /// Straight tracking, within one call.
    Tracking(String),
    /// The hand-over report of a call, by the id of its visit.
    Report(String),
    /// Tags to print: of this unit, or of none yet.
    Tags(Option<String>),
    /// A tag to be read: what was scanned, or nothing yet.
    Tag(String),
    /// The bench sheet of a pump or motor, within one call.
    Bench(String),
    /// Units of measure, instruments, data.
    Settings,
}

impl Route {
    /// Reads the part of an address behind `#`, with or without it. What is not known is the list of units.
    pub fn read(hash: &str) -> Route {
        let path = hash.trim_start_matches('#').trim_matches('/');
        match path.split_once('/') {
            None if path == "settings" => Route::Settings,
            None if path == "tags" => Route::Tags(None),
            None if path == "tag" => Route::Tag(String::new()),
            // What is no tag is told by the screen that reads it.
            Some(("tag", scanned)) => Route::Tag(scanned.to_owned()),
            Some(("unit", id)) if is_id(id) => Route::Unit(id.to_owned()),
            Some(("unit", rest)) => match rest.split_once('/') {
                Some((id, "tag")) if is_id(id) => Route::Tags(Some(id.to_owned())),
                _ => Route::Units,
            },
            Some(("call", id)) if is_id(id) => Route::Call(id.to_owned()),
            Some(("call", rest)) => match rest.split_once('/') {
                Some((id, "neutral")) if is_id(id) => Route::Neutral(id.to_owned()),
                Some((id, "bench")) if is_id(id) => Route::Bench(id.to_owned()),
                Some((id, "tracking")) if is_id(id) => Route::Tracking(id.to_owned()),
                Some((id, "report")) if is_id(id) => Route::Report(id.to_owned()),
                _ => Route::Units,
            },
            _ => Route::Units,
        }
    }

    /// The address, `#` included.
    pub fn href(&self) -> String {
        match self {
            Route::Units => "#/units".to_owned(),
            Route::Unit(id) => format!("#/unit/{id}"),
            Route::Call(id) => format!("#/call/{id}"),
            Route::Neutral(id) => format!("#/call/{id}/neutral"),
            Route::Tracking(id) => format!("#/call/{id}/tracking"),
            Route::Report(id) => format!("#/call/{id}/report"),
            Route::Tags(None) => "#/tags".to_owned(),
            Route::Tags(Some(id)) => format!("#/unit/{id}/tag"),
            Route::Tag(scanned) if scanned.is_empty() => "#/tag".to_owned(),
            Route::Tag(scanned) => format!("#/tag/{scanned}"),
            Route::Bench(id) => format!("#/call/{id}/bench"),
            Route::Settings => "#/settings".to_owned(),
        }
    }
}
