//! The order of work at a neutral, for each control kind: one step at a time, with its pitfalls and cautions where the hand
//! goes. The neutral switch comes last, after everything that moves it.
//!
//! Figures are *common practice*; the unit's manual, local rules and licensed practice come before every line here.

mod control;
mod shared;

use crate::caution::Stands;
use crate::unit::Control;

/// What is entered at a step.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Enter {
    /// Creep in neutral, wheels free.
    Creep,
    /// Creep with the servo ports bridged.
    CreepBridged,
    /// Both servo pressures.
    Servo,
    /// Residual pilot pressures.
    PilotRest,
    /// Pilot pressures at which it starts.
    PilotStart,
    /// Places of the adjuster.
    Series,
    /// Threshold and end currents.
    Currents,
    /// Loop difference, motor held.
    Difference,
}

/// A step.
#[derive(Clone, Copy, Debug)]
pub struct Step {
    /// Stable id (kebab case): it stands in files that people keep.
    pub id: &'static str,
    /// Title.
    pub title: &'static str,
    /// What to do, one thing a line.
    pub how: &'static [&'static str],
    /// What is good. Common practice, each line.
    pub good: &'static [&'static str],
    /// What fools.
    pub pitfalls: &'static [&'static str],
    /// Cautions of the place.
    pub stands: &'static [Stands],
    /// What is entered.
    pub enters: &'static [Enter],
}

/// A step without texts, to start from.
const PLAIN: Step = Step {
    id: "",
    title: "",
    how: &[],
    good: &[],
    pitfalls: &[],
    stands: &[],
    enters: &[],
};

/// The steps for a control kind, in order. For a kind that is not known, what holds for all of them.
#[must_use]
pub fn steps(control: Control) -> Vec<&'static Step> {
    let own = control::own(control);
    let mut out: Vec<&'static Step> = vec![&shared::BEFORE];
    out.extend(own.first);
    out.extend(own.middle);
    out.extend(own.last);
    out.extend([&shared::SWITCH, &shared::PROVE]);
    out
}

/// The id of the step that sets the neutral switch.
pub const SWITCH_ID: &str = "neutral-switch";

#[cfg(test)]
mod tests {
    use super::*;
    use std::collections::BTreeSet;

    #[test]
    fn the_switch_comes_after_everything_that_moves_the_null() {
        for control in Control::ALL {
            let ids: Vec<&str> = steps(control).iter().map(|s| s.id).collect();
            assert_eq!(ids.first(), Some(&"before"), "{control:?}");
            assert_eq!(ids.get(ids.len() - 2), Some(&SWITCH_ID), "{control:?}");
            assert_eq!(ids.last(), Some(&"prove"), "{control:?}");
            assert_eq!(ids.iter().collect::<BTreeSet<_>>().len(), ids.len());
        }
    }

    #[test]
    fn a_servo_is_bridged_before_its_spool_is_set_and_no_servo_is_not_bridged() {
        for control in Control::ALL {
            let ids: Vec<&str> = steps(control).iter().map(|s| s.id).collect();
            let place = |id: &str| ids.iter().position(|i| *i == id);
            if control == Control::DirectManual {
                assert_eq!(place("bridge"), None);
            } else {
                let bridge = place("bridge").expect("a bridge");
                let series = place("two-starts")
                    .or(place("currents"))
                    .or(place("pilot-starts"));
                assert!(series.is_none_or(|s| s > bridge), "{control:?}");
            }
        }
    }

    #[test]
    fn every_step_says_what_to_do_and_turning_wheels_have_their_caution() {
        for control in Control::ALL {
            for step in steps(control) {
                assert!(
                    !step.title.is_empty() && !step.how.is_empty(),
                    "{}",
                    step.id
                );
                for text in step.how.iter().chain(step.good).chain(step.pitfalls) {
                    assert!(
                        text.ends_with('.') || text.ends_with('?'),
                        "{}: {text}",
                        step.id
                    );
                    assert!(!text.contains("  "), "{}: {text}", step.id);
                }
                if step.enters.contains(&Enter::Creep) || step.enters.contains(&Enter::Series) {
                    assert!(step.stands.contains(&Stands::WheelsClear), "{}", step.id);
                }
                if step.enters.contains(&Enter::CreepBridged) {
                    assert!(step.stands.contains(&Stands::Bridge), "{}", step.id);
                }
                if step.enters.contains(&Enter::Difference) {
                    assert!(step.stands.contains(&Stands::LoopPort), "{}", step.id);
                }
            }
        }
    }
}
