//! Checks that take something apart or swap something: which causes each outcome speaks for. Common practice.

use crate::faults::FaultId::{self, *};

/// Chance that such a check comes out as it should. Common practice.
pub const RELIABLE: f64 = 0.92;

/// What a check's outcomes are: each a list of causes; all other causes come out as "nothing found".
pub fn of(check: &str) -> &'static [&'static [FaultId]] {
    match check {
        "pull-the-shuttle" => &[
            &[ShuttleCentred],
            &[OperatingReliefHigh, OperatingReliefLow],
            &[FlushingOrificeBlocked],
            &[ShuttleStuckA],
            &[ShuttleStuckB],
        ],
        "swap-cartridges" => &[
            &[CheckALeaking, CheckAShut, LoopReliefALow, LoopReliefAHigh],
            &[CheckBLeaking, CheckBShut, LoopReliefBLow, LoopReliefBHigh],
        ],
        "isolate-the-pump" => &[
            &[PumpWorn, PumpWornAcross],
            &[BypassOpen, LoopHoseRestricted, MotorWorn, MotorWornAcross],
        ],
        "stroke-arm-by-hand" => &[
            &[LinkageShortForward, LinkageShortReverse, FeedbackLinkWorn],
            &[
                ControlNullOff,
                PilotSupplyLow,
                SignalLostForward,
                SignalLostReverse,
                SignalWeak,
                InterlockOrDerate,
                InchingOff,
                ControlOrificeBlocked,
            ],
        ],
        "interlock-and-codes" => &[&[InterlockOrDerate]],
        "oil-run-down" => &[&[OilTooThin], &[WrongOrWetOil], &[OilTooThick]],
        "bridge-the-servo" => &[&[ServoNullOff], &[ControlNullOff, FeedbackLinkWorn]],
        "swap-plugs" => &[&[SignalLostForward], &[SignalLostReverse], &[SignalWeak]],
        "cap-a-consumer" => &[&[ConsumerLeak]],
        "work-another-function" => &[&[ChargeStarvedByFunction]],
        "roll-by-hand" => &[&[BrakeDragging, BrakeNotReleased], &[DrivetrainSlipping]],
        "debris" => &[&[
            PumpWorn,
            PumpWornAcross,
            MotorWorn,
            MotorWornAcross,
            ChargePumpWorn,
        ]],
        _ => &[],
    }
}
