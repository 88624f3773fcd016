//! How each port is read: where it usually is, how the reading is taken, what to watch for. *Common practice*, from memory of the
//! trade: the unit's own manual comes first, and what stands in the profile of this unit comes before this.

use super::Port;

/// Help for a port, each part a sentence or two.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct PortHelp {
    /// Where it usually is.
    pub place: &'static str,
    /// How the reading is taken.
    pub how: &'static str,
    /// What to watch for.
    pub watch: &'static str,
}

impl Port {
    /// How it is read.
    #[must_use]
    pub fn help(self) -> PortHelp {
        let (place, how, watch) = texts(self);
        PortHelp { place, how, watch }
    }
}

/// Place, how, watch.
fn texts(port: Port) -> (&'static str, &'static str, &'static str) {
    match port {
        Port::Charge => (
            "Mostly on the charge pump's cover at the back of the pump, or on the head of the charge filter.",
            "Fit with the engine off. Read it warm and steady, and leave the gauge on for the next condition: differences on one gauge \
             are sharp.",
            "Which side of the filter it is on. A gauge that reads nothing on a machine that drives is on the wrong port, or its coupling \
             is not pushed home.",
        ),
        Port::LoopA | Port::LoopB => (
            "At the pump's two big ports or in its end cover, one gauge port a side; the motor often has a pair too.",
            "Engine off and loop bled to fit. Move the lever slowly and read where the needle stands still.",
            "Which side is which: A is the one that is high going forward. A low-range gauge bursts here, in neutral too.",
        ),
        Port::LoopDifference => (
            "Both big gauge ports of the pump, on one switched gauge or on two transducers zeroed together.",
            "Zero with the engine off and bled. Read A, switch, read B in the same quarter minute; A less B, with its sign.",
            "Two gauges of 600 bar cannot see a few bar. The sign says which way neutral is off.",
        ),
        Port::PumpCase => (
            "A tee in the pump's drain line, close to the housing, or a spare drain port plugged.",
            "Low-range gauge, warm oil, at the speed in the heading.",
            "A coupling not pushed home reads high, and throws the shaft seal. Cold oil reads high on a sound machine.",
        ),
        Port::MotorCase => (
            "A tee in the motor's drain line, close to the housing.",
            "As at the pump case, with the same gauge: the two are compared.",
            "Motors at wheels and drums often bear less than the pump. Stop when the shaft seal weeps more.",
        ),
        Port::InletPull => (
            "A tee in the suction line right at the charge pump's inlet, after the suction filter where there is one.",
            "Vacuum gauge, warm, low idle and then high idle. Type the pull; its sign does not matter.",
            "A joint that sucks air makes the fault it looks for. Much pull is a restriction, hardly any with noise is air.",
        ),
        Port::Servo => (
            "Two small gauge ports at the ends of the servo cylinder, mostly on the pump's control side.",
            "A gauge on each; read the higher one with the lever where the heading says.",
            "Prove both ports on the drawing: a servo port and a loop port can look alike.",
        ),
        Port::Pilot => (
            "A tee in the pilot hose of the direction asked, at the pump's control or under the joystick.",
            "Lever slowly from neutral to the heading's travel, read what stands at the end.",
            "A pressure left over in neutral strokes the pump a little: read both lines at rest too.",
        ),
        Port::Release => (
            "A tee in the brake's release line, at the brake or at its valve.",
            "Chock first: it lets the brake go. Release the brake, read the pressure that stands.",
            "Under the pressure at which the brake lets go it drags, gets hot and reads like a tired machine.",
        ),
        Port::Shift => (
            "A tee in the motor's shift line, at the motor.",
            "Chock or stands. Ask for the other range, read the pressure that stands.",
            "Read it at the motor: a pressure that is good at the valve says nothing of a line bent shut.",
        ),
        Port::CoilCurrent => (
            "In the plug of the control coil of the direction asked.",
            "Meter in line or a clamp round one wire, lever where the heading says. Hot as well as cold.",
            "A plain meter reads a pulsed current low; the same meter forward and reverse still compares. Leads clear of shafts.",
        ),
        Port::MotorDrain => (
            "The small hose from the motor's housing, mostly the highest plug of the case.",
            "Off at the far end and led into a jug, machine side plugged; 30 s or more, with the stopwatch here.",
            "Hot oil, and the tank falls. More than about 8 L/min in neutral is flushing oil and no leak. Never cap a drain.",
        ),
        Port::ReturnFlow => (
            "Where all drains have joined, before the cooler or at the tank.",
            "Flow meter of full bore, hose tied, tank level watched; low idle and then high idle.",
            "Nothing may be throttled. It is the charge pump's delivery and says nothing of pump or motor wear.",
        ),
        Port::EngineSpeed => (
            "Crank pulley or flywheel, or the pump shaft where nothing slips in between.",
            "Reflecting tape stuck on at standstill. Throttle left where it was, read while the load is on.",
            "The cab's dial is no tachometer. Sleeves and leads clear of belts and fan.",
        ),
        Port::PumpShaft => (
            "The pump's own shaft or coupling, past every belt and clutch.",
            "Reflecting tape stuck on at standstill; read together with the engine.",
            "A belt that slips shows only under load. Guards stay on.",
        ),
        Port::MotorShaft => (
            "The motor's output shaft or its coupling, ahead of gearbox and brake.",
            "Tape and tachometer from the side, or turns past a chalk mark counted for half a minute.",
            "Never reach between turning parts. A shaft that turns while the wheel does not is the gearbox.",
        ),
        Port::Wheel => (
            "The driven wheel, the drum or the sprocket.",
            "Chalk mark; tap at each pass for 30 s or more, stand off its line.",
            "An open differential turns one wheel alone: count both and take the mean. Tyres of another size are no fault of the drive.",
        ),
        Port::Ground => (
            "A measured stretch of level ground, 20 m or more.",
            "At full speed before the first mark; stopwatch from mark to mark, both ways, and take the mean.",
            "The driver drives and the second person times. Wheel slip and slope look like a weak drive.",
        ),
        Port::Knee => (
            "The charge gauge and a tachometer, read together.",
            "From low idle raise the throttle slowly; note the engine speed at which the needle stops rising.",
            "Slowly, or the needle lags. Flat from low idle on: type the low idle.",
        ),
        Port::ResponseOut => (
            "The driven wheel, clear of the ground, and a stopwatch.",
            "Lever to full in one move; stop the watch when the wheel gains no more. Three times, take the middle one.",
            "Cold oil and a throttle not fully open are slow on a sound machine.",
        ),
        Port::ResponseBack => (
            "The driven wheel, clear of the ground, and a stopwatch.",
            "From full speed the lever back to neutral in one move; stop the watch at standstill. Three times, take the middle one.",
            "A machine that does not stop by itself is not timed again: stop work, engine off.",
        ),
        Port::SettledTemperature => (
            "The tank, in the oil and not on its wall.",
            "After ordinary work for half an hour or more, when a quarter of an hour changes it by less than 2 K.",
            "An infrared gun on paint reads the air as much as the oil. Write down how warm the day is.",
        ),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::collections::BTreeSet;

    #[test]
    fn every_port_says_where_how_and_what_to_watch_for() {
        let mut hows = BTreeSet::new();
        for port in Port::ALL {
            let help = port.help();
            for text in [help.place, help.how, help.watch] {
                assert!(
                    text.ends_with('.') && !text.contains("  "),
                    "{port:?}: {text}"
                );
                assert!(
                    (20..=240).contains(&text.chars().count()),
                    "{port:?}: to be read with oil on the hands: {text}"
                );
            }
            hows.insert(help.how);
        }
        // Only the two loop sides share theirs.
        assert_eq!(hows.len(), Port::ALL.len() - 1);
    }

    #[test]
    fn what_is_dangerous_at_a_port_is_said_there() {
        assert!(Port::LoopA.help().watch.contains("bursts"));
        assert!(Port::MotorDrain.help().watch.contains("Never cap a drain"));
        assert!(Port::Release.help().how.contains("Chock"));
    }
}
