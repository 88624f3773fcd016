//! The call screen: what was seen, the readings with their windows, and the causes that follow, all in one place.
//!
//! | file | what it holds |
//! | --- | --- |
//! | [`change`], [`history`] | every edit of a visit, and the way back |
//! | [`entry`] | what is typed in a reading's field, and what was seen |
//! | [`group`], [`quick`] | readings by condition; the usual sets |
//! | [`scale`], [`mark`], [`words`] | how windows, standings and chances are shown |
//! | [`gate`] | precautions that open a hazardous reading |
//! | [`map`] | the loop drawn with its ports |
//! | [`causes`] | the ranking |
//! | [`screen`] | all of it together |

mod add_panel;
mod alerts;
mod causes;
mod cautions;
mod change;
mod condition_editor;
mod condition_parts;
mod edits;
mod entry;
mod entry_field;
mod entry_modes;
mod gate;
mod gate_panel;
mod group;
mod history;
mod map;
mod mark;
mod new_gauge;
mod next_panel;
mod quick;
mod quick_panel;
mod reading_group;
mod reading_row;
mod rig;
mod scale;
mod screen;
mod seen_panel;
mod told;
mod window_scale;
mod words;

pub use screen::{CallScreen, CallScreenProps};
