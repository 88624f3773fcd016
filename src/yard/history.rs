//! The coefficients of a unit over its visits, and where a series breaks.

use super::calendar;
use super::field::Field;
use super::law;
use super::sheet::YardSheet;
use super::wear::{self, Coefficient, FullLever, Uncertain, Wear, Withheld};
use crate::faults::FaultId;
use crate::quantity::{Measure, Unit as InUnit};
use crate::readings::instrument::{Instrument, timed};
use crate::readings::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Path, Port, Reading, Seen,
};
use crate::record::Visit;
use crate::unit::{FigureId, Unit};

/// One coefficient of one visit, or why there is none.
#[derive(Clone, Debug, PartialEq)]
pub struct Point {
    /// Visit id.
    pub visit: String,
    /// When, as the visit was opened.
    pub opened: String,
    /// Days from 1970; none where the visit has no readable day.
    pub day: Option<i64>,
    /// Hour meter, h.
    pub hours: Option<f64>,
    /// What is said.
    pub is: Result<Coefficient, Withheld>,
    /// Instruments and place: points with another one do not compare without a step between them.
    pub with: String,
}

/// Why a series breaks.
#[derive(Clone, Debug, PartialEq)]
pub enum Break {
    /// A repair, with its visit: nothing before it compares.
    Repair(String),
    /// Another gauge, thermometer place or ramp: the level may step, the slope goes on.
    OtherInstrument,
}

/// A point with its place among the breaks.
#[derive(Clone, Debug, PartialEq)]
pub struct Grouped {
    /// The point.
    pub point: Point,
    /// Count of repairs before it.
    pub segment: usize,
    /// Count of changes of instruments before it within the segment, over the different sets of them: a set that comes back has
    /// its old number.
    pub level: usize,
    /// The break just before it.
    pub after: Option<Break>,
}

/// One series.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct History {
    /// Points in the order of time.
    pub points: Vec<Grouped>,
    /// A repair came after the last point.
    pub is_broken_since: bool,
}

impl History {
    /// The series of one coefficient over the visits to a unit, whatever their order.
    #[must_use]
    pub fn of(of: Wear, unit: &Unit, visits: &[&Visit], instruments: &[Instrument]) -> History {
        let mut sorted: Vec<&Visit> = visits
            .iter()
            .copied()
            .filter(|v| v.unit == unit.id)
            .collect();
        sorted.sort_by_key(|v| (v.opened.as_str(), v.id.as_str()));
        let usual = Usual::of(unit, sorted.iter().copied());
        let mut out = History::default();
        let (mut segment, mut repair) = (0, None);
        let mut sets: Vec<String> = Vec::new();
        for visit in sorted {
            if let Some((is, with)) = of_visit(of, unit, visit, instruments, usual) {
                let level = sets.iter().position(|set| *set == with).unwrap_or_else(|| {
                    sets.push(with.clone());
                    sets.len() - 1
                });
                let last = out.points.last();
                let stepped = last.is_some_and(|l| l.segment == segment && l.point.with != with);
                let after = match repair.take() {
                    Some(id) if last.is_some() => Some(Break::Repair(id)),
                    _ if stepped => Some(Break::OtherInstrument),
                    _ => None,
                };
                out.points.push(Grouped {
                    point: Point {
                        visit: visit.id.clone(),
                        opened: visit.opened.clone(),
                        day: calendar::day(&visit.opened),
                        hours: visit.hour_meter(),
                        is,
                        with,
                    },
                    segment,
                    level,
                    after,
                });
            }
            if is_repair(visit) {
                segment += 1;
                repair = Some(visit.id.clone());
                sets.clear();
            }
        }
        out.is_broken_since = repair.is_some() && !out.points.is_empty();
        out
    }

    /// Points that compare with the last one: since the last repair, warm enough.
    #[must_use]
    pub fn comparable(&self) -> Vec<&Grouped> {
        let Some(last) = self.points.last().filter(|_| !self.is_broken_since) else {
            return Vec::new();
        };
        self.points
            .iter()
            .filter(|g| g.segment == last.segment && g.point.is.is_ok())
            .collect()
    }
}

/// True where something was put right at the end of a visit, so that what was read before does not compare.
#[must_use]
pub fn is_repair(visit: &Visit) -> bool {
    let Some(closed) = visit.closed.as_ref() else {
        return false;
    };
    let nothing = [FaultId::Healthy, FaultId::OperatorOrLoad];
    let is_cause = !closed.cause.is_empty() && !nothing.iter().any(|id| id.code() == closed.cause);
    visit.yard.is_none()
        && (is_cause || !closed.done.trim().is_empty() || !closed.parts.trim().is_empty())
}

/// What is one figure for all checks of a unit: pressures that stand in where they were not read, and how readings go with
/// viscosity.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Usual {
    /// What drives the drain, bar: median at high idle, else the profile's setting, else the class.
    pub charge: f64,
    /// Cracking pressure of the charge relief, bar.
    pub cracks: f64,
    /// How the drain and the knee fall with viscosity.
    pub powers: (f64, f64),
}

impl Usual {
    pub(super) fn of<'a>(unit: &Unit, visits: impl IntoIterator<Item = &'a Visit>) -> Usual {
        let read: Vec<f64> = visits
            .into_iter()
            .filter_map(|v| match &v.yard {
                Some(sheet) => sheet.value(Field::ChargeHigh),
                None => value(v, Port::Charge, |c| {
                    c.doing == Doing::Neutral && c.engine == EngineSpeed::HighIdle
                })
                .map(|(_, value)| value),
            })
            .filter(|bar| *bar > 0.0)
            .collect();
        Usual {
            charge: if read.is_empty() {
                wear::figure(unit, FigureId::ChargeSetting)
            } else {
                super::robust::median(&read)
            },
            cracks: wear::cracks(unit, &read),
            powers: (law::power(Wear::Drain, unit), law::power(Wear::Knee, unit)),
        }
    }
}

type Said = (Result<Coefficient, Withheld>, String);

fn of_visit(
    of: Wear,
    unit: &Unit,
    visit: &Visit,
    instruments: &[Instrument],
    usual: Usual,
) -> Option<Said> {
    match &visit.yard {
        Some(sheet) => of_sheet(of, unit, sheet, instruments, usual),
        None => of_readings(of, unit, visit, instruments, usual),
    }
}

/// Condition of a sheet's oil.
pub(super) fn oil(sheet: &YardSheet) -> Condition {
    let mut condition = Condition::start();
    condition.oil = sheet
        .fields
        .get(&Field::Oil)
        .and_then(|typed| typed.value)
        .map(|value| OilTemperature {
            value,
            place: sheet.place,
        });
    condition
}

/// A speed at full lever from turns and their time, or from the time of the marked run. Its unit is turns or runs a minute.
pub(super) fn speed(sheet: &YardSheet, turns: Field, time: Field) -> Option<Uncertain> {
    let seconds = sheet.value(time)?;
    let time = Measure::new(seconds, InUnit::Second).ok()?;
    let timed = match sheet.value(turns).filter(|turns| *turns > 0.0) {
        Some(turns) => timed::counted_turns(turns, time),
        None => timed::timed_ground_speed(
            Measure::new(sheet.value(Field::Distance)?, InUnit::Metre).ok()?,
            time,
        ),
    }
    .ok()?;
    Some(Uncertain {
        value: timed.value.base(),
        own: timed.reading,
        shared: timed.bias,
    })
}

/// A coefficient from a yard sheet; none where what it takes was not read.
pub(super) fn of_sheet(
    of: Wear,
    unit: &Unit,
    sheet: &YardSheet,
    instruments: &[Instrument],
    usual: Usual,
) -> Option<Said> {
    let with = |parts: &[&str]| {
        let place = serde_json::to_string(&sheet.place).unwrap_or_default();
        [parts, &[&place]].concat().join("|")
    };
    let instrument = |id: &str| instruments.iter().find(|i| i.id == id);
    let charge = |field| {
        sheet
            .value(field)
            .map(|bar| Uncertain::read(bar, Port::Charge, instrument(&sheet.gauge)))
    };
    let idle = || {
        sheet
            .value(Field::LowIdle)
            .unwrap_or_else(|| wear::low_idle_of(unit))
    };
    let warm = wear::warm(unit, &oil(sheet));
    match of {
        Wear::Drain | Wear::DrainRight => {
            let field = if of == Wear::Drain {
                Field::Drain
            } else {
                Field::DrainRight
            };
            let flow = Uncertain::read(
                sheet.value(field)?,
                Port::MotorDrain,
                instrument(&sheet.meter),
            );
            let over = sheet.value(Field::ChargeHigh).unwrap_or(usual.charge);
            Some((
                warm.map(|w| wear::drain(flow, over, &w, usual.powers.0)),
                with(&["drain", &sheet.meter]),
            ))
        }
        Wear::Slip => {
            let counted = sheet.value(Field::LoadedTurns).is_some();
            let light = FullLever {
                speed: speed(sheet, Field::ForwardTurns, Field::ForwardTime)?,
                engine: sheet.value(Field::EngineLight),
            };
            let loaded = FullLever {
                speed: speed(sheet, Field::LoadedTurns, Field::LoadedTime)?,
                engine: sheet.value(Field::EngineLoaded),
            };
            // Counted on one and timed on the other do not compare.
            if counted != sheet.value(Field::ForwardTurns).is_some() {
                return None;
            }
            wear::slip(light, loaded)?;
            let high = wear::high_idle_of(unit);
            let is = warm.map(|w| wear::slip_coefficient(light, loaded, high, &w));
            let course = sheet.course.trim().to_lowercase();
            let by = if counted { "turns" } else { "run" };
            Some((transpose(is)?, with(&["slip", by, &course])))
        }
        Wear::Knee => {
            let speed = Uncertain::read(
                sheet.value(Field::Knee)?,
                Port::Knee,
                instrument(&sheet.tachometer),
            );
            // However good the tachometer, the bend is read off a needle.
            let own = Uncertain::read(speed.value, Port::Knee, None).own;
            let speed = Uncertain { own, ..speed };
            Some((
                warm.map(|w| wear::knee(speed, idle(), &w, usual.powers.1)),
                with(&["knee", &sheet.tachometer]),
            ))
        }
        Wear::LowIdle => {
            let low = charge(Field::ChargeLow)?;
            let is = warm.map(|w| wear::low_idle(low, usual.cracks, idle(), &w));
            Some((transpose(is)?, with(&["charge", &sheet.gauge])))
        }
    }
}

fn transpose(is: Result<Option<Coefficient>, Withheld>) -> Option<Result<Coefficient, Withheld>> {
    match is {
        Ok(None) => None,
        Ok(Some(is)) => Some(Ok(is)),
        Err(why) => Some(Err(why)),
    }
}

/// The first steady value at a port in a condition, with its reading.
fn value(visit: &Visit, port: Port, fits: impl Fn(&Condition) -> bool) -> Option<(&Reading, f64)> {
    visit.readings.iter().find_map(|r| match &r.seen {
        Some(Seen::Value { value }) if r.port == port && fits(&r.condition) => {
            Some((r, value.base()))
        }
        _ => None,
    })
}

/// A coefficient from the readings of a call.
fn of_readings(
    of: Wear,
    unit: &Unit,
    visit: &Visit,
    instruments: &[Instrument],
    usual: Usual,
) -> Option<Said> {
    let instrument = |reading: &Reading| {
        let rigging = visit.riggings.iter().find(|r| r.id == reading.rigging)?;
        instruments.iter().find(|i| i.id == rigging.instrument)
    };
    let with = |what: &str, reading: &Reading| {
        let place = reading
            .condition
            .oil
            .map(|oil| oil.place)
            .unwrap_or_default();
        let place = serde_json::to_string(&place).unwrap_or_default();
        let id = instrument(reading).map_or("", |i| i.id.as_str());
        format!("{what}|{id}|{place}")
    };
    let neutral = |c: &Condition| c.doing == Doing::Neutral;
    let idles = |c: &Condition, engine| neutral(c) && c.engine == engine;
    match of {
        Wear::Drain | Wear::DrainRight => {
            let path = if of == Wear::Drain {
                Path::Left
            } else {
                Path::Right
            };
            let (reading, flow) = visit.readings.iter().find_map(|r| match &r.seen {
                Some(Seen::Value { value })
                    if r.port == Port::MotorDrain && r.path == path && neutral(&r.condition) =>
                {
                    Some((r, value.base()))
                }
                _ => None,
            })?;
            let over = value(visit, Port::Charge, |c| {
                neutral(c) && c.engine == reading.condition.engine
            });
            let over = over.map_or(usual.charge, |(_, bar)| bar);
            let caught = visit
                .caught_for(reading)
                .and_then(|jug| jug.behind(reading));
            let flow = match caught {
                Some(made) => Uncertain {
                    value: flow,
                    own: made.reading,
                    shared: made.bias,
                },
                None => Uncertain::read(flow, Port::MotorDrain, instrument(reading)),
            };
            let is = wear::warm(unit, &reading.condition)
                .map(|w| wear::drain(flow, over, &w, usual.powers.0));
            Some((is, with("drain", reading)))
        }
        Wear::Slip => {
            let full = |c: &Condition, doing| {
                c.doing == doing && c.lever == Lever::Full && c.direction == Direction::Forward
            };
            let (port, (light, slow)) = [Port::Wheel, Port::MotorShaft, Port::Ground]
                .into_iter()
                .find_map(|port| {
                let light = value(visit, port, |c| full(c, Doing::Travel))?;
                let loaded = value(visit, port, |c| full(c, Doing::Loaded))?;
                (light.0.path == loaded.0.path).then_some((port, (light, loaded)))
            })?;
            let lever = |(reading, value): (&Reading, f64)| FullLever {
                speed: Uncertain::read(value, port, instrument(reading)),
                engine: match reading.condition.engine {
                    EngineSpeed::Measured(speed) => Some(speed.base()),
                    _ => None,
                },
            };
            let high = wear::high_idle_of(unit);
            let is = wear::warm(unit, &slow.0.condition)
                .map(|w| wear::slip_coefficient(lever(light), lever(slow), high, &w));
            Some((transpose(is)?, with("slip|call", slow.0)))
        }
        Wear::Knee => {
            let (reading, speed) = value(visit, Port::Knee, neutral)?;
            let speed = Uncertain::read(speed, Port::Knee, instrument(reading));
            let own = Uncertain::read(speed.value, Port::Knee, None).own;
            let is = wear::warm(unit, &reading.condition).map(|w| {
                wear::knee(
                    Uncertain { own, ..speed },
                    wear::low_idle_of(unit),
                    &w,
                    usual.powers.1,
                )
            });
            Some((is, with("knee", reading)))
        }
        Wear::LowIdle => {
            let (low, bar) = value(visit, Port::Charge, |c| idles(c, EngineSpeed::LowIdle))?;
            let read = Uncertain::read(bar, Port::Charge, instrument(low));
            let idle = wear::low_idle_of(unit);
            let is = wear::warm(unit, &low.condition)
                .map(|w| wear::low_idle(read, usual.cracks, idle, &w));
            Some((transpose(is)?, with("charge", low)))
        }
    }
}
