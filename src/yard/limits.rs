//! Limits of common practice for each line, and those of the unit's manual.

use super::field::Field;
use super::judge::brake_from_charge;
use super::report::Grade;
use super::sheet::YardSheet;
use super::taken::{Key, Taken};
use super::wear;
use crate::readings::{Doing, EngineSpeed, Port};
use crate::unit::{FigureId, ManualWindow, Unit};

/// Limits of one line.
#[derive(Clone, Debug, Default)]
pub(super) struct Limits {
    /// To watch.
    pub watch: Option<f64>,
    /// To stay.
    pub stop: Option<f64>,
    /// Where they come from.
    pub source: &'static str,
    /// A verdict that goes by something else than a limit on the figure.
    pub other: Option<(Grade, String)>,
}

const PRACTICE: &str = "common practice";
/// Least charge in drive, bar, of most machines; of a smaller class this share of its setting.
const LEAST_CHARGE: (f64, f64) = (10.0, 0.55);
/// Room over the brake's full release, bar.
const OVER_RELEASE: f64 = 3.0;

/// Least charge in drive of a unit, bar.
fn least_charge(unit: &Unit) -> f64 {
    (LEAST_CHARGE.1 * wear::figure(unit, FigureId::ChargeSetting)).min(LEAST_CHARGE.0)
}

/// Limits of a line of a unit's sheet.
pub(super) fn limits(unit: &Unit, sheet: &YardSheet, key: Key, now: &[Taken]) -> Limits {
    let two = |watch, stop| Limits {
        watch: Some(watch),
        stop: Some(stop),
        source: PRACTICE,
        other: None,
    };
    match key {
        Key::LowIdle => idle(unit, FigureId::LowIdle, now, key),
        Key::HighIdle => idle(unit, FigureId::HighIdle, now, key),
        Key::ChargeHigh => Limits {
            stop: None,
            source: PRACTICE,
            other: manual(unit, sheet, Field::ChargeHigh, EngineSpeed::HighIdle),
            ..Limits::default()
        },
        Key::ChargeShare => Limits {
            other: release(unit, sheet).or_else(|| {
                manual(unit, sheet, Field::ChargeLow, EngineSpeed::LowIdle)
                    .filter(|(grade, _)| *grade > Grade::Good)
            }),
            ..two(0.80, 0.65)
        },
        Key::Knee => {
            let idle = sheet
                .value(Field::LowIdle)
                .unwrap_or_else(|| wear::low_idle_of(unit));
            two(idle + 300.0, idle + 700.0)
        }
        Key::ChargeDrive => Limits {
            stop: Some(least_charge(unit)),
            source: PRACTICE,
            ..Limits::default()
        },
        Key::Fall => Limits {
            watch: Some(3.0),
            source: PRACTICE,
            ..Limits::default()
        },
        Key::DriveSpread => two(0.5, 1.5),
        Key::SpeedForward | Key::SpeedReverse | Key::ForwardOverReverse => Limits::default(),
        Key::Slip => two(0.06, 0.12),
        Key::TurnsForward | Key::TurnsReverse | Key::PathForward | Key::PathReverse => {
            two(0.01, 0.025)
        }
        Key::Spin => two(0.07, 0.12),
        Key::Hubs => two(15.0, 25.0),
        Key::Drain => Limits {
            other: sides(now, Key::Drain, Key::DrainRight),
            ..Limits::default()
        },
        Key::DrainRight => Limits {
            other: sides(now, Key::DrainRight, Key::Drain),
            ..Limits::default()
        },
    }
}

/// An idle against the profile's figure: within 3 %.
fn idle(unit: &Unit, id: FigureId, now: &[Taken], key: Key) -> Limits {
    let read = now.iter().find(|t| t.key == key).map(|t| t.raw);
    let (Some(figure), Some(read)) = (unit.known(id), read) else {
        return Limits::default();
    };
    let off = read / figure - 1.0;
    let grade = if off.abs() > 0.03 {
        Grade::Watch
    } else {
        Grade::Good
    };
    let why = format!(
        "{}: {read:.0} rpm, {:.0} % off the {figure:.0} rpm of its profile; 3 % is common practice. Set it before speeds are \
         compared.",
        if key == Key::LowIdle {
            "Low idle"
        } else {
            "High idle"
        },
        100.0 * off.abs(),
    );
    Limits {
        other: Some((grade, why)),
        ..Limits::default()
    }
}

/// Charge at low idle against what the brake needs.
fn release(unit: &Unit, sheet: &YardSheet) -> Option<(Grade, String)> {
    let needs = unit
        .known(FigureId::BrakeRelease)
        .filter(|_| brake_from_charge(unit))?;
    let low = sheet.value(Field::ChargeLow)?;
    (low < needs + OVER_RELEASE).then(|| {
        (
            Grade::Stop,
            format!(
                "Charge at low idle: {low:.1} bar; the brake is released at {needs:.1} bar and wants {OVER_RELEASE:.0} bar over it \
                 (common practice). It may drag."
            ),
        )
    })
}

/// Charge in neutral against the unit's own manual.
fn manual(
    unit: &Unit,
    sheet: &YardSheet,
    field: Field,
    engine: EngineSpeed,
) -> Option<(Grade, String)> {
    let window: &ManualWindow = unit.manual.iter().find(|w| {
        w.port == Port::Charge
            && w.condition.doing == Doing::Neutral
            && w.condition.engine == engine
    })?;
    let read = sheet.value(field)?;
    let (low, high) = (window.low.base(), window.high.base());
    let is_in = (low..=high).contains(&read);
    let grade = if is_in { Grade::Good } else { Grade::Watch };
    let reference = if window.reference.trim().is_empty() {
        String::new()
    } else {
        format!(", {}", window.reference.trim())
    };
    Some((
        grade,
        format!(
            "Charge in neutral: {read:.1} bar; the unit’s manual has {low:.1} to {high:.1} bar{reference}."
        ),
    ))
}

/// One drain against the other side's: three times is watched, four times stays.
fn sides(now: &[Taken], this: Key, that: Key) -> Option<(Grade, String)> {
    let of = |key| now.iter().find(|t| t.key == key).map(|t| t.compare);
    let (this_flow, that_flow) = (of(this)?, of(that)?);
    let ratio = this_flow / that_flow.max(1e-6);
    let grade = match ratio {
        r if r > 4.0 => Grade::Stop,
        r if r > 3.0 => Grade::Watch,
        _ => Grade::Good,
    };
    let side = if this == Key::Drain { "Left" } else { "Right" };
    Some((
        grade,
        format!(
            "{side} motor drain: {ratio:.1} times the other side’s; up to 3 times is common practice."
        ),
    ))
}
