//! The likelihood of readings against closed forms worked by hand: a straight line, two gauges, one of them perhaps wrong.
#![cfg(not(target_arch = "wasm32"))]
#![allow(clippy::disallowed_methods)] // the platform's own functions: an outside check

use lowside::ranking::{Belief, Data, Datum, Prediction, Says, fit, normalised};
use lowside::readings::{Path, Port};

/// Chance that a rigging is wrong, in these tests.
const WRONG: f64 = 0.03;
/// Density of a reading of a wrong rigging on the transformed scale: even over four e-folds, as the program states it.
const ANYWHERE: f64 = 0.25;

/// Readings in groups of their own, unless told otherwise.
fn data(t: &[f64], own: &[f64], bias: &[f64], groups: &[usize], wrong: f64) -> Data {
    Data {
        data: (0..t.len())
            .map(|i| Datum {
                reading: i,
                port: Port::Charge,
                condition: 0,
                says: Says::Value,
                t: t[i],
                value: 0.0,
                own: own[i],
                bias: bias[i],
                group: groups[i],
                gauge: groups[i],
                path: Path::Left,
                swung: false,
                instrument: 0.0,
            })
            .collect(),
        groups: groups.iter().max().map_or(0, |g| g + 1),
        belief: Belief {
            wrong,
            ..Belief::default()
        },
        ..Data::default()
    }
}

/// One latent that moves every reading along a line.
fn line(mean: &[f64], slope: &[f64]) -> Prediction {
    Prediction {
        mean: mean.to_vec(),
        rows: slope.to_vec(),
        columns: 1,
        loose: vec![0.0; mean.len()],
        starved: vec![false; mean.len()],
        swing: 0.0,
    }
}

fn normal(e: f64, variance: f64) -> f64 {
    (-0.5 * e * e / variance).exp() / (2.0 * core::f64::consts::PI * variance).sqrt()
}

/// Density of two correlated normals, by the textbook form with their correlation.
fn two_normals(e: [f64; 2], v: [f64; 2], covariance: f64) -> f64 {
    let rho = covariance / (v[0] * v[1]).sqrt();
    let z =
        e[0] * e[0] / v[0] - 2.0 * rho * e[0] * e[1] / (v[0] * v[1]).sqrt() + e[1] * e[1] / v[1];
    (-0.5 * z / (1.0 - rho * rho)).exp()
        / (2.0 * core::f64::consts::PI * (v[0] * v[1] * (1.0 - rho * rho)).sqrt())
}

#[test]
fn one_reading_of_a_line_is_a_normal() {
    // t = 1 + 0.3 u + noise of 0.1, one gauge bias of 0.2: variance 0.09 + 0.01 + 0.04 = 0.14.
    let d = data(&[1.5], &[0.1], &[0.2], &[0], 1e-12);
    let f = fit(&d, &line(&[1.0], &[0.3]), &[], 0.0).expect("positive");
    assert!((f.log - normal(0.5, 0.14).ln()).abs() < 1e-9, "{}", f.log);
    // Posterior mean of the latent: covariance over variance times what the reading is off by.
    assert!((f.at[0] - 0.3 / 0.14 * 0.5).abs() < 1e-9);
    assert!((f.spread[0] - 0.3).abs() < 1e-12);
}

#[test]
fn where_a_line_is_linearised_does_not_matter() {
    let d = data(&[1.5, 0.2], &[0.1, 0.2], &[0.0, 0.0], &[0, 1], WRONG);
    let at_rest = fit(&d, &line(&[1.0, 0.0], &[0.3, -0.2]), &[], 0.0).expect("positive");
    let u = 1.7;
    let moved = line(&[1.0 + 0.3 * u, -0.2 * u], &[0.3, -0.2]);
    let elsewhere = fit(&d, &moved, &[u], 0.0).expect("positive");
    assert!((at_rest.log - elsewhere.log).abs() < 1e-12);
    assert!((at_rest.at[0] - elsewhere.at[0]).abs() < 1e-12);
}

#[test]
fn one_gauge_makes_differences_sharp_and_two_do_not() {
    let (t, own, bias) = ([0.30, 0.32], [0.02, 0.02], [0.2, 0.2]);
    let flat = line(&[0.0, 0.0], &[0.0, 0.0]);
    let v = 0.02 * 0.02 + 0.2 * 0.2;
    let same = fit(&data(&t, &own, &bias, &[0, 0], 1e-12), &flat, &[], 0.0).expect("positive");
    assert!((same.log - two_normals(t, [v, v], 0.04).ln()).abs() < 1e-9);
    let two = fit(&data(&t, &own, &bias, &[0, 1], 1e-12), &flat, &[], 0.0).expect("positive");
    assert!((two.log - (normal(t[0], v) * normal(t[1], v)).ln()).abs() < 1e-9);
}

/// Two gauges, each wrong with a chance of 0.03: both right, or one of them anywhere. Both wrong at once would say nothing of any
/// cause and is left out.
#[test]
fn one_wrong_rigging_is_the_mixture_worked_by_hand() {
    for t in [[0.1, -0.05], [0.2, 1.9], [-2.4, 0.1], [1.5, 1.4]] {
        let d = data(&t, &[0.1, 0.15], &[0.05, 0.0], &[0, 1], WRONG);
        let f = fit(&d, &line(&[0.0, 0.0], &[0.4, 0.3]), &[], 0.0).expect("positive");
        let v = [0.16 + 0.01 + 0.0025, 0.09 + 0.0225];
        let right = (1.0 - WRONG) * (1.0 - WRONG) * two_normals(t, v, 0.12);
        let first = WRONG * (1.0 - WRONG) * ANYWHERE * normal(t[1], v[1]);
        let second = WRONG * (1.0 - WRONG) * ANYWHERE * normal(t[0], v[0]);
        let total = right + first + second;
        // The program prints the log density of "anywhere" to three places: -1.386.
        assert!(
            (f.log - total.ln()).abs() < 3e-4,
            "{t:?}: {} {}",
            f.log,
            total.ln()
        );
        assert!((f.wrong[0] - first / total).abs() < 3e-4, "{t:?}");
        assert!((f.wrong[1] - second / total).abs() < 3e-4, "{t:?}");
    }
}

/// Two causes whose readings are normal round two lines: the posterior that a textbook gives for two shifted normals.
#[test]
fn two_causes_on_lines_have_the_logistic_posterior() {
    // Equal variance 0.25 + 0.04, means 0 and 1: log odds are linear in the reading, (t - 1/2)/variance.
    let variance = 0.29;
    for t in [-0.4, 0.5, 0.9, 2.0] {
        let d = data(&[t], &[0.2], &[0.0], &[0], 1e-12);
        let logs: Vec<f64> = [0.0, 1.0]
            .iter()
            .map(|mean| {
                fit(&d, &line(&[*mean], &[0.5]), &[], 0.0)
                    .expect("positive")
                    .log
            })
            .collect();
        let p = normalised(&[0.8_f64.ln(), 0.2_f64.ln()], &logs);
        let odds = 0.25 * ((t - 0.5) / variance).exp();
        assert!((p[1] - odds / (1.0 + odds)).abs() < 1e-9, "{t}: {p:?}");
    }
}
