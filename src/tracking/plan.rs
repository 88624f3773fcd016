//! The path that the machine will draw, before and after what is to be adjusted: for a plan view.

use super::adjust::Adjustment;
use super::fit::{Fit, slopes};
use super::law::{self, Prior, State};
use super::run::{Lever, Machine, Run, Seen, Setting, Travel};
use crate::kinematics::{Pose, TwoSides};
use crate::quantity::typed::{Angle, Length, Time, Velocity};
use uom::si;

/// Lane that is drawn where none was run, m.
const USUAL: f64 = 10.0;
/// Steps along the lane.
const STEPS: usize = 24;
/// Largest angle that is drawn, rad: beyond a quarter turn a lane is no lane.
const TURN: f64 = 1.5;

/// A place on the ground.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point {
    /// Along the lane, m; negative in reverse.
    pub along: f64,
    /// To the left of the seat, m.
    pub left: f64,
}

/// A path with its 95 % band.
#[derive(Clone, Debug, PartialEq)]
pub struct Trace {
    /// The middle of the machine.
    pub middle: Vec<Point>,
    /// Right edge of the band.
    pub low: Vec<Point>,
    /// Left edge of the band.
    pub high: Vec<Point>,
    /// Curvature, 1/m, positive to the left.
    pub curvature: f64,
    /// Half-width of its 95 % interval, 1/m.
    pub half: f64,
}

impl Trace {
    /// How far to the left it ends, m: lowest, likeliest, highest.
    #[must_use]
    pub fn end(&self) -> (f64, f64, f64) {
        let last = |points: &[Point]| points.last().map_or(0.0, |p| p.left);
        (last(&self.low), last(&self.middle), last(&self.high))
    }
}

/// One way of driving, before and after.
#[derive(Clone, Debug, PartialEq)]
pub struct Plan {
    /// How it is driven.
    pub setting: Setting,
    /// Length of the path, m.
    pub distance: f64,
    /// As it is now.
    pub before: Trace,
    /// Once what is to be adjusted has been.
    pub after: Trace,
}

fn points(curvature: f64, width: f64, distance: f64, travel: Travel) -> Vec<Point> {
    let curvature = curvature.clamp(-TURN / distance, TURN / distance);
    let speed = |share: f64| Velocity::new::<si::velocity::meter_per_second>(travel.sign() * share);
    let half = 0.5 * curvature * width;
    let sides = TwoSides {
        track: Length::new::<si::length::meter>(width),
        left: speed(1.0 - half),
        right: speed(1.0 + half),
    };
    let start = Pose {
        x: Length::new::<si::length::meter>(0.0),
        y: Length::new::<si::length::meter>(0.0),
        heading: Angle::new::<si::angle::radian>(0.0),
    };
    (0..=STEPS)
        .map(|step| {
            let run = distance * step as f64 / STEPS as f64;
            let pose = start.after(&sides, Time::new::<si::time::second>(run));
            Point {
                along: pose.x.value,
                left: pose.y.value,
            }
        })
        .collect()
}

fn trace(
    fit: &Fit,
    prior: &Prior,
    x: &State,
    setting: Setting,
    track: f64,
    distance: f64,
) -> Trace {
    let curvature = law::curvature(x, setting, track);
    let row = slopes(x, &prior.width, |x| law::curvature(x, setting, track));
    let half = 1.96 * fit.spread(&row);
    let width = law::width(x, track);
    let at = |curvature| points(curvature, width, distance, setting.travel);
    Trace {
        middle: at(curvature),
        low: at(curvature - half),
        high: at(curvature + half),
        curvature,
        half,
    }
}

/// Half and full lever, forward and in reverse. None without a track width or without a run.
pub(super) fn plans(
    fit: &Fit,
    prior: &Prior,
    machine: &Machine,
    runs: &[Run],
    adjustments: &[Adjustment],
) -> Vec<Plan> {
    let Some(track) = machine.track.filter(|t| *t > 0.0 && t.is_finite()) else {
        return Vec::new();
    };
    if fit.figures == 0 {
        return Vec::new();
    }
    let distance = runs
        .iter()
        .filter(|run| run.check(machine).is_ok())
        .filter_map(|run| match run.seen {
            Seen::Path { distance, .. } => Some(distance),
            _ => None,
        })
        .fold(0.0_f64, f64::max);
    let distance = if distance > 0.0 { distance } else { USUAL };
    let mut mended = fit.x;
    for adjustment in adjustments.iter().filter(|a| a.is_adjusted) {
        mended[adjustment.kind.latent() as usize] = 0.0;
    }
    let mut plans = Vec::new();
    for lever in [Lever::Half, Lever::Full] {
        for travel in [Travel::Forward, Travel::Reverse] {
            let setting = Setting {
                travel,
                lever,
                ..Setting::default()
            };
            plans.push(Plan {
                setting,
                distance,
                before: trace(fit, prior, &fit.x, setting, track, distance),
                after: trace(fit, prior, &mended, setting, track, distance),
            });
        }
    }
    plans
}
