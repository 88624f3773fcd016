//! What the browser gives: one file per thing. Nothing here fails loudly; what is missing is said by the return value.

pub mod awake;
pub mod clock;
pub mod files;
pub mod focus;
pub mod ids;
pub mod listen;
pub mod media;
pub mod offline;
pub mod persistence;
pub mod share;
pub mod sound;
pub mod theme;
pub mod timer;
