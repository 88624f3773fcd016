//! What a check is worth: information on the cause, its minutes, and what its set-up serves besides.

use super::answers::{MOST_QUESTIONS, Outcome, Question, answers, entropy, yes_or_no};
use super::gate;
use super::mixture::readings_and_answers;
use super::probe::Forecasts;
use super::repair::{self, Job};
use super::rig;
use super::words;
use crate::assessment::At;
use crate::checks::{self, Check};
use crate::observations::{self, Family, Observation};
use crate::record::Visit;
use crate::unit::Unit;

/// Share of what a further check tells that is counted when it shares the set-up of a first one: they say part of the same.
const SHARED: f64 = 0.6;

/// Information (bits) under which a check has nothing left to say.
pub const USEFUL: f64 = 0.03;

/// What a candidate check is worth.
pub struct Worth {
    /// Expected information, bits.
    pub bits: f64,
    /// Minutes now, rigging and access included.
    pub minutes: f64,
    /// Expected minutes to the end of the trouble when it is made first.
    pub after: f64,
    /// Its outcomes.
    pub outcomes: Vec<Outcome>,
    /// Chance that another cause leads after it.
    pub changes: f64,
    /// One sentence: what it tells from what.
    pub why: String,
    /// Bits a minute, with the checks that its set-up serves besides.
    pub rate: f64,
    /// The check that its set-up serves next, where that is what makes it worth while.
    pub serves: Option<&'static str>,
    /// A check that can tell something waits for this one.
    pub opens: bool,
}

/// Everything that is known of the causes when checks are compared.
pub struct Known<'a> {
    /// The unit.
    pub unit: &'a Unit,
    /// The visit.
    pub visit: &'a Visit,
    /// Causes.
    pub ids: &'a [At],
    /// Their probabilities.
    pub prior: &'a [f64],
    /// The repairs that they ask for.
    pub jobs: &'a [Job],
    /// Forecasts of the candidates' readings.
    pub forecasts: &'a Forecasts,
    /// Weight of each node.
    pub weights: &'a [f64],
    /// Cause of each node.
    pub of_cause: &'a [usize],
}

/// What a check is worth by itself; none where it has nothing left to say.
pub fn worth(known: &Known, index: usize, check: &Check) -> Option<Worth> {
    let (ids, prior) = (known.ids, known.prior);
    let minutes = rig::minutes(known.unit, known.visit, check);
    let asked = questions(known, check);
    let f = known.forecasts.of(index, known.weights, known.of_cause);
    let questions: Vec<Question> = asked.iter().map(|(_, q, _)| q.clone()).collect();
    let by_answer = asked
        .first()
        .map(|(o, _, bits)| (format!("Answers: {}.", o.words.to_lowercase()), *bits));
    let (out, bits, why): (Vec<Outcome>, f64, Option<String>) = if f.is_empty() {
        if questions.is_empty() {
            return None;
        }
        let (out, bits) = answers(&questions, prior);
        (out, bits, by_answer.map(|(w, _)| w))
    } else {
        let own: Vec<f64> = (0..ids.len())
            .map(|i| f.iter().filter(|n| n.cause == i).map(|n| n.weight).sum())
            .collect();
        let seed = 77 + index as u64;
        let (out, bits) = readings_and_answers(&f, &questions, &own, seed);
        let why = match by_answer {
            // The answer carries most of it.
            Some((words, own)) if own > 0.5 * bits => Some(words),
            _ => words::by_readings(&f, ids, prior),
        };
        (out, bits, why)
    };
    let bits = information(known.jobs, &out).min(bits);
    Some(Worth {
        bits,
        minutes,
        after: repair::expected_after_check(known.jobs, &out, minutes),
        changes: changes(&out, prior),
        outcomes: out,
        why: why.unwrap_or_else(|| check.separates.to_string()),
        rate: bits / minutes,
        serves: None,
        opens: false,
    })
}

/// Information (bits) on which job is to be done: what tells members of a set apart that one action serves is worth nothing.
fn information(jobs: &[Job], outcomes: &[Outcome]) -> f64 {
    let n = outcomes.first().map_or(0, |o| o.causes.len());
    let mut before = vec![0.0; n];
    for o in outcomes {
        for (b, c) in before.iter_mut().zip(&o.causes) {
            *b += o.weight * c;
        }
    }
    let after: f64 = outcomes
        .iter()
        .map(|o| o.weight * entropy(&repair::joined(jobs, &o.causes)))
        .sum();
    (entropy(&repair::joined(jobs, &before)) - after).max(0.0)
}

/// Chance that another cause leads after a check than leads now.
fn changes(outcomes: &[Outcome], prior: &[f64]) -> f64 {
    let lead = |p: &[f64]| (0..p.len()).max_by(|a, b| p[*a].total_cmp(&p[*b]));
    let now = lead(prior);
    outcomes
        .iter()
        .filter(|o| lead(&o.causes) != now)
        .map(|o| o.weight)
        .sum()
}

/// Open questions of a check, the one that tells most first, with the bits each carries alone. The second of a family counts
/// less, and so does what the operator says.
fn questions(known: &Known, check: &Check) -> Vec<(&'static Observation, Question, f64)> {
    // The operator's word counts half; one's own look after it adds the other half.
    let trust = |o: &Observation| {
        if rig::is_hearsay(check) || rig::is_heard(known.visit, o.id) {
            observations::OPERATOR
        } else {
            1.0
        }
    };
    let mut list: Vec<(&'static Observation, Question, f64)> =
        rig::open_answers(known.unit, known.visit, check)
            .into_iter()
            .map(|o| {
                let chance: Vec<f64> = known
                    .ids
                    .iter()
                    .map(|id| observations::probability(o, id.id))
                    .collect();
                let (_, bits) = yes_or_no(&chance, known.prior);
                (
                    o,
                    Question {
                        chance,
                        kept: trust(o),
                    },
                    bits,
                )
            })
            .collect();
    list.sort_by(|a, b| b.2.total_cmp(&a.2).then(a.0.id.cmp(b.0.id)));
    list.truncate(MOST_QUESTIONS);
    let answered = |family: Family| {
        known
            .visit
            .observations
            .keys()
            .filter(|id| observations::find(id).is_some_and(|o| o.family == family))
            .count()
    };
    let mut before: Vec<(Family, usize)> = Vec::new();
    for (o, q, _) in &mut list {
        let place = before.iter().position(|(f, _)| *f == o.family);
        let n = match place {
            Some(i) => {
                before[i].1 += 1;
                before[i].1
            }
            None => {
                before.push((o.family, answered(o.family)));
                answered(o.family)
            }
        };
        q.kept *= observations::kept(o.family, n);
    }
    list
}

/// Raises the check that others wait for: what they tell is its fruit too. It is offered even where it tells nothing itself.
pub fn open_the_way(
    candidates: &[&'static Check],
    waits: &[Option<gate::Waits>],
    worths: &mut [Option<Worth>],
) {
    for (j, wait) in waits.iter().enumerate() {
        let Some(first) = wait.as_ref().and_then(|w| w.first) else {
            continue;
        };
        let (Some(i), Some((bits, minutes))) = (
            candidates.iter().position(|c| c.id == first),
            worths[j].as_ref().map(|w| (w.bits, w.minutes)),
        ) else {
            continue;
        };
        if let Some(w) = &mut worths[i] {
            let rate = (w.bits + SHARED * bits) / (w.minutes + minutes);
            w.opens |= bits > USEFUL;
            if rate > w.rate {
                w.rate = rate;
                w.serves = Some(candidates[j].title);
            }
        }
    }
}

/// Counts what a set-up serves besides: the gauge that is fitted for one check makes the next ones cheap.
pub fn share_set_ups(known: &Known, candidates: &[&'static Check], worths: &mut [Option<Worth>]) {
    let safe = |c: &Check| gate::hazard(c) < checks::HIGHEST_HAZARD;
    let plain: Vec<Option<(f64, f64)>> = worths
        .iter()
        .map(|w| w.as_ref().map(|w| (w.bits, w.minutes)))
        .collect();
    for (i, first) in candidates.iter().enumerate() {
        let Some((bits, minutes)) = plain[i] else {
            continue;
        };
        let rigs = rig::rigs(known.unit, known.visit, first);
        if rigs.is_empty() || !safe(first) {
            continue;
        }
        let mut next: Vec<(f64, f64, &'static str)> = candidates
            .iter()
            .enumerate()
            .filter(|(j, c)| *j != i && safe(c))
            .filter_map(|(j, c)| {
                let (b, m) = plain[j]?;
                let after = rig::minutes_once_rigged(known.unit, known.visit, c, &rigs);
                (after < m).then_some((SHARED * b, after, c.title))
            })
            .collect();
        next.sort_by(|a, b| (b.0 / b.1).total_cmp(&(a.0 / a.1)));
        let (mut told, mut taken) = (bits, minutes);
        for (b, m, title) in next {
            if b / m <= told / taken {
                break;
            }
            told += b;
            taken += m;
            if let Some(w) = &mut worths[i] {
                w.rate = told / taken;
                w.serves.get_or_insert(title);
            }
        }
    }
}
