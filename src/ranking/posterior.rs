//! From data to the posterior over the catalogue: nodes over severity and builds, scatter integrated in closed form at each
//! node, and the nodes that carry weight, with the best of every other cause, linearised again at their own posterior mean.

use super::belief::Belief;
use super::datum::Data;
use super::likelihood::{Fit, fit, not_listed};
use super::node::{Node, nodes};
use super::pairs::{self, Alone, Candidate};
use super::predict::{Bench, CELLS, Prediction};
use super::quick::{Carried, CarriedCause, carry};
use super::suspect::{Suspect, suspects};
use crate::assessment::At;
use crate::circuit::Arrangement;
use crate::faults::{self, Fault, FaultId};
use crate::math;
use crate::readings::Path;
use crate::readings::SideNaming;
use std::collections::BTreeMap;

/// Share of all weight from which a node is linearised again.
const HEAVY: f64 = 5e-4;
/// Most nodes that are linearised again.
const MOST_AGAIN: usize = 400;
/// How little the best node of a cause may weigh (natural log of its share of all weight) and still be linearised again. In the assay
/// more nodes of a cause, or lighter ones, are no better.
const IN_REACH: f64 = 40.0;
/// Steps that such a node may take, and the move of its posterior mean (standard deviations) below which it is at rest.
const STEPS: usize = 2;
const AT_REST: f64 = 0.5;
/// Largest change of any probability in a round that counts as settled.
const SETTLED: f64 = 0.01;
/// Largest step (standard deviations) to which a node is linearised again.
const FARTHEST: f64 = 3.5;

/// Change of a reading (a factor of e) across half a severity cell from which the cell is cut in three.
const STEEP: f64 = 0.5;

/// A cause with what the data make of it.
#[derive(Clone, Debug)]
pub struct Weighed {
    /// Which.
    pub id: FaultId,
    /// The side it is on, on a machine with two paths.
    pub path: Option<Path>,
    /// The second one, where two are at work together.
    pub with: Option<At>,
    /// Log of its base rate over the builds (per hundred calls).
    pub log_prior: f64,
    /// Log likelihood of all data.
    pub log_likelihood: f64,
    /// Log likelihood without each datum.
    pub without: Vec<f64>,
    /// Chance of each group being wrong, given the cause.
    pub wrong: Vec<f64>,
    /// Chance of swapped sides, given the cause.
    pub swapped: f64,
    /// Expected value of each datum on its transformed scale, and its standard deviation.
    pub would: Vec<(f64, f64)>,
    /// Share of the heaviest node.
    pub heaviest: f64,
}

/// A node with what it makes of the data.
pub(super) struct Held {
    pub cause: usize,
    pub node: Node,
    fit: Fit,
    mean: Vec<f64>,
    /// As first predicted, in the middle of the scatter, and the change across the severity cell.
    first: Vec<f64>,
    cell: Vec<f64>,
    /// It had its turn as the best of its cause.
    was_tried: bool,
    /// Where it is linearised (empty: the middle), and what it predicts there.
    pub centre: Vec<f64>,
    pub prediction: Prediction,
}

impl Held {
    /// Log of its share of its cause × likelihood.
    fn log(&self) -> f64 {
        self.node.log_weight + self.fit.log
    }

    fn part(&self) -> Part<'_> {
        Part {
            log_weight: self.node.log_weight,
            fit: &self.fit,
            mean: &self.mean,
        }
    }
}

/// A node that carries weight: what the next check is chosen over.
#[derive(Clone, Debug)]
pub struct Heavy {
    /// Its cause.
    pub fault: &'static Fault,
    /// The side it is on.
    pub path: Option<Path>,
    /// The node.
    pub node: Node,
    /// Log of base rate × share × likelihood of the readings, not normalised.
    pub log: f64,
}

/// The causes weighed, and the nodes behind them.
pub struct Posterior {
    /// Causes.
    pub causes: Vec<Weighed>,
    /// Largest change of any probability in the last round.
    pub change: f64,
    /// Nodes that carry weight, heaviest first.
    pub heavy: Vec<Heavy>,
    /// What a quick look at one reading more starts from.
    pub carried: Carried,
}

impl Weighed {
    /// The cause with its side.
    pub fn at(&self) -> At {
        At {
            id: self.id,
            path: self.path,
        }
    }

    /// True for a single cause at a place.
    pub fn is_alone(&self, at: At) -> bool {
        self.at() == at && self.with.is_none()
    }
}

/// Chance that sides or directions are swapped in the notes.
pub fn swap_chance(sides: SideNaming, belief: &Belief) -> f64 {
    if sides == SideNaming::AsMarked {
        0.5
    } else {
        belief.swapped
    }
}

/// Weighs every cause of the catalogue.
pub fn weigh(bench: &Bench, data: &Data, sides: SideNaming) -> Posterior {
    let swap = swap_chance(sides, &data.belief);
    let arrangement = bench
        .builds
        .first()
        .map_or(Arrangement::Single, |b| b.layout.arrangement);
    let mut catalogue: Vec<Suspect> = suspects(arrangement);
    let mut held: Vec<Held> = Vec::new();
    let mut priors = vec![f64::NEG_INFINITY; catalogue.len()];
    let sound = sound(bench, data);
    for (cause, suspect) in catalogue.iter().enumerate() {
        let fault = suspect.fault;
        let (list, prior) = nodes(suspect, &bench.builds, &data.belief);
        priors[cause] = prior;
        for node in list {
            let p = bench.predict(fault, &node, data, &[]);
            if p.steepness() > STEEP {
                for part in node.thirds() {
                    let p = bench.predict(fault, &part, data, &[]);
                    held.extend(hold(cause, part, p, data, swap));
                }
            } else {
                held.extend(hold(cause, node, p, data, swap));
            }
        }
    }
    let mut change = settle(bench, data, &catalogue, &priors, &mut held, swap);
    let singles = catalogue.len();
    let mut second: Vec<Option<At>> = vec![None; singles];
    for pair in pairs_of(data, bench, &sound, &catalogue, &held) {
        let cause = catalogue.len();
        catalogue.push(pair.suspects[0]);
        second.push(Some(pair.suspects[1].at()));
        priors.push(pair.log_prior);
        for node in pair.nodes {
            let p = bench.predict(pair.suspects[0].fault, &node, data, &[]);
            held.extend(hold(cause, node, p, data, swap));
        }
    }
    if catalogue.len() > singles {
        change = settle(bench, data, &catalogue, &priors, &mut held, swap);
    }
    let whole = shares(&held, &priors);
    let mut out: Vec<Weighed> = catalogue
        .iter()
        .enumerate()
        .filter(|(i, _)| priors[*i].is_finite() && (*i < singles || whole[*i] > SHOWN))
        .map(|(i, suspect)| {
            collect(
                suspect.at(),
                second[i],
                priors[i],
                held.iter().filter(|h| h.cause == i).map(Held::part),
                data,
            )
        })
        .collect();
    if let Some((_, p)) = sound.first() {
        out.extend(unlisted(data, p));
    }
    let heavy = heaviest(&catalogue, &priors, &held);
    let causes = catalogue
        .iter()
        .enumerate()
        .map(|(i, suspect)| CarriedCause {
            suspect: *suspect,
            with: second[i],
            log_prior: priors[i],
            shown: i < singles || whole[i] > SHOWN,
        })
        .collect();
    Posterior {
        causes: out,
        change,
        heavy,
        carried: carry(causes, held, sound.into_iter().next(), &priors),
    }
}

/// "Something not listed here", weighed.
pub(super) fn unlisted(data: &Data, sound: &Prediction) -> Option<Weighed> {
    let entry = faults::find(FaultId::NotListed)?;
    let log = not_listed(data, sound);
    Some(Weighed {
        id: FaultId::NotListed,
        path: None,
        with: None,
        log_prior: math::ln(data.belief.rate(entry).max(1e-9)),
        log_likelihood: log,
        without: vec![log; data.data.len()],
        wrong: vec![0.0; data.groups],
        swapped: 0.0,
        would: sound.mean.iter().map(|m| (*m, 0.8)).collect(),
        heaviest: 0.0,
    })
}

/// Share of all weight from which a pair is a row of its own.
const SHOWN: f64 = 0.005;
/// Share of the heaviest node of its cause from which a node counts.
const COUNTS: f64 = 0.02;
/// Most nodes that are handed on.
const MOST_HANDED_ON: usize = 90;

fn heaviest(catalogue: &[Suspect], priors: &[f64], held: &[Held]) -> Vec<Heavy> {
    let mut best = vec![f64::NEG_INFINITY; catalogue.len()];
    for h in held {
        best[h.cause] = best[h.cause].max(h.log());
    }
    let mut list: Vec<Heavy> = held
        .iter()
        .filter(|h| h.log() > best[h.cause] + math::ln(COUNTS))
        .flat_map(|h| {
            let log = priors[h.cause] + h.log();
            let suspect = catalogue[h.cause];
            // Two causes at once speak for either with half their weight.
            let (log, other) = match h.node.turned(suspect) {
                Some((second, node)) => {
                    let log = log - core::f64::consts::LN_2;
                    (
                        log,
                        Some(Heavy {
                            fault: second.fault,
                            path: second.path,
                            node,
                            log,
                        }),
                    )
                }
                None => (log, None),
            };
            let first = Heavy {
                fault: suspect.fault,
                path: suspect.path,
                node: h.node,
                log,
            };
            core::iter::once(first).chain(other)
        })
        .collect();
    list.sort_by(|a, b| {
        b.log
            .total_cmp(&a.log)
            .then((a.fault.id, a.path).cmp(&(b.fault.id, b.path)))
    });
    list.truncate(4 * MOST_HANDED_ON);
    list
}

/// Log of each node's share of all weight.
pub(super) fn node_shares(held: &[Held], priors: &[f64]) -> Vec<f64> {
    let mut logs: Vec<f64> = held.iter().map(|h| priors[h.cause] + h.log()).collect();
    let total = math::ln_sum_exp(&logs);
    for l in &mut logs {
        *l -= total;
    }
    logs
}

/// Share of all weight a cause, by its nodes.
fn shares(held: &[Held], priors: &[f64]) -> Vec<f64> {
    let mut out = vec![0.0; priors.len()];
    for (h, l) in held.iter().zip(node_shares(held, priors)) {
        out[h.cause] += math::exp(l);
    }
    out
}

/// Linearises again until the shares stand still; returns their last change.
fn settle(
    bench: &Bench,
    data: &Data,
    catalogue: &[Suspect],
    priors: &[f64],
    held: &mut [Held],
    swap: f64,
) -> f64 {
    let mut before = shares(held, priors);
    let mut change = f64::INFINITY;
    for _ in 0..data.belief.rounds {
        again(bench, data, catalogue, priors, held, swap);
        let after = shares(held, priors);
        change = before
            .iter()
            .zip(&after)
            .map(|(a, b)| (a - b).abs())
            .fold(0.0, f64::max);
        before = after;
        if change < SETTLED {
            break;
        }
    }
    change
}

/// The sound machine at all its nodes, whatever its base rate: what effects are measured from.
fn sound(bench: &Bench, data: &Data) -> Vec<(Node, Prediction)> {
    let Some(fault) = faults::find(FaultId::Healthy) else {
        return Vec::new();
    };
    let believed = Belief {
        rates: BTreeMap::new(),
        ..data.belief.clone()
    };
    let suspect = Suspect { fault, path: None };
    nodes(&suspect, &bench.builds, &believed)
        .0
        .into_iter()
        .map(|node| {
            let p = bench.predict(fault, &node, data, &[]);
            (node, p)
        })
        .collect()
}

fn pairs_of(
    data: &Data,
    bench: &Bench,
    sound: &[(Node, Prediction)],
    catalogue: &[Suspect],
    held: &[Held],
) -> Vec<Candidate> {
    let alone: Vec<Alone> = held
        .iter()
        .map(|h| Alone {
            suspect: catalogue[h.cause],
            node: h.node,
            mean: &h.first,
            cell: &h.cell,
        })
        .collect();
    pairs::candidates(data, &bench.builds, sound, &alone)
}

fn hold(cause: usize, node: Node, p: Prediction, data: &Data, swap: f64) -> Option<Held> {
    fit(data, &p, &[], swap).map(|fit| Held {
        cause,
        node,
        fit,
        mean: p.mean.clone(),
        first: p.mean.clone(),
        cell: p.across_cell(),
        was_tried: false,
        centre: Vec::new(),
        prediction: p,
    })
}

/// Means at the middle of the scatter, of what was linearised elsewhere.
pub(super) fn means_at_the_middle(p: &Prediction, centre: &[f64]) -> Vec<f64> {
    p.rows
        .chunks(p.columns)
        .zip(&p.mean)
        .map(|(row, mean)| mean - row.iter().zip(centre).map(|(r, u)| r * u).sum::<f64>())
        .collect()
}

/// The nodes that are linearised again, heaviest first, and whether they carry weight: those that do, and the best one of every cause in
/// reach. Far from where the readings put it a cause fits worse than it is, and by its weight alone it would never get its turn.
fn in_turn(held: &[Held], priors: &[f64]) -> Vec<(usize, bool)> {
    let shares = node_shares(held, priors);
    let mut order: Vec<usize> = (0..held.len()).collect();
    order.sort_by(|a, b| shares[*b].total_cmp(&shares[*a]).then(a.cmp(b)));
    let mut had_one = vec![false; priors.len()];
    let mut turns = Vec::new();
    for i in order {
        let is_best = !core::mem::replace(&mut had_one[held[i].cause], true);
        let is_heavy = shares[i] > math::ln(HEAVY) && turns.len() < MOST_AGAIN;
        if is_heavy || is_best && shares[i] > -IN_REACH {
            turns.push((i, is_heavy));
        }
    }
    turns
}

/// Where a node is linearised again: at its posterior mean, as far as a step reaches.
fn centre_of(fit: &Fit) -> Vec<f64> {
    let mut centre: Vec<f64> = fit
        .at
        .iter()
        .map(|v| v.clamp(-FARTHEST, FARTHEST))
        .collect();
    let cells = centre.len().saturating_sub(CELLS);
    for place in &mut centre[cells..] {
        // The place in a severity cell ends at the cell's wall.
        *place = place.clamp(-(3f64.sqrt()), 3f64.sqrt());
    }
    centre
}

/// Linearises nodes again, each at its own posterior mean. One that carries no weight yet takes a second step where the
/// first did not bring it to rest, and of what the two promise the less counts: halfway there a straight line promises more than the circuit keeps.
fn again(
    bench: &Bench,
    data: &Data,
    catalogue: &[Suspect],
    priors: &[f64],
    held: &mut [Held],
    swap: f64,
) {
    for (i, is_heavy) in in_turn(held, priors) {
        let h = &mut held[i];
        if !is_heavy && h.was_tried {
            continue;
        }
        h.was_tried = true;
        let fault = catalogue[h.cause].fault;
        let mut centre = centre_of(&h.fit);
        let mut least: Option<(Vec<f64>, Prediction, Fit)> = None;
        for _ in 0..if is_heavy { 1 } else { STEPS } {
            let p = bench.predict(fault, &h.node, data, &centre);
            let Some(f) = fit(data, &p, &centre, swap) else {
                break;
            };
            let next = centre_of(&f);
            let is_at_rest = is_near(&next, &centre);
            if is_at_rest || least.as_ref().is_none_or(|(_, _, l)| f.log < l.log) {
                least = Some((centre, p, f));
            }
            if is_at_rest {
                break;
            }
            centre = next;
        }
        if let Some((centre, p, f)) = least {
            h.mean = means_at_the_middle(&p, &centre);
            h.prediction = p;
            h.centre = centre;
            h.fit = f;
        }
    }
}

/// True where a posterior mean stands where its node was linearised.
fn is_near(mean: &[f64], centre: &[f64]) -> bool {
    mean.iter()
        .zip(centre)
        .all(|(there, here)| (there - here).abs() < AT_REST)
}

/// What a node makes of the data, as its cause is summed up from.
pub(super) struct Part<'a> {
    /// Log of its share of its cause.
    pub log_weight: f64,
    /// Its fit.
    pub fit: &'a Fit,
    /// Means at the middle of the scatter.
    pub mean: &'a [f64],
}

/// Sums a cause up over its nodes.
pub(super) fn collect<'a>(
    at: At,
    with: Option<At>,
    log_prior: f64,
    nodes: impl Iterator<Item = Part<'a>>,
    data: &Data,
) -> Weighed {
    let nodes: Vec<Part> = nodes.collect();
    let n = data.data.len();
    let logs: Vec<f64> = nodes.iter().map(|h| h.log_weight + h.fit.log).collect();
    let log_likelihood = if logs.is_empty() {
        f64::NEG_INFINITY
    } else {
        math::ln_sum_exp(&logs)
    };
    let weights: Vec<f64> = logs.iter().map(|l| math::exp(l - log_likelihood)).collect();
    let without = (0..n)
        .map(|k| {
            let terms: Vec<f64> = nodes
                .iter()
                .map(|h| h.log_weight + h.fit.without[k])
                .collect();
            if terms.is_empty() {
                f64::NEG_INFINITY
            } else {
                math::ln_sum_exp(&terms)
            }
        })
        .collect();
    let wrong = (0..data.groups)
        .map(|g| {
            nodes
                .iter()
                .zip(&weights)
                .map(|(h, w)| w * h.fit.wrong[g])
                .sum()
        })
        .collect();
    let swapped = nodes
        .iter()
        .zip(&weights)
        .map(|(h, w)| w * h.fit.swapped)
        .sum();
    let would = (0..n)
        .map(|k| {
            let mean: f64 = nodes.iter().zip(&weights).map(|(h, w)| w * h.mean[k]).sum();
            let square: f64 = nodes
                .iter()
                .zip(&weights)
                .map(|(h, w)| w * ((h.mean[k] - mean).powi(2) + h.fit.spread[k].powi(2)))
                .sum();
            (mean, square.sqrt())
        })
        .collect();
    let heaviest = weights.iter().copied().fold(0.0, f64::max);
    Weighed {
        id: at.id,
        path: at.path,
        with,
        log_prior,
        log_likelihood,
        without,
        wrong,
        swapped,
        would,
        heaviest,
    }
}
