//! The assay: how often the ranking is right on machines whose fault is known, in a world that differs from the model.
//!
//! `cargo run --release --bin assay -- ranking [cases] [Charge|Held|Speeds|All]` scores the ranking for each set of readings,
//! with clean notes and with sloppy ones, beside the best possible ranker, which knows the world's own laws and scatter.
//! Faults are drawn equally often and the base rates are made equal too, so that the scores speak of the readings alone.
//! `assay steps [cases] [seed]` counts the minutes to the cause (see [`steps`]).
//! `ASSAY_TELL=1` prints the cases in which a wrong cause was all but certain; `ASSAY_SEED` changes the draw;
//! `ASSAY_NOTES=clean` leaves the sloppy notes out.

mod judge;
mod score;
mod steps;
mod steps_danger;
mod world;

use judge::{Judge, Ranked, Ranker, listed};
use lowside::faults::{Fault, FaultId};
use lowside::ranking::assess;
use lowside::windows::Normals;
use score::Score;
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
        Some("steps") => steps::steps(number(2, 60), number(3, 2026) as u64),
        Some(other) => eprintln!("assay: no such part: {other}. There are: ranking, steps."),
    }
}

/// Share of drawn units that can have each listed fault.
fn possible(listed: &[&'static Fault]) -> BTreeMap<FaultId, f64> {
    let mut draw = Normals::new(1);
    let mut count: BTreeMap<FaultId, f64> = BTreeMap::new();
    for _ in 0..UNITS {
        if let Some(m) = Machine::draw(&mut draw, &[]) {
            for f in listed.iter().filter(|f| m.can_have(f)) {
                *count.entry(f.id).or_default() += 1.0 / UNITS as f64;
            }
        }
    }
    count
}

/// Draws single-fault cases and hands each to the judges.
fn run(
    cases: usize,
    set: ReadingSet,
    sloppy: Sloppiness,
    judges: &[Judge],
    listed: &[&'static Fault],
    seed: u64,
) -> Vec<Score> {
    let mut draw = Normals::new(seed);
    let mut scores = vec![Score::default(); judges.len()];
    let mut done = 0;
    while done < cases {
        let fault = listed[((draw.unit() * listed.len() as f64) as usize).min(listed.len() - 1)];
        // The fault is drawn first and keeps its place: a unit that can have it is looked for.
        let Some(c) = (0..400).find_map(|_| case(&mut draw, &[fault], set, sloppy)) else {
            continue;
        };
        done += 1;
        for (judge, score) in judges.iter().zip(&mut scores) {
            let r = judge.rank(&c);
            score.add(&c.faults, &r);
            if r[0].0 != c.faults && r[0].1 > 0.85 && std::env::var_os("ASSAY_TELL").is_some() {
                tell(&c, &r);
            }
        }
    }
    scores
}

fn ranking() {
    let cases = number(2, 300);
    let only = std::env::args().nth(3);
    let listed = listed();
    let possible = possible(&listed);
    println!("{} faults, {cases} cases a set", listed.len());
    println!(
        "{:<8} {:<22} {:<5} {:>6} {:>6} {:>9} {:>12} {:>12}",
        "readings", "notes", "who", "top-1", "top-3", "log score", "cal. leader", "cal. all"
    );
    for (words, sloppy) in [
        ("clean", Sloppiness::CLEAN),
        ("3 % wrong, sides 1/15", Sloppiness::USUAL),
    ]
    .into_iter()
    .filter(|(words, _)| std::env::var("ASSAY_NOTES").map_or(true, |n| words.starts_with(&n)))
    {
        for set in ReadingSet::EACH
            .into_iter()
            .filter(|s| only.as_ref().is_none_or(|o| *o == format!("{s:?}")))
        {
            let rankers = [Ranker::Own, Ranker::Best];
            let judges: Vec<Judge> = rankers
                .iter()
                .map(|r| Judge::new(*r, &possible, sloppy, false))
                .collect();
            let scores = std::thread::scope(|s| {
                let workers: Vec<_> = (0..THREADS)
                    .map(|t| {
                        let (judges, listed) = (&judges, &listed);
                        let share = (cases + t) / THREADS;
                        s.spawn(move || {
                            run(share, set, sloppy, judges, listed, seed() + 1000 * t as u64)
                        })
                    })
                    .collect();
                let mut total = vec![Score::default(); judges.len()];
                for w in workers {
                    for (a, b) in total.iter_mut().zip(w.join().unwrap_or_default()) {
                        a.merge(&b);
                    }
                }
                total
            });
            for (ranker, s) in rankers.iter().zip(&scores) {
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
            if set == ReadingSet::All {
                by_fault(&scores);
            }
        }
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
        .find(|x| x.ids.iter().any(|i| c.faults.contains(i)));
    let led = r
        .first()
        .and_then(|(ids, _)| a.causes.iter().find(|x| x.ids.contains(&ids[0])));
    for (w, r) in a.windows.iter().zip(&c.visit.readings) {
        let of = |x: Option<&lowside::assessment::Cause>| {
            x.and_then(|x| x.would_read.iter().find(|y| y.reading == r.id))
                .map_or(String::new(), |y| {
                    format!("{:.2} ± {:.2}", y.value, y.spread)
                })
        };
        println!(
            "  {:?} {:?} {:?}: {:.2} … {:.2}, read {:.2} | hidden {} | led {}",
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
