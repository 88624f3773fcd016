//! Straight tracking of a machine that is steered by the difference of two sides: from runs on a lane, counted wheel turns and
//! speeds to which side is faster, why, and what to turn.
//!
//! * [`Run`] is one thing measured, in one [`Setting`] (forward or reverse, lever, load, range, which way the machine faces).
//! * `law` says what the two sides do with a null, a gain, a stop, a loss and a rolling radius that differ. The path is the exact
//!   arc of the differential drive (see [`crate::kinematics`]), never its small-angle form.
//! * `fit` is weighted least squares by Gauss–Newton, with a stated width for what nobody measured, so that it always has an
//!   answer and never more of one than the runs give.
//! * `alone` asks which single mismatch would explain all runs; `apart` says which two cannot be told from each other and
//!   which further run would do it.
//! * [`find`] puts it together; `plan` draws the path before and after; `work` is the order of the work.
//!
//! **Signs.** Every mismatch is right over left: positive where the right side runs faster going forward. Sideways is
//! positive to the left as seen from the seat, whichever way the machine travels: a faster right side then gives a positive
//! deviation in both directions, and a null gives opposite ones.

mod adjust;
mod alone;
mod apart;
mod fit;
mod kind;
mod law;
mod outcome;
mod plan;
mod run;
mod sheet;
mod work;

pub use adjust::{Adjustment, Screws};
pub use alone::Alone;
pub use apart::{Advice, Candidate, Pair};
pub use fit::{Fit, fit};
pub use kind::Kind;
pub use law::{Latent, Prior, SIZE, State};
pub use outcome::{Agreement, Found, Outcome, Verdict, find};
pub use plan::{Plan, Point, Trace};
pub use run::{
    Facing, Gear, LANE, Lever, Load, Machine, Run, RunError, Seen, Setting, Travel, Undercarriage,
    usual_undercarriage,
};
pub use sheet::{Answer, Field, Hand, Head, LINES, Line, LineProblem, TrackingSheet, What};
pub use work::{Step, WORK};
