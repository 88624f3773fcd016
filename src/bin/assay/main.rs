//! The assay: how often the ranking is right on machines whose fault is known, in a world that differs from the model.
//!
//! `cargo run --release --bin assay -- ranking [cases] [Charge|Held|Speeds|All]` scores the ranking for each set of readings,
//! with clean notes and with sloppy ones, beside the best possible ranker, which knows the world's own laws and scatter.
//! Faults are drawn equally often and the base rates are made equal too, so that the scores speak of the readings alone.
//! `assay pairs [cases]` hides two faults at once; `assay sides [cases] [set]` one on one side of a machine with two paths.
//! `assay tracking [cases]` hides one mismatch between two sides (see [`tracking`]).
//! `assay steps [cases] [seed]` counts the minutes to the cause (see [`steps`]).
//! `assay neutral [cases]` hides a swash offset (see [`neutral`]).
//! `assay yard [cases]` wears machines down over the hours (see [`yard`]).
//! `assay hostile [inputs]` reads broken files and tables (see [`hostile`]).
//! `ASSAY_TELL=1` prints the cases in which a wrong cause was all but certain; `ASSAY_SEED` changes the draw;
//! `ASSAY_NOTES=clean` leaves the sloppy notes out.

mod hostile;
mod judge;
mod neutral;
mod score;
mod steps;
mod steps_danger;
mod tracking;
mod world;
mod yard;

use judge::{Judge, Ranked, Ranker, listed};
use lowside::faults::{Fault, FaultId};
use lowside::machine::arrangement;
use lowside::ranking::{Suspect, apart, assess, pair_rate, suspects};
use lowside::unit::Paths;
use lowside::windows::Normals;
use score::{Score, sides as sides_of};
use std::collections::BTreeMap;
use world::{Case, Machine, ReadingSet, Sloppiness, case};

/// Draws made to see how many units can have a fault.
const UNITS: usize = 4000;
/// Threads.
const THREADS: usize = 2;

fn number(at: usize, usual: usize) -> usize {
    std::env::args()
        .nth(at)
        .and_then(|a| a.parse().ok())
        .unwrap_or(usual)
}

fn seed() -> u64 {
    std::env::var("ASSAY_SEED")
        .ok()
        .and_then(|s| s.parse().ok())
        .unwrap_or(2026)
}

fn main() {
    match std::env::args().nth(1).as_deref() {
        Some("ranking") | None => ranking(),
        Some("pairs") => pairs(),
        Some("sides") => sides(),
        Some("neutral") => neutral::neutral(number(2, 400), seed()),
        Some("steps") => steps::steps(number(2, 60), number(3, 2026) as u64),
        Some("yard") => yard::yard(number(2, 400), seed()),
        Some("tracking") => tracking::tracking(number(2, 2000), seed()),
        Some("hostile") => hostile::hostile(number(2, 100_000), seed()),
        Some(other) => {
            eprintln!(
                "assay: no such part: {other}. There are: ranking, pairs, sides, steps, tracking, neutral, hostile, yard."
            )
        }
    }
}

/// Share of drawn units that can have each listed fault.
fn possible(listed: &[&'static Fault], paths: Paths) -> BTreeMap<FaultId, f64> {
    let mut draw = Normals::new(1);
    let mut count: BTreeMap<FaultId, f64> = BTreeMap::new();
    for _ in 0..UNITS {
        if let Some(m) = Machine::draw(&mut draw, paths, &[]) {
            for f in listed.iter().filter(|f| m.can_have(f)) {
                *count.entry(f.id).or_default() += 1.0 / UNITS as f64;
            }
        }
    }
    count
}

/// Draws the faults of a case.
type Draw<'a> = dyn Fn(&mut Normals) -> Vec<Suspect> + Sync + 'a;

/// Draws cases and hands each to the judges, on all threads.
fn run(
    cases: usize,
    paths: Paths,
    set: ReadingSet,
    sloppy: Sloppiness,
    judges: &[Judge],
    hidden: &Draw,
) -> Vec<Score> {
    let one = |cases: usize, seed: u64| {
        let mut draw = Normals::new(seed);
        let mut scores = vec![Score::default(); judges.len()];
        let mut done = 0;
        while done < cases {
            let faults = hidden(&mut draw);
            // The faults are drawn first and keep their place: a unit that can have them is looked for.
            let Some(c) = (0..400).find_map(|_| case(&mut draw, paths, &faults, set, sloppy))
            else {
                continue;
            };
            done += 1;
            for (judge, score) in judges.iter().zip(&mut scores) {
                let r = judge.rank(&c);
                score.add(&c.faults, &r);
                let wrong_side = sides_of(&c.faults, &r).is_some_and(|(here, there)| here <= there);
                if wrong_side && std::env::var_os("ASSAY_TELL").is_some() {
                    println!(
                        "wrong side: hidden {:?} {}; led {:?}",
                        c.faults[0].key(),
                        c.machine.shows_how(),
                        r.iter()
                            .take(3)
                            .map(|(a, p)| (a[0].key(), *p))
                            .collect::<Vec<_>>()
                    );
                }
                let certain = r.first().is_some_and(|l| l.1 > 0.85 && l.0 != c.faults);
                if certain && std::env::var_os("ASSAY_TELL").is_some() {
                    tell(&c, &r);
                }
            }
        }
        scores
    };
    std::thread::scope(|s| {
        let workers: Vec<_> = (0..THREADS)
            .map(|t| {
                let one = &one;
                s.spawn(move || one((cases + t) / THREADS, seed() + 1000 * t as u64))
            })
            .collect();
        let mut total = vec![Score::default(); judges.len()];
        for w in workers {
            for (a, b) in total.iter_mut().zip(w.join().unwrap_or_default()) {
                a.merge(&b);
            }
        }
        total
    })
}

const RANKERS: [Ranker; 2] = [Ranker::Own, Ranker::Best];

fn head(what: &str) {
    println!("{what}");
    println!(
        "{:<8} {:<22} {:<5} {:>6} {:>6} {:>9} {:>12} {:>12}",
        "readings", "notes", "who", "top-1", "top-3", "log score", "cal. leader", "cal. all"
    );
}

fn print(set: ReadingSet, words: &str, scores: &[Score]) {
    for (ranker, s) in RANKERS.iter().zip(scores) {
        let (leader, all) = s.calibration();
        println!(
            "{:<8} {:<22} {:<5} {:>6.3} {:>6.3} {:>9.3} {:>12.3} {:>12.3}",
            format!("{set:?}"),
            words,
            format!("{ranker:?}"),
            s.top1(),
            s.top3(),
            s.log(),
            leader,
            all
        );
    }
    println!(
        "         of the ceiling: top-1 {:.2}, top-3 {:.2}; stated and kept (own): {}",
        scores[0].top1() / scores[1].top1().max(1e-9),
        scores[0].top3() / scores[1].top3().max(1e-9),
        scores[0]
            .table()
            .iter()
            .map(|(n, said, kept)| format!("{said:.2}→{kept:.2} ({n})"))
            .collect::<Vec<_>>()
            .join(", ")
    );
}

fn ranking() {
    let cases = number(2, 300);
    let only = std::env::args().nth(3);
    let listed = listed();
    let possible = possible(&listed, Paths::One);
    head(&format!("{} faults, {cases} cases a set", listed.len()));
    for (words, sloppy) in [
        ("clean", Sloppiness::CLEAN),
        ("3 % wrong, sides 1/15", Sloppiness::USUAL),
    ]
    .into_iter()
    .filter(|(words, _)| std::env::var("ASSAY_NOTES").map_or(true, |n| words.starts_with(&n)))
    {
        for set in ReadingSet::EACH
            .into_iter()
            .filter(|s| *s != ReadingSet::Sides)
            .filter(|s| only.as_ref().is_none_or(|o| *o == format!("{s:?}")))
        {
            let judges = RANKERS.map(|r| Judge::new(r, &possible, sloppy, 0.0));
            let any = |draw: &mut Normals| {
                let i = (draw.unit() * listed.len() as f64) as usize;
                vec![Suspect {
                    fault: listed[i.min(listed.len() - 1)],
                    path: None,
                }]
            };
            let scores = run(cases, Paths::One, set, sloppy, &judges, &any);
            print(set, words, &scores);
            if set == ReadingSet::All {
                by_fault(&scores);
            }
        }
    }
}

/// One hidden fault on one side of a machine with two paths.
fn sides() {
    let cases = number(2, 150);
    let only = std::env::args().nth(3);
    let listed = listed();
    for paths in [Paths::TwoSharedCharge, Paths::TwoOwnCharge] {
        let possible = possible(&listed, paths);
        let sided: Vec<Suspect> = suspects(arrangement(paths))
            .into_iter()
            .filter(|s| s.path.is_some() && listed.iter().any(|f| f.id == s.fault.id))
            .collect();
        head(&format!(
            "{}: {} faults at a side, {cases} cases a set",
            paths.words(),
            sided.len()
        ));
        for set in ReadingSet::EACH
            .into_iter()
            .filter(|s| only.as_ref().is_none_or(|o| *o == format!("{s:?}")))
        {
            let sloppy = Sloppiness::CLEAN;
            let judges = RANKERS.map(|r| Judge::new(r, &possible, sloppy, 0.0));
            let any = |draw: &mut Normals| {
                let i = (draw.unit() * sided.len() as f64) as usize;
                vec![sided[i.min(sided.len() - 1)]]
            };
            let scores = run(cases, paths, set, sloppy, &judges, &any);
            print(set, "clean", &scores);
            for (ranker, s) in RANKERS.iter().zip(&scores) {
                let (n, right, stated) = s.sides();
                println!("         side, {ranker:?}: right {right:.3} of {n}, stated {stated:.3}");
            }
            if set == ReadingSet::Sides {
                by_fault(&scores);
            }
        }
    }
}

/// Factor on the base rate of pairs with which a pair of two common faults is met as often as each alone.
const PAIRS_AS_OFTEN: f64 = 100.0;

/// Two hidden faults at once, drawn as often as the rankers are told that they are met.
fn pairs() {
    let cases = number(2, 150);
    let listed = listed();
    let possible = possible(&listed, Paths::One);
    let sloppy = Sloppiness::CLEAN;
    let judges = RANKERS.map(|r| Judge::new(r, &possible, sloppy, PAIRS_AS_OFTEN));
    let belief = judges[0].belief();
    let mut all: Vec<(f64, [Suspect; 2])> = Vec::new();
    let mut sum = 0.0;
    let alone: Vec<Suspect> = listed
        .iter()
        .map(|fault| Suspect { fault, path: None })
        .collect();
    for (i, a) in alone.iter().enumerate() {
        for b in alone.iter().skip(i + 1).filter(|b| apart(a, b)) {
            let (a, b) = (*a, *b);
            // How often both are possible on a unit is left to the search for a unit that can have them.
            let share = |s: &Suspect| possible.get(&s.fault.id).unwrap_or(&0.0);
            sum += pair_rate(&belief, a.fault, b.fault) * share(&a) * share(&b);
            all.push((sum, [a, b]));
        }
    }
    head(&format!("{} pairs, {cases} cases a set", all.len()));
    for set in [ReadingSet::Speeds, ReadingSet::All] {
        let draw = |draw: &mut Normals| {
            let x = draw.unit() * sum;
            let at = all.partition_point(|(upto, _)| *upto < x);
            all[at.min(all.len() - 1)].1.to_vec()
        };
        let scores = run(cases, Paths::One, set, sloppy, &judges, &draw);
        print(set, "two faults", &scores);
    }
}

/// Prints each fault's score, own and best.
fn by_fault(scores: &[Score]) {
    println!("         each fault: cases, top-1 and top-3 own (best)");
    for (id, (n, one, three)) in &scores[0].by_fault {
        let best = scores[1].by_fault.get(id).copied().unwrap_or_default();
        println!(
            "         {:<26} {n:>3}  {:>3.0} % ({:>3.0} %)  {:>3.0} % ({:>3.0} %)",
            format!("{id:?}"),
            100.0 * *one as f64 / *n as f64,
            100.0 * best.1 as f64 / *n as f64,
            100.0 * *three as f64 / *n as f64,
            100.0 * best.2 as f64 / *n as f64,
        );
    }
}

/// Prints a case that was missed: readings with their windows, and what led instead.
fn tell(c: &Case, r: &Ranked) {
    let a = assess(&c.machine.unit, &c.visit, &[]);
    println!(
        "\nhidden {:?}; led: {:?}; wrong {:.2}",
        c.faults,
        r.iter().take(3).collect::<Vec<_>>(),
        a.trust.wrong_reading
    );
    let hidden = a
        .causes
        .iter()
        .find(|x| x.members().any(|i| c.faults.contains(&i)));
    let led = r
        .first()
        .and_then(|(ids, _)| a.causes.iter().find(|x| x.members().any(|m| m == ids[0])));
    for (w, r) in a.windows.iter().zip(&c.visit.readings) {
        let of = |x: Option<&lowside::assessment::Cause>| {
            x.and_then(|x| x.would_read.iter().find(|y| y.reading == r.id))
                .map_or(String::new(), |y| {
                    format!("{:.2} ± {:.2}", y.value, y.spread)
                })
        };
        println!(
            "  {:?} {:?} {:?} {:?}: {:.2} … {:.2}, read {:.2} | hidden {} | led {}",
            r.path,
            r.port,
            r.condition.doing,
            r.condition.direction,
            w.low,
            w.high,
            w.read.unwrap_or(f64::NAN),
            of(hidden),
            of(led)
        );
    }
}
