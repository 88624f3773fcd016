//! Elementary functions that give the same bits on every target.
//!
//! The standard library hands `exp`, `ln`, `powf` and their like to the platform, and the last bit then differs between a
//! native build and wasm (measured: 1 to 11 % of inputs). A ranking that shifts with the target cannot be tested, so the
//! whole core calls these, which are `libm` on both. `sqrt`, `abs`, `floor` and the four operations are exact everywhere
//! and need no wrapper.

use core::f64::consts::{LN_2, SQRT_2, TAU};

/// Natural logarithm.
#[must_use]
pub fn ln(x: f64) -> f64 {
    libm::log(x)
}

/// Natural logarithm of `1 + x`, exact for small `x`.
#[must_use]
pub fn ln_1p(x: f64) -> f64 {
    libm::log1p(x)
}

/// Logarithm to base 10.
#[must_use]
pub fn log10(x: f64) -> f64 {
    libm::log10(x)
}

/// Logarithm to base 2.
#[must_use]
pub fn log2(x: f64) -> f64 {
    libm::log2(x)
}

/// e to the power of `x`.
#[must_use]
pub fn exp(x: f64) -> f64 {
    libm::exp(x)
}

/// `exp(x) - 1`, exact for small `x`.
#[must_use]
pub fn exp_m1(x: f64) -> f64 {
    libm::expm1(x)
}

/// 10 to the power of `x`.
#[must_use]
pub fn exp10(x: f64) -> f64 {
    libm::exp10(x)
}

/// `x` to the power of `y`.
#[must_use]
pub fn pow(x: f64, y: f64) -> f64 {
    libm::pow(x, y)
}

/// Sine of an angle in radians.
#[must_use]
pub fn sin(x: f64) -> f64 {
    libm::sin(x)
}

/// Cosine of an angle in radians.
#[must_use]
pub fn cos(x: f64) -> f64 {
    libm::cos(x)
}

/// Tangent of an angle in radians.
#[must_use]
pub fn tan(x: f64) -> f64 {
    libm::tan(x)
}

/// Angle in radians of the direction (`x`, `y`), -π to π.
#[must_use]
pub fn atan2(y: f64, x: f64) -> f64 {
    libm::atan2(y, x)
}

/// Hyperbolic tangent.
#[must_use]
pub fn tanh(x: f64) -> f64 {
    libm::tanh(x)
}

/// Error function.
#[must_use]
pub fn erf(x: f64) -> f64 {
    libm::erf(x)
}

/// Complementary error function, `1 - erf(x)`, without loss for large `x`.
#[must_use]
pub fn erfc(x: f64) -> f64 {
    libm::erfc(x)
}

/// Logarithm of the size of the gamma function.
#[must_use]
pub fn ln_gamma(x: f64) -> f64 {
    libm::lgamma(x)
}

/// Density of the standard normal distribution.
#[must_use]
pub fn normal_density(x: f64) -> f64 {
    exp(ln_normal_density(x))
}

/// Logarithm of the density of the standard normal distribution.
#[must_use]
pub fn ln_normal_density(x: f64) -> f64 {
    // ½ ln 2π
    const HALF_LN_TAU: f64 = 0.918_938_533_204_672_8;
    -0.5 * x * x - HALF_LN_TAU
}

/// Distribution function of the standard normal distribution: the chance of a draw at or under `x`.
#[must_use]
pub fn normal_cdf(x: f64) -> f64 {
    0.5 * erfc(-x / SQRT_2)
}

/// Logarithm of [`normal_cdf`], finite far into the lower tail where the function itself is zero. Relative error under
/// 1e-9.
#[must_use]
pub fn ln_normal_cdf(x: f64) -> f64 {
    if x > -25.0 {
        return ln(erfc(-x / SQRT_2)) - LN_2;
    }
    // Asymptotic series of Mills' ratio (Abramowitz & Stegun 26.2.12).
    let r = 1.0 / (x * x);
    let series = r * (-1.0 + r * (3.0 + r * (-15.0 + r * 105.0)));
    ln_normal_density(x) - ln(-x) + ln_1p(series)
}

/// Quantile of the standard normal distribution. 0 gives -∞, 1 gives ∞, anything outside 0 to 1 NaN. Relative error about
/// 1e-15 (Wichura 1988, algorithm AS 241).
#[must_use]
pub fn normal_quantile(p: f64) -> f64 {
    if p.is_nan() || !(0.0..=1.0).contains(&p) {
        return f64::NAN;
    }
    let q = p - 0.5;
    if q.abs() <= 0.425 {
        return q * rational(&CENTRE, 0.180_625 - q * q);
    }
    let tail = if q < 0.0 { p } else { 1.0 - p };
    if tail <= 0.0 {
        return if q < 0.0 {
            f64::NEG_INFINITY
        } else {
            f64::INFINITY
        };
    }
    let r = (-ln(tail)).sqrt();
    let size = if r <= 5.0 {
        rational(&NEAR_TAIL, r - 1.6)
    } else {
        rational(&FAR_TAIL, r - 5.0)
    };
    if q < 0.0 { -size } else { size }
}

/// Numerator and denominator of degree 7, lowest power first.
struct Rational {
    above: [f64; 8],
    below: [f64; 8],
}

fn rational(of: &Rational, x: f64) -> f64 {
    let horner =
        |coefficients: &[f64; 8]| coefficients.iter().rev().fold(0.0, |sum, c| sum * x + c);
    horner(&of.above) / horner(&of.below)
}

const CENTRE: Rational = Rational {
    above: [
        3.387_132_872_796_366_5,
        133.141_667_891_784_38,
        1_971.590_950_306_551_3,
        13_731.693_765_509_46,
        45_921.953_931_549_87,
        67_265.770_927_008_7,
        33_430.575_583_588_13,
        2_509.080_928_730_122_7,
    ],
    below: [
        1.0,
        42.313_330_701_600_91,
        687.187_007_492_057_9,
        5_394.196_021_424_751,
        21_213.794_301_586_597,
        39_307.895_800_092_71,
        28_729.085_735_721_943,
        5_226.495_278_852_854,
    ],
};

const NEAR_TAIL: Rational = Rational {
    above: [
        1.423_437_110_749_683_5,
        4.630_337_846_156_546,
        5.769_497_221_460_691,
        3.647_848_324_763_204_5,
        1.270_458_252_452_368_4,
        0.241_780_725_177_450_6,
        0.022_723_844_989_269_184,
        7.745_450_142_783_414e-4,
    ],
    below: [
        1.0,
        2.053_191_626_637_759,
        1.676_384_830_183_803_8,
        0.689_767_334_985_1,
        0.148_103_976_427_480_08,
        0.015_198_666_563_616_457,
        5.475_938_084_995_345e-4,
        1.050_750_071_644_416_9e-9,
    ],
};

const FAR_TAIL: Rational = Rational {
    above: [
        6.657_904_643_501_103,
        5.463_784_911_164_114,
        1.784_826_539_917_291_3,
        0.296_560_571_828_504_87,
        0.026_532_189_526_576_124,
        1.242_660_947_388_078_4e-3,
        2.711_555_568_743_487_6e-5,
        2.010_334_399_292_288e-7,
    ],
    below: [
        1.0,
        0.599_832_206_555_887_9,
        0.136_929_880_922_735_8,
        0.014_875_361_290_850_615,
        7.868_691_311_456_133e-4,
        1.846_318_317_510_054_7e-5,
        1.421_511_758_316_446e-7,
        2.044_263_103_389_939_8e-15,
    ],
};

/// Logarithm of the sum of exponentials of `terms`, without overflow. Empty: -∞.
#[must_use]
pub fn ln_sum_exp(terms: &[f64]) -> f64 {
    let largest = terms.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    if !largest.is_finite() {
        return largest;
    }
    largest + ln(terms.iter().map(|term| exp(term - largest)).sum())
}

/// An angle brought into -π to π.
#[must_use]
pub fn wrap_angle(angle: f64) -> f64 {
    angle - TAU * (angle / TAU).round()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quantile_undoes_the_distribution() {
        for x in [-8.0, -6.5, -3.0, -1.96, -0.4, 0.0, 0.3, 1.0, 2.576, 5.0] {
            let back = normal_quantile(normal_cdf(x));
            // Above the centre the chance itself is rounded near 1.
            let tolerance =
                1e-13 * x.abs() + f64::EPSILON / normal_density(x).min(1.0) * f64::from(x > 0.0);
            assert!((back - x).abs() <= tolerance + 1e-15, "{x}: {back}");
        }
        assert_eq!(normal_quantile(0.0), f64::NEG_INFINITY);
        assert_eq!(normal_quantile(1.0), f64::INFINITY);
        assert!(normal_quantile(1.1).is_nan() && normal_quantile(f64::NAN).is_nan());
    }

    #[test]
    fn tail_logarithm_joins_smoothly() {
        let step = 1e-6;
        let (above, below) = (ln_normal_cdf(-25.0 + step), ln_normal_cdf(-25.0));
        // The slope there is about 25.04.
        assert!(((above - below) / step - 25.04).abs() < 0.01);
        assert!((ln_normal_cdf(-25.0) + 316.639_408).abs() < 1e-4);
        assert!(ln_normal_cdf(-1e6).is_finite());
        assert!((ln_normal_cdf(0.0) + LN_2).abs() < 1e-15);
    }

    #[test]
    fn sums_of_exponentials() {
        assert!((ln_sum_exp(&[1000.0, 1000.0]) - 1000.0 - LN_2).abs() < 1e-12);
        assert_eq!(ln_sum_exp(&[]), f64::NEG_INFINITY);
        assert_eq!(ln_sum_exp(&[f64::NEG_INFINITY]), f64::NEG_INFINITY);
    }

    #[test]
    fn angles_wrap() {
        assert!((wrap_angle(7.0) - (7.0 - TAU)).abs() < 1e-15);
        assert!((wrap_angle(-3.0) + 3.0).abs() < 1e-15);
    }
}
