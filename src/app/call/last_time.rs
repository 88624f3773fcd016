//! The same reading on the unit's earlier calls: shown beside the field, with what today's is of it.

use super::quick::alike;
use super::side::Sides;
use super::words;
use crate::app::platform::clock;
use crate::quantity::{Kind, UnitPrefs};
use crate::readings::{Port, Reading, Seen};
use crate::record::Visit;
use std::rc::Rc;
use yew::{Html, html};

/// Calls on the unit before this one, latest first. Equal to the same list of the same objects: nothing is compared field by
/// field on every drawing.
#[derive(Clone, Debug, Default)]
pub struct EarlierCalls(pub Vec<Rc<Visit>>);

impl PartialEq for EarlierCalls {
    fn eq(&self, other: &Self) -> bool {
        self.0.len() == other.0.len()
            && self
                .0
                .iter()
                .zip(&other.0)
                .all(|(one, other)| Rc::ptr_eq(one, other))
    }
}

/// What the same port showed in the same condition.
#[derive(Clone, Debug, PartialEq)]
pub struct LastTime {
    /// What was seen.
    pub seen: Seen,
    /// When the call was opened (ISO 8601).
    pub when: String,
}

impl EarlierCalls {
    /// The latest earlier call on which this was read.
    pub fn of(&self, reading: &Reading, sides: Sides) -> Option<LastTime> {
        let side = |reading: &Reading| sides.side(reading.port, reading.path);
        self.0.iter().find_map(|visit| {
            let same = visit.readings.iter().rev().find_map(|other| {
                let is_same = other.port == reading.port
                    && side(other) == side(reading)
                    && alike(&other.condition, &reading.condition);
                let seen = other.seen.as_ref().filter(|_| is_same)?;
                matches!(
                    seen,
                    Seen::Value { .. } | Seen::Swing { .. } | Seen::Nothing | Seen::OffScale { .. }
                )
                .then(|| seen.clone())
            })?;
            Some(LastTime {
                seen: same,
                when: visit.opened.clone(),
            })
        })
    }
}

/// Share of the last value that today's is; none where a share says nothing: temperatures, what runs through zero.
fn share(port: Port, now: Option<&Seen>, last: &Seen) -> Option<f64> {
    let (Some(Seen::Value { value: now }), Seen::Value { value: last }) = (now, last) else {
        return None;
    };
    let is_signed = matches!(
        port,
        Port::LoopDifference | Port::InletPull | Port::PumpCase | Port::MotorCase
    );
    if is_signed || port.kind() == Kind::Temperature || last.base() <= 0.0 || now.base() < 0.0 {
        return None;
    }
    Some(now.base() / last.base())
}

/// One line under the field.
pub fn told(reading: &Reading, last: Option<&LastTime>, number: usize, prefs: &UnitPrefs) -> Html {
    let Some(last) = last else {
        return Html::default();
    };
    let share = share(reading.port, reading.seen.as_ref(), &last.seen);
    html! {
        <p class="last-time" data-testid={format!("last-time-{number}")}>
            { "Last time " }
            <strong class="figure">{ words::seen(reading.port, &last.seen, prefs) }</strong>
            { format!(", {}", clock::tell(&last.when)) }
            if let Some(share) = share {
                { format!(": now {} of it", times(share)) }
            }
            { "." }
        </p>
    }
}

/// A share that may be well over one.
fn times(share: f64) -> String {
    if share > 9.99 {
        return String::from("over 10 times");
    }
    format!("{:.0}\u{202F}%", share * 100.0)
}

/// Why "last time" is not among the things a share is taken of.
pub fn why_not(last: Option<&LastTime>) -> String {
    match last {
        Some(last) => format!(
            "Last time is not in the list: its value stands in the record ({}), so type today’s value.",
            clock::tell(&last.when)
        ),
        None => String::from(
            "Last time is not in the list: no earlier call here has this reading, and a share of a figure nobody wrote down \
             tells nothing.",
        ),
    }
}
