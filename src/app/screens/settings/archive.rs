//! Old calls into an archive file, and then out of the way.

use super::data::DataProps;
use crate::app::deed::Deed;
use crate::app::exchange::count;
use crate::app::parts::{Confirm, Opt, Select};
use crate::app::persist::book_of;
use crate::record::archive::{choices, old};
use yew::{Callback, Html, MouseEvent, component, html, use_state};

/// The panel; nothing where no call is old enough.
#[component]
pub fn Archive(props: &DataProps) -> Html {
    let is_open = use_state(|| false);
    let before = use_state(|| None::<u16>);
    // A year that was handed over as a file, with the calls in it.
    let handed = use_state(|| None::<Vec<String>>);
    let has_closed = props
        .state
        .visits
        .values()
        .any(|visit| visit.closed.is_some());
    if !has_closed {
        return Html::default();
    }
    let on_open = {
        let is_open = is_open.clone();
        Callback::from(move |_: MouseEvent| is_open.set(true))
    };
    if !*is_open {
        return html! {
            <div class="actions">
                <button type="button" class="button is-quiet" onclick={on_open} data-testid="archive-open">
                    { "Put old calls into an archive" }
                </button>
            </div>
        };
    }
    let book = book_of(&props.state);
    let years = choices(&book);
    if years.is_empty() {
        return html! {
            <p class="small" data-testid="archive-none">
                { "No call can go yet: the last call of each unit stays, and so does what is open or not put back." }
            </p>
        };
    }
    // With nothing chosen a browser shows the first option, and choosing what it shows would tell us nothing.
    let options: Vec<Opt<Option<u16>>> = std::iter::once(Opt::new(None, "Choose the year", "none"))
        .chain(years.iter().map(|(year, calls)| {
            let words = format!("opened before {year}: {}", count(*calls, "call"));
            Opt::new(Some(*year), words, year.to_string())
        }))
        .collect();
    let on_before = {
        let (before, handed) = (before.clone(), handed.clone());
        Callback::from(move |year: Option<u16>| {
            before.set(year);
            handed.set(None);
        })
    };
    let on_archive = before.map(|year| {
        let (deed, handed) = (props.deed.clone(), handed.clone());
        let ids: Vec<String> = old(&book, year)
            .iter()
            .map(|visit| visit.id.clone())
            .collect();
        Callback::from(move |_: MouseEvent| {
            deed.emit(Deed::Archive(year));
            handed.set(Some(ids.clone()));
        })
    });
    let on_remove = {
        let (deed, handed, is_open) = (props.deed.clone(), handed.clone(), is_open.clone());
        Callback::from(move |()| {
            if let Some(ids) = &*handed {
                deed.emit(Deed::RemoveArchived(ids.clone()));
            }
            handed.set(None);
            is_open.set(false);
        })
    };
    html! {
        <div class="sub stack is-tight" role="group" aria-label="Archive" data-testid="archive">
            <h3>{ "Archive" }</h3>
            <p class="small">
                { "Closed calls go into a file and then out of this browser. “Take a file in” brings them back. The last call of each \
                   unit stays here, and so does what is open or not put back." }
            </p>
            <Select<Option<u16>>
                id="archive-before"
                label="Which calls"
                options={options}
                value={Some(*before)}
                on_change={on_before}
                testid="archive-before"
            />
            <div class="actions">
                <button
                    type="button"
                    class="button"
                    disabled={on_archive.is_none()}
                    onclick={on_archive}
                    data-testid="archive-file"
                >
                    { "1. Save them to a file" }
                </button>
            </div>
            if let Some(ids) = &*handed {
                <p class="small">{ "Look that the file is where you want it before you go on." }</p>
                <Confirm
                    words={format!("2. Remove {} here", count(ids.len(), "call"))}
                    question={format!("Is the file safe? {} leave this browser and are only in it.", count(ids.len(), "call"))}
                    yes="The file is safe: remove them"
                    on_yes={on_remove}
                    testid="archive-remove"
                />
            }
        </div>
    }
}
