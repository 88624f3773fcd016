//! The text of a record in the browser's storage, in each format there was, today's and the next.
#![no_main]

#[path = "../shared.rs"]
mod shared;

use libfuzzer_sys::{fuzz_mutator, fuzz_target};
use lowside::record::SCHEMA;

fuzz_target!(|text: &[u8]| {
    if let Ok(text) = std::str::from_utf8(text) {
        for schema in 0..=u64::from(SCHEMA) + 1 {
            shared::take::kept(text, schema);
        }
    }
});
fuzz_mutator!(|data: &mut [u8], size: usize, most: usize, seed: u32| {
    shared::change(data, size, most, seed)
});
