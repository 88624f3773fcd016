//! Heat and oil: case return, cooler, viscosity, water.

use super::{BASE, possible, ways};
use crate::circuit::Param;
use crate::faults::Bend::{Plus, Times};
use crate::faults::SeverityShape::{Even, MostlyBad, MostlyMild};
use crate::faults::{Column, Fault, FaultId};

const OIL_CAUTION: &str =
    "Hot oil scalds. Take a sample and look in the filter before new oil goes in.";

pub const FAULTS: &[Fault] = &[
    Fault {
        id: FaultId::CaseReturnRestricted,
        title: "Case return restricted (hose, cooler, filter, check)",
        per_hundred: 0.8,
        column: Column::Heat,
        severity: MostlyMild,
        effects: ways!(
            [PumpCaseLine: Times(2.5, 15.0), PumpCaseTurbulent: Times(2.5, 15.0), HeatRise: Times(1.02, 1.4)],
            [MotorCaseLine: Times(4.0, 60.0), HeatRise: Times(1.02, 1.3)],
        ),
        explains: "Case pressure stands high, so the charge gauge reads high while charge above case is unchanged. Shaft \
                   seals weep.",
        proof: "Case pressure high warm at high idle, and lower once the return is opened or changed.",
        repair: "Clear or change return hose, cooler, return filter or check.",
        minutes: 60.0,
        caution: "Never cap or throttle a drain to test: the housing bursts or the seal is thrown.",
        ..BASE
    },
    Fault {
        id: FaultId::CaseCouplingShut,
        title: "Drain coupling not pushed home or plugged",
        per_hundred: 0.5,
        column: Column::Heat,
        severity: MostlyBad,
        effects: ways!(
            [PumpCaseLine: Times(10.0, 60.0), PumpCaseTurbulent: Times(3.0, 20.0)],
            [MotorCaseLine: Times(60.0, 3000.0)],
        ),
        explains: "The case cannot drain: its pressure climbs until the shaft seal goes. Mostly just after a repair or an \
                   attachment change.",
        proof: "The coupling found loose, half home or shut.",
        repair: "Push it home or open it; then look at the shaft seal.",
        minutes: 10.0,
        caution: "Do not run the engine until the drain is proved open. Stay clear of shaft seals.",
        ..BASE
    },
    Fault {
        id: FaultId::CoolerBypassing,
        title: "Cooler bypassed (thermostat or bypass valve stuck)",
        per_hundred: 0.7,
        column: Column::Heat,
        severity: Even,
        effects: ways!([HeatRise: Times(1.25, 2.2)]),
        explains: "Oil goes past the cooler: the drive is good cold and thins out hot.",
        proof: "Oil hot, cooler cool, hardly any difference between its two hoses, fins clean.",
        repair: "Free or change thermostat or bypass valve.",
        minutes: 45.0,
        possible: possible::cooler,
        ..BASE
    },
    Fault {
        id: FaultId::CoolerDirty,
        title: "Cooler dirty or fan slow",
        per_hundred: 3.4,
        column: Column::Heat,
        severity: Even,
        effects: ways!([HeatRise: Times(1.25, 2.2)]),
        explains: "Too little air takes too little heat: the drive is good cold and weak hot. The commonest cause of heat.",
        proof: "No light through the fins, or the fan below its speed; oil hot into and hot out of the cooler.",
        repair: "Clean the fins from the clean side, put fan, belt or fan drive right.",
        minutes: 30.0,
        caution: "Engine off and fan at rest: electric fans start by themselves. Goggles with an air line.",
        ..BASE
    },
    Fault {
        id: FaultId::OilTooThin,
        title: "Oil too thin (grade, sheared, fuel in it)",
        per_hundred: 0.6,
        column: Column::Heat,
        severity: Even,
        effects: ways!([Viscosity: Times(0.75, 0.3)]),
        explains: "Everything leaks a little more, as if every part were worn at once.",
        proof: "A sample runs down faster than new oil of the right grade at the same temperature.",
        repair: "Drain, flush and fill with the right oil; change the filter.",
        minutes: 120.0,
        destroys_evidence: true,
        caution: OIL_CAUTION,
        ..BASE
    },
    Fault {
        id: FaultId::OilTooThick,
        title: "Oil too thick (grade, or cold)",
        per_hundred: 0.4,
        column: Column::Inlet,
        severity: MostlyMild,
        effects: ways!([Viscosity: Times(1.8, 8.0)]),
        explains: "The inlet starves, case pressures stand high and the drive is slow and noisy until warm.",
        proof: "Comes right when warm, or a sample runs down slower than new oil of the right grade.",
        repair: "Warm it up gently; fill with the right grade.",
        minutes: 120.0,
        destroys_evidence: true,
        caution: OIL_CAUTION,
        ..BASE
    },
    Fault {
        id: FaultId::WrongOrWetOil,
        title: "Wrong oil, or water in it",
        per_hundred: 0.8,
        column: Column::Heat,
        severity: Even,
        effects: ways!(
            [Viscosity: Times(0.8, 0.4)],
            [Viscosity: Times(1.2, 3.0)],
            [Air: Plus(0.03, 0.3)],
        ),
        explains: "The wrong oil leaks or foams; water turns it milky, foams, and eats bearings.",
        proof: "Milky, or it crackles on a hot plate; or the label on the drum.",
        repair: "Drain, flush and fill with the right oil; find where the water came in.",
        minutes: 150.0,
        destroys_evidence: true,
        caution: "A drop only on the hot plate, goggles on: water in it spits.",
        ..BASE
    },
];
