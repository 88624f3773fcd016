//! What the watch view says beside the needle: what the hands do and where the eyes are while the engine runs, and the dial on
//! which the expected band is drawn where the gauge's own needle will stand.

use crate::readings::instrument::Instrument;
use crate::readings::{Condition, Doing, Port};

/// The safety line of a condition. It stays in sight all the time.
#[must_use]
pub fn safety(condition: &Condition) -> &'static str {
    match condition.doing {
        Doing::Held => {
            "Lever back the moment the time is over. Nobody in front, behind or beside the hoses. Hand on the stop."
        }
        Doing::Free | Doing::NeutralFree | Doing::NeutralBridged => {
            "Hands off, stand clear of turning wheels and tracks. Eyes on the machine, hand on the stop."
        }
        Doing::Travel | Doing::Loaded | Doing::Overrun => {
            "The driver looks ahead and reads no gauge. A second person in a seat reads, or the needle is filmed."
        }
        Doing::Neutral => "Hands off hoses and shafts. Eyes on the machine, hand on the stop.",
    }
}

/// A dial: its ends, and what its divisions are, in the unit in which it is shown.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dial {
    /// Lower end.
    pub low: f64,
    /// Upper end.
    pub high: f64,
    /// From one figure on the dial to the next.
    pub step: f64,
    /// True where these are the ends of the instrument that stands on the port.
    pub is_instruments: bool,
}

/// Most figures on a dial that is read from two metres.
const FIGURES: f64 = 6.0;

impl Dial {
    /// The instrument's own dial where its ends are known and the band lies on it, else a round one round the band. Everything in
    /// the unit of the dial: `span` the instrument's ends, `band` the expected ends. None where the band is no band.
    #[must_use]
    pub fn of(span: Option<(f64, f64)>, band: (f64, f64)) -> Option<Dial> {
        let (low, high) = band;
        if !(low.is_finite() && high.is_finite() && low <= high) {
            return None;
        }
        let fits = |(from, to): &(f64, f64)| {
            from.is_finite() && to.is_finite() && from < to && *from <= high && low < *to
        };
        if let Some((from, to)) = span.filter(fits) {
            return Some(Dial {
                low: from,
                high: to,
                step: step(to - from),
                is_instruments: true,
            });
        }
        // Room for what is too low and what is too high.
        let room = (high - low).max(0.25 * high.abs().max(low.abs())).max(5e-3);
        let step = step((high + room) - (low - room).min(0.0));
        let from = if low >= 0.0 {
            0.0
        } else {
            ((low - room) / step).floor() * step
        };
        let to = ((high + room) / step).ceil() * step;
        Some(Dial {
            low: from,
            high: to,
            step,
            is_instruments: false,
        })
    }

    /// Where a value stands, 0 at the lower end and 1 at the upper; beyond the ends it stays on them.
    #[must_use]
    pub fn place(&self, value: f64) -> f64 {
        ((value - self.low) / (self.high - self.low)).clamp(0.0, 1.0)
    }

    /// The figures on it.
    #[must_use]
    pub fn figures(&self) -> Vec<f64> {
        let first = (self.low / self.step - 1e-9).ceil();
        let last = (self.high / self.step + 1e-9).floor();
        let mut figures = Vec::new();
        let mut at = first;
        while at <= last && figures.len() < 16 {
            // No minus before a nought.
            figures.push(at * self.step + 0.0);
            at += 1.0;
        }
        figures
    }
}

/// A round step (1, 2 or 5) that leaves at most [`FIGURES`] of them.
fn step(width: f64) -> f64 {
    let mut step = 1e-3;
    let mut next = [2.0, 2.5, 2.0].into_iter().cycle();
    while width / step > FIGURES {
        let Some(factor) = next.next() else { break };
        step *= factor;
        if step > 1e9 {
            break;
        }
    }
    step
}

/// What the needle is looked for on: the instrument by name, or that none is named.
#[must_use]
pub fn instrument(port: Port, instrument: Option<&Instrument>) -> String {
    match instrument {
        Some(instrument) => format!("On: {}", instrument.name.trim()),
        None if port.kind() == crate::quantity::Kind::Pressure => {
            String::from("No gauge named: the dial is drawn round the band")
        }
        None => String::from("No instrument named"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_gauge_on_the_port_gives_the_dial() {
        let dial = Dial::of(Some((0.0, 60.0)), (18.2, 23.9)).expect("a dial");
        assert!(dial.is_instruments);
        assert_eq!((dial.low, dial.high, dial.step), (0.0, 60.0, 10.0));
        assert_eq!(dial.figures(), [0.0, 10.0, 20.0, 30.0, 40.0, 50.0, 60.0]);
        assert!((dial.place(30.0) - 0.5).abs() < 1e-12);
        assert_eq!((dial.place(-5.0), dial.place(99.0)), (0.0, 1.0));
    }

    #[test]
    fn a_band_beside_the_gauge_is_drawn_on_a_dial_of_its_own() {
        // A loop pressure on a charge gauge: the band is off that scale.
        let dial = Dial::of(Some((0.0, 60.0)), (380.0, 430.0)).expect("a dial");
        assert!(!dial.is_instruments);
        assert!(dial.low == 0.0 && dial.high >= 480.0, "{dial:?}");
        let dial = Dial::of(None, (-12.0, 12.0)).expect("a dial");
        assert!(
            dial.low <= -36.0 && dial.high >= 36.0 && dial.figures().contains(&0.0),
            "{dial:?}"
        );
    }

    #[test]
    fn every_dial_has_a_few_figures_and_the_band_on_it() {
        for low in [0.0, 0.3, 4.7, 21.0, 380.0, 2250.0] {
            for width in [0.0, 0.1, 3.0, 160.0] {
                let band = (low, low + width);
                let dial = Dial::of(None, band).expect("a dial");
                let figures = dial.figures().len();
                assert!((3..=8).contains(&figures), "{band:?}: {dial:?}");
                assert!(
                    dial.low <= band.0 && band.1 < dial.high,
                    "{band:?}: {dial:?}"
                );
            }
        }
    }

    #[test]
    fn what_is_no_band_has_no_dial() {
        for band in [(f64::NAN, 1.0), (1.0, f64::INFINITY), (2.0, 1.0)] {
            assert_eq!(Dial::of(None, band), None);
        }
    }

    #[test]
    fn every_condition_has_its_safety_line() {
        for doing in Doing::ALL {
            let line = safety(&Condition {
                doing,
                ..Condition::start()
            });
            assert!(
                line.ends_with('.') && line.chars().count() < 140,
                "{doing:?}"
            );
        }
        let held = Condition {
            doing: Doing::Held,
            ..Condition::start()
        };
        assert!(safety(&held).contains("Lever back"));
    }
}
