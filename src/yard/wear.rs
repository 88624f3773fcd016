//! Wear as coefficients that neither oil temperature nor engine speed moves.
//!
//! Everything that leaks in a gap leaks with pressure over viscosity (laminar: Wilson; Schlösser). With μ the viscosity of the
//! oil where it leaks, over [`REFERENCE`]:
//!
//! * motor drain in neutral, q at Δp over case: **q·μ^e·20 bar/Δp**. Charge alone drives it, engine speed does not. Never the
//!   drain in drive: that follows the flushing relief.
//! * slip from light to loaded at the same ramp, s at pump speed n: **s·μ·n/n_high**, since the leak is the same and the
//!   delivery grows with speed.
//! * knee, the engine speed n at which charge stops rising: **n·μ^e**. There the charge pump's whole delivery, in proportion to
//!   n, is what leaves at the relief's cracking pressure.
//! * charge at low idle p, once it no longer reaches the relief's cracking pressure p_c: **n_low·μ·p_c/p**, the speed that would
//!   hold full charge; the same kind of figure as the knee. While the relief still holds, all that can be said is "at most
//!   n_low·μ". p_c is one figure for all checks of a unit, so that an error in it moves the level and no trend.
//!
//! e is 1 for gaps alone. Consumers, lines and filters are no gaps, so that it is less: [`super::law`] takes it from the circuit
//! of the unit's own profile.
//!
//! Uncertainty has two parts: what each reading brings anew, and what all readings with the same instruments share. A trend on
//! unmoved instruments knows only the first.

use crate::machine::Warmth;
use crate::ranking::{Accuracy, accuracy};
use crate::readings::instrument::{Instrument, gum};
use crate::readings::{Condition, Port};
use crate::unit::{FigureId, Unit};
use crate::{fluid, math};
use serde::{Deserialize, Serialize};

/// Viscosity that coefficients are brought to, mPa·s: an ISO VG 46 at about 49 °C.
pub const REFERENCE: f64 = 27.5;
/// Pressure over case that the drain is brought to, bar.
pub const DRAIN_BAR: f64 = 20.0;
/// What the thermometer is off anew at each reading, K. Common practice.
const OWN_KELVIN: f64 = 1.5;
/// How alike the load is from one run to the next on the same ramp, relative. Common practice.
const SAME_RAMP: f64 = 0.05;
/// What an engine speed that nobody measured leaves open in a speed at full lever, relative. Common practice: droop.
const DROOP: f64 = 0.02;
/// Override of the charge relief from cracking to high idle, bar, where its setting is not known. Common practice: 1.5 to 3 bar.
const OVERRIDE: f64 = 2.0;
/// From this share of the cracking pressure on, the relief may still hold.
const HOLDS: f64 = 0.9;
/// What a law too plain leaves open from one temperature to another, relative: part of what leaks goes through orifices.
pub const LAW: f64 = 0.04;
/// A knee this close over low idle may lie anywhere below, relative.
const AT_IDLE: f64 = 0.02;

/// Which coefficient.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Wear {
    /// Motor drain in neutral; left or only motor. L/min at 20 bar and the reference oil.
    Drain,
    /// The same on the right.
    DrainRight,
    /// Slip from light to loaded at high idle and the reference oil, share.
    Slip,
    /// Knee at the reference oil, rpm.
    Knee,
    /// Engine speed that would hold full charge, from charge at low idle, at the reference oil, rpm.
    LowIdle,
}

impl Wear {
    /// Every coefficient, in the order in which screens show them.
    pub const ALL: [Wear; 5] = [
        Wear::Slip,
        Wear::LowIdle,
        Wear::Knee,
        Wear::Drain,
        Wear::DrainRight,
    ];

    /// Name for a screen.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Wear::Drain => "Motor drain in neutral",
            Wear::DrainRight => "Right motor drain in neutral",
            Wear::Slip => "Slip, light to loaded",
            Wear::Knee => "Knee of charge",
            Wear::LowIdle => "Charge at hot low idle",
        }
    }

    /// What wears when it rises.
    #[must_use]
    pub fn tells(self) -> &'static str {
        match self {
            Wear::Drain | Wear::DrainRight => {
                "Rises with the motor’s case leak alone; blind to the pump."
            }
            Wear::Slip => "Rises with every leak of the loop: pump, motor, checks, bypass.",
            Wear::Knee | Wear::LowIdle => {
                "The engine speed that still holds full charge. Rises as the charge pump wears or more leaks from charge."
            }
        }
    }

    /// Stable code for test ids.
    #[must_use]
    pub fn code(self) -> &'static str {
        match self {
            Wear::Drain => "drain",
            Wear::DrainRight => "drain-right",
            Wear::Slip => "slip",
            Wear::Knee => "knee",
            Wear::LowIdle => "low-idle",
        }
    }
}

/// A figure with its uncertainty in two parts, in one unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Uncertain {
    /// The figure.
    pub value: f64,
    /// Standard uncertainty that comes anew with each reading.
    pub own: f64,
    /// Standard uncertainty that readings with the same instruments share.
    pub shared: f64,
}

impl Uncertain {
    /// A reading at a port, base unit of its kind, by the instrument or the usual one.
    #[must_use]
    pub fn read(value: f64, port: Port, instrument: Option<&Instrument>) -> Uncertain {
        let Accuracy { bias, own } = accuracy(instrument, port, value);
        Uncertain {
            value,
            own,
            shared: bias,
        }
    }

    fn scaled(self, factor: f64) -> Uncertain {
        Uncertain {
            value: self.value * factor,
            own: self.own * factor.abs(),
            shared: self.shared * factor.abs(),
        }
    }

    /// More uncertainty, relative to the value.
    fn widened(self, own: f64, shared: f64) -> Uncertain {
        Uncertain {
            value: self.value,
            own: gum::combined(&[self.own, own * self.value]),
            shared: gum::combined(&[self.shared, shared * self.value]),
        }
    }

    /// Both parts together.
    #[must_use]
    pub fn all(self) -> f64 {
        gum::combined(&[self.own, self.shared])
    }
}

/// A coefficient.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Coefficient {
    /// Value with its uncertainty, in the unit of its [`Wear`].
    pub is: Uncertain,
    /// The reading says only that it is no more than this.
    pub at_most: bool,
}

/// Why a reading gives no coefficient.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Withheld {
    /// Nobody took the oil's temperature.
    NoTemperature,
    /// The oil is too cold, °C, and its viscosity, mm²/s: cold oil hides wear.
    Cold(f64, f64),
}

impl Withheld {
    /// In words.
    #[must_use]
    pub fn words(self) -> String {
        match self {
            Withheld::NoTemperature => {
                "not comparable: no oil temperature was taken with it".to_owned()
            }
            Withheld::Cold(celsius, kinematic) => format!(
                "not comparable: oil at {celsius:.0} °C, {kinematic:.0} mm²/s, hides wear; {:.0} °C and at most {:.0} mm²/s are \
                 needed",
                fluid::TOO_COLD_TO_JUDGE,
                fluid::TOO_THICK_TO_JUDGE
            ),
        }
    }
}

/// Oil of a condition, where it can be judged.
///
/// # Errors
/// [`Withheld`].
pub fn warm(unit: &Unit, condition: &Condition) -> Result<Warmth, Withheld> {
    let warmth = Warmth::of(unit, condition);
    if !warmth.taken {
        Err(Withheld::NoTemperature)
    } else if warmth.celsius < fluid::TOO_COLD_TO_JUDGE
        || warmth.kinematic > fluid::TOO_THICK_TO_JUDGE
    {
        Err(Withheld::Cold(warmth.celsius, warmth.kinematic))
    } else {
        Ok(warmth)
    }
}

/// Brings a figure that goes with 1/μ to this power to the reference oil, with what the temperature leaves open.
fn to_reference(figure: Uncertain, warmth: &Warmth, power: f64) -> Uncertain {
    let slope = power * warmth.per_kelvin.abs();
    let own = gum::combined(&[OWN_KELVIN * slope, LAW]);
    figure
        .scaled(math::pow(warmth.relative(), power))
        .widened(own, warmth.spread * slope)
}

/// Motor drain in neutral, L/min, at a charge pressure over case, bar; it goes with 1/μ^`power` on this unit.
#[must_use]
pub fn drain(flow: Uncertain, over_case: f64, warmth: &Warmth, power: f64) -> Coefficient {
    let at_20 = flow.scaled(DRAIN_BAR / over_case.max(1.0));
    Coefficient {
        is: to_reference(at_20, warmth, power),
        at_most: false,
    }
}

/// A speed at full lever (any unit, the same for both) and the engine speed held there, where it was measured.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FullLever {
    /// Wheel, sprocket, shaft or ground speed.
    pub speed: Uncertain,
    /// Engine, rpm.
    pub engine: Option<f64>,
}

/// Slip from light to loaded as it was, share, with its uncertainty; none where a speed is nothing.
#[must_use]
pub fn slip(light: FullLever, loaded: FullLever) -> Option<Uncertain> {
    if light.speed.value <= 0.0 || loaded.speed.value <= 0.0 {
        return None;
    }
    // Only where both were measured does the engine's droop drop out.
    let (droop, open) = match (light.engine, loaded.engine) {
        (Some(light), Some(loaded)) if light > 0.0 && loaded > 0.0 => (loaded / light, 0.004),
        _ => (1.0, DROOP),
    };
    let kept = loaded.speed.value / light.speed.value / droop;
    let own = kept
        * gum::combined(&[
            light.speed.own / light.speed.value,
            loaded.speed.own / loaded.speed.value,
            open,
        ]);
    Some(Uncertain {
        value: 1.0 - kept,
        own,
        shared: 0.0,
    })
}

/// Slip as a coefficient: at high idle and the reference oil.
#[must_use]
pub fn slip_coefficient(
    light: FullLever,
    loaded: FullLever,
    high_idle: f64,
    warmth: &Warmth,
) -> Option<Coefficient> {
    let slip = slip(light, loaded)?;
    let engine = loaded.engine.or(light.engine).unwrap_or(high_idle);
    let at_high = slip.scaled(engine / high_idle).widened(SAME_RAMP, 0.0);
    Some(Coefficient {
        is: to_reference(at_high, warmth, 1.0),
        at_most: false,
    })
}

/// Knee, rpm, beside the low idle of the engine, rpm; it goes with 1/μ^`power` on this unit.
#[must_use]
pub fn knee(speed: Uncertain, low_idle: f64, warmth: &Warmth, power: f64) -> Coefficient {
    Coefficient {
        is: to_reference(speed, warmth, power),
        at_most: speed.value <= low_idle * (1.0 + AT_IDLE),
    }
}

/// Charge at low idle, neutral, bar, at this low idle, rpm, on a relief that cracks at `cracks`, bar. None where the gauge shows
/// nothing.
#[must_use]
pub fn low_idle(low: Uncertain, cracks: f64, idle: f64, warmth: &Warmth) -> Option<Coefficient> {
    if low.value <= 0.0 || cracks <= 0.0 {
        return None;
    }
    let lacks = (cracks / low.value).max(1.0);
    let speed = Uncertain {
        value: idle * lacks,
        own: idle * lacks * gum::combined(&[low.own / low.value, 0.004]),
        shared: idle * lacks * low.shared / low.value,
    };
    Some(Coefficient {
        is: to_reference(speed, warmth, 1.0),
        at_most: low.value >= HOLDS * cracks,
    })
}

/// Cracking pressure of a unit's charge relief, bar at the gauge: the profile's setting, else from the highest reading at high
/// idle, else usual for the class.
#[must_use]
pub fn cracks(unit: &Unit, high: &[f64]) -> f64 {
    let highest = high.iter().copied().fold(0.0, f64::max);
    match unit.known(FigureId::ChargeSetting) {
        Some(setting) => setting,
        None if highest > OVERRIDE => (highest - OVERRIDE).max(0.6 * highest),
        None => figure(unit, FigureId::ChargeSetting),
    }
}

/// High idle as the profile has it or the class usually, rpm.
#[must_use]
pub fn high_idle_of(unit: &Unit) -> f64 {
    figure(unit, FigureId::HighIdle)
}

/// Low idle as the profile has it or the class usually, rpm.
#[must_use]
pub fn low_idle_of(unit: &Unit) -> f64 {
    figure(unit, FigureId::LowIdle)
}

pub(super) fn figure(unit: &Unit, id: FigureId) -> f64 {
    unit.known(id)
        .unwrap_or_else(|| unit.class.spread(id).value)
}

/// Viscosity of a unit's oil at a temperature, °C, over [`REFERENCE`].
#[must_use]
pub fn viscosity_at(unit: &Unit, celsius: f64) -> f64 {
    let mut condition = Condition::start();
    condition.oil =
        crate::quantity::Measure::from_base(celsius, crate::quantity::Kind::Temperature)
            .ok()
            .map(|value| crate::readings::OilTemperature {
                value,
                place: crate::readings::Place::DrainHose,
            });
    Warmth::of(unit, &condition).relative()
}

/// Temperature, °C, at which a unit's oil has the reference viscosity, to half a degree: what "at the reference oil" means on
/// this unit.
#[must_use]
pub fn reference_temperature(unit: &Unit) -> f64 {
    let (mut low, mut high) = (-10.0, 120.0);
    while high - low > 0.25 {
        let middle = 0.5 * (low + high);
        // Thinner above.
        if math::ln(viscosity_at(unit, middle)) > 0.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    (2.0 * low).round() / 2.0
}
