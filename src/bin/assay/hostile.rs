//! Hostile input: files of the app, broken in every way that a careless or ill-meaning hand breaks them, read as untrusted. A panic ends
//! the program (the release build aborts), so a run that ends has had none.

mod breaks;
mod seeds;
mod take;

use breaks::{below, broken, twisted};
use lowside::record::SCHEMA;
use lowside::windows::Normals;
use lowside::{pack, tag};
use serde_json::Value;

/// How many inputs of each kind were taken or refused.
#[derive(Default)]
struct Counts {
    taken: usize,
    refused: usize,
    tables: usize,
    stored: usize,
    kept: usize,
    tags: usize,
    figures: usize,
    worked_out: usize,
}

/// One call in so many of those taken is worked out whole: that takes a thousand times as long as reading it.
const WORKED_OUT: usize = 500;

/// Reads `count` broken files, tables, stored texts, tags and typed figures, and tells how many were taken and how many refused.
pub fn hostile(count: usize, seed: u64) {
    let mut draw = Normals::new(seed);
    let mut counts = Counts::default();
    let tags: Vec<String> = seeds::yard().units.iter().map(tag::digits).collect();
    let whole = seeds::full();
    let full = whole.text().expect("what was read can be written");
    let files = [seeds::FILES[0], seeds::FILES[1], seeds::FILES[2], &full];
    let tree = |text: &str| serde_json::from_str(text).expect("a seed is JSON");
    let trees: Vec<Value> = files[1..].iter().copied().map(tree).collect();
    let records: Vec<Value> = seeds::records(&whole)
        .iter()
        .map(|text| tree(text))
        .collect();
    for at in 0..count {
        match at % 8 {
            2 => table(&mut draw, &mut counts),
            4 if at % 16 == 4 => stored(&mut draw, &mut counts),
            4 => kept(&mut draw, &records, &mut counts),
            6 => damaged_tag(&mut draw, &tags, &mut counts),
            7 => figure(&mut draw, &mut counts),
            1 | 5 => {
                let text = twisted(&mut draw, &trees[at / 4 % trees.len()]);
                file(&text, &mut counts);
            }
            _ => {
                let text = broken(&mut draw, files[at / 2 % files.len()].as_bytes());
                file(&text, &mut counts);
            }
        }
    }
    println!(
        "{count} hostile inputs, no panic: {} files taken, {} refused with words; {} tables, {} packed texts, {} records, {} tags and \
         {} figures read; {} calls worked out",
        counts.taken,
        counts.refused,
        counts.tables,
        counts.stored,
        counts.kept,
        counts.tags,
        counts.figures,
        counts.worked_out
    );
}

fn file(text: &[u8], counts: &mut Counts) {
    match take::file(text) {
        None => counts.refused += 1,
        Some(export) => {
            counts.taken += 1;
            if counts.taken.is_multiple_of(WORKED_OUT) {
                counts.worked_out += take::calls(&export);
            }
        }
    }
}

fn table(draw: &mut Normals, counts: &mut Counts) {
    let text = broken(draw, seeds::TABLE.as_bytes());
    counts.tables += usize::from(take::table(&String::from_utf8_lossy(&text)));
}

/// A text of the local storage whose characters were changed.
fn stored(draw: &mut Normals, counts: &mut Counts) {
    let seed = broken(draw, seeds::FILES[1].as_bytes());
    let mut wide: Vec<char> = pack::stored(&String::from_utf8_lossy(&seed))
        .chars()
        .collect();
    for _ in 0..below(draw, 4) {
        if wide.is_empty() {
            break;
        }
        let at = below(draw, wide.len());
        if draw.unit() < 0.5 {
            wide.remove(at);
        } else {
            wide[at] = char::from_u32((draw.unit() * 65_536.0) as u32).unwrap_or('\u{fffd}');
        }
    }
    counts.stored += usize::from(take::packed(wide.into_iter().collect()));
}

/// A record of the local storage with some of its values exchanged, in an envelope that is sound.
fn kept(draw: &mut Normals, records: &[Value], counts: &mut Counts) {
    let record = &records[below(draw, records.len())];
    let body = twisted(draw, record);
    let schema = below(draw, SCHEMA as usize + 2) as u64;
    counts.kept += usize::from(take::kept(&String::from_utf8_lossy(&body), schema));
}

fn damaged_tag(draw: &mut Normals, tags: &[String], counts: &mut Counts) {
    let Some(whole) = tags.get(below(draw, tags.len())) else {
        return;
    };
    let text = broken(draw, whole.as_bytes());
    counts.tags += usize::from(take::tag(&String::from_utf8_lossy(&text)));
}

fn figure(draw: &mut Normals, counts: &mut Counts) {
    let seed = seeds::FIGURES[below(draw, seeds::FIGURES.len())];
    let text = broken(draw, seed.as_bytes());
    let of = below(draw, 5);
    counts.figures += usize::from(take::figure(&String::from_utf8_lossy(&text), of));
}
