//! Which loss has grown: leakage and slip of the fit at one pressure and viscosity, held against the unit's profile or, where that is
//! silent, against what is usual for the size. Nothing is usual enough of drag and friction to be held against.

use super::channel::Subject;
use super::fit::Loss;
use super::flaw::{Part, lies};
use super::report::BenchReport;
use super::uncertain::Uncertain;
use crate::machine::MEASURED_LEAKAGE;
use crate::math;
use crate::readings::instrument::gum;
use crate::unit::{FigureId, Source, Unit};

/// Width of a leakage that a manual states, relative (1 sigma). Common practice.
const STATED: f64 = 0.20;

/// A loss of the run beside what is known or usual.
#[derive(Clone, Debug, PartialEq)]
pub struct Beside {
    /// Which: leakage into the case, or all slip as laminar.
    pub loss: Loss,
    /// L/min at 200 bar and 27.5 mPa·s.
    pub now: Uncertain,
    /// The same by profile or practice, L/min.
    pub known: f64,
    /// Where that is from.
    pub from: String,
    /// How many times it is now, with the interval of about 95 % in which both doubts stand.
    pub times: (f64, f64, f64),
}

impl Beside {
    /// True where all of the interval lies over 1.
    #[must_use]
    pub fn is_grown(&self) -> bool {
        self.times.0 > 1.0
    }
}

/// Leakage and slip beside what is known of them. Empty for a whole drive, without a fit, and where an instrument lies.
#[must_use]
pub fn beside(report: &BenchReport, machine: Option<&Unit>) -> Vec<Beside> {
    let losses = &report.losses;
    let (case_id, slip_id, volume_id) = match losses.subject {
        Subject::Pump => (
            FigureId::PumpCaseLeakage,
            FigureId::PumpSlip,
            FigureId::PumpDisplacement,
        ),
        Subject::Motor => (
            FigureId::MotorCaseLeakage,
            FigureId::MotorSlip,
            FigureId::MotorDisplacement,
        ),
        Subject::Transmission => return Vec::new(),
    };
    let Some(machine) = machine else {
        return Vec::new();
    };
    let is_sound = |part: Part| lies(&report.left_out, &[part]).is_none();
    let proposed = |id: FigureId| {
        let found = report.proposals.iter().find(|proposal| proposal.id == id)?;
        let value = found.value.base();
        Some(Uncertain {
            value,
            standard: found.share * value,
        })
    };
    let volume = report.evaluated.analysis.displacement;
    [
        (Loss::Case, case_id, Part::Case),
        (Loss::Laminar, slip_id, Part::Flow),
    ]
    .into_iter()
    .filter(|(_, _, part)| is_sound(*part))
    .filter_map(|(loss, id, _)| {
        let now = proposed(id)?;
        let (known, width, from) = known(machine, id, volume_id, volume, now.value);
        let ratio = now.value / known;
        let factor = math::exp(2.0 * gum::combined(&[now.standard / now.value, width]));
        ratio.is_finite().then(|| Beside {
            loss,
            now,
            known,
            from,
            times: (ratio / factor, ratio, ratio * factor),
        })
    })
    .collect()
}

/// What the profile has of a leakage, L/min, with its relative width and where it is from; else what is usual for the size.
fn known(
    machine: &Unit,
    id: FigureId,
    volume_id: FigureId,
    volume: Option<f64>,
    now: f64,
) -> (f64, f64, String) {
    let figure = machine.figures.get(&id);
    let own = figure
        .and_then(|figure| Some((figure.value?.base(), figure.source)))
        // What this very run put there says nothing of it.
        .filter(|(value, _)| *value > 0.0 && (value - now).abs() > 1e-6 * now);
    if let Some((value, source)) = own.filter(|(_, source)| *source != Source::Practice) {
        let width = match source {
            Source::Measured => MEASURED_LEAKAGE,
            _ => STATED,
        };
        return (value, width, format!("profile, {}", source.words()));
    }
    let usual = machine.class.spread(id);
    let of_class = machine.class.spread(volume_id).value;
    // Leakage grows with the machine.
    let size = volume.map_or(1.0, |volume| volume / of_class);
    let from = "common practice for this size".to_owned();
    (usual.value * size, usual.relative, from)
}

/// What has grown, in words, and what that points to (common practice); none where nothing has.
#[must_use]
pub fn points_to(found: &[Beside], subject: Subject) -> Option<&'static str> {
    let grown = |loss: Loss| found.iter().any(|one| one.loss == loss && one.is_grown());
    match (grown(Loss::Case), grown(Loss::Laminar)) {
        (true, _) if subject == Subject::Motor => Some(
            "Leakage into the case has grown: pistons and slippers, or the bearing plate to the case",
        ),
        (true, _) => Some(
            "Leakage into the case has grown: pistons, slippers, or the block to the port plate",
        ),
        (false, true) => Some(
            "Slip has grown and leakage into the case is not shown to have: across the port plate, kidney to kidney, or a check, relief or bypass seat",
        ),
        (false, false) => None,
    }
}
