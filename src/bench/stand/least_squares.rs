//! Weighted linear least squares of a few unknowns, with their covariance.

use crate::ranking::Gauss;

/// One observation: what each unknown contributes, what was seen, and its standard uncertainty by chance.
#[derive(Clone, Debug, PartialEq)]
pub struct Observation {
    /// Factor of each unknown.
    pub row: Vec<f64>,
    /// What was seen.
    pub seen: f64,
    /// Standard uncertainty.
    pub sigma: f64,
}

/// An estimate.
#[derive(Clone, Debug, PartialEq)]
pub struct Estimate {
    /// The unknowns.
    pub x: Vec<f64>,
    /// Their covariance, row-major, as the stated uncertainties give it.
    pub covariance: Vec<f64>,
    /// Sum of squared residuals, each over its uncertainty.
    pub chi_squared: f64,
    /// Observations less unknowns.
    pub freedom: usize,
}

impl Estimate {
    /// Standard uncertainty of one unknown.
    #[must_use]
    pub fn standard(&self, at: usize) -> f64 {
        self.covariance[at * self.x.len() + at].max(0.0).sqrt()
    }

    /// What the estimate foretells for a row.
    #[must_use]
    pub fn foretold(&self, row: &[f64]) -> f64 {
        row.iter().zip(&self.x).map(|(a, x)| a * x).sum()
    }

    /// Root of chi squared over the degrees of freedom, not under 1: scatter beyond what was stated widens everything (Birge
    /// ratio).
    #[must_use]
    pub fn birge(&self) -> f64 {
        if self.freedom == 0 {
            1.0
        } else {
            (self.chi_squared / self.freedom as f64).sqrt().max(1.0)
        }
    }
}

/// Least squares; none where the observations do not determine every unknown, or are fewer.
#[must_use]
pub fn solve(observations: &[Observation]) -> Option<Estimate> {
    let n = observations.first()?.row.len();
    if observations.len() < n || n == 0 {
        return None;
    }
    let whitened: Vec<(Vec<f64>, f64)> = observations
        .iter()
        .map(|o| {
            let row = o.row.iter().map(|a| a / o.sigma).collect();
            (row, o.seen / o.sigma)
        })
        .collect();
    // Columns of one length: else litres against their hundredths make the normal equations worse than they are.
    let lengths: Vec<f64> = (0..n)
        .map(|j| {
            whitened
                .iter()
                .map(|(row, _)| row[j] * row[j])
                .sum::<f64>()
                .sqrt()
        })
        .collect();
    if lengths
        .iter()
        .any(|length| !(*length > 0.0 && length.is_finite()))
    {
        return None;
    }
    let mut normal = vec![0.0; n * n];
    let mut right = vec![0.0; n];
    for (row, seen) in &whitened {
        for i in 0..n {
            let scaled = row[i] / lengths[i];
            right[i] += scaled * seen;
            for j in 0..n {
                normal[i * n + j] += scaled * row[j] / lengths[j];
            }
        }
    }
    // Columns that are one another's image to ten digits are not told apart.
    let gauss = Gauss::new(normal, &right)?;
    if (0..n).any(|i| gauss.precision[i * n + i] > 1e9) {
        return None;
    }
    let x: Vec<f64> = (0..n).map(|i| gauss.z[i] / lengths[i]).collect();
    let covariance = (0..n * n)
        .map(|at| gauss.precision[at] / (lengths[at / n] * lengths[at % n]))
        .collect();
    let chi_squared = whitened
        .iter()
        .map(|(row, seen)| {
            let foretold: f64 = row.iter().zip(&x).map(|(a, x)| a * x).sum();
            (seen - foretold) * (seen - foretold)
        })
        .sum();
    Some(Estimate {
        freedom: observations.len() - n,
        x,
        covariance,
        chi_squared,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn line(x: f64, y: f64, sigma: f64) -> Observation {
        Observation {
            row: vec![1.0, x],
            seen: y,
            sigma,
        }
    }

    #[test]
    fn a_line_through_three_points_by_hand() {
        // y = 1, 3, 4 at x = 0, 1, 2: slope 1.5, intercept 7/6, residual sum of squares 1/6.
        let data = [
            line(0.0, 1.0, 1.0),
            line(1.0, 3.0, 1.0),
            line(2.0, 4.0, 1.0),
        ];
        let fit = solve(&data).expect("determined");
        assert!((fit.x[0] - 7.0 / 6.0).abs() < 1e-12);
        assert!((fit.x[1] - 1.5).abs() < 1e-12);
        assert!((fit.chi_squared - 1.0 / 6.0).abs() < 1e-12);
        assert!((fit.covariance[3] - 0.5).abs() < 1e-12);
        assert!((fit.covariance[0] - 5.0 / 6.0).abs() < 1e-12);
        assert_eq!(fit.freedom, 1);
    }

    #[test]
    fn what_is_not_determined_is_not_answered() {
        assert_eq!(solve(&[]), None);
        assert_eq!(solve(&[line(1.0, 2.0, 1.0)]), None);
        let alike = [
            line(1.0, 2.0, 1.0),
            line(1.0, 2.1, 1.0),
            line(1.0, 1.9, 1.0),
        ];
        assert_eq!(solve(&alike), None);
    }
}
