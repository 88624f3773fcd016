//! The figures that a sheet is judged by, each with what it is compared by.

use super::field::Field;
use super::history::{Usual, of_sheet, oil, speed};
use super::sheet::YardSheet;
use super::wear::{self, FullLever, Uncertain, Wear};
use crate::quantity::Unit as InUnit;
use crate::readings::Port;
use crate::readings::instrument::{Instrument, gum};
use crate::unit::Unit;

/// What is judged.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Key {
    LowIdle,
    HighIdle,
    ChargeHigh,
    /// Charge at low idle over charge at high idle.
    ChargeShare,
    Knee,
    /// Least charge in drive.
    ChargeDrive,
    /// Fall of charge from neutral to drive.
    Fall,
    /// Forward against reverse, or the sides stroked alone and both.
    DriveSpread,
    SpeedForward,
    SpeedReverse,
    /// Forward over reverse.
    ForwardOverReverse,
    Slip,
    TurnsForward,
    TurnsReverse,
    PathForward,
    PathReverse,
    Spin,
    Hubs,
    Drain,
    DrainRight,
}

/// A figure of one sheet.
#[derive(Clone, Debug)]
pub(super) struct Taken {
    pub key: Key,
    /// As it was.
    pub raw: f64,
    /// What it compares by with the unit's other checks: free of temperature and speed where it leaks.
    pub compare: f64,
    /// Standard uncertainty of `compare`.
    pub own: f64,
    /// Standard uncertainty of `raw`.
    pub raw_own: f64,
    /// Unit of `raw` and `compare`; a share is kept as one and printed in per cent.
    pub unit: InUnit,
    /// Instruments: other ones do not compare.
    pub with: String,
}

/// Unit of a key's figure; speeds have the unit of how they were taken.
fn unit_of(key: Key) -> InUnit {
    match key {
        Key::LowIdle | Key::HighIdle | Key::Knee => InUnit::RevolutionPerMinute,
        Key::ChargeHigh | Key::ChargeDrive | Key::Fall | Key::DriveSpread => InUnit::Bar,
        Key::Drain | Key::DrainRight => InUnit::LitrePerMinute,
        Key::Hubs => InUnit::Kelvin,
        _ => InUnit::Percent,
    }
}

/// Check-to-check scatter beside the reading itself, relative or absolute as the key's figure is. Common practice.
fn floor(key: Key, value: f64) -> f64 {
    match key {
        Key::LowIdle | Key::HighIdle => 0.005 * value,
        Key::ChargeHigh | Key::ChargeDrive => 0.02 * value,
        Key::ChargeShare => 0.02,
        Key::Knee => 0.05 * value,
        Key::Fall | Key::DriveSpread => 0.15,
        Key::SpeedForward | Key::SpeedReverse | Key::ForwardOverReverse => 0.01 * value,
        Key::Slip => 0.007,
        Key::TurnsForward | Key::TurnsReverse | Key::PathForward | Key::PathReverse => 0.002,
        Key::Spin => 0.02,
        Key::Hubs => 2.0,
        Key::Drain | Key::DrainRight => 0.08 * value,
    }
}

/// Sideways off the line after a run, as the difference of the two sides' speeds: the circle that starts along the lane and ends
/// there has the curvature 2y/(x² + y²), and the sides differ by it times the track width.
fn mismatch(aside: f64, lane: f64, track: f64) -> f64 {
    2.0 * aside * track / (lane * lane + aside * aside)
}

/// Limit of error of a deviation paced out at the end of a lane, m. Common practice.
const ASIDE_LIMIT: f64 = 0.1;

/// Every figure that the sheet gives. Those that need warm oil are there whether it was warm or not.
pub(super) fn taken(
    unit: &Unit,
    sheet: &YardSheet,
    instruments: &[Instrument],
    usual: Usual,
) -> Vec<Taken> {
    let mut out = Vec::new();
    let instrument = |id: &str| instruments.iter().find(|i| i.id == id);
    let mut put = |key, raw: f64, own: f64, with: &str| {
        out.push(Taken {
            key,
            raw,
            compare: raw,
            own: gum::combined(&[own, floor(key, raw)]),
            raw_own: own,
            unit: unit_of(key),
            with: with.to_owned(),
        });
    };
    let read = |field, port, id: &str| {
        sheet
            .value(field)
            .map(|value| Uncertain::read(value, port, instrument(id)))
    };
    let rpm = |field| read(field, Port::EngineSpeed, &sheet.tachometer);
    let charge = |field| read(field, Port::Charge, &sheet.gauge);
    for (key, field) in [
        (Key::LowIdle, Field::LowIdle),
        (Key::HighIdle, Field::HighIdle),
    ] {
        if let Some(speed) = rpm(field) {
            put(key, speed.value, speed.own, &sheet.tachometer);
        }
    }
    let high = charge(Field::ChargeHigh);
    if let Some(high) = high {
        put(Key::ChargeHigh, high.value, high.own, &sheet.gauge);
    }
    if let (Some(low), Some(high)) = (charge(Field::ChargeLow), high.filter(|h| h.value > 0.0)) {
        let own = gum::combined(&[low.own, high.own * low.value / high.value]) / high.value;
        put(Key::ChargeShare, low.value / high.value, own, &sheet.gauge);
    }
    let driven: Vec<Uncertain> = [
        Field::ChargeForward,
        Field::ChargeReverse,
        Field::ChargeLeft,
        Field::ChargeRight,
        Field::ChargeBoth,
    ]
    .into_iter()
    .filter_map(charge)
    .collect();
    if let Some(least) = driven.iter().min_by(|a, b| a.value.total_cmp(&b.value)) {
        put(Key::ChargeDrive, least.value, least.own, &sheet.gauge);
        let both = core::f64::consts::SQRT_2 * least.own;
        if let Some(high) = high {
            put(Key::Fall, high.value - least.value, both, &sheet.gauge);
        }
        let most = driven.iter().map(|c| c.value).fold(f64::MIN, f64::max);
        if driven.len() > 1 {
            put(Key::DriveSpread, most - least.value, both, &sheet.gauge);
        }
    }
    sides(sheet, &mut put);
    ratios(sheet, &mut put);
    for (key, field) in [
        (Key::Drain, Field::Drain),
        (Key::DrainRight, Field::DrainRight),
    ] {
        if let Some(flow) = read(field, Port::MotorDrain, &sheet.meter) {
            put(key, flow.value, flow.own, &sheet.meter);
        }
    }
    if let Some(knee) = read(Field::Knee, Port::Knee, &sheet.tachometer) {
        put(Key::Knee, knee.value, knee.own, &sheet.tachometer);
    }
    speeds(unit, sheet, &mut out);
    for (key, of) in [
        (Key::Slip, Wear::Slip),
        (Key::Knee, Wear::Knee),
        (Key::Drain, Wear::Drain),
        (Key::DrainRight, Wear::DrainRight),
    ] {
        if let Some(taken) = out.iter_mut().find(|t| t.key == key)
            && let Some((Ok(is), with)) = of_sheet(of, unit, sheet, instruments, usual)
        {
            taken.compare = is.is.value;
            taken.own = gum::combined(&[is.is.own, floor(key, is.is.value)]);
            taken.with = with;
        }
    }
    out
}

/// "turns" where turns were counted, "run" where the marked run was timed.
fn by(sheet: &YardSheet, turns: Field) -> &'static str {
    if sheet.value(turns).is_some() {
        "turns"
    } else {
        "run"
    }
}

/// Speeds at full lever: compared as at the same engine speed.
fn speeds(unit: &Unit, sheet: &YardSheet, out: &mut Vec<Taken>) {
    let engine = sheet.value(Field::EngineLight).filter(|rpm| *rpm > 0.0);
    for (key, turns, time) in [
        (Key::SpeedForward, Field::ForwardTurns, Field::ForwardTime),
        (Key::SpeedReverse, Field::ReverseTurns, Field::ReverseTime),
    ] {
        let Some(is) = speed(sheet, turns, time) else {
            continue;
        };
        let at_high = engine.map_or(1.0, |rpm| wear::high_idle_of(unit) / rpm);
        let compare = is.value * at_high;
        let by = by(sheet, turns);
        out.push(Taken {
            key,
            raw: is.value,
            compare,
            own: gum::combined(&[is.own * at_high, floor(key, compare)]),
            raw_own: is.own,
            unit: if by == "turns" {
                InUnit::RevolutionPerMinute
            } else {
                InUnit::KilometrePerHour
            },
            with: format!("{by}|{}", engine.is_some()),
        });
    }
}

/// Forward over reverse, and slip.
fn ratios(sheet: &YardSheet, put: &mut impl FnMut(Key, f64, f64, &str)) {
    let by = |turns| by(sheet, turns);
    let forward = speed(sheet, Field::ForwardTurns, Field::ForwardTime);
    let reverse = speed(sheet, Field::ReverseTurns, Field::ReverseTime);
    if let (Some(f), Some(r)) = (forward, reverse.filter(|r| r.value > 0.0))
        && by(Field::ForwardTurns) == by(Field::ReverseTurns)
    {
        let ratio = f.value / r.value;
        let own = ratio * gum::combined(&[f.own / f.value.max(1e-9), r.own / r.value]);
        put(Key::ForwardOverReverse, ratio, own, by(Field::ForwardTurns));
    }
    let loaded = speed(sheet, Field::LoadedTurns, Field::LoadedTime);
    if let (Some(light), Some(loaded)) = (forward, loaded)
        && by(Field::ForwardTurns) == by(Field::LoadedTurns)
    {
        let lever = |speed, field| FullLever {
            speed,
            engine: sheet.value(field),
        };
        let slip = wear::slip(
            lever(light, Field::EngineLight),
            lever(loaded, Field::EngineLoaded),
        );
        if let Some(slip) = slip {
            put(Key::Slip, slip.value, slip.own, by(Field::LoadedTurns));
        }
    }
}

/// What compares the two sides.
fn sides(sheet: &YardSheet, put: &mut impl FnMut(Key, f64, f64, &str)) {
    for (key, left, right) in [
        (
            Key::TurnsForward,
            Field::ForwardTurns,
            Field::ForwardTurnsRight,
        ),
        (
            Key::TurnsReverse,
            Field::ReverseTurns,
            Field::ReverseTurnsRight,
        ),
    ] {
        let (Some(left), Some(right)) = (sheet.value(left), sheet.value(right)) else {
            continue;
        };
        let mean = 0.5 * (left + right);
        if mean > 0.0 {
            let each = gum::rectangular(crate::readings::instrument::timed::TURN_LIMIT) / mean;
            let own = core::f64::consts::SQRT_2 * each;
            put(key, (left - right).abs() / mean, own, "turns");
        }
    }
    if let (Some(lane), Some(track)) = (sheet.value(Field::Lane), sheet.value(Field::Track)) {
        for (key, field) in [
            (Key::PathForward, Field::AsideForward),
            (Key::PathReverse, Field::AsideReverse),
        ] {
            if let Some(aside) = sheet.value(field) {
                let own = mismatch(gum::rectangular(ASIDE_LIMIT), lane, track);
                put(key, mismatch(aside, lane, track), own, "path");
            }
        }
    }
    if let (Some(left), Some(right)) = (sheet.value(Field::SpinLeft), sheet.value(Field::SpinRight))
    {
        let mean = 0.5 * (left + right);
        let own = core::f64::consts::SQRT_2
            * gum::rectangular(crate::readings::instrument::timed::HAND_LIMIT_S)
            * core::f64::consts::SQRT_2
            / mean;
        put(Key::Spin, (left - right).abs() / mean, own, "spin");
    }
    if let (Some(left), Some(right)) = (sheet.value(Field::HubLeft), sheet.value(Field::HubRight)) {
        put(Key::Hubs, (left - right).abs(), 1.5, "hubs");
    }
}

/// True where a sheet was made on oil warm enough to compare.
pub(super) fn is_warm(unit: &Unit, sheet: &YardSheet) -> bool {
    let warmth = crate::machine::Warmth::of(unit, &oil(sheet));
    warmth.taken && warmth.celsius >= super::report::WARM_ENOUGH
}
