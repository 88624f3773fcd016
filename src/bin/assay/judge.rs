//! The rankers under test: the product's own, and the best possible one, which knows the laws and the scatter of the world.

use crate::world::{Case, Sloppiness, TILTED, TURBULENT, wider};
use lowside::assessment::At;
use lowside::circuit::Param;
use lowside::faults::{self, Fault, FaultId};
use lowside::machine::{builds, condition_latents, unit_latents};
use lowside::math;
use lowside::ranking::{Belief, Bench, gather_with, weigh};
use lowside::readings::Path;
use std::collections::BTreeMap;
use std::iter::once;

/// Faults that readings of pressure, flow and speed can tell at all.
pub fn listed() -> Vec<&'static Fault> {
    faults::all()
        .iter()
        .filter(|f| {
            !f.effects.is_empty()
                && !matches!(
                    f.id,
                    FaultId::AssemblyError
                        | FaultId::StrokeStuck
                        | FaultId::CoolerDirty
                        | FaultId::CoolerBypassing
                        | FaultId::EngineLugging
                        | FaultId::TyreOrTrackMismatch
                )
        })
        .collect()
}

/// Which ranker.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ranker {
    /// The product's, with its own assumptions.
    Own,
    /// Knows the world's laws, scatter and sloppiness, and integrates more finely.
    Best,
}

/// Suspects (one cause, or two) with their probabilities, most probable first.
pub type Ranked = Vec<(Vec<At>, f64)>;

/// A ranker with base rates such that each listed fault is met equally often.
pub struct Judge {
    ranker: Ranker,
    rates: BTreeMap<FaultId, f64>,
    sloppy: Sloppiness,
    pairs: f64,
}

impl Judge {
    /// A judge for cases drawn with this sloppiness; `possible`: share of drawn units that can have each fault.
    pub fn new(
        ranker: Ranker,
        possible: &BTreeMap<FaultId, f64>,
        sloppy: Sloppiness,
        pairs: f64,
    ) -> Judge {
        let rates = faults::all()
            .iter()
            .map(|f| {
                let rate = possible.get(&f.id).map_or(0.0, |p| 1.0 / p.max(1e-3));
                (f.id, rate)
            })
            .collect();
        Judge {
            ranker,
            rates,
            sloppy,
            pairs,
        }
    }

    /// What it takes for granted.
    pub fn belief(&self) -> Belief {
        let own = Belief {
            rates: self.rates.clone(),
            pairs: self.pairs,
            ..Belief::default()
        };
        match self.ranker {
            Ranker::Own => own,
            Ranker::Best => Belief {
                wider: wider(),
                // It knows the laws; this much is left to the integral's own error.
                discrepancy: 0.67,
                wrong: self.sloppy.wrong.max(1e-6),
                swapped: self.sloppy.swapped,
                fineness: 20,
                rounds: 3,
                pairs_solved: 800,
                pairs_better: f64::NEG_INFINITY,
                ..own
            },
        }
    }

    /// Ranks a case.
    pub fn rank(&self, case: &Case) -> Ranked {
        let unit = &case.machine.unit;
        let data = gather_with(unit, &case.visit.readings, &[], &[], self.belief());
        let mut latents = unit_latents(unit);
        condition_latents(unit, &data.conditions, &mut latents);
        if self.ranker == Ranker::Best {
            // Right and left are alike in them.
            for (p, sd) in TILTED {
                latents.on_both(p, sd / wider());
            }
        }
        let size = builds(unit).first().map_or(1.0, |b| {
            lowside::machine::base(b)[Param::PumpDisp as usize] / 75.0
        });
        if self.ranker == Ranker::Best {
            for (p, least, most) in TURBULENT {
                latents.on_both(p, size * (most - least) / 12f64.sqrt() / wider());
            }
        }
        let mut bench = Bench::new(builds(unit), latents, &data);
        if self.ranker == Ranker::Best {
            bench.adjust(|theta| {
                for (p, least, most) in TURBULENT {
                    for path in Path::BOTH {
                        theta[p.on(path)] += 0.5 * (least + most) * size;
                    }
                }
            });
        }
        let causes = weigh(&bench, &data, unit.sides).causes;
        let logs: Vec<f64> = causes
            .iter()
            .map(|c| c.log_prior + c.log_likelihood)
            .collect();
        let total = math::ln_sum_exp(&logs);
        let mut out: Ranked = causes
            .iter()
            .zip(&logs)
            .filter(|(_, l)| l.is_finite())
            .map(|(c, l)| (once(c.at()).chain(c.with).collect(), math::exp(l - total)))
            .collect();
        out.sort_by(|a, b| b.1.total_cmp(&a.1).then(a.0.cmp(&b.0)));
        out
    }
}
