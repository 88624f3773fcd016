//! Parts that several screens use.

pub mod caution;
pub mod choice;
pub mod confirm;
pub mod field;
pub mod icon;
pub mod section;
pub mod select;
pub mod text;

pub use caution::{Caution, Grade};
pub use choice::{Choice, Lay, Opt, tick_options};
pub use confirm::Confirm;
pub use field::{Entry, MeasureField};
pub use icon::{Icon, Shape};
pub use section::Section;
pub use select::Select;
pub use text::TextField;
