//! The path from above: forward upwards, reverse downwards, before and after, with their bands.

use super::words;
use crate::app::parts::{Choice, Opt};
use crate::quantity::UnitPrefs;
use crate::tracking::{Lever, Outcome, Plan, Point, Trace, Travel};
use yew::{Callback, Html, Properties, component, html, use_state};

/// Half of the drawing's width and height, in its own units, and the room kept for words at the ends.
const HALF_WIDTH: f64 = 160.0;
const HALF_HEIGHT: f64 = 210.0;
const END: f64 = 60.0;
const SIDE: f64 = 24.0;
/// Least that the half width shows, m.
const NARROW: f64 = 0.3;

/// Properties of [`PlanView`].
#[derive(Clone, PartialEq, Properties)]
pub struct PlanViewProps {
    /// The plans to draw.
    pub plans: Vec<Plan>,
    /// True where something is to be adjusted: else before and after are one.
    pub has_after: bool,
    /// Units of measure.
    pub prefs: UnitPrefs,
}

/// The plans of an outcome, and whether anything changes.
pub fn props_of(outcome: &Outcome, prefs: &UnitPrefs) -> PlanViewProps {
    PlanViewProps {
        plans: outcome.plans.clone(),
        has_after: outcome.adjustments.iter().any(|a| a.is_adjusted),
        prefs: prefs.clone(),
    }
}

/// From the ground to the drawing.
#[derive(Clone, Copy)]
struct Scale {
    across: f64,
    along: f64,
}

impl Scale {
    fn of(plans: &[&Plan]) -> Scale {
        let traces = plans.iter().flat_map(|plan| [&plan.before, &plan.after]);
        let edges = traces.flat_map(|trace| trace.low.iter().chain(&trace.high));
        let widest = edges.fold(NARROW, |most, point| most.max(point.left.abs()));
        let longest = plans
            .iter()
            .fold(1.0_f64, |most, plan| most.max(plan.distance));
        Scale {
            across: (HALF_WIDTH - SIDE) / widest,
            along: (HALF_HEIGHT - END) / longest,
        }
    }

    fn at(self, point: &Point) -> String {
        format!(
            "{:.1},{:.1}",
            -point.left * self.across,
            -point.along * self.along
        )
    }

    fn line(self, points: &[Point]) -> String {
        points
            .iter()
            .map(|p| self.at(p))
            .collect::<Vec<_>>()
            .join(" ")
    }

    fn band(self, trace: &Trace) -> String {
        let back = trace.high.iter().rev();
        trace
            .low
            .iter()
            .chain(back)
            .map(|p| self.at(p))
            .collect::<Vec<_>>()
            .join(" ")
    }
}

/// Where a path ends, in words: "0.67 m to the left, ± 0.05 m".
fn end(trace: &Trace, prefs: &UnitPrefs) -> String {
    let (low, middle, high) = trace.end();
    let half = 0.5 * (high - low);
    let good = format!("± {}", words::aside(half, prefs));
    if middle.abs() < 0.005 {
        return format!("on the line, {good}");
    }
    let side = if middle > 0.0 { "left" } else { "right" };
    format!(
        "{} to the {side}, {good}",
        words::aside(middle.abs(), prefs)
    )
}

/// The drawing.
#[component]
pub fn PlanView(props: &PlanViewProps) -> Html {
    let lever = use_state(|| Lever::Full);
    let plans: Vec<&Plan> = props
        .plans
        .iter()
        .filter(|plan| plan.setting.lever == *lever)
        .collect();
    if plans.is_empty() {
        return Html::default();
    }
    let scale = Scale::of(&plans);
    let told: Vec<String> = plans.iter().map(|plan| tell(plan, props)).collect();
    let wider = scale.across / scale.along;
    let on_lever = {
        let lever = lever.clone();
        Callback::from(move |chosen| lever.set(chosen))
    };
    let view = format!(
        "{} {} {} {}",
        -HALF_WIDTH,
        -HALF_HEIGHT,
        2.0 * HALF_WIDTH,
        2.0 * HALF_HEIGHT
    );
    html! {
        <figure class="tracking-plan" data-testid="plan-view">
            <Choice<Lever>
                name="plan-lever"
                label="Path drawn at"
                options={vec![Opt::new(Lever::Half, "Half lever", "half"), Opt::new(Lever::Full, "Full lever", "full")]}
                value={Some(*lever)}
                on_change={on_lever}
            />
            <svg class="tracking-plan-drawing" viewBox={view} role="img" aria-label={format!("Path from above. {}", told.join(" "))}>
                <line class="plan-lane" x1="0" y1={(END - HALF_HEIGHT).to_string()} x2="0" y2={(HALF_HEIGHT - END).to_string()} />
                { for plans.iter().map(|plan| html! { <>
                    <polygon class="plan-band" points={scale.band(&plan.before)} />
                    if props.has_after {
                        <polygon class="plan-band is-after" points={scale.band(&plan.after)} />
                        <polyline class="plan-path is-after" points={scale.line(&plan.after.middle)} />
                    }
                    <polyline class="plan-path" points={scale.line(&plan.before.middle)} />
                    { name(plan, scale, props.has_after) }
                </> }) }
                <g class="plan-machine">
                    <rect x="-15" y="-11" width="7" height="22" />
                    <rect x="8" y="-11" width="7" height="22" />
                    <path d="M-8 -7H8V7H-8Z M0 -16L5 -7H-5Z" />
                </g>
                <text class="plan-word" x={(-HALF_WIDTH + 4.0).to_string()} y="5">{ "left" }</text>
                <text class="plan-word is-end" x={(HALF_WIDTH - 4.0).to_string()} y="5">{ "right" }</text>
                <text class="plan-word is-middle" x="0" y={(-HALF_HEIGHT + 15.0).to_string()}>{ "forward" }</text>
                <text class="plan-word is-middle" x="0" y={(HALF_HEIGHT - 6.0).to_string()}>{ "reverse" }</text>
            </svg>
            <figcaption>
                { for told.iter().map(|line| html! { <p>{ line }</p> }) }
                <p class="soft small">
                    { format!("Level ground, no camber. Bands: 95 %, computed from these runs. Sideways drawn {wider:.0} times wider than along.") }
                </p>
            </figcaption>
        </figure>
    }
}

/// Words at the ends of the paths.
fn name(plan: &Plan, scale: Scale, has_after: bool) -> Html {
    let down = if plan.setting.travel == Travel::Reverse {
        1.0
    } else {
        -1.0
    };
    let place = |trace: &Trace, row: f64| {
        let x = trace.middle.last().map_or(0.0, |p| -p.left * scale.across);
        let x = x.clamp(-HALF_WIDTH + 30.0, HALF_WIDTH - 30.0);
        let y = down * (HALF_HEIGHT - END + row) + 4.0;
        (format!("{x:.1}"), format!("{y:.1}"))
    };
    let (x, y) = place(&plan.before, 9.0);
    html! { <>
        <text class="plan-name" {x} {y}>{ if has_after { "now" } else { "path" } }</text>
        if has_after {
            { {
                let (x, y) = place(&plan.after, 23.0);
                html! { <text class="plan-name" {x} {y}>{ "after" }</text> }
            } }
        }
    </> }
}

fn tell(plan: &Plan, props: &PlanViewProps) -> String {
    let way = match plan.setting.travel {
        Travel::Forward => "Forward",
        Travel::Reverse => "Reverse",
    };
    let distance = words::lane(plan.distance, &props.prefs);
    let now = end(&plan.before, &props.prefs);
    if props.has_after {
        let after = end(&plan.after, &props.prefs);
        format!("{way}, {distance}: now {now}; after adjusting {after}.")
    } else {
        format!("{way}, {distance}: {now}.")
    }
}
