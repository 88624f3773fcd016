//! Words and figures of the tracking screen.

use crate::quantity::{DecimalMark, Decimals, Measure, Unit, UnitPrefs, format_with_unit};
pub use crate::tracking::usual_undercarriage;
use crate::tracking::{
    Agreement, Candidate, Facing, Field, Gear, Head, Lever, Load, Seen, Setting, Travel, Verdict,
    What,
};

/// A share with its half-width, in per cent: "1.2 % ± 0.3 %".
pub fn share(value: f64, half: f64, mark: DecimalMark) -> String {
    format!(
        "{} ± {}",
        percent(value, half, mark),
        percent(half, half, mark)
    )
}

/// A share in per cent, with the places that its half-width leaves.
pub fn percent(value: f64, half: f64, mark: DecimalMark) -> String {
    let places = if half < 0.001 {
        2
    } else if half < 0.1 {
        1
    } else {
        0
    };
    figure(100.0 * value, Unit::Percent, places, mark)
}

/// A figure in a unit; nothing where it is none.
pub fn figure(value: f64, unit: Unit, places: u8, mark: DecimalMark) -> String {
    Measure::new(value, unit)
        .map(|measure| format_with_unit(measure, unit, Decimals::Fixed(places), mark))
        .unwrap_or_default()
}

/// A length in the shop's unit for deviations.
pub fn aside(metres: f64, prefs: &UnitPrefs) -> String {
    Measure::new(metres, Unit::Metre)
        .map(|measure| format_with_unit(measure, length(prefs), Decimals::Fixed(2), prefs.mark()))
        .unwrap_or_default()
}

/// The length of a lane in the shop's unit.
pub fn lane(metres: f64, prefs: &UnitPrefs) -> String {
    let measure = Measure::new(metres, Unit::Metre).ok();
    let places = measure
        .map(|measure| measure.in_unit(length(prefs)))
        .map_or(0, |value| u8::from((value - value.round()).abs() > 0.05));
    measure
        .map(|measure| {
            format_with_unit(
                measure,
                length(prefs),
                Decimals::Fixed(places),
                prefs.mark(),
            )
        })
        .unwrap_or_default()
}

/// The unit in which lanes and deviations are told.
pub fn length(prefs: &UnitPrefs) -> Unit {
    match prefs.unit(Unit::Metre.kind()) {
        Unit::Foot | Unit::Inch => Unit::Foot,
        _ => Unit::Metre,
    }
}

/// Forward or reverse.
pub fn travel(travel: Travel) -> &'static str {
    match travel {
        Travel::Forward => "forward",
        Travel::Reverse => "reverse",
    }
}

/// How far the levers are.
pub fn lever(lever: Lever) -> &'static str {
    match lever {
        Lever::Low => "low lever",
        Lever::Half => "half lever",
        Lever::Full => "full lever",
    }
}

/// What the sides push.
pub fn load(load: Load) -> &'static str {
    match load {
        Load::Free => "wheels clear",
        Load::Level => "on level ground",
        Load::Loaded => "under load",
    }
}

/// What is measured.
pub fn what(what: What) -> &'static str {
    match what {
        What::Turns => "Turns of both sides, same time",
        What::TurnsApart => "Turns of each side, own time",
        What::WheelSpeeds => "Wheel or sprocket speeds",
        What::SideSpeeds => "Ground speed of each side",
        What::Path => "Path on a lane",
        What::RollOut => "One turn rolled out",
    }
}

/// A setting in words, as far as it bears on what is measured.
pub fn setting(of: What, setting: Setting) -> String {
    if of == What::RollOut {
        return "straight, on the ground".to_owned();
    }
    let mut words = vec![lever(setting.lever), travel(setting.travel)];
    if of != What::Path || setting.load != Load::Level {
        words.push(load(setting.load));
    }
    if setting.gear == Gear::Two {
        words.push("range 2");
    }
    if of == What::Path && setting.facing == Facing::Back {
        words.push("turned round");
    }
    words.join(", ")
}

/// A field's label.
pub fn field(of: What, field: Field) -> &'static str {
    match (of, field) {
        (What::TurnsApart, Field::Seconds) => "Time of the left count",
        (_, Field::Seconds) => "Time of both counts, if taken",
        (_, Field::SecondsRight) => "Time of the right count",
        (_, Field::Distance) => "Length of the lane",
        (_, Field::Aside) => "Middle ended beside the line by",
        (_, Field::Uncertainty) => "Good to ± (standard), if you know",
        (What::Turns | What::TurnsApart, Field::Left) => "Left, turns",
        (What::Turns | What::TurnsApart, Field::Right) => "Right, turns",
        (What::RollOut, Field::Left) => "Left, mark to mark",
        (What::RollOut, Field::Right) => "Right, mark to mark",
        (_, Field::Left) => "Left",
        (_, Field::Right) => "Right",
    }
}

/// Label and hint of a field of the head.
pub fn head(head: Head) -> (&'static str, &'static str) {
    match head {
        Head::Track => (
            "Track width",
            "middle of the left wheel or track to middle of the right one",
        ),
        Head::Low => (
            "Speed at the low mark",
            "per cent of full speed; empty: about 25 %",
        ),
        Head::Half => (
            "Speed at the half mark",
            "per cent of full speed; empty: about 50 %",
        ),
        Head::NullTurn => (
            "One turn of the null screw",
            "per cent of full stroke, from the manual or your own trial; empty: no turns are told",
        ),
        Head::StopTurn => (
            "One turn of the full-stroke stop",
            "per cent of full stroke, from the manual or your own trial; empty: no turns are told",
        ),
    }
}

/// A verdict in words, and its class.
pub fn verdict(verdict: Verdict, is_seen: bool) -> (&'static str, &'static str) {
    match verdict {
        Verdict::RightFaster => ("right faster", "is-off"),
        Verdict::LeftFaster => ("left faster", "is-off"),
        Verdict::Equal => ("equal within 1 %", "is-even"),
        Verdict::CannotTell if is_seen => ("cannot tell yet", "is-open"),
        Verdict::CannotTell => ("no run bears on it", "is-open"),
    }
}

/// The run to make, in words, with what it takes.
pub fn candidate(candidate: &Candidate) -> String {
    let of = what_of(candidate);
    let how = match of {
        What::RollOut => "Roll out one turn of each side",
        What::Path => "Run the lane",
        _ => "Count wheel turns of both sides over the same time",
    };
    format!("{how}: {}", setting(of, candidate.setting))
}

/// What a candidate measures.
pub fn what_of(candidate: &Candidate) -> What {
    match candidate.seen {
        Seen::Path { .. } => What::Path,
        Seen::RollOut { .. } => What::RollOut,
        Seen::TurnsApart { .. } => What::TurnsApart,
        Seen::WheelSpeeds { .. } => What::WheelSpeeds,
        Seen::SideSpeeds { .. } => What::SideSpeeds,
        Seen::Turns { .. } => What::Turns,
    }
}

/// Whether the runs agree, in words.
pub fn agreement(agreement: Agreement, widening: f64, mark: DecimalMark) -> Option<String> {
    match agreement {
        Agreement::TooFew => None,
        Agreement::Agree => Some("The runs agree within their uncertainties.".to_owned()),
        Agreement::Disagree { worst } => Some(format!(
            "The runs scatter more than counting and tape allow: play in the linkage, camber, the operator’s hand. All ± are widened {} \
             times. Run {} stands out most: make it again, each run from rest, levers moved the same way.",
            figure(widening, Unit::Fraction, 1, mark),
            worst + 1
        )),
    }
}
