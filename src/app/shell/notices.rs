//! What must be told above every screen, with the buttons that answer it.

use yew::{Callback, Html, MouseEvent, Properties, component, html, use_state};

use crate::app::deed::{Deed, Snapshot};
use crate::app::parts::{Caution, Grade};
use crate::app::platform::clock;
use crate::app::route::Route;
use crate::app::state::{About, Action, Notice, Save};
use crate::record::backup::{AtRisk, at_risk};
use crate::store::RecordKey;

/// Properties of [`Notices`].
#[derive(Clone, PartialEq, Properties)]
pub struct NoticesProps {
    /// The state.
    pub state: Snapshot,
    /// Wishes.
    pub deed: Callback<Deed>,
}

impl NoticesProps {
    fn button(&self, words: &str, testid: &'static str, deed: Deed) -> Html {
        let on = self.deed.clone();
        let onclick = Callback::from(move |_: MouseEvent| on.emit(deed.clone()));
        html! {
            <button type="button" class="button" {onclick} data-testid={testid}>{ words }</button>
        }
    }
}

/// The notices.
#[component]
pub fn Notices(props: &NoticesProps) -> Html {
    let state = &props.state;
    let export = || props.button("Save everything to a file", "export-now", Deed::Export);
    let put_off = use_state(|| false);
    // Only where nobody is in the middle of a job.
    let risk = (!*put_off && state.route == Route::Units && !state.memory_only)
        .then(|| {
            let visits = state.visits.values().map(|visit| &**visit);
            at_risk(&state.settings.last_export, visits, &clock::now())
        })
        .flatten();
    let on_later = Callback::from(move |_: MouseEvent| put_off.set(true));
    let anything = risk.is_some()
        || !state.notices.is_empty()
        || state.memory_only
        || state.is_nearly_full
        || state.engine_trouble.is_some()
        || state.update_waits
        || matches!(state.save, Save::Failed(_));
    if !anything {
        return Html::default();
    }
    html! {
        <div class="notices">
            if state.memory_only {
                <Caution grade={Grade::Caution} title="nothing is being saved here" role="alert" testid="memory-banner">
                    <p>{ "Nothing is being saved here. Save your data to a file now." }</p>
                    <p class="small">
                        { "This browser does not let the page keep anything: a private window, or storage is blocked for this site. \
                           What you type is gone when the page closes." }
                    </p>
                    <div class="actions">{ export() }</div>
                </Caution>
            }
            if let Save::Failed(why) = &state.save {
                <Caution grade={Grade::Caution} title="not saved" role="alert" testid="save-failed">
                    <p>{ format!("{why}.") }</p>
                    <div class="actions">{ export() }</div>
                </Caution>
            } else if state.is_nearly_full {
                <Caution title="Storage is filling up" testid="nearly-full">
                    <p>{ "Put old calls into an archive file and empty the trash, both in Settings. Until then everything goes on being saved." }</p>
                    <div class="actions">{ export() }</div>
                </Caution>
            }
            if let Some(risk) = risk {
                <Caution title="Save a copy off this device" testid="backup-reminder">
                    <p>{ at_risk_words(risk) }</p>
                    <div class="actions">
                        { export() }
                        <button type="button" class="button is-quiet" onclick={on_later} data-testid="backup-later">{ "Later" }</button>
                    </div>
                </Caution>
            }
            if let Some(why) = &state.engine_trouble {
                <Caution grade={Grade::Caution} title="no calculation" role="alert" testid="engine-trouble">
                    <p>{ why }</p>
                </Caution>
            }
            { for state.notices.iter().map(|notice| one(props, notice)) }
            if state.update_waits {
                <Caution title="A newer version is ready" testid="update-notice">
                    <p>{ "It takes over when you say so. What you typed is saved first." }</p>
                    <div class="actions">
                        { props.button("Change to the new version", "update-now", Deed::Update) }
                    </div>
                </Caution>
            }
        </div>
    }
}

fn one(props: &NoticesProps, notice: &Notice) -> Html {
    let (grade, title) = match notice.about {
        About::Note => (Grade::Note, "To know"),
        About::Trouble => (Grade::Caution, "look at this"),
        About::Conflict(_) => (Grade::Caution, "two versions"),
    };
    let buttons = match &notice.about {
        About::Conflict(key) => {
            let mine = match key {
                RecordKey::Settings => "Keep mine",
                _ => "Keep mine as a copy",
            };
            html! { <>
                { props.button(mine, "keep-mine", Deed::KeepMineAsCopy(key.clone())) }
                { props.button("Load theirs", "load-theirs", Deed::LoadTheirs(key.clone())) }
            </> }
        }
        _ => props.button(
            "All right",
            "put-away",
            Deed::Put(Action::PutAway(notice.number)),
        ),
    };
    html! {
        <Caution key={notice.number} {grade} {title} role="alert" testid="notice">
            <p>{ &notice.text }</p>
            <div class="actions">{ buttons }</div>
        </Caution>
    }
}

fn at_risk_words(risk: AtRisk) -> String {
    let calls = match risk.calls {
        1 => "One call is on this device alone".to_owned(),
        many => format!("{many} calls are on this device alone"),
    };
    match risk.days {
        None => format!("{calls}: nothing was saved to a file yet. A lost phone takes them along."),
        Some(days) => format!("{calls}: the last file is {days} days old."),
    }
}
