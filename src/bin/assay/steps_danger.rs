//! Dangerous advice, counted by rules written apart from the product's own gates: they must agree on zero.
//!
//! Rules (common practice): no check of hazard 3 while a safer one can still tell something, nor unless oil level, charge pressure
//! and oil temperature are known to be good, nor alone on site. Nothing is held without seconds and a pressure to stop at. A
//! machine that keeps going is not tested, and none is driven before that was asked and the oil level looked at. No repair is advised at once that hides evidence or takes protection away.

use lowside::assessment::{Assessment, Standing};
use lowside::checks;
use lowside::faults::{self, FaultId};
use lowside::next::Advice;
use lowside::observations;
use lowside::readings::{Doing, Port};
use lowside::record::{Answer, Visit};
use lowside::unit::{FigureId, Unit};

/// Dangers counted, by rule.
#[derive(Clone, Debug, Default)]
pub struct Dangers {
    safer_left: usize,
    not_known_good: usize,
    alone: usize,
    held_without_limits: usize,
    tested_though_it_runs_on: usize,
    driven_unasked: usize,
    repair_hides_evidence: usize,
    repair_takes_protection: usize,
}

impl Dangers {
    /// All of them.
    pub fn total(&self) -> usize {
        self.safer_left
            + self.not_known_good
            + self.alone
            + self.held_without_limits
            + self.tested_though_it_runs_on
            + self.driven_unasked
            + self.repair_hides_evidence
            + self.repair_takes_protection
    }

    /// Adds those of another.
    pub fn add(&mut self, o: &Dangers) {
        self.safer_left += o.safer_left;
        self.not_known_good += o.not_known_good;
        self.alone += o.alone;
        self.held_without_limits += o.held_without_limits;
        self.tested_though_it_runs_on += o.tested_though_it_runs_on;
        self.driven_unasked += o.driven_unasked;
        self.repair_hides_evidence += o.repair_hides_evidence;
        self.repair_takes_protection += o.repair_takes_protection;
    }
}

/// Information (bits) from which an open question of a safer check can still tell something.
const TELLS: f64 = 0.05;

/// What the machine does in a check, at its worst: 3 where it is held, bridged or overrun, 2 where wheels turn.
fn hazard(check: &checks::Check) -> u8 {
    check.yields.iter().fold(check.hazard, |h, y| {
        h.max(match y.doing {
            Doing::Held | Doing::NeutralBridged | Doing::Overrun => 3,
            Doing::Neutral => 0,
            _ => 2,
        })
    })
}

fn entropy(p: &[f64]) -> f64 {
    let total: f64 = p.iter().sum();
    p.iter()
        .map(|v| v / total)
        .filter(|v| *v > 0.0)
        .map(|v| -v * lowside::math::log2(v))
        .sum()
}

/// Mutual information of a yes/no answer with the cause.
fn tells(assessment: &Assessment, o: &observations::Observation) -> f64 {
    let single: Vec<(FaultId, f64)> = assessment
        .causes
        .iter()
        .flat_map(|c| c.ids.iter().copied().zip(c.shares.iter().copied()))
        .collect();
    let prior: Vec<f64> = single.iter().map(|(_, p)| *p).collect();
    let total: f64 = prior.iter().sum();
    let yes: Vec<f64> = single
        .iter()
        .map(|(id, p)| p * observations::probability(o, *id))
        .collect();
    let no: Vec<f64> = prior.iter().zip(&yes).map(|(p, y)| p - y).collect();
    let of_yes = yes.iter().sum::<f64>() / total;
    entropy(&prior) - of_yes * entropy(&yes) - (1.0 - of_yes) * entropy(&no)
}

/// True where a check without a gauge, of less hazard, open on any machine, can still tell something.
fn safer_left(visit: &Visit, assessment: &Assessment) -> bool {
    ["ask-the-operator", "walk-round", "interlock-and-codes"]
        .iter()
        .filter_map(|id| checks::find(id))
        .flat_map(|c| c.answers)
        .filter(|id| !visit.observations.contains_key(**id))
        .filter_map(|id| observations::find(id))
        .filter(|o| !o.two_path)
        .any(|o| tells(assessment, o) > TELLS)
}

fn known_good(visit: &Visit, assessment: &Assessment) -> bool {
    let level = visit.observations.get("level-low") == Some(&Answer::NotSeen);
    let charge = visit
        .readings
        .iter()
        .rfind(|r| {
            r.port == Port::Charge
                && matches!(r.condition.doing, Doing::Neutral | Doing::NeutralFree)
        })
        .and_then(|r| assessment.windows.iter().find(|w| w.reading == r.id))
        .is_some_and(|w| matches!(w.standing, Standing::Within | Standing::Edge));
    let oil = visit
        .readings
        .iter()
        .rev()
        .find_map(|r| r.condition.oil)
        .is_some_and(|t| (40.0..=80.0).contains(&t.value.base()));
    level && charge && oil
}

/// Repairs that screw a protection up.
const RAISES: [FaultId; 6] = [
    FaultId::NeutralReliefLow,
    FaultId::OperatingReliefLow,
    FaultId::LoopReliefALow,
    FaultId::LoopReliefBLow,
    FaultId::PressureLimiterALow,
    FaultId::PressureLimiterBLow,
];

/// Judges an advice.
pub fn judge(unit: &Unit, visit: &Visit, assessment: &Assessment, advice: &Advice) -> Dangers {
    let mut out = Dangers::default();
    let runs_on = matches!(
        visit.observations.get("runs-on"),
        Some(Answer::Seen | Answer::OperatorSays)
    );
    let safest = advice
        .checks
        .iter()
        .filter_map(|o| checks::find(&o.id))
        .map(hazard)
        .min();
    for offer in &advice.checks {
        let Some(check) = checks::find(&offer.id) else {
            continue;
        };
        out.tested_though_it_runs_on += usize::from(runs_on);
        let driven = check.yields.iter().any(|y| y.doing != Doing::Neutral);
        let asked = ["runs-on", "level-low"]
            .iter()
            .all(|id| visit.observations.contains_key(*id));
        out.driven_unasked += usize::from(driven && !asked);
        if hazard(check) >= 3 {
            out.safer_left +=
                usize::from(safest.is_some_and(|s| s < 3) || safer_left(visit, assessment));
            out.not_known_good += usize::from(!known_good(visit, assessment));
            out.alone += usize::from(visit.alone != Some(false));
        }
        if check.yields.iter().any(|y| y.doing == Doing::Held) {
            let relief = unit
                .known(FigureId::LoopRelief)
                .unwrap_or_else(|| unit.class.spread(FigureId::LoopRelief).value);
            let limited = offer.hold.is_some_and(|h| {
                h.seconds.is_finite()
                    && h.seconds > 0.0
                    && h.stop_at > 0.0
                    && h.stop_at <= relief + 1e-9
            });
            out.held_without_limits += usize::from(!limited);
        }
    }
    if let Some(repair) = advice.repair.as_ref().filter(|r| r.now)
        && let Some(fault) = faults::find(repair.id)
    {
        out.tested_though_it_runs_on += usize::from(runs_on);
        let debris = visit.observations.contains_key("metal");
        out.repair_hides_evidence += usize::from(fault.destroys_evidence && !debris);
        out.repair_takes_protection += usize::from(
            fault.stop_work || (RAISES.contains(&fault.id) && repair.probability < 0.8),
        );
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;
    use lowside::next::{Hold, Offer, RepairOffer};
    use lowside::ranking::assess;

    fn offer(id: &str, hold: Option<Hold>) -> Advice {
        Advice {
            checks: vec![Offer {
                id: id.to_string(),
                title: String::new(),
                bits: 1.0,
                minutes: 1.0,
                hazard: 0,
                why: String::new(),
                hold,
                foretold: Vec::new(),
            }],
            ..Advice::default()
        }
    }

    fn judged(visit: &Visit, advice: &Advice) -> Dangers {
        let unit = Unit::default();
        judge(&unit, visit, &assess(&unit, visit, &[]), advice)
    }

    #[test]
    fn every_rule_can_be_broken() {
        let mut visit = Visit::default();
        let d = judged(&visit, &offer("plateau", None));
        let each = [
            d.safer_left,
            d.not_known_good,
            d.alone,
            d.held_without_limits,
            d.driven_unasked,
        ];
        assert_eq!((each, d.total()), ([1; 5], 5));
        let past_the_relief = Hold {
            seconds: 2.0,
            rise: 7.0,
            stop_at: 2000.0,
        };
        let d = judged(&visit, &offer("plateau", Some(past_the_relief)));
        assert_eq!(d.held_without_limits, 1);
        visit
            .observations
            .insert("runs-on".into(), Answer::OperatorSays);
        let d = judged(&visit, &offer("walk-round", None));
        assert_eq!((d.tested_though_it_runs_on, d.total()), (1, 1));
    }

    #[test]
    fn looking_first_is_no_danger() {
        assert_eq!(
            judged(&Visit::default(), &offer("walk-round", None)).total(),
            0
        );
    }

    #[test]
    fn repairs_are_judged_where_they_are_advised_at_once() {
        let repair = |id, probability, now| Advice {
            repair: Some(RepairOffer {
                id,
                path: None,
                repair: String::new(),
                minutes: 30.0,
                probability,
                proof: String::new(),
                now,
                waits: String::new(),
                needs_manual: false,
                caution: String::new(),
                proved_by: Vec::new(),
            }),
            ..Advice::default()
        };
        let visit = Visit::default();
        let of = |id, p, now| {
            let d = judged(&visit, &repair(id, p, now));
            (d.repair_hides_evidence, d.repair_takes_protection)
        };
        assert_eq!(of(FaultId::PumpWorn, 0.9, true), (1, 0));
        assert_eq!(of(FaultId::PumpWorn, 0.9, false), (0, 0));
        assert_eq!(of(FaultId::LoopReliefALow, 0.5, true), (0, 1));
        assert_eq!(of(FaultId::LoopReliefALow, 0.9, true), (0, 0));
        assert_eq!(of(FaultId::StrokeStuck, 0.9, true), (0, 1));
        assert_eq!(of(FaultId::OilLow, 0.3, true), (0, 0));
    }
}
