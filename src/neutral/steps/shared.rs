//! Steps that several control kinds share.

use super::{Enter, PLAIN, Step};
use crate::caution::Stands;

pub(super) const BEFORE: Step = Step {
    id: "before",
    title: "Before anything is turned",
    how: &[
        "It creeps as it stands? Engine off, chock both ways, then lift it: nothing is counted or turned on a machine that can \
         roll off.",
        "Warm the oil to within 10 K of working temperature, 50 °C or more, and keep it there: the check afterwards is made at \
         the same.",
        "Charge and case pressure are known good. On low charge a null is never set.",
        "Every driven wheel clear of the ground, one person at the stop. Low idle first, then high idle.",
        "Turn each wheel by hand: drag is even.",
        "Mark the adjuster where it is found, and count turns from there.",
    ],
    good: &[
        "Charge within its window in neutral at both idles.",
        "Case pressures within 0.3 bar of each other where there are two.",
    ],
    pitfalls: &[
        "Set cold, it creeps hot, and the other way on controls with an orifice bridge. Set hot, and check once cold.",
        "It creeps one way only since a repair: look for crossed servo or pilot lines before you turn anything.",
        "The servo rests on case pressure: uneven cases make uneven stroke.",
    ],
    stands: &[Stands::WheelsClear],
    enters: &[],
};

pub(super) const BRIDGE: Step = Step {
    id: "bridge",
    title: "Bridge the servo ports: what creeps now is the servo’s",
    how: &[
        "Engine off: short hose between the two servo ports, bled, then low idle.",
        "Count the creep, if any.",
        "It creeps: set the servo’s own centre as the manual has it, in steps of 1/8 turn, until it stands both ways.",
    ],
    good: &["No creep bridged."],
    pitfalls: &[
        "A weak or broken centring spring: the null wanders with rpm or temperature and the piston snaps instead of centring. \
         No setting cures it.",
        "Breakaway hides up to about 0.5 % of stroke: a wheel that stands does not prove the null.",
    ],
    stands: &[Stands::Bridge, Stands::WheelsClear],
    enters: &[Enter::CreepBridged],
};

pub(super) const EQUAL: Step = Step {
    id: "servo-equal",
    title: "Bridge off: are the servo pressures equal?",
    how: &[
        "Engine off, bridge hose off, a gauge on each servo port or one gauge switched.",
        "Low idle, nothing asked: read both.",
        "Unequal: set the control’s null until they are equal, then count the creep again.",
    ],
    good: &["Equal within 0.3 to 0.5 bar at null."],
    pitfalls: &[
        "A difference that stays under the spring preload moves nothing: the control is off and the machine still stands, until \
         the oil gets hot.",
        "Two gauges differ by more than that among themselves: switch one gauge, or swap them and read again.",
    ],
    stands: &[Stands::Opening, Stands::WheelsClear],
    enters: &[Enter::Servo],
};

pub(super) const TWO_STARTS: Step = Step {
    id: "two-starts",
    title: "Find both starts, set the middle, lock, measure again",
    how: &[
        "Turn the adjuster slowly until it just starts forward, note the turns; then back until it just starts in reverse. Three \
         times from each side.",
        "Or note the creep at several places, on both sides of the null.",
        "Set the middle. Arrive there turning the same way as when you counted.",
        "Tighten the lock nut, then measure again locked.",
    ],
    good: &[
        "Dead band 3 to 8 % of stroke either way; halves equal within 20 %.",
        "The same start within 1/16 turn each time.",
    ],
    pitfalls: &[
        "Two values, one from each side: that is play or hysteresis, and no setting takes it out. One value, off the middle: \
         that is offset.",
        "The lock nut takes the adjuster with it, 1/16 turn is usual: always measure locked.",
        "Turns count from the last turn in the same sense. The backlash sits in the other.",
        "The middle of the starts is not the null of the springs where springs, coils or thresholds differ: then balance the \
         servo pressures and note both.",
    ],
    stands: &[Stands::WheelsClear],
    enters: &[Enter::Series],
};

pub(super) const LOCKED: Step = Step {
    id: "locked-difference",
    title: "Only if creep cannot be counted: the loop difference, held",
    how: &[
        "Motor blocked by capped ports or a real obstacle. The parking brake alone only under the pressure shown here.",
        "Low idle: read side A and side B with one switched gauge or transducers zeroed together.",
        "Stop at the pressure shown, whatever it still climbs to.",
    ],
    good: &["Both sides equal within 3 bar, hot too."],
    pitfalls: &[
        "Equal sides do not prove the null: in the dead zone both rest on charge, wider with heat and wear.",
        "Two 600 bar gauges cannot see it.",
        "The parking brake is let go by the first few bars of control: a locked test unlocks itself.",
    ],
    stands: &[Stands::LoopPort],
    enters: &[Enter::Difference],
};

pub(super) const CONNECT: Step = Step {
    id: "connect",
    title: "Connect the rod without moving the arm",
    how: &[
        "Set the rod’s length until its pin slides in by itself, lever in its neutral detent.",
        "Cab down, seat loaded, engine rocked under torque: the arm does not move.",
    ],
    good: &["Play at the pump arm under 1 mm, and no more than a third of the dead band."],
    pitfalls: &[
        "2 mm on a 60 mm arm is 2°, of perhaps 15 to 30 for full stroke: more than the whole dead band.",
        "A cable changes its length with cab and engine movement.",
    ],
    stands: &[],
    enters: &[],
};

pub(super) const STOPS: Step = Step {
    id: "stops",
    title: "Stop screws: full stroke forward and in reverse",
    how: &[
        "Wheels clear, high idle: full lever each way, count the turns.",
        "Reduce the faster side. Never screw a stop past where the slow side ends.",
    ],
    good: &["Both ways within 5 % of each other, or as the manual has it."],
    pitfalls: &["A stop that holds the lever and not the swash hides a short rod."],
    stands: &[Stands::WheelsClear],
    enters: &[],
};

pub(super) const SWITCH: Step = Step {
    id: super::SWITCH_ID,
    title: "The neutral switch, last",
    how: &[
        "Set it so that the engine starts only inside the dead band and the switch opens before the machine creeps.",
        "Check it at both edges of the dead band, forward and reverse.",
    ],
    good: &["Starts inside the dead band only, both edges."],
    pitfalls: &[
        "Set earlier, it is wrong again after the first turn of the null.",
        "Never bridged to go on working: it keeps the machine from jumping off at the start.",
    ],
    stands: &[Stands::PutBack],
    enters: &[],
};

pub(super) const PROVE: Step = Step {
    id: "prove",
    title: "Prove it: high idle, hot, 30 seconds",
    how: &[
        "High idle, oil hot, lever in neutral, 30 s: the wheels stand.",
        "Lever from full forward to neutral, from full reverse to neutral: it stops each time.",
        "Down from the stands. On a ramp, nobody below: the brake holds.",
        "Check once more with cold oil.",
    ],
    good: &["No turn in 30 s, hot, at high idle."],
    pitfalls: &[
        "No creep does not prove the null: breakaway holds up to about 0.5 % of stroke. The starts do.",
    ],
    stands: &[Stands::WheelsClear],
    enters: &[],
};

/// Base of a first step: whether it creeps with the control cut off.
pub(super) const CUT_OFF: Step = Step {
    enters: &[Enter::Creep],
    stands: &[Stands::WheelsClear],
    good: &["No turn in 60 s, low idle and high idle."],
    ..PLAIN
};
