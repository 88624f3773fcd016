//! A quick look at one reading more: the nodes that carried the last answer, held against the new data where they were linearised.
//!
//! What the last assessment predicted for the data it had stays as it is; only what is new is solved, at those nodes alone. The
//! full assessment follows, and need not agree to the last per cent: a cause that nothing spoke for stands here for its best
//! node only.

use super::datum::{Data, Datum};
use super::likelihood::fit;
use super::node::Node;
use super::posterior::{
    Held, Part, Weighed, collect, means_at_the_middle, node_shares, swap_chance, unlisted,
};
use super::predict::{Bench, CELLS, Known, Prediction};
use super::suspect::Suspect;
use crate::assessment::At;
use crate::faults::{Fault, FaultId};
use crate::math;
use crate::readings::{Condition, SideNaming};
use crate::unit::Unit;

/// A cause or pair that nodes are carried for.
#[derive(Clone, Debug)]
pub struct CarriedCause {
    /// Which.
    pub suspect: Suspect,
    /// The second one of a pair.
    pub with: Option<At>,
    /// Log of its base rate over the builds.
    pub log_prior: f64,
    /// A row of its own.
    pub shown: bool,
}

/// A node carried from one assessment to the next.
#[derive(Clone, Debug)]
pub struct CarriedNode {
    /// Its cause, index into [`Carried::causes`].
    pub cause: usize,
    /// The node; its weight stands for those of its cause that were left behind as well.
    pub node: Node,
    /// Where it is linearised (empty: the middle).
    pub centre: Vec<f64>,
    /// What it predicts there.
    pub prediction: Prediction,
}

/// What a quick look at one reading more starts from: of each cause its best node and all that carry weight.
#[derive(Clone, Debug, Default)]
pub struct Carried {
    /// Causes and pairs.
    pub causes: Vec<CarriedCause>,
    /// Nodes.
    pub nodes: Vec<CarriedNode>,
    /// The sound machine.
    pub sound: Option<(Node, Prediction)>,
}

/// Share of all weight from which a node is carried on even if it is not the best of its cause.
const CARRIED: f64 = 2e-3;

pub(super) fn carry(
    causes: Vec<CarriedCause>,
    held: Vec<Held>,
    sound: Option<(Node, Prediction)>,
    priors: &[f64],
) -> Carried {
    let logs = node_shares(&held, priors);
    let mut best = vec![(f64::NEG_INFINITY, 0); causes.len()];
    let mut all = vec![Vec::new(); causes.len()];
    for (i, (h, l)) in held.iter().zip(&logs).enumerate() {
        all[h.cause].push(*l);
        if *l > best[h.cause].0 {
            best[h.cause] = (*l, i);
        }
    }
    let is_carried = |i: usize, h: &Held| best[h.cause].1 == i || logs[i] > math::ln(CARRIED);
    let mut kept = vec![Vec::new(); causes.len()];
    for (i, h) in held.iter().enumerate().filter(|(i, h)| is_carried(*i, h)) {
        kept[h.cause].push(logs[i]);
    }
    let left_behind: Vec<f64> = all
        .iter()
        .zip(&kept)
        .map(|(all, kept)| math::ln_sum_exp(all) - math::ln_sum_exp(kept))
        .collect();
    let nodes = held
        .into_iter()
        .enumerate()
        .filter(|(i, h)| is_carried(*i, h))
        .map(|(_, h)| CarriedNode {
            cause: h.cause,
            node: Node {
                log_weight: h.node.log_weight + left_behind[h.cause],
                ..h.node
            },
            centre: h.centre,
            prediction: h.prediction,
        })
        .collect();
    Carried {
        causes,
        nodes,
        sound,
    }
}

/// Fewest data of the last assessment from which its nodes say enough to go on from.
const FEWEST: usize = 3;
/// Most data that may be new.
const MOST_NEW: usize = 3;

/// The last full assessment, as far as a quick look needs it.
#[derive(Clone, Debug)]
pub struct Last {
    unit: Unit,
    visit: String,
    conditions: Vec<Condition>,
    data: Vec<Datum>,
    latents: Vec<u64>,
    carried: Carried,
}

impl Last {
    /// Keeps what a quick look needs.
    pub fn new(unit: &Unit, visit: &str, data: Data, bench: &Bench, carried: Carried) -> Last {
        Last {
            unit: unit.clone(),
            visit: visit.to_string(),
            conditions: data.conditions,
            data: data.data,
            latents: bench.latent_seeds().to_vec(),
            carried,
        }
    }

    /// True where a quick look can start from here: the same unit and visit.
    pub fn is_of(&self, unit: &Unit, visit: &str) -> bool {
        self.visit == visit && self.unit == *unit
    }

    /// The causes weighed at the carried nodes; none where too little was known, or too much is new.
    pub fn weigh(&self, bench: &Bench, data: &Data, sides: SideNaming) -> Option<Vec<Weighed>> {
        if self.data.len() < FEWEST || !data.conditions.starts_with(&self.conditions) {
            return None;
        }
        let columns = self.columns(bench)?;
        let before: Vec<Option<usize>> = data.data.iter().map(|d| self.place_of(d)).collect();
        if before.iter().filter(|b| b.is_none()).count() > MOST_NEW {
            return None;
        }
        let predict = |fault: &Fault, node: &Node, centre: &[f64], p: &Prediction| {
            let centre = stretched(centre, &columns, bench.latent_seeds().len() + CELLS);
            let known = |k: usize| {
                let was = before[k]?;
                Some(Known {
                    // Where there is no steady state a reading may stand anywhere.
                    mean: if p.loose[was] > 0.0 {
                        data.data[k].t
                    } else {
                        p.mean[was]
                    },
                    row: &p.rows[was * p.columns..(was + 1) * p.columns],
                    columns: &columns,
                    loose: p.loose[was],
                    starved: p.starved[was],
                })
            };
            let prediction = bench.predict_with(fault, node, data, &centre, known);
            (prediction, centre)
        };
        let swap = swap_chance(sides, &data.belief);
        let fits: Vec<_> = self
            .carried
            .nodes
            .iter()
            .filter_map(|n| {
                let fault = self.carried.causes[n.cause].suspect.fault;
                let (p, centre) = predict(fault, &n.node, &n.centre, &n.prediction);
                Some((
                    n,
                    fit(data, &p, &centre, swap)?,
                    means_at_the_middle(&p, &centre),
                ))
            })
            .collect();
        let mut out: Vec<Weighed> = self
            .carried
            .causes
            .iter()
            .enumerate()
            .filter(|(_, c)| c.shown && c.log_prior.is_finite())
            .map(|(i, c)| {
                let parts = fits
                    .iter()
                    .filter(|(n, ..)| n.cause == i)
                    .map(|(n, fit, mean)| Part {
                        log_weight: n.node.log_weight,
                        fit,
                        mean,
                    });
                collect(c.suspect.at(), c.with, c.log_prior, parts, data)
            })
            .collect();
        if let (Some((node, p)), Some(healthy)) =
            (&self.carried.sound, crate::faults::find(FaultId::Healthy))
        {
            out.extend(unlisted(data, &predict(healthy, node, &[], p).0));
        }
        Some(out)
    }

    /// Where each column of the last predictions stands now; none where a latent is gone.
    fn columns(&self, bench: &Bench) -> Option<Vec<usize>> {
        let now = bench.latent_seeds();
        let latents = self
            .latents
            .iter()
            .map(|seed| now.iter().position(|s| s == seed));
        latents
            .chain((0..CELLS).map(|cell| Some(now.len() + cell)))
            .collect()
    }

    /// Which datum of the last assessment asked for the same prediction.
    fn place_of(&self, d: &Datum) -> Option<usize> {
        self.data.iter().position(|o| {
            (o.path, o.port, o.condition) == (d.path, d.port, d.condition) && o.says == d.says
        })
    }
}

/// A centre over other columns; what is new starts in the middle.
fn stretched(centre: &[f64], columns: &[usize], n: usize) -> Vec<f64> {
    if centre.is_empty() {
        return Vec::new();
    }
    let mut out = vec![0.0; n];
    for (v, at) in centre.iter().zip(columns) {
        out[*at] = *v;
    }
    out
}
