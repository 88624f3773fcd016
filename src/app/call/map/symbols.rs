//! Graphic symbols of ISO 1219, drawn about the origin and set in place by the caller.

use yew::{Html, html};

/// Puts a symbol in its place.
pub fn at(x: f64, y: f64, symbol: Html) -> Html {
    html! { <g transform={format!("translate({x} {y})")}>{ symbol }</g> }
}

/// Variable pump, two directions of flow: triangles point out, arrow through.
pub fn pump() -> Html {
    html! { <>
        <circle r="36" class="body" />
        <path d="M0 -36L-9 -21H9Z" class="solid" />
        <path d="M0 36L-9 21H9Z" class="solid" />
        <path d="M28 30L-31 -33M-31 -33L-27.5 -21M-31 -33L-19.5 -28.5" class="line" />
    </> }
}

/// Motor, two directions of flow: triangles point in.
pub fn motor() -> Html {
    html! { <>
        <circle r="36" class="body" />
        <path d="M0 -21L-9 -36H9Z" class="solid" />
        <path d="M0 21L-9 36H9Z" class="solid" />
    </> }
}

/// The arrow through a motor whose displacement can be changed.
pub fn variable() -> Html {
    html! { <path d="M-28 30L31 -33M31 -33L19.5 -28.5M31 -33L27.5 -21" class="line" /> }
}

/// Charge pump: fixed, one direction.
pub fn charge_pump() -> Html {
    html! { <>
        <circle r="20" class="body" />
        <path d="M0 -20L-7 -8H7Z" class="solid" />
    </> }
}

/// Check valve that opens upward.
pub fn check() -> Html {
    html! { <>
        <path d="M0 -16V-9M0 5V16" class="line" />
        <path d="M-9 -6L0 5 9 -6" class="line" />
        <circle cy="-4" r="5" class="body" />
    </> }
}

/// Relief valve, flow downward; the spring stands at the right, the dashed pilot line at the left.
pub fn relief() -> Html {
    html! { <>
        <path d="M-11 -11H11V11H-11Z" class="body" />
        <path d="M4 -11V9M4 9L1 3M4 9L7 3" class="line" />
        <path d="M11 -2L14 -6 16 2 19 -6 21 0" class="line" />
        <path d="M-11 0H-16V-15H-3" class="pilot" />
    </> }
}

/// Filter.
pub fn filter() -> Html {
    html! { <>
        <path d="M0 -13L13 0 0 13 -13 0Z" class="body" />
        <path d="M-13 0H13" class="pilot" />
    </> }
}

/// Cooler: arrows point out, heat leaves.
pub fn cooler() -> Html {
    html! { <>
        <path d="M0 -16L16 0 0 16 -16 0Z" class="body" />
        <path d="M0 -3V-25M-3 -20L0 -25.5 3 -20M0 3V25M-3 20L0 25.5 3 20" class="line" />
    </> }
}

/// Tank, open to the air.
pub fn tank() -> Html {
    html! { <path d="M-62 -14V14H62V-14" class="line is-heavy" /> }
}

/// Flushing shuttle: three positions, closed in the middle where `is_closed_centre`, springs at both ends.
pub fn shuttle(is_closed_centre: bool) -> Html {
    html! { <>
        <path d="M-30 -13H30V13H-30ZM-10 -13V13M10 -13V13" class="body" />
        <path d="M-24 -13L-16 13M24 -13L16 13" class="line" />
        if is_closed_centre {
            <path d="M-5 -13V-7M-8 -7H-2M5 -13V-7M2 -7H8M0 13V7M-3 7H3" class="line" />
        } else {
            <path d="M-5 -13L0 13 5 -13" class="line" />
        }
        <path d="M-30 0L-33 -4 -35 4 -38 -4 -40 0M30 0L33 -4 35 4 38 -4 40 0" class="line" />
    </> }
}

/// Servo: double-acting cylinder centred by springs.
pub fn servo() -> Html {
    html! { <>
        <path d="M-21 -9H21V9H-21Z" class="body" />
        <path d="M-3 -9V9M3 -9V9" class="line" />
        <path d="M-21 0L-18 -5 -14 5 -10 -5 -6 5 -3 0M21 0L18 -5 14 5 10 -5 6 5 3 0" class="line is-thin" />
    </> }
}

/// Engine.
pub fn engine() -> Html {
    html! { <path d="M-18 -18H18V18H-18Z" class="body" /> }
}

/// Wheel or sprocket.
pub fn wheel() -> Html {
    html! { <><circle r="22" class="body is-heavy" /><circle r="4" class="solid" /></> }
}
