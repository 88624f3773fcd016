//! A case flow taken on the machine, held against what the bench measured of the same motor.
//!
//! A gap leaks with pressure over viscosity (laminar: Wilson; Schlösser), and the bench told it so: L/min per bar of both sides
//! over the case, at 27.5 mPa·s. So a jug and a stopwatch on the machine are brought to the same: by the oil's viscosity at the
//! drain and by what drives the leak. In neutral that is charge on both sides; under load it takes both loop pressures, and no
//! flushing oil in the drain.

use crate::assessment::SinceBench;
use crate::machine::{MEASURED_LEAKAGE, Warmth};
use crate::math;
use crate::ranking::{Accuracy, accuracy, instrument_of, path_of};
use crate::readings::instrument::{Instrument, gum};
use crate::readings::{Doing, Port, Reading, Seen};
use crate::record::Visit;
use crate::unit::{FigureId, OnBench, Source, Tick, Unit};
use crate::yard::wear::{LAW, warm};

/// Pressure over the case at which the profile tells a leakage, bar: of both sides together.
const LEAKAGE_AT: f64 = 200.0;
/// Standard uncertainty of a charge pressure that nobody read, relative. Common practice.
const CHARGE_UNREAD: f64 = 0.10;
/// Standard uncertainty of a case pressure that nobody read, bar: a drain led into a jug has next to none. Common practice.
const CASE_UNREAD: f64 = 0.5;
/// Standard uncertainty of what a flushing shuttle lets past while it stands in the middle, L/min. Common practice.
const SHUTTLE: f64 = 0.05;
/// Least that drives a leak, bar, below which nothing is compared.
const LEAST_DRIVE: f64 = 5.0;

/// A figure with its standard uncertainty.
type Figure = (f64, f64);

/// Holds a reading against the bench. None where it is no case flow, or no motor of this unit was measured.
#[must_use]
pub fn since(
    unit: &Unit,
    visit: &Visit,
    reading: &Reading,
    instruments: &[Instrument],
) -> Option<SinceBench> {
    let Some(Seen::Value { value }) = &reading.seen else {
        return None;
    };
    if reading.port != Port::MotorDrain {
        return None;
    }
    let measured = unit
        .figures
        .get(&FigureId::MotorCaseLeakage)
        .filter(|figure| figure.source == Source::Measured)?;
    let leakage = measured
        .value
        .map(|m| m.base())
        .filter(|flow| *flow > 0.0)?;
    // What was typed over since is no longer the bench's.
    let on_bench = unit
        .bench
        .get(&FigureId::MotorCaseLeakage)
        .filter(|bench| (bench.value.base() - leakage).abs() <= 1e-6 * leakage);
    if let Some(path) = on_bench.and_then(|bench| bench.path)
        && !unit.ticks.paths.is_one()
        && path != path_of(unit, reading)
    {
        return None;
    }
    let here = Here {
        unit,
        visit,
        reading,
        instruments,
    };
    Some(match here.leakage(value.base()) {
        Ok(now) => times(now, leakage, on_bench),
        Err(why) => SinceBench::Cannot { why },
    })
}

/// How many times the bench's leakage, with the interval of about 95 %. Doubts are relative, so the interval is one of factors.
fn times(now: Figure, then: f64, on_bench: Option<&OnBench>) -> SinceBench {
    let ratio = now.0 / then;
    let doubt = on_bench.map_or(MEASURED_LEAKAGE, |bench| bench.share);
    let factor = math::exp(2.0 * gum::combined(&[now.1 / now.0.max(1e-9), doubt]));
    SinceBench::Times {
        ratio,
        low: ratio / factor,
        high: ratio * factor,
        on: on_bench.map_or_else(String::new, |bench| bench.on.clone()),
    }
}

/// A reading with what was read beside it.
struct Here<'a> {
    unit: &'a Unit,
    visit: &'a Visit,
    reading: &'a Reading,
    instruments: &'a [Instrument],
}

impl Here<'_> {
    /// The leakage of one motor as the bench told it, with its standard uncertainty, L/min; or why it cannot be told.
    fn leakage(&self, flow: f64) -> Result<Figure, String> {
        let warmth = warm(self.unit, &self.reading.condition).map_err(|why| why.words())?;
        let (drive, drive_u) = self.drive()?;
        let motors = f64::from(self.unit.ticks.motors.clamp(1, 4));
        let value = flow * warmth.relative() * LEAKAGE_AT / drive / motors;
        let Accuracy { bias, own } = self.accuracy(self.reading, flow);
        let shuttle = if self.is_without_flushing() {
            0.0
        } else {
            SHUTTLE
        };
        let relative = gum::combined(&[
            gum::combined(&[bias, own, shuttle]) / flow.max(0.01),
            by_temperature(&warmth),
            LAW,
            drive_u / drive,
        ]);
        Ok((value, value * relative))
    }

    /// What drives the leak: both sides over the case, bar.
    fn drive(&self) -> Result<Figure, String> {
        let case = self.beside(Port::MotorCase).unwrap_or((0.0, CASE_UNREAD));
        let loops = self.beside(Port::LoopA).zip(self.beside(Port::LoopB));
        let (sides, u) = match loops {
            Some((a, b)) if self.is_neutral() || self.is_without_flushing() => {
                (a.0 + b.0, gum::combined(&[a.1, b.1]))
            }
            _ if self.is_neutral() => {
                let charge = self
                    .beside(Port::Charge)
                    .unwrap_or_else(|| self.usual_charge());
                (2.0 * charge.0, 2.0 * charge.1)
            }
            Some(_) => {
                return Err("not comparable with the bench: flushing oil is in the drain. Take it in neutral, or with the flushing blocked as the manual has it".to_owned());
            }
            None => {
                return Err("not comparable with the bench: under load it takes both loop pressures beside it, and no flushing oil in the drain; in neutral neither".to_owned());
            }
        };
        let drive = sides - 2.0 * case.0;
        if drive < LEAST_DRIVE {
            return Err(
                "not comparable with the bench: hardly any pressure drives the leak".to_owned(),
            );
        }
        Ok((drive, gum::combined(&[u, 2.0 * case.1])))
    }

    fn is_neutral(&self) -> bool {
        matches!(
            self.reading.condition.doing,
            Doing::Neutral | Doing::NeutralFree | Doing::NeutralBridged
        )
    }

    fn is_without_flushing(&self) -> bool {
        self.reading.condition.flushing_blocked || self.unit.ticks.flushing == Tick::No
    }

    /// Charge pressure that nobody read: the profile's setting, else the class's.
    fn usual_charge(&self) -> Figure {
        let charge = self
            .unit
            .known(FigureId::ChargeSetting)
            .unwrap_or_else(|| self.unit.class.spread(FigureId::ChargeSetting).value);
        (charge, CHARGE_UNREAD * charge)
    }

    /// Another port of the same path, read in the same condition.
    fn beside(&self, port: Port) -> Option<Figure> {
        let path = path_of(self.unit, self.reading);
        let is_same = |other: &&Reading| {
            let (one, two) = (&self.reading.condition, &other.condition);
            other.port == port
                && (port.is_common() || path_of(self.unit, other) == path)
                && one.doing == two.doing
                && one.engine == two.engine
                && one.flushing_blocked == two.flushing_blocked
                && (self.is_neutral() || (one.direction == two.direction && one.lever == two.lever))
        };
        let found = self.visit.readings.iter().rev().filter(is_same);
        found.into_iter().find_map(|other| match &other.seen {
            Some(Seen::Value { value }) => {
                let value = value.base();
                let Accuracy { bias, own } = self.accuracy(other, value);
                Some((value, gum::combined(&[bias, own])))
            }
            _ => None,
        })
    }

    /// Accuracy of a reading: of the catch in a jug where it was one, else of its instrument.
    fn accuracy(&self, reading: &Reading, value: f64) -> Accuracy {
        let caught = self.visit.caught.get(&reading.id);
        if let Some(made) = caught.and_then(|jug| jug.behind(reading)) {
            return Accuracy {
                bias: made.bias,
                own: made.reading,
            };
        }
        let instrument = instrument_of(reading, &self.visit.riggings, self.instruments);
        accuracy(instrument, reading.port, value)
    }
}

/// What the temperature leaves open in a viscosity, relative.
fn by_temperature(warmth: &Warmth) -> f64 {
    warmth.spread * warmth.per_kelvin.abs()
}
