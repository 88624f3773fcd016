//! The engine in its worker, so that no calculation ever blocks a screen.
//!
//! The page sends JSON `{call: {seq, unit, visit, instruments, rates}}` and gets `{seq, assessment}` or `{seq, error}` back: a
//! first look where little is new, the full assessment, and the same with the advice on what to do next, all but the last with
//! `more` set. A question that comes in between calls the rest of the older one off. `{neutral: {seq, unit, sheet}}` is a
//! neutral sheet to be worked out: it is answered at once, with `{seq, neutral}`. A worker that is ready says so with `{seq: 0}`.

pub mod client;
pub mod worker;

use crate::assessment::Assessment;
use crate::neutral::report::Report;
use serde::{Deserialize, Serialize};

/// What the page asks: of a call, or of a neutral sheet.
#[derive(Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
enum Asked<Call, Sheet> {
    Call(Call),
    Neutral(Sheet),
}

/// What the worker answers.
#[derive(Debug, Serialize, Deserialize)]
struct Reply {
    /// Number of the request.
    seq: u32,
    /// The assessment.
    #[serde(default)]
    assessment: Option<Assessment>,
    /// Why there is none.
    #[serde(default)]
    error: Option<String>,
    /// A fuller answer to the same question follows.
    #[serde(default)]
    more: bool,
    /// A neutral sheet worked out.
    #[serde(default)]
    neutral: Option<Box<Report>>,
}

impl Reply {
    /// Says that the worker is there.
    const READY: Reply = Reply {
        seq: 0,
        assessment: None,
        error: None,
        more: false,
        neutral: None,
    };

    fn is_ready(&self) -> bool {
        self.seq == 0 && self.error.is_none()
    }
}
