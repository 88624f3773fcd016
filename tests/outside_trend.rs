//! Robust lines against statsmodels and Student quantiles against scipy. Inputs and printed figures stand in
//! `fixtures/outside/statsmodels_trend.{py,json}`.
#![cfg(not(target_arch = "wasm32"))]

use lowside::yard::{robust, student_quantile};
use serde::Deserialize;
use std::collections::BTreeMap;

#[derive(Deserialize)]
struct Printed {
    series: BTreeMap<String, Series>,
    student_975: BTreeMap<String, f64>,
    student_95: BTreeMap<String, f64>,
}

#[derive(Deserialize)]
struct Series {
    points: Vec<(f64, usize, f64, f64)>,
    coefficients: Vec<f64>,
    standard_errors: Vec<f64>,
    weights: Vec<f64>,
    scale: f64,
    least_squares: Vec<f64>,
}

fn printed() -> Printed {
    serde_json::from_str(include_str!("fixtures/outside/statsmodels_trend.json"))
        .expect("the file is ours")
}

fn rows(points: &[(f64, usize, f64, f64)]) -> (Vec<Vec<f64>>, Vec<f64>) {
    let hours: Vec<f64> = points.iter().map(|p| p.0).collect();
    let mean = hours.iter().sum::<f64>() / hours.len() as f64;
    let width = hours.iter().fold(f64::MIN, |a, b| a.max(*b))
        - hours.iter().fold(f64::MAX, |a, b| a.min(*b));
    let levels = points.iter().map(|p| p.1).max().unwrap_or(0) + 1;
    points
        .iter()
        .map(|(h, level, value, u)| {
            let mut row: Vec<f64> = (0..levels)
                .map(|l| f64::from(u8::from(l == *level)) / u)
                .collect();
            row.push((h - mean) / width / u);
            (row, value / u)
        })
        .unzip()
}

fn near(what: &str, ours: f64, theirs: f64, within: f64) {
    let slack = within * theirs.abs().max(1e-9);
    assert!(
        (ours - theirs).abs() <= slack,
        "{what}: {ours} and {theirs}"
    );
}

#[test]
fn lines_weights_and_errors_are_those_of_statsmodels() {
    for (name, series) in printed().series {
        let (rows, y) = rows(&series.points);
        let fit = robust(&rows, &y).expect("enough points");
        let n = fit.coefficients.len();
        for (i, theirs) in series.coefficients.iter().enumerate() {
            near(&format!("{name}, {i}"), fit.coefficients[i], *theirs, 1e-8);
            let own = fit.covariance[i * n + i].sqrt();
            near(
                &format!("{name}, ± {i}"),
                own,
                series.standard_errors[i],
                1e-7,
            );
        }
        for (ours, theirs) in fit.weights.iter().zip(&series.weights) {
            near(&format!("{name}, weight"), *ours, *theirs, 1e-7);
        }
        near(&format!("{name}, scale"), fit.scale, series.scale, 1e-8);
        // Where points stand far off, least squares goes another way: the robust line is worth its name.
        if name.contains("far off") {
            let slope = n - 1;
            assert!(fit.coefficients[slope] > 0.02 && series.least_squares[slope] < 0.0);
            assert_eq!(fit.weights.iter().filter(|w| **w < 0.2).count(), 2);
        }
    }
}

#[test]
fn student_quantiles_are_those_of_scipy() {
    let printed = printed();
    for (p, table) in [(0.975, printed.student_975), (0.95, printed.student_95)] {
        for (freedom, theirs) in table {
            let freedom: f64 = freedom.parse().expect("a number");
            near(
                &format!("t({p}, {freedom})"),
                student_quantile(p, freedom),
                theirs,
                2e-4,
            );
        }
    }
}

#[test]
fn columns_that_cannot_be_told_apart_have_no_line() {
    assert!(
        robust(
            &[vec![1.0, 2.0], vec![1.0, 2.0], vec![1.0, 2.0]],
            &[1.0, 2.0, 3.0]
        )
        .is_none()
    );
    assert!(robust(&[vec![1.0, 2.0]], &[1.0]).is_none());
    assert!(robust(&[], &[]).is_none());
}
