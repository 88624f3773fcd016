//! Random machines, conditions and severities: the solver ends with a state that balances, or with a stated reason.
//! Prints iteration counts and the share of each outcome (`cargo test --test circuit_random -- --nocapture`).

use lowside::circuit::{
    Arrangement, ControlBuild, DumpBuild, FilterBuild, Layout, Network, NoState, Param, Params,
    Route, Scale, healthy,
};
use lowside::math;
use lowside::readings::Path;

/// A small seeded generator (splitmix64), so that every run sees the same machines.
struct Seeded(u64);

impl Seeded {
    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^ (z >> 31)
    }
    fn unit(&mut self) -> f64 {
        (self.next() >> 11) as f64 / (1u64 << 53) as f64
    }
    fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * self.unit()
    }
    fn chance(&mut self, p: f64) -> bool {
        self.unit() < p
    }
    fn of<T: Copy>(&mut self, items: &[T]) -> T {
        items[(self.next() % items.len() as u64) as usize]
    }
}

fn layout(r: &mut Seeded) -> Layout {
    use ControlBuild::*;
    Layout {
        control: r.of(&[
            Direct,
            Feedback,
            Pilot,
            Electric,
            SpeedSensing,
            NoFeedback,
            ThreePosition,
        ]),
        filter: r.of(&[
            FilterBuild::Suction,
            FilterBuild::GaugeBefore,
            FilterBuild::GaugeAfter,
        ]),
        dump: r.of(&[DumpBuild::Gallery, DumpBuild::Across, DumpBuild::Case]),
        relief_to_tank: r.chance(0.3),
        separate_cases: r.chance(0.3),
        arrangement: Arrangement::Single,
        held: [r.chance(0.4), false],
        bridged: [r.chance(0.1), false],
    }
}

/// A machine: every figure within a factor of about three, often with one or two faults up to total.
fn machine(r: &mut Seeded) -> Params {
    let mut t = healthy();
    for p in Param::ALL {
        if p.scale() == Scale::Log {
            t[*p as usize] *= math::exp(r.between(-1.0, 1.0));
        }
    }
    t[Param::Atmosphere as usize] = r.between(0.6, 1.02);
    t[Param::Viscosity as usize] = math::exp(r.between(-1.6, 3.5));
    t[Param::Lever as usize] = if r.chance(0.25) {
        0.0
    } else {
        r.between(-1.0, 1.0)
    };
    t[Param::Load as usize] = if r.chance(0.5) {
        0.0
    } else {
        r.between(0.0, 350.0)
    };
    t[Param::Push as usize] = if r.chance(0.7) {
        0.0
    } else {
        r.between(-150.0, 150.0)
    };
    t[Param::NullControl as usize] = if r.chance(0.5) {
        0.0
    } else {
        r.between(-0.08, 0.08)
    };
    t[Param::OperatingSet as usize] = t[Param::ReliefSet as usize] * r.between(0.7, 1.05);
    t[Param::ServoFull as usize] = t[Param::ServoStart as usize] + r.between(2.0, 15.0);
    t[Param::SenseFull as usize] = t[Param::SenseStart as usize] + r.between(200.0, 1500.0);
    if r.chance(0.5) {
        let set = r.between(150.0, 450.0);
        t[Param::LimiterA as usize] = set;
        t[Param::LimiterB as usize] = set * r.between(0.8, 1.2);
    }
    if r.chance(0.3) {
        t[Param::ServoLoad as usize] = r.between(0.5, 6.0);
    }
    for _ in 0..(r.next() % 3) {
        break_something(r, &mut t);
    }
    t
}

fn break_something(r: &mut Seeded, t: &mut Params) {
    use Param::*;
    let leak = math::exp(r.between(math::ln(0.05), math::ln(60.0)));
    match r.next() % 16 {
        0 => t[CheckLeakA as usize] += leak,
        1 => t[CheckLeakB as usize] += leak,
        2 => t[Bypass as usize] += leak,
        3 => t[ReliefHeld as usize] += leak,
        4 => t[ConsumerLeak as usize] += leak,
        5 => t[CheckA as usize] *= 1e-4,
        6 => t[CheckB as usize] *= 1e-4,
        7 => t[PumpLeak as usize] *= r.between(2.0, 60.0),
        8 => t[MotorAcross as usize] *= r.between(2.0, 100.0),
        9 => t[ChargeDrive as usize] = 0.0,
        10 => t[Air as usize] = r.between(0.1, 0.95),
        11 => t[SuctionLaminar as usize] *= r.between(5.0, 500.0),
        12 => t[PumpCaseLine as usize] *= r.between(5.0, 3000.0),
        13 => t[ShuttleStuckA as usize] = r.unit(),
        14 => t[ShuttleTravel as usize] = 0.0,
        _ => t[LoopReliefA as usize] *= r.between(0.05, 0.7),
    }
}

#[test]
fn every_machine_ends_with_a_state_or_a_reason() {
    const MACHINES: usize = 40_000;
    let mut r = Seeded(20_261_201);
    let (mut direct, mut from_rest, mut run_up, mut hunts) = (0u32, 0u32, 0u32, 0u32);
    let mut iterations = Vec::with_capacity(MACHINES);
    for i in 0..MACHINES {
        let net = Network::new(layout(&mut r));
        let theta = machine(&mut r);
        match net.solve(&theta, None) {
            Ok(s) => {
                assert!(
                    s.state.iter().all(|v| v.is_finite()),
                    "machine {i}: not a number in the state"
                );
                let flow = theta[Param::PumpDisp as usize] * theta[Param::Speed as usize] * 1e-3;
                assert!(
                    s.imbalance < 1e-5 * (1.0 + flow),
                    "machine {i}: {} L/min left over",
                    s.imbalance
                );
                iterations.push(s.iterations);
                match s.route {
                    Route::Direct => direct += 1,
                    Route::FromRest => from_rest += 1,
                    Route::RunUp => run_up += 1,
                }
            }
            Err(NoState::Hunts) => hunts += 1,
            Err(NoState::BadFigure) => panic!(
                "machine {i}: a valid machine was refused: {:?} {theta:?}",
                net.layout()
            ),
        }
    }
    iterations.sort_unstable();
    let at = |q: f64| iterations[((iterations.len() - 1) as f64 * q) as usize];
    println!(
        "{MACHINES} machines: direct {direct}, from rest {from_rest}, run up {run_up}, would hunt {hunts}"
    );
    println!(
        "iterations: mean {:.1}, median {}, p99 {}, most {}",
        iterations.iter().map(|i| f64::from(*i)).sum::<f64>() / iterations.len() as f64,
        at(0.5),
        at(0.99),
        at(1.0)
    );
    assert!(
        (hunts as usize) < MACHINES / 500,
        "{hunts} of {MACHINES} without a state"
    );
}

/// A tandem: the same make left and right, each with its own condition and troubles.
fn tandem(r: &mut Seeded) -> (Layout, Params) {
    let layout = Layout {
        arrangement: Arrangement::Tandem,
        ..layout(r)
    };
    let layout = Layout {
        held: [r.chance(0.4), r.chance(0.4)],
        bridged: [r.chance(0.1), r.chance(0.1)],
        ..layout
    };
    let mut theta = machine(r);
    let other = machine(r);
    for p in Param::ALL {
        theta[p.on(Path::Right)] = other[*p as usize];
    }
    (layout, theta)
}

#[test]
fn every_tandem_ends_with_a_state_or_a_reason() {
    const MACHINES: usize = 10_000;
    let mut r = Seeded(20_261_202);
    let (mut routes, mut hunts) = ([0u32; 3], 0usize);
    for i in 0..MACHINES {
        let (layout, theta) = tandem(&mut r);
        match Network::new(layout).solve(&theta, None) {
            Ok(s) => {
                assert!(s.state.iter().all(|v| v.is_finite()), "machine {i}");
                let flow = theta[Param::PumpDisp as usize] * theta[Param::Speed as usize] * 2e-3;
                assert!(
                    s.imbalance < 1e-5 * (1.0 + flow),
                    "machine {i}: {} L/min left over",
                    s.imbalance
                );
                routes[s.route as usize] += 1;
            }
            Err(NoState::Hunts) => hunts += 1,
            Err(NoState::BadFigure) => panic!("machine {i}: a valid machine was refused"),
        }
    }
    println!("{MACHINES} tandems: direct, from rest, run up {routes:?}, would hunt {hunts}");
    assert!(
        hunts < MACHINES / 200,
        "{hunts} of {MACHINES} without a state"
    );
}

#[test]
fn a_figure_that_is_not_a_number_is_refused_with_a_reason() {
    let net = Network::new(Layout::default());
    let mut theta = healthy();
    theta[Param::PumpDisp as usize] = f64::NAN;
    assert_eq!(net.solve(&theta, None).err(), Some(NoState::BadFigure));
}

#[test]
fn a_warm_start_gives_the_same_state() {
    let mut r = Seeded(7);
    for _ in 0..2_000 {
        let net = Network::new(layout(&mut r));
        let theta = machine(&mut r);
        let Ok(cold) = net.solve(&theta, None) else {
            continue;
        };
        let warm = net
            .solve(&theta, Some(&cold.state))
            .expect("a state was there");
        for (a, b) in cold.state.iter().zip(warm.state) {
            assert!((a - b).abs() < 1e-5 * (1.0 + a.abs()), "{a} {b}");
        }
    }
}
