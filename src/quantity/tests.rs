//! Entries as people type them, and the properties that hold for all of them.

use super::spelling::fold;
use super::*;
use proptest::prelude::*;

fn measure(value: f64, unit: Unit) -> Measure {
    Measure::new(value, unit).expect("finite test figure")
}

fn typed(text: &str, kind: Kind, shown: Unit) -> Result<(f64, Unit), EntryError> {
    let nine_digits = |value: f64| (value * 1e9).round() / 1e9;
    parse(text, kind, shown, None).map(|parsed| {
        (
            nine_digits(parsed.measure.in_unit(parsed.unit)),
            parsed.unit,
        )
    })
}

#[test]
fn spellings_are_folded_and_belong_to_one_unit_or_are_shared_knowingly() {
    // A shared spelling goes to the unit shown beside the field.
    let shared = ["°", "deg", "degrees", "hp"];
    for kind in Kind::ALL {
        let mut seen: Vec<&str> = Vec::new();
        for unit in kind.units() {
            for spelling in unit.spellings() {
                assert_eq!(*spelling, fold(spelling), "{unit:?}");
                assert!(
                    !seen.contains(spelling) || shared.contains(spelling),
                    "{spelling} twice in {kind}"
                );
                seen.push(spelling);
            }
        }
    }
}

#[test]
fn every_symbol_is_read_back_as_its_unit() {
    for unit in Unit::ALL {
        let other = unit.kind().base_unit();
        let text = format!("12 {}", unit.symbol());
        let parsed = parse(&text, unit.kind(), other, None).map(|parsed| parsed.unit);
        assert_eq!(parsed, Ok(*unit), "{text}");
    }
}

#[test]
fn codes_are_unique_ascii_and_the_serde_form() {
    for (index, unit) in Unit::ALL.iter().enumerate() {
        assert!(unit.code().is_ascii());
        assert_eq!(Unit::from_code(unit.code()), Some(*unit));
        assert!(
            Unit::ALL
                .iter()
                .skip(index + 1)
                .all(|other| other.code() != unit.code())
        );
        assert_eq!(
            serde_json::to_string(unit).ok(),
            Some(format!("\"{}\"", unit.code()))
        );
    }
    for kind in Kind::ALL {
        assert_eq!(kind.base_unit().kind(), kind);
        assert_eq!(kind.units().next(), Some(kind.base_unit()));
        assert_eq!(measure(3.25, kind.base_unit()).base(), 3.25);
        let name = serde_json::to_string(&kind).ok();
        assert_eq!(name, Some(format!("\"{}\"", kind.name().replace(' ', "_"))));
    }
}

#[test]
fn what_a_mechanic_types() {
    assert_eq!(
        typed("350 psi", Kind::Pressure, Unit::Bar),
        Ok((350.0, Unit::Psi))
    );
    assert_eq!(
        typed("24,5", Kind::Pressure, Unit::Bar),
        Ok((24.5, Unit::Bar))
    );
    assert_eq!(
        typed(" 24.5 Bar. ", Kind::Pressure, Unit::Psi),
        Ok((24.5, Unit::Bar))
    );
    assert_eq!(
        typed(
            "2\u{2009}400 RPM",
            Kind::RotationalSpeed,
            Unit::RevolutionPerMinute
        ),
        Ok((2400.0, Unit::RevolutionPerMinute))
    );
    assert_eq!(
        typed(
            "2 400 1/min",
            Kind::RotationalSpeed,
            Unit::RevolutionPerMinute
        ),
        Ok((2400.0, Unit::RevolutionPerMinute))
    );
    assert_eq!(
        typed("75cc", Kind::Displacement, Unit::CubicInchPerRevolution),
        Ok((75.0, Unit::CubicCentimetrePerRevolution))
    );
    assert_eq!(
        typed("-12 °F", Kind::Temperature, Unit::DegreeCelsius),
        Ok((-12.0, Unit::DegreeFahrenheit))
    );
    assert_eq!(
        typed("90°", Kind::Temperature, Unit::DegreeFahrenheit),
        Ok((90.0, Unit::DegreeFahrenheit))
    );
    assert_eq!(
        typed("1 1/2 turns", Kind::Angle, Unit::Turn),
        Ok((1.5, Unit::Turn))
    );
    assert_eq!(
        typed("25.6:1", Kind::Ratio, Unit::Percent),
        Ok((25.6, Unit::Fraction))
    );
    assert_eq!(
        typed("50 HP", Kind::Power, Unit::MetricHorsepower),
        Ok((50.0, Unit::MetricHorsepower))
    );
    assert_eq!(
        typed("50 hp", Kind::Power, Unit::Kilowatt),
        Ok((50.0, Unit::Horsepower))
    );
    assert_eq!(
        typed("6'", Kind::Length, Unit::Metre),
        Ok((6.0, Unit::Foot))
    );
    let watch = parse("1:12,5", Kind::Time, Unit::Second, None).map(|parsed| parsed.measure.base());
    assert_eq!(watch, Ok(72.5));
}

#[test]
fn megapascal_in_any_case_is_taken_and_said() {
    for text in ["35 mPa", "35 mpa"] {
        let parsed = parse(text, Kind::Pressure, Unit::Bar, None);
        assert_eq!(
            parsed.map(|parsed| (parsed.measure.base(), parsed.note)),
            Ok((350.0, Some(EntryNote::Megapascal)))
        );
    }
    let parsed = parse("35 MPa", Kind::Pressure, Unit::Bar, None);
    assert_eq!(parsed.map(|parsed| parsed.note), Ok(None));
}

#[test]
fn a_vacuum_gauge_takes_either_sign() {
    let pull =
        |text| parse(text, Kind::Pressure, Unit::Bar, None).map(|parsed| parsed.measure.base());
    let plain = pull("10 inHg").expect("a vacuum");
    assert!((plain + 0.338_638_864).abs() < 1e-9);
    assert_eq!(pull("−10 inHg"), Ok(plain));
    assert!(
        format_with_unit(
            measure(0.3, Unit::Bar),
            Unit::InchOfMercuryVacuum,
            Decimals::Reading,
            DecimalMark::Point
        )
        .ends_with("psi")
    );
}

#[test]
fn thousands_or_decimals_by_range() {
    let speed = |text, high| {
        let range =
            measure(0.0, Unit::RevolutionPerMinute)..=measure(high, Unit::RevolutionPerMinute);
        parse(
            text,
            Kind::RotationalSpeed,
            Unit::RevolutionPerMinute,
            Some(range),
        )
    };
    let refused = speed("2,400", 3000.0).expect_err("both readings lie in range");
    assert_eq!(
        refused.to_string(),
        "“2,400” can mean 2.4 rpm or 2400 rpm. Type 2.4 or 2400."
    );
    assert!(refused.message(DecimalMark::Comma).contains("2,4 rpm"));
    let decimal = speed("2,400", 100.0).expect("only 2.4 lies in range");
    assert_eq!(
        (decimal.measure.base(), decimal.note),
        (2.4, Some(EntryNote::Decimal { value: 2.4 }))
    );
    let range =
        measure(500.0, Unit::RevolutionPerMinute)..=measure(3000.0, Unit::RevolutionPerMinute);
    let grouped = parse(
        "2.400",
        Kind::RotationalSpeed,
        Unit::RevolutionPerMinute,
        Some(range),
    )
    .expect("only 2400 lies in range");
    assert_eq!(
        (grouped.measure.base(), grouped.note),
        (2400.0, Some(EntryNote::Thousands { value: 2400.0 }))
    );
    assert!(matches!(
        parse("2.400", Kind::Flow, Unit::LitrePerMinute, None),
        Err(EntryError::AmbiguousSeparator { .. })
    ));
}

#[test]
fn every_refusal_says_what_to_do() {
    let range = || Some(measure(0.0, Unit::Bar)..=measure(60.0, Unit::Bar));
    for text in [
        "",
        "much",
        "1.2.3,4",
        "20 30",
        "20 furlongs",
        "20 rpm",
        "20 bara",
        "400",
        &"9".repeat(40),
        &"9".repeat(400),
    ] {
        let why = parse(text, Kind::Pressure, Unit::Bar, range()).expect_err(text);
        let words = why.to_string();
        let says = ["Type ", " type ", "Use ", "Look ", "at most"]
            .iter()
            .any(|verb| words.contains(verb));
        assert!(says, "{text:?}: {words}");
    }
    // A separator that can be read either way needs a field without limits.
    let why = parse("2,400", Kind::Pressure, Unit::Bar, None).expect_err("either way");
    assert!(why.to_string().contains("Type "), "{why}");
}

#[test]
fn refusals_say_what_is_wrong_and_what_is_accepted() {
    let range = measure(0.0, Unit::Bar)..=measure(60.0, Unit::Bar);
    let charge = |text: &str| {
        parse(text, Kind::Pressure, Unit::Bar, Some(range.clone()))
            .map(|_| ())
            .map_err(|e| e.to_string())
    };
    assert_eq!(
        charge("400"),
        Err("400 bar is outside what is accepted here: 0 to 60 bar. Look at the figure and its unit again.".into())
    );
    assert_eq!(
        charge("900 psi"),
        Err("900 psi is outside what is accepted here: 0 to 870.2 psi. Look at the figure and its unit again.".into())
    );
    // What is told is accepted, also where it was rounded.
    assert_eq!(charge("870.2 psi"), Ok(()));
    let rated = measure(50.0, Unit::Psi)..=measure(700.0, Unit::Psi);
    let told = parse("1", Kind::Pressure, Unit::Bar, Some(rated.clone()));
    let told = told.expect_err("too low").to_string();
    assert!(told.contains("3.4480 to 48.26 bar"), "{told}");
    for limit in ["3.4480", "48.26"] {
        assert!(parse(limit, Kind::Pressure, Unit::Bar, Some(rated.clone())).is_ok());
    }
    assert_eq!(charge("20 rpm"), Err("rpm measures rotational speed; this field asks for pressure. Type it in bar, psi, kPa or MPa.".into()));
    assert_eq!(
        charge("20 furlongs"),
        Err("“furlongs” is not a unit known here. For pressure type bar, psi, kPa or MPa.".into())
    );
    assert_eq!(
        charge("22-25 bar"),
        Err("“22-25 bar” reads as two figures. Type one.".into())
    );
    assert_eq!(
        charge("1.2.3"),
        Err("“1.2.3” cannot be read as one number. Use one decimal point or comma.".into())
    );
    assert_eq!(
        charge("nothing"),
        Err("“nothing” does not start with a figure. Type a number in bar.".into())
    );
    assert_eq!(charge("  "), Err("Type a pressure in bar.".into()));
    assert!(charge("1.8 bara").is_err_and(|text| text.contains("absolute")));
    assert!(charge("26 psia").is_err_and(|text| text.contains("absolute")));
    assert!(charge(&"9".repeat(40)).is_err_and(|text| text.contains("larger than anything")));
    assert!(charge(&"9".repeat(90)).is_err_and(|text| text.contains("64 characters")));
    assert!(matches!(
        parse("5", Kind::Flow, Unit::Bar, None),
        Err(EntryError::FieldOfOtherKind { .. })
    ));
}

#[test]
fn the_shown_limit_can_be_typed() {
    let high = measure(60.0, Unit::Bar);
    let range = measure(0.0, Unit::Bar)..=high;
    let shown = edit_text(high, Unit::Psi, DecimalMark::Point);
    let parsed =
        parse(&shown, Kind::Pressure, Unit::Psi, Some(range)).map(|parsed| parsed.measure <= high);
    assert_eq!(parsed, Ok(true));
}

#[test]
fn printed_figures() {
    let print = |value, unit| {
        format_with_unit(
            measure(value, unit),
            unit,
            Decimals::Reading,
            DecimalMark::Point,
        )
        .replace('\u{202F}', " ")
    };
    assert_eq!(print(24.56, Unit::Bar), "24.6 bar");
    assert_eq!(print(345.4, Unit::Bar), "345 bar");
    assert_eq!(print(99.96, Unit::Bar), "100 bar");
    assert_eq!(print(0.347, Unit::Bar), "0.35 bar");
    assert_eq!(print(-0.001, Unit::Bar), "0.00 bar");
    assert_eq!(print(-0.25, Unit::Bar), "\u{2212}0.25 bar");
    assert_eq!(print(2437.0, Unit::RevolutionPerMinute), "2437 rpm");
    assert_eq!(print(21_565.0, Unit::RevolutionPerMinute), "21 565 rpm");
    assert_eq!(print(0.0123, Unit::Fraction), "0.0123");
    assert_eq!(print(92.4, Unit::Percent), "92.4 %");
    assert_eq!(print(12.5, Unit::Degree), "12.5°");
    let prefs = UnitPrefs::us();
    assert_eq!(
        prefs
            .print(measure(20.0, Unit::Bar))
            .replace('\u{202F}', " "),
        "290 psi"
    );
    let span = format_span(
        measure(345.2, Unit::Bar),
        measure(352.9, Unit::Bar),
        Unit::Bar,
        DecimalMark::Comma,
    );
    assert_eq!(span.replace('\u{202F}', " "), "345,2 to 352,9 bar");
    assert_eq!(
        edit_text(measure(1.405, Unit::Bar), Unit::Bar, DecimalMark::Point),
        "1.4050"
    );
    assert_eq!(
        edit_text(measure(350.0, Unit::Psi), Unit::Psi, DecimalMark::Point),
        "350"
    );
}

#[test]
fn measures_are_finite_and_compare_within_their_kind() {
    assert!(Measure::new(f64::NAN, Unit::Bar).is_err());
    assert!(Measure::new(f64::INFINITY, Unit::Bar).is_err());
    assert!(Measure::new(1e300, Unit::Bar).is_err());
    assert!(
        measure(1.0, Unit::Bar)
            .partial_cmp(&measure(1.0, Unit::Second))
            .is_none()
    );
    assert!(measure(15.0, Unit::Psi) > measure(1.0, Unit::Bar));
    assert!(measure(1.0, Unit::Bar).try_in_unit(Unit::Second).is_err());
    let zero = measure(-0.0, Unit::Bar).base();
    assert!(zero.is_sign_positive());
}

#[test]
fn stored_forms() {
    let pressure = measure(350.0, Unit::Psi);
    let text = serde_json::to_string(&pressure).expect("a measure writes");
    assert!(
        text.starts_with("{\"value\":24.13") && text.ends_with("\"unit\":\"bar\"}"),
        "{text}"
    );
    assert_eq!(serde_json::from_str::<Measure>(&text).ok(), Some(pressure));
    let in_psi: Measure =
        serde_json::from_str(r#"{"value":350,"unit":"psi"}"#).expect("any unit reads");
    assert_eq!(in_psi, pressure);
    assert!(serde_json::from_str::<Measure>(r#"{"value":1e300,"unit":"psi"}"#).is_err());
    assert!(serde_json::from_str::<Measure>(r#"{"value":1,"unit":"cubit"}"#).is_err());

    let mut prefs = UnitPrefs::us();
    prefs.choose_mark(DecimalMark::Comma);
    let text = serde_json::to_string(&prefs).expect("preferences write");
    assert_eq!(serde_json::from_str::<UnitPrefs>(&text).ok(), Some(prefs));
    let strange = r#"{"units":{"pressure":"rpm","flow":"gpm_US","colour":"red"},"later":true}"#;
    let prefs: UnitPrefs = serde_json::from_str(strange).expect("unknown settings are passed over");
    assert_eq!(
        (prefs.unit(Kind::Pressure), prefs.unit(Kind::Flow)),
        (Unit::Bar, Unit::UsGallonPerMinute)
    );
}

#[test]
fn typed_quantities_go_over_and_come_back() {
    let flow = measure(20.0, Unit::UsGallonPerMinute);
    let back = flow
        .volume_rate()
        .and_then(|q| Measure::from_volume_rate(q).ok())
        .expect("a flow");
    assert!((back.base() - flow.base()).abs() < 1e-12);
    assert!(flow.gauge_pressure().is_none());
    let inlet = GaugePressure::from_bar(-0.3);
    let air = uom::si::f64::Pressure::new::<uom::si::pressure::pascal>(101_325.0);
    assert!((inlet.absolute(air).get::<uom::si::pressure::pascal>() - 71_325.0).abs() < 1e-6);
    let displacement = DisplacementPerRevolution::from_cm3(75.0);
    let speed = measure(2400.0, Unit::RevolutionPerMinute)
        .angular_velocity()
        .expect("a speed");
    let theory = Measure::from_volume_rate(displacement.flow_at(speed)).expect("a flow");
    assert!((theory.base() - 180.0).abs() < 1e-9);
}

proptest! {
    #[test]
    fn edited_text_reads_back(index in 0..Unit::ALL.len(), mantissa in -9.999_f64..9.999, exponent in -3_i32..9, comma: bool) {
        let unit = Unit::ALL[index];
        let mark = if comma { DecimalMark::Comma } else { DecimalMark::Point };
        let value = mantissa * 10_f64.powi(exponent);
        let value = if unit.reads_vacuum() { value.abs() } else { value };
        let original = measure(value, unit);
        let text = edit_text(original, unit, mark);
        let read = parse(&text, unit.kind(), unit, None);
        let read = read.map_err(|error| TestCaseError::fail(format!("{text}: {error}")))?;
        prop_assert!((read.measure.in_unit(unit) - value).abs() <= 1e-8 * value.abs() + 1e-12, "{text}");
    }

    #[test]
    fn printed_reading_reads_back(index in 0..Unit::ALL.len(), value in -99_999.0_f64..99_999.0, comma: bool) {
        let unit = Unit::ALL[index];
        let mark = if comma { DecimalMark::Comma } else { DecimalMark::Point };
        let value = if unit.reads_vacuum() { value.abs() } else { value };
        let text = format_with_unit(measure(value, unit), unit, Decimals::Reading, mark);
        let read = parse(&text, unit.kind(), unit.kind().base_unit(), None);
        let read = read.map_err(|error| TestCaseError::fail(format!("{text}: {error}")))?;
        prop_assert_eq!(read.unit, unit);
        let decimals = text.split_once(if comma { ',' } else { '.' });
        let places = decimals.map_or(0, |(_, rest)| rest.chars().take_while(char::is_ascii_digit).count());
        let last_place = 0.500_001 * 0.1_f64.powi(i32::try_from(places).unwrap_or(0));
        prop_assert!((read.measure.in_unit(unit) - value).abs() <= last_place, "{}", text);
    }

    #[test]
    fn no_text_stops_the_program(text in any::<String>(), kind in 0..Kind::ALL.len()) {
        let kind = Kind::ALL[kind];
        let unit = kind.base_unit();
        if let Err(error) = parse(&text, kind, unit, None) {
            prop_assert!(!error.to_string().is_empty());
            prop_assert!(!error.message(DecimalMark::Comma).contains("NaN"));
        }
    }

    #[test]
    fn no_near_number_stops_the_program(text in "[-+−]?[0-9.,' \u{202f}/:½]{0,12} ?[a-zA-Z°%/²³·\"]{0,7}", kind in 0..Kind::ALL.len()) {
        let kind = Kind::ALL[kind];
        let range = measure(0.0, kind.base_unit())..=measure(100.0, kind.base_unit());
        match parse(&text, kind, kind.base_unit(), Some(range.clone())) {
            Ok(parsed) => prop_assert!(range.contains(&parsed.measure)),
            Err(error) => prop_assert!(!error.to_string().contains("NaN")),
        }
    }

    #[test]
    fn nothing_printed_is_nan_or_minus_zero(value in any::<f64>(), index in 0..Unit::ALL.len(), places in 0_u8..20) {
        let unit = Unit::ALL[index];
        if let Ok(measure) = Measure::new(value, unit) {
            for decimals in [Decimals::Reading, Decimals::Edit, Decimals::Fixed(places)] {
                let text = format(measure, unit, decimals, DecimalMark::Point);
                prop_assert!(!text.contains("NaN") && !text.contains("inf") && !text.contains('-'), "{}", text);
                prop_assert!(!text.starts_with(MINUS) || text.chars().any(|c| ('1'..='9').contains(&c)), "{}", text);
            }
        }
    }

    #[test]
    fn conversions_return(value in -1e6_f64..1e6, index in 0..Unit::ALL.len()) {
        let unit = Unit::ALL[index];
        let back = measure(value, unit).in_unit(unit);
        prop_assert!((back - value).abs() <= 1e-12 * value.abs() + 1e-12 * 300.0);
    }
}
