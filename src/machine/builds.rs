//! Builds: what "don't know" leaves possible, each with its share.

use crate::circuit::{Arrangement, ControlBuild, DumpBuild, FilterBuild, Layout};
use crate::unit::{
    CaseLines, Control, Filter, LoopReliefTo, MachineClass, Paths, ReliefDrain, Shuttle, Tick, Unit,
};

/// One possible build of a unit.
#[derive(Clone, Debug)]
pub struct Build {
    /// The unit with its open ticks answered as in this build.
    pub unit: Unit,
    /// Its layout, not yet set for a condition.
    pub layout: Layout,
    /// Share among the builds, 0 to 1.
    pub share: f64,
    /// Flushing fitted.
    pub flushing: bool,
    /// Two-position shuttle: flushes in neutral too.
    pub two_position: bool,
    /// Pressure limiter fitted.
    pub limiter: bool,
}

/// Most builds that are kept; where the ticks leave more, they are drawn in proportion to their shares.
pub const MOST: usize = 16;

fn fitted(tick: Tick, share: f64) -> Vec<(bool, f64)> {
    match tick {
        Tick::Yes => vec![(true, 1.0)],
        Tick::No => vec![(false, 1.0)],
        Tick::Unknown => vec![(true, share), (false, 1.0 - share)],
    }
}

/// Shares of control kinds by class. Common practice, from memory.
fn controls(control: Control, class: MachineClass) -> Vec<(Control, f64)> {
    use Control::*;
    if control != Unknown {
        return vec![(control, 1.0)];
    }
    match class {
        MachineClass::SmallIntegrated => vec![(DirectManual, 0.9), (ManualFeedback, 0.1)],
        MachineClass::CompactWheeled => vec![
            (HydraulicRemote, 0.35),
            (ManualFeedback, 0.35),
            (ElectricProportional, 0.3),
        ],
        MachineClass::CompactTracked => vec![(HydraulicRemote, 0.55), (ElectricProportional, 0.45)],
        MachineClass::Roller => vec![(ManualFeedback, 0.5), (ElectricProportional, 0.5)],
        MachineClass::Loader => vec![
            (SpeedSensing, 0.6),
            (ElectricProportional, 0.25),
            (PressureNoFeedback, 0.15),
        ],
        MachineClass::WheelMotorCarrier | MachineClass::Crawler => vec![
            (ElectricProportional, 0.6),
            (ManualFeedback, 0.25),
            (HydraulicRemote, 0.15),
        ],
    }
}

fn filters(filter: Filter) -> Vec<(Filter, f64)> {
    match filter {
        Filter::Unknown => vec![
            (Filter::Suction, 0.5),
            (Filter::PressureGaugeAfter, 0.3),
            (Filter::PressureGaugeBefore, 0.2),
        ],
        known => vec![(known, 1.0)],
    }
}

fn control_build(control: Control) -> ControlBuild {
    match control {
        Control::DirectManual => ControlBuild::Direct,
        Control::ManualFeedback | Control::Unknown => ControlBuild::Feedback,
        Control::HydraulicRemote => ControlBuild::Pilot,
        Control::ElectricProportional => ControlBuild::Electric,
        Control::SpeedSensing => ControlBuild::SpeedSensing,
        Control::PressureNoFeedback => ControlBuild::NoFeedback,
        Control::ThreePosition => ControlBuild::ThreePosition,
    }
}

/// The builds that a unit's ticks leave possible; shares sum to 1.
pub fn builds(unit: &Unit) -> Vec<Build> {
    let practice = unit.class.practice();
    let t = &unit.ticks;
    let mut all = Vec::new();
    for (flushing, pf) in fitted(t.flushing, practice.flushing) {
        for (filter, pi) in filters(t.filter) {
            for (control, pc) in controls(t.control, unit.class) {
                for (limiter, pl) in fitted(t.limiter, practice.limiter) {
                    let share = pf * pi * pc * pl;
                    if share > 0.0 {
                        all.push(build(unit, flushing, filter, control, limiter, share));
                    }
                }
            }
        }
    }
    thin(all)
}

fn build(
    unit: &Unit,
    flushing: bool,
    filter: Filter,
    control: Control,
    limiter: bool,
    share: f64,
) -> Build {
    let mut unit = unit.clone();
    let tick = |yes| if yes { Tick::Yes } else { Tick::No };
    unit.ticks.flushing = tick(flushing);
    unit.ticks.filter = filter;
    unit.ticks.control = control;
    unit.ticks.limiter = tick(limiter);
    let t = &unit.ticks;
    let layout = Layout {
        control: control_build(control),
        filter: match filter {
            Filter::Suction | Filter::Unknown => FilterBuild::Suction,
            Filter::PressureGaugeBefore => FilterBuild::GaugeBefore,
            Filter::PressureGaugeAfter => FilterBuild::GaugeAfter,
        },
        dump: match t.loop_relief_to {
            LoopReliefTo::Gallery | LoopReliefTo::Unknown => DumpBuild::Gallery,
            LoopReliefTo::Across => DumpBuild::Across,
            LoopReliefTo::Case => DumpBuild::Case,
        },
        relief_to_tank: t.relief_drain == ReliefDrain::Tank,
        separate_cases: t.case_lines == CaseLines::Separate,
        arrangement: arrangement(t.paths),
        held: [false; 2],
        bridged: [false; 2],
    };
    let two_position = t.shuttle == Shuttle::TwoPosition;
    Build {
        unit,
        layout,
        share,
        flushing,
        two_position,
        limiter,
    }
}

/// What the paths of a machine share.
pub fn arrangement(paths: Paths) -> Arrangement {
    match paths {
        Paths::One => Arrangement::Single,
        Paths::TwoSharedCharge => Arrangement::Tandem,
        Paths::TwoOwnCharge => Arrangement::Apart,
    }
}

/// Keeps at most [`MOST`] builds by systematic draws along the list, so that every open tick is met in its proportion.
fn thin(all: Vec<Build>) -> Vec<Build> {
    if all.len() <= MOST {
        return all;
    }
    let mut kept: Vec<Build> = Vec::with_capacity(MOST);
    let mut sum = 0.0;
    let mut drawn = 0usize;
    for b in all {
        sum += b.share;
        let mut count = 0usize;
        while drawn < MOST && sum >= (drawn as f64 + 0.5) / MOST as f64 - 1e-12 {
            drawn += 1;
            count += 1;
        }
        if count > 0 {
            kept.push(Build {
                share: count as f64 / MOST as f64,
                ..b
            });
        }
    }
    let total: f64 = kept.iter().map(|b| b.share).sum();
    for b in &mut kept {
        b.share /= total;
    }
    kept
}
