//! Parts that several screens use.

pub mod caution;
pub mod choice;
pub mod confirm;
pub mod field;
pub mod icon;
pub mod late;
pub mod own_keys;
pub mod retold;
pub mod same;
pub mod section;
pub mod select;
pub mod sound_switch;
pub mod stopwatch;
pub mod tap_counter;
pub mod text;

pub use caution::{Caution, Grade};
pub use choice::{Choice, Lay, Opt, tick_options};
pub use confirm::Confirm;
pub use field::{Entry, MeasureField};
pub use icon::{Icon, Shape};
pub use late::{Late, LateProps};
pub use own_keys::OwnKeys;
pub use retold::Retold;
pub use same::Same;
pub use section::Section;
pub use select::Select;
pub use sound_switch::SoundSwitch;
pub use stopwatch::Stopwatch;
pub use tap_counter::TapCounter;
pub use text::TextField;
