//! Fault ids. They stand in files that people keep: never renamed, never reused.

use serde::{Deserialize, Serialize};

macro_rules! ids {
    ($($name:ident),* $(,)?) => {
        /// A cause that the catalogue knows. The code form (kebab case) is stable.
        #[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
        #[serde(rename_all = "kebab-case")]
        #[allow(missing_docs)] // each id is described by its catalogue entry
        pub enum FaultId { $($name,)* }
        impl FaultId {
            /// Every id in catalogue order.
            pub const ALL: &'static [FaultId] = &[$(FaultId::$name,)*];

            /// Its stable code.
            pub fn code(self) -> String {
                match serde_json::to_value(self) {
                    Ok(serde_json::Value::String(code)) => code,
                    _ => String::new(),
                }
            }
        }
    };
}

ids! {
    Healthy,
    OilLow, InletRestricted, InletAir, ChargePumpWorn, ChargeDriveFailed, ChargeFilterBlocked,
    NeutralReliefLow, NeutralReliefStuckOpen, NeutralReliefHigh, OperatingReliefLow, OperatingReliefHigh,
    FlushingOrificeBlocked, ShuttleCentred, ShuttleStuckA, ShuttleStuckB, ConsumerLeak, ChargeStarvedByFunction,
    CheckALeaking, CheckBLeaking, CheckAShut, CheckBShut, LoopReliefALow, LoopReliefBLow, LoopReliefAHigh,
    LoopReliefBHigh, BypassOpen, PumpWorn, PumpWornAcross, MotorWorn, MotorWornAcross, PressureLimiterALow,
    PressureLimiterBLow, PressureLimiterStuck, LoopHoseRestricted,
    ControlNullOff, ServoNullOff, LinkageShortForward, LinkageShortReverse, FeedbackLinkWorn, StrokeStuck,
    ServoLeak, ControlOrificeBlocked, PilotSupplyLow, SignalLostForward, SignalLostReverse, SignalWeak,
    InterlockOrDerate, InchingOff,
    MotorStuckSmall, MotorStuckLarge, MotorShiftSupplyLow, BrakeDragging, BrakeNotReleased, DrivetrainSlipping,
    InputDriveSlipping, EngineLugging, CaseReturnRestricted, CaseCouplingShut, CoolerBypassing, CoolerDirty,
    OilTooThin, OilTooThick, WrongOrWetOil,
    PathsNullMismatch, PathsStrokeMismatch, TyreOrTrackMismatch,
    AssemblyError, OperatorOrLoad,
    NotListed,
}
