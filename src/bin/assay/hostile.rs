//! Hostile input: files of the app, broken in every way that a careless or ill-meaning hand breaks them, read as untrusted. A panic ends
//! the program (the release build aborts), so a run that ends has had none.

use lowside::bench::stand::{BenchSheet, Subject as Stood, paste};
use lowside::demo::TAMARISK;
use lowside::quantity::{Kind, Unit as InUnit, UnitPrefs, parse};
use lowside::record::{Export, NeutralSheet, Visit};
use lowside::report::{Report, Subject};
use lowside::unit::Unit;
use lowside::windows::Normals;
use lowside::{pack, tag, tracking};
use serde_json::Value;

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

/// How many inputs of each kind were taken or refused.
#[derive(Default)]
struct Counts {
    taken: usize,
    refused: usize,
    tables: usize,
    stored: usize,
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
    let whole = Export::read(TAMARISK.as_bytes()).expect("the yard reads");
    let tags: Vec<String> = whole.units.iter().map(tag::digits).collect();
    let full = full(&whole);
    let seeds = [SEEDS[0], SEEDS[1], SEEDS[2], &full];
    let trees: Vec<Value> = [SEEDS[1], SEEDS[2], &full]
        .into_iter()
        .map(|seed| serde_json::from_str(seed).expect("a seed is JSON"))
        .collect();
    for at in 0..count {
        match at % 8 {
            2 => table(&mut draw, &mut counts),
            4 => stored(&mut draw, &mut counts),
            6 => damaged_tag(&mut draw, &tags, &mut counts),
            7 => figure(&mut draw, &mut counts),
            1 | 5 => {
                let text = twisted(&mut draw, &trees[at / 4 % trees.len()]);
                file(&text, &mut counts);
            }
            _ => {
                let text = broken(&mut draw, seeds[at / 2 % seeds.len()].as_bytes());
                file(&text, &mut counts);
            }
        }
    }
    println!(
        "{count} hostile inputs, no panic: {} files taken, {} refused with words; {} tables, {} stored texts, {} tags and {} figures \
         read; {} calls worked out",
        counts.taken,
        counts.refused,
        counts.tables,
        counts.stored,
        counts.tags,
        counts.figures,
        counts.worked_out
    );
}

/// A file that is whole as JSON, with one to four of its values exchanged for ones that nobody meant.
fn twisted(draw: &mut Normals, seed: &Value) -> Vec<u8> {
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

/// A call in which every sheet has something.
fn full(whole: &Export) -> String {
    let mut export = whole.clone();
    export.visits.truncate(1);
    let of = export.visits.first().map(|visit| visit.unit.clone());
    export.units.retain(|unit| Some(&unit.id) == of.as_ref());
    if let Some(visit) = export.visits.first_mut() {
        let mut bench = BenchSheet::default();
        if let Ok(pasted) = paste::read(TABLE, Stood::Pump) {
            let mut rows = 0;
            bench.rows = pasted
                .rows(|| {
                    rows += 1;
                    format!("row-{rows}")
                })
                .0;
        }
        visit.bench = Some(bench);
        visit.neutral = Some(NeutralSheet::default());
        visit.tracking = Some(tracking::TrackingSheet {
            runs: vec![tracking::Line::default()],
            ..tracking::TrackingSheet::default()
        });
    }
    export.text().expect("what was read can be written")
}

/// What is taken goes out again and is read back: no half-checked record stays behind.
fn file(text: &[u8], counts: &mut Counts) {
    let Ok(export) = Export::read(text) else {
        counts.refused += 1;
        return;
    };
    counts.taken += 1;
    let again = export.texts().is_ok_and(|texts| {
        texts
            .iter()
            .all(|text| Export::read(text.as_bytes()).is_ok())
    });
    assert!(again, "taken once and refused when it came back");
    for unit in &export.units {
        let back = tag::read(&tag::digits(unit));
        // Too long for a tag is told; anything else must come back as it went.
        if let Ok(back) = back {
            assert_eq!(back.units.first(), Some(unit), "changed by its tag");
        }
    }
    if counts.taken.is_multiple_of(WORKED_OUT) {
        counts.worked_out += export
            .visits
            .iter()
            .filter_map(|visit| {
                let unit = export.units.iter().find(|unit| unit.id == visit.unit)?;
                work_out(unit, visit, &export);
                Some(())
            })
            .count();
    }
}

/// Everything that the app works out of a call. A probability is one, and nothing that is printed is "not a number".
fn work_out(unit: &Unit, visit: &Visit, export: &Export) {
    let instruments = &export.instruments;
    let assessment = lowside::ranking::assess(unit, visit, instruments);
    for cause in &assessment.causes {
        assert!(
            (0.0..=1.0 + 1e-9).contains(&cause.probability),
            "{}",
            cause.probability
        );
    }
    let prefs = UnitPrefs::default();
    let text = Report::of(&Subject {
        unit,
        visit,
        instruments,
        assessment: &assessment,
        prefs: &prefs,
        made_at: "2026-01-01T00:00:00Z",
    })
    .text();
    assert!(!text.contains("NaN") && !text.contains("inf "), "{text}");
    let _ = lowside::yard::report(unit, visit, &[], instruments, &prefs);
    let visits: Vec<&Visit> = export.visits.iter().collect();
    let _ = lowside::yard::outlook(unit, &visits, instruments);
    if let Some(sheet) = &visit.neutral {
        let _ = lowside::neutral::report::report(unit, sheet);
    }
    if let Some(sheet) = &visit.tracking {
        let machine = sheet.machine(tracking::usual_undercarriage(unit.class));
        let runs: Vec<tracking::Run> = sheet.runs(&machine).into_iter().flatten().collect();
        let _ = tracking::find(&machine, &runs, &sheet.screws());
    }
    if let Some(sheet) = &visit.bench {
        let _ = lowside::bench::stand::report(sheet, Some(unit));
    }
}

fn table(draw: &mut Normals, counts: &mut Counts) {
    let text = broken(draw, TABLE.as_bytes());
    let text = String::from_utf8_lossy(&text);
    if let Ok(pasted) = paste::read(&text, Stood::Pump) {
        let (rows, _) = pasted.rows(String::new);
        counts.tables += usize::from(!rows.is_empty());
    }
}

/// A text of the local storage whose characters were changed: it comes back as some text, and that is read as a file is.
fn stored(draw: &mut Normals, counts: &mut Counts) {
    let seed = broken(draw, SEEDS[1].as_bytes());
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
    let text = pack::text_of(wide.into_iter().collect());
    counts.stored += usize::from(Export::read(text.as_bytes()).is_ok());
}

fn damaged_tag(draw: &mut Normals, tags: &[String], counts: &mut Counts) {
    let Some(whole) = tags.get(below(draw, tags.len())) else {
        return;
    };
    let text = broken(draw, whole.as_bytes());
    let read = tag::read(&String::from_utf8_lossy(&text));
    counts.tags += usize::from(read.is_ok());
}

fn figure(draw: &mut Normals, counts: &mut Counts) {
    let seeds = [
        "21,5 bar",
        "3/4 turn",
        "1.234,5 psi",
        "-0.8 bar",
        "2 1/2 L",
        "70 °F",
        "1e3 rpm",
    ];
    let seed = seeds[below(draw, seeds.len())];
    let text = broken(draw, seed.as_bytes());
    let text = String::from_utf8_lossy(&text);
    let kinds = [
        (Kind::Pressure, InUnit::Bar),
        (Kind::Angle, InUnit::Turn),
        (Kind::Temperature, InUnit::DegreeCelsius),
        (Kind::RotationalSpeed, InUnit::RevolutionPerMinute),
        (Kind::Volume, InUnit::Litre),
    ];
    let (kind, unit) = kinds[below(draw, kinds.len())];
    if let Ok(parsed) = parse(&text, kind, unit, None) {
        assert!(parsed.measure.base().is_finite(), "{text:?}");
        counts.figures += 1;
    }
}
