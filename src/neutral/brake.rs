//! What a parking brake may hold while the loop pushes against it.
//!
//! A spring-applied brake is sized for the slope, often 0.5 to 1.0 of the motor's torque at relief (common practice): it slips,
//! glazes, or is let go by the first few bars of control. So a locked check stops well under what it could hold.

use super::belief::Belief;
use super::offset::{Foretold, would_show};
use super::response::Shows;
use crate::readings::Condition;
use crate::unit::{FigureId, Tick, Unit};

/// Share of the brake's torque that a check may ask of it. Common practice.
pub const SHARE: f64 = 0.6;
/// Least torque that a parking brake of unknown size is taken to have, as a share of the motor's at relief. Common practice:
/// 0.5 to 1.0.
pub const LEAST: f64 = 0.5;

/// Where a locked check stops.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Stop {
    /// Loop difference not to be passed, bar.
    pub bar: f64,
    /// True where the brake's torque is in the profile; false where common practice stands in for it.
    pub is_known: bool,
    /// The brake is fed from charge, so the control itself may let it go. Unknown counts as yes.
    pub may_release: bool,
}

/// The loop difference at which a locked check stops: [`SHARE`] of what the brake holds. Torque at the motor shaft from
/// T = Δp V / (20 π), bar and cm³/rev giving N·m.
#[must_use]
pub fn stop(unit: &Unit) -> Stop {
    let figure = |id| {
        unit.known(id)
            .unwrap_or_else(|| unit.class.spread(id).value)
    };
    let motors = f64::from(unit.ticks.motors.clamp(1, 4));
    let displacement = figure(FigureId::MotorDisplacement) * motors;
    let relief = figure(FigureId::LoopRelief);
    let known = unit
        .known(FigureId::BrakeTorque)
        .filter(|torque| *torque > 0.0 && displacement > 0.0);
    let holds = known.map_or(LEAST * relief, |torque| {
        20.0 * core::f64::consts::PI * torque / displacement
    });
    Stop {
        // Never past the relief: beyond it nothing rises.
        bar: (SHARE * holds).min(relief),
        is_known: known.is_some(),
        may_release: unit.ticks.brake_from_charge != Tick::No,
    }
}

/// The difference that is about to be built, against what the brake may hold.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Risk {
    /// Difference that the offset would build.
    pub builds: Foretold,
    /// Where to stop.
    pub stop: Stop,
    /// How it stands.
    pub says: Says,
}

/// How the difference stands against the stop.
#[derive(
    Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, serde::Serialize, serde::Deserialize,
)]
pub enum Says {
    /// All of the interval stays under the stop.
    Under,
    /// Part of the interval passes it.
    MayPass,
    /// Most of it does: do not lock it on the brake.
    Passes,
}

/// The difference that an offset would build at this engine speed and oil with the motor held, against the brake.
#[must_use]
pub fn risk(unit: &Unit, condition: &Condition, offset: &Belief) -> Option<Risk> {
    let builds = would_show(unit, Shows::Difference, condition, offset)?;
    let stop = stop(unit);
    let says = if builds.middle.abs() > stop.bar {
        Says::Passes
    } else if builds.largest() > stop.bar {
        Says::MayPass
    } else {
        Says::Under
    };
    Some(Risk { builds, stop, says })
}
