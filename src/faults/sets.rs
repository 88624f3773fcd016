//! Causes that common readings cannot tell apart: shown as one row with one action and the check that splits them.

use super::FaultId;
use FaultId::*;

/// A set of causes that look alike until one particular thing is looked at.
#[derive(Clone, Copy, Debug)]
pub struct AlikeSet {
    /// Members.
    pub ids: &'static [FaultId],
    /// Title of the row.
    pub title: &'static str,
    /// The one action that serves them all.
    pub action: &'static str,
    /// What splits them.
    pub split: &'static str,
    /// The action ends the trouble whichever member it is: one repair for all.
    pub one_repair: bool,
}

/// The sets. A set is joined only where the readings taken weigh its members alike.
pub const SETS: &[AlikeSet] = &[
    AlikeSet {
        ids: &[ShuttleCentred, OperatingReliefHigh, FlushingOrificeBlocked],
        title: "Flushing does not pass",
        action: "Pull the plugs of shuttle, operating relief and orifice in one visit: same place, same tools.",
        split: "Spool free? Spring whole? Orifice clear? The plugs show which.",
        one_repair: true,
    },
    AlikeSet {
        ids: &[CheckALeaking, LoopReliefALow],
        title: "Cartridge of side A leaks or opens early",
        action: "Change or swap the check and relief cartridge of side A.",
        split: "Staged build-up: a leaking seat curves from the start, a low relief runs straight and then goes flat.",
        one_repair: true,
    },
    AlikeSet {
        ids: &[CheckBLeaking, LoopReliefBLow],
        title: "Cartridge of side B leaks or opens early",
        action: "Change or swap the check and relief cartridge of side B.",
        split: "Staged build-up in reverse: a leaking seat curves from the start, a low relief runs straight and then goes flat.",
        one_repair: true,
    },
    AlikeSet {
        ids: &[PumpWorn, MotorWorn],
        title: "Pump or motor worn to the case",
        action: "Look for debris, then measure the motor drain in neutral.",
        split: "Motor drain in neutral at high idle tells the motor alone; capping the pump ports tells the pump alone.",
        one_repair: false,
    },
    AlikeSet {
        ids: &[PumpWornAcross, MotorWornAcross, BypassOpen],
        title: "Oil passes from side to side",
        action: "Look at the bypass screw first: two minutes.",
        split: "Bypass screw position; then the pump with its ports capped. Seats give a curved build-up, worn faces a straight one.",
        one_repair: false,
    },
    AlikeSet {
        ids: &[ChargePumpWorn, NeutralReliefStuckOpen, ConsumerLeak],
        title: "Charge oil goes astray",
        action: "Cap the consumers one at a time, then measure the total return at two speeds.",
        split: "Return flow stays normal with a relief held open; a capped consumer brings the pressure back; a worn pump does neither.",
        one_repair: false,
    },
    AlikeSet {
        ids: &[InletRestricted, ChargeFilterBlocked],
        title: "Charge pump inlet or filter blocked",
        action: "Change the filter element, after the pleats have been looked at.",
        split: "Inlet pull at high idle before and after the new element.",
        one_repair: true,
    },
    AlikeSet {
        ids: &[OilLow, InletAir, ChargeStarvedByFunction],
        title: "Too little oil, or air with it, reaches the charge pump",
        action: "Look at the level, then at every joint of the suction line; work steering and implement and watch the charge gauge.",
        split: "Dipstick; foam after two minutes running; a gauge that falls only while the other function works.",
        one_repair: false,
    },
    AlikeSet {
        ids: &[CoolerDirty, CoolerBypassing],
        title: "Cooler takes too little heat",
        action: "Look through the fins, feel inlet and outlet, look at the fan.",
        split: "A bypassing cooler is cold while the oil is hot; a dirty one is hot.",
        one_repair: false,
    },
    AlikeSet {
        ids: &[LinkageShortForward, SignalLostForward],
        title: "Stroke asked forward does not arrive",
        action: "Work the arm at the pump by hand, wheels clear.",
        split: "Arm moved by hand gives full speed: linkage. It does not: signal or servo.",
        one_repair: false,
    },
    AlikeSet {
        ids: &[LinkageShortReverse, SignalLostReverse],
        title: "Stroke asked in reverse does not arrive",
        action: "Work the arm at the pump by hand, wheels clear.",
        split: "Arm moved by hand gives full speed: linkage. It does not: signal or servo.",
        one_repair: false,
    },
];
