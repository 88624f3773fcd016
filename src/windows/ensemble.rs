//! The ensemble of healthy machines behind the windows.

use super::draw::Normals;
use super::words::basis;
use crate::assessment::{Standing, Window, WindowSource};
use crate::circuit::Param;
use crate::faults::{self, FaultId};
use crate::machine::describe_basis;
use crate::quantity::Measure;
use crate::ranking::{Accuracy, Bench, Data, Node, accuracy, instrument_of, path_of};
use crate::readings::instrument::Instrument;
use crate::readings::{Condition, Doing, Path, Port, Reading, Rigging, Seen};
use crate::unit::{FigureId, ManualWindow, Unit};

/// Draws behind each window.
const DRAWS: usize = 240;
/// Seed of the draws: the same windows each time and on every target.
const SEED: u64 = 0x10F5_1DE0;

/// Values of one reading over the ensemble, sorted; and how many draws had no steady state.
#[derive(Clone, Debug, Default)]
struct Spread {
    values: Vec<f64>,
    without_state: usize,
}

/// Ensembles kept from one assessment to the next, as long as the unit stays as it is.
#[derive(Clone, Debug, Default)]
pub struct Spreads {
    unit: Option<Unit>,
    kept: Vec<(Port, Path, Condition, Spread)>,
}

impl Spreads {
    fn of(&self, r: &Reading) -> Option<&Spread> {
        self.kept
            .iter()
            .find(|(p, path, c, _)| (*p, *path) == (r.port, r.path) && *c == r.condition)
            .map(|(.., s)| s)
    }
}

/// The windows of all readings of a visit, in their order.
pub fn windows(
    unit: &Unit,
    readings: &[Reading],
    riggings: &[Rigging],
    instruments: &[Instrument],
    data: &Data,
    bench: &Bench,
    spreads: &mut Spreads,
) -> Vec<Window> {
    if spreads.unit.as_ref() != Some(unit) {
        *spreads = Spreads {
            unit: Some(unit.clone()),
            kept: Vec::new(),
        };
    }
    let new: Vec<&Reading> = readings
        .iter()
        .filter(|r| spreads.of(r).is_none())
        .collect();
    let found = ensemble(unit, bench, data, readings, &new);
    for (r, s) in new.iter().zip(found) {
        spreads.kept.push((r.port, r.path, r.condition, s));
    }
    readings
        .iter()
        .enumerate()
        .map(|(i, r)| {
            let silent = data
                .silent
                .iter()
                .find(|(k, _)| *k == i)
                .map(|(_, why)| why.clone());
            window(
                unit,
                r,
                data.condition_of[i],
                data.caught.get(&i).copied(),
                spreads.of(r).unwrap_or(&Spread::default()),
                riggings,
                instruments,
                bench,
                silent,
            )
        })
        .collect()
}

/// One stream of draws a latent, named after it, so that a window stays as it is when other conditions are added.
fn scatter(bench: &Bench) -> Vec<Vec<f64>> {
    bench
        .latent_seeds()
        .iter()
        .map(|seed| Normals::new(SEED ^ seed).many(DRAWS))
        .collect()
}

/// Spreads of the new readings.
fn ensemble(
    unit: &Unit,
    bench: &Bench,
    data: &Data,
    readings: &[Reading],
    new: &[&Reading],
) -> Vec<Spread> {
    let mut spreads = vec![Spread::default(); new.len()];
    let Some(healthy) = faults::find(FaultId::Healthy).filter(|_| !new.is_empty()) else {
        return spreads;
    };
    let condition_of: Vec<usize> = new
        .iter()
        .map(|n| {
            readings
                .iter()
                .position(|r| r.id == n.id)
                .map_or(0, |i| data.condition_of[i])
        })
        .collect();
    let scatter = scatter(bench);
    let mut sum = 0.0;
    let mut build = 0;
    for draw in 0..DRAWS {
        // Builds in proportion to their shares.
        let place = (draw as f64 + 0.5) / DRAWS as f64;
        while build + 1 < bench.builds.len() && sum + bench.builds[build].share < place {
            sum += bench.builds[build].share;
            build += 1;
        }
        let node = Node {
            build,
            path: Path::Left,
            effect: None,
            sign: 1.0,
            quantile: 0.5,
            half: 0.0,
            second: None,
            place: None,
            log_weight: 0.0,
        };
        let u: Vec<f64> = scatter.iter().map(|s| s[draw]).collect();
        for c in 0..data.conditions.len() {
            if !condition_of.contains(&c) {
                continue;
            }
            let shown = bench.values(healthy, &node, c, &u);
            for (i, r) in new
                .iter()
                .enumerate()
                .filter(|(i, _)| condition_of[*i] == c)
            {
                match shown.as_ref().and_then(|list| {
                    let wanted = (path_of(unit, r), r.port);
                    list.iter().find(|(path, p, _)| (*path, *p) == wanted)
                }) {
                    Some((_, _, v)) if v.is_finite() => spreads[i].values.push(*v),
                    _ => spreads[i].without_state += 1,
                }
            }
        }
    }
    for s in &mut spreads {
        s.values.sort_by(f64::total_cmp);
    }
    spreads
}

fn quantile(sorted: &[f64], q: f64) -> f64 {
    if sorted.is_empty() {
        return 0.0;
    }
    let x = q * (sorted.len() - 1) as f64;
    let i = x.floor() as usize;
    let j = (i + 1).min(sorted.len() - 1);
    sorted[i] + (sorted[j] - sorted[i]) * (x - i as f64)
}

/// A manual's window for this reading, where one was entered.
fn manual<'a>(unit: &'a Unit, reading: &Reading) -> Option<&'a ManualWindow> {
    unit.manual.iter().find(|m| {
        let (a, b) = (&m.condition, &reading.condition);
        m.port == reading.port
            && a.doing == b.doing
            && (a.doing.is_neutral() || a.direction == b.direction)
            && core::mem::discriminant(&a.engine) == core::mem::discriminant(&b.engine)
            && a.flushing_blocked == b.flushing_blocked
    })
}

#[allow(clippy::too_many_arguments)] // private; the facts behind one window
fn window(
    unit: &Unit,
    reading: &Reading,
    condition: usize,
    caught: Option<Accuracy>,
    spread: &Spread,
    riggings: &[Rigging],
    instruments: &[Instrument],
    bench: &Bench,
    silent: Option<String>,
) -> Window {
    let instrument = instrument_of(reading, riggings, instruments).filter(|_| caught.is_none());
    let read = match &reading.seen {
        Some(Seen::Value { value }) => Some(value.base()),
        Some(Seen::Swing { low, high }) => Some(0.5 * (low.base() + high.base())),
        Some(Seen::OffScale { top }) => Some(top.base()),
        Some(Seen::Nothing) => Some(0.0),
        _ => None,
    };
    let (low, middle, high) = (
        quantile(&spread.values, 0.025),
        quantile(&spread.values, 0.5),
        quantile(&spread.values, 0.975),
    );
    let a = caught.unwrap_or_else(|| accuracy(instrument, reading.port, read.unwrap_or(middle)));
    let u = (a.bias * a.bias + a.own * a.own).sqrt();
    // Central 95 % of the machines, widened by the instrument in quadrature.
    let mut w = Window {
        reading: reading.id.clone(),
        low: middle - ((middle - low).powi(2) + (1.96 * u).powi(2)).sqrt(),
        middle,
        high: middle + ((high - middle).powi(2) + (1.96 * u).powi(2)).sqrt(),
        read,
        instrument: u,
        source: WindowSource::Computed,
        widest: String::new(),
        basis: String::new(),
        standing: Standing::Open,
        remark: silent.clone(),
        swings: spread.without_state * 10 > spread.values.len() + spread.without_state,
        since_bench: None,
    };
    if cannot_be_negative(reading.port) {
        w.low = w.low.max(0.0);
        w.middle = w.middle.max(w.low);
        w.high = w.high.max(w.middle);
    }
    let rpm = bench.speed(0, condition);
    w.basis = basis(unit, &reading.condition, rpm);
    let (widest, practice) = widest(bench, unit, reading, condition);
    w.widest = widest;
    if practice {
        w.source = WindowSource::Practice;
    }
    if let Some(m) = manual(unit, reading) {
        w.low = m.low.base();
        w.high = m.high.base();
        w.middle = 0.5 * (w.low + w.high);
        w.source = WindowSource::Manual;
        w.basis = if m.reference.trim().is_empty() {
            "the unit's manual, as entered".to_string()
        } else {
            format!("the unit's manual: {}", m.reference.trim())
        };
        w.widest = String::new();
    }
    stand(&mut w, reading, instrument, silent.is_some());
    w
}

fn cannot_be_negative(port: Port) -> bool {
    !matches!(
        port,
        Port::InletPull | Port::LoopDifference | Port::SettledTemperature
    )
}

fn stand(w: &mut Window, reading: &Reading, instrument: Option<&Instrument>, silent: bool) {
    let Some(read) = w.read else { return };
    if silent {
        w.standing = Standing::CannotTell;
        return;
    }
    let half = 0.5 * (w.high - w.low);
    if let Some(i) = instrument
        && let Ok(m) = Measure::from_base(read, reading.port.kind())
        && let Err(why) = i.can_judge(m, half)
    {
        w.standing = Standing::CannotTell;
        w.remark = Some(why);
        return;
    }
    let margin = w.instrument.min(0.25 * half);
    let at_least = matches!(reading.seen, Some(Seen::OffScale { .. }));
    w.standing = if at_least {
        if read > w.high {
            Standing::High
        } else {
            Standing::CannotTell
        }
    } else if read < w.low - margin {
        Standing::Low
    } else if read > w.high + margin {
        Standing::High
    } else if read < w.low + 0.05 * half || read > w.high - 0.05 * half {
        Standing::Edge
    } else {
        Standing::Within
    };
    if reading.port == Port::Charge
        && matches!(reading.seen, Some(Seen::Nothing))
        && reading.condition.doing != Doing::Neutral
    {
        w.remark = Some("A machine that drives has charge pressure: check coupling, hose and port before anything else.".to_string());
    }
}

/// The input that widens a window most, and whether it is one that the profile leaves to common practice.
fn widest(bench: &Bench, unit: &Unit, reading: &Reading, condition: usize) -> (String, bool) {
    let Some(healthy) = faults::find(FaultId::Healthy) else {
        return (String::new(), true);
    };
    let shares = bench.shares_of_spread(healthy, path_of(unit, reading), reading.port, condition);
    let mut by_words: Vec<(String, f64)> = Vec::new();
    for (words, square) in shares {
        match by_words.iter_mut().find(|(w, _)| *w == words) {
            Some((_, s)) => *s += square,
            None => by_words.push((words, square)),
        }
    }
    by_words.sort_by(|a, b| b.1.total_cmp(&a.1).then(a.0.cmp(&b.0)));
    let words = by_words.first().map(|(w, _)| w.clone()).unwrap_or_default();
    let (known, _) = describe_basis(unit);
    (words.clone(), known < 3 || open_to_practice(unit, &words))
}

/// True where the words name a figure that the profile does not give.
fn open_to_practice(unit: &Unit, words: &str) -> bool {
    let id = match words {
        "pump displacement" => FigureId::PumpDisplacement,
        "charge relief setting" => FigureId::ChargeSetting,
        "loop relief setting" => FigureId::LoopRelief,
        "pressure limiter setting" => FigureId::Limiter,
        "gap between charge and operating relief" | "operating relief setting" => {
            FigureId::OperatingSetting
        }
        w if w == Param::MotorDisp.words() => FigureId::MotorDisplacement,
        w if w == Param::GearRatio.words() => FigureId::GearRatio,
        w if w == Param::ChargeDisp.words() => FigureId::ChargeDisplacement,
        _ => return false,
    };
    unit.known(id).is_none()
}
