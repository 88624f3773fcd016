//! Every call of a file worked out whole: causes, report, yard check, wear, neutral, tracking, bench. Slow: a few hundred a minute.
#![no_main]

#[path = "../shared.rs"]
mod shared;

use libfuzzer_sys::{fuzz_mutator, fuzz_target};

fuzz_target!(|text: &[u8]| {
    if let Some(export) = shared::take::file(text) {
        shared::take::calls(&export);
    }
});
fuzz_mutator!(|data: &mut [u8], size: usize, most: usize, seed: u32| {
    shared::change(data, size, most, seed)
});
