//! Element laws: flow from one node to another as a function of pressures, speed and parameters.
//!
//! Each law is written once over [`Real`]; the exact derivatives follow. Units: bar, L/min, thousands of motor rpm.
//! Leakage is laminar, in proportion to pressure over viscosity (Wilson; Schlösser); seats and valves are orifices
//! (square root); reliefs crack and then rise in a straight line (pressure override).

use super::real::{Real, limited, positive, root_flow, step};

/// Pressure band (bar) inside which an orifice is taken as straight, so that its slope stays finite at zero.
const ORIFICE_LINEAR: f64 = 0.05;
/// Cracking pressure (bar) of the make-up checks. Common practice: 0.1 to 0.5 bar.
const CHECK_CRACK: f64 = 0.3;
/// Corner (bar) of valves that crack.
const CRACK_CORNER: f64 = 0.05;
/// Absolute pressure (bar) under which a pump inlet stops filling. Common practice: 0.7 to 0.8 bar.
const FILL_LIMIT: f64 = 0.75;
/// Pressure over the charge filter at which its bypass opens, bar. Common practice.
const FILTER_BYPASS: f64 = 3.5;
/// Band (bar) over which a pressure limiter takes the stroke away.
const LIMITER_BAND: f64 = 12.0;

/// Laminar leak: conductance over viscosity.
#[inline(always)]
pub fn laminar<S: Real>(dp: S, conductance: S, viscosity: S) -> S {
    conductance * dp / viscosity
}

/// Sharp orifice: k √dp.
#[inline(always)]
pub fn orifice<S: Real>(dp: S, k: S) -> S {
    k * root_flow(dp, ORIFICE_LINEAR)
}

/// A line with a laminar and a turbulent drop, dp = r1·q + r2·q·|q|, solved for q.
#[inline(always)]
pub fn line<S: Real>(dp: S, r1: S, r2: S) -> S {
    // |dp| smoothed over a hair so that the derivative of r2's part exists at rest.
    let size = (dp * dp + 1e-8).sqrt();
    dp * 2.0 / (r1 + (r1 * r1 + r2 * size * 4.0).sqrt())
}

/// Check valve: shut below its cracking pressure, an orifice above.
#[inline(always)]
pub fn check<S: Real>(dp: S, k: S) -> S {
    k * root_flow(positive(dp - CHECK_CRACK, CRACK_CORNER), ORIFICE_LINEAR)
}

/// Relief: shut below cracking, then `gain` L/min per bar.
#[inline(always)]
pub fn relief<S: Real>(dp: S, set: S, gain: S) -> S {
    positive(dp - set, CRACK_CORNER) * gain
}

/// Relief with an orifice in series: dp − set = q/gain + (q/k)².
#[inline(always)]
pub fn relief_behind_orifice<S: Real>(dp: S, set: S, gain: S, k: S) -> S {
    let over = positive(dp - set, CRACK_CORNER);
    let slope = S::constant(1.0) / gain;
    over * 2.0 / (slope + (slope * slope + over * 4.0 / (k * k)).sqrt())
}

/// Share of its displacement that a pump or motor fills from an inlet at this gauge pressure.
#[inline(always)]
pub fn fill<S: Real>(inlet: S, atmosphere: S) -> S {
    S::constant(1.0)
        - positive(S::constant(FILL_LIMIT) - inlet - atmosphere, 0.01) * (1.0 / FILL_LIMIT)
}

/// Charge filter with its bypass.
#[inline(always)]
pub fn filter<S: Real>(dp: S, resistance: S, viscosity: S) -> S {
    dp / (resistance * viscosity) + positive(dp - FILTER_BYPASS, CRACK_CORNER) * 30.0
}

/// How far the shuttle opens the path from the low side, 0 to 1, from the difference (high minus low).
#[inline(always)]
pub fn shuttle<S: Real>(difference: S, spring: S, travel: S, stuck: S) -> S {
    let open = step(difference - spring, 0.25) * travel;
    // Held open whatever the sides do: the larger of the two, without a corner.
    open + stuck - open * stuck
}

/// What the control asks and what it can give.
#[derive(Clone, Copy)]
pub struct Servo<S> {
    /// Stroke asked, signed share of full stroke, null of the control included.
    pub asked: S,
    /// Offset of the servo piston or swash itself, added after the servo.
    pub offset: S,
    /// Servo pressure available over case, bar.
    pub available: S,
    /// Servo pressure at which the swash starts, bar.
    pub start: S,
    /// Servo pressure for full stroke, bar.
    pub full: S,
}

/// Stroke from a servo: what is asked, limited by what the servo pressure can hold against the centring springs.
#[inline(always)]
pub fn servo_stroke<S: Real>(s: &Servo<S>) -> S {
    let authority = positive((s.available - s.start) / (s.full - s.start), 0.02);
    limited(s.asked, authority, 0.01) + s.offset
}

/// Share of the stroke that a pressure limiter leaves.
#[inline(always)]
pub fn limiter<S: Real>(side: S, set: S) -> S {
    let over = positive(side - set, 0.5) * (1.0 / LIMITER_BAND);
    positive(S::constant(1.0) - over, 0.02)
}

/// Smooth ramp from 0 at `start` to 1 at `full`.
#[inline(always)]
pub fn ramp<S: Real>(x: S, start: S, full: S) -> S {
    let t = (x - start) / (full - start);
    S::constant(1.0) - positive(S::constant(1.0) - positive(t, 0.02), 0.02)
}

/// Coulomb friction with a sign that turns over smoothly within a few rpm.
#[inline(always)]
pub fn friction<S: Real>(speed: S, size: S) -> S {
    size * speed / (speed * speed + 9e-6).sqrt()
}
