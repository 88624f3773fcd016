//! The readings of a road call, one touch a set.

use super::change::Change;
use super::quick::sets;
use super::side::Sides;
use super::taken::Taken;
use crate::app::parts::{Icon, Shape};
use yew::{Callback, Html, MouseEvent, Properties, component, html};

/// Properties of [`QuickPanel`].
#[derive(Clone, PartialEq, Properties)]
pub struct QuickPanelProps {
    /// Readings there are.
    pub taken: Vec<Taken>,
    /// Ports that are there twice.
    pub sides: Sides,
    /// An edit.
    pub on_change: Callback<Change>,
}

/// The sets, in the order of a road call.
#[component]
pub fn QuickPanel(props: &QuickPanelProps) -> Html {
    html! {
        <section class="panel quick" aria-labelledby="quick-title" id="quick" tabindex="-1">
            <h2 id="quick-title">{ "Usual readings, in order" }</h2>
            <ol class="quick-sets">
                { for sets(props.sides).enumerate().map(|(place, set)| {
                    let missing = set.missing(props.sides, props.taken.iter().map(|taken| (taken.port, taken.path, &taken.condition)));
                    let is_there = missing.is_empty();
                    let on_change = props.on_change.clone();
                    let on_click = Callback::from(move |_: MouseEvent| on_change.emit(Change::Add(missing.clone())));
                    html! {
                        <li key={set.id}>
                            <button
                                type="button"
                                class={if is_there { "quick-set is-there" } else { "quick-set" }}
                                disabled={is_there}
                                data-testid={format!("quick-{}", set.id)}
                                onclick={on_click}
                            >
                                <span class="quick-number" aria-hidden="true">
                                    if is_there { <Icon shape={Shape::Done} /> } else { { place + 1 } }
                                </span>
                                <span class="quick-words">
                                    <span class="quick-name">{ set.words }</span>
                                    <span class="quick-tells">
                                        { if is_there { "added" } else { set.tells } }
                                        if !is_there && !set.two_path && set.has_sides(props.sides) {
                                            { "; left and right" }
                                        }
                                    </span>
                                </span>
                            </button>
                        </li>
                    }
                }) }
            </ol>
        </section>
    }
}
