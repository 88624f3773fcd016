//! How a text or a tree of values is broken.

use lowside::windows::Normals;
use serde_json::Value;

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

/// Zero to `n` - 1.
pub fn below(draw: &mut Normals, n: usize) -> usize {
    ((draw.unit() * n as f64) as usize).min(n.saturating_sub(1))
}

/// One to six breaks.
pub fn broken(draw: &mut Normals, seed: &[u8]) -> Vec<u8> {
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

/// A file that is whole as JSON, with one to four of its values exchanged for ones that nobody meant.
pub fn twisted(draw: &mut Normals, seed: &Value) -> Vec<u8> {
    let mut tree = seed.clone();
    for _ in 0..=below(draw, 4) {
        twist(draw, &mut tree);
    }
    tree.to_string().into_bytes()
}

fn twist(draw: &mut Normals, node: &mut Value) {
    match node {
        Value::Object(map) if !map.is_empty() && draw.unit() < 0.97 => {
            let at = below(draw, map.len());
            if let Some((_, inside)) = map.iter_mut().nth(at) {
                twist(draw, inside);
            }
        }
        Value::Array(list) if !list.is_empty() && draw.unit() < 0.95 => {
            let at = below(draw, list.len());
            if draw.unit() < 0.1 {
                let again = list[at].clone();
                list.push(again);
            } else {
                twist(draw, &mut list[at]);
            }
        }
        // A figure that could be meant: ten times too large or too small.
        Value::Number(figure) if draw.unit() < 0.6 => {
            let size = figure.as_f64().unwrap_or(1.0);
            *node = (size * lowside::math::exp(4.6 * (draw.unit() - 0.5))).into();
        }
        _ => *node = foreign(draw),
    }
}

fn foreign(draw: &mut Normals) -> Value {
    let all = [
        Value::Null,
        true.into(),
        0.into(),
        (-1).into(),
        1e308.into(),
        5e-324.into(),
        (-0.0).into(),
        u64::MAX.into(),
        "".into(),
        "<script>\u{202e}\u{0}".into(),
        "x".repeat(70_000).into(),
        Value::Array(vec![Value::Null; 3]),
        serde_json::json!({ "value": 1e12, "unit": "bar" }),
    ];
    let at = below(draw, all.len());
    all.into_iter().nth(at).unwrap_or_default()
}
