//! The way back on the screens beside the call: units, settings, the sheets for neutral, tracking, yard and bench. The call screen has
//! its own, that knows each change by name; here a step is a record as it stood before, and typing on in one field is one step.

use super::platform::focus::Named;
use super::route::Route;
use super::state::{Action, State};
use crate::record::{Settings, Visit};
use crate::unit::Unit;
use std::rc::Rc;

/// Most steps that are kept.
const KEPT: usize = 50;

/// A record as it stood.
#[derive(Clone, Debug, PartialEq)]
enum Before {
    Unit(Rc<Unit>),
    Visit(Rc<Visit>),
    Settings(Rc<Settings>),
}

#[derive(Clone, Debug)]
struct Step {
    before: Before,
    /// Where it was changed.
    at: Option<Named>,
}

/// Steps back on one screen, oldest first; gone with it.
#[derive(Clone, Debug, Default)]
pub struct Undo {
    route: Route,
    steps: Vec<Step>,
}

impl Undo {
    /// Remembers what an edit is about to change. `at` is what has the keyboard.
    pub fn remember(&mut self, state: &State, action: &Action, at: Option<Named>) {
        if self.route != state.route {
            *self = Undo {
                route: state.route.clone(),
                steps: Vec::new(),
            };
        }
        let Some(before) = before(state, action) else {
            return;
        };
        let goes_on = self.steps.last().is_some_and(|last| {
            let is_typing = at.as_ref().is_some_and(|at| at.is_typing);
            is_typing && last.at == at
        });
        if goes_on {
            return;
        }
        if self.steps.len() == KEPT {
            self.steps.remove(0);
        }
        self.steps.push(Step { before, at });
    }

    /// Takes the last step back: the edit that does it, and what it takes back in words.
    pub fn back(&mut self, state: &State) -> Option<(Action, String)> {
        if self.route != state.route {
            return None;
        }
        let step = self.steps.pop()?;
        let action = match &step.before {
            Before::Unit(unit) => Action::PutUnit((**unit).clone()),
            Before::Visit(visit) => Action::PutVisit(Box::new((**visit).clone())),
            Before::Settings(settings) => Action::PutSettings((**settings).clone()),
        };
        Some((action, step.words()))
    }

    /// What the next step back would take back, in words; none where there is none.
    pub fn next(&self, route: &Route) -> Option<String> {
        let step = self.steps.last().filter(|_| self.route == *route)?;
        Some(step.words())
    }
}

impl Step {
    fn words(&self) -> String {
        let name = self
            .at
            .as_ref()
            .map(|at| at.name.trim())
            .unwrap_or_default();
        if name.is_empty() {
            String::from("last change")
        } else {
            name.to_owned()
        }
    }
}

/// The record as it stands before an edit; none where the edit changes nothing, or is none that is taken back here.
fn before(state: &State, action: &Action) -> Option<Before> {
    match action {
        Action::PutUnit(unit) => {
            let before = state
                .units
                .get(&unit.id)
                .filter(|before| ***before != *unit)?;
            Some(Before::Unit(before.clone()))
        }
        Action::PutVisit(visit) => {
            let before = state
                .visits
                .get(&visit.id)
                .filter(|before| ***before != **visit)?;
            let is_call = matches!(state.route, Route::Call(_)) && !before.is_yard_check();
            (!is_call).then(|| Before::Visit(before.clone()))
        }
        // What is put away or switched in passing on other screens is no edit of the settings.
        Action::PutSettings(settings)
            if is_settings(&state.route) && *state.settings != *settings =>
        {
            Some(Before::Settings(state.settings.clone()))
        }
        Action::PutInstruments(list)
            if is_settings(&state.route) && state.settings.instruments != *list =>
        {
            Some(Before::Settings(state.settings.clone()))
        }
        _ => None,
    }
}

fn is_settings(route: &Route) -> bool {
    matches!(route, Route::Settings | Route::Learned)
}
