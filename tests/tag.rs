//! Tags: a profile goes into a QR code and comes out of it through a reader from outside; what is damaged is refused.
#![cfg(not(target_arch = "wasm32"))]

mod record_support;

use lowside::record::{Book, Export, Fate, ImportPlan};
use lowside::tag::{self, Shortened, Symbol, TagError};
use lowside::unit::Unit;
use proptest::prelude::*;
use record_support::Dice;

/// Address of an app below the root of a host.
const ADDRESS: &str = "https://yard.example/lowside/";

fn demo() -> Vec<Unit> {
    Export::read(lowside::demo::TAMARISK.as_bytes())
        .expect("the demo")
        .units
}

/// As an export would write it and read it back.
fn settled(unit: &Unit) -> Unit {
    let mut book = Book::default();
    book.put_unit(unit.clone());
    let text = Export::of(&book, "").text().expect("a text");
    Export::read(text.as_bytes()).expect("it reads").units[0].clone()
}

/// What a reader from outside (another QR library) sees in the drawn code, a few pixels a module.
fn scanned(symbol: &Symbol, pixels: usize) -> String {
    let side = symbol.whole() * pixels;
    let is_dark = |x: usize, y: usize| {
        let module = |at: usize| (at / pixels).checked_sub(tag::QUIET);
        match (module(x), module(y)) {
            (Some(x), Some(y)) => symbol.is_dark(x, y),
            _ => false,
        }
    };
    let mut image = rqrr::PreparedImage::prepare_from_greyscale(side, side, |x, y| {
        if is_dark(x, y) { 20 } else { 235 }
    });
    let grids = image.detect_grids();
    assert_eq!(grids.len(), 1, "one code is seen");
    grids[0].decode().expect("the code is read").1
}

#[test]
fn a_reader_from_outside_reads_the_tag_and_the_profile_comes_back() {
    for unit in demo() {
        let made = tag::tag(&unit, ADDRESS).expect("it fits");
        assert_eq!(made.shortened, Shortened::Whole);
        assert!(made.symbol.version <= 20);
        let link = scanned(&made.symbol, 3);
        assert_eq!(link, made.link);
        assert!(link.starts_with("https://yard.example/lowside/#/tag/"));
        let export = tag::read(&link).expect("it reads");
        assert_eq!(export.units, std::slice::from_ref(&unit));
        println!(
            "{}: version {}, {} modules, {} digits",
            unit.name,
            made.symbol.version,
            made.symbol.side,
            link.len() - ADDRESS.len() - tag::MARK.len()
        );
    }
}

#[test]
fn what_is_drawn_is_what_the_code_has() {
    let made = tag::tag(&demo()[2], ADDRESS).expect("it fits");
    let path = made.symbol.path();
    let mut dark = 0;
    for part in path.split('z').filter(|part| !part.is_empty()) {
        let (place, run) = part.split_once('h').expect("a run");
        let (x, y) = place
            .trim_start_matches('M')
            .split_once(' ')
            .expect("a place");
        let (x, y): (usize, usize) = (x.parse().expect("x"), y.parse().expect("y"));
        let run: usize = run
            .split('v')
            .next()
            .expect("a length")
            .parse()
            .expect("a length");
        for at in x..x + run {
            assert!(made.symbol.is_dark(at - tag::QUIET, y - tag::QUIET));
        }
        dark += run;
    }
    let side = made.symbol.side;
    let all = (0..side).flat_map(|y| (0..side).map(move |x| (x, y)));
    assert_eq!(
        all.filter(|(x, y)| made.symbol.is_dark(*x, *y)).count(),
        dark
    );
}

#[test]
fn the_same_text_pasted_in_many_ways() {
    let unit = &demo()[0];
    let digits = tag::digits(unit);
    let block = tag::block(unit, &digits);
    let spaced: String = block.lines().map(|line| format!("  {line} \r\n")).collect();
    for text in [
        digits.clone(),
        block.clone(),
        spaced,
        format!("Here it is:\n{block}\nSee you"),
        format!("{ADDRESS}{}{digits}", tag::MARK),
        format!("Look: {ADDRESS}{}{digits}. Bye", tag::MARK),
    ] {
        assert_eq!(
            tag::read(&text).expect("it reads").units,
            std::slice::from_ref(unit)
        );
    }
    assert!(block.lines().all(|line| line.len() <= 50), "{block}");
}

#[test]
fn damage_is_refused() {
    let digits = tag::digits(&demo()[0]);
    for at in 0..digits.len() {
        let mut other: Vec<u8> = digits.clone().into_bytes();
        other[at] = if other[at] == b'9' {
            b'0'
        } else {
            other[at] + 1
        };
        let other = String::from_utf8(other).expect("digits");
        assert_eq!(tag::read(&other), Err(TagError::Damaged), "digit {at}");
    }
    for cut in 1..digits.len() {
        assert_eq!(
            tag::read(&digits[..cut]),
            Err(TagError::Damaged),
            "cut at {cut}"
        );
    }
    let mut swapped = digits.clone().into_bytes();
    swapped.swap(20, 61);
    let swapped = String::from_utf8(swapped).expect("digits");
    assert!(swapped == digits || tag::read(&swapped).is_err());
}

#[test]
fn what_is_no_tag_says_so() {
    for text in [
        "",
        "T-27",
        "call me at twelve",
        "#/tag/",
        "{\"lowside_export\":2}",
    ] {
        assert_eq!(tag::read(text), Err(TagError::NoTag), "{text:?}");
    }
    assert_eq!(tag::read("12345"), Err(TagError::Damaged));
    let long = "7".repeat(tag::MOST_DIGITS + 1);
    assert!(matches!(tag::read(&long), Err(TagError::TooLong { .. })));
}

/// A tag as a stranger might make one: any text, packed and summed as it should be.
fn forged(version: u8, text: &str) -> String {
    let mut bytes = vec![version];
    bytes.extend(lowside::pack::pack(text.as_bytes()));
    let hex: String = bytes.iter().map(|byte| format!("{byte:02x}")).collect();
    let sum = lowside::record::checksum(&hex);
    let end = (0..4).map(|at| u8::from_str_radix(&sum[2 * at..2 * at + 2], 16).expect("hex"));
    bytes.extend(end);
    lowside::pack::to_digits(&bytes)
}

#[test]
fn a_forged_tag_brings_nothing_but_a_checked_profile() {
    assert_eq!(
        tag::read(&forged(2, "{}")),
        Err(TagError::Newer { found: 2 })
    );
    assert_eq!(tag::read(&forged(0, "{}")), Err(TagError::Damaged));
    for text in [
        "",
        "[]",
        "{\"lowside_export\":2,\"units\":[{\"id\":\"../x\",\"name\":\"T\"}]}",
        "{\"lowside_export\":99,\"units\":[]}",
        "{\"lowside_export\":2,\"units\":[{\"id\":\"u1\",\"ticks\":{\"motors\":200}}]}",
    ] {
        assert!(
            matches!(tag::read(&forged(1, text)), Err(TagError::Refused(_))),
            "{text}"
        );
    }
    for text in [
        "{\"lowside_export\":2,\"units\":[]}",
        "{\"lowside_export\":2,\"units\":[{\"id\":\"u1\"},{\"id\":\"u2\"}]}",
    ] {
        assert_eq!(
            tag::read(&forged(1, text)),
            Err(TagError::Damaged),
            "{text}"
        );
    }
    // Nothing but the profile gets in.
    let text = "{\"lowside_export\":2,\"units\":[{\"id\":\"u1\"}],\"visits\":[{\"id\":\"v1\",\"unit\":\"u1\"}],\"settings\":{}}";
    let export = tag::read(&forged(1, text)).expect("the profile");
    assert!(export.visits.is_empty() && export.settings.is_none());
    // What unpacks to more than a profile is refused before it is there.
    let bomb = format!(
        "{{\"lowside_export\":2,\"units\":[{{\"id\":\"{}\"}}]}}",
        "x".repeat(3_000_000)
    );
    assert_eq!(tag::read(&forged(1, &bomb)), Err(TagError::Damaged));
}

#[test]
fn a_long_profile_goes_without_what_can_be_read_elsewhere() {
    let mut unit = demo()[0].clone();
    let mut dice = Dice(7);
    unit.note = (0..1500)
        .map(|_| char::from(b'a' + (dice.next() % 26) as u8))
        .collect();
    let made = tag::tag(&unit, ADDRESS).expect("it fits without the note");
    assert_eq!(made.shortened, Shortened::WithoutNote);
    let back = tag::read(&made.link).expect("it reads").units[0].clone();
    assert_eq!(back.note, "");
    assert_eq!(back.ports, unit.ports);
    for note in unit.ports.values_mut() {
        note.place = (0..600)
            .map(|_| char::from(b'a' + (dice.next() % 26) as u8))
            .collect();
    }
    let made = tag::tag(&unit, ADDRESS).expect("it fits without the places");
    assert_eq!(made.shortened, Shortened::WithoutPlaces);
    unit.name = (0..400)
        .map(|_| char::from(b'!' + (dice.next() % 90) as u8))
        .collect();
    unit.id = "x".repeat(64);
    for figure in unit.figures.values_mut() {
        figure.typed = (0..400)
            .map(|_| char::from(b'!' + (dice.next() % 90) as u8))
            .collect();
    }
    assert!(tag::tag(&unit, ADDRESS).is_err());
    // The text carries all of it.
    assert_eq!(
        tag::read(&tag::digits(&unit)).expect("it reads").units,
        [settled(&unit)]
    );
}

#[test]
fn a_tag_never_writes_over_a_unit() {
    let unit = demo()[0].clone();
    let mut book = Book::default();
    let export = tag::read(&tag::digits(&unit)).expect("it reads");
    assert_eq!(ImportPlan::of(&export, &book).units[0].fate, Fate::New);
    book.put_unit(unit.clone());
    assert!(ImportPlan::of(&export, &book).is_empty());
    let changed = Unit {
        note: "other".into(),
        ..unit.clone()
    };
    book.put_unit(changed.clone());
    let plan = ImportPlan::of(&export, &book);
    assert!(matches!(plan.units[0].fate, Fate::Copy { .. }));
    plan.apply(&mut book, true);
    assert_eq!(book.units.len(), 2);
    assert_eq!(book.unit(&unit.id), Some(&changed));
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]

    #[test]
    fn any_profile_comes_back_from_its_digits(seed: u64) {
        let unit = Dice(seed).unit();
        let digits = tag::digits(&unit);
        prop_assert_eq!(&tag::read(&digits).expect("it reads").units[0], &settled(&unit));
        if let Ok(made) = tag::tag(&unit, ADDRESS) {
            prop_assert_eq!(scanned(&made.symbol, 3), made.link);
        }
    }

    #[test]
    fn any_text_is_read_or_refused(text in "\\PC{0,200}", digits in "[0-9]{1,400}") {
        let _ = tag::read(&text);
        prop_assert!(tag::read(&digits).is_err());
    }
}
