//! Which null is off: the control's or the servo's. Bridging the servo ports takes the control out (common practice), so what
//! is left is the servo's; the rest is the control's. The servo pressures say it a second way.

use super::belief::{Belief, before, places};
use super::offset::{Taken, log_likelihood};
use super::response::{Machine, Shows, machines};
use crate::math;
use crate::readings::Condition;
use crate::unit::Unit;

/// Both nulls, as swash offsets: share of full stroke, forward positive.
#[derive(Clone, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Nulls {
    /// What the control asks in neutral.
    pub control: Part,
    /// Where the servo piston or the swash stands when nothing is asked.
    pub servo: Part,
    /// Where it is, as far as that can be told.
    pub sits: Sits,
}

/// One of the two.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct Part {
    /// Mean.
    pub mean: f64,
    /// 95 % interval, low end.
    pub low: f64,
    /// 95 % interval, high end.
    pub high: f64,
}

impl Part {
    fn of(belief: &Belief) -> Part {
        Part {
            mean: belief.mean(),
            low: belief.quantile(0.025),
            high: belief.quantile(0.975),
        }
    }

    /// True where the interval does not hold null.
    #[must_use]
    pub fn is_off(self) -> bool {
        self.low > 0.0 || self.high < 0.0
    }
}

/// Where the offset sits.
#[derive(Clone, Copy, Debug, PartialEq, Eq, serde::Serialize, serde::Deserialize)]
pub enum Sits {
    /// In the control.
    Control,
    /// In the servo.
    Servo,
    /// In both.
    Both,
    /// In neither, within what these readings can tell.
    Neither,
}

/// Control null and servo null from readings without and with the bridge. None without a bridged reading, without another one,
/// or where no machine could show them.
#[must_use]
pub fn nulls(unit: &Unit, taken: &[Taken]) -> Option<Nulls> {
    let asked: Vec<(Shows, Condition)> = taken.iter().map(|t| (t.shows, t.condition)).collect();
    let bridged = |shows: Shows| shows == Shows::CreepBridged;
    if !asked.iter().any(|(shows, _)| bridged(*shows))
        || asked.iter().all(|(shows, _)| bridged(*shows))
    {
        return None;
    }
    let (mut control, mut servo) = (Vec::new(), Vec::new());
    // Machine by machine, for both readings are of one machine.
    for machine in machines(unit, &asked) {
        let part = |keep: bool| single(&machine, taken, |shows| bridged(shows) == keep);
        let (Some((open, w_open)), Some((alone, w_alone))) = (part(false), part(true)) else {
            continue;
        };
        let weight = w_open * w_alone;
        for (v, pv) in decile(&alone) {
            servo.push((v, weight * pv));
            for (u, pu) in decile(&open) {
                control.push((u - machine.left_by_feedback * v, weight * pv * pu));
            }
        }
    }
    let (control, servo) = (
        Part::of(&Belief::from_points(control)?),
        Part::of(&Belief::from_points(servo)?),
    );
    let sits = match (control.is_off(), servo.is_off()) {
        (true, true) => Sits::Both,
        (true, false) => Sits::Control,
        (false, true) => Sits::Servo,
        (false, false) => Sits::Neither,
    };
    Some(Nulls {
        control,
        servo,
        sits,
    })
}

/// What one machine makes of some of the readings: its belief, and how well it explains them.
fn single(
    machine: &Machine,
    taken: &[Taken],
    keep: impl Fn(Shows) -> bool,
) -> Option<(Belief, f64)> {
    let kept: Vec<Taken> = taken.iter().copied().filter(|t| keep(t.shows)).collect();
    let curves = taken
        .iter()
        .zip(&machine.curves)
        .filter(|(t, _)| keep(t.shows))
        .map(|(_, curve)| curve.clone())
        .collect();
    let own = Machine {
        curves,
        ..machine.clone()
    };
    let logs: Vec<f64> = places()
        .iter()
        .map(|s| log_likelihood(&own, &kept, *s) + before(*s))
        .collect();
    let belief = Belief::from_logs(&logs)?;
    // Evidence: the likelihood summed over what was believed before.
    Some((belief, Belief::total(&logs)))
}

/// Ten values of equal weight.
fn decile(belief: &Belief) -> Vec<(f64, f64)> {
    (0..10)
        .map(|i| (belief.quantile((f64::from(i) + 0.5) / 10.0), 0.1))
        .collect()
}

/// What a difference of servo pressures (forward port over reverse port, bar, with its standard uncertainty) asks of the swash.
///
/// Between the springs' preloads the piston does not move: then the control pushes, and nothing comes of it.
#[derive(Clone, Copy, Debug, PartialEq, serde::Serialize, serde::Deserialize)]
pub struct ServoPush {
    /// Stroke that the control's push makes, share of full, forward positive.
    pub stroke: Part,
    /// Chance that the piston stays on its springs.
    pub rests: f64,
    /// Preload that was taken for the springs, bar: median.
    pub preload: f64,
}

/// The servo's own law, over the unit's scatter: nothing under the start pressure, full stroke at the full-stroke pressure.
#[must_use]
pub fn servo_push(unit: &Unit, difference: f64, uncertainty: f64) -> Option<ServoPush> {
    let ensemble = machines(unit, &[]);
    let mut points = Vec::new();
    let mut preloads = Vec::new();
    let mut rests = 0.0;
    for machine in &ensemble {
        preloads.push((machine.servo_start, 1.0));
        for i in 0..9 {
            let z = math::normal_quantile((f64::from(i) + 0.5) / 9.0);
            let bar = difference + z * uncertainty;
            let past = (bar.abs() - machine.servo_start).max(0.0);
            let stroke = past / (machine.servo_full - machine.servo_start).max(0.1);
            if past == 0.0 {
                rests += 1.0;
            }
            points.push((stroke.min(1.0) * bar.signum(), 1.0));
        }
    }
    let count = points.len() as f64;
    Some(ServoPush {
        stroke: Part::of(&Belief::from_points(points)?),
        rests: rests / count,
        preload: Belief::from_points(preloads)?.quantile(0.5),
    })
}
