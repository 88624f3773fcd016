//! The report as plain text: short lines that read well in a message, headings in capitals, nothing that needs a fixed pitch.

use super::{Group, Report, Row};
use crate::assessment::{Standing, upper_first};
use crate::call::words as told;
use std::fmt::Write as _;

impl Report {
    /// Plain text, lines ended by `\n`.
    #[must_use]
    pub fn text(&self) -> String {
        let mut out = String::new();
        line(&mut out, &self.title);
        line(&mut out, &self.finding.words);
        out.push('\n');
        for fact in &self.facts {
            line(&mut out, &format!("{}: {}", fact.name, fact.words));
        }
        for group in &self.groups {
            readings(&mut out, group);
        }
        if !self.causes.is_empty() {
            heading(&mut out, "Causes by chance");
            for cause in &self.causes {
                line(&mut out, &format!("- {}: {}", cause.title, cause.chance));
                for (name, reasons) in [
                    ("for", &cause.reasons_for),
                    ("against", &cause.reasons_against),
                ] {
                    if !reasons.is_empty() {
                        line(&mut out, &format!("  {name}: {}", reasons.join("; ")));
                    }
                }
            }
        }
        for section in &self.sections {
            heading(&mut out, section.heading);
            section
                .lines
                .iter()
                .for_each(|words| bullet(&mut out, words));
        }
        heading(&mut out, "Cautions");
        self.cautions
            .iter()
            .for_each(|words| bullet(&mut out, words));
        heading(&mut out, "What this rests on");
        self.basis.iter().for_each(|words| bullet(&mut out, words));
        out
    }
}

fn line(out: &mut String, words: &str) {
    out.push_str(words.trim_end());
    out.push('\n');
}

fn heading(out: &mut String, words: &str) {
    out.push('\n');
    line(out, &words.to_uppercase());
}

fn bullet(out: &mut String, words: &str) {
    line(out, &format!("- {words}"));
}

fn readings(out: &mut String, group: &Group) {
    out.push('\n');
    line(out, &format!("READINGS: {}", group.condition));
    // Figures and units stay as they are written.
    line(out, &upper_first(&group.oil));
    for row in &group.rows {
        reading(out, row);
    }
}

fn reading(out: &mut String, row: &Row) {
    let mut words = format!("{}. {}: {}", row.number, row.what, row.read);
    // Writing to a text cannot fail.
    match (&row.expected, row.source) {
        (Some(expected), Some(source)) => {
            let standing = standing(row.standing);
            let _ = write!(
                words,
                ". {standing}expected {expected}, {}",
                told::source(source)
            );
        }
        _ => words.push_str(". No window: nothing can be expected here"),
    }
    let _ = write!(words, ". {}", upper_first(&row.instrument));
    if !row.before.is_empty() {
        let _ = write!(words, ". Read before: {}", row.before.join(", "));
    }
    for remark in &row.remarks {
        let _ = write!(words, ". {}", upper_first(remark));
    }
    line(out, words.trim_end_matches('.'));
}

/// Where it stands, loud where it is off.
fn standing(standing: Standing) -> &'static str {
    match standing {
        Standing::Low => "LOW, ",
        Standing::High => "HIGH, ",
        Standing::Within => "Within, ",
        Standing::Edge => "At the edge, ",
        Standing::CannotTell => "Cannot be judged, ",
        Standing::Open => "Open, ",
    }
}
