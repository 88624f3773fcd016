//! The call screen: what was seen, the readings with their windows, and the causes that follow, all in one place.
//!
//! | file | what it holds |
//! | --- | --- |
//! | [`change`], [`history`] | every edit of a visit, and the way back |
//! | [`entry`] | what is typed in a reading's field, and what was seen |
//! | [`group`], [`quick`] | readings by condition; the usual sets |
//! | [`side`], [`pair_line`] | left and right on a machine with two drive paths; the sides are the core's |
//! | [`scale`], [`mark`], [`words`] | how windows, standings and chances are shown |
//! | [`close`] | the end of the call |
//! | [`put_back`] | what has to be put back before a call is closed |
//! | [`gate`] | precautions that open a hazardous reading |
//! | [`watch`] | one needle at a time while the engine runs |
//! | [`jug`], [`help`] | litres and seconds to a flow; how a reading is taken |
//! | [`steady`], [`slices`] | what keeps a part from being drawn for nothing, and a long list from being drawn at one go |
//! | [`map`] | the loop drawn with its ports |
//! | [`causes`] | the ranking |
//! | [`next`] | the check that tells most, what it would say, the repair |
//! | [`screen`] | all of it together |

use crate::call::{put_back, side, words};

mod add_panel;
pub(in crate::app) mod alerts;
pub mod bands;
mod causes;
pub(in crate::app) mod cautions;
pub(in crate::app) mod change;
mod close;
mod condition_editor;
mod condition_parts;
mod edits;
mod entry;
mod entry_field;
mod entry_modes;
pub(in crate::app) mod gate;
pub(in crate::app) mod gate_panel;
mod group;
mod hazard;
mod help;
mod history;
mod jug;
mod last_time;
mod map;
pub(in crate::app) mod mark;
mod new_gauge;
mod next;
mod pair_line;
mod quick;
mod quick_panel;
mod reading_group;
mod reading_row;
mod retake;
mod rig;
mod rigging;
mod rooms;
mod scale;
mod screen;
mod seen_keys;
mod seen_panel;
mod slices;
mod steady;
mod taken;
mod told;
mod watch;
mod watching;
mod window_scale;

pub use last_time::EarlierCalls;
pub use screen::{CallScreen, CallScreenProps};
