//! Visits and units as they are kept: versions, migration, import, export.
//!
//! * [`Book`] holds everything in memory: units, visits, [`Settings`].
//! * [`Envelope`] stands round each stored record; [`migrate`] brings old formats up to [`SCHEMA`].
//! * [`Export`] is the file: `Export::of(&book, …).text()` writes one, [`Export::read`] takes any bytes and gives records or a
//!   [`RecordError`] that says where it is wrong. [`ImportPlan`] shows what taking it in would do before anything is changed.
//! * [`limits`] says how much a record may hold; fields on a screen keep to them.

pub mod archive;
pub mod backup;
mod bench;
mod book;
mod check;
mod envelope;
mod error;
mod export;
mod id;
mod import;
mod jug;
pub mod limits;
mod mend;
pub mod migrate;
pub mod neutral;
mod plan;
mod rescue;
mod settings;
mod sum;
mod tracking;
mod visit;
mod yard;

pub use book::{Book, natural};
pub use envelope::{APP, Envelope, Stamp};
pub use error::{Problem, RecordError};
pub use export::Export;
pub use id::{IdOf, is_id, new_id};
pub use migrate::{Ladder, RecordKind, SCHEMA, STEPS, Step, Subject};
pub use neutral::NeutralSheet;
pub use plan::{Fate, ImportPlan, Planned, Taken};
pub use settings::{FirstRun, Settings, Theme, UnitOrder};
pub use sum::checksum;
pub use visit::{Afterwards, Answer, Closing, Earlier, PutBack, Visit};
