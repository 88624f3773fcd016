//! The profile of one unit: a name and a class are enough, everything else sharpens.

mod calls;
mod figures;
mod manual;
mod ports;
mod ticks;
mod window_draft;
mod window_form;

use std::rc::Rc;
use yew::{AttrValue, Callback, Html, MouseEvent, Properties, component, html};

use self::calls::Calls;
use self::figures::Figures;
use self::manual::Manual;
use self::ports::Ports;
use self::ticks::TicksForm;
pub use self::ticks::usual_paths;
use crate::app::deed::{Deed, Snapshot};
use crate::app::parts::{Confirm, Icon, Section, Select, Shape, TextField};
use crate::app::route::Route;
use crate::app::screens::units::class_options;
use crate::app::state::Action;
use crate::quantity::UnitPrefs;
use crate::record::limits;
use crate::unit::{MachineClass, Unit};

/// Properties of [`Profile`].
#[derive(Clone, PartialEq, Properties)]
pub struct ProfileProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// The state.
    pub state: Snapshot,
    /// Wishes.
    pub deed: Callback<Deed>,
}

/// What the parts of the profile take.
#[derive(Clone, PartialEq, Properties)]
pub struct PartProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// The units of measure of the shop.
    pub prefs: UnitPrefs,
    /// The unit as it is from now on.
    pub on_unit: Callback<Unit>,
}

impl PartProps {
    /// A callback that changes a copy of the unit and hands it on.
    pub fn change<T: 'static>(&self, change: impl Fn(&mut Unit, T) + 'static) -> Callback<T> {
        let (unit, on_unit) = (self.unit.clone(), self.on_unit.clone());
        Callback::from(move |value: T| {
            let mut next = (*unit).clone();
            change(&mut next, value);
            on_unit.emit(next);
        })
    }
}

/// The screen.
#[component]
pub fn Profile(props: &ProfileProps) -> Html {
    let (unit, state) = (&props.unit, &props.state);
    let part = PartProps {
        unit: unit.clone(),
        prefs: state.settings.units.clone(),
        on_unit: props.deed.reform(|unit| Deed::Put(Action::PutUnit(unit))),
    };
    let open = state
        .visits_of(&unit.id)
        .into_iter()
        .find(|visit| visit.closed.is_none());
    let on_start = {
        let (deed, id) = (props.deed.clone(), unit.id.clone());
        Callback::from(move |_: MouseEvent| deed.emit(Deed::StartCall(id.clone())))
    };
    let on_remove = {
        let (deed, id) = (props.deed.clone(), unit.id.clone());
        Callback::from(move |()| deed.emit(Deed::RemoveUnit(id.clone())))
    };
    let calls = state.visits_of(&unit.id).len();
    let question = match calls {
        0 => format!("Remove unit {}?", unit.name),
        1 => format!("Remove unit {} and its call?", unit.name),
        calls => format!("Remove unit {} and its {calls} calls?", unit.name),
    };
    html! {
        <main class="page" id="main" data-testid="unit-screen">
            <div class="page-head">
                <h1 id="title" tabindex="-1">{ &unit.name }</h1>
                <div class="actions">
                    if let Some(visit) = open {
                        <a class="button is-main" href={Route::Call(visit.id.clone()).href()} data-testid="continue-call">
                            { "Continue the call" }
                            <Icon shape={Shape::Forward} />
                        </a>
                    } else {
                        <button type="button" class="button is-main" onclick={on_start} data-testid="start-call">
                            { "Start the call" }
                            <Icon shape={Shape::Forward} />
                        </button>
                    }
                </div>
            </div>
            <p class="soft">
                { "All of this can wait. Each answer and figure narrows the windows; what is left open stays open in the \
                   calculation." }
            </p>
            <div class="columns">
                <div class="stack">
                    <Section id="machine" title="Machine" state={unit.class.words()}>
                        <TextField
                            id="unit-name"
                            label="Yard number or name"
                            value={AttrValue::from(unit.name.clone())}
                            on_input={part.change(|unit, name: String| unit.name = name)}
                            maxlength=80
                            error={if unit.name.trim().is_empty() { "A unit needs a name to be found again." } else { "" }}
                            testid="unit-name"
                        />
                        <Select<MachineClass>
                            id="unit-class"
                            label="Class of machine"
                            options={class_options()}
                            value={unit.class}
                            on_change={part.change(|unit, class| unit.class = class)}
                            testid="unit-class"
                        />
                    </Section>
                    <TicksForm ..part.clone() />
                </div>
                <div class="stack">
                    <Figures ..part.clone() />
                    <Ports ..part.clone() />
                    <Manual ..part.clone() />
                    <Section id="note" title="Note" state={if unit.note.trim().is_empty() { "" } else { "written" }}>
                        <TextField
                            id="unit-note"
                            label="What the next one should know"
                            value={AttrValue::from(unit.note.clone())}
                            on_input={part.change(|unit, note: String| unit.note = note)}
                            lines={true}
                            maxlength={u32::try_from(limits::TEXT_CHARACTERS).unwrap_or(u32::MAX)}
                            testid="unit-note"
                        />
                    </Section>
                    <Calls unit={unit.clone()} state={state.clone()} deed={props.deed.clone()} />
                    <a class="button" href={Route::Tags(Some(unit.id.clone())).href()} data-testid="to-tag">
                        { "Tag: this profile as a QR code" }
                    </a>
                    <Confirm
                        words="Remove this unit"
                        question={question}
                        yes="Remove"
                        on_yes={on_remove}
                        testid="remove-unit"
                    />
                </div>
            </div>
        </main>
    }
}
