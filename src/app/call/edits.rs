//! Edits of the visit: made in one place, handed out whole, and remembered for the way back.

use super::change::{Change, apply};
use super::history::History;
use crate::record::Visit;
use std::cell::RefCell;
use std::rc::Rc;
use yew::{Callback, UseStateHandle, hook, use_mut_ref, use_state};

/// What a screen edits a visit with.
#[derive(Clone)]
pub struct Edits {
    newest: Rc<RefCell<Rc<Visit>>>,
    history: Rc<RefCell<History>>,
    said: UseStateHandle<String>,
    on_visit: Callback<Visit>,
}

impl Edits {
    /// The newest visit, also between two drawings: two quick edits build on one another.
    pub fn visit(&self) -> Rc<Visit> {
        self.newest.borrow().clone()
    }

    /// Makes a change; hands back the visit before and after it, none where it changed nothing.
    pub fn make(&self, change: &Change) -> Option<(Rc<Visit>, Rc<Visit>)> {
        let before = self.visit();
        let after = Rc::new(apply(&before, change));
        if after == before {
            return None;
        }
        self.history.borrow_mut().remember(before.clone(), change);
        self.newest.replace(after.clone());
        self.on_visit.emit((*after).clone());
        Some((before, after))
    }

    /// Takes the last change back.
    pub fn undo(&self) {
        let step = self.history.borrow_mut().back();
        if let Some((before, words)) = step {
            self.newest.replace(before.clone());
            self.said.set(format!("Undone: {words}."));
            self.on_visit.emit((*before).clone());
        }
    }

    /// What the next step back would take back, in words.
    pub fn undoable(&self) -> Option<String> {
        self.history.borrow().next()
    }

    /// The last word on what was undone.
    pub fn said(&self) -> String {
        (*self.said).clone()
    }
}

/// Edits of `visit`. A visit that comes from elsewhere (another window, an import) is taken as it is, and what was done here
/// before it cannot be undone any more.
#[hook]
pub fn use_edits(visit: &Rc<Visit>, on_visit: &Callback<Visit>) -> Edits {
    let newest = use_mut_ref(|| visit.clone());
    let shown = use_mut_ref(|| visit.clone());
    let history = use_mut_ref(History::default);
    let said = use_state(String::new);
    let is_news = !Rc::ptr_eq(&shown.borrow(), visit);
    if is_news {
        shown.replace(visit.clone());
        let is_foreign = **newest.borrow() != **visit;
        if is_foreign {
            history.replace(History::default());
        }
        newest.replace(visit.clone());
    }
    Edits {
        newest,
        history,
        said,
        on_visit: on_visit.clone(),
    }
}
