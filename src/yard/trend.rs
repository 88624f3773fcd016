//! The trend of a coefficient: a robust line over the hours with its band, the next check, and a projection where the points
//! carry one.

use super::calendar;
use super::history::{Grouped, History};
use super::robust::{Robust, robust, student_quantile};

/// Fewest comparable points behind a projection. Common practice.
pub const PROJECT_POINTS: usize = 5;
/// Shortest span behind a projection, h. Common practice.
pub const PROJECT_HOURS: f64 = 200.0;
/// Hours between two checks while nothing moves. Common practice.
pub const INTERVAL_HOURS: f64 = 250.0;
/// Days between two checks where nobody reads the hour meter. Common practice.
pub const INTERVAL_DAYS: f64 = 90.0;
/// Shortest time to the next check, as a share of the usual one.
const SHORTEST: f64 = 0.04;
/// How many residuals the stated uncertainties count for beside the residuals themselves.
const STATED: f64 = 4.0;
/// Coverage of every interval.
const COVER: f64 = 0.975;

/// What runs along the line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Axis {
    /// Hour meter.
    Hours,
    /// Days, where not every comparable point has its hours.
    Days,
}

impl Axis {
    /// Unit behind a figure.
    #[must_use]
    pub fn unit(self) -> &'static str {
        match self {
            Axis::Hours => "h",
            Axis::Days => "days",
        }
    }

    /// Where a point stands on it.
    #[must_use]
    pub fn of(self, g: &Grouped) -> Option<f64> {
        match self {
            Axis::Hours => g.point.hours,
            #[allow(clippy::cast_precision_loss)] // days of the calendar
            Axis::Days => g.point.day.map(|day| day as f64),
        }
    }
}

/// A value with its 95 % interval.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Band {
    /// Value on the line.
    pub value: f64,
    /// Lower end.
    pub low: f64,
    /// Upper end.
    pub high: f64,
}

/// A fitted trend. Its level is that of the instruments last used.
#[derive(Clone, Debug, PartialEq)]
pub struct Trend {
    /// Axis.
    pub axis: Axis,
    /// First and last point that were fitted.
    pub span: (f64, f64),
    /// Points fitted.
    pub points: usize,
    /// Change per unit of the axis.
    pub slope: Band,
    /// Weight of each comparable point, in their order; none where it only says "at most". Under 0.5 it stands off the line.
    pub weights: Vec<Option<f64>>,
    centre: f64,
    levels: Vec<usize>,
    fit: Robust,
    variance: f64,
    reach: f64,
}

/// Why there is no line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum NoTrend {
    /// Too few comparable points: how many there are.
    Few(usize),
    /// The points only say "at most".
    OnlyBounds,
    /// A repair came after the last point.
    Repaired,
    /// Neither hours nor days tell the points apart.
    NoSpan,
}

impl NoTrend {
    /// In words.
    #[must_use]
    pub fn words(self) -> String {
        match self {
            NoTrend::Few(0) => "No comparable point yet.".to_owned(),
            NoTrend::Few(1) => "One comparable point: no line yet. It takes three.".to_owned(),
            NoTrend::Few(n) => format!("{n} comparable points: no line yet. It takes three, and one more for each change of instrument."),
            NoTrend::OnlyBounds => {
                "The relief still holds wherever this was read, so each point only says \u{201c}at most\u{201d}. That is good, and no line can be drawn."
                    .to_owned()
            }
            NoTrend::Repaired => {
                "Repaired since: what was read before no longer compares.".to_owned()
            }
            NoTrend::NoSpan => "All points were taken at the same hours: no line yet.".to_owned(),
        }
    }
}

/// Fits the comparable points of a series.
///
/// # Errors
/// [`NoTrend`].
pub fn trend(history: &History) -> Result<Trend, NoTrend> {
    if history.is_broken_since {
        return Err(NoTrend::Repaired);
    }
    let points = history.comparable();
    let firm = |g: &&&Grouped| g.point.is.as_ref().is_ok_and(|c| !c.at_most);
    let fitted: Vec<&Grouped> = points.iter().filter(firm).copied().collect();
    if fitted.is_empty() && !points.is_empty() {
        return Err(NoTrend::OnlyBounds);
    }
    let has = |axis: Axis| fitted.iter().all(|g| axis.of(g).is_some());
    let axis = if has(Axis::Hours) {
        Axis::Hours
    } else {
        Axis::Days
    };
    let fitted: Vec<&Grouped> = fitted
        .into_iter()
        .filter(|g| axis.of(g).is_some())
        .collect();
    let mut levels: Vec<usize> = fitted.iter().map(|g| g.level).collect();
    levels.sort_unstable();
    levels.dedup();
    let columns = 1 + levels.len();
    if fitted.len() <= columns {
        return Err(NoTrend::Few(fitted.len()));
    }
    let at: Vec<f64> = fitted.iter().filter_map(|g| axis.of(g)).collect();
    let span = (
        at.iter().copied().fold(f64::INFINITY, f64::min),
        at.iter().copied().fold(f64::NEG_INFINITY, f64::max),
    );
    if span.1 - span.0 <= 0.0 {
        return Err(NoTrend::NoSpan);
    }
    let centre = at.iter().sum::<f64>() / at.len() as f64;
    let width = span.1 - span.0;
    let (mut rows, mut y) = (Vec::new(), Vec::new());
    for (g, x) in fitted.iter().zip(&at) {
        let Ok(c) = &g.point.is else { continue };
        let u = c.is.own.max(1e-9);
        let mut row: Vec<f64> = levels
            .iter()
            .map(|l| f64::from(u8::from(*l == g.level)) / u)
            .collect();
        row.push((x - centre) / width / u);
        rows.push(row);
        y.push(c.is.value / u);
    }
    let fit = robust(&rows, &y).ok_or(NoTrend::NoSpan)?;
    let place = (levels.len() + 1) * (levels.len() + 1) - 1;
    let by_residuals = fit.covariance[place] / fit.inverse[place];
    let freedom = fit.freedom as f64;
    let variance = (STATED + freedom * by_residuals) / (STATED + freedom);
    let reach = student_quantile(COVER, STATED + freedom);
    let slope = fit.coefficients[levels.len()] / width;
    let half = reach * (variance * fit.inverse[place]).sqrt() / width;
    let mut of_fitted = fit.weights.iter();
    let weights = points
        .iter()
        .map(|g| {
            let is_fitted = fitted.iter().any(|f| core::ptr::eq(*f, *g));
            is_fitted.then(|| of_fitted.next().copied()).flatten()
        })
        .collect();
    Ok(Trend {
        axis,
        span,
        points: fitted.len(),
        slope: Band {
            value: slope,
            low: slope - half,
            high: slope + half,
        },
        weights,
        centre,
        levels,
        fit,
        variance,
        reach,
    })
}

impl Trend {
    /// The line at a place of the axis, at the level of the instruments last used, with its 95 % band.
    #[must_use]
    pub fn at(&self, x: f64, level: usize) -> Band {
        let level = self.levels.iter().position(|l| *l == level);
        let level = level.unwrap_or(self.levels.len() - 1);
        let n = self.levels.len() + 1;
        let t = (x - self.centre) / (self.span.1 - self.span.0);
        let c = |i: usize, j: usize| self.fit.inverse[i * n + j];
        let value = self.fit.coefficients[level] + t * self.fit.coefficients[n - 1];
        let variance = c(level, level) + 2.0 * t * c(level, n - 1) + t * t * c(n - 1, n - 1);
        let half = self.reach * (self.variance * variance.max(0.0)).sqrt();
        Band {
            value,
            low: value - half,
            high: value + half,
        }
    }

    /// The first place after the last point at which `edge` of the band passes `limit`; none within `most` of it.
    fn crosses(&self, level: usize, limit: f64, edge: fn(Band) -> f64, most: f64) -> Option<f64> {
        let over = |x: f64| edge(self.at(x, level)) >= limit;
        let last = self.span.1;
        if over(last) {
            return Some(last);
        }
        // The band's edges bend only one way beyond the points, so halving finds the first passage.
        let steps = 400;
        let step = most / f64::from(steps);
        let first = (1..=steps)
            .map(|k| last + step * f64::from(k))
            .find(|x| over(*x))?;
        let (mut low, mut high) = (first - step, first);
        while high - low > 1e-3 {
            let middle = 0.5 * (low + high);
            if over(middle) {
                high = middle
            } else {
                low = middle
            }
        }
        Some(high)
    }
}

/// When the margin is gone, on the hour meter.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Projection {
    /// Limit.
    pub limit: f64,
    /// Earliest, h: the upper edge of the band reaches the limit.
    pub earliest: f64,
    /// By the line itself, h.
    pub middle: f64,
    /// Latest, h; none where the lower edge does not reach it in five times the span.
    pub latest: Option<f64>,
}

/// Why there is no projection.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum NoProjection {
    /// No line.
    NoLine,
    /// Too few points or too short a span, h; or the hour meter was not read.
    Thin(usize, Option<f64>),
    /// The line does not rise for certain.
    NotRising,
    /// It rises, and the limit lies beyond what the points can tell: five times their span.
    Far,
}

impl NoProjection {
    /// In words.
    #[must_use]
    pub fn words(self) -> String {
        match self {
            NoProjection::NoLine => "No projection without a line.".to_owned(),
            NoProjection::Thin(points, span) => {
                let span = span.map_or("no hour meter reading for each".to_owned(), |h| {
                    format!("{h:.0} h")
                });
                format!(
                    "No projection: it takes at least {PROJECT_POINTS} comparable points over {PROJECT_HOURS:.0} h (common \
                     practice); there are {points}, over {span}."
                )
            }
            NoProjection::NotRising => {
                "No projection: it is not certain that it rises at all.".to_owned()
            }
            NoProjection::Far => {
                "It rises, and the limit lies further off than these points can tell.".to_owned()
            }
        }
    }
}

/// How far beyond the last point a projection goes, in spans of the points.
const FURTHEST: f64 = 5.0;

/// When the line reaches a limit.
///
/// # Errors
/// [`NoProjection`]: it stands only where the points carry one.
pub fn projection(trend: &Trend, level: usize, limit: f64) -> Result<Projection, NoProjection> {
    let span = trend.span.1 - trend.span.0;
    let hours = (trend.axis == Axis::Hours).then_some(span);
    if trend.points < PROJECT_POINTS || hours.is_none_or(|h| h < PROJECT_HOURS) {
        return Err(NoProjection::Thin(trend.points, hours));
    }
    if trend.slope.low <= 0.0 {
        return Err(NoProjection::NotRising);
    }
    let most = FURTHEST * span;
    let middle = trend
        .crosses(level, limit, |b| b.value, most)
        .ok_or(NoProjection::Far)?;
    let earliest = trend
        .crosses(level, limit, |b| b.high, most)
        .unwrap_or(middle);
    Ok(Projection {
        limit,
        earliest,
        middle,
        latest: trend.crosses(level, limit, |b| b.low, most),
    })
}

/// When to check next.
#[derive(Clone, Debug, PartialEq)]
pub struct NextCheck {
    /// At these hours on the meter, where it is read.
    pub hours: Option<f64>,
    /// On this day (days from 1970), where the unit's days can be read.
    pub day: Option<i64>,
    /// Why then.
    pub why: &'static str,
}

/// When to check next: at the usual interval, and no later than half the way to where the upper edge of any trend's band reaches
/// its watch limit. `reaches` gives that way, in the unit of its axis, for each trend. `last` is day and hours of the last check;
/// `daily` the hours a day that the unit makes, where two checks tell it.
#[must_use]
pub fn next_check(
    last: (Option<i64>, Option<f64>),
    daily: Option<f64>,
    reaches: &[(Axis, f64)],
) -> NextCheck {
    let (day, hours) = last;
    let daily = daily.filter(|d| *d > 0.0);
    let (mut in_hours, mut in_days) = (INTERVAL_HOURS, INTERVAL_DAYS);
    let mut why = "the usual interval, common practice";
    for (axis, reach) in reaches {
        let (usual, left) = match axis {
            Axis::Hours => (INTERVAL_HOURS, &mut in_hours),
            Axis::Days => (INTERVAL_DAYS, &mut in_days),
        };
        let half = (0.5 * reach).max(SHORTEST * usual);
        if half < *left {
            *left = half;
            why = "half the way to where the trend may reach its watch limit";
        }
    }
    // Whichever comes first.
    if let Some(daily) = daily {
        in_days = in_days.min(in_hours / daily);
    } else if hours.is_some() {
        // Nobody knows how fast the hours run: the share of the usual interval holds for the days too.
        in_days = in_days.min(INTERVAL_DAYS * in_hours / INTERVAL_HOURS);
    }
    #[allow(clippy::cast_possible_truncation)] // at most INTERVAL_DAYS
    let ahead = in_days.clamp(1.0, INTERVAL_DAYS).round() as i64;
    NextCheck {
        hours: hours.map(|h| h + in_hours),
        day: day.map(|d| d + ahead),
        why,
    }
}

/// How far beyond its last point the upper edge of a trend's band reaches a limit; none where it stays under it for as long as
/// the usual interval twice over.
#[must_use]
pub fn reach(trend: &Trend, level: usize, limit: f64) -> Option<f64> {
    let most = 2.0
        * match trend.axis {
            Axis::Hours => INTERVAL_HOURS,
            Axis::Days => INTERVAL_DAYS,
        };
    trend
        .crosses(level, limit, |b| b.high, most)
        .map(|x| x - trend.span.1)
}

/// Hours a day that a unit makes, from the first and the last of its points that have both; none under a week.
#[must_use]
pub fn daily_hours(points: &[(i64, f64)]) -> Option<f64> {
    let first = points.iter().min_by_key(|(day, _)| *day)?;
    let last = points.iter().max_by_key(|(day, _)| *day)?;
    let days = last.0 - first.0;
    let hours = last.1 - first.1;
    #[allow(clippy::cast_precision_loss)] // days of the calendar
    (days >= 7 && hours > 0.0).then(|| (hours / days as f64).min(24.0))
}

/// Text of a day for a screen.
#[must_use]
pub fn day_words(day: i64) -> String {
    calendar::words(day)
}
