//! The integral held against brute force: a large fixed-seed ensemble over severity, builds and scatter, with the same
//! likelihood of instruments. It converges to the exact posterior slowly, so it serves as a judge and not as the method.

use super::belief::Belief;
use super::datum::{Data, gather};
use super::likelihood::fit;
use super::node::{Node, nodes};
use super::posterior::weigh;
use super::predict::{Bench, Prediction};
use super::suspect::Suspect;
use crate::faults::{self, Fault, FaultId};
use crate::machine::{builds, condition_latents, unit_latents};
use crate::math;
use crate::quantity::{Kind, Measure};
use crate::readings::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Path, Place, Port, Reading,
    Seen, SideNaming, Stroked,
};
use crate::unit::{Control, Figure, FigureId, Filter, MachineClass, Source, Tick, Ticks, Unit};
use crate::windows::Normals;

/// Draws a cause.
const DRAWS: usize = 12_000;
/// Causes compared: those that our integral weighs most.
const COMPARED: usize = 7;

fn unit() -> Unit {
    let mut u = Unit {
        class: MachineClass::Roller,
        ..Unit::default()
    };
    u.ticks = Ticks {
        flushing: Tick::Yes,
        limiter: Tick::No,
        control: Control::ElectricProportional,
        filter: Filter::PressureGaugeAfter,
        two_speed: Tick::No,
        ..Ticks::default()
    };
    for (id, v, kind) in [
        (FigureId::PumpDisplacement, 75.0, Kind::Displacement),
        (FigureId::ChargeDisplacement, 15.0, Kind::Displacement),
        (FigureId::HighIdle, 2400.0, Kind::RotationalSpeed),
        (FigureId::ChargeSetting, 22.0, Kind::Pressure),
        (FigureId::LoopRelief, 380.0, Kind::Pressure),
        (FigureId::MotorDisplacement, 75.0, Kind::Displacement),
        (FigureId::OilGrade, 46.0, Kind::KinematicViscosity),
    ] {
        u.figures.insert(
            id,
            Figure {
                value: Measure::from_base(v, kind).ok(),
                typed: String::new(),
                source: Source::Manual,
            },
        );
    }
    u
}

fn conditions() -> Vec<(Port, Condition)> {
    let c = |doing, direction, lever, engine| Condition {
        doing,
        direction,
        lever,
        engine,
        oil: Measure::from_base(60.0, Kind::Temperature)
            .ok()
            .map(|value| OilTemperature {
                value,
                place: Place::DrainHose,
            }),
        flushing_blocked: false,
        consumers_capped: false,
        stroked: Stroked::Both,
    };
    let neutral = |e| c(Doing::Neutral, Direction::Forward, Lever::Full, e);
    vec![
        (Port::Charge, neutral(EngineSpeed::LowIdle)),
        (Port::Charge, neutral(EngineSpeed::HighIdle)),
        (Port::ReturnFlow, neutral(EngineSpeed::HighIdle)),
        (Port::MotorDrain, neutral(EngineSpeed::HighIdle)),
        (
            Port::Charge,
            c(
                Doing::Free,
                Direction::Forward,
                Lever::Half,
                EngineSpeed::HighIdle,
            ),
        ),
        (
            Port::LoopA,
            c(
                Doing::Held,
                Direction::Forward,
                Lever::Share(0.1),
                EngineSpeed::LowIdle,
            ),
        ),
        (
            Port::LoopB,
            c(
                Doing::Held,
                Direction::Reverse,
                Lever::Share(0.1),
                EngineSpeed::LowIdle,
            ),
        ),
        (
            Port::MotorShaft,
            c(
                Doing::Free,
                Direction::Forward,
                Lever::Full,
                EngineSpeed::HighIdle,
            ),
        ),
    ]
}

fn bench(unit: &Unit, data: &Data) -> Bench {
    let mut latents = unit_latents(unit);
    condition_latents(unit, &data.conditions, &mut latents);
    Bench::new(builds(unit), latents, data)
}

/// Coarse cells: the draws are spread over them.
fn coarse() -> Belief {
    Belief {
        fineness: 9,
        ..Belief::default()
    }
}

/// Readings of a machine with a fault, drawn from the model itself.
fn readings(unit: &Unit, fault: &'static Fault, take: usize, draw: &mut Normals) -> Vec<Reading> {
    let ports = conditions();
    let mut list: Vec<Reading> = ports
        .iter()
        .take(take)
        .enumerate()
        .map(|(i, (port, condition))| Reading {
            id: format!("{i}"),
            port: *port,
            path: Path::Left,
            condition: *condition,
            rigging: String::new(),
            seen: Measure::from_base(1.0, port.kind())
                .ok()
                .map(|value| Seen::Value { value }),
            typed: String::new(),
            note: String::new(),
        })
        .collect();
    let data = gather(unit, &list, &[], &[]);
    let bench = bench(unit, &data);
    let (all, _) = nodes(&Suspect { fault, path: None }, &bench.builds, &coarse());
    let node = Node {
        second: None,
        place: None,
        quantile: draw.unit(),
        ..all[(draw.unit() * all.len() as f64) as usize]
    };
    let u = draw.many(bench.latents.0.len());
    for (i, r) in list.iter_mut().enumerate() {
        let shown = bench
            .values(fault, &node, data.condition_of[i], &u)
            .expect("a state");
        let value = shown
            .iter()
            .find(|(_, p, _)| *p == r.port)
            .expect("wanted")
            .2;
        r.seen = Measure::from_base(value * (1.0 + 0.004 * draw.normal()), r.port.kind())
            .ok()
            .map(|value| Seen::Value { value });
    }
    list
}

/// Log likelihood of each cause by plain means over draws, with the standard error of each mean (relative).
fn brute_force(
    bench: &Bench,
    data: &Data,
    fault: &'static Fault,
    draw: &mut Normals,
) -> (f64, f64, f64) {
    let (all, prior) = nodes(&Suspect { fault, path: None }, &bench.builds, &coarse());
    if all.is_empty() {
        return (f64::NEG_INFINITY, f64::NEG_INFINITY, 0.0);
    }
    let mut cumulative = Vec::new();
    let mut sum = 0.0;
    for n in &all {
        sum += math::exp(n.log_weight);
        cumulative.push(sum);
    }
    let mut logs = Vec::with_capacity(DRAWS);
    for _ in 0..DRAWS {
        let x = draw.unit() * sum;
        let i = cumulative
            .iter()
            .position(|c| *c >= x)
            .unwrap_or(all.len() - 1);
        let node = Node {
            second: None,
            place: None,
            quantile: all[i].quantile + all[i].half * (2.0 * draw.unit() - 1.0),
            ..all[i]
        };
        let u = draw.many(bench.latents.0.len());
        let p: Prediction = bench.drawn(fault, &node, data, &u);
        if let Some(f) = fit(data, &p, &[], data.belief.swapped) {
            logs.push(f.log);
        }
    }
    let total = math::ln_sum_exp(&logs);
    let n = logs.len() as f64;
    let mean = total - math::ln(n);
    let second: f64 = logs
        .iter()
        .map(|l| math::exp(2.0 * (l - mean)))
        .sum::<f64>()
        / n;
    (prior, mean, ((second - 1.0).max(0.0) / n).sqrt())
}

#[test]
fn the_integral_agrees_with_a_large_ensemble() {
    let unit = unit();
    let hidden = [
        (FaultId::ChargePumpWorn, 3),
        (FaultId::NeutralReliefLow, 2),
        (FaultId::PumpWorn, 4),
        (FaultId::Healthy, 4),
        (FaultId::MotorWorn, 8),
        (FaultId::CheckALeaking, 8),
        (FaultId::InletRestricted, 5),
        (FaultId::ServoLeak, 6),
        (FaultId::ConsumerLeak, 5),
        (FaultId::OperatingReliefLow, 5),
        (FaultId::LoopReliefBLow, 7),
        (FaultId::InputDriveSlipping, 8),
    ];
    let mut distances = Vec::new();
    let mut same_leader = 0;
    for (i, (id, take)) in hidden.iter().enumerate() {
        let fault = faults::find(*id).expect("listed");
        let mut draw = Normals::new(90 + i as u64);
        let list = readings(&unit, fault, *take, &mut draw);
        let data = gather(&unit, &list, &[], &[]);
        let bench = bench(&unit, &data);
        let weighed = weigh(&bench, &data, SideNaming::Known).causes;
        let mut listed: Vec<_> = weighed
            .iter()
            .filter(|w| w.id != FaultId::NotListed && w.with.is_none())
            .collect();
        listed.sort_by(|a, b| {
            (b.log_prior + b.log_likelihood).total_cmp(&(a.log_prior + a.log_likelihood))
        });
        listed.truncate(COMPARED);
        let mut exact = Vec::new();
        let mut error: f64 = 0.0;
        for w in &listed {
            let (prior, mean, relative) = brute_force(
                &bench,
                &data,
                faults::find(w.id).expect("listed"),
                &mut draw,
            );
            exact.push((prior + mean, relative));
        }
        let share = |logs: Vec<f64>| {
            let total = math::ln_sum_exp(&logs);
            logs.iter()
                .map(|l| math::exp(l - total))
                .collect::<Vec<_>>()
        };
        let ours = share(
            listed
                .iter()
                .map(|w| w.log_prior + w.log_likelihood)
                .collect(),
        );
        let theirs = share(exact.iter().map(|e| e.0).collect());
        for (t, e) in theirs.iter().zip(&exact) {
            error += 0.5 * t * e.1;
        }
        let distance: f64 = 0.5
            * ours
                .iter()
                .zip(&theirs)
                .map(|(a, b)| (a - b).abs())
                .sum::<f64>();
        let lead = |v: &[f64]| {
            (0..v.len())
                .max_by(|a, b| v[*a].total_cmp(&v[*b]))
                .unwrap_or(0)
        };
        println!(
            "{id:?}, {take} readings: distance {distance:.3} (the ensemble's own error about {error:.3}); leaders {:?} {:?}",
            listed[lead(&ours)].id,
            listed[lead(&theirs)].id
        );
        if lead(&ours) == lead(&theirs) || theirs[lead(&theirs)] - theirs[lead(&ours)] < 2.0 * error
        {
            same_leader += 1;
        }
        distances.push((distance - 2.0 * error).max(0.0));
    }
    let mean = distances.iter().sum::<f64>() / distances.len() as f64;
    assert!(
        mean <= 0.05,
        "mean distance beyond the ensemble's own error: {mean}"
    );
    // Where a total and a nearly total failure look alike, ensemble and integral may each lean to one of them.
    assert!(
        same_leader + 1 >= hidden.len(),
        "{same_leader} of {}",
        hidden.len()
    );
}
