//! Reading the digits of what a person typed, before the unit.

use super::spelling::is_space;

/// What a run of digits and separators can mean.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Figure {
    /// One meaning.
    Plain(f64),
    /// `1,234`: the one separator can be a decimal mark or a thousands mark.
    Either {
        /// Read as a decimal mark.
        decimal: f64,
        /// Read as a thousands mark.
        grouped: f64,
    },
}

/// Why there is no figure.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum NoFigure {
    /// No digit at the front.
    Missing,
    /// Digits and separators in an order that means nothing.
    Unreadable,
}

/// What was read, and what stands behind it.
#[derive(Debug, PartialEq)]
pub(super) struct Read<'a> {
    pub figure: Figure,
    /// A sign was typed and it is a minus.
    pub negative: bool,
    pub rest: &'a str,
}

/// True for white space and for the invisible spaces formatters leave.
fn blank(c: char) -> bool {
    c.is_whitespace() || is_space(c)
}

fn is_minus(c: char) -> bool {
    matches!(c, '-' | '−' | '–' | '—' | '‐' | '‑' | '－')
}

fn is_apostrophe(c: char) -> bool {
    matches!(c, '\'' | '’' | '′')
}

/// True when `rest` starts with three digits and no fourth.
fn starts_with_group(rest: &str) -> bool {
    let digits = rest
        .chars()
        .take(4)
        .take_while(char::is_ascii_digit)
        .count();
    digits == 3
}

fn leading_digits(text: &str) -> (&str, &str) {
    let end = text
        .find(|c: char| !c.is_ascii_digit())
        .unwrap_or(text.len());
    text.split_at(end)
}

/// Reads a signed figure from the front of `text`.
pub(super) fn read(text: &str) -> Result<Read<'_>, NoFigure> {
    let mut rest = text.trim_start_matches(blank);
    let mut negative = false;
    if let Some(sign) = rest.chars().next().filter(|c| *c == '+' || is_minus(*c)) {
        negative = is_minus(sign);
        rest = rest
            .get(sign.len_utf8()..)
            .unwrap_or_default()
            .trim_start_matches(blank);
    }

    let (body, after) = take_body(rest);
    if let Some((figure, rest)) = take_fraction(&body, after) {
        return Ok(Read {
            figure: signed(Figure::Plain(figure), negative),
            negative,
            rest,
        });
    }
    if !body.contains(|c: char| c.is_ascii_digit()) {
        return Err(NoFigure::Missing);
    }
    let figure = interpret(&body).ok_or(NoFigure::Unreadable)?;
    Ok(Read {
        figure: signed(figure, negative),
        negative,
        rest: after,
    })
}

fn signed(figure: Figure, negative: bool) -> Figure {
    let sign = if negative { -1.0 } else { 1.0 };
    match figure {
        Figure::Plain(value) => Figure::Plain(sign * value),
        Figure::Either { decimal, grouped } => Figure::Either {
            decimal: sign * decimal,
            grouped: sign * grouped,
        },
    }
}

/// Takes digits, points, commas, and the spaces and apostrophes that part thousands. A space becomes `' '`, an apostrophe
/// `'\''`.
fn take_body(text: &str) -> (String, &str) {
    let mut body = String::new();
    let mut rest = text;
    while let Some(c) = rest.chars().next() {
        let after = rest.get(c.len_utf8()..).unwrap_or_default();
        let mark_seen = body.contains(['.', ',']);
        let parts_thousands = !body.is_empty() && starts_with_group(after);
        if c.is_ascii_digit() || c == '.' || c == ',' {
            body.push(c);
        } else if c == '٫' {
            body.push(',');
        } else if is_apostrophe(c) && parts_thousands {
            body.push('\'');
        } else if blank(c) && parts_thousands && !mark_seen {
            body.push(' ');
        } else {
            break;
        }
        rest = after;
    }
    (body, rest)
}

/// `1/2`, `1 1/2`, `1½`: an adjuster's turns, a wrench's inches. Gives the figure and what follows.
fn take_fraction<'a>(body: &str, after: &'a str) -> Option<(f64, &'a str)> {
    let whole = |text: &str| -> Option<f64> {
        if text.is_empty() {
            Some(0.0)
        } else {
            plain(text)
        }
    };
    if !body.chars().all(|c| c.is_ascii_digit()) {
        return None;
    }
    let next = after.trim_start_matches(blank);
    if let Some(c) = next.chars().next()
        && let Some(part) = vulgar(c)
    {
        return Some((
            whole(body)? + part,
            next.get(c.len_utf8()..).unwrap_or_default(),
        ));
    }
    let ratio = |above: &str, below_and_rest: &'a str| -> Option<(f64, &'a str)> {
        let below_and_rest = below_and_rest.strip_prefix(['/', '⁄', '∕'])?;
        let (below, rest) = leading_digits(below_and_rest);
        let (above, below) = (plain(above)?, plain(below)?);
        (below > 0.0).then(|| (above / below, rest))
    };
    if let Some(found) = ratio(body, after) {
        return Some(found);
    }
    if body.is_empty() {
        return None;
    }
    let (above, rest) = leading_digits(next);
    let (part, rest) = ratio(above, rest)?;
    Some((whole(body)? + part, rest))
}

fn vulgar(c: char) -> Option<f64> {
    Some(match c {
        '½' => 0.5,
        '¼' => 0.25,
        '¾' => 0.75,
        '⅓' => 1.0 / 3.0,
        '⅔' => 2.0 / 3.0,
        '⅛' => 0.125,
        '⅜' => 0.375,
        '⅝' => 0.625,
        '⅞' => 0.875,
        _ => return None,
    })
}

/// Digits with at most one point, as a number.
fn plain(digits: &str) -> Option<f64> {
    if digits.is_empty() {
        None
    } else {
        digits.parse::<f64>().ok().filter(|value| value.is_finite())
    }
}

/// Digits parted by `mark` into a first group of one to three and then threes, as a number.
fn grouped(text: &str, mark: char) -> Option<f64> {
    let mut groups = text.split(mark);
    let first = groups.next()?;
    let well_formed = (1..=3).contains(&first.len())
        && first.chars().all(|c| c.is_ascii_digit())
        && groups.all(|group| group.len() == 3 && group.chars().all(|c| c.is_ascii_digit()));
    if well_formed {
        plain(&text.replace(mark, ""))
    } else {
        None
    }
}

/// What digits and separators mean. See [`super::parse`] for the rules.
fn interpret(body: &str) -> Option<Figure> {
    let last_mark = body.rfind(['.', ',']);
    let spaced = body.chars().find(|c| matches!(c, ' ' | '\''));
    let Some(at) = last_mark else {
        return match spaced {
            Some(mark) => grouped(body, mark),
            None => plain(body),
        }
        .map(Figure::Plain);
    };
    let (before, from_mark) = body.split_at(at);
    let decimals = from_mark.get(1..)?;
    if !decimals.chars().all(|c| c.is_ascii_digit()) {
        return None;
    }
    let mark = from_mark.chars().next()?;

    if let Some(space) = spaced {
        // 1 234,5: the spaces part thousands, so the one mark is the decimal mark.
        let whole = grouped(before, space)?;
        return Some(Figure::Plain(join(whole, decimals)?));
    }
    if !before.contains(['.', ',']) {
        let decimal = decimal(before, decimals)?;
        let can_be_thousands =
            decimals.len() == 3 && (1..=3).contains(&before.len()) && !before.starts_with('0');
        return Some(if can_be_thousands {
            Figure::Either {
                decimal,
                grouped: plain(&format!("{before}{decimals}"))?,
            }
        } else {
            Figure::Plain(decimal)
        });
    }
    if before.contains(mark) {
        // 1,234,567: the same mark again and again can only part thousands.
        return grouped(body, mark).map(Figure::Plain);
    }
    // 1.234,5 or 1,234.5: the last mark is the decimal mark, the other parts thousands.
    let other = if mark == '.' { ',' } else { '.' };
    Some(Figure::Plain(join(grouped(before, other)?, decimals)?))
}

fn decimal(before: &str, decimals: &str) -> Option<f64> {
    if before.is_empty() && decimals.is_empty() {
        return None;
    }
    plain(&format!(
        "{}.{}",
        if before.is_empty() { "0" } else { before },
        if decimals.is_empty() { "0" } else { decimals }
    ))
}

fn join(whole: f64, decimals: &str) -> Option<f64> {
    if decimals.is_empty() {
        Some(whole)
    } else {
        plain(&format!("{whole:.0}.{decimals}"))
    }
}

/// `2:30`, `0:12.4`, `1:02:30` as a stopwatch shows them: seconds. Nothing else may follow.
pub(super) fn clock(text: &str) -> Option<f64> {
    let text = text.trim_matches(blank);
    let mut parts = text.rsplit(':');
    let last = parts.next()?.replace(',', ".");
    let two_digits = |part: &str| part.len() == 2 && part.chars().all(|c| c.is_ascii_digit());
    let (whole, fraction) = last.split_once('.').unwrap_or((&last, "0"));
    if !two_digits(whole) || fraction.is_empty() || !fraction.chars().all(|c| c.is_ascii_digit()) {
        return None;
    }
    let mut seconds = plain(&last).filter(|s| *s < 60.0)?;
    let mut weight = 60.0;
    let mut rest: Vec<&str> = parts.collect();
    if rest.is_empty() || rest.len() > 2 {
        return None;
    }
    let leading = rest.pop()?;
    for part in rest {
        seconds += weight * plain(part).filter(|m| two_digits(part) && *m < 60.0)?;
        weight *= 60.0;
    }
    if leading.len() > 4 || !leading.chars().all(|c| c.is_ascii_digit()) {
        return None;
    }
    Some(seconds + weight * plain(leading)?)
}

/// True when a second figure follows the first: `22-25`, `22 to 25`, `22 / 25`.
pub(super) fn second_figure(rest: &str) -> bool {
    let rest = rest.trim_start_matches(blank);
    let rest = rest.strip_prefix("to").unwrap_or(rest);
    let rest = rest.trim_start_matches(|c: char| {
        blank(c) || is_minus(c) || matches!(c, '/' | '.' | '…' | ';' | '~')
    });
    rest.starts_with(|c: char| c.is_ascii_digit())
}

#[cfg(test)]
mod tests {
    use super::*;

    fn figure(text: &str) -> Option<Figure> {
        read(text).ok().map(|read| read.figure)
    }

    #[test]
    fn decimal_marks_and_groups() {
        for (text, value) in [
            ("24,5", 24.5),
            ("24.5", 24.5),
            (".5", 0.5),
            ("5.", 5.0),
            ("1.234,5", 1234.5),
            ("1,234.5", 1234.5),
            ("1 234,5", 1234.5),
            ("1\u{202F}234,5", 1234.5),
            ("1’234.5", 1234.5),
            ("2 400", 2400.0),
            ("1,234,567", 1_234_567.0),
            ("0.125", 0.125),
            ("2400.125", 2400.125),
            ("\u{2212}4,2", -4.2),
            ("+ 3", 3.0),
            ("1 1/2", 1.5),
            ("1/4", 0.25),
            ("2½", 2.5),
        ] {
            assert_eq!(figure(text), Some(Figure::Plain(value)), "{text}");
        }
    }

    #[test]
    fn one_mark_before_three_digits_has_two_meanings() {
        assert_eq!(
            figure("2,400"),
            Some(Figure::Either {
                decimal: 2.4,
                grouped: 2400.0
            })
        );
        assert_eq!(
            figure("-12.500"),
            Some(Figure::Either {
                decimal: -12.5,
                grouped: -12_500.0
            })
        );
    }

    #[test]
    fn disorder_is_refused() {
        for text in [
            "1.2.3",
            "1,23,456",
            "1234 567",
            "..5",
            "1.2,3.4",
            "1,234.567,8",
        ] {
            assert_eq!(read(text).err(), Some(NoFigure::Unreadable), "{text}");
        }
        for text in ["", "bar", "-", ",", "."] {
            assert_eq!(read(text).err(), Some(NoFigure::Missing), "{text}");
        }
    }

    #[test]
    fn a_unit_that_starts_with_a_digit_stays_a_unit() {
        let read = read("25 1/s").map(|read| (read.figure, read.rest));
        assert_eq!(read, Ok((Figure::Plain(25.0), " 1/s")));
    }

    #[test]
    fn stopwatch() {
        assert_eq!(clock("2:30"), Some(150.0));
        assert_eq!(clock("0:12,4"), Some(12.4));
        assert_eq!(clock("1:02:30"), Some(3750.0));
        for text in ["2:3", "2:75", "12", "1:2:3:04", "a:10", ":10", "1:75:10"] {
            assert_eq!(clock(text), None, "{text}");
        }
    }

    #[test]
    fn two_figures_are_noticed() {
        for rest in ["-25", " to 25 bar", " – 25", " / 25", " 25"] {
            assert!(second_figure(rest), "{rest}");
        }
        assert!(!second_figure(" bar"));
    }
}
