//! The yard check, the wear of a unit over its hours, and what closed cases taught. Everything that is said comes from
//! [`crate::yard`]; here it is drawn and filled in.

mod change;
mod checked;
mod counters;
mod entry;
mod head;
mod learned;
mod plot;
mod screen;
mod step;
mod verdict;
mod wear;

pub use entry::{YardEntry, start};
pub use learned::LearnedScreen;
pub use screen::{Others, YardScreen};
pub use verdict::verdict_words;
pub use wear::WearScreen;
