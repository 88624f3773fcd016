//! From the sheet as it was filled in to what can be said: pure, so that the screen only draws.

use std::borrow::Cow;

use super::adjust::{self, Fitted, Halves, NoFit, Point, Seen};
use super::brake::{self, Risk, Stop};
use super::electric::{self, Currents, Judged};
use super::nulls::{Nulls, ServoPush, nulls, servo_push};
use super::offset::{Offset, Taken, offset};
use super::response::Shows;
use crate::quantity::{Kind, Measure, Unit as InUnit};
use crate::readings::instrument::timed::counted_turns;
use crate::readings::instrument::{gum, timed};
use crate::readings::{Condition, Direction, EngineSpeed, OilTemperature, Place};
use crate::record::NeutralSheet;
use crate::record::neutral::{AdjusterRow, Field, Gauging, SeriesBy};
use crate::unit::Unit;

/// Standard uncertainty of a difference of two servo or pilot pressures read one after the other on one small gauge, bar.
/// Common practice: a quarter division of a 0 to 40 bar gauge, twice.
pub const SMALL_GAUGE: f64 = 0.15;
/// Pilot pressure that may be left in a line at rest, bar. Common practice.
pub const PILOT_REST: f64 = 0.5;
/// Pilot pressures at which it starts, bar. Common practice.
pub const PILOT_START: (f64, f64) = (4.0, 6.0);
/// How far the two starts may differ, bar. Common practice.
pub const PILOT_DIFFER: f64 = 0.5;
/// How far servo pressures may differ at null, bar. Common practice: 0.3 to 0.5.
pub const SERVO_EQUAL: f64 = 0.5;

/// Everything that the sheet lets one say.
#[derive(Clone, Debug, Default, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Report {
    /// Creep in neutral, rpm of the wheel, forward positive, with its standard uncertainty.
    pub creep: Option<(f64, f64)>,
    /// Creep with the servo bridged.
    pub bridged: Option<(f64, f64)>,
    /// Swash offset from all that was read without the bridge.
    pub offset: Option<Offset>,
    /// Control null and servo null.
    pub nulls: Option<Nulls>,
    /// What the servo pressures ask.
    pub servo: Option<ServoPush>,
    /// The places of the adjuster that can be read.
    pub points: Vec<Point>,
    /// The adjuster.
    pub series: Option<Result<Fitted, NoFit>>,
    /// Halves of the dead band about the place of equal servo pressures.
    pub halves: Option<Halves>,
    /// Currents.
    pub currents: Option<Judged>,
    /// Where a locked check stops.
    pub stop: Option<Stop>,
    /// What the offset would build with the motor held.
    pub risk: Option<Risk>,
    /// What is missing before a reading counts, in words.
    pub missing: Vec<Cow<'static, str>>,
    /// True where the readings fit no machine of this profile.
    pub fits_none: bool,
}

/// The condition of the sheet: engine and oil; what the machine does follows from each reading.
#[must_use]
pub fn condition(sheet: &NeutralSheet) -> Condition {
    let measure = |field: Field, kind: Kind| {
        let value = sheet.fields.get(&field)?.value?;
        (value.kind() == kind).then_some(value)
    };
    Condition {
        engine: measure(Field::Engine, Kind::RotationalSpeed)
            .map_or(sheet.engine, EngineSpeed::Measured),
        oil: measure(Field::Oil, Kind::Temperature).map(|value| OilTemperature {
            value,
            place: Place::DrainHose,
        }),
        ..Condition::start()
    }
}

/// What the sheet lets one say of this unit.
#[must_use]
pub fn report(unit: &Unit, sheet: &NeutralSheet) -> Report {
    let mut missing = Vec::new();
    let condition = condition(sheet);
    let creep = counted(
        sheet.value(Field::CreepTurns),
        sheet.value(Field::CreepTime),
        sheet.creeps,
        &mut missing,
    );
    let bridged = counted(
        sheet.value(Field::BridgedTurns),
        sheet.value(Field::BridgedTime),
        sheet.creeps_bridged,
        &mut missing,
    );
    let taken = |shows: Shows, read: Option<(f64, f64)>| {
        read.map(|(value, uncertainty)| Taken {
            shows,
            condition,
            value,
            uncertainty,
        })
    };
    let difference = sheet
        .value(Field::Difference)
        .map(|bar| (bar, difference_uncertainty(sheet.gauging, bar)));
    let open: Vec<Taken> = taken(Shows::Creep, creep)
        .into_iter()
        .chain(taken(Shows::Difference, difference))
        .collect();
    let mut all = open.clone();
    all.extend(taken(Shows::CreepBridged, bridged));
    let found = (!open.is_empty()).then(|| offset(unit, &open)).flatten();
    let points = points(sheet, &mut missing);
    let series = (!sheet.series.is_empty()).then(|| adjust::fit(&points));
    let currents = currents(sheet);
    Report {
        fits_none: !open.is_empty() && found.is_none(),
        risk: found
            .as_ref()
            .and_then(|found| brake::risk(unit, &condition, &found.belief)),
        offset: found,
        nulls: (all.len() > open.len())
            .then(|| nulls(unit, &all))
            .flatten(),
        servo: pair(sheet, Field::ServoForward, Field::ServoReverse)
            .and_then(|(f, r)| servo_push(unit, f - r, SMALL_GAUGE)),
        halves: halves(sheet),
        points,
        series,
        currents,
        stop: Some(brake::stop(unit)),
        creep,
        bridged,
        missing,
    }
}

/// Both of two figures.
pub(super) fn pair(sheet: &NeutralSheet, one: Field, other: Field) -> Option<(f64, f64)> {
    sheet.value(one).zip(sheet.value(other))
}

/// A counted speed, forward positive, with its standard uncertainty, rpm. What is missing is told.
fn counted(
    turns: Option<f64>,
    seconds: Option<f64>,
    going: Option<Direction>,
    missing: &mut Vec<Cow<'static, str>>,
) -> Option<(f64, f64)> {
    let turns = turns?;
    let Some(seconds) = seconds.filter(|s| *s > 0.0) else {
        missing.push("Time over which the turns were counted.".into());
        return None;
    };
    if turns == 0.0 {
        // It stood: whatever it may have moved unseen is less than a quarter turn.
        return Some((0.0, gum::rectangular(timed::TURN_LIMIT) * 60.0 / seconds));
    }
    let Some(going) = going else {
        missing.push("Which way it creeps: forward or reverse.".into());
        return None;
    };
    let time = Measure::new(seconds, InUnit::Second).ok()?;
    let speed = counted_turns(turns, time).ok()?;
    let sign = sign(going);
    Some((sign * speed.value.base(), speed.combined()))
}

fn sign(going: Direction) -> f64 {
    match going {
        Direction::Forward => 1.0,
        Direction::Reverse => -1.0,
    }
}

/// Standard uncertainty of a loop difference, bar. Common practice: transducers zeroed together 1 bar and half a per cent; one
/// switched gauge of 600 bar a quarter division twice, its own error cancels; two gauges of 600 bar class 1.6 each.
#[must_use]
pub fn difference_uncertainty(gauging: Gauging, bar: f64) -> f64 {
    match gauging {
        Gauging::Paired => gum::combined(&[gum::rectangular(1.0), 0.005 * bar]),
        Gauging::Switched => gum::combined(&[
            gum::needle_division(10.0),
            gum::needle_division(10.0),
            0.01 * bar,
        ]),
        Gauging::TwoGauges => gum::combined(&[gum::rectangular(9.6), gum::rectangular(9.6)]),
    }
}

/// The places of the series that can be read.
fn points(sheet: &NeutralSheet, missing: &mut Vec<Cow<'static, str>>) -> Vec<Point> {
    let mut out = Vec::new();
    for row in &sheet.series {
        if let Some(point) = point(row, sheet.by, sheet.gauging, missing) {
            out.push(point);
        }
    }
    missing.dedup();
    out
}

fn point(
    row: &AdjusterRow,
    by: SeriesBy,
    gauging: Gauging,
    missing: &mut Vec<Cow<'static, str>>,
) -> Option<Point> {
    let turns = row.turns.value_in(InUnit::Turn)?;
    let seen = match (row.starts, by) {
        (Some(direction), _) => Seen::Starts(direction),
        (None, SeriesBy::Creep) => {
            let (value, uncertainty) = counted(
                row.shown.value_in(InUnit::Turn),
                row.time.value_in(InUnit::Second),
                row.going,
                missing,
            )?;
            Seen::Value { value, uncertainty }
        }
        (None, SeriesBy::Difference) => {
            let bar = row.shown.value_in(InUnit::Bar)?;
            Seen::Value {
                value: bar,
                uncertainty: difference_uncertainty(gauging, bar),
            }
        }
    };
    Some(Point {
        turns,
        from: row.from,
        seen,
    })
}

/// Halves of the dead band about the balanced place, from the means of the starts.
fn halves(sheet: &NeutralSheet) -> Option<Halves> {
    let balanced = sheet.value(Field::Balanced)?;
    let mean = |direction: Direction| {
        let places: Vec<f64> = sheet
            .series
            .iter()
            .filter(|row| row.starts == Some(direction))
            .filter_map(|row| row.turns.value_in(InUnit::Turn))
            .collect();
        (!places.is_empty()).then(|| places.iter().sum::<f64>() / places.len() as f64)
    };
    adjust::halves(
        mean(Direction::Forward)?,
        mean(Direction::Reverse)?,
        balanced,
    )
}

fn currents(sheet: &NeutralSheet) -> Option<Judged> {
    let currents = Currents {
        threshold_forward: sheet.value(Field::ThresholdForward),
        threshold_reverse: sheet.value(Field::ThresholdReverse),
        end_forward: sheet.value(Field::EndForward),
        end_reverse: sheet.value(Field::EndReverse),
    };
    (currents != Currents::default()).then(|| electric::judge(&currents))
}
