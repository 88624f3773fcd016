//! What instruments can and cannot tell. Published figures: `tests/published_instruments.rs`.

use super::timed::{JUG_MARK_SHARE, TimedError, counted_turns, jug_flow, timed_ground_speed};
use super::*;
use crate::quantity::Unit;

fn bar(value: f64) -> Measure {
    Measure::literal(value, Unit::Bar)
}

fn gauge(top: f64) -> Instrument {
    Instrument {
        id: "g".into(),
        name: format!("Gauge 0 to {top} bar"),
        what: InstrumentKind::PressureGauge,
        span_low: bar(0.0),
        span_high: bar(top),
        accuracy: Accuracy::En837 {
            class: En837Class::C1_6,
        },
        indication: Indication::Needle,
        resolution: None,
    }
}

#[test]
fn one_gauge_left_on_the_port_tells_a_small_difference() {
    // Two separate gauges: 0.52 bar; one gauge, unmoved: 0.16 bar (class 1.6, 0 to 40 bar, fifty divisions).
    let gauge = gauge(40.0);
    let two = core::f64::consts::SQRT_2 * gauge.bias_standard_uncertainty(bar(20.0));
    let one = core::f64::consts::SQRT_2 * gauge.reading_standard_uncertainty();
    assert!((two - 0.5226).abs() < 1e-3, "{two}");
    assert!((one - 0.1633).abs() < 1e-3, "{one}");
    assert_eq!(gauge.can_answer(bar(0.7)), Ok(()));
}

#[test]
fn a_loop_gauge_is_refused_by_name_for_a_charge_difference() {
    let refused = gauge(600.0)
        .can_answer(bar(1.0))
        .expect_err("too coarse")
        .replace('\u{202F}', " ");
    assert!(
        refused.starts_with(
            "Gauge 0 to 600 bar cannot answer this: it is good to ±9.60 bar (class 1.6)"
        ),
        "{refused}"
    );
    assert!(refused.contains("1.00 bar is looked for"), "{refused}");
    assert!(
        refused.contains("Use a gauge of 100 bar or less"),
        "{refused}"
    );
    assert_eq!(gauge(100.0).can_answer(bar(1.0)), Ok(()));
    let other = gauge(60.0).can_answer(Measure::literal(1.0, Unit::Second));
    assert!(other.is_err_and(|text| text.contains("measures pressure, not time")));
}

#[test]
fn a_charge_gauge_is_kept_off_the_loop() {
    let refused = gauge(60.0)
        .can_stand(bar(420.0))
        .expect_err("it would burst")
        .replace('\u{202F}', " ");
    assert!(
        refused.contains("ends at 60.0 bar; this port can see 420 bar"),
        "{refused}"
    );
    assert_eq!(gauge(600.0).can_stand(bar(420.0)), Ok(()));
}

#[test]
fn a_window_narrower_than_the_gauge_is_not_judged() {
    assert!(
        gauge(600.0)
            .can_judge(bar(22.0), 3.0)
            .is_err_and(|text| text.contains("the window is only"))
    );
    assert_eq!(gauge(60.0).can_judge(bar(22.0), 3.0), Ok(()));
}

#[test]
fn descriptions_are_checked() {
    assert_eq!(gauge(60.0).check(), Ok(()));
    let upside_down = Instrument {
        span_low: bar(60.0),
        span_high: bar(0.0),
        ..gauge(60.0)
    };
    assert!(matches!(
        upside_down.check(),
        Err(InstrumentError::NoSpan { .. })
    ));
    let other = Instrument {
        span_high: Measure::literal(60.0, Unit::Second),
        ..gauge(60.0)
    };
    assert!(matches!(
        other.check(),
        Err(InstrumentError::OtherKind { .. })
    ));
    let division = Instrument {
        resolution: Some(bar(70.0)),
        ..gauge(60.0)
    };
    assert!(matches!(
        division.check(),
        Err(InstrumentError::Resolution { .. })
    ));
    let accuracy = Instrument {
        accuracy: Accuracy::OfSpan { share: 1.6 },
        ..gauge(60.0)
    };
    assert!(matches!(
        accuracy.check(),
        Err(InstrumentError::Accuracy { .. })
    ));
}

#[test]
fn usual_instruments_are_in_order() {
    let list = usual_instruments();
    for (index, instrument) in list.iter().enumerate() {
        assert_eq!(instrument.check(), Ok(()), "{}", instrument.name);
        assert!(
            list.iter()
                .skip(index + 1)
                .all(|other| other.id != instrument.id)
        );
        assert!(instrument.standard_uncertainty(instrument.span_high) > 0.0);
    }
}

#[test]
fn stored_form() {
    let text = r#"{"id":"g","name":"Gauge","what":"pressure_gauge","span_low":{"value":0,"unit":"bar"},
        "span_high":{"value":870,"unit":"psi"},"accuracy":{"by":"en_837_1","class":"1.6"}}"#;
    let instrument: Instrument = serde_json::from_str(text).expect("an instrument");
    assert_eq!(
        instrument.accuracy,
        Accuracy::En837 {
            class: En837Class::C1_6
        }
    );
    assert_eq!(
        (instrument.indication, instrument.resolution),
        (Indication::Needle, None)
    );
    let written = serde_json::to_string(&instrument).expect("it writes");
    assert_eq!(
        serde_json::from_str::<Instrument>(&written).ok(),
        Some(instrument)
    );
    for accuracy in [
        Accuracy::NotKnown,
        Accuracy::Asme {
            grade: AsmeGrade::A,
        },
        Accuracy::OfReading { share: 0.02 },
    ] {
        let written = serde_json::to_string(&accuracy).expect("it writes");
        assert_eq!(
            serde_json::from_str::<Accuracy>(&written).ok(),
            Some(accuracy),
            "{written}"
        );
    }
}

#[test]
fn jug_and_stopwatch() {
    // 1.5 L in 30 s: 3 L/min; marks 5 %/√3 = 2.887 %, level 1.155 %, hand √2 × 0.2/√3 s = 0.1633 s or 0.544 %.
    let litres = |value| Measure::literal(value, Unit::Litre);
    let seconds = |value| Measure::literal(value, Unit::Second);
    let flow = jug_flow(litres(1.5), seconds(30.0), JUG_MARK_SHARE).expect("a flow");
    assert!((flow.value.base() - 3.0).abs() < 1e-12);
    assert!((flow.bias - 0.086_603).abs() < 1e-6, "{}", flow.bias);
    assert!((flow.reading - 0.038_297).abs() < 1e-5, "{}", flow.reading);
    assert!(flow.combined() > flow.bias);
    assert!(matches!(
        jug_flow(litres(1.5), seconds(0.0), 0.05),
        Err(TimedError::NoTime { .. })
    ));
    assert!(matches!(
        jug_flow(litres(0.0), seconds(9.0), 0.05),
        Err(TimedError::Nothing { what: "volume" })
    ));
    assert!(matches!(
        jug_flow(seconds(1.0), seconds(9.0), 0.05),
        Err(TimedError::OtherKind { .. })
    ));
}

#[test]
fn counted_turns_and_timed_ground() {
    let seconds = |value| Measure::literal(value, Unit::Second);
    let speed = counted_turns(20.0, seconds(60.0)).expect("a speed");
    assert!((speed.value.base() - 20.0).abs() < 1e-12);
    // A quarter turn in twenty: 0.72 %; the hand 0.27 %.
    assert!(
        (speed.reading / 20.0 - 0.007_713).abs() < 1e-5,
        "{}",
        speed.reading
    );
    assert!(counted_turns(f64::NAN, seconds(60.0)).is_err());
    let ground =
        timed_ground_speed(Measure::literal(20.0, Unit::Metre), seconds(9.0)).expect("a speed");
    assert!((ground.value.base() - 8.0).abs() < 1e-12);
    assert!(ground.reading > ground.bias);
}

#[test]
fn accuracies_in_words() {
    assert_eq!(
        Accuracy::OfSpan { share: 0.005 }.to_string(),
        "±0.5 % of span"
    );
    assert_eq!(
        Accuracy::Asme {
            grade: AsmeGrade::G2A
        }
        .to_string(),
        "grade 2A"
    );
    assert_eq!(
        Accuracy::Fixed {
            limit: Measure::literal(2.0, Unit::Kelvin)
        }
        .to_string(),
        "±2 K"
    );
}
