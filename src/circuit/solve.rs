//! The solver: from parameters to a steady state, or to a stated reason why there is none.
//!
//! Newton's method with exact derivatives and an affine-invariant step test (natural monotonicity: Deuflhard, *Newton
//! Methods for Nonlinear Problems*, 2004), since near neutral a loop side hangs on almost no leakage beside stiff checks and a
//! search that demands a falling imbalance creeps. Where it does not settle, the machine is run up from rest instead: implicit
//! steps in time with growing length (pseudo-transient continuation: Kelley and Keyes, 1998), which follows what a real loop
//! would do and tells hunting from settling.

use super::lu::{Lu, Matrix, Vector};
use super::network::Network;
use super::node::{Node, State, UNKNOWNS};
use super::param::{Param, Params};

/// A solved state.
#[derive(Clone, Copy, Debug)]
pub struct Solution {
    /// Pressures (bar) and shaft speed (thousands of rpm).
    pub state: State,
    /// Newton or time steps used.
    pub iterations: u32,
    /// Largest imbalance left at any node, L/min (bar in the shaft row).
    pub imbalance: f64,
    /// How it was found.
    pub route: Route,
    /// Factorised derivative at the solution, for sensitivities.
    pub slope: Lu,
}

/// How a solution was found.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Route {
    /// Newton from the guess.
    Direct,
    /// Newton from rest.
    FromRest,
    /// Run up in time from rest.
    RunUp,
}

/// Why there is no steady state.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
pub enum NoState {
    /// The pressures keep swinging round between states.
    #[error("the machine would hunt: no steady state")]
    Hunts,
    /// A parameter is not a number or outside what a circuit can have.
    #[error("a figure of the circuit is outside what a machine can have")]
    BadFigure,
}

/// Largest weighted correction that counts as settled.
const SETTLED: f64 = 1e-9;
/// Newton steps before the run-up is tried.
const NEWTON_STEPS: u32 = 40;
/// Time steps of the run-up.
const RUN_UP_STEPS: u32 = 600;

/// Size of a correction in each unknown: a bar plus a hundredth of the pressure; ten rpm.
#[inline(always)]
fn weighted(dx: &Vector, x: &State) -> f64 {
    let mut worst: f64 = 0.0;
    for i in 0..UNKNOWNS {
        let scale = if i == Node::Shaft.at() {
            0.05 + 0.1 * x[i].abs()
        } else {
            1.0 + 0.02 * x[i].abs()
        };
        worst = worst.max((dx[i] / scale).abs());
    }
    worst
}

fn moved(x: &State, dx: &Vector, share: f64) -> State {
    let mut y = *x;
    for i in 0..UNKNOWNS {
        y[i] += share * dx[i];
    }
    y
}

fn largest(f: &Vector) -> f64 {
    f.iter().fold(0.0, |m, v| m.max(v.abs()))
}

fn negated(v: &Vector) -> Vector {
    let mut out = *v;
    for e in &mut out {
        *e = -*e;
    }
    out
}

impl Network {
    /// A first guess from the parameters alone: what a mechanic would expect the gauges to read.
    pub fn guess(&self, theta: &Params) -> State {
        let g = |p: Param| theta[p as usize];
        let delivery = g(Param::PumpDisp) * g(Param::Speed) * g(Param::InputGrip) * 1e-3;
        let charge = g(Param::ReliefSet) + 1.0;
        let lever = super::element::asked(self.layout(), &g);
        let low = charge - 0.5;
        let mut x = [0.0; UNKNOWNS + 1];
        x[Node::Inlet.at()] = -0.1;
        x[Node::ChargeOut.at()] = charge + 0.3;
        x[Node::Gallery.at()] = charge;
        x[Node::PumpCase.at()] = 0.5;
        x[Node::MotorCase.at()] = 0.8;
        let (mut a, mut b) = (low, low);
        if self.layout().held {
            let high = (delivery * lever.abs()
                / (g(Param::PumpLeak)
                    + g(Param::MotorLeak)
                    + g(Param::PumpAcross)
                    + g(Param::MotorAcross))
                * g(Param::Viscosity))
            .min(g(Param::LoopReliefA).min(g(Param::LoopReliefB)));
            if lever > 0.0 {
                a = low + high
            } else {
                b = low + high
            }
        } else {
            let speed = delivery * lever / (g(Param::MotorDisp) * g(Param::MotorShift));
            let resisting = g(Param::Friction) + g(Param::BrakeDrag) + g(Param::Load);
            let needed = g(Param::Push)
                + if speed == 0.0 {
                    0.0
                } else {
                    resisting * speed.signum()
                }
                + g(Param::Drag) * g(Param::Viscosity) * speed;
            let difference = (needed / g(Param::MotorShift))
                .clamp(-g(Param::LoopReliefB), g(Param::LoopReliefA));
            x[Node::Shaft.at()] = speed;
            if difference > 0.0 {
                a = low + difference
            } else {
                b = low - difference
            }
        }
        x[Node::APump.at()] = a;
        x[Node::AMotor.at()] = a;
        x[Node::BPump.at()] = b;
        x[Node::BMotor.at()] = b;
        x
    }

    /// Solves for the steady state, from `start` where one is given (a neighbouring solution).
    ///
    /// # Errors
    /// [`NoState`] where there is none.
    pub fn solve(&self, theta: &Params, start: Option<&State>) -> Result<Solution, NoState> {
        if theta.iter().any(|v| !v.is_finite()) {
            return Err(NoState::BadFigure);
        }
        let first = start.copied().unwrap_or_else(|| self.guess(theta));
        if let Some(s) = self.newton(theta, first, Route::Direct) {
            return Ok(s);
        }
        if start.is_some()
            && let Some(s) = self.newton(theta, self.guess(theta), Route::Direct)
        {
            return Ok(s);
        }
        let mut rest = [0.0; UNKNOWNS + 1];
        rest[Node::Gallery.at()] = 1.0;
        if let Some(s) = self.newton(theta, rest, Route::FromRest) {
            return Ok(s);
        }
        self.run_up(theta, rest)
    }

    fn newton(&self, theta: &Params, start: State, route: Route) -> Option<Solution> {
        let mut x = start;
        let (mut f, mut j) = self.balance_and_slope(&x, theta);
        let mut share: f64 = 1.0;
        for iteration in 1..=NEWTON_STEPS {
            let lu = Lu::new(j)?;
            let dx = lu.solve(&negated(&f));
            let size = weighted(&dx, &x);
            if !size.is_finite() {
                return None;
            }
            if size < SETTLED {
                return Some(Solution {
                    state: x,
                    iterations: iteration,
                    imbalance: largest(&f),
                    route,
                    slope: lu,
                });
            }
            // Natural monotonicity: the next simplified correction must be smaller.
            let mut accepted = false;
            share = (share * 4.0).min(1.0);
            for _ in 0..8 {
                let y = moved(&x, &dx, share);
                let (fy, jy) = self.balance_and_slope(&y, theta);
                let ahead = weighted(&lu.solve(&negated(&fy)), &x);
                if ahead <= (1.0 - 0.25 * share) * size || ahead < SETTLED {
                    x = y;
                    f = fy;
                    j = jy;
                    accepted = true;
                    break;
                }
                share *= 0.4;
            }
            if !accepted {
                return None;
            }
        }
        None
    }

    /// Runs the machine up from rest by implicit time steps. Each node holds a little oil, the shaft a little inertia.
    fn run_up(&self, theta: &Params, start: State) -> Result<Solution, NoState> {
        let mut x = start;
        let mut rate = 1e3;
        let (mut f, mut j) = self.balance_and_slope(&x, theta);
        let mut lowest = f64::INFINITY;
        for iteration in 1..=RUN_UP_STEPS {
            let lu = Lu::new(with_storage(&j, rate)).ok_or(NoState::BadFigure)?;
            let dx = lu.solve(&negated(&f));
            let size = weighted(&dx, &x);
            if !size.is_finite() {
                return Err(NoState::BadFigure);
            }
            let share = (5.0 / size).min(1.0);
            let y = moved(&x, &dx, share);
            let (fy, jy) = self.balance_and_slope(&y, theta);
            let (before, after) = (largest(&f), largest(&fy));
            x = y;
            f = fy;
            j = jy;
            lowest = lowest.min(after);
            // Step length follows the fall of the imbalance (switched evolution relaxation).
            let factor = (after / before.max(1e-300)).clamp(0.3, 3.0);
            rate = if share < 1.0 {
                rate
            } else {
                (rate * factor).clamp(1e-12, 1e4)
            };
            if share >= 1.0
                && rate <= 1e-2
                && let Some(s) = self.newton(theta, x, Route::RunUp)
            {
                return Ok(Solution {
                    iterations: iteration + s.iterations,
                    ..s
                });
            }
        }
        if let Some(s) = self.newton(theta, x, Route::RunUp) {
            return Ok(Solution {
                iterations: RUN_UP_STEPS + s.iterations,
                ..s
            });
        }
        Err(NoState::Hunts)
    }
}

/// The slope of an implicit time step: J − rate × storage.
fn with_storage(j: &Matrix, rate: f64) -> Matrix {
    let mut a = *j;
    for (i, row) in a.iter_mut().enumerate() {
        row[i] -= rate * if i == Node::Shaft.at() { 30.0 } else { 1.0 };
    }
    a
}
