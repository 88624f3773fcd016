//! Which single mismatch would explain all runs.
//!
//! Each kind in turn may be large while all others are what no two sides are without; the chance of the runs under each
//! (Laplace's approximation, exact where the law is straight) gives its share.

use super::fit::{Fit, solve};
use super::kind::Kind;
use super::law::{Datum, Prior};
use crate::math;

/// What the other mismatches are when one stands alone, share: no two sides are quite equal. Common practice.
const BACKGROUND: f64 = 0.003;
/// Share of calls in which nothing is off, and in which several things are. Common practice, from memory.
const NOTHING: f64 = 0.15;
const SEVERAL: f64 = 0.15;

/// What one account of the runs is worth.
#[derive(Clone, Debug)]
pub struct Alone {
    /// The mismatch that stands alone; none where all are small.
    pub kind: Option<Kind>,
    /// True for the account with several at once.
    pub is_several: bool,
    /// Its share among all accounts, 0 to 1.
    pub share: f64,
    /// The mismatch, if it is alone: value and 95 % half-width, share.
    pub value: f64,
    /// Half-width of its 95 % interval, share.
    pub half: f64,
}

fn narrowed(prior: &Prior, kept: Option<Kind>) -> Prior {
    let mut narrow = *prior;
    for kind in Kind::ALL.into_iter().filter(|k| Some(*k) != kept) {
        let width = &mut narrow.width[kind.latent() as usize];
        *width = width.min(BACKGROUND);
    }
    narrow
}

/// Every account, the likeliest first.
pub(super) fn accounts(
    data: &[(usize, Datum)],
    prior: &Prior,
    joint: &Fit,
    widening: f64,
) -> Vec<Alone> {
    // Where the runs scatter more than stated, differences of chance count for less by the same factor.
    let soften = 1.0 / (widening * widening);
    let mut all: Vec<(Alone, f64)> = Vec::new();
    let none = solve(data, &narrowed(prior, None));
    let account = |kind, is_several, value, half| Alone {
        kind,
        is_several,
        share: 0.0,
        value,
        half,
    };
    all.push((
        account(None, false, 0.0, 0.0),
        math::ln(NOTHING) + soften * none.log_evidence,
    ));
    for kind in Kind::ALL {
        let one = solve(data, &narrowed(prior, Some(kind)));
        let at = kind.latent() as usize;
        let mut row = [0.0; super::SIZE];
        row[at] = 1.0;
        let half = 1.96 * super::fit::quadratic(&one.covariance, &row).max(0.0).sqrt() * widening;
        all.push((
            account(Some(kind), false, one.x[at], half),
            math::ln(kind.rate()) + soften * one.log_evidence,
        ));
    }
    all.push((
        account(None, true, 0.0, 0.0),
        math::ln(SEVERAL) + soften * joint.log_evidence,
    ));
    let terms: Vec<f64> = all.iter().map(|(_, weight)| *weight).collect();
    let sum = math::ln_sum_exp(&terms);
    let mut accounts: Vec<Alone> = all
        .into_iter()
        .map(|(account, weight)| Alone {
            share: math::exp(weight - sum),
            ..account
        })
        .collect();
    accounts.sort_by(|a, b| b.share.total_cmp(&a.share));
    accounts
}
