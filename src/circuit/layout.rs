//! The build of a circuit: which of the possible plumbings and controls this unit has. Chosen from the unit's ticks;
//! a "don't know" becomes several layouts, each with its share.

/// Control kind, known.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum ControlBuild {
    /// Lever on the swash itself: no servo, charge loss does not destroke.
    Direct,
    /// Servo with feedback: stroke follows the command while servo pressure lasts.
    Feedback,
    /// Pilot pressure with feedback; pilot supply scales the command.
    Pilot,
    /// Coil current with feedback.
    Electric,
    /// Stroke follows engine speed.
    SpeedSensing,
    /// Servo pressure without feedback: loop pressure destrokes.
    NoFeedback,
    /// Full, nothing, full.
    ThreePosition,
}

/// Filter and gauge place, known.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum FilterBuild {
    /// In the suction line.
    Suction,
    /// Pressure side, gauge before it.
    GaugeBefore,
    /// Pressure side, gauge after it.
    GaugeAfter,
}

/// Loop relief dump, known.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum DumpBuild {
    /// Into the gallery.
    Gallery,
    /// Across into the other side.
    Across,
    /// Into the pump case.
    Case,
}

/// How many paths there are, and what they share.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub enum Arrangement {
    /// One path.
    #[default]
    Single,
    /// Left and right on one charge gallery and in one pump housing.
    Tandem,
    /// Left and right, each with its own charge pump: they share engine, oil and operator only.
    Apart,
}

/// A build of the circuit, and the two facts of a condition that change its equations.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Layout {
    /// Control.
    pub control: ControlBuild,
    /// Filter.
    pub filter: FilterBuild,
    /// Loop relief dump.
    pub dump: DumpBuild,
    /// Neutral relief drains to tank instead of the pump case.
    pub relief_to_tank: bool,
    /// Motor case drains on its own, not through the pump case.
    pub separate_cases: bool,
    /// Paths.
    pub arrangement: Arrangement,
    /// The motor cannot turn, left (or the only one) and right.
    pub held: [bool; 2],
    /// Servo ports bridged, left (or the only ones) and right: the control has no say.
    pub bridged: [bool; 2],
}

impl Default for Layout {
    fn default() -> Self {
        Layout {
            control: ControlBuild::Feedback,
            filter: FilterBuild::GaugeAfter,
            dump: DumpBuild::Gallery,
            relief_to_tank: false,
            separate_cases: false,
            arrangement: Arrangement::Single,
            held: [false; 2],
            bridged: [false; 2],
        }
    }
}
