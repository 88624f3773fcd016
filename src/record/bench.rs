//! The bench sheet as it comes from outside and goes out.

use super::check::{self, Checked};
use super::limits::ENTRIES;
use crate::bench::stand::BenchSheet;
use crate::bench::stand::acceptance::{LIMITS, Part};
use crate::bench::stand::items::{Entry, item};
use crate::bench::stand::sheet::ROWS;
use crate::quantity::Typed;
use crate::quantity::{Measure, Unit};
use std::collections::BTreeSet;

/// Largest figure of an item, in its unit.
const LARGEST: f64 = 1e5;

type Asked = (Measure, Measure);

fn asked(unit: Unit, low: f64, high: f64) -> Asked {
    (Measure::literal(low, unit), Measure::literal(high, unit))
}

/// Every typed figure of a sheet, with its path and the range that is taken.
fn figures(sheet: &mut BenchSheet) -> Vec<(String, &mut Typed, Asked)> {
    let mut all = Vec::new();
    for (head, typed) in &mut sheet.head {
        let (unit, low, high) = head.asks();
        all.push(("head".to_owned(), typed, asked(unit, low, high)));
    }
    for (channel, meter) in &mut sheet.meters {
        let (unit, _, high) = channel.asks();
        let percent = asked(Unit::Percent, 0.0, 20.0);
        all.push(("meters.limit".to_owned(), &mut meter.limit, percent));
        let span = asked(unit, 0.0, 10.0 * high);
        all.push(("meters.span".to_owned(), &mut meter.span, span));
    }
    for (at, row) in sheet.rows.iter_mut().enumerate() {
        for (channel, typed) in &mut row.cells {
            let (unit, low, high) = channel.asks();
            all.push((format!("rows[{at}].cells"), typed, asked(unit, low, high)));
        }
    }
    for (id, entry) in &mut sheet.items {
        let unit = match item(*id).map(|item| item.entry) {
            Some(Entry::Figure(unit)) => unit,
            _ => Unit::Fraction,
        };
        for typed in [&mut entry.found, &mut entry.low, &mut entry.high] {
            all.push(("items".to_owned(), typed, asked(unit, 0.0, LARGEST)));
        }
    }
    for limit in sheet.limits.values_mut() {
        for typed in [&mut limit.low, &mut limit.high] {
            all.push(("limits".to_owned(), typed, asked(Unit::Percent, 0.0, 200.0)));
        }
    }
    for (at, limit) in sheet.acceptance.iter_mut().enumerate() {
        let of = limit.of;
        // One field at a time can be lent out to be written.
        let fields = [
            (Part::Speed, &mut limit.speed),
            (Part::From, &mut limit.from),
            (Part::To, &mut limit.to),
            (Part::Limit, &mut limit.limit),
            (Part::LimitTo, &mut limit.limit_to),
        ];
        for (part, typed) in fields {
            let (unit, low, high) = part.asks(of);
            all.push((format!("acceptance[{at}]"), typed, asked(unit, low, high)));
        }
    }
    all
}

/// Checks a sheet and cleans its texts.
pub(super) fn check(path: &str, sheet: &mut BenchSheet) -> Checked {
    check::count(&format!("{path}.rows"), sheet.rows.len(), ROWS)?;
    check::count(&format!("{path}.columns"), sheet.columns.len(), ENTRIES)?;
    let mut met = BTreeSet::new();
    for (index, row) in sheet.rows.iter_mut().enumerate() {
        let path = format!("{path}.rows[{index}]");
        check::id_once(&path, &row.id, &mut met)?;
        check::line(&path, "name", &mut row.name)?;
    }
    for text in sheet.texts.values_mut() {
        check::prose(&format!("{path}.texts"), "text", text)?;
    }
    for meter in sheet.meters.values_mut() {
        check::line(&format!("{path}.meters"), "mark", &mut meter.mark)?;
        check::line(
            &format!("{path}.meters"),
            "calibrated",
            &mut meter.calibrated,
        )?;
    }
    for entry in sheet.items.values_mut() {
        check::prose(&format!("{path}.items"), "note", &mut entry.note)?;
        if let Some(why) = &mut entry.skipped {
            check::prose(&format!("{path}.items"), "skipped", why)?;
        }
    }
    for limit in sheet.limits.values_mut() {
        check::line(&format!("{path}.limits"), "from", &mut limit.from)?;
    }
    check::count(
        &format!("{path}.acceptance"),
        sheet.acceptance.len(),
        LIMITS,
    )?;
    let mut limits = BTreeSet::new();
    for (index, limit) in sheet.acceptance.iter_mut().enumerate() {
        let path = format!("{path}.acceptance[{index}]");
        check::id_once(&path, &limit.id, &mut limits)?;
        check::line(&path, "point", &mut limit.point)?;
        check::line(&path, "source", &mut limit.source)?;
    }
    if let Some(when) = &mut sheet.taken_over {
        check::line(path, "taken_over", when)?;
    }
    for (at, typed, asked) in figures(sheet) {
        check::typed(&format!("{path}.{at}"), typed, asked)?;
    }
    check::unknown_fields(path, &sheet.extra)
}

/// A figure that the checks would refuse goes out as its text alone.
pub(super) fn mend(sheet: &mut BenchSheet) {
    for (_, typed, asked) in figures(sheet) {
        typed
            .value
            .take_if(|value| check::within(*value, asked).is_err());
    }
}

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests {
    use super::*;
    use crate::bench::stand::acceptance::{Acceptance, Limited};
    use crate::bench::stand::{Channel, Row};

    fn sheet(speed: f64) -> BenchSheet {
        let mut row = Row::of("1", &[(Channel::Speed, speed)]);
        row.id = "row-1".to_owned();
        BenchSheet {
            rows: vec![row],
            ..BenchSheet::default()
        }
    }

    #[test]
    fn figures_beyond_their_columns_are_refused_with_their_path_and_go_out_as_text() {
        assert!(check("visit.bench", &mut sheet(1500.0)).is_ok());
        let mut wrong = sheet(1e6);
        let why = check("visit.bench", &mut wrong).expect_err("out of range");
        assert!(
            why.to_string().contains("visit.bench.rows[0].cells"),
            "{why}"
        );
        mend(&mut wrong);
        assert!(check("visit.bench", &mut wrong).is_ok());
        assert_eq!(wrong.rows[0].cells[&Channel::Speed].typed, "1000000");
    }

    #[test]
    fn limits_along_curves_are_kept_and_held_to_their_ranges() {
        let typed = |value: f64, unit: Unit| Typed {
            typed: format!("{value}"),
            value: Some(Measure::literal(value, unit)),
        };
        let mut kept = sheet(1500.0);
        kept.acceptance.push(Acceptance {
            id: "limit-1".to_owned(),
            of: Limited::CaseLeakage,
            limit: typed(6.0, Unit::LitrePerMinute),
            ..Acceptance::default()
        });
        let text = serde_json::to_string(&kept).expect("written");
        let back: BenchSheet = serde_json::from_str(&text).expect("read");
        assert_eq!(back, kept);
        assert!(check("visit.bench", &mut kept).is_ok());
        // A limit of leakage under an efficiency, as no screen writes it.
        kept.acceptance[0].of = Limited::Overall;
        let why = check("visit.bench", &mut kept).expect_err("another kind");
        assert!(
            why.to_string().contains("visit.bench.acceptance[0]"),
            "{why}"
        );
        mend(&mut kept);
        assert!(check("visit.bench", &mut kept).is_ok());
        assert_eq!(kept.acceptance[0].limit.typed, "6");
        kept.acceptance.push(kept.acceptance[0].clone());
        assert!(check("visit.bench", &mut kept).is_err(), "one id twice");
        // Sheets of before have none.
        let old: BenchSheet = serde_json::from_str("{}").expect("read");
        assert!(old.acceptance.is_empty());
    }

    #[test]
    fn two_rows_of_one_id_are_refused() {
        let mut twice = sheet(1500.0);
        twice.rows.push(twice.rows[0].clone());
        assert!(check("visit.bench", &mut twice).is_err());
    }
}
