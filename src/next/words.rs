//! Why a check is offered, in one sentence.

use super::mixture::Forecast;
use crate::assessment::{At, lower_first};

fn title(at: At) -> String {
    lower_first(&at.title())
}

/// Mean and spread of a cause's first reading that tells most.
fn apart(a: &[&Forecast], b: &[&Forecast]) -> f64 {
    let n = a.first().map_or(0, |f| f.mean.len());
    let moments = |list: &[&Forecast], i: usize| {
        let w: f64 = list.iter().map(|f| f.weight).sum();
        let mean = list.iter().map(|f| f.weight * f.mean[i]).sum::<f64>() / w;
        let own = |f: &Forecast| (0..=i).map(|k| f.factor[i * n + k].powi(2)).sum::<f64>();
        let square = list
            .iter()
            .map(|f| f.weight * ((f.mean[i] - mean).powi(2) + own(f)))
            .sum::<f64>()
            / w;
        (mean, square)
    };
    (0..n)
        .map(|i| {
            let ((m1, s1), (m2, s2)) = (moments(a, i), moments(b, i));
            (m1 - m2).abs() / (s1 + s2).max(1e-12).sqrt()
        })
        .fold(0.0, f64::max)
}

/// The pair of causes that matters most and that the readings of a check set apart.
pub fn by_readings(forecasts: &[Forecast], ids: &[At], prior: &[f64]) -> Option<String> {
    let mut order: Vec<usize> = (0..ids.len()).filter(|i| prior[*i] > 0.01).collect();
    order.sort_by(|a, b| prior[*b].total_cmp(&prior[*a]));
    order.truncate(6);
    let of = |i: usize| {
        forecasts
            .iter()
            .filter(|f| f.cause == i)
            .collect::<Vec<_>>()
    };
    let mut best: Option<(f64, usize, usize)> = None;
    for (x, a) in order.iter().enumerate() {
        for b in &order[x + 1..] {
            let (fa, fb) = (of(*a), of(*b));
            if fa.is_empty() || fb.is_empty() {
                continue;
            }
            let score = apart(&fa, &fb).min(3.0) * prior[*a] * prior[*b];
            if best.is_none_or(|(s, _, _)| score > s) {
                best = Some((score, *a, *b));
            }
        }
    }
    best.map(|(_, a, b)| format!("Tells “{}” from “{}”.", title(ids[a]), title(ids[b])))
}
