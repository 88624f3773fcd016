//! The setting in words: the adjuster, its dead band, currents and pilot pressures.

use super::{Line, Tone, Writer, line};
use crate::neutral::adjust::{EQUAL_HALVES, Fitted, Halves, NoFit, PLACE, Reach, Sense};
use crate::neutral::electric::{Figure, Judged, Stands};
use crate::neutral::report::{PILOT_DIFFER, PILOT_REST, PILOT_START, pair};
use crate::record::NeutralSheet;
use crate::record::neutral::Field;

impl Writer<'_> {
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
}
