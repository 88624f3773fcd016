//! Two causes at once: which pairs are worth solving, found by superposing what each does alone.

use super::belief::Belief;
use super::datum::{Data, Says};
use super::gauss::Whitener;
use super::node::{Node, Second};
use super::predict::Prediction;
use super::suspect::Suspect;
use crate::faults::{Fault, FaultId};
use crate::machine::Build;
use crate::math;

/// A node of a single cause, as it was predicted in the middle of the scatter.
pub struct Alone<'a> {
    /// Its cause.
    pub suspect: Suspect,
    /// The node.
    pub node: Node,
    /// Predicted data on their transformed scales.
    pub mean: &'a [f64],
    /// Their change across its severity cell, a standard deviation.
    pub cell: &'a [f64],
}

/// Two causes at once, with the nodes that are worth solving.
pub struct Candidate {
    /// The two.
    pub suspects: [Suspect; 2],
    /// Log of the base rate.
    pub log_prior: f64,
    /// Nodes, weighted as shares of the pair.
    pub nodes: Vec<Node>,
}

/// Wear that dirt in the loop brings to several parts at once.
pub const DIRT: &[FaultId] = &[
    FaultId::PumpWorn,
    FaultId::PumpWornAcross,
    FaultId::MotorWorn,
    FaultId::MotorWornAcross,
    FaultId::ChargePumpWorn,
];
/// Share of the worn machines on which pump and motor are both worn; dirt links them. Common practice: 0.3 once dirt was seen,
/// which the story of the call adds.
const BOTH_WORN: f64 = 0.1;
/// Most nodes of a pair that are solved.
const MOST_NODES: usize = 10;
/// Nodes of a way of showing that the first comparison looks at.
const COARSE: usize = 6;
/// How far behind the best single cause (natural log) the best pair may lie by superposition, base rates counted, and still be
/// solved.
const WORTH: f64 = 3.0;
/// Square of a whitened residual beyond which it is one wrong reading and not many causes.
const CLIP: f64 = 40.0;

/// Base rate of a pair per hundred calls: two independent troubles, or one dirt that wore two parts.
pub fn rate(belief: &Belief, a: &Fault, b: &Fault) -> f64 {
    let (x, y) = (belief.rate(a), belief.rate(b));
    let independent = x * y / 100.0;
    let linked = if DIRT.contains(&a.id) && DIRT.contains(&b.id) {
        BOTH_WORN * 0.5 * (x + y)
    } else {
        0.0
    };
    belief.pairs * (independent + linked)
}

/// Share of the linked rate that falls to worn parts of different paths: their loops are apart, their oil is one. Common practice.
const ACROSS_PATHS: f64 = 0.15;

/// As [`rate`], of causes at their places.
fn rate_at(belief: &Belief, a: &Suspect, b: &Suspect) -> f64 {
    let pair = rate(belief, a.fault, b.fault);
    match (a.path, b.path) {
        (None, None) => pair,
        (Some(p), Some(q)) if p != q => {
            let linked = DIRT.contains(&a.fault.id) && DIRT.contains(&b.fault.id);
            pair * if linked { ACROSS_PATHS } else { 0.25 }
        }
        (Some(_), Some(_)) => pair * 0.5,
        _ => pair * 0.5,
    }
}

/// True where two causes can be told as two: each bends something that the other does not.
pub fn apart(a: &Suspect, b: &Suspect) -> bool {
    let whole = |f: &Fault| {
        !f.effects.is_empty()
            && !f.stop_work
            && !matches!(f.id, FaultId::AssemblyError | FaultId::OperatorOrLoad)
    };
    let other: Vec<usize> = b.bent().collect();
    whole(a.fault) && whole(b.fault) && !a.bent().any(|p| other.contains(&p))
}

/// Residuals and effects without correlation.
struct White {
    residual: Vec<f64>,
    /// For each node alone: its effect and the change across its severity cell; none where the healthy machine of its build was
    /// not predicted.
    effects: Vec<Option<[Vec<f64>; 2]>>,
}

fn white(data: &Data, sound: &[(Node, Prediction)], alone: &[Alone]) -> Option<White> {
    let healthy = &sound.first()?.1;
    let used: Vec<usize> = (0..data.data.len())
        .filter(|k| data.data[*k].says != Says::AtLeast)
        .collect();
    let n = used.len();
    let row = |k: usize| &healthy.rows[k * healthy.columns..(k + 1) * healthy.columns];
    let mut covariance = vec![0.0; n * n];
    for (i, ki) in used.iter().enumerate() {
        for (j, kj) in used.iter().enumerate().take(i + 1) {
            let (d, e) = (&data.data[*ki], &data.data[*kj]);
            let mut s: f64 = row(*ki).iter().zip(row(*kj)).map(|(a, b)| a * b).sum();
            if d.gauge == e.gauge {
                s += d.bias * e.bias;
            }
            if i == j {
                s += d.own * d.own + healthy.loose[*ki];
            }
            covariance[i * n + j] = s;
            covariance[j * n + i] = s;
        }
    }
    let whitener = Whitener::new(covariance, n)?;
    let reference = |node: &Node| {
        let own = |s: &&(Node, Prediction)| s.0.build == node.build;
        sound
            .iter()
            .filter(own)
            .find(|s| s.0.place == node.place)
            .or_else(|| sound.iter().find(own))
    };
    let pick = |f: &dyn Fn(usize) -> f64| -> Vec<f64> {
        whitener.apply(&used.iter().map(|k| f(*k)).collect::<Vec<_>>())
    };
    Some(White {
        residual: pick(&|k| data.data[k].t - healthy.mean[k]),
        effects: alone
            .iter()
            .map(|a| {
                reference(&a.node)
                    .map(|r| [pick(&|k| a.mean[k] - r.1.mean[k]), pick(&|k| a.cell[k])])
            })
            .collect(),
    })
}

impl White {
    /// Log density of the readings (up to a constant) with the effects of one or two nodes superposed, each free to move within
    /// its severity cell.
    fn log(&self, nodes: &[&[Vec<f64>; 2]]) -> f64 {
        let mut z = self.residual.clone();
        for [effect, _] in nodes {
            for (z, e) in z.iter_mut().zip(effect) {
                *z -= e;
            }
        }
        let mut log = 0.0;
        for [_, cell] in nodes {
            let own: f64 = cell.iter().map(|c| c * c).sum();
            let along: f64 = z.iter().zip(cell).map(|(z, c)| z * c).sum();
            // The cell ends at its walls, √3 standard deviations from its middle.
            let shift = (along / (1.0 + own)).clamp(-(3f64.sqrt()), 3f64.sqrt());
            for (z, c) in z.iter_mut().zip(cell) {
                *z -= shift * c;
            }
            log -= 0.5 * shift * shift + 0.5 * math::ln(1.0 + own);
        }
        log - 0.5 * z.iter().map(|z| (z * z).min(CLIP)).sum::<f64>()
    }
}

/// The pairs worth solving, best first; none where a single cause explains the readings as well.
pub fn candidates(
    data: &Data,
    builds: &[Build],
    sound: &[(Node, Prediction)],
    alone: &[Alone],
) -> Vec<Candidate> {
    if data.belief.pairs <= 0.0 || data.data.len() < 3 {
        return Vec::new();
    }
    let Some(white) = white(data, sound, alone) else {
        return Vec::new();
    };
    let mut causes: Vec<Suspect> = Vec::new();
    for a in alone {
        if !causes.iter().any(|c| c.at() == a.suspect.at()) {
            causes.push(a.suspect);
        }
    }
    let nodes_of: Vec<Vec<usize>> = causes
        .iter()
        .map(|c| {
            (0..alone.len())
                .filter(|i| alone[*i].suspect.at() == c.at())
                .collect()
        })
        .collect();
    let coarse: Vec<Vec<usize>> = nodes_of
        .iter()
        .map(|list| {
            let step = list.len().div_ceil(COARSE * alone_ways(list, alone)).max(1);
            list.iter().copied().skip(step / 2).step_by(step).collect()
        })
        .collect();
    let weight = |i: usize| alone[i].node.log_weight;
    let single: Vec<f64> = nodes_of
        .iter()
        .map(|list| {
            let logs: Vec<f64> = list
                .iter()
                .filter_map(|i| {
                    let effect = white.effects[*i].as_ref()?;
                    Some(weight(*i) + white.log(&[effect]))
                })
                .collect();
            math::ln_sum_exp(&logs)
        })
        .collect();
    let best_single = causes
        .iter()
        .zip(&single)
        .map(|(c, log)| math::ln((data.belief.rate(c.fault) * c.share()).max(1e-12)) + log)
        .fold(f64::NEG_INFINITY, f64::max);
    // Of nodes on the same build; the build's share is counted once.
    let joint = |a: usize, b: usize| {
        let (x, y) = (&alone[a].node, &alone[b].node);
        if x.build != y.build {
            return None;
        }
        let (e, f) = (white.effects[a].as_ref()?, white.effects[b].as_ref()?);
        let share = builds.get(x.build).map_or(1.0, |b| b.share).max(1e-9);
        let log_weight = weight(a) + weight(b) - math::ln(share);
        Some((log_weight, log_weight + white.log(&[e, f])))
    };
    // The rarer pairs are, the better one must explain the readings.
    let better = data.belief.pairs_better - math::ln(data.belief.pairs);
    let thin = |list: &[usize], all: &[usize]| {
        math::ln(all.len().max(1) as f64 / list.len().max(1) as f64)
    };
    let prior =
        |a: usize, b: usize| math::ln(rate_at(&data.belief, &causes[a], &causes[b]).max(1e-12));
    let mut ranked: Vec<(f64, usize, usize)> = Vec::new();
    for a in 0..causes.len() {
        for b in a + 1..causes.len() {
            if !apart(&causes[a], &causes[b]) {
                continue;
            }
            let logs: Vec<f64> = coarse[a]
                .iter()
                .flat_map(|i| coarse[b].iter().map(move |j| (*i, *j)))
                .filter_map(|(i, j)| joint(i, j).map(|l| l.1))
                .collect();
            if logs.is_empty() {
                continue;
            }
            let log = math::ln_sum_exp(&logs)
                + thin(&coarse[a], &nodes_of[a])
                + thin(&coarse[b], &nodes_of[b]);
            if log < single[a].max(single[b]) + better {
                continue;
            }
            ranked.push((prior(a, b) + log, a, b));
        }
    }
    ranked.sort_by(|x, y| y.0.total_cmp(&x.0).then((x.1, x.2).cmp(&(y.1, y.2))));
    if ranked.first().is_none_or(|r| r.0 < best_single - WORTH) {
        return Vec::new();
    }
    ranked.truncate(data.belief.pairs_solved);
    ranked
        .into_iter()
        .map(|(_, a, b)| {
            let mut grid: Vec<(f64, f64, usize, usize)> = nodes_of[a]
                .iter()
                .flat_map(|i| nodes_of[b].iter().map(move |j| (*i, *j)))
                .filter_map(|(i, j)| joint(i, j).map(|(w, l)| (l, w, i, j)))
                .collect();
            grid.sort_by(|x, y| y.0.total_cmp(&x.0).then((x.2, x.3).cmp(&(y.2, y.3))));
            grid.truncate(MOST_NODES);
            let nodes = grid
                .into_iter()
                .map(|(_, log_weight, i, j)| {
                    let other = &alone[j].node;
                    Node {
                        second: Some(Second {
                            fault: alone[j].suspect.fault,
                            path: other.path,
                            sided: alone[j].suspect.path.is_some(),
                            effect: other.effect,
                            sign: other.sign,
                            quantile: other.quantile,
                            half: other.half,
                        }),
                        log_weight,
                        ..alone[i].node
                    }
                })
                .collect();
            Candidate {
                suspects: [causes[a], causes[b]],
                log_prior: prior(a, b),
                nodes,
            }
        })
        .collect()
}

/// In how many ways (builds, effects, signs) a cause's nodes show.
fn alone_ways(list: &[usize], alone: &[Alone]) -> usize {
    let mut ways: Vec<(usize, Option<usize>, bool)> = list
        .iter()
        .map(|i| {
            let n = &alone[*i].node;
            (n.build, n.effect, n.sign > 0.0)
        })
        .collect();
    ways.sort_unstable();
    ways.dedup();
    ways.len().max(1)
}
