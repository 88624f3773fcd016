//! Conversion factors, built from the units' definitions.
//!
//! The inch (25.4 mm), the pound (0.453 592 37 kg), standard gravity (9.806 65 m/s²) and the two gallons (231 in³;
//! 4.546 09 L) are exact by definition, so every factor here is exact to the last bits of an `f64`. Tables of seven
//! printed digits (NIST SP 811 Appendix B; the `uom` crate holds the same) serve as the outside check, not as the source:
//! a psi of 6 894.757 Pa is off by 4 in 10⁸.

/// Inch in metres.
pub const INCH_M: f64 = 0.0254;
/// Foot in metres.
pub const FOOT_M: f64 = 12.0 * INCH_M;
/// Mile in metres.
pub const MILE_M: f64 = 1609.344;
/// Pound (avoirdupois) in kilograms.
pub const POUND_KG: f64 = 0.453_592_37;
/// Standard acceleration of gravity in m/s².
pub const GRAVITY_M_S2: f64 = 9.806_65;
/// Pound-force in newtons.
pub const POUND_FORCE_N: f64 = POUND_KG * GRAVITY_M_S2;
/// Cubic inch in cubic centimetres.
pub const CUBIC_INCH_CM3: f64 = 16.387_064;
/// Cubic foot in litres.
pub const CUBIC_FOOT_L: f64 = 28.316_846_592;
/// US gallon in litres: 231 in³.
pub const US_GALLON_L: f64 = 3.785_411_784;
/// Imperial gallon in litres.
pub const IMPERIAL_GALLON_L: f64 = 4.546_09;
/// Pound-force per square inch in bar.
pub const PSI_BAR: f64 = POUND_FORCE_N / (INCH_M * INCH_M) * 1e-5;
/// Conventional millimetre of mercury in bar: 133.322 387 415 Pa.
pub const MM_MERCURY_BAR: f64 = 133.322_387_415e-5;
/// Conventional inch of mercury in bar.
pub const INCH_MERCURY_BAR: f64 = 25.4 * MM_MERCURY_BAR;
/// Technical atmosphere (kgf/cm²) in bar.
pub const KGF_CM2_BAR: f64 = 0.980_665;
/// Pound-force foot in newton metres.
pub const POUND_FOOT_NM: f64 = POUND_FORCE_N * FOOT_M;
/// Pound-force inch in newton metres.
pub const POUND_INCH_NM: f64 = POUND_FORCE_N * INCH_M;
/// Horsepower (550 ft·lbf/s) in kilowatts.
pub const HORSEPOWER_KW: f64 = 550.0 * POUND_FOOT_NM * 1e-3;
/// Metric horsepower (75 kgf·m/s) in kilowatts.
pub const METRIC_HORSEPOWER_KW: f64 = 75.0 * GRAVITY_M_S2 * 1e-3;
/// One revolution per minute in rad/s.
pub const RPM_RAD_S: f64 = core::f64::consts::TAU / 60.0;
/// Celsius zero in kelvin.
pub const CELSIUS_ZERO_K: f64 = 273.15;
