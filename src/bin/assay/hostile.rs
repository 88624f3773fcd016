//! Hostile input: files of the app, broken in every way that a careless or ill-meaning hand breaks them, read as untrusted. A panic ends
//! the program (the release build aborts), so a run that ends has had none.

use lowside::bench::stand::{Subject, paste};
use lowside::demo::TAMARISK;
use lowside::record::Export;
use lowside::windows::Normals;

/// What comes in from outside and is read.
const SEEDS: [&str; 3] = [
    TAMARISK,
    include_str!("../../../tests/fixtures/v1/export.json"),
    include_str!("../../../tests/fixtures/v2/export.json"),
];
/// Pieces that a parser may trip over.
const PIECES: [&str; 18] = [
    "null",
    "[]",
    "{}",
    "1e999",
    "-0",
    "NaN",
    "\"\"",
    "[[[[[[[[",
    "}}}}",
    "\\u0000",
    "\u{202e}",
    "<script>",
    "9007199254740993",
    "-1e308",
    "\"__proto__\":1,",
    "é",
    "\u{feff}",
    ",,",
];
/// Largest text that is broken further: small ones are read quicker and broken more deeply.
const LARGEST: usize = 6_000;
const TABLE: &str = "Point\tSpeed\tInlet pressure\tOutlet pressure\tFlow\tTorque\n\trpm\tbar\tbar\tl/min\tNm\n1\t1500\t20,0\t220,5\t108,3\t262,4\n";

fn below(draw: &mut Normals, n: usize) -> usize {
    ((draw.unit() * n as f64) as usize).min(n.saturating_sub(1))
}

/// One to six breaks.
fn broken(draw: &mut Normals, seed: &[u8]) -> Vec<u8> {
    let mut text = seed.to_vec();
    if text.len() > LARGEST {
        // A window of a large file with its head, so that it still looks like one.
        let from = below(draw, text.len() - LARGEST);
        let mut window = seed[..120.min(seed.len())].to_vec();
        window.extend_from_slice(&text[from..from + LARGEST]);
        if draw.unit() < 0.5 {
            text = window;
        }
    }
    for _ in 0..=below(draw, 6) {
        if text.is_empty() {
            break;
        }
        let at = below(draw, text.len());
        match below(draw, 6) {
            0 => text[at] = (draw.unit() * 256.0) as u8,
            1 => {
                let to = (at + 1 + below(draw, 40)).min(text.len());
                text.drain(at..to);
            }
            2 => {
                let piece = PIECES[below(draw, PIECES.len())].as_bytes();
                text.splice(at..at, piece.iter().copied());
            }
            3 => {
                let to = (at + 1 + below(draw, 200)).min(text.len());
                let again = text[at..to].to_vec();
                text.splice(at..at, again);
            }
            4 => text.truncate(at),
            // A figure becomes another one.
            _ => {
                if let Some(digit) = text[at..].iter().position(u8::is_ascii_digit) {
                    let piece = PIECES[below(draw, PIECES.len())].as_bytes();
                    text.splice(at + digit..=at + digit, piece.iter().copied());
                }
            }
        }
    }
    text
}

/// Reads `count` broken files and tables, and tells how many were taken and how many refused.
pub fn hostile(count: usize, seed: u64) {
    let mut draw = Normals::new(seed);
    let (mut taken, mut refused, mut tables) = (0_usize, 0_usize, 0_usize);
    for at in 0..count {
        if at % 4 == 3 {
            let text = broken(&mut draw, TABLE.as_bytes());
            let text = String::from_utf8_lossy(&text);
            if let Ok(pasted) = paste::read(&text, Subject::Pump) {
                let (rows, _) = pasted.rows(String::new);
                tables += usize::from(!rows.is_empty());
            }
            continue;
        }
        let text = broken(&mut draw, SEEDS[at % SEEDS.len()].as_bytes());
        match Export::read(&text) {
            Ok(export) => {
                // What is taken goes out again and is read back: no half-checked record stays behind.
                let again = export.texts().is_ok_and(|texts| {
                    texts
                        .iter()
                        .all(|text| Export::read(text.as_bytes()).is_ok())
                });
                assert!(again, "taken once and refused when it came back");
                taken += 1;
            }
            Err(_) => refused += 1,
        }
    }
    println!(
        "{count} hostile inputs, no panic: {taken} files taken, {refused} refused with words, {tables} tables read"
    );
}
