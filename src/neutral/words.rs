//! The report in words: short, with a unit at every figure, and never more certain than the interval.

use super::adjust::{EQUAL_HALVES, Fitted, Halves, NoFit, PLACE, Reach, Sense};
use super::brake::{self, Risk, Stop};
use super::electric::{Figure, Judged, Stands};
use super::nulls::{Nulls, Part, ServoPush, Sits};
use super::offset::{Offset, Says};
use super::report::{PILOT_DIFFER, PILOT_REST, PILOT_START, Report, SERVO_EQUAL, pair};
use crate::quantity::{DecimalMark, Kind, Measure, UnitPrefs};
use crate::record::NeutralSheet;
use crate::record::neutral::Field;

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
                    "The swash stands {} of full stroke off (95 %).",
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
                    "Between {} of full stroke (95 %): this reading does not tell the side.",
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
            "{name}: {} of stroke (95 %).",
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
                "The control pushes {} towards {side}: it asks {} of stroke (95 %).",
                self.bar(difference.abs()),
                self.span(push.stroke.low, push.stroke.high)
            ),
        )
    }

    /// The adjuster.
    #[must_use]
    pub fn series(&self, series: &Result<Fitted, NoFit>) -> Vec<Line> {
        let fitted = match series {
            Ok(fitted) => fitted,
            Err(why) => {
                let mut text = why.to_string();
                if let Some(first) = text.get(..1) {
                    text = first.to_uppercase() + text.get(1..).unwrap_or_default();
                }
                return vec![line(Tone::Open, format!("{text}."))];
            }
        };
        let mut out = vec![self.to_go(fitted)];
        if fitted.reach == Reach::BothSides {
            out.push(line(
                Tone::Look,
                format!(
                    "Dead band: {} either way, {} to {} (95 %).",
                    self.turns(fitted.dead.mean),
                    self.turns(fitted.dead.low.max(0.0)),
                    self.turns(fitted.dead.high)
                ),
            ));
        }
        if let Some(play) = fitted.play {
            out.push(if fitted.has_play() {
                line(
                    Tone::Bad,
                    format!(
                        "Two values, one from each side: play or hysteresis of {} ({} to {}, 95 %). No setting takes it out: \
                         joints, rod and spring first.",
                        self.turns(play.mean),
                        self.turns(play.low),
                        self.turns(play.high)
                    ),
                )
            } else {
                line(
                    Tone::Good,
                    format!(
                        "The same from both sides, as far as 1/16 turn can be set: play under {} (95 %). What is off is offset.",
                        self.turns(play.high)
                    ),
                )
            });
        }
        if fitted.scattered {
            out.push(line(
                Tone::Look,
                "The places do not lie on one line: oil, rpm or a lock nut changed between them, or a joint sticks.",
            ));
        }
        out
    }

    fn to_go(&self, fitted: &Fitted) -> Line {
        let go = fitted.to_go;
        match fitted.reach {
            Reach::NoMotion => line(
                Tone::Open,
                "No motion at any place: all lie in the dead band. Turn on until it just starts, each way.",
            ),
            Reach::OneSide => line(
                Tone::Open,
                "Motion on one side only: null and dead band cannot be told apart. Turn on until it goes the other way.",
            ),
            Reach::BothSides => match fitted.turn() {
                Some(sense) => line(
                    Tone::Bad,
                    format!(
                        "Turn {} {} from the last place, ± {} (95 %).{}",
                        self.turns(go.mean),
                        sense.words(),
                        self.turns(go.half().max(PLACE)),
                        match sense {
                            Sense::In => "",
                            Sense::Out =>
                                " Where it was counted turning in: go half a turn past, and come back in, so that the backlash \
                                 stays where it was.",
                        }
                    ),
                ),
                None => line(
                    Tone::Good,
                    format!(
                        "The last place is the null within ± {} (95 %): lock, and measure again locked.",
                        self.turns(go.half().max(PLACE))
                    ),
                ),
            },
        }
    }

    /// Halves of a dead band.
    #[must_use]
    pub fn halves(&self, halves: &Halves) -> Line {
        if halves.differ > EQUAL_HALVES {
            line(
                Tone::Bad,
                format!(
                    "Dead band not even: {} forward, {} reverse of equal servo pressures. The middle of the starts is not the null \
                     of the springs ({} apart): springs, coils or thresholds differ. Balance the servo pressures, note both.",
                    self.turns(halves.forward),
                    self.turns(halves.reverse),
                    self.turns(halves.apart)
                ),
            )
        } else {
            line(
                Tone::Good,
                format!(
                    "Halves of the dead band {} and {}: equal within 20 % (common practice).",
                    self.turns(halves.forward),
                    self.turns(halves.reverse)
                ),
            )
        }
    }

    fn figure(&self, name: &str, figure: Figure, usual: &str) -> Line {
        let (tone, word) = match figure.stands {
            Stands::Usual => (Tone::Good, "usual"),
            Stands::Edge => (Tone::Look, "at the edge"),
            Stands::Unusual => (Tone::Bad, "not usual"),
        };
        line(
            tone,
            format!(
                "{name}: {} ± {}, {word} ({usual}, common practice).",
                self.percent(figure.value),
                self.percent((2.0 * figure.uncertainty).max(0.01))
            ),
        )
    }

    /// Currents.
    #[must_use]
    pub fn currents(&self, judged: &Judged) -> Vec<Line> {
        let mut out = Vec::new();
        if judged.end_under_threshold {
            out.push(line(
                Tone::Bad,
                "An end current is no higher than its threshold: look for mixed-up sides or a slip of the pen.",
            ));
        }
        for (name, figure, usual) in [
            (
                "Thresholds differ by",
                judged.thresholds_differ,
                "up to 5 to 8 %",
            ),
            (
                "End currents differ by",
                judged.ends_differ,
                "up to 5 to 8 %",
            ),
            (
                "Threshold forward",
                judged.share_forward,
                "30 to 45 % of the end current",
            ),
            (
                "Threshold reverse",
                judged.share_reverse,
                "30 to 45 % of the end current",
            ),
        ] {
            if let Some(figure) = figure {
                out.push(self.figure(name, figure, usual));
            }
        }
        if let Some((off, wide)) = judged.null_off {
            let side = if off > 0.0 { "forward" } else { "reverse" };
            out.push(if off.abs() > 2.0 * wide {
                line(
                    Tone::Look,
                    format!(
                        "It starts later {side}: the null lies {} ± {} off in current. Pump null or unequal coils: swap the \
                         plugs and see whether it goes with them.",
                        self.milliampere(off),
                        self.milliampere(2.0 * wide)
                    ),
                )
            } else {
                line(
                    Tone::Good,
                    format!(
                        "Both starts alike within ± {}.",
                        self.milliampere(2.0 * wide)
                    ),
                )
            });
        }
        out
    }

    /// Pilot pressures left at rest.
    #[must_use]
    pub fn pilot_rest(&self, sheet: &NeutralSheet) -> Vec<Line> {
        let mut out = Vec::new();
        for (name, field) in [
            ("Forward pilot line at rest", Field::PilotForward),
            ("Reverse pilot line at rest", Field::PilotReverse),
        ] {
            if let Some(bar) = sheet.value(field) {
                let good = bar < PILOT_REST;
                out.push(line(
                    if good { Tone::Good } else { Tone::Bad },
                    format!(
                        "{name}: {} ({} {}, common practice).",
                        self.bar(bar),
                        if good { "under" } else { "should be under" },
                        self.bar(PILOT_REST)
                    ),
                ));
            }
        }
        out
    }

    /// Pilot pressures at which it starts.
    #[must_use]
    pub fn pilot_start(&self, sheet: &NeutralSheet) -> Vec<Line> {
        let mut out = Vec::new();
        if let Some((f, r)) = pair(sheet, Field::PilotStartForward, Field::PilotStartReverse) {
            let alike = (f - r).abs() <= PILOT_DIFFER;
            let usual = [f, r]
                .iter()
                .all(|bar| (PILOT_START.0..=PILOT_START.1).contains(bar));
            let tone = match (alike, usual) {
                (true, true) => Tone::Good,
                (true, false) => Tone::Look,
                (false, _) => Tone::Bad,
            };
            out.push(line(
                tone,
                format!(
                    "Starts at {} forward, {} reverse: {} apart (within {}; {} to {} usual, common practice).",
                    self.bar(f),
                    self.bar(r),
                    self.bar((f - r).abs()),
                    self.bar(PILOT_DIFFER),
                    self.bar(PILOT_START.0),
                    self.bar(PILOT_START.1)
                ),
            ));
        }
        out
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
