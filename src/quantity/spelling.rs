//! Finding the unit in what a person typed.

use super::{Kind, Unit};

/// Folds a typed unit so that spellings compare: lower case, no spaces, plain digits for raised ones, one sign for product
/// and degree.
#[must_use]
pub fn fold(text: &str) -> String {
    let mut folded = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            _ if c.is_whitespace() || is_space(c) => {}
            '²' => folded.push('2'),
            '³' => folded.push('3'),
            '¹' => folded.push('1'),
            '⁻' | '−' | '–' | '‐' | '‑' => folded.push('-'),
            '·' | '⋅' | '∙' | '•' | '*' | '×' => folded.push('.'),
            'º' | '˚' => folded.push('°'),
            '℃' => folded.push_str("°c"),
            '℉' => folded.push_str("°f"),
            'ℓ' => folded.push('l'),
            '″' | '”' | '“' => folded.push('"'),
            '′' | '’' => folded.push('\''),
            '∶' => folded.push(':'),
            '⁄' | '∕' => folded.push('/'),
            _ => folded.extend(c.to_lowercase()),
        }
    }
    // "bar." at the end of a note.
    while folded.len() > 1 && folded.ends_with('.') {
        folded.pop();
    }
    folded
}

/// Spaces that keyboards and formatters put between digits, besides what Unicode calls white space.
pub(super) fn is_space(c: char) -> bool {
    matches!(c, '\u{200B}' | '\u{2060}' | '\u{FEFF}')
}

/// The unit of `kind` that the folded text spells. Where two units share a spelling (`°`, `hp`), the one shown beside the
/// field wins, then the first in the table.
pub(super) fn find(folded: &str, kind: Kind, shown: Unit) -> Option<Unit> {
    let spells = |unit: Unit| unit.spellings().contains(&folded);
    if shown.kind() == kind && spells(shown) {
        return Some(shown);
    }
    kind.units().find(|unit| spells(*unit))
}

/// A unit of any kind that the folded text spells: for saying what was typed instead.
pub(super) fn find_any(folded: &str) -> Option<Unit> {
    if folded.is_empty() {
        return None;
    }
    Unit::ALL
        .iter()
        .copied()
        .find(|unit| unit.spellings().contains(&folded))
}

/// True when the text asks for absolute pressure, which no field takes.
pub(super) fn is_absolute_pressure(folded: &str) -> bool {
    let Some(stem) = ["(abs)", "(a)", "absolute", "abs", "a"]
        .iter()
        .find_map(|end| folded.strip_suffix(end))
    else {
        return false;
    };
    // "kPa" itself ends in an a.
    find(folded, Kind::Pressure, Unit::Bar).is_none()
        && find(stem, Kind::Pressure, Unit::Bar).is_some()
}
