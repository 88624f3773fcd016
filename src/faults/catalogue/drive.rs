//! Drive: motor shift, brakes, driveline, pump drive, engine.

use super::{BASE, possible, ways};
use crate::circuit::Param;
use crate::faults::Bend::{Plus, Times, TimesLinear};
use crate::faults::SeverityShape::{Even, MostlyBad, MostlyMild};
use crate::faults::{Column, Fault, FaultId};

pub const FAULTS: &[Fault] = &[
    Fault {
        id: FaultId::MotorStuckSmall,
        title: "Motor stuck in the small (fast) position",
        per_hundred: 0.5,
        column: Column::Motor,
        severity: MostlyBad,
        effects: ways!([MotorShift: Times(0.85, 0.45)]),
        explains: "Too fast in the low range with poor pull: the motor turns faster and needs more pressure for the same \
                   work. Charge says nothing.",
        proof: "Shift line right for the large position, yet wheel speed stays that of the small one.",
        repair: "Free or change the shift spool or its piston; on units shifted by spring, the spring.",
        minutes: 120.0,
        needs_manual: true,
        possible: possible::two_speed,
        ..BASE
    },
    Fault {
        id: FaultId::MotorStuckLarge,
        title: "Motor stuck in the large (slow) position",
        per_hundred: 0.5,
        column: Column::Motor,
        severity: Even,
        explains: "Only top speed is missing: the low range is normal, and every reading taken in it is normal.",
        proof: "Shift pressure is there when the fast range is asked, yet wheel speed does not change.",
        repair: "Free or change the shift spool or its piston.",
        minutes: 120.0,
        needs_manual: true,
        possible: possible::two_speed,
        ..BASE
    },
    Fault {
        id: FaultId::MotorShiftSupplyLow,
        title: "Shift pressure low or missing",
        per_hundred: 0.7,
        column: Column::Motor,
        severity: Even,
        effects: ways!([ShiftShare: TimesLinear(0.7, 0.0)]),
        explains: "The motor is not pushed into the other position, or only one side shifts: no fast range, or it drops out.",
        proof: "Gauge on the shift line with the range asked: below this unit's figure while charge is good.",
        repair: "Mend valve, coil, wire or line of the shift.",
        minutes: 45.0,
        caution: "A one-sided shift turns the machine: try it with wheels or tracks clear of the ground.",
        possible: possible::shift_supply,
        ..BASE
    },
    Fault {
        id: FaultId::BrakeDragging,
        title: "Brake drags (mechanical)",
        per_hundred: 2.9,
        column: Column::Drag,
        severity: Even,
        effects: ways!([BrakeDrag: Plus(25.0, 150.0), HeatRise: Times(1.03, 1.5)]),
        explains: "The drive works against its own brake though release pressure is good: loop pressure is high with the \
                   wheels clear, the hub gets hot, the engine pulls down.",
        proof: "Hub, disc or drum hot and hard to turn with full release pressure on the line.",
        repair: "Free or overhaul the brake.",
        minutes: 120.0,
        caution: "A dragging brake burns: let it cool, keep oil and rags away. Chock before the brake is slackened.",
        ..BASE
    },
    Fault {
        id: FaultId::BrakeNotReleased,
        title: "Brake not released (valve, coil, seal, low pressure)",
        per_hundred: 4.3,
        column: Column::Drag,
        severity: MostlyBad,
        effects: ways!([ReleaseShare: TimesLinear(0.7, 0.0), BrakeDrag: Plus(30.0, 280.0)]),
        explains: "Too little pressure reaches the brake to lift it: the drive pulls against it or does not move at all, \
                   with good charge and stroke.",
        proof: "Gauge on the release line while travel is asked: below the brake's release pressure.",
        repair: "Mend the release valve, coil, wire or brake seal.",
        minutes: 60.0,
        caution: "When it lets go the machine may jerk away: chock, nobody in front or behind.",
        possible: possible::released_brake,
        ..BASE
    },
    Fault {
        id: FaultId::DrivetrainSlipping,
        title: "Driveline slips (shaft, hub, gearbox, final drive)",
        per_hundred: 1.9,
        column: Column::Slip,
        severity: MostlyBad,
        effects: ways!([DriveGrip: TimesLinear(0.9, 0.0)]),
        explains: "The motor turns and the wheel does not, or not as much: no pull, low loop pressure, no heat in the oil.",
        proof: "Chalk mark on motor shaft and wheel: the shaft turns, the wheel stays behind.",
        repair: "Change the stripped spline, key, coupling or final drive part.",
        minutes: 240.0,
        caution: "The machine may roll with the drive in neutral and the brake upstream of the break: chock both ways.",
        ..BASE
    },
    Fault {
        id: FaultId::InputDriveSlipping,
        title: "Pump drive slips (belt, clutch, coupling, spline)",
        per_hundred: 2.0,
        column: Column::Slip,
        severity: MostlyMild,
        effects: ways!([InputGrip: Times(0.95, 0.1)]),
        explains: "The engine holds its speed while the pump shaft falls behind under load: slow, weak, charge falls with it.",
        proof: "Tachometer on the pump shaft against the crankshaft, loaded: they part.",
        repair: "Tension or change the belt, clutch, coupling or spline.",
        minutes: 45.0,
        caution: "Belts and couplings take fingers and sleeves: guards on, tape stuck on at standstill only.",
        possible: possible::slipping_drive,
        ..BASE
    },
    Fault {
        id: FaultId::EngineLugging,
        title: "Engine short of power",
        per_hundred: 3.4,
        column: Column::Engine,
        severity: Even,
        effects: ways!([EnginePower: Times(0.8, 0.35)]),
        explains: "The engine is pulled down by ordinary work while loop pressures and charge are right for its speed.",
        proof: "Engine speed falls under a load this machine always carried, with loop pressure no higher than before.",
        repair: "Fuel, air, exhaust, governor: the engine's own fault-finding.",
        minutes: 90.0,
        ..BASE
    },
];
