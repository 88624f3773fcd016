//! Kinematic viscosity over temperature: ASTM D341 (Walther).
//!
//! Inner loops call this by the hundred thousand: plain `f64`, mm²/s and °C, throughout.

use super::FluidError;
use crate::math::{exp, exp10, log10};
use crate::quantity::factor::CELSIUS_ZERO_K;

/// Accepted kinematic viscosity at 40 °C, mm²/s.
pub const KV40_RANGE: (f64, f64) = (1.0, 4000.0);
/// Accepted kinematic viscosity at 100 °C, mm²/s.
pub const KV100_RANGE: (f64, f64) = (0.5, 400.0);
/// Temperatures outside this span, in °C, are answered as its nearer end: no machine works there, and the formula means
/// nothing.
pub const TEMPERATURE_RANGE: (f64, f64) = (-60.0, 200.0);

/// ln 10
const LN_10: f64 = core::f64::consts::LN_10;

/// Viscosity over temperature of one oil, through two fitted points.
///
/// log₁₀ log₁₀ Z = A − B log₁₀ T with T in K and Z = ν + 0.7 + exp(−1.47 − 1.84 ν − 0.51 ν²), ν in mm²/s (ASTM D341; the
/// exponential is nothing above 2 mm²/s).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ViscosityCurve {
    a: f64,
    b: f64,
}

impl ViscosityCurve {
    /// Through `kv40` at 40 °C and `kv100` at 100 °C, mm²/s.
    ///
    /// # Errors
    /// [`FluidError::Viscosity`] outside [`KV40_RANGE`] and [`KV100_RANGE`], [`FluidError::NotFalling`].
    pub fn new(kv40: f64, kv100: f64) -> Result<Self, FluidError> {
        for (celsius, value, (low, high)) in [(40.0, kv40, KV40_RANGE), (100.0, kv100, KV100_RANGE)]
        {
            if !(low..=high).contains(&value) {
                return Err(FluidError::Viscosity {
                    celsius,
                    value,
                    low,
                    high,
                });
            }
        }
        if kv100 >= kv40 {
            return Err(FluidError::NotFalling { kv40, kv100 });
        }
        let (cold, hot) = (walther(kv40), walther(kv100));
        let (log_cold, log_hot) = (log10(40.0 + CELSIUS_ZERO_K), log10(100.0 + CELSIUS_ZERO_K));
        let b = (cold - hot) / (log_hot - log_cold);
        Ok(Self {
            a: cold + b * log_cold,
            b,
        })
    }

    /// The constants A and B of the fit.
    #[must_use]
    pub const fn constants(&self) -> (f64, f64) {
        (self.a, self.b)
    }

    /// Kinematic viscosity in mm²/s at `celsius` °C. Finite and above zero for every finite temperature; temperatures
    /// outside [`TEMPERATURE_RANGE`] count as its end. Below 0 °C and above 140 °C the fit is an extrapolation, and measured
    /// oils are thinner in the cold than it says: see [`remarks`](super::remarks).
    #[must_use]
    pub fn kinematic_at(&self, celsius: f64) -> f64 {
        self.kinematic_and_slope_at(celsius).0
    }

    /// Kinematic viscosity in mm²/s and its slope in mm²/s per K. The slope leaves out the small low-viscosity term: 0.1 % of
    /// it at 2 mm²/s, nothing above 4.
    #[must_use]
    pub fn kinematic_and_slope_at(&self, celsius: f64) -> (f64, f64) {
        let kelvin = celsius.clamp(TEMPERATURE_RANGE.0, TEMPERATURE_RANGE.1) + CELSIUS_ZERO_K;
        let log_z = exp10(self.a - self.b * log10(kelvin));
        let z = exp10(log_z);
        // dZ/dT = Z ln10 · d(log Z)/dT, and d(log Z)/dT = -log Z · B / T.
        let slope = -z * LN_10 * log_z * self.b / kelvin;
        (from_z(z), slope)
    }

    /// The temperature in °C at which the oil has this kinematic viscosity in mm²/s. Answers within
    /// [`TEMPERATURE_RANGE`], its end where the oil never gets that thick or thin.
    #[must_use]
    pub fn temperature_at(&self, kinematic: f64) -> f64 {
        let (low, high) = TEMPERATURE_RANGE;
        if kinematic.is_nan() || kinematic >= self.kinematic_at(low) {
            return low;
        }
        if kinematic <= self.kinematic_at(high) {
            return high;
        }
        let kelvin = exp10((self.a - walther(kinematic)) / self.b);
        (kelvin - CELSIUS_ZERO_K).clamp(low, high)
    }

    /// The curve of the same oil with its viscosity multiplied by `share` at 40 and 100 °C (sheared multigrade 0.7 to 0.8,
    /// the wrong drum anything).
    ///
    /// # Errors
    /// As [`ViscosityCurve::new`].
    pub fn scaled(&self, share: f64) -> Result<Self, FluidError> {
        Self::new(
            self.kinematic_at(40.0) * share,
            self.kinematic_at(100.0) * share,
        )
    }
}

/// log₁₀ log₁₀ Z of a viscosity in mm²/s.
fn walther(kinematic: f64) -> f64 {
    log10(log10(to_z(kinematic)))
}

fn to_z(kinematic: f64) -> f64 {
    kinematic + 0.7 + exp(-1.47 - 1.84 * kinematic - 0.51 * kinematic * kinematic)
}

/// Undoes [`to_z`] by the standard's own polynomial.
fn from_z(z: f64) -> f64 {
    let plain = z - 0.7;
    if plain > 4.0 {
        // The correction is under 1e-10 here.
        return plain;
    }
    let correction =
        -0.7487 - 3.295 * plain + 0.6119 * plain * plain - 0.3193 * plain * plain * plain;
    (plain - exp(correction)).max(1e-3)
}

/// By how much a laminar leak grows when the oil warms from one temperature to another: ν(`from`) / ν(`to`).
#[must_use]
pub fn leakage_growth(curve: &ViscosityCurve, from_celsius: f64, to_celsius: f64) -> f64 {
    curve.kinematic_at(from_celsius) / curve.kinematic_at(to_celsius)
}
