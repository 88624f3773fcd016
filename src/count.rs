//! Turns counted by tapping at each pass of a mark, and the time they took.
//!
//! The watch starts with the first tap, so the count begins with the mark at the finger and no quarter turn is guessed: what
//! is left is when the finger came down.

use crate::quantity::{Measure, Unit};
use crate::readings::instrument::gum;
use crate::readings::instrument::timed::{HAND_LIMIT_S, Timed};

/// Milliseconds in a second.
const MS: f64 = 1000.0;

/// Taps so far, each at one pass of the mark.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Taps {
    /// Moments of the taps, ms on any clock that only runs forward; ascending.
    at_ms: Vec<f64>,
    /// The count ends by itself so long after the first tap, s.
    limit_s: Option<f64>,
}

/// What a count comes to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Counted {
    /// Whole turns: passes of the mark after the first.
    pub turns: u32,
    /// Time from the first pass to the last, s; where there was no second pass, how long it was waited for.
    pub seconds: f64,
    /// True once the set time is over.
    pub is_over: bool,
}

impl Taps {
    /// A count that ends by itself `limit_s` seconds after its first tap, or never.
    #[must_use]
    pub fn until(limit_s: Option<f64>) -> Taps {
        Taps {
            at_ms: Vec::new(),
            limit_s: limit_s.filter(|limit| limit.is_finite() && *limit > 0.0),
        }
    }

    /// A pass of the mark. Refused (false) once the set time is over, and where the clock went back.
    pub fn tap(&mut self, now_ms: f64) -> bool {
        let runs_back = self.at_ms.last().is_some_and(|last| now_ms < *last);
        if !now_ms.is_finite() || runs_back || self.is_over(now_ms) {
            return false;
        }
        self.at_ms.push(now_ms);
        true
    }

    /// Takes the last tap back; false where there is none.
    pub fn undo(&mut self) -> bool {
        self.at_ms.pop().is_some()
    }

    /// True once the first tap is made.
    #[must_use]
    pub fn is_started(&self) -> bool {
        !self.at_ms.is_empty()
    }

    /// Time since the first tap, s, no more than the set time; 0 before it.
    #[must_use]
    pub fn elapsed_s(&self, now_ms: f64) -> f64 {
        let since = self
            .at_ms
            .first()
            .map_or(0.0, |first| ((now_ms - first) / MS).max(0.0));
        self.limit_s.map_or(since, |limit| since.min(limit))
    }

    /// True once the set time is over.
    #[must_use]
    pub fn is_over(&self, now_ms: f64) -> bool {
        self.limit_s
            .is_some_and(|limit| self.is_started() && self.elapsed_s(now_ms) >= limit)
    }

    /// What it comes to now. None before the first tap.
    #[must_use]
    pub fn counted(&self, now_ms: f64) -> Option<Counted> {
        let (first, last) = (self.at_ms.first()?, self.at_ms.last()?);
        let turns = u32::try_from(self.at_ms.len() - 1).unwrap_or(u32::MAX);
        let seconds = if turns > 0 {
            (last - first) / MS
        } else {
            self.elapsed_s(now_ms)
        };
        Some(Counted {
            turns,
            seconds,
            is_over: self.is_over(now_ms),
        })
    }
}

impl Counted {
    /// Speed with its uncertainty: 60 N / t, both ends timed by hand to within [`HAND_LIMIT_S`]. None without a whole turn:
    /// then [`Counted::under`] is all that can be said.
    #[must_use]
    pub fn speed(self) -> Option<Timed> {
        if self.turns == 0 || self.seconds <= 0.0 {
            return None;
        }
        let speed = 60.0 * f64::from(self.turns) / self.seconds;
        let end = gum::rectangular(HAND_LIMIT_S);
        Some(Timed {
            value: Measure::new(speed, Unit::RevolutionPerMinute).ok()?,
            bias: 0.0,
            reading: speed * gum::combined(&[end, end]) / self.seconds,
        })
    }

    /// Speed that it stayed under, where no whole turn came in the time: less than one turn. None otherwise.
    #[must_use]
    pub fn under(self) -> Option<Measure> {
        if self.turns > 0 || self.seconds <= 0.0 {
            return None;
        }
        Measure::new(60.0 / self.seconds, Unit::RevolutionPerMinute).ok()
    }

    /// Standard uncertainty of the time, s.
    #[must_use]
    pub fn seconds_uncertainty(self) -> f64 {
        let end = gum::rectangular(HAND_LIMIT_S);
        gum::combined(&[end, end])
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn tapped(limit_s: Option<f64>, at_s: &[f64]) -> Taps {
        let mut taps = Taps::until(limit_s);
        for at in at_s {
            assert!(taps.tap(5000.0 + at * MS));
        }
        taps
    }

    #[test]
    fn the_first_tap_starts_the_watch_and_counts_no_turn() {
        let taps = tapped(None, &[0.0, 4.0, 8.0, 12.0]);
        let counted = taps.counted(99_000.0).expect("started");
        assert_eq!((counted.turns, counted.seconds), (3, 12.0));
        // 3 turns in 12 s = 15 rpm; both ends within 0.2 s: 0.2/√3·√2 = 0.1633 s of 12 s, 1.36 % of 15.
        let speed = counted.speed().expect("turned");
        assert!((speed.value.base() - 15.0).abs() < 1e-12);
        assert!((speed.combined() - 0.204_124).abs() < 1e-5);
    }

    #[test]
    fn a_tap_too_many_is_taken_back() {
        let mut taps = tapped(None, &[0.0, 4.0, 4.3]);
        assert!(taps.undo());
        let counted = taps.counted(20_000.0).expect("started");
        assert_eq!((counted.turns, counted.seconds), (1, 4.0));
        assert!(taps.undo() && taps.undo() && !taps.undo());
        assert_eq!(taps.counted(20_000.0), None);
    }

    #[test]
    fn after_the_set_time_nothing_is_counted() {
        let mut taps = tapped(Some(60.0), &[0.0, 41.0]);
        assert!(!taps.is_over(5000.0 + 59_900.0));
        assert!(!taps.tap(5000.0 + 60_000.0));
        let counted = taps.counted(90_000.0).expect("started");
        assert_eq!((counted.turns, counted.is_over), (1, true));
        assert_eq!(taps.elapsed_s(90_000.0), 60.0);
    }

    #[test]
    fn no_turn_in_a_minute_says_under_one_a_minute() {
        let counted = tapped(Some(60.0), &[0.0])
            .counted(90_000.0)
            .expect("started");
        assert_eq!(counted.speed(), None);
        let under = counted.under().expect("waited");
        assert!((under.base() - 1.0).abs() < 1e-12);
    }

    #[test]
    fn a_clock_that_runs_back_is_not_believed() {
        let mut taps = tapped(None, &[0.0, 2.0]);
        assert!(!taps.tap(6000.0));
        assert!(!taps.tap(f64::NAN));
        assert_eq!(taps.counted(9000.0).map(|counted| counted.turns), Some(1));
    }
}
