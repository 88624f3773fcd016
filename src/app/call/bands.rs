//! Several spans on one scale: what a reading would be under each of several causes. Round figures along the foot.

/// A scale in the unit of the figures handed in.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Axis {
    from: f64,
    to: f64,
    step: f64,
}

/// Narrowest band that is still seen as one, per cent of the width.
const NARROWEST: f64 = 2.0;
/// Steps that the spans are to take up, at least.
const STEPS: f64 = 3.0;

/// The scale that holds all spans; none where a figure is not finite.
pub fn axis(spans: &[(f64, f64)]) -> Option<Axis> {
    let all = || spans.iter().flat_map(|(one, other)| [*one, *other]);
    if spans.is_empty() || !all().all(f64::is_finite) {
        return None;
    }
    let low = all().fold(f64::INFINITY, f64::min);
    let high = all().fold(f64::NEG_INFINITY, f64::max);
    // Spans that hardly differ are not blown up to the whole width.
    let width = (high - low).max(low.abs().max(high.abs()) * 0.05).max(1e-3);
    let step = round_step(width / STEPS);
    let from = (low / step).floor() * step;
    let to = ((high / step).ceil() * step).max(from + step);
    Some(Axis { from, to, step })
}

/// The next of 1, 2, 5 times a power of ten; of nothing, a step that is as good as nothing.
pub fn round_step(least: f64) -> f64 {
    let least = least.max(1e-9);
    let mut power = 1.0_f64;
    while power * 10.0 <= least {
        power *= 10.0;
    }
    while power > least {
        power /= 10.0;
    }
    for times in [1.0, 2.0, 5.0] {
        if power * times >= least * 0.999 {
            return power * times;
        }
    }
    power * 10.0
}

impl Axis {
    /// Place along the width, per cent from the left.
    pub fn place(&self, figure: f64) -> f64 {
        ((figure - self.from) / (self.to - self.from) * 100.0).clamp(0.0, 100.0)
    }

    /// Left end and width of a band, per cent; never so narrow that it is not seen.
    pub fn band(&self, one: f64, other: f64) -> (f64, f64) {
        let (left, right) = (self.place(one.min(other)), self.place(one.max(other)));
        let width = (right - left).max(NARROWEST);
        (left.min(100.0 - width), width)
    }

    /// Round figures along the foot, ends included.
    pub fn ticks(&self) -> Vec<f64> {
        let mut ticks = Vec::new();
        let mut at = self.from;
        while at <= self.to + self.step * 0.01 && ticks.len() < 12 {
            // No minus before a zero that is only rounding.
            ticks.push(if at.abs() < self.step * 1e-6 { 0.0 } else { at });
            at += self.step;
        }
        ticks
    }

    /// Decimals that the figures along the foot carry.
    pub fn decimals(&self) -> u8 {
        let (mut step, mut places) = (self.step, 0_u8);
        while step < 0.999 && places < 6 {
            step *= 10.0;
            places += 1;
        }
        places
    }
}
