//! The calls made to a unit, latest first.

use yew::{Callback, Html, MouseEvent, component, html};

use super::ProfileProps;
use crate::app::deed::Deed;
use crate::app::parts::{Confirm, Section};
use crate::app::platform::clock;
use crate::app::route::Route;
use crate::app::screens::units::{closing_words, standing_words, yard_words};

/// The list.
#[component]
pub fn Calls(props: &ProfileProps) -> Html {
    let visits = props.state.visits_of(&props.unit.id);
    if visits.is_empty() {
        return Html::default();
    }
    let on_new = {
        let (deed, id) = (props.deed.clone(), props.unit.id.clone());
        Callback::from(move |_: MouseEvent| deed.emit(Deed::StartCall(id.clone())))
    };
    html! {
        <Section id="calls" title="Calls" state={visits.len().to_string()} is_open={true}>
            <div class="actions">
                <button type="button" class="button" onclick={on_new} data-testid="new-call">{ "New call" }</button>
            </div>
            <ul class="rows">
                { for visits.iter().map(|visit| {
                    let words = match &visit.closed {
                        _ if visit.is_yard_check() => yard_words(visit, &props.unit, &props.state),
                        Some(closing) => closing_words(closing),
                        None => {
                            let (assessment, _) = props.state.answer(&visit.id);
                            standing_words(visit, assessment.as_deref())
                        }
                    };
                    let when = clock::tell(&visit.opened);
                    let what = if visit.closed.is_some() { "closed" } else { "open" };
                    let on_remove = {
                        let (deed, id) = (props.deed.clone(), visit.id.clone());
                        Callback::from(move |()| deed.emit(Deed::RemoveVisit(id.clone())))
                    };
                    html! {
                        <li key={visit.id.clone()} class="line-item">
                            <a class="call-link" href={Route::Call(visit.id.clone()).href()}>
                                <span class="call-when">{ format!("{when}, {what}") }</span>
                                <span>{ words }</span>
                            </a>
                            <Confirm
                                words="Remove"
                                question={format!("Remove the call of {when}?")}
                                yes="Remove"
                                on_yes={on_remove}
                                testid={format!("remove-call-{}", visit.id)}
                            />
                        </li>
                    }
                }) }
            </ul>
        </Section>
    }
}
