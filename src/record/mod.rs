//! Visits and units as they are kept: versions, migration, import, export.

mod visit;

pub use visit::{Answer, Closing, Visit};
