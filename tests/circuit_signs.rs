//! What the solved circuit must show. Layout: three-position flushing shuttle and operating relief at the motor into the motor
//! case; motor case through pump case and cooler to tank; neutral relief to pump case; combined check and relief cartridges into
//! the gallery; servo control; engine holds its speed; oil warm; charge taken above pump case at the gallery.
//! Signs and shapes from common practice and from the balance of oil; no fixed pressures are asserted.

use lowside::circuit::{Layout, Network, Node, Param, Params, Solution, healthy};
use lowside::readings::{Path, Port};

const PSI: f64 = 0.068_947_572_931_683_6;

struct Run {
    net: Network,
    theta: Params,
    solution: Solution,
}

impl Run {
    fn at(&self, n: Node) -> f64 {
        self.solution.state[n.at()]
    }
    fn read(&self, port: Port) -> f64 {
        self.net.reading(port, &self.solution, &self.theta)
    }
    fn charge_above_case(&self) -> f64 {
        self.at(Node::Gallery) - self.at(Node::PumpCase)
    }
}

#[derive(Clone, Copy)]
enum State {
    Neutral,
    Half,
    HalfReverse,
    Full,
    Held(f64),
}

fn run(state: State, speed: f64, change: &[(Param, f64)]) -> Run {
    let (held, lever, load) = match state {
        State::Neutral => (true, 0.0, 0.0),
        State::Half => (false, 0.5, 0.0),
        State::HalfReverse => (false, -0.5, 0.0),
        State::Full => (false, 1.0, 150.0),
        State::Held(l) => (true, l, 0.0),
    };
    let net = Network::new(Layout {
        held: [held; 2],
        ..Layout::default()
    });
    let mut theta = healthy();
    theta[Param::Viscosity as usize] = 0.63;
    theta[Param::Speed as usize] = speed;
    theta[Param::Lever as usize] = lever;
    theta[Param::Load as usize] = load;
    for (p, v) in change {
        theta[*p as usize] = *v;
    }
    let solution = net.solve(&theta, None).expect("a state");
    Run {
        net,
        theta,
        solution,
    }
}

fn times(p: Param, k: f64) -> (Param, f64) {
    (p, p.healthy() * k)
}

#[test]
fn total_return_is_the_charge_pump_and_blind_to_the_loop() {
    for state in [State::Neutral, State::Half, State::Full] {
        let sound = run(state, 2400.0, &[]).read(Port::ReturnFlow);
        for fault in [
            vec![times(Param::MotorLeak, 6.0)],
            vec![times(Param::PumpLeak, 6.0)],
            vec![times(Param::MotorAcross, 20.0)],
            vec![(Param::ShuttleStuckA, 0.6)],
            vec![(Param::CheckLeakA, 0.5)],
            vec![(Param::LoopReliefA, 250.0)],
            vec![(Param::Bypass, 1.0)],
        ] {
            let now = run(state, 2400.0, &fault).read(Port::ReturnFlow);
            // All that moves is the charge pump's own slip, with charge pressure.
            assert!(
                (now - sound).abs() < 0.06 * sound,
                "{fault:?}: {sound} {now}"
            );
        }
    }
}

#[test]
fn neutral_motor_drain_sees_the_motor_and_not_the_pump() {
    let drain = |f: &[(Param, f64)]| run(State::Neutral, 2400.0, f).read(Port::MotorDrain);
    let sound = drain(&[]);
    for k in [2.0, 4.0, 6.0] {
        let motor = drain(&[times(Param::MotorLeak, k)]);
        assert!(
            (motor / sound - k).abs() < 0.15 * k,
            "motor × {k}: {sound} → {motor}"
        );
        let pump = drain(&[times(Param::PumpLeak, k)]);
        assert!(
            (pump / sound - 1.0).abs() < 0.06,
            "pump × {k}: {sound} → {pump}"
        );
    }
}

#[test]
fn cross_port_leakage_leaves_charge_and_drains() {
    for p in [Param::PumpAcross, Param::MotorAcross] {
        for state in [State::Neutral, State::Half, State::Full] {
            let (sound, worn) = (
                run(state, 2400.0, &[]),
                run(state, 2400.0, &[times(p, 12.0)]),
            );
            assert!(
                (sound.charge_above_case() - worn.charge_above_case()).abs() < 0.35,
                "{p:?}"
            );
            assert!((sound.read(Port::ReturnFlow) - worn.read(Port::ReturnFlow)).abs() < 0.3);
        }
        let (sound, worn) = (
            run(State::Held(0.2), 1500.0, &[]),
            run(State::Held(0.2), 1500.0, &[times(p, 12.0)]),
        );
        assert!(
            worn.read(Port::LoopA) < 0.7 * sound.read(Port::LoopA),
            "and costs pressure"
        );
    }
}

#[test]
fn a_leaking_cartridge_never_lowers_charge() {
    for leak in [0.1, 0.5, 2.0, 8.0] {
        for (p, state) in [
            (Param::CheckLeakA, State::Half),
            (Param::CheckLeakA, State::Full),
            (Param::CheckLeakB, State::HalfReverse),
        ] {
            let (sound, bad) = (run(state, 2400.0, &[]), run(state, 2400.0, &[(p, leak)]));
            assert!(
                bad.charge_above_case() > sound.charge_above_case() - 0.05,
                "{p:?} {leak}"
            );
        }
    }
}

#[test]
fn a_shut_check_hurts_the_other_direction_from_a_leaking_one() {
    let leaking = |l| run(State::Held(l), 1500.0, &[(Param::CheckLeakA, 2.0)]);
    let sound = |l| run(State::Held(l), 1500.0, &[]);
    // Leaking A: A cannot hold pressure (forward); reverse is sound.
    assert!(leaking(0.2).read(Port::LoopA) < 0.5 * sound(0.2).read(Port::LoopA));
    assert!((leaking(-0.2).read(Port::LoopB) / sound(-0.2).read(Port::LoopB) - 1.0).abs() < 0.03);
    // Shut A: A gets no make-up as the low side (reverse); forward is sound.
    let shut = |state| run(state, 2400.0, &[(Param::CheckA, 1e-3)]);
    let speed = |r: &Run| r.read(Port::MotorShaft);
    assert!((speed(&shut(State::Half)) / speed(&run(State::Half, 2400.0, &[])) - 1.0).abs() < 0.03);
    assert!(
        shut(State::HalfReverse).at(Node::APump)
            < 0.5 * run(State::HalfReverse, 2400.0, &[]).at(Node::APump)
    );
}

#[test]
fn a_starved_low_side_makes_no_oil() {
    // Check A shut, reverse, loaded: A starves. Less speed than sound, and return no more than the charge pump delivers.
    let change = [
        (Param::CheckA, 1e-4),
        (Param::ShuttleTravel, 0.0),
        (Param::Lever, -1.0),
    ];
    let shut = run(State::Full, 2400.0, &change);
    let sound = run(State::Full, 2400.0, &change[2..]);
    assert!(
        shut.read(Port::MotorShaft) < 0.9 * sound.read(Port::MotorShaft),
        "{} {}",
        shut.read(Port::MotorShaft),
        sound.read(Port::MotorShaft)
    );
    assert!(
        shut.net
            .filled(Path::Left, &shut.solution.state, &shut.theta)
            < 0.97
    );
    assert!(shut.read(Port::ReturnFlow) < sound.read(Port::ReturnFlow) + 0.5);
    assert!(shut.at(Node::APump) > -1.0);
}

#[test]
fn a_centred_shuttle_is_the_same_as_a_high_operating_relief() {
    for state in [State::Neutral, State::Half, State::Full, State::Held(0.2)] {
        let centred = run(state, 2400.0, &[(Param::ShuttleTravel, 0.0)]);
        let high = run(state, 2400.0, &[(Param::OperatingSet, 90.0)]);
        for port in [
            Port::Charge,
            Port::LoopA,
            Port::LoopB,
            Port::MotorDrain,
            Port::ReturnFlow,
            Port::MotorShaft,
        ] {
            let (a, b) = (centred.read(port), high.read(port));
            assert!((a - b).abs() < 0.01 * (1.0 + a.abs()), "{port:?} {a} {b}");
        }
    }
}

#[test]
fn a_worn_charge_pump_and_a_restricted_inlet_have_opposite_speed_trends() {
    let lost = |change: &[(Param, f64)], speed| {
        run(State::Neutral, speed, &[]).read(Port::ReturnFlow)
            - run(State::Neutral, speed, change).read(Port::ReturnFlow)
    };
    let share = |change: &[(Param, f64)], speed| {
        lost(change, speed) / run(State::Neutral, speed, &[]).read(Port::ReturnFlow)
    };
    let worn = [times(Param::ChargeSlip, 9.0)];
    assert!(share(&worn, 900.0) > 1.5 * share(&worn, 2400.0));
    let blocked = [
        times(Param::SuctionLaminar, 14.0),
        times(Param::SuctionTurbulent, 14.0),
    ];
    assert!(
        share(&blocked, 2400.0) > 3.0 * share(&blocked, 900.0).max(0.01),
        "{} {}",
        share(&blocked, 2400.0),
        share(&blocked, 900.0)
    );
}

#[test]
fn motor_size_linkage_and_tyre_leave_charge_alone() {
    for change in [
        times(Param::MotorShift, 0.5),
        times(Param::GainForward, 0.5),
        times(Param::Rolling, 0.9),
    ] {
        for state in [State::Neutral, State::Half] {
            let (sound, now) = (run(state, 2400.0, &[]), run(state, 2400.0, &[change]));
            assert!(
                (sound.charge_above_case() - now.charge_above_case()).abs() < 0.5,
                "{change:?}"
            );
        }
    }
}

#[test]
fn a_restricted_case_return_lifts_the_gauge_and_not_charge_above_case() {
    let change = [
        times(Param::PumpCaseLine, 15.0),
        times(Param::PumpCaseTurbulent, 15.0),
    ];
    let (sound, now) = (
        run(State::Neutral, 2400.0, &[]),
        run(State::Neutral, 2400.0, &change),
    );
    assert!(now.read(Port::Charge) > sound.read(Port::Charge) + 4.0);
    assert!((now.charge_above_case() - sound.charge_above_case()).abs() < 0.1);
}

#[test]
fn pump_wear_lowers_the_motor_drain_under_load() {
    let drain = |k| run(State::Full, 2400.0, &[times(Param::PumpLeak, k)]).read(Port::MotorDrain);
    assert!(drain(6.0) < drain(4.0) && drain(4.0) < drain(1.0));
}

#[test]
fn both_checks_pass_oil_in_neutral_and_one_is_shut_in_drive() {
    let neutral = run(State::Neutral, 2400.0, &[]);
    let flow = |r: &Run, to: Node| {
        r.net
            .flows(&r.solution.state, &r.theta)
            .find(|(e, _)| e.from == Node::Gallery && e.to == to)
            .expect("a check")
            .1
    };
    let leak = neutral.read(Port::MotorDrain);
    assert!(flow(&neutral, Node::APump) > 0.2 * leak && flow(&neutral, Node::BPump) > 0.2 * leak);
    let drive = run(State::Full, 2400.0, &[]);
    assert!(flow(&drive, Node::APump) < 0.01, "high side shut");
    assert!(flow(&drive, Node::BPump) > 5.0, "low side open");
}

#[test]
fn charge_falls_to_the_operating_relief_in_drive_only_with_flushing() {
    // Half stroke, light load, short hoses. The operating relief stands on motor case, which is a little above pump case, so
    // that 20 psi between the cracking pressures is a gap of about 15 psi at one gauge: common practice, 10 to 20 psi.
    let short = [
        times(Param::LineALaminar, 0.2),
        times(Param::LineBLaminar, 0.2),
        times(Param::LineATurbulent, 0.1),
        times(Param::LineBTurbulent, 0.1),
        (Param::OperatingSet, 22.0 - 20.0 * PSI),
        (Param::MotorCaseLine, 0.004),
        times(Param::CheckB, 2.0),
    ];
    let fall = |extra: &[(Param, f64)]| {
        let change: Vec<_> = short.iter().chain(extra).copied().collect();
        (run(State::Neutral, 2400.0, &change).read(Port::Charge)
            - run(State::Half, 2400.0, &change).read(Port::Charge))
            / PSI
    };
    let with = fall(&[]);
    assert!((10.0..=20.0).contains(&with), "fall {with} psi");
    let without = fall(&[(Param::ShuttleTravel, 0.0)]);
    assert!(without.abs() < 2.0, "no flushing, fall {without} psi");
    let long = fall(&[
        times(Param::LineBLaminar, 4.0),
        times(Param::LineBTurbulent, 4.0),
    ]);
    assert!(long > with + 2.0, "longer hoses, more: {long} psi");
}

#[test]
fn motor_case_oil_passes_through_the_pump_case() {
    let through = run(State::Half, 2400.0, &[]);
    assert!(through.at(Node::MotorCase) > through.at(Node::PumpCase));
    let more = run(State::Half, 2400.0, &[times(Param::PumpCaseLine, 10.0)]);
    assert!(more.at(Node::MotorCase) > through.at(Node::MotorCase) + 1.0);
}

#[test]
fn one_bad_relief_hurts_one_direction_only() {
    let low = |l| {
        run(State::Held(l), 1500.0, &[(Param::LoopReliefA, 200.0)]).read(if l > 0.0 {
            Port::LoopA
        } else {
            Port::LoopB
        })
    };
    let sound =
        |l| run(State::Held(l), 1500.0, &[]).read(if l > 0.0 { Port::LoopA } else { Port::LoopB });
    assert!(low(0.4) < 0.65 * sound(0.4));
    assert!((low(-0.4) / sound(-0.4) - 1.0).abs() < 0.01);
}

#[test]
fn a_swash_offset_makes_the_machine_creep() {
    let creep = |offset| {
        let net = Network::new(Layout::default());
        let mut theta = healthy();
        theta[Param::NullControl as usize] = offset;
        let s = net.solve(&theta, None).expect("a state");
        s.state[Node::Shaft.at()] * 1e3
    };
    assert!(creep(0.04) > 30.0 && creep(-0.04) < -30.0);
    assert!(creep(0.0).abs() < 0.01);
    // Breakaway hides a small one: no creep does not prove null.
    assert!(creep(0.002).abs() < 2.0, "{}", creep(0.002));
}

#[test]
fn the_staged_build_up_separates_what_the_plateau_hides() {
    let a = |l, f: &[(Param, f64)]| run(State::Held(l), 1500.0, f).read(Port::LoopA);
    for fault in [
        vec![(Param::CheckLeakA, 0.35)],
        vec![times(Param::PumpAcross, 10.0)],
        vec![(Param::Bypass, 0.4)],
    ] {
        assert!(
            (a(1.0, &fault) / a(1.0, &[]) - 1.0).abs() < 0.03,
            "full stroke hides {fault:?}"
        );
        assert!(
            a(0.05, &fault) < 0.75 * a(0.05, &[]),
            "a twentieth shows {fault:?}"
        );
    }
}
