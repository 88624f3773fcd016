//! What stands round every screen: the bar, the notices, the live region.

mod bar;
mod notices;

pub use bar::Bar;
pub use notices::Notices;
