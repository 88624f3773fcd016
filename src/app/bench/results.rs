//! What the run comes to: verdict, displacement, efficiencies with their doubt, losses, balances.

use super::codes;
use super::limits::LimitsForm;
use super::screen::{Edit, Told};
use crate::app::parts::{Caution, Grade, Section};
use crate::bench::stand::analysis::Quantity;
use crate::bench::stand::balance::OPEN;
use crate::bench::stand::fit::{Fit, LossFit, NoFit, TurbulentShare};
use crate::bench::stand::flaw::told;
use crate::bench::stand::judge::Decision;
use crate::bench::stand::report::Judged;
use crate::bench::stand::{BenchReport, BenchSheet, LayoutGap, Subject, grown, paper};
use crate::quantity::{DecimalMark, Unit, UnitPrefs};
use crate::unit::Unit as Machine;
use std::collections::BTreeSet;
use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html};

const VERDICT: &str = "bench-verdict";
const EFFICIENCIES: &str = "bench-results";
const LOSSES: &str = "bench-losses";
/// Ids of the sections that stand here.
pub const SECTIONS: [&str; 3] = [VERDICT, EFFICIENCIES, LOSSES];

/// Properties of [`Results`].
#[derive(Clone, PartialEq, Properties)]
pub struct ResultsProps {
    /// The sheet.
    pub sheet: Rc<BenchSheet>,
    /// What it comes to.
    pub told: Told,
    /// The unit that it belongs to.
    pub unit: Rc<Machine>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

/// The results.
#[component]
pub fn Results(props: &ResultsProps) -> Html {
    let report = &*props.told.0;
    let verdict = report.verdict();
    let state = verdict.map_or("nothing judged yet", Decision::words);
    html! { <>
        <Section id={VERDICT} title="Verdict" {state} is_open=true>
            { judged(props, verdict) }
            <LimitsForm sheet={props.sheet.clone()} told={props.told.clone()} prefs={props.prefs.clone()} on_edit={props.on_edit.clone()} />
        </Section>
        if !report.points.is_empty() {
            <Section id={EFFICIENCIES} title="Efficiencies" is_open=true>
                { displacement(props) }
                { table(props) }
                { remarks(props) }
            </Section>
            if props.sheet.subject != Subject::Transmission {
                <Section id={LOSSES} title="Losses" is_open=true>
                    { losses(&report.losses, props.prefs.mark()) }
                    { grown_losses(props) }
                    { points_to(&report.losses) }
                </Section>
            }
        }
    </> }
}

fn judged(props: &ResultsProps, verdict: Option<Decision>) -> Html {
    let report = &*props.told.0;
    let words = match verdict {
        None => "Nothing was judged: no figure with a limit is on the sheet yet.",
        Some(Decision::Fail) => "Fails: a figure lies outside its limit by more than its doubt.",
        Some(Decision::CannotTell) if report.judged.iter().any(|judged| !judged.why.is_empty()) => {
            "Cannot tell: something on the sheet decides nothing; the reason stands beside it."
        }
        Some(Decision::CannotTell) => {
            "Cannot tell: the doubt of a figure reaches over its limit. Better instruments or more readings decide it."
        }
        Some(Decision::Pass) => "Passes in what was tested.",
    };
    html! { <>
        <p class="bench-headline" role="status" data-testid="bench-verdict-words">{ words }</p>
        if !report.judged.is_empty() {
            <ul class="bench-judged">
                { for report.judged.iter().map(|judged| judged_row(judged, &props.prefs)) }
            </ul>
            <p class="soft">{ "Guard band: the expanded uncertainty, coverage factor 2 (JCGM 106). Of each figure, a wrong pass or a wrong fail has a chance of 2.5 % at most." }</p>
        }
        if !report.left_out.is_empty() {
            <h3>{ "Points left out" }</h3>
            <ul class="bench-missing" data-testid="bench-left-out">
                { for told(&report.left_out, props.sheet.subject).into_iter().map(|line| html! { <li>{ line }</li> }) }
            </ul>
        }
        <h3>{ "Not tested" }</h3>
        if report.not_tested.is_empty() {
            <p>{ "Everything on the sheet was tested." }</p>
        } else {
            <ul class="bench-missing" data-testid="bench-not-tested">
                { for report.not_tested.iter().map(|(what, why)| html! {
                    <li>{ *what }{ why.as_ref().map(|why| format!(": {why}")) }</li>
                }) }
            </ul>
        }
    </> }
}

fn judged_row(judged: &Judged, prefs: &UnitPrefs) -> Html {
    let value = paper::figure_words(judged, prefs);
    let class = match judged.decision {
        Decision::Pass => "is-pass",
        Decision::Fail => "is-fail",
        Decision::CannotTell => "is-open",
    };
    html! {
        <li class={class}>
            <strong class="bench-decision">{ judged.decision.words() }</strong>
            <span>{ paper::what_words(judged, prefs) }{ value.map(|value| format!(": {value}")) }</span>
            if let Some(limits) = paper::limits_words(judged, prefs) { <span class="soft">{ limits }</span> }
            if !judged.why.is_empty() { <span>{ format!("Because {}.", judged.why) }</span> }
        </li>
    }
}

fn displacement(props: &ResultsProps) -> Html {
    let evaluated = &props.told.0.evaluated;
    let text = match (&evaluated.derived, &evaluated.analysis.derived) {
        (Some(figure), Some(derived)) => {
            let cm3 = codes::in_unit(
                figure.value,
                figure.expanded(),
                Unit::CubicCentimetrePerRevolution,
                &props.prefs,
            );
            let how = match derived.slopes.len() {
                1 => "at one pressure only, so a little of the leakage may be in it".to_owned(),
                2 => "at the lower of two pressures".to_owned(),
                many => format!("followed from {many} pressures to none"),
            };
            format!(
                "Derived displacement {cm3}: slope of flow over speed, {how} (after ISO 8426). Efficiencies use it."
            )
        }
        _ => match evaluated.analysis.displacement {
            Some(plate) => format!(
                "No displacement could be derived: run one pressure at several speeds. Efficiencies use the plate’s {} ± 3 % (common practice).",
                codes::plain(plate, Unit::CubicCentimetrePerRevolution, &props.prefs)
            ),
            None if props.sheet.subject == Subject::Transmission => return html! {},
            None => "No displacement: give the plate’s, or run one pressure at several speeds."
                .to_owned(),
        },
    };
    html! { <p data-testid="bench-derived">{ text }</p> }
}

/// Columns of the table of results.
fn columns(subject: Subject) -> Vec<(Quantity, &'static str, Option<Unit>)> {
    let mut columns = vec![
        (Quantity::Volumetric, "Volumetric", None),
        (Quantity::HydroMechanical, "Hydro-mechanical", None),
        (Quantity::Overall, "Overall", None),
        (Quantity::FlowLost, "Flow lost", Some(Unit::LitrePerMinute)),
        (
            Quantity::CaseLeakage,
            "Case leakage",
            Some(Unit::LitrePerMinute),
        ),
        (Quantity::TorqueLost, "Torque lost", Some(Unit::NewtonMetre)),
        (Quantity::ShaftPower, "Shaft", Some(Unit::Kilowatt)),
        (Quantity::OutPower, "Oil", Some(Unit::Kilowatt)),
    ];
    if subject == Subject::Transmission {
        columns.retain(|(quantity, ..)| {
            matches!(
                quantity,
                Quantity::Overall | Quantity::ShaftPower | Quantity::OutPower
            )
        });
        for column in &mut columns {
            match column.0 {
                Quantity::ShaftPower => column.1 = "Power in",
                Quantity::OutPower => column.1 = "Power out",
                _ => {}
            }
        }
    }
    columns
}

fn table(props: &ResultsProps) -> Html {
    let report = &*props.told.0;
    let columns = columns(props.sheet.subject);
    let gaps: BTreeSet<LayoutGap> = report
        .evaluated
        .analysis
        .points
        .iter()
        .flat_map(|point| point.values.values().filter_map(|value| value.err()))
        .collect();
    html! { <>
        <div class="bench-scroll" tabindex="0" role="region" aria-label="Table of results">
            <table class="bench-table bench-figures" data-testid="bench-figures">
                <thead><tr>
                    <th scope="col">{ "Point" }</th>
                    { for columns.iter().map(|(_, words, _)| html! { <th scope="col">{ *words }</th> }) }
                    <th scope="col">{ "Balance" }</th>
                </tr></thead>
                <tbody>
                    { for report.points.iter().enumerate().map(|(at, point)| html! {
                        <tr key={at}>
                            <th scope="row">
                                { &point.name }
                                if !point.left_out.is_empty() { <span class="soft">{ " left out" }</span> }
                            </th>
                            { for columns.iter().map(|(quantity, _, unit)| {
                                let figure = report.evaluated.points[at].get(quantity);
                                let text = figure.map(|figure| match unit {
                                    None => codes::share(*figure, props.prefs.mark()),
                                    Some(unit) => codes::in_unit(figure.value, figure.expanded(), *unit, &props.prefs),
                                });
                                html! { <td>{ text.unwrap_or_else(|| "–".to_owned()) }</td> }
                            }) }
                            <td>{ balance(report, at, props.prefs.mark()) }</td>
                        </tr>
                    }) }
                </tbody>
            </table>
        </div>
        <p class="soft">{ "± is the expanded uncertainty, coverage factor 2 (JCGM 100). Efficiencies by ISO 4391: the volumetric one is a flow factor, in which \
            oil that is only pressed together counts as lost; ISO 4409 defines the hydro-mechanical one for motors only, for pumps ISO 4391’s is used." }</p>
        if !gaps.is_empty() {
            <p class="bench-remark" data-testid="bench-gaps">
                { format!("Not computed at some points: {}.", gaps.iter().map(ToString::to_string).collect::<Vec<_>>().join("; ")) }
            </p>
        }
    </> }
}

fn balance(report: &BenchReport, at: usize, mark: DecimalMark) -> String {
    let Some(balance) = report.balances.get(at).copied().flatten() else {
        return "–".to_owned();
    };
    if balance.is_impossible() {
        return "more out than in".to_owned();
    }
    let percent = |share: f64| {
        let text = format!("{:+.0} %", share * 100.0).replace('-', "−");
        if mark == DecimalMark::Comma {
            text.replace('.', ",")
        } else {
            text
        }
    };
    match balance.open {
        Some(open) if open.abs() <= OPEN => format!("closes ({})", percent(open)),
        Some(open) => format!("open by {}", percent(open)),
        None => "temperatures missing".to_owned(),
    }
}

fn remarks(props: &ResultsProps) -> Html {
    let report = &*props.told.0;
    let open = report
        .balances
        .iter()
        .flatten()
        .any(|balance| balance.is_closed() == Some(false) || balance.is_impossible());
    let drift = report.repeated.map(|(flow, case)| {
        let text = |what: &str, change: Option<f64>, limit: f64| {
            change.map(|change| {
                let verdict = if change.abs() <= limit {
                    "as it should"
                } else {
                    "more than it should"
                };
                format!(
                    "{what} {:+.1} % ({verdict}, limit {:.0} %)",
                    change * 100.0,
                    limit * 100.0
                )
                .replace('-', "−")
            })
        };
        let parts: Vec<String> = [text("flow", flow, 0.01), text("case flow", case, 0.10)]
            .into_iter()
            .flatten()
            .collect();
        parts.join(", ")
    });
    html! { <>
        if report.is_impossible() || open {
            <Caution grade={Grade::Caution} title="An instrument may lie">
                <p>{ "More comes out than goes in, or heat and power do not balance within 10 % (common practice). Look at the torque zero, the flow \
                    meter’s viscosity, the line that is metered, and the thermometers." }</p>
            </Caution>
        }
        if let Some(drift) = drift {
            <p data-testid="bench-drift">{ format!("First point taken again at the end: {drift}. Common practice.") }</p>
        } else {
            <p class="soft">{ "Take the first point again at the end: it tells warming up and wear from the rest." }</p>
        }
    </> }
}

fn losses(losses: &LossFit, mark: DecimalMark) -> Html {
    let turbulent = match losses.turbulent {
        TurbulentShare::Told => "Slip has a turbulent share: a scored plate, a cut edge or a leaking seat lets oil through like an orifice.".to_owned(),
        TurbulentShare::NotTold(..) => "Cannot tell turbulent from laminar slip: a turbulent share would lie within its own doubt.".to_owned(),
        TurbulentShare::TooFew => "Too few points to tell turbulent from laminar slip: seven and more over speed and pressure.".to_owned(),
    };
    let flow_fitted = losses.flow.is_ok();
    html! { <>
        <p class="soft">{ "Wilson’s and Schlösser’s terms by weighted least squares; told at 27.5 mPa·s. What an instrument is off by is in the doubt." }</p>
        { fit("Flow", &losses.flow, mark) }
        if flow_fitted { <p data-testid="bench-turbulent">{ turbulent }</p> }
        { fit("Torque", &losses.torque, mark) }
        { fit("Case flow", &losses.case, mark) }
    </> }
}

fn fit(what: &'static str, fit: &Result<Fit, NoFit>, mark: DecimalMark) -> Html {
    let body = match fit {
        Err(why) => html! { <p class="bench-remark">{ format!("No fit: {why}.") }</p> },
        Ok(fit) => {
            let rows = fit.losses.iter().filter_map(|loss| {
                let (value, u) = fit.get(*loss)?;
                let text = paper::coefficient(value, 2.0 * u, loss.unit(), mark);
                Some(html! { <li><span>{ loss.words() }</span><strong>{ text }</strong></li> })
            });
            let freedom = fit.by_chance.freedom;
            let scatter = fit.by_chance.birge();
            let note = if scatter > 1.5 {
                format!(
                    "Points scatter {scatter:.1} times as much as stated: the doubt is widened by that."
                )
            } else {
                format!("Points scatter as their instruments allow ({freedom} to spare).")
            };
            html! { <>
                <ul class="bench-terms">{ for rows }</ul>
                <p class="soft">{ note }</p>
            </> }
        }
    };
    html! { <div data-testid={format!("bench-fit-{}", what.to_lowercase().replace(' ', "-"))}><h3>{ what }</h3>{ body }</div> }
}

/// Leakage and slip beside the profile's or what is usual, and what has grown.
fn grown_losses(props: &ResultsProps) -> Html {
    let beside = grown::beside(&props.told.0, Some(&props.unit));
    if beside.is_empty() {
        return html! {};
    }
    let points_to = grown::points_to(&beside, props.sheet.subject)
        .unwrap_or("Not shown to have grown: the interval reaches down to once, or lies below it");
    html! {
        <div data-testid="bench-grown">
            <h3>{ "Has a loss grown?" }</h3>
            <ul class="bench-missing">
                { for beside.iter().map(|one| html! { <li>{ paper::beside_words(one, &props.prefs) }</li> }) }
            </ul>
            <p>{ format!("{points_to} (common practice).") }</p>
            <p class="soft">{ "In brackets what both doubts leave open, 95 in 100. Of drag and friction nothing is known well enough to hold them against." }</p>
        </div>
    }
}

/// What a grown loss points to.
fn points_to(losses: &LossFit) -> Html {
    let is_motor = losses.subject == Subject::Motor;
    let lines = [
        (
            "Case leakage grown alone",
            if is_motor {
                "pistons and slippers, or the bearing plate to the case"
            } else {
                "pistons, slippers, or the block to the port plate"
            },
        ),
        (
            "Slip grown, case leakage not",
            "across the port plate: kidney to kidney, or a check, relief or bypass seat",
        ),
        (
            "Viscous drag grown",
            "oil thicker than stated, or a case too full and too fast",
        ),
        (
            "Friction with pressure grown",
            "bearings, slippers, swash seat",
        ),
        (
            "Constant friction grown",
            "seal, brake that drags, coupling out of line",
        ),
    ];
    html! {
        <details class="advice">
            <summary>{ "What a grown loss points to (common practice)" }</summary>
            <ul class="bench-missing">{ for lines.iter().map(|(what, where_)| html! { <li>{ format!("{what}: {where_}.") }</li> }) }</ul>
        </details>
    }
}
