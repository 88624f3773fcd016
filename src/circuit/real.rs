//! Numbers that carry their own derivatives (forward mode), so that every element law is written once and its exact
//! partial derivatives follow. Hot loop: plain `f64` in the circuit's units.

use core::ops::{Add, Div, Mul, Neg, Sub};

/// What an element law may do with a number.
pub trait Real:
    Copy
    + Add<Output = Self>
    + Sub<Output = Self>
    + Mul<Output = Self>
    + Div<Output = Self>
    + Neg<Output = Self>
    + Add<f64, Output = Self>
    + Sub<f64, Output = Self>
    + Mul<f64, Output = Self>
{
    /// A constant.
    fn constant(value: f64) -> Self;
    /// The value without its derivatives.
    fn value(self) -> f64;
    /// Square root; the argument must be positive.
    fn sqrt(self) -> Self;
}

impl Real for f64 {
    #[inline(always)]
    fn constant(value: f64) -> Self {
        value
    }
    #[inline(always)]
    fn value(self) -> f64 {
        self
    }
    #[inline(always)]
    fn sqrt(self) -> Self {
        f64::sqrt(self)
    }
}

/// A value with its partial derivatives with respect to `N` inputs.
#[derive(Clone, Copy, Debug)]
pub struct Dual<const N: usize> {
    /// Value.
    pub v: f64,
    /// Partial derivatives.
    pub d: [f64; N],
}

impl<const N: usize> Dual<N> {
    /// The `lane`-th input itself.
    #[inline(always)]
    pub fn input(value: f64, lane: usize) -> Self {
        let mut d = [0.0; N];
        d[lane] = 1.0;
        Dual { v: value, d }
    }

    #[inline(always)]
    fn map2(self, o: Self, v: f64, ds: f64, d_o: f64) -> Self {
        let mut d = self.d;
        for (own, other) in d.iter_mut().zip(o.d) {
            *own = ds * *own + d_o * other;
        }
        Dual { v, d }
    }

    #[inline(always)]
    fn map(self, v: f64, ds: f64) -> Self {
        let mut d = self.d;
        for e in &mut d {
            *e *= ds;
        }
        Dual { v, d }
    }
}

impl<const N: usize> Real for Dual<N> {
    #[inline(always)]
    fn constant(value: f64) -> Self {
        Dual {
            v: value,
            d: [0.0; N],
        }
    }
    #[inline(always)]
    fn value(self) -> f64 {
        self.v
    }
    #[inline(always)]
    fn sqrt(self) -> Self {
        let r = self.v.sqrt();
        self.map(r, 0.5 / r)
    }
}

impl<const N: usize> Add for Dual<N> {
    type Output = Self;
    #[inline(always)]
    fn add(self, o: Self) -> Self {
        self.map2(o, self.v + o.v, 1.0, 1.0)
    }
}
impl<const N: usize> Sub for Dual<N> {
    type Output = Self;
    #[inline(always)]
    fn sub(self, o: Self) -> Self {
        self.map2(o, self.v - o.v, 1.0, -1.0)
    }
}
impl<const N: usize> Mul for Dual<N> {
    type Output = Self;
    #[inline(always)]
    fn mul(self, o: Self) -> Self {
        self.map2(o, self.v * o.v, o.v, self.v)
    }
}
impl<const N: usize> Div for Dual<N> {
    type Output = Self;
    #[inline(always)]
    fn div(self, o: Self) -> Self {
        let inv = 1.0 / o.v;
        let v = self.v * inv;
        self.map2(o, v, inv, -v * inv)
    }
}
impl<const N: usize> Neg for Dual<N> {
    type Output = Self;
    #[inline(always)]
    fn neg(self) -> Self {
        self.map(-self.v, -1.0)
    }
}
impl<const N: usize> Add<f64> for Dual<N> {
    type Output = Self;
    #[inline(always)]
    fn add(self, c: f64) -> Self {
        Dual {
            v: self.v + c,
            d: self.d,
        }
    }
}
impl<const N: usize> Sub<f64> for Dual<N> {
    type Output = Self;
    #[inline(always)]
    fn sub(self, c: f64) -> Self {
        Dual {
            v: self.v - c,
            d: self.d,
        }
    }
}
impl<const N: usize> Mul<f64> for Dual<N> {
    type Output = Self;
    #[inline(always)]
    fn mul(self, c: f64) -> Self {
        self.map(self.v * c, c)
    }
}

/// Smooth positive part: near `max(x, 0)` outside a band of about `w` round zero (algebraic, so it costs one root).
#[inline(always)]
pub fn positive<S: Real>(x: S, w: f64) -> S {
    (x + (x * x + w * w).sqrt()) * 0.5
}

/// Smooth limit of `x` to −`a` … `a`, `a` ≥ 0; corners rounded over about `w`.
#[inline(always)]
pub fn limited<S: Real>(x: S, a: S, w: f64) -> S {
    let (up, down) = (x + a, x - a);
    ((up * up + w * w).sqrt() - (down * down + w * w).sqrt()) * 0.5
}

/// Smooth step from 0 to 1 round `x` = 0 over a width of about `w`.
#[inline(always)]
pub fn step<S: Real>(x: S, w: f64) -> S {
    (x / (x * x + w * w).sqrt()) * 0.5 + 0.5
}

/// Square-root flow characteristic, odd in `dp`, straight inside about ± `d`: dp / (dp² + d²)^¼.
#[inline(always)]
pub fn root_flow<S: Real>(dp: S, d: f64) -> S {
    dp / (dp * dp + d * d).sqrt().sqrt()
}
