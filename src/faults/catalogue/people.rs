//! Nothing wrong, people, and what the list does not hold.

use super::{BASE, ways};
use crate::circuit::Param;
use crate::faults::Bend::{Plus, PlusEitherSign, Times, TimesLinear};
use crate::faults::SeverityShape::Even;
use crate::faults::{Column, Fault, FaultId};

pub const FAULTS: &[Fault] = &[
    Fault {
        id: FaultId::Healthy,
        title: "Nothing wrong in the drive",
        per_hundred: 4.0,
        explains: "Every reading taken fits a healthy unit at this speed, temperature and lever.",
        proof: "Readings inside their windows warm and loaded, in both directions, and the complaint does not show.",
        repair: "None in the drive. Look at load, ground, tyres and how it is driven, and ask when it happens.",
        minutes: 10.0,
        ..BASE
    },
    Fault {
        id: FaultId::AssemblyError,
        title: "Put together wrongly (hoses crossed, rotation, wrong part, drain shut)",
        per_hundred: 2.0,
        severity: Even,
        effects: ways!(
            [NullControl: PlusEitherSign(0.02, 0.3)],
            [Air: Plus(0.1, 0.9)],
            [ChargeDrive: TimesLinear(0.15, 0.0)],
            [ReliefSet: Times(0.88, 0.5)],
            [MotorCaseLine: Times(60.0, 3000.0)],
            [LineBLaminar: Times(5.0, 200.0), LineBTurbulent: Times(5.0, 200.0)],
        ),
        explains: "After a repair almost any reading can be wrong. What was touched last is the first suspect.",
        proof: "The part, hose or rotation mark compared with the manual or with the other side.",
        repair: "Put it right; then prefill, prove charge, and run in before it pulls.",
        minutes: 120.0,
        needs_manual: true,
        caution: "Crossed hoses make it drive the other way: first start with every driven wheel clear of the ground.",
        ..BASE
    },
    Fault {
        id: FaultId::OperatorOrLoad,
        title: "Operator, load, ground or tyres",
        per_hundred: 3.4,
        severity: Even,
        explains: "The machine is asked for more than it has, or in the wrong range: the drive itself reads healthy.",
        proof: "A second machine of the kind does no better in the same place with the same load.",
        repair: "Show the range and the limit; tyres, track tension, attachment, load.",
        minutes: 20.0,
        ..BASE
    },
    Fault {
        id: FaultId::NotListed,
        title: "Something that is not on this list",
        per_hundred: 3.0,
        column: Column::Healthy,
        severity: Even,
        explains: "No listed cause explains the readings well.",
        proof: "First check gauge, port, side, direction and condition of the readings that fit worst; then look outside this list.",
        repair: "Take the doubtful readings again before anything is opened.",
        minutes: 30.0,
        ..BASE
    },
];
