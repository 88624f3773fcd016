//! The work that both speed benchmarks do, native and wasm: random solves, solves with derivatives, one full assessment.

use crate::support::*;
use lowside::circuit::{Layout, Network, Param, healthy};
use lowside::math;
use lowside::ranking::{Session, assess};
use lowside::readings::{Direction::*, Doing, EngineSpeed::*, Lever, Port};
use lowside::record::Visit;
use lowside::windows::Normals;

/// Solves `n` random machines in drive; returns the mean number of iterations.
pub fn solves(n: usize) -> f64 {
    let net = Network::new(Layout::default());
    let mut draw = Normals::new(1);
    let mut iterations = 0u64;
    for _ in 0..n {
        let mut t = healthy();
        t[Param::Lever as usize] = 2.0 * draw.unit() - 1.0;
        t[Param::Load as usize] = 200.0 * draw.unit();
        for p in [
            Param::PumpLeak,
            Param::MotorLeak,
            Param::Viscosity,
            Param::ChargeDisp,
            Param::ReliefSet,
            Param::LoopReliefA,
        ] {
            t[p as usize] *= math::exp(0.3 * draw.normal());
        }
        if let Ok(s) = net.solve(&t, None) {
            iterations += u64::from(s.iterations);
        }
    }
    iterations as f64 / n as f64
}

/// Solves `n` random machines and takes three readings of each with their derivatives.
pub fn solves_with_derivatives(n: usize) -> f64 {
    let net = Network::new(Layout::default());
    let mut sum = 0.0;
    for i in 0..n {
        let mut t = healthy();
        t[Param::Lever as usize] = 0.2 + 0.6 * i as f64 / n as f64;
        if let Ok(s) = net.solve(&t, None) {
            for port in [Port::Charge, Port::LoopA, Port::MotorDrain] {
                sum += net.reading_and_gradient(port, &s, &t).gradient[Param::PumpLeak as usize];
            }
        }
    }
    sum
}

/// A call with readings in eight conditions.
pub fn call() -> Visit {
    let rpm = |v| Measured(base(v, lowside::quantity::Kind::RotationalSpeed));
    let held = |d, s| condition(Doing::Held, d, Lever::Share(s), rpm(1500.0));
    let free = |d| condition(Doing::Free, d, Lever::Half, HighIdle);
    visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 23.2),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.6),
        reading("case", Port::PumpCase, neutral(HighIdle), 0.9),
        reading("ret", Port::ReturnFlow, neutral(HighIdle), 33.0),
        reading("drain", Port::MotorDrain, neutral(HighIdle), 0.6),
        reading("cf", Port::Charge, free(Forward), 23.6),
        reading("cr", Port::Charge, free(Reverse), 23.5),
        reading("wf", Port::Wheel, free(Forward), 19.6),
        reading("f5", Port::LoopA, held(Forward, 0.05), 60.0),
        reading("f10", Port::LoopA, held(Forward, 0.1), 120.0),
        reading("f20", Port::LoopA, held(Forward, 0.2), 260.0),
        reading("r10", Port::LoopB, held(Reverse, 0.1), 290.0),
    ])
}

/// One full assessment; returns the probability of its leading cause.
pub fn assessment(visit: &Visit) -> f64 {
    assess(&roller(), visit, &[])
        .causes
        .first()
        .map_or(0.0, |c| c.probability)
}

/// The call and one reading more: in a condition that was read already, or in a new one.
pub fn one_more(known: bool) -> Visit {
    let mut v = call();
    let speed = if known { HighIdle } else { LowIdle };
    let c = condition(Doing::Free, Forward, Lever::Half, speed);
    v.readings.push(reading("more", Port::LoopA, c, 48.0));
    v
}

/// A session that has assessed the call.
pub fn session() -> Session {
    let mut s = Session::default();
    s.assess(&roller(), &call(), &[]);
    s
}

/// First look at a visit in a session; returns the probability of the leading cause.
pub fn look(session: &mut Session, visit: &Visit) -> f64 {
    session
        .look(&roller(), visit, &[])
        .and_then(|a| a.causes.first().map(|c| c.probability))
        .unwrap_or(f64::NAN)
}

/// Assesses a visit in a session.
pub fn again(session: &mut Session, visit: &Visit) -> f64 {
    session
        .assess(&roller(), visit, &[])
        .causes
        .first()
        .map_or(0.0, |c| c.probability)
}

/// A call to a machine with two paths: speeds, held pressures and drains of both sides.
pub fn two_paths() -> (lowside::unit::Unit, Visit) {
    let mut unit = roller();
    unit.ticks.paths = lowside::unit::Paths::TwoSharedCharge;
    let mut v = call();
    let right: Vec<_> = v
        .readings
        .iter()
        .filter(|r| !r.port.is_common())
        .map(|r| lowside::readings::Reading {
            id: format!("{}-right", r.id),
            path: lowside::readings::Path::Right,
            ..r.clone()
        })
        .collect();
    v.readings.extend(right);
    (unit, v)
}
