//! The time of a held reading: it runs from the lever going out, ends by itself and never longer than it was given, and then
//! counts the rest. No second hold begins before the rest is over.

use super::hold::Plan;

/// Milliseconds in a second.
const MS: f64 = 1000.0;

/// How it stands at a moment.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Phase {
    /// A hold may begin.
    Ready,
    /// Held: so many seconds are left.
    Holds {
        /// Time left, s.
        left: f64,
    },
    /// Lever back, oil cools: so many seconds are left.
    Rests {
        /// Time left, s.
        left: f64,
    },
    /// As often as this side may be held.
    Spent,
}

/// Times of one visit's holds. Moments are ms on a clock that only runs forward.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct HoldClock {
    begun: Option<Begun>,
    /// Holds made, by what they were for.
    made: Vec<(String, u8)>,
}

#[derive(Clone, Copy, Debug, PartialEq)]
struct Begun {
    at_ms: f64,
    hold_s: f64,
    rest_s: f64,
    /// When the lever went back; none while nobody said so.
    back_ms: Option<f64>,
}

impl Begun {
    /// When the hold ended: at the lever, or when its time was over.
    fn end_ms(&self) -> f64 {
        let over = self.at_ms + self.hold_s * MS;
        self.back_ms.map_or(over, |back| back.min(over))
    }
}

impl HoldClock {
    /// How it stands for what is held next.
    #[must_use]
    pub fn phase(&self, key: &str, plan: &Plan, now_ms: f64) -> Phase {
        if let Some(begun) = &self.begun {
            let end = begun.end_ms();
            if now_ms < end {
                return Phase::Holds {
                    left: (end - now_ms) / MS,
                };
            }
            let rested = end + begun.rest_s * MS;
            if now_ms < rested {
                return Phase::Rests {
                    left: (rested - now_ms) / MS,
                };
            }
        }
        match plan.tries {
            Some(tries) if self.made(key) >= tries => Phase::Spent,
            _ => Phase::Ready,
        }
    }

    /// The lever goes out. Refused (false) unless it is [`Phase::Ready`].
    pub fn begin(&mut self, key: &str, plan: &Plan, now_ms: f64) -> bool {
        if !now_ms.is_finite() || self.phase(key, plan, now_ms) != Phase::Ready {
            return false;
        }
        self.begun = Some(Begun {
            at_ms: now_ms,
            hold_s: plan.seconds,
            rest_s: plan.rest.unwrap_or(0.0),
            back_ms: None,
        });
        match self.made.iter_mut().find(|(other, _)| other == key) {
            Some((_, made)) => *made = made.saturating_add(1),
            None => self.made.push((key.to_owned(), 1)),
        }
        true
    }

    /// The lever is back before the time was over: the rest begins now.
    pub fn back(&mut self, now_ms: f64) {
        if let Some(begun) = &mut self.begun
            && begun.back_ms.is_none()
            && now_ms < begun.end_ms()
        {
            begun.back_ms = Some(now_ms);
        }
    }

    /// Holds made of this.
    #[must_use]
    pub fn made(&self, key: &str) -> u8 {
        self.made
            .iter()
            .find(|(other, _)| other == key)
            .map_or(0, |(_, made)| *made)
    }
}

#[cfg(test)]
mod tests {
    use super::super::hold::Basis;
    use super::*;

    fn plan(tries: Option<u8>) -> Plan {
        Plan {
            seconds: 3.0,
            rest: Some(60.0),
            rise: None,
            basis: Basis::Practice,
            tries,
        }
    }

    #[test]
    fn it_ends_by_itself_and_rests_before_the_next() {
        let (plan, mut clock) = (plan(None), HoldClock::default());
        assert_eq!(clock.phase("r1", &plan, 0.0), Phase::Ready);
        assert!(clock.begin("r1", &plan, 1000.0));
        assert_eq!(clock.phase("r1", &plan, 2000.0), Phase::Holds { left: 2.0 });
        // A second touch does not make it longer.
        assert!(!clock.begin("r1", &plan, 3900.0));
        assert_eq!(
            clock.phase("r1", &plan, 4000.0),
            Phase::Rests { left: 60.0 }
        );
        // The rest is for the oil, so it holds for the next reading too.
        assert!(!clock.begin("r2", &plan, 63_999.0));
        assert_eq!(clock.phase("r2", &plan, 64_000.0), Phase::Ready);
        assert!(clock.begin("r2", &plan, 64_000.0));
        assert_eq!((clock.made("r1"), clock.made("r2")), (1, 1));
    }

    #[test]
    fn a_lever_put_back_early_rests_from_then() {
        let (plan, mut clock) = (plan(None), HoldClock::default());
        assert!(clock.begin("r1", &plan, 0.0));
        clock.back(1000.0);
        assert_eq!(
            clock.phase("r1", &plan, 1000.0),
            Phase::Rests { left: 60.0 }
        );
        // Said again, or said late, changes nothing.
        clock.back(2000.0);
        assert_eq!(
            clock.phase("r1", &plan, 31_000.0),
            Phase::Rests { left: 30.0 }
        );
    }

    #[test]
    fn two_tries_are_all() {
        let (plan, mut clock) = (plan(Some(2)), HoldClock::default());
        assert!(clock.begin("r1", &plan, 0.0));
        assert!(clock.begin("r1", &plan, 63_000.0));
        assert_eq!(clock.phase("r1", &plan, 200_000.0), Phase::Spent);
        assert!(!clock.begin("r1", &plan, 200_000.0));
        assert_eq!(clock.phase("r2", &plan, 200_000.0), Phase::Ready);
        assert!(!clock.begin("r2", &plan, f64::NAN));
    }
}
