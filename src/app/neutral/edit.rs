//! Edits of the sheet: each builds on the newest one, also between two drawings, and hands out the whole visit.

use std::cell::RefCell;
use std::rc::Rc;

use yew::{Callback, hook, use_mut_ref};

use crate::app::call::change::{Change, apply};
use crate::readings::Path;
use crate::record::neutral::Field;
use crate::record::{NeutralSheet, Visit};

/// Figures that are read at something opened, with the check whose put-back list it joins at the end of the call.
const OPENS: [(Field, &str); 3] = [
    (Field::BridgedTurns, "bridge-the-servo"),
    (Field::ServoForward, "servo-two-gauges"),
    (Field::ServoReverse, "servo-two-gauges"),
];

/// What parts of the screen edit with. Two are equal where they edit the same sheet of the same visit.
#[derive(Clone)]
pub struct Edits {
    newest: Rc<RefCell<Rc<Visit>>>,
    path: Path,
    on_visit: Callback<Visit>,
}

impl PartialEq for Edits {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.newest, &other.newest) && self.path == other.path
    }
}

/// The sheet of a path.
pub fn sheet(visit: &Visit, path: Path) -> NeutralSheet {
    let kept = match path {
        Path::Left => &visit.neutral,
        Path::Right => &visit.neutral_right,
    };
    kept.clone().unwrap_or_default()
}

impl Edits {
    /// Changes the sheet.
    pub fn make(&self, edit: impl FnOnce(&mut NeutralSheet)) {
        let mut visit = (**self.newest.borrow()).clone();
        let mut sheet = sheet(&visit, self.path);
        edit(&mut sheet);
        for (field, check) in OPENS {
            if sheet.fields.contains_key(&field) && !visit.made.iter().any(|made| made == check) {
                visit.made.push(check.to_owned());
            }
        }
        let kept = (sheet != NeutralSheet::default()).then_some(sheet);
        match self.path {
            Path::Left => visit.neutral = kept,
            Path::Right => visit.neutral_right = kept,
        }
        self.hand_out(visit);
    }

    /// Changes something else of the visit: precautions, alone on site.
    pub fn change(&self, change: &Change) {
        let visit = apply(&self.newest.borrow(), change);
        self.hand_out(visit);
    }

    fn hand_out(&self, visit: Visit) {
        if visit == **self.newest.borrow() {
            return;
        }
        self.newest.replace(Rc::new(visit.clone()));
        self.on_visit.emit(visit);
    }
}

/// Edits of a visit as it came last.
#[hook]
pub fn use_edits(visit: &Rc<Visit>, path: Path, on_visit: &Callback<Visit>) -> Edits {
    let newest = use_mut_ref(|| visit.clone());
    let shown = use_mut_ref(|| visit.clone());
    let is_news = !Rc::ptr_eq(&shown.borrow(), visit);
    if is_news {
        shown.replace(visit.clone());
        newest.replace(visit.clone());
    }
    Edits {
        newest,
        path,
        on_visit: on_visit.clone(),
    }
}
