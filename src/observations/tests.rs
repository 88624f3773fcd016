use super::{
    CLIP, COLUMNS, Family, Group, all, detail, find, log_weights, prior_factor, probability,
    stop_work,
};
use crate::faults::{self, Column, FaultId};
use crate::record::Answer;
use std::collections::{BTreeMap, BTreeSet};

fn answers(list: &[(&str, Answer)]) -> BTreeMap<String, Answer> {
    list.iter().map(|(id, a)| ((*id).to_string(), *a)).collect()
}

/// Causes by base rate × observations, most probable first.
fn ranked(list: &[(&str, Answer)]) -> Vec<FaultId> {
    let weights = log_weights(&answers(list), FaultId::ALL);
    let mut order: Vec<(FaultId, f64)> = faults::all()
        .iter()
        .zip(weights)
        .map(|(f, w)| (f.id, w + crate::math::ln(f.per_hundred)))
        .collect();
    order.sort_by(|a, b| b.1.total_cmp(&a.1));
    order.into_iter().map(|(id, _)| id).collect()
}

#[test]
fn ids_are_stable_and_unlike() {
    let ids: BTreeSet<&str> = all().map(|o| o.id).collect();
    assert_eq!(ids.len(), all().count());
    for o in all() {
        assert!(
            o.id.chars().all(|c| c.is_ascii_lowercase() || c == '-'),
            "{}",
            o.id
        );
        assert_eq!(find(o.id).map(|f| f.words), Some(o.words));
    }
    let words: BTreeSet<&str> = all().map(|o| o.words).collect();
    assert_eq!(words.len(), all().count());
    assert!(find("no-such-thing").is_none());
}

#[test]
fn chances_are_chances() {
    for o in all() {
        for p in o.row {
            assert!((0.01..=0.97).contains(&p), "{}: {p}", o.id);
        }
        let mut named = BTreeSet::new();
        for (id, p) in o.exceptions {
            assert!((0.01..=0.97).contains(p), "{} {id:?}: {p}", o.id);
            assert!(named.insert(id), "{} names {id:?} twice", o.id);
        }
        for id in FaultId::ALL {
            let p = probability(o, *id);
            assert!((CLIP.0..=CLIP.1).contains(&p), "{} {id:?}: {p}", o.id);
        }
    }
}

#[test]
fn columns_stand_in_the_order_of_the_table() {
    assert_eq!(COLUMNS, 17);
    assert_eq!(Column::Air as usize, 0);
    assert_eq!(Column::Healthy as usize, 16);
    let foam = find("foam").unwrap();
    assert_eq!(probability(foam, FaultId::OilLow), 0.80);
    assert_eq!(probability(foam, FaultId::Healthy), 0.03);
    let level = find("level-low").unwrap();
    assert_eq!(probability(level, FaultId::OilLow), 0.97);
    assert_eq!(probability(level, FaultId::InletAir), 0.15);
}

#[test]
fn every_group_and_family_is_used() {
    for group in Group::ALL {
        assert!(all().any(|o| o.group == group), "{group:?}");
        assert!(!group.words().is_empty());
    }
    for family in [
        Family::Noise,
        Family::Air,
        Family::Weak,
        Family::Heat,
        Family::Direction,
        Family::Debris,
    ] {
        assert!(
            all().filter(|o| o.family == family).count() > 1,
            "{family:?}"
        );
    }
    assert_eq!(all().filter(|o| o.two_path).count(), 6);
}

#[test]
fn not_looked_says_nothing() {
    assert!(detail(&answers(&[])).is_empty());
    assert!(
        log_weights(&answers(&[]), FaultId::ALL)
            .iter()
            .all(|w| *w == 0.0)
    );
    assert!(detail(&answers(&[("from-a-newer-version", Answer::Seen)])).is_empty());
}

#[test]
fn seen_and_not_seen_are_two_sides_of_one_chance() {
    let seen = &detail(&answers(&[("foam", Answer::Seen)]))[0];
    let not = &detail(&answers(&[("foam", Answer::NotSeen)]))[0];
    for (a, b) in seen.logs.iter().zip(&not.logs) {
        let total = crate::math::exp(*a) + crate::math::exp(*b);
        assert!((total - 1.0).abs() < 1e-12, "{total}");
    }
    assert!(not.words.contains("not so") && !seen.words.contains("not so"));
}

#[test]
fn the_operator_counts_less_than_ones_own_look() {
    let gap = |a: Answer| {
        let w = log_weights(
            &answers(&[("foam", a)]),
            &[FaultId::InletAir, FaultId::PumpWorn],
        );
        w[0] - w[1]
    };
    let (own, told) = (gap(Answer::Seen), gap(Answer::OperatorSays));
    assert!(
        (told - 0.5 * own).abs() < 1e-12 && own > 1.0,
        "{told} {own}"
    );
    let (own, told) = (gap(Answer::NotSeen), gap(Answer::OperatorSaysNot));
    assert!(
        (told - 0.5 * own).abs() < 1e-12 && own < -1.0,
        "{told} {own}"
    );
}

#[test]
fn second_and_third_of_a_family_count_six_tenths_and_the_strongest_in_full() {
    let alone = |id: &str| detail(&answers(&[(id, Answer::Seen)]))[0].logs.clone();
    let ids = ["whine-with-revs", "whine-cold", "relief-scream"];
    let together = detail(&answers(&ids.map(|id| (id, Answer::Seen))));
    let mut shares: Vec<f64> = together
        .iter()
        .map(|d| d.logs[1] / alone(d.id)[1])
        .collect();
    shares.sort_by(f64::total_cmp);
    for (share, wanted) in shares.iter().zip([0.6, 0.6, 1.0]) {
        assert!((share - wanted).abs() < 1e-12, "{share}");
    }
    // Families do not touch each other, nor do observations that stand alone.
    let apart = detail(&answers(&[
        ("milky", Answer::Seen),
        ("creeps", Answer::Seen),
        ("foam", Answer::Seen),
    ]));
    for d in &apart {
        assert_eq!(d.logs, alone(d.id), "{}", d.id);
    }
}

#[test]
fn more_of_one_family_never_outweighs_their_plain_sum() {
    let ids = [
        "weak-both-ways",
        "slow-to-answer",
        "weak-hot",
        "engine-not-loaded",
        "top-speed-low",
    ];
    let together = log_weights(
        &answers(&ids.map(|id| (id, Answer::Seen))),
        &[FaultId::PumpWorn, FaultId::Healthy],
    );
    let plain: f64 = ids
        .iter()
        .map(|id| {
            let w = log_weights(
                &answers(&[(id, Answer::Seen)]),
                &[FaultId::PumpWorn, FaultId::Healthy],
            );
            w[0] - w[1]
        })
        .sum();
    let weighed = together[0] - together[1];
    assert!(weighed > 0.0 && weighed < plain, "{weighed} {plain}");
}

#[test]
fn plain_cases_point_where_a_mechanic_would_look() {
    use Answer::{NotSeen, Seen};
    let first = |list: &[(&str, Answer)]| ranked(list)[0];
    assert_eq!(
        first(&[
            ("level-low", Seen),
            ("foam", Seen),
            ("whine-with-revs", Seen)
        ]),
        FaultId::OilLow
    );
    assert_eq!(
        first(&[
            ("level-low", NotSeen),
            ("foam", Seen),
            ("whine-with-revs", Seen),
            ("surges", Seen)
        ]),
        FaultId::InletAir
    );
    assert_eq!(
        first(&[("runs-on", Seen), ("creeps", Seen)]),
        FaultId::StrokeStuck
    );
    assert_eq!(
        first(&[("no-drive", Seen), ("lamp-or-code", Seen)]),
        FaultId::InterlockOrDerate
    );
    assert_eq!(first(&[("creeps", Seen)]), FaultId::ControlNullOff);
    assert_eq!(
        first(&[("weak-hot", Seen), ("cooler-clogged", Seen)]),
        FaultId::CoolerDirty
    );
    assert_eq!(
        first(&[("tow-valve-open", Seen), ("weak-both-ways", Seen)]),
        FaultId::BypassOpen
    );
    assert_eq!(
        first(&[("engine-pulls-down", Seen), ("hub-hot", Seen)]),
        FaultId::BrakeDragging
    );
    assert_eq!(first(&[("fast-in-low", Seen)]), FaultId::MotorStuckSmall);
    assert_eq!(
        first(&[("shaft-turns-wheel-not", Seen)]),
        FaultId::DrivetrainSlipping
    );
    let one_way = ranked(&[
        ("one-direction", Seen),
        ("relief-scream", Seen),
        ("cartridge-hot", Seen),
    ]);
    assert!([FaultId::LoopReliefALow, FaultId::LoopReliefBLow].contains(&one_way[0]));
    let tired = ranked(&[
        ("weak-both-ways", Seen),
        ("weak-hot", Seen),
        ("metal", Seen),
    ]);
    let worn = [
        FaultId::PumpWorn,
        FaultId::MotorWorn,
        FaultId::PumpWornAcross,
        FaultId::MotorWornAcross,
    ];
    assert!(worn.contains(&tired[0]) && worn.contains(&tired[1]));
}

#[test]
fn a_sound_machine_is_not_convicted_by_a_clean_walk_round() {
    let list: Vec<(&str, Answer)> = all()
        .filter(|o| !o.two_path)
        .map(|o| (o.id, Answer::NotSeen))
        .collect();
    let top = ranked(&list);
    assert!(top[..4].contains(&FaultId::Healthy), "{:?}", &top[..4]);
}

#[test]
fn a_fresh_repair_moves_the_base_rates() {
    assert_eq!(prior_factor(None, FaultId::AssemblyError), 1.0);
    for id in [
        FaultId::AssemblyError,
        FaultId::InletAir,
        FaultId::LinkageShortForward,
        FaultId::WrongOrWetOil,
    ] {
        assert!(
            (4.0..=8.0).contains(&prior_factor(Some(true), id)),
            "{id:?}"
        );
    }
    assert_eq!(prior_factor(Some(true), FaultId::PumpWorn), 1.0);
    assert!(prior_factor(Some(false), FaultId::AssemblyError) < 1.0);
    for id in FaultId::ALL {
        for story in [None, Some(true), Some(false)] {
            assert!(prior_factor(story, *id) > 0.0);
        }
    }
}

#[test]
fn keeps_going_stops_work_even_on_hearsay() {
    assert!(stop_work(&answers(&[("runs-on", Answer::Seen)])));
    assert!(stop_work(&answers(&[("runs-on", Answer::OperatorSays)])));
    assert!(!stop_work(&answers(&[
        ("runs-on", Answer::NotSeen),
        ("creeps", Answer::Seen)
    ])));
    assert!(!stop_work(&answers(&[])));
}
