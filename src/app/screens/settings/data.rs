//! The data: how safe it is, out to a file, in from a file, and what was put aside.

use std::rc::Rc;

use web_sys::{Event, HtmlInputElement};
use yew::{Callback, Html, MouseEvent, Properties, TargetCast, component, html, use_state};

use super::archive::Archive;
use super::import::{Picked, Preview};
use crate::app::deed::{Deed, Snapshot};
use crate::app::parts::{Caution, Confirm, Grade, Section};
use crate::app::persist::book_of;
use crate::app::platform::persistence::Keeping;
use crate::app::platform::{clock, files};
use crate::record::{Export, ImportPlan, limits};
use crate::store::RecordKey;

/// Properties of [`Data`].
#[derive(Clone, PartialEq, Properties)]
pub struct DataProps {
    /// The state.
    pub state: Snapshot,
    /// Wishes.
    pub deed: Callback<Deed>,
    /// Only the exchange of files, folded away: for the list of units.
    #[prop_or_default]
    pub is_folded: bool,
}

impl DataProps {
    fn wish(&self, deed: Deed) -> Callback<MouseEvent> {
        let on = self.deed.clone();
        Callback::from(move |_| on.emit(deed.clone()))
    }
}

/// The panel.
#[component]
pub fn Data(props: &DataProps) -> Html {
    if props.is_folded {
        return html! {
            <details class="fold panel" data-testid="data-fold">
                <summary>{ "Your data, as a file" }</summary>
                <div class="stack"><Exchange ..props.clone() /></div>
            </details>
        };
    }
    let state = &props.state;
    html! {
        <Section id="data" title="Your data" is_open={true}>
            <p>
                { if state.memory_only {
                    "Nothing is being saved here. Save your data to a file now."
                } else {
                    "Everything stays in this browser on this device. Nothing is sent anywhere."
                } }
            </p>
            if !state.memory_only {
                <p class="small" data-testid="keeping">{ state.keeping.words() }</p>
                if state.keeping == Keeping::BestEffort {
                    <div class="actions">
                        <button type="button" class="button" onclick={props.wish(Deed::AskToKeep)} data-testid="ask-to-keep">
                            { "Ask the browser to keep it" }
                        </button>
                    </div>
                }
            }
            <Exchange ..props.clone() />
            <Archive ..props.clone() />
            <PutAside ..props.clone() />
        </Section>
    }
}

/// Out to a file, in from a file.
#[component]
fn Exchange(props: &DataProps) -> Html {
    let picked = use_state(|| None::<Picked>);
    let state = &props.state;
    let on_pick = {
        let (picked, state) = (picked.clone(), state.clone());
        Callback::from(move |event: Event| {
            let input: HtmlInputElement = event.target_unchecked_into();
            let Some(file) = input.files().and_then(|files| files.get(0)) else {
                return;
            };
            let (picked, state, name) = (picked.clone(), state.clone(), file.name());
            files::read(&file, limits::FILE_BYTES, move |bytes| {
                let plan = bytes
                    .and_then(|bytes| Export::read(&bytes).map_err(|why| why.to_string()))
                    .map(|export| Rc::new(ImportPlan::of(&export, &book_of(&state))));
                picked.set(Some(Picked { name, plan }));
            });
            // The same file can be picked again after a change.
            input.set_value("");
        })
    };
    let on_done = {
        let (picked, deed) = (picked.clone(), props.deed.clone());
        Callback::from(move |taken: Option<(Rc<ImportPlan>, bool)>| {
            picked.set(None);
            if let Some((plan, with_settings)) = taken {
                deed.emit(Deed::Import(plan, with_settings));
            }
        })
    };
    let last = match state.settings.last_export.as_str() {
        "" => "Never saved to a file yet.".to_owned(),
        when => format!("Last saved to a file: {}.", clock::tell(when)),
    };
    html! {
        <div class="stack is-tight">
            <div class="actions">
                <button type="button" class="button" onclick={props.wish(Deed::Export)} data-testid="export">
                    { "Save everything to a file" }
                </button>
                <label class="button file-button">
                    { "Take a file in" }
                    <input type="file" accept=".json,application/json" onchange={on_pick} data-testid="import-file" />
                </label>
            </div>
            <p class="soft small" data-testid="last-export">{ last }</p>
            if let Some(picked) = &*picked {
                <Preview picked={picked.clone()} {on_done} />
            }
        </div>
    }
}

/// The trash, the quarantine, the demo.
#[component]
fn PutAside(props: &DataProps) -> Html {
    let state = &props.state;
    let on_empty = {
        let deed = props.deed.clone();
        Callback::from(move |()| deed.emit(Deed::EmptyTrash))
    };
    html! {
        <>
            if state.has_demo() {
                <div class="actions">
                    <button type="button" class="button" onclick={props.wish(Deed::RemoveDemo)} data-testid="settings-remove-demo">
                        { "Remove the demo" }
                    </button>
                </div>
            } else {
                <div class="actions">
                    <button type="button" class="button is-quiet" onclick={props.wish(Deed::LoadDemo)} data-testid="settings-load-demo">
                        { "Load the Tamarisk demo" }
                    </button>
                </div>
            }
            if !state.bins.trashed.is_empty() {
                <details class="fold" data-testid="trash">
                    <summary>{ format!("Trash ({})", state.bins.trashed.len()) }</summary>
                    <div class="stack is-tight">
                        <ul class="rows">
                            { for state.bins.trashed.iter().map(|trashed| {
                                let what = match trashed.key {
                                    RecordKey::Unit(_) => "Unit",
                                    RecordKey::Visit(_) => "Call",
                                    RecordKey::Settings => "Settings",
                                };
                                html! {
                                    <li key={trashed.path.clone()} class="line-item">
                                        <span>
                                            { format!("{what} {}", trashed.name).trim_end() }
                                            <span class="soft small">{ format!(", removed {}", clock::tell(&trashed.when)) }</span>
                                        </span>
                                        <button
                                            type="button"
                                            class="button"
                                            onclick={props.wish(Deed::Restore(trashed.clone()))}
                                            data-testid="restore"
                                        >
                                            { "Bring back" }
                                        </button>
                                    </li>
                                }
                            }) }
                        </ul>
                        <Confirm
                            words="Empty the trash"
                            question="Remove these for good? They cannot be brought back."
                            yes="Remove for good"
                            no="Keep them"
                            on_yes={on_empty}
                            testid="empty-trash"
                        />
                    </div>
                </details>
            }
            if !state.bins.quarantined.is_empty() {
                <Caution grade={Grade::Caution} title="some stored text could not be read" testid="quarantine">
                    <p class="small">{ "It is kept as it was. Save it to a file; someone may be able to mend it." }</p>
                    <ul class="rows">
                        { for state.bins.quarantined.iter().map(|entry| html! {
                            <li key={entry.path.clone()} class="line-item">
                                <span>{ format!("{}, {} characters, {}", entry.was, entry.characters, clock::tell(&entry.when)) }</span>
                                <button type="button" class="button" onclick={props.wish(Deed::HandOverUnread(entry.clone()))}>
                                    { "Save to a file" }
                                </button>
                            </li>
                        }) }
                    </ul>
                </Caution>
            }
        </>
    }
}
