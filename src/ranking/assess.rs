//! The whole assessment of a visit: windows, causes, reasons, doubts.

use super::belief::Belief;
use super::datum::{Data, gather_visit, has_sides, path_of};
use super::hold::hold_time;
use super::memo::Memo;
use super::posterior::{Heavy, Weighed, weigh};
use super::predict::Bench;
use super::quick::Last;
use super::rows::rows;
use super::seen;
use crate::assessment::{Assessment, At, Cause, SinceBench, Trust, Window};
use crate::bench::since::since;
use crate::machine::{Warmth, builds, condition_latents, unit_latents};
use crate::math;
use crate::readings::instrument::Instrument;
use crate::readings::{Condition, Direction, Doing, Port, Reading, Seen};
use crate::record::Visit;
use crate::unit::{Tick, Unit};
use crate::windows::{Spreads, windows};
use crate::yard::learn::Rates;

/// Chance of a wrong gauge from which a reading is asked for again.
const ASK_AGAIN: f64 = 0.5;

/// Assesses a visit to a unit with the shop's instruments. Never fails: what cannot be judged is withheld with its reason.
pub fn assess(unit: &Unit, visit: &Visit, instruments: &[Instrument]) -> Assessment {
    Session::default().assess(unit, visit, instruments)
}

/// One call after another: what was solved for the last assessment serves the next.
#[derive(Clone, Debug, Default)]
pub struct Session {
    memo: Memo,
    spreads: Spreads,
    heavy: Vec<Heavy>,
    last: Option<Last>,
    rates: Rates,
}

impl Session {
    /// Takes these base rates from now on, learned from the shop's own cases; none learned: the catalogue's.
    pub fn learn(&mut self, rates: Rates) {
        if self.rates != rates {
            // What was carried from the last assessment was weighed with the old ones.
            self.last = None;
            self.rates = rates;
        }
    }

    /// As [`assess`], the quicker the less has changed since the last one. The answer does not hang on what came before.
    pub fn assess(&mut self, unit: &Unit, visit: &Visit, instruments: &[Instrument]) -> Assessment {
        let made = Prepared::new(unit, visit, instruments, self.memo.clone(), &self.rates);
        let windows = made.windows(&mut self.spreads);
        let posterior = weigh(&made.bench, &made.data, unit.sides);
        let answer = made.answer(windows, posterior.causes, posterior.change);
        self.heavy = posterior.heavy;
        let Prepared { data, bench, .. } = made;
        self.last = Some(Last::new(unit, &visit.id, data, &bench, posterior.carried));
        answer
    }

    /// A first look where little is new since the last assessment of this visit, for the moment until the full one is there:
    /// close to it, and many times quicker. None where it cannot be taken.
    pub fn look(
        &mut self,
        unit: &Unit,
        visit: &Visit,
        instruments: &[Instrument],
    ) -> Option<Assessment> {
        let last = self.last.as_ref().filter(|l| l.is_of(unit, &visit.id))?;
        let made = Prepared::new(unit, visit, instruments, self.memo.clone(), &self.rates);
        let weighed = last.weigh(&made.bench, &made.data, unit.sides)?;
        let windows = made.windows(&mut self.spreads);
        let mut answer = made.answer(windows, weighed, 0.0);
        answer.trust.first_look = true;
        Some(answer)
    }

    /// The nodes that carried weight in the last assessment: what the next check is chosen over.
    pub fn heavy(&self) -> &[Heavy] {
        &self.heavy
    }
}

/// A visit made ready to be weighed.
struct Prepared<'a> {
    unit: &'a Unit,
    visit: &'a Visit,
    instruments: &'a [Instrument],
    data: Data,
    bench: Bench,
    learned: Option<String>,
}

impl<'a> Prepared<'a> {
    fn new(
        unit: &'a Unit,
        visit: &'a Visit,
        instruments: &'a [Instrument],
        memo: Memo,
        rates: &Rates,
    ) -> Prepared<'a> {
        let belief = Belief {
            rates: rates.per_hundred.clone(),
            ..Belief::default()
        };
        let data = gather_visit(unit, visit, instruments, belief);
        let mut latents = unit_latents(unit);
        condition_latents(unit, &data.conditions, &mut latents);
        let mut bench = Bench::with(builds(unit), latents, &data, memo);
        // A window is wanted for every reading, also while nothing is typed yet.
        for (reading, condition) in visit.readings.iter().zip(&data.condition_of) {
            bench.want(*condition, path_of(unit, reading), reading.port);
        }
        Prepared {
            unit,
            visit,
            instruments,
            data,
            bench,
            learned: rates.words(),
        }
    }

    fn windows(&self, spreads: &mut Spreads) -> Vec<Window> {
        let mut windows = windows(
            self.unit,
            &self.visit.readings,
            &self.visit.riggings,
            self.instruments,
            &self.data,
            &self.bench,
            spreads,
        );
        for window in &mut windows {
            let mut readings = self.visit.readings.iter();
            let reading = readings.find(|reading| reading.id == window.reading);
            window.since_bench =
                reading.and_then(|reading| since(self.unit, self.visit, reading, self.instruments));
        }
        windows
    }

    fn answer(&self, windows: Vec<Window>, mut weighed: Vec<Weighed>, change: f64) -> Assessment {
        let Prepared {
            unit,
            visit,
            data,
            bench,
            learned,
            ..
        } = self;
        for w in &mut weighed {
            w.log_prior +=
                math::ln(seen::prior_factor(visit, w.id, w.with.map(|with| with.id)).max(1e-6));
        }
        let observed = seen::observed(visit);
        let words: Vec<String> = visit.readings.iter().map(|r| words(unit, r)).collect();
        let causes = rows(&weighed, data, &visit.readings, &observed, &words);
        let mut trust = trust(unit, visit, data, &weighed, &causes);
        trust.trust.change = change;
        trust.trust.solves = bench.solves.get();
        let hold = visit
            .readings
            .iter()
            .position(|r| r.condition.doing == Doing::Held)
            .map(|i| hold_time(unit, bench.speed(0, data.condition_of[i])));
        let grown = since_bench(&windows);
        Assessment {
            windows,
            causes,
            withheld: withheld(unit, visit, data),
            notes: notes(unit, visit, trust.swapped)
                .into_iter()
                .chain(grown)
                .chain(learned.clone())
                .collect(),
            trust: trust.trust,
            hold,
            advice: None,
        }
    }
}

/// How far to trust the causes, and the chance that something is swapped in the notes.
struct Trusted {
    trust: Trust,
    swapped: f64,
}

fn trust(
    unit: &Unit,
    visit: &Visit,
    data: &Data,
    weighed: &[Weighed],
    causes: &[Cause],
) -> Trusted {
    let share = |w: &Weighed| {
        causes
            .iter()
            .find(|c| is_of(c, w))
            .map_or(0.0, |c| match w.with {
                Some(_) => c.probability,
                None => member_share(c, w.at()),
            })
    };
    let mut trust = Trust::default();
    let mut swapped = 0.0;
    let mut wrong = vec![0.0; data.groups];
    for w in weighed {
        let p = share(w);
        swapped += p * w.swapped;
        for (total, own) in wrong.iter_mut().zip(&w.wrong) {
            *total += p * own;
        }
    }
    if let Some(lead) = causes
        .first()
        .and_then(|c| weighed.iter().find(|w| is_of(c, w)))
    {
        trust.heaviest = lead.heaviest;
    }
    trust.wrong_reading = 1.0 - wrong.iter().map(|w| 1.0 - w).product::<f64>();
    for (group, chance) in wrong.iter().enumerate() {
        if *chance > ASK_AGAIN {
            for d in data.data.iter().filter(|d| d.group == group) {
                if let Some(r) = visit.readings.get(d.reading) {
                    trust.retake.push((r.id.clone(), retake_words(unit, r)));
                }
            }
        }
    }
    Trusted { trust, swapped }
}

/// True where a row speaks of a weighed cause or pair.
fn is_of(cause: &Cause, w: &Weighed) -> bool {
    let has = |at| cause.members().any(|m| m == at);
    has(w.at()) && cause.pair.is_some() == w.with.is_some() && w.with.is_none_or(has)
}

fn member_share(cause: &Cause, at: At) -> f64 {
    cause
        .members()
        .position(|m| m == at)
        .and_then(|i| cause.shares.get(i).copied())
        .unwrap_or(0.0)
}

/// A reading in words: port and condition.
fn words(unit: &Unit, reading: &Reading) -> String {
    let sided = has_sides(unit, reading.port);
    format!(
        "{}{}, {}",
        reading.port.words(),
        if sided {
            format!(" {}", reading.path.words())
        } else {
            String::new()
        },
        condition_words(&reading.condition)
    )
}

fn condition_words(c: &Condition) -> String {
    let mut out = c.doing.words().to_lowercase();
    if !c.stroked.is_both() {
        out.push_str(", ");
        out.push_str(c.stroked.words());
    }
    if !c.doing.is_neutral() {
        out.push_str(match c.direction {
            Direction::Forward => ", forward",
            Direction::Reverse => ", reverse",
        });
    }
    out.push_str(&match c.engine {
        crate::readings::EngineSpeed::LowIdle => ", low idle".to_string(),
        crate::readings::EngineSpeed::HighIdle => ", high idle".to_string(),
        crate::readings::EngineSpeed::Measured(m) => format!(", {:.0} rpm", m.base()),
    });
    out
}

fn retake_words(unit: &Unit, reading: &Reading) -> String {
    let proof = match (&reading.seen, reading.port) {
        (Some(Seen::Nothing), _) => {
            "Push the coupling home, open the snubber, crack the hose end at the gauge: does oil come?"
        }
        (_, Port::LoopA | Port::LoopB) => {
            "Which side is it on? Stroke a little the other way: the high side must change over."
        }
        _ => {
            "Gauge on the right port? Put a second gauge on it, or read this one at zero with the pressure bled off."
        }
    };
    format!(
        "{} does not fit what the others say. Take it again. {proof}",
        words(unit, reading)
    )
}

fn withheld(unit: &Unit, visit: &Visit, data: &Data) -> Vec<String> {
    let mut out: Vec<String> = data.silent.iter().map(|(_, why)| why.clone()).collect();
    out.sort();
    out.dedup();
    let loop_or_drain =
        |r: &Reading| r.condition.doing == Doing::Held || r.port == Port::MotorDrain;
    if visit
        .readings
        .iter()
        .any(|r| r.seen.is_some() && loop_or_drain(r) && !Warmth::of(unit, &r.condition).taken)
    {
        out.push("Leakage is judged at oil temperature, and none was taken with these readings: the windows are wide until it is.".to_string());
    }
    out
}

/// What case flows say against the bench, where it is sure either way. The figures stand beside the readings.
fn since_bench(windows: &[Window]) -> Option<String> {
    windows.iter().find_map(|window| match window.since_bench {
        Some(SinceBench::Times { low, .. }) if low > 1.0 => Some(
            "The motor leaks more into its case than the bench measured of it, at the same oil and pressure. How many times stands beside the reading.".to_string(),
        ),
        Some(SinceBench::Times { high, .. }) if high < 1.0 => Some(
            "The motor seems to leak less into its case than the bench measured of it. Motors do not heal: look at the oil's temperature, at the jug, and whether it is the same motor.".to_string(),
        ),
        _ => None,
    })
}

fn notes(unit: &Unit, visit: &Visit, swapped: f64) -> Vec<String> {
    let mut out = Vec::new();
    if crate::observations::stop_work(&visit.observations) {
        out.push("It keeps going with the lever in neutral: do not test. Stop the engine, chock it, do not drive it onto a trailer.".to_string());
    }
    if swapped > 0.5 {
        out.push("The loop readings fit better with sides A and B changed over. Check which port is which: the side that rises when stroked forward is A.".to_string());
    }
    if unit.ticks.flushing == Tick::Unknown && visit.readings.iter().any(|r| r.port == Port::Charge)
    {
        out.push("Whether this unit has loop flushing is not known, so a charge pressure that does not fall in drive proves nothing yet. Both builds are weighed.".to_string());
    }
    if visit
        .readings
        .iter()
        .any(|r| r.port == Port::ReturnFlow && r.seen.is_some())
    {
        out.push("Total return is what the charge pump delivers: it says nothing about wear of pump or motor.".to_string());
    }
    let held_full = |r: &Reading| {
        r.condition.doing == Doing::Held && r.condition.lever == crate::readings::Lever::Full
    };
    if visit
        .readings
        .iter()
        .any(|r| r.port == Port::Charge && held_full(r))
    {
        out.push("Charge at a full held stroke is not a leak reading: the whole flow passes the low side's check. Take it at the least stroke that reaches the plateau.".to_string());
    }
    out
}
