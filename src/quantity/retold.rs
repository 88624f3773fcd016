//! Figures within a sentence, said in the reader's own units too.
//!
//! Cautions and steps are written in bar, °C, L/min and L. Somebody whose gauge reads psi gets the figure twice: as written, and
//! rounded in brackets, so that no limit of a caution has to be worked out beside a running machine.

use super::{Measure, Unit, UnitPrefs};
use std::borrow::Cow;

/// Units that our sentences use, as they stand in them after a figure.
const WRITTEN: [(&str, Unit); 4] = [
    (" bar", Unit::Bar),
    (" °C", Unit::DegreeCelsius),
    (" L/min", Unit::LitrePerMinute),
    (" L", Unit::Litre),
];
/// Between the two figures of a span.
const TO: &str = " to ";

/// The sentence, with every figure in a unit that the reader does not use followed by the same in one that they do, rounded
/// to two digits (temperatures to one degree). Metric readers get it as it is.
#[must_use]
pub fn retold<'a>(text: &'a str, prefs: &UnitPrefs) -> Cow<'a, str> {
    let foreign = |unit: Unit| prefs.unit(unit.kind()) != unit;
    if !WRITTEN.iter().any(|(_, unit)| foreign(*unit)) {
        return Cow::Borrowed(text);
    }
    let mut out = String::with_capacity(text.len() + 24);
    let mut rest = text;
    while let Some((before, unit, after)) = next(rest) {
        out.push_str(&rest[..rest.len() - after.len()]);
        if foreign(unit)
            && let Some(told) = figures(before, unit, prefs)
        {
            out.push_str(&told);
        }
        rest = after;
    }
    out.push_str(rest);
    Cow::Owned(out)
}

/// The first unit after a figure: what stands before it, the unit, what comes after.
fn next(text: &str) -> Option<(&str, Unit, &str)> {
    text.char_indices()
        .filter(|(_, c)| *c == ' ')
        .find_map(|(at, _)| {
            let (before, from) = text.split_at(at);
            let (word, unit) = WRITTEN.iter().find(|(word, _)| {
                from.strip_prefix(word).is_some_and(|after| {
                    !after.starts_with(|c: char| c.is_alphanumeric() || "/·³²".contains(c))
                })
            })?;
            number(before)?;
            Some((before, *unit, from.strip_prefix(word)?))
        })
}

/// The figure at the end of a text, and what stands before it.
fn number(text: &str) -> Option<(&str, f64)> {
    let digits = text
        .rfind(|c: char| !c.is_ascii_digit() && c != '.')
        .map_or(0, |at| {
            at + text[at..].chars().next().map_or(1, char::len_utf8)
        });
    let (before, figure) = text.split_at(digits);
    let size: f64 = figure.parse().ok()?;
    if let Some(before) = before.strip_suffix('−') {
        return Some((before, -size));
    }
    Some((before.strip_suffix('+').unwrap_or(before), size))
}

fn figures(before: &str, unit: Unit, prefs: &UnitPrefs) -> Option<String> {
    let (before, last) = number(before)?;
    let first = before
        .strip_suffix(TO)
        .and_then(number)
        .map(|(_, first)| first);
    let to = prefs.unit(unit.kind());
    let convert = |figure: f64| {
        let value = Measure::new(figure, unit).ok()?.try_in_unit(to).ok()?;
        Some(rounded(value, to))
    };
    let last = convert(last)?;
    let span = match first {
        Some(first) => format!("{}{TO}{last}", convert(first)?),
        None => last,
    };
    Some(format!(" ({span} {})", to.symbol()))
}

fn rounded(value: f64, unit: Unit) -> String {
    let places = match unit {
        Unit::DegreeFahrenheit | Unit::DegreeCelsius => 0,
        _ if value == 0.0 => 0,
        _ => 1 - crate::math::log10(value.abs()).floor() as i32,
    };
    let scale = crate::math::pow(10.0, f64::from(places));
    let value = (value * scale).round() / scale;
    let decimals = usize::try_from(places).unwrap_or(0);
    format!("{value:.decimals$}").replace('-', "−")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn figures_come_in_the_readers_units_too() {
        let us = UnitPrefs::us();
        for (text, told) in [
            (
                "oil above about 7 bar (common practice)",
                "oil above about 7 bar (100 psi) (common practice)",
            ),
            ("oil over 60 °C scalds", "oil over 60 °C (140 °F) scalds"),
            (
                "30 L/min fills a 5 L jug in 10 s.",
                "30 L/min (7.9 US gpm) fills a 5 L (1.3 US gal) jug in 10 s.",
            ),
            (
                "begins at 8 to 14 bar, fully off at 13 to 20 bar",
                "begins at 8 to 14 bar (120 to 200 psi), fully off at 13 to 20 bar (190 to 290 psi)",
            ),
            (
                "vacuum gauge, −1 to +1.5 bar",
                "vacuum gauge, −1 to +1.5 bar (−15 to 22 psi)",
            ),
            ("0 to 600 bar", "0 to 600 bar (0 to 8700 psi)"),
            ("within 0.3 bar of it", "within 0.3 bar (4.4 psi) of it"),
            ("no bar, a Long bar, 3 bars", "no bar, a Long bar, 3 bars"),
            ("", ""),
        ] {
            assert_eq!(retold(text, &us), told);
        }
    }

    #[test]
    fn metric_sentences_stay_as_they_are() {
        let text = "A pinhole above 7 bar, 60 °C, 30 L/min and 5 L.";
        assert!(matches!(retold(text, &UnitPrefs::metric()), Cow::Borrowed(same) if same == text));
        // Only what the reader does not use is told again.
        let mut kelvin_free = UnitPrefs::metric();
        kelvin_free.choose(Unit::Psi);
        assert_eq!(
            retold(text, &kelvin_free),
            "A pinhole above 7 bar (100 psi), 60 °C, 30 L/min and 5 L."
        );
    }
}
