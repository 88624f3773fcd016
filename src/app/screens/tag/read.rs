//! Reading a tag: what was scanned or pasted, what it would bring, and taking it in. Nothing that is here is written over.

use crate::app::deed::{Deed, Snapshot};
use crate::app::hands::go;
use crate::app::parts::TextField;
use crate::app::persist::book_of;
use crate::app::route::Route;
use crate::app::screens::settings::import::{Picked, Preview};
use crate::record::{Fate, ImportPlan};
use crate::tag;
use crate::unit::{FIGURES, Unit};
use std::rc::Rc;
use yew::{AttrValue, Callback, Html, Properties, component, html, use_memo, use_state};

/// Properties of [`TagReader`].
#[derive(Clone, PartialEq, Properties)]
pub struct TagReaderProps {
    /// What the address brought; empty where nothing was scanned.
    pub scanned: String,
    /// The state.
    pub state: Snapshot,
    /// Wishes.
    pub deed: Callback<Deed>,
}

/// The screen.
#[component]
pub fn TagReader(props: &TagReaderProps) -> Html {
    let pasted = use_state(|| match props.scanned.as_str() {
        "" => String::new(),
        digits => format!("{}{digits}", tag::MARK),
    });
    let read = {
        let state = props.state.clone();
        use_memo((pasted.to_string(), state), |(text, state)| {
            (!text.trim().is_empty()).then(|| {
                tag::read(text).map(|export| {
                    let unit = export.units.first().cloned().unwrap_or_default();
                    (unit, Rc::new(ImportPlan::of(&export, &book_of(state))))
                })
            })
        })
    };
    let on_text = {
        let pasted = pasted.clone();
        Callback::from(move |text: String| pasted.set(text))
    };
    let on_done = {
        let (deed, pasted) = (props.deed.clone(), pasted.clone());
        Callback::from(move |taken: Option<(Rc<ImportPlan>, bool)>| {
            let Some((plan, _)) = taken else {
                pasted.set(String::new());
                go(&Route::Units);
                return;
            };
            let unit = plan.units.first().map(|planned| planned.item.id.clone());
            deed.emit(Deed::Import(plan, false));
            go(&unit.map_or(Route::Units, Route::Unit));
        })
    };
    let is_scanned = !props.scanned.is_empty();
    html! {
        <main class="page" id="main" data-testid="read-tag-screen">
            <h1 id="title" tabindex="-1">{ "Read a tag" }</h1>
            if !is_scanned {
                <p>
                    { "Scan the code on the machine with the phone's own camera: the link opens here. Or paste the text of a tag." }
                </p>
            }
            { match &*read {
                Some(Ok((unit, plan))) => html! { <>
                    { what(unit) }
                    if let Some(here) = already(plan) {
                        <p data-testid="tag-here">
                            { "This very profile is here already: " }
                            <a href={Route::Unit(here.clone()).href()}>{ &unit.name }</a>
                        </p>
                    }
                    <Preview
                        picked={Picked { name: "the tag".to_owned(), plan: Ok(plan.clone()) }}
                        on_done={on_done.clone()}
                    />
                </> },
                _ => Html::default(),
            } }
            <TextField
                id="tag-paste"
                label="Link or text of a tag"
                lines={true}
                value={AttrValue::from((*pasted).clone())}
                on_input={on_text}
                maxlength=60000
                error={match &*read {
                    Some(Err(why)) => AttrValue::from(format!("{why}.")),
                    _ => AttrValue::from(""),
                }}
                testid="tag-paste"
            />
        </main>
    }
}

/// The unit that is here and says the very same.
fn already(plan: &ImportPlan) -> Option<String> {
    let planned = plan.units.first()?;
    (planned.fate == Fate::Same).then(|| planned.item.id.clone())
}

/// What the profile is, before it is taken in.
fn what(unit: &Unit) -> Html {
    let count = |number: usize, one: &str, many: &str| match number {
        1 => format!("1 {one}"),
        number => format!("{number} {many}"),
    };
    let known = FIGURES
        .iter()
        .filter(|ask| unit.known(ask.id).is_some())
        .count();
    html! {
        <section class="panel stack is-tight" data-testid="tag-preview">
            <h2>{ &unit.name }</h2>
            <p>{ unit.class.words() }</p>
            <p class="small">
                { [
                    count(known, "figure", "figures"),
                    count(unit.ports.len(), "port with its place", "ports with their places"),
                    count(unit.manual.len(), "window from its manual", "windows from its manual"),
                ].join(", ") }
            </p>
            if !unit.note.trim().is_empty() { <p class="small">{ &unit.note }</p> }
        </section>
    }
}
