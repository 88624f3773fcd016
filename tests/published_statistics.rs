//! Elementary and statistical functions against the standard library and the `statrs` crate.
#![cfg(not(target_arch = "wasm32"))]
#![allow(clippy::disallowed_methods)] // the platform's functions as an outside check

use lowside::{math, next, ranking};
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

/// Published tests of one cause: prior, chance seen under it and without it, and the printed chance of the cause once seen.
#[test]
fn printed_posteriors_of_a_test() {
    for (prior, under, without, posterior, digits, source) in [
        // Found: classic screening problem, printed 7.8 %.
        (0.01, 0.80, 0.096, 0.077_64, 1e-5, "screening"),
        // Found, printed 36 %.
        (0.06, 0.90, 0.10, 0.364_86, 1e-5, "disease test"),
        // Found: medical-test article, sensitivity 0.93, specificity 0.96, printed 19 %.
        (0.01, 0.93, 0.04, 0.190_18, 1e-4, "medical test"),
        // Inputs found in course notes, answer derived: sensitivity 0.99, specificity 0.85.
        (0.03, 0.99, 0.15, 0.169_52, 1e-5, "course notes"),
    ] {
        let priors = [prior, 1.0 - prior];
        let (out, _) = next::yes_or_no(&[under, without], &priors);
        assert!((out[0].causes[0] - posterior).abs() < digits, "{source}");
        // The ranking's own normalisation, on logs, says the same.
        let logs = |p: [f64; 2]| p.map(math::ln);
        let ranked = ranking::normalised(&logs(priors), &logs([under, without]));
        assert!((ranked[0] - out[0].causes[0]).abs() < 1e-12, "{source}");
    }
}

/// The 14-day decision tree of Quinlan (1986), as in Mitchell, Machine Learning (1997): 9 yes, 5 no.
#[test]
fn gains_of_the_fourteen_day_tree() {
    let prior = [9.0 / 14.0, 5.0 / 14.0];
    assert!((next::entropy(&prior) - 0.940_286).abs() < 1e-6);
    for (what, counts, gain) in [
        (
            "outlook",
            vec![[2.0, 3.0], [4.0, 0.0], [3.0, 2.0]],
            0.246_750,
        ),
        ("humidity", vec![[3.0, 4.0], [6.0, 1.0]], 0.151_836),
        ("wind", vec![[6.0, 2.0], [3.0, 3.0]], 0.048_127),
        (
            "temperature",
            vec![[2.0, 2.0], [4.0, 2.0], [3.0, 1.0]],
            0.029_223,
        ),
    ] {
        let chances: Vec<Vec<f64>> = counts
            .iter()
            .map(|c| vec![c[0] / 9.0, c[1] / 5.0])
            .collect();
        let (_, bits) = next::by_table(&chances, &prior);
        assert!((bits - gain).abs() < 1e-6, "{what}: {bits}");
        if counts.len() == 2 {
            let (_, bits) = next::yes_or_no(&chances[0], &prior);
            assert!((bits - gain).abs() < 1e-6, "{what}: {bits}");
        }
    }
}

/// Cover and Thomas, Elements of Information Theory, example 2.2.1 (joint table from memory, sums checked with scipy).
#[test]
fn the_joint_table_of_cover_and_thomas() {
    let joint = [
        [1.0 / 8.0, 1.0 / 16.0, 1.0 / 32.0, 1.0 / 32.0],
        [1.0 / 16.0, 1.0 / 8.0, 1.0 / 32.0, 1.0 / 32.0],
        [1.0 / 16.0; 4],
        [1.0 / 4.0, 0.0, 0.0, 0.0],
    ];
    let near = |a: f64, b: f64| (a - b).abs() < 1e-12;
    let x: Vec<f64> = (0..4).map(|i| joint.iter().map(|r| r[i]).sum()).collect();
    let y: Vec<f64> = joint.iter().map(|r| r.iter().sum()).collect();
    assert!(near(next::entropy(&x), 7.0 / 4.0) && near(next::entropy(&y), 2.0));
    assert!(near(next::entropy(&joint.concat()), 27.0 / 8.0));
    let after = |out: &[next::Outcome]| -> f64 {
        out.iter()
            .map(|o| o.weight * next::entropy(&o.causes))
            .sum()
    };
    // Y as the check, X as the cause; then the other way round.
    let chances: Vec<Vec<f64>> = joint
        .iter()
        .map(|r| r.iter().zip(&x).map(|(j, p)| j / p).collect())
        .collect();
    let (out, bits) = next::by_table(&chances, &x);
    assert!(near(bits, 3.0 / 8.0) && near(after(&out), 11.0 / 8.0));
    let chances: Vec<Vec<f64>> = (0..4)
        .map(|i| joint.iter().zip(&y).map(|(r, p)| r[i] / p).collect())
        .collect();
    let (out, bits) = next::by_table(&chances, &y);
    assert!(near(bits, 3.0 / 8.0) && near(after(&out), 13.0 / 8.0));
}

/// Cover and Thomas, the eight-horse race (from memory): 2 bits.
#[test]
fn entropy_of_the_horse_race() {
    let mut p = vec![0.5, 0.25, 0.125, 0.0625];
    p.extend([1.0 / 64.0; 4]);
    assert_eq!(next::entropy(&p), 2.0);
}

/// The chest-clinic network of Lauritzen and Spiegelhalter (1988), its tables as in the documentation of an R package for graphical
/// independence networks: every state is a hypothesis, weighed and normalised as the ranking does with causes.
#[test]
fn the_chest_clinic() {
    let so = |chance: f64, state: bool| if state { chance } else { 1.0 - chance };
    // Asia, smoking, tuberculosis, lung cancer, bronchitis, X-ray, dyspnoea.
    let states: Vec<[bool; 7]> = (0..128)
        .map(|n| core::array::from_fn(|i| n >> i & 1 == 1))
        .collect();
    let log_prior: Vec<f64> = states
        .iter()
        .map(|[a, s, t, l, b, x, d]| {
            let either = *t || *l;
            let dyspnoea = match (*b, either) {
                (true, true) => 0.9,
                (true, false) => 0.8,
                (false, true) => 0.7,
                (false, false) => 0.1,
            };
            [
                so(0.01, *a),
                0.5,
                so(if *a { 0.05 } else { 0.01 }, *t),
                so(if *s { 0.10 } else { 0.01 }, *l),
                so(if *s { 0.60 } else { 0.30 }, *b),
                so(if either { 0.98 } else { 0.05 }, *x),
                so(dyspnoea, *d),
            ]
            .into_iter()
            .map(math::ln)
            .sum()
        })
        .collect();
    let chance_of = |seen: &dyn Fn(&[bool; 7]) -> bool| {
        let log_likelihood: Vec<f64> = states
            .iter()
            .map(|s| if seen(s) { 0.0 } else { f64::NEG_INFINITY })
            .collect();
        let p = ranking::normalised(&log_prior, &log_likelihood);
        move |of: &dyn Fn(&[bool; 7]) -> bool| -> f64 {
            (0..128_usize)
                .filter(|n| of(&core::array::from_fn(|i| n >> i & 1 == 1)))
                .map(|n| p[n])
                .sum()
        }
    };
    let near = |a: f64, b: f64| assert!((a - b).abs() < 1e-6, "{a} {b}");
    let prior = chance_of(&|_| true);
    near(prior(&|s| s[2]), 0.0104);
    near(prior(&|s| s[3]), 0.055);
    near(prior(&|s| s[4]), 0.45);
    near(prior(&|s| s[2] || s[3]), 0.064_828);
    near(prior(&|s| s[5]), 0.110_29);
    near(prior(&|s| s[6]), 0.435_971);
    // Asia and dyspnoea seen: pgmpy 1.1.2, variable elimination.
    let seen = chance_of(&|s| s[0] && s[6]);
    near(seen(&|s| s[2]), 0.087_751);
    near(seen(&|s| s[3]), 0.099_525);
    near(seen(&|s| s[4]), 0.811_402);
    near(seen(&|s| s[5]), 0.219_539);
}

proptest! {
    /// Mutual information is symmetric: what a check tells of the cause is what the cause tells of the check.
    #[test]
    fn information_is_the_same_from_both_ends(
        chance in proptest::collection::vec(0.001_f64..0.999, 2..12),
        weight in proptest::collection::vec(0.01_f64..1.0, 12),
    ) {
        let total: f64 = weight[..chance.len()].iter().sum();
        let prior: Vec<f64> = weight[..chance.len()].iter().map(|w| w / total).collect();
        let (out, bits) = next::yes_or_no(&chance, &prior);
        let of_check = next::entropy(&[out[0].weight, out[1].weight]);
        let given: f64 = chance
            .iter()
            .zip(&prior)
            .map(|(c, p)| p * next::entropy(&[*c, 1.0 - c]))
            .sum();
        prop_assert!((bits - (of_check - given)).abs() < 1e-12);
    }

    /// Repairs one after the other: no order is quicker than the one that the program counts on (Heckerman, Breese and Rommelse,
    /// 1995: probability over minutes, for one fault and repairs that do not depend on each other).
    #[test]
    fn no_order_of_repairs_is_quicker(weight in proptest::collection::vec(0.01_f64..1.0, 5)) {
        use lowside::faults::{self, FaultId::*};
        let ids = [PumpWorn, OilLow, CheckALeaking, ControlNullOff, BrakeDragging];
        let total: f64 = weight.iter().sum();
        let p: Vec<f64> = weight.iter().map(|w| w / total).collect();
        let minutes = ids.map(|id| faults::find(id).map_or(0.0, |f| f.minutes));
        let mut shortest = f64::INFINITY;
        // Every order of five, by Lehmer code.
        for code in 0..120_usize {
            let mut left: Vec<usize> = (0..5).collect();
            let mut rest = code;
            let mut still = 1.0;
            let mut cost = 0.0;
            for base in (1..=5).rev() {
                let i = left.remove(rest % base);
                rest /= base;
                cost += minutes[i] * still;
                still -= p[i];
            }
            shortest = shortest.min(cost);
        }
        prop_assert!((next::expected_minutes(&ids, &p) - shortest).abs() < 1e-9);
    }
}
