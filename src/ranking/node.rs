//! Integration nodes of a cause: builds, ways of showing and severities, each with its weight.

use super::belief::Belief;
use super::split::Place;
use super::suspect::Suspect;
use crate::circuit::{Param, Params};
use crate::faults::{Bend, Fault, SeverityShape};
use crate::machine::Build;
use crate::math;
use crate::readings::Path;

/// A second cause at work beside the first.
#[derive(Clone, Copy, Debug)]
pub struct Second {
    /// Which.
    pub fault: &'static Fault,
    /// Path it is on; left where there is one, or where the part is common.
    pub path: Path,
    /// It is on that side and not common.
    pub sided: bool,
    /// Index into its effects.
    pub effect: Option<usize>,
    /// Sign of those bends that can go either way.
    pub sign: f64,
    /// Place of its cell's middle in its severity distribution, 0 to 1.
    pub quantile: f64,
    /// Half the width of its cell.
    pub half: f64,
}

/// One node: a cause at one severity, shown in one way, on one build.
#[derive(Clone, Copy, Debug)]
pub struct Node {
    /// Index into the builds.
    pub build: usize,
    /// Path that the cause is on; left where there is one, or where the part is common.
    pub path: Path,
    /// Index into the fault's effects; none: no effect on the circuit.
    pub effect: Option<usize>,
    /// Sign of those bends that can go either way.
    pub sign: f64,
    /// Place of the cell's middle in the severity distribution, 0 to 1.
    pub quantile: f64,
    /// Half the width of the cell.
    pub half: f64,
    /// Second cause, where two are at work.
    pub second: Option<Second>,
    /// Its place in the sampled half of the scatter, of how many; none: all scatter is left to the closed form.
    pub place: Option<Place>,
    /// Log of the node's share of its cause.
    pub log_weight: f64,
}

impl Node {
    /// The three thirds of its severity cell.
    pub fn thirds(&self) -> [Node; 3] {
        [-2.0, 0.0, 2.0].map(|step| Node {
            quantile: self.quantile + step * self.half / 3.0,
            half: self.half / 3.0,
            log_weight: self.log_weight - math::ln(3.0),
            ..*self
        })
    }

    /// The same node with its two causes in the other order, and the cause that is then the first; none for a single cause.
    pub fn turned(&self, first: Suspect) -> Option<(Suspect, Node)> {
        let second = self.second?;
        let node = Node {
            path: second.path,
            effect: second.effect,
            sign: second.sign,
            quantile: second.quantile,
            half: second.half,
            second: Some(Second {
                fault: first.fault,
                path: self.path,
                sided: first.path.is_some(),
                effect: self.effect,
                sign: self.sign,
                quantile: self.quantile,
                half: self.half,
            }),
            ..*self
        };
        let other = Suspect {
            fault: second.fault,
            path: second.sided.then_some(second.path),
        };
        Some((other, node))
    }
}

/// Severity (0 to 1) at a quantile of its distribution.
pub fn severity(shape: SeverityShape, quantile: f64) -> f64 {
    let q = quantile.clamp(0.0, 1.0);
    match shape {
        SeverityShape::Even => q,
        SeverityShape::MostlyMild => q * q,
        SeverityShape::MostlyBad => q.sqrt(),
        SeverityShape::Total => 1.0,
    }
}

/// Size of a machine's seats over the reference of 75 and 15 cm³/rev that added leaks are written for.
fn size_of(theta: &Params, path: Path, p: Param) -> f64 {
    match p {
        Param::CheckLeakA | Param::CheckLeakB | Param::Bypass => {
            theta[Param::PumpDisp.on(path)] / 75.0
        }
        Param::ReliefHeld | Param::ConsumerLeak | Param::ServoLeak => {
            theta[Param::ChargeDisp as usize] / 15.0
        }
        _ => 1.0,
    }
}

/// Bends the parameters of a path in a condition; returns the place of each bent one and by how much its scatter is scaled.
pub fn bend(
    theta: &mut Params,
    path: Path,
    bends: &[(Param, Bend)],
    s: f64,
    sign: f64,
) -> Vec<(usize, f64)> {
    let geometric = |from: f64, to: f64| from * math::pow(to / from, s);
    let straight = |from: f64, to: f64| from + (to - from) * s;
    let mut factors = Vec::with_capacity(bends.len());
    for (p, b) in bends {
        let size = size_of(theta, path, *p);
        let place = p.on(path);
        let v = &mut theta[place];
        let factor = match *b {
            Bend::Times(from, to) => geometric(from, to),
            Bend::TimesLinear(from, to) => straight(from, to),
            Bend::Plus(from, to) => {
                *v += size * straight(from, to);
                1.0
            }
            Bend::PlusGeometric(from, to) => {
                *v += size * geometric(from, to);
                1.0
            }
            Bend::PlusEitherSign(from, to) => {
                *v += sign * straight(from, to);
                1.0
            }
        };
        *v *= factor;
        factors.push((place, factor));
    }
    factors
}

/// Share of the nodes that each side of a cause with two sides gets: steep cells are cut in three anyway.
const SIDED: f64 = 0.7;

/// The nodes of a cause, and the log of its prior mass over the builds (base rate × share of builds that can have it).
pub fn nodes(suspect: &Suspect, builds: &[Build], belief: &Belief) -> (Vec<Node>, f64) {
    let fault = suspect.fault;
    let masses: Vec<f64> = builds
        .iter()
        .map(|b| b.share * (fault.possible)(&b.unit).max(0.0))
        .collect();
    let total: f64 = masses.iter().sum();
    let rate = belief.rate(fault) * suspect.share();
    if total <= 0.0 || rate <= 0.0 {
        return (Vec::new(), f64::NEG_INFINITY);
    }
    let mut variants: Vec<(Option<usize>, f64)> = Vec::new();
    for (i, effect) in fault.effects.iter().enumerate() {
        let either = effect
            .bends
            .iter()
            .any(|(_, b)| matches!(b, Bend::PlusEitherSign(..)));
        variants.push((Some(i), 1.0));
        if either {
            variants.push((Some(i), -1.0));
        }
    }
    if variants.is_empty() {
        variants.push((None, 1.0));
    }
    // Each effect is equally likely; its signs share it.
    let effects = fault.effects.len().max(1) as f64;
    // A cause that is there twice has its nodes shared out between the sides.
    let fineness = belief.fineness as f64 * if suspect.path.is_some() { SIDED } else { 1.0 };
    let mut out = Vec::new();
    for (effect, sign) in &variants {
        let signs = variants.iter().filter(|(e, _)| e == effect).count() as f64;
        for (build, mass) in masses.iter().enumerate().filter(|(_, m)| **m > 0.0) {
            let share = mass / total / effects / signs;
            let plain = effect.is_none() || fault.severity == SeverityShape::Total;
            let n = ((fineness * share).round() as usize).clamp(3, belief.fineness.max(3));
            for i in 0..n {
                out.push(Node {
                    build,
                    path: suspect.path.unwrap_or_default(),
                    effect: *effect,
                    sign: *sign,
                    quantile: if plain {
                        0.5
                    } else {
                        (i as f64 + 0.5) / n as f64
                    },
                    half: if plain { 0.0 } else { 0.5 / n as f64 },
                    second: None,
                    place: Some(Place { at: i, of: n }),
                    log_weight: math::ln(share / n as f64),
                });
            }
        }
    }
    (out, math::ln(rate * total))
}
