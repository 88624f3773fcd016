//! What it was: one cause, two, or none; proved or not.

use super::EntryProps;
use crate::app::call::change::Change;
use crate::app::parts::{Choice, Opt, Select, TextField};
use crate::assessment::Assessment;
use crate::call::closing::cause;
use crate::faults::{self, FaultId};
use crate::record::limits::TEXT_CHARACTERS;
use crate::record::{Afterwards, Closing};
use yew::{Html, html};

/// Leading causes that stand first in the list.
const LEADING: usize = 6;

/// The code under which a cause stands in a record.
fn code(id: FaultId) -> String {
    serde_json::to_value(id)
        .ok()
        .and_then(|code| code.as_str().map(str::to_owned))
        .unwrap_or_default()
}

pub use crate::call::closing::words;

/// The causes that lead now, by name: while the same ones lead, whatever their order, the list to choose from stays as it is and is
/// not drawn anew at every answer.
pub fn leading(assessment: Option<&Assessment>) -> Vec<FaultId> {
    let causes = assessment.map(|assessment| assessment.causes.iter().take(LEADING));
    let mut ids: Vec<FaultId> = causes
        .into_iter()
        .flatten()
        .flat_map(|cause| cause.ids.clone())
        .collect();
    sort_by_title(&mut ids);
    ids.dedup();
    ids
}

fn sort_by_title(ids: &mut [FaultId]) {
    ids.sort_by_key(|id| faults::find(*id).map_or("", |fault| fault.title));
}

/// Causes to choose from: those that lead now, then all others, both by name.
fn options(none: &'static str, props: &EntryProps, but: &str) -> Vec<Opt<String>> {
    let mut rest: Vec<FaultId> = FaultId::ALL.to_vec();
    sort_by_title(&mut rest);
    let mut options = vec![Opt::new(String::new(), none, "none")];
    for id in props.leading.iter().copied().chain(rest) {
        let Some(fault) = faults::find(id) else {
            continue;
        };
        let code = code(id);
        if code != but && !options.iter().any(|option| option.value == code) {
            options.push(Opt::new(code.clone(), fault.title, code));
        }
    }
    options
}

/// The questions.
pub fn asked(closing: &Closing, props: &EntryProps) -> Html {
    let edit = |set: fn(&mut Closing, String)| {
        let closing = closing.clone();
        props.on_change.reform(move |text: String| {
            let mut next = closing.clone();
            set(&mut next, text);
            Change::Closing(next)
        })
    };
    let on_proved = {
        let closing = closing.clone();
        props.on_change.reform(move |is_proved: bool| {
            Change::Closing(Closing {
                is_proved,
                ..closing.clone()
            })
        })
    };
    let proof = cause(&closing.cause).map_or("", |fault| fault.proof);
    let on_afterwards = {
        let closing = closing.clone();
        props.on_change.reform(move |afterwards: Afterwards| {
            Change::Closing(Closing {
                afterwards,
                ..closing.clone()
            })
        })
    };
    html! { <>
        <Select<String>
            id="close-cause"
            label="Cause found"
            options={options("No cause found", props, "")}
            value={Some(closing.cause.clone())}
            on_change={edit(|closing, cause| {
                closing.cause = cause;
                if closing.cause.is_empty() || closing.cause == closing.also {
                    closing.also = String::new();
                }
                if closing.cause.is_empty() {
                    closing.is_proved = false;
                }
            })}
            testid="close-cause"
        />
        if !closing.cause.is_empty() {
            <Select<String>
                id="close-also"
                label="And a second one"
                options={options("None", props, &closing.cause)}
                value={Some(closing.also.clone())}
                on_change={edit(|closing, also| closing.also = also)}
                testid="close-also"
            />
            <Choice<bool>
                name="close-proved"
                label="Proved on the machine?"
                options={vec![Opt::new(true, "Proved", "yes"), Opt::new(false, "Not proved", "no")]}
                value={Some(closing.is_proved)}
                on_change={on_proved}
            />
            if closing.is_proved {
                <TextField
                    id="close-proof"
                    label="What proved it"
                    hint={proof}
                    value={closing.proof.clone()}
                    on_input={edit(|closing, proof| closing.proof = proof)}
                    lines={true}
                    maxlength={u32::try_from(TEXT_CHARACTERS).unwrap_or(2000)}
                    testid="close-proof"
                />
            }
        }
        <Choice<Afterwards>
            name="close-afterwards"
            label="The trouble, after what was done"
            options={Afterwards::ALL.map(|after| Opt::new(after, after.words(), after.code())).to_vec()}
            value={(!closing.afterwards.is_not_said()).then_some(closing.afterwards)}
            on_change={on_afterwards}
        />
    </> }
}
