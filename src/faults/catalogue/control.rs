//! Control: null, linkage, feedback, servo, pilot, signal, interlocks, inching.

use super::{BASE, possible, ways};
use crate::circuit::Param;
use crate::faults::Bend::{Plus, PlusEitherSign, Times, TimesLinear};
use crate::faults::SeverityShape::{Even, MostlyBad, MostlyMild};
use crate::faults::{Column, Fault, FaultId};

const CREEP_CAUTION: &str = "Every driven wheel or track clear of the ground before neutral is tried or turned; one \
                             person in the seat at the stop. The control arm may jump.";

const PLUG_CAUTION: &str = "Engine off before a plug is pulled or moved: the machine can drive off the moment a signal comes back.";

const LINKAGE: Fault = Fault {
    column: Column::Control,
    severity: Even,
    repair: "Refit or set the rod, cable or stop screw; set neutral and both ends again.",
    minutes: 30.0,
    caution: CREEP_CAUTION,
    possible: possible::linkage,
    ..BASE
};

const SIGNAL_LOST: Fault = Fault {
    column: Column::Signal,
    severity: MostlyBad,
    repair: "Mend the wire, plug or earth, change the coil or valve; on pilot controls free or change the line or remote valve.",
    minutes: 45.0,
    caution: PLUG_CAUTION,
    possible: possible::signal,
    ..BASE
};

pub const FAULTS: &[Fault] = &[
    Fault {
        id: FaultId::ControlNullOff,
        title: "Control neutral out of set (creeps)",
        per_hundred: 2.4,
        column: Column::Null,
        severity: MostlyMild,
        effects: ways!([NullControl: PlusEitherSign(0.006, 0.08)]),
        explains: "The control asks for a little stroke with the lever at rest: the machine creeps, and neutral charge \
                   reads as it does in drive.",
        proof: "Creep stops with the servo ports bridged (with no servo: with the lever rod off) and comes back without.",
        repair: "Set the control's neutral in the manual's order, between the two points where each direction just starts.",
        minutes: 30.0,
        needs_manual: true,
        caution: CREEP_CAUTION,
        ..BASE
    },
    Fault {
        id: FaultId::ServoNullOff,
        title: "Servo piston neutral out of set",
        per_hundred: 0.7,
        column: Column::Null,
        severity: MostlyMild,
        effects: ways!([NullServo: PlusEitherSign(0.01, 0.15)]),
        explains: "The servo piston's centre stands off zero. A feedback control pulls most of it back, so the servo \
                   ports are unequal in neutral while creep is small.",
        proof: "Creep with the servo ports bridged.",
        repair: "Set the servo's mechanical centre in small steps as the manual says, ports bridged.",
        minutes: 45.0,
        needs_manual: true,
        caution: "Bridge only ports identified by two signs, with a hose rated for loop pressure. Engine off to fit and \
                  to remove.",
        possible: possible::servo,
        ..BASE
    },
    Fault {
        id: FaultId::LinkageShortForward,
        title: "Linkage or stop gives short stroke forward",
        per_hundred: 1.6,
        effects: ways!([GainForward: Times(0.93, 0.30)]),
        explains: "Rod, cable or stop keeps the pump from full stroke going forward: slow forward, pull normal, charge normal.",
        proof: "Moved by hand at the pump the arm goes further forward and speed comes back.",
        ..LINKAGE
    },
    Fault {
        id: FaultId::LinkageShortReverse,
        title: "Linkage or stop gives short stroke in reverse",
        per_hundred: 1.4,
        effects: ways!([GainReverse: Times(0.93, 0.30)]),
        explains: "Rod, cable or stop keeps the pump from full stroke in reverse: slow in reverse, pull normal, charge normal.",
        proof: "Moved by hand at the pump the arm goes further in reverse and speed comes back.",
        ..LINKAGE
    },
    Fault {
        id: FaultId::FeedbackLinkWorn,
        title: "Feedback link worn or loose",
        per_hundred: 0.7,
        column: Column::Control,
        severity: Even,
        effects: ways!([
            NullControl: PlusEitherSign(0.003, 0.05),
            GainForward: Times(0.98, 0.75),
            GainReverse: Times(0.98, 0.75),
            ResponseOut: Times(1.0, 1.6),
        ]),
        explains: "The servo does not know where the swash stands: neutral wanders, the drive hunts, and the lever's answer \
                   changes from day to day.",
        proof: "Neutral found from forward and from reverse differs each time; play felt in the link.",
        repair: "Change pin, bush or link; set neutral again.",
        minutes: 90.0,
        needs_manual: true,
        caution: CREEP_CAUTION,
        possible: possible::feedback_link,
        ..BASE
    },
    Fault {
        id: FaultId::StrokeStuck,
        title: "Stroke stuck: keeps going with the lever in neutral",
        per_hundred: 0.9,
        column: Column::Null,
        severity: MostlyBad,
        effects: ways!([
            NullControl: PlusEitherSign(0.15, 0.9),
            GainForward: Times(0.6, 0.02),
            GainReverse: Times(0.6, 0.02),
        ]),
        explains: "Spool, servo or swash does not come back to the middle: the machine keeps driving whatever the lever says.",
        proof: "With the engine stopped: spool, servo or swash found jammed when opened. Never proved by driving.",
        repair: "Free or change the stuck part; find the dirt or the broken spring that jammed it.",
        minutes: 180.0,
        needs_manual: true,
        stop_work: true,
        caution: "Do not test. Stop the engine, chock both ways, do not drive it onto a trailer.",
        ..BASE
    },
    Fault {
        id: FaultId::ServoLeak,
        title: "Servo piston or its seals leak",
        per_hundred: 0.5,
        column: Column::Control,
        severity: Even,
        effects: ways!(
            [ServoLeak: Plus(0.05, 1.2), ResponseOut: Times(1.1, 2.5), GainForward: Times(1.0, 0.75), GainReverse: Times(1.0, 0.75)],
            [ServoLeak: Plus(0.05, 1.2), ResponseOut: Times(1.1, 2.5), GainForward: Times(0.98, 0.6)],
            [ServoLeak: Plus(0.05, 1.2), ResponseOut: Times(1.1, 2.5), GainReverse: Times(0.98, 0.6)],
        ),
        explains: "Servo oil escapes while stroked: slow to answer, short of stroke hot, and charge a little lower in drive \
                   than flushing explains.",
        proof: "Two gauges on the servo ports: the stroked side does not reach the pressure asked, with good supply and signal.",
        repair: "Reseal or rebuild the servo.",
        minutes: 180.0,
        needs_manual: true,
        possible: possible::servo,
        ..BASE
    },
    Fault {
        id: FaultId::ControlOrificeBlocked,
        title: "Control orifice blocked",
        per_hundred: 0.7,
        column: Column::Control,
        severity: Even,
        effects: ways!(
            [ResponseOut: Times(2.0, 10.0), ResponseBack: Times(1.5, 8.0)],
            [ResponseOut: Times(2.0, 10.0)],
            [ResponseBack: Times(2.0, 10.0)],
        ),
        explains: "Oil creeps to or from the servo: slow to answer or slow to stop, while every steady reading is right.",
        proof: "Stopwatch: well over this unit's own time with warm oil; dirt found in the orifice.",
        repair: "Clear or change the orifice as the manual says; same size back.",
        minutes: 40.0,
        needs_manual: true,
        caution: "Slow to stop is dangerous: try only with wheels or tracks clear of the ground.",
        possible: possible::servo,
        ..BASE
    },
    Fault {
        id: FaultId::PilotSupplyLow,
        title: "Pilot or control supply low",
        per_hundred: 0.8,
        column: Column::Control,
        severity: Even,
        effects: ways!([PilotSupply: TimesLinear(0.85, 0.1)]),
        explains: "The control cannot ask for full stroke: slow both ways alike, charge and leakage normal.",
        proof: "Gauge on the pilot line under full lever below this unit's figure, both directions alike.",
        repair: "Put the supply right: reducing valve, filter, cut-off solenoid, line.",
        minutes: 45.0,
        caution: PLUG_CAUTION,
        possible: possible::pilot_supply,
        ..BASE
    },
    Fault {
        id: FaultId::SignalLostForward,
        title: "No or little signal forward (wire, coil, pilot line)",
        per_hundred: 1.7,
        effects: ways!([SignalForward: TimesLinear(0.5, 0.0)]),
        explains: "The control is not told to go forward: no or poor drive forward, reverse normal, the engine not loaded.",
        proof: "Coil current or pilot pressure missing forward; the fault changes direction when the two plugs are swapped.",
        ..SIGNAL_LOST
    },
    Fault {
        id: FaultId::SignalLostReverse,
        title: "No or little signal in reverse (wire, coil, pilot line)",
        per_hundred: 1.3,
        effects: ways!([SignalReverse: TimesLinear(0.5, 0.0)]),
        explains: "The control is not told to reverse: no or poor drive in reverse, forward normal, the engine not loaded.",
        proof: "Coil current or pilot pressure missing in reverse; the fault changes direction when the two plugs are swapped.",
        ..SIGNAL_LOST
    },
    Fault {
        id: FaultId::SignalWeak,
        title: "Control signal weak both ways (volts, earth, hot coil, calibration)",
        per_hundred: 3.3,
        column: Column::Signal,
        severity: Even,
        effects: ways!([SignalForward: TimesLinear(0.9, 0.45), SignalReverse: TimesLinear(0.9, 0.45)]),
        explains: "Low volts, a poor earth or a hot coil leave too little current: short stroke both ways, worse hot, with \
                   no leak anywhere.",
        proof: "Coil current at full lever below this unit's figure, both directions; volts and earth tell which.",
        repair: "Mend supply or earth, change the coil, calibrate as the manual says.",
        minutes: 45.0,
        caution: PLUG_CAUTION,
        possible: possible::weak_signal,
        ..BASE
    },
    Fault {
        id: FaultId::InterlockOrDerate,
        title: "Interlock or controller holds the drive back (seat, door, brake, temperature)",
        per_hundred: 8.0,
        column: Column::Signal,
        severity: Even,
        effects: ways!(
            [SignalForward: TimesLinear(0.03, 0.0), SignalReverse: TimesLinear(0.03, 0.0), PilotSupply: TimesLinear(0.05, 0.0)],
            [
                SignalForward: TimesLinear(0.03, 0.0), SignalReverse: TimesLinear(0.03, 0.0),
                PilotSupply: TimesLinear(0.05, 0.0), ReleaseShare: TimesLinear(0.1, 0.0), BrakeDrag: Plus(60.0, 250.0),
            ],
            [SignalForward: TimesLinear(0.75, 0.3), SignalReverse: TimesLinear(0.75, 0.3)],
        ),
        explains: "A switch or the controller refuses or limits travel in both directions; the hydraulics are not asked.",
        proof: "Warning lamp or stored code, or coil current that comes with the switch made as the manual says.",
        repair: "Mend the switch, its wiring or what it warns of. Leave no switch bridged.",
        minutes: 30.0,
        caution: "Never strap a seat or door switch down to drive. With the fault mended the machine may move at once.",
        possible: possible::interlock,
        ..BASE
    },
    Fault {
        id: FaultId::InchingOff,
        title: "Inching pedal, cable or valve bleeds the control",
        per_hundred: 1.1,
        column: Column::Control,
        severity: Even,
        effects: ways!([Inching: TimesLinear(0.85, 0.1)]),
        explains: "Control pressure leaks away at the inching valve: short stroke both ways at every engine speed.",
        proof: "Control pressure against engine speed comes right with the pedal cable off and the valve shut.",
        repair: "Set pedal free play and cable; clean or change the inching valve.",
        minutes: 30.0,
        caution: CREEP_CAUTION,
        possible: possible::inching,
        ..BASE
    },
];
