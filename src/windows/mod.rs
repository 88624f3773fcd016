//! Windows: what a healthy unit of this profile should show at this speed, temperature and lever, central 95 %, from solved
//! circuits over the profile's tolerances, widened by the instrument; and where a reading stands against it.

mod draw;
mod ensemble;
mod words;

pub use draw::Normals;
pub use ensemble::{Spreads, windows};
