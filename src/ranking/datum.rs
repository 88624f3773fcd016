//! Readings made ready for the likelihood: on a scale where the circuit's answer is near a straight line in its scatter,
//! with what the instrument alone makes uncertain.

use super::accuracy::{Accuracy, accuracy};
use super::belief::Belief;
use crate::machine::Warmth;
use crate::math;
use crate::readings::instrument::Instrument;
use crate::readings::{Condition, Doing, JugCatch, Path, Port, Reading, Rigging, Seen};
use crate::record::Visit;
use crate::unit::{FigureId, Paths, Unit};
use std::collections::BTreeMap;

/// What kind of statement a datum makes.
#[derive(Clone, Debug, PartialEq)]
pub enum Says {
    /// The value itself.
    Value,
    /// At least this much (off the scale).
    AtLeast,
    /// Nothing: zero, or a coupling that is not home.
    Nothing,
    /// Share of the same port's reading in another condition (index into the conditions).
    Share(usize),
}

/// A reading ready for the likelihood.
#[derive(Clone, Debug)]
pub struct Datum {
    /// Index into the visit's readings.
    pub reading: usize,
    /// Port.
    pub port: Port,
    /// Path it is on.
    pub path: Path,
    /// Index into the conditions.
    pub condition: usize,
    /// What it says.
    pub says: Says,
    /// Value on the transformed scale.
    pub t: f64,
    /// Value in the base unit.
    pub value: f64,
    /// Standard uncertainty of its own on the transformed scale: needle, swing, counting, model discrepancy.
    pub own: f64,
    /// Effect on the transformed scale of one standard deviation of its instrument's bias.
    pub bias: f64,
    /// Group that is right or wrong together: one instrument on one port.
    pub group: usize,
    /// Instrument whose bias it has: one that is moved from port to port keeps it, so that differences on it are sharp.
    pub gauge: usize,
    /// The needle swung.
    pub swung: bool,
    /// Standard uncertainty of the instrument alone in the base unit.
    pub instrument: f64,
}

/// Value under which a port's scale turns from ratios to differences, base unit.
pub fn floor(port: Port) -> f64 {
    match port {
        Port::Charge | Port::Servo | Port::Pilot | Port::Release | Port::Shift => 1.0,
        Port::LoopA | Port::LoopB => 8.0,
        Port::LoopDifference => 10.0,
        Port::PumpCase | Port::MotorCase => 0.4,
        Port::InletPull => 0.1,
        Port::CoilCurrent => 40.0,
        Port::MotorDrain => 0.2,
        Port::ReturnFlow => 1.0,
        Port::EngineSpeed | Port::PumpShaft | Port::Knee => 50.0,
        Port::MotorShaft => 10.0,
        Port::Wheel => 0.5,
        Port::Ground => 0.1,
        Port::ResponseOut | Port::ResponseBack => 0.2,
        Port::SettledTemperature => 30.0,
    }
}

/// The transformed scale: ln of the value where it is large, straight near zero (asinh).
pub fn transform(port: Port, value: f64) -> f64 {
    let s = floor(port);
    let x = value.abs() / s;
    let t = math::ln(x + (x * x + 1.0).sqrt());
    if value < 0.0 { -t } else { t }
}

/// Back from the transformed scale to the base unit.
pub fn untransform(port: Port, t: f64) -> f64 {
    floor(port) * 0.5 * (math::exp(t) - math::exp(-t))
}

/// Slope of [`transform`].
pub fn slope(port: Port, value: f64) -> f64 {
    let s = floor(port);
    1.0 / (value * value + s * s).sqrt()
}

/// Share of a value by which a circuit of elements is off although its figures are right: laws that are a little too plain
/// (turbulent share of leakage, curves of overrides). A stated term with a size, held in the assay against a world that differs.
fn discrepancy(port: Port) -> f64 {
    match port {
        Port::LoopA | Port::LoopB | Port::LoopDifference => 0.045,
        Port::MotorDrain
        | Port::ReturnFlow
        | Port::PumpCase
        | Port::MotorCase
        | Port::InletPull => 0.045,
        Port::ResponseOut | Port::ResponseBack => 0.12,
        Port::Knee => 0.03,
        Port::MotorShaft | Port::Wheel | Port::Ground => 0.015,
        _ => 0.0075,
    }
}

/// A reading that leakage decides, so that cold or unknown oil makes it worthless.
fn leakage_decides(port: Port, doing: Doing) -> bool {
    port == Port::MotorDrain || doing == Doing::Held
}

/// Kinematic viscosity (mm²/s) over which no verdict on leakage is given. Common practice.
const TOO_THICK: f64 = 60.0;

/// What came of the readings of a visit.
#[derive(Clone, Debug, Default)]
pub struct Data {
    /// Distinct conditions.
    pub conditions: Vec<Condition>,
    /// Condition of each reading.
    pub condition_of: Vec<usize>,
    /// Data that the ranking uses.
    pub data: Vec<Datum>,
    /// Reading index and reason, for readings that say nothing.
    pub silent: Vec<(usize, String)>,
    /// Number of bias groups.
    pub groups: usize,
    /// Port and readings of each group.
    pub group_ports: Vec<Port>,
    /// Readings by index that a jug gave, with how sure its litres and seconds make them.
    pub caught: BTreeMap<usize, Accuracy>,
    /// What the ranking takes for granted.
    pub belief: Belief,
}

fn condition_index(conditions: &mut Vec<Condition>, condition: &Condition) -> usize {
    match conditions.iter().position(|c| c == condition) {
        Some(i) => i,
        None => {
            conditions.push(*condition);
            conditions.len() - 1
        }
    }
}

/// Which instrument stands on the port of a reading: the reading's own rigging, else the last rigging of its port.
pub fn instrument_of<'a>(
    reading: &Reading,
    riggings: &[Rigging],
    instruments: &'a [Instrument],
) -> Option<&'a Instrument> {
    let own = riggings
        .iter()
        .find(|r| r.id == reading.rigging && !r.id.is_empty());
    let rigging = own.or_else(|| riggings.iter().rev().find(|r| r.port == reading.port))?;
    instruments.iter().find(|i| i.id == rigging.instrument)
}

/// Name of what is wrong together with a reading: its rigging, else its port.
fn group_key(reading: &Reading, riggings: &[Rigging]) -> String {
    let own = riggings
        .iter()
        .find(|r| r.id == reading.rigging && !r.id.is_empty());
    match own.or_else(|| riggings.iter().rev().find(|r| r.port == reading.port)) {
        // A wrong port is wrong for one place only.
        Some(r) => format!("{}/{:?}/{:?}", r.instrument, reading.port, reading.path),
        None => format!("/{:?}/{:?}", reading.port, reading.path),
    }
}

/// Null that a sound machine may have, share of full stroke, 1 sigma. Common practice.
const SOUND_NULL: f64 = 0.006;

/// A sound machine's creep: breakaway friction holds a small null or lets it go, so that no slope at standstill can tell how
/// far it scatters. Its spread is stated as a share of full speed instead.
fn creep_own(unit: &Unit, d: &Datum) -> f64 {
    let figure = |id| {
        unit.known(id)
            .unwrap_or_else(|| unit.class.spread(id).value)
    };
    let motors = f64::from(unit.ticks.motors.clamp(1, 4));
    let shaft = figure(FigureId::PumpDisplacement) * figure(FigureId::HighIdle)
        / (figure(FigureId::MotorDisplacement) * motors);
    let wheel = shaft / figure(FigureId::GearRatio).max(1e-3);
    let full = match d.port {
        Port::MotorShaft => shaft,
        Port::Wheel => wheel,
        Port::Ground => wheel * figure(FigureId::RollingCircumference) * 0.06,
        _ => return d.own,
    };
    let spread = SOUND_NULL * full * slope(d.port, d.value);
    (d.own * d.own + spread * spread).sqrt()
}

/// True where a unit has a port on either side.
pub fn has_sides(unit: &Unit, port: Port) -> bool {
    match unit.ticks.paths {
        Paths::One => false,
        Paths::TwoSharedCharge => !port.is_common(),
        Paths::TwoOwnCharge => !matches!(
            port,
            Port::EngineSpeed | Port::PumpShaft | Port::SettledTemperature
        ),
    }
}

/// Path whose port a reading was taken on: left where there is one only, or where both share the port.
pub fn path_of(unit: &Unit, reading: &Reading) -> Path {
    if has_sides(unit, reading.port) {
        reading.path
    } else {
        Path::Left
    }
}

/// Sorts out what the readings of a visit say.
pub fn gather(
    unit: &Unit,
    readings: &[Reading],
    riggings: &[Rigging],
    instruments: &[Instrument],
) -> Data {
    gather_with(unit, readings, riggings, instruments, Belief::default())
}

/// As [`gather`], with other assumptions than the usual ones.
pub fn gather_with(
    unit: &Unit,
    readings: &[Reading],
    riggings: &[Rigging],
    instruments: &[Instrument],
    belief: Belief,
) -> Data {
    gather_caught(
        unit,
        readings,
        riggings,
        instruments,
        &BTreeMap::new(),
        belief,
    )
}

/// As [`gather_with`], with all that a visit keeps of its readings: what was caught in a jug for a flow is as sure as its litres and
/// seconds.
pub fn gather_visit(
    unit: &Unit,
    visit: &Visit,
    instruments: &[Instrument],
    belief: Belief,
) -> Data {
    gather_caught(
        unit,
        &visit.readings,
        &visit.riggings,
        instruments,
        &visit.caught,
        belief,
    )
}

fn gather_caught(
    unit: &Unit,
    readings: &[Reading],
    riggings: &[Rigging],
    instruments: &[Instrument],
    caught: &BTreeMap<String, JugCatch>,
    belief: Belief,
) -> Data {
    let mut out = Data {
        belief,
        ..Data::default()
    };
    let mut keys: Vec<String> = Vec::new();
    let mut gauges: Vec<String> = Vec::new();
    for (index, reading) in readings.iter().enumerate() {
        let condition = condition_index(&mut out.conditions, &reading.condition);
        out.condition_of.push(condition);
        let Some(seen) = &reading.seen else { continue };
        let warmth = Warmth::of(unit, &reading.condition);
        if leakage_decides(reading.port, reading.condition.doing)
            && warmth.taken
            && (warmth.kinematic > TOO_THICK || warmth.celsius < 38.0)
        {
            let why = format!(
                "Oil at {:.0} °C is too thick ({:.0} mm²/s) to judge leakage: warm it up and take this again.",
                warmth.celsius, warmth.kinematic
            );
            out.silent.push((index, why));
            continue;
        }
        if !unit.ticks.paths.is_one() && matches!(reading.port, Port::EngineSpeed | Port::Ground) {
            let why = format!(
                "{} is not judged on a machine with two paths: both work on it. Count the wheel turns of each side instead.",
                reading.port.words()
            );
            out.silent.push((index, why));
            continue;
        }
        let instrument = instrument_of(reading, riggings, instruments);
        let Some((says, value, swing)) = statement(seen, &mut out.conditions) else {
            continue;
        };
        let made = caught.get(&reading.id).and_then(|jug| jug.behind(reading));
        let a = match made {
            Some(made) => Accuracy {
                bias: made.bias,
                own: made.reading.max(1e-6),
            },
            None => accuracy(instrument, reading.port, value),
        };
        if made.is_some() {
            out.caught.insert(index, a);
        }
        let key = group_key(reading, riggings);
        let gauge = match instrument {
            Some(i) => i.id.clone(),
            // One gauge of each kind is moved from side to side, where nobody says otherwise.
            None => format!("/{:?}", reading.port),
        };
        let gauge = gauges.iter().position(|g| *g == gauge).unwrap_or_else(|| {
            gauges.push(gauge);
            gauges.len() - 1
        });
        let group = keys.iter().position(|k| *k == key).unwrap_or_else(|| {
            keys.push(key);
            out.group_ports.push(reading.port);
            keys.len() - 1
        });
        let mut made = datum(
            index,
            reading.port,
            path_of(unit, reading),
            condition,
            says,
            value,
            swing,
            a,
            group,
            out.belief.discrepancy * discrepancy(reading.port),
        );
        if reading.condition.doing == Doing::NeutralFree {
            made.own = creep_own(unit, &made);
        }
        made.gauge = gauge;
        out.data.push(made);
    }
    out.groups = keys.len();
    out
}

/// What is said, its value, and the standard spread of a swing.
fn statement(seen: &Seen, conditions: &mut Vec<Condition>) -> Option<(Says, f64, Option<f64>)> {
    match seen {
        Seen::Value { value } => Some((Says::Value, value.base(), None)),
        Seen::Swing { low, high } => {
            let (a, b) = (low.base(), high.base());
            // Rectangular between the ends (JCGM 100, 4.3.7).
            Some((
                Says::Value,
                0.5 * (a + b),
                Some(0.5 * (b - a).abs() / 3f64.sqrt()),
            ))
        }
        Seen::OffScale { top } => Some((Says::AtLeast, top.base(), None)),
        Seen::Nothing => Some((Says::Nothing, 0.0, None)),
        Seen::ShareOf { share, other } if *share > 0.0 && share.is_finite() => Some((
            Says::Share(condition_index(conditions, other)),
            *share,
            None,
        )),
        Seen::ShareOf { .. } | Seen::NotPossible { .. } => None,
    }
}

#[allow(clippy::too_many_arguments)] // one place, private: the parts of one reading
fn datum(
    reading: usize,
    port: Port,
    path: Path,
    condition: usize,
    says: Says,
    value: f64,
    swing: Option<f64>,
    a: Accuracy,
    group: usize,
    discrepancy: f64,
) -> Datum {
    let (t, own, bias) = match says {
        Says::Share(_) => {
            // The scale error of one instrument drops out of a ratio; an offset does not quite.
            (
                math::ln(value),
                (0.02f64.powi(2) + discrepancy.powi(2)).sqrt(),
                0.0,
            )
        }
        _ => {
            let k = slope(port, value);
            let needle = (a.own * a.own + swing.unwrap_or(0.0).powi(2)).sqrt() * k;
            let model = discrepancy * value.abs() * k;
            (
                transform(port, value),
                (needle * needle + model * model + 0.25 * a.own * a.own * k * k).sqrt(),
                a.bias * k,
            )
        }
    };
    let instrument = (a.own * a.own + a.bias * a.bias).sqrt();
    Datum {
        reading,
        port,
        path,
        condition,
        says,
        t,
        value,
        own: own.max(1e-4),
        bias,
        group,
        gauge: 0,
        swung: swing.is_some(),
        instrument,
    }
}
