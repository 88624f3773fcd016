//! The bench: efficiencies of pumps, motors and transmissions, and the losses behind them.

pub mod efficiency;
pub mod since;
pub mod stand;
