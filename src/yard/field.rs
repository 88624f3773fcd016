//! Figures of the yard sheet. The codes stand in files that people keep.

use crate::quantity::{Kind, Measure, Unit};
use serde::{Deserialize, Serialize};

/// A figure of the sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Field {
    /// Oil temperature at the drain hose.
    Oil,
    /// Engine, throttle right back.
    LowIdle,
    /// Engine, full throttle, nothing loaded.
    HighIdle,
    /// Charge in neutral, low idle.
    ChargeLow,
    /// Charge in neutral, high idle.
    ChargeHigh,
    /// Engine speed at which charge stops rising.
    Knee,
    /// Charge at half stroke or less, forward.
    ChargeForward,
    /// Charge at half stroke or less, reverse.
    ChargeReverse,
    /// Charge with the left side alone stroked at half.
    ChargeLeft,
    /// Charge with the right side alone stroked at half.
    ChargeRight,
    /// Charge with both sides stroked at half.
    ChargeBoth,
    /// Motor drain in neutral, left or only motor.
    Drain,
    /// Motor drain in neutral, right motor.
    DrainRight,
    /// Length of the marked run.
    Distance,
    /// Wheel or left sprocket turns, full lever, flat, forward.
    ForwardTurns,
    /// Time of them, or of the marked run.
    ForwardTime,
    /// Wheel or left sprocket turns, full lever, flat, reverse.
    ReverseTurns,
    /// Time of them, or of the marked run.
    ReverseTime,
    /// Engine speed held on the flat at full lever.
    EngineLight,
    /// Wheel or left sprocket turns up the ramp or against the drag, forward.
    LoadedTurns,
    /// Time of them, or of the marked run.
    LoadedTime,
    /// Engine speed held there.
    EngineLoaded,
    /// Right sprocket turns in the forward time.
    ForwardTurnsRight,
    /// Right sprocket turns in the reverse time.
    ReverseTurnsRight,
    /// Length of the path run.
    Lane,
    /// Sideways off the line at its end, forward.
    AsideForward,
    /// Sideways off the line at its end, reverse.
    AsideReverse,
    /// Track width, middle to middle.
    Track,
    /// Time of a full spin turn to the left.
    SpinLeft,
    /// Time of a full spin turn to the right.
    SpinRight,
    /// Left hub or sprocket motor after the run.
    HubLeft,
    /// Right hub or sprocket motor after the run.
    HubRight,
}

impl Field {
    /// Every field.
    pub const ALL: [Field; 32] = [
        Field::Oil,
        Field::LowIdle,
        Field::HighIdle,
        Field::ChargeLow,
        Field::ChargeHigh,
        Field::Knee,
        Field::ChargeForward,
        Field::ChargeReverse,
        Field::ChargeLeft,
        Field::ChargeRight,
        Field::ChargeBoth,
        Field::Drain,
        Field::DrainRight,
        Field::Distance,
        Field::ForwardTurns,
        Field::ForwardTime,
        Field::ReverseTurns,
        Field::ReverseTime,
        Field::EngineLight,
        Field::LoadedTurns,
        Field::LoadedTime,
        Field::EngineLoaded,
        Field::ForwardTurnsRight,
        Field::ReverseTurnsRight,
        Field::Lane,
        Field::AsideForward,
        Field::AsideReverse,
        Field::Track,
        Field::SpinLeft,
        Field::SpinRight,
        Field::HubLeft,
        Field::HubRight,
    ];

    /// Unit in which it is asked for where the shop has no other, lowest and highest taken, in that unit.
    #[must_use]
    pub fn asks(self) -> (Unit, f64, f64) {
        match self {
            Field::Oil | Field::HubLeft | Field::HubRight => (Unit::DegreeCelsius, -40.0, 150.0),
            Field::LowIdle
            | Field::HighIdle
            | Field::Knee
            | Field::EngineLight
            | Field::EngineLoaded => (Unit::RevolutionPerMinute, 200.0, 6_000.0),
            Field::ChargeLow
            | Field::ChargeHigh
            | Field::ChargeForward
            | Field::ChargeReverse
            | Field::ChargeLeft
            | Field::ChargeRight
            | Field::ChargeBoth => (Unit::Bar, 0.0, 100.0),
            Field::Drain | Field::DrainRight => (Unit::LitrePerMinute, 0.0, 200.0),
            Field::Distance | Field::Lane => (Unit::Metre, 1.0, 200.0),
            Field::AsideForward | Field::AsideReverse => (Unit::Metre, 0.0, 20.0),
            Field::Track => (Unit::Metre, 0.2, 10.0),
            Field::ForwardTurns
            | Field::ReverseTurns
            | Field::LoadedTurns
            | Field::ForwardTurnsRight
            | Field::ReverseTurnsRight => (Unit::Turn, 0.0, 5_000.0),
            Field::ForwardTime
            | Field::ReverseTime
            | Field::LoadedTime
            | Field::SpinLeft
            | Field::SpinRight => (Unit::Second, 0.5, 600.0),
        }
    }

    /// Kind of quantity. Turns are angles.
    #[must_use]
    pub fn kind(self) -> Kind {
        self.asks().0.kind()
    }

    /// Lowest and highest taken.
    #[must_use]
    pub fn range(self) -> (Measure, Measure) {
        let (unit, low, high) = self.asks();
        (Measure::literal(low, unit), Measure::literal(high, unit))
    }

    /// Stable code, as in a file.
    #[must_use]
    pub fn code(self) -> String {
        match serde_json::to_value(self) {
            Ok(serde_json::Value::String(code)) => code,
            _ => String::new(),
        }
    }
}
