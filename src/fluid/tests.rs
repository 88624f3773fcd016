//! Properties of the oil that no single figure shows. Published figures: `tests/published_viscosity.rs`.

use super::*;
use crate::quantity::{Measure, Unit};
use proptest::prelude::*;

fn vg46() -> ViscosityCurve {
    ViscosityCurve::new(46.0, 6.8).expect("an oil")
}

#[test]
fn impossible_oils_are_named() {
    assert!(matches!(
        ViscosityCurve::new(6.8, 46.0),
        Err(FluidError::NotFalling { .. })
    ));
    assert!(matches!(
        ViscosityCurve::new(f64::NAN, 6.8),
        Err(FluidError::Viscosity { .. })
    ));
    assert!(matches!(
        ViscosityCurve::new(46.0, f64::INFINITY),
        Err(FluidError::Viscosity { .. })
    ));
    let text = ViscosityCurve::new(46_000.0, 6.8).map_err(|error| error.to_string());
    assert_eq!(
        text,
        Err(
            "kinematic viscosity at 40 °C is 46000 mm²/s; an oil has 1 to 4000 mm²/s there"
                .to_owned()
        )
    );
    let heavy = Oil {
        density_15: Measure::new(3.0, Unit::KilogramPerLitre).ok(),
        ..Oil::default()
    };
    assert!(matches!(
        heavy.properties(),
        Err(FluidError::Density { .. })
    ));
    let mixed_up = Oil {
        density_15: Measure::new(30.0, Unit::Bar).ok(),
        ..Oil::default()
    };
    assert!(matches!(
        mixed_up.properties(),
        Err(FluidError::OtherKind { .. })
    ));
}

#[test]
fn oil_keeps_its_stored_form() {
    let text = r#"{"viscosity":{"by":"grade","grade":46}}"#;
    let oil: Oil = serde_json::from_str(text).expect("an oil with the usual index");
    assert_eq!(oil, Oil::default());
    let written = serde_json::to_string(&oil).expect("an oil writes");
    assert_eq!(
        written,
        r#"{"viscosity":{"by":"grade","grade":46,"index":100.0},"density_15":null}"#
    );
    let wrong = serde_json::from_str::<Oil>(r#"{"viscosity":{"by":"grade","grade":47}}"#);
    assert!(wrong.is_err_and(|error| error.to_string().contains("no ISO VG grade")));
}

#[test]
fn grade_and_index_give_the_two_points() {
    let properties = Oil::default().properties().expect("the usual oil");
    assert!((properties.kinematic_at(40.0) - 46.0).abs() < 1e-9);
    let kv100 = properties.kinematic_at(100.0);
    let index = viscosity_index::viscosity_index(46.0, kv100).expect("an oil");
    assert!((index - 100.0).abs() < 1e-6);
    for usual in USUAL_OILS {
        let kv100 = viscosity_index::kv100_from_index(usual.kv40, usual.index).expect(usual.name);
        assert!(
            ViscosityCurve::new(usual.kv40, kv100).is_ok(),
            "{}",
            usual.name
        );
    }
}

#[test]
fn verdicts_on_cold_oil_are_withheld_with_the_temperature_to_reach() {
    let curve = vg46();
    let cold = remarks(&curve, 5.0);
    assert!(cold.extrapolated_cold && !cold.leakage_can_be_judged);
    let text = cold.why_withheld(&curve).expect("cold oil");
    assert!(
        text.contains("(extrapolated)") && text.contains("40 °C or more"),
        "{text}"
    );
    assert_eq!(remarks(&curve, 60.0).why_withheld(&curve), None);
    // VG 100 is still too thick at 45 °C.
    let thick = ViscosityCurve::new(100.0, 11.2).expect("an oil");
    let at_45 = remarks(&thick, 45.0);
    assert!(!at_45.leakage_can_be_judged && at_45.band == Band::Thick);
}

#[test]
fn bands_take_their_edges() {
    for (nu, band) in [
        (11.9, Band::TooThin),
        (12.0, Band::Thin),
        (28.0, Band::Ideal),
        (60.0, Band::Ideal),
        (500.0, Band::Thick),
        (501.0, Band::TooThick),
    ] {
        assert_eq!(Band::of(nu), band, "{nu}");
    }
}

#[test]
fn grades_cover_the_viscosities_between_their_limits() {
    assert_eq!(IsoGrade::of_viscosity(43.0).map(IsoGrade::number), Some(46));
    assert_eq!(IsoGrade::of_viscosity(38.0), None);
    assert!(IsoGrade::new(47).is_err());
}

#[test]
fn typed_properties_are_the_plain_ones() {
    use crate::quantity::typed::ThermodynamicTemperature;
    let properties = Oil::default().properties().expect("the usual oil");
    let at =
        ThermodynamicTemperature::new::<uom::si::thermodynamic_temperature::degree_celsius>(50.0);
    let kinematic = properties
        .kinematic(at)
        .get::<uom::si::kinematic_viscosity::centistokes>();
    assert!((kinematic - properties.kinematic_at(50.0)).abs() < 1e-9);
    let dynamic = properties
        .dynamic(at)
        .get::<uom::si::dynamic_viscosity::centipoise>();
    assert!((dynamic - properties.dynamic_at(50.0)).abs() < 1e-9);
    let density = properties
        .density(at)
        .get::<uom::si::mass_density::kilogram_per_cubic_meter>();
    assert!((density - properties.density_at(50.0)).abs() < 1e-9);
}

proptest! {
    #[test]
    fn viscosity_falls_with_heat_and_is_always_a_number(kv40 in 8.0_f64..700.0, share in 0.06_f64..0.4, at in -80.0_f64..220.0, step in 0.01_f64..20.0) {
        let curve = ViscosityCurve::new(kv40, (kv40 * share).clamp(1.5, kv40 - 1.0)).expect("an oil");
        let (cold, hot) = (curve.kinematic_at(at), curve.kinematic_at(at + step));
        prop_assert!(cold.is_finite() && hot.is_finite() && hot > 0.0 && cold >= hot);
    }

    #[test]
    fn slope_is_the_derivative(kv40 in 20.0_f64..300.0, at in -20.0_f64..90.0) {
        let curve = ViscosityCurve::new(kv40, 0.15 * kv40 + 2.0).expect("an oil");
        let (value, slope) = curve.kinematic_and_slope_at(at);
        let difference = (curve.kinematic_at(at + 1e-4) - curve.kinematic_at(at - 1e-4)) / 2e-4;
        prop_assert!((slope - difference).abs() < 2e-3 * difference.abs() + 1e-6 * value, "{slope} {difference}");
    }

    #[test]
    fn temperature_of_a_viscosity_returns(kv40 in 20.0_f64..300.0, at in -40.0_f64..140.0) {
        let curve = ViscosityCurve::new(kv40, 0.15 * kv40 + 2.0).expect("an oil");
        let back = curve.temperature_at(curve.kinematic_at(at));
        // Under 2 mm²/s the standard's inverse is a polynomial, good to a part in a thousand.
        prop_assert!((back - at).abs() < 0.2, "{back}");
    }
}
