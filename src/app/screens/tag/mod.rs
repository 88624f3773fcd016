//! Tags: profiles as QR codes to print and stick on the machine, and reading one back.

mod card;
mod read;
mod sheet;

pub use read::TagReader;
pub use sheet::TagSheet;
