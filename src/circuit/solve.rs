//! The solver: from parameters to a steady state, or to a stated reason why there is none.
//!
//! Newton's method with exact derivatives and an affine-invariant step test (natural monotonicity: Deuflhard, *Newton
//! Methods for Nonlinear Problems*, 2004), since near neutral a loop side hangs on almost no leakage beside stiff checks and a
//! search that demands a falling imbalance creeps. Where it does not settle, the machine is run up from rest instead: implicit
//! steps in time with growing length (pseudo-transient continuation: Kelley and Keyes, 1998), which follows what a real loop
//! would do and tells hunting from settling.

use super::layout::Arrangement;
use super::lu::{Lu, Matrix, Vector};
use super::network::Network;
use super::node::{Node, PLACES, RIGHT_SHAFT, State, TANDEM, UNKNOWNS};
use super::param::{Param, Params};
use crate::readings::Path;

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
    pub(super) slope: Slope,
}

/// Factorised derivatives of the arrangements.
#[derive(Clone, Copy, Debug)]
#[allow(clippy::large_enum_variant)] // copied with its solution and dropped; on the heap it would cost more
pub(super) enum Slope {
    /// One path.
    Single(Lu<UNKNOWNS>),
    /// A tandem.
    Tandem(Lu<TANDEM>),
    /// Two circuits.
    Apart([Lu<UNKNOWNS>; 2]),
}

/// As [`Solution`], of a circuit with `N` places.
struct Found<const N: usize> {
    state: State,
    iterations: u32,
    imbalance: f64,
    route: Route,
    slope: Lu<N>,
}

impl<const N: usize> Found<N> {
    fn with(self, slope: impl FnOnce(Lu<N>) -> Slope) -> Solution {
        Solution {
            state: self.state,
            iterations: self.iterations,
            imbalance: self.imbalance,
            route: self.route,
            slope: slope(self.slope),
        }
    }
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
fn weighted<const N: usize>(dx: &Vector<N>, x: &State) -> f64 {
    let mut worst: f64 = 0.0;
    for i in 0..N {
        let scale = if is_shaft(i) {
            0.05 + 0.1 * x[i].abs()
        } else {
            1.0 + 0.02 * x[i].abs()
        };
        worst = worst.max((dx[i] / scale).abs());
    }
    worst
}

#[inline(always)]
fn is_shaft(place: usize) -> bool {
    place == Node::Shaft.at() || place == RIGHT_SHAFT
}

fn moved<const N: usize>(x: &State, dx: &Vector<N>, share: f64) -> State {
    let mut y = *x;
    for (y, d) in y.iter_mut().zip(dx) {
        *y += share * d;
    }
    y
}

fn largest<const N: usize>(f: &Vector<N>) -> f64 {
    f.iter().fold(0.0, |m, v| m.max(v.abs()))
}

fn negated<const N: usize>(v: &Vector<N>) -> Vector<N> {
    let mut out = *v;
    for e in &mut out {
        *e = -*e;
    }
    out
}

impl Network {
    /// A first guess from the parameters alone: what a mechanic would expect the gauges to read.
    pub fn guess(&self, theta: &Params) -> State {
        let mut x = [0.0; PLACES];
        let charge = theta[Param::ReliefSet as usize] + 1.0;
        x[Node::Inlet.at()] = -0.1;
        x[Node::ChargeOut.at()] = charge + 0.3;
        x[Node::Gallery.at()] = charge;
        x[Node::PumpCase.at()] = 0.5;
        self.guess_path(Path::Left, theta, charge - 0.5, &mut x);
        if self.layout().arrangement == Arrangement::Tandem {
            self.guess_path(Path::Right, theta, charge - 0.5, &mut x);
        }
        x
    }

    fn guess_path(&self, path: Path, theta: &Params, low: f64, x: &mut State) {
        let g = |p: Param| theta[super::network::used(path, p)];
        let delivery = g(Param::PumpDisp) * g(Param::Speed) * g(Param::InputGrip) * 1e-3;
        let lever = super::element::asked(self.layout(), path, &g);
        let (mut a, mut b) = (low, low);
        let mut shaft = 0.0;
        if self.layout().held[path as usize] {
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
            shaft = speed;
            if difference > 0.0 {
                a = low + difference
            } else {
                b = low - difference
            }
        }
        for (node, value) in [
            (Node::MotorCase, 0.8),
            (Node::Shaft, shaft),
            (Node::APump, a),
            (Node::AMotor, a),
            (Node::BPump, b),
            (Node::BMotor, b),
        ] {
            x[node.in_tandem(path)] = value;
        }
    }

    /// Solves for the steady state, from `start` where one is given (a neighbouring solution).
    ///
    /// # Errors
    /// [`NoState`] where there is none.
    pub fn solve(&self, theta: &Params, start: Option<&State>) -> Result<Solution, NoState> {
        if theta.iter().any(|v| !v.is_finite()) {
            return Err(NoState::BadFigure);
        }
        match (self.layout().arrangement, &self.apart) {
            (Arrangement::Tandem, _) => Ok(self.find::<TANDEM>(theta, start)?.with(Slope::Tandem)),
            (Arrangement::Apart, Some(right)) => {
                let left = self.find::<UNKNOWNS>(theta, start)?;
                let start = start.map(right_state);
                let view = Network::right_view(theta);
                let other = right.find::<UNKNOWNS>(&view, start.as_ref())?;
                let mut state = left.state;
                state[UNKNOWNS + 1..].copy_from_slice(&other.state[..UNKNOWNS]);
                Ok(Solution {
                    state,
                    iterations: left.iterations + other.iterations,
                    imbalance: left.imbalance.max(other.imbalance),
                    route: left.route.max(other.route),
                    slope: Slope::Apart([left.slope, other.slope]),
                })
            }
            _ => Ok(self.find::<UNKNOWNS>(theta, start)?.with(Slope::Single)),
        }
    }

    fn find<const N: usize>(
        &self,
        theta: &Params,
        start: Option<&State>,
    ) -> Result<Found<N>, NoState> {
        let first = start.copied().unwrap_or_else(|| self.guess(theta));
        if let Some(s) = self.newton(theta, first, Route::Direct) {
            return Ok(s);
        }
        if start.is_some()
            && let Some(s) = self.newton(theta, self.guess(theta), Route::Direct)
        {
            return Ok(s);
        }
        let mut rest = [0.0; PLACES];
        rest[Node::Gallery.at()] = 1.0;
        if let Some(s) = self.newton(theta, rest, Route::FromRest) {
            return Ok(s);
        }
        self.run_up(theta, rest)
    }

    fn newton<const N: usize>(
        &self,
        theta: &Params,
        start: State,
        route: Route,
    ) -> Option<Found<N>> {
        let mut x = start;
        let (mut f, mut j) = self.balance_and_slope::<N>(&x, theta);
        let mut share: f64 = 1.0;
        for iteration in 1..=NEWTON_STEPS {
            let lu = Lu::new(j)?;
            let dx = lu.solve(&negated(&f));
            let size = weighted(&dx, &x);
            if !size.is_finite() {
                return None;
            }
            if size < SETTLED {
                return Some(Found {
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
    fn run_up<const N: usize>(&self, theta: &Params, start: State) -> Result<Found<N>, NoState> {
        let mut x = start;
        let mut rate = 1e3;
        let (mut f, mut j) = self.balance_and_slope::<N>(&x, theta);
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
                return Ok(Found {
                    iterations: iteration + s.iterations,
                    ..s
                });
            }
        }
        if let Some(s) = self.newton(theta, x, Route::RunUp) {
            return Ok(Found {
                iterations: RUN_UP_STEPS + s.iterations,
                ..s
            });
        }
        Err(NoState::Hunts)
    }
}

/// The slope of an implicit time step: J − rate × storage.
fn with_storage<const N: usize>(j: &Matrix<N>, rate: f64) -> Matrix<N> {
    let mut a = *j;
    for (i, row) in a.iter_mut().enumerate() {
        row[i] -= rate * if is_shaft(i) { 30.0 } else { 1.0 };
    }
    a
}

/// The state of the right one of two circuits, in the places of a left one.
pub(super) fn right_state(state: &State) -> State {
    let mut own = [0.0; PLACES];
    own[..UNKNOWNS].copy_from_slice(&state[UNKNOWNS + 1..]);
    own
}
