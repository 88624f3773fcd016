//! The adjuster drawn: turns against what was seen, the fitted law, the dead band, the null with its interval, and where the
//! adjuster stands now.

use yew::{AttrValue, Html, Properties, component, html};

use crate::neutral::adjust::{Fitted, Point, Reach, Seen};
use crate::neutral::words::Writer;
use crate::quantity::UnitPrefs;
use crate::readings::Direction;

/// Width and height of the drawing.
const SIZE: (f64, f64) = (360.0, 266.0);
/// Free to the left, right, top and bottom of the plot.
const EDGE: (f64, f64, f64, f64) = (14.0, 14.0, 26.0, 74.0);

/// Properties of [`AdjusterPlot`].
#[derive(Clone, PartialEq, Properties)]
pub struct AdjusterPlotProps {
    /// Places, as read.
    pub points: Vec<Point>,
    /// What they come to, where they do.
    pub fitted: Option<Fitted>,
    /// What stands on the upright axis: "creep, rpm".
    pub what: AttrValue,
    /// Units: the decimal mark.
    pub prefs: UnitPrefs,
}

/// Where things stand in the drawing.
struct Frame {
    turns: (f64, f64),
    top: f64,
}

impl Frame {
    fn of(props: &AdjusterPlotProps) -> Frame {
        let mut turns = (f64::MAX, f64::MIN);
        let mut top = 0.0_f64;
        let mut hold = |x: f64| turns = (turns.0.min(x), turns.1.max(x));
        for point in &props.points {
            hold(point.turns);
            if let Seen::Value { value, .. } = point.seen {
                top = top.max(value.abs());
            }
        }
        if let Some(fitted) = props
            .fitted
            .as_ref()
            .filter(|f| f.reach == Reach::BothSides)
        {
            hold(fitted.null.mean - fitted.dead.mean);
            hold(fitted.null.mean + fitted.dead.mean);
        }
        let spare = 0.08 * (turns.1 - turns.0).max(0.25);
        Frame {
            turns: (turns.0 - spare, turns.1 + spare),
            top: if top > 0.0 { 1.15 * top } else { 1.0 },
        }
    }

    fn x(&self, turns: f64) -> f64 {
        let share = (turns - self.turns.0) / (self.turns.1 - self.turns.0);
        EDGE.0 + share.clamp(0.0, 1.0) * (SIZE.0 - EDGE.0 - EDGE.1)
    }

    fn y(&self, value: f64) -> f64 {
        let middle = 0.5 * (EDGE.2 + SIZE.1 - EDGE.3);
        let half = 0.5 * (SIZE.1 - EDGE.2 - EDGE.3);
        middle - (value / self.top).clamp(-1.0, 1.0) * half
    }
}

fn px(x: f64) -> String {
    format!("{x:.1}")
}

/// The drawing. Its words stand beside it.
#[component]
pub fn AdjusterPlot(props: &AdjusterPlotProps) -> Html {
    if props.points.is_empty() {
        return Html::default();
    }
    let frame = Frame::of(props);
    let writer = Writer::new(&props.prefs);
    let fitted = props
        .fitted
        .as_ref()
        .filter(|f| f.reach == Reach::BothSides);
    let zero = frame.y(0.0);
    let bottom = SIZE.1 - EDGE.3;
    let label = match fitted {
        Some(fitted) => format!(
            "Turns of the adjuster against {}: null at {} {}, now at {}.",
            props.what,
            writer.turns(fitted.null.mean),
            if fitted.null.mean < 0.0 { "out" } else { "in" },
            props
                .points
                .last()
                .map_or(String::new(), |p| writer.turns(p.turns)),
        ),
        None => format!(
            "Turns of the adjuster against {}: {} places.",
            props.what,
            props.points.len()
        ),
    };
    html! {
        <svg class="drawing" viewBox={format!("0 0 {} {}", SIZE.0, SIZE.1)} role="img" aria-label={label} data-testid="adjuster-plot">
            <text class="draw-text is-soft" x={px(EDGE.0)} y="16">{ format!("{}; forward up", props.what) }</text>
            <line class="draw-axis" x1={px(EDGE.0)} x2={px(SIZE.0 - EDGE.1)} y1={px(zero)} y2={px(zero)} />
            if let Some(fitted) = fitted { { band(&frame, fitted, bottom) } }
            { for props.points.iter().map(|point| mark(&frame, point)) }
            { here(&frame, props, bottom) }
            <text class="draw-text" x={px(EDGE.0)} y={px(SIZE.1 - 6.0)}>{ format!("{} {}", writer.turns(frame.turns.0), if frame.turns.0 < 0.0 { "out" } else { "in" }) }</text>
            <text class="draw-text" x={px(SIZE.0 - EDGE.1)} y={px(SIZE.1 - 6.0)} text-anchor="end">{
                format!("{} {}", writer.turns(frame.turns.1), if frame.turns.1 < 0.0 { "out" } else { "in" })
            }</text>
        </svg>
    }
}

/// Dead band, null with its interval, and the law.
fn band(frame: &Frame, fitted: &Fitted, bottom: f64) -> Html {
    let (null, dead) = (fitted.null.mean, fitted.dead.mean);
    let (left, right) = (frame.x(null - dead), frame.x(null + dead));
    let slope = fitted.slope.unwrap_or(0.0);
    let side = |edge: f64, end: f64| {
        html! {
            <line
                class="draw-line"
                x1={px(frame.x(edge))}
                y1={px(frame.y(0.0))}
                x2={px(frame.x(end))}
                y2={px(frame.y(slope * (end - edge)))}
            />
        }
    };
    html! { <>
        <rect class="draw-zone" x={px(left)} y={px(EDGE.2)} width={px((right - left).max(2.0))} height={px(bottom - EDGE.2)} />
        <text class="draw-text is-soft" x={px(0.5 * (left + right))} y={px(EDGE.2 + 14.0)} text-anchor="middle">{ "dead band" }</text>
        if slope != 0.0 {
            { side(null - dead, frame.turns.0) }
            { side(null + dead, frame.turns.1) }
        }
        <line class="draw-null" x1={px(frame.x(null))} x2={px(frame.x(null))} y1={px(EDGE.2 + 20.0)} y2={px(bottom + 6.0)} />
        <line
            class="draw-line is-strong"
            x1={px(frame.x(fitted.null.low))}
            x2={px(frame.x(fitted.null.high))}
            y1={px(bottom + 6.0)}
            y2={px(bottom + 6.0)}
        />
        <text class="draw-text" x={px(frame.x(null))} y={px(bottom + 24.0)} text-anchor="middle">{ "null" }</text>
    </> }
}

/// A place: a dot for a figure, a triangle for a start, pointing the way it went.
fn mark(frame: &Frame, point: &Point) -> Html {
    let x = frame.x(point.turns);
    match point.seen {
        Seen::Value { value, uncertainty } => {
            let (low, high) = (
                frame.y(value - 2.0 * uncertainty),
                frame.y(value + 2.0 * uncertainty),
            );
            html! { <>
                <line class="draw-line" x1={px(x)} x2={px(x)} y1={px(low)} y2={px(high)} />
                <circle class="draw-point" cx={px(x)} cy={px(frame.y(value))} r="5" />
            </> }
        }
        Seen::Starts(direction) => {
            let y = frame.y(0.0);
            let tip = if direction == Direction::Forward {
                -14.0
            } else {
                14.0
            };
            let path = format!(
                "M{:.1} {:.1}L{:.1} {:.1}L{:.1} {:.1}Z",
                x - 8.0,
                y,
                x + 8.0,
                y,
                x,
                y + tip
            );
            html! { <path class="draw-point" d={path} /> }
        }
    }
}

/// Where the adjuster stands now: a ring and a word below it.
fn here(frame: &Frame, props: &AdjusterPlotProps, bottom: f64) -> Html {
    let Some(last) = props.points.last() else {
        return Html::default();
    };
    let x = frame.x(last.turns);
    let value = match last.seen {
        Seen::Value { value, .. } => value,
        Seen::Starts(_) => 0.0,
    };
    html! { <>
        <circle class="draw-ring" cx={px(x)} cy={px(frame.y(value))} r="10" />
        <line class="draw-leader" x1={px(x)} x2={px(x)} y1={px(frame.y(value) + 10.0)} y2={px(bottom + 26.0)} />
        <text class="draw-text" x={px(x.clamp(24.0, SIZE.0 - 24.0))} y={px(bottom + 40.0)} text-anchor="middle">{ "now" }</text>
    </> }
}
