//! Ranking: from readings and observations to causes with probabilities and reasons.
//!
//! p(cause | readings) = base rate × ∫∫ likelihood d(severity) d(scatter), normalised. Severity is summed over nodes; the scatter
//! that all causes share (settings, leakages, oil, instrument biases) is integrated in closed form at each node through the
//! circuit's own derivatives; nodes that carry weight, and the best of every other cause, are linearised again at their own
//! posterior mean.

mod accuracy;
mod assess;
mod belief;
mod datum;
mod evidence;
mod gauss;
mod hold;
mod likelihood;
mod memo;
mod node;
#[cfg(all(test, not(target_arch = "wasm32")))]
mod oracle;
mod pairs;
mod posterior;
mod predict;
mod quick;
mod rows;
mod seen;
mod split;
mod suspect;
mod swing;

pub use accuracy::{Accuracy, accuracy};
pub use assess::{Session, assess};
pub use belief::Belief;
pub use datum::{
    Data, Datum, Says, gather, gather_visit, gather_with, has_sides, instrument_of, path_of, slope,
    untransform,
};
pub use evidence::normalised;
pub use gauss::{Gauss, LN_TWO_PI};
pub use hold::hold_time;
pub use likelihood::fit;
pub use memo::Memo;
pub use node::{Node, Second};
pub use pairs::{apart, rate as pair_rate};
pub use posterior::{Heavy, Posterior, Weighed, swap_chance, weigh};
pub use predict::{Bench, Known, Prediction};
pub use quick::{Carried, CarriedCause, CarriedNode};
pub use suspect::{Suspect, suspects};
