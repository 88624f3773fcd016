//! Charge side: oil, inlet, charge pump, filter, neutral relief, consumers.

use super::{BASE, possible, ways};
use crate::circuit::Param;
use crate::faults::Bend::{Plus, PlusGeometric, Times, TimesLinear};
use crate::faults::SeverityShape::{Even, MostlyBad, MostlyMild};
use crate::faults::{Column, Fault, FaultId};

pub const FAULTS: &[Fault] = &[
    Fault {
        id: FaultId::OilLow,
        title: "Oil level low",
        per_hundred: 3.5,
        column: Column::Air,
        severity: Even,
        effects: ways!([Air: Plus(0.05, 0.95)]),
        explains: "The charge pump takes air with the oil: charge falls and swings, worst on a slope or in a turn, and \
                   the drive goes weak and noisy both ways.",
        proof: "Level below the mark, machine level and cylinders as the manual says; topped up, foam gone and charge steady.",
        repair: "Find where the oil went, then top up with the right oil and let the air settle out.",
        minutes: 15.0,
        caution: "Hot oil, and the cap may be under pressure: open it slowly. Look for the leak with a card or a stick, \
                  never a hand.",
        ..BASE
    },
    Fault {
        id: FaultId::InletRestricted,
        title: "Charge pump inlet restricted (strainer, suction filter, hose)",
        per_hundred: 1.9,
        column: Column::Inlet,
        severity: Even,
        effects: ways!([SuctionLaminar: Times(1.8, 80.0), SuctionTurbulent: Times(1.8, 80.0)]),
        explains: "The charge pump cannot fill: its flow goes flat however fast the engine turns. Charge is good at low \
                   idle and fails at speed or cold.",
        proof: "Inlet pull high at high idle and less at low idle; gone with a clean strainer, a new element or the hose \
                replaced.",
        repair: "Clean or change strainer and suction filter; look for a hose gone soft or a rag in the tank.",
        minutes: 30.0,
        destroys_evidence: true,
        caution: "Keep the old element and cut it open before it is thrown away.",
        ..BASE
    },
    Fault {
        id: FaultId::InletAir,
        title: "Suction line draws air",
        per_hundred: 2.5,
        column: Column::Air,
        severity: Even,
        effects: ways!([Air: Plus(0.05, 0.7)]),
        explains: "Air comes in at a clamp, hose or seal before the charge pump though the level is right. Charge falls \
                   and swings, the drive surges, and the inlet pull reads less than normal.",
        proof: "Foam with a good level; grease or oil on the suspect joint and the noise and foam change.",
        repair: "Tighten or change clamps, hose, O-rings and pump shaft seal on the suction side; bleed.",
        minutes: 40.0,
        caution: "Oil or grease on the joint only with hands clear of belts, fans and shafts.",
        ..BASE
    },
    Fault {
        id: FaultId::ChargePumpWorn,
        title: "Charge pump worn",
        per_hundred: 1.6,
        column: Column::Charge,
        severity: Even,
        effects: ways!([ChargeSlip: Times(3.0, 45.0)]),
        explains: "The same litres are missing at every speed: charge is poor at hot low idle long before it shows at \
                   high idle, and it climbs late as revs rise.",
        proof: "Total return flow low at two speeds with a good inlet pull and the consumers capped.",
        repair: "Change or rebuild the charge pump; find out what wore it.",
        minutes: 180.0,
        needs_manual: true,
        ..BASE
    },
    Fault {
        id: FaultId::ChargeDriveFailed,
        title: "Charge pump not driven (sheared coupling, key or tang)",
        per_hundred: 0.5,
        column: Column::Dead,
        severity: Even,
        effects: ways!([ChargeDrive: TimesLinear(0.08, 0.0)]),
        explains: "No charge at all: the loop empties, the servo has nothing to work with, and there is no drive either way.",
        proof: "Charge reads nothing on a gauge proved on another port, and no return flow; then the coupling in the hand.",
        repair: "Change the coupling, key or shaft, and the pump if it seized.",
        minutes: 240.0,
        needs_manual: true,
        caution: "No charge is no braking from the drive: chock both ways before anything else.",
        possible: possible::own_charge_pump,
        ..BASE
    },
    Fault {
        id: FaultId::ChargeFilterBlocked,
        title: "Charge filter blocked",
        per_hundred: 1.0,
        column: Column::Charge,
        severity: MostlyMild,
        effects: ways!([FilterLaminar: Times(3.0, 80.0)]),
        explains: "In the suction line it starves the charge pump; on the pressure side it runs on its bypass, and a \
                   gauge before it reads high while the gallery does not.",
        proof: "Filter sign tripped with warm oil, or the gauge changes when it is moved to the other side of the filter.",
        repair: "Change the element. Cut the old one open and look in the pleats.",
        minutes: 15.0,
        destroys_evidence: true,
        caution: "Keep the old element: metal in it decides what comes next.",
        ..BASE
    },
    Fault {
        id: FaultId::NeutralReliefLow,
        title: "Charge relief set low or spring weak",
        per_hundred: 0.6,
        column: Column::Charge,
        severity: Even,
        effects: ways!([ReliefSet: Times(0.88, 0.45)]),
        explains: "Charge stands low by the same amount at every speed, flow is normal, and it stops rising early.",
        proof: "Low at low and at high idle alike with normal return flow; spring length and shims against the manual.",
        repair: "Shim, set or change the relief to the manual's figure.",
        minutes: 30.0,
        needs_manual: true,
        ..BASE
    },
    Fault {
        id: FaultId::NeutralReliefStuckOpen,
        title: "Charge relief held off its seat",
        per_hundred: 1.1,
        column: Column::Charge,
        severity: Even,
        effects: ways!([ReliefHeld: PlusGeometric(1.0, 7.0)]),
        explains: "Dirt or a damaged seat bleeds charge like a hole: very low at low idle, nearly right at high idle. The \
                   oil still comes back, so return flow is normal.",
        proof: "Low idle charge far under high idle with normal return flow; dirt or a score found on the seat.",
        repair: "Take the relief out, clean it, change it if seat or cone is marked.",
        minutes: 30.0,
        caution: "Engine off and charge bled: the spring can throw the plug.",
        ..BASE
    },
    Fault {
        id: FaultId::NeutralReliefHigh,
        title: "Charge relief set high or stuck shut",
        per_hundred: 0.2,
        column: Column::Healthy,
        severity: Even,
        effects: ways!([ReliefSet: Times(1.12, 1.8)]),
        explains: "Charge stands high above case at every speed; the fall from neutral to drive grows, and seals suffer.",
        proof: "Charge less case pressure is above the setting warm, and case pressure itself is normal.",
        repair: "Set, shim or change the relief to the manual's figure.",
        minutes: 30.0,
        needs_manual: true,
        caution: "Measure case pressure first: a restricted return lifts the gauge just the same.",
        ..BASE
    },
    Fault {
        id: FaultId::ConsumerLeak,
        title: "Brake, shift or pilot line leaks charge oil away",
        per_hundred: 2.4,
        column: Column::Charge,
        severity: Even,
        effects: ways!(
            [ConsumerLeak: PlusGeometric(0.5, 6.0)],
            [ConsumerLeak: PlusGeometric(0.5, 6.0), ReleaseShare: TimesLinear(0.97, 0.5)],
        ),
        explains: "A seal or valve fed from charge passes oil while it is switched on: it looks like a worn charge pump, \
                   worst at low idle.",
        proof: "Charge comes back when that line is capped with rated caps, or when its valve is switched off.",
        repair: "Change the leaking seal or valve.",
        minutes: 60.0,
        caution: "A capped brake line leaves the brake on, or on some units lets the machine roll: chock both ways. Never \
                  cap a drain.",
        possible: possible::consumers,
        ..BASE
    },
    Fault {
        id: FaultId::ChargeStarvedByFunction,
        title: "Another function takes the charge oil (steering, implement)",
        per_hundred: 0.8,
        column: Column::Charge,
        severity: MostlyBad,
        effects: ways!(
            [ChargeFeed: TimesLinear(0.8, 0.05)],
            [ChargeFeed: TimesLinear(1.0, 0.85)],
        ),
        explains: "Where charge is fed from another circuit's return, that circuit at its stop or with a stuck valve \
                   leaves little for the drive.",
        proof: "Charge falls while the steering is held at its stop or a cylinder extends, and comes back when released.",
        repair: "Put the feeding circuit right: priority valve, relief, or a valve that does not centre.",
        minutes: 60.0,
        caution: "Keep everyone out of the reach of arms and of the pinch at the articulation while the function is worked.",
        possible: possible::fed_by_function,
        ..BASE
    },
];
