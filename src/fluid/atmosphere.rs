//! Pressure of the air at a height: the standard atmosphere (ISO 2533, US Standard Atmosphere 1976), up to 11 km.

use crate::math::pow;
use crate::quantity::typed::{Length, Pressure};
use uom::si;

/// Pressure of the standard atmosphere at sea level, bar.
pub const SEA_LEVEL_BAR: f64 = 1.013_25;
/// Heights in m that are answered; others count as the nearer end.
pub const HEIGHT_RANGE: (f64, f64) = (-500.0, 11_000.0);

/// Temperature at sea level, K.
const SEA_LEVEL_K: f64 = 288.15;
/// Fall of temperature with height, K/m.
const LAPSE: f64 = 0.0065;
/// g M / (R × lapse) with the constants of the standard.
const EXPONENT: f64 = 9.806_65 * 0.028_964_4 / (8.314_32 * LAPSE);

/// Absolute pressure of the air in bar at a height above the sea in m. The weather shifts it by about 0.03 bar.
#[must_use]
pub fn pressure_bar(height_m: f64) -> f64 {
    let height = height_m.clamp(HEIGHT_RANGE.0, HEIGHT_RANGE.1);
    SEA_LEVEL_BAR * pow(1.0 - LAPSE * height / SEA_LEVEL_K, EXPONENT)
}

/// Absolute pressure of the air at a height above the sea.
#[must_use]
pub fn pressure(height: Length) -> Pressure {
    Pressure::new::<si::pressure::pascal>(pressure_bar(height.get::<si::length::meter>()) * 1e5)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn standard_atmosphere() {
        // Tabulated pressures of the US Standard Atmosphere 1976 (from memory): 0, 1000, 3000, 5000, 11 000 m.
        for (height, bar) in [
            (0.0, 1.013_25),
            (1000.0, 0.898_75),
            (3000.0, 0.701_09),
            (5000.0, 0.540_20),
            (11_000.0, 0.226_32),
        ] {
            assert!(
                (pressure_bar(height) - bar).abs() < 2e-5,
                "{height}: {}",
                pressure_bar(height)
            );
        }
        assert_eq!(pressure_bar(1e9), pressure_bar(11_000.0));
    }
}
