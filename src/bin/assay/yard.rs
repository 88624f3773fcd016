//! Wear and not weather, on machines of the assay's own world: how far coefficients scatter beside the readings they are made of
//! when oil temperature and engine speed change from visit to visit, and how often a trend's stated 95 % interval holds the truth
//! while the machine wears.

use super::world::{Machine, Notes, Sloppiness};
use lowside::circuit::Param;
use lowside::math;
use lowside::quantity::Typed;
use lowside::quantity::{Kind, Measure, Unit as InUnit};
use lowside::readings::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Path, Place, Port,
};
use lowside::record::Visit;
use lowside::unit::{FigureId, Paths};
use lowside::windows::Normals;
use lowside::yard::trend::{INTERVAL_HOURS, trend};
use lowside::yard::wear::{self, Wear};
use lowside::yard::{Field, History, YardSheet};

/// Coldest and hottest drain hose of a visit, °C.
const WEATHER: (f64, f64) = (45.0, 75.0);
/// Standard deviation of the engine speed from visit to visit, relative.
const SPEED: f64 = 0.03;
/// How unlike the load is from one run to the next on the same ramp.
const RAMP: f64 = 0.04;
/// Load on the flat and up the ramp, share of the loop relief.
const FLAT: f64 = 0.1;
const STEEP: f64 = 0.45;
/// Less slip than this drowns in the counting of turns.
const LEAST_SLIP: f64 = 0.04;
/// More slip than this from the flat to the ramp, and the ramp is too steep for the machine.
const MOST_SLIP: f64 = 0.4;
/// Engine speed up the ramp over that on the flat.
const DROOPS: f64 = 0.96;
/// Seconds over which turns are counted.
const COUNTED_S: f64 = 60.0;
/// Standard deviation of a knee read off a rising needle, relative.
const BEND: f64 = 0.03;
/// Temperatures over which the truth is averaged.
const TRUTH: usize = 60;

const EACH: [Wear; 4] = [Wear::Drain, Wear::Slip, Wear::Knee, Wear::LowIdle];

/// What wears, and how worn a machine is found, so that the reading says something.
fn wears(of: Wear) -> (&'static [Param], (f64, f64)) {
    match of {
        Wear::Drain | Wear::DrainRight => (&[Param::MotorLeak], (1.0, 2.0)),
        Wear::Slip => (
            &[
                Param::PumpLeak,
                Param::PumpAcross,
                Param::MotorLeak,
                Param::MotorAcross,
            ],
            (2.0, 5.0),
        ),
        Wear::Knee => (&[Param::ChargeSlip], (3.0, 10.0)),
        Wear::LowIdle => (&[Param::ChargeSlip], (6.0, 25.0)),
    }
}

fn typed(value: f64, unit: InUnit) -> Typed {
    Typed {
        typed: format!("{value}"),
        value: Measure::new(value, unit).ok(),
    }
}

/// Day's oil and engine.
struct Weather {
    celsius: f64,
    low: f64,
    high: f64,
    flat: f64,
    ramp: f64,
    droops: f64,
}

impl Weather {
    fn draw(machine: &Machine, draw: &mut Normals) -> Weather {
        let figure = |id, usual| machine.unit.known(id).unwrap_or(usual);
        Weather {
            celsius: WEATHER.0 + (WEATHER.1 - WEATHER.0) * draw.unit(),
            low: figure(FigureId::LowIdle, 900.0) * (1.0 + SPEED * draw.normal()),
            high: figure(FigureId::HighIdle, 2400.0) * (1.0 + SPEED * draw.normal()),
            flat: FLAT * figure(FigureId::LoopRelief, 380.0) * (1.0 + RAMP * draw.normal()),
            ramp: STEEP * figure(FigureId::LoopRelief, 380.0) * (1.0 + RAMP * draw.normal()),
            droops: DROOPS + 0.01 * draw.normal(),
        }
    }

    fn usual(machine: &Machine) -> Option<Weather> {
        let relief = machine.unit.known(FigureId::LoopRelief)?;
        Some(Weather {
            celsius: 60.0,
            low: wear::low_idle_of(&machine.unit),
            high: wear::high_idle_of(&machine.unit),
            flat: FLAT * relief,
            ramp: STEEP * relief,
            droops: DROOPS,
        })
    }

    fn condition(&self, doing: Doing, rpm: f64) -> Condition {
        Condition {
            doing,
            direction: Direction::Forward,
            lever: Lever::Full,
            engine: Measure::from_base(rpm, Kind::RotationalSpeed)
                .map_or(EngineSpeed::HighIdle, EngineSpeed::Measured),
            oil: Measure::from_base(self.celsius, Kind::Temperature)
                .ok()
                .map(|value| OilTemperature {
                    value,
                    place: Place::DrainHose,
                }),
            ..Condition::start()
        }
    }
}

/// How a sheet is filled in: through the yard's instruments, or as the machine is.
enum By<'a> {
    Notes(&'a mut Notes, &'a mut Normals),
    Truth,
}

impl By<'_> {
    fn read(&mut self, machine: &Machine, port: Port, condition: &Condition) -> Option<f64> {
        match self {
            By::Notes(notes, _) => Some(notes.take(machine, Path::Left, port, condition)?.0),
            By::Truth => Some(machine.shows_and_swings(Path::Left, port, condition)?.0),
        }
    }
}

/// Reads what a coefficient takes into a sheet. None where the machine has no steady state.
fn fill(of: Wear, machine: &mut Machine, day: &Weather, mut by: By) -> Option<YardSheet> {
    let mut sheet = YardSheet::default();
    sheet.set(Field::Oil, typed(day.celsius, InUnit::DegreeCelsius));
    let neutral = |rpm| day.condition(Doing::Neutral, rpm);
    match of {
        Wear::Drain | Wear::DrainRight => {
            let flow = by.read(machine, Port::MotorDrain, &neutral(day.high))?;
            let charge = by.read(machine, Port::Charge, &neutral(day.high))?;
            sheet.set(Field::Drain, typed(flow, InUnit::LitrePerMinute));
            sheet.set(Field::ChargeHigh, typed(charge, InUnit::Bar));
        }
        Wear::LowIdle => {
            let low = by.read(machine, Port::Charge, &neutral(day.low))?;
            let high = by.read(machine, Port::Charge, &neutral(day.high))?;
            sheet.set(Field::ChargeLow, typed(low, InUnit::Bar));
            sheet.set(Field::ChargeHigh, typed(high, InUnit::Bar));
            sheet.set(Field::LowIdle, typed(day.low, InUnit::RevolutionPerMinute));
        }
        Wear::Knee => {
            let knee = by.read(machine, Port::Knee, &neutral(day.high))?;
            // Nobody sees a knee beyond full throttle.
            if knee > day.high {
                return None;
            }
            let knee = match &mut by {
                By::Notes(_, draw) => (knee * (1.0 + BEND * draw.normal()) / 10.0).round() * 10.0,
                By::Truth => knee,
            };
            sheet.set(Field::Knee, typed(knee, InUnit::RevolutionPerMinute));
            sheet.set(Field::LowIdle, typed(day.low, InUnit::RevolutionPerMinute));
        }
        Wear::Slip => {
            machine.runs = Some((day.flat, day.ramp));
            for (doing, turns, time, engine) in [
                (
                    Doing::Travel,
                    Field::ForwardTurns,
                    Field::ForwardTime,
                    Field::EngineLight,
                ),
                (
                    Doing::Loaded,
                    Field::LoadedTurns,
                    Field::LoadedTime,
                    Field::EngineLoaded,
                ),
            ] {
                let held = day.high
                    * if doing == Doing::Loaded {
                        day.droops
                    } else {
                        1.0
                    };
                let condition = day.condition(doing, held);
                // Turns in a minute are sharper than any speed that the notes know of.
                let (rpm, _) = machine.shows_and_swings(Path::Left, Port::Wheel, &condition)?;
                let exact = rpm * COUNTED_S / 60.0;
                let (counted, seconds, held) = match &mut by {
                    By::Notes(_, draw) => (
                        (4.0 * (exact + 0.1 * draw.normal())).round() / 4.0,
                        COUNTED_S + 0.15 * draw.normal(),
                        held * (1.0 + 0.004 * draw.normal()),
                    ),
                    By::Truth => (exact, COUNTED_S, held),
                };
                sheet.set(turns, typed(counted, InUnit::Turn));
                sheet.set(time, typed(seconds, InUnit::Second));
                sheet.set(engine, typed(held, InUnit::RevolutionPerMinute));
            }
            // A ramp that it does not climb is no ramp for this, and one that it hardly feels tells nothing.
            if !(LEAST_SLIP..MOST_SLIP).contains(&raw(of, &sheet)?) {
                return None;
            }
        }
    }
    Some(sheet)
}

fn visit(at: usize, hours: f64, sheet: YardSheet) -> Visit {
    Visit {
        id: format!("v{at}"),
        unit: "u".into(),
        opened: format!("2026-01-01T{:02}:{:02}:00Z", at / 60, at % 60),
        yard: Some(sheet),
        hours: typed(hours, InUnit::Hour),
        ..Visit::default()
    }
}

/// The raw reading beside the coefficient.
fn raw(of: Wear, sheet: &YardSheet) -> Option<f64> {
    match of {
        Wear::Drain | Wear::DrainRight => sheet.value(Field::Drain),
        Wear::Knee => sheet.value(Field::Knee),
        Wear::LowIdle => sheet.value(Field::ChargeLow),
        Wear::Slip => {
            let speed = |turns, time| Some(sheet.value(turns)? / sheet.value(time)?);
            let light = speed(Field::ForwardTurns, Field::ForwardTime)?;
            let loaded = speed(Field::LoadedTurns, Field::LoadedTime)?;
            // The engine's droop is no slip, and every mechanic knows it.
            let droop = sheet.value(Field::EngineLoaded)? / sheet.value(Field::EngineLight)?;
            Some(1.0 - loaded / light / droop)
        }
    }
}

/// Coefficients of a history that are more than bounds.
fn firm(history: &History) -> Vec<f64> {
    history
        .points
        .iter()
        .filter_map(|g| g.point.is.as_ref().ok())
        .filter(|c| !c.at_most)
        .map(|c| c.is.value)
        .collect()
}

fn spread(values: &[f64]) -> f64 {
    let n = values.len() as f64;
    let mean = values.iter().sum::<f64>() / n;
    let square = values.iter().map(|v| (v - mean).powi(2)).sum::<f64>() / (n - 1.0);
    square.sqrt() / mean.abs()
}

/// Spread of the readings and of their coefficients; none where a reading says only "at most".
fn spreads(of: Wear, machine: &Machine, sheets: Vec<YardSheet>) -> Option<(f64, f64)> {
    let count = sheets.len();
    let raws: Vec<f64> = sheets.iter().filter_map(|s| raw(of, s)).collect();
    let visits: Vec<Visit> = sheets
        .into_iter()
        .enumerate()
        .map(|(at, sheet)| visit(at, 0.0, sheet))
        .collect();
    let history = History::of(of, &machine.unit, &visits.iter().collect::<Vec<_>>(), &[]);
    let made = firm(&history);
    (raws.len() == count && made.len() == count).then(|| (spread(&raws), spread(&made)))
}

/// What the coefficient is at this wear, as its own instruments would have it on the average of all weather.
fn truth(
    of: Wear,
    machine: &mut Machine,
    day: &Weather,
    notes: &mut Notes,
    own: &mut Normals,
) -> Option<f64> {
    let visits: Vec<Visit> = (0..TRUTH)
        .map(|k| {
            let share = (k as f64 + 0.5) / TRUTH as f64;
            let day = Weather {
                celsius: WEATHER.0 + (WEATHER.1 - WEATHER.0) * share,
                ..*day
            };
            Some(visit(
                k,
                0.0,
                fill(of, machine, &day, By::Notes(notes, own))?,
            ))
        })
        .collect::<Option<_>>()?;
    let history = History::of(of, &machine.unit, &visits.iter().collect::<Vec<_>>(), &[]);
    let values = firm(&history);
    (values.len() == TRUTH).then(|| values.iter().sum::<f64>() / TRUTH as f64)
}

#[derive(Default)]
struct Scores {
    weather: Vec<(f64, f64)>,
    hands: Vec<(f64, f64)>,
    slope: usize,
    level: usize,
    ahead: usize,
    cases: usize,
    width: Vec<f64>,
}

/// One machine: constant wear for the spread, then wear over the hours for the trend. None where it says nothing.
fn one(of: Wear, draw: &mut Normals, scores: &mut Scores) -> Option<()> {
    let mut machine = Machine::draw(draw, Paths::One, &[])?;
    machine.unit.id = "u".into();
    machine.null = Some(0.0);
    let (params, (least, most)) = wears(of);
    let start = least * math::pow(most / least, draw.unit());
    let count = 5 + (8.0 * draw.unit()) as usize;
    let grows = 1.5 * draw.unit() / 1000.0;
    let mut notes = Notes::new(draw, Sloppiness::CLEAN);
    let mut own = Normals::new((draw.unit() * 1e15) as u64);
    let worn = |hours: f64| -> Vec<(Param, f64)> {
        params
            .iter()
            .map(|p| (*p, start * (1.0 + grows * hours)))
            .collect()
    };
    // Steady wear, first as it is on each day, then through the yard's hands.
    machine.worn = worn(0.0);
    let usual = Weather::usual(&machine)?;
    let mut bare = Vec::new();
    for _ in 0..12 {
        let day = Weather {
            flat: usual.flat,
            ramp: usual.ramp,
            ..Weather::draw(&machine, draw)
        };
        bare.push(fill(of, &mut machine, &day, By::Truth)?);
    }
    let weather = spreads(of, &machine, bare)?;
    let mut sheets = Vec::new();
    for _ in 0..12 {
        let day = Weather::draw(&machine, draw);
        let by = By::Notes(&mut notes, &mut own);
        sheets.push(fill(of, &mut machine, &day, by)?);
    }
    let hands = spreads(of, &machine, sheets)?;
    // Growing wear.
    let mut hours = 0.0;
    let mut visits = Vec::new();
    for at in 0..count {
        machine.worn = worn(hours);
        let day = Weather::draw(&machine, draw);
        let by = By::Notes(&mut notes, &mut own);
        visits.push(visit(at, hours, fill(of, &mut machine, &day, by)?));
        if at + 1 < count {
            hours += 40.0 + 110.0 * draw.unit();
        }
    }
    let history = History::of(of, &machine.unit, &visits.iter().collect::<Vec<_>>(), &[]);
    let fitted = trend(&history).ok()?;
    let mut at = |hours: f64| {
        machine.worn = worn(hours);
        truth(of, &mut machine, &usual, &mut notes, &mut own)
    };
    let (first, last, ahead) = (at(0.0)?, at(hours)?, at(hours + INTERVAL_HOURS)?);
    let slope = (last - first) / hours;
    let inside = |band: lowside::yard::trend::Band, truth: f64| {
        usize::from((band.low..=band.high).contains(&truth))
    };
    if std::env::var_os("ASSAY_TELL").is_some() {
        println!(
            "{of:?}: weather {weather:.3?}, hands {hands:.3?}; slope {slope:.3e} in {:.3e} to {:.3e}; level {last:.4} in {:.4?}; {:?}, {start:.1}",
            fitted.slope.low,
            fitted.slope.high,
            fitted.at(hours, 0),
            machine.unit.class,
        );
    }
    scores.weather.push(weather);
    scores.hands.push(hands);
    scores.cases += 1;
    scores.slope += inside(fitted.slope, slope);
    scores.level += inside(fitted.at(hours, 0), last);
    scores.ahead += inside(fitted.at(hours + INTERVAL_HOURS, 0), ahead);
    let band = fitted.at(hours, 0);
    scores.width.push(0.5 * (band.high - band.low) / last);
    Some(())
}

/// Root mean square of the first and of the second, and their ratio.
fn pooled(spreads: &[(f64, f64)]) -> (f64, f64, f64) {
    let of = |get: fn(&(f64, f64)) -> f64| {
        let squares = spreads.iter().map(|s| get(s).powi(2)).sum::<f64>();
        (squares / spreads.len().max(1) as f64).sqrt()
    };
    let (raw, made) = (of(|s| s.0), of(|s| s.1));
    (raw, made, made / raw)
}

/// Prints spreads and coverage.
pub fn yard(cases: usize, seed: u64) {
    println!(
        "relative spread with steady wear, reading and coefficient, by the weather alone and through the yard's hands;\n\
         share of stated 95 % intervals that hold the truth while it wears:"
    );
    for of in EACH {
        let mut draw = Normals::new(seed);
        let mut scores = Scores::default();
        let mut tried = 0;
        while scores.cases < cases && tried < 200 * cases {
            tried += 1;
            let _ = one(of, &mut draw, &mut scores);
        }
        let share = |n: usize| n as f64 / scores.cases.max(1) as f64;
        scores.width.sort_by(f64::total_cmp);
        let (raw, made, ratio) = pooled(&scores.weather);
        let (raw_hands, made_hands, ratio_hands) = pooled(&scores.hands);
        println!(
            "{:<24} {:>4} of {tried} machines: weather {raw:.3} to {made:.3} ({ratio:.2}), hands {raw_hands:.3} to {made_hands:.3} \
             ({ratio_hands:.2}); slope {:.3}, level {:.3}, {INTERVAL_HOURS:.0} h ahead {:.3}; level ± {:.1} %",
            of.words(),
            scores.cases,
            share(scores.slope),
            share(scores.level),
            share(scores.ahead),
            100.0
                * scores
                    .width
                    .get(scores.width.len() / 2)
                    .copied()
                    .unwrap_or(f64::NAN),
        );
    }
}
