//! Loop side: cartridges, bypass, wear of pump and motor, limiters, hoses.

use super::{BASE, possible, ways};
use crate::circuit::Param;
use crate::faults::Bend::{PlusGeometric, Times};
use crate::faults::SeverityShape::{Even, MostlyBad};
use crate::faults::{Column, Fault, FaultId};

const CARTRIDGE_CAUTION: &str = "Engine off is not pressure off: chock, lower everything, back the cartridge off one turn behind a rag and wait.";

const CHECK_LEAKING: Fault = Fault {
    column: Column::OneSide,
    severity: Even,
    repair: "Change the cartridge (check and relief in one on most units); clean its bore.",
    minutes: 40.0,
    caution: CARTRIDGE_CAUTION,
    ..BASE
};

const CHECK_SHUT: Fault = Fault {
    column: Column::OneSide,
    severity: MostlyBad,
    repair: "Take the check out, free or change it.",
    minutes: 40.0,
    caution: CARTRIDGE_CAUTION,
    ..BASE
};

const RELIEF_LOW: Fault = Fault {
    column: Column::OneSide,
    severity: Even,
    repair: "Change the cartridge, or set it to the manual's figure with the manual's procedure.",
    minutes: 40.0,
    needs_manual: true,
    caution: CARTRIDGE_CAUTION,
    ..BASE
};

const RELIEF_HIGH: Fault = Fault {
    column: Column::Healthy,
    severity: Even,
    repair: "Fit the right cartridge or set it back to the manual's figure.",
    minutes: 40.0,
    needs_manual: true,
    caution: "Nothing protects hoses and people on this side: no held check, no heavy pushing until it is put right.",
    ..BASE
};

const LIMITER_LOW: Fault = Fault {
    column: Column::OneSide,
    severity: Even,
    repair: "Clean the limiter or set it to the manual's figure.",
    minutes: 45.0,
    needs_manual: true,
    possible: possible::limiter,
    ..BASE
};

const UNIT_CAUTION: &str = "With loop hoses off there is no braking from the drive: chock both ways before the spanner touches.";

pub const FAULTS: &[Fault] = &[
    Fault {
        id: FaultId::CheckALeaking,
        title: "Check or relief seat of side A leaks (weak forward)",
        per_hundred: 0.9,
        effects: ways!([CheckLeakA: PlusGeometric(0.2, 12.0)]),
        explains: "Forward, oil of the high side slips through its own cartridge into the charge gallery: little push at \
                   small stroke, while charge stays or even rises.",
        proof: "The weak direction changes over when the two cartridges are swapped side to side.",
        ..CHECK_LEAKING
    },
    Fault {
        id: FaultId::CheckBLeaking,
        title: "Check or relief seat of side B leaks (weak in reverse)",
        per_hundred: 0.9,
        effects: ways!([CheckLeakB: PlusGeometric(0.2, 12.0)]),
        explains: "In reverse, oil of the high side slips through its own cartridge into the charge gallery: little push at \
                   small stroke, while charge stays or even rises.",
        proof: "The weak direction changes over when the two cartridges are swapped side to side.",
        ..CHECK_LEAKING
    },
    Fault {
        id: FaultId::CheckAShut,
        title: "Make-up check of side A does not open (rough in reverse)",
        per_hundred: 0.3,
        effects: ways!([CheckA: Times(0.12, 0.002)]),
        explains: "Side A is the low side in reverse and gets no oil made up: it empties, the drive rattles, jerks and \
                   loses speed in reverse.",
        proof: "Low side swings near nothing in reverse with good charge; the check found stuck.",
        ..CHECK_SHUT
    },
    Fault {
        id: FaultId::CheckBShut,
        title: "Make-up check of side B does not open (rough forward)",
        per_hundred: 0.3,
        effects: ways!([CheckB: Times(0.12, 0.002)]),
        explains: "Side B is the low side going forward and gets no oil made up: it empties, the drive rattles, jerks and \
                   loses speed forward.",
        proof: "Low side swings near nothing going forward with good charge; the check found stuck.",
        ..CHECK_SHUT
    },
    Fault {
        id: FaultId::LoopReliefALow,
        title: "Loop relief of side A opens too early (weak pull forward)",
        per_hundred: 0.9,
        effects: ways!([LoopReliefA: Times(0.90, 0.12)]),
        explains: "Speed and light pull are normal forward, then pressure stops at a flat plateau below the setting with a \
                   scream.",
        proof: "Flat plateau forward, higher in reverse; it changes over when the cartridges are swapped, if both are \
                stamped alike.",
        ..RELIEF_LOW
    },
    Fault {
        id: FaultId::LoopReliefBLow,
        title: "Loop relief of side B opens too early (weak pull in reverse)",
        per_hundred: 0.7,
        effects: ways!([LoopReliefB: Times(0.90, 0.12)]),
        explains: "Speed and light pull are normal in reverse, then pressure stops at a flat plateau below the setting. It \
                   is also the side that brakes going forward downhill.",
        proof: "Flat plateau in reverse, higher forward; it changes over when the cartridges are swapped, if both are \
                stamped alike.",
        caution: "This side holds the machine back downhill going forward: no slopes until it is put right.",
        ..RELIEF_LOW
    },
    Fault {
        id: FaultId::LoopReliefAHigh,
        title: "Loop relief of side A set too high or does not open",
        per_hundred: 0.2,
        effects: ways!([LoopReliefA: Times(1.08, 1.7)]),
        explains: "The machine pulls well forward, too well: pressure climbs past the setting and the engine stalls instead.",
        proof: "Pressure goes past the plate setting going forward; stop there.",
        ..RELIEF_HIGH
    },
    Fault {
        id: FaultId::LoopReliefBHigh,
        title: "Loop relief of side B set too high or does not open",
        per_hundred: 0.2,
        effects: ways!([LoopReliefB: Times(1.08, 1.7)]),
        explains: "The machine pulls well in reverse, too well: pressure climbs past the setting and the engine stalls \
                   instead.",
        proof: "Pressure goes past the plate setting in reverse; stop there.",
        ..RELIEF_HIGH
    },
    Fault {
        id: FaultId::BypassOpen,
        title: "Tow (bypass) valve open or leaking",
        per_hundred: 1.7,
        column: Column::TwoSides,
        severity: Even,
        effects: ways!(
            [Bypass: PlusGeometric(0.2, 30.0)],
            [CheckLeakA: PlusGeometric(0.2, 20.0), CheckLeakB: PlusGeometric(0.2, 20.0)],
        ),
        explains: "Oil short-circuits from side to side: weak both ways, worst at small stroke, and the machine may roll \
                   on a slope. Charge stays good.",
        proof: "The valve found open or its seat marked; push is back when it is shut as the manual says.",
        repair: "Shut and torque the valve; change its seat or seal if it does not hold.",
        minutes: 15.0,
        caution: "While it is open there is no braking from the drive: chock both ways before touching it.",
        possible: possible::bypass,
        ..BASE
    },
    Fault {
        id: FaultId::PumpWorn,
        title: "Pump worn, leaking to its case",
        per_hundred: 4.3,
        column: Column::Worn,
        severity: Even,
        effects: ways!([PumpLeak: Times(2.0, 22.0), PumpAcross: Times(1.0, 2.5)]),
        explains: "More oil is lost inside as pressure and heat rise: slow when loaded and hot, both ways. Charge holds \
                   until the spare flow is used up, then it drops quickly.",
        proof: "Pump alone, its ports capped, does not build pressure at small stroke with warm oil; or metal that comes \
                from a pump.",
        repair: "Rebuild or exchange the pump. Clean loop, cooler, tank and filter first, prefill the case, prove charge \
                 before driving.",
        minutes: 480.0,
        destroys_evidence: true,
        needs_manual: true,
        caution: UNIT_CAUTION,
        ..BASE
    },
    Fault {
        id: FaultId::PumpWornAcross,
        title: "Pump worn across (port plate or bores, side to side)",
        per_hundred: 2.0,
        column: Column::Worn,
        severity: Even,
        effects: ways!([PumpAcross: Times(3.5, 60.0), PumpLeak: Times(1.0, 1.5)]),
        explains: "Oil slips from the high side to the low side inside the pump: speed and push are lost but charge and \
                   drains stay normal.",
        proof: "Pump alone, its ports capped, does not build pressure at small stroke while its case flow is normal.",
        repair: "Rebuild or exchange the pump. Clean loop, cooler, tank and filter first, prefill the case, prove charge \
                 before driving.",
        minutes: 480.0,
        destroys_evidence: true,
        needs_manual: true,
        caution: UNIT_CAUTION,
        ..BASE
    },
    Fault {
        id: FaultId::MotorWorn,
        title: "Motor worn, leaking to its case",
        per_hundred: 4.9,
        column: Column::Worn,
        severity: Even,
        effects: ways!([MotorLeak: Times(2.0, 22.0), MotorAcross: Times(1.0, 2.5)]),
        explains: "More oil is lost inside as pressure and heat rise: slow when loaded and hot, both ways. Its drain shows \
                   it cleanly only in neutral or with flushing blocked.",
        proof: "Motor drain in true neutral far above the other side or this unit's own past, or the pump proved good alone.",
        repair: "Rebuild or exchange the motor. Clean loop, cooler, tank and filter first, prefill the case.",
        minutes: 360.0,
        destroys_evidence: true,
        needs_manual: true,
        caution: UNIT_CAUTION,
        ..BASE
    },
    Fault {
        id: FaultId::MotorWornAcross,
        title: "Motor worn across (port plate or bores, side to side)",
        per_hundred: 2.3,
        column: Column::Worn,
        severity: Even,
        effects: ways!([MotorAcross: Times(3.5, 60.0), MotorLeak: Times(1.0, 1.5)]),
        explains: "Oil slips from the high side to the low side inside the motor: speed and push are lost but charge and \
                   drains stay normal.",
        proof: "Pump alone builds pressure at small stroke; with the motor connected and held it does not.",
        repair: "Rebuild or exchange the motor. Clean loop, cooler, tank and filter first, prefill the case.",
        minutes: 360.0,
        destroys_evidence: true,
        needs_manual: true,
        caution: UNIT_CAUTION,
        ..BASE
    },
    Fault {
        id: FaultId::PressureLimiterALow,
        title: "Pressure limiter of side A set low (forward)",
        per_hundred: 0.6,
        effects: ways!([LimiterA: Times(0.88, 0.2)]),
        explains: "The pump takes its stroke back too early going forward: weak pull, no scream, and the engine is hardly \
                   loaded.",
        proof: "Pressure stops low and quietly going forward; it changes when the limiter is cleaned or its parts are \
                swapped over.",
        ..LIMITER_LOW
    },
    Fault {
        id: FaultId::PressureLimiterBLow,
        title: "Pressure limiter of side B set low (reverse)",
        per_hundred: 0.5,
        effects: ways!([LimiterB: Times(0.88, 0.2)]),
        explains: "The pump takes its stroke back too early in reverse: weak pull, no scream, and the engine is hardly \
                   loaded.",
        proof: "Pressure stops low and quietly in reverse; it changes when the limiter is cleaned or its parts are swapped \
                over.",
        ..LIMITER_LOW
    },
    Fault {
        id: FaultId::PressureLimiterStuck,
        title: "Pressure limiter does not act",
        per_hundred: 0.4,
        column: Column::Healthy,
        severity: Even,
        effects: ways!(
            [LimiterA: Times(3.0, 3.0), LimiterB: Times(3.0, 3.0)],
            [LimiterA: Times(3.0, 3.0)],
            [LimiterB: Times(3.0, 3.0)],
        ),
        explains: "Nothing destrokes the pump at its limit: it runs on the loop reliefs, screams and heats the oil.",
        proof: "Relief scream and relief pressure where the limiter should have destroked the pump quietly.",
        repair: "Free, clean or change the limiter; set it as the manual says.",
        minutes: 60.0,
        needs_manual: true,
        caution: "No long pushing against relief: the loop oil heats within seconds.",
        possible: possible::limiter,
        ..BASE
    },
    Fault {
        id: FaultId::LoopHoseRestricted,
        title: "Loop hose collapsed inside or coupling half shut",
        per_hundred: 0.6,
        column: Column::OneSide,
        severity: Even,
        effects: ways!(
            [LineALaminar: Times(5.0, 200.0), LineATurbulent: Times(5.0, 200.0)],
            [LineBLaminar: Times(5.0, 200.0), LineBTurbulent: Times(5.0, 200.0)],
        ),
        explains: "One line takes pressure that should drive the motor; the loss grows with speed, and the hose runs hot \
                   and noisy. A loose liner may do it in one direction only.",
        proof: "Pressure at the two ends of the line differs far more than a few bar (common practice) at full flow.",
        repair: "Change the hose or the coupling.",
        minutes: 60.0,
        caution: "Relieve the loop and chock before a loop hose is opened. Never a hand along a hose under pressure.",
        ..BASE
    },
];
