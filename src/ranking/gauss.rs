//! Small symmetric positive matrices: Cholesky, inverse, log densities of blocks. Hot loop: plain `f64`, row-major.

use crate::math;

/// ln 2π.
pub const LN_TWO_PI: f64 = 1.837_877_066_409_345_3;

/// A positive definite matrix, factorised and inverted, with the residual it was asked about.
#[derive(Clone, Debug)]
pub struct Gauss {
    n: usize,
    /// Inverse (precision), row-major.
    pub precision: Vec<f64>,
    /// Precision × residual.
    pub z: Vec<f64>,
    /// Log density of the residual.
    pub log_density: f64,
}

/// Lower Cholesky factor in place; none where the matrix is not positive.
fn cholesky(a: &mut [f64], n: usize) -> Option<()> {
    for j in 0..n {
        let mut d = a[j * n + j];
        for k in 0..j {
            d -= a[j * n + k] * a[j * n + k];
        }
        if !(d > 0.0 && d.is_finite()) {
            return None;
        }
        let d = d.sqrt();
        a[j * n + j] = d;
        for i in j + 1..n {
            let mut s = a[i * n + j];
            for k in 0..j {
                s -= a[i * n + k] * a[j * n + k];
            }
            a[i * n + j] = s / d;
        }
    }
    Some(())
}

impl Gauss {
    /// Log density N(residual; 0, `covariance`) and the precision; none where the covariance is not positive.
    pub fn new(mut covariance: Vec<f64>, residual: &[f64]) -> Option<Gauss> {
        let n = residual.len();
        cholesky(&mut covariance, n)?;
        let l = covariance;
        // Inverse of the factor, then the precision.
        let mut inv = vec![0.0; n * n];
        for j in 0..n {
            inv[j * n + j] = 1.0 / l[j * n + j];
            for i in j + 1..n {
                let mut s = 0.0;
                for k in j..i {
                    s -= l[i * n + k] * inv[k * n + j];
                }
                inv[i * n + j] = s / l[i * n + i];
            }
        }
        let mut precision = vec![0.0; n * n];
        for i in 0..n {
            for j in 0..=i {
                let mut s = 0.0;
                for k in i..n {
                    s += inv[k * n + i] * inv[k * n + j];
                }
                precision[i * n + j] = s;
                precision[j * n + i] = s;
            }
        }
        let mut half_log_det = 0.0;
        let mut square = 0.0;
        for i in 0..n {
            half_log_det += math::ln(l[i * n + i]);
            let mut w = 0.0;
            for k in 0..=i {
                w += inv[i * n + k] * residual[k];
            }
            square += w * w;
        }
        let z = (0..n)
            .map(|i| (0..n).map(|k| precision[i * n + k] * residual[k]).sum())
            .collect();
        let log_density = -0.5 * square - half_log_det - 0.5 * n as f64 * LN_TWO_PI;
        Some(Gauss {
            n,
            precision,
            z,
            log_density,
        })
    }

    /// Log density of the residuals in `block` given all the others: what is lost when the block is left out.
    pub fn conditional(&self, block: &[usize]) -> f64 {
        let m = block.len();
        let mut a = vec![0.0; m * m];
        for (i, bi) in block.iter().enumerate() {
            for (j, bj) in block.iter().enumerate() {
                a[i * m + j] = self.precision[bi * self.n + bj];
            }
        }
        if cholesky(&mut a, m).is_none() {
            return 0.0;
        }
        // −½ zᵀ P⁻¹ z + ½ ln|P| − m/2 ln 2π, with P = L Lᵀ.
        let mut square = 0.0;
        let mut half_log_det = 0.0;
        let mut w = vec![0.0; m];
        for i in 0..m {
            let mut s = self.z[block[i]];
            for k in 0..i {
                s -= a[i * m + k] * w[k];
            }
            w[i] = s / a[i * m + i];
            square += w[i] * w[i];
            half_log_det += math::ln(a[i * m + i]);
        }
        -0.5 * square + half_log_det - 0.5 * m as f64 * LN_TWO_PI
    }
}

/// Takes correlation out of residuals: with C = L·Lᵀ, L⁻¹·x.
#[derive(Clone, Debug)]
pub struct Whitener {
    n: usize,
    factor: Vec<f64>,
}

impl Whitener {
    /// For a covariance; none where it is not positive.
    pub fn new(mut covariance: Vec<f64>, n: usize) -> Option<Whitener> {
        cholesky(&mut covariance, n)?;
        Some(Whitener {
            n,
            factor: covariance,
        })
    }

    /// L⁻¹·x.
    pub fn apply(&self, x: &[f64]) -> Vec<f64> {
        let n = self.n;
        let mut out: Vec<f64> = Vec::with_capacity(n);
        for (i, x) in x.iter().enumerate().take(n) {
            let row = &self.factor[i * n..(i + 1) * n];
            let before: f64 = row.iter().zip(&out).map(|(l, o)| l * o).sum();
            out.push((x - before) / row[i]);
        }
        out
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn density_and_conditional_agree_with_the_closed_form() {
        // Two variables, variances 2 and 3, covariance 1: determinant 5.
        let g = Gauss::new(vec![2.0, 1.0, 1.0, 3.0], &[0.5, -1.0]).expect("positive");
        let square = (3.0 * 0.25 + 2.0 * 0.5 + 2.0 * 1.0) / 5.0;
        let expected = -0.5 * square - 0.5 * math::ln(5.0) - LN_TWO_PI;
        assert!((g.log_density - expected).abs() < 1e-12);
        // Second given first: mean −1/2·… = 0.25, variance 2.5.
        let conditional =
            -0.5 * (-1.0f64 - 0.25).powi(2) / 2.5 - 0.5 * math::ln(2.5) - 0.5 * LN_TWO_PI;
        assert!((g.conditional(&[1]) - conditional).abs() < 1e-12);
        let first = -0.5 * 0.25 / 2.0 - 0.5 * math::ln(2.0) - 0.5 * LN_TWO_PI;
        assert!((g.log_density - g.conditional(&[1]) - first).abs() < 1e-12);
        assert!((g.conditional(&[0, 1]) - g.log_density).abs() < 1e-12);
    }

    #[test]
    fn whitened_residuals_have_the_same_square() {
        let c = vec![2.0, 1.0, 1.0, 3.0];
        let w = Whitener::new(c, 2).expect("positive").apply(&[0.5, -1.0]);
        let square = (3.0 * 0.25 + 2.0 * 0.5 + 2.0 * 1.0) / 5.0;
        assert!((w.iter().map(|x| x * x).sum::<f64>() - square).abs() < 1e-12);
    }

    #[test]
    fn a_matrix_that_is_not_positive_is_refused() {
        assert!(Gauss::new(vec![1.0, 2.0, 2.0, 1.0], &[0.0, 0.0]).is_none());
    }
}
