//! From the runs to what is off, what to turn, what is still open.

use super::adjust::{Adjustment, Screws, adjustments};
use super::alone::{Alone, accounts};
use super::apart::{Advice, Pair, advise, is_informed, pairs};
use super::fit::{Fit, gather, solve};
use super::kind::Kind;
use super::law::{Prior, SIZE};
use super::plan::{Plan, plans};
use super::run::{Machine, Run, RunError};

/// Least mismatch that is worth a word, share. Common practice: sides within 1 % are fit for work.
const SMALL: f64 = 0.003;
/// Within this the two sides count as equal, share. Common practice.
const FIT: f64 = 0.01;
/// Standard deviations to the ends of a 95 % interval.
const ENDS: f64 = 1.96;
/// Chance of scatter below which the runs are said not to agree.
const DISAGREE: f64 = 0.01;

/// What the runs say of one mismatch.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Verdict {
    /// The right side is faster.
    RightFaster,
    /// The left side is faster.
    LeftFaster,
    /// Equal within 1 %.
    Equal,
    /// The runs don't say.
    CannotTell,
}

/// One mismatch as estimated.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Found {
    /// Which.
    pub kind: Kind,
    /// Right over left, share (see [`Kind::share_of`]).
    pub value: f64,
    /// Half-width of its 95 % interval, share.
    pub half: f64,
    /// What may be said.
    pub verdict: Verdict,
    /// True where the runs bear on it at all.
    pub is_seen: bool,
}

/// Whether the runs agree with each other.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Agreement {
    /// Too few of them to say.
    TooFew,
    /// Within their uncertainties.
    Agree,
    /// They scatter more than their uncertainties: play, camber, the operator's hand. The intervals are widened.
    Disagree {
        /// The run that stands out most, by its place.
        worst: usize,
    },
}

/// Everything that the runs give.
#[derive(Clone, Debug)]
pub struct Outcome {
    /// The estimate.
    pub fit: Fit,
    /// Each mismatch, in the order of the work.
    pub found: Vec<Found>,
    /// Which single mismatch would explain all runs, the likeliest first.
    pub alone: Vec<Alone>,
    /// What cannot be told apart.
    pub pairs: Vec<Pair>,
    /// The run to make next; none where nothing is open or no run would help.
    pub advice: Option<Advice>,
    /// Whether the runs agree.
    pub agreement: Agreement,
    /// What to do.
    pub adjustments: Vec<Adjustment>,
    /// The path before and after.
    pub plans: Vec<Plan>,
    /// Runs that could not be used, by their place, and why.
    pub refused: Vec<(usize, RunError)>,
}

fn found(fit: &Fit, prior: &Prior, kind: Kind) -> Found {
    let at = kind.latent() as usize;
    let mut row = [0.0; SIZE];
    row[at] = 1.0;
    let (value, half) = (fit.x[at], ENDS * fit.spread(&row));
    let is_seen = is_informed(fit, prior, at);
    let verdict = if !is_seen {
        Verdict::CannotTell
    } else if value.abs() > half && value.abs() >= SMALL {
        if value > 0.0 {
            Verdict::RightFaster
        } else {
            Verdict::LeftFaster
        }
    } else if value.abs() + half <= FIT {
        Verdict::Equal
    } else {
        Verdict::CannotTell
    };
    Found {
        kind,
        value,
        half,
        verdict,
        is_seen,
    }
}

fn agreement(fit: &Fit) -> Agreement {
    if fit.freedom < 1.0 {
        return Agreement::TooFew;
    }
    if fit.chance_of_scatter() >= DISAGREE {
        return Agreement::Agree;
    }
    let worst = fit
        .residuals
        .iter()
        .max_by(|a, b| a.1.abs().total_cmp(&b.1.abs()));
    match worst {
        Some((worst, _)) => Agreement::Disagree { worst: *worst },
        None => Agreement::TooFew,
    }
}

/// What these runs say about this machine. Always answers: without runs it says that it cannot tell, and what to do first.
#[must_use]
pub fn find(machine: &Machine, runs: &[Run], screws: &Screws) -> Outcome {
    let prior = Prior::of(machine);
    let refused = runs
        .iter()
        .enumerate()
        .filter_map(|(at, run)| run.check(machine).err().map(|why| (at, why)))
        .collect();
    let data = gather(machine, runs);
    let fit = solve(&data, &prior);
    let found: Vec<Found> = Kind::ALL
        .into_iter()
        .map(|kind| found(&fit, &prior, kind))
        .collect();
    let alone = accounts(&data, &prior, &fit, fit.widening());
    let pairs = pairs(&fit, &prior, &found, &alone);
    let advice = advise(&fit, &prior, machine, &found, &pairs);
    let adjustments = adjustments(&found, screws);
    let plans = plans(&fit, &prior, machine, runs, &adjustments);
    Outcome {
        agreement: agreement(&fit),
        fit,
        found,
        alone,
        pairs,
        advice,
        adjustments,
        plans,
        refused,
    }
}
