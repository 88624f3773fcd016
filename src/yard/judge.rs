//! Every line of the sheet against its limit: common practice at first, the unit's own checks from the third one on.

use super::baseline::Baseline;
use super::history::{Usual, is_repair};
use super::limits::{Limits, limits};
use super::report::{Grade, Judged};
use super::sheet::YardSheet;
use super::steps::{Step, steps};
use super::taken::{Key, Taken, is_warm, taken};
use super::words::Printer;
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::record::Visit;
use crate::unit::{Tick, Unit};

/// Uncertainties off the unit's own checks from which it is watched, and from which it stays. Common practice.
const OFF: (f64, f64) = (2.0, 4.0);

/// Judges every line of a sheet. `cold` says why warm steps do not count.
pub(super) fn judged(
    unit: &Unit,
    visit: &Visit,
    sheet: &YardSheet,
    earlier: &[&Visit],
    instruments: &[Instrument],
    prefs: &UnitPrefs,
    cold: Option<&str>,
) -> Vec<Judged> {
    let usual = Usual::of(unit, earlier.iter().copied().chain([visit]));
    let now = taken(unit, sheet, instruments, usual);
    let before = since_repair(visit, earlier);
    let before: Vec<Vec<Taken>> = before
        .iter()
        .filter(|sheet| is_warm(unit, sheet))
        .map(|sheet| taken(unit, sheet, instruments, usual))
        .collect();
    let printer = Printer { prefs };
    let mut out = Vec::new();
    for step in steps(unit) {
        looks(unit, sheet, step, cold, &mut out);
        let own: Vec<&Taken> = now.iter().filter(|t| step_of(t.key) == step.id).collect();
        for t in &own {
            if let (false, Some(why)) = (step.cold, cold) {
                out.push(Judged {
                    step: step.id,
                    what: name(unit, t.key).to_owned(),
                    found: printer.of(t.unit, t.raw),
                    grade: None,
                    why: why.to_owned(),
                });
                continue;
            }
            let earlier: Vec<f64> = before
                .iter()
                .flatten()
                .filter(|e| e.key == t.key && e.with == t.with)
                .map(|e| e.compare)
                .collect();
            out.push(one(unit, sheet, step, t, &now, &earlier, &printer));
        }
        missing(unit, sheet, step, &now, &mut out);
    }
    out
}

/// Sheets since the last repair, oldest first.
fn since_repair<'a>(visit: &Visit, earlier: &[&'a Visit]) -> Vec<&'a YardSheet> {
    let mut sorted: Vec<&Visit> = earlier
        .iter()
        .copied()
        .filter(|v| v.id != visit.id)
        .collect();
    sorted.sort_by_key(|v| (v.opened.as_str(), v.id.as_str()));
    let after = sorted
        .iter()
        .rposition(|v| is_repair(v))
        .map_or(0, |at| at + 1);
    sorted[after..]
        .iter()
        .filter_map(|v| v.yard.as_ref())
        .collect()
}

fn looks(unit: &Unit, sheet: &YardSheet, step: &Step, cold: Option<&str>, out: &mut Vec<Judged>) {
    for look in step.looks_of(unit, sheet.leg) {
        let answer = sheet.looks.get(look.id).and_then(|code| look.option(code));
        let (grade, why) = match answer {
            None => (None, "not looked at".to_owned()),
            Some(option) => match (option.grade, cold) {
                // A fault seen is a fault, also on cold oil; that nothing was seen says little there.
                (Some(Grade::Good), Some(why)) if !look.cold => (None, why.to_owned()),
                (grade, _) => (grade, option.reason.to_owned()),
            },
        };
        out.push(Judged {
            step: step.id,
            what: look.title.to_owned(),
            found: answer.map_or("", |option| option.words).to_owned(),
            grade,
            why,
        });
    }
}

/// Figures of a step that nobody read, in one line each.
fn missing(unit: &Unit, sheet: &YardSheet, step: &Step, now: &[Taken], out: &mut Vec<Judged>) {
    let wanted = wanted(unit, step.id);
    for key in wanted {
        if now.iter().any(|t| t.key == *key) {
            continue;
        }
        let begun = step.fields.iter().any(|f| sheet.fields.contains_key(f));
        let why = if begun {
            "not all of it was read"
        } else {
            "not read"
        };
        out.push(Judged {
            step: step.id,
            what: name(unit, *key).to_owned(),
            found: String::new(),
            grade: None,
            why: why.to_owned(),
        });
    }
}

fn step_of(key: Key) -> &'static str {
    match key {
        Key::LowIdle | Key::HighIdle => "idles",
        Key::ChargeHigh | Key::ChargeShare => "charge",
        Key::Knee => "knee",
        Key::ChargeDrive | Key::Fall | Key::DriveSpread => "charge-drive",
        Key::SpeedForward
        | Key::SpeedReverse
        | Key::ForwardOverReverse
        | Key::TurnsForward
        | Key::TurnsReverse => "speed",
        Key::Slip => "slip",
        Key::PathForward | Key::PathReverse | Key::Spin => "path",
        Key::Hubs => "hubs",
        Key::Drain | Key::DrainRight => "drain",
    }
}

/// What a step should give on this unit.
fn wanted(unit: &Unit, step: &str) -> &'static [Key] {
    match step {
        "idles" => &[Key::LowIdle, Key::HighIdle],
        "charge" => &[Key::ChargeHigh, Key::ChargeShare],
        "knee" => &[Key::Knee],
        "charge-drive" => &[Key::DriveSpread],
        "speed" if unit.ticks.paths.is_one() => &[Key::SpeedForward, Key::SpeedReverse],
        "speed" => &[Key::TurnsForward, Key::TurnsReverse],
        "slip" => &[Key::Slip],
        "path" => &[Key::PathForward, Key::PathReverse, Key::Spin],
        "hubs" => &[Key::Hubs],
        "drain" if unit.ticks.paths.is_one() => &[Key::Drain],
        "drain" => &[Key::Drain, Key::DrainRight],
        _ => &[],
    }
}

fn name(unit: &Unit, key: Key) -> &'static str {
    match key {
        Key::LowIdle => "Low idle",
        Key::HighIdle => "High idle",
        Key::ChargeHigh => "Charge at high idle",
        Key::ChargeShare => "Charge at low idle, share of high idle",
        Key::Knee => "Knee",
        Key::ChargeDrive => "Least charge in drive",
        Key::Fall => "Fall of charge from neutral to drive",
        Key::DriveSpread if unit.ticks.paths.is_one() => "Charge forward against reverse",
        Key::DriveSpread => "Charge left, right and both",
        Key::SpeedForward => "Speed forward",
        Key::SpeedReverse => "Speed in reverse",
        Key::ForwardOverReverse => "Forward over reverse",
        Key::Slip => "Slip, flat to ramp",
        Key::TurnsForward => "Left against right, forward",
        Key::TurnsReverse => "Left against right, reverse",
        Key::PathForward => "Off the line, forward",
        Key::PathReverse => "Off the line, reverse",
        Key::Spin => "Spin left against right",
        Key::Hubs => "Hubs left against right",
        Key::Drain if unit.ticks.paths.is_one() => "Motor drain in neutral",
        Key::Drain => "Left motor drain in neutral",
        Key::DrainRight => "Right motor drain in neutral",
    }
}

fn one(
    unit: &Unit,
    sheet: &YardSheet,
    step: &Step,
    t: &Taken,
    now: &[Taken],
    earlier: &[f64],
    printer: &Printer,
) -> Judged {
    let what = name(unit, t.key);
    let found = printer.of(t.unit, t.raw);
    let limits = limits(unit, sheet, t.key, now);
    let own = Baseline::of(earlier, t.own);
    let by_own = own.map(|b| against_own(t, &b, printer));
    let by_limit = against_limit(t, &limits, own.is_some(), what, &found, printer);
    let worse = match (by_own, by_limit) {
        (Some(own), Some(limit)) if limit.0 > own.0 => Some(limit),
        (Some(own), _) => Some(own),
        (None, limit) => limit,
    };
    let (grade, why) = match worse {
        Some((Grade::Good, _)) => (Some(Grade::Good), String::new()),
        Some((grade, why)) => (Some(grade), why),
        None => (
            None,
            format!(
                "{found}: no limit to hold it against yet; from the third check on the unit’s own are the yardstick"
            ),
        ),
    };
    Judged {
        step: step.id,
        what: what.to_owned(),
        found,
        grade,
        why,
    }
}

/// Which way is worse: +1 above, −1 below, 0 either.
fn worse(key: Key) -> f64 {
    match key {
        Key::ChargeShare | Key::SpeedForward | Key::SpeedReverse | Key::ChargeDrive => -1.0,
        Key::LowIdle | Key::HighIdle | Key::ChargeHigh | Key::ForwardOverReverse => 0.0,
        _ => 1.0,
    }
}

fn against_own(t: &Taken, own: &Baseline, printer: &Printer) -> (Grade, String) {
    let off = own.off(t.compare);
    let off = match worse(t.key) {
        way if way > 0.0 => off,
        way if way < 0.0 => -off,
        _ => off.abs(),
    };
    // Where what is usual leaves a share, less than that share is no news however sharp the readings are.
    let share = (t.compare - own.middle).abs() / own.middle.abs().max(1e-9);
    let grade = match t.key {
        Key::LowIdle | Key::HighIdle if off > OFF.0 && share > 0.03 => Grade::Watch,
        Key::LowIdle | Key::HighIdle => Grade::Good,
        Key::SpeedForward | Key::SpeedReverse | Key::ForwardOverReverse => match share {
            _ if off <= OFF.0 => Grade::Good,
            s if s > 0.07 => Grade::Stop,
            s if s > 0.03 => Grade::Watch,
            _ => Grade::Good,
        },
        // Above either factor whatever the uncertainty. Common practice.
        Key::Drain | Key::DrainRight => match t.compare / own.middle.max(1e-9) {
            r if r > 4.0 && off > OFF.0 => Grade::Stop,
            r if r > 2.0 && off > OFF.0 => Grade::Watch,
            _ => Grade::Good,
        },
        _ if off > OFF.1 => Grade::Stop,
        _ if off > OFF.0 => Grade::Watch,
        _ => Grade::Good,
    };
    let free = matches!(t.key, Key::Slip | Key::Knee | Key::Drain | Key::DrainRight);
    let why = format!(
        "{}: {} {}; this unit’s last {} checks have {} ± {} (95 %).",
        printer.name(t.key),
        printer.of(t.unit, t.compare),
        match t.key {
            _ if free => "as at the reference oil",
            Key::SpeedForward | Key::SpeedReverse => "as at high idle",
            _ => "now",
        },
        own.checks,
        printer.of(t.unit, own.middle),
        printer.of(t.unit, 2.0 * own.uncertainty),
    );
    (grade, why)
}

fn against_limit(
    t: &Taken,
    limits: &Limits,
    has_own: bool,
    what: &str,
    found: &str,
    printer: &Printer,
) -> Option<(Grade, String)> {
    let over = |limit: f64| match worse(t.key) {
        way if way < 0.0 => t.raw < limit,
        _ => t.raw > limit,
    };
    let side = if worse(t.key) < 0.0 { "under" } else { "over" };
    let close = |limit: f64| {
        if (t.raw - limit).abs() < 2.0 * t.raw_own {
            format!(
                " It is nearer to the limit than it can be read (± {}).",
                printer.of(t.unit, 2.0 * t.raw_own)
            )
        } else {
            String::new()
        }
    };
    let tell = |limit: f64| {
        format!(
            "{what}: {found}, {side} {} ({}).{}",
            printer.of(t.unit, limit),
            limits.source,
            close(limit)
        )
    };
    if let Some(other) = &limits.other {
        return Some(other.clone());
    }
    if let Some(stop) = limits.stop.filter(|l| over(*l)) {
        return Some((Grade::Stop, tell(stop)));
    }
    // The unit's own checks take the place of the limit to watch.
    if let Some(watch) = limits.watch.filter(|l| !has_own && over(*l)) {
        return Some((Grade::Watch, tell(watch)));
    }
    (limits.watch.is_some() || limits.stop.is_some()).then(|| (Grade::Good, String::new()))
}

/// True where the brake release is fed from charge, as far as the profile knows.
pub(super) fn brake_from_charge(unit: &Unit) -> bool {
    unit.ticks.brake_from_charge == Tick::Yes
}
