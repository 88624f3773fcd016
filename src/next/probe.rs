//! Forecasts: what each candidate reading would be under each node, given the readings taken.

use crate::checks::Check;
use crate::machine::{builds, condition_latents, unit_latents};
use crate::ranking::{
    Bench, Data, Datum, Gauss, Heavy, Prediction, Says, accuracy, fit, slope, swap_chance,
};
use crate::readings::instrument::Instrument;
use crate::readings::{OilTemperature, Path, Port};
use crate::record::Visit;
use crate::unit::Unit;

use super::mixture::{Forecast, MOST_READINGS};
use super::rig;

/// A candidate reading of a check.
#[derive(Clone, Debug)]
pub struct Probe {
    /// Index of its check among the candidates.
    pub check: usize,
    /// Index into the merged conditions.
    pub condition: usize,
    /// Path.
    pub path: Path,
    /// Port.
    pub port: Port,
}

/// Everything that forecasts need.
pub struct Forecasts {
    /// Candidate readings.
    pub probes: Vec<Probe>,
    /// Conditions of readings and probes together.
    pub data: Data,
    /// For each node: mean of each probe on its transformed scale.
    pub means: Vec<Vec<f64>>,
    /// For each node: covariance of the probes, row-major.
    pub covariances: Vec<Vec<f64>>,
}

/// Oil temperature to plan with: the last one taken.
pub fn oil_now(visit: &Visit) -> Option<OilTemperature> {
    visit.readings.iter().rev().find_map(|r| r.condition.oil)
}

/// Candidate readings that are not taken yet, and can be taken on this unit.
fn probes(unit: &Unit, checks: &[&Check], visit: &Visit, data: &mut Data) -> Vec<Probe> {
    let oil = oil_now(visit);
    let mut out = Vec::new();
    for (i, check) in checks.iter().enumerate() {
        for y in rig::open_readings(unit, visit, check)
            .iter()
            .take(MOST_READINGS)
        {
            let condition = y.condition(oil);
            let at = data
                .conditions
                .iter()
                .position(|c| *c == condition)
                .unwrap_or_else(|| {
                    data.conditions.push(condition);
                    data.conditions.len() - 1
                });
            out.push(Probe {
                check: i,
                condition: at,
                path: y.path,
                port: y.port,
            });
        }
    }
    out
}

/// Forecasts every candidate reading at every heavy node.
pub fn forecast(
    unit: &Unit,
    visit: &Visit,
    instruments: &[Instrument],
    taken: &Data,
    heavy: &[Heavy],
    checks: &[&Check],
) -> Forecasts {
    let mut data = taken.clone();
    let probes = probes(unit, checks, visit, &mut data);
    let k = taken.data.len();
    let mut merged = data.clone();
    for p in &probes {
        // The gauge that stands on the port already, or one of its own.
        let gauge = taken
            .data
            .iter()
            .find(|d| (d.path, d.port) == (p.path, p.port))
            .map_or(
                taken.data.len() + 2 * p.port as usize + p.path as usize,
                |d| d.gauge,
            );
        merged.data.push(Datum {
            reading: usize::MAX,
            port: p.port,
            condition: p.condition,
            says: Says::Value,
            t: 0.0,
            value: 0.0,
            own: 0.0,
            bias: 0.0,
            group: usize::MAX,
            gauge,
            path: p.path,
            swung: false,
            instrument: 0.0,
        });
    }
    let mut latents = unit_latents(unit);
    condition_latents(unit, &data.conditions, &mut latents);
    let bench = Bench::new(builds(unit), latents, &merged);
    let swap = swap_chance(unit.sides, &data.belief);
    let mut means = Vec::with_capacity(heavy.len());
    let mut covariances = Vec::with_capacity(heavy.len());
    for node in heavy {
        let first = bench.predict(node.fault, &node.node, &data, &[]);
        let centre = fit(&data, &first, &[], swap).map_or(Vec::new(), |f| {
            let mut at = f.at;
            for v in &mut at {
                *v = v.clamp(-3.0, 3.0);
            }
            at
        });
        let p = bench.predict(node.fault, &node.node, &merged, &centre);
        let (mean, covariance) = given(&data, &merged, &p, &centre, k, instruments, visit);
        means.push(mean);
        covariances.push(covariance);
    }
    Forecasts {
        probes,
        data: merged,
        means,
        covariances,
    }
}

/// Mean and covariance of the probes given the data, at one node.
fn given(
    data: &Data,
    merged: &Data,
    p: &Prediction,
    centre: &[f64],
    k: usize,
    instruments: &[Instrument],
    visit: &Visit,
) -> (Vec<f64>, Vec<f64>) {
    let c = p.columns;
    let row = |i: usize| &p.rows[i * c..(i + 1) * c];
    let dot = |a: &[f64], b: &[f64]| a.iter().zip(b).map(|(x, y)| x * y).sum::<f64>();
    let middle = |i: usize| p.mean[i] - dot(row(i), centre);
    let joint: Vec<usize> = (0..k)
        .filter(|i| data.data[*i].says != Says::AtLeast)
        .collect();
    let n = joint.len();
    let q = merged.data.len() - k;
    // Accuracy of each probe at the value that it is expected to have.
    let probe: Vec<(f64, f64)> = (k..k + q)
        .map(|i| {
            let d = &merged.data[i];
            let value = crate::ranking::untransform(d.port, p.mean[i]);
            let instrument = visit
                .riggings
                .iter()
                .rev()
                .find(|r| r.port == d.port)
                .and_then(|r| instruments.iter().find(|x| x.id == r.instrument));
            let a = accuracy(instrument, d.port, value);
            let s = slope(d.port, value);
            (
                a.bias * s,
                (a.own * a.own * s * s + (0.006 * value * s).powi(2))
                    .sqrt()
                    .max(1e-3),
            )
        })
        .collect();
    let mut mean: Vec<f64> = (k..k + q).map(middle).collect();
    let shared = |i: usize, j: usize| merged.data[i].gauge == merged.data[j].gauge;
    let mut covariance = vec![0.0; q * q];
    for i in 0..q {
        for j in 0..q {
            let mut s = dot(row(k + i), row(k + j));
            if shared(k + i, k + j) {
                s += probe[i].0 * probe[j].0;
            }
            if i == j {
                s += probe[i].1 * probe[i].1 + p.loose[k + i];
            }
            covariance[i * q + j] = s;
        }
    }
    if n == 0 {
        return (mean, covariance);
    }
    let mut s = vec![0.0; n * n];
    let mut residual = vec![0.0; n];
    for (a, i) in joint.iter().enumerate() {
        residual[a] = data.data[*i].t - middle(*i);
        for (b, j) in joint.iter().enumerate() {
            s[a * n + b] = dot(row(*i), row(*j));
            if shared(*i, *j) {
                s[a * n + b] += data.data[*i].bias * data.data[*j].bias;
            }
        }
        s[a * n + a] += data.data[*i].own.powi(2) + p.loose[*i];
    }
    let Some(g) = Gauss::new(s, &residual) else {
        return (mean, covariance);
    };
    let cross: Vec<f64> = (0..q)
        .flat_map(|i| joint.iter().map(move |j| (i, *j)))
        .map(|(i, j)| {
            dot(row(k + i), row(j))
                + if shared(k + i, j) {
                    probe[i].0 * data.data[j].bias
                } else {
                    0.0
                }
        })
        .collect();
    for i in 0..q {
        let ci = &cross[i * n..(i + 1) * n];
        mean[i] += dot(ci, &g.z);
        let pc: Vec<f64> = (0..n)
            .map(|a| dot(&g.precision[a * n..(a + 1) * n], ci))
            .collect();
        for j in 0..q {
            covariance[i * q + j] -= dot(&pc, &cross[j * n..(j + 1) * n]);
        }
    }
    (mean, covariance)
}

impl Forecasts {
    /// Forecasts of one check's readings; empty where it has none left.
    pub fn of(&self, check: usize, weights: &[f64], causes: &[usize]) -> Vec<Forecast> {
        let mine: Vec<usize> = self.indices(check);
        let q = self.probes.len();
        if mine.is_empty() {
            return Vec::new();
        }
        (0..self.means.len())
            .filter_map(|node| {
                let mean = mine.iter().map(|i| self.means[node][*i]).collect();
                let covariance = mine
                    .iter()
                    .flat_map(|i| mine.iter().map(move |j| (i, j)))
                    .map(|(i, j)| self.covariances[node][i * q + j])
                    .collect();
                Forecast::new(weights[node], causes[node], mean, covariance)
            })
            .collect()
    }

    /// Probes of a check.
    pub fn indices(&self, check: usize) -> Vec<usize> {
        self.probes
            .iter()
            .enumerate()
            .filter(|(_, p)| p.check == check)
            .map(|(i, _)| i)
            .collect()
    }
}
