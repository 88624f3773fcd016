//! The bench screen: layout first, the sheet, the table of points, what it comes to, pictures, hand-over.
//!
//! Nothing is calculated here but in `crate::bench::stand`.

mod codes;
mod hand_over;
mod head;
mod items;
mod layout;
mod limits;
mod paste;
mod plot;
mod results;
mod screen;
mod table;
mod take_over;
mod warm_plot;

pub use screen::{BenchScreen, BenchScreenProps};
