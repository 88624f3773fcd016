//! The exact derivatives of every reading agree with central differences over re-solved circuits.

use lowside::circuit::{ControlBuild, Layout, Network, Param, Scale, healthy};
use lowside::readings::Port;

fn check(layout: Layout, lever: f64, load: f64) {
    let net = Network::new(layout);
    let mut theta = healthy();
    theta[Param::Lever as usize] = lever;
    theta[Param::Load as usize] = load;
    theta[Param::CheckLeakA as usize] = 0.3;
    theta[Param::Bypass as usize] = 0.2;
    theta[Param::ConsumerLeak as usize] = 0.3;
    let solution = net
        .solve(&theta, None)
        .expect("a healthy machine has a state");
    for port in Port::ALL {
        if port == Port::Knee {
            continue;
        }
        let shown = net.reading_and_gradient(port, &solution, &theta);
        assert!((shown.value - net.reading(port, &solution, &theta)).abs() < 1e-9);
        for p in Param::ALL {
            let at = theta[*p as usize];
            let h = match p.scale() {
                Scale::Log => 1e-5 * at,
                Scale::Linear => 1e-5,
            };
            let side = |sign: f64| {
                let mut t = theta;
                t[*p as usize] = at + sign * h;
                let s = net
                    .solve(&t, Some(&solution.state))
                    .expect("a neighbour has a state");
                net.reading(port, &s, &t)
            };
            let numeric = (side(1.0) - side(-1.0)) / (2.0 * h);
            let exact = shown.gradient[*p as usize];
            let scale = match p.scale() {
                Scale::Log => at,
                Scale::Linear => 1.0,
            };
            assert!(
                (numeric - exact).abs() * scale
                    < 4e-4 * (5.0 + 4.0 * (exact * scale).abs() + 0.1 * shown.value.abs()),
                "{port:?} by {p:?}: exact {exact}, numeric {numeric}"
            );
        }
    }
}

#[test]
fn readings_change_with_parameters_as_the_derivatives_say() {
    check(Layout::default(), 0.5, 60.0);
    check(
        Layout {
            held: [true; 2],
            ..Layout::default()
        },
        0.1,
        0.0,
    );
    check(
        Layout {
            control: ControlBuild::NoFeedback,
            separate_cases: true,
            relief_to_tank: true,
            ..Layout::default()
        },
        -0.7,
        40.0,
    );
    check(
        Layout {
            control: ControlBuild::Direct,
            ..Layout::default()
        },
        0.0,
        0.0,
    );
}

#[test]
fn the_knee_moves_with_parameters_as_the_derivatives_say() {
    let net = Network::new(Layout {
        held: [true; 2],
        ..Layout::default()
    });
    let mut theta = healthy();
    theta[Param::ChargeSlip as usize] = 0.5;
    let shown = net.knee(&theta, 2400.0).expect("a knee");
    assert!(
        shown.value > 300.0 && shown.value < 2400.0,
        "{}",
        shown.value
    );
    for p in [
        Param::ChargeSlip,
        Param::ReliefSet,
        Param::Viscosity,
        Param::ControlLeak,
    ] {
        let h = 1e-5 * theta[p as usize];
        let side = |sign: f64| {
            let mut t = theta;
            t[p as usize] += sign * h;
            net.knee(&t, 2400.0).expect("a knee").value
        };
        let numeric = (side(1.0) - side(-1.0)) / (2.0 * h);
        let exact = shown.gradient[p as usize];
        assert!(
            (numeric - exact).abs() < 1e-3 * exact.abs().max(1.0),
            "{p:?}: {exact} {numeric}"
        );
    }
}
