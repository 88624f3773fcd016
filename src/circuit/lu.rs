//! Dense LU with partial pivoting for the circuit's few unknowns, of which there are `N`. No allocation.
// Index loops are the clearest way to write elimination.
#![allow(clippy::needless_range_loop)]

/// Square matrix of the circuit.
pub type Matrix<const N: usize> = [[f64; N]; N];
/// Vector of the circuit.
pub type Vector<const N: usize> = [f64; N];

/// A factorised matrix.
#[derive(Clone, Copy, Debug)]
pub struct Lu<const N: usize> {
    a: Matrix<N>,
    order: [usize; N],
}

impl<const N: usize> Lu<N> {
    /// Factorises; none where the matrix is singular or not finite.
    pub fn new(mut a: Matrix<N>) -> Option<Lu<N>> {
        let mut order = [0; N];
        for (i, o) in order.iter_mut().enumerate() {
            *o = i;
        }
        for k in 0..N {
            let mut best = k;
            for r in k + 1..N {
                if a[r][k].abs() > a[best][k].abs() {
                    best = r;
                }
            }
            let pivot = a[best][k];
            if !(pivot.abs() > 1e-300 && pivot.is_finite()) {
                return None;
            }
            a.swap(k, best);
            order.swap(k, best);
            let inverse = 1.0 / a[k][k];
            for r in k + 1..N {
                if a[r][k] != 0.0 {
                    let factor = a[r][k] * inverse;
                    a[r][k] = factor;
                    for c in k + 1..N {
                        a[r][c] -= factor * a[k][c];
                    }
                }
            }
        }
        Some(Lu { a, order })
    }

    /// Solves A x = b.
    pub fn solve(&self, b: &Vector<N>) -> Vector<N> {
        let mut x = [0.0; N];
        for i in 0..N {
            let mut sum = b[self.order[i]];
            for j in 0..i {
                sum -= self.a[i][j] * x[j];
            }
            x[i] = sum;
        }
        for i in (0..N).rev() {
            let mut sum = x[i];
            for j in i + 1..N {
                sum -= self.a[i][j] * x[j];
            }
            x[i] = sum / self.a[i][i];
        }
        x
    }

    /// Solves Aᵀ x = b.
    pub fn solve_transposed(&self, b: &Vector<N>) -> Vector<N> {
        let mut y = *b;
        for i in 0..N {
            let mut sum = y[i];
            for j in 0..i {
                sum -= self.a[j][i] * y[j];
            }
            y[i] = sum / self.a[i][i];
        }
        for i in (0..N).rev() {
            let mut sum = y[i];
            for j in i + 1..N {
                sum -= self.a[j][i] * y[j];
            }
            y[i] = sum;
        }
        let mut x = [0.0; N];
        for i in 0..N {
            x[self.order[i]] = y[i];
        }
        x
    }
}
