//! The way into yard checks from a unit: out, in, wear.

use yew::{Callback, Html, MouseEvent, component, html};

use crate::app::deed::Deed;
use crate::app::parts::{Icon, Section, Shape};
use crate::app::route::Route;
use crate::app::screens::unit::ProfileProps;
use crate::record::Visit;
use crate::yard::{Field, Leg, YardSheet, calendar, outlook};

/// The section on the unit's screen.
#[component]
pub fn YardEntry(props: &ProfileProps) -> Html {
    let visits = props.state.visits_of(&props.unit.id);
    let checks = visits.iter().filter(|visit| visit.is_yard_check()).count();
    let refs: Vec<&Visit> = visits.iter().map(|visit| &**visit).collect();
    let open = visits
        .iter()
        .find(|v| v.is_yard_check() && v.closed.is_none());
    let next = (checks > 0).then(|| outlook(&props.unit, &refs, &props.state.instruments).next);
    let begin = |leg: Leg| {
        let (deed, id) = (props.deed.clone(), props.unit.id.clone());
        Callback::from(move |_: MouseEvent| deed.emit(Deed::StartYardCheck(id.clone(), leg)))
    };
    let state = match checks {
        0 => "none yet".to_owned(),
        1 => "1 check".to_owned(),
        n => format!("{n} checks"),
    };
    html! {
        <Section id="yard-entry" title="Yard checks" {state} is_open={true}>
            if let Some(next) = next {
                <p data-testid="next-check">{ next_words(next.hours, next.day, next.why) }</p>
            }
            <div class="actions">
                if let Some(visit) = open {
                    <a class="button is-main" href={Route::Yard(visit.id.clone()).href()} data-testid="continue-yard">
                        { "Continue the yard check" }
                        <Icon shape={Shape::Forward} />
                    </a>
                } else {
                    <button type="button" class="button" onclick={begin(Leg::Out)} data-testid="yard-out">{ "Check it out" }</button>
                    <button type="button" class="button" onclick={begin(Leg::In)} data-testid="yard-in">{ "Check it in" }</button>
                }
                <a class="button is-quiet" href={Route::Wear(props.unit.id.clone()).href()} data-testid="open-wear">{ "Wear over the hours" }</a>
            </div>
        </Section>
    }
}

/// When to check next, in words. No promise of how long it stays fit.
pub fn next_words(hours: Option<f64>, day: Option<i64>, why: &str) -> String {
    let when = match (hours, day) {
        (Some(hours), Some(day)) => {
            format!(
                "at {hours:.0} h or on {}, whichever comes first",
                calendar::words(day)
            )
        }
        (Some(hours), None) => format!("at {hours:.0} h"),
        (None, Some(day)) => format!("on {}", calendar::words(day)),
        (None, None) => return "Next check: no day and no hours to count from.".to_owned(),
    };
    format!("Next check {when} ({why}).")
}

/// A new check. What the unit keeps from one check to the next is there already: instruments, places, the ramp, the marked run.
pub fn start(id: String, unit: String, opened: String, leg: Leg, last: Option<&Visit>) -> Visit {
    let mut sheet = YardSheet {
        leg,
        ..YardSheet::default()
    };
    if let Some(before) = last.and_then(|visit| visit.yard.as_ref()) {
        sheet.place = before.place;
        sheet.gauge.clone_from(&before.gauge);
        sheet.tachometer.clone_from(&before.tachometer);
        sheet.meter.clone_from(&before.meter);
        sheet.course.clone_from(&before.course);
        for field in [Field::Distance, Field::Lane, Field::Track] {
            if let Some(typed) = before.fields.get(&field) {
                sheet.fields.insert(field, typed.clone());
            }
        }
    }
    Visit {
        id,
        unit,
        opened,
        yard: Some(sheet),
        ..Visit::default()
    }
}
