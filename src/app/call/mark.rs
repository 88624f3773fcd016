//! The mark of a standing: a shape of its own for each, so that colour only repeats what the shape says.
//! Round: within. Diamond: at the edge. Point down: low. Point up: high. Square with a query: cannot tell. Ring: open.

use super::words;
use crate::assessment::Standing;
use yew::{Html, html};

/// The mark, about 22 units wide, centred on the origin of the drawing it stands in.
pub fn shape(standing: Standing) -> Html {
    let class = format!("mark is-{}", words::standing_class(standing));
    let inside = match standing {
        Standing::Within => html! { <>
            <circle r="10" class="mark-body" />
            <path d="M-4.8 .4L-1.4 3.8 5 -3.4" class="mark-sign" />
        </> },
        Standing::Edge => html! { <>
            <path d="M0 -12L12 0 0 12 -12 0Z" class="mark-body" />
            <path d="M-5 1.2C-3 -2.6 -1 -2.6 0 0S3 2.6 5 -1.2" class="mark-sign" />
        </> },
        Standing::Low => html! { <>
            <path d="M-11.5 -8.5H11.5L0 11.5Z" class="mark-body" />
            <path d="M0 -5.5V4M-3 1L0 4.4 3 1" class="mark-sign" />
        </> },
        Standing::High => html! { <>
            <path d="M-11.5 8.5H11.5L0 -11.5Z" class="mark-body" />
            <path d="M0 5.5V-4M-3 -1L0 -4.4 3 -1" class="mark-sign" />
        </> },
        Standing::CannotTell => html! { <>
            <path d="M-9.5 -9.5H9.5V9.5H-9.5Z" class="mark-body" />
            <path d="M-3 -3.2C-3 -7.4 3.4 -7.2 3.2 -3.2 3 -.8 0 -1 0 2" class="mark-sign" />
            <circle cy="5.6" r="1.3" class="mark-dot" />
        </> },
        Standing::Open => html! { <circle r="9.5" class="mark-body" /> },
    };
    html! { <g {class}>{ inside }</g> }
}

/// The mark with its word, for a line of text.
pub fn badge(standing: Standing) -> Html {
    html! {
        <span class={format!("badge is-{}", words::standing_class(standing))}>
            <svg class="badge-mark" viewBox="-13 -13 26 26" width="22" height="22" aria-hidden="true" focusable="false">
                { shape(standing) }
            </svg>
            <span class="badge-word">{ words::standing(standing) }</span>
        </span>
    }
}
