//! A small fault network against pgmpy, a general-purpose library for Bayesian networks (exact, by variable elimination).
//! Inputs and printed figures stand in `fixtures/outside/pgmpy_network.{py,json}`.
#![cfg(not(target_arch = "wasm32"))]
#![allow(clippy::disallowed_methods)] // the platform's own functions: an outside check

mod support;

use lowside::faults::{self, FaultId};
use lowside::next::yes_or_no;
use lowside::observations;
use lowside::ranking::{assess, normalised};
use lowside::record::Answer;
use serde::Deserialize;
use std::collections::BTreeMap;
use support::*;

#[derive(Deserialize)]
struct Network {
    causes: Vec<FaultId>,
    rates: Vec<f64>,
    chances: BTreeMap<String, Vec<f64>>,
    scenarios: BTreeMap<String, Solved>,
}

#[derive(Deserialize)]
struct Solved {
    answers: BTreeMap<String, Answer>,
    posterior: Vec<f64>,
    information: BTreeMap<String, f64>,
}

fn network() -> Network {
    serde_json::from_str(include_str!("fixtures/outside/pgmpy_network.json"))
        .expect("the fixture reads")
}

/// Base rate × observations, as the ranking normalises it.
fn posterior(n: &Network, answers: &BTreeMap<String, Answer>) -> Vec<f64> {
    let prior: Vec<f64> = n.rates.iter().map(|r| r.ln()).collect();
    normalised(&prior, &observations::log_weights(answers, &n.causes))
}

#[test]
fn both_sides_start_from_the_same_table() {
    let n = network();
    for (id, rate) in n.causes.iter().zip(&n.rates) {
        assert_eq!(faults::find(*id).expect("listed").per_hundred, *rate);
    }
    for (name, chances) in &n.chances {
        let o = observations::find(name).expect("listed");
        let ours: Vec<f64> = n
            .causes
            .iter()
            .map(|id| observations::probability(o, *id))
            .collect();
        assert_eq!(&ours, chances, "{name}: run pgmpy_network.py again");
    }
}

#[test]
fn posteriors_are_those_of_variable_elimination() {
    let n = network();
    assert_eq!(n.scenarios.len(), 6);
    for (name, s) in &n.scenarios {
        let ours = posterior(&n, &s.answers);
        for ((id, p), theirs) in n.causes.iter().zip(&ours).zip(&s.posterior) {
            assert!((p - theirs).abs() < 1e-9, "{name}, {id:?}: {p} {theirs}");
        }
    }
}

#[test]
fn information_of_what_is_not_answered_is_that_of_the_network() {
    let n = network();
    let mut compared = 0;
    for (name, s) in &n.scenarios {
        let prior = posterior(&n, &s.answers);
        for (open, theirs) in &s.information {
            let o = observations::find(open).expect("listed");
            let chance: Vec<f64> = n
                .causes
                .iter()
                .map(|id| observations::probability(o, *id))
                .collect();
            let (_, bits) = yes_or_no(&chance, &prior);
            assert!(
                (bits - theirs).abs() < 1e-9,
                "{name}, {open}: {bits} {theirs}"
            );
            compared += 1;
        }
    }
    assert_eq!(compared, 6 + 5 + 4 + 3 + 5 + 1);
}

/// Cause by cause: probability in an assessment without any reading.
fn assessed(answers: &[(&str, Answer)]) -> BTreeMap<FaultId, f64> {
    let mut v = visit(vec![]);
    for (id, a) in answers {
        v.observations.insert((*id).to_string(), *a);
    }
    assess(&roller(), &v, &[])
        .causes
        .iter()
        .filter(|c| c.pair.is_none())
        .flat_map(|c| c.ids.iter().copied().zip(c.shares.iter().copied()))
        .collect()
}

/// Odds between causes move by the ratio of their chances, through the whole program and not only its parts.
#[test]
fn a_whole_assessment_moves_the_odds_as_the_network_does() {
    let n = network();
    let before = assessed(&[]);
    for (name, s) in &n.scenarios {
        let answers: Vec<(&str, Answer)> =
            s.answers.iter().map(|(k, a)| (k.as_str(), *a)).collect();
        let after = assessed(&answers);
        let first = n.causes[0];
        for (i, id) in n.causes.iter().enumerate() {
            let ours = (after[id] / after[&first]) / (before[id] / before[&first]);
            let theirs = (s.posterior[i] / s.posterior[0]) / (n.rates[i] / n.rates[0]);
            assert!(
                (ours / theirs - 1.0).abs() < 1e-9,
                "{name}, {id:?}: {ours} {theirs}"
            );
        }
    }
}

/// Weight of evidence (I. J. Good, 1950): log odds with the observation less log odds without it.
#[test]
fn the_reason_shown_for_an_observation_is_its_weight_of_evidence() {
    let mut v = visit(vec![]);
    v.observations.insert("foam".into(), Answer::Seen);
    let with = assess(&roller(), &v, &[]);
    let without = assessed(&[]);
    let log_odds = |p: f64| (p / (1.0 - p)).ln();
    let mut told = 0;
    for c in with.causes.iter().filter(|c| c.pair.is_none()) {
        let before: f64 = c.ids.iter().map(|id| without[id]).sum();
        let weight = log_odds(c.probability) - log_odds(before);
        let shown = c.evidence.iter().find(|e| e.of == "foam");
        match shown {
            Some(e) => {
                assert!(
                    (e.weight - weight).abs() < 1e-9,
                    "{:?}: {} {weight}",
                    c.ids,
                    e.weight
                );
                told += 1;
            }
            None => assert!(weight.abs() < 0.15 + 1e-9, "{:?}: {weight}", c.ids),
        }
    }
    assert!(told > 20, "{told}");
}
