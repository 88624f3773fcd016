//! What a unit has: yes / no / don't know. "Don't know" mixes both builds in every window and ranking.

use serde::{Deserialize, Serialize};

/// Yes, no, or don't know.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Tick {
    /// Fitted.
    Yes,
    /// Not fitted.
    No,
    /// Not known: both builds stay possible.
    #[default]
    Unknown,
}

/// How the swash plate is commanded.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Control {
    /// Lever straight on the swash shaft, no servo.
    DirectManual,
    /// Manual spool with a feedback linkage.
    ManualFeedback,
    /// Pilot pressures from a remote valve.
    HydraulicRemote,
    /// Coil current, with feedback.
    ElectricProportional,
    /// Stroke follows engine speed; inching pedal bleeds it.
    SpeedSensing,
    /// Servo pressure without feedback: stroke falls as loop pressure rises.
    PressureNoFeedback,
    /// Three-position on/off.
    ThreePosition,
    /// Not known.
    #[default]
    Unknown,
}

impl Control {
    /// Every control kind, in the order in which screens offer them.
    pub const ALL: [Control; 8] = [
        Control::Unknown,
        Control::DirectManual,
        Control::ManualFeedback,
        Control::HydraulicRemote,
        Control::ElectricProportional,
        Control::SpeedSensing,
        Control::PressureNoFeedback,
        Control::ThreePosition,
    ];

    /// Words for a screen.
    pub fn words(self) -> &'static str {
        match self {
            Control::DirectManual => "Lever straight on the swash, no servo",
            Control::ManualFeedback => "Manual spool with feedback link",
            Control::HydraulicRemote => "Hydraulic pilot",
            Control::ElectricProportional => "Electric, proportional",
            Control::SpeedSensing => "Follows engine speed, inching pedal",
            Control::PressureNoFeedback => "Servo without feedback",
            Control::ThreePosition => "Three-position, on/off",
            Control::Unknown => "Don't know",
        }
    }
}

/// Where the charge oil is filtered, and where the charge gauge sits to it.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Filter {
    /// In the suction line of the charge pump.
    Suction,
    /// After the charge pump; the gauge port is before the filter.
    PressureGaugeBefore,
    /// After the charge pump; the gauge port is after the filter.
    PressureGaugeAfter,
    /// Not known.
    #[default]
    Unknown,
}

/// Where the charge oil comes from.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum ChargeSource {
    /// Its own charge pump.
    OwnPump,
    /// Return of the steering circuit.
    Steering,
    /// Return of the implement circuit.
    Implement,
    /// Not known.
    #[default]
    Unknown,
}

/// Drive paths of a machine.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Paths {
    /// One pump and its loop.
    #[default]
    One,
    /// Left and right, on one charge pump.
    TwoSharedCharge,
    /// Left and right, each with its own charge pump.
    TwoOwnCharge,
}

impl Paths {
    /// Every choice, in the order in which screens offer them.
    pub const ALL: [Paths; 3] = [Paths::One, Paths::TwoSharedCharge, Paths::TwoOwnCharge];

    /// True for one path.
    pub fn is_one(&self) -> bool {
        *self == Paths::One
    }

    /// Words for a screen.
    pub fn words(self) -> &'static str {
        match self {
            Paths::One => "One pump, one loop",
            Paths::TwoSharedCharge => "Left and right, one charge pump",
            Paths::TwoOwnCharge => "Left and right, each its charge pump",
        }
    }
}

/// Where the neutral charge relief drains.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum ReliefDrain {
    /// Into the pump case: the gauge shows setting plus case pressure.
    PumpCase,
    /// To tank or to the charge pump inlet.
    Tank,
    /// Not known.
    #[default]
    Unknown,
}

/// Where the loop reliefs dump.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum LoopReliefTo {
    /// Into the charge gallery (combined check and relief cartridges).
    Gallery,
    /// Across, into the low side.
    Across,
    /// Into the case.
    Case,
    /// Not known: the gallery is taken, the commonest build.
    #[default]
    Unknown,
}

/// How the motor case drains.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum CaseLines {
    /// Motor case through the pump case to the cooler.
    ThroughPump,
    /// Motor case straight to the cooler, pump case likewise.
    Separate,
    /// Not known: through the pump is taken, the commonest build.
    #[default]
    Unknown,
}

/// Kind of flushing shuttle.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Shuttle {
    /// Three positions, closed in the middle: nothing flushes in neutral.
    ClosedCentre,
    /// Two positions: flushes in neutral too, so that charge does not fall from neutral to drive.
    TwoPosition,
    /// Not known: closed centre is taken, the commonest build.
    #[default]
    Unknown,
}

/// What the unit has. Each answer may be "don't know".
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Ticks {
    /// Loop flushing (shuttle and operating charge relief) fitted.
    pub flushing: Tick,
    /// Kind of shuttle.
    pub shuttle: Shuttle,
    /// Pressure limiter (destrokes before the relief opens) fitted.
    pub limiter: Tick,
    /// Control kind.
    pub control: Control,
    /// Charge filter and gauge place.
    pub filter: Filter,
    /// Charge source.
    pub charge_source: ChargeSource,
    /// Brake release fed from charge.
    pub brake_from_charge: Tick,
    /// Shift or other consumers fed from charge.
    pub shift_from_charge: Tick,
    /// Two-speed or variable motor.
    pub two_speed: Tick,
    /// Bypass (tow) valve fitted.
    pub bypass: Tick,
    /// Neutral relief drain.
    pub relief_drain: ReliefDrain,
    /// Loop relief dump.
    pub loop_relief_to: LoopReliefTo,
    /// Case lines.
    pub case_lines: CaseLines,
    /// Pump driven by a belt, a clutch or another drive that can slip.
    pub slipping_drive: Tick,
    /// Motors in parallel on a pump, 1 to 4.
    pub motors: u8,
    /// Drive paths.
    #[serde(skip_serializing_if = "Paths::is_one")]
    pub paths: Paths,
}

impl Default for Ticks {
    fn default() -> Self {
        Ticks {
            flushing: Tick::Unknown,
            shuttle: Shuttle::Unknown,
            limiter: Tick::Unknown,
            control: Control::Unknown,
            filter: Filter::Unknown,
            charge_source: ChargeSource::Unknown,
            brake_from_charge: Tick::Unknown,
            shift_from_charge: Tick::Unknown,
            two_speed: Tick::Unknown,
            bypass: Tick::Unknown,
            relief_drain: ReliefDrain::Unknown,
            loop_relief_to: LoopReliefTo::Unknown,
            case_lines: CaseLines::Unknown,
            slipping_drive: Tick::Unknown,
            motors: 1,
            paths: Paths::One,
        }
    }
}
