//! The keys.

use super::around;
use crate::app::parts::{Icon, Shape};
use crate::app::platform::listen::Listener;
use crate::app::platform::timer::Timer;
use crate::quantity::DecimalMark;
use crate::quantity::strokes::Stroke;
use wasm_bindgen::JsCast;
use web_sys::{Element, HtmlInputElement};
use yew::{
    Callback, Html, MouseEvent, Properties, component, html, use_effect_with, use_mut_ref,
    use_node_ref, use_state,
};

/// Height that is counted on for the keys where it is not known yet, px.
const HEIGHT: f64 = 340.0;

/// Properties of [`Keypad`].
#[derive(Clone, PartialEq, Properties)]
pub struct KeypadProps {
    /// The person wants these keys.
    pub on: bool,
    /// Decimal mark of the settings.
    pub mark: DecimalMark,
}

/// What the keys work on; a touch of the page can change it between two drawings.
#[derive(Clone, PartialEq)]
struct Target {
    field: HtmlInputElement,
    /// Counts the strokes, so that what stands round the field is looked at anew.
    strokes: u32,
}

/// The keypad. Nothing is drawn while no figure is being entered.
#[component]
pub fn Keypad(props: &KeypadProps) -> Html {
    let target = use_state(|| None::<Target>);
    let picks_unit = use_state(|| false);
    let pad = use_node_ref();
    let later = use_mut_ref(|| None::<Timer>);
    {
        let (target, picks_unit, pad) = (target.clone(), picks_unit.clone(), pad.clone());
        use_effect_with(props.on, move |on| {
            // Switched on from beside a field, they work on that field at once.
            let at = around::focused().filter(|_| *on);
            target.set(at.map(|field| Target { field, strokes: 0 }));
            let listener = on.then(|| {
                Listener::at_document("focusin", move |event| {
                    let Some(at) = event.target().and_then(|at| at.dyn_into::<Element>().ok())
                    else {
                        return;
                    };
                    let is_own = pad
                        .cast::<Element>()
                        .is_some_and(|pad| pad.contains(Some(&at)));
                    if !is_own {
                        picks_unit.set(false);
                        target.set(around::figure(&at).map(|field| Target { field, strokes: 0 }));
                    }
                })
            });
            move || drop(listener)
        });
    }
    let is_shown = props.on && target.is_some();
    {
        let (pad, field) = (
            pad.clone(),
            target.as_ref().map(|target| target.field.clone()),
        );
        use_effect_with((is_shown, field), move |(is_shown, field)| {
            let root = web_sys::window()
                .and_then(|window| window.document())
                .and_then(|document| document.document_element());
            if let Some(root) = root {
                // The page gets room under its end; a class that cannot be set leaves the last field behind the keys.
                let _ = root.class_list().toggle_with_force("has-keys", *is_shown);
            }
            if let Some(field) = field.as_ref().filter(|_| *is_shown) {
                let height = pad
                    .cast::<Element>()
                    .map(|pad| pad.get_bounding_client_rect().height());
                around::bring_up(field, height.unwrap_or(HEIGHT));
            }
            || ()
        });
    }
    let Some(now) = target.as_ref().filter(|_| props.on) else {
        return Html::default();
    };
    let field = now.field.clone();
    let strike = |stroke: Stroke| {
        let (target, field, strokes) = (target.clone(), field.clone(), now.strokes);
        Callback::from(move |_: MouseEvent| {
            around::strike(&field, stroke);
            target.set(Some(Target {
                field: field.clone(),
                strokes: strokes.wrapping_add(1),
            }));
        })
    };
    let go_next = {
        let (target, field) = (target.clone(), field.clone());
        move || match around::next(&field) {
            // The page tells of the new focus by itself.
            Some(next) => drop(next.focus()),
            None => {
                drop(field.blur());
                target.set(None);
            }
        }
    };
    let on_next = {
        let go_next = go_next.clone();
        Callback::from(move |_: MouseEvent| go_next())
    };
    let on_done = {
        let (target, field) = (target.clone(), field.clone());
        Callback::from(move |_: MouseEvent| {
            drop(field.blur());
            target.set(None);
        })
    };
    let on_unit = {
        let picks_unit = picks_unit.clone();
        Callback::from(move |_: MouseEvent| picks_unit.set(!*picks_unit))
    };
    let units = around::units(&field);
    let unit = units.iter().find(|(_, _, is_chosen)| *is_chosen);
    let unit_words = unit
        .map(|(_, symbol, _)| symbol.clone())
        .unwrap_or_default();
    let on_answer = |code: String, is_last: bool| {
        let (field, later, go_next) = (field.clone(), later.clone(), go_next.clone());
        Callback::from(move |_: MouseEvent| {
            // "Nothing" needs no more typing: the next field has the keys then. It is looked for before this one goes.
            let next = around::next(&field);
            around::answer(&field, &code);
            if !is_last {
                return;
            }
            let go_next = go_next.clone();
            let timer = Timer::once(0, move || match &next {
                Some(next) => drop(next.focus()),
                None => go_next(),
            });
            later.replace(timer);
        })
    };
    let key = |stroke: Stroke, words: String, spoken: &'static str, code: String| {
        html! {
            <button
                type="button"
                class="pad-key"
                onclick={strike(stroke)}
                aria-label={(!spoken.is_empty()).then_some(spoken)}
                data-testid={format!("pad-{code}")}
            >{ words }</button>
        }
    };
    let digit = |digit: u8| {
        key(
            Stroke::Digit(digit),
            digit.to_string(),
            "",
            digit.to_string(),
        )
    };
    let mark = match props.mark {
        DecimalMark::Point => ".",
        DecimalMark::Comma => ",",
    };
    html! {
        <div
            ref={pad}
            class="pad"
            role="group"
            aria-label={format!("Keys for {}", around::name(&field))}
            data-testid="keypad"
            onmousedown={Callback::from(|event: MouseEvent| {
                // The field keeps the focus, and with it its caret.
                event.prevent_default();
            })}
        >
            if *picks_unit {
                <div class="pad-units">
                    { for units.iter().map(|(code, symbol, is_chosen)| {
                        let (field, picks_unit, code) = (field.clone(), picks_unit.clone(), code.clone());
                        let testid = format!("pad-unit-{code}");
                        html! {
                            <button
                                key={code.clone()}
                                type="button"
                                class={if *is_chosen { "pad-key is-on" } else { "pad-key" }}
                                aria-pressed={if *is_chosen { "true" } else { "false" }}
                                data-testid={testid}
                                onclick={Callback::from(move |_: MouseEvent| {
                                    around::take_unit(&field, &code);
                                    picks_unit.set(false);
                                })}
                            >{ symbol.clone() }</button>
                        }
                    }) }
                </div>
            }
            <div class="pad-keys">
                { digit(7) }{ digit(8) }{ digit(9) }
                { key(Stroke::Delete, "⌫".to_owned(), "Delete", "delete".to_owned()) }
                { digit(4) }{ digit(5) }{ digit(6) }
                if units.len() > 1 {
                    <button
                        type="button"
                        class="pad-key is-word"
                        aria-expanded={if *picks_unit { "true" } else { "false" }}
                        aria-label={format!("Unit, now {unit_words}")}
                        onclick={on_unit}
                        data-testid="pad-unit"
                    >{ unit_words }</button>
                } else {
                    <span class="pad-blank" />
                }
                { digit(1) }{ digit(2) }{ digit(3) }
                if around::is_signed(&field) {
                    { key(Stroke::Sign, "±".to_owned(), "Plus or minus", "sign".to_owned()) }
                } else {
                    <span class="pad-blank" />
                }
                { key(Stroke::Mark(props.mark), mark.to_owned(), "Decimal mark", "mark".to_owned()) }
                { digit(0) }
                <button type="button" class="pad-key is-word" onclick={on_done} data-testid="pad-done">{ "Done" }</button>
                <button type="button" class="pad-key is-word is-main" onclick={on_next} data-testid="pad-next">
                    { "Next" }<Icon shape={Shape::Forward} />
                </button>
            </div>
            <div class="pad-answers">
                { for around::answers(&field).into_iter().filter(|(code, ..)| ANSWERS.contains(&code.as_str())).map(|(code, words, is_given)| html! {
                    <button
                        key={code.clone()}
                        type="button"
                        class={if is_given { "pad-key is-word is-on" } else { "pad-key is-word" }}
                        aria-pressed={if is_given { "true" } else { "false" }}
                        data-testid={format!("pad-{code}")}
                        onclick={on_answer(code.clone(), code == "nothing")}
                    >{ words }</button>
                }) }
            </div>
        </div>
    }
}

/// Answers of a reading that have a key here.
const ANSWERS: [&str; 3] = ["nothing", "off-scale", "swing"];
