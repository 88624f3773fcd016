//! From weighed causes to the rows that a screen shows: probabilities, twins joined, reasons, what each gauge would read.

use super::datum::{Data, Says, slope, untransform};
use super::evidence::{Probable, evidence};
use super::posterior::Weighed;
use super::seen::Seen;
use crate::assessment::{At, Cause, Pair, WouldRead, lower_first, sided};
use crate::faults::{AlikeSet, FaultId, SETS};
use crate::math;
use crate::readings::{Path, Reading};

/// Largest difference in log likelihood at which the readings count as having nothing to say between twins.
const ALIKE: f64 = 0.6;

/// Rows in order of probability.
pub fn rows(
    weighed: &[Weighed],
    data: &Data,
    readings: &[Reading],
    seen: &[Seen],
    words: &[String],
) -> Vec<Cause> {
    let probable = Probable::new(weighed, seen);
    let mut taken = vec![false; weighed.len()];
    let mut out = Vec::new();
    let sides = [None, Some(Path::Left), Some(Path::Right)];
    for (set, side) in SETS.iter().flat_map(|s| sides.map(|side| (s, side))) {
        let members = alike(set, side, weighed, &probable);
        if members.len() > 1 && !members.iter().any(|i| taken[*i]) {
            for i in &members {
                taken[*i] = true;
            }
            out.push(row(
                &members,
                Some(set),
                weighed,
                &probable,
                data,
                readings,
                seen,
                words,
            ));
        }
    }
    for (i, _) in taken.iter().enumerate().filter(|(_, t)| !**t) {
        out.push(row(
            &[i],
            None,
            weighed,
            &probable,
            data,
            readings,
            seen,
            words,
        ));
    }
    // What differs by rounding alone, as mirror images do, is in the order of the catalogue, whatever was worked out before.
    let place = |cause: &Cause| (cause.probability * 1e9).round();
    out.sort_by(|a, b| {
        place(b)
            .total_cmp(&place(a))
            .then_with(|| a.ids.cmp(&b.ids))
            .then_with(|| a.paths.cmp(&b.paths))
    });
    out
}

/// Members of a set that the evidence weighs alike and that are not ruled out.
fn alike(
    set: &AlikeSet,
    side: Option<Path>,
    weighed: &[Weighed],
    probable: &Probable,
) -> Vec<usize> {
    let mut found: Vec<usize> = set
        .ids
        .iter()
        .filter_map(|id| {
            weighed.iter().position(|w| {
                w.is_alone(At {
                    id: *id,
                    path: side,
                }) && w.log_prior.is_finite()
            })
        })
        .collect();
    found.retain(|i| probable.log_likelihood[*i].is_finite());
    let Some(best) = found
        .iter()
        .copied()
        .max_by(|a, b| probable.log_likelihood[*a].total_cmp(&probable.log_likelihood[*b]))
    else {
        return found;
    };
    found.retain(|i| probable.log_likelihood[best] - probable.log_likelihood[*i] < ALIKE);
    found
}

#[allow(clippy::too_many_arguments)] // private; the parts of one row
fn row(
    members: &[usize],
    set: Option<&AlikeSet>,
    weighed: &[Weighed],
    probable: &Probable,
    data: &Data,
    readings: &[Reading],
    seen: &[Seen],
    words: &[String],
) -> Cause {
    let mut ids: Vec<FaultId> = members.iter().map(|i| weighed[*i].id).collect();
    let mut shares: Vec<f64> = members.iter().map(|i| probable.share[*i]).collect();
    let probability = shares.iter().sum();
    let lead = members
        .iter()
        .copied()
        .max_by(|a, b| probable.share[*a].total_cmp(&probable.share[*b]))
        .unwrap_or(members[0]);
    let side = weighed[lead].path;
    let mut title = set.map_or_else(|| weighed[lead].at().title(), |s| sided(side, s.title));
    let mut paths: Vec<Option<Path>> = members.iter().map(|i| weighed[*i].path).collect();
    let mut pair = None;
    if let Some(with) = weighed[lead].with {
        let titles = [title, with.title()];
        title = format!("{}, and {}", titles[0], lower_first(&titles[1]));
        pair = Some(Pair {
            explains: explains([weighed[lead].at(), with], weighed, data, readings, seen),
            titles,
        });
        ids = vec![weighed[lead].id, with.id];
        paths = vec![side, with.path];
        shares = Vec::new();
    }
    if paths.iter().all(Option::is_none) {
        paths.clear();
    }
    Cause {
        title,
        probability,
        shares,
        pair,
        action: set.map_or(String::new(), |s| s.action.to_string()),
        split: set.map_or(String::new(), |s| s.split.to_string()),
        evidence: evidence(members, weighed, probable, data, readings, seen, words),
        would_read: would_read(&weighed[lead], data, readings),
        paths,
        ids,
    }
}

/// How much nearer (standard deviations) a cause must come to a reading than its partner to count as what explains it.
const NEARER: f64 = 0.8;
/// The same for an observation, natural log.
const LIKELIER: f64 = 0.4;

/// Ids of the readings and observations that each of two causes explains and the other does not.
fn explains(
    causes: [At; 2],
    weighed: &[Weighed],
    data: &Data,
    readings: &[Reading],
    seen: &[Seen],
) -> [Vec<String>; 2] {
    let mut out = [Vec::new(), Vec::new()];
    let alone = |at| weighed.iter().find(|w| w.is_alone(at));
    if let (Some(a), Some(b)) = (alone(causes[0]), alone(causes[1])) {
        for (k, d) in data.data.iter().enumerate() {
            let off = |w: &Weighed| {
                let (mean, spread) = w.would[k];
                let width = (spread * spread + d.own * d.own + d.bias * d.bias).sqrt();
                ((d.t - mean) / width.max(1e-6)).abs()
            };
            let (x, y) = (off(a), off(b));
            let Some(reading) = readings.get(d.reading) else {
                continue;
            };
            if x + NEARER < y {
                out[0].push(reading.id.clone());
            } else if y + NEARER < x {
                out[1].push(reading.id.clone());
            }
        }
    }
    for s in seen.iter().filter(|s| s.positive) {
        let (x, y) = (s.log(causes[0], None), s.log(causes[1], None));
        if x > y + LIKELIER {
            out[0].push(s.id.clone());
        } else if y > x + LIKELIER {
            out[1].push(s.id.clone());
        }
    }
    out
}

/// What the readings taken would be under a cause, back on the port's own scale.
fn would_read(w: &Weighed, data: &Data, readings: &[Reading]) -> Vec<WouldRead> {
    data.data
        .iter()
        .zip(&w.would)
        .filter_map(|(d, (mean, spread))| {
            let reading = readings.get(d.reading)?.id.clone();
            let (value, spread) = match d.says {
                Says::Share(_) => {
                    let v = math::exp(*mean);
                    (v, v * spread)
                }
                _ => {
                    let value = untransform(d.port, *mean);
                    (value, spread / slope(d.port, value))
                }
            };
            (value.is_finite() && spread.is_finite()).then_some(WouldRead {
                reading,
                value,
                spread,
            })
        })
        .collect()
}
