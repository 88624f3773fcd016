//! Robust straight lines: Huber's M-estimator by iterated reweighting, scale by the median of absolute residuals.
//!
//! Huber, P. J. and Ronchetti, E. M., *Robust Statistics*, 2nd ed. (2009), chapter 7: weights 1 up to [`BEND`] scales and falling
//! off beyond; covariance after their equation (7.83) with the correction for few points. A test holds it against a published
//! statistics library on the same data.

use crate::math;

/// Where Huber's weights begin to fall, in scales: 95 % efficiency with normal errors.
pub const BEND: f64 = 1.345;
/// Most rounds of reweighting.
const ROUNDS: usize = 200;
/// Relative change under which the coefficients stand.
const STILL: f64 = 1e-12;
/// Normal-consistent factor on the median of absolute residuals: the 0.75 quantile.
const MEDIAN_NORMAL: f64 = 0.674_489_750_196_081_7;

/// A robust fit.
#[derive(Clone, Debug, PartialEq)]
pub struct Robust {
    /// Coefficients, in the order of the columns.
    pub coefficients: Vec<f64>,
    /// Their covariance by the residuals alone, row by row.
    pub covariance: Vec<f64>,
    /// (XᵀX)⁻¹ of the rows as given, row by row.
    pub inverse: Vec<f64>,
    /// Weight of each row, 0 to 1: under 1 where it stands off.
    pub weights: Vec<f64>,
    /// Scale of the residuals.
    pub scale: f64,
    /// Rows less columns.
    pub freedom: usize,
}

/// Fits y = X·b. Rows are divided by their own standard uncertainty beforehand. None where there are fewer rows than columns
/// or the columns cannot be told apart.
#[must_use]
pub fn robust(rows: &[Vec<f64>], y: &[f64]) -> Option<Robust> {
    let columns = rows.first()?.len();
    if rows.len() != y.len() || rows.len() < columns || rows.iter().any(|r| r.len() != columns) {
        return None;
    }
    let mut weights = vec![1.0; rows.len()];
    let inverse = invert(&normal(rows, &weights, columns), columns)?;
    let mut b = solve(rows, y, &weights, columns)?;
    let freedom = rows.len() - columns;
    let mut scale = scale_of(&residuals(rows, y, &b));
    for _ in 0..ROUNDS {
        // Rounding alone is left: nothing stands off.
        let size = y.iter().map(|v| v.abs()).fold(0.0, f64::max);
        if freedom == 0 || scale <= 1e-12 * size {
            break;
        }
        for (w, r) in weights.iter_mut().zip(residuals(rows, y, &b)) {
            *w = (BEND * scale / r.abs().max(1e-300)).min(1.0);
        }
        let next = solve(rows, y, &weights, columns)?;
        let moved = next
            .iter()
            .zip(&b)
            .map(|(n, o)| (n - o).abs() / (n.abs() + o.abs()).max(1e-30))
            .fold(0.0, f64::max);
        b = next;
        scale = scale_of(&residuals(rows, y, &b));
        if moved < STILL {
            break;
        }
    }
    let covariance = covariance(rows, y, &b, scale, &inverse);
    Some(Robust {
        coefficients: b,
        covariance,
        inverse,
        weights,
        scale,
        freedom,
    })
}

/// k² · (Σψ²·s²/(n−p)) / (mean ψ′)² · (XᵀX)⁻¹, with k = 1 + p/n · var(ψ′)/(mean ψ′)².
fn covariance(rows: &[Vec<f64>], y: &[f64], b: &[f64], scale: f64, inverse: &[f64]) -> Vec<f64> {
    let (n, p) = (rows.len() as f64, b.len() as f64);
    if n <= p || scale <= 0.0 {
        return vec![0.0; inverse.len()];
    }
    let standard: Vec<f64> = residuals(rows, y, b).iter().map(|r| r / scale).collect();
    let squares: f64 = standard.iter().map(|r| r.clamp(-BEND, BEND).powi(2)).sum();
    let inner = standard.iter().filter(|r| r.abs() <= BEND).count() as f64 / n;
    if inner <= 0.0 {
        return vec![0.0; inverse.len()];
    }
    let k = 1.0 + p / n * (inner * (1.0 - inner)) / (inner * inner);
    let variance = k * k * squares * scale * scale / (n - p) / (inner * inner);
    inverse.iter().map(|c| c * variance).collect()
}

fn residuals(rows: &[Vec<f64>], y: &[f64], b: &[f64]) -> Vec<f64> {
    rows.iter().zip(y).map(|(row, y)| y - dot(row, b)).collect()
}

fn dot(row: &[f64], b: &[f64]) -> f64 {
    row.iter().zip(b).map(|(x, b)| x * b).sum()
}

/// Median of the absolute residuals over the normal's.
fn scale_of(residuals: &[f64]) -> f64 {
    let sizes: Vec<f64> = residuals.iter().map(|r| r.abs()).collect();
    median(&sizes) / MEDIAN_NORMAL
}

/// Median; 0 of nothing.
pub(super) fn median(values: &[f64]) -> f64 {
    let mut sorted = values.to_vec();
    sorted.sort_by(f64::total_cmp);
    let middle = sorted.len() / 2;
    match (sorted.get(middle), sorted.len() % 2) {
        (None, _) => 0.0,
        (Some(m), 1) => *m,
        (Some(m), _) => 0.5 * (m + sorted[middle - 1]),
    }
}

fn normal(rows: &[Vec<f64>], weights: &[f64], columns: usize) -> Vec<f64> {
    let mut a = vec![0.0; columns * columns];
    for (row, w) in rows.iter().zip(weights) {
        for i in 0..columns {
            for j in 0..columns {
                a[i * columns + j] += w * row[i] * row[j];
            }
        }
    }
    a
}

fn solve(rows: &[Vec<f64>], y: &[f64], weights: &[f64], columns: usize) -> Option<Vec<f64>> {
    let inverse = invert(&normal(rows, weights, columns), columns)?;
    let mut right = vec![0.0; columns];
    for ((row, y), w) in rows.iter().zip(y).zip(weights) {
        for (r, x) in right.iter_mut().zip(row) {
            *r += w * x * y;
        }
    }
    Some(
        (0..columns)
            .map(|i| dot(&inverse[i * columns..(i + 1) * columns], &right))
            .collect(),
    )
}

/// Inverse of a small symmetric positive matrix by Gauss–Jordan with pivots; none where it is singular.
fn invert(a: &[f64], n: usize) -> Option<Vec<f64>> {
    let mut m = a.to_vec();
    let mut inv: Vec<f64> = (0..n * n)
        .map(|k| f64::from(u8::from(k / n == k % n)))
        .collect();
    let size = a.iter().map(|v| v.abs()).fold(0.0, f64::max);
    for column in 0..n {
        let pivot = (column..n)
            .max_by(|i, j| m[i * n + column].abs().total_cmp(&m[j * n + column].abs()))?;
        if m[pivot * n + column].abs() <= 1e-13 * size {
            return None;
        }
        for k in 0..n {
            m.swap(column * n + k, pivot * n + k);
            inv.swap(column * n + k, pivot * n + k);
        }
        let by = m[column * n + column];
        for k in 0..n {
            m[column * n + k] /= by;
            inv[column * n + k] /= by;
        }
        for row in (0..n).filter(|row| *row != column) {
            let by = m[row * n + column];
            for k in 0..n {
                m[row * n + k] -= by * m[column * n + k];
                inv[row * n + k] -= by * inv[column * n + k];
            }
        }
    }
    Some(inv)
}

/// Quantile of Student's t for a two-sided 95 % interval and the like: `p` over 0.5, `freedom` 1 or more.
/// Hill, G. W., *Algorithm 396: Student's t-quantiles*, Communications of the ACM 13 (1970) 619–620.
#[must_use]
pub fn student_quantile(p: f64, freedom: f64) -> f64 {
    let n = freedom.max(1.0);
    let two = (2.0 * (1.0 - p)).clamp(1e-12, 1.0);
    if (n - 1.0).abs() < 1e-9 {
        let angle = two * core::f64::consts::FRAC_PI_2;
        return 1.0 / math::tan(angle);
    }
    if (n - 2.0).abs() < 1e-9 {
        return (2.0 / (two * (2.0 - two)) - 2.0).sqrt();
    }
    let a = 1.0 / (n - 0.5);
    let b = 48.0 / (a * a);
    let mut c = ((20_700.0 * a / b - 98.0) * a - 16.0) * a + 96.36;
    let d = ((94.5 / (b + c) - 3.0) / b + 1.0) * (a * core::f64::consts::FRAC_PI_2).sqrt() * n;
    let mut x = d * two;
    let mut y = math::pow(x, 2.0 / n);
    if y > 0.05 + a {
        x = math::normal_quantile(0.5 * two);
        y = x * x;
        if n < 5.0 {
            c += 0.3 * (n - 4.5) * (x + 0.6);
        }
        c += (((0.05 * d * x - 5.0) * x - 7.0) * x - 2.0) * x + b;
        y = (((((0.4 * y + 6.3) * y + 36.0) * y + 94.5) / c - y - 3.0) / b + 1.0) * x;
        y = a * y * y;
        y = math::exp_m1(y);
    } else {
        y = ((1.0 / (((n + 6.0) / (n * y) - 0.089 * d - 0.822) * (n + 2.0) * 3.0)
            + 0.5 / (n + 4.0))
            * y
            - 1.0)
            * (n + 1.0)
            / (n + 2.0)
            + 1.0 / y;
    }
    (n * y).sqrt()
}
