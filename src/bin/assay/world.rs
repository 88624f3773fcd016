//! The world of the assay: machines that are not quite what the model believes, and readings as a mechanic takes them.
//!
//! It differs from the model on purpose: a turbulent share in the leakage, other override curves and line drops, heavier tails,
//! gauges with a bias even over their class, needles read to a quarter division, ports and sides mixed up now and then.

use lowside::circuit::{Network, Param, Params};
use lowside::faults::{self, Bend, Fault, FaultId};
use lowside::machine::{
    Latents, apply, base, builds, condition_latents, layout_for, scattered, unit_latents,
};
use lowside::math;
use lowside::quantity::{Kind, Measure};
use lowside::readings::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Place, Port, Reading, Seen,
};
use lowside::record::Visit;
use lowside::unit::{
    Control, FIGURES, Figure, FigureId, Filter, MachineClass, Source, Tick, Ticks, Unit,
};
use lowside::windows::Normals;

/// Which readings are taken.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ReadingSet {
    /// Charge pressures only.
    Charge,
    /// With staged held loop pressures.
    Held,
    /// With speeds and creep.
    Speeds,
    /// All: drains, return, cases, inlet, knee.
    All,
}

impl ReadingSet {
    /// Every set, smallest first.
    pub const EACH: [ReadingSet; 4] = [
        ReadingSet::Charge,
        ReadingSet::Held,
        ReadingSet::Speeds,
        ReadingSet::All,
    ];
}

/// How often something is wrong with the notes.
#[derive(Clone, Copy, Debug)]
pub struct Sloppiness {
    /// Chance of a wrong rigging.
    pub wrong: f64,
    /// Chance of swapped sides.
    pub swapped: f64,
}

/// A hidden machine and what was written down.
pub struct Case {
    /// As declared to the program.
    pub unit: Unit,
    /// What was taken.
    pub visit: Visit,
    /// What is really wrong.
    pub fault: FaultId,
}

fn one_of<T: Copy>(draw: &mut Normals, items: &[T]) -> T {
    items[((draw.unit() * items.len() as f64) as usize).min(items.len() - 1)]
}

/// A declared unit: five figures known more or less, some ticks open.
fn unit(draw: &mut Normals) -> Unit {
    let class = one_of(draw, &MachineClass::ALL);
    let mut u = Unit {
        id: "u".into(),
        class,
        ..Unit::default()
    };
    let yes = |draw: &mut Normals, p: f64| if draw.unit() < p { Tick::Yes } else { Tick::No };
    let practice = class.practice();
    u.ticks = Ticks {
        flushing: yes(draw, practice.flushing),
        limiter: yes(draw, practice.limiter),
        control: one_of(
            draw,
            &[
                Control::ManualFeedback,
                Control::ElectricProportional,
                Control::HydraulicRemote,
            ],
        ),
        filter: one_of(
            draw,
            &[
                Filter::Suction,
                Filter::PressureGaugeAfter,
                Filter::PressureGaugeBefore,
            ],
        ),
        brake_from_charge: yes(draw, practice.brake),
        two_speed: yes(draw, practice.two_speed),
        bypass: Tick::Yes,
        slipping_drive: Tick::No,
        ..Ticks::default()
    };
    for id in [
        FigureId::PumpDisplacement,
        FigureId::ChargeDisplacement,
        FigureId::HighIdle,
        FigureId::LowIdle,
        FigureId::ChargeSetting,
        FigureId::LoopRelief,
        FigureId::MotorDisplacement,
        FigureId::OilGrade,
        FigureId::GearRatio,
    ] {
        let s = class.spread(id);
        let Some(ask) = FIGURES.iter().find(|f| f.id == id) else {
            continue;
        };
        let value = (s.value * math::exp(0.25 * draw.normal())).clamp(ask.low, ask.high);
        let value = Measure::from_base(value, ask.kind).ok();
        u.figures.insert(
            id,
            Figure {
                value,
                typed: String::new(),
                source: Source::Manual,
            },
        );
    }
    u
}

fn asked(set: ReadingSet) -> Vec<(Port, Condition)> {
    let c = |doing, direction, lever, engine| Condition {
        doing,
        direction,
        lever,
        engine,
        oil: Measure::from_base(62.0, Kind::Temperature)
            .ok()
            .map(|value| OilTemperature {
                value,
                place: Place::DrainHose,
            }),
        flushing_blocked: false,
        consumers_capped: false,
    };
    use Direction::{Forward, Reverse};
    let rpm = Measure::from_base(1500.0, Kind::RotationalSpeed)
        .map_or(EngineSpeed::LowIdle, EngineSpeed::Measured);
    let neutral = |e| c(Doing::Neutral, Forward, Lever::Full, e);
    let free = |d, l| c(Doing::Free, d, l, EngineSpeed::HighIdle);
    let held = |d, s| c(Doing::Held, d, Lever::Share(s), rpm);
    let mut out = vec![
        (Port::Charge, neutral(EngineSpeed::LowIdle)),
        (Port::Charge, neutral(EngineSpeed::HighIdle)),
        (Port::Charge, free(Forward, Lever::Half)),
        (Port::Charge, free(Reverse, Lever::Half)),
    ];
    if set == ReadingSet::Charge {
        return out;
    }
    out.extend([
        (Port::LoopA, held(Forward, 0.1)),
        (Port::LoopA, held(Forward, 0.3)),
        (Port::LoopB, held(Reverse, 0.1)),
        (Port::LoopB, held(Reverse, 0.3)),
    ]);
    if set == ReadingSet::Held {
        return out;
    }
    out.extend([
        (Port::Wheel, free(Forward, Lever::Full)),
        (Port::Wheel, free(Reverse, Lever::Full)),
        (
            Port::Wheel,
            c(Doing::Loaded, Forward, Lever::Full, EngineSpeed::HighIdle),
        ),
        (
            Port::Wheel,
            c(
                Doing::NeutralFree,
                Forward,
                Lever::Full,
                EngineSpeed::HighIdle,
            ),
        ),
        (Port::ResponseOut, free(Forward, Lever::Full)),
    ]);
    if set == ReadingSet::Speeds {
        return out;
    }
    out.extend([
        (Port::MotorDrain, neutral(EngineSpeed::HighIdle)),
        (Port::ReturnFlow, neutral(EngineSpeed::LowIdle)),
        (Port::ReturnFlow, neutral(EngineSpeed::HighIdle)),
        (Port::PumpCase, neutral(EngineSpeed::HighIdle)),
        (Port::InletPull, neutral(EngineSpeed::HighIdle)),
        (Port::PumpShaft, neutral(EngineSpeed::HighIdle)),
        (Port::LoopA, free(Forward, Lever::Full)),
    ]);
    out
}

/// Bends as the world has them: ten per cent to either side of the catalogue's ends.
fn world_bend(theta: &mut Params, fault: &Fault, draw: &mut Normals) {
    if fault.effects.is_empty() {
        return;
    }
    let effect = fault.effects
        [((draw.unit() * fault.effects.len() as f64) as usize).min(fault.effects.len() - 1)];
    let u = draw.unit();
    let s = match fault.severity {
        faults::SeverityShape::Even => u,
        faults::SeverityShape::MostlyMild => u * u,
        faults::SeverityShape::MostlyBad => u.sqrt(),
        faults::SeverityShape::Total => 1.0,
    };
    let sign = if draw.unit() < 0.5 { -1.0 } else { 1.0 };
    let pump = theta[Param::PumpDisp as usize] / 75.0;
    let charge = theta[Param::ChargeDisp as usize] / 15.0;
    for (p, b) in effect.bends {
        let size = match p {
            Param::CheckLeakA | Param::CheckLeakB | Param::Bypass => pump,
            Param::ReliefHeld | Param::ConsumerLeak | Param::ServoLeak => charge,
            _ => 1.0,
        };
        let v = &mut theta[*p as usize];
        match *b {
            Bend::Times(a, z) => *v *= a * math::pow(z / a, s),
            Bend::TimesLinear(a, z) => *v *= a + (z - a) * s,
            Bend::Plus(a, z) => *v += size * (a + (z - a) * s),
            Bend::PlusGeometric(a, z) => *v += size * a * math::pow(z / a, s),
            Bend::PlusEitherSign(a, z) => *v += sign * size * (a + (z - a) * s),
        }
    }
}

/// Student-like scatter: a normal with now and then a wider one.
fn heavy(draw: &mut Normals) -> f64 {
    let k = if draw.unit() < 0.1 { 1.8 } else { 1.0 };
    k * draw.normal()
}

/// Span of the gauge on a port and whether it is a gauge.
fn span(port: Port, value: f64) -> Option<f64> {
    match port.kind() {
        Kind::Pressure => Some(match port {
            Port::LoopA | Port::LoopB => 600.0,
            Port::PumpCase | Port::MotorCase => 10.0,
            Port::InletPull => 1.0,
            _ => {
                if value > 38.0 {
                    60.0
                } else {
                    40.0
                }
            }
        }),
        _ => None,
    }
}

/// Draws a case with one hidden fault that the unit can have. None where the machine has no steady state in a reading.
pub fn case(
    draw: &mut Normals,
    fault: &Fault,
    set: ReadingSet,
    sloppy: Sloppiness,
) -> Option<Case> {
    let unit = unit(draw);
    if (fault.possible)(&unit) <= 0.0 {
        return None;
    }
    let build = builds(&unit).into_iter().next()?;
    let list = asked(set);
    let conditions: Vec<Condition> = list.iter().map(|(_, c)| *c).collect();
    let mut distinct: Vec<Condition> = Vec::new();
    for c in &conditions {
        if !distinct.contains(c) {
            distinct.push(*c);
        }
    }
    let mut latents: Latents = unit_latents(&unit);
    condition_latents(&unit, &distinct, &mut latents);
    let u: Vec<f64> = latents.0.iter().map(|_| heavy(draw)).collect();
    // What the model does not know.
    let turbulent = (0.01 + 0.03 * draw.unit(), 0.02 * draw.unit());
    let tilt: Vec<(Param, f64)> = [
        Param::LoopOverride,
        Param::ReliefGain,
        Param::OperatingGain,
        Param::LineATurbulent,
        Param::LineBTurbulent,
        Param::Friction,
    ]
    .iter()
    .map(|p| (*p, math::exp(0.35 * draw.normal())))
    .collect();
    let fault_draw = draw.clone();
    let mut readings = Vec::new();
    let mut biases: Vec<(Port, f64)> = Vec::new();
    let mut shown = Vec::new();
    for (port, condition) in &list {
        let c = distinct.iter().position(|d| d == condition)?;
        let before = apply(&build, &base(&build), condition);
        let mut theta = scattered(&before, &latents, c, &u);
        for (p, k) in &tilt {
            theta[*p as usize] *= k;
        }
        let size = theta[Param::PumpDisp as usize] / 75.0;
        theta[Param::Bypass as usize] += turbulent.0 * size;
        theta[Param::CheckLeakA as usize] += turbulent.1 * size;
        theta[Param::CheckLeakB as usize] += turbulent.1 * size;
        world_bend(&mut theta, fault, &mut fault_draw.clone());
        theta[Param::ServoFull as usize] =
            theta[Param::ServoFull as usize].max(1.2 * theta[Param::ServoStart as usize]);
        for p in [Param::Load, Param::SignalForward, Param::SignalReverse] {
            theta[p as usize] = theta[p as usize].max(0.0);
        }
        let net = Network::new(layout_for(&build, condition));
        let solution = net.solve(&theta, None).ok()?;
        shown.push(net.reading(*port, &solution, &theta));
    }
    let _ = fault_draw;
    for _ in 0..7 {
        draw.unit();
    }
    let swapped = draw.unit() < sloppy.swapped;
    for (i, (port, condition)) in list.iter().enumerate() {
        let mut value = shown[i];
        if swapped && matches!(port, Port::LoopA | Port::LoopB) {
            // The other side's pressure was written down: in a held check the low side stands near charge.
            value = shown[1].min(value);
        }
        let bias = match biases.iter().find(|(p, _)| p == port) {
            Some((_, b)) => *b,
            None => {
                let b = match span(*port, value) {
                    Some(s) => {
                        0.016 * s * (2.0 * draw.unit() - 1.0)
                            + if draw.unit() < sloppy.wrong {
                                0.3 * s * draw.normal()
                            } else {
                                0.0
                            }
                    }
                    None => {
                        0.008 * value * draw.normal()
                            + if draw.unit() < sloppy.wrong {
                                0.5 * value * draw.normal()
                            } else {
                                0.0
                            }
                    }
                };
                biases.push((*port, b));
                b
            }
        };
        let mut v = value + bias;
        v = match span(*port, value) {
            Some(s) => {
                let division = s / 240.0;
                ((v + 0.3 * division * draw.normal()) / division).round() * division
            }
            None => v * (1.0 + 0.012 * draw.normal()),
        };
        if port.kind() != Kind::Pressure {
            v = v.max(0.0);
        }
        readings.push(Reading {
            id: format!("r{i}"),
            port: *port,
            condition: *condition,
            rigging: String::new(),
            seen: Measure::from_base(v, port.kind())
                .ok()
                .map(|value| Seen::Value { value }),
            typed: String::new(),
            note: String::new(),
        });
    }
    Some(Case {
        unit,
        visit: Visit {
            id: "v".into(),
            unit: "u".into(),
            readings,
            ..Visit::default()
        },
        fault: fault.id,
    })
}
