//! Scatter split in two: half of the variance of the load is sampled at the nodes, the rest is integrated in closed form.
//!
//! A motor that stalls shows no slope towards turning, and one that turns freely none towards stalling: where the middle of the
//! load's scatter lies on one side of such a kink, no derivative there knows of the other side. Nodes that start from different
//! places do. (Leakages too are hidden under a relief that holds; sampling them costs more in noise than it gains, as the assay
//! showed: too many readings pin them.) The places are a Latin hypercube (McKay, Beckman and Conover, 1979) of fixed seed, the same for every
//! cause, so that its noise drops out of their comparison.

use super::memo::text_key;
use crate::circuit::Param;
use crate::machine::{Latent, Latents};
use crate::math;
use crate::windows::Normals;
use std::collections::BTreeMap;

/// Share of the variance that is sampled.
const SAMPLED: f64 = 0.5;

/// Parameters whose scatter is sampled.
const KINKED: &[Param] = &[Param::Load, Param::Push];

/// A node's place in the sampled half of the scatter.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Place {
    /// Which place.
    pub at: usize,
    /// Of how many.
    pub of: usize,
}

/// Places of the nodes in the scatter.
#[derive(Debug)]
pub struct Split {
    sampled: Vec<bool>,
    /// A number of its own for each latent, that stays when others are added.
    seeds: Vec<u64>,
    places: core::cell::RefCell<BTreeMap<usize, Vec<Vec<f64>>>>,
}

impl Split {
    /// The split of a unit's latents.
    pub fn new(latents: &Latents) -> Split {
        // What one side of two has for itself is left to the closed form: the more is sampled over the same few nodes, the more a
        // node that happens to lie well outweighs the others.
        let sampled =
            |l: &Latent| !l.of_one_side && l.acts.iter().any(|a| KINKED.contains(&a.param));
        Split {
            sampled: latents.0.iter().map(sampled).collect(),
            seeds: seeds(latents),
            places: core::cell::RefCell::default(),
        }
    }

    /// A number of its own for each latent.
    pub fn seeds(&self) -> &[u64] {
        &self.seeds
    }

    fn is_sampled(&self, latent: usize, place: Option<Place>) -> bool {
        place.is_some() && self.sampled.get(latent).copied().unwrap_or(false)
    }

    /// Share of a latent's standard deviation that is left to the closed form at a node.
    pub fn left(&self, latent: usize, place: Option<Place>) -> f64 {
        if self.is_sampled(latent, place) {
            (1.0 - SAMPLED).sqrt()
        } else {
            1.0
        }
    }

    /// Full scatter (standard deviations) of a node, its closed-form part being `u` (empty: zero).
    pub fn scatter(&self, place: Option<Place>, u: &[f64]) -> Vec<f64> {
        let own = |j: usize| u.get(j).copied().unwrap_or(0.0);
        let Some(p) = place else {
            return (0..self.sampled.len()).map(own).collect();
        };
        let mut places = self.places.borrow_mut();
        let table = places
            .entry(p.of)
            .or_insert_with(|| hypercube(p.of, &self.sampled, &self.seeds));
        (0..self.sampled.len())
            .map(|j| {
                let start = if self.is_sampled(j, place) {
                    table[j].get(p.at).copied().unwrap_or(0.0)
                } else {
                    0.0
                };
                start + self.left(j, place) * own(j)
            })
            .collect()
    }
}

/// A number for each latent from its name, where it acts first, and how many of that name came before.
fn seeds(latents: &Latents) -> Vec<u64> {
    let mut names: Vec<String> = Vec::with_capacity(latents.0.len());
    latents
        .0
        .iter()
        .map(|l| {
            let first = l.acts.first().map(|a| (a.condition, a.param));
            let name = format!("{} {first:?}", l.words);
            let before = names.iter().filter(|n| **n == name).count();
            let seed = text_key(&format!("{name} {before}"));
            names.push(name);
            seed
        })
        .collect()
}

/// For each latent (empty where it is not sampled) the place of every node.
fn hypercube(of: usize, sampled: &[bool], seeds: &[u64]) -> Vec<Vec<f64>> {
    sampled
        .iter()
        .zip(seeds)
        .map(|(sampled, seed)| {
            if !sampled {
                return Vec::new();
            }
            let mut draw = Normals::new(seed.wrapping_add(of as u64));
            let mut order: Vec<usize> = (0..of).collect();
            for i in (1..of).rev() {
                let k = ((draw.unit() * (i + 1) as f64) as usize).min(i);
                order.swap(i, k);
            }
            let middles: Vec<f64> = order
                .iter()
                .map(|k| math::normal_quantile((*k as f64 + 0.5) / of as f64))
                .collect();
            // The middles of equal cells scatter a little less than what they stand for.
            let square = middles.iter().map(|m| m * m).sum::<f64>() / of as f64;
            let scale = (SAMPLED / square.max(1e-9)).sqrt();
            middles
                .iter()
                .map(|m| if of > 1 { m * scale } else { 0.0 })
                .collect()
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn places_hold_their_share_of_the_variance_and_the_rest_is_left() {
        let mut latents = Latents::default();
        latents.one(Param::ReliefSet, 0.1);
        latents.one(Param::Load, 10.0);
        let split = Split::new(&latents);
        let place = |at| Some(Place { at, of: 14 });
        let all: Vec<Vec<f64>> = (0..14).map(|i| split.scatter(place(i), &[])).collect();
        let mean = all.iter().map(|u| u[1]).sum::<f64>() / 14.0;
        let variance = all.iter().map(|u| u[1] * u[1]).sum::<f64>() / 14.0;
        assert!(mean.abs() < 1e-9, "{mean}");
        assert!((variance - SAMPLED).abs() < 1e-9, "{variance}");
        assert!((split.left(1, place(0)).powi(2) + variance - 1.0).abs() < 1e-9);
        // What crosses no kink is left to the closed form altogether.
        assert!(all.iter().all(|u| u[0] == 0.0));
        assert_eq!(split.left(0, place(0)), 1.0);
        // A node without a place is the closed form alone.
        assert_eq!(split.scatter(None, &[0.5, -1.0]), vec![0.5, -1.0]);
        assert_eq!(split.left(1, None), 1.0);
    }
}
