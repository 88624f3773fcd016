//! Native speed: solves per second, iterations per solve, a full assessment. `cargo bench`. Prints, asserts nothing.
#![allow(clippy::disallowed_methods)] // a native benchmark has a clock

#[path = "../support/mod.rs"]
mod support;
mod work;

use std::time::Instant;

fn main() {
    let time = |f: &mut dyn FnMut()| {
        f();
        let mut best = f64::INFINITY;
        for _ in 0..5 {
            let t = Instant::now();
            f();
            best = best.min(t.elapsed().as_secs_f64());
        }
        best
    };
    const N: usize = 50_000;
    let mut iterations = 0.0;
    let solve = time(&mut || iterations = work::solves(N));
    let derived = time(&mut || {
        std::hint::black_box(work::solves_with_derivatives(N / 5));
    });
    let visit = work::call();
    let full = time(&mut || {
        std::hint::black_box(work::assessment(&visit));
    });
    println!(
        "native: {:.0} solves/s ({:.2} µs each, {:.1} iterations)",
        N as f64 / solve,
        1e6 * solve / N as f64,
        iterations
    );
    println!(
        "native: {:.2} µs a solve with three readings and all derivatives",
        1e6 * derived / (N / 5) as f64
    );
    println!(
        "native: full assessment, 12 readings in 10 conditions: {:.1} ms",
        1e3 * full
    );
    let (unit, both) = work::two_paths();
    let twice = time(&mut || {
        std::hint::black_box(lowside::ranking::assess(&unit, &both, &[]));
    });
    println!(
        "native: two paths, {} readings: {:.1} ms, {:.1} of one path's",
        both.readings.len(),
        1e3 * twice,
        twice / full
    );
    for (words, known) in [("a known condition", true), ("a new condition", false)] {
        let more = work::one_more(known);
        let (mut first, mut best) = (f64::INFINITY, f64::INFINITY);
        for _ in 0..5 {
            let mut session = work::session();
            let t = Instant::now();
            std::hint::black_box(work::look(&mut session, &more));
            first = first.min(t.elapsed().as_secs_f64());
            let t = Instant::now();
            std::hint::black_box(work::again(&mut session, &more));
            best = best.min(t.elapsed().as_secs_f64());
        }
        let fresh = time(&mut || {
            std::hint::black_box(work::assessment(&more));
        });
        println!(
            "native: one reading more at {words}: first look {:.1} ms, 1/{:.0} of a full assessment; the full answer after it {:.1} ms, {:.2} of one",
            1e3 * first,
            fresh / first,
            1e3 * best,
            best / fresh
        );
    }
}
