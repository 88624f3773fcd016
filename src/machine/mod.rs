//! The believed machine: from what is known of a unit and a condition to circuit parameters with their scatter.
//!
//! Each build that the ticks leave possible has its layout and its share. Scatter is a list of independent standard normal
//! latents; each acts on one or more parameters (a bigger machine has a bigger pump, bigger lines and more leakage), on all
//! conditions or on one. Widths without another source are common practice, from memory of the trade.

mod builds;
mod condition;
mod figures;
mod latent;
mod twin;

pub use builds::{Build, arrangement, builds};
pub use condition::{Warmth, apply, condition_latents, layout_for};
pub use figures::{MEASURED_LEAKAGE, base, describe_basis, unit_latents};
pub use latent::{Act, Latent, Latents, scattered};
