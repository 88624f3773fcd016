//! Closing the call: what has to be put back first, then what was found, what proved it, what was done, and the parts.

mod found;
mod list;

use super::change::Change;
use super::put_back;
use super::side::Sides;
use super::steady::Answer;
use crate::app::parts::{Caution, Grade, TextField};
use crate::app::platform::clock;
use crate::faults::FaultId;
use crate::record::limits::TEXT_CHARACTERS;
use crate::record::{Closing, PutBack, Visit};
use std::rc::Rc;
use yew::{Callback, Html, MouseEvent, Properties, component, html};

/// DOM id of the panel.
pub const ID: &str = "close";

/// Properties of [`ClosePanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct ClosePanelProps {
    /// The visit.
    pub visit: Rc<Visit>,
    /// Ports that are there twice.
    pub sides: Sides,
    /// Last answer of the engine: its leading causes stand first in the list.
    pub assessment: Option<Answer>,
    /// An edit.
    pub on_change: Callback<Change>,
}

/// The panel.
#[component]
pub fn ClosePanel(props: &ClosePanelProps) -> Html {
    let visit = &props.visit;
    let open = put_back::open(visit);
    html! {
        <section class="panel close-call" aria-labelledby="close-title" id={ID} tabindex="-1" data-testid="close">
            <h2 id="close-title">
                { if visit.closed.is_some() { "This call is closed" } else { "Close the call" } }
            </h2>
            { match &visit.closed {
                Some(closing) => closed(closing, open, props),
                None => html! { <>
                    { list::shown(visit, props.sides, &props.on_change) }
                    <Entry
                        {open}
                        closing={visit.closing.clone().unwrap_or_default()}
                        leading={found::leading(props.assessment.as_deref())}
                        on_change={props.on_change.clone()}
                    />
                </> },
            } }
        </section>
    }
}

/// Properties of [`Entry`].
#[derive(Clone, PartialEq, Properties)]
struct EntryProps {
    /// Lines that are not answered for.
    open: usize,
    /// What is entered so far.
    closing: Closing,
    /// The causes that lead now.
    leading: Vec<FaultId>,
    /// An edit.
    on_change: Callback<Change>,
}

/// What is entered, and the button.
#[component]
fn Entry(props: &EntryProps) -> Html {
    let (open, closing) = (props.open, &props.closing);
    let text = |set: fn(&mut Closing, String)| {
        let closing = closing.clone();
        props.on_change.reform(move |text: String| {
            let mut next = closing.clone();
            set(&mut next, text);
            Change::Closing(next)
        })
    };
    let on_close = props
        .on_change
        .reform(|_: MouseEvent| Change::Close(clock::now()));
    let maxlength = u32::try_from(TEXT_CHARACTERS).unwrap_or(2000);
    html! {
        <div class="close-part stack">
            <h3>{ "What it was" }</h3>
            { found::asked(closing, props) }
            <TextField
                id="close-done"
                label="What was done"
                value={closing.done.clone()}
                on_input={text(|closing, text| closing.done = text)}
                lines={true}
                {maxlength}
                testid="close-done"
            />
            <TextField
                id="close-parts"
                label="Parts"
                value={closing.parts.clone()}
                on_input={text(|closing, text| closing.parts = text)}
                {maxlength}
                testid="close-parts"
            />
            if open > 0 {
                <p class="close-waits" id="close-waits" data-testid="close-waits">
                    { match open {
                        1 => String::from("Not yet: 1 line above is not put back."),
                        open => format!("Not yet: {open} lines above are not put back."),
                    } }
                </p>
            }
            <button
                type="button"
                class="button is-main is-wide"
                disabled={open > 0}
                aria-describedby={(open > 0).then_some("close-waits")}
                data-testid="close-call"
                onclick={on_close}
            >
                { "Close the call" }
            </button>
        </div>
    }
}

/// How it ended, and the way back.
fn closed(closing: &Closing, open: usize, props: &ClosePanelProps) -> Html {
    let on_reopen = props.on_change.reform(|_: MouseEvent| Change::Reopen);
    let fact = |name: &'static str, text: &str| {
        if text.trim().is_empty() {
            return Html::default();
        }
        html! { <div><dt>{ name }</dt><dd class="close-text">{ text.to_owned() }</dd></div> }
    };
    html! { <>
        if open > 0 {
            <Caution grade={Grade::Caution} title="not all is put back" class="small-caution" testid="close-open-lines">
                <p>{ "Something was opened after the call was closed. Open the call again and answer for it." }</p>
            </Caution>
        }
        <dl class="next-facts" data-testid="closed">
            <div>
                <dt>{ "Found" }</dt>
                <dd>{ found::words(closing) }</dd>
            </div>
            { fact("Proved by", &closing.proof) }
            { fact("Done", &closing.done) }
            if !closing.afterwards.is_not_said() {
                { fact("The trouble afterwards", closing.afterwards.words()) }
            }
            { fact("Parts", &closing.parts) }
            { fact("Closed", &clock::tell(&closing.when)) }
        </dl>
        if !props.visit.put_back.is_empty() {
            <details class="advice">
                <summary>{ format!("Put back: {} lines", props.visit.put_back.len()) }</summary>
                <ul>
                    { for props.visit.put_back.iter().map(|(line, answer)| html! {
                        <li key={line.clone()}>
                            { line.clone() }
                            { match answer {
                                PutBack::Done => String::from(": seen to be so"),
                                PutBack::Struck(why) => format!(": struck out, {why}"),
                            } }
                        </li>
                    }) }
                </ul>
            </details>
        }
        <button type="button" class="button is-wide" data-testid="reopen-call" onclick={on_reopen}>
            { "Open it again" }
        </button>
    </> }
}
