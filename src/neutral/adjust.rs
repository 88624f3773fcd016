//! The null on an adjuster: turns, with creep, a difference or the start of motion at two or more places.
//!
//! The law: nothing inside the dead band, outside it as much as the turns past its edge times a slope; a joint with play lags
//! behind the adjuster by half its play, the way it was last turned. Weighted least squares in the slope (which enters in
//! proportion), summed over a grid of null, dead band and play, gives each with its 95 % interval.

use super::belief::Belief;
use super::series::{Grid, Place, Span, weigh};
use crate::readings::Direction;

/// Which way an adjuster was last turned.
#[derive(Clone, Copy, Debug, PartialEq, Eq, serde::Serialize, serde::Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Sense {
    /// The way that counts as positive: in, or clockwise, as the mechanic chose.
    In,
    /// The other way.
    Out,
}

impl Sense {
    /// +1 or −1.
    #[must_use]
    pub fn sign(self) -> f64 {
        match self {
            Sense::In => 1.0,
            Sense::Out => -1.0,
        }
    }

    /// Word.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Sense::In => "in",
            Sense::Out => "out",
        }
    }
}

/// What was seen with the adjuster at one place.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub enum Seen {
    /// A creep speed or a loop difference, forward positive, with its standard uncertainty; one kind in a series.
    Value {
        /// Value.
        value: f64,
        /// Standard uncertainty.
        uncertainty: f64,
    },
    /// Here it just starts to move.
    Starts(Direction),
}

/// One place of the adjuster.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Point {
    /// Turns in (positive) or out from where it was found.
    pub turns: f64,
    /// The way it was last turned to get here; none where nobody noted it.
    pub from: Option<Sense>,
    /// What was seen.
    pub seen: Seen,
}

/// A figure with its 95 % interval, turns.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Turns {
    /// Mean.
    pub mean: f64,
    /// Low end.
    pub low: f64,
    /// High end.
    pub high: f64,
}

impl Turns {
    fn of(belief: &Belief) -> Turns {
        Turns {
            mean: belief.mean(),
            low: belief.quantile(0.025),
            high: belief.quantile(0.975),
        }
    }

    /// Half the width of the interval.
    #[must_use]
    pub fn half(self) -> f64 {
        0.5 * (self.high - self.low)
    }
}

/// What a series comes to.
#[derive(Clone, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Fitted {
    /// Where the null is: the middle of the dead band, turns from where the adjuster was found.
    pub null: Turns,
    /// Half the dead band.
    pub dead: Turns,
    /// How far to turn from the last place to the null; positive in.
    pub to_go: Turns,
    /// Change of the reading a turn outside the dead band, forward positive; none where only starts of motion were noted.
    pub slope: Option<f64>,
    /// True where turning in makes it go forward.
    pub in_is_forward: bool,
    /// Play, where places were reached from both sides.
    pub play: Option<Turns>,
    /// How far the statement goes.
    pub reach: Reach,
    /// True where the places do not lie on such a law within their uncertainty: something changed between them.
    pub scattered: bool,
}

/// How far a statement on a null goes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, serde::Serialize, serde::Deserialize)]
pub enum Reach {
    /// Both sides of the dead band were seen.
    BothSides,
    /// Motion was seen on one side only: null and dead band cannot be told apart, turn on until it goes the other way.
    OneSide,
    /// No motion anywhere: every place lies in the dead band.
    NoMotion,
}

/// Why a series has no answer.
#[derive(
    Clone, Copy, Debug, PartialEq, Eq, thiserror::Error, serde::Serialize, serde::Deserialize,
)]
pub enum NoFit {
    /// Fewer than two places.
    #[error("two places of the adjuster are needed at least; there is {0}")]
    TooFew(usize),
    /// All at the same place.
    #[error("the places are the same: turn the adjuster between two readings (1/8 turn or more)")]
    SamePlace,
    /// Not a number, or turns out of range.
    #[error("a figure of the series is out of range: turns lie between −40 and 40")]
    OutOfRange,
}

/// Standard uncertainty of a place, turns: a lock nut takes 1/16 turn with it (common practice), anywhere within.
pub const PLACE: f64 = 0.036;
/// Most turns from where an adjuster was found.
const MOST: f64 = 40.0;
/// Closest two places that say anything, turns.
const APART: f64 = 0.01;
/// A reading speaks when it is this many standard uncertainties from zero.
const SPEAKS: f64 = 2.0;
/// Least squares left over a degree of freedom, from which places do not lie on the law (1 in 1000 by chance).
const SCATTERED: f64 = 7.0;

/// Finds null, dead band and play.
///
/// # Errors
/// [`NoFit`].
pub fn fit(points: &[Point]) -> Result<Fitted, NoFit> {
    let span = checked(points)?;
    let both_ways = Sense::sign;
    let senses: Vec<f64> = points
        .iter()
        .filter_map(|p| p.from.map(both_ways))
        .collect();
    let plays = senses.iter().any(|s| *s > 0.0) && senses.iter().any(|s| *s < 0.0);
    let wide = (span.high - span.low).max(0.5);
    let mut grid = Grid {
        null: Span::new(span.low - wide, span.high + wide, 91),
        dead: Span::new(0.0, wide, 31),
        play: if plays {
            Span::new(0.0, 0.75 * wide, 12)
        } else {
            Span::new(0.0, 0.0, 1)
        },
    };
    let mut places = weigh(points, &grid, None);
    // Twice closer round what carries weight, with the slope that the first look gave.
    for _ in 0..2 {
        let slope = mean(&places, |p| p.slope.abs());
        grid = grid.round(
            &belief(&places, |p| p.null),
            &belief(&places, |p| p.dead),
            &belief(&places, |p| p.play),
        );
        places = weigh(points, &grid, Some(slope));
    }
    Ok(fitted(points, &places, plays))
}

fn checked(points: &[Point]) -> Result<Span, NoFit> {
    let is_wrong = |p: &Point| {
        let value = match p.seen {
            Seen::Value { value, uncertainty } => {
                value.is_finite() && uncertainty.is_finite() && uncertainty >= 0.0
            }
            Seen::Starts(_) => true,
        };
        // Written so that what is no number is wrong.
        !(p.turns.abs() <= MOST && value)
    };
    if points.len() < 2 {
        return Err(NoFit::TooFew(points.len()));
    }
    if points.iter().any(is_wrong) {
        return Err(NoFit::OutOfRange);
    }
    let low = points.iter().map(|p| p.turns).fold(MOST, f64::min);
    let high = points.iter().map(|p| p.turns).fold(-MOST, f64::max);
    if high - low < APART {
        return Err(NoFit::SamePlace);
    }
    Ok(Span::new(low, high, 2))
}

fn belief(places: &[Place], of: impl Fn(&Place) -> f64) -> Belief {
    let points: Vec<(f64, f64)> = places.iter().map(|p| (of(p), p.weight)).collect();
    // There is always a place: each of the grid has a finite misfit.
    Belief::pooled(points)
}

fn mean(places: &[Place], of: impl Fn(&Place) -> f64) -> f64 {
    places.iter().map(|p| of(p) * p.weight).sum()
}

fn fitted(points: &[Point], places: &[Place], plays: bool) -> Fitted {
    let null = Turns::of(&belief(places, |p| p.null));
    let here = points.last().map_or(0.0, |p| p.turns);
    let slope = mean(places, |p| p.slope);
    let has_values = points.iter().any(|p| matches!(p.seen, Seen::Value { .. }));
    let unknowns = if plays { 4 } else { 3 };
    let freedom = points.len().saturating_sub(unknowns);
    let least = places
        .iter()
        .map(|p| p.misfit)
        .fold(f64::INFINITY, f64::min);
    Fitted {
        null,
        dead: Turns::of(&belief(places, |p| p.dead)),
        to_go: Turns {
            mean: null.mean - here,
            low: null.low - here,
            high: null.high - here,
        },
        slope: has_values.then_some(slope),
        in_is_forward: mean(places, |p| p.sense) > 0.0,
        play: plays.then(|| Turns::of(&belief(places, |p| p.play))),
        reach: reach(points),
        scattered: freedom > 0 && least > SCATTERED * (freedom as f64).max(1.0),
    }
}

fn reach(points: &[Point]) -> Reach {
    let mut sides = (false, false);
    for p in points {
        let side = match p.seen {
            Seen::Starts(Direction::Forward) => 1.0,
            Seen::Starts(Direction::Reverse) => -1.0,
            Seen::Value { value, uncertainty } if value.abs() > SPEAKS * uncertainty => value,
            Seen::Value { .. } => 0.0,
        };
        sides.0 |= side > 0.0;
        sides.1 |= side < 0.0;
    }
    match sides {
        (true, true) => Reach::BothSides,
        (false, false) => Reach::NoMotion,
        _ => Reach::OneSide,
    }
}

impl Fitted {
    /// True where places reached from both sides lie apart: play or hysteresis, which no adjuster takes out.
    #[must_use]
    pub fn has_play(&self) -> bool {
        self.play.is_some_and(|play| play.low > PLACE)
    }

    /// The way to turn, where the interval tells it.
    #[must_use]
    pub fn turn(&self) -> Option<Sense> {
        if self.to_go.low > 0.0 {
            Some(Sense::In)
        } else if self.to_go.high < 0.0 {
            Some(Sense::Out)
        } else {
            None
        }
    }
}

/// Halves of a dead band about the place where the servo pressures are equal.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Halves {
    /// From the balanced place to the start of motion forward, turns.
    pub forward: f64,
    /// From the balanced place to the start of motion in reverse, turns.
    pub reverse: f64,
    /// How far they differ, share of their mean.
    pub differ: f64,
    /// The middle of the starts less the balanced place, turns.
    pub apart: f64,
}

/// Halves that differ by no more than this share are taken as equal. Common practice.
pub const EQUAL_HALVES: f64 = 0.2;

/// Halves of a dead band: start of motion each way, and where the servo pressures are equal (all in turns). None where the
/// balanced place lies outside the band: then the springs hold the swash off, and no turn of this adjuster centres both.
#[must_use]
pub fn halves(forward: f64, reverse: f64, balanced: f64) -> Option<Halves> {
    let (f, r) = (forward - balanced, reverse - balanced);
    let lies_between = f * r < 0.0;
    if !lies_between {
        return None;
    }
    let (f, r) = (f.abs(), r.abs());
    Some(Halves {
        forward: f,
        reverse: r,
        differ: (f - r).abs() / (0.5 * (f + r)),
        apart: 0.5 * (forward + reverse) - balanced,
    })
}
