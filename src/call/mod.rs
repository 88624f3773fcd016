//! What the record of one call says, for a screen and for the report alike: words and figures, sides, how it ended, what has to
//! be put back.
//!
//! | file | what it holds |
//! | --- | --- |
//! | [`words`] | states, sources, conditions and chances in the trade's own terms |
//! | [`side`] | left and right on a machine with two drive paths |
//! | [`hold`], [`hold_clock`] | how long a machine may be held, and the time kept of it |
//! | [`watch`] | what the watch view says of a condition |
//! | [`put_back`] | what was opened and has to be put back before a call is closed |
//! | [`closing`] | how a call ended |
//! | [`attention`] | what a unit asks for, by its last call |

pub mod attention;
pub mod closing;
pub mod hold;
pub mod hold_clock;
pub mod put_back;
pub mod side;
pub mod watch;
pub mod words;
