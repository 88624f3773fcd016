//! The assay: how often the ranking is right on machines whose fault is known, in a world that differs from the model.
//!
//! `cargo run --release --bin assay -- [cases per set] [Charge|Held|Speeds|All]`. Prints top-1, top-3, mean log score and calibration for each set of readings,
//! without and with wrong readings, and the faults that are missed most. Faults are drawn equally often; the ranking's base rates are
//! made equal too, so that the scores speak of the readings alone.

mod world;

use lowside::faults::{self, Fault, FaultId};
use lowside::math;
use lowside::ranking::assess;
use lowside::windows::Normals;
use std::collections::BTreeMap;
use world::{ReadingSet, Sloppiness, case};

/// Faults that readings of pressure, flow and speed can tell at all.
fn listed() -> Vec<&'static Fault> {
    faults::all()
        .iter()
        .filter(|f| {
            !f.effects.is_empty()
                && !matches!(
                    f.id,
                    FaultId::AssemblyError
                        | FaultId::StrokeStuck
                        | FaultId::CoolerDirty
                        | FaultId::CoolerBypassing
                        | FaultId::EngineLugging
                )
        })
        .collect()
}

/// Probability of each listed fault with equal base rates.
fn ranked(case: &world::Case, listed: &[&'static Fault]) -> Vec<(FaultId, f64)> {
    let a = assess(&case.unit, &case.visit, &[]);
    let mut out: Vec<(FaultId, f64)> = Vec::new();
    for c in &a.causes {
        for (id, share) in c.ids.iter().zip(&c.shares) {
            if let Some(f) = listed.iter().find(|f| f.id == *id) {
                out.push((
                    *id,
                    share / (f.per_hundred * (f.possible)(&case.unit).max(1e-9)),
                ));
            }
        }
    }
    let total: f64 = out.iter().map(|o| o.1).sum();
    for o in &mut out {
        o.1 /= total.max(1e-300);
    }
    out.sort_by(|a, b| b.1.total_cmp(&a.1).then(a.0.cmp(&b.0)));
    out
}

fn main() {
    let cases: usize = std::env::args()
        .nth(1)
        .and_then(|a| a.parse().ok())
        .unwrap_or(200);
    let only = std::env::args().nth(2);
    let listed = listed();
    println!("{} faults, {cases} cases a set", listed.len());
    println!(
        "{:<10} {:<22} {:>6} {:>6} {:>9} {:>12}",
        "readings", "notes", "top-1", "top-3", "log score", "calibration"
    );
    for (notes, sloppy) in [
        (
            "clean",
            Sloppiness {
                wrong: 0.0,
                swapped: 0.0,
            },
        ),
        (
            "3 % wrong, sides 1/15",
            Sloppiness {
                wrong: 0.03,
                swapped: 1.0 / 15.0,
            },
        ),
    ] {
        for set in ReadingSet::EACH
            .into_iter()
            .filter(|s| only.as_ref().is_none_or(|o| *o == format!("{s:?}")))
        {
            let mut draw = Normals::new(2026);
            let (mut top1, mut top3, mut score) = (0usize, 0usize, 0.0);
            let mut bins = [(0usize, 0.0, 0usize); 10];
            let mut missed: BTreeMap<FaultId, (usize, usize)> = BTreeMap::new();
            let mut done = 0;
            while done < cases {
                let fault =
                    listed[((draw.unit() * listed.len() as f64) as usize).min(listed.len() - 1)];
                let Some(c) = case(&mut draw, fault, set, sloppy) else {
                    continue;
                };
                done += 1;
                let r = ranked(&c, &listed);
                let place = r.iter().position(|(id, _)| *id == c.fault);
                let p = place.map_or(0.0, |i| r[i].1);
                if p < 0.01 && std::env::var_os("ASSAY_TELL").is_some() {
                    tell(&c, &r, p);
                }
                top1 += usize::from(place == Some(0));
                top3 += usize::from(place.is_some_and(|i| i < 3));
                score += math::ln(p.max(1e-6));
                let m = missed.entry(c.fault).or_default();
                m.1 += 1;
                m.0 += usize::from(place.is_none_or(|i| i >= 3));
                for (id, q) in &r {
                    let b = &mut bins[((q * 10.0) as usize).min(9)];
                    b.0 += 1;
                    b.1 += q;
                    b.2 += usize::from(*id == c.fault);
                }
            }
            // Expected calibration error over all stated probabilities of a twentieth and more.
            let stated: usize = bins[1..].iter().map(|b| b.0).sum();
            let calibration: f64 = bins[1..]
                .iter()
                .map(|b| (b.1 - b.2 as f64).abs())
                .sum::<f64>()
                / stated.max(1) as f64;
            let share = |k: usize| k as f64 / cases as f64;
            println!(
                "{:<10} {:<22} {:>6.2} {:>6.2} {:>9.2} {:>12.3}",
                format!("{set:?}"),
                notes,
                share(top1),
                share(top3),
                score / cases as f64,
                calibration
            );
            if set == ReadingSet::All {
                let mut worst: Vec<_> = missed
                    .into_iter()
                    .filter(|(_, (m, n))| *m * 2 > *n && *n > 1)
                    .collect();
                worst.sort_by_key(|(_, (m, _))| std::cmp::Reverse(*m));
                println!(
                    "  missed in more than half: {:?}",
                    worst
                        .iter()
                        .map(|(id, (m, n))| format!("{id:?} {m}/{n}"))
                        .collect::<Vec<_>>()
                );
            }
        }
    }
}

/// Prints a case that was missed: readings with their windows, and what led instead.
fn tell(c: &world::Case, r: &[(FaultId, f64)], p: f64) {
    let a = assess(&c.unit, &c.visit, &[]);
    println!(
        "\nhidden {:?} at {p:.1e}; led: {:?}; wrong {:.2}",
        c.fault,
        r.iter().take(3).collect::<Vec<_>>(),
        a.trust.wrong_reading
    );
    let hidden = a.causes.iter().find(|x| x.ids.contains(&c.fault));
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
            of(a.causes.first())
        );
    }
}
