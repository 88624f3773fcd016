//! A table pasted or read from a file: shown as understood before it is taken.

use super::codes;
use super::screen::Edit;
use crate::app::parts::{Opt, Select, TextField};
use crate::app::platform::{files, ids};
use crate::bench::stand::paste::{Goes, LARGEST, Pasted, read};
use crate::bench::stand::sheet::ROWS;
use crate::bench::stand::{Channel, Subject};
use crate::record::IdOf;
use yew::{Callback, Event, Html, MouseEvent, Properties, TargetCast, component, html, use_state};

/// Properties of [`PasteBox`].
#[derive(Clone, PartialEq, Properties)]
pub struct PasteBoxProps {
    /// Subject: it says which port is the high one.
    pub subject: Subject,
    /// Rows that are on the sheet already.
    pub rows: usize,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

/// Rows shown before the table is taken.
const SHOWN: usize = 5;

fn goes(subject: Subject) -> Vec<Opt<Goes>> {
    let fixed = [
        Opt::new(Goes::Nowhere, "Leave it out", "nowhere"),
        Opt::new(Goes::Name, "Name of the point", "name"),
    ];
    fixed
        .into_iter()
        .chain(
            Channel::ALL
                .into_iter()
                .filter(|channel| channel.belongs(subject))
                .map(|channel| {
                    Opt::new(
                        Goes::To(channel),
                        channel.words(subject),
                        codes::channel(channel),
                    )
                }),
        )
        .collect()
}

/// The box.
#[component]
pub fn PasteBox(props: &PasteBoxProps) -> Html {
    let text = use_state(String::new);
    let table = use_state(|| None::<Pasted>);
    let error = use_state(String::new);
    let understand = {
        let (text, table, error) = (text.clone(), table.clone(), error.clone());
        let subject = props.subject;
        move |new: String| {
            if new.trim().is_empty() {
                error.set(String::new());
                table.set(None);
            } else {
                match read(&new, subject) {
                    Ok(pasted) => {
                        error.set(String::new());
                        table.set(Some(pasted));
                    }
                    Err(why) => {
                        error.set(why.to_string());
                        table.set(None);
                    }
                }
            }
            text.set(new);
        }
    };
    let on_input = {
        let understand = understand.clone();
        Callback::from(move |new: String| understand(new))
    };
    let on_file = {
        let error = error.clone();
        Callback::from(move |event: Event| {
            let input = event.target_unchecked_into::<web_sys::HtmlInputElement>();
            let Some(file) = input.files().and_then(|files| files.get(0)) else {
                return;
            };
            let (understand, error) = (understand.clone(), error.clone());
            files::read(&file, LARGEST, move |bytes| match bytes {
                Ok(bytes) => understand(String::from_utf8_lossy(&bytes).into_owned()),
                Err(why) => error.set(why),
            });
        })
    };
    let on_take = {
        let (table, text, on_edit) = (table.clone(), text.clone(), props.on_edit.clone());
        Callback::from(move |_: MouseEvent| {
            if let Some(pasted) = &*table {
                let (rows, _) = pasted.rows(|| ids::fresh(IdOf::Reading));
                on_edit.emit(Box::new(move |sheet| {
                    let room = ROWS.saturating_sub(sheet.rows.len());
                    sheet.rows.extend(rows.into_iter().take(room));
                }));
            }
            table.set(None);
            text.set(String::new());
        })
    };
    html! {
        <details class="advice" data-testid="bench-paste">
            <summary>{ "Paste a table, or read a CSV file" }</summary>
            <div class="stack">
                <TextField
                    id="bench-paste-text"
                    label="Table with its row of heads"
                    hint="Tabs, semicolons or commas between the cells; decimal commas and a row of units are understood"
                    lines=true
                    maxlength={200_000}
                    value={(*text).clone()}
                    error={(*error).clone()}
                    {on_input}
                    testid="bench-paste-text"
                />
                <label class="button is-quiet">
                    { "Read a file" }
                    <input class="hidden-text" type="file" accept=".csv,.txt,.tsv,text/csv,text/plain" onchange={on_file} data-testid="bench-file" />
                </label>
                if let Some(pasted) = &*table {
                    { preview(pasted, props.subject, &table) }
                    { unread(pasted) }
                    <div class="actions">
                        <button type="button" class="button is-main" onclick={on_take} data-testid="bench-take"
                            disabled={props.rows + pasted.cells.len() > ROWS}>
                            { format!("Take {} rows", pasted.cells.len()) }
                        </button>
                    </div>
                    if props.rows + pasted.cells.len() > ROWS {
                        <p class="field-error" role="status">{ format!("At most {ROWS} rows fit on a sheet; {} are there.", props.rows) }</p>
                    }
                }
            </div>
        </details>
    }
}

/// Cells that cannot be read come along as text, named beforehand.
fn unread(pasted: &Pasted) -> Html {
    let (_, bad) = pasted.rows(String::new);
    html! {
        <div role="status" data-testid="bench-paste-unread">
            if !bad.is_empty() {
                <p>{ "These cells come along as text and do not count until they are put right:" }</p>
                <ul class="bench-bad">
                    { for bad.iter().take(8).map(|cell| html! {
                        <li class="field-error">{ format!("Row {}, column {}: {}", cell.row, cell.column, cell.why) }</li>
                    }) }
                </ul>
            }
        </div>
    }
}

fn preview(pasted: &Pasted, subject: Subject, table: &yew::UseStateHandle<Option<Pasted>>) -> Html {
    let options = goes(subject);
    let columns = pasted.columns.iter().enumerate().map(|(at, column)| {
        let on_change = {
            let (table, pasted) = (table.clone(), pasted.clone());
            Callback::from(move |goes: Goes| {
                let mut changed = pasted.clone();
                // A channel is filled by one column.
                for other in &mut changed.columns {
                    if other.goes == goes {
                        other.goes = Goes::Nowhere;
                    }
                }
                changed.columns[at].goes = goes;
                table.set(Some(changed));
            })
        };
        let head = if column.head.is_empty() {
            format!("Column {}", at + 1)
        } else {
            column.head.clone()
        };
        let unit = column
            .unit
            .map_or_else(String::new, |unit| format!("in {}", unit.symbol()));
        html! {
            <Select<Goes>
                key={at}
                id={format!("bench-goes-{at}")}
                label={head}
                hint={unit}
                options={options.clone()}
                value={Some(column.goes)}
                {on_change}
                testid={format!("bench-goes-{at}")}
            />
        }
    });
    html! { <>
        <h3>{ "Where the columns go" }</h3>
        <div class="bench-fields">{ for columns }</div>
        <div class="bench-scroll" tabindex="0" role="region" aria-label="First rows as they were read">
            <table class="bench-table">
                <thead><tr>{ for pasted.columns.iter().map(|column| html! { <th scope="col">{ &column.head }</th> }) }</tr></thead>
                <tbody>{ for pasted.cells.iter().take(SHOWN).map(|row| html! {
                    <tr>{ for row.iter().map(|cell| html! { <td>{ cell }</td> }) }</tr>
                }) }</tbody>
            </table>
        </div>
    </> }
}
