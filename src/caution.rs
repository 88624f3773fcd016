//! Cautions: short words that say what to do, at the step where the hand goes.
//!
//! Figures in them are *common practice* unless a screen computes them for the unit. The unit's manual, local rules and
//! licensed practice come before all of them.

use crate::faults::FaultId;
use crate::readings::{Condition, Doing, Port, Seen};

/// Stands at the top of every call and under every report.
pub const MANUAL_FIRST: &str = "The unit's own manual, local rules and licensed practice come first. This program helps to \
                                think; it does not see the machine.";

/// Where a caution stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Stands {
    /// At the start of every call.
    Call,
    /// When work alone on site has been ticked.
    Alone,
    /// Where the machine keeps going with the lever in neutral.
    KeepsGoing,
    /// Where a hose, coupling or plug is opened, or a leak is looked for.
    Opening,
    /// Where a gauge goes on a loop port.
    LoopPort,
    /// Where a case drain is touched.
    Drain,
    /// Where oil is caught in a jug.
    Jug,
    /// Where wheels or tracks turn clear of the ground.
    WheelsClear,
    /// Where the motor is blocked.
    Held,
    /// Where the drive does not brake: no charge, tow valve open, loop line off.
    NoBraking,
    /// Where release pressure is low and the brake drags.
    BrakeDrags,
    /// Where the brake lets go late.
    BrakeReleasesLate,
    /// Where servo ports are bridged.
    Bridge,
    /// Where the machine drives with instruments on it.
    Driving,
    /// Where a switch or a line was changed for a test, at the end of a call.
    PutBack,
}

/// How loud a caution is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Weight {
    /// A reminder.
    Note,
    /// A caution.
    Caution,
    /// Stop: nothing goes on until it is settled.
    Stop,
}

/// A caution.
#[derive(Clone, Copy, Debug)]
pub struct Caution {
    /// Stable id (kebab case).
    pub id: &'static str,
    /// Where it stands.
    pub stands: Stands,
    /// How loud.
    pub weight: Weight,
    /// What to do, in few words.
    pub text: &'static str,
}

const fn caution(id: &'static str, stands: Stands, weight: Weight, text: &'static str) -> Caution {
    Caution {
        id,
        stands,
        weight,
        text,
    }
}

/// Every caution, loudest first within a place.
pub const ALL: &[Caution] = &[
    caution("manual-first", Stands::Call, Weight::Note, MANUAL_FIRST),
    caution(
        "stored-energy",
        Stands::Call,
        Weight::Caution,
        "Engine off is not pressure off: on a slope the loop stays loaded, accumulators stay full. Chock both ways, lower \
         everything, crack one turn behind a rag, wait.",
    ),
    caution(
        "keeps-going",
        Stands::KeepsGoing,
        Weight::Stop,
        "Keeps moving with the lever in neutral: do not test. Stop the engine, chock both ways, do not drive it onto a \
         trailer.",
    ),
    caution(
        "alone",
        Stands::Alone,
        Weight::Caution,
        "Alone on site: no held check, no bridged servo, no roll or slope test. They wait for a second person at the stop.",
    ),
    caution(
        "injection",
        Stands::Opening,
        Weight::Stop,
        "A pinhole you cannot feel can inject oil above about 7 bar (common practice). Small dot, little pain: emergency \
         surgery within hours, say “high-pressure injection”. Card or stick, never a hand.",
    ),
    caution(
        "crack-and-wait",
        Stands::Opening,
        Weight::Caution,
        "Engine off, chocked, everything lowered. Back off one turn behind a rag, face aside, wait, then open.",
    ),
    caution(
        "loop-gauge",
        Stands::LoopPort,
        Weight::Stop,
        "A loop port can reach full relief pressure in any condition, neutral too. Gauge and hose rated over it; a 0 to 60 bar \
         gauge only through a protector.",
    ),
    caution(
        "never-cap-a-drain",
        Stands::Drain,
        Weight::Stop,
        "Never cap or throttle a drain: the housing bursts or the seal is thrown.",
    ),
    caution(
        "jug",
        Stands::Jug,
        Weight::Caution,
        "30 L/min fills a 5 L jug in 10 s. Goggles, long gloves, hose tied into the jug, stop switch in reach; oil over 60 °C \
         scalds.",
    ),
    caution(
        "wheels-clear",
        Stands::WheelsClear,
        Weight::Caution,
        "Every driven wheel clear of the ground: one wheel down drives it off the stands. Stands on the frame, not on an axle \
         housing that turns; articulation locked. Tracks throw stones: stand clear in front and behind, low speed.",
    ),
    caution(
        "brake-is-no-stop",
        Stands::Held,
        Weight::Stop,
        "The parking brake may slip or let go. Block the motor by capped ports, or push against something that cannot move, \
         nobody in front or behind. Stop at the pressure shown.",
    ),
    caution(
        "loop-heats",
        Stands::Held,
        Weight::Caution,
        "Hold no longer than the seconds shown, then rest 60 s: the loop oil heats by several K each second. None on oil under \
         40 °C or over 80 °C.",
    ),
    caution(
        "no-braking",
        Stands::NoBraking,
        Weight::Stop,
        "No charge, tow valve open or a loop line off means no braking from the drive: it rolls. Chock both ways before the \
         spanner touches.",
    ),
    caution(
        "brake-drags",
        Stands::BrakeDrags,
        Weight::Caution,
        "Release pressure low: the brake drags, gets hot and can burn. Do not drive on.",
    ),
    caution(
        "brake-jerks",
        Stands::BrakeReleasesLate,
        Weight::Caution,
        "A brake that lets go late lets the machine jerk off: nobody in front or behind.",
    ),
    caution(
        "bridge",
        Stands::Bridge,
        Weight::Stop,
        "Both servo ports identified on the drawing by two signs: a bridge across the loop fails with injection force. Hose \
         rated for loop pressure, engine off to fit and to remove.",
    ),
    caution(
        "driver-reads-nothing",
        Stands::Driving,
        Weight::Caution,
        "The driver reads no gauge. Film the needle, or a second person in a seat; nobody walks alongside, hoses tied clear.",
    ),
    caution(
        "put-back",
        Stands::PutBack,
        Weight::Caution,
        "Before it goes: seat switch, flushing plug, tow valve, brake line, bridge hose back as they were.",
    ),
];

/// What this program never offers, whatever would be learned from it.
pub const NEVER_OFFERED: &[&str] = &[
    "Pinching a hose",
    "Capping or throttling a case drain, or running with a blocked return",
    "A hand near a leak",
    "A held check on cold oil",
    "A held check on the parking brake alone",
    "A low-range gauge on a loop port because it is in neutral",
    "Reading gauges while driving alone",
    "A seat, door or brake switch strapped down to drive",
];

/// The cautions of a place.
pub fn at(stands: Stands) -> impl Iterator<Item = &'static Caution> {
    ALL.iter().filter(move |c| c.stands == stands)
}

/// Where cautions belong while a port is read in a condition.
#[must_use]
pub fn places(condition: &Condition, port: Port) -> Vec<Stands> {
    let mut out = Vec::new();
    match condition.doing {
        Doing::Held => out.push(Stands::Held),
        Doing::NeutralBridged => out.extend([Stands::Bridge, Stands::WheelsClear]),
        Doing::NeutralFree | Doing::Free => out.push(Stands::WheelsClear),
        Doing::Travel | Doing::Loaded | Doing::Overrun => out.push(Stands::Driving),
        Doing::Neutral => {}
    }
    match port {
        Port::LoopA | Port::LoopB | Port::LoopDifference => {
            out.extend([Stands::LoopPort, Stands::Opening])
        }
        Port::MotorDrain => out.extend([Stands::Jug, Stands::Drain]),
        Port::ReturnFlow => out.extend([Stands::Jug, Stands::Drain, Stands::Opening]),
        Port::PumpCase | Port::MotorCase => out.extend([Stands::Drain, Stands::Opening]),
        Port::Charge
        | Port::Servo
        | Port::Pilot
        | Port::Release
        | Port::Shift
        | Port::InletPull => {
            out.push(Stands::Opening);
        }
        _ => {}
    }
    if condition.flushing_blocked || condition.consumers_capped {
        out.push(Stands::PutBack);
    }
    out
}

/// Where a cause, once suspected, needs its own caution.
#[must_use]
pub fn of_cause(cause: FaultId) -> Option<Stands> {
    match cause {
        FaultId::StrokeStuck => Some(Stands::KeepsGoing),
        FaultId::ChargeDriveFailed | FaultId::BypassOpen | FaultId::DrivetrainSlipping => {
            Some(Stands::NoBraking)
        }
        FaultId::BrakeDragging => Some(Stands::BrakeDrags),
        FaultId::BrakeNotReleased => Some(Stands::BrakeReleasesLate),
        FaultId::CaseCouplingShut | FaultId::CaseReturnRestricted => Some(Stands::Drain),
        _ => None,
    }
}

/// True where a reading alone says that the drive cannot brake: charge reads nothing.
#[must_use]
pub fn charge_is_dead(port: Port, seen: &Seen) -> bool {
    port == Port::Charge && matches!(seen, Seen::Nothing)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::readings::Lever;
    use std::collections::BTreeSet;

    #[test]
    fn ids_and_texts_differ() {
        let ids: BTreeSet<&str> = ALL.iter().map(|c| c.id).collect();
        let texts: BTreeSet<&str> = ALL.iter().map(|c| c.text).collect();
        assert_eq!(ids.len(), ALL.len());
        assert_eq!(texts.len(), ALL.len());
        for c in ALL {
            assert!(c.text.ends_with('.') && !c.text.contains("  "), "{}", c.id);
            assert!(
                c.text.chars().count() <= 260,
                "{}: too long to be read with oil on the hands",
                c.id
            );
        }
    }

    #[test]
    fn every_place_has_its_caution() {
        for stands in [
            Stands::Call,
            Stands::Alone,
            Stands::KeepsGoing,
            Stands::Opening,
            Stands::LoopPort,
            Stands::Drain,
            Stands::Jug,
            Stands::WheelsClear,
            Stands::Held,
            Stands::NoBraking,
            Stands::BrakeDrags,
            Stands::BrakeReleasesLate,
            Stands::Bridge,
            Stands::Driving,
            Stands::PutBack,
        ] {
            assert!(at(stands).count() >= 1, "{stands:?}");
        }
    }

    #[test]
    fn what_can_kill_is_a_stop() {
        for stands in [
            Stands::KeepsGoing,
            Stands::LoopPort,
            Stands::Drain,
            Stands::Held,
            Stands::NoBraking,
            Stands::Bridge,
            Stands::Opening,
        ] {
            assert!(at(stands).any(|c| c.weight == Weight::Stop), "{stands:?}");
        }
    }

    fn condition(doing: Doing) -> Condition {
        Condition {
            doing,
            lever: Lever::Half,
            ..Condition::start()
        }
    }

    #[test]
    fn cautions_follow_the_hand() {
        assert!(places(&condition(Doing::Held), Port::LoopA).contains(&Stands::Held));
        assert!(places(&condition(Doing::Neutral), Port::LoopB).contains(&Stands::LoopPort));
        assert!(places(&condition(Doing::Neutral), Port::MotorDrain).contains(&Stands::Drain));
        assert!(places(&condition(Doing::Free), Port::Wheel).contains(&Stands::WheelsClear));
        assert!(places(&condition(Doing::Travel), Port::Charge).contains(&Stands::Driving));
        assert!(places(&condition(Doing::NeutralBridged), Port::Wheel).contains(&Stands::Bridge));
        assert_eq!(places(&condition(Doing::Neutral), Port::EngineSpeed), []);
        let blocked = Condition {
            flushing_blocked: true,
            ..condition(Doing::Free)
        };
        assert!(places(&blocked, Port::MotorDrain).contains(&Stands::PutBack));
    }

    #[test]
    fn a_stuck_stroke_and_a_dead_charge_speak_up() {
        assert_eq!(of_cause(FaultId::StrokeStuck), Some(Stands::KeepsGoing));
        assert_eq!(of_cause(FaultId::BypassOpen), Some(Stands::NoBraking));
        assert_eq!(of_cause(FaultId::CoolerDirty), None);
        for f in crate::faults::all() {
            if f.stop_work {
                let stands = of_cause(f.id).expect("a caution for stopped work");
                assert!(at(stands).any(|c| c.weight == Weight::Stop));
            }
        }
        assert!(charge_is_dead(Port::Charge, &Seen::Nothing));
        assert!(!charge_is_dead(Port::LoopA, &Seen::Nothing));
    }

    #[test]
    fn nothing_on_the_never_list_is_a_check() {
        for never in NEVER_OFFERED {
            assert!(crate::checks::all().all(|c| c.title != *never));
        }
        for check in crate::checks::all() {
            for text in check.how {
                assert!(
                    !text.contains("pinch") && !text.contains("strap"),
                    "{}",
                    check.id
                );
            }
        }
    }
}
