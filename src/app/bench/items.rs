//! Items of the sheet beside the efficiency run.

use super::codes;
use super::screen::{Edit, Told};
use crate::app::parts::{Caution, Choice, Entry, Grade, MeasureField, Opt, Section, TextField};
use crate::bench::stand::BenchSheet;
use crate::bench::stand::items::{Entry as Asked, Item, ItemId, of};
use crate::bench::stand::sheet::ItemEntry;
use crate::quantity::Typed;
use crate::quantity::{Measure, Unit, UnitPrefs};
use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html};

/// Id of the section.
pub const SECTION: &str = "bench-items";

/// Properties of [`ItemsForm`].
#[derive(Clone, PartialEq, Properties)]
pub struct ItemsFormProps {
    /// The sheet.
    pub sheet: Rc<BenchSheet>,
    /// What it comes to.
    pub told: Told,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

/// How an item stands on the screen.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Came {
    Good,
    Bad,
    Skipped,
}

fn change(props: &ItemsFormProps, id: ItemId, change: impl FnOnce(&mut ItemEntry) + 'static) {
    props.on_edit.emit(Box::new(move |sheet| {
        let entry = sheet.items.entry(id).or_default();
        change(entry);
        if *entry == ItemEntry::default() {
            sheet.items.remove(&id);
        }
    }));
}

fn measure(
    props: &ItemsFormProps,
    item: &'static Item,
    unit: Unit,
    code: &'static str,
    label: &'static str,
    typed: &Typed,
    of: fn(&mut ItemEntry) -> &mut Typed,
) -> Html {
    let (low, high) = (
        Measure::literal(0.0, unit),
        Measure::literal(100_000.0, unit),
    );
    let on_entry = {
        let props = props.clone();
        Callback::from(move |entry: Entry| {
            change(&props, item.id, move |item| {
                *of(item) = entry;
            });
        })
    };
    let id = format!("bench-item-{:?}-{code}", item.id).to_lowercase();
    html! {
        <MeasureField
            key={code}
            id={id.clone()}
            {label}
            unit={codes::shown(&props.prefs, unit)}
            typed={typed.typed.clone()}
            value={typed.value}
            range={Some((low, high))}
            mark={props.prefs.mark()}
            {on_entry}
            testid={id}
        />
    }
}

fn item_row(props: &ItemsFormProps, item: &'static Item) -> Html {
    let entry = props.sheet.items.get(&item.id).cloned().unwrap_or_default();
    let name = format!("bench-item-{:?}", item.id).to_lowercase();
    let came = match (entry.is_good, &entry.skipped) {
        (_, Some(_)) => Some(Came::Skipped),
        (Some(true), _) => Some(Came::Good),
        (Some(false), _) => Some(Came::Bad),
        _ => None,
    };
    let ticks = vec![
        Opt::new(Came::Good, "Good", "good"),
        Opt::new(Came::Bad, "Not good", "bad"),
        Opt::new(Came::Skipped, "Not tested", "skipped"),
    ];
    let on_came = {
        let props = props.clone();
        Callback::from(move |came: Came| {
            change(&props, item.id, move |entry| {
                entry.is_good = match came {
                    Came::Good => Some(true),
                    Came::Bad => Some(false),
                    Came::Skipped => None,
                };
                entry.skipped = (came == Came::Skipped).then(String::new);
            });
        })
    };
    let on_why = {
        let props = props.clone();
        Callback::from(move |why: String| {
            change(&props, item.id, move |entry| entry.skipped = Some(why));
        })
    };
    let judged = props
        .told
        .0
        .judged
        .iter()
        .find(|judged| judged.words == item.words);
    let verdict = judged.map(|judged| judged.decision.words());
    let from = judged
        .and_then(|judged| judged.limits.as_ref())
        .map(|limits| limits.from.clone());
    html! {
        <li key={name.clone()} class="bench-item" data-testid={name.clone()}>
            <h3>{ item.words }</h3>
            <p class="soft">{ item.how }</p>
            if !item.caution.is_empty() {
                <Caution grade={Grade::Caution}><p>{ item.caution }</p></Caution>
            }
            if let Asked::Figure(unit) = item.entry {
                <div class="bench-fields">
                    { measure(props, item, unit, "found", "Found", &entry.found, |e| &mut e.found) }
                    { measure(props, item, unit, "low", "Lowest allowed", &entry.low, |e| &mut e.low) }
                    { measure(props, item, unit, "high", "Highest allowed", &entry.high, |e| &mut e.high) }
                </div>
            } else {
                <Choice<Came> name={format!("{name}-came")} label="Came out" options={ticks} value={came} on_change={on_came} />
                if entry.skipped.is_some() {
                    <TextField id={format!("{name}-why")} label="Why not" value={entry.skipped.clone().unwrap_or_default()} on_input={on_why} />
                }
            }
            <p role="status" class="bench-verdict">
                if let Some(verdict) = verdict {
                    <strong>{ verdict }</strong>
                    if let Some(from) = from { <span class="soft">{ format!(", limits: {from}") }</span> }
                }
            </p>
        </li>
    }
}

/// The list.
#[component]
pub fn ItemsForm(props: &ItemsFormProps) -> Html {
    let items: Vec<&'static Item> = of(props.sheet.subject).collect();
    let done = items
        .iter()
        .filter(|item| {
            props.sheet.items.get(&item.id).is_some_and(|entry| {
                entry.is_good.is_some() || entry.found.value.is_some() || entry.skipped.is_some()
            })
        })
        .count();
    html! {
        <Section id={SECTION} title="The rest of the sheet" state={format!("{done} of {} answered", items.len())}>
            <ul class="bench-items">{ for items.into_iter().map(|item| item_row(props, item)) }</ul>
        </Section>
    }
}
