//! Out and in are paired: what changed while the machine was out, with its uncertainty.

use super::history::{Usual, of_sheet};
use super::report::Grade;
use super::sheet::{Leg, YardSheet};
use super::wear::{Coefficient, Wear};
use crate::quantity::{Measure, Unit as InUnit, UnitPrefs};
use crate::readings::instrument::{Instrument, gum};
use crate::record::Visit;
use crate::unit::Unit;

/// Uncertainties from which a change is to be watched. Common practice.
const WATCH: f64 = 2.0;
/// Uncertainties from which it stays. Common practice.
const STOP: f64 = 4.0;

/// A change of one coefficient.
#[derive(Clone, Debug, PartialEq)]
pub struct Change {
    /// Which.
    pub of: Wear,
    /// What it was, what it is, the difference and its standard uncertainty; in the unit of the coefficient.
    pub figures: (f64, f64, f64, f64),
    /// What it comes to. A change for the better is never worse than good.
    pub grade: Grade,
    /// In words.
    pub words: String,
}

/// The check out that belongs to a check in, and what changed.
#[derive(Clone, Debug, PartialEq)]
pub struct OutCheck {
    /// Visit id of the check out.
    pub visit: String,
    /// When it was.
    pub opened: String,
    /// Hours on the meter while it was out.
    pub hours: Option<f64>,
    /// Changes.
    pub changes: Vec<Change>,
    /// What cannot be compared, and why.
    pub not_compared: Vec<String>,
}

/// The latest check out before a check in, with no other check in between them.
fn partner<'a>(visit: &Visit, earlier: &[&'a Visit]) -> Option<&'a Visit> {
    let mut before: Vec<&Visit> = earlier
        .iter()
        .copied()
        .filter(|v| v.id != visit.id && v.yard.is_some())
        .collect();
    before.sort_by(|a, b| (&b.opened, &b.id).cmp(&(&a.opened, &a.id)));
    let leg = |v: &Visit| v.yard.as_ref().map(|sheet| sheet.leg);
    before
        .into_iter()
        .take_while(|v| leg(v) != Some(Leg::In))
        .find(|v| leg(v) == Some(Leg::Out))
}

/// Pairs a check in with its check out. None where there is none.
#[must_use]
pub fn out_of(
    unit: &Unit,
    visit: &Visit,
    earlier: &[&Visit],
    instruments: &[Instrument],
    prefs: &UnitPrefs,
) -> Option<OutCheck> {
    let now = visit.yard.as_ref()?;
    let out = partner(visit, earlier)?;
    let then = out.yard.as_ref()?;
    let mut made = OutCheck {
        visit: out.id.clone(),
        opened: out.opened.clone(),
        hours: out
            .hour_meter()
            .zip(visit.hour_meter())
            .map(|(then, now)| now - then)
            .filter(|h| *h >= 0.0),
        changes: Vec::new(),
        not_compared: Vec::new(),
    };
    let usual = Usual::of(unit, earlier.iter().copied().chain([visit]));
    let is_two = !unit.ticks.paths.is_one();
    for of in Wear::ALL {
        if of == Wear::DrainRight && !is_two {
            continue;
        }
        match one(of, unit, then, now, instruments, usual, prefs) {
            Ok(change) => made.changes.push(change),
            Err(why) => made.not_compared.push(format!("{}: {why}", of.words())),
        }
    }
    Some(made)
}

fn one(
    of: Wear,
    unit: &Unit,
    then: &YardSheet,
    now: &YardSheet,
    instruments: &[Instrument],
    usual: Usual,
    prefs: &UnitPrefs,
) -> Result<Change, String> {
    let get = |sheet, leg: &str| -> Result<(Coefficient, String), String> {
        let (is, with) = of_sheet(of, unit, sheet, instruments, usual)
            .ok_or_else(|| format!("not read {leg}"))?;
        Ok((is.map_err(|why| format!("{}, {leg}", why.words()))?, with))
    };
    let (before, with_before) = get(then, "going out")?;
    let (after, with_after) = get(now, "coming in")?;
    let same = with_before == with_after;
    if !same && of == Wear::Slip {
        return Err("another ramp, or counted once and timed once".to_owned());
    }
    let u = |c: Coefficient| if same { c.is.own } else { c.is.all() };
    let (a, b) = (before.is.value, after.is.value);
    let difference = b - a;
    let uncertainty = gum::combined(&[u(before), u(after)]);
    let print = |value: f64| value_words(of, value, prefs);
    // "At most" on the way in cannot be worse than anything; on the way out it is the mildest that can be said.
    let grade = match difference / uncertainty.max(1e-12) {
        _ if after.at_most => Grade::Good,
        off if off > STOP => Grade::Stop,
        off if off > WATCH => Grade::Watch,
        _ => Grade::Good,
    };
    let bound = |c: Coefficient| if c.at_most { "at most " } else { "" };
    let told = if before.at_most && after.at_most {
        "The relief held both times: no change to be seen.".to_owned()
    } else {
        let at_least = if before.at_most { "at least " } else { "" };
        let judged = match grade {
            Grade::Stop => "a clear change for the worse while it was out",
            Grade::Watch => "more than chance would have it",
            Grade::Good if difference < -WATCH * uncertainty => {
                "better than it went out: find out what was done to it"
            }
            Grade::Good => "no more than chance",
        };
        format!(
            "{}{} going out, {}{} coming in: {at_least}{} ± {} (95 %), {judged}.",
            bound(before),
            print(a),
            bound(after),
            print(b),
            signed(difference, &print),
            print(2.0 * uncertainty),
        )
    };
    let other = if same {
        ""
    } else {
        " Read with other instruments: their errors are in the uncertainty."
    };
    Ok(Change {
        of,
        figures: (a, b, difference, uncertainty),
        grade,
        words: format!("{}, as at the reference oil: {told}{other}", of.words()),
    })
}

fn signed(value: f64, print: &impl Fn(f64) -> String) -> String {
    if value < 0.0 {
        format!("\u{2212}{}", print(-value))
    } else {
        format!("+{}", print(value))
    }
}

/// A coefficient's value with its unit, in the shop's units.
#[must_use]
pub fn value_words(of: Wear, value: f64, prefs: &UnitPrefs) -> String {
    let (unit, value) = match of {
        Wear::Drain | Wear::DrainRight => (InUnit::LitrePerMinute, value),
        Wear::Slip => (InUnit::Percent, value),
        Wear::Knee | Wear::LowIdle => (InUnit::RevolutionPerMinute, value.round()),
    };
    if of == Wear::Slip {
        return super::words::percent(value, prefs);
    }
    Measure::new(value, unit).map_or_else(|why| why.to_string(), |m| prefs.print(m))
}
