//! Repairs: probability over minutes, weighed against the best check; what a repair waits for, and what proves it afterwards.

use super::RepairOffer;
use super::answers::Outcome;
use crate::assessment::{Assessment, At, Cause, Standing, Window, sided};
use crate::faults::{self, AlikeSet, Fault, FaultId, SETS};
use crate::record::Visit;

/// Probability under which no repair is offered.
const LEAST: f64 = 0.25;
/// Probability from which a repair that raises a setting may be made: a protection is not screwed up on a guess.
const SURE: f64 = 0.8;

/// Repairs that screw a protection up again.
const RAISES: [FaultId; 6] = [
    FaultId::NeutralReliefLow,
    FaultId::OperatingReliefLow,
    FaultId::LoopReliefALow,
    FaultId::LoopReliefBLow,
    FaultId::PressureLimiterALow,
    FaultId::PressureLimiterBLow,
];

/// One repair: of one cause, or of a set that one action serves whichever member it is.
pub struct Job {
    /// Causes that it ends, as places in the list of causes.
    members: Vec<usize>,
    /// The set, where it is one.
    set: Option<&'static AlikeSet>,
    /// Minutes.
    minutes: f64,
}

/// Minutes of the repair of a cause; none for what is no repair.
fn minutes(id: FaultId) -> Option<f64> {
    faults::find(id).map(|f| f.minutes).filter(|m| *m > 0.0)
}

/// The repairs that the causes ask for. A row that no reading can split is one job where one action serves all its members; it
/// takes as long as its longest member.
pub fn jobs(assessment: &Assessment, ids: &[At]) -> Vec<Job> {
    let one_action = |row: &Cause| {
        SETS.iter().find(|s| {
            s.one_repair
                && row.pair.is_none()
                && row.ids.len() > 1
                && row.ids.iter().all(|i| s.ids.contains(i))
        })
    };
    let mut out: Vec<Job> = Vec::new();
    let mut taken = vec![false; ids.len()];
    for row in &assessment.causes {
        let Some(set) = one_action(row) else { continue };
        let members: Vec<usize> = (0..ids.len())
            .filter(|i| row.members().any(|m| m == ids[*i]))
            .collect();
        let longest = members
            .iter()
            .filter_map(|i| minutes(ids[*i].id))
            .fold(0.0, f64::max);
        if longest > 0.0 {
            members.iter().for_each(|i| taken[*i] = true);
            out.push(Job {
                members,
                set: Some(set),
                minutes: longest,
            });
        }
    }
    for (i, id) in ids.iter().enumerate().filter(|(i, _)| !taken[*i]) {
        if let Some(minutes) = minutes(id.id) {
            out.push(Job {
                members: vec![i],
                set: None,
                minutes,
            });
        }
    }
    out
}

/// Probabilities with the members of each job taken together.
pub fn joined(jobs: &[Job], causes: &[f64]) -> Vec<f64> {
    let mut out = causes.to_vec();
    for job in jobs.iter().filter(|j| j.members.len() > 1) {
        let sum = job.probability(causes);
        for (k, i) in job.members.iter().enumerate() {
            if let Some(p) = out.get_mut(*i) {
                *p = if k == 0 { sum } else { 0.0 };
            }
        }
    }
    out
}

impl Job {
    /// Probability that it ends the trouble.
    fn probability(&self, causes: &[f64]) -> f64 {
        self.members.iter().filter_map(|i| causes.get(*i)).sum()
    }
}

/// Expected minutes to the end of the trouble when repairs are made one after the other, best probability over minutes first (the
/// optimal order for one fault: Heckerman, Breese and Rommelse, 1995). Each repair: probability, minutes.
fn expected(mut repairs: Vec<(f64, f64)>) -> f64 {
    repairs.sort_by(|a, b| (b.0 / b.1).total_cmp(&(a.0 / a.1)));
    let mut left = repairs.iter().map(|(p, _)| p).sum::<f64>();
    let mut total = 0.0;
    for (p, m) in repairs {
        total += m * left;
        left -= p;
    }
    total
}

/// Expected minutes to the end of the trouble when causes are repaired one by one, in the best order.
pub fn expected_minutes(ids: &[FaultId], probability: &[f64]) -> f64 {
    expected(
        ids.iter()
            .zip(probability)
            .filter_map(|(id, p)| minutes(*id).map(|m| (*p, m)))
            .collect(),
    )
}

/// The same with jobs.
fn expected_of(jobs: &[Job], causes: &[f64]) -> f64 {
    expected(
        jobs.iter()
            .map(|j| (j.probability(causes), j.minutes))
            .collect(),
    )
}

/// Expected minutes when a check is made first: its own, and those of the repairs after each of its outcomes.
pub fn expected_after_check(jobs: &[Job], outcomes: &[Outcome], check_minutes: f64) -> f64 {
    check_minutes
        + outcomes
            .iter()
            .map(|o| o.weight * expected_of(jobs, &o.causes))
            .sum::<f64>()
}

/// The best check, as repairs see it.
pub struct CheckFirst<'a> {
    /// Its outcomes.
    pub outcomes: &'a [Outcome],
    /// Its minutes.
    pub minutes: f64,
}

/// Expected minutes when a job is done first: its own, and where it did not help those of the better of the two ways to go on:
/// the other repairs one by one, or the check and then repairs.
fn expected_job_first(
    jobs: &[Job],
    first: &Job,
    causes: &[f64],
    check: Option<&CheckFirst>,
) -> f64 {
    let without = |p: &[f64]| -> (f64, Vec<f64>) {
        let left: Vec<f64> = p
            .iter()
            .enumerate()
            .map(|(i, v)| if first.members.contains(&i) { 0.0 } else { *v })
            .collect();
        let still = left.iter().sum::<f64>();
        (still, left)
    };
    // Probabilities are left unscaled: what is left of them is the chance that the job did not help.
    let (still, left) = without(causes);
    let one_by_one = expected_of(jobs, &left);
    let checked = check.map_or(f64::INFINITY, |c| {
        still * c.minutes
            + c.outcomes
                .iter()
                .map(|o| o.weight * expected_of(jobs, &without(&o.causes).1))
                .sum::<f64>()
    });
    first.minutes + one_by_one.min(checked)
}

/// What a repair waits for although it may be the right one; empty where it may be made now.
fn waits(faults: &[&Fault], visit: &Visit, probability: f64) -> &'static str {
    let debris_looked_for = visit.observations.contains_key("metal");
    if faults.iter().any(|f| f.stop_work) {
        "With the engine stopped, and not moved until it is done."
    } else if faults.iter().any(|f| f.destroys_evidence) && !debris_looked_for {
        "Look for debris first: this repair takes the evidence away."
    } else if probability < SURE && faults.iter().any(|f| RAISES.contains(&f.id)) {
        "Prove it first: this repair raises a setting that protects the drive."
    } else {
        ""
    }
}

/// The best repair: by probability over minutes, and whether it is quicker made now than after the best check, where one is left.
pub fn best(
    visit: &Visit,
    assessment: &Assessment,
    ids: &[At],
    jobs: &[Job],
    probability: &[f64],
    check: Option<&CheckFirst>,
) -> Option<RepairOffer> {
    let rate = |j: &Job| j.probability(probability) / j.minutes;
    let job = jobs
        .iter()
        .filter(|j| j.probability(probability) >= LEAST)
        .max_by(|a, b| rate(a).total_cmp(&rate(b)))?;
    let members: Vec<&Fault> = job
        .members
        .iter()
        .filter_map(|i| faults::find(ids[*i].id))
        .collect();
    let lead_at = job
        .members
        .iter()
        .max_by(|a, b| probability[**a].total_cmp(&probability[**b]))
        .map(|i| ids[*i])?;
    let lead = faults::find(lead_at.id)?;
    let p = job.probability(probability);
    let waits = waits(&members, visit, p);
    let mut cautions: Vec<&str> = Vec::new();
    for f in &members {
        if !f.caution.is_empty() && !cautions.contains(&f.caution) {
            cautions.push(f.caution);
        }
    }
    Some(RepairOffer {
        id: lead.id,
        path: lead_at.path,
        repair: sided(lead_at.path, job.set.map_or(lead.repair, |s| s.action)),
        minutes: job.minutes,
        probability: p,
        proof: job.set.map_or(lead.proof, |s| s.split).to_string(),
        now: waits.is_empty()
            && check.is_none_or(|c| {
                expected_job_first(jobs, job, probability, check)
                    <= expected_after_check(jobs, c.outcomes, c.minutes)
            }),
        waits: waits.to_string(),
        needs_manual: members.iter().any(|f| f.needs_manual),
        caution: cautions.join(" "),
        proved_by: proved_by(assessment, lead_at),
    })
}

/// Readings that are off now, that the cause explains, and that must come back once it is mended. A reading that is off for another
/// reason proves nothing about this repair.
fn proved_by(assessment: &Assessment, at: At) -> Vec<String> {
    let Some(row) = assessment
        .causes
        .iter()
        .find(|c| c.pair.is_none() && c.members().any(|m| m == at))
    else {
        return Vec::new();
    };
    assessment
        .windows
        .iter()
        .filter(|w| matches!(w.standing, Standing::Low | Standing::High))
        .filter(|w| explains(row, w))
        .map(|w| w.reading.clone())
        .collect()
}

/// True where a cause takes a reading out of its window to where it was read: nearer to what was read than a healthy unit is, and
/// not weighed against it.
fn explains(row: &Cause, window: &Window) -> bool {
    let weight = row
        .evidence
        .iter()
        .find(|e| e.of == window.reading)
        .map_or(0.0, |e| e.weight);
    let Some(read) = window.read else {
        return weight > 0.0;
    };
    let off = read - window.middle;
    let nearer = row
        .would_read
        .iter()
        .find(|w| w.reading == window.reading)
        .is_some_and(|w| (read - w.value).abs() < 0.5 * off.abs());
    weight > 0.0 || (weight == 0.0 && nearer)
}
