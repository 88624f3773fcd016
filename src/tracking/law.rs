//! What the runs would show, given how the two sides differ.
//!
//! Each side runs at `stroke × level`, with `stroke = lever (1 + σ (gain ± one way + stop at full)) ± σ null + σ load × loss` and
//! σ = +½ for the right, −½ for the left side; ± by direction of travel. Over the ground the rolling radius comes in. The path is
//! the arc with curvature `2/track × (right − left)/(right + left)`, plus what the camber of the lane gives.

use super::run::{Facing, Gear, Lever, Load, Machine, Run, Seen, Setting};
use crate::math;

/// Unknowns: the seven mismatches first, then what has to be known beside them.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[repr(usize)]
pub enum Latent {
    /// Rolling radius, right over left, share.
    Rolling,
    /// Null, right over left, share of full stroke.
    Null,
    /// Gain, right over left, share.
    Gain,
    /// Gain forward over gain in reverse, right over left, half of the difference, share.
    OneWay,
    /// Stop at full lever, right over left, share.
    Stop,
    /// Range 2, right over left, share.
    Range,
    /// Loss on level ground, left over right, share of full speed.
    Loss,
    /// Camber of the lane, as the mismatch that it feigns while the front looks out, share.
    Camber,
    /// ln of effective over measured track width.
    Scrub,
    /// Share of full speed at low lever.
    Low,
    /// Share of full speed at half lever.
    Half,
    /// ln of the loss with wheels free over that on level ground.
    FreeLoss,
    /// ln of the loss under load over that on level ground.
    LoadedLoss,
    /// ln of wheel rpm at full lever.
    Level,
}

/// Unknowns in all.
pub const SIZE: usize = 14;

/// A value for each unknown.
pub type State = [f64; SIZE];

/// What is believed before any run: centre and standard width of each unknown.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Prior {
    /// Centre.
    pub centre: State,
    /// Standard width.
    pub width: State,
}

/// Standard widths of the mismatches, in the order of [`Latent`]: share. Common practice, from memory.
const WIDTHS: [f64; 7] = [0.012, 0.03, 0.03, 0.02, 0.03, 0.05, 0.025];
/// Camber of a lane that looks level, as a mismatch, share: about 2 % side slope. Common practice, from memory.
const CAMBER: f64 = 0.006;
/// Lever marks: share of full speed, and standard width. Common practice.
const LOW: (f64, f64) = (0.25, 0.07);
const HALF: (f64, f64) = (0.5, 0.08);
/// Width where the mechanic has given the share himself.
const MARKED: f64 = 0.03;
/// Loss with wheels free and under load against level ground, and relative width. Common practice, from memory.
const FREE_LOSS: (f64, f64) = (0.4, 0.35);
const LOADED_LOSS: (f64, f64) = (2.5, 0.35);
/// Wheel speed at full lever: so wide that it says nothing.
const LEVEL: (f64, f64) = (100.0, 3.0);

impl Prior {
    /// For this machine.
    #[must_use]
    pub fn of(machine: &Machine) -> Prior {
        let (scrub, scrub_width) = machine.undercarriage.scrub();
        let mark = |known: Option<f64>, usual: (f64, f64)| known.map_or(usual, |m| (m, MARKED));
        let (low, half) = (mark(machine.low, LOW), mark(machine.half, HALF));
        let mut prior = Prior {
            centre: [0.0; SIZE],
            width: [CAMBER; SIZE],
        };
        for (width, usual) in prior.width.iter_mut().zip(WIDTHS) {
            *width = usual;
        }
        for (latent, centre, width) in [
            (Latent::Scrub, math::ln(scrub), scrub_width),
            (Latent::Low, low.0, low.1),
            (Latent::Half, half.0, half.1),
            (Latent::FreeLoss, math::ln(FREE_LOSS.0), FREE_LOSS.1),
            (Latent::LoadedLoss, math::ln(LOADED_LOSS.0), LOADED_LOSS.1),
            (Latent::Level, math::ln(LEVEL.0), LEVEL.1),
        ] {
            prior.centre[latent as usize] = centre;
            prior.width[latent as usize] = width;
        }
        prior
    }
}

/// Least output of a side that the law follows, share of full: below it a side does not drive at all.
const LEAST: f64 = 0.02;

fn of(x: &State, latent: Latent) -> f64 {
    x[latent as usize]
}

/// Speeds of left and right wheel, share of full.
fn wheels(x: &State, setting: Setting) -> (f64, f64) {
    let lever = match setting.lever {
        Lever::Low => of(x, Latent::Low),
        Lever::Half => of(x, Latent::Half),
        Lever::Full => 1.0,
    };
    let load = match setting.load {
        Load::Free => math::exp(of(x, Latent::FreeLoss)),
        Load::Level => 1.0,
        Load::Loaded => math::exp(of(x, Latent::LoadedLoss)),
    };
    let way = setting.travel.sign();
    let mut proportional = of(x, Latent::Gain) + way * of(x, Latent::OneWay);
    if setting.lever == Lever::Full {
        proportional += of(x, Latent::Stop);
    }
    let constant = way * of(x, Latent::Null) + load * of(x, Latent::Loss);
    let range = match setting.gear {
        Gear::One => 0.0,
        Gear::Two => of(x, Latent::Range),
    };
    let side = |half: f64| {
        let stroke = lever * (1.0 + half * proportional) + half * constant;
        stroke.max(LEAST) * (1.0 + half * range)
    };
    (side(-0.5), side(0.5))
}

/// Speeds of left and right over the ground, share of full.
pub(super) fn sides(x: &State, setting: Setting) -> (f64, f64) {
    let (left, right) = wheels(x, setting);
    let rolling = 0.5 * of(x, Latent::Rolling);
    (left * (1.0 - rolling), right * (1.0 + rolling))
}

/// Effective track width, m.
pub(super) fn width(x: &State, track: f64) -> f64 {
    track * math::exp(of(x, Latent::Scrub))
}

/// Curvature of the path on level ground, 1/m, positive to the left of the seat.
pub(super) fn curvature(x: &State, setting: Setting, track: f64) -> f64 {
    let (left, right) = sides(x, setting);
    2.0 / width(x, track) * (right - left) / (right + left)
}

/// One figure that the law can foretell, with its standard uncertainty.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Datum {
    pub setting: Setting,
    pub shown: Shown,
    pub value: f64,
    pub uncertainty: f64,
}

/// What a datum is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Shown {
    /// Curvature of the path, 1/m, on a machine of this track width, m.
    Curvature { track: f64 },
    /// ln of right over left wheel speed.
    WheelRatio,
    /// ln of right over left ground speed.
    GroundRatio,
    /// ln of right over left rolling radius.
    RollingRatio,
    /// ln of the mean wheel speed, rpm.
    WheelLevel,
}

impl Datum {
    /// What the law gives.
    pub(super) fn foretold(&self, x: &State) -> f64 {
        let ratio = |(left, right): (f64, f64)| math::ln(right / left);
        match self.shown {
            Shown::Curvature { track } => {
                let camber = match self.setting.facing {
                    Facing::Out => of(x, Latent::Camber),
                    Facing::Back => -of(x, Latent::Camber),
                };
                curvature(x, self.setting, track) + camber / track
            }
            Shown::WheelRatio => ratio(wheels(x, self.setting)),
            Shown::GroundRatio => ratio(sides(x, self.setting)),
            Shown::RollingRatio => {
                let half = 0.5 * of(x, Latent::Rolling);
                math::ln((1.0 + half) / (1.0 - half))
            }
            Shown::WheelLevel => {
                let (left, right) = wheels(x, self.setting);
                of(x, Latent::Level) + math::ln(0.5 * (left + right))
            }
        }
    }
}

/// Sighting of the start along the lane, rad; tape, m. Common practice.
const SIGHTING: f64 = 0.006;
const TAPE: f64 = 0.02;
/// A count is good to an eighth of a turn either way (rectangular, JCGM 100), turns.
const COUNT: f64 = 0.125 / 1.732_050_807_568_877_2;
/// Reaction at each end of a timed count, s. Common practice.
const REACTION: f64 = 0.2;
/// A hand tachometer on each side, share; each side's speed over the ground, share. Common practice.
const TACHOMETER: f64 = 0.003;
const GROUND: f64 = 0.01;
/// Roll-out mark, m.
const ROLL_OUT: f64 = 0.004;
/// From run to run the two sides do not come back alike: share of speed, and share of full stroke (play). Common practice.
const AGAIN: f64 = 0.002;
const PLAY: f64 = 0.0015;
/// The engine does not hold its speed from run to run, share.
const ENGINE: f64 = 0.03;
/// A governed engine at no load from one count to the next, share. Common practice.
const COUNTS_APART: f64 = 0.005;

fn root_of_squares(terms: &[f64]) -> f64 {
    terms.iter().map(|t| t * t).sum::<f64>().sqrt()
}

/// How well the two sides come back to the same ratio, share.
fn again(setting: Setting) -> f64 {
    let lever = match setting.lever {
        Lever::Low => LOW.0,
        Lever::Half => HALF.0,
        Lever::Full => 1.0,
    };
    root_of_squares(&[AGAIN, PLAY / lever])
}

/// What a run says, as figures the law can foretell. The run has been checked.
pub(super) fn data(run: &Run, machine: &Machine) -> Vec<Datum> {
    let setting = run.setting;
    let datum = |shown, value, uncertainty| Datum {
        setting,
        shown,
        value,
        uncertainty,
    };
    let ratio = |shown, left: f64, right: f64, uncertainty: f64| {
        let all = root_of_squares(&[uncertainty, again(setting)]);
        datum(shown, math::ln(right / left), all)
    };
    let level = |rpm: f64, uncertainty: f64| {
        (setting.gear == Gear::One).then(|| {
            let all = root_of_squares(&[ENGINE, uncertainty]);
            datum(Shown::WheelLevel, math::ln(rpm), all)
        })
    };
    match run.seen {
        Seen::Path { distance, left } => {
            let Some(track) = machine.track else {
                return Vec::new();
            };
            let sideways = run
                .uncertainty
                .unwrap_or_else(|| root_of_squares(&[TAPE, SIGHTING * distance]));
            // The circle that starts along the lane and ends there: distance² + left² = 2 left × radius, exactly.
            let square = distance * distance + left * left;
            let slope = 2.0 * (distance * distance - left * left) / (square * square);
            let uncertainty = root_of_squares(&[slope * sideways, again(setting) / track]);
            let curvature = 2.0 * left / square;
            vec![datum(Shown::Curvature { track }, curvature, uncertainty)]
        }
        Seen::Turns {
            left,
            right,
            seconds,
        } => {
            let count = run.uncertainty.unwrap_or(COUNT);
            // One start and one stop for both: the time drops out of the ratio.
            let counted = root_of_squares(&[count / left, count / right]);
            let mut all = vec![ratio(Shown::WheelRatio, left, right, counted)];
            all.extend(seconds.and_then(|seconds| {
                let rpm = 30.0 * (left + right) / seconds;
                level(rpm, root_of_squares(&[REACTION, REACTION]) / seconds)
            }));
            all
        }
        Seen::TurnsApart { left, right } => {
            let count = run.uncertainty.unwrap_or(COUNT);
            let of = |(turns, seconds): (f64, f64)| {
                let timed = root_of_squares(&[REACTION, REACTION]) / seconds;
                (turns / seconds, root_of_squares(&[count / turns, timed]))
            };
            let ((left, u_left), (right, u_right)) = (of(left), of(right));
            let both = root_of_squares(&[u_left, u_right, COUNTS_APART]);
            let mut all = vec![ratio(Shown::WheelRatio, left, right, both)];
            all.extend(level(30.0 * (left + right), both));
            all
        }
        Seen::WheelSpeeds { left, right } => {
            let each = |speed: f64| run.uncertainty.map_or(TACHOMETER, |u| u / speed);
            let both = root_of_squares(&[each(left), each(right)]);
            let mut all = vec![ratio(Shown::WheelRatio, left, right, both)];
            all.extend(level(0.5 * (left + right), both));
            all
        }
        Seen::SideSpeeds { left, right } => {
            let each = |speed: f64| run.uncertainty.map_or(GROUND, |u| u / speed);
            let both = root_of_squares(&[each(left), each(right)]);
            vec![ratio(Shown::GroundRatio, left, right, both)]
        }
        Seen::RollOut { left, right } => {
            let mark = run.uncertainty.unwrap_or(ROLL_OUT);
            let both = root_of_squares(&[mark / left, mark / right]);
            vec![datum(
                Shown::RollingRatio,
                math::ln(right / left),
                both.max(1e-4),
            )]
        }
    }
}
