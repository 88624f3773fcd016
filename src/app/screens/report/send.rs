//! The ways to hand a report over: paper, the share sheet, the clipboard, files.

use crate::app::platform::{files, share};
use yew::{AttrValue, Callback, Html, MouseEvent, Properties, component, html};

/// Properties of [`Send`].
#[derive(Clone, PartialEq, Properties)]
pub struct SendProps {
    /// Name of the files, without ending.
    pub name: String,
    /// Title of a shared text.
    pub title: String,
    /// The report as text.
    pub text: String,
    /// The readings as a table.
    pub table: String,
    /// The call or the check as a file.
    pub file: String,
    /// What is in that file: "call" or "check".
    pub what: AttrValue,
    /// Something to say in the live region.
    pub on_say: Callback<String>,
}

/// The buttons, and the text as it goes out.
#[component]
pub fn Send(props: &SendProps) -> Html {
    let hand_over = |ending: &'static str, kind: &'static str, text: &str| {
        let (name, text, on_say) = (
            format!("{}.{ending}", props.name),
            text.to_owned(),
            props.on_say.clone(),
        );
        Callback::from(move |_: MouseEvent| {
            on_say.emit(match files::hand_over(&name, kind, &text) {
                Ok(()) => String::from("The file was handed to the browser as a download."),
                Err(why) => format!("The file could not be handed to the browser: {why}."),
            });
        })
    };
    let on_print = Callback::from(|_: MouseEvent| share::print());
    let on_share = {
        let (title, text, on_say) = (
            props.title.clone(),
            props.text.clone(),
            props.on_say.clone(),
        );
        Callback::from(move |_: MouseEvent| {
            let on_say = on_say.clone();
            share::share(&title, &text, move |is_done| {
                if is_done {
                    on_say.emit(String::from("Handed on."));
                }
            });
        })
    };
    let on_copy = {
        let (text, on_say) = (props.text.clone(), props.on_say.clone());
        Callback::from(move |_: MouseEvent| {
            let on_say = on_say.clone();
            share::copy(&text, move |is_done| {
                on_say.emit(String::from(if is_done {
                    "The text is on the clipboard."
                } else {
                    "The browser does not let the page copy. Open “As text” below and copy it by hand."
                }));
            });
        })
    };
    html! {
        <section class="no-print panel stack is-tight" aria-label="Hand it over">
            <div class="actions">
                <button type="button" class="button is-main" onclick={on_print} data-testid="report-print">{ "Print, or save as PDF" }</button>
                if share::can_share() {
                    <button type="button" class="button" onclick={on_share} data-testid="report-share">{ "Share the text" }</button>
                }
                <button type="button" class="button" onclick={on_copy} data-testid="report-copy">{ "Copy the text" }</button>
            </div>
            <div class="actions">
                <button type="button" class="button" onclick={hand_over("txt", "text/plain;charset=utf-8", &props.text)} data-testid="report-text">
                    { "Text as a file" }
                </button>
                <button type="button" class="button" onclick={hand_over("csv", "text/csv;charset=utf-8", &props.table)} data-testid="report-csv">
                    { "Readings as CSV" }
                </button>
                <button type="button" class="button" onclick={hand_over("json", "application/json", &props.file)} data-testid="report-file">
                    { format!("This {} as a file", props.what) }
                </button>
            </div>
            <details class="fold">
                <summary>{ "As text" }</summary>
                <textarea
                    class="field-input field-lines report-text"
                    rows="16"
                    readonly=true
                    aria-label="The report as text"
                    value={AttrValue::from(props.text.clone())}
                    data-testid="report-as-text"
                />
            </details>
        </section>
    }
}
