//! Speed in wasm: the same work as the native benchmark. Prints, asserts nothing about time.
//! Run with the wasm-bindgen test runner: `.ci/bench`.
#![cfg(target_arch = "wasm32")]

mod support;
#[path = "bench/work.rs"]
mod work;

use wasm_bindgen_test::{console_log, wasm_bindgen_test};

#[wasm_bindgen_test]
fn speed_in_wasm() {
    let time = |f: &mut dyn FnMut()| {
        f();
        let mut best = f64::INFINITY;
        for _ in 0..3 {
            let t = js_sys::Date::now();
            f();
            best = best.min(1e-3 * (js_sys::Date::now() - t));
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
    let mut lead = 0.0;
    let full = time(&mut || lead = work::assessment(&visit));
    console_log!(
        "wasm: {:.0} solves/s ({:.2} µs each, {:.1} iterations)",
        N as f64 / solve,
        1e6 * solve / N as f64,
        iterations
    );
    console_log!(
        "wasm: {:.2} µs a solve with three readings and all derivatives",
        1e6 * derived / (N / 5) as f64
    );
    console_log!(
        "wasm: full assessment, 12 readings in 10 conditions: {:.1} ms",
        1e3 * full
    );
    assert!(lead > 0.0 && lead <= 1.0);
    for (words, known) in [("a known condition", true), ("a new condition", false)] {
        let more = work::one_more(known);
        let fresh = time(&mut || lead = work::assessment(&more));
        let (mut first, mut best) = (f64::INFINITY, f64::INFINITY);
        for _ in 0..3 {
            let mut session = work::session();
            let t = js_sys::Date::now();
            let looked = work::look(&mut session, &more);
            first = first.min(1e-3 * (js_sys::Date::now() - t));
            assert!(looked > 0.0 && looked <= 1.0);
            let t = js_sys::Date::now();
            lead = work::again(&mut session, &more);
            best = best.min(1e-3 * (js_sys::Date::now() - t));
        }
        console_log!(
            "wasm: one reading more at {words}: first look {:.1} ms, 1/{:.0} of a full assessment; the full answer after it {:.1} ms, {:.2} of one",
            1e3 * first,
            fresh / first,
            1e3 * best,
            best / fresh
        );
        assert!(lead > 0.0 && lead <= 1.0);
    }
}
