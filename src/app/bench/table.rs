//! The table of points: one row a reading, cells as typed, what is wrong told under the table by row and column.

use super::codes;
use super::screen::{Edit, Told};
use crate::app::parts::{Confirm, Icon, Opt, Select, Shape};
use crate::app::platform::ids;
use crate::bench::stand::point::Steadiness;
use crate::bench::stand::sheet::ROWS;
use crate::bench::stand::{BenchSheet, Channel, Row};
use crate::quantity::Typed;
use crate::quantity::{Measure, Unit, UnitPrefs, parse};
use crate::record::IdOf;
use std::rc::Rc;
use yew::{AttrValue, Callback, Html, InputEvent, MouseEvent, Properties, TargetCast};
use yew::{component, html};

/// Properties of [`PointTable`].
#[derive(Clone, PartialEq, Properties)]
pub struct PointTableProps {
    /// The sheet.
    pub sheet: Rc<BenchSheet>,
    /// What it comes to.
    pub told: Told,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

/// Reads a cell in the unit of its column; the unit of the shop is written behind the text by the caller where it differs.
fn read(channel: Channel, unit: Unit, text: &str) -> Result<Measure, String> {
    let (own, low, high) = channel.asks();
    let range = Measure::literal(low, own)..=Measure::literal(high, own);
    parse(text, own.kind(), unit, Some(range))
        .map(|parsed| parsed.measure)
        .map_err(|why| why.to_string())
}

/// Properties of [`Cell`].
#[derive(Clone, PartialEq, Properties)]
struct CellProps {
    row: AttrValue,
    at: usize,
    channel: Channel,
    label: AttrValue,
    unit: Unit,
    typed: Typed,
    on_edit: Callback<Edit>,
}

#[component]
fn Cell(props: &CellProps) -> Html {
    let (channel, unit) = (props.channel, props.unit);
    let wrong = !props.typed.is_blank() && props.typed.value.is_none();
    let on_input = {
        let (row, on_edit) = (props.row.to_string(), props.on_edit.clone());
        Callback::from(move |event: InputEvent| {
            let text = event
                .target_unchecked_into::<web_sys::HtmlInputElement>()
                .value();
            let row = row.clone();
            on_edit.emit(Box::new(move |sheet| {
                let Some(row) = sheet.rows.iter_mut().find(|r| r.id == row) else {
                    return;
                };
                if text.trim().is_empty() {
                    row.cells.remove(&channel);
                } else {
                    let value = read(channel, unit, &text).ok();
                    row.cells.insert(channel, Typed { typed: text, value });
                }
            }));
        })
    };
    // What is kept in another unit than the shop's now is shown in the shop's.
    let shown = match props.typed.value {
        Some(value) if read(channel, unit, &props.typed.typed).ok() != Some(value) => {
            let value = value.try_in_unit(unit).unwrap_or_default();
            let text = format!("{value:.4}");
            text.trim_end_matches('0').trim_end_matches('.').to_owned()
        }
        _ => props.typed.typed.clone(),
    };
    let testid = format!("cell-{}-{}", props.at, codes::channel(channel));
    html! {
        <td class={if wrong { "is-wrong" } else { "" }}>
            <input
                class="bench-cell"
                type="text"
                inputmode="decimal"
                autocomplete="off"
                maxlength="60"
                aria-label={format!("Row {}, {}", props.at + 1, props.label)}
                aria-invalid={wrong.then_some("true")}
                value={shown}
                oninput={on_input}
                data-testid={testid}
            />
        </td>
    }
}

/// The table.
#[component]
pub fn PointTable(props: &PointTableProps) -> Html {
    let sheet = &props.sheet;
    let columns = sheet.table_columns();
    let unit = |channel: Channel| codes::shown(&props.prefs, channel.asks().0);
    let on_add = {
        let on_edit = props.on_edit.clone();
        Callback::from(move |_: MouseEvent| {
            let id = ids::fresh(IdOf::Reading);
            on_edit.emit(Box::new(move |sheet| {
                if sheet.rows.len() < ROWS {
                    let name = next_name(&sheet.rows);
                    sheet.rows.push(Row {
                        id,
                        name,
                        ..Row::default()
                    });
                }
            }));
        })
    };
    let on_clear = props
        .on_edit
        .reform(|()| -> Edit { Box::new(|sheet| sheet.rows.clear()) });
    let bad: Vec<String> = sheet
        .rows
        .iter()
        .enumerate()
        .flat_map(|(at, row)| {
            let unit = &unit;
            row.cells.iter().filter_map(move |(channel, typed)| {
                if typed.is_blank() || typed.value.is_some() {
                    return None;
                }
                let why = read(*channel, unit(*channel), &typed.typed).err()?;
                Some(format!(
                    "Row {}, {}: {why}",
                    at + 1,
                    channel.words(sheet.subject)
                ))
            })
        })
        .collect();
    let more: Vec<Opt<Option<Channel>>> = std::iter::once(Opt::new(None, "Choose a column", ""))
        .chain(
            Channel::ALL
                .into_iter()
                .filter(|channel| channel.belongs(sheet.subject) && !columns.contains(channel))
                .map(|channel| {
                    Opt::new(
                        Some(channel),
                        channel.words(sheet.subject),
                        codes::channel(channel),
                    )
                }),
        )
        .collect();
    let on_column = props.on_edit.reform(|channel: Option<Channel>| -> Edit {
        Box::new(move |sheet| {
            if let Some(channel) = channel
                && !sheet.columns.contains(&channel)
            {
                sheet.columns.push(channel);
            }
        })
    });
    html! { <>
        if sheet.rows.is_empty() {
            <p class="soft" data-testid="bench-no-rows">{ "No readings yet. Type a row, or paste the table from a spreadsheet. Rows with one point name are \
                repeated readings of one point: three and more show that it stood steady." }</p>
        } else {
            <div class="bench-scroll" tabindex="0" role="region" aria-label="Table of readings">
                <table class="bench-table" data-testid="bench-table">
                    <thead><tr>
                        <th scope="col">{ "Point" }</th>
                        { for columns.iter().map(|channel| html! {
                            <th key={codes::channel(*channel)} scope="col">{ channel.words(sheet.subject) }<br /><span class="soft">{ unit(*channel).symbol() }</span></th>
                        }) }
                        <th scope="col"><span class="hidden-text">{ "Count it" }</span></th>
                    </tr></thead>
                    <tbody>
                        { for sheet.rows.iter().enumerate().map(|(at, row)| table_row(props, &columns, at, row)) }
                    </tbody>
                </table>
            </div>
        }
        <div role="status" aria-live="polite" data-testid="bench-bad-cells">
            if !bad.is_empty() {
                <ul class="bench-bad">{ for bad.into_iter().take(12).map(|line| html! { <li class="field-error">{ line }</li> }) }</ul>
            }
        </div>
        { steadiness(props) }
        <div class="actions">
            <button type="button" class="button is-main" data-testid="bench-add-row" disabled={sheet.rows.len() >= ROWS} onclick={on_add}>
                <Icon shape={Shape::Plus} />{ "Add a row" }
            </button>
            if !sheet.rows.is_empty() {
                <Confirm
                    words="Clear the table"
                    question={format!("Take all {} rows away?", sheet.rows.len())}
                    yes="Clear it"
                    on_yes={on_clear}
                    testid="bench-clear"
                />
            }
        </div>
        if more.len() > 1 {
            <Select<Option<Channel>> id="bench-column" label="One more column" options={more} value={Some(None)} on_change={on_column} testid="bench-column" />
        }
    </> }
}

/// The name that a new row starts with: the last one, so that a reading repeated is one press.
fn next_name(rows: &[Row]) -> String {
    rows.last()
        .map_or_else(|| "1".to_owned(), |row| row.name.clone())
}

fn table_row(props: &PointTableProps, columns: &[Channel], at: usize, row: &Row) -> Html {
    let sheet = &props.sheet;
    let on_name = {
        let (id, on_edit) = (row.id.clone(), props.on_edit.clone());
        Callback::from(move |event: InputEvent| {
            let text = event
                .target_unchecked_into::<web_sys::HtmlInputElement>()
                .value();
            let id = id.clone();
            on_edit.emit(Box::new(move |sheet| {
                if let Some(row) = sheet.rows.iter_mut().find(|row| row.id == id) {
                    row.name = text;
                }
            }));
        })
    };
    let on_out = {
        let (id, on_edit) = (row.id.clone(), props.on_edit.clone());
        Callback::from(move |_: MouseEvent| {
            let id = id.clone();
            on_edit.emit(Box::new(move |sheet| {
                if let Some(row) = sheet.rows.iter_mut().find(|row| row.id == id) {
                    row.is_left_out = !row.is_left_out;
                }
            }));
        })
    };
    html! {
        <tr key={row.id.clone()} class={if row.is_left_out { "is-out" } else { "" }}>
            <th scope="row">
                <input
                    class="bench-cell bench-name"
                    type="text"
                    autocomplete="off"
                    maxlength="40"
                    aria-label={format!("Row {}, name of the point", at + 1)}
                    value={row.name.clone()}
                    oninput={on_name}
                    data-testid={format!("row-{at}-name")}
                />
            </th>
            { for columns.iter().map(|channel| html! {
                <Cell
                    key={codes::channel(*channel)}
                    row={row.id.clone()}
                    {at}
                    channel={*channel}
                    label={channel.words(sheet.subject)}
                    unit={codes::shown(&props.prefs, channel.asks().0)}
                    typed={row.cells.get(channel).cloned().unwrap_or_default()}
                    on_edit={props.on_edit.clone()}
                />
            }) }
            <td>
                <button
                    type="button"
                    class="button is-quiet bench-out"
                    aria-pressed={if row.is_left_out { "true" } else { "false" }}
                    onclick={on_out}
                    data-testid={format!("row-{at}-out")}
                >{ if row.is_left_out { "Count" } else { "Leave out" } }<span class="hidden-text">{ format!(" row {}", at + 1) }</span></button>
            </td>
        </tr>
    }
}

/// What is not steady, and what was never shown to be.
fn steadiness(props: &PointTableProps) -> Html {
    let report = &props.told.0;
    let subject = props.sheet.subject;
    let moving = report
        .points
        .iter()
        .filter_map(|point| match &point.steadiness {
            Steadiness::Moving(channels) => {
                let which = channels
                    .iter()
                    .map(|(channel, half, allowed)| {
                        let base = channel.asks().0;
                        format!(
                            "{} moves by ± {}, allowed ± {}",
                            channel.words(subject),
                            codes::plain(*half, base, &props.prefs),
                            codes::plain(*allowed, base, &props.prefs)
                        )
                    })
                    .collect::<Vec<_>>()
                    .join("; ");
                Some(format!("Point {} was not steady: {which}.", point.name))
            }
            _ => None,
        });
    let single = report
        .points
        .iter()
        .filter(|point| matches!(point.steadiness, Steadiness::NotShown(_)))
        .count();
    html! {
        <div class="stack" data-testid="bench-steady">
            { for moving.map(|line| html! { <p class="bench-remark">{ line }</p> }) }
            if single > 0 {
                <p class="soft">{ format!(
                    "{single} of {} points read fewer than three times: nothing shows that they stood steady. Limits of common practice.",
                    report.points.len()
                ) }</p>
            }
        </div>
    }
}
