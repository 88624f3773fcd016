//! The way back: the last states of a visit, so that a slip of the thumb costs one tap.

use super::change::Change;
use crate::record::Visit;
use std::rc::Rc;

/// Most steps that are kept.
const KEPT: usize = 50;

/// One step back.
#[derive(Clone, Debug, PartialEq)]
struct Step {
    /// The visit before the change.
    before: Rc<Visit>,
    /// What was changed.
    change: Change,
}

/// Steps back, oldest first. Kept by the screen and gone with it.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct History {
    steps: Vec<Step>,
}

impl History {
    /// Remembers the visit as it was before `change`. Typing on in the same field is one step.
    pub fn remember(&mut self, before: Rc<Visit>, change: &Change) {
        if self
            .steps
            .last()
            .is_some_and(|last| last.change.goes_on(change))
        {
            return;
        }
        if self.steps.len() == KEPT {
            self.steps.remove(0);
        }
        self.steps.push(Step {
            before,
            change: change.clone(),
        });
    }

    /// Takes the last step back: the visit as it was, and what is undone in words.
    pub fn back(&mut self) -> Option<(Rc<Visit>, String)> {
        self.steps
            .pop()
            .map(|step| (step.before, step.change.words()))
    }

    /// What the next step back would undo, in words.
    pub fn next(&self) -> Option<String> {
        self.steps.last().map(|step| step.change.words())
    }
}
