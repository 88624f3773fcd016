//! The circuit: elements between nodes as data, the solver, and what can be read off a solved state.

mod element;
mod law;
mod layout;
mod lu;
mod mirror;
mod network;
mod node;
mod output;
mod param;
mod real;
mod solve;

pub use element::{Element, Law};
pub use layout::{Arrangement, ControlBuild, DumpBuild, FilterBuild, Layout};
pub use network::Network;
pub use node::{Node, State};
pub use output::Shown;
pub use param::{Belongs, Param, Params, Scale, VALUES, healthy};
pub use solve::{NoState, Route, Solution};
