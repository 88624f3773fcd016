//! Small drawn signs. Each stands beside words and never carries a meaning alone.

use yew::{Html, Properties, component, html};

/// What is drawn.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Shape {
    /// Ring with a dot.
    RadioOn,
    /// Ring.
    RadioOff,
    /// Tick.
    Done,
    /// Triangle with a bar and a dot.
    Warning,
    /// Octagon with a bar.
    Danger,
    /// Circle with an i.
    Note,
    /// Cross.
    Cross,
    /// Plus.
    Plus,
    /// Arrow to the right.
    Forward,
    /// Arrow to the left.
    Back,
    /// Sliders.
    Settings,
    /// Turning dots: at work.
    Working,
}

/// Properties of [`Icon`].
#[derive(Clone, PartialEq, Properties)]
pub struct IconProps {
    /// What is drawn.
    pub shape: Shape,
}

/// The sign, hidden from screen readers.
#[component]
pub fn Icon(props: &IconProps) -> Html {
    let inside = match props.shape {
        Shape::RadioOn => html! { <>
            <circle cx="12" cy="12" r="9" class="stroke" />
            <circle cx="12" cy="12" r="4.5" class="fill" />
        </> },
        Shape::RadioOff => html! { <circle cx="12" cy="12" r="9" class="stroke" /> },
        Shape::Done => html! { <path d="M4 13l5 5L20 6" class="stroke" /> },
        Shape::Warning => html! { <>
            <path d="M12 3L22.5 21H1.5Z" class="stroke" />
            <path d="M12 9.5v5" class="stroke" />
            <circle cx="12" cy="17.8" r="1.3" class="fill" />
        </> },
        Shape::Danger => html! { <>
            <path d="M8 2.5h8L21.5 8v8L16 21.5H8L2.5 16V8Z" class="stroke" />
            <path d="M12 7v6" class="stroke" />
            <circle cx="12" cy="16.6" r="1.3" class="fill" />
        </> },
        Shape::Note => html! { <>
            <circle cx="12" cy="12" r="10" class="stroke" />
            <path d="M12 11v6" class="stroke" />
            <circle cx="12" cy="7.3" r="1.3" class="fill" />
        </> },
        Shape::Cross => html! { <path d="M5 5l14 14M19 5L5 19" class="stroke" /> },
        Shape::Plus => html! { <path d="M12 4v16M4 12h16" class="stroke" /> },
        Shape::Forward => html! { <path d="M4 12h15M13 5.5l6.5 6.5-6.5 6.5" class="stroke" /> },
        Shape::Back => html! { <path d="M20 12H5M11 5.5L4.5 12l6.5 6.5" class="stroke" /> },
        Shape::Settings => html! { <>
            <path d="M3 7h8M17 7h4M3 17h4M13 17h8" class="stroke" />
            <circle cx="14" cy="7" r="3" class="stroke" />
            <circle cx="10" cy="17" r="3" class="stroke" />
        </> },
        Shape::Working => html! { <>
            <circle cx="5" cy="12" r="2" class="fill" />
            <circle cx="12" cy="12" r="2" class="fill" />
            <circle cx="19" cy="12" r="2" class="fill" />
        </> },
    };
    html! {
        <svg class="icon" viewBox="0 0 24 24" width="24" height="24" aria-hidden="true" focusable="false">
            { inside }
        </svg>
    }
}
