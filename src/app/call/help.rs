//! How a reading is taken, one touch away at the reading itself: where the port is, how, what to watch for.

use super::steady::Fold;
use crate::app::parts::Retold;
use crate::checks::{self, Check};
use crate::readings::{Condition, Port};
use crate::unit::PortNote;
use yew::{Callback, Html, html};

/// The fold. What the profile says of this machine comes before common practice.
pub fn fold(condition: &Condition, port: Port, note: Option<&PortNote>, number: usize) -> Html {
    let place = note
        .map(|note| note.place.trim().to_owned())
        .filter(|place| !place.is_empty());
    let check = checks::for_reading(condition, port);
    let body = Callback::from(move |()| inside(port, check, place.as_deref()));
    html! {
        <Fold
            head={html! { "How to read it" }}
            {body}
            class="advice reading-help"
            testid={format!("help-{number}")}
        />
    }
}

fn inside(port: Port, check: Option<&'static Check>, place: Option<&str>) -> Html {
    let help = port.help();
    let around = check.and_then(|check| checks::help(check.id));
    html! {
        <div class="stack is-tight">
            <dl class="help">
                if let Some(place) = place {
                    <dt>{ "On this machine" }</dt>
                    <dd>{ place.to_owned() }</dd>
                }
                <dt>{ "Usually" }</dt>
                <dd><Retold text={help.place} /></dd>
                <dt>{ "How" }</dt>
                <dd><Retold text={help.how} /></dd>
                <dt>{ "Watch for" }</dt>
                <dd><Retold text={help.watch} /></dd>
                if let (Some(check), Some(around)) = (check, around) {
                    <dt>{ check.title }</dt>
                    <dd><Retold text={around.place} />{ " " }<Retold text={around.watch} /></dd>
                }
            </dl>
            <p class="soft small">{ "Common practice; the unit’s manual comes first." }</p>
        </div>
    }
}

/// Where a check is made and what to watch for, for a check that is offered.
pub fn of_check(id: &str) -> Html {
    match checks::help(id) {
        Some(help) => html! {
            <dl class="help">
                <dt>{ "Usually" }</dt>
                <dd><Retold text={help.place} /></dd>
                <dt>{ "Watch for" }</dt>
                <dd><Retold text={help.watch} /></dd>
            </dl>
        },
        None => Html::default(),
    }
}
