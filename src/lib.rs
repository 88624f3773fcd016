//! Lowside: the fault-finding calculator for closed-loop hydrostatic drives.
#![forbid(unsafe_code)]
#![warn(missing_docs)]

pub mod fluid;
pub mod quantity;
