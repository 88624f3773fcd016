//! A point: readings repeated in one setting, their mean, their spread, and whether the machine stood steady meanwhile.

use super::channel::{Allowed, Channel};
use super::flaw::Part;
use super::sheet::Row;
use crate::readings::instrument::gum;
use std::collections::{BTreeMap, BTreeSet};

/// Fewest readings that show a steady point (common practice).
pub const READINGS: usize = 3;
/// Where the inlet should stand, °C, and how far from it (common practice; ISO 4409 states 50 °C, from memory).
pub const INLET: (f64, f64) = (50.0, 3.0);

/// Means of a point's channels, each in the channel's unit.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Means(BTreeMap<Channel, f64>);

impl Means {
    /// A channel's mean.
    #[must_use]
    pub fn get(&self, channel: Channel) -> Option<f64> {
        self.0.get(&channel).copied()
    }

    /// With one channel moved by an amount; the same where the channel was not read.
    #[must_use]
    pub fn moved(&self, channel: Channel, by: f64) -> Means {
        let mut moved = self.clone();
        if let Some(value) = moved.0.get_mut(&channel) {
            *value += by;
        }
        moved
    }

    /// Channels that were read.
    pub fn channels(&self) -> impl Iterator<Item = (Channel, f64)> + '_ {
        self.0.iter().map(|(channel, value)| (*channel, *value))
    }

    /// Pressure difference, bar.
    #[must_use]
    pub fn difference(&self) -> Option<f64> {
        Some(self.get(Channel::High)? - self.get(Channel::Low)?)
    }

    /// Temperature at which the oil leaks, °C: between inlet and case where both were read.
    #[must_use]
    pub fn leak_temperature(&self) -> Option<f64> {
        let inlet = self.get(Channel::Inlet);
        let other = self.get(Channel::CaseOil).or(self.get(Channel::Outlet));
        match (inlet, other) {
            (Some(inlet), Some(other)) => Some(0.5 * (inlet + other)),
            (one, other) => one.or(other),
        }
    }
}

impl FromIterator<(Channel, f64)> for Means {
    fn from_iter<T: IntoIterator<Item = (Channel, f64)>>(cells: T) -> Self {
        Means(cells.into_iter().collect())
    }
}

/// Whether a point was steady.
#[derive(Clone, Debug, PartialEq)]
pub enum Steadiness {
    /// Enough readings, and they lie together.
    Steady,
    /// Too few readings to show it: how many there are.
    NotShown(usize),
    /// Not steady: which channels, and by how much they moved over what is allowed (both in the channel's unit).
    Moving(Vec<(Channel, f64, f64)>),
}

/// A point of the run.
#[derive(Clone, Debug, PartialEq)]
pub struct Point {
    /// Its name on the sheet.
    pub name: String,
    /// Rows of the table that it joins.
    pub rows: Vec<usize>,
    /// Means.
    pub means: Means,
    /// Standard uncertainty of each mean by the scatter of its readings (GUM 4.2.3); only where there are at least two.
    pub scatter: BTreeMap<Channel, f64>,
    /// Whether it was steady.
    pub steadiness: Steadiness,
    /// What of it is left out of displacement, fits and verdict; [`super::flaw`] says why.
    pub left_out: BTreeSet<Part>,
}

impl Point {
    /// True where none of these parts is left out.
    #[must_use]
    pub fn counts_for(&self, parts: &[Part]) -> bool {
        parts.iter().all(|part| !self.left_out.contains(part))
    }
}

/// Joins rows of one name to points, in the order of their first row. Rows without a name are points of their own.
#[must_use]
pub fn points(rows: &[Row]) -> Vec<Point> {
    let mut order: Vec<(String, Vec<usize>)> = Vec::new();
    for (at, row) in rows.iter().enumerate().filter(|(_, row)| row.counts()) {
        let name = row.name.trim();
        let known = order
            .iter_mut()
            .find(|(known, _)| !name.is_empty() && known == name);
        match known {
            Some((_, at_rows)) => at_rows.push(at),
            None if name.is_empty() => order.push((String::new(), vec![at])),
            None => order.push((name.to_owned(), vec![at])),
        }
    }
    let mut points: Vec<Point> = order
        .into_iter()
        .map(|(name, at)| point(name, rows, at))
        .collect();
    for (index, point) in points.iter_mut().enumerate() {
        if point.name.is_empty() {
            point.name = format!("{}", index + 1);
        }
    }
    points
}

fn point(name: String, rows: &[Row], at: Vec<usize>) -> Point {
    let mut means = BTreeMap::new();
    let mut scatter = BTreeMap::new();
    let mut moving = Vec::new();
    for channel in Channel::ALL {
        let values: Vec<f64> = at
            .iter()
            .filter_map(|at| rows[*at].value(channel))
            .collect();
        if values.is_empty() {
            continue;
        }
        let n = values.len() as f64;
        let mean = values.iter().sum::<f64>() / n;
        means.insert(channel, mean);
        if values.len() < 2 {
            continue;
        }
        let squares: f64 = values.iter().map(|v| (v - mean) * (v - mean)).sum();
        let of_mean = (squares / (n - 1.0) / n).sqrt();
        // Few readings know their own scatter badly: widened as Student's t is over the normal (GUM G.3.3).
        let widened =
            of_mean * gum::coverage_factor_95(n - 1.0) / gum::coverage_factor_95(f64::INFINITY);
        scatter.insert(channel, widened);
        let high = values.iter().copied().fold(f64::MIN, f64::max);
        let low = values.iter().copied().fold(f64::MAX, f64::min);
        let half = 0.5 * (high - low);
        let allowed = match channel.allowed() {
            Allowed::Share(share) => share * mean.abs(),
            Allowed::Fixed(limit) => limit,
            Allowed::Free => f64::INFINITY,
        };
        // A hair of slack: limits are shown rounded.
        if half > allowed * (1.0 + 1e-9) + 1e-9 {
            moving.push((channel, half, allowed));
        }
    }
    let steadiness = if !moving.is_empty() {
        Steadiness::Moving(moving)
    } else if at.len() < READINGS {
        Steadiness::NotShown(at.len())
    } else {
        Steadiness::Steady
    };
    Point {
        name,
        rows: at,
        means: Means(means),
        scatter,
        steadiness,
        left_out: BTreeSet::new(),
    }
}

/// How the first point came out when it was taken again at the end: flow and case flow, last over first less 1, where both
/// points stand at the same speed and pressure within 3 %, and neither is left out.
#[must_use]
pub fn repeated(points: &[Point]) -> Option<(Option<f64>, Option<f64>)> {
    let (first, last) = (points.first()?, points.last()?);
    if points.len() < 3 || !(first.left_out.is_empty() && last.left_out.is_empty()) {
        return None;
    }
    let near = |one: Option<f64>, other: Option<f64>| {
        let (one, other) = (one?, other?);
        ((one - other).abs() <= 0.03 * one.abs()).then_some(())
    };
    near(
        first.means.get(Channel::Speed),
        last.means.get(Channel::Speed),
    )?;
    near(first.means.difference(), last.means.difference())?;
    let change = |channel| {
        let (one, other) = (first.means.get(channel)?, last.means.get(channel)?);
        (one > 0.0).then(|| other / one - 1.0)
    };
    let found = (change(Channel::Flow), change(Channel::Case));
    (found != (None, None)).then_some(found)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn row(name: &str, speed: f64, flow: f64) -> Row {
        Row::of(name, &[(Channel::Speed, speed), (Channel::Flow, flow)])
    }

    #[test]
    fn rows_of_one_name_are_one_point() {
        let rows = [
            row("a", 1500.0, 90.0),
            row("", 1000.0, 60.0),
            row("a", 1502.0, 90.4),
            row("a", 1498.0, 89.6),
        ];
        let points = points(&rows);
        assert_eq!(points.len(), 2);
        assert_eq!(points[0].rows, [0, 2, 3]);
        assert_eq!(points[0].steadiness, Steadiness::Steady);
        assert!((points[0].means.get(Channel::Flow).expect("read") - 90.0).abs() < 1e-12);
        // s = 0.4, of the mean 0.4/√3, widened by 4.30/1.96.
        let expected = 0.4 / 3.0_f64.sqrt() * 4.30 / 1.96;
        assert!((points[0].scatter[&Channel::Flow] - expected).abs() < 1e-12);
        assert_eq!(points[1].steadiness, Steadiness::NotShown(1));
        assert_eq!(points[1].name, "2");
    }

    #[test]
    fn a_point_that_moves_says_what_moved() {
        let rows = [
            row("a", 1500.0, 90.0),
            row("a", 1500.0, 93.0),
            row("a", 1500.0, 87.0),
        ];
        let Steadiness::Moving(moving) = points(&rows)[0].steadiness.clone() else {
            panic!("3.3 % is more than 1.5 %");
        };
        assert_eq!(moving.len(), 1);
        assert_eq!(moving[0].0, Channel::Flow);
    }

    #[test]
    fn the_first_point_taken_again_tells_of_warming_up() {
        let at = |name: &str, flow: f64| {
            Row::of(
                name,
                &[
                    (Channel::Speed, 1500.0),
                    (Channel::Low, 20.0),
                    (Channel::High, 220.0),
                    (Channel::Flow, flow),
                ],
            )
        };
        let rows = [at("1", 100.0), row("2", 1000.0, 60.0), at("3", 98.0)];
        let (flow, case) = repeated(&points(&rows)).expect("the same setting");
        assert!((flow.expect("read") + 0.02).abs() < 1e-12);
        assert_eq!(case, None);
        assert_eq!(repeated(&points(&rows[..2])), None);
    }
}
