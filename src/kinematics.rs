//! How the machine moves: ground speed from the wheels, and the path of a machine that is steered by the difference of two
//! sides (differential drive).
//!
//! Forward speeds are positive; headings and yaw are counter-clockwise, so a faster right side turns the machine to the
//! left.

use crate::math::{cos, sin};
use crate::quantity::typed::{Angle, AngularVelocity, Length, Time, Velocity};
use uom::si;

/// Yaw under which a path counts as straight, as an angle over the step. The arc and the straight line then differ by less
/// than a rounding error.
const STRAIGHT: f64 = 1e-9;

/// Ground speed of a wheel or sprocket with this rolling radius, without slip.
#[must_use]
pub fn ground_speed(wheel: AngularVelocity, rolling_radius: Length) -> Velocity {
    velocity(wheel.value * rolling_radius.value)
}

/// Wheel speed behind a reduction: motor turns over wheel turns.
#[must_use]
pub fn wheel_speed(motor: AngularVelocity, reduction: f64) -> AngularVelocity {
    motor / reduction
}

/// Share of the wheel's speed that is lost to slip on the ground.
#[must_use]
pub fn slip_share(ground: Velocity, wheel: Velocity) -> f64 {
    1.0 - ground.value / wheel.value
}

/// Speeds of the two sides and their distance.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct TwoSides {
    /// Distance between the lines on which the two sides run.
    pub track: Length,
    /// Speed of the left side.
    pub left: Velocity,
    /// Speed of the right side.
    pub right: Velocity,
}

impl TwoSides {
    /// Speed of the middle.
    #[must_use]
    pub fn speed(&self) -> Velocity {
        0.5 * (self.left + self.right)
    }

    /// Yaw rate, (Vr − Vl) / track; counter-clockwise positive.
    #[must_use]
    pub fn yaw_rate(&self) -> AngularVelocity {
        AngularVelocity::new::<si::angular_velocity::radian_per_second>(
            (self.right.value - self.left.value) / self.track.value,
        )
    }

    /// Radius of the middle's path, (track / 2) (Vr + Vl) / (Vr − Vl): positive to the left. None when it runs straight.
    #[must_use]
    pub fn turn_radius(&self) -> Option<Length> {
        let difference = self.right.value - self.left.value;
        (difference != 0.0)
            .then(|| 0.5 * self.track * ((self.right.value + self.left.value) / difference))
    }
}

/// Where the machine stands and which way it looks.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Pose {
    /// East, say.
    pub x: Length,
    /// North, say.
    pub y: Length,
    /// Heading from the x axis, counter-clockwise. Not wrapped: full turns add up.
    pub heading: Angle,
}

impl Pose {
    /// The pose after both sides ran at constant speed for a time: an arc, exactly.
    #[must_use]
    pub fn after(&self, sides: &TwoSides, time: Time) -> Pose {
        let turned = sides.yaw_rate().value * time.value;
        let run = sides.speed().value * time.value;
        let start = self.heading.value;
        let (dx, dy) = if turned.abs() < STRAIGHT {
            (run * cos(start), run * sin(start))
        } else {
            let radius = run / turned;
            (
                radius * (sin(start + turned) - sin(start)),
                radius * (cos(start) - cos(start + turned)),
            )
        };
        Pose {
            x: self.x + length(dx),
            y: self.y + length(dy),
            heading: Angle::new::<si::angle::radian>(start + turned),
        }
    }
}

/// How far a machine that should run straight ends up to the side, after its middle has run `distance`, when one side is
/// slower than the other by `share` (0.02 for 2 %). Away from the faster side, always positive.
#[must_use]
pub fn drift(track: Length, share: f64, distance: Length) -> Length {
    match mismatch_radius(track, share) {
        Some(radius) => length(lateral(radius, distance.value)),
        None => length(0.0),
    }
}

/// Radius of the path when one side is slower than the other by `share`; none when both are alike.
#[must_use]
pub fn drift_radius(track: Length, share: f64) -> Option<Length> {
    mismatch_radius(track, share).map(length)
}

fn mismatch_radius(track: Length, share: f64) -> Option<f64> {
    let share = share.abs();
    (share > 0.0).then(|| 0.5 * track.value * (2.0 - share) / share)
}

fn lateral(radius: f64, distance: f64) -> f64 {
    // 1 - cos without loss where the angle is small.
    let half = sin(0.5 * distance / radius);
    2.0 * radius * half * half
}

/// The share by which one side is slower, from a drift measured over a distance: the inverse of [`drift`]. None where no
/// share below 1 can drift that far without coming back (beyond a quarter turn), or the figures are not positive.
#[must_use]
pub fn mismatch_from_drift(track: Length, drifted: Length, distance: Length) -> Option<f64> {
    let (track, drifted, distance) = (track.value, drifted.value, distance.value);
    if !(track > 0.0 && distance > 0.0 && drifted >= 0.0) {
        return None;
    }
    // The angle turned lies between none and a quarter turn, and the drift rises with it.
    let at = |turned: f64| lateral(distance / turned, distance);
    let (mut small, mut large) = (0.0, core::f64::consts::FRAC_PI_2);
    if drifted > at(large) {
        return None;
    }
    for _ in 0..60 {
        let middle = 0.5 * (small + large);
        if at(middle) < drifted {
            small = middle;
        } else {
            large = middle;
        }
    }
    let turned = 0.5 * (small + large);
    // turned = distance / R and R = (track / 2)(2 - s) / s.
    let radii = distance / (0.5 * track) / turned;
    let share = 2.0 / (radii + 1.0);
    (share < 1.0).then_some(share)
}

fn length(metres: f64) -> Length {
    Length::new::<si::length::meter>(metres)
}

fn velocity(metres_per_second: f64) -> Velocity {
    Velocity::new::<si::velocity::meter_per_second>(metres_per_second)
}

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests {
    use super::*;
    use proptest::prelude::*;

    proptest! {
        #[test]
        fn mismatch_is_read_back_from_its_drift(share in 1e-4_f64..0.08, track in 0.8_f64..3.0, distance in 2.0_f64..20.0) {
            let turned = distance / (0.5 * track * (2.0 - share) / share);
            prop_assume!(turned < 1.5);
            let drifted = drift(length(track), share, length(distance));
            let back = mismatch_from_drift(length(track), drifted, length(distance)).expect("within a quarter turn");
            prop_assert!((back - share).abs() < 1e-6 * share + 1e-9, "{back}");
        }

        #[test]
        fn two_half_steps_are_one_step(left in -2.0_f64..2.0, right in -2.0_f64..2.0, seconds in 0.0_f64..10.0) {
            let sides = TwoSides { track: length(1.2), left: velocity(left), right: velocity(right) };
            let start = Pose { x: length(0.0), y: length(0.0), heading: Angle::new::<si::angle::radian>(0.3) };
            let time = |s| Time::new::<si::time::second>(s);
            let whole = start.after(&sides, time(seconds));
            let halves = start.after(&sides, time(0.5 * seconds)).after(&sides, time(0.5 * seconds));
            prop_assert!((whole.x - halves.x).value.abs() < 1e-6);
            prop_assert!((whole.y - halves.y).value.abs() < 1e-6);
            prop_assert!((whole.heading - halves.heading).value.abs() < 1e-12);
        }
    }

    #[test]
    fn no_drift_without_mismatch_and_no_answer_without_figures() {
        assert_eq!(drift(length(1.0), 0.0, length(10.0)).value, 0.0);
        assert_eq!(drift_radius(length(1.0), 0.0), None);
        assert!(
            mismatch_from_drift(length(1.0), length(0.0), length(10.0))
                .is_some_and(|share| share < 1e-9)
        );
        assert_eq!(
            mismatch_from_drift(length(1.0), length(9.0), length(10.0)),
            None
        );
        assert_eq!(
            mismatch_from_drift(length(1.0), length(f64::NAN), length(10.0)),
            None
        );
    }
}
