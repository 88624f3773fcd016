//! A table pasted from a spreadsheet or read from a CSV file: tabs, semicolons or commas between the cells, decimal commas, a row of
//! heads, units in the heads or in a row of their own.

use super::channel::{Channel, Subject};
use super::sheet::{ROWS, Row};
use crate::quantity::Typed;
use crate::quantity::{Measure, Unit, parse};
use thiserror::Error;

/// Largest text that is looked at, in bytes.
pub const LARGEST: usize = 200_000;
/// Most columns.
pub const COLUMNS: usize = 60;
/// Longest cell that is kept, in characters.
const CELL: usize = 60;

/// Why a text is no table.
#[derive(Clone, Debug, PartialEq, Eq, Error)]
pub enum PasteError {
    /// Nothing in it.
    #[error("nothing to read: copy the table with its row of heads")]
    Empty,
    /// Too long.
    #[error("more than {} kB: paste the table alone", LARGEST / 1000)]
    TooLong,
    /// Too many rows.
    #[error("{0} rows: at most {ROWS} fit on a sheet")]
    TooManyRows(usize),
    /// Too many columns.
    #[error("{0} columns: at most {COLUMNS} are read")]
    TooManyColumns(usize),
    /// No row of figures.
    #[error("no row of figures was found under the heads")]
    NoFigures,
}

/// What a column is taken for.
#[derive(Clone, Debug, PartialEq)]
pub struct Column {
    /// Its head, as it stood there.
    pub head: String,
    /// Where its cells go; none: left out.
    pub goes: Goes,
    /// The unit of its figures.
    pub unit: Option<Unit>,
}

/// Where a column goes.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Goes {
    /// Nowhere.
    #[default]
    Nowhere,
    /// The name of the point.
    Name,
    /// A channel.
    To(Channel),
}

/// A table as it was understood. What columns go to may be changed before it is taken.
#[derive(Clone, Debug, PartialEq)]
pub struct Pasted {
    /// Columns.
    pub columns: Vec<Column>,
    /// Cells, row by row.
    pub cells: Vec<Vec<String>>,
    /// The decimal mark, where the table as a whole tells it. One cell alone may not: "81.849".
    decimal: Option<char>,
}

/// A cell that could not be read: row and column as counted in the table, from 1, and why.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct BadCell {
    /// Row of figures.
    pub row: usize,
    /// Column.
    pub column: usize,
    /// Why.
    pub why: String,
}

/// Reads a table.
///
/// # Errors
/// [`PasteError`] says what to do.
pub fn read(text: &str, subject: Subject) -> Result<Pasted, PasteError> {
    if text.len() > LARGEST {
        return Err(PasteError::TooLong);
    }
    let lines: Vec<&str> = text
        .trim_start_matches('\u{feff}')
        .lines()
        .filter(|line| line.chars().any(|c| !matches!(c, ' ' | '\t' | ';' | ',')))
        .collect();
    if lines.is_empty() {
        return Err(PasteError::Empty);
    }
    let between = delimiter(&lines);
    let table: Vec<Vec<String>> = lines.iter().map(|line| cells(line, between)).collect();
    let width = table.iter().map(Vec::len).max().unwrap_or(0);
    if width > COLUMNS {
        return Err(PasteError::TooManyColumns(width));
    }
    // Heads are the rows above the first one in which figures are more than words.
    let first = table
        .iter()
        .position(|row| is_figures(row))
        .ok_or(PasteError::NoFigures)?;
    let (heads, figures) = table.split_at(first);
    if figures.len() > ROWS {
        return Err(PasteError::TooManyRows(figures.len()));
    }
    let mut taken = Vec::new();
    let columns = (0..width)
        .map(|at| {
            let parts: Vec<&str> = heads
                .iter()
                .filter_map(|row| row.get(at))
                .map(String::as_str)
                .filter(|part| !part.is_empty())
                .collect();
            let mut column = column(&parts, subject);
            if column.goes != Goes::Nowhere && taken.contains(&column.goes) {
                column.goes = Goes::Nowhere;
            }
            taken.push(column.goes);
            column
        })
        .collect();
    Ok(Pasted {
        columns,
        decimal: decimal_mark(figures),
        cells: figures.to_vec(),
    })
}

/// Digits behind the one mark of a figure.
fn behind(cell: &str, mark: char) -> Option<usize> {
    let other = if mark == '.' { ',' } else { '.' };
    let (whole, rest) = cell.split_once(mark)?;
    let is_plain = !cell.contains(other) && rest.chars().all(|c| c.is_ascii_digit());
    let is_whole = whole
        .trim_start_matches(['-', '+', '−'])
        .chars()
        .all(|c| c.is_ascii_digit());
    (is_plain && is_whole).then_some(rest.len())
}

/// A mark with other than three digits behind it somewhere in the table is a decimal mark everywhere in it.
fn decimal_mark(figures: &[Vec<String>]) -> Option<char> {
    let tells = |mark: char| {
        let mut cells = figures
            .iter()
            .flatten()
            .filter_map(|cell| behind(cell, mark));
        cells.any(|digits| digits != 3)
    };
    match (tells('.'), tells(',')) {
        (true, false) => Some('.'),
        (false, true) => Some(','),
        _ => None,
    }
}

fn delimiter(lines: &[&str]) -> char {
    let count = |c: char| lines.iter().filter(|line| line.contains(c)).count();
    let most = lines.len().div_ceil(2);
    if count('\t') >= most {
        '\t'
    } else if count(';') >= most {
        ';'
    } else {
        ','
    }
}

/// Cells of a line, quoted or not (RFC 4180).
fn cells(line: &str, between: char) -> Vec<String> {
    let mut cells = Vec::new();
    let mut cell = String::new();
    let mut quoted = false;
    let mut letters = line.chars().peekable();
    while let Some(c) = letters.next() {
        match c {
            '"' if quoted && letters.peek() == Some(&'"') => {
                letters.next();
                cell.push('"');
            }
            '"' => quoted = !quoted,
            c if c == between && !quoted => cells.push(core::mem::take(&mut cell)),
            c => cell.push(c),
        }
    }
    cells.push(cell);
    let tidy = |cell: String| cell.trim().chars().take(CELL).collect();
    cells.into_iter().map(tidy).collect()
}

fn is_figure(cell: &str) -> bool {
    let cell = cell.trim_start_matches(['-', '+', '−', '.']);
    cell.starts_with(|c: char| c.is_ascii_digit())
}

fn is_figures(row: &[String]) -> bool {
    let filled = row.iter().filter(|cell| !cell.is_empty());
    let (mut figures, mut words) = (0, 0);
    for cell in filled {
        if is_figure(cell) {
            figures += 1;
        } else {
            words += 1;
        }
    }
    figures > words
}

fn column(parts: &[&str], subject: Subject) -> Column {
    let head = parts.join(" ");
    let (words, mut unit) = split_unit(&head);
    // A unit in a row of its own.
    if unit.is_none() && parts.len() > 1 {
        unit = parts.last().and_then(|part| unit_of(part));
    }
    Column {
        goes: place(&words, unit, subject),
        unit,
        head,
    }
}

/// Head and unit of "Outlet pressure (bar)", "Flow [L/min]", "Flow in L/min", "Flow, L/min".
fn split_unit(head: &str) -> (String, Option<Unit>) {
    let lower = head.to_lowercase();
    for (open, close) in [('(', ')'), ('[', ']')] {
        if let (Some(from), Some(to)) = (head.find(open), head.rfind(close))
            && from < to
            && let Some(unit) = unit_of(&head[from + 1..to])
        {
            return (lower.get(..from).unwrap_or(&lower).to_owned(), Some(unit));
        }
    }
    for separator in [", ", " in ", " / ", " "] {
        if let Some((words, unit)) = head.rsplit_once(separator)
            && let Some(unit) = unit_of(unit)
        {
            return (words.to_lowercase(), Some(unit));
        }
    }
    match unit_of(head) {
        Some(unit) => (String::new(), Some(unit)),
        None => (lower, None),
    }
}

fn unit_of(text: &str) -> Option<Unit> {
    let folded: String = text
        .trim()
        .trim_matches(['(', ')', '[', ']'])
        .to_lowercase()
        .chars()
        .filter(|c| !c.is_whitespace())
        .map(|c| match c {
            '²' => '2',
            '³' => '3',
            '·' | '*' => '.',
            c => c,
        })
        .collect();
    if folded.is_empty() {
        return None;
    }
    Unit::ALL
        .iter()
        .copied()
        .filter(|unit| {
            Channel::ALL
                .iter()
                .any(|c| c.asks().0.kind() == unit.kind())
        })
        .find(|unit| unit.spellings().contains(&folded.as_str()))
}

/// Words of heads and where they go, longest first.
const WORDS: &[(&[&str], Channel)] = &[
    (
        &[
            "case pressure",
            "housing pressure",
            "pressure in case",
            "p3",
        ],
        Channel::CasePressure,
    ),
    (
        &["charge pressure", "boost pressure"],
        Channel::ChargePressure,
    ),
    (&["charge flow", "boost flow"], Channel::ChargeFlow),
    (&["make-up", "make up", "makeup"], Channel::MakeUp),
    (
        &["case flow", "drain flow", "leakage", "case drain", "q3"],
        Channel::Case,
    ),
    (
        &["case oil", "case temperature", "drain temperature", "t3"],
        Channel::CaseOil,
    ),
    (&["output speed", "n2"], Channel::OutSpeed),
    (&["output torque"], Channel::OutTorque),
    (
        &["input speed", "shaft speed", "speed", "n1"],
        Channel::Speed,
    ),
    (&["input torque", "shaft torque", "torque"], Channel::Torque),
    (&["input power", "shaft power", "power"], Channel::Power),
    (&["low side", "low pressure"], Channel::Low),
    (&["high side", "high pressure"], Channel::High),
    (
        &["outlet oil", "outlet temperature", "oil out"],
        Channel::Outlet,
    ),
    (
        &[
            "inlet oil",
            "inlet temperature",
            "oil temperature",
            "oil in",
            "temperature",
            "temp",
        ],
        Channel::Inlet,
    ),
    (
        &["outlet flow", "inlet flow", "main flow", "flow"],
        Channel::Flow,
    ),
];

fn place(words: &str, unit: Option<Unit>, subject: Subject) -> Goes {
    let words = words.trim();
    if matches!(words, "point" | "no" | "no." | "name" | "#" | "run") && unit.is_none() {
        return Goes::Name;
    }
    let fits = |channel: Channel| {
        channel.belongs(subject) && unit.is_none_or(|unit| unit.kind() == channel.asks().0.kind())
    };
    let inlet = if subject == Subject::Motor {
        Channel::High
    } else {
        Channel::Low
    };
    let outlet = if subject == Subject::Motor {
        Channel::Low
    } else {
        Channel::High
    };
    let ports: [(&[&str], Channel); 2] = [
        (&["inlet pressure", "pressure in", "p1"], inlet),
        (&["outlet pressure", "pressure out", "p2"], outlet),
    ];
    let by_words = ports
        .iter()
        .chain(WORDS)
        .find(|(spellings, channel)| {
            fits(*channel) && spellings.iter().any(|spelling| words.contains(spelling))
        })
        .map(|(_, channel)| *channel);
    // A bare unit or symbol: speed, flow, torque and power are told by it; a pressure or temperature could be of several.
    let by_unit = || {
        let kind = unit?.kind();
        [
            Channel::Speed,
            Channel::Flow,
            Channel::Torque,
            Channel::Power,
        ]
        .into_iter()
        .find(|channel| words.chars().count() <= 2 && channel.asks().0.kind() == kind)
    };
    by_words.or_else(by_unit).map_or(Goes::Nowhere, Goes::To)
}

impl Pasted {
    /// Rows for the sheet, with what could not be read. Such cells keep their text. `id` makes the id of a row.
    pub fn rows(&self, mut id: impl FnMut() -> String) -> (Vec<Row>, Vec<BadCell>) {
        let mut bad = Vec::new();
        let rows = self
            .cells
            .iter()
            .enumerate()
            .map(|(index, cells)| {
                let mut row = Row {
                    id: id(),
                    ..Row::default()
                };
                for (at, (column, cell)) in self.columns.iter().zip(cells).enumerate() {
                    match column.goes {
                        Goes::Nowhere => {}
                        Goes::Name => row.name.clone_from(cell),
                        Goes::To(_) if cell.is_empty() => {}
                        Goes::To(channel) => {
                            // A fourth digit keeps the meaning when the cell stands alone.
                            let is_open =
                                self.decimal.and_then(|mark| behind(cell, mark)) == Some(3);
                            let cell = &if is_open {
                                format!("{cell}0")
                            } else {
                                cell.clone()
                            };
                            let (typed, why) = typed(channel, column.unit, cell);
                            bad.extend(why.map(|why| BadCell {
                                row: index + 1,
                                column: at + 1,
                                why,
                            }));
                            row.cells.insert(channel, typed);
                        }
                    }
                }
                row
            })
            .collect();
        (rows, bad)
    }
}

fn typed(channel: Channel, unit: Option<Unit>, cell: &str) -> (Typed, Option<String>) {
    let (own, low, high) = channel.asks();
    let unit = unit.filter(|unit| unit.kind() == own.kind()).unwrap_or(own);
    let range = Measure::literal(low, own)..=Measure::literal(high, own);
    // The unit goes with the text where it is not the table's, so that the text says the same when it is read again.
    let text = if unit == own {
        cell.to_owned()
    } else {
        format!("{cell} {}", unit.symbol())
    };
    match parse(&text, own.kind(), own, Some(range)) {
        Ok(parsed) => {
            let value = Some(parsed.measure);
            (Typed { typed: text, value }, None)
        }
        Err(why) => {
            let typed = Typed {
                typed: text,
                value: None,
            };
            (typed, Some(why.to_string()))
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rows(text: &str, subject: Subject) -> (Vec<Row>, Vec<BadCell>) {
        let mut next = 0;
        read(text, subject).expect("a table").rows(|| {
            next += 1;
            format!("r{next}")
        })
    }

    #[test]
    fn tabs_decimal_commas_and_a_row_of_units() {
        let text = "Point\tSpeed\tInlet pressure\tOutlet pressure\tFlow\tCase flow\tTorque\tOil temperature\n\
                    \trpm\tbar\tbar\tl/min\tl/min\tNm\t°C\n\
                    1\t1500\t20,0\t220,5\t108,3\t2,1\t262,4\t50,1\n\
                    2\t1000\t20,1\t221\t70,9\t2,0\t259\t50,4\n";
        let (rows, bad) = rows(text, Subject::Pump);
        assert!(bad.is_empty(), "{bad:?}");
        assert_eq!(rows.len(), 2);
        assert_eq!(rows[0].name, "1");
        assert_eq!(rows[0].value(Channel::High), Some(220.5));
        assert_eq!(rows[0].value(Channel::Low), Some(20.0));
        assert_eq!(rows[0].value(Channel::Flow), Some(108.3));
        assert_eq!(rows[0].value(Channel::Case), Some(2.1));
        assert_eq!(rows[1].value(Channel::Inlet), Some(50.4));
    }

    #[test]
    fn semicolons_and_units_in_the_heads() {
        let text = "n [rpm];p1 (psi);p2 (psi);q (gpm);Torque (lbf·ft)\n1800;290;3000;30;200\n";
        let (rows, bad) = rows(text, Subject::Motor);
        assert!(bad.is_empty(), "{bad:?}");
        // At a motor p1 is the high side.
        let high = rows[0].value(Channel::High).expect("read");
        assert!((high - 290.0 * 0.068_947_572_931_683_6).abs() < 1e-9);
        let torque = rows[0].value(Channel::Torque).expect("read");
        assert!((torque - 271.16).abs() < 0.01);
        assert_eq!(rows[0].value(Channel::Speed), Some(1800.0));
        assert!(rows[0].cells[&Channel::High].typed.ends_with("psi"));
    }

    #[test]
    fn the_table_tells_what_one_cell_leaves_open() {
        let text = "Speed\tTorque\n1500\t81.849\n1500\t84.2\n";
        let (rows, bad) = rows(text, Subject::Pump);
        assert!(bad.is_empty(), "{bad:?}");
        assert_eq!(rows[0].value(Channel::Torque), Some(81.849));
        assert_eq!(rows[0].cells[&Channel::Torque].typed, "81.8490");
    }

    #[test]
    fn commas_with_decimal_points() {
        let text = "\u{feff}Speed (rpm),Flow (L/min)\r\n1500,\"108.3\"\r\n";
        let (rows, _) = rows(text, Subject::Pump);
        assert_eq!(rows[0].value(Channel::Flow), Some(108.3));
    }

    #[test]
    fn a_cell_that_cannot_be_read_is_kept_and_named() {
        let text = "Speed (rpm)\tFlow (L/min)\tTorque (Nm)\n1500\t108\t-\n1500\tsee note\t240\n";
        let (rows, bad) = rows(text, Subject::Pump);
        assert_eq!(rows[1].cells[&Channel::Flow].typed, "see note");
        assert_eq!(rows[1].value(Channel::Flow), None);
        assert!(bad.iter().any(|b| (b.row, b.column) == (2, 2)), "{bad:?}");
    }

    #[test]
    fn what_is_no_table_says_so() {
        assert_eq!(read("  \n;;\n", Subject::Pump), Err(PasteError::Empty));
        assert_eq!(
            read("hello, world", Subject::Pump),
            Err(PasteError::NoFigures)
        );
        let long = "1\t2\n".repeat(ROWS + 1);
        assert_eq!(
            read(&long, Subject::Pump),
            Err(PasteError::TooManyRows(ROWS + 1))
        );
        let huge = "1".repeat(LARGEST + 1);
        assert_eq!(read(&huge, Subject::Pump), Err(PasteError::TooLong));
    }
}
