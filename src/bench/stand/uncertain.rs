//! Uncertainty of everything computed (JCGM 100): what an instrument is off by moves all its readings alike, so the whole analysis
//! is run again with each instrument moved by its standard uncertainty; what comes by chance is added point by point. So a
//! flow meter's error falls out of an efficiency whose displacement came from the same meter, and stays in where the
//! displacement is the plate's.

use super::analysis::{Analysis, Quantity, Setup, analyse, evaluate, flow_chance};
use super::channel::{Channel, Gauged};
use super::point::Point;
use crate::readings::instrument::gum;
use std::collections::BTreeMap;

/// Standard uncertainty of a plate's displacement, as a share: tolerances of ±2 to 3 % as a rectangular distribution. Common
/// practice.
pub const PLATE_SPREAD: f64 = 0.015;
/// Standard uncertainty by chance of what was read once, as a share of the channel's own limit of error. Common practice.
const CHANCE_OF_LIMIT: f64 = 0.25;

/// Something that is off by the same for the whole run.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Common {
    /// An instrument.
    Instrument(Channel),
    /// The oil's viscosity.
    Viscosity,
    /// The displacement on the plate, where no better one was derived.
    Plate,
}

/// A figure with its standard uncertainty.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Uncertain {
    /// Figure.
    pub value: f64,
    /// Standard uncertainty.
    pub standard: f64,
}

impl Uncertain {
    /// Expanded uncertainty, coverage factor 2: about 95 %.
    #[must_use]
    pub fn expanded(&self) -> f64 {
        gum::expanded(self.standard, 2.0)
    }
}

/// The analysis with the uncertainty of each figure.
#[derive(Clone, Debug, PartialEq)]
pub struct Evaluated {
    /// As read.
    pub analysis: Analysis,
    /// Derived displacement.
    pub derived: Option<Uncertain>,
    /// Figures, point by point.
    pub points: Vec<BTreeMap<Quantity, Uncertain>>,
}

/// The run with one common cause moved by its standard uncertainty, for each.
#[must_use]
pub fn moved(
    points: &[Point],
    setup: &Setup,
    gauged: impl Fn(Channel) -> Gauged,
    viscosity: f64,
) -> Vec<(Common, Vec<Point>, Setup)> {
    let mut runs = Vec::new();
    for channel in Channel::ALL {
        if !points
            .iter()
            .any(|point| point.means.get(channel).is_some())
        {
            continue;
        }
        let gauge = gauged(channel);
        let shifted = points
            .iter()
            .map(|point| {
                let by = point
                    .means
                    .get(channel)
                    .map_or(0.0, |v| gauge.standard(channel, v));
                Point {
                    means: point.means.moved(channel, by),
                    ..point.clone()
                }
            })
            .collect();
        runs.push((Common::Instrument(channel), shifted, setup.clone()));
    }
    if setup.oil.is_some() {
        let thicker = Setup {
            viscosity_factor: setup.viscosity_factor * (1.0 + viscosity),
            ..setup.clone()
        };
        runs.push((Common::Viscosity, points.to_vec(), thicker));
    }
    if let Some(plate) = setup.plate {
        let larger = Setup {
            plate: Some(plate * (1.0 + PLATE_SPREAD)),
            ..setup.clone()
        };
        runs.push((Common::Plate, points.to_vec(), larger));
    }
    runs
}

/// Standard uncertainty of a channel's mean at a point by chance.
pub(super) fn chance(point: &Point, channel: Channel, gauge: Gauged) -> f64 {
    if channel == Channel::Flow {
        return flow_chance(point).unwrap_or(0.0);
    }
    point.scatter.get(&channel).copied().unwrap_or_else(|| {
        point.means.get(channel).map_or(0.0, |value| {
            CHANCE_OF_LIMIT * gauge.standard(channel, value)
        })
    })
}

/// Evaluates a run.
#[must_use]
pub fn evaluated(
    points: &[Point],
    setup: &Setup,
    gauged: impl Fn(Channel) -> Gauged,
    viscosity: f64,
) -> Evaluated {
    let analysis = analyse(points, setup);
    let mut squares: Vec<BTreeMap<Quantity, f64>> = vec![BTreeMap::new(); points.len()];
    let mut derived = analysis
        .derived
        .as_ref()
        .map_or(0.0, |d| d.chance * d.chance);
    for (_, shifted, setup) in moved(points, setup, &gauged, viscosity) {
        let other = analyse(&shifted, &setup);
        if let (Some(one), Some(other)) = (&analysis.derived, &other.derived) {
            derived += (other.value - one.value) * (other.value - one.value);
        }
        for (at, square) in squares.iter_mut().enumerate() {
            add(square, &analysis.points[at], &other.points[at]);
        }
    }
    for (at, point) in points.iter().enumerate() {
        let here = &analysis.points[at];
        for (channel, _) in point.means.channels() {
            let by = chance(point, channel, gauged(channel));
            let means = point.means.moved(channel, by);
            let other = evaluate(&means, setup, analysis.displacement);
            add(&mut squares[at], here, &other);
        }
        if let Some(d) = &analysis.derived {
            let other = evaluate(&point.means, setup, Some(d.value + d.chance));
            add(&mut squares[at], here, &other);
        }
    }
    let figures = analysis
        .points
        .iter()
        .zip(&squares)
        .map(|(result, square)| {
            let figure = |(quantity, square): (&Quantity, &f64)| {
                let value = result.get(*quantity)?;
                let standard = square.sqrt();
                Some((*quantity, Uncertain { value, standard }))
            };
            square.iter().filter_map(figure).collect()
        })
        .collect();
    Evaluated {
        derived: analysis.derived.as_ref().map(|d| Uncertain {
            value: d.value,
            standard: derived.sqrt(),
        }),
        points: figures,
        analysis,
    }
}

fn add(
    squares: &mut BTreeMap<Quantity, f64>,
    one: &super::analysis::PointResult,
    other: &super::analysis::PointResult,
) {
    for quantity in Quantity::ALL {
        if let (Some(a), Some(b)) = (one.get(quantity), other.get(quantity)) {
            *squares.entry(quantity).or_default() += (b - a) * (b - a);
        }
    }
}
