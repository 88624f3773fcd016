//! The sheet goes out: as text, as a table, on paper.

use super::screen::Told;
use crate::app::parts::Section;
use crate::app::platform::files;
use crate::bench::stand::BenchSheet;
use crate::bench::stand::paper;
use crate::quantity::UnitPrefs;
use crate::unit::Unit;
use std::rc::Rc;
use yew::{Callback, Html, MouseEvent, Properties, component, html, use_state};

/// Properties of [`HandOver`].
#[derive(Clone, PartialEq, Properties)]
pub struct HandOverProps {
    /// The sheet.
    pub sheet: Rc<BenchSheet>,
    /// What it comes to.
    pub told: Told,
    /// The unit.
    pub unit: Rc<Unit>,
    /// Units of measure.
    pub prefs: UnitPrefs,
}

/// The buttons.
#[component]
pub fn HandOver(props: &HandOverProps) -> Html {
    let trouble = use_state(String::new);
    let hand = |kind: &'static str| {
        let (props, trouble) = (props.clone(), trouble.clone());
        Callback::from(move |_: MouseEvent| {
            let (text, ending, media) = match kind {
                "text" => (
                    paper::text(&props.sheet, &props.told.0, &props.unit.name, &props.prefs),
                    "txt",
                    "text/plain",
                ),
                _ => (
                    // The mark that tells a spreadsheet the encoding.
                    format!(
                        "\u{feff}{}",
                        paper::table(&props.sheet, &props.told.0, &props.prefs)
                    ),
                    "csv",
                    "text/csv",
                ),
            };
            let part = files::name_part(&props.unit.name);
            let part = if part.is_empty() { "sheet" } else { &part };
            let name = format!("bench-{part}.{ending}");
            trouble.set(match files::hand_over(&name, media, &text) {
                Ok(()) => String::new(),
                Err(why) => format!("The file could not be handed to the browser: {why}."),
            });
        })
    };
    let on_print = {
        let trouble = trouble.clone();
        Callback::from(move |_: MouseEvent| {
            let printed = web_sys::window().map(|window| window.print());
            if !matches!(printed, Some(Ok(()))) {
                trouble.set("This browser does not print from here: save the text.".to_owned());
            }
        })
    };
    html! {
        <Section id="bench-hand-over" title="Hand over">
            <p class="soft">{ "The sheet lists what was not tested, where each limit comes from, and the version that computed it." }</p>
            <div class="actions">
                <button type="button" class="button is-main" onclick={on_print} data-testid="bench-print">{ "Print the sheet" }</button>
                <button type="button" class="button is-quiet" onclick={hand("text")} data-testid="bench-text">{ "Save as text" }</button>
                <button type="button" class="button is-quiet" onclick={hand("table")} data-testid="bench-csv">{ "Save readings and results (CSV)" }</button>
            </div>
            <p class="field-error" role="status">{ (*trouble).clone() }</p>
        </Section>
    }
}
