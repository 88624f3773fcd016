//! What a check's readings would be under the leading causes, before the hose goes on.

use super::probe::Forecasts;
use super::{Foretold, Would};
use crate::assessment::At;
use crate::ranking::untransform;

/// Causes whose readings are foretold.
const FORETOLD: usize = 4;

/// What a check's readings would be under the leading causes.
pub fn foretold(
    check: usize,
    forecasts: &Forecasts,
    weights: &[f64],
    of_cause: &[usize],
    ids: &[At],
    prior: &[f64],
) -> Vec<Foretold> {
    let mut order: Vec<usize> = (0..ids.len()).filter(|i| of_cause.contains(i)).collect();
    order.sort_by(|a, b| prior[*b].total_cmp(&prior[*a]));
    order.truncate(FORETOLD);
    let q = forecasts.probes.len();
    forecasts
        .indices(check)
        .into_iter()
        .map(|i| {
            let probe = &forecasts.probes[i];
            let would = order
                .iter()
                .map(|cause| {
                    let mine: Vec<usize> = (0..weights.len())
                        .filter(|n| of_cause[*n] == *cause)
                        .collect();
                    let total: f64 = mine.iter().map(|n| weights[*n]).sum();
                    let mean = mine
                        .iter()
                        .map(|n| weights[*n] * forecasts.means[*n][i])
                        .sum::<f64>()
                        / total;
                    let square = mine
                        .iter()
                        .map(|n| {
                            weights[*n]
                                * ((forecasts.means[*n][i] - mean).powi(2)
                                    + forecasts.covariances[*n][i * q + i])
                        })
                        .sum::<f64>()
                        / total;
                    // Normal on the transformed scale: 1.2816 standard deviations hold the central 80 %.
                    let half = 1.2816 * square.max(0.0).sqrt();
                    Would {
                        id: ids[*cause].id,
                        title: ids[*cause].title(),
                        value: untransform(probe.port, mean),
                        low: untransform(probe.port, mean - half),
                        high: untransform(probe.port, mean + half),
                    }
                })
                .collect();
            Foretold {
                path: probe.path,
                port: probe.port,
                condition: forecasts.data.conditions[probe.condition],
                would,
            }
        })
        .collect()
}
