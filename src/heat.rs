//! Heat: what lost power does to the oil, and what the tank and the cooler take away.
//!
//! Everything that goes in at the shaft and does not come out at the wheels ends up in the oil.

use crate::quantity::typed::{
    MassDensity, Power, Pressure, TemperatureInterval, Time, Volume, VolumeRate,
};
use uom::si;
use uom::si::f64::{Area, HeatTransfer, SpecificHeatCapacity};

/// Heat that a bare steel tank gives to still air per area and kelvin, W/m²K, by two rules of the trade that differ by 27 %:
/// hp = 0.001 × ft² × °F gives 14.5, Btu/h = 2.0 × ft² × °F gives 11.4. Use the span, not one of them.
pub const TANK_TO_AIR: (f64, f64) = (11.36, 14.45);

/// Specific heat of mineral oil at a temperature, J/kgK. A line through an engine oil's tabulated 1964 at 40 °C and 2132 at
/// 80 °C; other mineral oils within about 5 %.
#[must_use]
pub fn oil_specific_heat(celsius: f64) -> f64 {
    1796.0 + 4.2 * celsius.clamp(-40.0, 160.0)
}

/// The same as a quantity.
#[must_use]
pub fn oil_heat_capacity(celsius: f64) -> SpecificHeatCapacity {
    SpecificHeatCapacity::new::<si::specific_heat_capacity::joule_per_kilogram_kelvin>(
        oil_specific_heat(celsius),
    )
}

/// How much hotter oil leaves a relief, an orifice or a leaking gap than it came, when all its pressure turns to heat:
/// Δp / (ρ c). About 6 K per 100 bar.
#[must_use]
pub fn throttling_rise(
    drop: Pressure,
    density: MassDensity,
    heat: SpecificHeatCapacity,
) -> TemperatureInterval {
    kelvin(drop.value / (density.value * heat.value))
}

/// How much hotter a flow leaves than it came when it takes up this power.
#[must_use]
pub fn stream_rise(
    power: Power,
    flow: VolumeRate,
    density: MassDensity,
    heat: SpecificHeatCapacity,
) -> TemperatureInterval {
    kelvin(power.value / (flow.value * density.value * heat.value))
}

/// Power that a flow carries away when it is cooled by this much.
#[must_use]
pub fn stream_power(
    cooled: TemperatureInterval,
    flow: VolumeRate,
    density: MassDensity,
    heat: SpecificHeatCapacity,
) -> Power {
    watt(cooled.value * flow.value * density.value * heat.value)
}

/// Time in which a volume of oil that goes round without a cooler, as in a held check, warms by this much. Infinite without
/// power. Metal is left out, so the true time is longer.
#[must_use]
pub fn time_to_warm(
    volume: Volume,
    density: MassDensity,
    heat: SpecificHeatCapacity,
    by: TemperatureInterval,
    power: Power,
) -> Time {
    let joules = volume.value * density.value * heat.value * by.value;
    Time::new::<si::time::second>(if power.value > 0.0 {
        joules / power.value
    } else {
        f64::INFINITY
    })
}

/// Heat that a machine of this efficiency makes when it puts out this power: output × (1 / efficiency − 1).
#[must_use]
pub fn loss_of_output(output: Power, efficiency: f64) -> Power {
    output * (1.0 / efficiency - 1.0)
}

/// Heat that a tank gives off.
#[must_use]
pub fn tank_cooling(transfer: HeatTransfer, area: Area, over_air: TemperatureInterval) -> Power {
    watt(transfer.value * area.value * over_air.value)
}

/// How far over the air a tank settles that must give off this power.
#[must_use]
pub fn tank_rise(power: Power, transfer: HeatTransfer, area: Area) -> TemperatureInterval {
    kelvin(power.value / (transfer.value * area.value))
}

/// Tank area that gives off this power at this difference.
#[must_use]
pub fn tank_area(power: Power, transfer: HeatTransfer, over_air: TemperatureInterval) -> Area {
    Area::new::<si::area::square_meter>(power.value / (transfer.value * over_air.value))
}

/// What does not close in a heat balance, as a share of what went in: (in − out − carried away) / in. More than about 8 to
/// 10 % means that an instrument lies (common practice). None without input.
#[must_use]
pub fn balance_gap(input: Power, output: Power, carried_away: Power) -> Option<f64> {
    (input.value > 0.0).then(|| (input - output - carried_away).value / input.value)
}

fn kelvin(value: f64) -> TemperatureInterval {
    TemperatureInterval::new::<si::temperature_interval::kelvin>(value)
}

fn watt(value: f64) -> Power {
    Power::new::<si::power::watt>(value)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_held_check_warms_the_loop_in_seconds() {
        // 4 L at 870 kg/m³ and 2010 J/kgK, 10 kW over the relief: 20 K in 14 s.
        let litres = Volume::new::<si::volume::liter>(4.0);
        let density = MassDensity::new::<si::mass_density::kilogram_per_cubic_meter>(870.0);
        let heat = SpecificHeatCapacity::new::<si::specific_heat_capacity::joule_per_kilogram_kelvin>(
            2010.0,
        );
        let time = time_to_warm(litres, density, heat, kelvin(20.0), watt(10_000.0));
        assert!((time.value - 13.9896).abs() < 1e-9, "{}", time.value);
        assert_eq!(
            time_to_warm(litres, density, heat, kelvin(20.0), watt(0.0)).value,
            f64::INFINITY
        );
    }

    #[test]
    fn a_balance_that_closes_has_no_gap() {
        assert_eq!(balance_gap(watt(10.0), watt(8.0), watt(2.0)), Some(0.0));
        assert_eq!(balance_gap(watt(0.0), watt(8.0), watt(2.0)), None);
    }

    #[test]
    fn a_stream_takes_what_it_is_cooled_by() {
        let flow = VolumeRate::new::<si::volume_rate::liter_per_minute>(30.0);
        let density = MassDensity::new::<si::mass_density::kilogram_per_cubic_meter>(860.0);
        let heat = oil_heat_capacity(60.0);
        let power = stream_power(kelvin(8.0), flow, density, heat);
        assert!((stream_rise(power, flow, density, heat).value - 8.0).abs() < 1e-12);
    }
}
