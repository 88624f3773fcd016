//! A file that somebody hands over: read, handed on, read again, put on tags.
#![no_main]

#[path = "../shared.rs"]
mod shared;

use libfuzzer_sys::{fuzz_mutator, fuzz_target};

fuzz_target!(|text: &[u8]| {
    shared::take::file(text);
});
fuzz_mutator!(|data: &mut [u8], size: usize, most: usize, seed: u32| {
    shared::change(data, size, most, seed)
});
