//! Windows from the unit's own manual: used as given, before anything computed.

use yew::{Callback, Html, MouseEvent, component, html};
use yew::{use_effect_with, use_state};

use super::PartProps;
use super::window_draft::Draft;
use super::window_form::WindowForm;
use crate::app::parts::Section;
use crate::app::platform::focus;
use crate::quantity::UnitPrefs;
use crate::readings::{Direction, EngineSpeed};
use crate::unit::{ManualWindow, Unit};

/// A window in one line.
fn line(window: &ManualWindow, prefs: &UnitPrefs) -> String {
    let condition = &window.condition;
    let direction = match condition.direction {
        _ if condition.doing.is_neutral() => "",
        Direction::Forward => ", forward",
        Direction::Reverse => ", reverse",
    };
    let engine = match condition.engine {
        EngineSpeed::LowIdle => "low idle".to_owned(),
        EngineSpeed::HighIdle => "high idle".to_owned(),
        EngineSpeed::Measured(speed) => prefs.print(speed),
    };
    format!("{}{direction}, {engine}", condition.doing.words())
}

/// The windows.
#[component]
pub fn Manual(props: &PartProps) -> Html {
    let tried = use_state(|| false);
    let changes = use_state(|| 0u32);
    let (unit, prefs) = (&props.unit, &props.prefs);
    let draft = Draft::of(unit);
    let missing = draft.window().err().filter(|_| *tried);
    use_effect_with(*changes, |changes| {
        // The form stands below the list.
        if *changes > 0 {
            focus::to("manual-port");
        }
    });
    let on_add = {
        let (tried, unit, on_unit) = (tried.clone(), unit.clone(), props.on_unit.clone());
        let draft = draft.clone();
        Callback::from(move |_: MouseEvent| {
            let window = draft.window();
            tried.set(window.is_err());
            if let Ok(window) = window {
                let mut next = (*unit).clone();
                next.manual.push(window);
                Draft::default().keep(&mut next);
                on_unit.emit(next);
            }
        })
    };
    let take_out = |at: usize, to_change: bool| {
        let (prefs, changes) = (prefs.clone(), changes.clone());
        props.change(move |unit: &mut Unit, _: MouseEvent| {
            if at < unit.manual.len() {
                let window = unit.manual.remove(at);
                if to_change {
                    Draft::from_window(&window, &prefs).keep(unit);
                    changes.set(*changes + 1);
                }
            }
        })
    };
    html! {
        <Section id="manual" title="Windows from the manual" state={format!("{} given", unit.manual.len())}>
            <p class="soft small">{ "Where the unit’s manual gives one, it goes before anything computed." }</p>
            if !unit.manual.is_empty() {
                <ul class="rows">
                    { for unit.manual.iter().enumerate().map(|(at, window)| html! {
                        <li key={at} class="line-item" data-testid="manual-window">
                            <div>
                                <strong>{ window.port.words() }</strong>
                                { ", " }
                                <span class="figure">{ prefs.print_span(window.low, window.high) }</span>
                                <div class="soft small">
                                    { line(window, prefs) }
                                    if !window.reference.is_empty() { { format!(" ({})", window.reference) } }
                                </div>
                            </div>
                            <div class="actions">
                                <button type="button" class="button is-quiet" onclick={take_out(at, true)}>{ "Change" }</button>
                                <button type="button" class="button is-quiet" onclick={take_out(at, false)}>{ "Remove" }</button>
                            </div>
                        </li>
                    }) }
                </ul>
            }
            <details class="fold" open={draft != Draft::default()} data-testid="manual-add">
                <summary>{ "Add a window" }</summary>
                <div class="stack">
                    <WindowForm ..props.clone() />
                    if let Some(what) = missing {
                        <p class="field-error" role="alert" data-testid="manual-missing">{ what }</p>
                    }
                    <div class="actions">
                        <button type="button" class="button is-main" onclick={on_add} data-testid="manual-keep">
                            { "Keep this window" }
                        </button>
                    </div>
                </div>
            </details>
        </Section>
    }
}
