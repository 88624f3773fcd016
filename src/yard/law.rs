//! How a reading goes with the oil's viscosity on this unit: from its own circuit, solved.
//!
//! Gaps leak with 1/μ; seats, consumers and lines do not. How much of a reading is which hangs on the unit, so the circuit of its
//! profile is solved twice, at thick and at thin oil, and the exponent between the two is taken. Slip under load and charge that
//! has fallen off the relief are gaps for all that matters, on every build.

use super::wear::Wear;
use crate::circuit::{Network, Param};
use crate::machine::{Build, apply, base, builds, layout_for};
use crate::math;
use crate::readings::{Condition, Doing, EngineSpeed, Path, Port};
use crate::unit::Unit;

/// Viscosities, over the reference, between which the exponent is taken: an ISO VG 46 at about 70 and 45 °C.
const BETWEEN: (f64, f64) = (0.5, 1.2);
/// Charge pump slip, as a factor, at which a knee is within what an engine runs.
const WORN: f64 = 6.0;
/// Least and most that is believed.
const SPAN: (f64, f64) = (0.4, 1.0);

/// How a coefficient's reading falls with viscosity on this unit: it goes with 1/μ to this power, 1 for a pure gap.
#[must_use]
pub fn power(of: Wear, unit: &Unit) -> f64 {
    let solved = match of {
        Wear::Drain | Wear::DrainRight | Wear::Knee => exponent(of, unit),
        Wear::Slip | Wear::LowIdle => None,
    };
    solved.map_or(1.0, |e| (-e).clamp(SPAN.0, SPAN.1))
}

/// Exponent of μ in a reading. None where the circuit has no such state.
fn exponent(of: Wear, unit: &Unit) -> Option<f64> {
    let build = builds(unit).into_iter().next()?;
    let at = |mu: f64| reading(of, &build, mu);
    let (thin, thick) = (at(BETWEEN.0)?, at(BETWEEN.1)?);
    if thin <= 0.0 || thick <= 0.0 {
        return None;
    }
    Some(math::ln(thick / thin) / math::ln(BETWEEN.1 / BETWEEN.0))
}

fn reading(of: Wear, build: &Build, mu: f64) -> Option<f64> {
    let condition = Condition {
        doing: Doing::Neutral,
        engine: EngineSpeed::HighIdle,
        ..Condition::start()
    };
    let net = Network::new(layout_for(build, &condition));
    let mut theta = apply(build, &base(build), &condition);
    theta[Param::Viscosity as usize] = mu;
    if of == Wear::Knee {
        theta[Param::ChargeSlip as usize] *= WORN;
        let top = theta[Param::Speed as usize];
        return net.knee(&theta, top).ok().map(|knee| knee.value);
    }
    let solution = net.solve(&theta, None).ok()?;
    Some(net.reading_on(Path::Left, Port::MotorDrain, &solution, &theta))
}
