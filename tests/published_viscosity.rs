//! Viscosity, viscosity index and grades against standards and tables.
#![allow(clippy::disallowed_methods)] // the platform's functions as an outside check
#![cfg(not(target_arch = "wasm32"))]

mod published_common;

use lowside::fluid::viscosity_index::{
    index_by_definition, kv100_from_index, reference_oils, viscosity_by_definition, viscosity_index,
};
use lowside::fluid::{
    Band, FluidError, IsoGrade, ViscosityCurve, dynamic_viscosity, remarks, saybolt,
};
use published_common::{EXACT, close, within};

fn curve(kv40: f64, kv100: f64) -> ViscosityCurve {
    ViscosityCurve::new(kv40, kv100).expect("an oil")
}

/// B-E1: log10 log10 (ν + 0.7) is straight in log10 T. B-E2: at low viscosity the exponential term keeps it so.
#[test]
fn form_of_astm_d341() {
    let oil = curve(46.0, 6.8);
    let (a, b) = oil.constants();
    for celsius in [0.0, 25.0, 60.0, 90.0] {
        let walther = (oil.kinematic_at(celsius) + 0.7).log10().log10();
        within("B-E1", walther, a - b * (celsius + 273.15).log10(), 1e-9);
    }
    // Z and its inverse agree to the standard's own accuracy: the curve passes through its own fitting points.
    for (kv40, kv100) in [(2.2, 1.0), (3.2, 1.2), (4.6, 1.6), (6.8, 2.0)] {
        let thin = curve(kv40, kv100);
        close("B-E2 40 °C", thin.kinematic_at(40.0), kv40, 0.002);
        close("B-E2 100 °C", thin.kinematic_at(100.0), kv100, 0.002);
    }
}

/// B1, B2: the worked examples of ASTM D2270; the open package chemicals 1.5.2 gives 92.4296 and 156.4235.
#[test]
fn worked_examples_of_astm_d2270() {
    let (l, h) = reference_oils(8.86).expect("in the table");
    within("B1 L", l, 119.94, 0.005);
    within("B1 H", h, 69.48, 0.005);
    let index = viscosity_index(73.30, 8.86).expect("an oil");
    within("B1", index, 92.43, 0.05);
    within("B1 by chemicals", index, 92.4296, 1e-4);

    let (_, h) = reference_oils(5.05).expect("in the table");
    within("B2 H", h, 28.97, 0.01);
    let index = viscosity_index(22.83, 5.05).expect("an oil");
    // The standard's print rounds H; the table interpolated gives 156.42.
    within("B2", index, 156.37, 0.1);
    within("B2 by chemicals", index, 156.4235, 1e-4);
}

/// B4: formulas above 70 mm²/s. B5: no index under 2. B6: nodes of Table 1 as chemicals 1.5.2 holds them.
#[test]
fn reference_oils_of_astm_d2270() {
    let y: f64 = 120.0;
    let (l, h) = reference_oils(y).expect("above the table");
    close("B4 L", l, 0.8353 * y * y + 14.67 * y - 216.0, EXACT);
    close("B4 H", h, 0.1684 * y * y + 11.85 * y - 97.0, EXACT);
    assert!(
        matches!(
            viscosity_index(4.0, 1.99),
            Err(FluidError::IndexNotDefined { .. })
        ),
        "B5"
    );
    let nodes = [
        (2.00, 7.994, 6.394),
        (5.00, 40.23, 28.49),
        (7.00, 78.00, 48.57),
        (10.00, 147.7, 82.87),
        (70.0, 4905.0, 1558.0),
    ];
    for (y, l, h) in nodes {
        let found = reference_oils(y).expect("in the table");
        close("B6 L", found.0, l, 1e-9);
        close("B6 H", found.1, h, 1e-9);
    }
}

/// B9: nominal oils, by chemicals 1.5.2; and the way back to the viscosity at 100 °C.
#[test]
fn nominal_oils() {
    for (kv40, kv100, index) in [(32.0, 5.4, 102.2), (46.0, 6.8, 101.6), (68.0, 8.6, 96.8)] {
        let found = viscosity_index(kv40, kv100).expect("an oil");
        within("B9", found, index, 0.05);
        close(
            "B9 back",
            kv100_from_index(kv40, found).expect("an oil"),
            kv100,
            1e-9,
        );
    }
}

/// B10: ISO 3448, as a viscosity handbook prints its table. Limits are 10 % about the mid-point.
#[test]
fn grades_of_iso_3448() {
    let table = [
        (10, 9.00, 11.0),
        (15, 13.5, 16.5),
        (22, 19.8, 24.2),
        (32, 28.8, 35.2),
        (46, 41.4, 50.6),
        (68, 61.2, 74.8),
        (100, 90.0, 110.0),
        (150, 135.0, 165.0),
    ];
    for (number, low, high) in table {
        let grade = IsoGrade::new(number).expect("a grade");
        close("B10 middle", grade.middle(), f64::from(number), EXACT);
        close("B10 low", grade.limits().0, low, EXACT);
        close("B10 high", grade.limits().1, high, EXACT);
    }
}

/// B11: unused engine oil of Cengel's property table, fitted at 40 and 100 °C (fit derived): 217.7 and 17.18 mPa·s over
/// 876.0 and 840.0 kg/m³, 248.5 and 20.45 mm²/s.
#[test]
fn d341_against_a_measured_engine_oil() {
    let oil = curve(217.7 / 0.876, 17.18 / 0.840);
    let (a, b) = oil.constants();
    within("B11 A", a, 8.813_09, 1e-4);
    within("B11 B", b, 3.379_14, 1e-4);
    let rows = [
        (60.0, 87.24, 85.65, 0.025),
        (80.0, 38.79, 37.93, 0.025),
        (120.0, 12.21, 12.41, 0.025),
        (140.0, 8.00, 8.03, 0.025),
        (20.0, 988.6, 942.9, 0.05),
    ];
    for (celsius, fitted, measured, tolerance) in rows {
        close("B11 fit", oil.kinematic_at(celsius), fitted, 0.001);
        close("B11 table", oil.kinematic_at(celsius), measured, tolerance);
    }
}

/// B12, B14 are documented and not asserted: at 0 °C D341 gives 6355 mm²/s where the table has 4242. What must hold is that
/// such a figure is marked.
#[test]
fn cold_extrapolation_is_marked() {
    let oil = curve(248.5, 20.45);
    for celsius in [0.0, 273.0 - 273.15, 280.0 - 273.15, 290.0 - 273.15] {
        assert!(remarks(&oil, celsius).extrapolated_cold, "{celsius} °C");
    }
    assert!(!remarks(&oil, 40.0).extrapolated_cold);
}

/// B15 to B17: D341 for nominal oils (own fits with 0.7 and 273.15).
#[test]
fn d341_for_nominal_oils() {
    type Row = (f64, f64, Option<(f64, f64)>, &'static [(f64, f64)]);
    let rows: [Row; 3] = [
        (
            46.0,
            6.8,
            Some((9.417_99, 3.684_44)),
            &[
                (-20.0, 4518.0),
                (0.0, 577.3),
                (20.0, 133.8),
                (60.0, 20.62),
                (80.0, 11.10),
            ],
        ),
        (
            32.0,
            5.4,
            Some((9.530_82, 3.746_58)),
            &[(0.0, 336.0), (20.0, 86.28), (60.0, 15.19), (80.0, 8.533)],
        ),
        (
            68.0,
            8.6,
            Some((9.377_81, 3.651_69)),
            &[(0.0, 1060.0), (60.0, 28.49), (80.0, 14.59)],
        ),
    ];
    for (kv40, kv100, constants, points) in rows {
        let oil = curve(kv40, kv100);
        if let Some((a, b)) = constants {
            within("B15-17 A", oil.constants().0, a, 1e-5);
            within("B15-17 B", oil.constants().1, b, 1e-5);
        }
        for (celsius, kinematic) in points {
            close("B15-17", oil.kinematic_at(*celsius), *kinematic, 0.001);
        }
    }
    // The same oil warmed from 60 to 75 °C leaks 61 % more (derived).
    let growth = lowside::fluid::leakage_growth(&curve(46.0, 6.8), 60.0, 75.0);
    within("growth", growth, 1.61, 0.005);
}

/// B18 to B20: Esposito Ex 2-12 to 2-14.
#[test]
fn conversions_of_esposito() {
    let nu = saybolt::kinematic(230.0).expect("in range");
    close("B18 by chemicals", nu, 49.4, 0.02);
    close(
        "B18 by the book's formula",
        nu,
        0.220 * 230.0 - 135.0 / 230.0,
        0.02,
    );
    close("B19", dynamic_viscosity(25.0, 890.0), 22.25, EXACT);
    close(
        "B19 as printed",
        dynamic_viscosity(25.0, 890.0),
        22.3,
        0.003,
    );
    close(
        "B20",
        viscosity_by_definition(400.0, 150.0, 80.0),
        200.0,
        EXACT,
    );
    close(
        "B20 back",
        index_by_definition(400.0, 150.0, 200.0),
        80.0,
        EXACT,
    );
}

/// F15: viscosity bands of a practical hydraulics article.
#[test]
fn bands() {
    for (kinematic, band) in [
        (10.0, Band::TooThin),
        (20.0, Band::Thin),
        (30.0, Band::Ideal),
        (59.0, Band::Ideal),
        (100.0, Band::Thick),
        (600.0, Band::TooThick),
    ] {
        assert_eq!(Band::of(kinematic), band, "F15 {kinematic}");
    }
}
