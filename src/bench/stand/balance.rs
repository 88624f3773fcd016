//! Does what goes in come out? Losses of a machine warm its oil; where inlet, outlet and case temperatures were read, the heat
//! they carry is held against the power that is missing. A balance that stays open means that an instrument lies.

use super::analysis::{PointResult, Quantity, Setup};
use super::channel::{Channel, Subject};
use super::point::Means;

/// Openness of the balance that is still taken as closed, as a share of the power put in. Common practice: 8 to 10 %.
pub const OPEN: f64 = 0.10;
/// Specific heat of mineral oil, kJ/(kg·K), at about 50 °C. Common handbook value.
pub const SPECIFIC_HEAT: f64 = 1.97;
/// kW per (L/min · kg/m³ · kJ/(kg·K) · K): litres to cubic metres, minutes to seconds.
const KW_PER_LITRE: f64 = 1.0 / 60.0 * 1e-3;

/// The balance of a point, kW.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Balance {
    /// Put in: shaft of a pump, oil of a motor, input shaft of a drive.
    pub power_in: f64,
    /// Given out.
    pub power_out: f64,
    /// Heat carried off by the oil of the loop, and by the case oil.
    pub heat: Option<f64>,
    /// Power in less power out less heat, as a share of power in; none where temperatures are missing.
    pub open: Option<f64>,
}

impl Balance {
    /// True where it is closed within [`OPEN`]; none where it cannot be told.
    #[must_use]
    pub fn is_closed(&self) -> Option<bool> {
        self.open.map(|open| open.abs() <= OPEN)
    }

    /// True where more comes out than goes in, whatever the temperatures.
    #[must_use]
    pub fn is_impossible(&self) -> bool {
        self.power_out > self.power_in
    }
}

/// The balance of a point, where powers are known. `lost_to_room` in kW.
#[must_use]
pub fn balance(
    means: &Means,
    result: &PointResult,
    setup: &Setup,
    lost_to_room: f64,
) -> Option<Balance> {
    let shaft = result.get(Quantity::ShaftPower)?;
    let other = result.get(Quantity::OutPower)?;
    let (power_in, power_out) = match setup.subject {
        Subject::Motor => (other, shaft),
        _ => (shaft, other),
    };
    if power_in <= 0.0 {
        return None;
    }
    let heat = carried(means, result, setup);
    Some(Balance {
        power_in,
        power_out,
        heat,
        open: heat.map(|heat| (power_in - power_out - heat - lost_to_room) / power_in),
    })
}

/// Heat that oil carries off, kW: loop flow from inlet to outlet, case flow from inlet to case.
fn carried(means: &Means, result: &PointResult, setup: &Setup) -> Option<f64> {
    if setup.subject == Subject::Transmission {
        return None;
    }
    let oil = setup.oil.as_ref()?;
    let inlet = means.get(Channel::Inlet)?;
    let outlet = means.get(Channel::Outlet)?;
    let flow = setup.layout.high_flow(setup.subject, means).ok()?;
    let case = result.get(Quantity::CaseLeakage).unwrap_or(0.0);
    let leaves = match setup.subject {
        Subject::Motor => flow - case,
        _ => flow,
    };
    let heat = |flow: f64, from: f64, to: f64| {
        flow * KW_PER_LITRE * oil.density_at(to) * SPECIFIC_HEAT * (to - from)
    };
    let by_case = means
        .get(Channel::CaseOil)
        .map_or(0.0, |to| heat(case, inlet, to));
    Some(heat(leaves, inlet, outlet) + by_case)
}

#[cfg(test)]
mod tests {
    use super::super::analysis::evaluate;
    use super::super::layout::{Charge, Layout, Meter};
    use super::*;
    use crate::fluid::{IsoGrade, Oil};

    fn setup() -> Setup {
        Setup {
            subject: Subject::Pump,
            layout: Layout {
                charge: Some(Charge::None),
                meter: Some(Meter::High),
                ..Layout::default()
            },
            plate: Some(75.0),
            charge_displacement: None,
            oil: Some(Oil::of_grade(IsoGrade::VG46).properties().expect("an oil")),
            viscosity_factor: 1.0,
        }
    }

    fn means(outlet: f64, case_oil: f64) -> Means {
        [
            (Channel::Speed, 1500.0),
            (Channel::Low, 0.0),
            (Channel::High, 200.0),
            (Channel::Flow, 108.0),
            (Channel::Case, 3.0),
            (Channel::Torque, 255.0),
            (Channel::Inlet, 50.0),
            (Channel::Outlet, outlet),
            (Channel::CaseOil, case_oil),
        ]
        .into_iter()
        .collect()
    }

    #[test]
    fn losses_come_back_as_heat() {
        // 40.06 kW in, 36 kW out: 4.06 kW of heat; 108 L/min carry 3.0 kW per K.
        let (setup, means) = (setup(), means(51.15, 66.0));
        let result = evaluate(&means, &setup, Some(75.0));
        let balance = balance(&means, &result, &setup, 0.0).expect("powers known");
        assert!((balance.power_in - 40.055).abs() < 0.01);
        assert!((balance.power_out - 36.0).abs() < 0.01);
        assert_eq!(balance.is_closed(), Some(true));
    }

    #[test]
    fn a_thermometer_that_lies_leaves_it_open() {
        let (setup, means) = (setup(), means(56.0, 66.0));
        let result = evaluate(&means, &setup, Some(75.0));
        let balance = balance(&means, &result, &setup, 0.0).expect("powers known");
        assert_eq!(balance.is_closed(), Some(false));
    }
}
