//! Ground speed and differential-drive kinematics against printed examples.
#![cfg(not(target_arch = "wasm32"))]

mod published_common;

use lowside::kinematics::{Pose, TwoSides, drift, drift_radius, ground_speed, wheel_speed};
use lowside::quantity::typed::{Angle, AngularVelocity, Length, Time, Velocity};
use lowside::quantity::{Measure, Unit};
use published_common::{EXACT, book, close, within};
use uom::si;

fn metres(value: f64) -> Length {
    Length::new::<si::length::meter>(value)
}

fn speed(value: f64) -> Velocity {
    Velocity::new::<si::velocity::meter_per_second>(value)
}

fn seconds(value: f64) -> Time {
    Time::new::<si::time::second>(value)
}

fn radians(value: f64) -> Angle {
    Angle::new::<si::angle::radian>(value)
}

fn in_unit(velocity: Velocity, unit: Unit) -> f64 {
    Measure::from_velocity(velocity)
        .expect("a finite speed")
        .in_unit(unit)
}

/// H1: a how-to article. H2: an engineering formula page, mph = r n / (168.07 G). H3: an engineering handbook page.
#[test]
fn ground_speeds() {
    let found = ground_speed(book::rpm(300.0), book::length(15.0, Unit::Inch));
    close("H1", in_unit(found, Unit::MilePerHour), 26.77, 0.001);
    let wheel = wheel_speed(book::rpm(3000.0), 3.73);
    close(
        "H2",
        in_unit(
            ground_speed(wheel, book::length(15.0, Unit::Inch)),
            Unit::MilePerHour,
        ),
        71.8,
        0.001,
    );
    let found = ground_speed(wheel_speed(book::rpm(100.0), 1.0), metres(0.5));
    close("H3", in_unit(found, Unit::KilometrePerHour), 18.85, 0.0001);
}

/// H4: R = (l/2)(Vr + Vl)/(Vr − Vl), ω = (Vr − Vl)/l. H5: an online exercise (answer derived).
#[test]
fn turn_of_two_wheels() {
    let wheel = |value| {
        ground_speed(
            AngularVelocity::new::<si::angular_velocity::radian_per_second>(value),
            metres(0.1),
        )
    };
    let sides = TwoSides {
        track: metres(0.5),
        left: wheel(2.0),
        right: wheel(3.0),
    };
    close("H5 speed", sides.speed().value, 0.25, EXACT);
    close("H5 yaw", sides.yaw_rate().value, 0.20, EXACT);
    let radius = sides.turn_radius().expect("it turns").value;
    close("H5 radius", radius, 1.25, EXACT);
    close(
        "H4",
        radius,
        sides.speed().value / sides.yaw_rate().value,
        EXACT,
    );
}

/// H6: university homework: both sides 5 cm/s for 5 s.
#[test]
fn straight_run() {
    let sides = TwoSides {
        track: metres(0.10),
        left: speed(0.05),
        right: speed(0.05),
    };
    let start = Pose {
        x: metres(0.0),
        y: metres(0.0),
        heading: radians(0.0),
    };
    let end = start.after(&sides, seconds(5.0));
    close("H6", end.x.value, 0.25, EXACT);
    within("H6 sideways", end.y.value, 0.0, EXACT);
}

/// H9: solution notebook of a mobile-robotics course.
#[test]
fn chain_of_poses() {
    let mut pose = Pose {
        x: metres(1.5),
        y: metres(2.0),
        heading: radians(std::f64::consts::FRAC_PI_2),
    };
    let steps = [
        (0.3, 0.3, 3.0, (1.5, 2.9, std::f64::consts::FRAC_PI_2)),
        (0.1, -0.1, 1.0, (1.5, 2.9, 1.170_796_326_794_896_6)),
        (
            0.2,
            0.0,
            2.0,
            (1.639_675_8, 3.035_655_2, 0.370_796_326_794_896_6),
        ),
    ];
    for (left, right, time, (x, y, heading)) in steps {
        let sides = TwoSides {
            track: metres(0.5),
            left: speed(left),
            right: speed(right),
        };
        pose = pose.after(&sides, seconds(time));
        // The notebook's last pose is printed to seven decimals.
        within("H9 x", pose.x.value, x, 5e-8);
        within("H9 y", pose.y.value, y, 5e-8);
        within("H9 heading", pose.heading.value, heading, 1e-9);
    }
}

/// H10: limits of H4, course notes.
#[test]
fn limits_of_the_turn() {
    let sides = |left, right| TwoSides {
        track: metres(0.8),
        left: speed(left),
        right: speed(right),
    };
    assert_eq!(sides(1.0, 1.0).turn_radius(), None, "H10 straight");
    within(
        "H10 on the spot",
        sides(-1.0, 1.0).turn_radius().expect("it turns").value,
        0.0,
        EXACT,
    );
    close(
        "H10 about one side",
        sides(0.0, 1.0).turn_radius().expect("it turns").value,
        0.4,
        EXACT,
    );
}

/// H12: drift of a machine with one side 2 % slower (derived).
#[test]
fn drift_over_ten_metres() {
    let radius = drift_radius(metres(1.0), 0.02).expect("it drifts").value;
    close("H12 radius", radius, 49.5, 0.001);
    close(
        "H12",
        drift(metres(1.0), 0.02, metres(10.0)).value,
        1.0067,
        0.001,
    );
}
