//! Elementary and statistical functions against the standard library and the `statrs` crate.
#![cfg(not(target_arch = "wasm32"))]

use lowside::math;
use proptest::prelude::*;
use statrs::distribution::{Continuous, ContinuousCDF, Normal};
use statrs::function::gamma::ln_gamma;

fn normal() -> Normal {
    Normal::new(0.0, 1.0).expect("the standard normal distribution")
}

/// Printed quantiles of the standard normal distribution.
#[test]
fn printed_quantiles() {
    for (chance, quantile) in [
        (0.975, 1.959_963_984_540_054),
        (0.95, 1.644_853_626_951_472_2),
        (0.5, 0.0),
    ] {
        assert!(
            (math::normal_quantile(chance) - quantile).abs() < 1e-14,
            "{chance}"
        );
    }
    assert!((math::normal_cdf(1.0) - 0.841_344_746_068_542_9).abs() < 1e-15);
}

/// The same distribution by scipy 1.17.1, to the last places and far into the tail.
#[test]
fn distribution_by_scipy() {
    let close = |ours: f64, theirs: f64, digits: f64| (ours / theirs - 1.0).abs() < digits;
    for (x, cdf) in [
        (-6.0, 9.865_876_450_376_946e-10),
        (-3.3, 4.834_241_423_837_774_4e-4),
        (-1.866_901_126_383_837_5, 0.030_957_698_276_114_82),
        (0.7, 0.758_036_347_776_927),
        (2.5, 0.993_790_334_674_223_8),
    ] {
        assert!(close(math::normal_cdf(x), cdf, 1e-13), "{x}");
    }
    for (chance, quantile) in [
        (1e-10, -6.361_340_902_404_056),
        (1e-4, -3.719_016_485_455_680_4),
        (0.3, -0.524_400_512_708_040_9),
        (0.9, 1.281_551_565_544_600_4),
    ] {
        assert!(
            close(math::normal_quantile(chance), quantile, 1e-14),
            "{chance}"
        );
    }
    for (x, ln_cdf) in [
        (-3.0, -6.60772622151035),
        (-8.0, -35.01343715991456),
        (-24.0, -292.09872100320786),
        (-26.0, -342.17850892992794),
        (-30.0, -454.32124395634327),
        (-100.0, -5005.524208694205),
    ] {
        assert!(
            close(math::ln_normal_cdf(x), ln_cdf, 1e-10),
            "{x}: {}",
            math::ln_normal_cdf(x)
        );
    }
}

proptest! {
    #[test]
    fn normal_distribution_is_that_of_statrs(x in -8.0_f64..8.0) {
        // The crate's own error function holds about ten digits; the sharper check is printed_quantiles.
        prop_assert!((math::normal_cdf(x) - normal().cdf(x)).abs() < 1e-10);
        prop_assert!((math::normal_density(x) - normal().pdf(x)).abs() < 1e-14);
    }

    #[test]
    fn quantile_is_that_of_statrs(chance in 1e-12_f64..0.999_999) {
        let (ours, theirs) = (math::normal_quantile(chance), normal().inverse_cdf(chance));
        prop_assert!((ours - theirs).abs() < 1e-8, "{ours} {theirs}");
    }

    #[test]
    fn gamma_is_that_of_statrs(x in 0.01_f64..150.0) {
        let (ours, theirs) = (math::ln_gamma(x), ln_gamma(x));
        prop_assert!((ours - theirs).abs() < 1e-11 * theirs.abs().max(1.0));
    }

    #[test]
    fn elementary_functions_are_within_a_few_last_places_of_the_platform(x in 1e-6_f64..1e6, y in -3.0_f64..3.0) {
        let near = |ours: f64, theirs: f64| (ours - theirs).abs() <= 8.0 * f64::EPSILON * theirs.abs() + 1e-300;
        prop_assert!(near(math::ln(x), x.ln()) || (x - 1.0).abs() < 1e-3);
        prop_assert!(near(math::log10(x), x.log10()) || (x - 1.0).abs() < 1e-3);
        prop_assert!(near(math::exp(y), y.exp()));
        prop_assert!(near(math::exp10(y), 10_f64.powf(y)));
        prop_assert!(near(math::pow(x, y), x.powf(y)));
        prop_assert!((math::sin(y) - y.sin()).abs() < 1e-15 && (math::cos(y) - y.cos()).abs() < 1e-15);
        prop_assert!((math::atan2(y, x) - y.atan2(x)).abs() < 1e-15);
    }
}
