//! Is the oil in a state in which readings mean something?

use super::ViscosityCurve;

/// Above this kinematic viscosity, mm²/s, a verdict on leakage is withheld: cold oil hides wear. Common practice.
pub const TOO_THICK_TO_JUDGE: f64 = 60.0;
/// Below this temperature, °C, a verdict on leakage is withheld. Common practice.
pub const TOO_COLD_TO_JUDGE: f64 = 40.0;
/// Lowest kinematic viscosity, mm²/s, that piston units of closed circuits stand for a short time. Common practice (5 to 7).
pub const SHORT_TIME_LOWEST: f64 = 7.0;
/// Highest kinematic viscosity, mm²/s, at a cold start. Common practice.
pub const COLD_START_HIGHEST: f64 = 1600.0;
/// Span of temperature, °C, in which a D341 curve through 40 and 100 °C stays within a few per cent of measured oils. Below
/// it the curve reads high: 40 to 50 % at 0 °C on measured engine oils.
pub const FITTED: (f64, f64) = (20.0, 140.0);

/// How thick the oil is, by the limits a practical hydraulics article charts for mineral oil.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Band {
    /// Under 12 mm²/s: films break, parts wear.
    TooThin,
    /// 12 to 28 mm²/s: tolerated, leaks more.
    Thin,
    /// 28 to 60 mm²/s.
    Ideal,
    /// 60 to 500 mm²/s: tolerated while warming up.
    Thick,
    /// Over 500 mm²/s: inlets starve.
    TooThick,
}

impl Band {
    /// The band of a kinematic viscosity in mm²/s.
    #[must_use]
    pub fn of(kinematic: f64) -> Band {
        match kinematic {
            nu if nu < 12.0 => Band::TooThin,
            nu if nu < 28.0 => Band::Thin,
            nu if nu <= 60.0 => Band::Ideal,
            nu if nu <= 500.0 => Band::Thick,
            _ => Band::TooThick,
        }
    }

    /// In the mechanic's words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Band::TooThin => "too thin: films break down",
            Band::Thin => "thin: leaks more than usual",
            Band::Ideal => "good",
            Band::Thick => "thick: warm it up before judging leakage",
            Band::TooThick => "too thick: the charge inlet can starve",
        }
    }
}

/// What has to be said beside a viscosity that was computed at a temperature.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Remarks {
    /// Temperature, °C.
    pub celsius: f64,
    /// Kinematic viscosity, mm²/s.
    pub kinematic: f64,
    /// Its band.
    pub band: Band,
    /// The temperature lies under [`FITTED`]: the true viscosity is lower, perhaps by a third.
    pub extrapolated_cold: bool,
    /// The temperature lies over [`FITTED`].
    pub extrapolated_hot: bool,
    /// False where the oil is too cold or too thick for a verdict on leakage.
    pub leakage_can_be_judged: bool,
}

/// The remarks on an oil at `celsius` °C.
#[must_use]
pub fn remarks(curve: &ViscosityCurve, celsius: f64) -> Remarks {
    let kinematic = curve.kinematic_at(celsius);
    Remarks {
        celsius,
        kinematic,
        band: Band::of(kinematic),
        extrapolated_cold: celsius < FITTED.0,
        extrapolated_hot: celsius > FITTED.1,
        leakage_can_be_judged: celsius >= TOO_COLD_TO_JUDGE && kinematic <= TOO_THICK_TO_JUDGE,
    }
}

impl Remarks {
    /// Why a verdict on leakage is withheld, and from which temperature on it can be given; none where it can be given.
    #[must_use]
    pub fn why_withheld(&self, curve: &ViscosityCurve) -> Option<String> {
        if self.leakage_can_be_judged {
            return None;
        }
        let enough = curve
            .temperature_at(TOO_THICK_TO_JUDGE)
            .max(TOO_COLD_TO_JUDGE)
            .ceil();
        Some(format!(
            "The oil is too cold to judge leakage: {:.0} °C, about {:.0} mm²/s{}. Warm it to {enough:.0} °C or more.",
            self.celsius,
            self.kinematic,
            if self.extrapolated_cold {
                " (extrapolated)"
            } else {
                ""
            }
        ))
    }
}
