//! The places of the adjuster, and what they come to.

use std::rc::Rc;

use yew::{Callback, Html, MouseEvent, Properties, component, html};

use super::adjuster::Adjuster;
use super::edit::Edits;
use super::figures::SheetField;
use super::lines::Lines;
use super::plot::AdjusterPlot;
use crate::app::parts::{Choice, Opt};
use crate::neutral::report::Report;
use crate::neutral::words::Writer;
use crate::quantity::{Kind, UnitPrefs};
use crate::record::NeutralSheet;
use crate::record::neutral::{AdjusterRow, Field, SeriesBy};

/// Properties of [`Series`].
#[derive(Clone, PartialEq, Properties)]
pub struct SeriesProps {
    /// The sheet.
    pub sheet: Rc<NeutralSheet>,
    /// What it comes to.
    pub report: Rc<Report>,
    /// Units.
    pub prefs: UnitPrefs,
    /// Edits.
    pub edits: Edits,
}

/// The next place: where the last one is, turned the same way, nothing seen yet.
fn next(rows: &[AdjusterRow]) -> AdjusterRow {
    let number = rows
        .iter()
        .filter_map(|row| row.id.strip_prefix('p')?.parse::<u32>().ok())
        .max()
        .unwrap_or(0);
    let last = rows.last().cloned().unwrap_or_default();
    AdjusterRow {
        id: format!("p{}", number.saturating_add(1)),
        turns: last.turns,
        time: last.time,
        from: last.from,
        ..AdjusterRow::default()
    }
}

/// The places.
#[component]
pub fn Series(props: &SeriesProps) -> Html {
    let sheet = &props.sheet;
    let on_add = {
        let edits = props.edits.clone();
        Callback::from(move |_: MouseEvent| {
            edits.make(|sheet| {
                let row = next(&sheet.series);
                sheet.series.push(row);
            });
        })
    };
    let on_by = {
        let edits = props.edits.clone();
        Callback::from(move |by: SeriesBy| edits.make(|sheet| sheet.by = by))
    };
    let writer = Writer::new(&props.prefs);
    let mut lines = props
        .report
        .series
        .as_ref()
        .map(|s| writer.series(s))
        .unwrap_or_default();
    lines.extend(props.report.halves.as_ref().map(|h| writer.halves(h)));
    let what = match sheet.by {
        SeriesBy::Creep => "creep, rpm".to_owned(),
        SeriesBy::Difference => format!("A − B, {}", props.prefs.unit(Kind::Pressure).symbol()),
    };
    html! {
        <div class="stack">
            <Choice<SeriesBy>
                name="series-by"
                label="Read at each place"
                options={vec![
                    Opt::new(SeriesBy::Creep, "Creep, wheels free", "creep"),
                    Opt::new(SeriesBy::Difference, "Loop difference, held", "difference"),
                ]}
                value={Some(sheet.by)}
                on_change={on_by}
            />
            { for sheet.series.iter().enumerate().map(|(i, row)| html! {
                <Adjuster
                    key={row.id.clone()}
                    row={row.clone()}
                    number={i + 1}
                    by={sheet.by}
                    prefs={props.prefs.clone()}
                    edits={props.edits.clone()}
                />
            }) }
            <button type="button" class="button is-main is-wide" data-testid="add-place" onclick={on_add}>
                { if sheet.series.is_empty() { "Add the first place" } else { "Add a place" } }
            </button>
            <AdjusterPlot
                points={props.report.points.clone()}
                fitted={props.report.series.clone().and_then(Result::ok)}
                {what}
                prefs={props.prefs.clone()}
            />
            <Lines {lines} testid="series-told" />
            if !sheet.series.is_empty() {
                <SheetField
                    field={Field::Balanced}
                    label="Servo pressures equal at"
                    hint="turns in; tells an uneven dead band, where both starts are noted"
                    sheet={sheet.clone()}
                    prefs={props.prefs.clone()}
                    edits={props.edits.clone()}
                />
            }
        </div>
    }
}
