//! A coefficient drawn over hours or days: points with their uncertainty, the line with its band, breaks and limits.

use yew::{Html, Properties, component, html};

use crate::quantity::UnitPrefs;
use crate::yard::trend::{Axis, Trend};
use crate::yard::{Break, Grouped, Series, calendar, value_words};

/// Width and height of the drawing.
const SIZE: (f64, f64) = (520.0, 280.0);
/// Free to the left, right, top and bottom of the plot.
const EDGE: (f64, f64, f64, f64) = (16.0, 16.0, 30.0, 40.0);
/// Places at which the band is drawn.
const STEPS: usize = 24;
/// How far the line goes on beyond the last point, share of the span.
const AHEAD: f64 = 0.25;

/// Properties of [`WearPlot`].
#[derive(Clone, PartialEq, Properties)]
pub struct WearPlotProps {
    /// The series.
    pub series: Series,
    /// Units of measure.
    pub prefs: UnitPrefs,
}

struct Frame {
    x: (f64, f64),
    top: f64,
}

impl Frame {
    fn x(&self, at: f64) -> f64 {
        let share = (at - self.x.0) / (self.x.1 - self.x.0);
        EDGE.0 + share.clamp(0.0, 1.0) * (SIZE.0 - EDGE.0 - EDGE.1)
    }

    fn y(&self, value: f64) -> f64 {
        let height = SIZE.1 - EDGE.2 - EDGE.3;
        SIZE.1 - EDGE.3 - (value / self.top).clamp(0.0, 1.0) * height
    }
}

fn px(x: f64) -> String {
    format!("{x:.1}")
}

/// The axis that a series is drawn on: that of its line, else hours where each point has them.
pub fn axis(series: &Series) -> Axis {
    match &series.trend {
        Ok(trend) => trend.axis,
        Err(_) => {
            let warm = series.history.points.iter().filter(|g| g.point.is.is_ok());
            if warm.clone().all(|g| g.point.hours.is_some()) {
                Axis::Hours
            } else {
                Axis::Days
            }
        }
    }
}

/// The drawing. Its words and a table stand beside it. Cold readings are not drawn.
#[component]
pub fn WearPlot(props: &WearPlotProps) -> Html {
    let series = &props.series;
    let axis = axis(series);
    let points: Vec<(&Grouped, f64, f64, f64, bool)> = series
        .history
        .points
        .iter()
        .filter_map(|g| {
            let c = g.point.is.as_ref().ok()?;
            Some((g, axis.of(g)?, c.is.value, c.is.own, c.at_most))
        })
        .collect();
    let (Some(first), Some(last)) = (points.first(), points.last()) else {
        return Html::default();
    };
    let span = (last.1 - first.1).max(if axis == Axis::Hours { 50.0 } else { 14.0 });
    let end = last.1
        + if series.trend.is_ok() {
            AHEAD * span
        } else {
            0.05 * span
        };
    let most = points.iter().map(|p| p.2 + 2.0 * p.3).fold(0.0, f64::max);
    let most = series
        .trend
        .as_ref()
        .map_or(most, |t| most.max(t.at(end, series.level).high));
    // Limits far above the points stay out of the picture: the words have them.
    let limits: Vec<(f64, &str)> = series
        .limits
        .map(|(watch, stop)| vec![(watch, "watch"), (stop, "stop")])
        .unwrap_or_default()
        .into_iter()
        .filter(|(limit, _)| *limit < 2.2 * most)
        .collect();
    let top = limits.iter().map(|(limit, _)| *limit).fold(most, f64::max);
    let frame = Frame {
        x: (first.1 - 0.05 * span, end),
        top: 1.1 * top.max(1e-6),
    };
    let bottom = SIZE.1 - EDGE.3;
    let place = |at: f64| match axis {
        Axis::Hours => format!("{at:.0} h"),
        #[allow(clippy::cast_possible_truncation)] // days of the calendar
        Axis::Days => calendar::words(at as i64),
    };
    let label = format!(
        "{} over {}: {} points, the last {}.",
        series.of.words(),
        if axis == Axis::Hours { "hours" } else { "days" },
        points.len(),
        value_words(series.of, last.2, &props.prefs),
    );
    html! {
        <svg class="drawing yard-plot" viewBox={format!("0 0 {} {}", SIZE.0, SIZE.1)} role="img" aria-label={label}
            data-testid={format!("plot-{}", series.of.code())}>
            <text class="draw-text is-soft" x={px(EDGE.0)} y="18">{
                format!("top {}", value_words(series.of, frame.top, &props.prefs))
            }</text>
            <line class="draw-axis" x1={px(EDGE.0)} x2={px(SIZE.0 - EDGE.1)} y1={px(bottom)} y2={px(bottom)} />
            if let Ok(trend) = &series.trend { { band(&frame, trend, series.level, (first.1, end)) } }
            { for limits.iter().map(|(limit, words)| html! { <>
                <line class="yard-limit" x1={px(EDGE.0)} x2={px(SIZE.0 - EDGE.1)} y1={px(frame.y(*limit))} y2={px(frame.y(*limit))} />
                <text class="draw-text" x={px(SIZE.0 - EDGE.1)} y={px(frame.y(*limit) - 5.0)} text-anchor="end">{ *words }</text>
            </> }) }
            { for points.iter().map(|(g, x, value, own, at_most)| mark(&frame, g, *x, *value, *own, *at_most)) }
            <text class="draw-text" x={px(EDGE.0)} y={px(SIZE.1 - 12.0)}>{ place(first.1) }</text>
            <text class="draw-text" x={px(SIZE.0 - EDGE.1)} y={px(SIZE.1 - 12.0)} text-anchor="end">{ place(end) }</text>
        </svg>
    }
}

fn band(frame: &Frame, trend: &Trend, level: usize, span: (f64, f64)) -> Html {
    let at = |k: usize| {
        let from = span.0.max(trend.span.0);
        from + (span.1 - from) * k as f64 / STEPS as f64
    };
    let point = |x: f64, value: f64| format!("{:.1} {:.1}", frame.x(x), frame.y(value));
    let bands: Vec<_> = (0..=STEPS)
        .map(|k| (at(k), trend.at(at(k), level)))
        .collect();
    let edge: Vec<String> = bands
        .iter()
        .map(|(x, b)| point(*x, b.high))
        .chain(bands.iter().rev().map(|(x, b)| point(*x, b.low)))
        .collect();
    let line = |from: f64, to: f64, class: &'static str| {
        let (a, b) = (trend.at(from, level).value, trend.at(to, level).value);
        html! {
            <line {class} x1={px(frame.x(from))} y1={px(frame.y(a))} x2={px(frame.x(to))} y2={px(frame.y(b))} />
        }
    };
    html! { <>
        <polygon class="yard-band" points={edge.join(" ")} />
        { line(at(0), trend.span.1, "draw-line is-strong") }
        { line(trend.span.1, span.1, "draw-leader") }
    </> }
}

/// A dot with its uncertainty; a triangle pointing down where the reading only says "at most". A break stands before it.
fn mark(frame: &Frame, g: &Grouped, x: f64, value: f64, own: f64, at_most: bool) -> Html {
    let (x, y) = (frame.x(x), frame.y(value));
    let broken = match &g.after {
        Some(Break::Repair(_)) => Some("repair"),
        Some(Break::OtherInstrument) => Some("other instrument"),
        None => None,
    };
    html! { <>
        if let Some(words) = broken {
            <line class="yard-break" x1={px(x - 10.0)} x2={px(x - 10.0)} y1={px(EDGE.2)} y2={px(SIZE.1 - EDGE.3)} />
            <text class="draw-text is-soft" x={px(x - 14.0)} y={px(EDGE.2 + 12.0)} text-anchor="end">{ words }</text>
        }
        if at_most {
            <path class="draw-ring" d={format!("M{:.1} {:.1}h12l-6 11Z", x - 6.0, y)} />
        } else {
            <line class="draw-line" x1={px(x)} x2={px(x)} y1={px(frame.y(value - 2.0 * own))} y2={px(frame.y(value + 2.0 * own))} />
            <circle class="draw-point" cx={px(x)} cy={px(y)} r="5" />
        }
    </> }
}
