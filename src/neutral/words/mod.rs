//! The report in words: short, with a unit at every figure, and never more certain than the interval.

mod setting;

use crate::neutral::brake::{self, Risk, Stop};
use crate::neutral::nulls::{Nulls, Part, ServoPush, Sits};
use crate::neutral::offset::{Offset, Says};
use crate::neutral::report::{Report, SERVO_EQUAL};
use crate::quantity::{DecimalMark, Kind, Measure, UnitPrefs};

/// How a sentence stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Tone {
    /// As it should be.
    Good,
    /// To look at.
    Look,
    /// Not as it should be.
    Bad,
    /// Cannot be told from this.
    Open,
    /// Danger.
    Stop,
}

/// A sentence.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// How it stands.
    pub tone: Tone,
    /// The words.
    pub text: String,
}

fn line(tone: Tone, text: impl Into<String>) -> Line {
    Line {
        tone,
        text: text.into(),
    }
}

/// Writes figures in the mechanic's units and with the mechanic's decimal mark.
#[derive(Clone, Debug)]
pub struct Writer<'a> {
    prefs: &'a UnitPrefs,
}

impl<'a> Writer<'a> {
    /// A writer.
    #[must_use]
    pub fn new(prefs: &'a UnitPrefs) -> Writer<'a> {
        Writer { prefs }
    }

    fn marked(&self, text: String) -> String {
        let text = text.replace('-', "−");
        match self.prefs.mark() {
            DecimalMark::Comma => text.replace('.', ","),
            DecimalMark::Point => text,
        }
    }

    /// A share of stroke as per cent, without its sign.
    #[must_use]
    pub fn stroke(&self, share: f64) -> String {
        let percent = 100.0 * share.abs();
        self.marked(match percent {
            p if p < 0.1 => format!("{p:.2} %"),
            p if p < 10.0 => format!("{p:.1} %"),
            p => format!("{p:.0} %"),
        })
    }

    /// Turns, with two places: half a sixteenth is what a hand can set.
    #[must_use]
    pub fn turns(&self, turns: f64) -> String {
        let text = format!("{:.2}", turns.abs());
        let word = if text == "1.00" { "turn" } else { "turns" };
        self.marked(format!("{text} {word}"))
    }

    /// A pressure in the mechanic's unit.
    #[must_use]
    pub fn bar(&self, bar: f64) -> String {
        Measure::from_base(bar, Kind::Pressure)
            .map_or_else(|_| String::from("no figure"), |m| self.prefs.print(m))
    }

    fn milliampere(&self, current: f64) -> String {
        self.marked(format!("{:.0} mA", current.abs()))
    }

    fn percent(&self, share: f64) -> String {
        self.marked(format!("{:.0} %", 100.0 * share.abs()))
    }

    /// A counted speed.
    #[must_use]
    pub fn rpm(&self, rpm: f64) -> String {
        self.marked(format!("{:.2} rpm", rpm.abs()))
    }

    fn span(&self, low: f64, high: f64) -> String {
        let way = |v: f64| if v < 0.0 { "reverse" } else { "forward" };
        if low < 0.0 && high > 0.0 {
            format!(
                "{} reverse to {} forward",
                self.stroke(low),
                self.stroke(high)
            )
        } else {
            let (near, far) = if low >= 0.0 { (low, high) } else { (high, low) };
            format!("{} to {} {}", self.stroke(near), self.stroke(far), way(far))
        }
    }

    /// The swash offset.
    #[must_use]
    pub fn offset(&self, offset: &Offset) -> Line {
        match offset.says {
            Says::Off => line(
                Tone::Bad,
                format!(
                    "The swash stands off by {} (share of full stroke, 95 %).",
                    self.span(offset.low, offset.high)
                ),
            ),
            Says::Within { under } => line(
                Tone::Open,
                format!(
                    "Dead zone: off by under {} of stroke either way (95 %). That is no proof of null: within it brake, drag or \
                     leakage hold the machine.",
                    self.stroke(under)
                ),
            ),
            Says::Either => line(
                Tone::Open,
                format!(
                    "Between {} (share of full stroke, 95 %): this reading does not tell the side.",
                    self.span(offset.low, offset.high)
                ),
            ),
            Says::AtLeast => {
                let (near, way) = if offset.mean < 0.0 {
                    (offset.high, "reverse")
                } else {
                    (offset.low, "forward")
                };
                line(
                    Tone::Bad,
                    format!(
                        "Off by {} of stroke {way} at least (95 %): the reading is at the end of what can show.",
                        self.stroke(near)
                    ),
                )
            }
        }
    }

    fn part(&self, name: &str, part: Part) -> Line {
        let text = format!(
            "{name}: {} (share of full stroke, 95 %).",
            self.span(part.low, part.high)
        );
        line(if part.is_off() { Tone::Bad } else { Tone::Open }, text)
    }

    /// Control null and servo null.
    #[must_use]
    pub fn nulls(&self, nulls: &Nulls) -> Vec<Line> {
        let verdict = match nulls.sits {
            Sits::Control => line(
                Tone::Bad,
                "It sits in the control: set the control’s null, leave the servo’s centre.",
            ),
            Sits::Servo => line(
                Tone::Bad,
                "It sits in the servo: set the servo’s own centre first, as the manual has it.",
            ),
            Sits::Both => line(
                Tone::Bad,
                "Both are off: the servo’s centre first, bridged; then the control.",
            ),
            Sits::Neither => line(
                Tone::Open,
                "Neither is shown to be off by these readings; both may be, within the intervals.",
            ),
        };
        vec![
            verdict,
            self.part("Control null", nulls.control),
            self.part("Servo null", nulls.servo),
        ]
    }

    /// Servo pressures: forward over reverse by `difference` bar.
    #[must_use]
    pub fn servo(&self, difference: f64, push: &ServoPush) -> Line {
        let side = if difference < 0.0 {
            "reverse"
        } else {
            "forward"
        };
        if difference.abs() <= SERVO_EQUAL {
            return line(
                Tone::Good,
                format!(
                    "Servo pressures {} apart: equal (within {}, common practice).",
                    self.bar(difference.abs()),
                    self.bar(SERVO_EQUAL)
                ),
            );
        }
        if push.rests > 0.9 {
            return line(
                Tone::Look,
                format!(
                    "The control pushes {} towards {side}, under the springs’ preload of about {}: the piston rests. It is off, \
                     and shows once oil or rpm change.",
                    self.bar(difference.abs()),
                    self.bar(push.preload)
                ),
            );
        }
        line(
            Tone::Bad,
            format!(
                "The control pushes {} towards {side}: it asks {} (share of full stroke, 95 %).",
                self.bar(difference.abs()),
                self.span(push.stroke.low, push.stroke.high)
            ),
        )
    }

    /// Where a locked check stops.
    #[must_use]
    pub fn stop(&self, stop: &Stop) -> Vec<Line> {
        let source = if stop.is_known {
            "0.6 of the brake torque in the profile"
        } else {
            "brake torque not in the profile: 0.6 of half the motor’s torque at relief, common practice"
        };
        let mut out = vec![line(
            Tone::Stop,
            format!(
                "Stop at {} of loop difference ({source}).",
                self.bar(stop.bar)
            ),
        )];
        if stop.may_release {
            out.push(line(
                Tone::Stop,
                "The brake may be released by charge or by the control itself as soon as it moves: a locked test can unlock \
                 itself.",
            ));
        }
        out
    }

    /// The difference about to be built, against the brake.
    #[must_use]
    pub fn risk(&self, risk: &Risk) -> Line {
        let (low, high) = if risk.builds.low.abs() > risk.builds.high.abs() {
            (-risk.builds.high, -risk.builds.low)
        } else {
            (risk.builds.low, risk.builds.high)
        };
        let builds = format!(
            "Held, this offset would build {} to {} (95 %)",
            self.bar(low.max(0.0)),
            self.bar(high)
        );
        let stop = self.bar(risk.stop.bar);
        match risk.says {
            brake::Says::Under => line(
                Tone::Look,
                format!("{builds}, under the {stop} that the brake may be asked."),
            ),
            brake::Says::MayPass => line(
                Tone::Stop,
                format!(
                    "{builds}: that can pass the {stop} that the parking brake may be asked. It may slip. Capped ports or a real \
                     obstacle, low idle."
                ),
            ),
            brake::Says::Passes => line(
                Tone::Stop,
                format!(
                    "{builds}, past the {stop} that the parking brake may be asked: do not lock it on the brake. Count the creep \
                     with the wheels free instead."
                ),
            ),
        }
    }

    /// What stands in the way.
    #[must_use]
    pub fn missing(&self, report: &Report) -> Vec<Line> {
        let mut out: Vec<Line> = report
            .missing
            .iter()
            .map(|what| line(Tone::Open, format!("Still missing: {what}")))
            .collect();
        if report.fits_none {
            out.push(line(
                Tone::Open,
                "No machine of this profile shows these readings together: look at the directions, the times and the profile.",
            ));
        }
        out
    }
}
