//! Flushing: operating relief, orifice, shuttle.

use super::{BASE, possible, ways};
use crate::circuit::Param;
use crate::faults::Bend::{PlusGeometric, Times, TimesLinear};
use crate::faults::SeverityShape::{Even, MostlyBad};
use crate::faults::{Column, Fault, FaultId};

const CAUTION: &str = "Engine off, loop bled and machine chocked: pressure can stay behind the plug, and the spring flies.";

const FLUSHING: Fault = Fault {
    column: Column::Flushing,
    caution: CAUTION,
    possible: possible::flushing,
    ..BASE
};

const STUCK: Fault = Fault {
    column: Column::OneSide,
    severity: MostlyBad,
    repair: "Take the shuttle out, clean or change it, look at its bore and at both springs.",
    minutes: 45.0,
    ..FLUSHING
};

pub const FAULTS: &[Fault] = &[
    Fault {
        id: FaultId::OperatingReliefLow,
        title: "Operating (flushing) relief set low or stuck open",
        per_hundred: 0.35,
        severity: Even,
        effects: ways!([OperatingSet: Times(0.90, 0.30)]),
        explains: "Charge is good in neutral and falls too far as soon as the machine drives, the same in both directions.",
        proof: "Large equal fall forward and reverse at half stroke with light load; dirt or a weak spring in the relief.",
        repair: "Clean, shim or change the operating relief to the manual's figure.",
        minutes: 30.0,
        needs_manual: true,
        ..FLUSHING
    },
    Fault {
        id: FaultId::OperatingReliefHigh,
        title: "Operating (flushing) relief set high or stuck shut",
        per_hundred: 0.2,
        severity: Even,
        effects: ways!([OperatingSet: Times(1.07, 1.8)]),
        explains: "Charge does not fall in drive, so no hot oil leaves the loop: the drive is well until it is hot.",
        proof: "No fall in either direction, and the relief found shut, wrongly shimmed or with the wrong spring.",
        repair: "Clean, shim or change the operating relief to the manual's figure.",
        minutes: 30.0,
        needs_manual: true,
        ..FLUSHING
    },
    Fault {
        id: FaultId::FlushingOrificeBlocked,
        title: "Flushing orifice blocked",
        per_hundred: 0.3,
        severity: MostlyBad,
        effects: ways!([FlushOrifice: Times(0.3, 0.01)]),
        explains: "Shuttle and relief work but nothing passes: loop and motor run hot though charge looks good.",
        proof: "The plug out and the orifice found blocked.",
        repair: "Clear the orifice; find what blocked it.",
        minutes: 30.0,
        ..FLUSHING
    },
    Fault {
        id: FaultId::ShuttleCentred,
        title: "Flushing shuttle stuck in the middle",
        per_hundred: 0.4,
        severity: MostlyBad,
        effects: ways!([ShuttleTravel: TimesLinear(0.3, 0.0)]),
        explains: "The low side never reaches the operating relief: charge does not fall in drive and the loop runs hot.",
        proof: "The spool does not slide freely in its bore, or a spring is broken.",
        repair: "Take the shuttle out, clean or change it, look at its bore and at both springs.",
        minutes: 45.0,
        possible: possible::shuttle_centre,
        ..FLUSHING
    },
    Fault {
        id: FaultId::ShuttleStuckA,
        title: "Flushing shuttle stuck open to side A",
        per_hundred: 0.3,
        effects: ways!([ShuttleStuckA: PlusGeometric(0.04, 1.0), ShuttleTravel: TimesLinear(0.3, 0.0)]),
        explains: "Forward, high-pressure oil leaves through the flushing relief: weak forward, normal in reverse, and the \
                   motor drain runs full.",
        proof: "Weak forward only with a great deal of motor drain oil; the spool found stuck towards side A.",
        ..STUCK
    },
    Fault {
        id: FaultId::ShuttleStuckB,
        title: "Flushing shuttle stuck open to side B",
        per_hundred: 0.25,
        effects: ways!([ShuttleStuckB: PlusGeometric(0.04, 1.0), ShuttleTravel: TimesLinear(0.3, 0.0)]),
        explains: "In reverse, high-pressure oil leaves through the flushing relief: weak in reverse, normal forward, and \
                   the motor drain runs full.",
        proof: "Weak in reverse only with a great deal of motor drain oil; the spool found stuck towards side B.",
        ..STUCK
    },
];
