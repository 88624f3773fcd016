//! The whole sheet in one pure call: points, efficiencies, losses, balances, what is judged and how, what was not tested, and what
//! the unit's profile may take over.

use super::acceptance::Limited;
use super::accepted::{Accepted, accepted};
use super::analysis::{Quantity, Setup, theoretical_flow};
use super::balance::{Balance, balance};
use super::channel::{Channel, Subject};
use super::fit::{Loss, LossFit, losses};
use super::flaw::{LeftOut, Part, lies, sorted};
use super::items::{Entry, Item, ItemId, Practice, of};
use super::judge::{Decision, Limits, Measurand, decide, usual};
use super::point::{Point, points, repeated};
use super::sheet::{BenchSheet, Head};
use super::uncertain::{Evaluated, Uncertain, evaluated};
use crate::quantity::{Kind, Measure, Unit};
use crate::readings::instrument::gum;
use crate::unit::{FigureId, Unit as Machine};

/// Pressure difference at which leakages are told in the profile, bar.
pub const LEAKAGE_AT: f64 = 200.0;
/// A point stands for the rated one within this share of speed and pressure.
const NEAR_RATED: f64 = 0.10;
/// Standard uncertainty of a figure that no instrument of the stand covers (a time, a signal), as a share. Common practice.
const OTHER_FIGURES: f64 = 0.01;

/// Where on a run something was judged: a curve over pressure.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Span {
    /// Speed, rpm; none where any will do.
    pub speed: Option<f64>,
    /// Lower pressure difference, bar.
    pub from: f64,
    /// Higher pressure difference, bar.
    pub to: f64,
    /// Where the figure stands that decides, bar.
    pub at: Option<f64>,
}

/// Something judged.
#[derive(Clone, Debug, PartialEq)]
pub struct Judged {
    /// What.
    pub words: String,
    /// Unit of figure and limits, as printed.
    pub unit: Unit,
    /// Figure in the base unit of the unit's kind; none for what is ticked.
    pub figure: Option<Uncertain>,
    /// Limits in the same; none for what is ticked.
    pub limits: Option<Limits>,
    /// Decision.
    pub decision: Decision,
    /// Why it cannot be told, where no doubt about a figure says so; empty otherwise.
    pub why: String,
    /// Of a curve, where it was judged.
    pub span: Option<Span>,
}

impl Judged {
    /// Symbol of its unit as printed, and the factor from the base unit to it.
    #[must_use]
    pub fn printed(&self) -> (&'static str, f64) {
        if self.unit == Unit::Percent {
            ("%", 100.0)
        } else {
            (self.unit.kind().base_unit().symbol(), 1.0)
        }
    }

    /// A figure held against its limits.
    pub(super) fn of(
        words: String,
        unit: Unit,
        figure: Uncertain,
        limits: Limits,
        decision: Decision,
    ) -> Judged {
        Judged {
            words,
            unit,
            figure: Some(figure),
            limits: Some(limits),
            decision,
            why: String::new(),
            span: None,
        }
    }

    /// Something that nothing on the sheet can decide, and why.
    pub(super) fn open(words: String, unit: Unit, limits: Limits, why: String) -> Judged {
        Judged {
            words,
            unit,
            figure: None,
            limits: Some(limits),
            decision: Decision::CannotTell,
            why,
            span: None,
        }
    }
}

/// What a sheet says.
#[derive(Clone, Debug, PartialEq)]
pub struct BenchReport {
    /// Points.
    pub points: Vec<Point>,
    /// What of them is left out of displacement, fits and verdict.
    pub left_out: Vec<LeftOut>,
    /// Everything computed of them.
    pub evaluated: Evaluated,
    /// The loss fit.
    pub losses: LossFit,
    /// Power and heat balance, point by point.
    pub balances: Vec<Option<Balance>>,
    /// Change of flow and case flow from the first point to the same one at the end.
    pub repeated: Option<(Option<f64>, Option<f64>)>,
    /// What was judged: limits of the manual first.
    pub judged: Vec<Judged>,
    /// What came of each limit at points and along curves.
    pub accepted: Vec<Accepted>,
    /// What was left out, with the reason where one was given.
    pub not_tested: Vec<(&'static str, Option<String>)>,
    /// What the profile may take over.
    pub proposals: Vec<Proposal>,
}

/// A figure for the profile.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Proposal {
    /// Which.
    pub id: FigureId,
    /// Value.
    pub value: Measure,
    /// Standard uncertainty as a share of it.
    pub share: f64,
}

/// What the setup of a sheet is.
#[must_use]
pub fn setup(sheet: &BenchSheet, machine: Option<&Machine>) -> (Setup, f64) {
    let profile = |id| machine.and_then(|machine| machine.known(id));
    let plate_of = if sheet.subject == Subject::Motor {
        FigureId::MotorDisplacement
    } else {
        FigureId::PumpDisplacement
    };
    let stroke = sheet
        .head(Head::Stroke)
        .map_or(1.0, |percent| percent / 100.0);
    let plate = sheet.head(Head::Displacement).or(profile(plate_of));
    let charge = sheet
        .head(Head::ChargeDisplacement)
        .or(profile(FigureId::ChargeDisplacement));
    let oil = sheet.oil();
    let viscosity = oil.as_ref().map_or(0.0, |(_, spread)| *spread);
    let setup = Setup {
        subject: sheet.subject,
        layout: sheet.layout,
        plate: plate.map(|plate| plate * stroke),
        charge_displacement: charge,
        oil: oil.map(|(oil, _)| oil),
        viscosity_factor: 1.0,
    };
    (setup, viscosity)
}

/// Computes the whole sheet. `machine` is the unit that the pump or motor belongs to; what its profile knows stands in where the
/// sheet is silent.
#[must_use]
pub fn report(sheet: &BenchSheet, machine: Option<&Machine>) -> BenchReport {
    let (setup, viscosity) = setup(sheet, machine);
    let mut points = points(&sheet.rows);
    let gauged = |channel| sheet.gauged(channel);
    let (evaluated, left_out) = sorted(
        &mut points,
        setup.subject,
        &setup.layout,
        |point| doubt_of_difference(sheet, point),
        |points| evaluated(points, &setup, gauged, viscosity),
    );
    let losses = losses(
        &points,
        &setup,
        evaluated.analysis.displacement,
        gauged,
        viscosity,
    );
    let lost = sheet.head(Head::HeatLost).unwrap_or(0.0);
    let balances = points
        .iter()
        .zip(&evaluated.analysis.points)
        .map(|(point, result)| balance(&point.means, result, &setup, lost))
        .collect();
    let run = Run {
        sheet,
        setup: &setup,
        points: &points,
        evaluated: &evaluated,
        left_out: &left_out,
    };
    let accepted = accepted(&run, &losses);
    let mut judged: Vec<Judged> = accepted
        .iter()
        .filter_map(|one| one.judged.clone().ok())
        .collect();
    judged.extend(run_judged(&run, &accepted));
    let mut not_tested = Vec::new();
    for item in of(sheet.subject) {
        match item_judged(sheet, machine, &setup, item) {
            Some(found) => judged.push(found),
            None => {
                let entry = sheet.items.get(&item.id);
                let has_figure = entry.is_some_and(|entry| entry.found.value.is_some());
                if !has_figure {
                    let why = entry.and_then(|entry| entry.skipped.clone());
                    not_tested.push((item.words, why.filter(|why| !why.trim().is_empty())));
                }
            }
        }
    }
    judged.extend(relations(sheet));
    if points.is_empty() {
        not_tested.push(("Efficiency run", None));
    }
    for limit in &accepted {
        if let Err(why) = limit.judged {
            not_tested.push(("A limit of the run", Some(why.to_owned())));
        }
    }
    BenchReport {
        repeated: repeated(&points),
        proposals: proposals(sheet, &evaluated, &losses, &left_out),
        points,
        left_out,
        evaluated,
        losses,
        balances,
        judged,
        accepted,
        not_tested,
    }
}

impl BenchReport {
    /// The verdict on what was judged: fail where anything fails, cannot tell where anything cannot be told; none where nothing
    /// was judged.
    #[must_use]
    pub fn verdict(&self) -> Option<Decision> {
        let any = |decision| self.judged.iter().any(|j| j.decision == decision);
        if any(Decision::Fail) {
            Some(Decision::Fail)
        } else if any(Decision::CannotTell) {
            Some(Decision::CannotTell)
        } else {
            any(Decision::Pass).then_some(Decision::Pass)
        }
    }

    /// True where a point shows what no machine can do: an instrument lies.
    #[must_use]
    pub fn is_impossible(&self) -> bool {
        self.left_out.iter().any(|one| one.flaw.is_impossible())
    }

    /// Points of which something counts.
    #[must_use]
    pub fn counted(&self) -> usize {
        let counts = |point: &&Point| point.left_out.len() < Part::ALL.len();
        self.points.iter().filter(counts).count()
    }
}

/// Expanded uncertainty of a point's pressure difference, bar.
fn doubt_of_difference(sheet: &BenchSheet, point: &Point) -> f64 {
    let of = |channel: Channel| {
        let value = point.means.get(channel).unwrap_or(0.0);
        sheet.gauged(channel).standard(channel, value)
    };
    gum::expanded(gum::combined(&[of(Channel::High), of(Channel::Low)]), 2.0)
}

/// Limits of the run: those typed, else those of common practice, unless the manual limits the same figure elsewhere.
fn limits(sheet: &BenchSheet, what: Measurand, has_own: bool) -> Option<Limits> {
    let typed = sheet.limits.get(&what);
    let share = |measure: Option<Measure>| measure.and_then(|m| m.try_in_unit(Unit::Fraction).ok());
    let low = typed.and_then(|t| share(t.low.value));
    let high = typed.and_then(|t| share(t.high.value));
    if low.is_none() && high.is_none() {
        return (!has_own).then(|| usual(what));
    }
    let from = typed.map_or("", |t| t.from.trim());
    Some(Limits {
        low,
        high,
        from: if from.is_empty() {
            "as entered".to_owned()
        } else {
            from.to_owned()
        },
    })
}

/// What a run is judged by.
pub(super) struct Run<'a> {
    pub(super) sheet: &'a BenchSheet,
    pub(super) setup: &'a Setup,
    pub(super) points: &'a [Point],
    pub(super) evaluated: &'a Evaluated,
    left_out: &'a [LeftOut],
}

/// What came of a figure that is judged: the figure, or why there is none to judge.
pub(super) type Found = Result<Uncertain, String>;

impl Run<'_> {
    /// A figure of a point, where its part counts and no instrument of its kind lies. None where the sheet does not carry it.
    pub(super) fn figure(&self, at: usize, quantity: Quantity) -> Option<Found> {
        let figure = self.evaluated.points.get(at)?.get(&quantity).copied();
        let parts = Part::of(quantity);
        if let Some(why) = self.lie(parts) {
            // Also where the figure itself looks right: the same instrument read it.
            return figure.map(|_| Err(why));
        }
        let own = self
            .left_out
            .iter()
            .find(|one| one.at == at && parts.iter().any(|part| one.parts.contains(part)));
        match own {
            Some(one) => figure.map(|_| Err(one.words(self.setup.subject))),
            None => figure.map(Ok),
        }
    }

    /// Why nothing that rests on these parts is judged, where an instrument lies.
    pub(super) fn lie(&self, parts: &[Part]) -> Option<String> {
        let liar = lies(self.left_out, parts)?;
        Some(format!(
            "{}; the same instruments read the other points, so correct its row or leave it out",
            liar.words(self.setup.subject)
        ))
    }

    /// The best point by overall efficiency, with its name, of those that count.
    fn best(&self) -> Option<(String, Found)> {
        let found = (0..self.points.len())
            .filter_map(|at| Some((at, self.figure(at, Quantity::Overall)?)))
            .max_by(|a, b| {
                let rank = |found: &Found| found.as_ref().map_or(f64::MIN, |f| f.value);
                rank(&a.1).total_cmp(&rank(&b.1))
            })?;
        let name = match &found.1 {
            Ok(_) => format!(", at point {}", self.points[found.0].name),
            Err(_) => String::new(),
        };
        Some((name, found.1))
    }

    /// Derived displacement over that of the plate.
    fn displacement(&self) -> Option<Found> {
        let plate = self.setup.plate?;
        let out = |one: &&LeftOut| one.parts.contains(&Part::Flow);
        if let Some(derived) = self.evaluated.derived {
            return Some(match self.lie(&[Part::Flow]) {
                Some(why) => Err(why),
                None => Ok(Uncertain {
                    value: derived.value / plate,
                    standard: derived.standard / plate,
                }),
            });
        }
        // Only where leaving points out is why there is none.
        let one = self.left_out.iter().find(out)?;
        (self.setup.subject != Subject::Transmission).then(|| Err(one.words(self.setup.subject)))
    }
}

/// The limits of the run as a whole. Where the manual limits a figure at points or along a curve, its common practice is silent.
fn run_judged(run: &Run, accepted: &[Accepted]) -> Vec<Judged> {
    let Run {
        sheet,
        points,
        evaluated,
        ..
    } = run;
    let mut judged = Vec::new();
    let mut judge = |what: Measurand, words: String, found: Option<Found>| {
        let limited = match what {
            Measurand::Volumetric => Some(Limited::Volumetric),
            Measurand::Overall => Some(Limited::Overall),
            Measurand::CaseLeakage => Some(Limited::CaseLeakage),
            Measurand::Displacement => None,
        };
        let has_own = sheet
            .acceptance
            .iter()
            .zip(accepted)
            .any(|(limit, found)| Some(limit.of) == limited && found.judged.is_ok());
        let Some(limits) = limits(sheet, what, has_own) else {
            return;
        };
        let unit = Unit::Percent;
        judged.extend(match found {
            None => None,
            Some(Err(why)) => Some(Judged::open(words, unit, limits, why)),
            Some(Ok(figure)) => decide(figure, &limits)
                .map(|decision| Judged::of(words, unit, figure, limits, decision)),
        });
    };
    let rated = rated_point(sheet, points);
    let at_rated = |quantity| run.figure(rated?, quantity);
    let name = rated.map_or(String::new(), |at| points[at].name.clone());
    judge(
        Measurand::Volumetric,
        format!("Volumetric efficiency at point {name}, nearest to the rated one"),
        at_rated(Quantity::Volumetric),
    );
    let (best_name, best) = run.best().unzip();
    judge(
        Measurand::Overall,
        format!("Best overall efficiency{}", best_name.unwrap_or_default()),
        best,
    );
    let flow = sheet
        .head(Head::RatedSpeed)
        .zip(evaluated.analysis.displacement)
        .map(|(speed, volume)| theoretical_flow(volume, speed));
    let leakage = at_rated(Quantity::CaseLeakage)
        .zip(flow)
        .map(|(leakage, flow)| {
            leakage.map(|leakage| Uncertain {
                value: leakage.value / flow,
                standard: leakage.standard / flow,
            })
        });
    judge(
        Measurand::CaseLeakage,
        format!("Case leakage at point {name}, of the rated flow"),
        leakage,
    );
    judge(
        Measurand::Displacement,
        "Derived displacement over that of the plate".to_owned(),
        run.displacement(),
    );
    judged
}

/// The point that stands for the rated one; one that counts before one that is left out.
fn rated_point(sheet: &BenchSheet, points: &[Point]) -> Option<usize> {
    let speed = sheet.head(Head::RatedSpeed)?;
    let pressure = sheet.head(Head::RatedPressure)?;
    points
        .iter()
        .enumerate()
        .filter_map(|(at, point)| {
            let n = (point.means.get(Channel::Speed)? / speed - 1.0).abs();
            let dp = (point.means.difference()? / pressure - 1.0).abs();
            let out = if point.left_out.is_empty() { 0.0 } else { 1.0 };
            (n <= NEAR_RATED && dp <= NEAR_RATED).then_some((at, n + dp + out))
        })
        .min_by(|a, b| a.1.total_cmp(&b.1))
        .map(|(at, _)| at)
}

/// The channel whose instrument reads a kind of figure.
fn channel_of(kind: Kind) -> Option<Channel> {
    match kind {
        Kind::Pressure => Some(Channel::High),
        Kind::Flow => Some(Channel::Flow),
        Kind::Torque => Some(Channel::Torque),
        _ => None,
    }
}

fn doubt(sheet: &BenchSheet, kind: Kind, value: f64) -> f64 {
    match channel_of(kind) {
        Some(channel) => sheet.gauged(channel).standard(channel, value),
        // A ratio's step and a stopwatch's start do not shrink to nothing with the figure.
        None => (OTHER_FIGURES * value.abs()).max(gum::rectangular(match kind {
            Kind::Time => 0.1,
            _ => 0.005,
        })),
    }
}

fn item_judged(
    sheet: &BenchSheet,
    machine: Option<&Machine>,
    setup: &Setup,
    item: &Item,
) -> Option<Judged> {
    let entry = sheet.items.get(&item.id)?;
    match item.entry {
        Entry::Tick => entry.is_good.map(|is_good| Judged {
            words: item.words.to_owned(),
            unit: Unit::Fraction,
            figure: None,
            limits: None,
            decision: if is_good {
                Decision::Pass
            } else {
                Decision::Fail
            },
            why: String::new(),
            span: None,
        }),
        Entry::Figure(unit) => {
            let value = entry.found.value?.base_of(unit.kind())?;
            let figure = Uncertain {
                value,
                standard: doubt(sheet, unit.kind(), value),
            };
            let typed = |measure: Option<Measure>| measure.and_then(|m| m.base_of(unit.kind()));
            let (low, high) = (typed(entry.low.value), typed(entry.high.value));
            let limits = if low.is_some() || high.is_some() {
                Limits {
                    low,
                    high,
                    from: "as entered".to_owned(),
                }
            } else {
                practice(machine, setup, item)?
            };
            Some(Judged {
                words: item.words.to_owned(),
                unit,
                figure: Some(figure),
                decision: decide(figure, &limits)?,
                limits: Some(limits),
                why: String::new(),
                span: None,
            })
        }
    }
}

/// Limits of common practice, about what the profile says where it takes that.
fn practice(machine: Option<&Machine>, setup: &Setup, item: &Item) -> Option<Limits> {
    let known = |id| machine.and_then(|machine| machine.known(id));
    let about = |low: f64, high: f64, of: &str| Limits {
        low: Some(low),
        high: Some(high),
        from: format!("common practice about the profile's {of}"),
    };
    let plain = |low, high| Limits {
        low,
        high,
        from: "common practice".to_owned(),
    };
    let by_profile = match item.id {
        ItemId::ChargeReliefLow => known(FigureId::ChargeSetting)
            .map(|set| about(set - 0.7, set + 0.7, "charge relief setting")),
        ItemId::ChargeReliefHigh => known(FigureId::ChargeSetting)
            .map(|set| about(set - 0.7, set + 3.0, "charge relief setting")),
        ItemId::ReliefA | ItemId::ReliefB => {
            known(FigureId::LoopRelief).map(|set| about(set, 1.05 * set, "loop relief setting"))
        }
        ItemId::LimiterA | ItemId::LimiterB => {
            known(FigureId::Limiter).map(|set| about(set - 10.0, set + 10.0, "limiter setting"))
        }
        ItemId::BrakeRelease => known(FigureId::BrakeRelease)
            .map(|set| about(0.7 * set, 1.1 * set, "brake release pressure")),
        _ => None,
    };
    by_profile.or_else(|| match item.practice {
        Practice::None => None,
        Practice::AtMost(high) => Some(plain(None, Some(high))),
        Practice::Between(low, high) => Some(plain(Some(low), Some(high))),
        Practice::OfTheory(low, high) => {
            let plate = setup.plate?;
            Some(about(low * plate, high * plate, "displacement"))
        }
    })
}

/// What two items say of each other.
fn relations(sheet: &BenchSheet) -> Vec<Judged> {
    let found = |id: ItemId, unit: Unit| {
        let value = sheet.items.get(&id)?.found.value?.base_of(unit.kind())?;
        Some((value, doubt(sheet, unit.kind(), value)))
    };
    let mut judged = Vec::new();
    let mut judge = |words: &str, unit, value: f64, standard: f64, high: f64| {
        let figure = Uncertain { value, standard };
        let limits = Limits {
            low: None,
            high: Some(high),
            from: "common practice".to_owned(),
        };
        judged.extend(
            decide(figure, &limits)
                .map(|decision| Judged::of(words.to_owned(), unit, figure, limits, decision)),
        );
    };
    // Two readings of one gauge: its own error falls out of their difference, the needle's stays. A quarter of the doubt of one.
    let shared = 0.25;
    if let (Some((low, u)), Some((high, _))) = (
        found(ItemId::ChargeReliefLow, Unit::Bar),
        found(ItemId::ChargeReliefHigh, Unit::Bar),
    ) {
        judge(
            "Charge relief, rise from lower to higher speed",
            Unit::Bar,
            high - low,
            shared * u,
            3.0,
        );
    }
    if let (Some((a, u)), Some((b, _))) = (
        found(ItemId::ReliefA, Unit::Bar),
        found(ItemId::ReliefB, Unit::Bar),
    ) && a + b > 0.0
    {
        let mean = 0.5 * (a + b);
        let apart = (a - b).abs() / mean;
        judge(
            "Loop reliefs A and B apart",
            Unit::Percent,
            apart,
            shared * u / mean,
            0.03,
        );
    }
    if let (Some((a, u)), Some((b, _))) = (
        found(ItemId::StartA, Unit::Percent),
        found(ItemId::StartB, Unit::Percent),
    ) {
        judge(
            "Start of sides A and B apart",
            Unit::Percent,
            (a - b).abs(),
            u,
            0.08,
        );
    }
    judged
}

/// What the profile may take over; nothing that rests on an instrument that lies.
fn proposals(
    sheet: &BenchSheet,
    evaluated: &Evaluated,
    losses: &LossFit,
    left_out: &[LeftOut],
) -> Vec<Proposal> {
    let is_sound = |part: Part| lies(left_out, &[part]).is_none();
    let mut found = Vec::new();
    let mut propose = |id, value: f64, unit, standard: f64| {
        if value > 0.0
            && standard.is_finite()
            && let Ok(value) = Measure::new(value, unit)
        {
            let share = standard / value.base();
            found.push(Proposal { id, value, share });
        }
    };
    let (volume, leakage, slip) = match sheet.subject {
        Subject::Pump => (
            FigureId::PumpDisplacement,
            FigureId::PumpCaseLeakage,
            FigureId::PumpSlip,
        ),
        Subject::Motor => (
            FigureId::MotorDisplacement,
            FigureId::MotorCaseLeakage,
            FigureId::MotorSlip,
        ),
        Subject::Transmission => return item_proposals(sheet),
    };
    let stroke = sheet
        .head(Head::Stroke)
        .map_or(1.0, |percent| percent / 100.0);
    if let Some(derived) = evaluated.derived.filter(|_| is_sound(Part::Flow)) {
        let (value, u) = (derived.value / stroke, derived.standard / stroke);
        propose(volume, value, Unit::CubicCentimetrePerRevolution, u);
    }
    if let Some((g, u)) = losses
        .case
        .as_ref()
        .ok()
        .filter(|_| is_sound(Part::Case))
        .and_then(|fit| fit.get(Loss::Case))
    {
        propose(
            leakage,
            g * LEAKAGE_AT,
            Unit::LitrePerMinute,
            u * LEAKAGE_AT,
        );
    }
    if let Some((a, u)) = losses
        .flow
        .as_ref()
        .ok()
        .filter(|_| is_sound(Part::Flow))
        .and_then(|fit| fit.get(Loss::Laminar))
    {
        // What a turbulent share adds at the pressure where it is told.
        let turbulent = losses
            .flow
            .as_ref()
            .ok()
            .and_then(|fit| fit.get(Loss::Turbulent));
        let more = turbulent.map_or(0.0, |(b, _)| b * LEAKAGE_AT.sqrt());
        propose(
            slip,
            a * LEAKAGE_AT + more,
            Unit::LitrePerMinute,
            u * LEAKAGE_AT,
        );
    }
    found.extend(item_proposals(sheet));
    found
}

/// Settings that were found.
fn item_proposals(sheet: &BenchSheet) -> Vec<Proposal> {
    let bar = |id: ItemId| sheet.items.get(&id)?.found.value?.base_of(Kind::Pressure);
    let either = |a: Option<f64>, b: Option<f64>| match (a, b) {
        (Some(a), Some(b)) => Some(0.5 * (a + b)),
        (one, other) => one.or(other),
    };
    [
        (FigureId::ChargeSetting, bar(ItemId::ChargeReliefLow)),
        (
            FigureId::LoopRelief,
            either(bar(ItemId::ReliefA), bar(ItemId::ReliefB)),
        ),
        (
            FigureId::Limiter,
            either(bar(ItemId::LimiterA), bar(ItemId::LimiterB)),
        ),
        (FigureId::BrakeRelease, bar(ItemId::BrakeRelease)),
    ]
    .into_iter()
    .filter_map(|(id, value)| {
        let value = value.filter(|value| *value > 0.0)?;
        Some(Proposal {
            id,
            value: Measure::new(value, Unit::Bar).ok()?,
            share: doubt(sheet, Kind::Pressure, value) / value,
        })
    })
    .collect()
}
