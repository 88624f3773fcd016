//! The kinds of mismatch between right and left.

use super::law::Latent;

/// What can differ between the two sides, in the order in which the work goes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kind {
    /// Rolling radius: tyres, track tension, sprockets.
    Rolling,
    /// Null position of one pump against the other.
    Null,
    /// Stroke per lever travel: linkage ratio, controller gain, displacement.
    Gain,
    /// Gain of one direction against the other: linkage or signal of that direction, its check or relief.
    OneWay,
    /// Maximum stroke: the stop at full lever.
    Stop,
    /// Displacement of the motors in the second range.
    Range,
    /// What a side loses: leakage, or a brake or hub that drags.
    Loss,
}

impl Kind {
    /// Every kind, in the order of the work.
    pub const ALL: [Kind; 7] = [
        Kind::Rolling,
        Kind::Null,
        Kind::Gain,
        Kind::OneWay,
        Kind::Stop,
        Kind::Range,
        Kind::Loss,
    ];

    /// Its place among the unknowns.
    #[must_use]
    pub fn latent(self) -> Latent {
        match self {
            Kind::Rolling => Latent::Rolling,
            Kind::Null => Latent::Null,
            Kind::Gain => Latent::Gain,
            Kind::OneWay => Latent::OneWay,
            Kind::Stop => Latent::Stop,
            Kind::Range => Latent::Range,
            Kind::Loss => Latent::Loss,
        }
    }

    /// Name.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Kind::Rolling => "Rolling radius",
            Kind::Null => "Null",
            Kind::Gain => "Stroke per lever travel",
            Kind::OneWay => "Stroke in one direction only",
            Kind::Stop => "Full-stroke stop",
            Kind::Range => "Second range",
            Kind::Loss => "Leakage or drag",
        }
    }

    /// What is compared, with what the per cent are of.
    #[must_use]
    pub fn share_of(self) -> &'static str {
        match self {
            Kind::Rolling => "of the rolling radius",
            Kind::Null => "of full stroke",
            Kind::Gain => "of the stroke, at any lever",
            Kind::OneWay => "of the stroke, forward and the reverse of it backward",
            Kind::Stop => "of full stroke, at full lever only",
            Kind::Range => "of the speed, in range 2 only",
            Kind::Loss => "of full speed, level ground",
        }
    }

    /// How it shows: the table of what is seen.
    #[must_use]
    pub fn shows(self) -> &'static str {
        match self {
            Kind::Rolling => {
                "bends to the same side both ways, as much at any speed; wheel turns are equal"
            }
            Kind::Null => {
                "bends to opposite sides forward and in reverse, less when faster; wheel turns differ by a constant"
            }
            Kind::Gain => {
                "bends to the same side both ways, as much at any speed; wheel turns differ in proportion"
            }
            Kind::OneWay => "bends one way of travel only, or the two ways by different amounts",
            Kind::Stop => "bends to the same side both ways, at full lever only",
            Kind::Range => "tracks straight in range 1, bends in range 2",
            Kind::Loss => "bends to the same side both ways, less when faster, more under load",
        }
    }

    /// Share of calls with this as the main mismatch. Common practice, from memory.
    pub(super) fn rate(self) -> f64 {
        match self {
            Kind::Rolling => 0.20,
            Kind::Null => 0.22,
            Kind::Gain => 0.15,
            Kind::OneWay => 0.08,
            Kind::Stop => 0.12,
            Kind::Range => 0.05,
            Kind::Loss => 0.18,
        }
    }
}
