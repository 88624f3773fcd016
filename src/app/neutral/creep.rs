//! Creep: turns and time, typed or tapped, and which way.

use std::rc::Rc;

use yew::{AttrValue, Callback, Html, Properties, component, html};

use super::edit::Edits;
use super::figures::SheetField;
use crate::app::parts::{Choice, Opt, TapCounter};
use crate::count::Counted;
use crate::quantity::Typed;
use crate::quantity::{Measure, Unit, UnitPrefs, edit_text};
use crate::readings::Direction;
use crate::record::NeutralSheet;
use crate::record::neutral::Field;

/// Time over which creep is counted, s. Common practice.
pub const COUNT_S: f64 = 60.0;

/// Properties of [`Creep`].
#[derive(Clone, PartialEq, Properties)]
pub struct CreepProps {
    /// With the servo ports bridged.
    pub bridged: bool,
    /// Start of DOM ids; unique on the page.
    pub id: AttrValue,
    /// The sheet.
    pub sheet: Rc<NeutralSheet>,
    /// Units.
    pub prefs: UnitPrefs,
    /// Edits.
    pub edits: Edits,
}

/// The ways that a wheel can creep.
pub fn ways() -> Vec<Opt<Direction>> {
    vec![
        Opt::new(Direction::Forward, "Forward", "forward"),
        Opt::new(Direction::Reverse, "Reverse", "reverse"),
    ]
}

/// A count as it is kept: turns, and seconds with a tenth.
pub fn tapped(counted: Counted, prefs: &UnitPrefs) -> (Typed, Typed) {
    let keep = |value: f64, unit: Unit| {
        let value = Measure::new(value, unit).ok();
        let typed = value.map(|v| edit_text(v, unit, prefs.mark()));
        Typed {
            typed: typed.unwrap_or_default(),
            value,
        }
    };
    (
        keep(f64::from(counted.turns), Unit::Turn),
        keep((counted.seconds * 10.0).round() / 10.0, Unit::Second),
    )
}

/// The entry.
#[component]
pub fn Creep(props: &CreepProps) -> Html {
    let (turns, time) = if props.bridged {
        (Field::BridgedTurns, Field::BridgedTime)
    } else {
        (Field::CreepTurns, Field::CreepTime)
    };
    let on_count = {
        let (edits, prefs) = (props.edits.clone(), props.prefs.clone());
        Callback::from(move |counted: Option<Counted>| {
            // A first tap alone is no count; what stood there before stays until there is one.
            let Some(counted) = counted.filter(|c| c.turns > 0 || c.is_over) else {
                return;
            };
            let (kept_turns, kept_time) = tapped(counted, &prefs);
            edits.make(|sheet| {
                sheet.set(turns, kept_turns.clone());
                sheet.set(time, kept_time.clone());
            });
        })
    };
    let way = if props.bridged {
        props.sheet.creeps_bridged
    } else {
        props.sheet.creeps
    };
    let on_way = {
        let (edits, bridged) = (props.edits.clone(), props.bridged);
        Callback::from(move |way: Direction| {
            edits.make(|sheet| {
                if bridged {
                    sheet.creeps_bridged = Some(way);
                } else {
                    sheet.creeps = Some(way);
                }
            });
        })
    };
    let id = &props.id;
    html! {
        <div class="stack is-tight">
            <details class="neutral-count">
                <summary data-testid={format!("{id}-count")}>{ "Count with taps" }</summary>
                <TapCounter
                    id={format!("{id}-taps")}
                    label={if props.bridged { "Wheel, servo bridged" } else { "Wheel" }}
                    limit_s={COUNT_S}
                    {on_count}
                />
                <p class="field-hint">{ "The first tap starts the watch. A wheel that stands: tap once and wait for the signal." }</p>
            </details>
            <div class="neutral-pair">
                <SheetField
                    field={turns}
                    label="Wheel turns"
                    hint="0 where it stands; quarters as decimals"
                    sheet={props.sheet.clone()}
                    prefs={props.prefs.clone()}
                    edits={props.edits.clone()}
                />
                <SheetField
                    field={time}
                    label="Time"
                    hint="60 s is common practice"
                    sheet={props.sheet.clone()}
                    prefs={props.prefs.clone()}
                    edits={props.edits.clone()}
                />
            </div>
            <Choice<Direction>
                name={format!("{id}-way")}
                label="Which way does it creep?"
                options={ways()}
                value={way}
                on_change={on_way}
            />
        </div>
    }
}
