//! From weighed causes to the rows that a screen shows: probabilities, twins joined, reasons, what each gauge would read.

use super::datum::{Data, Says, slope, untransform};
use super::evidence::{Probable, evidence};
use super::posterior::Weighed;
use super::seen::Seen;
use crate::assessment::{Cause, WouldRead};
use crate::faults::{self, AlikeSet, FaultId, SETS};
use crate::math;
use crate::readings::Reading;

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
    for set in SETS {
        let members = alike(set, weighed, &probable);
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
    out.sort_by(|a, b| {
        b.probability
            .total_cmp(&a.probability)
            .then_with(|| a.ids.cmp(&b.ids))
    });
    out
}

/// Members of a set that the evidence weighs alike and that are not ruled out.
fn alike(set: &AlikeSet, weighed: &[Weighed], probable: &Probable) -> Vec<usize> {
    let mut found: Vec<usize> = set
        .ids
        .iter()
        .filter_map(|id| {
            weighed
                .iter()
                .position(|w| w.id == *id && w.log_prior.is_finite())
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
    let ids: Vec<FaultId> = members.iter().map(|i| weighed[*i].id).collect();
    let shares: Vec<f64> = members.iter().map(|i| probable.share[*i]).collect();
    let probability = shares.iter().sum();
    let lead = members
        .iter()
        .copied()
        .max_by(|a, b| probable.share[*a].total_cmp(&probable.share[*b]))
        .unwrap_or(members[0]);
    let title = match set {
        Some(s) => s.title.to_string(),
        None => faults::find(weighed[lead].id).map_or(String::new(), |f| f.title.to_string()),
    };
    Cause {
        title,
        probability,
        shares,
        pair: None,
        action: set.map_or(String::new(), |s| s.action.to_string()),
        split: set.map_or(String::new(), |s| s.split.to_string()),
        evidence: evidence(members, weighed, probable, data, readings, seen, words),
        would_read: would_read(&weighed[lead], data, readings),
        ids,
    }
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
