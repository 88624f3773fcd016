//! The circuit: elements between nodes as data, the solver, and what can be read off a solved state.

mod param;

pub use param::{Param, Params, Scale, healthy};
