//! Scores: how often the true cause leads, stands in the first three, and whether a stated probability is kept.

use crate::judge::Ranked;
use lowside::assessment::At;
use lowside::faults::FaultId;
use lowside::math;
use lowside::readings::Path;
use std::collections::BTreeMap;

/// Equal bins of the leader's probability for the calibration table.
const BINS: usize = 5;

/// Scores of one ranker over many cases.
#[derive(Clone, Default)]
pub struct Score {
    /// Cases.
    pub cases: usize,
    top1: usize,
    top3: usize,
    log: f64,
    /// For each bin: stated, sum of stated probabilities, kept. Of the leader.
    leader: [(usize, f64, usize); BINS],
    /// The same of every suspect that was given a twentieth and more.
    every: [(usize, f64, usize); BINS],
    /// Cases, top-1, top-3 of each fault.
    pub by_fault: BTreeMap<FaultId, (usize, usize, usize)>,
    /// Cases in which a side was to be told, those in which the likelier side was right, and sums of what was stated of it.
    sides: (usize, usize, f64),
}

/// Probability of the side that a single hidden fault is on, and of the other one; none where it is on no side.
pub fn sides(truth: &[At], ranked: &Ranked) -> Option<(f64, f64)> {
    let [at] = truth else {
        return None;
    };
    let own = at.path?;
    let on = |path: Path| -> f64 {
        let here = ranked
            .iter()
            .filter(|(ids, _)| ids.iter().all(|i| i.path == Some(path)));
        here.map(|(_, q)| q).sum()
    };
    Some((on(own), on(own.other())))
}

impl Score {
    /// Adds a case.
    pub fn add(&mut self, truth: &[At], ranked: &Ranked) {
        let is = |ids: &[At]| ids.len() == truth.len() && ids.iter().all(|i| truth.contains(i));
        let place = ranked.iter().position(|(ids, _)| is(ids));
        let p = place.map_or(0.0, |i| ranked[i].1);
        self.cases += 1;
        self.top1 += usize::from(place == Some(0));
        self.top3 += usize::from(place.is_some_and(|i| i < 3));
        self.log += math::ln(p.max(1e-6));
        let bin = |q: f64| ((q * BINS as f64) as usize).min(BINS - 1);
        if let Some((ids, q)) = ranked.first() {
            let b = &mut self.leader[bin(*q)];
            *b = (b.0 + 1, b.1 + q, b.2 + usize::from(is(ids)));
        }
        for (ids, q) in ranked.iter().filter(|r| r.1 >= 0.05) {
            let b = &mut self.every[bin(*q)];
            *b = (b.0 + 1, b.1 + q, b.2 + usize::from(is(ids)));
        }
        if let Some((here, there)) = sides(truth, ranked) {
            self.sides.0 += 1;
            self.sides.1 += usize::from(here > there);
            self.sides.2 += here.max(there) / (here + there).max(1e-12);
        }
        for at in truth {
            let f = self.by_fault.entry(at.id).or_default();
            f.0 += 1;
            f.1 += usize::from(place == Some(0));
            f.2 += usize::from(place.is_some_and(|i| i < 3));
        }
    }

    /// Adds another's cases.
    pub fn merge(&mut self, other: &Score) {
        self.cases += other.cases;
        self.top1 += other.top1;
        self.top3 += other.top3;
        self.log += other.log;
        for (mine, theirs) in [
            (&mut self.leader, &other.leader),
            (&mut self.every, &other.every),
        ] {
            for (a, b) in mine.iter_mut().zip(theirs) {
                *a = (a.0 + b.0, a.1 + b.1, a.2 + b.2);
            }
        }
        let (a, b) = (&mut self.sides, other.sides);
        *a = (a.0 + b.0, a.1 + b.1, a.2 + b.2);
        for (id, f) in &other.by_fault {
            let mine = self.by_fault.entry(*id).or_default();
            *mine = (mine.0 + f.0, mine.1 + f.1, mine.2 + f.2);
        }
    }

    /// Of the cases in which a side was to be told: how many, share in which it was right, mean of what was stated of it.
    pub fn sides(&self) -> (usize, f64, f64) {
        let n = self.sides.0.max(1) as f64;
        (self.sides.0, self.sides.1 as f64 / n, self.sides.2 / n)
    }

    fn share(&self, k: usize) -> f64 {
        k as f64 / self.cases.max(1) as f64
    }

    /// Share of cases in which the true cause leads.
    pub fn top1(&self) -> f64 {
        self.share(self.top1)
    }

    /// Share of cases in which it is among the first three.
    pub fn top3(&self) -> f64 {
        self.share(self.top3)
    }

    /// Mean log of the probability of the true cause.
    pub fn log(&self) -> f64 {
        self.log / self.cases.max(1) as f64
    }

    /// Expected calibration error: of the leader, and of all stated probabilities of a twentieth and more.
    pub fn calibration(&self) -> (f64, f64) {
        let error = |bins: &[(usize, f64, usize); BINS]| {
            let n: usize = bins.iter().map(|b| b.0).sum();
            bins.iter().map(|b| (b.1 - b.2 as f64).abs()).sum::<f64>() / n.max(1) as f64
        };
        (error(&self.leader), error(&self.every))
    }

    /// Calibration table of the leader: for each bin stated, mean stated probability, share kept.
    pub fn table(&self) -> Vec<(usize, f64, f64)> {
        self.leader
            .iter()
            .filter(|b| b.0 > 0)
            .map(|b| (b.0, b.1 / b.0 as f64, b.2 as f64 / b.0 as f64))
            .collect()
    }
}
