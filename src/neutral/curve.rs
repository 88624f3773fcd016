//! A rising curve through solved points: monotone cubic interpolation (Fritsch and Carlson, 1980), odd about zero.

/// What a machine shows against its swash offset: zero at null, the same either way but for the sign.
#[derive(Clone, Debug, PartialEq)]
pub struct Curve {
    /// Offsets, share of full stroke, ascending from zero.
    at: Vec<f64>,
    /// What is shown there, never falling.
    shown: Vec<f64>,
    /// Slopes there.
    slope: Vec<f64>,
}

impl Curve {
    /// A curve through points whose first is (0, 0); a value that falls back is lifted to the one before it, as no loop
    /// shows less for more stroke. None for fewer than two points, or where the offsets do not ascend.
    #[must_use]
    pub fn through(points: &[(f64, f64)]) -> Option<Curve> {
        let ascends = points.windows(2).all(|pair| match pair {
            [one, other] => other.0 > one.0,
            _ => false,
        });
        if points.len() < 2 || !ascends || points.iter().any(|p| !p.1.is_finite()) {
            return None;
        }
        let at: Vec<f64> = points.iter().map(|p| p.0).collect();
        let mut top = 0.0_f64;
        let shown: Vec<f64> = points
            .iter()
            .map(|p| {
                top = top.max(p.1);
                top
            })
            .collect();
        let slope = slopes(&at, &shown);
        Some(Curve { at, shown, slope })
    }

    /// What is shown at an offset of either sign. Past the last point it stays as it is there.
    #[must_use]
    pub fn value(&self, offset: f64) -> f64 {
        let size = offset.abs();
        let next = self.at.partition_point(|at| *at <= size);
        let value = match (next.checked_sub(1), self.at.get(next)) {
            (None, _) => 0.0,
            (Some(last), None) => self.shown.get(last).copied().unwrap_or(0.0),
            (Some(before), Some(_)) => self.between(before, size),
        };
        if offset < 0.0 { -value } else { value }
    }

    /// Between a point and the next.
    fn between(&self, before: usize, size: f64) -> f64 {
        let of = |list: &[f64], at: usize| list.get(at).copied().unwrap_or(0.0);
        let (x0, x1) = (of(&self.at, before), of(&self.at, before + 1));
        let (y0, y1) = (of(&self.shown, before), of(&self.shown, before + 1));
        let (m0, m1) = (of(&self.slope, before), of(&self.slope, before + 1));
        let wide = x1 - x0;
        let t = (size - x0) / wide;
        let (tt, ttt) = (t * t, t * t * t);
        y0 * (2.0 * ttt - 3.0 * tt + 1.0)
            + wide * m0 * (ttt - 2.0 * tt + t)
            + y1 * (3.0 * tt - 2.0 * ttt)
            + wide * m1 * (ttt - tt)
    }
}

/// Slopes that keep every piece from turning back: the harmonic mean of the neighbouring secants (Fritsch and Butland, 1984).
fn slopes(at: &[f64], shown: &[f64]) -> Vec<f64> {
    let secants: Vec<f64> = at
        .windows(2)
        .zip(shown.windows(2))
        .map(|(x, y)| match (x, y) {
            ([x0, x1], [y0, y1]) => (y1 - y0) / (x1 - x0),
            _ => 0.0,
        })
        .collect();
    let mut out = Vec::with_capacity(at.len());
    for i in 0..at.len() {
        let before = i.checked_sub(1).and_then(|b| secants.get(b)).copied();
        let after = secants.get(i).copied();
        out.push(match (before, after) {
            (Some(b), Some(a)) if b > 0.0 && a > 0.0 => 2.0 * a * b / (a + b),
            (None, Some(only)) | (Some(only), None) => only,
            _ => 0.0,
        });
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn passes_its_points_rises_between_and_is_odd() {
        let points = [(0.0, 0.0), (0.01, 0.0), (0.02, 13.0), (0.05, 80.0)];
        let curve = Curve::through(&points).expect("rises");
        for (at, shown) in points {
            assert!((curve.value(at) - shown).abs() < 1e-12);
            assert!((curve.value(-at) + shown).abs() < 1e-12);
        }
        let mut last = -1.0;
        for i in 0..=60 {
            let value = curve.value(f64::from(i) * 0.001);
            assert!(value >= last);
            last = value;
        }
        assert_eq!(curve.value(0.3), 80.0);
    }

    #[test]
    fn refuses_what_is_no_curve() {
        assert_eq!(Curve::through(&[(0.0, 0.0)]), None);
        assert_eq!(Curve::through(&[(0.0, 0.0), (0.0, 1.0)]), None);
        assert_eq!(Curve::through(&[(0.0, 0.0), (0.1, f64::NAN)]), None);
    }
}
