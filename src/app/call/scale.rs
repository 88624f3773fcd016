//! The window as a scale: where its ends, its middle and the reading stand along the width of a row, in per cent.

/// Places along the width, per cent from the left.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scale {
    /// Lower end of the healthy window.
    pub low: f64,
    /// Its middle.
    pub middle: f64,
    /// Upper end.
    pub high: f64,
    /// The reading.
    pub read: Option<f64>,
    /// What the instrument alone leaves open about the reading (95 %).
    pub whisker: Option<(f64, f64)>,
    /// The zero of the quantity, where it lies on the scale and clear of the window.
    pub zero: Option<f64>,
}

/// Share of the width kept free on both sides, so that the figures at the ends of the window stand outside the band
/// and never on each other.
const MARGIN: f64 = 24.0;
/// Narrowest band that is still seen as one, per cent.
const NARROWEST: f64 = 1.5;
/// Half-width of a central 95 % interval in standard uncertainties.
const COVERAGE: f64 = 1.96;

/// Lays out a scale. `instrument` is the standard uncertainty of the instrument, in the unit of the rest. None where a figure
/// is not finite: nothing is drawn rather than something false.
pub fn lay_out(
    low: f64,
    middle: f64,
    high: f64,
    read: Option<f64>,
    instrument: f64,
) -> Option<Scale> {
    let half = if instrument.is_finite() {
        (COVERAGE * instrument).max(0.0)
    } else {
        0.0
    };
    let known = [low, middle, high]
        .iter()
        .chain(read.iter())
        .all(|figure| figure.is_finite());
    if !known || low > high {
        return None;
    }
    let from = read.map_or(low, |read| low.min(read - half));
    let to = read.map_or(high, |read| high.max(read + half));
    let size = from.abs().max(to.abs());
    let width = (to - from).max(size * 0.02).max(1e-9);
    let centre = f64::midpoint(from, to);
    let place = |figure: f64| {
        let inner = 100.0 - 2.0 * MARGIN;
        50.0 + (figure - centre) / width * inner
    };
    let (mut left, mut right) = (place(low), place(high));
    if right - left < NARROWEST {
        let middle = f64::midpoint(left, right);
        (left, right) = (middle - NARROWEST / 2.0, middle + NARROWEST / 2.0);
    }
    let zero = place(0.0);
    Some(Scale {
        low: left,
        middle: place(middle).clamp(left, right),
        high: right,
        read: read.map(place),
        whisker: read
            .filter(|_| half > 0.0)
            .map(|read| (place(read - half), place(read + half))),
        zero: (0.0..=left.max(0.0)).contains(&zero).then_some(zero),
    })
}
