//! Facts to tick before a check opens. Each names something that can be seen to be so; none is a promise to be careful.

use super::{Check, HIGHEST_HAZARD};
use crate::readings::Doing;

/// A second person where a check is never made alone.
pub const NOT_ALONE: &str = "Not alone on site: a second person at the stop, named";

/// Facts of every check from hazard 1 up, machine standing on its wheels or tracks.
pub const COMMON: &[&str] = &[
    "Parking brake set",
    "Chocks both ways at two wheels or both tracks",
    "Attachment and arms down on the ground",
    "People clear in front, behind and at the articulation",
    "One person in the seat with a hand on the stop, named",
    "Signals agreed: go, stop, lever back",
];

/// Where the facts begin that hold on stands too, and those that hold while driving too.
const ON_STANDS_TOO: usize = 2;
const DRIVING_TOO: usize = 3;

/// Facts while driven wheels or tracks turn clear of the ground.
const CLEAR: &[&str] = &[
    "Every driven wheel or track clear of the ground: one wheel down drives it off the stands",
    "Stands under the frame on firm ground, articulation locked, chocks at any wheel that still stands",
    "Nobody in front of or behind a turning wheel or track, low speed first",
];

/// Facts while the motor is blocked.
const BLOCKED: &[&str] = &[
    "Ports capped: parking brake set, chocks both ways. Obstacle: it cannot move, nothing and nobody in between",
];

/// Facts while the machine drives.
const DRIVING: &[&str] = &[
    "Attachment carried low",
    "Gauge hoses tied clear of wheels, tracks and joints",
    "Needle filmed by phone or read by a second person in a seat; the driver reads no gauge, nobody walks alongside",
    "Service brake tried and good",
    "The machine stops when the lever goes back",
];

/// Hazard of a check while the machine does this, 0 to 3: turning wheels are 2 whatever is read, blocked motors, bridged
/// servos and overrun are 3.
#[must_use]
pub fn hazard(check: &Check, doing: Doing) -> u8 {
    let of_condition = match doing {
        Doing::Neutral => 0,
        Doing::NeutralFree | Doing::Free | Doing::Travel | Doing::Loaded => 2,
        Doing::Held | Doing::NeutralBridged | Doing::Overrun => HIGHEST_HAZARD,
    };
    check.hazard.max(of_condition)
}

/// All facts to tick for a check while the machine does this: those of the condition, the common ones, its own. Empty where
/// [`hazard`] is 0.
#[must_use]
pub fn facts(check: &Check, doing: Doing) -> Vec<&'static str> {
    if hazard(check, doing) == 0 {
        return Vec::new();
    }
    let (of_condition, from): (&[&str], usize) = match doing {
        Doing::Neutral => (&[], 0),
        Doing::Held => (BLOCKED, ON_STANDS_TOO),
        Doing::NeutralFree | Doing::NeutralBridged | Doing::Free => (CLEAR, ON_STANDS_TOO),
        Doing::Travel | Doing::Loaded | Doing::Overrun => (DRIVING, DRIVING_TOO),
    };
    let mut out: Vec<&'static str> = Vec::new();
    for fact in of_condition
        .iter()
        .chain(COMMON.iter().skip(from))
        .chain(check.precautions)
    {
        if !out.contains(fact) {
            out.push(fact);
        }
    }
    out
}
