//! The advice for a visit: checks, repair, stop.

use super::mixture::{Outcome, by_table, outcomes, yes_or_no};
use super::probe::{Forecasts, forecast};
use super::{Advice, Foretold, Offer, Would, gate, outcomes as parts, repair, words};
use crate::assessment::Assessment;
use crate::checks::{self, Check};
use crate::faults::{self, FaultId};
use crate::machine::{builds, condition_latents, unit_latents};
use crate::math;
use crate::observations;
use crate::ranking::{Bench, Heavy, gather, untransform, weigh};
use crate::readings::instrument::Instrument;
use crate::record::Visit;
use crate::unit::Unit;

/// Information (bits) under which a check has nothing left to say.
const USEFUL: f64 = 0.03;
/// Share of the sum of several answers' information that is counted: they say part of the same.
const TOGETHER: f64 = 0.6;
/// Checks offered.
const OFFERED: usize = 4;
/// Nodes that forecasts are made over.
const NODES: usize = 90;
/// Causes whose readings are foretold.
const FORETOLD: usize = 4;

/// What a candidate check is worth.
struct Worth {
    bits: f64,
    minutes: f64,
    after: f64,
    why: String,
}

/// Advice for a visit whose assessment is at hand.
pub fn advise(
    unit: &Unit,
    visit: &Visit,
    instruments: &[Instrument],
    assessment: &Assessment,
) -> Advice {
    if observations::stop_work(&visit.observations) {
        return Advice {
            stop: Some(
                "Do not test. Stop the engine, chock the machine, do not drive it onto a trailer."
                    .to_string(),
            ),
            ..Advice::default()
        };
    }
    let data = gather(unit, &visit.readings, &visit.riggings, instruments);
    let mut latents = unit_latents(unit);
    condition_latents(unit, &data.conditions, &mut latents);
    let bench = Bench::new(builds(unit), latents, &data);
    let heavy = weigh(&bench, &data, unit.sides).heavy;
    let (ids, prior) = causes(assessment);
    let (heavy, weights, of_cause) = weighted(heavy, &ids, &prior);
    let candidates: Vec<&Check> = checks::all()
        .filter(|c| gate::possible(unit, visit, c))
        .collect();
    let forecasts = forecast(unit, visit, instruments, &data, &heavy, &candidates);
    let worths: Vec<Option<Worth>> = candidates
        .iter()
        .enumerate()
        .map(|(i, check)| {
            worth(
                unit, visit, i, check, &forecasts, &weights, &of_cause, &ids, &prior,
            )
        })
        .collect();
    let mut order: Vec<usize> = (0..candidates.len())
        .filter(|i| worths[*i].as_ref().is_some_and(|w| w.bits > USEFUL))
        .collect();
    let rate = |i: &usize| worths[*i].as_ref().map_or(0.0, |w| w.bits / w.minutes);
    order.sort_by(|a, b| rate(b).total_cmp(&rate(a)).then(a.cmp(b)));
    let mut advice = Advice::default();
    let lower_left = order
        .iter()
        .any(|i| gate::hazard(candidates[*i]) < checks::HIGHEST_HAZARD);
    order.retain(|i| {
        let check = candidates[*i];
        if gate::hazard(check) < checks::HIGHEST_HAZARD {
            return true;
        }
        let reason = if lower_left {
            Some("A safer check can still tell something: that first.".to_string())
        } else {
            gate::held_back(visit, assessment, check)
        };
        match reason {
            Some(why) => {
                advice.held_back.push((check.title.to_string(), why));
                false
            }
            None => true,
        }
    });
    let best_after = order
        .iter()
        .filter_map(|i| worths[*i].as_ref())
        .map(|w| w.after)
        .min_by(f64::total_cmp);
    advice.repair = repair::best(&ids, &prior, visit, assessment, best_after);
    for i in order.iter().take(OFFERED) {
        if let Some(w) = &worths[*i] {
            advice.checks.push(Offer {
                id: candidates[*i].id.to_string(),
                title: candidates[*i].title.to_string(),
                bits: w.bits,
                minutes: w.minutes,
                hazard: gate::hazard(candidates[*i]),
                why: w.why.clone(),
                foretold: foretold(*i, &forecasts, &weights, &of_cause, &ids, &prior),
            });
        }
    }
    if advice.checks.is_empty() {
        advice.stop = Some(stop_words(&ids, &prior, !advice.held_back.is_empty()));
    }
    advice
}

fn stop_words(ids: &[FaultId], prior: &[f64], held_back: bool) -> String {
    if held_back {
        return "No check that may be offered now can change the order. What is held back stands below, with what it waits for.".to_string();
    }
    let lead = ids
        .iter()
        .zip(prior)
        .max_by(|a, b| a.1.total_cmp(b.1))
        .and_then(|(id, _)| faults::find(*id));
    match lead {
        Some(f) if !f.proof.is_empty() => format!(
            "No check that is left can change the order. It is proved by: {}",
            f.proof
        ),
        _ => "No check that is left can change the order.".to_string(),
    }
}

/// Causes with their probabilities, members of sets apart.
fn causes(assessment: &Assessment) -> (Vec<FaultId>, Vec<f64>) {
    let mut ids = Vec::new();
    let mut prior = Vec::new();
    for c in &assessment.causes {
        for (id, share) in c.ids.iter().zip(&c.shares) {
            ids.push(*id);
            prior.push(*share);
        }
    }
    (ids, prior)
}

/// The nodes to forecast over, with weights that give each cause its probability; and the cause of each.
fn weighted(
    heavy: Vec<Heavy>,
    ids: &[FaultId],
    prior: &[f64],
) -> (Vec<Heavy>, Vec<f64>, Vec<usize>) {
    let place = |id: FaultId| ids.iter().position(|i| *i == id);
    let mut kept: Vec<(Heavy, usize)> = heavy
        .into_iter()
        .filter_map(|h| place(h.fault.id).map(|i| (h, i)))
        .filter(|(_, i)| prior[*i] > 0.002)
        .collect();
    let mut totals = vec![f64::NEG_INFINITY; ids.len()];
    let sums = |kept: &[(Heavy, usize)], totals: &mut Vec<f64>| {
        totals.fill(f64::NEG_INFINITY);
        for (h, i) in kept {
            totals[*i] = math::ln_sum_exp(&[totals[*i], h.log]);
        }
    };
    sums(&kept, &mut totals);
    let weight = |h: &Heavy, i: usize, totals: &[f64]| prior[i] * math::exp(h.log - totals[i]);
    kept.sort_by(|a, b| weight(&b.0, b.1, &totals).total_cmp(&weight(&a.0, a.1, &totals)));
    kept.truncate(NODES);
    sums(&kept, &mut totals);
    let mut weights: Vec<f64> = kept.iter().map(|(h, i)| weight(h, *i, &totals)).collect();
    let all: f64 = weights.iter().sum();
    for w in &mut weights {
        *w /= all.max(1e-300);
    }
    let of_cause = kept.iter().map(|(_, i)| *i).collect();
    (
        kept.into_iter().map(|(h, _)| h).collect(),
        weights,
        of_cause,
    )
}

#[allow(clippy::too_many_arguments)] // private; the parts of one estimate
fn worth(
    unit: &Unit,
    visit: &Visit,
    index: usize,
    check: &Check,
    forecasts: &Forecasts,
    weights: &[f64],
    of_cause: &[usize],
    ids: &[FaultId],
    prior: &[f64],
) -> Option<Worth> {
    let minutes = gate::minutes(unit, visit, check);
    let mut best: Option<(f64, Vec<Outcome>, Option<String>)> = None;
    let mut bits = 0.0;
    let mut take = |gain: f64, out: Vec<Outcome>, why: Option<String>, share: f64| {
        bits += gain * share;
        if best.as_ref().is_none_or(|(b, _, _)| gain > *b) {
            best = Some((gain, out, why));
        }
    };
    let f = forecasts.of(index, weights, of_cause);
    if !f.is_empty() {
        let own: Vec<f64> = (0..ids.len())
            .map(|i| f.iter().filter(|n| n.cause == i).map(|n| n.weight).sum())
            .collect();
        let (out, gain) = outcomes(&f, &own, 77 + index as u64);
        take(gain, out, words::by_readings(&f, ids, prior), 1.0);
    }
    for answer in check
        .answers
        .iter()
        .filter(|a| !visit.observations.contains_key(**a))
    {
        if let Some(o) = observations::find(answer) {
            let p: Vec<f64> = ids
                .iter()
                .map(|id| observations::probability(o, *id))
                .collect();
            let (out, gain) = yes_or_no(&p, prior);
            take(
                gain,
                out,
                Some(format!("Answers: {}.", o.words.to_lowercase())),
                TOGETHER,
            );
        }
    }
    let lists = parts::of(check.id);
    if !lists.is_empty() {
        let (out, gain) = partition(lists, ids, prior);
        take(gain, out, words::by_outcome(lists, ids, prior), TOGETHER);
    }
    let (_, out, why) = best?;
    Some(Worth {
        bits,
        minutes,
        after: repair::expected_after_check(ids, &out, minutes),
        why: why.unwrap_or_else(|| check.separates.to_string()),
    })
}

/// A check whose outcome is one of several lists of causes, or nothing found.
fn partition(lists: &[&[FaultId]], ids: &[FaultId], prior: &[f64]) -> (Vec<Outcome>, f64) {
    let n = lists.len() + 1;
    let own = |id: &FaultId| lists.iter().position(|l| l.contains(id)).unwrap_or(n - 1);
    let chance = |id: &FaultId, out: usize| {
        if own(id) == out {
            parts::RELIABLE
        } else {
            (1.0 - parts::RELIABLE) / (n - 1) as f64
        }
    };
    let table: Vec<Vec<f64>> = (0..n)
        .map(|o| ids.iter().map(|id| chance(id, o)).collect())
        .collect();
    by_table(&table, prior)
}

/// What a check's readings would be under the leading causes.
fn foretold(
    check: usize,
    forecasts: &Forecasts,
    weights: &[f64],
    of_cause: &[usize],
    ids: &[FaultId],
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
                        id: ids[*cause],
                        title: faults::find(ids[*cause])
                            .map_or(String::new(), |f| f.title.to_string()),
                        value: untransform(probe.port, mean),
                        low: untransform(probe.port, mean - half),
                        high: untransform(probe.port, mean + half),
                    }
                })
                .collect();
            Foretold {
                port: probe.port,
                condition: forecasts.data.conditions[probe.condition],
                would,
            }
        })
        .collect()
}
