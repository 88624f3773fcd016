//! The catalogue: what each fault does to the circuit, its base rate, its proof and its repair.
//! To add a fault: one id in `id.rs` and one entry in the table of its group. All else follows from the entry.

mod catalogue;
mod fault;
mod id;
mod sets;

pub use catalogue::{all, find};
pub use fault::{Bend, Column, Effect, Fault, SeverityShape};
pub use id::FaultId;
pub use sets::{AlikeSet, SETS};
