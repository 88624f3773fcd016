//! One place of the adjuster: turns with big steps, what was seen there, the way it was last turned.

use yew::{AttrValue, Callback, Html, MouseEvent, Properties, component, html};

use super::creep::{COUNT_S, tapped, ways};
use super::edit::Edits;
use super::figures::span;
use crate::app::parts::{Choice, Entry, Lay, MeasureField, Opt, TapCounter};
use crate::count::Counted;
use crate::neutral::adjust::Sense;
use crate::quantity::Typed;
use crate::quantity::{Measure, Unit, UnitPrefs, edit_text};
use crate::readings::Direction;
use crate::record::neutral::{ADJUSTER_TURNS, AdjusterRow, SeriesBy};

/// Steps of an adjuster, turns: lettering on the keys, size.
const STEPS: [(&str, f64); 4] = [
    ("½ out", -0.5),
    ("⅛ out", -0.125),
    ("⅛ in", 0.125),
    ("½ in", 0.5),
];

/// Properties of [`Adjuster`].
#[derive(Clone, PartialEq, Properties)]
pub struct AdjusterProps {
    /// The place.
    pub row: AdjusterRow,
    /// Its number, from 1.
    pub number: usize,
    /// What the series is read by.
    pub by: SeriesBy,
    /// Units.
    pub prefs: UnitPrefs,
    /// Edits.
    pub edits: Edits,
}

impl AdjusterProps {
    /// An edit of this place.
    fn edit(&self, change: impl Fn(&mut AdjusterRow)) {
        let id = self.row.id.clone();
        self.edits.make(|sheet| {
            if let Some(row) = sheet.series.iter_mut().find(|row| row.id == id) {
                change(row);
            }
        });
    }
}

/// The place.
#[component]
pub fn Adjuster(props: &AdjusterProps) -> Html {
    let row = &props.row;
    let at = format!("place-{}", props.number);
    let mark = props.prefs.mark();
    let text = |kept: &Typed| AttrValue::from(kept.typed.clone());
    let on_turns = {
        let props = props.clone();
        Callback::from(move |entry: Entry| props.edit(|row| row.turns = entry.clone()))
    };
    let on_shown = {
        let props = props.clone();
        Callback::from(move |entry: Entry| props.edit(|row| row.shown = entry.clone()))
    };
    let on_time = {
        let props = props.clone();
        Callback::from(move |entry: Entry| props.edit(|row| row.time = entry.clone()))
    };
    let on_step = |step: f64| {
        let props = props.clone();
        Callback::from(move |_: MouseEvent| {
            let now = props.row.turns.value_in(Unit::Turn).unwrap_or(0.0);
            let value = Measure::new(now + step, Unit::Turn).ok();
            let sense = if step > 0.0 { Sense::In } else { Sense::Out };
            props.edit(|row| {
                row.turns = Typed {
                    typed: value
                        .map(|v| edit_text(v, Unit::Turn, mark))
                        .unwrap_or_default(),
                    value,
                };
                row.from = Some(sense);
            });
        })
    };
    let on_seen = {
        let props = props.clone();
        Callback::from(move |starts: Option<Direction>| props.edit(|row| row.starts = starts))
    };
    let on_way = {
        let props = props.clone();
        Callback::from(move |way: Direction| props.edit(|row| row.going = Some(way)))
    };
    let on_from = {
        let props = props.clone();
        Callback::from(move |sense: Sense| props.edit(|row| row.from = Some(sense)))
    };
    let on_count = {
        let props = props.clone();
        Callback::from(move |counted: Option<Counted>| {
            if let Some(counted) = counted.filter(|c| c.turns > 0 || c.is_over) {
                let (turns, time) = tapped(counted, &props.prefs);
                props.edit(|row| {
                    row.shown = turns.clone();
                    row.time = time.clone();
                });
            }
        })
    };
    let on_remove = {
        let (edits, id) = (props.edits.clone(), row.id.clone());
        Callback::from(move |_: MouseEvent| {
            edits.make(|sheet| sheet.series.retain(|row| row.id != id))
        })
    };
    let read = match props.by {
        SeriesBy::Creep => "Creep, counted",
        SeriesBy::Difference => "Difference, read",
    };
    html! {
        <div class="place" role="group" aria-label={format!("Place {}", props.number)} data-testid={at.clone()}>
            <div class="place-head">
                <h4>{ format!("Place {}", props.number) }</h4>
                <button type="button" class="button is-quiet" data-testid={format!("{at}-remove")} onclick={on_remove}>
                    { "Remove" }
                </button>
            </div>
            <MeasureField
                id={format!("{at}-turns")}
                label="Turns in from where it was found"
                hint="out: minus"
                unit={Unit::Turn}
                range={span((-ADJUSTER_TURNS, ADJUSTER_TURNS), Unit::Turn)}
                {mark}
                typed={text(&row.turns)}
                value={row.turns.value}
                on_entry={on_turns}
                testid={format!("{at}-turns")}
            />
            <div class="place-keys">
                { for STEPS.into_iter().map(|(words, step)| html! {
                    <button type="button" class="button" key={words} data-testid={format!("{at}-step-{}", words.replace(' ', "-"))} onclick={on_step(step)}>
                        { words }
                    </button>
                }) }
            </div>
            <Choice<Option<Direction>>
                name={format!("{at}-seen")}
                label="What happens here?"
                options={vec![
                    Opt::new(None, read, "read"),
                    Opt::new(Some(Direction::Forward), "Just starts forward", "starts-forward"),
                    Opt::new(Some(Direction::Reverse), "Just starts in reverse", "starts-reverse"),
                ]}
                value={Some(row.starts)}
                on_change={on_seen}
            />
            if row.starts.is_none() && props.by == SeriesBy::Creep {
                <details class="neutral-count">
                    <summary>{ "Count with taps" }</summary>
                    <TapCounter id={format!("{at}-taps")} label={format!("Wheel, place {}", props.number)} limit_s={COUNT_S} {on_count} />
                </details>
                <div class="neutral-pair">
                    <MeasureField
                        id={format!("{at}-shown")}
                        label="Wheel turns"
                        hint="0 where it stands"
                        unit={Unit::Turn}
                        range={span((0.0, 2000.0), Unit::Turn)}
                        {mark}
                        typed={text(&row.shown)}
                        value={row.shown.value}
                        on_entry={on_shown.clone()}
                        testid={format!("{at}-shown")}
                    />
                    <MeasureField
                        id={format!("{at}-time")}
                        label="Time"
                        unit={Unit::Second}
                        range={span((1.0, 3600.0), Unit::Second)}
                        {mark}
                        typed={text(&row.time)}
                        value={row.time.value}
                        on_entry={on_time}
                        testid={format!("{at}-time")}
                    />
                </div>
                <Choice<Direction> name={format!("{at}-way")} label="Which way does it creep?" options={ways()} value={row.going} on_change={on_way} />
            }
            if row.starts.is_none() && props.by == SeriesBy::Difference {
                <MeasureField
                    id={format!("{at}-shown")}
                    label="Loop difference A − B"
                    hint="B higher: minus"
                    unit={props.prefs.unit(crate::quantity::Kind::Pressure)}
                    range={span((-700.0, 700.0), Unit::Bar)}
                    {mark}
                    typed={text(&row.shown)}
                    value={row.shown.value}
                    on_entry={on_shown}
                    testid={format!("{at}-shown")}
                />
            }
            <Choice<Sense>
                name={format!("{at}-from")}
                label="Last turned"
                hint="both ways noted: play can be told from offset"
                options={vec![Opt::new(Sense::In, "In", "in"), Opt::new(Sense::Out, "Out", "out")]}
                value={row.from}
                on_change={on_from}
                lay={Lay::Row}
            />
        </div>
    }
}
