//! The table as a whole: complete, ordered, plausible.

use super::{Fault, FaultId, all, find};
use crate::circuit::{Param, Scale};
use crate::faults::{Bend, SeverityShape};
use crate::unit::{
    CaseLines, ChargeSource, Control, Filter, LoopReliefTo, MachineClass, ReliefDrain, Shuttle,
    Tick, Unit,
};
use std::collections::BTreeSet;

/// Causes that leave every reading of the circuit as it is.
const SILENT: [FaultId; 4] = [
    FaultId::Healthy,
    FaultId::NotListed,
    FaultId::OperatorOrLoad,
    // Only the fast range is missing, and no condition asks for it.
    FaultId::MotorStuckLarge,
];

#[test]
fn one_entry_for_every_id_in_order() {
    assert_eq!(all().len(), FaultId::ALL.len());
    for (entry, id) in all().iter().zip(FaultId::ALL) {
        assert_eq!(entry.id, *id);
        assert_eq!(find(*id).map(|f| f.id), Some(*id));
    }
}

#[test]
fn every_text_is_there() {
    for f in all() {
        for (name, text) in [
            ("title", f.title),
            ("explains", f.explains),
            ("proof", f.proof),
            ("repair", f.repair),
        ] {
            assert!(!text.trim().is_empty(), "{:?}: no {name}", f.id);
            assert!(
                !text.contains("  "),
                "{:?}: {name} has a double space",
                f.id
            );
        }
        for text in [f.explains, f.proof, f.repair] {
            assert!(text.ends_with('.'), "{:?}: {text}", f.id);
        }
        assert!(!f.caution.contains("  "), "{:?}", f.id);
        assert!(
            f.title.chars().count() <= 80,
            "{:?}: title too long for a phone",
            f.id
        );
        assert!(f.minutes > 0.0 && f.minutes <= 960.0, "{:?}", f.id);
    }
}

#[test]
fn titles_differ() {
    let titles: BTreeSet<&str> = all().iter().map(|f| f.title).collect();
    assert_eq!(titles.len(), all().len());
}

#[test]
fn base_rates_are_per_hundred() {
    assert!(all().iter().all(|f| f.per_hundred > 0.0));
    let total: f64 = all().iter().map(|f| f.per_hundred).sum();
    assert!((95.0..=105.0).contains(&total), "{total}");
}

#[test]
fn silent_causes_only_where_meant() {
    for f in all() {
        assert_eq!(f.effects.is_empty(), SILENT.contains(&f.id), "{:?}", f.id);
        assert!(f.effects.iter().all(|e| !e.bends.is_empty()), "{:?}", f.id);
    }
}

#[test]
fn severities_run_from_mild_to_total() {
    for f in all() {
        for (param, bend) in f.effects.iter().flat_map(|e| e.bends) {
            let what = format!("{:?} {param:?} {bend:?}", f.id);
            match *bend {
                Bend::Times(mild, total) => {
                    assert!(mild > 0.0 && total > 0.0, "{what}");
                    assert!(ln(total).abs() >= ln(mild).abs(), "{what}");
                    assert!(ln(total) * ln(mild) >= 0.0, "both to one side: {what}");
                    assert_eq!(param.scale(), Scale::Log, "{what}");
                }
                Bend::TimesLinear(mild, total) => {
                    assert!(
                        (0.0..=1.0).contains(&mild) && (0.0..mild).contains(&total),
                        "{what}"
                    );
                    assert_eq!(param.scale(), Scale::Linear, "{what}");
                    assert!(param.healthy() > 0.0, "nothing to multiply: {what}");
                }
                Bend::Plus(mild, total)
                | Bend::PlusGeometric(mild, total)
                | Bend::PlusEitherSign(mild, total) => {
                    assert!(0.0 < mild && mild < total, "{what}");
                    assert_eq!(param.scale(), Scale::Linear, "{what}");
                }
            }
        }
    }
}

fn ln(x: f64) -> f64 {
    crate::math::ln(x)
}

#[test]
fn shares_stay_shares() {
    use Param as P;
    for f in all() {
        for (param, bend) in f.effects.iter().flat_map(|e| e.bends) {
            if let Bend::Plus(_, total)
            | Bend::PlusGeometric(_, total)
            | Bend::PlusEitherSign(_, total) = bend
                && matches!(
                    param,
                    P::Air | P::ShuttleStuckA | P::ShuttleStuckB | P::NullControl | P::NullServo
                )
            {
                assert!(*total <= 1.0, "{:?} {param:?}", f.id);
            }
        }
    }
}

#[test]
fn twins_mirror_each_other() {
    let pairs = [
        (FaultId::CheckALeaking, FaultId::CheckBLeaking),
        (FaultId::CheckAShut, FaultId::CheckBShut),
        (FaultId::LoopReliefALow, FaultId::LoopReliefBLow),
        (FaultId::LoopReliefAHigh, FaultId::LoopReliefBHigh),
        (FaultId::ShuttleStuckA, FaultId::ShuttleStuckB),
        (FaultId::PressureLimiterALow, FaultId::PressureLimiterBLow),
        (FaultId::LinkageShortForward, FaultId::LinkageShortReverse),
        (FaultId::SignalLostForward, FaultId::SignalLostReverse),
    ];
    let entry = |id| find(id).unwrap();
    for (a, b) in pairs {
        let (a, b): (&Fault, &Fault) = (entry(a), entry(b));
        assert_eq!(a.column, b.column);
        assert_eq!(a.severity, b.severity);
        assert_eq!(a.minutes, b.minutes);
        assert_eq!(a.effects.len(), b.effects.len());
        for (x, y) in a.effects.iter().zip(b.effects) {
            for ((p, bend_a), (q, bend_b)) in x.bends.iter().zip(y.bends) {
                assert_eq!(bend_a, bend_b);
                let mirrored = format!("{p:?}")
                    .replace("ReliefA", "ReliefB")
                    .replace("LeakA", "LeakB")
                    .replace("CheckA", "CheckB")
                    .replace("StuckA", "StuckB")
                    .replace("LimiterA", "LimiterB")
                    .replace("Forward", "Reverse");
                assert_eq!(mirrored, format!("{q:?}"));
            }
        }
    }
}

#[test]
fn only_a_stuck_stroke_stops_all_work() {
    let stop: Vec<FaultId> = all().iter().filter(|f| f.stop_work).map(|f| f.id).collect();
    assert_eq!(stop, [FaultId::StrokeStuck]);
    assert!(all().iter().any(|f| f.severity == SeverityShape::MostlyBad));
}

/// Units with every class and every answer to every tick that a mask looks at.
fn units() -> Vec<Unit> {
    let ticks = [Tick::Yes, Tick::No, Tick::Unknown];
    let mut out = Vec::new();
    for class in MachineClass::ALL {
        for control in Control::ALL {
            for tick in ticks {
                for source in [
                    ChargeSource::OwnPump,
                    ChargeSource::Steering,
                    ChargeSource::Implement,
                    ChargeSource::Unknown,
                ] {
                    let mut u = Unit {
                        class,
                        ..Unit::default()
                    };
                    u.ticks.control = control;
                    u.ticks.charge_source = source;
                    u.ticks.flushing = tick;
                    u.ticks.limiter = tick;
                    u.ticks.two_speed = tick;
                    u.ticks.bypass = tick;
                    u.ticks.brake_from_charge = tick;
                    u.ticks.shift_from_charge = tick;
                    u.ticks.slipping_drive = tick;
                    u.ticks.shuttle = Shuttle::Unknown;
                    u.ticks.filter = Filter::Unknown;
                    u.ticks.relief_drain = ReliefDrain::Unknown;
                    u.ticks.loop_relief_to = LoopReliefTo::Unknown;
                    u.ticks.case_lines = CaseLines::Unknown;
                    out.push(u);
                }
            }
        }
    }
    out
}

#[test]
fn masks_stay_within_bounds() {
    for u in units() {
        for f in all() {
            let p = (f.possible)(&u);
            assert!((0.0..=5.0).contains(&p), "{:?}: {p}", f.id);
        }
    }
}

fn possible(id: FaultId, u: &Unit) -> f64 {
    (find(id).unwrap().possible)(u)
}

#[test]
fn what_is_not_fitted_is_masked() {
    for u in units() {
        let t = &u.ticks;
        let flushing = possible(FaultId::ShuttleCentred, &u);
        match t.flushing {
            Tick::No => assert_eq!(flushing, 0.0),
            Tick::Yes => assert_eq!(flushing, 1.0),
            Tick::Unknown => assert_eq!(flushing, u.class.practice().flushing),
        }
        if t.limiter == Tick::No {
            assert_eq!(possible(FaultId::PressureLimiterALow, &u), 0.0);
            assert_eq!(possible(FaultId::PressureLimiterStuck, &u), 0.0);
        }
        if t.two_speed == Tick::No {
            assert_eq!(possible(FaultId::MotorStuckSmall, &u), 0.0);
            assert_eq!(possible(FaultId::MotorShiftSupplyLow, &u), 0.0);
        }
        if t.control == Control::DirectManual {
            for id in [
                FaultId::ServoNullOff,
                FaultId::ServoLeak,
                FaultId::ControlOrificeBlocked,
                FaultId::PilotSupplyLow,
                FaultId::SignalLostForward,
                FaultId::SignalWeak,
                FaultId::InterlockOrDerate,
                FaultId::FeedbackLinkWorn,
            ] {
                assert_eq!(possible(id, &u), 0.0, "{id:?}");
            }
        }
        let inching = possible(FaultId::InchingOff, &u) > 0.0;
        assert_eq!(
            inching,
            matches!(t.control, Control::SpeedSensing | Control::Unknown)
        );
        if t.charge_source == ChargeSource::OwnPump {
            assert_eq!(possible(FaultId::ChargeStarvedByFunction, &u), 0.0);
        }
        assert!(possible(FaultId::InputDriveSlipping, &u) > 0.0);
        assert!(possible(FaultId::BrakeDragging, &u) > 0.0);
    }
}

#[test]
fn a_two_position_shuttle_has_no_middle_to_stick_in() {
    let mut u = Unit::default();
    u.ticks.flushing = Tick::Yes;
    u.ticks.shuttle = Shuttle::TwoPosition;
    assert_eq!(possible(FaultId::ShuttleCentred, &u), 0.0);
    assert_eq!(possible(FaultId::ShuttleStuckA, &u), 1.0);
}
