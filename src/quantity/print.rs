//! Printing figures so that they read well and read back.

use serde::{Deserialize, Serialize};

use super::{Measure, Unit};

/// The minus sign of every printed figure: U+2212, which screen readers speak and which does not break a line.
pub const MINUS: char = '\u{2212}';
/// The space that parts thousands and stands before a unit: narrow, non-breaking (U+202F).
const NARROW_SPACE: char = '\u{202F}';
/// Figures with more digits before the mark than this are parted in threes.
const UNPARTED_DIGITS: usize = 4;

/// The mark between whole and decimals.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum DecimalMark {
    /// 24.5
    #[default]
    Point,
    /// 24,5
    Comma,
}

/// How many decimals to print.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Decimals {
    /// As one reads a gauge: three significant digits, whole digits never rounded away, never finer than the unit's last
    /// useful decimal (bar 0.01, psi 0.1, rpm 0.1, L/min 0.01).
    Reading,
    /// This many, always. Up to 12.
    Fixed(u8),
    /// To be edited again: nine significant digits without trailing zeros, no parted thousands. Always reads back with
    /// [`parse`](super::parse), without an ambiguous mark.
    Edit,
}

/// The figure of `measure` in `unit`, without the unit. Never `NaN`, never a minus before zero. A unit of another kind is
/// replaced by the base unit of the measure's kind.
#[must_use]
pub fn format(measure: Measure, unit: Unit, decimals: Decimals, mark: DecimalMark) -> String {
    let (value, unit) = measure.in_fitting_unit(unit);
    match decimals {
        Decimals::Reading => assemble(value, reading_decimals(value, unit), mark, true),
        Decimals::Fixed(places) => assemble(value, usize::from(places.min(12)), mark, true),
        Decimals::Edit => edited(value, mark),
    }
}

/// The figure with its unit behind a narrow space (`24.6 bar`); no space before `°` of an angle.
///
/// A vacuum unit shows pressures above the air's in psi or bar instead, because its dial cannot.
#[must_use]
pub fn format_with_unit(
    measure: Measure,
    unit: Unit,
    decimals: Decimals,
    mark: DecimalMark,
) -> String {
    let (_, mut unit) = measure.in_fitting_unit(unit);
    if unit.reads_vacuum() && measure.base() > 0.0 {
        unit = if unit == Unit::InchOfMercuryVacuum {
            Unit::Psi
        } else {
            Unit::Bar
        };
    }
    with_unit(format(measure, unit, decimals, mark), unit)
}

/// A span with one unit and the same decimals at both ends, enough to show its width: `18.0 to 25.4 bar`.
#[must_use]
pub fn format_span(low: Measure, high: Measure, unit: Unit, mark: DecimalMark) -> String {
    let (mut low, fitting) = low.in_fitting_unit(unit);
    let (mut high, _) = high.in_fitting_unit(fitting);
    if low > high {
        std::mem::swap(&mut low, &mut high);
    }
    let mut places = reading_decimals(low.abs().max(high.abs()), fitting);
    let finest = usize::from(fitting.reading_decimals());
    // Two digits of the width, or the span reads as a point.
    while places < finest && high - low < 20.0 * power_of_ten_below(places) {
        places += 1;
    }
    let from = assemble(low, places, mark, true);
    let to = assemble(high, places, mark, true);
    with_unit(format!("{from} to {to}"), fitting)
}

/// The figure as it stands in a field to be edited ([`Decimals::Edit`]), without the unit.
#[must_use]
pub fn edit_text(measure: Measure, unit: Unit, mark: DecimalMark) -> String {
    format(measure, unit, Decimals::Edit, mark)
}

/// A bare figure in a sentence, decimal point, nine significant digits at most.
pub(super) fn figure_text(value: f64) -> String {
    if value.is_finite() {
        trimmed(value)
    } else {
        String::from("?")
    }
}

fn with_unit(figure: String, unit: Unit) -> String {
    match unit.symbol() {
        "" => figure,
        "°" => figure + "°",
        symbol => format!("{figure}{NARROW_SPACE}{symbol}"),
    }
}

/// Digits before the decimal mark; for figures under 1, minus the zeros that follow the mark.
fn whole_digits(value: f64) -> i32 {
    let size = value.abs();
    let mut digits = 0;
    let mut bound = 1.0;
    while size >= bound && digits < 310 {
        bound *= 10.0;
        digits += 1;
    }
    if digits == 0 && size > 0.0 {
        let mut bound = 0.1;
        while size < bound && digits > -15 {
            bound /= 10.0;
            digits -= 1;
        }
    }
    digits
}

fn power_of_ten_below(places: usize) -> f64 {
    (0..places).fold(1.0, |power, _| power / 10.0)
}

fn decimals_for(value: f64, significant: i32, finest: usize) -> usize {
    usize::try_from(significant - whole_digits(value))
        .unwrap_or(0)
        .min(finest)
}

fn reading_decimals(value: f64, unit: Unit) -> usize {
    let finest = usize::from(unit.reading_decimals());
    let places = decimals_for(value, 3, finest);
    // 99.96 rounds to 100.0: count again on what will be printed.
    let printed: f64 = format!("{value:.places$}").parse().unwrap_or(value);
    decimals_for(printed, 3, finest).min(places)
}

/// Nine significant digits, trailing zeros dropped, decimal point, plain minus.
fn trimmed(value: f64) -> String {
    let places = decimals_for(value, 9, 15);
    let mut text = format!("{value:.places$}");
    if text.contains('.') {
        text.truncate(text.trim_end_matches('0').trim_end_matches('.').len());
    }
    if text.trim_start_matches('-') == "0" {
        String::from("0")
    } else {
        text.replace('-', &MINUS.to_string())
    }
}

/// A bare figure as [`Decimals::Edit`] prints it.
pub(super) fn edited(value: f64, mark: DecimalMark) -> String {
    let mut text = trimmed(value);
    // Exactly three decimals behind one to three digits would read as a thousands mark: one zero more settles it.
    if let Some((whole, decimals)) = text.split_once('.')
        && decimals.len() == 3
        && !whole.trim_start_matches(MINUS).starts_with('0')
    {
        text.push('0');
    }
    match mark {
        DecimalMark::Point => text,
        DecimalMark::Comma => text.replace('.', ","),
    }
}

/// A limit as a refusal tells it: a converted one to four digits, rounded to the side that is accepted, so that whoever types the
/// figure told is not refused again.
pub(super) fn limit_text(
    measure: Measure,
    unit: Unit,
    mark: DecimalMark,
    is_upper: bool,
) -> String {
    let (value, _) = measure.in_fitting_unit(unit);
    edited(inside(value, is_upper), mark)
}

/// `value` to four significant digits, not beyond itself in the direction given.
fn inside(value: f64, is_upper: bool) -> f64 {
    let text = format!("{value:.3e}");
    let rounded = text.parse().unwrap_or(value);
    let is_beyond = if is_upper {
        rounded > value
    } else {
        rounded < value
    };
    let exponent = text.split_once('e').map_or("0", |(_, exponent)| exponent);
    let step: f64 = format!("1e{exponent}").parse::<f64>().unwrap_or(0.0) / 1000.0;
    match (is_beyond, is_upper) {
        (false, _) => rounded,
        (true, true) => rounded - step,
        (true, false) => rounded + step,
    }
}

/// Sign, parted whole digits, mark, decimals.
fn assemble(value: f64, places: usize, mark: DecimalMark, part: bool) -> String {
    let text = format!("{:.places$}", value.abs());
    let (whole, decimals) = text.split_once('.').unwrap_or((&text, ""));
    let mut printed = String::with_capacity(text.len() + 8);
    if value < 0.0 && text.chars().any(|c| ('1'..='9').contains(&c)) {
        printed.push(MINUS);
    }
    let parted = part && whole.len() > UNPARTED_DIGITS;
    for (index, digit) in whole.chars().enumerate() {
        if parted && index > 0 && (whole.len() - index).is_multiple_of(3) {
            printed.push(NARROW_SPACE);
        }
        printed.push(digit);
    }
    if !decimals.is_empty() {
        printed.push(if mark == DecimalMark::Comma { ',' } else { '.' });
        printed.push_str(decimals);
    }
    printed
}
