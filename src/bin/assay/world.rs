//! The world of the assay: machines that are not quite what the model believes, and readings as a mechanic takes them.
//!
//! It differs from the model on purpose: a turbulent share in the leakage, other override curves and line drops, heavier tails,
//! gauges with a bias even over their class, needles read to a quarter division, ports and sides mixed up now and then.

use lowside::assessment::At;
use lowside::circuit::{Network, Param, Params};
use lowside::faults::{self, Bend, Fault};
use lowside::machine::{
    Build, Latents, apply, base, builds, condition_latents, layout_for, scattered, unit_latents,
};
use lowside::math;
use lowside::quantity::{Kind, Measure};
use lowside::ranking::{Suspect, has_sides};
use lowside::readings::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Path, Place, Port, Reading,
    Seen, Stroked,
};
use lowside::record::Visit;
use lowside::unit::{
    Control, FIGURES, Figure, FigureId, Filter, MachineClass, Paths, Source, Tick, Ticks, Unit,
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
    /// With what tells a side: drain in drive, motor case, plateau, charge with one side driven alone.
    Sides,
}

impl ReadingSet {
    /// Every set, smallest first.
    pub const EACH: [ReadingSet; 5] = [
        ReadingSet::Charge,
        ReadingSet::Held,
        ReadingSet::Speeds,
        ReadingSet::All,
        ReadingSet::Sides,
    ];
}

/// How often something is wrong with the notes.
#[derive(Clone, Copy, Debug)]
pub struct Sloppiness {
    /// Chance of a wrong rigging.
    pub wrong: f64,
    /// Chance of swapped sides, or of directions taken for each other and the sides with them.
    pub swapped: f64,
}

impl Sloppiness {
    /// Nothing wrong.
    pub const CLEAN: Sloppiness = Sloppiness {
        wrong: 0.0,
        swapped: 0.0,
    };
    /// As notes are on a road call (common practice).
    pub const USUAL: Sloppiness = Sloppiness {
        wrong: 0.03,
        swapped: 1.0 / 15.0,
    };
}

fn one_of<T: Copy>(draw: &mut Normals, items: &[T]) -> T {
    items[((draw.unit() * items.len() as f64) as usize).min(items.len() - 1)]
}

/// Chance that a profile leaves a tick open that it could have told.
const OPEN: f64 = 0.3;

/// A real unit, its figures as its plate and manual say.
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

/// The unit as its profile declares it: the builder did not always look whether it flushes or has a limiter.
fn declared(real: &Unit, draw: &mut Normals) -> Unit {
    let mut out = real.clone();
    if draw.unit() < OPEN {
        out.ticks.flushing = Tick::Unknown;
    }
    if draw.unit() < OPEN {
        out.ticks.limiter = Tick::Unknown;
    }
    out
}

/// The readings of a set.
pub fn asked(set: ReadingSet) -> Vec<(Port, Condition)> {
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
        stroked: Stroked::Both,
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
    if set == ReadingSet::All {
        return out;
    }
    let alone = |stroked| Condition {
        stroked,
        ..free(Forward, Lever::Half)
    };
    out.extend([
        (Port::MotorDrain, free(Forward, Lever::Half)),
        (Port::MotorDrain, free(Reverse, Lever::Half)),
        (Port::MotorCase, neutral(EngineSpeed::HighIdle)),
        (Port::LoopB, free(Reverse, Lever::Full)),
        (Port::LoopA, held(Forward, 1.0)),
        (Port::LoopB, held(Reverse, 1.0)),
        (Port::Charge, alone(Stroked::Left)),
        (Port::Charge, alone(Stroked::Right)),
    ]);
    out
}

/// A fault at work in a hidden machine: how it shows, how badly, which way.
#[derive(Clone)]
struct Hidden {
    fault: &'static Fault,
    path: Path,
    effect: usize,
    severity: f64,
    sign: f64,
}

impl Hidden {
    fn draw(suspect: &Suspect, draw: &mut Normals) -> Hidden {
        let fault = suspect.fault;
        let u = draw.unit();
        let n = fault.effects.len();
        Hidden {
            fault,
            path: suspect.path.unwrap_or_default(),
            effect: ((draw.unit() * n as f64) as usize).min(n.saturating_sub(1)),
            severity: match fault.severity {
                faults::SeverityShape::Even => u,
                faults::SeverityShape::MostlyMild => u * u,
                faults::SeverityShape::MostlyBad => u.sqrt(),
                faults::SeverityShape::Total => 1.0,
            },
            sign: if draw.unit() < 0.5 { -1.0 } else { 1.0 },
        }
    }

    fn bend(&self, theta: &mut Params) {
        let Some(effect) = self.fault.effects.get(self.effect) else {
            return;
        };
        let (s, sign) = (self.severity, self.sign);
        let pump = theta[Param::PumpDisp.on(self.path)] / 75.0;
        let charge = theta[Param::ChargeDisp.on(self.path)] / 15.0;
        for (p, b) in effect.bends {
            let size = match p {
                Param::CheckLeakA | Param::CheckLeakB | Param::Bypass => pump,
                Param::ReliefHeld | Param::ConsumerLeak | Param::ServoLeak => charge,
                _ => 1.0,
            };
            let v = &mut theta[p.on(self.path)];
            match *b {
                Bend::Times(a, z) => *v *= a * math::pow(z / a, s),
                Bend::TimesLinear(a, z) => *v *= a + (z - a) * s,
                Bend::Plus(a, z) => *v += size * (a + (z - a) * s),
                Bend::PlusGeometric(a, z) => *v += size * a * math::pow(z / a, s),
                Bend::PlusEitherSign(a, z) => *v += sign * size * (a + (z - a) * s),
            }
        }
    }
}

/// Student-like scatter: a normal with now and then a wider one.
fn heavy(draw: &mut Normals) -> f64 {
    let k = if draw.unit() < TAIL_SHARE {
        TAIL_WIDTH
    } else {
        1.0
    };
    k * draw.normal()
}

/// Share of the wide draws, and how wide they are.
const TAIL_SHARE: f64 = 0.1;
const TAIL_WIDTH: f64 = 1.8;
/// Standard deviation of the world's scatter over the model's.
pub fn wider() -> f64 {
    (1.0 - TAIL_SHARE + TAIL_SHARE * TAIL_WIDTH * TAIL_WIDTH).sqrt()
}

/// Laws whose curves differ from the model's, and the standard deviation of the log of the factor.
pub const TILTED: [(Param, f64); 6] = [
    (Param::LoopOverride, 0.35),
    (Param::ReliefGain, 0.35),
    (Param::OperatingGain, 0.35),
    (Param::LineATurbulent, 0.35),
    (Param::LineBTurbulent, 0.35),
    (Param::Friction, 0.35),
];

/// Turbulent share of the leakage, L/min per √bar at 75 cm³/rev: side to side, and of each cartridge; least and most.
pub const TURBULENT: [(Param, f64, f64); 3] = [
    (Param::Bypass, 0.01, 0.04),
    (Param::CheckLeakA, 0.0, 0.02),
    (Param::CheckLeakB, 0.0, 0.02),
];

/// How alike left and right are in laws that the model does not know, standard deviation of the log.
const ALIKE: f64 = 0.12;

/// A hidden machine that answers any reading.
#[derive(Clone)]
pub struct Machine {
    /// As declared to the program.
    pub unit: Unit,
    real: Unit,
    build: Build,
    faults: Vec<Hidden>,
    scatter: Vec<f64>,
    own: u64,
    tilt: Vec<(usize, f64)>,
    turbulent: Vec<(usize, f64)>,
    /// Swash offset in neutral, share of stroke: of the control, or of the servo where its ports are bridged. None: as drawn.
    pub null: Option<f64>,
    /// Wear: parameters and the factor on each.
    pub worn: Vec<(Param, f64)>,
    /// Load on the yard's own flat and ramp, bar, lever against its stop: the same each time. None: as drawn.
    pub runs: Option<(f64, f64)>,
}

impl Machine {
    /// Draws a machine with these faults; none where the drawn unit cannot have one of them.
    pub fn draw(draw: &mut Normals, paths: Paths, suspects: &[Suspect]) -> Option<Machine> {
        let mut real = unit(draw);
        real.ticks.paths = paths;
        if suspects.iter().any(|s| (s.fault.possible)(&real) <= 0.0) {
            return None;
        }
        let build = builds(&real).into_iter().next()?;
        let scatter = unit_latents(&real).0.iter().map(|_| heavy(draw)).collect();
        let mut tilt: Vec<(usize, f64)> = TILTED
            .iter()
            .map(|(p, sd)| (p.on(Path::Left), math::exp(sd * draw.normal())))
            .collect();
        let seats = draw.unit();
        let mut turbulent: Vec<(usize, f64)> = TURBULENT
            .iter()
            .map(|(p, least, most)| {
                let u = if *p == Param::Bypass {
                    draw.unit()
                } else {
                    seats
                };
                (p.on(Path::Left), least + (most - least) * u)
            })
            .collect();
        if !paths.is_one() {
            // The right side is of the same make, and never quite the same.
            let right = Param::COUNT;
            let of_the_left = tilt.clone();
            tilt.extend(
                of_the_left
                    .iter()
                    .map(|(p, k)| (p + right, k * math::exp(ALIKE * draw.normal()))),
            );
            let of_the_left = turbulent.clone();
            turbulent.extend(
                of_the_left
                    .iter()
                    .map(|(p, leak)| (p + right, leak * math::exp(ALIKE * draw.normal()))),
            );
        }
        let unit = declared(&real, draw);
        Some(Machine {
            unit,
            build,
            faults: suspects.iter().map(|s| Hidden::draw(s, draw)).collect(),
            scatter,
            own: (draw.unit() * 1e15) as u64,
            tilt,
            turbulent,
            real,
            null: None,
            worn: Vec::new(),
            runs: None,
        })
    }

    /// How its faults show, for printing: effect, severity, sign.
    pub fn shows_how(&self) -> String {
        let each = self
            .faults
            .iter()
            .map(|f| format!("{}/{:.2}/{:+}", f.effect, f.severity, f.sign));
        each.collect::<Vec<_>>().join(", ")
    }

    /// True where the real unit can have a fault.
    pub fn can_have(&self, fault: &Fault) -> bool {
        (fault.possible)(&self.real) > 0.0
    }

    /// What the port really shows in a condition, and whether the needle swings: air in the oil, or a low side that empties.
    /// None where the machine has no steady state.
    pub fn shows_and_swings(
        &self,
        path: Path,
        port: Port,
        condition: &Condition,
    ) -> Option<(f64, bool)> {
        let before = apply(&self.build, &base(&self.build), condition);
        let mut latents: Latents = unit_latents(&self.real);
        let known = latents.0.len();
        condition_latents(&self.real, core::slice::from_ref(condition), &mut latents);
        let mut u = self.scatter.clone();
        for (i, latent) in latents.0.iter().enumerate().skip(known) {
            let again = latents.0[known..i].iter().any(|l| l.words == latent.words);
            u.push(self.of_condition(&latent.words, again, condition));
        }
        let mut theta = scattered(&before, &latents, 0, &u);
        for (place, k) in &self.tilt {
            theta[*place] *= k;
        }
        let size = theta[Param::PumpDisp as usize] / 75.0;
        for (place, leak) in &self.turbulent {
            theta[*place] += leak * size;
        }
        for f in &self.faults {
            f.bend(&mut theta);
        }
        for (p, factor) in &self.worn {
            theta[p.on(Path::Left)] *= factor;
        }
        if let Some((flat, ramp)) = self.runs {
            match condition.doing {
                Doing::Travel => theta[Param::Load as usize] = flat,
                Doing::Loaded => theta[Param::Load as usize] = ramp,
                _ => {}
            }
        }
        if let Some(offset) = self.null {
            let bridged = condition.doing == Doing::NeutralBridged;
            theta[Param::NullControl as usize] = if bridged { 0.0 } else { offset };
            theta[Param::NullServo as usize] = if bridged { offset } else { 0.0 };
        }
        for path in Path::BOTH {
            if condition.consumers_capped {
                // A capped consumer neither drinks nor leaks.
                theta[Param::ConsumerLeak.on(path)] = 0.0;
            }
            theta[Param::ServoFull.on(path)] =
                theta[Param::ServoFull.on(path)].max(1.2 * theta[Param::ServoStart.on(path)]);
            for p in [Param::Load, Param::SignalForward, Param::SignalReverse] {
                theta[p.on(path)] = theta[p.on(path)].max(0.0);
            }
        }
        let net = Network::new(layout_for(&self.build, condition));
        if port == Port::Knee {
            return net
                .knee(&theta, theta[Param::Speed as usize].max(1500.0))
                .ok()
                .map(|k| (k.value, false));
        }
        let solution = net.solve(&theta, None).ok()?;
        let starved =
            net.filled(path, &solution.state, &theta) < 0.97 || theta[Param::Air as usize] > 0.08;
        Some((net.reading_on(path, port, &solution, &theta), starved))
    }

    /// Scatter that belongs to a condition: what is shared (idle speeds, tachometer, place of the thermometer, load of the day)
    /// is drawn once a machine, the rest once a condition.
    fn of_condition(&self, words: &str, again: bool, condition: &Condition) -> f64 {
        // Against its stop in the yard's own runs the lever stands alike each time.
        let lever = words == "lever travel" && self.runs.is_none();
        let own = again && self.runs.is_none_or(|_| words != "lever travel")
            || lever
            || (words == "oil temperature" && condition.oil.is_none());
        let key = if own {
            format!("{words} {condition:?}")
        } else {
            format!(
                "{words} {:?} {:?}",
                condition.doing,
                condition.oil.map(|o| o.place)
            )
        };
        let key = match words {
            "low idle" | "high idle" | "tachometer" => words.to_string(),
            "lever travel" if self.runs.is_some() => words.to_string(),
            _ => key,
        };
        // FNV-1a: a stream of its own for each name.
        let hash = key.bytes().fold(0xcbf2_9ce4_8422_2325 ^ self.own, |h, b| {
            (h ^ u64::from(b)).wrapping_mul(0x0100_0000_01b3)
        });
        heavy(&mut Normals::new(hash))
    }
}

/// Full scale of the gauge on a port; none where it is no gauge.
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

/// What is wrong with a rigging.
#[derive(Clone, Copy)]
enum Rigged {
    Right,
    Lies(f64),
    On(Port),
}

/// The port that is taken for another by mistake.
fn mistaken(port: Port) -> Option<Port> {
    match port {
        Port::Charge => Some(Port::PumpCase),
        Port::LoopA | Port::LoopB => Some(Port::Charge),
        Port::PumpCase => Some(Port::MotorCase),
        Port::MotorCase => Some(Port::PumpCase),
        _ => None,
    }
}

/// The mechanic's notes: one bias an instrument, needles read to a quarter division, and what is mixed up.
pub struct Notes {
    sloppy: Sloppiness,
    sides: bool,
    directions: bool,
    instruments: Vec<(Path, Port, f64, Rigged)>,
    /// Whether a swinging needle is written down as one.
    careful: bool,
    draw: Normals,
}

impl Notes {
    /// Notes of one visit.
    pub fn new(draw: &mut Normals, sloppy: Sloppiness) -> Notes {
        let swapped = draw.unit() < sloppy.swapped;
        let which = draw.unit() < 0.5;
        Notes {
            sloppy,
            sides: swapped,
            directions: swapped && which,
            instruments: Vec::new(),
            careful: draw.unit() < 0.5,
            draw: Normals::new((draw.unit() * 1e15) as u64),
        }
    }

    /// True where anything is swapped.
    #[allow(dead_code)] // told in printed cases only
    pub fn swapped(&self) -> bool {
        self.sides
    }

    fn instrument(&mut self, path: Path, port: Port) -> (f64, Rigged) {
        let here = |(a, p, _, _): &&(Path, Port, f64, Rigged)| (*a, *p) == (path, port);
        if let Some((_, _, bias, rigged)) = self.instruments.iter().find(here) {
            return (*bias, *rigged);
        }
        // One gauge of each kind is moved from side to side.
        let moved = self.instruments.iter().find(|(_, p, _, _)| *p == port);
        let bias = match moved {
            Some((_, _, bias, _)) => *bias,
            None => 2.0 * self.draw.unit() - 1.0,
        };
        let wrong = self.draw.unit() < self.sloppy.wrong;
        let lies = Rigged::Lies(self.draw.normal());
        let rigged = match (wrong, mistaken(port)) {
            (false, _) => Rigged::Right,
            (true, Some(other)) if self.draw.unit() < 0.5 => Rigged::On(other),
            (true, _) => lies,
        };
        self.instruments.push((path, port, bias, rigged));
        (bias, rigged)
    }

    /// Takes a reading as it is written down, base unit, and whether a swing is noted; none where the machine has no steady state.
    pub fn take(
        &mut self,
        machine: &Machine,
        path: Path,
        port: Port,
        condition: &Condition,
    ) -> Option<(f64, bool)> {
        let (bias, rigged) = self.instrument(path, port);
        let mut at = port;
        if let Rigged::On(other) = rigged {
            at = other;
        }
        at = match at {
            Port::LoopA if self.sides => Port::LoopB,
            Port::LoopB if self.sides => Port::LoopA,
            p => p,
        };
        let run = if self.directions && !condition.doing.is_neutral() {
            condition.reversed()
        } else {
            *condition
        };
        let (value, swings) = machine.shows_and_swings(path, at, &run)?;
        let v = match span(port, value) {
            Some(s) => {
                let lie = if let Rigged::Lies(k) = rigged {
                    0.3 * s * k
                } else {
                    0.0
                };
                let division = s / 240.0;
                let needle = value + 0.016 * s * bias + lie + 0.3 * division * self.draw.normal();
                (needle / division).round() * division
            }
            None => {
                let lie = if let Rigged::Lies(k) = rigged {
                    math::exp(0.5 * k)
                } else {
                    1.0
                };
                let (shared, own) = share_off(port);
                value * (1.0 + shared * bias * 3f64.sqrt()) * lie * (1.0 + own * self.draw.normal())
            }
        };
        let noted = self.careful && self.draw.unit() < if swings { 0.8 } else { 0.04 };
        Some(if port.kind() == Kind::Pressure {
            (v, noted)
        } else {
            (v.max(0.0), false)
        })
    }

    /// Takes a reading into a visit's list.
    pub fn reading(
        &mut self,
        machine: &Machine,
        path: Path,
        port: Port,
        condition: &Condition,
        id: String,
    ) -> Option<Reading> {
        let (v, swings) = self.take(machine, path, port, condition)?;
        let measure = |v: f64| Measure::from_base(v, port.kind()).ok();
        let seen = if swings {
            let half = (0.06 * v.abs()).max(0.1);
            measure(v - half)
                .zip(measure(v + half))
                .map(|(low, high)| Seen::Swing { low, high })
        } else {
            measure(v).map(|value| Seen::Value { value })
        };
        Some(Reading {
            id,
            port,
            path,
            condition: *condition,
            rigging: String::new(),
            seen,
            typed: String::new(),
            note: String::new(),
        })
    }
}

/// Standard deviations of what a jug, a stopwatch or a counter is off by: shared by all its readings, and of each.
fn share_off(port: Port) -> (f64, f64) {
    match port {
        Port::MotorDrain | Port::ReturnFlow => (0.02, 0.03),
        Port::ResponseOut | Port::ResponseBack => (0.0, 0.12),
        Port::EngineSpeed | Port::PumpShaft => (0.005, 0.004),
        _ => (0.005, 0.012),
    }
}

/// A hidden machine and what was written down.
pub struct Case {
    /// The machine.
    pub machine: Machine,
    /// What was taken.
    pub visit: Visit,
    /// What is really wrong.
    pub faults: Vec<At>,
}

/// Draws a case. None where the unit cannot have the faults, or the machine has no steady state in a reading.
pub fn case(
    draw: &mut Normals,
    paths: Paths,
    suspects: &[Suspect],
    set: ReadingSet,
    sloppy: Sloppiness,
) -> Option<Case> {
    let machine = Machine::draw(draw, paths, suspects)?;
    let mut notes = Notes::new(draw, sloppy);
    let mut readings = Vec::new();
    for (port, condition) in asked(set).iter() {
        let sides = if has_sides(&machine.unit, *port) {
            &Path::BOTH[..]
        } else {
            &Path::BOTH[..1]
        };
        for path in sides {
            let id = format!("r{}", readings.len());
            readings.push(notes.reading(&machine, *path, *port, condition, id)?);
        }
    }
    Some(Case {
        visit: Visit {
            id: "v".into(),
            unit: "u".into(),
            readings,
            ..Visit::default()
        },
        faults: suspects.iter().map(|s| s.at()).collect(),
        machine,
    })
}
