//! Unit factors against NIST SP 811 Appendix B and against the `uom` crate.
#![cfg(not(target_arch = "wasm32"))]

mod published_common;

use lowside::quantity::{Kind, Measure, Unit};
use published_common::{EXACT, close, convert, measure, within};

/// NIST SP 811 prints seven digits; the full figures follow from the definitions (scipy and pint hold the same).
#[test]
fn factors_of_nist_sp_811() {
    // C1: psi.
    close(
        "C1",
        convert(1.0, Unit::Psi, Unit::Bar) * 1e5,
        6_894.757_293_168_361,
        1e-9,
    );
    // C2: US gallon per minute, 6.309 020 E-05 m³/s.
    close(
        "C2",
        convert(1.0, Unit::UsGallonPerMinute, Unit::LitrePerMinute) / 6e4,
        6.309_019_64e-5,
        1e-9,
    );
    // C3: US gallon, 231 in³ by definition.
    close(
        "C3 L",
        convert(1.0, Unit::UsGallon, Unit::Litre),
        3.785_411_784,
        EXACT,
    );
    close(
        "C3 in3",
        convert(1.0, Unit::UsGallon, Unit::CubicInch),
        231.0,
        EXACT,
    );
    // C4: cubic inch.
    close(
        "C4",
        convert(
            1.0,
            Unit::CubicInchPerRevolution,
            Unit::CubicCentimetrePerRevolution,
        ),
        16.387_064,
        EXACT,
    );
    // C5: horsepower of 550 ft·lbf/s; C5b: metric horsepower as printed.
    close(
        "C5",
        convert(1.0, Unit::Horsepower, Unit::Watt),
        745.699_871_582_270_2,
        1e-9,
    );
    within(
        "C5b",
        convert(1.0, Unit::MetricHorsepower, Unit::Watt),
        735.498_8,
        5e-5,
    );
    // C6, C7: pound-force foot and inch.
    close(
        "C6",
        convert(1.0, Unit::PoundForceFoot, Unit::NewtonMetre),
        1.355_817_948_331_4,
        1e-9,
    );
    close(
        "C7",
        convert(1.0, Unit::PoundForceInch, Unit::NewtonMetre),
        0.112_984_829_027_6,
        1e-9,
    );
    // C9: Fahrenheit (also Esposito, Fluid Power with Applications, Ex 2-10).
    within(
        "C9",
        convert(180.0, Unit::DegreeFahrenheit, Unit::DegreeCelsius),
        740.0 / 9.0,
        1e-12,
    );
    within(
        "C9 -40",
        convert(-40.0, Unit::DegreeFahrenheit, Unit::DegreeCelsius),
        -40.0,
        1e-12,
    );
    // C10: mile per hour, from memory; scipy and pint agree.
    close(
        "C10",
        convert(1.0, Unit::MilePerHour, Unit::MetrePerSecond),
        0.447_04,
        EXACT,
    );
    // C11: bar.
    close(
        "C11",
        convert(1.0, Unit::Bar, Unit::Kilopascal) * 1e3,
        1e5,
        EXACT,
    );
    // C12: stokes 1 E-04 m²/s, poise 0.1 Pa·s.
    let viscosity = measure(1.0, Unit::Centistokes)
        .kinematic_viscosity()
        .expect("a viscosity");
    close("C12", viscosity.value, 1e-6, EXACT);
    close(
        "C12 cP",
        lowside::fluid::dynamic_viscosity(1.0, 1000.0),
        1.0,
        EXACT,
    );
}

/// Products of units that the trade's power and torque formulas rest on.
#[test]
fn products_of_units() {
    use lowside::bench::efficiency::{hydraulic_power, theoretical_torque};
    use published_common::book;
    // C13: 1714.2857 psi·gpm are one horsepower (12 × 33 000 / 231).
    let power = hydraulic_power(book::psi(12_000.0 / 7.0), book::gpm(1.0));
    close("C13", book::in_hp(power), 1.0, 1e-9);
    // C14: 12 psi·in³ of work are one lbf·ft: the torque of 2π times that displacement.
    let torque = theoretical_torque(book::in3(std::f64::consts::TAU), book::psi(12.0));
    close(
        "C14",
        book::in_torque(torque, Unit::PoundForceFoot),
        1.0,
        1e-9,
    );
    // C15: 600 bar·L/min are 1 kW.
    close(
        "C15",
        hydraulic_power(book::bar(600.0), book::litres_per_minute(1.0)).value,
        1000.0,
        EXACT,
    );
}

/// C17: 10 inHg of vacuum under 1.013 25 bar. Derived from SP 811's conventional inch of mercury.
#[test]
fn vacuum() {
    let pull = measure(10.0, Unit::InchOfMercuryVacuum);
    within("C17", pull.base(), -0.338_64, 1e-5);
    let air = measure(lowside::fluid::atmosphere::SEA_LEVEL_BAR, Unit::Bar);
    within("C17 absolute", pull.base() + air.base(), 0.674_61, 1e-5);
}

/// Figures that public manuals print in two units: both must be the same figure.
#[test]
fn manuals_that_print_two_units() {
    let pairs = [
        // F2: lubrication trade magazine, Mar-Apr 2016.
        ("F2 low", 200.0, Unit::Psi, 13.8, Unit::Bar, 0.05),
        ("F2 high", 300.0, Unit::Psi, 20.7, Unit::Bar, 0.05),
        // F3: US Army TM 5-3895-346-14, p 489.
        ("F3 neutral", 190.0, Unit::Psi, 13.1, Unit::Bar, 0.05),
        ("F3 drive", 160.0, Unit::Psi, 11.0, Unit::Bar, 0.05),
        ("F3 minimum", 130.0, Unit::Psi, 9.0, Unit::Bar, 0.05),
        ("F3 fall", 190.0 - 160.0, Unit::Psi, 2.07, Unit::Bar, 0.005),
        // F5: US Army TM 5-3895-383-24.
        ("F5 relief", 1800.0, Unit::Kilopascal, 261.0, Unit::Psi, 0.5),
        (
            "F5 flow",
            10.0,
            Unit::LitrePerMinute,
            2.6,
            Unit::UsGallonPerMinute,
            0.05,
        ),
        // The manual rounds 6526.7 to fives.
        (
            "F5 override",
            45_000.0,
            Unit::Kilopascal,
            6525.0,
            Unit::Psi,
            2.5,
        ),
        // F10, F11, F13: US Army TM 5-3895-346-14, p 482 and 489.
        ("F10", 40.0, Unit::Psi, 2.76, Unit::Bar, 0.005),
        (
            "F11",
            10.0,
            Unit::InchOfMercuryVacuum,
            -0.34,
            Unit::Bar,
            0.005,
        ),
        (
            "F13",
            180.0,
            Unit::DegreeFahrenheit,
            82.2,
            Unit::DegreeCelsius,
            0.05,
        ),
    ];
    for (row, value, from, printed, to, rounding) in pairs {
        within(row, convert(value, from, to), printed, rounding);
    }
}

/// The SI value of one of each unit, by `uom` or made of its parts. `uom` rounds some factors to the
/// seven digits of SP 811.
fn by_uom(unit: Unit) -> f64 {
    use uom::si::f64 as q;
    use uom::si::{
        angle, angular_velocity, electric_current, kinematic_viscosity, length, mass, mass_density,
        power, pressure, ratio, temperature_interval, thermodynamic_temperature, time, torque,
        velocity, volume, volume_rate,
    };
    match unit {
        Unit::Bar => q::Pressure::new::<pressure::bar>(1.0).value,
        Unit::Psi => q::Pressure::new::<pressure::psi>(1.0).value,
        Unit::Kilopascal => q::Pressure::new::<pressure::kilopascal>(1.0).value,
        Unit::Megapascal => q::Pressure::new::<pressure::megapascal>(1.0).value,
        Unit::Millibar => q::Pressure::new::<pressure::millibar>(1.0).value,
        Unit::KilogramForcePerSquareCentimetre => {
            q::Pressure::new::<pressure::kilogram_force_per_square_centimeter>(1.0).value
        }
        Unit::InchOfMercuryVacuum => -q::Pressure::new::<pressure::inch_of_mercury>(1.0).value,
        Unit::MillimetreOfMercuryVacuum => {
            -q::Pressure::new::<pressure::millimeter_of_mercury>(1.0).value
        }
        Unit::LitrePerMinute => q::VolumeRate::new::<volume_rate::liter_per_minute>(1.0).value,
        Unit::MillilitrePerMinute => q::Volume::new::<volume::milliliter>(1.0).value / 60.0,
        Unit::LitrePerHour => q::Volume::new::<volume::liter>(1.0).value / 3600.0,
        Unit::LitrePerSecond => q::VolumeRate::new::<volume_rate::liter_per_second>(1.0).value,
        Unit::CubicMetrePerHour => {
            q::VolumeRate::new::<volume_rate::cubic_meter_per_hour>(1.0).value
        }
        Unit::UsGallonPerMinute => q::VolumeRate::new::<volume_rate::gallon_per_minute>(1.0).value,
        Unit::ImperialGallonPerMinute => {
            q::Volume::new::<volume::gallon_imperial>(1.0).value / 60.0
        }
        Unit::RevolutionPerMinute => {
            q::AngularVelocity::new::<angular_velocity::revolution_per_minute>(1.0).value
        }
        Unit::RevolutionPerSecond => {
            q::AngularVelocity::new::<angular_velocity::revolution_per_second>(1.0).value
        }
        Unit::RadianPerSecond => {
            q::AngularVelocity::new::<angular_velocity::radian_per_second>(1.0).value
        }
        Unit::DegreeCelsius => {
            q::ThermodynamicTemperature::new::<thermodynamic_temperature::degree_celsius>(1.0).value
        }
        Unit::DegreeFahrenheit => {
            q::ThermodynamicTemperature::new::<thermodynamic_temperature::degree_fahrenheit>(1.0)
                .value
        }
        Unit::Kelvin => q::TemperatureInterval::new::<temperature_interval::kelvin>(1.0).value,
        Unit::FahrenheitDifference => {
            q::TemperatureInterval::new::<temperature_interval::degree_fahrenheit>(1.0).value
        }
        Unit::CubicCentimetrePerRevolution => q::Volume::new::<volume::cubic_centimeter>(1.0).value,
        Unit::CubicInchPerRevolution | Unit::CubicInch => {
            q::Volume::new::<volume::cubic_inch>(1.0).value
        }
        Unit::SquareMillimetrePerSecond => {
            q::KinematicViscosity::new::<kinematic_viscosity::square_millimeter_per_second>(1.0)
                .value
        }
        Unit::Centistokes => {
            q::KinematicViscosity::new::<kinematic_viscosity::centistokes>(1.0).value
        }
        Unit::NewtonMetre => q::Torque::new::<torque::newton_meter>(1.0).value,
        Unit::PoundForceFoot => q::Torque::new::<torque::pound_force_foot>(1.0).value,
        Unit::PoundForceInch => q::Torque::new::<torque::pound_force_inch>(1.0).value,
        Unit::KilogramForceMetre => q::Torque::new::<torque::kilogram_force_meter>(1.0).value,
        Unit::Kilowatt => q::Power::new::<power::kilowatt>(1.0).value,
        Unit::Watt => q::Power::new::<power::watt>(1.0).value,
        Unit::Horsepower => q::Power::new::<power::horsepower>(1.0).value,
        Unit::MetricHorsepower => q::Power::new::<power::horsepower_metric>(1.0).value,
        Unit::KilometrePerHour => q::Velocity::new::<velocity::kilometer_per_hour>(1.0).value,
        Unit::MilePerHour => q::Velocity::new::<velocity::mile_per_hour>(1.0).value,
        Unit::MetrePerSecond => q::Velocity::new::<velocity::meter_per_second>(1.0).value,
        Unit::MetrePerMinute => q::Length::new::<length::meter>(1.0).value / 60.0,
        Unit::FootPerMinute => q::Velocity::new::<velocity::foot_per_minute>(1.0).value,
        Unit::Metre => q::Length::new::<length::meter>(1.0).value,
        Unit::Millimetre => q::Length::new::<length::millimeter>(1.0).value,
        Unit::Centimetre => q::Length::new::<length::centimeter>(1.0).value,
        Unit::Foot => q::Length::new::<length::foot>(1.0).value,
        Unit::Inch => q::Length::new::<length::inch>(1.0).value,
        Unit::Second => q::Time::new::<time::second>(1.0).value,
        Unit::Minute => q::Time::new::<time::minute>(1.0).value,
        Unit::Millisecond => q::Time::new::<time::millisecond>(1.0).value,
        Unit::Hour => q::Time::new::<time::hour>(1.0).value,
        Unit::Milliampere => q::ElectricCurrent::new::<electric_current::milliampere>(1.0).value,
        Unit::Ampere => q::ElectricCurrent::new::<electric_current::ampere>(1.0).value,
        Unit::Fraction => q::Ratio::new::<ratio::ratio>(1.0).value,
        Unit::Percent => q::Ratio::new::<ratio::percent>(1.0).value,
        Unit::Kilogram => q::Mass::new::<mass::kilogram>(1.0).value,
        Unit::Gram => q::Mass::new::<mass::gram>(1.0).value,
        Unit::Tonne => q::Mass::new::<mass::ton>(1.0).value,
        Unit::Pound => q::Mass::new::<mass::pound>(1.0).value,
        Unit::Degree => q::Angle::new::<angle::degree>(1.0).value,
        Unit::Turn => q::Angle::new::<angle::revolution>(1.0).value,
        Unit::Radian => q::Angle::new::<angle::radian>(1.0).value,
        Unit::Litre => q::Volume::new::<volume::liter>(1.0).value,
        Unit::Millilitre => q::Volume::new::<volume::milliliter>(1.0).value,
        Unit::UsGallon => q::Volume::new::<volume::gallon>(1.0).value,
        Unit::UsQuart => q::Volume::new::<volume::quart_liquid>(1.0).value,
        Unit::UsFluidOunce => q::Volume::new::<volume::fluid_ounce>(1.0).value,
        Unit::ImperialGallon => q::Volume::new::<volume::gallon_imperial>(1.0).value,
        Unit::ImperialPint => q::Volume::new::<volume::gallon_imperial>(1.0).value / 8.0,
        Unit::KilogramPerCubicMetre => {
            q::MassDensity::new::<mass_density::kilogram_per_cubic_meter>(1.0).value
        }
        Unit::KilogramPerLitre => {
            q::MassDensity::new::<mass_density::gram_per_cubic_centimeter>(1.0).value
        }
        Unit::PoundPerUsGallon => q::MassDensity::new::<mass_density::pound_per_gallon>(1.0).value,
        Unit::PoundPerCubicFoot => {
            q::MassDensity::new::<mass_density::pound_per_cubic_foot>(1.0).value
        }
    }
}

/// A measure as its SI value, through the typed bridge of its kind.
fn si_value(measure: Measure) -> Option<f64> {
    match measure.kind() {
        Kind::Pressure => measure.gauge_pressure().map(|q| q.bar() * 1e5),
        Kind::Flow => measure.volume_rate().map(|q| q.value),
        Kind::RotationalSpeed => measure.angular_velocity().map(|q| q.value),
        Kind::Temperature => measure.temperature().map(|q| q.value),
        Kind::TemperatureDifference => measure.temperature_interval().map(|q| q.value),
        Kind::Displacement => measure.displacement().map(|q| q.cm3() * 1e-6),
        Kind::KinematicViscosity => measure.kinematic_viscosity().map(|q| q.value),
        Kind::Torque => measure.torque().map(|q| q.value),
        Kind::Power => measure.power().map(|q| q.value),
        Kind::GroundSpeed => measure.velocity().map(|q| q.value),
        Kind::Length => measure.length().map(|q| q.value),
        Kind::Time => measure.time().map(|q| q.value),
        Kind::Current => measure.current().map(|q| q.value),
        Kind::Ratio => measure.ratio().map(|q| q.value),
        Kind::Mass => measure.mass().map(|q| q.value),
        Kind::Angle => measure.angle().map(|q| q.value),
        Kind::Volume => measure.volume().map(|q| q.value),
        Kind::Density => measure.density().map(|q| q.value),
    }
}

#[test]
fn every_factor_agrees_with_uom() {
    for unit in Unit::ALL {
        let ours = si_value(measure(1.0, *unit)).expect("every kind has its bridge");
        let theirs = by_uom(*unit);
        // Seven printed digits: half a unit of the last is at most 5e-7 of a figure that starts with 1.
        close(unit.code(), ours, theirs, 5.1e-7);
    }
}
