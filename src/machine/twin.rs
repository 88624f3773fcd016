//! Scatter of a machine with two paths: what both share, and what each has for itself.
//!
//! Left and right are the same parts of the same age on the same oil, so most of what is not known of one is not known of the
//! other in the same way: it drops out where like is compared with like. What is left is small, and stated here.

use super::builds::arrangement;
use super::latent::{Act, Latent, Latents};
use crate::circuit::{Arrangement, Belongs, Param};
use crate::readings::{Condition, Path};
use crate::unit::Paths;

/// What two like parts of one machine differ by, 1 sigma on the parameter's own scale, where it is all the scatter there is
/// (`size`). Common practice, from memory: like pumps differ by half a per cent in size, healthy ones by a sixth in leakage.
fn own(param: Param, size: f64) -> f64 {
    let most = match param {
        // Set at each pump for itself.
        Param::NullControl
        | Param::NullServo
        | Param::GainForward
        | Param::GainReverse
        | Param::LoopReliefA
        | Param::LoopReliefB
        | Param::LimiterA
        | Param::LimiterB => f64::INFINITY,
        Param::PumpDisp | Param::MotorDisp | Param::GearRatio => 0.005,
        Param::Rolling => 0.006,
        Param::Lever => 0.008,
        Param::PumpLeak | Param::PumpAcross | Param::MotorLeak | Param::MotorAcross => 0.16,
        Param::Friction | Param::Drag => 0.15,
        Param::OperatingSet | Param::ServoStart | Param::ServoFull => 0.04,
        // The ground is not the same under both.
        Param::Load | Param::Push => 0.3 * size.abs(),
        _ => 0.08,
    };
    most.min(size.abs())
}

/// Scatter of one path spread over the paths of a machine. Conditions in which a path is not stroked leave its load alone.
pub fn on_paths(latents: Latents, paths: Paths, conditions: &[Condition]) -> Latents {
    let arrangement = arrangement(paths);
    if arrangement == Arrangement::Single {
        return latents;
    }
    let common = |p: Param| match p.belongs() {
        Belongs::Machine => true,
        Belongs::Charge => arrangement == Arrangement::Tandem,
        Belongs::Path => false,
    };
    let mut out = Latents::default();
    for latent in latents.0 {
        let Some(first) = latent.acts.iter().find(|a| !common(a.param)).copied() else {
            out.0.push(latent);
            continue;
        };
        let alone = own(first.param, first.size) / first.size.abs().max(1e-300);
        let shared = (1.0 - alone * alone).max(0.0).sqrt();
        let acts = |path: Path, scale: f64| -> Vec<Act> {
            latent
                .acts
                .iter()
                .filter(|a| !common(a.param) && acts_on(a, path, conditions))
                .map(|a| Act {
                    path,
                    size: a.size * scale,
                    ..*a
                })
                .collect()
        };
        // What the latent moves in common parts it moves as before, together with what the paths share of it.
        let mut both: Vec<Act> = latent
            .acts
            .iter()
            .filter(|a| common(a.param))
            .copied()
            .collect();
        if shared > 1e-6 {
            both.extend(Path::BOTH.into_iter().flat_map(|p| acts(p, shared)));
        }
        if !both.is_empty() {
            out.0.push(Latent {
                words: latent.words.clone(),
                acts: both,
                of_one_side: false,
            });
        }
        for path in Path::BOTH {
            let acts = acts(path, alone);
            if !acts.is_empty() {
                out.0.push(Latent {
                    words: format!("{}, {}", latent.words, path.words()),
                    acts,
                    of_one_side: true,
                });
            }
        }
    }
    out
}

fn acts_on(act: &Act, path: Path, conditions: &[Condition]) -> bool {
    let of_the_work = matches!(act.param, Param::Lever | Param::Load | Param::Push);
    !of_the_work
        || act
            .condition
            .and_then(|c| conditions.get(c))
            .is_none_or(|c| c.stroked.has(path))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn latents() -> Latents {
        let mut l = Latents::default();
        l.one(Param::PumpLeak, 0.35);
        l.one(Param::Viscosity, 0.1);
        l.one(Param::NullServo, 0.001);
        l.many(
            "pump displacement",
            &[(Param::PumpDisp, 0.2), (Param::ReliefGain, 0.2)],
        );
        l
    }

    fn variance(l: &Latents, place: usize) -> f64 {
        l.0.iter()
            .flat_map(|l| &l.acts)
            .filter(|a| a.place() == place)
            .map(|a| a.size * a.size)
            .sum()
    }

    fn together(l: &Latents, a: usize, b: usize) -> f64 {
        let of = |latent: &Latent, place| -> f64 {
            latent
                .acts
                .iter()
                .filter(|a| a.place() == place)
                .map(|a| a.size)
                .sum()
        };
        l.0.iter().map(|l| of(l, a) * of(l, b)).sum()
    }

    #[test]
    fn each_path_scatters_as_one_would_and_mostly_with_the_other() {
        for paths in [Paths::TwoSharedCharge, Paths::TwoOwnCharge] {
            let l = on_paths(latents(), paths, &[]);
            for (p, size) in [
                (Param::PumpLeak, 0.35),
                (Param::NullServo, 0.001),
                (Param::PumpDisp, 0.2),
            ] {
                for path in Path::BOTH {
                    let v = variance(&l, p.on(path));
                    assert!((v - size * size).abs() < 1e-12, "{p:?} {v}");
                }
            }
            let correlation = |p: Param, size: f64| {
                together(&l, p.on(Path::Left), p.on(Path::Right)) / (size * size)
            };
            assert!(correlation(Param::PumpDisp, 0.2) > 0.999);
            assert!((0.7..0.9).contains(&correlation(Param::PumpLeak, 0.35)));
            assert_eq!(correlation(Param::NullServo, 0.001), 0.0);
            // One oil.
            assert_eq!(variance(&l, Param::Viscosity.on(Path::Right)), 0.0);
        }
    }

    #[test]
    fn the_charge_side_is_common_where_one_pump_feeds_both() {
        let right = |paths| {
            let l = on_paths(latents(), paths, &[]);
            variance(&l, Param::ReliefGain.on(Path::Right))
        };
        assert_eq!(right(Paths::TwoSharedCharge), 0.0);
        assert!(right(Paths::TwoOwnCharge) > 0.03);
    }

    #[test]
    fn one_path_is_left_as_it_is() {
        assert_eq!(on_paths(latents(), Paths::One, &[]), latents());
    }
}
