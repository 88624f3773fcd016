//! The paper of a yard check: the verdict with its reasons, everything that was checked, and, as loud, what was not.

use super::causes::{Finding, Sure};
use super::{Fact, Report, Section, csv, moment, name, one_line, section, typed};
use crate::assessment::{lower_first, upper_first};
use crate::caution::{self, Stands};
use crate::quantity::{UnitPrefs, retold};
use crate::readings::instrument::Instrument;
use crate::record::{Book, Export, SCHEMA, Settings, Visit, checksum};
use crate::unit::Unit;
use crate::yard::{self, Field, Grade, Verdict, YardSheet, labels};

/// What the paper of a yard check is made from.
#[derive(Clone, Copy, Debug)]
pub struct Check<'a> {
    /// The unit.
    pub unit: &'a Unit,
    /// The check.
    pub visit: &'a Visit,
    /// The other visits to the unit, in any order: its own earlier checks, and the check out that this one is paired with.
    pub others: &'a [&'a Visit],
    /// Instruments of the shop.
    pub instruments: &'a [Instrument],
    /// Units of measure and decimal mark.
    pub prefs: &'a UnitPrefs,
    /// Moment of the paper (ISO 8601 text).
    pub made_at: &'a str,
}

impl Check<'_> {
    fn report(&self) -> yard::Report {
        yard::report(
            self.unit,
            self.visit,
            self.others,
            self.instruments,
            self.prefs,
        )
    }

    fn sheet(&self) -> YardSheet {
        self.visit.yard.clone().unwrap_or_default()
    }

    /// The check as a file from which the office command makes this very paper: the unit, the check, and the unit's earlier
    /// visits, since they are what it is compared with.
    #[must_use]
    pub fn export(&self) -> Export {
        let mut book = Book {
            settings: Settings {
                instruments: self.instruments.to_vec(),
                ..Settings::default()
            },
            ..Book::default()
        };
        book.put_unit(self.unit.clone());
        let own = (self.visit.opened.as_str(), self.visit.id.as_str());
        for other in self.others {
            if other.unit == self.unit.id && (other.opened.as_str(), other.id.as_str()) < own {
                book.put_visit((*other).clone());
            }
        }
        book.put_visit(self.visit.clone());
        let mut export = Export::of(&book, self.made_at);
        export.settings = Some(Settings {
            units: self.prefs.clone(),
            ..Settings::default()
        });
        export
    }

    fn record_sum(&self) -> String {
        let mut export = self.export();
        export.made_at.clear();
        export.program.clear();
        export
            .text()
            .map_or_else(|_| String::new(), |text| checksum(&text))
    }

    /// The sheet's figures as a table of one line: the unit of measure of each in its header, a point as the decimal mark.
    #[must_use]
    pub fn csv(&self) -> String {
        let sheet = self.sheet();
        let mut cells = vec![
            ("Unit".to_owned(), csv::text(&name(self.unit))),
            (
                "Check begun (UTC)".to_owned(),
                csv::text(&self.visit.opened),
            ),
            ("Leg".to_owned(), csv::text(sheet.leg.words())),
            (
                "Verdict".to_owned(),
                csv::text(self.report().verdict.words()),
            ),
            (
                "Hour meter (h)".to_owned(),
                self.visit
                    .hour_meter()
                    .map_or_else(String::new, |hours| hours.to_string()),
            ),
        ];
        for field in Field::ALL {
            let Some(typed) = sheet.fields.get(&field) else {
                continue;
            };
            let unit = labels::unit(field, self.prefs);
            let value = sheet.value_in(field, unit).map_or_else(
                // What cannot be read goes out as it was typed.
                || csv::text(&typed.typed),
                |value| format!("{}", (value * 1e6).round() / 1e6),
            );
            let label = labels::field(field, self.unit).0;
            cells.push((format!("{label} ({})", unit.symbol()), value));
        }
        cells.push(("Course".to_owned(), csv::text(&sheet.course)));
        cells.push(("Note".to_owned(), csv::text(&one_line(&self.visit.note))));
        let row = |cells: Vec<String>| {
            cells
                .into_iter()
                .map(csv::quoted)
                .collect::<Vec<_>>()
                .join(",")
        };
        let (header, values): (Vec<String>, Vec<String>) = cells.into_iter().unzip();
        format!("{}\r\n{}\r\n", row(header), row(values))
    }
}

impl Report {
    /// The paper of a yard check.
    #[must_use]
    pub fn of_check(check: &Check) -> Report {
        let found = check.report();
        let sheet = check.sheet();
        let sections = [
            section("reasons", "Why", reasons(&found)),
            section("change", "Since it went out", change(&found)),
            section("checked", "Checked", checked(&found)),
            section("not-checked", "Not checked", found.not_checked.clone()),
            section("note", "Note", typed(&check.visit.note).collect()),
        ];
        Report {
            title: format!(
                "Yard check: unit {}, {}",
                name(check.unit),
                lower_first(sheet.leg.words())
            ),
            facts: facts(check, &sheet, &found),
            finding: finding(&found),
            groups: Vec::new(),
            causes: Vec::new(),
            sections: sections.into_iter().flatten().collect::<Vec<Section>>(),
            cautions: cautions(check, &found),
            basis: basis(check),
        }
    }
}

fn finding(found: &yard::Report) -> Finding {
    let sure = match found.verdict {
        Verdict::NothingChecked => Sure::TooLittle,
        Verdict::NothingFound => Sure::Leads,
        Verdict::Watch | Verdict::DoNotSendOut => Sure::Uncertain,
    };
    let (done, all) = found.steps;
    let part = if done < all {
        format!(" {done} of {all} steps are whole.")
    } else {
        String::new()
    };
    Finding {
        sure,
        words: format!("{}.{part}", found.verdict.words()),
    }
}

fn facts(check: &Check, sheet: &YardSheet, found: &yard::Report) -> Vec<Fact> {
    let mut facts = vec![
        Fact {
            name: "Machine",
            words: format!("{}, {}", name(check.unit), check.unit.class.words()),
        },
        Fact {
            name: "Check",
            words: match &check.visit.closed {
                Some(closing) => format!(
                    "{} to {}",
                    moment(&check.visit.opened),
                    moment(&closing.when)
                ),
                None => format!("{}, not finished", moment(&check.visit.opened)),
            },
        },
    ];
    let mut say = |name, words: String| {
        if !words.is_empty() {
            facts.push(Fact { name, words });
        }
    };
    if let Some(hours) = check.visit.hour_meter() {
        say("Hour meter", format!("{hours:.0} h"));
    }
    if let Some(oil) = sheet.fields.get(&Field::Oil).and_then(|typed| typed.value) {
        say(
            "Oil",
            format!("{} at {}", check.prefs.print(oil), sheet.place.words()),
        );
    }
    if let Some(cold) = &found.cold {
        say(
            "Only in part",
            format!("only what does not leak counts: {cold}"),
        );
    }
    say("Instruments", instruments(check, sheet).join("; "));
    say("Loaded run", one_line(&sheet.course));
    facts
}

fn instruments(check: &Check, sheet: &YardSheet) -> Vec<String> {
    [
        ("charge", &sheet.gauge),
        ("speed", &sheet.tachometer),
        ("drain", &sheet.meter),
    ]
    .into_iter()
    .filter_map(|(of, id)| {
        let own = check.instruments.iter().find(|own| &own.id == id)?;
        Some(format!("{of}: {}", one_line(&own.name)))
    })
    .collect()
}

fn reasons(found: &yard::Report) -> Vec<String> {
    let line = |(grade, why): &(Grade, String)| format!("{}: {why}", upper_first(grade.words()));
    found.reasons.iter().map(line).collect()
}

fn change(found: &yard::Report) -> Vec<String> {
    let Some(out) = &found.change else {
        return Vec::new();
    };
    let hours = out.hours.map_or_else(String::new, |hours| {
        format!(", {hours:.0} h on the meter since")
    });
    let mut lines = vec![format!(
        "Paired with the check going out of {}{hours}",
        moment(&out.opened)
    )];
    lines.extend(out.changes.iter().map(|change| change.words.clone()));
    lines.extend(
        out.not_compared
            .iter()
            .map(|what| format!("Not compared: {what}")),
    );
    lines
}

fn checked(found: &yard::Report) -> Vec<String> {
    let judged = found.judged.iter().filter_map(|judged| {
        let grade = judged.grade?;
        let figure = if judged.found.is_empty() {
            String::new()
        } else {
            format!(" {},", judged.found)
        };
        let why = if judged.why.is_empty() {
            String::new()
        } else {
            format!(" ({})", judged.why)
        };
        Some(format!("{}:{figure} {}{why}", judged.what, grade.words()))
    });
    judged.collect()
}

fn cautions(check: &Check, found: &yard::Report) -> Vec<String> {
    let mut out = Vec::new();
    if found.verdict == Verdict::DoNotSendOut {
        out.push(String::from(
            "Not to be sent out before what is found has been put right and checked again.",
        ));
    }
    out.extend(
        caution::at(Stands::Call).map(|caution| retold(caution.text, check.prefs).into_owned()),
    );
    out
}

fn basis(check: &Check) -> Vec<String> {
    vec![
        String::from(
            "A yard check looks at the drive alone. “Nothing found in what was checked” does not say that the machine is fit: \
             what was not checked stands above, and whoever sends it out decides.",
        ),
        yard::ABOUT_LIMITS.to_owned(),
        format!(
            "Lowside {}, record format {SCHEMA}, {}. Record {}. The check's export file gives this paper again, after those of \
             the unit's earlier visits: assess --report < file.json",
            env!("CARGO_PKG_VERSION"),
            moment(check.made_at),
            check.record_sum()
        ),
    ]
}
