//! What to turn, on which side and by how much. The faster side is brought down; a slow side is never screwed past its stop.

use super::kind::Kind;
use super::outcome::{Found, Verdict};

/// What one turn of an adjuster does, where the mechanic knows it (his own trial or the unit's manual).
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Screws {
    /// Null screw: share of full stroke per turn.
    pub null: Option<f64>,
    /// Full-stroke stop: share of full stroke per turn.
    pub stop: Option<f64>,
}

/// One thing to do.
#[derive(Clone, Debug, PartialEq)]
pub struct Adjustment {
    /// Which mismatch it takes away.
    pub kind: Kind,
    /// True where the right side is the faster one (for a null: forward).
    pub is_right: bool,
    /// By how much, share (see [`Kind::share_of`]); never negative.
    pub share: f64,
    /// Half-width of its 95 % interval, share.
    pub half: f64,
    /// The same in turns of the adjuster, with its half-width, where a turn is known.
    pub turns: Option<(f64, f64)>,
    /// True where it is turned or set; false for a fault to find.
    pub is_adjusted: bool,
    /// What to do, in words.
    pub words: String,
}

fn sides(is_right: bool) -> (&'static str, &'static str) {
    if is_right {
        ("right", "left")
    } else {
        ("left", "right")
    }
}

fn words(kind: Kind, is_right: bool) -> String {
    let (fast, slow) = sides(is_right);
    match kind {
        Kind::Rolling => format!(
            "The {fast} side rolls further at each turn. Make tyre size, wear and pressure equal (tracks: tension, sprocket \
             wear) before anything is turned at the pumps."
        ),
        Kind::Null => format!(
            "Going forward the {fast} side gains, in reverse the {slow} side. Set the null of each side under Neutral: the side \
             that creeps with its lever at rest is the one that is off. If neither creeps, take it off the {fast} side, towards \
             reverse, an eighth of a turn at a time; lock, and count again."
        ),
        Kind::Gain => format!(
            "Take stroke per lever travel off the {fast} side: rod position on its arm, or its end current or ramp at the \
             controller. Both levers at the same mark first."
        ),
        Kind::OneWay => format!(
            "The {fast} side gains in forward and loses in reverse. Look at linkage travel and signal of each direction on both \
             sides, then at check and relief of that direction: equal pump signals and unequal speeds are a fault, not an adjustment."
        ),
        Kind::Stop => format!(
            "Screw the {fast} side's full-stroke stop in until it runs as the {slow} side does. Never screw the {slow} side past \
             its stop."
        ),
        Kind::Range => format!(
            "In range 2 the {fast} side is faster: the {slow} side's motor may not shift, or not all the way. Compare shift \
             pressure at both motors."
        ),
        Kind::Loss => format!(
            "The {slow} side loses more the harder it works. Its loop pressure higher than the {fast} side's: a brake or hub \
             drags, feel the hubs. Not higher: leakage of pump, motor, check or bypass on the {slow} side. Don't hide it with a \
             stop screw."
        ),
    }
}

/// Everything that the runs give reason for, in the order of the work.
pub(super) fn adjustments(found: &[Found], screws: &Screws) -> Vec<Adjustment> {
    found
        .iter()
        .filter_map(|found| {
            let is_right = match found.verdict {
                Verdict::RightFaster => true,
                Verdict::LeftFaster => false,
                Verdict::Equal | Verdict::CannotTell => return None,
            };
            let turn = match found.kind {
                Kind::Null => screws.null,
                Kind::Stop => screws.stop,
                _ => None,
            };
            let share = found.value.abs();
            Some(Adjustment {
                kind: found.kind,
                is_right,
                share,
                half: found.half,
                turns: turn
                    .filter(|t| *t > 0.0)
                    .map(|t| (share / t, found.half / t)),
                is_adjusted: !matches!(found.kind, Kind::Loss | Kind::Range | Kind::OneWay),
                words: words(found.kind, is_right),
            })
        })
        .collect()
}
