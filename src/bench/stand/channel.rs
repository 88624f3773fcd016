//! What is metered on a stand, and how well.

use crate::quantity::Unit;
use crate::readings::instrument::gum;
use serde::{Deserialize, Serialize};

/// What stands on the bench.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Subject {
    /// A pump.
    #[default]
    Pump,
    /// A motor.
    Motor,
    /// Pump and motor in one loop, shaft to shaft.
    Transmission,
}

impl Subject {
    /// Every subject.
    pub const ALL: [Subject; 3] = [Subject::Pump, Subject::Motor, Subject::Transmission];

    /// Words for a screen.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Subject::Pump => "Pump",
            Subject::Motor => "Motor",
            Subject::Transmission => "Whole drive, shaft to shaft",
        }
    }
}

/// A column of the table.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Channel {
    /// Shaft speed; of a whole drive the input shaft.
    Speed,
    /// Pressure of the low line: a pump's inlet, a motor's outlet.
    Low,
    /// Pressure of the high line.
    High,
    /// Flow of the metered loop line.
    Flow,
    /// Flow out of the case.
    Case,
    /// Torque at the shaft; of a whole drive the input shaft.
    Torque,
    /// Shaft power, where no torque is shown.
    Power,
    /// Oil temperature at the inlet.
    Inlet,
    /// Oil temperature at the outlet of the metered machine.
    Outlet,
    /// Oil temperature in the case drain.
    CaseOil,
    /// Case pressure.
    CasePressure,
    /// Charge flow delivered from outside or by the charge pump.
    ChargeFlow,
    /// Make-up flow into the loop.
    MakeUp,
    /// Charge pressure.
    ChargePressure,
    /// Output shaft speed of a whole drive.
    OutSpeed,
    /// Output shaft torque of a whole drive.
    OutTorque,
}

/// The spread of readings that a steady point may show, and how it is counted.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Allowed {
    /// Half of highest less lowest, as a share of the mean.
    Share(f64),
    /// Half of highest less lowest, in the channel's unit.
    Fixed(f64),
    /// Not judged.
    Free,
}

impl Channel {
    /// Every column, in the order of the table.
    pub const ALL: [Channel; 16] = [
        Channel::Speed,
        Channel::Low,
        Channel::High,
        Channel::Flow,
        Channel::Case,
        Channel::Torque,
        Channel::Power,
        Channel::Inlet,
        Channel::Outlet,
        Channel::CaseOil,
        Channel::CasePressure,
        Channel::ChargeFlow,
        Channel::MakeUp,
        Channel::ChargePressure,
        Channel::OutSpeed,
        Channel::OutTorque,
    ];

    /// The unit of the table, lowest and highest taken, in that unit.
    #[must_use]
    pub const fn asks(self) -> (Unit, f64, f64) {
        match self {
            Channel::Speed | Channel::OutSpeed => (Unit::RevolutionPerMinute, 0.0, 10_000.0),
            Channel::Low | Channel::High => (Unit::Bar, -1.0, 1_000.0),
            Channel::Flow => (Unit::LitrePerMinute, 0.0, 5_000.0),
            Channel::Case | Channel::ChargeFlow | Channel::MakeUp => {
                (Unit::LitrePerMinute, 0.0, 1_000.0)
            }
            Channel::Torque | Channel::OutTorque => (Unit::NewtonMetre, 0.0, 100_000.0),
            Channel::Power => (Unit::Kilowatt, 0.0, 2_000.0),
            Channel::Inlet | Channel::Outlet | Channel::CaseOil => {
                (Unit::DegreeCelsius, -20.0, 150.0)
            }
            Channel::CasePressure => (Unit::Bar, -1.0, 20.0),
            Channel::ChargePressure => (Unit::Bar, -1.0, 100.0),
        }
    }

    /// Head of the column.
    #[must_use]
    pub const fn words(self, subject: Subject) -> &'static str {
        match (self, subject) {
            (Channel::Speed, Subject::Transmission) => "Input speed",
            (Channel::Speed, _) => "Speed",
            (Channel::Low, Subject::Pump) => "Inlet pressure",
            (Channel::Low, Subject::Motor) => "Outlet pressure",
            (Channel::Low, Subject::Transmission) => "Low side",
            (Channel::High, Subject::Pump) => "Outlet pressure",
            (Channel::High, Subject::Motor) => "Inlet pressure",
            (Channel::High, Subject::Transmission) => "High side",
            (Channel::Flow, _) => "Flow",
            (Channel::Case, _) => "Case flow",
            (Channel::Torque, Subject::Transmission) => "Input torque",
            (Channel::Torque, _) => "Torque",
            (Channel::Power, Subject::Transmission) => "Input power",
            (Channel::Power, _) => "Shaft power",
            (Channel::Inlet, _) => "Inlet oil",
            (Channel::Outlet, _) => "Outlet oil",
            (Channel::CaseOil, _) => "Case oil",
            (Channel::CasePressure, _) => "Case pressure",
            (Channel::ChargeFlow, _) => "Charge flow",
            (Channel::MakeUp, _) => "Make-up flow",
            (Channel::ChargePressure, _) => "Charge pressure",
            (Channel::OutSpeed, _) => "Output speed",
            (Channel::OutTorque, _) => "Output torque",
        }
    }

    /// The columns that a table of this subject opens with.
    #[must_use]
    pub const fn usual(subject: Subject) -> &'static [Channel] {
        use Channel::{Case, Flow, High, Inlet, Low, OutSpeed, OutTorque, Speed, Torque};
        match subject {
            Subject::Pump | Subject::Motor => &[Speed, Low, High, Flow, Case, Torque, Inlet],
            Subject::Transmission => &[Speed, Torque, OutSpeed, OutTorque, Low, High, Inlet],
        }
    }

    /// True where the subject has such a column at all.
    #[must_use]
    pub const fn belongs(self, subject: Subject) -> bool {
        match self {
            Channel::OutSpeed | Channel::OutTorque => matches!(subject, Subject::Transmission),
            _ => true,
        }
    }

    /// How far readings of one steady point may lie apart (common practice after the stabilised conditions of ISO 4409,
    /// figures from memory): half the range.
    #[must_use]
    pub const fn allowed(self) -> Allowed {
        match self {
            Channel::Speed | Channel::OutSpeed => Allowed::Share(0.01),
            Channel::High | Channel::Flow | Channel::Torque | Channel::OutTorque => {
                Allowed::Share(0.015)
            }
            Channel::Power => Allowed::Share(0.02),
            Channel::Low | Channel::ChargePressure => Allowed::Fixed(0.5),
            Channel::Case | Channel::MakeUp => Allowed::Share(0.05),
            Channel::ChargeFlow => Allowed::Share(0.03),
            Channel::Inlet => Allowed::Fixed(2.0),
            Channel::CaseOil | Channel::Outlet => Allowed::Fixed(2.0),
            Channel::CasePressure => Allowed::Free,
        }
    }
}

/// Class of measuring accuracy, A sharpest. Limits after ISO 4409, from memory: compare them with the standard before a sheet
/// goes to a customer who asks for it.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
pub enum MeasuringClass {
    /// Laboratory.
    A,
    /// Good stand.
    #[default]
    B,
    /// Workshop.
    C,
}

impl MeasuringClass {
    /// Every class.
    pub const ALL: [MeasuringClass; 3] = [MeasuringClass::A, MeasuringClass::B, MeasuringClass::C];

    /// Limit of error of a channel at a value, in the channel's unit.
    #[must_use]
    pub fn limit(self, channel: Channel, value: f64) -> f64 {
        let pick = |limits: [f64; 3]| limits[self as usize];
        let share = match channel {
            Channel::Speed | Channel::OutSpeed | Channel::Torque | Channel::OutTorque => {
                pick([0.005, 0.01, 0.02])
            }
            Channel::Power => pick([0.007, 0.014, 0.028]),
            Channel::Flow | Channel::Case | Channel::ChargeFlow | Channel::MakeUp => {
                pick([0.005, 0.015, 0.025])
            }
            Channel::Inlet | Channel::Outlet | Channel::CaseOil => return pick([0.5, 1.0, 2.0]),
            Channel::Low | Channel::High | Channel::CasePressure | Channel::ChargePressure => {
                // Below 2 bar the limit is one of pressure, not of share.
                let share = pick([0.005, 0.015, 0.025]);
                return (share * value.abs()).max(2.0 * share);
            }
        };
        share * value.abs()
    }
}

/// How well a channel is metered.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Gauged {
    /// By the class of the stand.
    Class(MeasuringClass),
    /// Limit of error as a share of the reading.
    OfReading(f64),
    /// Limit of error in the channel's unit, the same at every reading: a share of span, or stated so.
    Fixed(f64),
}

impl Gauged {
    /// Standard uncertainty of the instrument's own error, which all its readings share (GUM 4.3.7).
    #[must_use]
    pub fn standard(&self, channel: Channel, value: f64) -> f64 {
        gum::rectangular(match self {
            Gauged::Class(class) => class.limit(channel, value),
            Gauged::OfReading(share) => share * value.abs(),
            Gauged::Fixed(limit) => *limit,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn columns_have_units_and_ranges() {
        for channel in Channel::ALL {
            let (unit, low, high) = channel.asks();
            assert!(low < high && unit.kind().base_unit() == unit, "{channel:?}");
        }
        for subject in Subject::ALL {
            assert!(Channel::usual(subject).iter().all(|c| c.belongs(subject)));
        }
    }

    #[test]
    fn classes_widen_from_a_to_c() {
        for channel in Channel::ALL {
            let limit = |class: MeasuringClass| class.limit(channel, 80.0);
            assert!(limit(MeasuringClass::A) < limit(MeasuringClass::B));
            assert!(limit(MeasuringClass::B) < limit(MeasuringClass::C));
        }
        let near_zero = Gauged::Class(MeasuringClass::B).standard(Channel::Low, 0.0);
        assert!((near_zero - 0.03 / 3.0_f64.sqrt()).abs() < 1e-12);
    }
}
