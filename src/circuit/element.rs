//! The circuit as data: one row per element, saying which law acts between which nodes, what else it looks at, and which
//! parameters it uses. To add an element: one row here (and its law in `law.rs`, if no present law fits).

use super::law::{self, Servo};
use super::layout::{Arrangement, ControlBuild, DumpBuild, FilterBuild, Layout};
use super::node::Node;
use super::param::Param;
use super::real::{Real, limited, positive};
use crate::readings::Path;

/// What kind of element a row is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Law {
    /// Suction line with strainer (and suction filter where one is fitted).
    Suction,
    /// Charge pump delivery, less what it cannot fill and what is air.
    ChargePump,
    /// Charge pump slip.
    ChargeSlip,
    /// Pressure-side filter with bypass, or a plain passage.
    ChargeFilter,
    /// Neutral charge relief.
    NeutralRelief,
    /// Consumers.
    Consumers,
    /// Control and servo leakage.
    Control,
    /// Make-up check; the parameter is its size.
    Check(Param),
    /// Damaged seat or open valve: an orifice.
    Seat(Param),
    /// Loop relief; the parameter is its setting.
    LoopRelief(Param),
    /// Main pump delivery.
    Pump,
    /// Laminar leak; the parameter is its conductance.
    Leak(Param),
    /// Line; laminar and turbulent resistance.
    Line(Param, Param),
    /// Motor displacement flow.
    Motor,
    /// Flushing: shuttle, orifice and operating relief; the parameter is the stuck share of this side.
    Flushing(Param),
    /// Case drain without a turbulent part.
    Drain,
    /// Net torque on the motor shaft, as bar of loop difference at large displacement.
    Torque,
}

impl Law {
    /// True for what a tandem has once.
    fn feeds_both(self) -> bool {
        matches!(
            self,
            Law::Suction
                | Law::ChargePump
                | Law::ChargeSlip
                | Law::ChargeFilter
                | Law::NeutralRelief
                | Law::Consumers
                | Law::Line(P::PumpCaseLine, _)
        )
    }
}

/// One row of the circuit.
#[derive(Clone, Copy, Debug)]
pub struct Element {
    /// Path whose nodes and parameters are meant.
    pub path: Path,
    /// Law.
    pub law: Law,
    /// Where the flow leaves.
    pub from: Node,
    /// Where it arrives.
    pub to: Node,
    /// Unknowns that the law looks at; the first `arity` count.
    pub inputs: [Node; 4],
    /// How many inputs count.
    pub arity: usize,
    /// Parameters that the law uses.
    pub params: &'static [Param],
}

use Node::*;
use Param as P;

fn two(law: Law, from: Node, to: Node, params: &'static [Param]) -> Element {
    Element {
        path: Path::Left,
        law,
        from,
        to,
        inputs: [from, to, Tank, Tank],
        arity: 2,
        params,
    }
}

/// Parameters of the stroke, shared by the pump and the readings of servo and signal.
pub const STROKE: &[Param] = &[
    P::PumpDisp,
    P::Speed,
    P::InputGrip,
    P::Atmosphere,
    P::Lever,
    P::SignalForward,
    P::SignalReverse,
    P::GainForward,
    P::GainReverse,
    P::NullControl,
    P::NullServo,
    P::PilotSupply,
    P::ServoStart,
    P::ServoFull,
    P::ServoLoad,
    P::SenseStart,
    P::SenseFull,
    P::Inching,
    P::LimiterA,
    P::LimiterB,
];

/// The rows of a layout: of one path, or of a tandem (of paths that are wholly apart: of the left one).
pub fn elements(layout: &Layout) -> Vec<Element> {
    let mut rows = path_elements(layout);
    if layout.arrangement == Arrangement::Tandem {
        let own: Vec<Element> = rows
            .iter()
            .filter(|e| !e.law.feeds_both())
            .map(|e| Element {
                path: Path::Right,
                ..*e
            })
            .collect();
        rows.extend(own);
    }
    rows
}

/// The rows of one path with all that feeds it.
fn path_elements(layout: &Layout) -> Vec<Element> {
    let relief_to = if layout.relief_to_tank {
        Tank
    } else {
        PumpCase
    };
    let (dump_a, dump_b) = match layout.dump {
        DumpBuild::Gallery => (Gallery, Gallery),
        DumpBuild::Across => (BPump, APump),
        DumpBuild::Case => (PumpCase, PumpCase),
    };
    let motor_drain_to = if layout.separate_cases {
        Tank
    } else {
        PumpCase
    };
    let wide = |law, from, to, inputs, arity, params| Element {
        path: Path::Left,
        law,
        from,
        to,
        inputs,
        arity,
        params,
    };
    vec![
        two(
            Law::Suction,
            Tank,
            Inlet,
            &[
                P::SuctionLaminar,
                P::SuctionTurbulent,
                P::FilterLaminar,
                P::Viscosity,
            ],
        ),
        two(
            Law::ChargePump,
            Inlet,
            ChargeOut,
            &[
                P::ChargeDisp,
                P::Speed,
                P::InputGrip,
                P::ChargeDrive,
                P::ChargeFeed,
                P::Air,
                P::Atmosphere,
            ],
        ),
        two(
            Law::ChargeSlip,
            ChargeOut,
            Inlet,
            &[P::ChargeSlip, P::Viscosity],
        ),
        two(
            Law::ChargeFilter,
            ChargeOut,
            Gallery,
            &[P::FilterLaminar, P::Viscosity],
        ),
        two(
            Law::NeutralRelief,
            Gallery,
            relief_to,
            &[P::ReliefSet, P::ReliefGain, P::ReliefHeld],
        ),
        two(
            Law::Consumers,
            Gallery,
            Tank,
            &[P::Consumers, P::ConsumerLeak],
        ),
        two(
            Law::Control,
            Gallery,
            PumpCase,
            &[P::ControlLeak, P::ServoLeak, P::Lever, P::Viscosity],
        ),
        two(Law::Check(P::CheckA), Gallery, APump, &[P::CheckA]),
        two(Law::Check(P::CheckB), Gallery, BPump, &[P::CheckB]),
        two(Law::Seat(P::CheckLeakA), APump, Gallery, &[P::CheckLeakA]),
        two(Law::Seat(P::CheckLeakB), BPump, Gallery, &[P::CheckLeakB]),
        two(
            Law::LoopRelief(P::LoopReliefA),
            APump,
            dump_a,
            &[P::LoopReliefA, P::LoopOverride, P::PumpDisp],
        ),
        two(
            Law::LoopRelief(P::LoopReliefB),
            BPump,
            dump_b,
            &[P::LoopReliefB, P::LoopOverride, P::PumpDisp],
        ),
        two(Law::Seat(P::Bypass), APump, BPump, &[P::Bypass]),
        wide(
            Law::Pump,
            BPump,
            APump,
            [BPump, APump, Gallery, PumpCase],
            4,
            STROKE,
        ),
        two(
            Law::Leak(P::PumpLeak),
            APump,
            PumpCase,
            &[P::PumpLeak, P::Viscosity],
        ),
        two(
            Law::Leak(P::PumpLeak),
            BPump,
            PumpCase,
            &[P::PumpLeak, P::Viscosity],
        ),
        two(
            Law::Leak(P::PumpAcross),
            APump,
            BPump,
            &[P::PumpAcross, P::Viscosity],
        ),
        two(
            Law::Line(P::LineALaminar, P::LineATurbulent),
            APump,
            AMotor,
            &[P::LineALaminar, P::LineATurbulent, P::Viscosity],
        ),
        two(
            Law::Line(P::LineBLaminar, P::LineBTurbulent),
            BMotor,
            BPump,
            &[P::LineBLaminar, P::LineBTurbulent, P::Viscosity],
        ),
        wide(
            Law::Motor,
            AMotor,
            BMotor,
            [AMotor, BMotor, Shaft, Tank],
            3,
            &[P::MotorDisp, P::MotorShift, P::Atmosphere],
        ),
        two(
            Law::Leak(P::MotorLeak),
            AMotor,
            MotorCase,
            &[P::MotorLeak, P::Viscosity],
        ),
        two(
            Law::Leak(P::MotorLeak),
            BMotor,
            MotorCase,
            &[P::MotorLeak, P::Viscosity],
        ),
        two(
            Law::Leak(P::MotorAcross),
            AMotor,
            BMotor,
            &[P::MotorAcross, P::Viscosity],
        ),
        wide(
            Law::Flushing(P::ShuttleStuckA),
            AMotor,
            MotorCase,
            [AMotor, MotorCase, BMotor, Tank],
            3,
            FLUSHING_A,
        ),
        wide(
            Law::Flushing(P::ShuttleStuckB),
            BMotor,
            MotorCase,
            [BMotor, MotorCase, AMotor, Tank],
            3,
            FLUSHING_B,
        ),
        two(
            Law::Drain,
            MotorCase,
            motor_drain_to,
            &[P::MotorCaseLine, P::Viscosity],
        ),
        two(
            Law::Line(P::PumpCaseLine, P::PumpCaseTurbulent),
            PumpCase,
            Tank,
            &[P::PumpCaseLine, P::PumpCaseTurbulent, P::Viscosity],
        ),
        wide(
            Law::Torque,
            Tank,
            Shaft,
            [AMotor, BMotor, Shaft, Tank],
            3,
            &[
                P::MotorShift,
                P::Load,
                P::Push,
                P::Friction,
                P::BrakeDrag,
                P::Drag,
                P::Viscosity,
                P::DriveGrip,
            ],
        ),
    ]
}

const FLUSHING_A: &[Param] = &[
    P::OperatingSet,
    P::OperatingGain,
    P::FlushOrifice,
    P::ShuttleTravel,
    P::ShuttleSpring,
    P::ShuttleStuckA,
];
const FLUSHING_B: &[Param] = &[
    P::OperatingSet,
    P::OperatingGain,
    P::FlushOrifice,
    P::ShuttleTravel,
    P::ShuttleSpring,
    P::ShuttleStuckB,
];

/// Share of the pressure filter's resistance that a filter in the suction line has: it is made much larger.
const SUCTION_FILTER_SHARE: f64 = 0.2;

/// Flow (L/min) through an element, or the net torque (bar) of the shaft row.
#[inline(always)]
pub fn flow<S: Real>(
    law: Law,
    layout: &Layout,
    path: Path,
    v: &[S; 4],
    g: &impl Fn(Param) -> S,
) -> S {
    let dp = v[0] - v[1];
    match law {
        Law::Suction => {
            let filter = if layout.filter == FilterBuild::Suction {
                SUCTION_FILTER_SHARE
            } else {
                0.0
            };
            let r1 = (g(P::SuctionLaminar) + g(P::FilterLaminar) * filter) * g(P::Viscosity);
            law::line(dp, r1, g(P::SuctionTurbulent))
        }
        Law::ChargePump => {
            let ideal = g(P::ChargeDisp) * g(P::Speed) * g(P::InputGrip) * 1e-3;
            let whole = g(P::ChargeDrive) * g(P::ChargeFeed) * (S::constant(1.0) - g(P::Air));
            ideal * whole * law::fill(v[0], g(P::Atmosphere))
        }
        Law::ChargeSlip => law::laminar(dp, g(P::ChargeSlip), g(P::Viscosity)),
        Law::ChargeFilter => match layout.filter {
            // A plain passage: a drop that no gauge can see.
            FilterBuild::Suction => dp * 2000.0,
            _ => law::filter(dp, g(P::FilterLaminar), g(P::Viscosity)),
        },
        Law::NeutralRelief => {
            law::relief(dp, g(P::ReliefSet), g(P::ReliefGain)) + law::orifice(dp, g(P::ReliefHeld))
        }
        Law::Consumers => law::orifice(dp, g(P::Consumers) + g(P::ConsumerLeak)),
        Law::Control => {
            let lever = g(P::Lever);
            let stroked = (lever * lever + 1e-6).sqrt();
            law::laminar(
                dp,
                g(P::ControlLeak) + g(P::ServoLeak) * stroked,
                g(P::Viscosity),
            )
        }
        Law::Check(size) => law::check(dp, g(size)),
        Law::Seat(size) => law::orifice(dp, g(size)),
        Law::LoopRelief(set) => {
            // Gain such that the whole flow of the pump at 2400 rpm passes at (1 + override) × setting.
            let gain = g(P::PumpDisp) * 2.4 / (g(P::LoopOverride) * g(set));
            law::relief(dp, g(set), gain)
        }
        Law::Pump => pump(layout, path, v, g),
        Law::Leak(size) => law::laminar(dp, g(size), g(P::Viscosity)),
        Law::Line(r1, r2) => law::line(dp, g(r1) * g(P::Viscosity), g(r2)),
        Law::Motor => {
            let (forward, back) = (positive(v[2], 1e-3), positive(-v[2], 1e-3));
            let filled = forward * law::fill(v[0], g(P::Atmosphere))
                - back * law::fill(v[1], g(P::Atmosphere));
            g(P::MotorDisp) * g(P::MotorShift) * filled
        }
        Law::Flushing(stuck) => {
            let open = law::shuttle(
                v[2] - v[0],
                g(P::ShuttleSpring),
                g(P::ShuttleTravel),
                g(stuck),
            );
            open * law::relief_behind_orifice(
                dp,
                g(P::OperatingSet),
                g(P::OperatingGain),
                g(P::FlushOrifice),
            )
        }
        Law::Drain => law::laminar(dp, S::constant(1.0) / g(P::MotorCaseLine), g(P::Viscosity)),
        Law::Torque => {
            let drive = dp * g(P::MotorShift);
            // A driveline that slips passes on only its share of what the wheels ask.
            let load = g(P::Load) * g(P::DriveGrip);
            let dry = law::friction(v[2], g(P::Friction) + g(P::BrakeDrag) + load);
            let wet = g(P::Drag) * g(P::Viscosity) * v[2];
            drive - g(P::Push) * g(P::DriveGrip) - dry - wet
        }
    }
}

/// Stroke at the mechanical stops, share of full stroke: a little over 1, since stops are set with a tolerance.
const STOPS: f64 = 1.03;

/// Stroke asked by lever, signal and linkage, before the servo (signed share of full stroke).
#[inline(always)]
pub fn asked<S: Real>(layout: &Layout, path: Path, g: &impl Fn(Param) -> S) -> S {
    if layout.bridged[path as usize] {
        return S::constant(0.0);
    }
    let lever = g(P::Lever);
    let (signal, gain) = if lever.value() >= 0.0 {
        (g(P::SignalForward), g(P::GainForward))
    } else {
        (g(P::SignalReverse), g(P::GainReverse))
    };
    let plain = lever * gain;
    let commanded = match layout.control {
        ControlBuild::Direct | ControlBuild::Feedback => plain,
        ControlBuild::Pilot => plain * signal * g(P::PilotSupply),
        ControlBuild::Electric | ControlBuild::NoFeedback => plain * signal,
        ControlBuild::SpeedSensing => {
            let share = law::ramp(
                g(P::Speed) * g(P::InputGrip),
                g(P::SenseStart),
                g(P::SenseFull),
            );
            sense_direction(lever) * gain * signal * share * g(P::Inching)
        }
        ControlBuild::ThreePosition => sense_direction(lever) * gain * signal,
    };
    // The swash ends at its stops, whatever is asked.
    limited(commanded + g(P::NullControl), S::constant(STOPS), 0.005)
}

/// Direction only: a lever past a twentieth of its travel counts as fully asked.
#[inline(always)]
fn sense_direction<S: Real>(lever: S) -> S {
    law::friction(lever * 0.05, S::constant(1.0))
}

/// Stroke of the main pump, signed share of full stroke, from the pressures `[B, A, gallery, pump case]` at the pump.
#[inline(always)]
pub fn stroke<S: Real>(layout: &Layout, path: Path, v: &[S; 4], g: &impl Fn(Param) -> S) -> S {
    let asked = asked(layout, path, g);
    let offset = match layout.control {
        // Feedback takes most of a servo offset back, unless the ports are bridged.
        ControlBuild::Feedback | ControlBuild::Pilot | ControlBuild::Electric
            if !layout.bridged[path as usize] =>
        {
            g(P::NullServo) * 0.2
        }
        _ => g(P::NullServo),
    };
    let at_servo = match layout.control {
        ControlBuild::Direct => asked + offset,
        _ => {
            let supply = if layout.control == ControlBuild::Pilot {
                S::constant(1.0)
            } else {
                g(P::PilotSupply)
            };
            let towards = if asked.value() >= 0.0 {
                v[1] - v[0]
            } else {
                v[0] - v[1]
            };
            let load = positive(towards, 1.0) * g(P::ServoLoad) * 0.01;
            law::servo_stroke(&Servo {
                asked,
                offset,
                available: (v[2] - v[3]) * supply - load,
                start: g(P::ServoStart),
                full: g(P::ServoFull),
            })
        }
    };
    let limit = if at_servo.value() >= 0.0 {
        law::limiter(v[1], g(P::LimiterA))
    } else {
        law::limiter(v[0], g(P::LimiterB))
    };
    at_servo * limit
}

#[inline(always)]
fn pump<S: Real>(layout: &Layout, path: Path, v: &[S; 4], g: &impl Fn(Param) -> S) -> S {
    let stroke = stroke(layout, path, v, g);
    let inlet = if stroke.value() >= 0.0 { v[0] } else { v[1] };
    let ideal = g(P::PumpDisp) * g(P::Speed) * g(P::InputGrip) * 1e-3;
    ideal * stroke * law::fill(inlet, g(P::Atmosphere))
}
