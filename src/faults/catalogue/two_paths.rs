//! What only a machine with two paths can have: left and right that do not match.

use super::{BASE, possible, ways};
use crate::circuit::Param;
use crate::faults::Bend::{PlusEitherSign, Times};
use crate::faults::SeverityShape::{Even, MostlyMild};
use crate::faults::{Column, Fault, FaultId};

const TRACKING_CAUTION: &str = "Tracks or wheels clear of the ground while anything is turned, one person in the seat at the stop. \
                                Path runs on level, empty ground only.";

pub const FAULTS: &[Fault] = &[
    Fault {
        id: FaultId::PathsNullMismatch,
        title: "Neutral of this side does not match the other",
        per_hundred: 1.2,
        column: Column::Null,
        severity: Even,
        effects: ways!([NullControl: PlusEitherSign(0.005, 0.03)]),
        explains: "One side starts earlier than the other or creeps alone: forward it bends one way, in reverse the other, the \
                   less the faster it goes.",
        proof: "Start points of both sides alike after setting; the bend is gone at low lever, forward and reverse.",
        repair: "Set the neutral of this side between its two start points, then compare both at low lever.",
        minutes: 35.0,
        needs_manual: true,
        caution: TRACKING_CAUTION,
        possible: possible::two_paths,
        ..BASE
    },
    Fault {
        id: FaultId::PathsStrokeMismatch,
        title: "Stroke of this side does not match the other",
        per_hundred: 1.2,
        column: Column::Control,
        severity: Even,
        effects: ways!([GainForward: Times(0.985, 0.85), GainReverse: Times(0.985, 0.85)]),
        explains: "One side strokes less for the same lever: it bends to that side forward and in reverse, alike at any speed.",
        proof: "Wheel turns alike left and right at half and at full lever after setting.",
        repair: "Set the linkage ratio or the controller's gain of this side; at full lever take the faster side back at its stop, never \
                 screw the slow side past its own.",
        minutes: 40.0,
        needs_manual: true,
        caution: TRACKING_CAUTION,
        possible: possible::two_paths,
        ..BASE
    },
    Fault {
        id: FaultId::TyreOrTrackMismatch,
        title: "Tyre or track of this side is smaller",
        per_hundred: 1.5,
        column: Column::Healthy,
        severity: MostlyMild,
        effects: ways!([Rolling: Times(0.99, 0.92)]),
        explains: "Wheel turns are alike and the path still bends to this side, forward and in reverse: rolling circumference, tyre \
                   pressure or track tension.",
        proof: "Roll-out marks alike within 1 % after pressure, tyre or tension was put right.",
        repair: "Tyre pressures and roll-out first, then track tension and sprockets; pair worn tyres.",
        minutes: 20.0,
        caution: TRACKING_CAUTION,
        possible: possible::two_paths,
        ..BASE
    },
];
