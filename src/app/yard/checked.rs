//! What a step came to, line by line.

use yew::{Html, Properties, component, html};

use super::verdict::{class, shape};
use crate::app::parts::{Icon, Shape};
use crate::yard::Judged;

/// Properties of [`Checked`].
#[derive(Clone, PartialEq, Properties)]
pub struct CheckedProps {
    /// Lines of the step that have a figure.
    pub lines: Vec<Judged>,
}

/// The lines.
#[component]
pub fn Checked(props: &CheckedProps) -> Html {
    if props.lines.is_empty() {
        return Html::default();
    }
    html! {
        <ul class="yard-lines" aria-live="polite">
            { for props.lines.iter().map(|line| {
                let (class, shape, words) = match line.grade {
                    Some(grade) => (class(grade), shape(grade), grade.words()),
                    None => ("is-open", Shape::Note, "not judged"),
                };
                html! {
                    <li class={yew::classes!("yard-line", class)}>
                        <Icon {shape} />
                        <span class="yard-line-what">{ &line.what }</span>
                        <span class="yard-line-found">{ &line.found }</span>
                        <span class="yard-line-grade">{ words }</span>
                        if !line.why.is_empty() {
                            <span class="yard-line-why">{ &line.why }</span>
                        }
                    </li>
                }
            }) }
        </ul>
    }
}
