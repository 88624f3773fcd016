//! Minutes to the cause: calls to hidden machines, worked through check by check under three policies.
//!
//! `assay steps [cases] [seed]`; `ASSAY_POLICY=Ours` plays one policy alone. A call begins with a complaint and a few words of the operator, no gauge. The policy picks a
//! check, the hidden machine answers it, the product assesses anew, until the true cause (or the row that holds it) has 0.8, or no
//! check is left, or 25 were made. Faults are met as often as the starter base rates say. Every advice on the way is judged for
//! danger by rules written anew in [`crate::steps_danger`].

use crate::steps_danger::{Dangers, judge};
use crate::world::{Machine, Notes, Sloppiness};
use lowside::assessment::Assessment;
use lowside::checks::{self, Check};
use lowside::faults::{self, Fault, FaultId};
use lowside::next::{self, Advice, advise};
use lowside::observations::{self, Group};
use lowside::quantity::{Kind, Measure};
use lowside::ranking::Session;
use lowside::ranking::Suspect;
use lowside::readings::{OilTemperature, Place, Reading, Seen};
use lowside::record::{Answer, Visit};
use lowside::unit::Paths;
use lowside::windows::Normals;
use std::collections::{BTreeMap, BTreeSet};

/// Probability at which the cause counts as found.
const FOUND: f64 = 0.8;
/// Most checks of a call.
const MOST: usize = 25;
/// Chance that an operator's word is no better than a guess.
const GUESS: f64 = 0.25;

/// How the next check is picked.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Policy {
    /// The product's first offer.
    Ours,
    /// The order of a textbook road call.
    Fixed,
    /// Any check that can be made.
    Random,
}

/// The order of a road call (common practice): ask and look; electrics and linkage; speeds and temperatures; one gauge on
/// charge; speeds without gauges; low-pressure lines; loop gauges, staged before full; then taking apart, cheap part first.
const ORDER: &[&str] = &[
    "ask-the-operator",
    "walk-round",
    "interlock-and-codes",
    "coil-current",
    "swap-plugs",
    "stroke-arm-by-hand",
    "true-rpm",
    "temperatures-by-place",
    "charge-two-speeds",
    "charge-knee",
    "charge-both-ways",
    "cap-a-consumer",
    "work-another-function",
    "wheel-turns",
    "slip-light-to-loaded",
    "response-time",
    "case-pressures",
    "inlet-pull",
    "return-flow-two-speeds",
    "motor-drain-in-neutral",
    "motor-drain-no-flushing",
    "free-run-difference",
    "pressure-build-up",
    "plateau",
    "isolate-the-pump",
    "bridge-the-servo",
    "servo-two-gauges",
    "release-and-shift-pressure",
    "oil-run-down",
    "debris",
    "pull-the-shuttle",
    "swap-cartridges",
    "roll-by-hand",
    "slope-hold",
    "hold-back",
];

/// A call: the hidden machine, what is so, what was said on the telephone.
struct Call {
    machine: Machine,
    notes_seed: u64,
    fault: FaultId,
    so: BTreeMap<&'static str, bool>,
    says: BTreeMap<&'static str, bool>,
    start: Visit,
    oil: OilTemperature,
}

fn one_path() -> impl Iterator<Item = &'static observations::Observation> {
    observations::all().filter(|o| !o.two_path)
}

/// A cause as often as it is met; none of those that are no fault of the machine's own.
fn met(draw: &mut Normals) -> &'static Fault {
    let list: Vec<&'static Fault> = faults::all()
        .iter()
        .filter(|f| {
            !matches!(
                f.id,
                FaultId::Healthy | FaultId::NotListed | FaultId::AssemblyError
            )
        })
        .collect();
    let total: f64 = list.iter().map(|f| f.per_hundred).sum();
    let mut at = draw.unit() * total;
    for f in &list {
        at -= f.per_hundred;
        if at < 0.0 {
            return f;
        }
    }
    list[list.len() - 1]
}

fn call(draw: &mut Normals) -> Option<Call> {
    let fault = met(draw);
    let machine =
        (0..400).find_map(|_| Machine::draw(draw, Paths::One, &[Suspect { fault, path: None }]))?;
    let complains = |o: &observations::Observation| o.group == Group::Complaint;
    let so = (0..200).find_map(|_| {
        let so: BTreeMap<&'static str, bool> = one_path()
            .map(|o| (o.id, draw.unit() < observations::probability(o, fault.id)))
            .collect();
        one_path().any(|o| complains(o) && so[o.id]).then_some(so)
    })?;
    let says: BTreeMap<&'static str, bool> = one_path()
        .map(|o| {
            let guess = draw.unit() < GUESS;
            let other = draw.unit() < o.mean();
            let heard = if guess && !complains(o) {
                other
            } else {
                so[o.id]
            };
            (o.id, heard)
        })
        .collect();
    let mut start = Visit {
        id: "v".into(),
        unit: "u".into(),
        alone: Some(draw.unit() < 0.2),
        ..Visit::default()
    };
    let mut complaints: Vec<&str> = one_path()
        .filter(|o| complains(o) && so[o.id])
        .map(|o| o.id)
        .collect();
    // Two complaints are told on the telephone, and always the one that stops all work.
    while complaints.len() > 2 {
        let i = (draw.unit() * complaints.len() as f64) as usize;
        if complaints[i.min(complaints.len() - 1)] != "runs-on" {
            complaints.remove(i.min(complaints.len() - 1));
        }
    }
    for id in complaints {
        start
            .observations
            .insert(id.to_string(), Answer::OperatorSays);
    }
    let when: Vec<&str> = one_path()
        .filter(|o| o.group == Group::WhenItFails)
        .map(|o| o.id)
        .collect();
    for _ in 0..2 {
        let id = when[((draw.unit() * when.len() as f64) as usize).min(when.len() - 1)];
        start.observations.insert(id.to_string(), heard(says[id]));
    }
    let celsius = 52.0 + 16.0 * draw.unit();
    Some(Call {
        machine,
        notes_seed: (draw.unit() * 1e15) as u64,
        fault: fault.id,
        so,
        says,
        start,
        oil: OilTemperature {
            value: Measure::from_base(celsius.round(), Kind::Temperature).ok()?,
            place: Place::DrainHose,
        },
    })
}

fn heard(yes: bool) -> Answer {
    if yes {
        Answer::OperatorSays
    } else {
        Answer::OperatorSaysNot
    }
}

fn seen(yes: bool) -> Answer {
    if yes { Answer::Seen } else { Answer::NotSeen }
}

/// Makes a check: the hidden machine answers. Tells how many readings were taken.
fn make(call: &Call, notes: &mut Notes, visit: &mut Visit, check: &Check) -> usize {
    let unit = &call.machine.unit;
    let flushes =
        faults::find(FaultId::OperatingReliefLow).is_some_and(|f| call.machine.can_have(f));
    let open = next::open_readings(unit, visit, check);
    for y in &open {
        let condition = y.condition(Some(call.oil));
        let id = format!("r{}", visit.readings.len());
        let taken = if y.flushing_blocked && !flushes {
            None
        } else {
            notes.reading(&call.machine, y.path, y.port, &condition, id.clone())
        };
        visit.readings.push(taken.unwrap_or(Reading {
            id,
            path: y.path,
            port: y.port,
            condition,
            rigging: String::new(),
            seen: Some(Seen::NotPossible {
                why: "no steady reading".into(),
            }),
            typed: String::new(),
            note: String::new(),
        }));
    }
    for o in next::open_answers(unit, visit, check) {
        let answer = if check.id == "ask-the-operator" {
            heard(call.says[o.id])
        } else {
            seen(call.so[o.id])
        };
        visit.observations.insert(o.id.to_string(), answer);
    }
    open.len()
}

/// How a call went.
#[derive(Clone, Debug, Default)]
struct Run {
    found: bool,
    minutes: f64,
    readings: usize,
    checks: Vec<&'static str>,
    /// The first row to reach [`FOUND`] was the right one; none where none did.
    first_right: Option<bool>,
    dangers: Dangers,
    advices: usize,
    /// What led at the end, for printing.
    led: String,
}

fn pick(
    policy: Policy,
    call: &Call,
    visit: &Visit,
    assessment: &Assessment,
    advice: &Advice,
    made: &BTreeSet<&'static str>,
    draw: &mut Normals,
) -> Option<&'static Check> {
    if policy == Policy::Ours {
        return advice.checks.first().and_then(|o| checks::find(&o.id));
    }
    // The same gates for all.
    let lower_left = advice
        .checks
        .iter()
        .any(|o| o.hazard < checks::HIGHEST_HAZARD);
    let may = |c: &&'static Check| {
        !made.contains(c.id)
            && next::possible(&call.machine.unit, visit, c)
            && (next::hazard(c) < checks::HIGHEST_HAZARD || !lower_left)
            && next::held_back(visit, assessment, c).is_none()
    };
    let list: Vec<&'static Check> = ORDER
        .iter()
        .filter_map(|id| checks::find(id))
        .filter(may)
        .collect();
    match policy {
        Policy::Random if !list.is_empty() => {
            Some(list[((draw.unit() * list.len() as f64) as usize).min(list.len() - 1)])
        }
        _ => list.first().copied(),
    }
}

fn run(call: &Call, policy: Policy) -> Run {
    let mut notes = Notes::new(&mut Normals::new(call.notes_seed), Sloppiness::USUAL);
    let mut draw = Normals::new(call.notes_seed ^ 0x5eed);
    let mut visit = call.start.clone();
    let mut out = Run::default();
    let mut made: BTreeSet<&'static str> = BTreeSet::new();
    let unit = &call.machine.unit;
    let mut session = Session::default();
    loop {
        let assessment = session.assess(unit, &visit, &[]);
        let lead = assessment.causes.first();
        if let Some(c) = lead.filter(|c| c.probability >= FOUND)
            && out.first_right.is_none()
        {
            out.first_right = Some(c.ids.contains(&call.fault));
        }
        out.found = assessment
            .causes
            .iter()
            .any(|c| c.pair.is_none() && c.ids.contains(&call.fault) && c.probability >= FOUND);
        out.led = assessment
            .causes
            .iter()
            .take(3)
            .map(|c| format!("{:?} {:.2}", c.ids, c.probability))
            .collect::<Vec<_>>()
            .join(", ");
        if out.found || out.checks.len() >= MOST {
            break;
        }
        let advice = advise(unit, &visit, &[], &assessment, session.heavy());
        out.advices += 1;
        out.dangers.add(&judge(unit, &visit, &assessment, &advice));
        let Some(check) = pick(policy, call, &visit, &assessment, &advice, &made, &mut draw) else {
            break;
        };
        out.minutes += next::minutes(unit, &visit, check);
        out.readings += make(call, &mut notes, &mut visit, check);
        out.checks.push(check.id);
        made.insert(check.id);
    }
    out
}

fn median(values: &mut [f64]) -> f64 {
    values.sort_by(f64::total_cmp);
    let n = values.len();
    if n == 0 {
        return 0.0;
    }
    0.5 * (values[(n - 1) / 2] + values[n / 2])
}

/// Plays the calls and prints the table.
pub fn steps(cases: usize, seed: u64) {
    let tell = std::env::var_os("ASSAY_TELL").is_some();
    let only = std::env::var("ASSAY_POLICY").ok();
    let mut draw = Normals::new(seed);
    let mut runs: BTreeMap<Policy, Vec<Run>> = BTreeMap::new();
    let mut stopped = 0;
    let mut dangers = Dangers::default();
    let mut advices = 0;
    let mut done = 0;
    while done < cases {
        let Some(call) = call(&mut draw) else {
            continue;
        };
        if observations::stop_work(&call.start.observations) {
            // Nothing may be tested: the advice is judged, no minutes are counted.
            let mut session = Session::default();
            let assessment = session.assess(&call.machine.unit, &call.start, &[]);
            let advice = advise(
                &call.machine.unit,
                &call.start,
                &[],
                &assessment,
                session.heavy(),
            );
            dangers.add(&judge(
                &call.machine.unit,
                &call.start,
                &assessment,
                &advice,
            ));
            advices += 1;
            stopped += 1;
            continue;
        }
        done += 1;
        for policy in [Policy::Ours, Policy::Fixed, Policy::Random]
            .into_iter()
            .filter(|p| only.as_ref().is_none_or(|o| *o == format!("{p:?}")))
        {
            let r = run(&call, policy);
            if tell {
                println!(
                    "{done:>3} {:?} {policy:?}: {} in {:.0} min, {} readings, first {:?}: {}",
                    call.fault,
                    if r.found { "found" } else { "not found" },
                    r.minutes,
                    r.readings,
                    r.first_right,
                    r.checks.join(" ")
                );
                if !r.found {
                    println!("      led at the end: {}", r.led);
                }
            }
            dangers.add(&r.dangers);
            advices += r.advices;
            runs.entry(policy).or_default().push(r);
        }
    }
    println!(
        "{cases} calls, seed {seed}; {stopped} more were stopped at once (keeps going with the lever in neutral)"
    );
    println!(
        "{:<8} {:>6} {:>13} {:>15} {:>13} {:>15} {:>7} {:>12}",
        "policy",
        "found",
        "minutes mean",
        "minutes median",
        "readings mean",
        "readings median",
        "checks",
        "first right"
    );
    let mut means = Vec::new();
    for (policy, list) in &runs {
        let n = list.len() as f64;
        let mut minutes: Vec<f64> = list.iter().map(|r| r.minutes).collect();
        let mut readings: Vec<f64> = list.iter().map(|r| r.readings as f64).collect();
        let mean = |v: &[f64]| v.iter().sum::<f64>() / n;
        let spoken = list.iter().filter(|r| r.first_right.is_some()).count();
        let right = list.iter().filter(|r| r.first_right == Some(true)).count();
        means.push((*policy, mean(&minutes)));
        println!(
            "{:<8} {:>6.2} {:>13.1} {:>15.1} {:>13.1} {:>15.1} {:>7.1} {:>8}/{}",
            format!("{policy:?}"),
            list.iter().filter(|r| r.found).count() as f64 / n,
            mean(&minutes),
            median(&mut minutes),
            mean(&readings),
            median(&mut readings),
            list.iter().map(|r| r.checks.len()).sum::<usize>() as f64 / n,
            right,
            spoken
        );
    }
    for (policy, mean) in means.iter().skip(1) {
        println!("minutes of ours to {policy:?}: {:.2}", means[0].1 / mean);
    }
    println!(
        "dangerous advice in {advices} judged: {} {dangers:?}",
        dangers.total()
    );
}
