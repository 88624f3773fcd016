//! The grid behind the fit of an adjuster's series: each place (null, dead band, play, sense) with its weight.

use super::adjust::{PLACE, Point, Seen, Sense};
use super::belief::Belief;
use crate::math;
use crate::readings::Direction;

/// Even steps from low to high.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Span {
    /// Low end.
    pub low: f64,
    /// High end.
    pub high: f64,
    /// Steps.
    pub count: usize,
}

impl Span {
    /// From low to high in so many places.
    pub fn new(low: f64, high: f64, count: usize) -> Span {
        Span { low, high, count }
    }

    fn at(self, i: usize) -> f64 {
        if self.count < 2 {
            return self.low;
        }
        self.low + (self.high - self.low) * i as f64 / (self.count - 1) as f64
    }

    fn all(self) -> impl Iterator<Item = f64> {
        (0..self.count).map(move |i| self.at(i))
    }

    /// Closer round what carries weight, never past the old ends.
    fn round(self, belief: &Belief) -> Span {
        if self.count < 2 {
            return self;
        }
        let step = (self.high - self.low) / (self.count - 1) as f64;
        let low = belief.quantile(0.0005) - step;
        let high = belief.quantile(0.9995) + step;
        Span::new(low.max(self.low), high.min(self.high), self.count)
    }
}

/// The grid.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Grid {
    /// Null, turns.
    pub null: Span,
    /// Half the dead band, turns.
    pub dead: Span,
    /// Play, turns.
    pub play: Span,
}

impl Grid {
    /// Closer round what carries weight.
    pub fn round(self, null: &Belief, dead: &Belief, play: &Belief) -> Grid {
        Grid {
            null: self.null.round(null),
            dead: self.dead.round(dead),
            play: self.play.round(play),
        }
    }
}

/// One place of the grid.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Place {
    /// Null, turns.
    pub null: f64,
    /// Half the dead band, turns.
    pub dead: f64,
    /// Play, turns.
    pub play: f64,
    /// +1 where turning in makes it go forward, −1 where it makes it go back.
    pub sense: f64,
    /// Best slope there, of the reading a turn, forward positive.
    pub slope: f64,
    /// Sum of squares left there, each over its variance.
    pub misfit: f64,
    /// Weight; all sum to 1.
    pub weight: f64,
}

/// Share of a reading that the straight law does not know of: the loop's answer is a little curved. Common practice.
const CURVED: f64 = 0.05;

/// Play that is usual in joints, turns of the adjuster. Common practice: no more than a third of the dead band.
const USUAL_PLAY: f64 = 0.2;

/// Weighs every place of the grid. `slope`: size of the slope by which an uncertain place of the adjuster becomes an uncertain
/// reading; a first guess where none is known.
pub fn weigh(points: &[Point], grid: &Grid, slope: Option<f64>) -> Vec<Place> {
    let slope = slope.unwrap_or_else(|| steepest(points));
    let mut out = Vec::new();
    for sense in [1.0, -1.0] {
        for play in grid.play.all() {
            let at: Vec<f64> = points.iter().map(|p| followed(p, play)).collect();
            for null in grid.null.all() {
                for dead in grid.dead.all() {
                    let (slope, misfit, log) = explain(points, &at, (null, dead, sense), slope);
                    let log = log - 0.5 * (play / USUAL_PLAY) * (play / USUAL_PLAY);
                    out.push(Place {
                        null,
                        dead,
                        play,
                        sense,
                        slope: sense * slope,
                        misfit,
                        weight: log,
                    });
                }
            }
        }
    }
    let top = out
        .iter()
        .map(|p| p.weight)
        .fold(f64::NEG_INFINITY, f64::max);
    let mut sum = 0.0;
    for place in &mut out {
        place.weight = math::exp(place.weight - top);
        sum += place.weight;
    }
    for place in &mut out {
        place.weight /= sum;
    }
    out.retain(|place| place.weight > 1e-12);
    out
}

/// Where the swash follows an adjuster to: half the play behind, the way it was last turned.
fn followed(point: &Point, play: f64) -> f64 {
    point.turns - 0.5 * play * point.from.map_or(0.0, Sense::sign)
}

/// How a place explains the points: best slope (never against the sense), sum of squares, log weight.
///
/// Where the reading changes with the place of the adjuster, an uncertain place is an uncertain reading: the more, the
/// steeper. So the slope is found twice, the second time with the uncertainties that belong to the first.
fn explain(points: &[Point], at: &[f64], place: (f64, f64, f64), slope: f64) -> (f64, f64, f64) {
    let (first, _, _) = squares(points, at, place, slope);
    squares(points, at, place, first)
}

fn squares(
    points: &[Point],
    at: &[f64],
    (null, dead, sense): (f64, f64, f64),
    slope: f64,
) -> (f64, f64, f64) {
    let (mut hh, mut hy, mut yy, mut logs) = (0.0, 0.0, 0.0, 0.0);
    for (point, x) in points.iter().zip(at) {
        match point.seen {
            Seen::Value { value, uncertainty } => {
                let past = (x - null).abs() - dead;
                let h = if past > 0.0 {
                    sense * (x - null).signum() * past
                } else {
                    0.0
                };
                let moves = if past > -PLACE { slope * PLACE } else { 0.0 };
                let own = CURVED * value;
                let variance = (uncertainty * uncertainty + moves * moves + own * own).max(1e-18);
                hh += h * h / variance;
                hy += h * value / variance;
                yy += value * value / variance;
                logs -= 0.5 * math::ln(variance);
            }
            Seen::Starts(direction) => {
                let way = match direction {
                    Direction::Forward => 1.0,
                    Direction::Reverse => -1.0,
                };
                let z = (x - (null + sense * way * dead)) / START;
                yy += z * z;
            }
        }
    }
    let best = if hh > 0.0 { (hy / hh).max(0.0) } else { 0.0 };
    // Sum of (y − m h)² / σ², with the starts that no slope moves.
    let misfit = (yy - 2.0 * best * hy + best * best * hh).max(0.0);
    (best, misfit, logs - 0.5 * misfit)
}

/// Standard uncertainty of where motion just starts, turns: the place, and a wheel that sticks a little. Common practice.
const START: f64 = 0.05;

/// First guess of the slope: the whole change over the whole travel.
fn steepest(points: &[Point]) -> f64 {
    let values = points.iter().filter_map(|p| match p.seen {
        Seen::Value { value, .. } => Some((p.turns, value)),
        Seen::Starts(_) => None,
    });
    let (mut turns, mut shown) = ((f64::MAX, f64::MIN), (f64::MAX, f64::MIN));
    for (at, value) in values {
        turns = (turns.0.min(at), turns.1.max(at));
        shown = (shown.0.min(value), shown.1.max(value));
    }
    let travel = turns.1 - turns.0;
    if travel > 0.0 {
        (shown.1 - shown.0) / travel
    } else {
        0.0
    }
}
