//! The order of the work: what comes before what, and why. Common practice; the unit's manual comes first.

use super::run::{Facing, Gear, Lever, Load, Setting, Travel};
use super::sheet::What;
use crate::caution::Stands;

/// One step.
#[derive(Clone, Copy, Debug)]
pub struct Step {
    /// Stable id: ticks are kept under it.
    pub id: &'static str,
    /// Title.
    pub title: &'static str,
    /// What to do.
    pub how: &'static str,
    /// What is good. Common practice.
    pub good: &'static str,
    /// What fools. Empty where nothing does.
    pub fools: &'static str,
    /// Cautions that stand at the step.
    pub stands: &'static [Stands],
    /// The runs that belong to it.
    pub runs: &'static [(What, Setting)],
}

const fn setting(travel: Travel, lever: Lever, load: Load, gear: Gear, facing: Facing) -> Setting {
    Setting {
        travel,
        lever,
        load,
        gear,
        facing,
    }
}

const fn counted(travel: Travel, lever: Lever) -> (What, Setting) {
    (
        What::Turns,
        setting(travel, lever, Load::Free, Gear::One, Facing::Out),
    )
}

const fn path(travel: Travel, facing: Facing) -> (What, Setting) {
    (
        What::Path,
        setting(travel, Lever::Full, Load::Level, Gear::One, facing),
    )
}

const F: Travel = Travel::Forward;
const R: Travel = Travel::Reverse;

/// The steps, in order.
pub const WORK: &[Step] = &[
    Step {
        id: "tyres",
        title: "Tyres or tracks",
        how: "Mark tyre and ground, roll one whole turn straight, mark again: left and right. Pressure equal first. Tracks: tension \
              and sprocket wear equal.",
        good: "Within 1 % of each other (common practice).",
        fools: "Same size on the wall is not the same roll-out: wear and pressure decide.",
        stands: &[],
        runs: &[(
            What::RollOut,
            setting(F, Lever::Half, Load::Level, Gear::One, Facing::Out),
        )],
    },
    Step {
        id: "brakes",
        title: "Both brakes off",
        how: "Release pressure at both brakes. After a run feel both hubs with the back of the hand from a distance first.",
        good: "Release pressure above what the manual asks, equal within 1 bar; hubs within 10 K (common practice).",
        fools: "A dragging brake looks like leakage, but the slow side's loop pressure is higher, not lower.",
        stands: &[Stands::BrakeDrags],
        runs: &[],
    },
    Step {
        id: "null",
        title: "Null of each side",
        how: "Oil at working temperature. Levers at rest, wheels clear: no creep on either side, come to rest from forward and from \
              reverse. The steps stand under Neutral.",
        good: "No creep in 60 s either side; dead band alike (common practice).",
        fools: "A null set on low charge or cold oil moves afterwards.",
        stands: &[Stands::WheelsClear],
        runs: &[],
    },
    Step {
        id: "low",
        title: "Low lever",
        how: "Both levers together to a low mark: do both sides start together? Count wheel turns of both sides over the same time.",
        good: "Start together; what differs here and not at half is null or leakage.",
        fools: "Thresholds and rods with play: start each run from rest, levers moved the same way.",
        stands: &[Stands::WheelsClear],
        runs: &[counted(F, Lever::Low), counted(R, Lever::Low)],
    },
    Step {
        id: "half",
        title: "Half lever",
        how: "Both levers to the same half mark, best against a block. Count wheel turns of both sides over the same minute, forward \
              and in reverse.",
        good: "Within 1 % of each other, both ways (common practice).",
        fools: "Counted one side after the other, the engine must hold its speed.",
        stands: &[Stands::WheelsClear],
        runs: &[counted(F, Lever::Half), counted(R, Lever::Half)],
    },
    Step {
        id: "full",
        title: "Full lever",
        how: "Levers as far as they go; count again, forward and in reverse. Reduce the faster side at its stop; never screw the slow \
              side past its stop.",
        good: "Within 1 % of each other (common practice).",
        fools: "A rod that ends before the pump's stop looks like a stop screw.",
        stands: &[Stands::WheelsClear],
        runs: &[counted(F, Lever::Full), counted(R, Lever::Full)],
    },
    Step {
        id: "range",
        title: "Range 2",
        how: "Where there is one: shift at low speed, full lever, count again.",
        good: "Both sides shift together; as equal as in range 1.",
        fools: "A motor that shifts halfway only shows here.",
        stands: &[Stands::WheelsClear],
        runs: &[(
            What::Turns,
            setting(F, Lever::Full, Load::Free, Gear::Two, Facing::Out),
        )],
    },
    Step {
        id: "loaded",
        title: "Under load",
        how: "Drawbar or an even grade straight up, half lever: count marks on both sides from a safe place or read wheel speeds. \
              A side that falls back under load leaks or drags.",
        good: "As equal as on level ground, within 2 % (common practice).",
        fools: "Wheel slip: turns are counted, not ground.",
        stands: &[Stands::Driving],
        runs: &[(
            What::WheelSpeeds,
            setting(F, Lever::Half, Load::Loaded, Gear::One, Facing::Out),
        )],
    },
    Step {
        id: "path",
        title: "Path run",
        how: "Only now: a straight line on firm level ground, 10 m or more; machine sighted along it. Forward and in reverse, twice, \
              then turned round on the same lane. Measure how far the middle ends beside the line.",
        good: "Within 1 %: about 0.33 m in 10 m on a track width of 1.5 m (common practice).",
        fools: "Camber: the same lane turned round takes it out. A start half a degree askew is 9 cm in 10 m.",
        stands: &[Stands::Driving],
        runs: &[
            path(F, Facing::Out),
            path(R, Facing::Out),
            path(F, Facing::Back),
            path(R, Facing::Back),
        ],
    },
];
