//! What the bench found goes into the unit's profile, when the technician says so.

use super::codes;
use super::screen::{Edit, Told};
use crate::app::parts::Section;
use crate::app::platform::clock;
use crate::bench::stand::BenchSheet;
use crate::bench::stand::report::Proposal;
use crate::quantity::{Decimals, UnitPrefs, edit_text, format_with_unit};
use crate::unit::{FIGURES, Figure, FigureId, OnBench, Source, Unit};
use std::collections::BTreeSet;
use std::rc::Rc;
use yew::{
    AttrValue, Callback, Event, Html, MouseEvent, Properties, TargetCast, component, html,
    use_state,
};

/// Properties of [`TakeOver`].
#[derive(Clone, PartialEq, Properties)]
pub struct TakeOverProps {
    /// What the sheet comes to.
    pub told: Told,
    /// The sheet.
    pub sheet: Rc<BenchSheet>,
    /// The unit.
    pub unit: Rc<Unit>,
    /// When the call was opened (ISO 8601): the day of the run.
    pub opened: AttrValue,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// The unit was edited.
    pub on_unit: Callback<Unit>,
    /// Edits of the sheet.
    pub on_edit: Callback<Edit>,
}

/// What later case flows are held against.
const fn is_leakage(id: FigureId) -> bool {
    matches!(
        id,
        FigureId::PumpCaseLeakage
            | FigureId::PumpSlip
            | FigureId::MotorCaseLeakage
            | FigureId::MotorSlip
    )
}

fn words(id: FigureId) -> &'static str {
    FIGURES
        .iter()
        .find(|ask| ask.id == id)
        .map_or("Figure", |ask| ask.words)
}

/// The list.
#[component]
pub fn TakeOver(props: &TakeOverProps) -> Html {
    let left_out = use_state(BTreeSet::<FigureId>::new);
    let proposals = &props.told.0.proposals;
    let state = match (&props.sheet.taken_over, proposals.len()) {
        (Some(_), _) => "taken over".to_owned(),
        (None, 0) => "nothing yet".to_owned(),
        (None, many) => format!("{many} to take over"),
    };
    let chosen: Vec<Proposal> = proposals
        .iter()
        .copied()
        .filter(|proposal| !left_out.contains(&proposal.id))
        .collect();
    let on_take = {
        let (unit, on_unit, on_edit) = (
            props.unit.clone(),
            props.on_unit.clone(),
            props.on_edit.clone(),
        );
        let (prefs, chosen) = (props.prefs.clone(), chosen.clone());
        let (opened, path) = (props.opened.to_string(), props.sheet.path);
        Callback::from(move |_: MouseEvent| {
            let mut unit = (*unit).clone();
            for proposal in &chosen {
                let shown = prefs.unit(proposal.value.kind());
                let figure = Figure {
                    value: Some(proposal.value),
                    typed: edit_text(proposal.value, shown, prefs.mark()),
                    source: Source::Measured,
                };
                unit.figures.insert(proposal.id, figure);
                if is_leakage(proposal.id) {
                    let found = OnBench {
                        on: opened.clone(),
                        value: proposal.value,
                        share: proposal.share.min(1.0),
                        path,
                    };
                    unit.bench.insert(proposal.id, found);
                }
            }
            on_unit.emit(unit);
            let now = clock::now();
            on_edit.emit(Box::new(move |sheet| sheet.taken_over = Some(now)));
        })
    };
    html! {
        <Section id="bench-take-over" title="Into the unit’s profile" {state}>
            if proposals.is_empty() {
                <p class="soft">{ "Nothing to take over yet: displacement, leakage and settings stand here once the sheet carries them." }</p>
            } else {
                <p>{ "These replace what the profile says, with the source “measured”. Windows and ranking on the machine then rest on them, and a motor’s drain \
                    taken on a later call is held against its leakage here." }</p>
                <ul class="bench-take">
                    { for proposals.iter().map(|proposal| row(props, proposal, &left_out)) }
                </ul>
                <div class="actions">
                    <button type="button" class="button is-main" disabled={chosen.is_empty()} onclick={on_take} data-testid="bench-into-profile">
                        { format!("Put {} into the profile", chosen.len()) }
                    </button>
                </div>
            }
            <p role="status" data-testid="bench-taken">
                if props.sheet.taken_over.is_some() { { "In the profile, marked as measured." } }
            </p>
        </Section>
    }
}

fn row(
    props: &TakeOverProps,
    proposal: &Proposal,
    left_out: &yew::UseStateHandle<BTreeSet<FigureId>>,
) -> Html {
    let id = proposal.id;
    let base = proposal.value.kind().base_unit();
    let value = proposal.value.base();
    let now = props.unit.figures.get(&id).and_then(|figure| {
        let unit = codes::shown(&props.prefs, base);
        let text = format_with_unit(figure.value?, unit, Decimals::Reading, props.prefs.mark());
        Some(format!("profile: {text}, {}", figure.source.words()))
    });
    let on_change = {
        let left_out = left_out.clone();
        Callback::from(move |event: Event| {
            let is_in = event
                .target_unchecked_into::<web_sys::HtmlInputElement>()
                .checked();
            let mut set = (*left_out).clone();
            if is_in {
                set.remove(&id);
            } else {
                set.insert(id);
            }
            left_out.set(set);
        })
    };
    html! {
        <li key={words(id)}>
            <label class="check">
                <input type="checkbox" checked={!left_out.contains(&id)} onchange={on_change} />
                <span>
                    { words(id) }{ ": " }
                    <strong>{ codes::in_unit(value, 2.0 * proposal.share * value, base, &props.prefs) }</strong>
                    <span class="soft">{ format!(" ({})", now.unwrap_or_else(|| "profile: not known".to_owned())) }</span>
                </span>
            </label>
        </li>
    }
}
