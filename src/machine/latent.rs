//! Latents: what scatters a machine round what is believed of it.

use crate::circuit::{Param, Params, Scale, VALUES};
use crate::math;
use crate::readings::Path;

/// How one latent acts on one parameter.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Act {
    /// Condition it acts in; none: in all.
    pub condition: Option<usize>,
    /// Path that it acts on; left for what is common.
    pub path: Path,
    /// Parameter.
    pub param: Param,
    /// Change per standard deviation: of the logarithm for parameters that scale, of the value for the others.
    pub size: f64,
}

impl Act {
    /// Place of what it moves in [`Params`].
    #[inline(always)]
    pub fn place(&self) -> usize {
        self.param.on(self.path)
    }
}

/// One independent standard normal.
#[derive(Clone, Debug, PartialEq)]
pub struct Latent {
    /// What it is, in the mechanic's words.
    pub words: String,
    /// What it moves.
    pub acts: Vec<Act>,
    /// What one path of two has for itself.
    pub of_one_side: bool,
}

/// All latents of a unit and its conditions.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Latents(pub Vec<Latent>);

impl Latents {
    /// Adds a latent that moves one parameter in all conditions.
    pub fn one(&mut self, param: Param, size: f64) {
        self.many(param.words(), &[(param, size)]);
    }

    /// Adds a latent that moves several parameters in all conditions.
    pub fn many(&mut self, words: &str, moves: &[(Param, f64)]) {
        let acts = moves
            .iter()
            .map(|(param, size)| Act {
                condition: None,
                path: Path::Left,
                param: *param,
                size: *size,
            })
            .collect();
        self.0.push(Latent {
            words: words.to_string(),
            acts,
            of_one_side: false,
        });
    }

    /// Adds a latent that moves one parameter of both paths alike.
    pub fn on_both(&mut self, param: Param, size: f64) {
        let acts = Path::BOTH.map(|path| Act {
            condition: None,
            path,
            param,
            size,
        });
        self.0.push(Latent {
            words: param.words().to_string(),
            acts: acts.to_vec(),
            of_one_side: false,
        });
    }

    /// Adds a latent that acts in named conditions only.
    pub fn in_conditions(&mut self, words: &str, acts: Vec<Act>) {
        if !acts.is_empty() {
            self.0.push(Latent {
                words: words.to_string(),
                acts,
                of_one_side: false,
            });
        }
    }
}

/// Parameters of a condition moved by latent values `u` (one per latent; shorter means zero).
pub fn scattered(base: &Params, latents: &Latents, condition: usize, u: &[f64]) -> Params {
    let mut logs = [0.0; VALUES];
    let mut theta = *base;
    let mut touched = [false; VALUES];
    for (latent, value) in latents.0.iter().zip(u) {
        if *value == 0.0 {
            continue;
        }
        for act in &latent.acts {
            if act.condition.is_none_or(|c| c == condition) {
                let i = act.place();
                match act.param.scale() {
                    Scale::Log => {
                        logs[i] += act.size * value;
                        touched[i] = true;
                    }
                    Scale::Linear => theta[i] += act.size * value,
                }
            }
        }
    }
    for i in 0..VALUES {
        if touched[i] {
            theta[i] *= math::exp(logs[i]);
        }
    }
    theta
}
