//! What can be asked of the state.

use std::rc::Rc;

use super::{Question, State};
use crate::assessment::Assessment;
use crate::demo;
use crate::record::{Visit, natural};
use crate::store::RecordKey as Key;
use crate::unit::Unit;

impl State {
    /// Plain words for a record.
    pub fn name_of(&self, key: &Key) -> String {
        let unit = |id: &str| {
            self.units
                .get(id)
                .map_or_else(|| "A unit".to_owned(), |unit| format!("Unit {}", unit.name))
        };
        match key {
            Key::Unit(id) => unit(id),
            Key::Visit(id) => self.visits.get(id).map_or_else(
                || "A call".to_owned(),
                |visit| format!("The call on {}", unit(&visit.unit)),
            ),
            Key::Settings => "The list of instruments and settings".to_owned(),
        }
    }

    /// True where a write would do something: something is dirty that waits for no choice.
    pub fn is_write_due(&self) -> bool {
        self.dirty.iter().any(|key| !self.contested.contains(key))
    }

    /// True while there is something of the demo yard that "remove the demo" would take away.
    pub fn has_demo(&self) -> bool {
        let is_own_call_on = |unit: &str| {
            let mut calls = self.visits.values().filter(|visit| visit.unit == unit);
            calls.any(|visit| !demo::is_demo(&visit.id))
        };
        self.visits.keys().any(|id| demo::is_demo(id))
            || self
                .units
                .keys()
                .any(|id| demo::is_demo(id) && !is_own_call_on(id))
    }

    /// Visits of a unit, latest first.
    pub fn visits_of(&self, unit: &str) -> Vec<Rc<Visit>> {
        let mut visits: Vec<_> = self
            .visits
            .values()
            .filter(|visit| visit.unit == unit)
            .cloned()
            .collect();
        visits.sort_by(|a, b| (&b.opened, &b.id).cmp(&(&a.opened, &a.id)));
        visits
    }

    /// Earlier visits to the same unit, latest first.
    pub fn visits_before(&self, visit: &Visit) -> Vec<Rc<Visit>> {
        let mut visits = self.visits_of(&visit.unit);
        visits.retain(|other| (&other.opened, &other.id) < (&visit.opened, &visit.id));
        visits
    }

    /// Units, the one called last first, those without a call by name behind them.
    pub fn units_by_last_call(&self) -> Vec<Rc<Unit>> {
        let last = |unit: &Rc<Unit>| {
            let visits = self.visits.values().filter(|visit| visit.unit == unit.id);
            visits.map(|visit| visit.opened.clone()).max()
        };
        let mut units: Vec<Rc<Unit>> = self.units.values().cloned().collect();
        units.sort_by_cached_key(|unit| {
            (
                std::cmp::Reverse(last(unit)),
                unit.name.to_lowercase(),
                unit.id.clone(),
            )
        });
        units
    }

    /// Units by name: "T-9" before "T-14".
    pub fn units_by_name(&self) -> Vec<Rc<Unit>> {
        let mut units: Vec<Rc<Unit>> = self.units.values().cloned().collect();
        units.sort_by_cached_key(|unit| (natural(&unit.name), unit.id.clone()));
        units
    }

    /// What to ask the engine about a visit; none where visit or unit are not there.
    pub fn question(&self, visit: &str) -> Option<Question> {
        let visit = self.visits.get(visit)?.clone();
        let unit = self.units.get(&visit.unit)?.clone();
        Some(Question {
            unit,
            visit,
            instruments: self.instruments.clone(),
        })
    }

    /// The last assessment of a visit, and whether a better one is to come: something was edited since, or it is a first look.
    pub fn answer(&self, visit: &str) -> (Option<Rc<Assessment>>, bool) {
        let answer = self.answers.get(visit);
        let is_current = answer
            .zip(self.question(visit))
            .is_some_and(|(answer, question)| {
                answer.asked == question && !answer.assessment.trust.first_look
            });
        (
            answer.map(|answer| answer.assessment.clone()),
            !is_current && self.engine_trouble.is_none(),
        )
    }
}
