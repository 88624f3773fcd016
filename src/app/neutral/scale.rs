//! The swash offset drawn: null in the middle, the 95 % interval as a bar with ends, a dead zone as an open box.

use yew::{AttrValue, Html, Properties, component, html};

use crate::neutral::offset::{Offset, Says};
use crate::neutral::words::Writer;
use crate::quantity::UnitPrefs;

/// Width and height of the drawing.
const SIZE: (f64, f64) = (360.0, 112.0);
/// Free on both sides.
const EDGE: f64 = 24.0;
/// Height of the axis.
const AXIS: f64 = 62.0;
/// Ends of the axis that are used, share of stroke.
const ENDS: [f64; 6] = [0.01, 0.02, 0.05, 0.1, 0.15, 0.2];

/// Properties of [`OffsetScale`].
#[derive(Clone, PartialEq, Properties)]
pub struct OffsetScaleProps {
    /// What it came to.
    pub offset: Offset,
    /// Units: the decimal mark.
    pub prefs: UnitPrefs,
}

/// The drawing. Its words stand beside it.
#[component]
pub fn OffsetScale(props: &OffsetScaleProps) -> Html {
    let writer = Writer::new(&props.prefs);
    let offset = &props.offset;
    let (low, high) = match offset.says {
        Says::Within { under } => (-under, under),
        _ => (offset.low, offset.high),
    };
    let reach = low.abs().max(high.abs());
    let end = ENDS.into_iter().find(|end| *end >= reach).unwrap_or(0.2);
    let at = |share: f64| SIZE.0 / 2.0 + (share / end).clamp(-1.0, 1.0) * (SIZE.0 / 2.0 - EDGE);
    let label: AttrValue = writer.offset(offset).text.into();
    let is_dead = matches!(offset.says, Says::Within { .. });
    // Past the end of what can show, the bar has no cap.
    let open_low = offset.says == Says::AtLeast && offset.mean < 0.0;
    let open_high = offset.says == Says::AtLeast && offset.mean >= 0.0;
    let (left, right) = (at(low), at(high));
    let px = |x: f64| format!("{x:.1}");
    let cap = |x: f64| {
        html! { <line class="draw-line is-strong" x1={px(x)} x2={px(x)} y1={px(AXIS - 16.0)} y2={px(AXIS + 16.0)} /> }
    };
    html! {
        <svg
            class="drawing"
            viewBox={format!("0 0 {} {}", SIZE.0, SIZE.1)}
            role="img"
            aria-label={label}
            data-testid="offset-scale"
        >
            <line class="draw-axis" x1={px(at(-end))} x2={px(at(end))} y1={px(AXIS)} y2={px(AXIS)} />
            { for [-1.0, -0.5, 0.5, 1.0].map(|part| html! {
                <line class="draw-axis" x1={px(at(part * end))} x2={px(at(part * end))} y1={px(AXIS - 5.0)} y2={px(AXIS + 5.0)} />
            }) }
            <rect
                class={if is_dead { "draw-zone" } else { "draw-bar" }}
                x={px(left)}
                y={px(AXIS - 10.0)}
                width={px((right - left).max(3.0))}
                height="20"
            />
            if !open_low && !is_dead { { cap(left) } }
            if !open_high && !is_dead { { cap(right) } }
            if !is_dead && !open_low && !open_high {
                <circle class="draw-point" cx={px(at(offset.mean))} cy={px(AXIS)} r="5" />
            }
            <line class="draw-null" x1={px(at(0.0))} x2={px(at(0.0))} y1="26" y2={px(AXIS + 26.0)} />
            <text class="draw-text" x={px(at(0.0))} y="18" text-anchor="middle">{ "null" }</text>
            <text class="draw-text" x={px(at(-end))} y="18" text-anchor="start">{ "reverse" }</text>
            <text class="draw-text" x={px(at(end))} y="18" text-anchor="end">{ "forward" }</text>
            <text class="draw-text" x={px(at(-end))} y={px(SIZE.1 - 8.0)} text-anchor="start">{ writer.stroke(end) }</text>
            <text class="draw-text" x={px(at(end))} y={px(SIZE.1 - 8.0)} text-anchor="end">{ writer.stroke(end) }</text>
            <text class="draw-text is-soft" x={px(at(0.0))} y={px(SIZE.1 - 8.0)} text-anchor="middle">{
                if is_dead { "dead zone" } else { "of full stroke" }
            }</text>
        </svg>
    }
}
