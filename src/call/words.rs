//! Words of the call screen: states, sources, conditions and probabilities in the trade's own terms.

use crate::assessment::{Assessment, Cause, SinceBench, Standing, Trust, WindowSource};
use crate::faults::FaultId;
use crate::quantity::{self, DecimalMark, Decimals, Kind, Measure, Unit, UnitPrefs};
use crate::readings::{Condition, Direction, EngineSpeed, Lever, Port, Seen};

/// Narrow no-break space: before a per cent sign and between a figure and its unit.
const NARROW: char = '\u{202F}';

/// The word for a standing. It stands beside the shape and the colour, never in place of them.
pub fn standing(standing: Standing) -> &'static str {
    match standing {
        Standing::Within => "within",
        Standing::Edge => "at the edge",
        Standing::Low => "low",
        Standing::High => "high",
        Standing::CannotTell => "cannot tell",
        Standing::Open => "not read yet",
    }
}

/// The end of a class name for a standing.
pub fn standing_class(standing: Standing) -> &'static str {
    match standing {
        Standing::Within => "within",
        Standing::Edge => "edge",
        Standing::Low => "low",
        Standing::High => "high",
        Standing::CannotTell => "unsure",
        Standing::Open => "open",
    }
}

/// Where a window comes from.
pub fn source(source: WindowSource) -> &'static str {
    match source {
        WindowSource::Manual => "from the unit's manual",
        WindowSource::Computed => "computed from these inputs",
        WindowSource::Practice => "common practice for the class",
    }
}

/// A share as an honest per cent: whole per cent only, and never a nought or a hundred that nobody can vouch for.
pub fn percent(share: f64) -> String {
    let per_cent = (share * 100.0).clamp(0.0, 100.0);
    if !per_cent.is_finite() {
        return String::from("?");
    }
    if per_cent < 1.0 {
        format!("<1{NARROW}%")
    } else if per_cent > 99.0 {
        format!(">99{NARROW}%")
    } else {
        format!("{per_cent:.0}{NARROW}%")
    }
}

/// A reading as a share of another one, which it may pass: whole per cent.
pub fn times(share: f64) -> String {
    if share.is_finite() {
        format!("{:.0}{NARROW}%", share * 100.0)
    } else {
        String::from("?")
    }
}

/// What a case flow says against the bench: "1.6 (1.3 to 2.0) times what the bench measured on 4 Mar 2025, at the same oil and
/// pressure".
pub fn since_bench(since: &SinceBench, prefs: &UnitPrefs) -> String {
    let number = |value: f64| {
        let text = match value {
            v if v < 0.1 => format!("{v:.2}"),
            v if v < 10.0 => format!("{v:.1}"),
            v => format!("{v:.0}"),
        };
        match prefs.mark() {
            DecimalMark::Comma => text.replace('.', ","),
            DecimalMark::Point => text,
        }
    };
    match since {
        SinceBench::Cannot { why } => why.clone(),
        SinceBench::Times {
            ratio,
            low,
            high,
            on,
        } => {
            let day = crate::yard::calendar::day(on).map(crate::yard::calendar::words);
            let when = day.map_or_else(String::new, |day| format!(" on {day}"));
            format!(
                "{} ({} to {}) times what the bench measured{when}, at the same oil and pressure",
                number(*ratio),
                number(*low),
                number(*high)
            )
        }
    }
}

/// How far the order of causes can be relied on at this moment.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Verdict {
    /// Nothing taken yet, or the integral cannot be trusted: no percentages.
    TooLittle,
    /// An order, but readings doubt it or the lead is thin.
    Uncertain,
    /// The best order so far.
    SoFar,
}

impl Verdict {
    /// The word that goes with it.
    pub fn words(self) -> &'static str {
        match self {
            Verdict::TooLittle => "too little to tell",
            Verdict::Uncertain => "uncertain",
            Verdict::SoFar => "so far",
        }
    }
}

/// Change of a probability in the last refinement above which no percentage is shown at all.
const UNSETTLED: f64 = 0.3;
/// The same, above which the order is called uncertain.
const SHAKY: f64 = 0.1;
/// The same, above which percentages are told in steps of five.
const COARSE: f64 = 0.02;

/// True where anything taken so far speaks for or against any cause.
pub fn is_informed(assessment: &Assessment) -> bool {
    assessment
        .causes
        .iter()
        .any(|cause| !cause.evidence.is_empty())
}

/// Judges an assessment. The limits are a choice of presentation, not of physics: a percentage that moved by a third in the
/// last refinement would be made up; a lead under a half, or with a fair chance of a wrong reading, is uncertain.
pub fn verdict(assessment: &Assessment) -> Verdict {
    let Some(lead) = assessment.causes.first() else {
        return Verdict::TooLittle;
    };
    let trust = &assessment.trust;
    if !is_informed(assessment) || trust.change > UNSETTLED || lead.probability < 0.05 {
        return Verdict::TooLittle;
    }
    let not_listed = lead.ids.contains(&FaultId::NotListed);
    if lead.probability < 0.5 || trust.change > SHAKY || trust.wrong_reading > 0.3 || not_listed {
        Verdict::Uncertain
    } else {
        Verdict::SoFar
    }
}

/// The name of a row of causes in one line.
pub fn cause_title(cause: &Cause) -> String {
    match &cause.pair {
        Some(pair) => format!("{} and {}", pair.titles[0], pair.titles[1]),
        None => cause.title.clone(),
    }
}

/// The chance of a cause as a per cent, told no finer than the last refinement left it.
pub fn chance(probability: f64, trust: &Trust) -> String {
    if trust.change <= COARSE {
        return percent(probability);
    }
    let steps = (probability * 20.0).round() * 5.0;
    if steps < 5.0 {
        format!("<5{NARROW}%")
    } else if steps > 95.0 {
        format!(">95{NARROW}%")
    } else {
        format!("{steps:.0}{NARROW}%")
    }
}

/// The name of a port for a chip.
pub fn port_short(port: Port) -> &'static str {
    match port {
        Port::LoopDifference => "A − B",
        Port::PumpShaft => "Pump shaft",
        Port::MotorShaft => "Motor shaft",
        Port::Knee => "Knee speed",
        Port::ResponseOut => "Time out",
        Port::ResponseBack => "Time back",
        Port::SettledTemperature => "Settled tank",
        Port::EngineSpeed => "Engine speed",
        Port::PumpCase => "Pump case",
        Port::MotorCase => "Motor case",
        Port::Servo => "Servo",
        Port::Pilot => "Pilot",
        Port::Release => "Brake release",
        Port::Shift => "Shift",
        Port::Charge => "Charge",
        Port::MotorDrain => "Motor drain",
        Port::ReturnFlow => "Return flow",
        _ => port.words(),
    }
}

/// The unit in which a port is shown: a pull at the inlet has its own.
pub fn unit_of(port: Port, prefs: &UnitPrefs) -> Unit {
    match port {
        Port::InletPull => prefs.pull_unit(),
        _ => prefs.unit(port.kind()),
    }
}

/// A value of a port as a measure: a pull is held as positive below the air and printed as vacuum where that is the unit.
fn as_measure(port: Port, base: f64, prefs: &UnitPrefs) -> Option<Measure> {
    let vacuum = port == Port::InletPull && prefs.pull_unit().reads_vacuum();
    Measure::from_base(if vacuum { -base } else { base }, port.kind()).ok()
}

/// A value read at a port (base unit of its kind), with its unit.
pub fn value(port: Port, base: f64, prefs: &UnitPrefs) -> String {
    as_measure(port, base, prefs).map_or_else(
        || String::from("?"),
        |measure| {
            quantity::format_with_unit(
                measure,
                unit_of(port, prefs),
                Decimals::Reading,
                prefs.mark(),
            )
        },
    )
}

/// What was seen at a port, in words.
pub fn seen(port: Port, seen: &Seen, prefs: &UnitPrefs) -> String {
    let value = |measure: Measure| value(port, measure.base(), prefs);
    match seen {
        Seen::Value { value: read } => value(*read),
        Seen::Swing { low, high } => format!("swings, {} to {}", value(*low), value(*high)),
        Seen::OffScale { top } => format!("over {}", value(*top)),
        Seen::Nothing => String::from("nothing"),
        Seen::ShareOf { share, .. } => format!("{} of the other", times(*share)),
        Seen::NotPossible { .. } => String::from("not possible"),
    }
}

/// A value with the spread around it, printed no finer than the spread allows: `about 9 ±4 bar`.
pub fn rough(port: Port, value: f64, spread: f64, prefs: &UnitPrefs) -> String {
    let Some(around) = as_spread(port, spread, prefs) else {
        return self::value(port, value, prefs);
    };
    let (measure, unit, places) = around;
    let decimals = Decimals::Fixed(places);
    let value_unit = unit_of(port, prefs);
    let figure = as_measure(port, value, prefs).map_or_else(
        || String::from("?"),
        |value| quantity::format(value, value_unit, decimals, prefs.mark()),
    );
    let around = quantity::format_with_unit(measure, unit, decimals, prefs.mark());
    format!("about {figure} ±{around}")
}

/// A spread at a port (base unit of its kind), with its unit: `±0.8 bar`.
pub fn spread(port: Port, base: f64, prefs: &UnitPrefs) -> String {
    as_spread(port, base, prefs).map_or_else(
        || String::from("±?"),
        |(measure, unit, places)| {
            let decimals = Decimals::Fixed(places);
            format!(
                "±{}",
                quantity::format_with_unit(measure, unit, decimals, prefs.mark())
            )
        },
    )
}

/// A difference at a port (base unit of its kind), without its sign: `1.4 rpm`; none where it prints as nought.
pub fn difference(port: Port, base: f64, prefs: &UnitPrefs) -> Option<String> {
    let (measure, unit, _) = as_spread(port, base, prefs)?;
    let size = measure.in_unit(unit).abs();
    // A difference is of two readings as typed: a tenth, and more where that is all there is.
    let decimals = Decimals::Fixed(if size >= 50.0 {
        0
    } else if size >= 1.0 {
        1
    } else {
        2
    });
    let figure = quantity::format(measure, unit, decimals, prefs.mark());
    let is_seen = figure.chars().any(|digit| ('1'..='9').contains(&digit));
    is_seen.then(|| quantity::format_with_unit(measure, unit, decimals, prefs.mark()))
}

/// A share with its sign, to a tenth of a per cent: `−3.2 %`.
pub fn signed_percent(share: f64, mark: DecimalMark) -> String {
    let figure = tick(share * 100.0, 1, mark);
    let sign = if share > 0.0 { "+" } else { "" };
    format!("{sign}{figure}{NARROW}%")
}

/// A spread as a measure, its unit, and the decimals it carries. A spread has no zero point, so a temperature's is in kelvin
/// or degrees of difference, and a vacuum's runs the same way as the pressure's.
fn as_spread(port: Port, base: f64, prefs: &UnitPrefs) -> Option<(Measure, Unit, u8)> {
    let kind = match port.kind() {
        Kind::Temperature => Kind::TemperatureDifference,
        kind => kind,
    };
    let unit = match port {
        Port::InletPull => prefs.pull_unit(),
        _ => prefs.unit(kind),
    };
    let sign = if unit.reads_vacuum() { -1.0 } else { 1.0 };
    let measure = Measure::from_base(sign * base.abs(), kind).ok()?;
    // One digit and a half is all that a spread carries.
    let size = measure.in_unit(unit).abs();
    let places = if size >= 5.0 {
        0
    } else if size >= 0.5 {
        1
    } else {
        2
    };
    Some((measure, unit, places))
}

/// Both ends of a window as printed: the figure of the low end, and that of the high end with the unit.
pub fn ends(port: Port, low: f64, high: f64, prefs: &UnitPrefs) -> (String, String) {
    let (Some(low), Some(high)) = (as_measure(port, low, prefs), as_measure(port, high, prefs))
    else {
        return (String::from("?"), String::from("?"));
    };
    let unit = unit_of(port, prefs);
    let span = quantity::format_span(low, high, unit, prefs.mark());
    match span.split_once(" to ") {
        Some((from, to)) => (from.to_owned(), to.to_owned()),
        None => (span.clone(), span),
    }
}

/// A value at a port (base unit of its kind) as a figure in the unit it is shown in; none where it cannot be.
pub fn shown(port: Port, base: f64, prefs: &UnitPrefs) -> Option<f64> {
    let unit = unit_of(port, prefs);
    as_measure(port, base, prefs)?.try_in_unit(unit).ok()
}

/// A round figure of a scale, with these decimals.
pub fn tick(figure: f64, decimals: u8, mark: DecimalMark) -> String {
    let text = format!("{figure:.*}", usize::from(decimals));
    match mark {
        DecimalMark::Point => text,
        DecimalMark::Comma => text.replace('.', ","),
    }
    .replace('-', "\u{2212}")
}

/// Minutes for a person: whole ones, up.
pub fn minutes(minutes: f64) -> String {
    if !minutes.is_finite() {
        String::from("? min")
    } else if minutes <= 1.0 {
        format!("1{NARROW}min")
    } else {
        format!("{:.0}{NARROW}min", minutes.ceil())
    }
}

/// Lever travel in words.
pub fn lever(lever: Lever) -> String {
    match lever {
        Lever::Full => String::from("full lever"),
        Lever::Half => String::from("half lever"),
        Lever::Feathered => String::from("feathered"),
        Lever::Share(share) => format!("lever at {}", percent(share)),
    }
}

/// Direction in words.
pub fn direction(direction: Direction) -> &'static str {
    match direction {
        Direction::Forward => "forward",
        Direction::Reverse => "reverse",
    }
}

/// Engine speed in words.
pub fn engine(engine: EngineSpeed, prefs: &UnitPrefs) -> String {
    match engine {
        EngineSpeed::LowIdle => String::from("low idle"),
        EngineSpeed::HighIdle => String::from("high idle"),
        EngineSpeed::Measured(speed) => prefs.print(speed),
    }
}

/// What the machine does, without the oil: the heading of a group of readings.
pub fn condition(condition: &Condition, prefs: &UnitPrefs) -> String {
    let mut parts = vec![String::from(condition.doing.words())];
    if !condition.doing.is_neutral() {
        parts.push(String::from(direction(condition.direction)));
        parts.push(lever(condition.lever));
    }
    parts.push(engine(condition.engine, prefs));
    if !condition.doing.is_neutral() && !condition.stroked.is_both() {
        parts.push(String::from(condition.stroked.words()));
    }
    if condition.flushing_blocked {
        parts.push(String::from("flushing blocked"));
    }
    if condition.consumers_capped {
        parts.push(String::from("consumers capped"));
    }
    parts.join(", ")
}

/// Oil temperature in words; says so where nobody looked.
pub fn oil(condition: &Condition, prefs: &UnitPrefs) -> String {
    match condition.oil {
        Some(oil) => format!("oil {} at {}", prefs.print(oil.value), oil.place.words()),
        None => String::from("oil temperature not taken"),
    }
}

/// Marks for the weight of a piece of evidence, 0 to 4, and its word. A natural log of 0.7 doubles the odds, 1.6 makes them
/// five times, 3 twenty times.
pub fn weight(weight: f64) -> (usize, &'static str) {
    let size = weight.abs();
    if size < 0.1 || !size.is_finite() {
        (0, "hardly anything")
    } else if size < 0.7 {
        (1, "a little")
    } else if size < 1.6 {
        (2, "clearly")
    } else if size < 3.0 {
        (3, "strongly")
    } else {
        (4, "very strongly")
    }
}
