//! What an instrument on a port shows at a solved state, and how that changes with every parameter.

use super::element::{self, Law, STROKE};
use super::layout::{Arrangement, ControlBuild, FilterBuild};
use super::network::{Network, seeded, used};
use super::node::{Node, PLACES, State, UNKNOWNS};
use super::param::{Param, Params, VALUES};
use super::real::{Dual, Real, positive};
use super::solve::{NoState, Slope, Solution, right_state};
use crate::readings::{Path, Port};

/// Pressure over its cracking at which the neutral relief counts as open, bar (knee of the charge curve).
const KNEE_OPEN: f64 = 0.15;
/// Share of full current at which a coil begins to act. Common practice: 30 to 45 %.
const THRESHOLD: f64 = 0.35;

use Param as P;

/// Parameters that a port's formula uses directly, beyond those that act through the state.
fn direct(port: Port) -> &'static [Param] {
    match port {
        Port::Servo => STROKE,
        Port::Pilot => &[
            P::PilotFull,
            P::PilotSupply,
            P::SignalForward,
            P::SignalReverse,
            P::Lever,
        ],
        Port::CoilCurrent => &[P::CurrentFull, P::SignalForward, P::SignalReverse, P::Lever],
        Port::Release => &[P::ReleaseShare],
        Port::Shift => &[P::ShiftShare],
        Port::MotorDrain => &[P::MotorCaseLine, P::Viscosity],
        Port::ReturnFlow => &[
            P::PumpCaseLine,
            P::PumpCaseTurbulent,
            P::Viscosity,
            P::MotorCaseLine,
            P::ReliefSet,
            P::ReliefGain,
            P::ReliefHeld,
        ],
        // The stroke enters the engine's load only through the pump flow; its own parameters act through STROKE.
        Port::EngineSpeed => ENGINE,
        Port::PumpShaft => &[P::Speed, P::InputGrip],
        Port::Wheel => &[P::GearRatio, P::DriveGrip],
        Port::Ground => &[P::GearRatio, P::DriveGrip, P::Rolling],
        Port::ResponseOut => &[
            P::ResponseOut,
            P::ReliefSet,
            P::ServoStart,
            P::Viscosity,
            P::Air,
        ],
        Port::ResponseBack => &[
            P::ResponseBack,
            P::ReliefSet,
            P::ServoStart,
            P::Viscosity,
            P::Air,
        ],
        Port::SettledTemperature => &[P::AirTemperature, P::HeatRise],
        Port::Knee => &[P::ReliefSet],
        _ => &[],
    }
}

const ENGINE: &[Param] = &[P::EnginePower, P::Speed, P::Lever, P::PumpDisp];

/// The reading of a port at a state, in the base unit of the port's kind. For the knee: how far the neutral relief is open
/// (bar over its cracking, less a hair), zero at the knee itself.
fn read<S: Real>(
    net: &Network,
    path: Path,
    port: Port,
    x: &[S; UNKNOWNS + 1],
    g: &impl Fn(Param) -> S,
) -> S {
    let at = |n: Node| x[n.at()];
    let layout = net.layout();
    let case = if layout.relief_to_tank {
        S::constant(0.0)
    } else {
        at(Node::PumpCase)
    };
    match port {
        Port::Charge => at(if layout.filter == FilterBuild::GaugeBefore {
            Node::ChargeOut
        } else {
            Node::Gallery
        }),
        Port::LoopA => at(Node::APump),
        Port::LoopB => at(Node::BPump),
        Port::LoopDifference => at(Node::APump) - at(Node::BPump),
        Port::PumpCase => at(Node::PumpCase),
        Port::MotorCase => at(Node::MotorCase),
        Port::InletPull => -at(Node::Inlet),
        Port::Servo => {
            let v = [
                at(Node::BPump),
                at(Node::APump),
                at(Node::Gallery),
                at(Node::PumpCase),
            ];
            let s = element::stroke(layout, path, &v, g);
            let size = (s * s + 1e-6).sqrt();
            let wanted = g(P::ServoStart) + (g(P::ServoFull) - g(P::ServoStart)) * size;
            // Never more than the gallery can give.
            let short = positive(wanted - (at(Node::Gallery) - at(Node::PumpCase)), 0.1);
            at(Node::PumpCase) + wanted - short
        }
        Port::Pilot => command(g) * g(P::PilotFull) * g(P::PilotSupply),
        Port::CoilCurrent => {
            let signal = if g(P::Lever).value() >= 0.0 {
                g(P::SignalForward)
            } else {
                g(P::SignalReverse)
            };
            let lever = (g(P::Lever) * g(P::Lever) + 1e-9).sqrt();
            // Nothing flows at neutral; past it the threshold is stepped over.
            let on = lever / (lever + 0.02);
            g(P::CurrentFull) * signal * (on * THRESHOLD + lever * (1.0 - THRESHOLD))
        }
        Port::Release => at(Node::Gallery) * g(P::ReleaseShare),
        Port::Shift => at(Node::Gallery) * g(P::ShiftShare),
        Port::MotorDrain => {
            let to = if layout.separate_cases {
                S::constant(0.0)
            } else {
                at(Node::PumpCase)
            };
            element::flow(
                Law::Drain,
                layout,
                path,
                &[at(Node::MotorCase), to, to, to],
                g,
            )
        }
        Port::ReturnFlow => {
            let zero = S::constant(0.0);
            let pump = element::flow(
                Law::Line(P::PumpCaseLine, P::PumpCaseTurbulent),
                layout,
                path,
                &[at(Node::PumpCase), zero, zero, zero],
                g,
            );
            let motor = if layout.separate_cases {
                element::flow(
                    Law::Drain,
                    layout,
                    path,
                    &[at(Node::MotorCase), zero, zero, zero],
                    g,
                )
            } else {
                zero
            };
            let relief = if layout.relief_to_tank {
                element::flow(
                    Law::NeutralRelief,
                    layout,
                    path,
                    &[at(Node::Gallery), zero, zero, zero],
                    g,
                )
            } else {
                zero
            };
            pump + motor + relief
        }
        Port::EngineSpeed => {
            // Power into the loop against what the engine can give: a governor's droop, then pulled down.
            let difference = at(Node::APump) - at(Node::BPump);
            let delivery = g(P::PumpDisp) * g(P::Speed) * g(P::Lever) * 1e-3;
            let power = positive(difference * delivery * (1.0 / 600.0), 0.2) * 1.1;
            let loading = power / g(P::EnginePower);
            let drop = loading * 0.05 + positive(loading - 0.9, 0.05) * 0.6;
            g(P::Speed) / (drop + 1.0)
        }
        Port::PumpShaft => g(P::Speed) * g(P::InputGrip),
        Port::MotorShaft => size(at(Node::Shaft)) * 1e3,
        Port::Wheel => wheel(at(Node::Shaft), g),
        Port::Ground => wheel(at(Node::Shaft), g) * g(P::Rolling) * 0.06,
        Port::ResponseOut => response(g(P::ResponseOut), at(Node::Gallery) - at(Node::PumpCase), g),
        Port::ResponseBack => response(
            g(P::ResponseBack),
            at(Node::Gallery) - at(Node::PumpCase),
            g,
        ),
        Port::SettledTemperature => g(P::AirTemperature) + g(P::HeatRise),
        Port::Knee => at(Node::Gallery) - case - g(P::ReliefSet) - KNEE_OPEN,
    }
}

/// Counted speeds have no sign.
fn size<S: Real>(speed: S) -> S {
    (speed * speed + 1e-10).sqrt()
}

fn wheel<S: Real>(shaft: S, g: &impl Fn(Param) -> S) -> S {
    size(shaft) * 1e3 * g(P::DriveGrip) / g(P::GearRatio)
}

fn command<S: Real>(g: &impl Fn(Param) -> S) -> S {
    let lever = g(P::Lever);
    let signal = if lever.value() >= 0.0 {
        g(P::SignalForward)
    } else {
        g(P::SignalReverse)
    };
    (lever * lever + 1e-9).sqrt() * signal
}

/// Time through the control orifice: with the root of the pressure that drives it, a little with viscosity, longer with air.
fn response<S: Real>(healthy: S, available: S, g: &impl Fn(Param) -> S) -> S {
    let nominal = g(P::ReliefSet) - g(P::ServoStart);
    let left = positive(available - g(P::ServoStart), 0.2);
    let drive = (nominal / (left + 0.3)).sqrt();
    let thick = (g(P::Viscosity).sqrt() + 1.0) * 0.5;
    healthy * drive * thick * (g(P::Air) * 2.0 + 1.0)
}

/// A reading with its derivatives.
#[derive(Clone, Copy, Debug)]
pub struct Shown {
    /// Value in the base unit of the port's kind.
    pub value: f64,
    /// Total derivative with respect to every parameter.
    pub gradient: Params,
}

impl Network {
    /// What a path's port shows at a solved state.
    pub fn reading_on(&self, path: Path, port: Port, solution: &Solution, theta: &Params) -> f64 {
        if let (Path::Right, Some(right)) = (path, &self.apart) {
            let own = Solution {
                state: right_state(&solution.state),
                ..*solution
            };
            return right.reading(port, &own, &Network::right_view(theta));
        }
        let x = self.local(path, &solution.state);
        let other = self.other_drain(path, port).map_or(0.0, |other| {
            read(
                self,
                other,
                Port::MotorDrain,
                &self.local(other, &solution.state),
                &|p: Param| theta[used(other, p)],
            )
        });
        other + read(self, path, port, &x, &|p: Param| theta[used(path, p)])
    }

    /// As [`Network::reading_on`], on the left or only path.
    pub fn reading(&self, port: Port, solution: &Solution, theta: &Params) -> f64 {
        self.reading_on(Path::Left, port, solution, theta)
    }

    /// What a path's port shows, and how it changes with every parameter (direct, and through the state by one adjoint solve).
    pub fn reading_and_gradient_on(
        &self,
        path: Path,
        port: Port,
        solution: &Solution,
        theta: &Params,
    ) -> Shown {
        if let (Path::Right, Some(right), Slope::Apart([_, slope])) =
            (path, &self.apart, solution.slope)
        {
            let own = Solution {
                state: right_state(&solution.state),
                slope: Slope::Single(slope),
                ..*solution
            };
            let shown = right.reading_and_gradient(port, &own, &Network::right_view(theta));
            return Shown {
                value: shown.value,
                gradient: Network::from_right_view(&shown.gradient),
            };
        }
        let mut shown = Shown {
            value: 0.0,
            gradient: [0.0; VALUES],
        };
        let mut by_place = [0.0; PLACES];
        self.add_reading(path, port, solution, theta, &mut shown, &mut by_place);
        if let Some(other) = self.other_drain(path, port) {
            let drain = Port::MotorDrain;
            self.add_reading(other, drain, solution, theta, &mut shown, &mut by_place);
        }
        if by_place.iter().any(|d| *d != 0.0) {
            let (x, out) = (&solution.state, &mut shown.gradient);
            match &solution.slope {
                Slope::Single(lu) | Slope::Apart([lu, _]) => {
                    let lambda = lu.solve_transposed(&first(&by_place));
                    self.add_adjoint(x, theta, &lambda, out);
                }
                Slope::Tandem(lu) => {
                    let lambda = lu.solve_transposed(&first(&by_place));
                    self.add_adjoint(x, theta, &lambda, out);
                }
            }
        }
        shown
    }

    /// As [`Network::reading_and_gradient_on`], on the left or only path.
    pub fn reading_and_gradient(&self, port: Port, solution: &Solution, theta: &Params) -> Shown {
        self.reading_and_gradient_on(Path::Left, port, solution, theta)
    }

    /// The common return of a tandem takes the other motor's drain too, where drains do not pass the pump.
    fn other_drain(&self, path: Path, port: Port) -> Option<Path> {
        let layout = self.layout();
        (port == Port::ReturnFlow
            && layout.separate_cases
            && layout.arrangement == Arrangement::Tandem)
            .then(|| path.other())
    }

    /// Adds a reading to `shown`, with its direct derivatives, and its derivatives by the places of the state to `by_place`.
    fn add_reading(
        &self,
        path: Path,
        port: Port,
        solution: &Solution,
        theta: &Params,
        shown: &mut Shown,
        by_place: &mut State,
    ) {
        let x = self.local(path, &solution.state);
        let by_state = read(self, path, port, &seeded_state(&x), &|p: Param| {
            Dual::<UNKNOWNS>::constant(theta[used(path, p)])
        });
        shown.value += by_state.v;
        for (node, d) in Node::ALL.iter().zip(by_state.d) {
            by_place[self.at(path, *node)] += d;
        }
        let params = direct(port);
        if !params.is_empty() {
            let fixed: [Dual<20>; UNKNOWNS + 1] = x.map(Dual::constant);
            let by_param = read(self, path, port, &fixed, &|p: Param| {
                seeded::<20>(params, path, theta, p)
            });
            for (p, d) in params.iter().zip(by_param.d) {
                shown.gradient[used(path, *p)] += d;
            }
        }
    }

    /// A path's nodes in the order of the left one's.
    fn local(&self, path: Path, x: &State) -> [f64; UNKNOWNS + 1] {
        Node::ALL.map(|n| x[self.at(path, n)])
    }

    /// The knee: engine speed (rpm) at which the neutral relief opens and charge stops rising, with its derivatives.
    /// Where even twice `top` rpm does not open it, twice `top` is given: it never stops rising.
    ///
    /// # Errors
    /// [`NoState`] where the circuit has no steady state on the way.
    pub fn knee(&self, theta: &Params, top: f64) -> Result<Shown, NoState> {
        let mut at = *theta;
        let open = |at: &Params, start: Option<&State>| -> Result<(Solution, Shown), NoState> {
            let s = self.solve(at, start)?;
            Ok((s, self.reading_and_gradient(Port::Knee, &s, at)))
        };
        let (mut low, mut high) = (50.0, 2.0 * top);
        at[P::Speed as usize] = 0.45 * top;
        let mut start = None;
        let mut last = Shown {
            value: high,
            gradient: [0.0; VALUES],
        };
        for _ in 0..40 {
            let (solution, shown) = open(&at, start.as_ref())?;
            start = Some(solution.state);
            let speed = at[P::Speed as usize];
            if shown.value > 0.0 {
                high = speed
            } else {
                low = speed
            }
            let slope = shown.gradient[P::Speed as usize];
            let next = if slope > 1e-9 {
                speed - shown.value / slope
            } else {
                f64::NAN
            };
            let next = if next > low && next < high {
                next
            } else {
                0.5 * (low + high)
            };
            last = shown;
            if (next - speed).abs() < 1e-7 * top || high - low < 1e-6 * top {
                break;
            }
            at[P::Speed as usize] = next;
        }
        let speed = at[P::Speed as usize];
        let slope = last.gradient[P::Speed as usize];
        let mut gradient = [0.0; VALUES];
        if slope > 1e-9 && speed < 1.99 * top {
            for (g, d) in gradient.iter_mut().zip(last.gradient) {
                *g = -d / slope;
            }
            gradient[P::Speed as usize] = 0.0;
        }
        Ok(Shown {
            value: speed,
            gradient,
        })
    }

    /// Share of its displacement that a path's pump fills at a state: below about 0.97 its low side empties and needles swing.
    pub fn filled(&self, path: Path, state: &State, theta: &Params) -> f64 {
        let atmosphere = theta[P::Atmosphere as usize];
        let side = |n: Node| state[self.at(path, n)];
        super::law::fill(side(Node::APump).min(side(Node::BPump)), atmosphere)
    }

    /// True where this control has a servo at all.
    pub fn has_servo(&self) -> bool {
        self.layout().control != ControlBuild::Direct
    }
}

fn seeded_state(x: &[f64; UNKNOWNS + 1]) -> [Dual<UNKNOWNS>; UNKNOWNS + 1] {
    core::array::from_fn(|i| {
        if i < UNKNOWNS {
            Dual::input(x[i], i)
        } else {
            Dual::constant(0.0)
        }
    })
}

/// The first `N` places.
fn first<const N: usize>(places: &State) -> [f64; N] {
    core::array::from_fn(|i| places[i])
}
