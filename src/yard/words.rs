//! Sentences of the yard check that stand on every screen of it, and figures in the shop's units.

use super::taken::Key;
use crate::quantity::{DecimalMark, Measure, Unit, UnitPrefs};

/// What is worth more than this app.
pub const ABOUT_COUPLINGS: &str = "Permanent test couplings on charge, and a tee on the motor drain where it can be had, are worth more than any app: \
     they make this a check of minutes, and the readings of one unit alike.";

/// Where limits come from.
pub const ABOUT_LIMITS: &str = "Limits are common practice. From the third check on, the unit’s own earlier checks take their place: watch at twice the \
     uncertainty, stop at four times or at the limit. The unit’s manual and the rules of the place come first.";

/// A share as per cent with one decimal, in the shop's decimal mark.
#[must_use]
pub fn percent(share: f64, prefs: &UnitPrefs) -> String {
    if !share.is_finite() {
        return "not known".to_owned();
    }
    // No −0.0.
    let rounded = (share * 1000.0).round() / 10.0 + 0.0;
    let text = format!("{rounded:.1} %");
    match prefs.mark() {
        DecimalMark::Comma => text.replace('.', ","),
        DecimalMark::Point => text,
    }
}

/// A bare number with one decimal, in the shop's decimal mark.
#[must_use]
pub fn number(value: f64, prefs: &UnitPrefs) -> String {
    let text = format!("{value:.1}");
    match prefs.mark() {
        DecimalMark::Comma => text.replace('.', ","),
        DecimalMark::Point => text,
    }
}

/// Prints figures of the sheet.
pub(super) struct Printer<'a> {
    pub prefs: &'a UnitPrefs,
}

impl Printer<'_> {
    /// A figure with its unit; a share in per cent.
    pub fn of(&self, unit: Unit, value: f64) -> String {
        if unit == Unit::Percent {
            return percent(value, self.prefs);
        }
        let value = if unit == Unit::RevolutionPerMinute && value > 500.0 {
            value.round()
        } else {
            value
        };
        Measure::new(value, unit).map_or_else(|why| why.to_string(), |m| self.prefs.print(m))
    }

    /// Short name.
    pub fn name(&self, key: Key) -> &'static str {
        match key {
            Key::LowIdle => "Low idle",
            Key::HighIdle => "High idle",
            Key::ChargeHigh => "Charge at high idle",
            Key::ChargeShare => "Charge at low idle over high idle",
            Key::Knee => "Knee",
            Key::ChargeDrive => "Least charge in drive",
            Key::Fall => "Fall of charge to drive",
            Key::DriveSpread => "Charge from one direction or side to the other",
            Key::SpeedForward => "Speed forward",
            Key::SpeedReverse => "Speed in reverse",
            Key::ForwardOverReverse => "Forward over reverse",
            Key::Slip => "Slip",
            Key::TurnsForward | Key::PathForward => "Left against right, forward",
            Key::TurnsReverse | Key::PathReverse => "Left against right, reverse",
            Key::Spin => "Spin left against right",
            Key::Hubs => "Hubs",
            Key::Drain => "Motor drain",
            Key::DrainRight => "Right motor drain",
        }
    }
}
