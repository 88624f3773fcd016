//! Repairs: probability over minutes, weighed against the best check.

use super::RepairOffer;
use super::mixture::Outcome;
use crate::assessment::{Assessment, Standing};
use crate::faults::{self, Fault, FaultId};
use crate::record::Visit;

/// Probability under which no repair is offered.
const LEAST: f64 = 0.25;

/// Minutes of the repair of a cause; none for what is no repair.
fn minutes(id: FaultId) -> Option<f64> {
    faults::find(id).map(|f| f.minutes).filter(|m| *m > 0.0)
}

/// Expected minutes to the end of the trouble when causes are repaired one after the other, best probability over minutes
/// first (the optimal order for one fault: Heckerman, Breese and Rommelse, 1995).
pub fn expected_minutes(ids: &[FaultId], probability: &[f64]) -> f64 {
    let mut order: Vec<(f64, f64)> = ids
        .iter()
        .zip(probability)
        .filter_map(|(id, p)| minutes(*id).map(|m| (*p, m)))
        .collect();
    order.sort_by(|a, b| (b.0 / b.1).total_cmp(&(a.0 / a.1)));
    let mut left = order.iter().map(|(p, _)| p).sum::<f64>();
    let mut total = 0.0;
    for (p, m) in order {
        total += m * left;
        left -= p;
    }
    total
}

/// Expected minutes when a check is made first.
pub fn expected_after_check(ids: &[FaultId], outcomes: &[Outcome], check_minutes: f64) -> f64 {
    check_minutes
        + outcomes
            .iter()
            .map(|o| o.weight * expected_minutes(ids, &o.causes))
            .sum::<f64>()
}

/// True where a repair may be offered before the cause is proved: it hides nothing and takes no protection away.
fn may_go_first(fault: &Fault, visit: &Visit) -> bool {
    let debris_seen = visit.observations.contains_key("metal");
    (!fault.destroys_evidence || debris_seen) && !fault.stop_work
}

/// The best repair: by probability over minutes.
pub fn best(
    ids: &[FaultId],
    probability: &[f64],
    visit: &Visit,
    assessment: &Assessment,
    best_check: Option<f64>,
) -> Option<RepairOffer> {
    let (fault, p) = ids
        .iter()
        .zip(probability)
        .filter(|(_, p)| **p >= LEAST)
        .filter_map(|(id, p)| faults::find(*id).map(|f| (f, *p)))
        .filter(|(f, _)| f.minutes > 0.0 && may_go_first(f, visit))
        .max_by(|a, b| (a.1 / a.0.minutes).total_cmp(&(b.1 / b.0.minutes)))?;
    let first = expected_minutes(ids, probability);
    let proved_by = assessment
        .windows
        .iter()
        .filter(|w| matches!(w.standing, Standing::Low | Standing::High))
        .map(|w| w.reading.clone())
        .collect();
    Some(RepairOffer {
        id: fault.id,
        repair: fault.repair.to_string(),
        minutes: fault.minutes,
        probability: p,
        proof: fault.proof.to_string(),
        now: best_check.is_none_or(|after| first <= after),
        needs_manual: fault.needs_manual,
        caution: fault.caution.to_string(),
        proved_by,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_order_by_probability_over_minutes_is_the_shortest() {
        let ids = [FaultId::PumpWorn, FaultId::OilLow, FaultId::CheckALeaking];
        let p = [0.5, 0.2, 0.3];
        let m: Vec<f64> = ids.iter().map(|i| minutes(*i).expect("a repair")).collect();
        let cost = |order: [usize; 3]| {
            let mut left = 1.0;
            order
                .iter()
                .map(|i| {
                    let c = m[*i] * left;
                    left -= p[*i];
                    c
                })
                .sum::<f64>()
        };
        let all = [
            [0, 1, 2],
            [0, 2, 1],
            [1, 0, 2],
            [1, 2, 0],
            [2, 0, 1],
            [2, 1, 0],
        ];
        let shortest = all.iter().map(|o| cost(*o)).fold(f64::INFINITY, f64::min);
        assert!((expected_minutes(&ids, &p) - shortest).abs() < 1e-9);
    }
}
