//! Which readings the watch view shows, and with what.

use super::gate::{self, Gate};
use super::rig;
use super::watch::Watched;
use crate::app::platform::clock;
use crate::assessment::Assessment;
use crate::readings::instrument::Instrument;
use crate::readings::{Port, Reading};
use crate::record::Visit;

/// The readings of these ids, in their order. All are of one condition.
pub fn watched(
    ids: &[String],
    visit: &Visit,
    instruments: &[Instrument],
    assessment: Option<&Assessment>,
) -> Vec<Watched> {
    let readings: Vec<&Reading> = ids
        .iter()
        .filter_map(|id| visit.readings.iter().find(|reading| reading.id == *id))
        .collect();
    let Some(first) = readings.first() else {
        return Vec::new();
    };
    let ports: Vec<Port> = readings.iter().map(|reading| reading.port).collect();
    let gates = Gate::of(&first.condition, &ports, visit, clock::now_ms());
    readings
        .into_iter()
        .map(|reading| Watched {
            reading: reading.clone(),
            window: assessment.and_then(|assessment| {
                let mut windows = assessment.windows.iter();
                windows.find(|window| window.reading == reading.id).cloned()
            }),
            instrument: rig::on_port(reading, visit, instruments).current,
            closed: gate::closes_now(&gates, reading),
        })
        .collect()
}

/// The readings of a group that may be watched now: those without an answer, or all where each has one.
pub fn watchable(readings: &[&Reading], gates: &[Gate]) -> Vec<String> {
    let may: Vec<&&Reading> = readings
        .iter()
        .filter(|reading| gate::closes_now(gates, reading).is_none())
        .collect();
    let open = may.iter().filter(|reading| super::entry::is_open(reading));
    let open: Vec<String> = open.map(|reading| reading.id.clone()).collect();
    if open.is_empty() {
        return may.into_iter().map(|reading| reading.id.clone()).collect();
    }
    open
}
