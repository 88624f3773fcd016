//! The advice for a visit: checks, repair, stop.

use super::foretell::foretold;
use super::probe::forecast;
use super::repair::{self, CheckFirst};
use super::worth::{Known, USEFUL, Worth, open_the_way, share_set_ups, worth};
use super::{Advice, Offer, gate, limits, rig};
use crate::assessment::{Assessment, At};
use crate::checks::{self, Check};
use crate::faults;
use crate::math;
use crate::observations;
use crate::ranking::{Belief, Heavy, gather_visit};
use crate::readings::instrument::Instrument;
use crate::record::Visit;
use crate::unit::Unit;

/// Probability of the leading cause from which it may be time to stop checking.
const LEADS: f64 = 0.9;
/// Chance of another leader after any check under which checking has come to its end.
const HARDLY: f64 = 0.05;
/// Checks offered.
const OFFERED: usize = 4;
/// Nodes that forecasts are made over.
const NODES: usize = 90;

/// Advice for a visit whose assessment is at hand; `heavy`: the nodes that carried weight in it
/// ([`Session::heavy`](crate::ranking::Session::heavy)).
pub fn advise(
    unit: &Unit,
    visit: &Visit,
    instruments: &[Instrument],
    assessment: &Assessment,
    heavy: &[Heavy],
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
    let data = gather_visit(unit, visit, instruments, Belief::default());
    let (ids, prior) = causes(assessment);
    let (heavy, weights, of_cause) = weighted(heavy.to_vec(), &ids, &prior);
    let candidates: Vec<&'static Check> = checks::all()
        .filter(|c| rig::possible(unit, visit, c))
        .collect();
    let forecasts = forecast(unit, visit, instruments, &data, &heavy, &candidates);
    let jobs = repair::jobs(assessment, &ids);
    let known = Known {
        unit,
        visit,
        ids: &ids,
        prior: &prior,
        jobs: &jobs,
        forecasts: &forecasts,
        weights: &weights,
        of_cause: &of_cause,
    };
    let mut worths: Vec<Option<Worth>> = candidates
        .iter()
        .enumerate()
        .map(|(i, check)| worth(&known, i, check))
        .collect();
    let waits: Vec<Option<gate::Waits>> = candidates
        .iter()
        .map(|c| gate::waits(visit, assessment, c))
        .collect();
    share_set_ups(&known, &candidates, &mut worths);
    open_the_way(&candidates, &waits, &mut worths);
    let mut order: Vec<usize> = (0..candidates.len())
        .filter(|i| {
            worths[*i]
                .as_ref()
                .is_some_and(|w| w.bits > USEFUL || w.opens)
        })
        .collect();
    let rate = |i: &usize| worths[*i].as_ref().map_or(0.0, |w| w.rate);
    order.sort_by(|a, b| rate(b).total_cmp(&rate(a)).then(a.cmp(b)));
    let mut advice = Advice::default();
    let lower_left = order
        .iter()
        .any(|i| gate::hazard(candidates[*i]) < checks::HIGHEST_HAZARD);
    order.retain(|i| {
        let check = candidates[*i];
        let unsafe_yet = lower_left && gate::hazard(check) == checks::HIGHEST_HAZARD;
        let reason = if unsafe_yet {
            Some("A safer check can still tell something: that first.".to_string())
        } else {
            waits[*i].as_ref().map(|w| w.why.clone())
        };
        match reason {
            Some(why) => {
                advice.held_back.push((check.title.to_string(), why));
                false
            }
            None => true,
        }
    });
    let quickest = order
        .iter()
        .filter_map(|i| worths[*i].as_ref())
        .min_by(|a, b| a.after.total_cmp(&b.after))
        .map(|w| CheckFirst {
            outcomes: &w.outcomes,
            minutes: w.minutes,
        });
    advice.repair = repair::best(visit, assessment, &ids, &jobs, &prior, quickest.as_ref());
    for i in order.iter().take(OFFERED) {
        if let Some(w) = &worths[*i] {
            advice.checks.push(Offer {
                id: candidates[*i].id.to_string(),
                title: candidates[*i].title.to_string(),
                bits: w.bits,
                minutes: w.minutes,
                hazard: gate::hazard(candidates[*i]),
                why: match w.serves {
                    Some(next) => format!("{} It also opens the way to “{next}”.", w.why),
                    None => w.why.clone(),
                },
                hold: limits::hold(unit, candidates[*i]),
                foretold: foretold(*i, &forecasts, &weights, &of_cause, &ids, &prior),
            });
        }
    }
    // What can still change the order, whatever it costs, keeps the search open.
    let open = worths
        .iter()
        .flatten()
        .map(|w| w.changes)
        .fold(0.0, f64::max);
    if advice.checks.is_empty() || (prior.iter().any(|p| *p >= LEADS) && open < HARDLY) {
        advice.stop = Some(stop_words(
            &ids,
            &prior,
            advice.checks.is_empty() && !advice.held_back.is_empty(),
        ));
    }
    advice
}

fn stop_words(ids: &[At], prior: &[f64], held_back: bool) -> String {
    if held_back {
        return "No check that may be offered now can change the order. What is held back stands below, with what it waits for.".to_string();
    }
    let lead = ids
        .iter()
        .zip(prior)
        .max_by(|a, b| a.1.total_cmp(b.1))
        .and_then(|(at, _)| faults::find(at.id));
    match lead {
        Some(f) if !f.proof.is_empty() => format!(
            "No check that is left is likely to change what leads. It is proved by: {}",
            f.proof
        ),
        _ => "No check that is left is likely to change what leads.".to_string(),
    }
}

/// Causes with their probabilities, members of sets apart. Two causes at work together leave half of their joint probability
/// with each: either of them is worth proving.
fn causes(assessment: &Assessment) -> (Vec<At>, Vec<f64>) {
    let mut ids: Vec<At> = Vec::new();
    let mut prior: Vec<f64> = Vec::new();
    let mut add = |id: At, share: f64| match ids.iter().position(|i| *i == id) {
        Some(i) => prior[i] += share,
        None => {
            ids.push(id);
            prior.push(share);
        }
    };
    for c in &assessment.causes {
        if c.pair.is_some() {
            for at in c.members() {
                add(at, c.probability / c.ids.len() as f64);
            }
        } else {
            for (at, share) in c.members().zip(&c.shares) {
                add(at, *share);
            }
        }
    }
    let total: f64 = prior.iter().sum();
    if total > 0.0 {
        prior.iter_mut().for_each(|p| *p /= total);
    }
    (ids, prior)
}

/// The nodes to forecast over, with weights that give each cause its probability; and the cause of each.
fn weighted(heavy: Vec<Heavy>, ids: &[At], prior: &[f64]) -> (Vec<Heavy>, Vec<f64>, Vec<usize>) {
    let place = |h: &Heavy| {
        let at = At {
            id: h.fault.id,
            path: h.path,
        };
        ids.iter().position(|i| *i == at)
    };
    let mut kept: Vec<(Heavy, usize)> = heavy
        .into_iter()
        .filter_map(|h| place(&h).map(|i| (h, i)))
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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::assessment::{Cause, Pair};
    use crate::faults::FaultId;

    #[test]
    fn two_causes_together_leave_half_of_their_probability_with_each() {
        let row = |ids: &[FaultId], probability: f64, shares: &[f64], pair: bool| Cause {
            ids: ids.to_vec(),
            paths: Vec::new(),
            title: String::new(),
            probability,
            shares: shares.to_vec(),
            pair: pair.then(Pair::default),
            action: String::new(),
            split: String::new(),
            evidence: Vec::new(),
            would_read: Vec::new(),
        };
        let assessment = Assessment {
            causes: vec![
                row(&[FaultId::PumpWorn, FaultId::MotorWorn], 0.4, &[], true),
                row(&[FaultId::PumpWorn], 0.3, &[0.3], false),
                row(&[FaultId::OilLow], 0.3, &[0.3], false),
            ],
            ..Assessment::default()
        };
        let (ids, prior) = causes(&assessment);
        assert_eq!(
            ids,
            [FaultId::PumpWorn, FaultId::MotorWorn, FaultId::OilLow].map(At::only)
        );
        for (p, wanted) in prior.iter().zip([0.5, 0.2, 0.3]) {
            assert!((p - wanted).abs() < 1e-12, "{prior:?}");
        }
    }
}
