//! The loss fit: Wilson's and Schlösser's terms by weighted least squares, with covariance.
//!
//! With the pressure difference Δp (bar), the speed n (rpm), the viscosity ν = μ / 27.5 mPa·s and the displacement V (cm³/rev):
//!
//! * flow at the high port of a pump: V n − a Δp/ν − b √Δp − c V₀ n Δp; of a motor with the losses added
//! * torque of a pump: V Δp / 2π + d ν n + e Δp + f; of a motor with the losses taken off
//! * case flow: g (p_high + p_low − 2 p_case) / ν
//!
//! a is laminar slip, b turbulent slip, c the oil pressed together (McCandlish & Dorey's 1/B (Vr + 1) for a machine at full
//! stroke), d viscous drag, e dry friction in proportion to pressure, f friction that is always there. c enters with a stated
//! width, because a table over few speeds does not tell it from slip.
//!
//! Estimates are weighted by what comes by chance; what an instrument is off by is added to the covariance by fitting again with
//! each instrument moved. Chance beyond what was stated widens the covariance (Birge ratio).

use super::analysis::{Quantity, Setup, flow_chance, theoretical_torque};
use super::channel::{Channel, Gauged, Subject};
use super::flaw::Part;
use super::layout::LayoutGap;
use super::least_squares::{Estimate, Observation, solve};
use super::point::Point;
use super::uncertain::{chance, moved};
use thiserror::Error;

/// Viscosity of reference, mPa·s: 32 mm²/s at 860 kg/m³.
pub const REFERENCE: f64 = 27.5;
/// Share of the flow per bar that compression takes, 1/bar: (Vr + 1) / B with Vr = 0.54 and B = 16,000 bar, and its relative
/// width. From the same source as [`crate::bench::efficiency::loss::LossModel::AXIAL_PISTON`]; the width is ours.
pub const COMPRESSION: (f64, f64) = (1.54 / 16_000.0, 0.5);
/// Times its standard uncertainty that a turbulent share must show to be believed.
const SUPPORT: f64 = 2.0;
/// Fewest degrees of freedom with which a turbulent share is looked for.
const SPARE: usize = 3;
const LITRE: f64 = 1e-3;

/// A loss.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Loss {
    /// Displacement, cm³/rev: no loss, but found with them.
    Displacement,
    /// Laminar slip at reference viscosity, L/min per bar.
    Laminar,
    /// Turbulent slip, L/min per √bar.
    Turbulent,
    /// Oil pressed together, share of the flow per bar.
    Compression,
    /// Viscous drag at reference viscosity, N·m per 1000 rpm.
    Viscous,
    /// Dry friction, N·m per bar.
    Dry,
    /// Constant friction, N·m.
    Constant,
    /// Leakage out of the case at reference viscosity, L/min per bar of each side.
    Case,
}

impl Loss {
    /// Unit, for words.
    #[must_use]
    pub const fn unit(self) -> &'static str {
        match self {
            Loss::Displacement => "cm³/rev",
            Loss::Laminar | Loss::Case => "L/min per bar",
            Loss::Turbulent => "L/min per √bar",
            Loss::Compression => "1/bar",
            Loss::Viscous => "N·m per 1000 rpm",
            Loss::Dry => "N·m per bar",
            Loss::Constant => "N·m",
        }
    }

    /// Words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Loss::Displacement => "Displacement",
            Loss::Laminar => "Laminar slip",
            Loss::Turbulent => "Turbulent slip",
            Loss::Compression => "Oil pressed together",
            Loss::Viscous => "Viscous drag",
            Loss::Dry => "Friction that grows with pressure",
            Loss::Constant => "Constant friction",
            Loss::Case => "Leakage into the case",
        }
    }
}

/// Why there is no fit.
#[derive(Clone, Debug, PartialEq, Eq, Error)]
pub enum NoFit {
    /// The layout is not stated.
    #[error("{}", .0.iter().map(ToString::to_string).collect::<Vec<_>>().join("; "))]
    Layout(Vec<LayoutGap>),
    /// No oil.
    #[error("give the oil's viscosity at 40 °C: losses are told at one viscosity")]
    Oil,
    /// No temperature beside the readings.
    #[error("give the oil temperature at each point")]
    Temperature,
    /// Too few points that carry it.
    #[error("{have} usable points; the fit needs {need}")]
    Points {
        /// There are.
        have: usize,
        /// It takes.
        need: usize,
    },
    /// The points lie so that the losses cannot be told apart.
    #[error(
        "the points do not tell the losses apart: run more than one speed and more than one pressure"
    )]
    Alike,
    /// A whole drive has no losses of its own.
    #[error("losses are told of a pump or a motor, not of a whole drive")]
    WholeDrive,
}

/// What the data say of turbulent slip.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum TurbulentShare {
    /// In the model.
    Told,
    /// Looked for and not more than its doubt: coefficient and standard uncertainty.
    NotTold(f64, f64),
    /// Too few points to look.
    TooFew,
}

/// A fit of some losses to one measured figure.
#[derive(Clone, Debug, PartialEq)]
pub struct Fit {
    /// The losses, in the order of the estimate.
    pub losses: Vec<Loss>,
    /// Values.
    pub x: Vec<f64>,
    /// Covariance with what instruments are off by, row-major.
    pub covariance: Vec<f64>,
    /// By chance alone, as least squares gives it: what a general-purpose fit would state.
    pub by_chance: Estimate,
    /// Which points carried it, what was measured there and what the fit says.
    pub points: Vec<(usize, f64, f64)>,
    /// Standard uncertainty by chance of each measured figure.
    pub sigma: Vec<f64>,
}

impl Fit {
    /// A loss with its standard uncertainty.
    #[must_use]
    pub fn get(&self, loss: Loss) -> Option<(f64, f64)> {
        let at = self.losses.iter().position(|l| *l == loss)?;
        let n = self.losses.len();
        Some((self.x[at], self.covariance[at * n + at].max(0.0).sqrt()))
    }

    /// What a row foretells, with its standard uncertainty.
    #[must_use]
    pub fn foretold(&self, row: &[f64]) -> (f64, f64) {
        let n = self.x.len();
        let value = row.iter().zip(&self.x).map(|(a, x)| a * x).sum();
        let mut square = 0.0;
        for i in 0..n {
            for j in 0..n {
                square += row[i] * row[j] * self.covariance[i * n + j];
            }
        }
        (value, square.max(0.0).sqrt())
    }

    /// Correlation of two losses.
    #[must_use]
    pub fn correlation(&self, one: Loss, other: Loss) -> Option<f64> {
        let n = self.losses.len();
        let i = self.losses.iter().position(|l| *l == one)?;
        let j = self.losses.iter().position(|l| *l == other)?;
        let below = (self.covariance[i * n + i] * self.covariance[j * n + j]).sqrt();
        (below > 0.0).then(|| self.covariance[i * n + j] / below)
    }
}

/// All fits of a run.
#[derive(Clone, Debug, PartialEq)]
pub struct LossFit {
    /// Pump or motor.
    pub subject: Subject,
    /// Flow at the high port.
    pub flow: Result<Fit, NoFit>,
    /// What is said of turbulent slip.
    pub turbulent: TurbulentShare,
    /// Torque.
    pub torque: Result<Fit, NoFit>,
    /// Case flow.
    pub case: Result<Fit, NoFit>,
    /// Ranges that the points cover: speed, pressure difference, viscosity.
    pub covered: Covered,
}

/// What the points cover.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Covered {
    /// Speed, rpm.
    pub speed: (f64, f64),
    /// Pressure difference, bar.
    pub difference: (f64, f64),
    /// Viscosity, mPa·s.
    pub viscosity: (f64, f64),
}

impl Covered {
    /// True where a state lies within what was run, with a hair of slack.
    #[must_use]
    pub fn holds(&self, speed: f64, difference: f64, viscosity: f64) -> bool {
        let within = |x: f64, (low, high): (f64, f64)| x >= low * 0.97 && x <= high * 1.03;
        within(speed, self.speed)
            && within(difference, self.difference)
            && within(viscosity, self.viscosity)
    }
}

fn sign(subject: Subject) -> f64 {
    if subject == Subject::Motor { 1.0 } else { -1.0 }
}

/// Row of the flow fit in a state.
#[must_use]
pub fn flow_row(subject: Subject, losses: &[Loss], v0: f64, n: f64, dp: f64, mu: f64) -> Vec<f64> {
    let s = sign(subject);
    losses
        .iter()
        .map(|loss| match loss {
            Loss::Displacement => n * LITRE,
            Loss::Laminar => s * dp * REFERENCE / mu,
            Loss::Turbulent => s * dp.abs().sqrt() * dp.signum(),
            Loss::Compression => s * v0 * n * LITRE * dp,
            _ => 0.0,
        })
        .collect()
}

/// Row of the torque fit in a state.
#[must_use]
pub fn torque_row(subject: Subject, losses: &[Loss], n: f64, dp: f64, mu: f64) -> Vec<f64> {
    let s = -sign(subject);
    losses
        .iter()
        .map(|loss| match loss {
            Loss::Viscous => s * mu / REFERENCE * n * LITRE,
            Loss::Dry => s * dp,
            Loss::Constant => s,
            _ => 0.0,
        })
        .collect()
}

struct Seen {
    at: usize,
    n: f64,
    dp: f64,
    mu: f64,
}

/// States of the points that carry one and count for this part.
fn states(points: &[Point], setup: &Setup, part: Part) -> Result<Vec<Seen>, NoFit> {
    let oil = setup.oil.as_ref().ok_or(NoFit::Oil)?;
    let has_temperature = points.iter().any(|p| p.means.leak_temperature().is_some());
    if !has_temperature {
        return Err(NoFit::Temperature);
    }
    Ok(points
        .iter()
        .enumerate()
        .filter(|(_, point)| point.counts_for(&[part]))
        .filter_map(|(at, point)| {
            let n = point.means.get(Channel::Speed).filter(|n| *n > 0.0)?;
            let dp = point.means.difference()?;
            let mu = oil.dynamic_at(point.means.leak_temperature()?) * setup.viscosity_factor;
            (mu.is_finite() && mu > 0.0).then_some(Seen { at, n, dp, mu })
        })
        .collect())
}

/// What is measured, and what it is made of, for one of the three fits.
struct Task {
    observations: Vec<Observation>,
    at: Vec<usize>,
}

fn flow_task(
    points: &[Point],
    setup: &Setup,
    losses: &[Loss],
    v0: f64,
    gauged: &impl Fn(Channel) -> Gauged,
) -> Result<Task, NoFit> {
    let mut observations = Vec::new();
    let mut at = Vec::new();
    for s in states(points, setup, Part::Flow)? {
        let point = &points[s.at];
        let Ok(flow) = setup.layout.high_flow(setup.subject, &point.means) else {
            continue;
        };
        let speed = chance(point, Channel::Speed, gauged(Channel::Speed));
        let by_speed = v0 * LITRE * speed;
        let by_flow = flow_chance(point).unwrap_or(0.0);
        observations.push(Observation {
            row: flow_row(setup.subject, losses, v0, s.n, s.dp, s.mu),
            seen: flow,
            sigma: (by_flow * by_flow + by_speed * by_speed).sqrt(),
        });
        at.push(s.at);
    }
    let have = observations.len();
    let need = losses.len() + 1;
    if have < need {
        return Err(NoFit::Points { have, need });
    }
    if let Some(c) = losses.iter().position(|l| *l == Loss::Compression) {
        let mut row = vec![0.0; losses.len()];
        row[c] = 1.0;
        observations.push(Observation {
            row,
            seen: COMPRESSION.0,
            sigma: COMPRESSION.0 * COMPRESSION.1,
        });
    }
    Ok(Task { observations, at })
}

fn torque_task(
    points: &[Point],
    setup: &Setup,
    volume: f64,
    gauged: &impl Fn(Channel) -> Gauged,
) -> Result<Task, NoFit> {
    const LOSSES: &[Loss] = &[Loss::Viscous, Loss::Dry, Loss::Constant];
    let mut observations = Vec::new();
    let mut at = Vec::new();
    for s in states(points, setup, Part::Torque)? {
        let point = &points[s.at];
        let torque = setup
            .layout
            .torque(setup.subject, &point.means, setup.charge_displacement);
        let Ok(torque) = torque else { continue };
        let pressure = chance(point, Channel::High, gauged(Channel::High));
        let by_pressure = theoretical_torque(volume, pressure);
        let by_torque = chance(point, Channel::Torque, gauged(Channel::Torque))
            .max(1e-3 * torque.abs().max(1.0));
        observations.push(Observation {
            row: torque_row(setup.subject, LOSSES, s.n, s.dp, s.mu),
            seen: torque - theoretical_torque(volume, s.dp),
            sigma: (by_torque * by_torque + by_pressure * by_pressure).sqrt(),
        });
        at.push(s.at);
    }
    let (have, need) = (observations.len(), LOSSES.len() + 1);
    if have < need {
        return Err(NoFit::Points { have, need });
    }
    Ok(Task { observations, at })
}

fn case_task(points: &[Point], setup: &Setup, gauge: Gauged) -> Result<Task, NoFit> {
    let mut observations = Vec::new();
    let mut at = Vec::new();
    for s in states(points, setup, Part::Case)? {
        let point = &points[s.at];
        let Ok(case) = setup.layout.case_leakage(setup.subject, &point.means) else {
            continue;
        };
        let low = point.means.get(Channel::Low).unwrap_or(0.0);
        let case_pressure = point.means.get(Channel::CasePressure).unwrap_or(0.0);
        let sides = s.dp + 2.0 * (low - case_pressure);
        observations.push(Observation {
            row: vec![sides * REFERENCE / s.mu],
            seen: case,
            sigma: chance(point, Channel::Case, gauge).max(0.01 * case.abs().max(0.1)),
        });
        at.push(s.at);
    }
    let (have, need) = (observations.len(), 2);
    if have < need {
        return Err(NoFit::Points { have, need });
    }
    Ok(Task { observations, at })
}

/// Fits a task and the same task with each common cause moved.
fn fitted(
    losses: &[Loss],
    task: &Task,
    others: impl Iterator<Item = Result<Task, NoFit>>,
) -> Result<Fit, NoFit> {
    let estimate = solve(&task.observations).ok_or(NoFit::Alike)?;
    let widened = estimate.birge() * estimate.birge();
    let mut covariance: Vec<f64> = estimate.covariance.iter().map(|c| c * widened).collect();
    let n = losses.len();
    for other in others {
        let Some(other) = other.ok().and_then(|task| solve(&task.observations)) else {
            continue;
        };
        let step: Vec<f64> = other
            .x
            .iter()
            .zip(&estimate.x)
            .map(|(a, b)| a - b)
            .collect();
        for i in 0..n {
            for j in 0..n {
                covariance[i * n + j] += step[i] * step[j];
            }
        }
    }
    let points = task
        .at
        .iter()
        .zip(&task.observations)
        .map(|(at, o)| (*at, o.seen, estimate.foretold(&o.row)))
        .collect();
    Ok(Fit {
        losses: losses.to_vec(),
        x: estimate.x.clone(),
        covariance,
        points,
        sigma: task
            .observations
            .iter()
            .map(|o| o.sigma)
            .take(task.at.len())
            .collect(),
        by_chance: estimate,
    })
}

/// The loss fit of a run. `displacement` is what compression is reckoned from and what stands in where no flow carries a
/// displacement of its own, cm³/rev.
#[must_use]
pub fn losses(
    points: &[Point],
    setup: &Setup,
    displacement: Option<f64>,
    gauged: impl Fn(Channel) -> Gauged,
    viscosity: f64,
) -> LossFit {
    let refuse = |why: NoFit| LossFit {
        subject: setup.subject,
        flow: Err(why.clone()),
        turbulent: TurbulentShare::TooFew,
        torque: Err(why.clone()),
        case: Err(why),
        covered: Covered::default(),
    };
    if setup.subject == Subject::Transmission {
        return refuse(NoFit::WholeDrive);
    }
    let open = setup.layout.open(setup.subject);
    if !open.is_empty() {
        return refuse(NoFit::Layout(open));
    }
    let of_part = |part| states(points, setup, part);
    let (seen, others_seen) = match (
        of_part(Part::Flow),
        of_part(Part::Case),
        of_part(Part::Torque),
    ) {
        (Ok(flow), Ok(case), Ok(torque)) => (flow, [case, torque]),
        (Err(why), ..) | (_, Err(why), _) | (.., Err(why)) => return refuse(why),
    };
    let others = moved(points, setup, &gauged, viscosity);
    let v0 = displacement.or(setup.plate).unwrap_or(0.0);

    let plain = [Loss::Displacement, Loss::Laminar, Loss::Compression];
    let with = [
        Loss::Displacement,
        Loss::Laminar,
        Loss::Compression,
        Loss::Turbulent,
    ];
    let flow_of = |losses: &[Loss]| {
        let task = flow_task(points, setup, losses, v0, &gauged)?;
        let moved = others
            .iter()
            .map(|(_, points, setup)| flow_task(points, setup, losses, v0, &gauged));
        fitted(losses, &task, moved)
    };
    let mut flow = flow_of(&plain);
    let mut turbulent = TurbulentShare::TooFew;
    if seen.len() >= with.len() + SPARE
        && let Ok(fit) = flow_of(&with)
        && let Some((b, u)) = fit.get(Loss::Turbulent)
    {
        let laminar = fit.get(Loss::Laminar).map_or(0.0, |(a, _)| a);
        if b > SUPPORT * u && laminar > 0.0 {
            turbulent = TurbulentShare::Told;
            flow = Ok(fit);
        } else {
            turbulent = TurbulentShare::NotTold(b, u);
        }
    }

    // The displacement of the torque fit moves with the flow meter, so it is found anew for each common cause.
    let volume_of = |points: &[Point], setup: &Setup| {
        let losses = flow.as_ref().map_or(&plain[..], |fit| &fit.losses[..]);
        let own = flow_task(points, setup, losses, v0, &gauged).ok();
        let own = own
            .and_then(|task| solve(&task.observations))
            .map(|e| e.x[0]);
        own.filter(|_| flow.is_ok()).or(setup.plate)
    };
    let torque_of = |points: &[Point], setup: &Setup| match volume_of(points, setup) {
        Some(volume) => torque_task(points, setup, volume, &gauged),
        None => Err(NoFit::Alike),
    };
    let torque_losses = [Loss::Viscous, Loss::Dry, Loss::Constant];
    let mut torque = torque_of(points, setup).and_then(|task| {
        let moved = others
            .iter()
            .map(|(_, points, setup)| torque_of(points, setup));
        fitted(&torque_losses, &task, moved)
    });
    // By chance the displacement is not the truth either, and dry friction takes all of that.
    if let (Ok(torque), Ok(flow)) = (&mut torque, &flow) {
        let by_volume =
            theoretical_torque(flow.by_chance.standard(0) * flow.by_chance.birge(), 1.0);
        torque.covariance[4] += by_volume * by_volume;
    }
    let case_of = |points: &[Point], setup: &Setup| case_task(points, setup, gauged(Channel::Case));
    let case = case_of(points, setup).and_then(|task| {
        let moved = others
            .iter()
            .map(|(_, points, setup)| case_of(points, setup));
        fitted(&[Loss::Case], &task, moved)
    });
    // Where no flow counts, the other fits still cover something.
    let seen = std::iter::once(seen)
        .chain(others_seen)
        .find(|seen| !seen.is_empty())
        .unwrap_or_default();
    let range = |of: fn(&Seen) -> f64| {
        let low = seen.iter().map(of).fold(f64::MAX, f64::min);
        (low, seen.iter().map(of).fold(f64::MIN, f64::max))
    };
    let covered = if seen.is_empty() {
        Covered::default()
    } else {
        Covered {
            speed: range(|s| s.n),
            difference: range(|s| s.dp),
            viscosity: range(|s| s.mu),
        }
    };
    LossFit {
        subject: setup.subject,
        flow,
        turbulent,
        torque,
        case,
        covered,
    }
}

impl LossFit {
    /// An efficiency in a state: speed (rpm), pressure difference (bar), viscosity (mPa·s).
    ///
    /// # Errors
    /// Why there is none, in words.
    pub fn efficiency(
        &self,
        quantity: Quantity,
        n: f64,
        dp: f64,
        mu: f64,
    ) -> Result<(f64, f64), String> {
        let told = self.foretell(n, dp, mu);
        let found = match quantity {
            Quantity::Volumetric => told.volumetric,
            Quantity::HydroMechanical => told.hydro_mechanical,
            _ => told.overall(),
        };
        found.ok_or_else(|| {
            let flow = self.flow.as_ref().err();
            let why = flow.or(self.torque.as_ref().err());
            why.map_or_else(|| NoFit::Alike.to_string(), ToString::to_string)
        })
    }

    /// Flow at the high port in a state, L/min, with its standard uncertainty.
    ///
    /// # Errors
    /// Why there is none, in words.
    pub fn high_flow(&self, n: f64, dp: f64, mu: f64) -> Result<(f64, f64), String> {
        let fit = self.flow.as_ref().map_err(ToString::to_string)?;
        let volume = fit.x[0];
        Ok(fit.foretold(&flow_row(self.subject, &fit.losses, volume, n, dp, mu)))
    }

    /// Leakage out of the case in a state, L/min, with its standard uncertainty; `over_case` is the low line over the case, bar.
    ///
    /// # Errors
    /// Why there is none, in words.
    pub fn case_leakage(&self, dp: f64, over_case: f64, mu: f64) -> Result<(f64, f64), String> {
        let fit = self.case.as_ref().map_err(ToString::to_string)?;
        Ok(fit.foretold(&[(dp + 2.0 * over_case) * REFERENCE / mu]))
    }
}

impl Foretold {
    /// Overall efficiency, the product of the other two, with its standard uncertainty.
    #[must_use]
    pub fn overall(&self) -> Option<(f64, f64)> {
        let ((v, uv), (h, uh)) = (self.volumetric?, self.hydro_mechanical?);
        Some((v * h, (h * h * uv * uv + v * v * uh * uh).sqrt()))
    }
}

/// What the fit foretells of one state: volumetric and hydro-mechanical efficiency, each with its standard uncertainty.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Foretold {
    /// Volumetric efficiency.
    pub volumetric: Option<(f64, f64)>,
    /// Hydro-mechanical efficiency.
    pub hydro_mechanical: Option<(f64, f64)>,
    /// Flow lost, L/min.
    pub flow_lost: Option<(f64, f64)>,
    /// True where the state lies beyond what was run.
    pub is_beyond: bool,
}

impl LossFit {
    /// Efficiencies in a state: speed (rpm), pressure difference (bar), viscosity (mPa·s).
    #[must_use]
    pub fn foretell(&self, n: f64, dp: f64, mu: f64) -> Foretold {
        let is_motor = self.subject == Subject::Motor;
        let flow = self.flow.as_ref().ok();
        let volume = flow.map(|fit| fit.x[0]);
        let lost = flow.map(|fit| {
            let row = flow_row(self.subject, &fit.losses, fit.x[0], n, dp, mu);
            let (seen, _) = fit.foretold(&row);
            // The displacement's own doubt falls out of what is lost against it.
            let mut without = row;
            without[0] = 0.0;
            let (_, u) = fit.foretold(&without);
            ((seen - fit.x[0] * n * LITRE) * sign(self.subject), u)
        });
        let volumetric = volume.zip(lost).and_then(|(volume, (lost, u))| {
            let theory = volume * n * LITRE;
            if theory <= 0.0 {
                return None;
            }
            Some(if is_motor {
                let share = theory / (theory + lost);
                (share, share * share * u / theory)
            } else {
                (1.0 - lost / theory, u / theory)
            })
        });
        let hydro_mechanical = self
            .torque
            .as_ref()
            .ok()
            .zip(volume)
            .and_then(|(fit, volume)| {
                let theory = theoretical_torque(volume, dp);
                let (lost, u) = fit.foretold(&torque_row(self.subject, &fit.losses, n, dp, mu));
                if theory <= 0.0 {
                    return None;
                }
                if is_motor {
                    Some((1.0 + lost / theory, u / theory))
                } else {
                    let share = theory / (theory + lost);
                    Some((share, share * share * u / theory))
                }
            });
        Foretold {
            volumetric,
            hydro_mechanical,
            flow_lost: lost,
            is_beyond: !self.covered.holds(n, dp, mu),
        }
    }
}
