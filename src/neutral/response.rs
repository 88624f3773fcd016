//! What a unit shows at each swash offset, from the solved circuit, over an ensemble of machines that fit its profile.

use super::curve::Curve;
use crate::circuit::{Network, Param, Params};
use crate::machine::{
    Latents, apply, base, builds, condition_latents, layout_for, scattered, unit_latents,
};
use crate::readings::{Condition, Doing, Port};
use crate::unit::Unit;
use crate::windows::Normals;

/// Machines in the ensemble.
pub const DRAWS: usize = 144;
/// Seed of the draws: the same answer each time and on every target.
const SEED: u64 = 0x0FF5_E700;
/// Factor on the scatter, as in the ranking: a little wider than believed costs nothing where the model is right.
const WIDER: f64 = 1.25;
/// Offsets that are solved, share of full stroke: close where the dead zones end.
pub const SOLVED: [f64; 18] = [
    0.0, 0.001, 0.002, 0.0035, 0.005, 0.0065, 0.008, 0.01, 0.0125, 0.016, 0.02, 0.026, 0.035, 0.05,
    0.07, 0.1, 0.14, 0.2,
];
/// Largest offset that is thought of, share of full stroke.
pub const LARGEST: f64 = 0.2;

/// What is read to find the offset.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Shows {
    /// Turning speed of the driven wheel or sprocket, rpm, wheels free; forward positive.
    Creep,
    /// As [`Shows::Creep`], with the servo ports bridged: the servo alone is at work.
    CreepBridged,
    /// Loop difference A − B, bar, motor held.
    Difference,
}

impl Shows {
    /// What the machine is doing.
    #[must_use]
    pub fn doing(self) -> Doing {
        match self {
            Shows::Creep => Doing::NeutralFree,
            Shows::CreepBridged => Doing::NeutralBridged,
            Shows::Difference => Doing::Neutral,
        }
    }

    /// The port that it is read at.
    fn port(self) -> Port {
        match self {
            Shows::Creep | Shows::CreepBridged => Port::Wheel,
            Shows::Difference => Port::LoopDifference,
        }
    }

    /// What the circuit does not know of, as a share of the reading: leakage that is not laminar, drag that changes with the
    /// place of the wheel. Common practice.
    #[must_use]
    pub fn discrepancy(self) -> f64 {
        match self {
            Shows::Creep | Shows::CreepBridged => 0.03,
            Shows::Difference => 0.10,
        }
    }
}

/// Curves of one machine of the ensemble: one for each thing asked, in that order.
#[derive(Clone, Debug)]
pub struct Machine {
    /// Curves.
    pub curves: Vec<Curve>,
    /// Share of a servo offset that the feedback leaves in the swash when the ports are not bridged.
    pub left_by_feedback: f64,
    /// Servo pressure over case at which the swash starts, bar.
    pub servo_start: f64,
    /// Servo pressure over case for full stroke, bar.
    pub servo_full: f64,
}

/// The ensemble for a unit and what is read on it, each in its condition (whose `doing` is set by what is read). Machines that
/// come to no steady state somewhere are left out.
#[must_use]
pub fn machines(unit: &Unit, asked: &[(Shows, Condition)]) -> Vec<Machine> {
    let asked: Vec<(Shows, Condition)> = asked
        .iter()
        .map(|(shows, condition)| (*shows, in_neutral(*shows, condition)))
        .collect();
    let conditions: Vec<Condition> = asked.iter().map(|(_, condition)| *condition).collect();
    let mut latents = unit_latents(unit);
    condition_latents(unit, &conditions, &mut latents);
    let builds = builds(unit);
    let mut draw = Normals::new(SEED);
    let mut out = Vec::with_capacity(DRAWS);
    let (mut which, mut sum) = (0, 0.0);
    for i in 0..DRAWS {
        // Builds in proportion to their shares.
        let place = (i as f64 + 0.5) / DRAWS as f64;
        while which + 1 < builds.len() && builds.get(which).is_some_and(|b| sum + b.share < place) {
            sum += builds.get(which).map_or(0.0, |b| b.share);
            which += 1;
        }
        let wide: Vec<f64> = draw
            .many(latents.0.len())
            .into_iter()
            .map(|u| WIDER * u)
            .collect();
        if let Some(build) = builds.get(which)
            && let Some(machine) = machine(build, &asked, &latents, &wide)
        {
            out.push(machine);
        }
    }
    out
}

/// A neutral condition in which this is read: levers and directions say nothing there.
fn in_neutral(shows: Shows, condition: &Condition) -> Condition {
    Condition {
        doing: shows.doing(),
        engine: condition.engine,
        oil: condition.oil,
        flushing_blocked: condition.flushing_blocked,
        consumers_capped: condition.consumers_capped,
        ..Condition::start()
    }
}

fn machine(
    build: &crate::machine::Build,
    asked: &[(Shows, Condition)],
    latents: &Latents,
    wide: &[f64],
) -> Option<Machine> {
    let plain = base(build);
    let mut curves = Vec::with_capacity(asked.len());
    let mut theta = plain;
    for (i, (shows, condition)) in asked.iter().enumerate() {
        let network = Network::new(layout_for(build, condition));
        theta = scattered(&apply(build, &plain, condition), latents, i, wide);
        curves.push(curve(&network, *shows, theta)?);
    }
    if asked.is_empty() {
        theta = scattered(&plain, latents, 0, wide);
    }
    Some(Machine {
        curves,
        left_by_feedback: feedback_leaves(build),
        servo_start: theta[Param::ServoStart as usize],
        servo_full: theta[Param::ServoFull as usize],
    })
}

/// Share of a servo offset that stays in the swash when the ports are not bridged, as the circuit has it; a test holds the two
/// together.
fn feedback_leaves(build: &crate::machine::Build) -> f64 {
    use crate::circuit::ControlBuild as C;
    match build.layout.control {
        C::Feedback | C::Pilot | C::Electric => 0.2,
        C::Direct | C::SpeedSensing | C::NoFeedback | C::ThreePosition => 1.0,
    }
}

/// The swash offset of a machine set to `offset`, so that what is read speaks of it alone.
fn with_offset(theta: &mut Params, shows: Shows, offset: f64) {
    let (control, servo) = match shows {
        Shows::CreepBridged => (0.0, offset),
        Shows::Creep | Shows::Difference => (offset, 0.0),
    };
    theta[Param::NullControl as usize] = control;
    theta[Param::NullServo as usize] = servo;
}

fn curve(network: &Network, shows: Shows, mut theta: Params) -> Option<Curve> {
    let mut points = Vec::with_capacity(SOLVED.len());
    let mut start = None;
    let mut zero = 0.0;
    for offset in SOLVED {
        with_offset(&mut theta, shows, offset);
        let solution = network.solve(&theta, start.as_ref()).ok()?;
        let shown = network.reading(shows.port(), &solution, &theta);
        start = Some(solution.state);
        if offset == 0.0 {
            // A counted speed is rounded at rest in the circuit, and the two sides are not quite alike.
            zero = shown;
        }
        points.push((offset, shown - zero));
    }
    Curve::through(&points)
}
