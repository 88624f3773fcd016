//! Which lines are metered and where oil goes. A complete pump's case flow holds relief and control oil beside its leakage, and
//! its torque holds the charge pump's: without the layout the one cannot be told from the other.

use super::channel::{Channel, Subject};
use super::point::Means;
use core::f64::consts::TAU;
use serde::{Deserialize, Serialize};
use thiserror::Error;

/// Mechanical efficiency of a gear charge pump at its setting. Common practice: 0.85 to 0.95.
pub const CHARGE_MECHANICAL: f64 = 0.90;

/// Who supplies charge.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Charge {
    /// The charge pump on the same shaft.
    Own,
    /// The stand, through the column "charge flow".
    Outside,
    /// No charge gallery: the inlet is fed, or this is a motor.
    None,
}

/// Where the charge relief drains.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum ReliefDrain {
    /// Into the case that is metered.
    Case,
    /// Elsewhere, or screwed shut while the stand feeds at a set pressure.
    Elsewhere,
}

/// In which line the flow meter stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Meter {
    /// The line under high pressure.
    High,
    /// The line under low pressure.
    Low,
}

/// The motor's flushing.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Flushing {
    /// Not fitted, or plugged for the run.
    Plugged,
    /// Open.
    Open,
}

/// What the torque meter carries.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum TorqueCovers {
    /// The main machine alone.
    MachineOnly,
    /// The charge pump too.
    WithCharge,
}

/// The metering layout. Nothing is taken for granted: what nobody said is `None`.
#[derive(Clone, Copy, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Layout {
    /// Charge supply.
    pub charge: Option<Charge>,
    /// Drain of the charge relief.
    pub relief: Option<ReliefDrain>,
    /// Metered line.
    pub meter: Option<Meter>,
    /// Flushing of a motor.
    pub flushing: Option<Flushing>,
    /// What the torque covers.
    pub torque: Option<TorqueCovers>,
}

/// Why a figure is refused under a layout. Each says what to do.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Error)]
pub enum LayoutGap {
    /// Charge supply not said.
    #[error("say who supplies charge")]
    Charge,
    /// Relief drain not said.
    #[error("say where the charge relief drains")]
    Relief,
    /// Metered line not said.
    #[error("say in which line the flow meter stands")]
    Meter,
    /// Flushing not said.
    #[error("say whether the motor's flushing is plugged")]
    Flushing,
    /// What the torque covers is not said.
    #[error("say whether the torque includes the charge pump")]
    Torque,
    /// Relief oil is in the case flow and nothing tells how much.
    #[error(
        "case flow holds the charge relief's oil: lead the relief elsewhere, or meter charge and make-up flow"
    )]
    ReliefInCase,
    /// Flushing oil is in the case flow.
    #[error("case flow holds flushing oil: plug the flushing and run again")]
    FlushingOpen,
    /// No case flow on the sheet.
    #[error("no case flow in the table")]
    NoCaseFlow,
    /// No flow on the sheet.
    #[error("no flow in the table")]
    NoFlow,
    /// No torque on the sheet.
    #[error("no torque or shaft power in the table")]
    NoTorque,
    /// The meter stands in the low line and the case flow that closes the balance is missing.
    #[error("the meter is in the low line: the high line's flow needs the case flow too")]
    LowLineNeedsCase,
    /// The charge pump's share of the torque cannot be taken off.
    #[error("give the charge pump's displacement, to take its torque off")]
    ChargeDisplacement,
    /// Speed or pressures are missing.
    #[error("speed and both pressures are needed")]
    State,
}

impl Layout {
    /// What is still to be said before a loss fit of this subject.
    #[must_use]
    pub fn open(&self, subject: Subject) -> Vec<LayoutGap> {
        let mut gaps = Vec::new();
        let mut ask = |open: bool, gap| gaps.extend(open.then_some(gap));
        match subject {
            Subject::Pump => {
                ask(self.charge.is_none(), LayoutGap::Charge);
                let has_relief = !matches!(self.charge, None | Some(Charge::None));
                ask(has_relief && self.relief.is_none(), LayoutGap::Relief);
                ask(self.meter.is_none(), LayoutGap::Meter);
                let own = self.charge == Some(Charge::Own);
                ask(own && self.torque.is_none(), LayoutGap::Torque);
            }
            Subject::Motor => {
                ask(self.meter.is_none(), LayoutGap::Meter);
                ask(self.flushing.is_none(), LayoutGap::Flushing);
            }
            Subject::Transmission => {
                ask(self.torque.is_none(), LayoutGap::Torque);
            }
        }
        gaps
    }

    /// Leakage out of the case, L/min: case flow less what else goes there. Control oil of a pump is in it, which the sheet says.
    ///
    /// # Errors
    /// [`LayoutGap`] where the layout does not carry it.
    pub fn case_leakage(&self, subject: Subject, means: &Means) -> Result<f64, LayoutGap> {
        let case = means.get(Channel::Case).ok_or(LayoutGap::NoCaseFlow);
        match subject {
            Subject::Motor => match self.flushing.ok_or(LayoutGap::Flushing)? {
                Flushing::Plugged => case,
                Flushing::Open => Err(LayoutGap::FlushingOpen),
            },
            _ => match self.charge.ok_or(LayoutGap::Charge)? {
                Charge::None => case,
                Charge::Own | Charge::Outside => match self.relief.ok_or(LayoutGap::Relief)? {
                    ReliefDrain::Elsewhere => case,
                    ReliefDrain::Case => {
                        // What charge delivers and the loop does not take goes through relief and control into the case.
                        let charge = means.get(Channel::ChargeFlow);
                        let make_up = means.get(Channel::MakeUp);
                        match (charge, make_up) {
                            (Some(charge), Some(make_up)) => Ok(case? - (charge - make_up)),
                            _ => Err(LayoutGap::ReliefInCase),
                        }
                    }
                },
            },
        }
    }

    /// Flow at the high port, L/min.
    ///
    /// # Errors
    /// [`LayoutGap`].
    pub fn high_flow(&self, subject: Subject, means: &Means) -> Result<f64, LayoutGap> {
        let flow = means.get(Channel::Flow).ok_or(LayoutGap::NoFlow)?;
        match self.meter.ok_or(LayoutGap::Meter)? {
            Meter::High => Ok(flow),
            Meter::Low => {
                let leakage = self.case_leakage(subject, means).map_err(|gap| match gap {
                    LayoutGap::NoCaseFlow => LayoutGap::LowLineNeedsCase,
                    other => other,
                })?;
                // A pump takes in what it delivers and leaks; a motor gives back what it takes less its leakage.
                Ok(match subject {
                    Subject::Motor => flow + leakage,
                    _ => flow - leakage,
                })
            }
        }
    }

    /// Torque of the machine alone, N·m. `charge_displacement` in cm³/rev.
    ///
    /// # Errors
    /// [`LayoutGap`].
    pub fn torque(
        &self,
        subject: Subject,
        means: &Means,
        charge_displacement: Option<f64>,
    ) -> Result<f64, LayoutGap> {
        let speed = means.get(Channel::Speed);
        let from_power = || {
            let speed = speed.filter(|speed| *speed > 0.0)?;
            Some(means.get(Channel::Power)? * 60_000.0 / (TAU * speed))
        };
        let torque = means
            .get(Channel::Torque)
            .or_else(from_power)
            .ok_or(LayoutGap::NoTorque)?;
        let carries_charge = match (subject, self.charge) {
            (Subject::Motor, _) | (Subject::Pump, Some(Charge::Outside | Charge::None)) => false,
            (Subject::Pump, None) => return Err(LayoutGap::Charge),
            _ => self.torque.ok_or(LayoutGap::Torque)? == TorqueCovers::WithCharge,
        };
        if !carries_charge {
            return Ok(torque);
        }
        let displacement = charge_displacement.ok_or(LayoutGap::ChargeDisplacement)?;
        let pressure = means
            .get(Channel::ChargePressure)
            .or(means.get(Channel::Low))
            .ok_or(LayoutGap::State)?;
        Ok(torque - charge_torque(displacement, pressure))
    }
}

/// Torque of a charge pump, N·m: V Δp / (2π η), with cm³/rev and bar.
#[must_use]
pub fn charge_torque(displacement: f64, pressure: f64) -> f64 {
    displacement * pressure.max(0.0) * 0.1 / (TAU * CHARGE_MECHANICAL)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn means(cells: &[(Channel, f64)]) -> Means {
        cells.iter().copied().collect()
    }

    #[test]
    fn relief_oil_in_the_case_is_refused_until_it_is_metered() {
        let layout = Layout {
            charge: Some(Charge::Own),
            relief: Some(ReliefDrain::Case),
            meter: Some(Meter::High),
            torque: Some(TorqueCovers::WithCharge),
            flushing: None,
        };
        assert!(layout.open(Subject::Pump).is_empty());
        let bare = means(&[(Channel::Case, 24.0)]);
        assert_eq!(
            layout.case_leakage(Subject::Pump, &bare),
            Err(LayoutGap::ReliefInCase)
        );
        let metered = means(&[
            (Channel::Case, 24.0),
            (Channel::ChargeFlow, 22.0),
            (Channel::MakeUp, 1.5),
        ]);
        let leakage = layout
            .case_leakage(Subject::Pump, &metered)
            .expect("metered");
        assert!((leakage - 3.5).abs() < 1e-12);
    }

    #[test]
    fn nothing_is_taken_for_granted() {
        let silent = Layout::default();
        assert_eq!(silent.open(Subject::Pump).len(), 2);
        assert_eq!(
            silent.open(Subject::Motor),
            [LayoutGap::Meter, LayoutGap::Flushing]
        );
        let m = means(&[(Channel::Flow, 90.0), (Channel::Case, 2.0)]);
        assert_eq!(silent.high_flow(Subject::Pump, &m), Err(LayoutGap::Meter));
        let open = Layout {
            flushing: Some(Flushing::Open),
            ..silent
        };
        assert_eq!(
            open.case_leakage(Subject::Motor, &m),
            Err(LayoutGap::FlushingOpen)
        );
    }

    #[test]
    fn a_meter_in_the_low_line_is_closed_with_the_case_flow() {
        let layout = Layout {
            charge: Some(Charge::None),
            meter: Some(Meter::Low),
            flushing: Some(Flushing::Plugged),
            ..Layout::default()
        };
        let m = means(&[(Channel::Flow, 90.0), (Channel::Case, 2.0)]);
        assert_eq!(layout.high_flow(Subject::Pump, &m), Ok(88.0));
        assert_eq!(layout.high_flow(Subject::Motor, &m), Ok(92.0));
        let no_case = means(&[(Channel::Flow, 90.0)]);
        assert_eq!(
            layout.high_flow(Subject::Motor, &no_case),
            Err(LayoutGap::LowLineNeedsCase)
        );
    }

    #[test]
    fn the_charge_pump_is_taken_off_the_torque() {
        // 15 cm³/rev at 25 bar: 5.97 N·m without friction, a tenth of what a 75 cm³/rev pump takes at 50 bar.
        assert!((charge_torque(15.0, 25.0) * CHARGE_MECHANICAL - 5.968).abs() < 1e-3);
        let layout = Layout {
            charge: Some(Charge::Own),
            torque: Some(TorqueCovers::WithCharge),
            ..Layout::default()
        };
        let m = means(&[(Channel::Torque, 70.0), (Channel::Low, 25.0)]);
        let net = layout.torque(Subject::Pump, &m, Some(15.0)).expect("known");
        assert!((net - (70.0 - charge_torque(15.0, 25.0))).abs() < 1e-12);
        assert_eq!(
            layout.torque(Subject::Pump, &m, None),
            Err(LayoutGap::ChargeDisplacement)
        );
    }

    #[test]
    fn power_stands_in_for_torque() {
        let layout = Layout {
            charge: Some(Charge::None),
            ..Layout::default()
        };
        let m = means(&[(Channel::Power, 37.7), (Channel::Speed, 1500.0)]);
        let torque = layout.torque(Subject::Pump, &m, None).expect("from power");
        assert!((torque - 240.0).abs() < 0.1);
    }
}
