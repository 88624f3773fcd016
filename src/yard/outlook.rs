//! The wear of one unit over its hours, in one pure call: every series with its line, its limits, what it projects; the next check.

use super::history::History;
use super::law;
use super::robust::median;
use super::trend::{
    Axis, NextCheck, NoProjection, NoTrend, Projection, Trend, daily_hours, next_check, projection,
    reach, trend,
};
use super::wear::{self, Wear};
use crate::readings::instrument::Instrument;
use crate::record::Visit;
use crate::unit::Unit;

/// Oil at which limits of common practice are meant to hold, °C.
pub const HOT: f64 = 65.0;
/// Points behind the level that a drain is compared with.
const FIRST: usize = 3;

/// One coefficient of a unit.
#[derive(Clone, Debug, PartialEq)]
pub struct Series {
    /// Which.
    pub of: Wear,
    /// Its points.
    pub history: History,
    /// Its line, or why there is none.
    pub trend: Result<Trend, NoTrend>,
    /// Instruments last used, as a level of the trend.
    pub level: usize,
    /// Limits to watch and to stop, as coefficients; none where nothing is known to hold it against.
    pub limits: Option<(f64, f64)>,
    /// Where the limits come from.
    pub limits_from: String,
    /// When the limit to stop is reached, or why that is not said.
    pub projection: Result<Projection, NoProjection>,
}

/// Everything there is to say about a unit's wear.
#[derive(Clone, Debug, PartialEq)]
pub struct Outlook {
    /// Series that have points, in the order in which screens show them.
    pub series: Vec<Series>,
    /// When to check next.
    pub next: NextCheck,
    /// Temperature at which this unit's oil is the reference oil, °C.
    pub reference_celsius: f64,
}

/// Works it out from the visits to a unit, in any order.
#[must_use]
pub fn outlook(unit: &Unit, visits: &[&Visit], instruments: &[Instrument]) -> Outlook {
    let series: Vec<Series> = Wear::ALL
        .into_iter()
        .filter_map(|of| series(of, unit, visits, instruments))
        .collect();
    let reaches: Vec<(Axis, f64)> = series
        .iter()
        .filter_map(|s| {
            let trend = s.trend.as_ref().ok()?;
            let (watch, _) = s.limits?;
            Some((trend.axis, reach(trend, s.level, watch)?))
        })
        .collect();
    let mut own: Vec<&Visit> = visits
        .iter()
        .copied()
        .filter(|v| v.unit == unit.id)
        .collect();
    own.sort_by_key(|v| (v.opened.as_str(), v.id.as_str()));
    let dated: Vec<(i64, f64)> = own
        .iter()
        .filter_map(|v| super::calendar::day(&v.opened).zip(v.hour_meter()))
        .collect();
    let last = own.iter().rev().find(|v| v.is_yard_check());
    let last = last.map_or((None, None), |v| {
        (super::calendar::day(&v.opened), v.hour_meter())
    });
    Outlook {
        series,
        next: next_check(last, daily_hours(&dated), &reaches),
        reference_celsius: wear::reference_temperature(unit),
    }
}

fn series(of: Wear, unit: &Unit, visits: &[&Visit], instruments: &[Instrument]) -> Option<Series> {
    let history = History::of(of, unit, visits, instruments);
    let level = history.points.last()?.level;
    let trend = trend(&history);
    let (limits, limits_from) = limits(of, unit, &history);
    let projection = match (&trend, limits) {
        (Ok(trend), Some((_, stop))) => projection(trend, level, stop),
        _ => Err(NoProjection::NoLine),
    };
    Some(Series {
        of,
        history,
        trend,
        level,
        limits,
        limits_from,
        projection,
    })
}

/// Limits as coefficients: what common practice says of hot oil, brought to the reference; of a drain, its own first checks.
fn limits(of: Wear, unit: &Unit, history: &History) -> (Option<(f64, f64)>, String) {
    let hot = crate::math::pow(wear::viscosity_at(unit, HOT), law::power(of, unit));
    let idle = wear::low_idle_of(unit);
    let practice = |words: &str| format!("{words}, with the oil at {HOT:.0} °C; common practice");
    match of {
        Wear::Slip => (
            Some((0.06 * hot, 0.12 * hot)),
            practice("6 % to watch and 12 % to stop"),
        ),
        Wear::Knee => (
            Some(((idle + 300.0) * hot, (idle + 700.0) * hot)),
            practice("300 rpm over low idle to watch and 700 rpm to stop"),
        ),
        Wear::LowIdle => (
            Some((idle * hot / 0.89, idle * hot / 0.72)),
            practice(
                "charge at low idle under 80 % of that at high idle to watch and 65 % to stop",
            ),
        ),
        Wear::Drain | Wear::DrainRight => {
            let first: Vec<f64> = history
                .comparable()
                .iter()
                .filter_map(|g| g.point.is.as_ref().ok().map(|c| c.is.value))
                .take(FIRST)
                .collect();
            if first.len() < FIRST {
                return (
                    None,
                    format!(
                        "No limit yet: it is held against its own first {FIRST} comparable checks"
                    ),
                );
            }
            let own = median(&first);
            (
                Some((2.0 * own, 4.0 * own)),
                format!(
                    "twice its own first {FIRST} checks to watch and four times to stop; common practice"
                ),
            )
        }
    }
}
