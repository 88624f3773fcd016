//! Gauge classes and uncertainties against EN 837-1, ASME B40.100 and the GUM (JCGM 100).
#![cfg(not(target_arch = "wasm32"))]

mod published_common;

use lowside::quantity::Unit;
use lowside::readings::instrument::gum::{
    coverage_factor_95, digital_step, effective_degrees_of_freedom, expanded, rectangular,
    triangular,
};
use lowside::readings::instrument::{
    Accuracy, AsmeGrade, En837Class, Indication, Instrument, InstrumentKind,
};
use published_common::{EXACT, close, measure, within};

fn gauge(top: f64, unit: Unit, accuracy: Accuracy) -> Instrument {
    Instrument {
        id: "gauge".into(),
        name: "Gauge".into(),
        what: InstrumentKind::PressureGauge,
        span_low: measure(0.0, unit),
        span_high: measure(top, unit),
        accuracy,
        indication: Indication::Needle,
        resolution: None,
    }
}

fn class(class: En837Class) -> Accuracy {
    Accuracy::En837 { class }
}

/// D1: EN 837-1:1996, Table 11.
#[test]
fn classes_of_en_837_1() {
    let classes = En837Class::ALL.map(En837Class::percent_of_span);
    assert_eq!(classes, [0.1, 0.25, 0.6, 1.0, 1.6, 2.5, 4.0], "D1");
}

/// D3, D4: a trade article's examples.
#[test]
fn class_limits_hold_everywhere_on_the_dial() {
    let ten = gauge(10.0, Unit::Bar, class(En837Class::C1_6));
    for reading in [0.0, 1.0, 5.0, 10.0] {
        close(
            "D3",
            ten.limit_of_error(measure(reading, Unit::Bar)),
            0.16,
            EXACT,
        );
    }
    let hundred = gauge(100.0, Unit::Bar, class(En837Class::C1));
    let reading = measure(10.0, Unit::Bar);
    close("D4", hundred.limit_of_error(reading), 1.0, EXACT);
    close(
        "D4 of reading",
        hundred.limit_of_error(reading) / reading.base(),
        0.10,
        EXACT,
    );
}

/// D5, D6: ASME B40.100 (grade A found, the others from memory). D7: a trade page on grade A.
#[test]
fn grades_of_asme_b40_100() {
    let single = [
        (AsmeGrade::G4A, 0.1),
        (AsmeGrade::G3A, 0.25),
        (AsmeGrade::G2A, 0.5),
        (AsmeGrade::G1A, 1.0),
    ];
    for (grade, percent) in single {
        assert_eq!(grade.percent_of_span(), (percent, percent), "D5");
    }
    let split = [
        (AsmeGrade::A, 2.0, 1.0),
        (AsmeGrade::B, 3.0, 2.0),
        (AsmeGrade::C, 4.0, 3.0),
        (AsmeGrade::D, 5.0, 5.0),
    ];
    for (grade, outer, middle) in split {
        for (place, percent) in [(0.1, outer), (0.5, middle), (0.9, outer)] {
            close("D6", grade.percent_at(place), percent, EXACT);
        }
    }
    let hundred = gauge(
        100.0,
        Unit::Psi,
        Accuracy::Asme {
            grade: AsmeGrade::A,
        },
    );
    for (reading, limit) in [
        (5.0, 2.0),
        (25.0, 2.0),
        (50.0, 1.0),
        (74.0, 1.0),
        (90.0, 2.0),
    ] {
        let found =
            hundred.limit_of_error(measure(reading, Unit::Psi)) / measure(1.0, Unit::Psi).base();
        close("D7", found, limit, 1e-9);
    }
}

/// D8: US Army training manual SM0486: 10 of 500 is 2 % of full scale.
#[test]
fn error_as_share_of_full_scale() {
    let instrument = gauge(500.0, Unit::Psi, Accuracy::OfSpan { share: 0.02 });
    let limit =
        instrument.limit_of_error(measure(250.0, Unit::Psi)) / measure(1.0, Unit::Psi).base();
    close("D8", limit, 260.0 - 250.0, 1e-9);
}

/// D9 to D11: GUM 4.4.5, 4.4.6 and F.2.2.1 (numbers from memory).
#[test]
fn standard_uncertainties_of_the_gum() {
    within("D9", rectangular(0.5 * (104.0 - 96.0)), 2.309, 0.005);
    within("D10", triangular(4.0), 1.633, 0.005);
    within("D11", digital_step(1.0), 0.2887, 1e-3);
}

/// D12, D13: derived from D3 and D9. D17: twice the standard uncertainty covers about 95 % (GUM G.6.6).
#[test]
fn gauges_in_the_guise_of_the_gum() {
    let ten = gauge(10.0, Unit::Bar, class(En837Class::C1_6));
    let u = ten.bias_standard_uncertainty(measure(5.0, Unit::Bar));
    within("D12", u, 0.092_38, 1e-4);
    within("D12 expanded", expanded(u, 2.0), 0.1848, 1e-4);
    let forty = gauge(40.0, Unit::Bar, class(En837Class::C1_6));
    let u = std::f64::consts::SQRT_2 * forty.bias_standard_uncertainty(measure(20.0, Unit::Bar));
    within("D13", u, 0.5226, 1e-3);
    within("D13 expanded", expanded(u, 2.0), 1.045, 1e-3);
    within("D17", coverage_factor_95(f64::INFINITY), 2.0, 0.05);
}

/// D15: GUM H.1.6 (inputs in the documentation of an R package; 16.7 from memory).
#[test]
fn welch_satterthwaite() {
    let parts = [(25.0, 18.0), (9.7, 25.6), (2.9, 50.0), (16.6, 2.0)];
    let values = parts.map(|(u, _)| u);
    within(
        "D15 uc",
        lowside::readings::instrument::gum::combined(&values),
        31.67,
        0.01,
    );
    within("D15", effective_degrees_of_freedom(&parts), 16.76, 0.01);
    // The GUM goes on with the combined uncertainty rounded to 32.
    let rounded = effective_degrees_of_freedom(&parts) * (32.0_f64 / 31.670_4).powi(4);
    within("D15 rounded", rounded, 17.47, 0.01);
    assert_eq!(
        effective_degrees_of_freedom(&[(1.0, f64::INFINITY)]),
        f64::INFINITY
    );
}

/// GUM Table G.2 against the t distribution of the `statrs` crate.
#[test]
fn coverage_factors_are_those_of_the_t_distribution() {
    use statrs::distribution::{ContinuousCDF, StudentsT};
    for freedom in [1.0, 2.0, 3.0, 5.0, 10.0, 16.0, 20.0, 30.0, 50.0, 100.0] {
        let t = StudentsT::new(0.0, 1.0, freedom)
            .expect("a distribution")
            .inverse_cdf(0.975);
        within("Table G.2", coverage_factor_95(freedom), t, 0.006);
    }
    // Between the rows the lower row holds, which is the larger factor.
    assert_eq!(coverage_factor_95(16.76), 2.12);
    assert_eq!(coverage_factor_95(0.5), 12.71);
}
