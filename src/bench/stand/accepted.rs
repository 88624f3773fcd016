//! What comes of the limits of a run: pass, fail or cannot tell, at points by their own doubt, along curves by the fitted curve
//! with its band and by the points that lie on it.

use super::acceptance::{Acceptance, Limited, Line, Scope};
use super::channel::Channel;
use super::fit::LossFit;
use super::flaw::Part;
use super::judge::{Decision, Limits, decide};
use super::layout::LayoutGap;
use super::report::{Found, Judged, Run, Span};
use super::uncertain::Uncertain;

/// Steps along a curve.
const STEPS: usize = 24;
/// Speeds within this share are one.
const ONE_SPEED: f64 = 0.06;
/// Without a fit, points carry a curve from this many on, the outer ones this close to its ends (share of the pressure).
const POINTS: (usize, f64) = (3, 0.05);

/// What came of one limit.
#[derive(Clone, Debug, PartialEq)]
pub struct Accepted {
    /// Which limit.
    pub id: String,
    /// How it was decided, or what is still to be entered.
    pub judged: Result<Judged, &'static str>,
}

/// Judges every limit of a sheet.
pub(super) fn accepted(run: &Run, losses: &LossFit) -> Vec<Accepted> {
    let limits = run.sheet.acceptance.iter();
    limits
        .map(|limit| Accepted {
            id: limit.id.clone(),
            judged: judged(run, losses, limit),
        })
        .collect()
}

fn judged(run: &Run, losses: &LossFit, limit: &Acceptance) -> Result<Judged, &'static str> {
    if !limit.of.belongs(run.setup.subject) {
        return Err("a whole drive carries its overall efficiency alone");
    }
    match limit.scope {
        Scope::Point if limit.point.trim().is_empty() => Err("choose the point"),
        Scope::Point => Ok(at_point(run, limit, limit.limit()?)),
        Scope::Curve => Ok(Curve::new(run, losses, limit, limit.line()?).judged()),
    }
}

fn limits(run: &Run, limit: &Acceptance, at: f64) -> Limits {
    let is_most = limit.of.is_most(run.setup.subject);
    Limits {
        low: (!is_most).then_some(at),
        high: is_most.then_some(at),
        from: limit.from_words(),
    }
}

fn at_point(run: &Run, limit: &Acceptance, value: f64) -> Judged {
    let name = limit.point.trim();
    let words = format!("{} at point {name}", limit.of.words());
    let limits = limits(run, limit, value);
    let (unit, ..) = limit.of.asks();
    let Some(at) = run.points.iter().position(|point| point.name == name) else {
        let why = "no point of this name is in the table".to_owned();
        return Judged::open(words, unit, limits, why);
    };
    match run.figure(at, limit.of.quantity()) {
        Some(Ok(figure)) => decided(words, limit, figure, limits, None),
        Some(Err(why)) => Judged::open(words, unit, limits, why),
        None => Judged::open(words, unit, limits, gap(run, at, limit.of)),
    }
}

/// Why a point carries no such figure.
fn gap(run: &Run, at: usize, of: Limited) -> String {
    let points = &run.evaluated.analysis.points;
    let value = points
        .get(at)
        .and_then(|point| point.values.get(&of.quantity()).copied());
    match value {
        Some(Err(gap)) => gap.to_string(),
        _ => LayoutGap::State.to_string(),
    }
}

fn decided(
    words: String,
    limit: &Acceptance,
    figure: Uncertain,
    limits: Limits,
    span: Option<Span>,
) -> Judged {
    let (unit, ..) = limit.of.asks();
    let decision = decide(figure, &limits).unwrap_or(Decision::CannotTell);
    Judged {
        span,
        ..Judged::of(words, unit, figure, limits, decision)
    }
}

/// A place on a curve: pressure difference, figure, whether it lies beyond what was run.
struct Place {
    difference: f64,
    figure: Uncertain,
    is_beyond: bool,
}

/// A limit along a curve.
struct Curve<'a> {
    run: &'a Run<'a>,
    losses: &'a LossFit,
    limit: &'a Acceptance,
    line: Line,
    /// Points that lie on it: which, pressure difference, figure or why there is none.
    on: Vec<(usize, f64, Found)>,
}

impl<'a> Curve<'a> {
    fn new(run: &'a Run<'a>, losses: &'a LossFit, limit: &'a Acceptance, line: Line) -> Self {
        let on = run
            .points
            .iter()
            .enumerate()
            .filter_map(|(at, point)| {
                let difference = point.means.difference()?;
                let speed = point.means.get(Channel::Speed)?;
                let (from, to) = line.span;
                let is_on = (0.99 * from..=1.01 * to).contains(&difference)
                    && line
                        .speed
                        .is_none_or(|n| (speed - n).abs() <= ONE_SPEED * n);
                let found = run.figure(at, limit.of.quantity())?;
                is_on.then_some((at, difference, found))
            })
            .collect();
        Curve {
            run,
            losses,
            limit,
            line,
            on,
        }
    }

    fn judged(&self) -> Judged {
        if let Some(why) = self.run.lie(Part::of(self.limit.of.quantity())) {
            return self.open(why);
        }
        let points: Vec<Place> = self
            .on
            .iter()
            .filter_map(|(_, difference, found)| {
                Some(Place {
                    difference: *difference,
                    figure: *found.as_ref().ok()?,
                    is_beyond: false,
                })
            })
            .collect();
        // A point that fails stands in no need of a curve.
        let failing = points
            .iter()
            .filter(|place| self.decide(place) == Some(Decision::Fail));
        if let Some(worst) = self.worst(failing) {
            return self.at(worst, "at a point");
        }
        match self.fitted() {
            Ok(places) => self.along(&places, points.len()),
            Err(why) => self.by_points(&points, &why),
        }
    }

    /// By the fitted curve, where no point fails.
    fn along(&self, places: &[Place], points: usize) -> Judged {
        let within = || places.iter().filter(|place| !place.is_beyond);
        let failing = within().filter(|place| self.decide(place) == Some(Decision::Fail));
        let on = match points {
            0 => "on the fitted curve, no point of its own",
            _ => "on the fitted curve",
        };
        if let Some(worst) = self.worst(failing) {
            return self.at(worst, on);
        }
        let beyond = places.iter().any(|place| place.is_beyond);
        match self.worst(within()) {
            Some(worst) if !beyond => self.at(worst, on),
            _ => self.open(
                "it reaches beyond the speeds, pressures and temperatures that were run".to_owned(),
            ),
        }
    }

    /// By points alone, where there is no fit.
    fn by_points(&self, points: &[Place], why: &str) -> Judged {
        let near = |end: f64| {
            points
                .iter()
                .any(|place| (place.difference - end).abs() <= POINTS.1 * end.max(20.0))
        };
        let (from, to) = self.line.span;
        let carries = points.len() >= POINTS.0 && near(from) && near(to);
        match self.worst(points.iter()) {
            Some(worst) if carries => self.at(worst, "by points alone"),
            _ => self.open(format!(
                "there is no fitted curve ({why}), and points alone would have to be three and more, from end to end"
            )),
        }
    }

    /// The fitted curve from end to end.
    fn fitted(&self) -> Result<Vec<Place>, String> {
        let (run, losses) = (self.run, self.losses);
        let mean = |channel: Channel| {
            let on: Vec<f64> = self
                .carriers()
                .filter_map(|at| run.points.get(at)?.means.get(channel))
                .collect();
            (!on.is_empty()).then(|| on.iter().sum::<f64>() / on.len() as f64)
        };
        let covered = losses.covered;
        let middle = |(low, high): (f64, f64)| 0.5 * (low + high);
        let viscosities: Vec<f64> = self
            .carriers()
            .filter_map(|at| run.evaluated.analysis.points.get(at)?.viscosity)
            .collect();
        let mu = if viscosities.is_empty() {
            middle(covered.viscosity)
        } else {
            viscosities.iter().sum::<f64>() / viscosities.len() as f64
        };
        let n = self.line.speed.unwrap_or_else(|| middle(covered.speed));
        let over_case =
            mean(Channel::Low).unwrap_or(0.0) - mean(Channel::CasePressure).unwrap_or(0.0);
        let (from, to) = self.line.span;
        (0..=STEPS)
            .map(|step| {
                let difference = from + (to - from) * step as f64 / STEPS as f64;
                let told = match self.limit.of {
                    Limited::CaseLeakage => losses.case_leakage(difference, over_case, mu),
                    Limited::Flow => losses.high_flow(n, difference, mu),
                    of => losses.efficiency(of.quantity(), n, difference, mu),
                };
                let (value, standard) = told?;
                let is_beyond = match self.limit.of {
                    // Leakage does not hang on the shaft.
                    Limited::CaseLeakage => !covered.holds(middle(covered.speed), difference, mu),
                    _ => !covered.holds(n, difference, mu),
                };
                Ok(Place {
                    difference,
                    figure: Uncertain { value, standard },
                    is_beyond,
                })
            })
            .collect()
    }

    /// Points whose oil and low pressure the curve takes: those on it, else all.
    fn carriers(&self) -> Box<dyn Iterator<Item = usize> + '_> {
        if self.on.is_empty() {
            Box::new(0..self.run.points.len())
        } else {
            Box::new(self.on.iter().map(|(at, ..)| *at))
        }
    }

    fn decide(&self, place: &Place) -> Option<Decision> {
        decide(
            place.figure,
            &limits(self.run, self.limit, self.line.at(place.difference)),
        )
    }

    /// The place nearest to its limit or farthest beyond it, in its own doubt.
    fn worst<'p>(&self, places: impl Iterator<Item = &'p Place>) -> Option<&'p Place> {
        let is_most = self.limit.of.is_most(self.run.setup.subject);
        let room = |place: &Place| {
            let limit = self.line.at(place.difference);
            let room = if is_most {
                limit - place.figure.value
            } else {
                place.figure.value - limit
            };
            room - place.figure.expanded()
        };
        places.min_by(|a, b| room(a).total_cmp(&room(b)))
    }

    fn words(&self) -> String {
        self.limit.of.words().to_owned()
    }

    fn span(&self, at: Option<f64>) -> Span {
        Span {
            speed: self.line.speed,
            from: self.line.span.0,
            to: self.line.span.1,
            at,
        }
    }

    fn at(&self, place: &Place, on: &str) -> Judged {
        let limits = limits(self.run, self.limit, self.line.at(place.difference));
        let words = format!("{}, {on}", self.words());
        let span = Some(self.span(Some(place.difference)));
        decided(words, self.limit, place.figure, limits, span)
    }

    fn open(&self, why: String) -> Judged {
        let (unit, ..) = self.limit.of.asks();
        let (low, high) = self.line.ends;
        let limits = limits(
            self.run,
            self.limit,
            if self.limit.of.is_most(self.run.setup.subject) {
                low.min(high)
            } else {
                low.max(high)
            },
        );
        Judged {
            span: Some(self.span(None)),
            ..Judged::open(self.words(), unit, limits, why)
        }
    }
}
