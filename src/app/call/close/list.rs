//! The put-back list: each line is ticked as it is seen to be so, or struck out with a reason.

use crate::app::call::change::Change;
use crate::app::call::put_back;
use crate::app::call::side::Sides;
use crate::app::parts::TextField;
use crate::checks::Check;
use crate::record::{PutBack, Visit};
use yew::{Callback, Event, Html, MouseEvent, TargetCast, html};

/// The list; says so where nothing was opened.
pub fn shown(visit: &Visit, sides: Sides, on_change: &Callback<Change>) -> Html {
    let lines = put_back::lines(visit);
    if lines.is_empty() {
        return html! { <p class="soft">{ "Nothing to put back: nothing was opened on this call." }</p> };
    }
    let open = put_back::open(visit);
    html! {
        <div class="close-part">
            <h3>
                { "Put back" }
                <span class="count">
                    { if open == 0 { String::from("all answered for") } else { format!("{open} of {} open", lines.len()) } }
                </span>
            </h3>
            <ul class="put-back" data-testid="put-back">
                { for lines.into_iter().enumerate().map(|(place, (line, of))| html! {
                    <li key={line}>{ one(place, line, &told(&of, visit, sides), visit.put_back.get(line), on_change) }</li>
                }) }
            </ul>
        </div>
    }
}

/// The checks that ask for a line.
fn told(of: &[&Check], visit: &Visit, sides: Sides) -> String {
    let told = of
        .iter()
        .map(|check| put_back::with_sides(check, visit, sides));
    told.collect::<Vec<_>>()
        .join(if sides.any() { "; " } else { ", " })
}

fn one(
    place: usize,
    line: &'static str,
    of: &str,
    answer: Option<&PutBack>,
    on_change: &Callback<Change>,
) -> Html {
    let on_tick = on_change.reform(move |event: Event| {
        let is_set = event
            .target_unchecked_into::<web_sys::HtmlInputElement>()
            .checked();
        Change::PutBack(line.to_owned(), is_set.then_some(PutBack::Done))
    });
    let struck = match answer {
        Some(PutBack::Struck(why)) => Some(why.clone()),
        _ => None,
    };
    let is_struck = struck.is_some();
    let on_strike = on_change.reform(move |_: MouseEvent| {
        let next = (!is_struck).then(|| PutBack::Struck(String::new()));
        Change::PutBack(line.to_owned(), next)
    });
    let on_why = on_change
        .reform(move |why: String| Change::PutBack(line.to_owned(), Some(PutBack::Struck(why))));
    html! { <>
        <div class="put-back-line">
            <label class={if is_struck { "tick is-struck" } else { "tick" }}>
                <input
                    type="checkbox"
                    checked={answer == Some(&PutBack::Done)}
                    disabled={is_struck}
                    onchange={on_tick}
                    data-testid={format!("put-back-{place}")}
                />
                <span>{ line }<span class="put-back-of">{ of.to_owned() }</span></span>
            </label>
            <button
                type="button"
                class="reading-more"
                aria-pressed={if is_struck { "true" } else { "false" }}
                aria-label={format!("{line}: strike out")}
                data-testid={format!("strike-{place}")}
                onclick={on_strike}
            >
                { if is_struck { "Undo" } else { "Strike out" } }
            </button>
        </div>
        if let Some(why) = struck {
            <TextField
                id={format!("strike-why-{place}")}
                label="Why it does not apply"
                error={if why.trim().is_empty() { "A word on why is needed." } else { "" }}
                value={why}
                on_input={on_why}
                maxlength={400}
                testid={format!("strike-why-{place}")}
            />
        }
    </> }
}
