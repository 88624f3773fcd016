//! Two paths in one network: what they share, what each has for itself, and that the derivatives hold for both.

use lowside::circuit::{Arrangement, Layout, Network, Param, Params, Scale, Solution, healthy};
use lowside::readings::{Path, Port};

use Path::{Left, Right};

struct Run {
    net: Network,
    theta: Params,
    solution: Solution,
}

impl Run {
    fn read(&self, path: Path, port: Port) -> f64 {
        self.net.reading_on(path, port, &self.solution, &self.theta)
    }
}

/// Levers of left and right, and what is changed where.
fn run(arrangement: Arrangement, levers: [f64; 2], change: &[(Path, Param, f64)]) -> Run {
    let net = Network::new(Layout {
        arrangement,
        ..Layout::default()
    });
    let mut theta = healthy();
    theta[Param::Viscosity as usize] = 0.63;
    theta[Param::ChargeDisp as usize] = 30.0;
    theta[Param::ReliefGain as usize] *= 2.0;
    for (path, lever) in Path::BOTH.into_iter().zip(levers) {
        theta[Param::Lever.on(path)] = lever;
        if lever != 0.0 {
            theta[Param::Load.on(path)] = 120.0;
        }
    }
    for (path, p, v) in change {
        theta[p.on(*path)] = *v;
    }
    let solution = net.solve(&theta, None).expect("a state");
    Run {
        net,
        theta,
        solution,
    }
}

fn tandem(levers: [f64; 2], change: &[(Path, Param, f64)]) -> Run {
    run(Arrangement::Tandem, levers, change)
}

#[test]
fn like_paths_in_like_work_read_alike() {
    let both = tandem([0.6, 0.6], &[]);
    for port in Port::ALL.into_iter().filter(|p| *p != Port::Knee) {
        let (l, r) = (both.read(Left, port), both.read(Right, port));
        assert!((l - r).abs() < 1e-6 * (1.0 + l.abs()), "{port:?} {l} {r}");
    }
}

#[test]
fn a_worn_side_shows_on_the_common_charge_only_while_it_is_stroked() {
    // Enough to bring the charge pump to its end.
    let worn = [(Right, Param::MotorLeak, 0.0065 * 40.0)];
    let charge = |levers| {
        let with = tandem(levers, &worn).read(Left, Port::Charge);
        let without = tandem(levers, &[]).read(Left, Port::Charge);
        with - without
    };
    let (left_alone, right_alone) = (charge([0.6, 0.0]), charge([0.0, 0.6]));
    assert!(right_alone < -1.0, "{right_alone}");
    assert!(left_alone > 0.3 * right_alone, "{left_alone} {right_alone}");
    // The gauge is one and the same.
    let both = tandem([0.6, 0.6], &worn);
    assert_eq!(
        both.read(Left, Port::Charge),
        both.read(Right, Port::Charge)
    );
}

#[test]
fn loop_drain_and_speed_signs_stay_on_their_side() {
    let sound = tandem([0.6, 0.6], &[]);
    let worn = tandem([0.6, 0.6], &[(Right, Param::MotorLeak, 0.0065 * 4.0)]);
    for port in [Port::MotorDrain, Port::Wheel, Port::LoopA] {
        let moved = |path| (worn.read(path, port) / sound.read(path, port) - 1.0).abs();
        assert!(moved(Left) < 0.04, "{port:?} left {}", moved(Left));
        assert!(moved(Left) < 0.3 * moved(Right) + 1e-3, "{port:?}");
    }
    assert!(worn.read(Right, Port::Wheel) < 0.97 * worn.read(Left, Port::Wheel));
    assert!(worn.read(Right, Port::MotorDrain) > 1.2 * worn.read(Left, Port::MotorDrain));
}

#[test]
fn the_side_that_is_not_stroked_stands_still() {
    let one = tandem([0.6, 0.0], &[]);
    assert!(one.read(Left, Port::Wheel) > 10.0);
    assert!(one.read(Right, Port::Wheel) < 0.1);
}

#[test]
fn paths_apart_read_as_two_machines_would() {
    let change = [
        (Right, Param::PumpLeak, 0.03),
        (Left, Param::ReliefSet, 18.0),
    ];
    let two = run(Arrangement::Apart, [0.7, -0.4], &change);
    for (path, lever, p, v) in [
        (Left, 0.7, Param::ReliefSet, 18.0),
        (Right, -0.4, Param::PumpLeak, 0.03),
    ] {
        let change = [(Left, p, v)];
        let one = run(Arrangement::Single, [lever, 0.0], &change);
        for port in [
            Port::Charge,
            Port::LoopA,
            Port::LoopB,
            Port::Wheel,
            Port::MotorDrain,
        ] {
            // On the right, what is the right's own was left as it is.
            let mut theta = one.theta;
            if path == Right {
                theta[Param::ChargeDisp as usize] = healthy()[Param::ChargeDisp as usize];
                theta[Param::ReliefGain as usize] = healthy()[Param::ReliefGain as usize];
            }
            let solution = one.net.solve(&theta, None).expect("a state");
            let alone = one.net.reading(port, &solution, &theta);
            let own = two.read(path, port);
            assert!(
                (own - alone).abs() < 1e-6 * (1.0 + alone.abs()),
                "{path:?} {port:?} {own} {alone}"
            );
        }
    }
}

fn check_gradient(run: &Run) {
    for path in Path::BOTH {
        for port in Port::ALL.into_iter().filter(|p| *p != Port::Knee) {
            let shown = run
                .net
                .reading_and_gradient_on(path, port, &run.solution, &run.theta);
            assert!((shown.value - run.read(path, port)).abs() < 1e-9);
            for p in Param::ALL {
                for side in Path::BOTH {
                    let place = p.on(side);
                    let at = run.theta[place];
                    let (h, scale) = match p.scale() {
                        Scale::Log => (1e-5 * at, at),
                        Scale::Linear => (1e-5, 1.0),
                    };
                    let moved = |sign: f64| {
                        let mut t = run.theta;
                        t[place] = at + sign * h;
                        let s = run
                            .net
                            .solve(&t, Some(&run.solution.state))
                            .expect("a state");
                        run.net.reading_on(path, port, &s, &t)
                    };
                    let numeric = (moved(1.0) - moved(-1.0)) / (2.0 * h);
                    let exact = shown.gradient[place];
                    assert!(
                        (numeric - exact).abs() * scale
                            < 4e-4 * (5.0 + 4.0 * (exact * scale).abs() + 0.1 * shown.value.abs()),
                        "{path:?} {port:?} by {p:?} {side:?}: exact {exact}, numeric {numeric}"
                    );
                }
            }
        }
    }
}

#[test]
fn readings_of_both_paths_change_as_the_derivatives_say() {
    let change = [(Right, Param::MotorLeak, 0.02), (Left, Param::Bypass, 0.2)];
    check_gradient(&tandem([0.6, -0.3], &change));
    check_gradient(&run(Arrangement::Apart, [0.6, -0.3], &change));
}

#[test]
fn the_mirror_image_shows_the_mirror_image() {
    let change = [(Right, Param::MotorLeak, 0.02), (Left, Param::Bypass, 0.2)];
    for arrangement in [Arrangement::Tandem, Arrangement::Apart] {
        let one = run(arrangement, [0.6, -0.3], &change);
        let net = &one.net;
        assert!(net.is_symmetric());
        let theta = net.mirrored(&one.theta);
        assert_eq!(net.mirrored(&theta), one.theta);
        let solution = net.solve(&theta, None).expect("a state");
        let image = net.mirrored_state(&one.solution.state);
        for (a, b) in solution.state.iter().zip(image) {
            assert!((a - b).abs() < 1e-6 * (1.0 + a.abs()), "{a} {b}");
        }
        for path in Path::BOTH {
            let told = |p: &Port| !matches!(p, Port::Knee | Port::EngineSpeed);
            for port in Port::ALL.into_iter().filter(told) {
                let there = net.reading_and_gradient_on(path, port, &one.solution, &one.theta);
                let from = if net.at_common(port) {
                    path
                } else {
                    path.other()
                };
                let here = net.reading_and_gradient_on(from, port, &solution, &theta);
                let back = net.mirrored_shown(&there);
                assert!(
                    (here.value - back.value).abs() < 1e-6 * (1.0 + here.value.abs()),
                    "{port:?}"
                );
                for (a, b) in here.gradient.iter().zip(back.gradient) {
                    assert!((a - b).abs() < 1e-4 * (1.0 + a.abs()), "{port:?} {a} {b}");
                }
            }
        }
    }
}

#[test]
fn where_drains_do_not_pass_the_pump_the_common_return_takes_both() {
    let net = Network::new(Layout {
        arrangement: Arrangement::Tandem,
        separate_cases: true,
        ..Layout::default()
    });
    let mut theta = healthy();
    theta[Param::Lever as usize] = 0.5;
    let solution = net.solve(&theta, None).expect("a state");
    let back = net.reading(Port::ReturnFlow, &solution, &theta);
    let drains: f64 = Path::BOTH
        .map(|p| net.reading_on(p, Port::MotorDrain, &solution, &theta))
        .iter()
        .sum();
    let delivered: f64 = net
        .flows(&solution.state, &theta)
        .filter(|(e, _)| {
            matches!(
                e.law,
                lowside::circuit::Law::ChargePump
                    | lowside::circuit::Law::ChargeSlip
                    | lowside::circuit::Law::Consumers
            )
        })
        .map(|(e, q)| {
            if e.law == lowside::circuit::Law::ChargePump {
                q
            } else {
                -q
            }
        })
        .sum();
    assert!(drains > 0.5, "{drains}");
    assert!(
        (back - delivered).abs() < 1e-6 * delivered,
        "{back} {delivered}"
    );
    let shown = net.reading_and_gradient(Port::ReturnFlow, &solution, &theta);
    assert!((shown.value - back).abs() < 1e-9);
}
