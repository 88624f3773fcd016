//! What these runs cannot tell apart, and which further run would.

use super::alone::Alone;
use super::fit::{Fit, slopes, times};
use super::kind::Kind;
use super::law::{self, Latent, Prior, SIZE, State};
use super::outcome::{Found, Verdict};
use super::run::{Facing, Gear, Lever, Load, Machine, Run, Seen, Setting, Travel};

/// Correlation from which two mismatches count as one in what the runs say.
const ALIKE: f64 = 0.75;
/// Least share of an account to be held open beside the likeliest.
const OPEN: f64 = 0.10;
/// Most pairs that are named.
const PAIRS: usize = 3;
/// Least share of the open variance that a further run must take away to be worth naming.
const WORTH: f64 = 0.05;
/// A run this near to the best one is as good: the quicker is named.
const AS_GOOD: f64 = 0.85;
/// Turns at full lever that a counted run is taken to have.
const TURNS: f64 = 40.0;

/// Two explanations that these runs cannot tell apart.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pair {
    /// One.
    pub one: Kind,
    /// The other; none for the camber of the lane.
    pub other: Option<Kind>,
    /// Correlation of the two estimates.
    pub correlation: f64,
    /// True where each alone would explain the runs about as well as the other.
    pub each_alone: bool,
}

/// A run that could be made.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Candidate {
    /// Its setting.
    pub setting: Setting,
    /// How: what would be measured, with figures as a straight machine would show them.
    pub seen: Seen,
    /// Minutes. Common practice.
    pub minutes: f64,
}

/// The run to make next.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Advice {
    /// The run.
    pub run: Candidate,
    /// What it is for: the pair that it tells apart; none where it is for all that is open.
    pub pair: Option<Pair>,
    /// Share of the open variance that it takes away, 0 to 1.
    pub takes: f64,
}

/// The pairs, those first that matter most to the answer.
pub(super) fn pairs(fit: &Fit, prior: &Prior, found: &[Found], accounts: &[Alone]) -> Vec<Pair> {
    let mut pairs: Vec<Pair> = Vec::new();
    if fit.figures == 0 {
        return pairs;
    }
    let alone: Vec<(Kind, f64)> = accounts
        .iter()
        .filter_map(|a| a.kind.map(|kind| (kind, a.share)))
        .collect();
    if let Some((lead, _)) = alone.first().filter(|(_, share)| *share > OPEN) {
        for (kind, _) in alone.iter().skip(1).filter(|(_, share)| *share > OPEN) {
            pairs.push(Pair {
                one: *lead,
                other: Some(*kind),
                correlation: fit.correlation(lead.latent() as usize, kind.latent() as usize),
                each_alone: true,
            });
        }
    }
    let open: Vec<Kind> = found
        .iter()
        .filter(|f| f.is_seen && f.verdict == Verdict::CannotTell)
        .map(|f| f.kind)
        .collect();
    let mut correlated: Vec<Pair> = Vec::new();
    for (at, one) in open.iter().enumerate() {
        let others = open.iter().skip(at + 1).map(|k| Some(*k));
        for other in others.chain([None]) {
            let latent = other.map_or(Latent::Camber, Kind::latent) as usize;
            let correlation = fit.correlation(one.latent() as usize, latent);
            let is_new = !pairs.iter().any(|p| {
                (p.one == *one && p.other == other)
                    || (p.other == Some(*one) && Some(p.one) == other)
            });
            // A camber that no run has seen is no rival.
            let is_rival = other.is_some() || is_informed(fit, prior, latent);
            if correlation.abs() > ALIKE && is_new && is_rival {
                correlated.push(Pair {
                    one: *one,
                    other,
                    correlation,
                    each_alone: false,
                });
            }
        }
    }
    correlated.sort_by(|a, b| b.correlation.abs().total_cmp(&a.correlation.abs()));
    pairs.extend(correlated);
    pairs.truncate(PAIRS);
    pairs
}

/// True where the runs have narrowed this unknown at all.
pub(super) fn is_informed(fit: &Fit, prior: &Prior, latent: usize) -> bool {
    let variance = fit
        .covariance
        .get(latent * SIZE + latent)
        .copied()
        .unwrap_or(0.0);
    variance.sqrt() < 0.97 * prior.width[latent]
}

/// Every run that could be made, in the order of the work.
fn catalogue(machine: &Machine) -> Vec<Candidate> {
    let base = Setting::default();
    let mut all = vec![Candidate {
        setting: base,
        seen: Seen::RollOut {
            left: machine.rolling.unwrap_or(2.0),
            right: machine.rolling.unwrap_or(2.0),
        },
        minutes: 5.0,
    }];
    let turns = |setting: Setting, minutes| {
        let share = match setting.lever {
            Lever::Low => 0.25,
            Lever::Half => 0.5,
            Lever::Full => 1.0,
        };
        Candidate {
            setting,
            seen: Seen::Turns {
                left: TURNS * share,
                right: TURNS * share,
                seconds: None,
            },
            minutes,
        }
    };
    for lever in [Lever::Low, Lever::Half, Lever::Full] {
        for travel in [Travel::Forward, Travel::Reverse] {
            let setting = Setting {
                travel,
                lever,
                load: Load::Free,
                ..base
            };
            all.push(turns(setting, 3.0));
        }
    }
    all.push(turns(
        Setting {
            lever: Lever::Full,
            load: Load::Free,
            gear: Gear::Two,
            ..base
        },
        3.0,
    ));
    for lever in [Lever::Half, Lever::Full] {
        all.push(turns(
            Setting {
                lever,
                load: Load::Loaded,
                ..base
            },
            8.0,
        ));
    }
    if machine.track.is_some() {
        for lever in [Lever::Half, Lever::Full] {
            for travel in [Travel::Forward, Travel::Reverse] {
                for facing in [Facing::Out, Facing::Back] {
                    let setting = Setting {
                        travel,
                        lever,
                        facing,
                        ..base
                    };
                    all.push(Candidate {
                        setting,
                        seen: Seen::Path {
                            distance: 10.0,
                            left: 0.0,
                        },
                        minutes: 4.0,
                    });
                }
            }
        }
    }
    all
}

/// Share of the variance along the combinations that this run takes away.
fn takes(fit: &Fit, prior: &Prior, machine: &Machine, wanted: &[State], c: &Candidate) -> f64 {
    let run = Run {
        setting: c.setting,
        seen: c.seen,
        uncertainty: None,
    };
    let data = law::data(&run, machine);
    let Some(datum) = data.first() else {
        return 0.0;
    };
    let row = slopes(&fit.x, &prior.width, |x| datum.foretold(x));
    let across = times(&fit.covariance, &row);
    let dot = |a: &State, b: &State| a.iter().zip(b).map(|(a, b)| a * b).sum::<f64>();
    let foreseen = datum.uncertainty * datum.uncertainty + dot(&row, &across);
    let (mut before, mut less) = (0.0, 0.0);
    for one in wanted {
        before += dot(one, &times(&fit.covariance, one));
        let shared = dot(one, &across);
        less += shared * shared / foreseen;
    }
    if before > 0.0 { less / before } else { 0.0 }
}

/// The run that narrows what is open most for its time.
pub(super) fn advise(
    fit: &Fit,
    prior: &Prior,
    machine: &Machine,
    found: &[Found],
    pairs: &[Pair],
) -> Option<Advice> {
    let catalogue = catalogue(machine);
    if fit.figures == 0 {
        // The order of the work comes first: nothing else means anything on uneven tyres.
        let run = *catalogue.first()?;
        return Some(Advice {
            run,
            pair: None,
            takes: takes(fit, prior, machine, &all_open(prior, found), &run),
        });
    }
    let one = |pair: &Pair| {
        let other = pair.other.map_or(Latent::Camber, Kind::latent) as usize;
        let (a, b) = (pair.one.latent() as usize, other);
        let spread = |at: usize| fit.covariance[at * SIZE + at].max(0.0).sqrt().max(1e-9);
        let mut row = [0.0; SIZE];
        row[a] = 1.0 / spread(a);
        // The combination along which the two trade against each other.
        row[b] = pair.correlation.signum() / spread(b);
        vec![row]
    };
    let best = |wanted: &[State], pair: Option<Pair>| {
        let judged: Vec<(Candidate, f64)> = catalogue
            .iter()
            .map(|c| (*c, takes(fit, prior, machine, wanted, c)))
            .collect();
        let most = judged.iter().fold(0.0_f64, |m, (_, t)| m.max(*t));
        judged
            .into_iter()
            .filter(|(_, t)| *t >= AS_GOOD * most && *t > WORTH)
            .min_by(|a, b| a.0.minutes.total_cmp(&b.0.minutes))
            .map(|(run, takes)| Advice { run, pair, takes })
    };
    pairs
        .iter()
        .find_map(|pair| best(&one(pair), Some(*pair)))
        .or_else(|| {
            let open = all_open(prior, found);
            (!open.is_empty()).then(|| best(&open, None)).flatten()
        })
}

/// Each mismatch of which the runs cannot tell yet, on the scale of what is usual for it.
fn all_open(prior: &Prior, found: &[Found]) -> Vec<State> {
    found
        .iter()
        .filter(|f| f.verdict == Verdict::CannotTell)
        .map(|f| {
            let at = f.kind.latent() as usize;
            let mut row = [0.0; SIZE];
            row[at] = 1.0 / prior.width[at];
            row
        })
        .collect()
}
