//! The four answers to an observation, one touch each; a second touch takes the answer back.

use super::change::Change;
use crate::observations::{Group, Observation};
use crate::record::Answer;
use yew::{Callback, Html, MouseEvent, html};

/// The four answers and their words for a group.
fn answers(group: Group) -> [(Answer, &'static str, &'static str); 4] {
    let (yes, no) = match group {
        Group::Complaint | Group::WhenItFails => ("I saw it", "Not so"),
        Group::Look => ("Seen", "Not there"),
        Group::Listen => ("Heard", "Not heard"),
        _ => ("Is so", "Not so"),
    };
    [
        (Answer::Seen, "seen", yes),
        (Answer::NotSeen, "not-seen", no),
        (Answer::OperatorSays, "says", "Says so"),
        (Answer::OperatorSaysNot, "says-not", "Says not"),
    ]
}

/// Words, how to look, and the keys. `place` begins the ids, so that one observation can be asked in two places.
pub fn ask(
    observation: &'static Observation,
    given: Option<Answer>,
    place: &str,
    on_change: &Callback<Change>,
) -> Html {
    let label = format!("{place}-{}", observation.id);
    html! { <>
        <span class="seen-words" id={label.clone()}>{ observation.words }</span>
        if !observation.how.is_empty() {
            <span class="seen-how">{ observation.how }</span>
        }
        <div class="keys" role="group" aria-labelledby={label}>
            { for answers(observation.group).into_iter().map(|(answer, code, words)| {
                let is_on = given == Some(answer);
                let on_change = on_change.clone();
                let on_click = Callback::from(move |_: MouseEvent| {
                    // Not looked is no answer.
                    let next = (!is_on).then_some(answer);
                    on_change.emit(Change::Observe(observation.id.to_owned(), next));
                });
                html! {
                    <button
                        key={code}
                        type="button"
                        class={if is_on { "key is-on" } else { "key" }}
                        aria-pressed={if is_on { "true" } else { "false" }}
                        data-testid={format!("{place}-{}-{code}", observation.id)}
                        onclick={on_click}
                    >
                        { words }
                    </button>
                }
            }) }
        </div>
    </> }
}
