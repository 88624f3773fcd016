//! What changed while the machine was out.

use yew::{Html, Properties, component, html};

use super::verdict::{class, shape};
use crate::app::parts::{Icon, Section};
use crate::app::platform::clock;
use crate::app::route::Route;
use crate::yard::{Leg, OutCheck};

/// Properties of [`ChangePanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct ChangeProps {
    /// Leg of this check.
    pub leg: Leg,
    /// The check out that belongs to it; none where none is kept.
    pub change: Option<OutCheck>,
}

/// The panel.
#[component]
pub fn ChangePanel(props: &ChangeProps) -> Html {
    if props.leg != Leg::In {
        return Html::default();
    }
    let Some(out) = &props.change else {
        return html! {
            <Section id="yard-change" title="Since it went out" is_open=true>
                <p>{ "No check going out is kept for this hire, so there is nothing to compare with. Check it out next time." }</p>
            </Section>
        };
    };
    let hours = out
        .hours
        .map_or(String::new(), |h| format!(", {h:.0} h on the meter since"));
    html! {
        <Section id="yard-change" title="Since it went out" state={format!("{} compared", out.changes.len())} is_open=true>
            <p>
                { "Paired with the check going out of " }
                <a href={Route::Yard(out.visit.clone()).href()}>{ clock::tell(&out.opened) }</a>
                { hours }{ "." }
            </p>
            <ul class="yard-reasons" data-testid="changes">
                { for out.changes.iter().map(|change| html! {
                    <li key={change.of.code()} class={yew::classes!("yard-reason", class(change.grade))}>
                        <Icon shape={shape(change.grade)} />
                        <span>{ &change.words }</span>
                    </li>
                }) }
            </ul>
            if !out.not_compared.is_empty() {
                <p class="soft small">{ format!("Not compared: {}.", out.not_compared.join("; ")) }</p>
            }
        </Section>
    }
}
