//! What can be asked of the state.

use std::cmp::Reverse;
use std::collections::{BTreeMap, BTreeSet};
use std::rc::Rc;

use super::{Question, State};
use crate::assessment::Assessment;
use crate::call::attention::Attention;
use crate::demo;
use crate::record::{UnitOrder, Visit, natural};
use crate::store::RecordKey as Key;
use crate::unit::{MachineClass, Unit};
use crate::yard::learn::{self, Rates};

/// A unit in a list.
#[derive(Clone, Debug, PartialEq)]
pub struct Listed {
    /// The unit.
    pub unit: Rc<Unit>,
    /// Its last call.
    pub last: Option<Rc<Visit>>,
    /// What it asks for.
    pub attention: Attention,
}

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

    /// A visit with its unit, where both are here.
    pub fn visit(&self, id: &str) -> Option<(&Rc<Visit>, &Rc<Unit>)> {
        let visit = self.visits.get(id)?;
        Some((visit, self.units.get(&visit.unit)?))
    }

    /// True where the visit of this id is a yard check.
    pub fn is_yard_check(&self, id: &str) -> bool {
        self.visits
            .get(id)
            .is_some_and(|visit| visit.is_yard_check())
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

    /// Units with their last call, in the order that the person chose, those whose name or class holds `search` (small
    /// letters). One pass over the visits: the list stays quick with thousands of them.
    pub fn listed(&self, search: &str) -> Vec<Listed> {
        let mut last: BTreeMap<&str, &Rc<Visit>> = BTreeMap::new();
        for visit in self.visits.values() {
            let newest = last.entry(visit.unit.as_str()).or_insert(visit);
            if (&visit.opened, &visit.id) > (&newest.opened, &newest.id) {
                *newest = visit;
            }
        }
        let is_wanted = |unit: &&Rc<Unit>| {
            search.is_empty()
                || unit.name.to_lowercase().contains(search)
                || unit.class.words().to_lowercase().contains(search)
        };
        let mut listed: Vec<Listed> = self
            .units
            .values()
            .filter(is_wanted)
            .map(|unit| {
                let last = last.get(unit.id.as_str()).map(|visit| (*visit).clone());
                Listed {
                    attention: Attention::of(last.as_deref()),
                    unit: unit.clone(),
                    last,
                }
            })
            .collect();
        let name = |listed: &Listed| (natural(&listed.unit.name), listed.unit.id.clone());
        let opened = |listed: &Listed| Reverse(listed.last.as_ref().map(|v| v.opened.clone()));
        match self.settings.unit_order {
            UnitOrder::Name => listed.sort_by_cached_key(name),
            UnitOrder::LastCall => listed.sort_by_cached_key(|one| (opened(one), name(one))),
            UnitOrder::Attention => {
                listed.sort_by_cached_key(|one| (one.attention, opened(one), name(one)));
            }
        }
        listed
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
            rates: self.rates_for(&visit, &unit),
            unit,
            visit,
            instruments: self.instruments.clone(),
        })
    }

    /// Base rates that hold for a visit: what the shop's other closed cases taught about machines of its class.
    fn rates_for(&self, visit: &Visit, unit: &Unit) -> Rc<Rates> {
        if visit.closed.is_some() {
            let (class, learning) = (unit.class, &self.settings.learning);
            return Rc::new(learn::rates_for(&visit.id, class, &self.cases, learning));
        }
        self.rates.get(&unit.class).cloned().unwrap_or_default()
    }

    /// Learns anew from what is closed.
    pub(super) fn relearn(&mut self) {
        let units = self.units.values().map(|unit| &**unit);
        let visits = self.visits.values().map(|visit| &**visit);
        let learning = &self.settings.learning;
        let cases = learn::cases(units, visits, learning);
        let classes: BTreeSet<MachineClass> = self.units.values().map(|unit| unit.class).collect();
        let made: BTreeMap<MachineClass, Rc<Rates>> = classes
            .into_iter()
            .map(|class| {
                let rates = Rc::new(learn::rates(&cases, Some(class), learning));
                // The same rates stay the same object, so that nothing is calculated anew.
                let before = self.rates.get(&class).filter(|before| **before == rates);
                (class, before.cloned().unwrap_or(rates))
            })
            .collect();
        self.rates = made;
        self.cases = Rc::new(cases);
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
