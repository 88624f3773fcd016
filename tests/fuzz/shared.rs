//! What the fuzz targets have in common: what must hold of an input, what to begin with, and how JSON is changed without ceasing to be
//! JSON (bytes alone hardly ever get past the parser).
#![allow(dead_code)] // each target takes what it needs

#[path = "../../src/bin/assay/hostile/breaks.rs"]
mod breaks;
#[path = "../../src/bin/assay/hostile/seeds.rs"]
pub mod seeds;
#[path = "../../src/bin/assay/hostile/take.rs"]
pub mod take;

use libfuzzer_sys::fuzzer_mutate;
use lowside::windows::Normals;

/// Every other change is made to the tree of values, if there is one; the rest is the fuzzer's own.
pub fn change(data: &mut [u8], size: usize, most: usize, seed: u32) -> usize {
    if seed.is_multiple_of(2)
        && let Ok(tree) = serde_json::from_slice(&data[..size])
    {
        let text = breaks::twisted(&mut Normals::new(u64::from(seed)), &tree);
        if let (true, Some(room)) = (text.len() <= most, data.get_mut(..text.len())) {
            room.copy_from_slice(&text);
            return text.len();
        }
    }
    fuzzer_mutate(data, size, most)
}
