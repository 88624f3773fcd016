//! How often the truth lies in the stated 95 % interval: of a swash offset from creep or a held difference, and of the null on an
//! adjuster from a series of places, on machines of the assay's own world.

use super::world::Machine;
use lowside::math;
use lowside::neutral::adjust::{Point, Reach, Seen, Sense, fit};
use lowside::neutral::offset::{Offset, Says, Taken, offset};
use lowside::neutral::response::Shows;
use lowside::quantity::{Kind, Measure};
use lowside::readings::{
    Condition, Doing, EngineSpeed, OilTemperature, Path, Place, Port, instrument::gum,
};
use lowside::unit::Paths;
use lowside::windows::Normals;

/// Time over which turns are counted, s.
const COUNTED_S: f64 = 60.0;
/// Standard uncertainty of a held difference from two transducers zeroed together, bar, and as a share of it.
const PAIRED: (f64, f64) = (0.6, 0.005);

/// Stated interval against the truth.
#[derive(Default)]
struct Tally {
    cases: usize,
    inside: usize,
    low_out: usize,
    high_out: usize,
    two_sided: usize,
    wrong_side: usize,
    widths: Vec<f64>,
}

impl Tally {
    fn add(&mut self, truth: f64, (low, high): (f64, f64), two_sided: bool) {
        self.cases += 1;
        self.inside += usize::from((low..=high).contains(&truth));
        self.low_out += usize::from(truth < low);
        self.high_out += usize::from(truth > high);
        if two_sided {
            self.two_sided += 1;
            self.widths.push(high - low);
            self.wrong_side +=
                usize::from((low > 0.0 && truth < 0.0) || (high < 0.0 && truth > 0.0));
        }
    }

    fn print(&mut self, name: &str, unit: &str, scale: f64) {
        self.widths.sort_by(f64::total_cmp);
        let middle = self
            .widths
            .get(self.widths.len() / 2)
            .copied()
            .unwrap_or(f64::NAN);
        println!(
            "{name:<34} {:>5} cases: {:.3} inside (under {:.3}, over {:.3}); {} two-sided, median ± {:.2} {unit}; wrong side {}",
            self.cases,
            self.inside as f64 / self.cases.max(1) as f64,
            self.low_out as f64 / self.cases.max(1) as f64,
            self.high_out as f64 / self.cases.max(1) as f64,
            self.two_sided,
            0.5 * middle * scale,
            self.wrong_side,
        );
    }
}

/// Prints the shares.
pub fn neutral(cases: usize, seed: u64) {
    let mut draw = Normals::new(seed);
    let (mut creep, mut held, mut both) = (Tally::default(), Tally::default(), Tally::default());
    let (mut turns, mut turns_held, mut play) =
        (Tally::default(), Tally::default(), Tally::default());
    let mut one_side = 0;
    while creep.cases < cases {
        let Some(mut machine) = Machine::draw(&mut draw, Paths::One, &[]) else {
            continue;
        };
        let condition = condition(&mut draw);
        let truth = 0.02 * draw.normal() * (1.0 + draw.unit());
        machine.null = Some(truth);
        let free = take(&machine, Shows::Creep, &condition, &mut draw);
        let locked = take(&machine, Shows::Difference, &condition, &mut draw);
        let (Some(free), Some(locked)) = (free, locked) else {
            continue;
        };
        for (tally, taken) in [
            (&mut creep, &[free][..]),
            (&mut held, &[locked][..]),
            (&mut both, &[free, locked][..]),
        ] {
            match offset(&machine.unit, taken) {
                Some(o) => judge(tally, truth, &o),
                None => tally.add(truth, (f64::NAN, f64::NAN), false),
            }
        }
        for (tally, shows) in [
            (&mut turns, Shows::Creep),
            (&mut turns_held, Shows::Difference),
        ] {
            if series(tally, &machine, shows, &condition, &mut draw, false).is_none() {
                one_side += 1;
            }
        }
        let _ = series(
            &mut play,
            &machine,
            Shows::Creep,
            &condition,
            &mut draw,
            true,
        );
    }
    creep.print("offset from creep", "% stroke", 100.0);
    held.print("offset from a held difference", "% stroke", 100.0);
    both.print("offset from both", "% stroke", 100.0);
    turns.print("null on the adjuster, creep", "turns", 1.0);
    turns_held.print("null on the adjuster, difference", "turns", 1.0);
    play.print("null, reached from both sides", "turns", 1.0);
    println!("series that saw one side only, left out: {one_side}");
}

fn condition(draw: &mut Normals) -> Condition {
    let celsius = 45.0 + 30.0 * draw.unit();
    Condition {
        doing: Doing::NeutralFree,
        engine: if draw.unit() < 0.5 {
            EngineSpeed::HighIdle
        } else {
            EngineSpeed::LowIdle
        },
        oil: Measure::from_base(celsius, Kind::Temperature)
            .ok()
            .map(|value| OilTemperature {
                value,
                place: Place::DrainHose,
            }),
        ..Condition::start()
    }
}

/// A reading as it is written down: turns to a quarter in a minute, or a difference from paired transducers.
fn take(
    machine: &Machine,
    shows: Shows,
    condition: &Condition,
    draw: &mut Normals,
) -> Option<Taken> {
    let condition = Condition {
        doing: shows.doing(),
        ..*condition
    };
    let truth = machine.null.unwrap_or_default();
    let (value, uncertainty) = match shows {
        Shows::Creep | Shows::CreepBridged => {
            let (rpm, _) = machine.shows_and_swings(Path::Left, Port::Wheel, &condition)?;
            let turns = rpm * COUNTED_S / 60.0 + 0.1 * draw.normal();
            let turns = ((4.0 * turns).round() / 4.0).max(0.0);
            let quarter = gum::rectangular(0.25) * 60.0 / COUNTED_S;
            (turns * 60.0 / COUNTED_S * truth.signum(), quarter)
        }
        Shows::Difference => {
            let (bar, _) =
                machine.shows_and_swings(Path::Left, Port::LoopDifference, &condition)?;
            let wide = gum::combined(&[PAIRED.0, PAIRED.1 * bar]);
            (bar + wide * draw.normal(), wide)
        }
    };
    Some(Taken {
        shows,
        condition,
        value,
        uncertainty,
    })
}

fn judge(tally: &mut Tally, truth: f64, o: &Offset) {
    match o.says {
        Says::Off | Says::Either => tally.add(truth, (o.low, o.high), true),
        Says::Within { under } => tally.add(truth, (-under, under), false),
        Says::AtLeast if o.mean > 0.0 => tally.add(truth, (o.low, f64::INFINITY), false),
        Says::AtLeast => tally.add(truth, (f64::NEG_INFINITY, o.high), false),
    }
}

/// A series of places on an adjuster; none where only one side was seen, which states no interval.
fn series(
    tally: &mut Tally,
    machine: &Machine,
    shows: Shows,
    condition: &Condition,
    draw: &mut Normals,
    plays: bool,
) -> Option<()> {
    let mut machine = machine.clone();
    // Stroke a turn, the sense, the control's own dead band, and play in the joints.
    let gain = 0.03 * math::exp(0.4 * draw.normal()) * if draw.unit() < 0.5 { 1.0 } else { -1.0 };
    let band = 0.004 * draw.unit();
    let slack = if plays { 0.3 * draw.unit() } else { 0.0 };
    let null = 0.6 * draw.normal();
    let count = 6 + (3.0 * draw.unit()) as usize;
    let reach = 0.03 / gain.abs() * (0.7 + 0.6 * draw.unit());
    let mut points = Vec::new();
    for i in 0..count {
        let share = 2.0 * i as f64 / (count - 1) as f64 - 1.0;
        let asked = null + reach * share + 0.3 * reach * (draw.unit() - 0.5);
        let sense = if plays && i % 2 == 1 {
            Sense::Out
        } else {
            Sense::In
        };
        let noted = asked + 0.0625 * (2.0 * draw.unit() - 1.0);
        let follows = asked - 0.5 * slack * sense.sign();
        let raw = gain * (follows - null);
        machine.null = Some((raw.abs() - band).max(0.0) * raw.signum());
        let taken = take(&machine, shows, condition, draw)?;
        points.push(Point {
            turns: noted,
            from: Some(sense),
            seen: Seen::Value {
                value: taken.value,
                uncertainty: taken.uncertainty,
            },
        });
    }
    let fitted = fit(&points).ok()?;
    if fitted.reach != Reach::BothSides {
        return None;
    }
    tally.add(null, (fitted.null.low, fitted.null.high), true);
    if std::env::var_os("ASSAY_TELL").is_some()
        && !(fitted.null.low..=fitted.null.high).contains(&null)
    {
        println!("{shows:?} null {null:.3}, gain {gain:.4}, band {band:.4}: {fitted:?}");
        for point in &points {
            println!("   {:.3} {:?}", point.turns, point.seen);
        }
    }
    // A slip here would be told by the share above; the sense is certain in any such series.
    if fitted.in_is_forward != (gain > 0.0) {
        tally.wrong_side += 1;
    }
    Some(())
}
