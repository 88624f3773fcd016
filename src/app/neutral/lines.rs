//! Sentences of the report, each with its shape and word: colour alone says nothing.

use yew::{Html, Properties, component, html};

use crate::app::parts::{Icon, Shape};
use crate::neutral::words::{Line, Tone};

/// Properties of [`Lines`].
#[derive(Clone, PartialEq, Properties)]
pub struct LinesProps {
    /// The sentences.
    pub lines: Vec<Line>,
    /// For the end-to-end tests.
    pub testid: &'static str,
}

/// The sentences.
#[component]
pub fn Lines(props: &LinesProps) -> Html {
    if props.lines.is_empty() {
        return Html::default();
    }
    html! {
        // The list keeps its own role; what is told of it is told by its frame.
        <div role="status">
        <ul class="told-lines" data-testid={props.testid}>
            { for props.lines.iter().map(|line| {
                let (class, shape, word) = look(line.tone);
                html! {
                    <li class={class}>
                        <Icon {shape} />
                        <span><strong>{ word }</strong>{ line.text.clone() }</span>
                    </li>
                }
            }) }
        </ul>
        </div>
    }
}

fn look(tone: Tone) -> (&'static str, Shape, &'static str) {
    match tone {
        Tone::Good => ("told-line is-good", Shape::Done, "Good. "),
        Tone::Look => ("told-line is-look", Shape::Note, "Note. "),
        Tone::Bad => ("told-line is-bad", Shape::Warning, "Off. "),
        Tone::Open => ("told-line is-open", Shape::RadioOff, "Cannot tell. "),
        Tone::Stop => ("told-line is-stop", Shape::Danger, "Stop. "),
    }
}
