//! What a picked file would bring, shown before anything is changed.

use std::rc::Rc;

use web_sys::{Event, HtmlInputElement};
use yew::{Callback, Html, MouseEvent, Properties, TargetCast, component, html, use_state};

use crate::app::exchange::count;
use crate::app::parts::{Caution, Grade};
use crate::app::platform::clock;
use crate::record::{Fate, ImportPlan, Planned};

/// So many names are listed before the rest is counted.
const NAMES: usize = 8;

/// A file that was picked.
#[derive(Clone, Debug, PartialEq)]
pub struct Picked {
    /// Its name.
    pub name: String,
    /// What it would bring, or why it cannot be read.
    pub plan: Result<Rc<ImportPlan>, String>,
}

/// Properties of [`Preview`].
#[derive(Clone, PartialEq, Properties)]
pub struct PreviewProps {
    /// The file.
    pub picked: Picked,
    /// Done with it: what is to be taken in, and whether its settings too; none where nothing is.
    pub on_done: Callback<Option<(Rc<ImportPlan>, bool)>>,
}

/// How many of a list are new, copies, and here already.
fn tally<T>(planned: &[Planned<T>]) -> (usize, usize, usize) {
    planned
        .iter()
        .fold((0, 0, 0), |(new, copies, same), planned| {
            match planned.fate {
                Fate::New => (new + 1, copies, same),
                Fate::Copy { .. } => (new, copies + 1, same),
                Fate::Same => (new, copies, same + 1),
            }
        })
}

/// One kind of record in a line; none where the file has none.
fn line<T>(planned: &[Planned<T>], what: &str) -> Option<String> {
    let (new, copies, same) = tally(planned);
    if planned.is_empty() {
        return None;
    }
    let mut parts = Vec::new();
    if new > 0 {
        parts.push(format!("{new} new"));
    }
    if copies > 0 {
        parts.push(format!("{copies} beside a different one, as a copy"));
    }
    if same > 0 {
        parts.push(format!("{same} here already"));
    }
    Some(format!(
        "{}: {}",
        count(planned.len(), what),
        parts.join(", ")
    ))
}

fn names(plan: &ImportPlan) -> String {
    let coming: Vec<&str> = plan
        .units
        .iter()
        .filter(|planned| planned.fate != Fate::Same)
        .map(|planned| planned.item.name.as_str())
        .collect();
    let shown = coming
        .iter()
        .take(NAMES)
        .copied()
        .collect::<Vec<_>>()
        .join(", ");
    match coming.len().saturating_sub(NAMES) {
        0 => shown,
        more => format!("{shown} and {more} more"),
    }
}

/// The preview.
#[component]
pub fn Preview(props: &PreviewProps) -> Html {
    let with_settings = use_state(|| false);
    let close = props.on_done.reform(|_: MouseEvent| None);
    let name = &props.picked.name;
    let plan = match &props.picked.plan {
        Err(why) => {
            return html! {
                <Caution grade={Grade::Caution} title="not taken in" role="alert" testid="import-error">
                    <p>{ format!("{name}: {why}.") }</p>
                    <p class="small">{ "Nothing was changed." }</p>
                    <div class="actions">
                        <button type="button" class="button" onclick={close}>{ "All right" }</button>
                    </div>
                </Caution>
            };
        }
        Ok(plan) => plan.clone(),
    };
    let lines = [
        line(&plan.units, "unit"),
        line(&plan.visits, "call"),
        line(&plan.instruments, "instrument"),
    ];
    let (coming, made) = (
        names(&plan),
        plan.made.split(' ').next().unwrap_or_default(),
    );
    let on_settings = {
        let with_settings = with_settings.clone();
        Callback::from(move |event: Event| {
            with_settings.set(event.target_unchecked_into::<HtmlInputElement>().checked());
        })
    };
    let take = {
        let (plan, with_settings) = (plan.clone(), *with_settings);
        props
            .on_done
            .reform(move |_: MouseEvent| Some((plan.clone(), with_settings)))
    };
    html! {
        <div class="sub" role="region" aria-label="What the file brings" data-testid="import-preview">
            <h3>{ format!("What {name} brings") }</h3>
            if !made.is_empty() { <p class="soft small">{ format!("Made {}.", clock::tell(made)) }</p> }
            if plan.is_empty() {
                <p>{ "Nothing that is not here already." }</p>
            }
            <ul class="import-lines">
                { for lines.into_iter().flatten().map(|line| html! { <li key={line.clone()}>{ line }</li> }) }
            </ul>
            if !coming.is_empty() { <p class="small">{ format!("Units coming in: {coming}.") }</p> }
            { for plan.remarks.iter().map(|remark| html! {
                <p key={remark.clone()} class="small soft">{ remark }</p>
            }) }
            if plan.settings.is_some() {
                <label class="check">
                    <input type="checkbox" checked={*with_settings} onchange={on_settings} data-testid="import-settings" />
                    <span>{ "Take over its units of measure and theme too" }</span>
                </label>
            }
            <p class="small">{ "Nothing that is here is written over." }</p>
            <div class="actions">
                if !plan.is_empty() {
                    <button type="button" class="button is-main" onclick={take} data-testid="import-take">{ "Take it in" }</button>
                }
                <button type="button" class="button" onclick={close} data-testid="import-leave">{ "Leave it" }</button>
            </div>
        </div>
    }
}
