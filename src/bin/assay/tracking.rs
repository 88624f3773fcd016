//! The tracking assay: machines with one mismatch that is known, run by a mechanic whose counts, tape and lane are not perfect, in
//! a world that differs from the law: the null fades towards full lever, leakage is not quite laminar, wheels slip, the scrub
//! changes with the direction, the engine wanders.

use lowside::math;
use lowside::tracking::{
    Agreement, Facing, Gear, Kind, Latent, Lever, Load, Machine, Prior, Run, Screws, Seen, Setting,
    Travel, Undercarriage, Verdict, find,
};
use lowside::windows::Normals;

/// What no two sides are without, share.
const BACKGROUND: f64 = 0.003;
/// A mismatch under this is not asked after: the machine is fit, share.
const WORTH: f64 = 0.008;

/// Which runs are made.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Runs {
    /// A lane at full lever, both ways, turned round.
    Path,
    /// Turns counted with the wheels clear at three levers, both ways; roll-out.
    Counted,
    /// The whole order of the work.
    All,
}

struct World {
    kind: Kind,
    size: f64,
    truth: [f64; 7],
    low: f64,
    half: f64,
    track: f64,
    undercarriage: Undercarriage,
    scrub: [f64; 2],
    camber: f64,
    free: f64,
    loaded: f64,
    rpm: f64,
    fade: f64,
    turbulent: f64,
}

fn pick<T: Copy>(draw: &mut Normals, of: &[T]) -> T {
    let at = (draw.unit() * of.len() as f64) as usize;
    of[at.min(of.len() - 1)]
}

fn world(draw: &mut Normals) -> World {
    let undercarriage = pick(
        draw,
        &[
            Undercarriage::Swivel,
            Undercarriage::Tracks,
            Undercarriage::SkidWheels,
        ],
    );
    let machine = Machine {
        undercarriage,
        ..Machine::default()
    };
    let prior = Prior::of(&machine);
    let kind = pick(draw, &Kind::ALL);
    let mut truth = [0.0; 7];
    for value in &mut truth {
        *value = BACKGROUND * draw.normal();
    }
    let at = kind.latent() as usize;
    truth[at] = prior.width[at] * draw.normal();
    let usual = |draw: &mut Normals, latent: Latent| {
        prior.centre[latent as usize] + prior.width[latent as usize] * draw.normal()
    };
    let scrub = usual(draw, Latent::Scrub);
    World {
        kind,
        size: truth[at],
        truth,
        low: usual(draw, Latent::Low).clamp(0.12, 0.4),
        half: usual(draw, Latent::Half),
        track: 1.0 + draw.unit(),
        undercarriage,
        scrub: [0.0, 0.0].map(|_| math::exp(scrub + 0.02 * draw.normal())),
        camber: usual(draw, Latent::Camber),
        free: math::exp(usual(draw, Latent::FreeLoss)),
        loaded: math::exp(usual(draw, Latent::LoadedLoss)),
        rpm: 60.0 + 90.0 * draw.unit(),
        fade: 0.25 * draw.unit(),
        turbulent: 0.2 * (draw.unit() - 0.5),
    }
}

/// Speeds of left and right wheel and of left and right over the ground, share of full, in one run.
fn speeds(w: &World, s: Setting, draw: &mut Normals) -> [(f64, f64); 2] {
    let of = |kind: Kind| w.truth[kind.latent() as usize];
    let lever = match s.lever {
        Lever::Low => w.low,
        Lever::Half => w.half,
        Lever::Full => 1.0,
    };
    let load = match s.load {
        Load::Free => w.free,
        Load::Level => 1.0,
        Load::Loaded => w.loaded,
    };
    let way = if s.travel == Travel::Forward {
        1.0
    } else {
        -1.0
    };
    let mut proportional = of(Kind::Gain) + way * of(Kind::OneWay);
    if s.lever == Lever::Full {
        proportional += of(Kind::Stop);
    }
    let null = way * of(Kind::Null) * (1.0 - w.fade * lever);
    let loss = load * of(Kind::Loss) * (1.0 + w.turbulent * lever);
    // Nobody's levers come back alike.
    let play = 0.0015 * draw.normal() + 0.002 * lever * draw.normal();
    let slip = if s.load == Load::Free {
        0.0
    } else {
        0.001 * draw.normal()
    };
    let gear = if s.gear == Gear::Two {
        of(Kind::Range)
    } else {
        0.0
    };
    let engine = 1.0 + 0.02 * draw.normal();
    let side = |half: f64| {
        engine
            * (lever * (1.0 + half * proportional) + half * (null + loss + play))
            * (1.0 + half * gear)
    };
    let ground = |half: f64| side(half) * (1.0 + half * (of(Kind::Rolling) + slip));
    [(side(-0.5), side(0.5)), (ground(-0.5), ground(0.5))]
}

fn rounded(value: f64, step: f64) -> f64 {
    (value / step).round() * step
}

fn run(w: &World, setting: Setting, seen: &Seen, draw: &mut Normals) -> Run {
    let [(left, right), (ground_left, ground_right)] = speeds(w, setting, draw);
    let seen = match seen {
        Seen::Path { distance, .. } => {
            let scrub = w.scrub[usize::from(setting.travel == Travel::Reverse)];
            let facing = if setting.facing == Facing::Out {
                1.0
            } else {
                -1.0
            };
            let share = (ground_right - ground_left) / (ground_right + ground_left);
            let curvature = 2.0 / (w.track * scrub) * share + facing * w.camber / w.track;
            let radius = 1.0 / curvature.clamp(-0.07, 0.07);
            let across = radius - radius.signum() * (radius * radius - distance * distance).sqrt();
            let askew = 0.006 * draw.normal() * distance + 0.01 * draw.normal();
            Seen::Path {
                distance: *distance,
                left: rounded(across + askew, 0.01),
            }
        }
        Seen::WheelSpeeds { .. } => Seen::WheelSpeeds {
            left: rounded(w.rpm * left * (1.0 + 0.002 * draw.normal()), 0.1),
            right: rounded(w.rpm * right * (1.0 + 0.002 * draw.normal()), 0.1),
        },
        Seen::RollOut { .. } => {
            let half = 0.5 * w.truth[Latent::Rolling as usize];
            Seen::RollOut {
                left: rounded(2.0 * (1.0 - half) + 0.003 * draw.normal(), 0.005),
                right: rounded(2.0 * (1.0 + half) + 0.003 * draw.normal(), 0.005),
            }
        }
        _ => {
            let minutes = 1.0 + 0.004 * draw.normal();
            Seen::Turns {
                left: rounded(w.rpm * left * minutes, 0.25),
                right: rounded(w.rpm * right * minutes, 0.25),
                seconds: Some(60.0),
            }
        }
    };
    Run {
        setting,
        seen,
        uncertainty: None,
    }
}

fn runs(w: &World, set: Runs, draw: &mut Normals) -> Vec<Run> {
    let mut plan: Vec<(Setting, Seen)> = Vec::new();
    let path = Seen::Path {
        distance: 10.0,
        left: 0.0,
    };
    let (one, both) = (1.0, [Travel::Forward, Travel::Reverse]);
    let counted = Seen::Turns {
        left: one,
        right: one,
        seconds: None,
    };
    let rolled = Seen::RollOut {
        left: one,
        right: one,
    };
    let read = Seen::WheelSpeeds {
        left: one,
        right: one,
    };
    let usual = Setting::default();
    if set != Runs::Path {
        plan.push((usual, rolled));
        for lever in [Lever::Low, Lever::Half, Lever::Full] {
            for travel in both {
                let load = Load::Free;
                plan.push((
                    Setting {
                        travel,
                        lever,
                        load,
                        ..usual
                    },
                    counted,
                ));
            }
        }
    }
    if set == Runs::All {
        let full = Lever::Full;
        plan.push((
            Setting {
                lever: full,
                load: Load::Free,
                gear: Gear::Two,
                ..usual
            },
            counted,
        ));
        for load in [Load::Level, Load::Loaded] {
            plan.push((Setting { load, ..usual }, read));
        }
    }
    if set != Runs::Counted {
        for travel in both {
            for facing in [Facing::Out, Facing::Back] {
                let lever = Lever::Full;
                plan.push((
                    Setting {
                        travel,
                        lever,
                        facing,
                        ..usual
                    },
                    path,
                ));
            }
        }
    }
    plan.iter()
        .map(|(setting, seen)| run(w, *setting, seen, draw))
        .collect()
}

#[derive(Default)]
struct Score {
    asked: usize,
    kind: usize,
    set: usize,
    told: usize,
    side: usize,
    main: (usize, usize),
    every: (usize, usize),
    claims: usize,
    wrong: usize,
    disagree: usize,
    cases: usize,
}

fn score(w: &World, runs: &[Run], s: &mut Score) {
    let machine = Machine {
        track: Some(w.track),
        undercarriage: w.undercarriage,
        ..Machine::default()
    };
    let out = find(&machine, runs, &Screws::default());
    s.cases += 1;
    s.disagree += usize::from(matches!(out.agreement, Agreement::Disagree { .. }));
    for f in out.found.iter().filter(|f| f.is_seen) {
        let truth = w.truth[f.kind.latent() as usize];
        let held = usize::from((f.value - truth).abs() <= f.half);
        s.every.0 += held;
        s.every.1 += 1;
        if f.kind == w.kind {
            s.main.0 += held;
            s.main.1 += 1;
        }
        let claimed = match f.verdict {
            Verdict::RightFaster => 1.0,
            Verdict::LeftFaster => -1.0,
            _ => continue,
        };
        s.claims += 1;
        s.wrong += usize::from(claimed * truth < 0.0);
    }
    let main = out.found.iter().find(|f| f.kind == w.kind);
    if w.size.abs() < WORTH || main.is_none_or(|f| !f.is_seen) {
        return;
    }
    s.asked += 1;
    let first = out.alone.iter().find_map(|a| a.kind);
    s.kind += usize::from(first == Some(w.kind));
    let is_named = first == Some(w.kind)
        || out
            .pairs
            .iter()
            .any(|p| p.one == w.kind || p.other == Some(w.kind));
    s.set += usize::from(is_named);
    match main.map(|f| f.verdict) {
        Some(Verdict::RightFaster) => {
            s.told += 1;
            s.side += usize::from(w.size > 0.0);
        }
        Some(Verdict::LeftFaster) => {
            s.told += 1;
            s.side += usize::from(w.size < 0.0);
        }
        _ => {}
    }
}

/// Plays the machines and prints the scores.
pub fn tracking(cases: usize, seed: u64) {
    println!("{cases} machines a set, one mismatch each");
    println!(
        "{:<8} {:>6} {:>9} {:>9} {:>6} {:>6} {:>9} {:>9} {:>14} {:>9}",
        "runs",
        "asked",
        "kind",
        "kind/set",
        "told",
        "side",
        "95 % main",
        "95 % all",
        "wrong claims",
        "disagree"
    );
    for set in [Runs::Path, Runs::Counted, Runs::All] {
        let mut draw = Normals::new(seed);
        let mut s = Score::default();
        for _ in 0..cases {
            let w = world(&mut draw);
            let made = runs(&w, set, &mut draw);
            score(&w, &made, &mut s);
        }
        let share = |a: usize, b: usize| a as f64 / b.max(1) as f64;
        println!(
            "{:<8} {:>6} {:>9.3} {:>9.3} {:>6.3} {:>6.3} {:>9.3} {:>9.3} {:>14} {:>9.3}",
            format!("{set:?}"),
            s.asked,
            share(s.kind, s.asked),
            share(s.set, s.asked),
            share(s.told, s.asked),
            share(s.side, s.told),
            share(s.main.0, s.main.1),
            share(s.every.0, s.every.1),
            format!("{}/{}", s.wrong, s.claims),
            share(s.disagree, s.cases)
        );
    }
}
