//! Likelihood of all data at a node: scatter and instrument biases integrated in closed form, wrong gauges, wrong ports and
//! swapped sides as explicit branches.

use super::datum::{Data, Datum, Says};
use super::gauss::{Gauss, LN_TWO_PI};
use super::predict::Prediction;
use crate::math;
use crate::readings::{Doing, Port};

/// Chance that a "nothing" is false: coupling not home, snubber shut, wrong port. Common practice: 0.1 to 0.15.
const FALSE_NOTHING: f64 = 0.12;
/// Log density of a reading that tells nothing, on the transformed scale: even over four e-folds.
const ANYTHING: f64 = -1.386;
/// What a node makes of the data.
#[derive(Clone, Debug)]
pub struct Fit {
    /// Log likelihood over all branches.
    pub log: f64,
    /// Log likelihood without each datum.
    pub without: Vec<f64>,
    /// Chance that each group is wrong, given this node.
    pub wrong: Vec<f64>,
    /// Chance that sides are swapped, given this node.
    pub swapped: f64,
    /// Posterior mean of the latents and of the place in the severity cell.
    pub at: Vec<f64>,
    /// Predictive standard deviation of each datum, instrument not counted.
    pub spread: Vec<f64>,
}

/// Data split into those in the joint normal and those that are censored.
struct Split {
    joint: Vec<usize>,
    tails: Vec<usize>,
}

fn split(data: &Data) -> Split {
    let (tails, joint) = (0..data.data.len()).partition(|k| data.data[*k].says == Says::AtLeast);
    Split { joint, tails }
}

/// Fits a node. `centre`: the latent values that the prediction was linearised at (empty: zero). `swap_prior`: chance that sides
/// or directions are swapped in the notes.
pub fn fit(data: &Data, p: &Prediction, centre: &[f64], swap_prior: f64) -> Option<Fit> {
    let plain = branch(data, p, centre, None)?;
    if swap_prior <= 0.0 {
        return Some(plain);
    }
    let swaps: Vec<Fit> = swap_orders(data)
        .iter()
        .filter_map(|order| branch(data, p, centre, Some(order)))
        .collect();
    if swaps.is_empty() {
        return Some(plain);
    }
    let each = math::ln(swap_prior / swaps.len() as f64);
    let mut all = vec![(math::ln(1.0 - swap_prior), plain)];
    all.extend(swaps.into_iter().map(|s| (each, s)));
    let joint: Vec<f64> = all.iter().map(|(prior, f)| prior + f.log).collect();
    let log = math::ln_sum_exp(&joint);
    let shares: Vec<f64> = joint.iter().map(|j| math::exp(j - log)).collect();
    let without = (0..data.data.len())
        .map(|k| {
            let terms: Vec<f64> = all.iter().map(|(prior, f)| prior + f.without[k]).collect();
            math::ln_sum_exp(&terms)
        })
        .collect();
    let wrong = (0..data.groups)
        .map(|g| {
            all.iter()
                .zip(&shares)
                .map(|((_, f), share)| share * f.wrong[g])
                .sum()
        })
        .collect();
    let swapped = 1.0 - shares[0];
    let lead = (0..all.len())
        .max_by(|a, b| shares[*a].total_cmp(&shares[*b]))
        .unwrap_or(0);
    let spread = all[0].1.spread.clone();
    let at = all.swap_remove(lead).1.at;
    Some(Fit {
        log,
        without,
        wrong,
        swapped,
        at,
        spread,
    })
}

/// Which prediction a datum is held against where something is swapped in the notes.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Against {
    /// Its own.
    Own,
    /// That of another datum.
    Other(usize),
    /// None was taken: the datum is left loose.
    Loose,
}

/// The swaps that the notes may hold: sides A and B changed over; directions taken for each other, and the sides with them
/// (a side is known by the direction in which it rises). None where no loop side was read.
fn swap_orders(data: &Data) -> Vec<Vec<Against>> {
    let side = |d: &Datum| matches!(d.port, Port::LoopA | Port::LoopB);
    if !data.data.iter().any(side) {
        return Vec::new();
    }
    let other_side = |port: Port| match port {
        Port::LoopA => Port::LoopB,
        Port::LoopB => Port::LoopA,
        p => p,
    };
    let find = |d: &Datum, condition: Option<usize>| {
        condition.and_then(|c| {
            data.data
                .iter()
                .position(|o| o.port == other_side(d.port) && o.condition == c && o.says == d.says)
        })
    };
    let take = |found: Option<usize>| found.map_or(Against::Loose, Against::Other);
    let sides: Vec<Against> = data
        .data
        .iter()
        .map(|d| {
            if side(d) {
                take(find(d, Some(d.condition)))
            } else {
                Against::Own
            }
        })
        .collect();
    let directions: Vec<Against> = data
        .data
        .iter()
        .map(|d| {
            let c = &data.conditions[d.condition];
            if c.doing.is_neutral() {
                return if side(d) {
                    take(find(d, Some(d.condition)))
                } else {
                    Against::Own
                };
            }
            let back = c.reversed();
            take(find(d, data.conditions.iter().position(|o| *o == back)))
        })
        .collect();
    // Directions can only be told where both were taken.
    let both = directions.iter().zip(&data.data).any(|(a, d)| {
        matches!(a, Against::Other(_)) && !data.conditions[d.condition].doing.is_neutral()
    });
    if both {
        vec![sides, directions]
    } else {
        vec![sides]
    }
}

fn branch(data: &Data, p: &Prediction, centre: &[f64], order: Option<&[Against]>) -> Option<Fit> {
    let Split { joint, tails } = split(data);
    let n = joint.len();
    let c = p.columns;
    let from = |k: usize| match order.map_or(Against::Own, |o| o[k]) {
        Against::Own => (k, false),
        Against::Other(other) => (other, false),
        Against::Loose => (k, true),
    };
    let row = |k: usize| &p.rows[from(k).0 * c..(from(k).0 + 1) * c];
    let expected = |k: usize| {
        let shift: f64 = row(k).iter().zip(centre).map(|(r, u)| r * u).sum();
        p.mean[from(k).0] - shift
    };
    let mut cov = vec![0.0; n * n];
    let mut residual = vec![0.0; n];
    let mut spread = vec![0.0; data.data.len()];
    for (i, ki) in joint.iter().enumerate() {
        let d = &data.data[*ki];
        residual[i] = d.t - expected(*ki);
        for (j, kj) in joint.iter().enumerate().take(i + 1) {
            let e = &data.data[*kj];
            let mut s: f64 = row(*ki).iter().zip(row(*kj)).map(|(a, b)| a * b).sum();
            if d.gauge == e.gauge {
                s += d.bias * e.bias;
            }
            cov[i * n + j] = s;
            cov[j * n + i] = s;
        }
        let (at, loose) = from(*ki);
        spread[*ki] = (cov[i * n + i] - d.bias * d.bias).max(0.0).sqrt();
        cov[i * n + i] += d.own * d.own + p.loose[at] + if loose { 1.0 } else { 0.0 };
    }
    let g = Gauss::new(cov.clone(), &residual)?;
    let mut log = p.swing;
    let doubted = data.belief.wrong;
    let mut tail_logs = vec![0.0; data.data.len()];
    for k in &tails {
        let d = &data.data[*k];
        let variance: f64 = row(*k).iter().map(|r| r * r).sum::<f64>()
            + d.bias * d.bias
            + d.own * d.own
            + p.loose[*k];
        spread[*k] = variance.sqrt();
        let inside = math::ln_normal_cdf((expected(*k) - d.t) / variance.sqrt());
        tail_logs[*k] =
            math::ln_sum_exp(&[math::ln(1.0 - doubted) + inside, math::ln(doubted) - 0.7]);
        log += tail_logs[*k];
    }
    let groups = group_members(data, &joint);
    let doubt = doubts(data, &joint, &groups);
    let branches = Branches::new(&g, &groups, &doubt, joint.len(), data.groups);
    log += branches.log;
    let mut without = vec![log; data.data.len()];
    for (i, k) in joint.iter().enumerate() {
        // A reading left out: its conditional density, with a little doubt so that one bad reading cannot weigh without end.
        let clean = g.conditional(&[i]);
        let doubt = doubt_of(&data.data[*k].says, doubted);
        let held = math::ln_sum_exp(&[math::ln(1.0 - doubt) + clean, math::ln(doubt) + ANYTHING]);
        without[*k] = log - held;
    }
    for k in &tails {
        without[*k] = log - tail_logs[*k];
    }
    let mut at = vec![0.0; c];
    for (i, k) in joint.iter().enumerate() {
        for (a, r) in at.iter_mut().zip(row(*k)) {
            *a += r * g.z[i];
        }
    }
    Some(Fit {
        log,
        without,
        wrong: branches.wrong,
        swapped: 0.0,
        at,
        spread,
    })
}

fn doubt_of(says: &Says, wrong: f64) -> f64 {
    if *says == Says::Nothing {
        FALSE_NOTHING
    } else {
        wrong
    }
}

/// Chance that the ground held a loaded wheel or let it go in a way that no load believed of it explains. Common practice.
const GROUND: f64 = 0.12;

/// A speed under load: near a stall it hangs on the ground under the wheel at that second.
fn hangs_on_the_ground(data: &Data, d: &Datum) -> bool {
    matches!(d.port, Port::Wheel | Port::Ground | Port::MotorShaft)
        && matches!(
            data.conditions[d.condition].doing,
            Doing::Loaded | Doing::Travel | Doing::Overrun
        )
}

/// Positions (in the joint vector) of each rigging's data, and after them each reading that hangs on the ground, alone.
fn group_members(data: &Data, joint: &[usize]) -> Vec<Vec<usize>> {
    let mut groups = vec![Vec::new(); data.groups];
    for (i, k) in joint.iter().enumerate() {
        groups[data.data[*k].group].push(i);
    }
    for (i, k) in joint.iter().enumerate() {
        if hangs_on_the_ground(data, &data.data[*k]) {
            groups.push(vec![i]);
        }
    }
    groups
}

/// Chance that each group says nothing.
fn doubts(data: &Data, joint: &[usize], groups: &[Vec<usize>]) -> Vec<f64> {
    groups
        .iter()
        .enumerate()
        .map(|(g, members)| {
            let nothing = members
                .iter()
                .any(|i| data.data[joint[*i]].says == Says::Nothing);
            match (g >= data.groups, nothing) {
                (true, _) => GROUND,
                (false, true) => FALSE_NOTHING,
                (false, false) => data.belief.wrong,
            }
        })
        .collect()
}

/// All riggings right; one wrong; two; three, found one after the other.
struct Branches {
    log: f64,
    wrong: Vec<f64>,
}

impl Branches {
    fn new(
        g: &Gauss,
        groups: &[Vec<usize>],
        doubt: &[f64],
        joint: usize,
        riggings: usize,
    ) -> Branches {
        let all_right: f64 = groups
            .iter()
            .zip(doubt)
            .filter(|(m, _)| !m.is_empty())
            .map(|(_, d)| math::ln(1.0 - d))
            .sum();
        let odds = |i: usize| math::ln(doubt[i] / (1.0 - doubt[i]));
        let base = g.log_density + all_right;
        let mut terms: Vec<(f64, Vec<usize>)> = vec![(base, Vec::new())];
        let mut chosen: Vec<usize> = Vec::new();
        for _ in 0..3 {
            let mut best: Option<(f64, usize)> = None;
            for (i, members) in groups.iter().enumerate() {
                if members.is_empty() || chosen.contains(&i) {
                    continue;
                }
                let mut set = chosen.clone();
                set.push(i);
                let mut block: Vec<usize> = set
                    .iter()
                    .flat_map(|s| groups[*s].iter().copied())
                    .collect();
                block.sort_unstable();
                block.dedup();
                if block.len() >= joint && joint > 1 && set.len() > 1 {
                    continue;
                }
                let lost = g.conditional(&block);
                let value = base - lost
                    + set.iter().map(|s| odds(*s)).sum::<f64>()
                    + ANYTHING * block.len() as f64;
                terms.push((value, set));
                if best.is_none_or(|(b, _)| value > b) {
                    best = Some((value, i));
                }
            }
            // Going on is worth it only where a wrong one has been found.
            match best {
                Some((value, i)) if value > terms[0].0 - 2.0 => chosen.push(i),
                _ => break,
            }
        }
        let logs: Vec<f64> = terms.iter().map(|(l, _)| *l).collect();
        let log = math::ln_sum_exp(&logs);
        let mut wrong = vec![0.0; groups.len()];
        for (l, set) in &terms {
            let share = math::exp(l - log);
            for i in set {
                wrong[*i] += share;
            }
        }
        wrong.truncate(riggings);
        Branches { log, wrong }
    }
}

/// Likelihood of the data where no listed cause is at work: each reading anywhere round the healthy one.
pub fn not_listed(data: &Data, healthy: &Prediction) -> f64 {
    let mut log = 0.0;
    for (k, d) in data.data.iter().enumerate() {
        let row = &healthy.rows[k * healthy.columns..(k + 1) * healthy.columns];
        let variance =
            row.iter().map(|r| r * r).sum::<f64>() + d.own * d.own + d.bias * d.bias + 0.49;
        let e = d.t - healthy.mean[k];
        log += if d.says == Says::AtLeast {
            math::ln_normal_cdf(-e / variance.sqrt())
        } else {
            -0.5 * e * e / variance - 0.5 * math::ln(variance) - 0.5 * LN_TWO_PI
        };
    }
    log
}
