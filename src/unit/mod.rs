//! The unit profile: what is known of one machine, and where each figure comes from.

mod class;
mod figure;
mod fitted;
mod profile;
mod ticks;

pub use class::{ClassPractice, MachineClass, Spread};
pub use figure::{FIGURES, Figure, FigureAsk, FigureId, OnBench, Source};
pub use fitted::Fitted;
pub use profile::{ManualWindow, PortNote, Unit};
pub use ticks::{
    CaseLines, ChargeSource, Control, Filter, LoopReliefTo, Paths, ReliefDrain, Shuttle, Tick,
    Ticks,
};
