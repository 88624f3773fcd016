//! What has to be known of the machine.

use super::screen::Edit;
use super::words;
use crate::app::parts::{Entry, MeasureField, Opt, Section, Select};
use crate::quantity::{Measure, UnitPrefs};
use crate::tracking::{Head, TrackingSheet, Undercarriage};
use yew::{Callback, Html, Properties, component, html};

/// Properties of [`HeadForm`].
#[derive(Clone, PartialEq, Properties)]
pub struct HeadFormProps {
    /// The sheet.
    pub sheet: TrackingSheet,
    /// What usually carries a machine of its class.
    pub usual: Undercarriage,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

fn code(head: Head) -> &'static str {
    match head {
        Head::Track => "track",
        Head::Low => "low",
        Head::Half => "half",
        Head::NullTurn => "null-turn",
        Head::StopTurn => "stop-turn",
    }
}

/// The fields.
#[component]
pub fn HeadForm(props: &HeadFormProps) -> Html {
    let sheet = &props.sheet;
    let carries = vec![
        Opt::new(
            Undercarriage::Swivel,
            "Two driven wheels, the others swivel",
            "swivel",
        ),
        Opt::new(Undercarriage::Tracks, "Tracks", "tracks"),
        Opt::new(
            Undercarriage::SkidWheels,
            "Wheels that skid sideways",
            "skid",
        ),
    ];
    let on_carries = props.on_edit.reform(|chosen: Undercarriage| -> Edit {
        Box::new(move |sheet| sheet.undercarriage = Some(chosen))
    });
    let is_known = sheet
        .head
        .get(&Head::Track)
        .is_some_and(|track| track.value.is_some());
    let state = if is_known {
        "track width known"
    } else {
        "track width needed for path runs"
    };
    html! {
        <Section id="tracking-machine" title="Machine" state={state} is_open=true>
            <Select<Undercarriage>
                id="tracking-undercarriage"
                label="It runs on"
                hint="What skids sideways turns less than its track width says (common practice)"
                options={carries}
                value={Some(sheet.undercarriage.unwrap_or(props.usual))}
                on_change={on_carries}
                testid="tracking-undercarriage"
            />
            <div class="tracking-head">
            { for Head::ALL.into_iter().map(|head| {
                let (base, low, high) = head.asks();
                let unit = if head == Head::Track { words::length(&props.prefs) } else { base };
                let (label, hint) = words::head(head);
                let typed = sheet.head.get(&head).cloned().unwrap_or_default();
                let on_entry = props.on_edit.reform(move |typed: Entry| -> Edit {
                    Box::new(move |sheet| {
                        if typed.is_blank() {
                            sheet.head.remove(&head);
                        } else {
                            sheet.head.insert(head, typed);
                        }
                    })
                });
                html! {
                    <MeasureField
                        key={code(head)}
                        id={format!("tracking-{}", code(head))}
                        {label}
                        {hint}
                        {unit}
                        typed={typed.typed}
                        value={typed.value}
                        range={Some((Measure::literal(low, base), Measure::literal(high, base)))}
                        mark={props.prefs.mark()}
                        {on_entry}
                        testid={format!("tracking-{}", code(head))}
                    />
                }
            }) }
            </div>
        </Section>
    }
}
