//! From a unit's figures to the circuit's parameters and their scatter.

use super::builds::Build;
use super::latent::Latents;
use super::twin::on_paths;
use crate::circuit::{Param as P, Params, healthy};
use crate::fluid;
use crate::readings::Path;
use crate::unit::{Figure, FigureId, Paths, Source, Unit};

/// Relative width (1 sigma, log scale) of a figure that somebody knows, by where it is from. Common practice.
fn width_of(source: Source) -> f64 {
    match source {
        Source::Manual => 0.03,
        Source::Plate => 0.03,
        Source::Measured => 0.02,
        Source::Practice => 0.12,
    }
}

/// A figure as it is believed: value in the base unit and relative width.
#[derive(Clone, Copy, Debug)]
struct Believed {
    value: f64,
    width: f64,
    known: bool,
}

fn believed(unit: &Unit, id: FigureId) -> Believed {
    match unit.figures.get(&id) {
        Some(Figure {
            value: Some(m),
            source,
            ..
        }) if m.base() > 0.0 => Believed {
            value: m.base(),
            width: width_of(*source),
            known: true,
        },
        _ => {
            let s = unit.class.spread(id);
            Believed {
                value: s.value,
                width: s.relative,
                known: false,
            }
        }
    }
}

/// Size of the machine over the reference of 75 cm³/rev that the healthy table is written for.
fn size(unit: &Unit) -> f64 {
    believed(unit, FigureId::PumpDisplacement).value / 75.0
}

/// Gap between neutral and operating relief where the operating setting is not known, bar: most likely value.
/// Common practice: 10 to 20 psi, with a long tail upwards.
const GAP: f64 = 1.3;

/// Parameters that grow with the size of a machine, and the power of size that they follow.
const WITH_SIZE: &[(P, f64)] = &[
    (P::ReliefGain, 1.0),
    (P::OperatingGain, 1.0),
    (P::FlushOrifice, 1.0),
    (P::ChargeSlip, 1.0),
    (P::Consumers, 0.5),
    (P::ControlLeak, 0.5),
    (P::CheckA, 1.0),
    (P::CheckB, 1.0),
    (P::PumpLeak, 1.0),
    (P::PumpAcross, 1.0),
    (P::MotorLeak, 1.0),
    (P::MotorAcross, 1.0),
    (P::LineALaminar, -1.0),
    (P::LineBLaminar, -1.0),
    (P::LineATurbulent, -2.0),
    (P::LineBTurbulent, -2.0),
    (P::SuctionLaminar, -1.0),
    (P::SuctionTurbulent, -2.0),
    (P::FilterLaminar, -1.0),
    (P::MotorCaseLine, -1.0),
    (P::PumpCaseLine, -1.0),
    (P::PumpCaseTurbulent, -2.0),
    (P::EnginePower, 1.0),
];

/// Parameters of a build before any condition is set.
pub fn base(build: &Build) -> Params {
    let unit = &build.unit;
    let b = |id| believed(unit, id).value;
    let size = size(unit);
    let mut t = healthy();
    let mut set = |p: P, v: f64| {
        for path in Path::BOTH {
            t[p.on(path)] = v;
        }
    };
    set(P::Speed, b(FigureId::HighIdle));
    set(P::PumpDisp, b(FigureId::PumpDisplacement));
    set(P::ChargeDisp, charge_displacement(unit));
    set(P::ReliefSet, b(FigureId::ChargeSetting));
    set(P::OperatingSet, operating_setting(unit));
    set(P::LoopReliefA, b(FigureId::LoopRelief));
    set(P::LoopReliefB, b(FigureId::LoopRelief));
    set(
        P::MotorDisp,
        b(FigureId::MotorDisplacement) * f64::from(unit.ticks.motors.clamp(1, 4)),
    );
    set(P::GearRatio, b(FigureId::GearRatio));
    set(P::Rolling, b(FigureId::RollingCircumference));
    set(P::CurrentFull, b(FigureId::FullCurrent));
    set(P::PilotFull, b(FigureId::FullPilot));
    let altitude = unit.known(FigureId::Altitude).unwrap_or(150.0);
    set(P::Atmosphere, fluid::atmosphere::pressure_bar(altitude));
    if build.limiter {
        let limit = limiter_setting(unit);
        set(P::LimiterA, limit);
        set(P::LimiterB, limit);
    }
    set(P::ShuttleTravel, if build.flushing { 1.0 } else { 0.0 });
    if build.two_position {
        set(P::ShuttleSpring, 1e-3);
    }
    // Servo springs are chosen for the charge pressure that the machine runs at.
    let charge = b(FigureId::ChargeSetting);
    set(P::ServoStart, 0.16 * charge);
    set(P::ServoFull, 0.5 * charge);
    set(P::SenseStart, 0.45 * b(FigureId::HighIdle));
    set(P::SenseFull, 0.8 * b(FigureId::HighIdle));
    if build.unit.ticks.control == crate::unit::Control::PressureNoFeedback {
        set(P::ServoLoad, 0.06 * charge);
    }
    for (p, power) in WITH_SIZE {
        for path in Path::BOTH {
            t[p.on(path)] *= crate::math::pow(size, *power);
        }
    }
    if unit.ticks.paths == Paths::TwoSharedCharge {
        // Lines that carry the oil of both.
        for p in [P::SuctionLaminar, P::PumpCaseLine] {
            t[p as usize] *= 0.5;
        }
        for p in [P::SuctionTurbulent, P::PumpCaseTurbulent] {
            t[p as usize] *= 0.25;
        }
    }
    for (p, value) in measured_leakage(unit) {
        for path in Path::BOTH {
            t[p.on(path)] = value;
        }
    }
    // A slow large motor has more leakage area in proportion to torque, not to its displacement: keep it with the pump's.
    t
}

/// Pressure difference at which a bench run tells leakages, bar.
const LEAKAGE_AT: f64 = 200.0;
/// Width of a leakage measured on the bench: the fit's own doubt, and what fitting and running since may have changed. Practice.
pub const MEASURED_LEAKAGE: f64 = 0.15;

/// Leakages that a bench run found, as parameters: L/min per bar at viscosity 1. What slips and does not reach the case goes
/// across.
fn measured_leakage(unit: &Unit) -> Vec<(P, f64)> {
    let one = |case, slip, leak, across, count: f64| {
        let case = unit.known(case).map(|flow| count * flow / LEAKAGE_AT);
        let slip = unit.known(slip).map(|flow| count * flow / LEAKAGE_AT);
        let least = 0.05;
        let mut found: Vec<(P, f64)> = Vec::new();
        found.extend(case.map(|case| (leak, case)));
        if let Some(slip) = slip {
            let case = case.unwrap_or(0.6 * slip);
            found.push((across, (slip - case).max(least * slip)));
        }
        found
    };
    let motors = f64::from(unit.ticks.motors.clamp(1, 4));
    let mut found = one(
        FigureId::PumpCaseLeakage,
        FigureId::PumpSlip,
        P::PumpLeak,
        P::PumpAcross,
        1.0,
    );
    found.extend(one(
        FigureId::MotorCaseLeakage,
        FigureId::MotorSlip,
        P::MotorLeak,
        P::MotorAcross,
        motors,
    ));
    found
}

fn charge_displacement(unit: &Unit) -> f64 {
    let own = believed(unit, FigureId::ChargeDisplacement);
    if own.known {
        own.value
    } else {
        // One charge pump for two is chosen for both.
        let fed = if unit.ticks.paths == Paths::TwoSharedCharge {
            2.0
        } else {
            1.0
        };
        0.18 * fed * believed(unit, FigureId::PumpDisplacement).value
    }
}

fn operating_setting(unit: &Unit) -> f64 {
    let own = believed(unit, FigureId::OperatingSetting);
    if own.known {
        own.value
    } else {
        (believed(unit, FigureId::ChargeSetting).value - GAP).max(1.0)
    }
}

fn limiter_setting(unit: &Unit) -> f64 {
    let own = believed(unit, FigureId::Limiter);
    // Common practice: 10 to 40 bar under the reliefs.
    if own.known {
        own.value
    } else {
        (believed(unit, FigureId::LoopRelief).value - 25.0).max(30.0)
    }
}

/// Scatter of the unit itself, the same in every condition.
pub fn unit_latents(unit: &Unit) -> Latents {
    on_paths(one_path_latents(unit), unit.ticks.paths, &[])
}

fn one_path_latents(unit: &Unit) -> Latents {
    let mut l = Latents::default();
    let b = |id| believed(unit, id);
    let pump = b(FigureId::PumpDisplacement);
    let charge = b(FigureId::ChargeDisplacement);
    let relief = b(FigureId::ChargeSetting);
    let operating = b(FigureId::OperatingSetting);
    let loop_relief = b(FigureId::LoopRelief);
    let limiter = b(FigureId::Limiter);

    let measured = measured_leakage(unit);
    let leakage = |p: P, usual: f64| {
        let is_measured = measured.iter().any(|(known, _)| *known == p);
        if is_measured { MEASURED_LEAKAGE } else { usual }
    };

    // The size of a machine whose pump nobody knows moves all that grows with it.
    let mut moves = vec![(P::PumpDisp, pump.width)];
    if !charge.known {
        moves.push((P::ChargeDisp, pump.width));
    }
    if !pump.known {
        let grows = WITH_SIZE
            .iter()
            .filter(|(p, _)| !measured.iter().any(|(known, _)| known == p));
        moves.extend(grows.map(|(p, power)| (*p, power * pump.width)));
        if !b(FigureId::MotorDisplacement).known {
            moves.push((P::MotorDisp, pump.width));
        }
    }
    l.many("pump displacement", &moves);
    l.one(
        P::ChargeDisp,
        if charge.known { charge.width } else { 0.25 },
    );
    l.one(P::ChargeSlip, 0.35);

    // Neutral and operating relief are set one under the other.
    let set = relief.value;
    let ratio = set / operating_setting(unit);
    let servo = [
        (P::ServoStart, 0.6 * relief.width),
        (P::ServoFull, 0.6 * relief.width),
    ];
    let mut moves = vec![(P::ReliefSet, relief.width)];
    if !relief.known {
        moves.extend(servo);
    }
    if operating.known {
        l.one(P::OperatingSet, operating.width);
    } else {
        moves.push((P::OperatingSet, relief.width * ratio));
        // 0.5 to 4 bar (common practice): half to double the usual gap.
        l.many(
            "gap between charge and operating relief",
            &[(P::OperatingSet, 0.55 * GAP / operating_setting(unit))],
        );
    }
    l.many("charge relief setting", &moves);
    l.one(P::ReliefGain, 0.25);
    l.one(P::OperatingGain, 0.25);
    l.one(P::FlushOrifice, 0.4);
    l.one(P::ShuttleSpring, 0.3);

    l.many(
        "loop relief setting",
        &[
            (P::LoopReliefA, loop_relief.width),
            (P::LoopReliefB, loop_relief.width),
        ],
    );
    l.one(P::LoopReliefA, 0.015);
    l.one(P::LoopReliefB, 0.015);
    l.one(P::LoopOverride, 0.35);
    let follow = if limiter.known {
        limiter.width
    } else {
        loop_relief.width.max(0.05)
    };
    l.many(
        "pressure limiter setting",
        &[(P::LimiterA, follow), (P::LimiterB, follow)],
    );
    l.one(P::LimiterA, 0.012);
    l.one(P::LimiterB, 0.012);

    l.one(P::PumpLeak, leakage(P::PumpLeak, 0.35));
    l.one(P::PumpAcross, leakage(P::PumpAcross, 0.4));
    l.one(P::MotorLeak, leakage(P::MotorLeak, 0.35));
    l.one(P::MotorAcross, leakage(P::MotorAcross, 0.4));
    let motor = b(FigureId::MotorDisplacement);
    l.one(P::MotorDisp, if motor.known { motor.width } else { 0.3 });
    l.many(
        "loop hoses",
        &[
            (P::LineALaminar, 0.35),
            (P::LineBLaminar, 0.35),
            (P::LineATurbulent, 0.35),
            (P::LineBTurbulent, 0.35),
        ],
    );
    l.many("make-up checks", &[(P::CheckA, 0.3), (P::CheckB, 0.3)]);
    l.one(P::Friction, 0.35);
    l.one(P::Drag, 0.4);
    l.one(P::GearRatio, b(FigureId::GearRatio).width);
    l.one(P::Rolling, b(FigureId::RollingCircumference).width.min(0.2));

    l.one(P::SuctionLaminar, 0.4);
    l.one(P::SuctionTurbulent, 0.4);
    l.one(P::FilterLaminar, 0.45);
    l.one(P::Consumers, 0.5);
    l.one(P::ControlLeak, 0.4);
    l.one(P::MotorCaseLine, 0.4);
    l.many(
        "return line and cooler",
        &[(P::PumpCaseLine, 0.4), (P::PumpCaseTurbulent, 0.4)],
    );

    l.one(P::NullControl, 0.0012);
    l.one(P::NullServo, 0.0012);
    l.many(
        "full stroke",
        &[(P::GainForward, 0.015), (P::GainReverse, 0.015)],
    );
    l.one(P::GainForward, 0.012);
    l.one(P::GainReverse, 0.012);
    l.one(P::ServoStart, 0.12);
    l.one(P::ServoFull, 0.12);
    l.one(P::SenseStart, 0.08);
    l.one(P::SenseFull, 0.06);
    l.many(
        "control orifice",
        &[(P::ResponseOut, 0.3), (P::ResponseBack, 0.3)],
    );
    l.one(P::CurrentFull, b(FigureId::FullCurrent).width);
    l.one(P::PilotFull, b(FigureId::FullPilot).width);
    l.one(P::ReleaseShare, 0.02);
    l.one(P::ShiftShare, 0.02);
    l.one(P::EnginePower, 0.2);
    l.one(P::HeatRise, 0.18);
    l.one(P::AirTemperature, 6.0);
    let oil = b(FigureId::OilGrade);
    // The grade may be right and the oil in it sheared, mixed or of another index.
    l.one(P::Viscosity, if oil.known { 0.08 } else { oil.width });
    l
}

/// How a unit is described where a window rests on it: which of the figures that matter are known.
pub fn describe_basis(unit: &Unit) -> (usize, usize) {
    let first = &crate::unit::FIGURES[..5];
    (
        first.iter().filter(|f| unit.known(f.id).is_some()).count(),
        first.len(),
    )
}
