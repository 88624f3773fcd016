//! What it says that needles swung or stood still: air and an empty low side make them swing, and a hand that notes it once
//! notes it again.

use super::datum::Datum;
use crate::math;
use crate::quantity::Kind;

/// Chance that whoever took the readings writes a swing down at all. Common practice.
const NOTES_SWINGS: f64 = 0.6;

/// Log factor of all swings of a visit: the readings of one hand are one statement, not many independent ones.
#[derive(Clone, Copy, Debug, Default)]
pub struct Swings {
    log: f64,
    noted: bool,
}

impl Swings {
    /// Adds a reading, taken where the low side fills or starves.
    pub fn add(&mut self, d: &Datum, starved: bool) {
        if d.port.kind() != Kind::Pressure {
            return;
        }
        self.noted |= d.swung;
        // Common practice. That a sound machine's needles stand still is no news, however often it is seen.
        self.log += match (d.swung, starved) {
            (true, true) => math::ln(0.7),
            (true, false) => math::ln(0.1),
            (false, true) => math::ln(0.3),
            (false, false) => 0.0,
        };
    }

    /// Log factor of all of them.
    pub fn log(&self) -> f64 {
        let careful = math::ln(NOTES_SWINGS) + self.log;
        if self.noted {
            careful
        } else {
            math::ln_sum_exp(&[careful, math::ln(1.0 - NOTES_SWINGS)])
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::ranking::datum::Says;
    use crate::readings::Port;

    fn pressure(swung: bool) -> Datum {
        Datum {
            reading: 0,
            port: Port::Charge,
            condition: 0,
            says: Says::Value,
            t: 0.0,
            value: 20.0,
            own: 0.1,
            bias: 0.0,
            group: 0,
            gauge: 0,
            path: crate::readings::Path::Left,
            swung,
            instrument: 0.1,
        }
    }

    fn all(swung: bool, starved: bool, n: usize) -> f64 {
        let mut s = Swings::default();
        for _ in 0..n {
            s.add(&pressure(swung), starved);
        }
        s.log()
    }

    #[test]
    fn still_needles_speak_against_air_but_never_without_end() {
        let few = all(false, true, 1) - all(false, false, 1);
        let many = all(false, true, 40) - all(false, false, 40);
        assert!(few < 0.0 && many < few, "{few} {many}");
        assert!(many > math::ln(1.0 - NOTES_SWINGS) - 0.1, "{many}");
    }

    #[test]
    fn a_noted_swing_speaks_for_air() {
        assert!(all(true, true, 2) - all(true, false, 2) > 3.0);
    }
}
