//! Which readings the watch view shows, and with what.

use super::gate::{self, Gate};
use super::group::groups;
use super::rig;
use super::watch::Watched;
use crate::app::platform::clock;
use crate::assessment::Assessment;
use crate::readings::Reading;
use crate::readings::instrument::Instrument;
use crate::record::Visit;

/// The readings of these ids, in their order.
pub fn watched(
    ids: &[String],
    visit: &Visit,
    instruments: &[Instrument],
    assessment: Option<&Assessment>,
) -> Vec<Watched> {
    let now = clock::now_ms();
    ids.iter()
        .filter_map(|id| visit.readings.iter().find(|reading| reading.id == *id))
        .map(|reading| Watched {
            reading: reading.clone(),
            window: assessment.and_then(|assessment| {
                let mut windows = assessment.windows.iter();
                windows.find(|window| window.reading == reading.id).cloned()
            }),
            instrument: rig::on_port(reading, visit, instruments).current,
            closed: gate::closes_now(&gates(reading, visit, now), reading),
        })
        .collect()
}

fn gates(reading: &Reading, visit: &Visit, now: f64) -> Vec<Gate> {
    Gate::of(&reading.condition, &[reading.port], visit, now)
}

/// These readings, and those of the groups after theirs while the machine does the same: a build-up goes on from step to step and low
/// idle to high idle without a look at the list.
pub fn with_following(ids: Vec<String>, visit: &Visit) -> Vec<String> {
    let of = |place: &usize| visit.readings.get(*place);
    let Some(first) = visit
        .readings
        .iter()
        .find(|reading| ids.first() == Some(&reading.id))
    else {
        return ids;
    };
    let now = clock::now_ms();
    let round = |reading: &Reading| {
        let condition = &reading.condition;
        gate::code(condition.doing, condition.direction)
    };
    let groups = groups(&visit.readings, &[]);
    let after = groups
        .iter()
        .skip_while(|group| {
            !group
                .at
                .iter()
                .filter_map(of)
                .any(|reading| reading.id == first.id)
        })
        .skip(1)
        .flat_map(|group| group.at.iter().filter_map(of));
    let more: Vec<String> = after
        .filter(|reading| round(reading) == round(first) && super::entry::is_open(reading))
        .filter(|reading| gate::closes_now(&gates(reading, visit, now), reading).is_none())
        .map(|reading| reading.id.clone())
        .collect();
    ids.into_iter().chain(more).collect()
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
