//! Which units can have a fault, from what is ticked: 0 masks it, 1 leaves its base rate, more or less scales it. Where a
//! tick is "don't know", the share of such machines in the class stands in for it (common practice, from memory).

use crate::unit::{ChargeSource, Control, MachineClass, Shuttle, Tick, Unit};

/// Any unit.
pub fn always(_: &Unit) -> f64 {
    1.0
}

fn share(tick: Tick, practice: f64) -> f64 {
    match tick {
        Tick::Yes => 1.0,
        Tick::No => 0.0,
        Tick::Unknown => practice,
    }
}

/// Units with a left and a right path.
pub fn two_paths(unit: &Unit) -> f64 {
    if unit.ticks.paths.is_one() { 0.0 } else { 1.0 }
}

/// Units with loop flushing.
pub fn flushing(unit: &Unit) -> f64 {
    share(unit.ticks.flushing, unit.class.practice().flushing)
}

/// Units with loop flushing whose shuttle has a closed centre to be caught in.
pub fn shuttle_centre(unit: &Unit) -> f64 {
    match unit.ticks.shuttle {
        Shuttle::TwoPosition => 0.0,
        Shuttle::ClosedCentre | Shuttle::Unknown => flushing(unit),
    }
}

/// Units with a pressure limiter.
pub fn limiter(unit: &Unit) -> f64 {
    share(unit.ticks.limiter, unit.class.practice().limiter)
}

/// Units with two-speed or variable motors.
pub fn two_speed(unit: &Unit) -> f64 {
    share(unit.ticks.two_speed, unit.class.practice().two_speed)
}

/// Units whose motors shift by a pressure that can be short; seldom where it does not come from charge.
pub fn shift_supply(unit: &Unit) -> f64 {
    let from_charge = match unit.ticks.shift_from_charge {
        Tick::Yes => 1.0,
        Tick::No => 0.4,
        Tick::Unknown => 0.8,
    };
    two_speed(unit) * from_charge
}

/// Units with something fed from charge besides the loop: brake, shift, pilot.
pub fn consumers(unit: &Unit) -> f64 {
    let practice = unit.class.practice();
    let brake = share(unit.ticks.brake_from_charge, practice.brake);
    let shift = share(unit.ticks.shift_from_charge, practice.two_speed);
    let pilot = match unit.ticks.control {
        Control::HydraulicRemote => 0.5,
        Control::Unknown => 0.15,
        _ => 0.0,
    };
    1.0 - (1.0 - brake) * (1.0 - shift) * (1.0 - pilot)
}

/// Units with a brake that pressure releases; seldom at fault where the release does not come from charge.
pub fn released_brake(unit: &Unit) -> f64 {
    let elsewhere = 0.35;
    let charge = share(unit.ticks.brake_from_charge, unit.class.practice().brake);
    charge + (1.0 - charge) * elsewhere
}

/// Units with a tow valve; without one only cartridges backed off for towing count.
pub fn bypass(unit: &Unit) -> f64 {
    match unit.ticks.bypass {
        Tick::Yes => 1.0,
        Tick::No => 0.15,
        Tick::Unknown => 0.8,
    }
}

/// Units with a charge pump of their own; where another circuit feeds charge, only a drive common to both can fail.
pub fn own_charge_pump(unit: &Unit) -> f64 {
    match unit.ticks.charge_source {
        ChargeSource::OwnPump | ChargeSource::Unknown => 1.0,
        ChargeSource::Steering | ChargeSource::Implement => 0.4,
    }
}

/// Units whose charge oil comes from another function.
pub fn fed_by_function(unit: &Unit) -> f64 {
    match (unit.ticks.charge_source, unit.class) {
        (ChargeSource::OwnPump, _) => 0.0,
        (ChargeSource::Steering | ChargeSource::Implement, _) => 3.0,
        (ChargeSource::Unknown, MachineClass::CompactWheeled | MachineClass::CompactTracked) => 0.5,
        (ChargeSource::Unknown, MachineClass::Loader) => 0.4,
        (ChargeSource::Unknown, _) => 0.15,
    }
}

/// Units whose pump drive can slip; a splined shaft or coupling can still be stripped.
pub fn slipping_drive(unit: &Unit) -> f64 {
    match (unit.ticks.slipping_drive, unit.class) {
        (Tick::Yes, _) => 4.0,
        (Tick::No, _) => 0.4,
        (Tick::Unknown, MachineClass::SmallIntegrated) => 3.5,
        (Tick::Unknown, MachineClass::CompactWheeled) => 1.3,
        (Tick::Unknown, _) => 0.7,
    }
}

/// Units with an oil cooler; small integrated drives mostly have a fan and fins only.
pub fn cooler(unit: &Unit) -> f64 {
    match unit.class {
        MachineClass::SmallIntegrated => 0.4,
        _ => 1.0,
    }
}

/// Share of a class's machines whose lever works straight on the swash.
fn direct_share(class: MachineClass) -> f64 {
    match class {
        MachineClass::SmallIntegrated => 0.8,
        MachineClass::CompactWheeled => 0.25,
        MachineClass::CompactTracked => 0.1,
        _ => 0.03,
    }
}

/// Share of a class's machines that are commanded by wire or by pilot oil.
fn remote_share(class: MachineClass) -> f64 {
    match class {
        MachineClass::SmallIntegrated => 0.05,
        MachineClass::CompactWheeled => 0.4,
        MachineClass::Roller => 0.45,
        MachineClass::CompactTracked | MachineClass::WheelMotorCarrier => 0.6,
        MachineClass::Loader | MachineClass::Crawler => 0.7,
    }
}

/// Units with a servo.
pub fn servo(unit: &Unit) -> f64 {
    match unit.ticks.control {
        Control::DirectManual => 0.0,
        Control::Unknown => 1.0 - direct_share(unit.class),
        _ => 1.0,
    }
}

/// Units with rods, cables or stop screws between lever and stroke.
pub fn linkage(unit: &Unit) -> f64 {
    match unit.ticks.control {
        Control::DirectManual | Control::ManualFeedback => 1.3,
        Control::HydraulicRemote | Control::ElectricProportional | Control::PressureNoFeedback => {
            0.35
        }
        Control::SpeedSensing => 0.4,
        Control::ThreePosition => 0.2,
        Control::Unknown => 1.3 - remote_share(unit.class),
    }
}

/// Units whose servo is told by a link how far it has gone.
pub fn feedback_link(unit: &Unit) -> f64 {
    match unit.ticks.control {
        Control::ManualFeedback => 1.5,
        Control::HydraulicRemote | Control::ElectricProportional => 0.5,
        Control::Unknown => 0.7 * servo(unit),
        Control::DirectManual
        | Control::SpeedSensing
        | Control::PressureNoFeedback
        | Control::ThreePosition => 0.0,
    }
}

/// Units whose control lives on a pilot or control supply.
pub fn pilot_supply(unit: &Unit) -> f64 {
    match unit.ticks.control {
        Control::HydraulicRemote => 1.5,
        Control::SpeedSensing | Control::PressureNoFeedback => 0.7,
        Control::ElectricProportional | Control::ThreePosition => 0.5,
        Control::ManualFeedback => 0.2,
        Control::DirectManual => 0.0,
        Control::Unknown => 0.3 + 0.4 * remote_share(unit.class),
    }
}

/// Units with a signal to each direction that can be lost: a wire, or a pilot line.
pub fn signal(unit: &Unit) -> f64 {
    match unit.ticks.control {
        Control::ElectricProportional | Control::ThreePosition => 1.3,
        Control::SpeedSensing | Control::PressureNoFeedback => 1.0,
        Control::HydraulicRemote => 0.6,
        Control::DirectManual | Control::ManualFeedback => 0.0,
        Control::Unknown => remote_share(unit.class),
    }
}

/// Units with a signal that can be weak rather than lost.
pub fn weak_signal(unit: &Unit) -> f64 {
    match unit.ticks.control {
        Control::ElectricProportional => 1.5,
        Control::PressureNoFeedback => 1.0,
        Control::HydraulicRemote => 0.4,
        Control::SpeedSensing => 0.5,
        Control::ThreePosition => 0.3,
        Control::DirectManual | Control::ManualFeedback => 0.0,
        Control::Unknown => remote_share(unit.class),
    }
}

/// Units where a switch or a controller can take the drive away.
pub fn interlock(unit: &Unit) -> f64 {
    match unit.ticks.control {
        Control::DirectManual => 0.0,
        Control::ManualFeedback => 0.4,
        Control::Unknown => 0.15 + 0.85 * remote_share(unit.class),
        _ => 1.0,
    }
}

/// Units with an inching pedal or valve.
pub fn inching(unit: &Unit) -> f64 {
    match (unit.ticks.control, unit.class) {
        (Control::SpeedSensing, _) => 2.7,
        (Control::Unknown, MachineClass::Loader) => 1.3,
        (Control::Unknown, MachineClass::WheelMotorCarrier) => 0.5,
        (Control::Unknown, MachineClass::CompactWheeled) => 0.3,
        (Control::Unknown, _) => 0.1,
        _ => 0.0,
    }
}
