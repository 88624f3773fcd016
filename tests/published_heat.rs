//! Heat against printed worked examples and an oil's property table.
#![cfg(not(target_arch = "wasm32"))]

mod published_common;

use lowside::bench::efficiency::hydraulic_power;
use lowside::fluid::{Oil, OilProperties, ViscosityCurve};
use lowside::heat::{
    TANK_TO_AIR, loss_of_output, oil_heat_capacity, oil_specific_heat, stream_power, tank_area,
    tank_cooling, tank_rise, throttling_rise,
};
use lowside::quantity::typed::{MassDensity, Power, TemperatureInterval};
use lowside::quantity::{Unit, typed::VolumeRate};
use published_common::{book, close, convert, measure, within};
use uom::si;
use uom::si::f64::{Area, HeatTransfer, SpecificHeatCapacity};

/// Btu/lb°F in J/kgK (International Table).
const BTU_LB_F: f64 = 4186.8;
/// Btu/h in W (International Table).
const BTU_H: f64 = 1_055.055_852_62 / 3600.0;

fn heat(btu_per_pound_fahrenheit: f64) -> SpecificHeatCapacity {
    SpecificHeatCapacity::new::<si::specific_heat_capacity::joule_per_kilogram_kelvin>(
        btu_per_pound_fahrenheit * BTU_LB_F,
    )
}

fn density(value: f64, unit: Unit) -> MassDensity {
    measure(value, unit).density().expect("a density")
}

fn fahrenheit(value: f64) -> TemperatureInterval {
    measure(value, Unit::FahrenheitDifference)
        .temperature_interval()
        .expect("a difference")
}

fn in_fahrenheit(value: TemperatureInterval) -> f64 {
    value.value * 1.8
}

fn square_feet(value: f64) -> Area {
    Area::new::<si::area::square_foot>(value)
}

fn transfer(value: f64) -> HeatTransfer {
    HeatTransfer::new::<si::heat_transfer::watt_per_square_meter_kelvin>(value)
}

fn btu_per_hour(power: Power) -> f64 {
    power.value / BTU_H
}

/// G1: Esposito Ex 11-2. G3: Sullivan Ex 12.2 (water of 62.4 lb/ft³).
#[test]
fn oil_warms_over_a_relief() {
    let rise = throttling_rise(
        book::psi(1000.0),
        density(7.42, Unit::PoundPerUsGallon),
        heat(0.42),
    );
    close("G1", in_fahrenheit(rise), 7.94, 0.001);
    close("G1 outlet", 120.0 + in_fahrenheit(rise), 127.9, 0.001);
    let rise = throttling_rise(
        book::psi(1000.0),
        density(0.85 * 62.4, Unit::PoundPerCubicFoot),
        heat(0.42),
    );
    close("G3", in_fahrenheit(rise), 8.31, 0.001);
}

/// G4: 5.8 to 6.1 K per 100 bar (derived); the trade says 5.7 to 6 (from memory).
#[test]
fn kelvin_per_hundred_bar() {
    let oil = Oil::default().properties().expect("the usual oil");
    for celsius in [40.0, 50.0, 60.0, 70.0] {
        let rho = density(oil.density_at(celsius), Unit::KilogramPerCubicMetre);
        let rise = throttling_rise(book::bar(100.0), rho, oil_heat_capacity(celsius)).value;
        assert!(
            (5.8 * 0.97..=6.1 * 1.03).contains(&rise),
            "G4: {rise} K at {celsius} °C"
        );
    }
}

/// G5: Esposito Ex 11-4: pump loss, half the flow over the relief, a tenth lost in the lines.
#[test]
fn heat_load_of_a_system() {
    let full = hydraulic_power(book::psi(1000.0), book::gpm(20.0));
    let pump = loss_of_output(full, 0.85);
    let load = pump + 0.5 * full + 0.10 * 0.5 * full;
    close("G5", book::in_hp(load), 8.477, 0.001);
    close("G5 Btu/h", btu_per_hour(load), 21_565.0, 0.001);
}

/// G7: Sullivan Ex 12.1.
#[test]
fn heat_of_a_shift() {
    let lost = book::hp(8.0) - book::hp(5.0);
    close("G7", btu_per_hour(lost) * 4.0, 30_528.0, 0.001);
}

/// G8 to G10: Sullivan Ex 14.5 to 14.7. G11: another rule from a trade formula sheet, 27 % lower.
#[test]
fn tanks() {
    let (slow, fast) = (transfer(TANK_TO_AIR.0), transfer(TANK_TO_AIR.1));
    let load = 0.25 * hydraulic_power(book::psi(1500.0), book::gpm(10.0));
    close("G8 load", book::in_hp(load), 2.188, 0.001);
    close(
        "G8",
        tank_area(load, fast, fahrenheit(75.0)).get::<si::area::square_foot>(),
        29.17,
        0.001,
    );
    let rise = tank_rise(book::hp(1.25), fast, square_feet(15.0));
    close("G9", 75.0 + in_fahrenheit(rise), 158.3, 0.001);
    close(
        "G10",
        btu_per_hour(tank_cooling(fast, square_feet(100.0), fahrenheit(40.0))),
        10_180.0,
        0.001,
    );
    close(
        "G11",
        btu_per_hour(tank_cooling(slow, square_feet(100.0), fahrenheit(40.0))),
        2.0 * 40.0 * 100.0,
        0.001,
    );
    close(
        "G8 and G11 differ",
        TANK_TO_AIR.1 / TANK_TO_AIR.0,
        1.27,
        0.005,
    );
}

/// G12: trade formula sheet: Btu/h = 210 gpm °F, which is 1.756 MJ/m³K.
#[test]
fn oil_carries_heat() {
    let rho = MassDensity::new::<si::mass_density::kilogram_per_cubic_meter>(1000.0);
    let c =
        SpecificHeatCapacity::new::<si::specific_heat_capacity::joule_per_kilogram_kelvin>(1756.0);
    let flow: VolumeRate = book::gpm(10.0);
    close(
        "G12",
        btu_per_hour(stream_power(fahrenheit(15.0), flow, rho, c)),
        210.0 * 10.0 * 15.0,
        0.001,
    );
}

/// G13: Cengel oil table; an orifice maker's fluid table for the oils to military specification. G14: Cengel oil table.
#[test]
fn oil_properties() {
    for (celsius, joules) in [(40.0, 1964.0), (80.0, 2132.0), (100.0, 2220.0)] {
        close("G13", oil_specific_heat(celsius), joules, 0.02);
    }
    let at_100_f =
        oil_specific_heat(convert(100.0, Unit::DegreeFahrenheit, Unit::DegreeCelsius)) / BTU_LB_F;
    assert!(
        (0.47 * 0.98..=0.50 * 1.02).contains(&at_100_f),
        "G13: {at_100_f} Btu/lb°F"
    );
    // The table's oil has 891 kg/m³ at 15 °C by its own slope.
    let curve = ViscosityCurve::new(248.5, 20.45).expect("the table's oil");
    let oil = OilProperties::new(curve, 891.0).expect("a usual density");
    for (celsius, kilograms) in [(40.0, 876.0), (80.0, 852.0), (100.0, 840.0)] {
        close("G14", oil.density_at(celsius), kilograms, 0.01);
    }
    within(
        "Cengel dynamic viscosity at 40 °C",
        oil.dynamic_at(40.0),
        217.7,
        1.0,
    );
}

/// G15: Esposito Ex 5-5.
#[test]
fn saving_of_a_compensated_pump() {
    let wasted = hydraulic_power(book::psi(1200.0), book::gpm(20.0) - book::gpm(0.7));
    close("G15", book::in_hp(wasted), 13.5, 0.002);
}
