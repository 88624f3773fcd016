//! Steps of each control kind.

use super::shared::{BRIDGE, CONNECT, CUT_OFF, EQUAL, LOCKED, STOPS, TWO_STARTS};
use super::{Enter, PLAIN, Step};
use crate::caution::Stands;
use crate::unit::Control;

/// What a kind does of its own, in three runs.
pub(super) struct Own {
    /// Cut the control off, tell control from servo.
    pub(super) first: &'static [&'static Step],
    /// Set.
    pub(super) middle: &'static [&'static Step],
    /// Connect and limit.
    pub(super) last: &'static [&'static Step],
}

const ROD_OFF: Step = Step {
    id: "linkage-off",
    title: "Linkage off at the pump arm: does the creep stop?",
    how: &[
        "Count the creep first, linkage on.",
        "Engine off: take the rod off the pump arm. Low idle: count again.",
        "The creep stops: it is the linkage, two minutes’ work. Leave the pump alone and go to the rod.",
    ],
    pitfalls: &[
        "One wheel may hold by drag while the others would turn: turn it by hand first.",
        "The arm is held by friction where it was left: move it by hand to where it centres.",
    ],
    ..CUT_OFF
};

const LEVER_ROD_OFF: Step = Step {
    id: "lever-rod-off",
    title: "Lever rod off: does the creep stop?",
    how: &[
        "Count the creep first, rod on.",
        "Engine off: take the lever rod off. Low idle: count again.",
        "The creep stops: it is the rod or the lever. Leave the return spring alone.",
    ],
    pitfalls: &[
        "Without its rod only the return spring holds the swash: hand away from the arm, it can go to full stroke.",
    ],
    ..CUT_OFF
};

const RETURN_SPRING: Step = Step {
    id: "return-spring",
    title: "Return spring and eccentric: stand both ways",
    how: &[
        "Low idle: turn the eccentric until it stands, from forward and from reverse.",
        "Let the arm go from a little forward and a little reverse: it comes back to the same place.",
    ],
    good: &["Back to the same place within 1/16 turn from both sides."],
    pitfalls: &["A worn eccentric or a tired spring comes back to two places: play, not offset."],
    stands: &[Stands::WheelsClear],
    enters: &[Enter::Series],
    ..PLAIN
};

const PILOTS_VENTED: Step = Step {
    id: "pilots-vented",
    title: "Both pilot lines vented to tank: does the creep stop?",
    how: &[
        "Count the creep first, lines on.",
        "Engine off: both pilot lines off at the pump and open to tank. Low idle: count again.",
        "The creep stops: it is the remote valve or its lines.",
    ],
    pitfalls: &["A line that stands full above the pump pushes by its own head: let it drain."],
    stands: &[Stands::Opening, Stands::WheelsClear],
    ..CUT_OFF
};

const PILOTS_BACK: Step = Step {
    id: "pilots-back",
    title: "Pilot lines back: what pressure is left in them?",
    how: &["Lever at rest, low idle: read both pilot lines at the pump."],
    good: &["Under 0.5 bar each."],
    pitfalls: &[
        "A remote valve that drains through a shared line keeps the back pressure of that line.",
    ],
    stands: &[Stands::Opening],
    enters: &[Enter::PilotRest],
    ..PLAIN
};

const PILOT_STARTS: Step = Step {
    id: "pilot-starts",
    title: "Pilot pressure at which it starts, each way",
    how: &[
        "Wheels clear, low idle: lever slowly forward until it just starts, read the pilot pressure. The same in reverse. Three \
         times each.",
    ],
    good: &["4 to 6 bar, both ways equal within 0.5 bar."],
    pitfalls: &[
        "Unequal starts with equal springs are a null that is off; with a spring changed on one side they are not.",
    ],
    stands: &[Stands::WheelsClear, Stands::Opening],
    enters: &[Enter::PilotStart],
    ..PLAIN
};

const PILOT_FULL: Step = Step {
    id: "pilot-full",
    title: "Full pilot pressures, each way",
    how: &["Full lever each way: the pilot pressure reaches what the manual has for full stroke."],
    stands: &[Stands::WheelsClear, Stands::Opening],
    ..PLAIN
};

const PLUG_OFF: Step = Step {
    id: "plug-off",
    title: "Plugs off: does the creep stop?",
    how: &[
        "Count the creep first, plugs on.",
        "Engine stopped while you unplug both coils. Low idle: count again.",
        "The creep stops: it is current, not the pump.",
    ],
    pitfalls: &["A controller may go into a fault and stay there: note it, clear it after."],
    ..CUT_OFF
};

const ZERO_CURRENT: Step = Step {
    id: "zero-current",
    title: "Plugs on, key on, lever at rest: no current in either coil?",
    how: &["Meter in series, engine off, key on: 0 mA in both. Then at low idle."],
    good: &["0 mA both."],
    pitfalls: &[
        "A poor earth adds an offset: measure it at the coil, not at the controller.",
        "The ripple (dither) of a driver fools a plain meter: one that shows the mean of a pulsed current.",
    ],
    ..PLAIN
};

const CURRENTS: Step = Step {
    id: "currents",
    title: "Threshold and end currents, each way; then calibrate",
    how: &[
        "Wheels clear, low idle: raise the current slowly until it just starts, forward and reverse, three times each.",
        "Raise it further until it goes no faster: the end current, each way.",
        "Enter them in the controller, or run its own calibration.",
    ],
    good: &[
        "Threshold 30 to 45 % of full current.",
        "Forward and reverse within 5 to 8 % of each other.",
    ],
    pitfalls: &[
        "Measured cold only: hot copper takes a quarter of the current away on a driver that holds voltage.",
        "Unequal thresholds are a null off in the pump or unequal coils: swap the plugs, and see whether the difference goes \
         with them.",
    ],
    stands: &[Stands::WheelsClear],
    enters: &[Enter::Currents],
    ..PLAIN
};

const LEVER_NEUTRAL: Step = Step {
    id: "lever-voltage",
    title: "The lever’s own neutral",
    how: &[
        "Lever in its detent: its signal lies inside the controller’s neutral window, from both sides.",
    ],
    pitfalls: &["A lever that comes back to two values has worn springs: no calibration cures it."],
    ..PLAIN
};

const INCH_DOWN: Step = Step {
    id: "inching-down",
    title: "Inching pedal down, direction neutral: does the creep stop?",
    how: &[
        "Count the creep first, pedal up.",
        "Pedal right down, direction in neutral, low idle: count again.",
        "The creep stops: it is the control pressure or the direction valve.",
    ],
    pitfalls: &[
        "Creep that comes with engine speed is stroke asked by the speed sense, not a null.",
    ],
    ..CUT_OFF
};

const INCH_PLAY: Step = Step {
    id: "inching-play",
    title: "Pedal free play: the inching valve is shut at rest",
    how: &["Feel the play at the valve’s lever with the pedal up: it rests on its own stop."],
    good: &["A little play at rest; valve shut."],
    pitfalls: &["No play: the valve bleeds all the time, and the machine is weak at low speed."],
    ..PLAIN
};

const SENSE_STARTS: Step = Step {
    id: "speed-starts",
    title: "Engine speed at which it starts, each way; full speed; pull-down",
    how: &[
        "Wheels clear, direction forward: raise the engine slowly until it just starts, note the rpm. The same in reverse.",
        "Note the rpm of full stroke, and how far the engine is pulled down under load.",
    ],
    good: &["Both ways start within 50 rpm of each other."],
    pitfalls: &["A slipping pump drive looks like a late start: take the pump’s own speed."],
    stands: &[Stands::WheelsClear],
    ..PLAIN
};

const STALL_LINE: Step = Step {
    id: "stall-line",
    title: "Stall line",
    how: &["As the manual has it: the engine is pulled down to its stall speed and no further."],
    pitfalls: &[
        "A held check of its own: it waits until level, charge and temperature are known good.",
    ],
    stands: &[Stands::Held],
    ..PLAIN
};

const LIMITER: Step = Step {
    id: "limiter",
    title: "Pressure limiter",
    how: &["As the manual has it, after the null: the limiter destrokes before the relief opens."],
    pitfalls: &[
        "A held check of its own: it waits until level, charge and temperature are known good.",
    ],
    stands: &[Stands::Held],
    ..PLAIN
};

const THRESHOLDS: Step = Step {
    id: "thresholds",
    title: "Thresholds, each way",
    enters: &[Enter::Currents],
    ..CURRENTS
};

const KIND_UNKNOWN: Step = Step {
    id: "which-control",
    title: "Which control is it?",
    how: &[
        "Rod to the pump: manual. Two thin hoses from a lever or pedal valve: pilot. Plugs on the control: electric.",
        "Say it in the unit’s profile: each kind has its own order. What follows holds for all with a servo.",
    ],
    ..PLAIN
};

const CONTROL_OFF: Step = Step {
    id: "control-off",
    title: "Control cut off: does the creep stop?",
    how: &[
        "Count the creep first.",
        "Engine off: rod off, pilot lines vented or plugs off, whichever it has. Low idle: count again.",
        "The creep stops: it is what asks, not the pump.",
    ],
    ..CUT_OFF
};

/// What a kind does of its own.
pub(super) fn own(control: Control) -> Own {
    match control {
        Control::ManualFeedback => Own {
            first: &[&ROD_OFF, &BRIDGE, &EQUAL],
            middle: &[&TWO_STARTS, &LOCKED],
            last: &[&CONNECT, &STOPS],
        },
        Control::DirectManual => Own {
            first: &[&LEVER_ROD_OFF],
            middle: &[&RETURN_SPRING, &TWO_STARTS, &LOCKED],
            last: &[&CONNECT, &STOPS],
        },
        Control::HydraulicRemote => Own {
            first: &[&PILOTS_VENTED, &BRIDGE, &PILOTS_BACK, &EQUAL],
            middle: &[&PILOT_STARTS, &TWO_STARTS, &LOCKED],
            last: &[&PILOT_FULL],
        },
        Control::ElectricProportional => Own {
            first: &[&PLUG_OFF, &BRIDGE, &ZERO_CURRENT, &EQUAL],
            middle: &[&CURRENTS, &TWO_STARTS, &LOCKED],
            last: &[&LEVER_NEUTRAL],
        },
        Control::SpeedSensing => Own {
            first: &[&INCH_DOWN, &BRIDGE, &INCH_PLAY, &EQUAL],
            middle: &[&TWO_STARTS, &SENSE_STARTS, &LOCKED],
            last: &[&STALL_LINE],
        },
        Control::PressureNoFeedback => Own {
            first: &[&PLUG_OFF, &BRIDGE, &ZERO_CURRENT, &EQUAL],
            middle: &[&TWO_STARTS, &THRESHOLDS, &LOCKED],
            last: &[&LIMITER],
        },
        Control::ThreePosition => Own {
            first: &[&PLUG_OFF, &BRIDGE, &ZERO_CURRENT, &EQUAL],
            middle: &[&TWO_STARTS, &LOCKED],
            last: &[&STOPS],
        },
        Control::Unknown => Own {
            first: &[&KIND_UNKNOWN, &CONTROL_OFF, &BRIDGE, &EQUAL],
            middle: &[&TWO_STARTS, &LOCKED],
            last: &[&STOPS],
        },
    }
}
