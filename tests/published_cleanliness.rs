//! Cleanliness codes and filters against ISO 4406 as handbooks print it.
#![cfg(not(target_arch = "wasm32"))]

mod published_common;

use lowside::fluid::cleanliness::{
    CleanlinessCode, ScaleNumber, filtration_efficiency, filtration_ratio,
};
use published_common::close;

/// F23: ISO 4406:1999 table in a filter handbook; the upper limit belongs to the number.
#[test]
fn scale_numbers() {
    let table = [
        (0, 0.0, 0.01),
        (10, 5.0, 10.0),
        (11, 10.0, 20.0),
        (12, 20.0, 40.0),
        (13, 40.0, 80.0),
        (14, 80.0, 160.0),
        (15, 160.0, 320.0),
        (16, 320.0, 640.0),
        (17, 640.0, 1300.0),
        (18, 1300.0, 2500.0),
        (19, 2500.0, 5000.0),
        (20, 5000.0, 10_000.0),
        (21, 10_000.0, 20_000.0),
        (22, 20_000.0, 40_000.0),
        (23, 40_000.0, 80_000.0),
        (24, 80_000.0, 160_000.0),
        (28, 1_300_000.0, 2_500_000.0),
    ];
    for (number, above, upto) in table {
        let scale = ScaleNumber::new(number).expect("a scale number");
        assert_eq!(scale.range(), (above, upto), "F23 {number}");
        assert_eq!(
            ScaleNumber::of_count(upto),
            Some(scale),
            "F23 {number}: the upper limit is in"
        );
        let next = ScaleNumber::new(number + 1);
        assert_eq!(
            ScaleNumber::of_count(upto * 1.000_001),
            next,
            "F23 {number}: just over it is not"
        );
    }
}

/// F26: ISO 4406:1999 note: fewer than 20 particles counted are marked.
#[test]
fn few_particles_are_marked() {
    let code =
        CleanlinessCode::from_counts([150.0, 35.0, 0.9], Some([1500, 350, 9])).expect("a code");
    assert_eq!(code.to_string(), "14/12/≥7", "F26");
    let typed: CleanlinessCode = "14/12/>=7".parse().expect("as the note writes it");
    assert_eq!(typed, code, "F26");
}

/// F27: a filtration handbook's example.
#[test]
fn decoding() {
    let code: CleanlinessCode = "19/16/13".parse().expect("a code");
    let ranges = code.numbers().map(ScaleNumber::range);
    assert_eq!(
        ranges,
        [(2500.0, 5000.0), (320.0, 640.0), (40.0, 80.0)],
        "F27"
    );
}

/// F31: Sullivan Ex 6.3 and 6.4.
#[test]
fn filters() {
    let ratio = filtration_ratio(36_815.0, 6_347.0).expect("particles on both sides");
    close("F31", ratio, 5.80, 0.001);
    close(
        "F31 efficiency",
        filtration_efficiency(ratio),
        0.8276,
        0.001,
    );
    assert_eq!(filtration_ratio(100.0, 0.0), None);
}
