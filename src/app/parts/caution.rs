//! A caution where the hand goes: shape, word and colour.

use yew::{AttrValue, Children, Classes, Html, Properties, classes, component, html};

use super::Icon;
use super::icon::Shape;

/// How grave.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Grade {
    /// To know.
    #[default]
    Note,
    /// Harm to the machine or a light injury.
    Caution,
    /// Can kill or maim.
    Danger,
}

impl Grade {
    /// The word that stands before the text.
    pub fn word(self) -> &'static str {
        match self {
            Grade::Note => "Note",
            Grade::Caution => "Caution",
            Grade::Danger => "Danger",
        }
    }

    fn shape(self) -> Shape {
        match self {
            Grade::Note => Shape::Note,
            Grade::Caution => Shape::Warning,
            Grade::Danger => Shape::Danger,
        }
    }

    fn class(self) -> &'static str {
        match self {
            Grade::Note => "is-note",
            Grade::Caution => "is-caution",
            Grade::Danger => "is-danger",
        }
    }
}

/// Properties of [`Caution`].
#[derive(Clone, PartialEq, Properties)]
pub struct CautionProps {
    /// How grave.
    #[prop_or_default]
    pub grade: Grade,
    /// Heading; the word of the grade where it is empty.
    #[prop_or_default]
    pub title: AttrValue,
    /// The text.
    #[prop_or_default]
    pub children: Children,
    /// Announced when it appears: `status` or `alert`. Empty: not announced.
    #[prop_or_default]
    pub role: Option<AttrValue>,
    /// For the end-to-end tests.
    #[prop_or_default]
    pub testid: AttrValue,
    /// Extra classes.
    #[prop_or_default]
    pub class: Classes,
}

/// The caution.
#[component]
pub fn Caution(props: &CautionProps) -> Html {
    let (word, title) = (props.grade.word(), &props.title);
    let heading = if title.is_empty() {
        html! { { word } }
    } else if props.grade == Grade::Note {
        html! { { title.clone() } }
    } else {
        html! { { format!("{word}: {title}") } }
    };
    html! {
        <div
            class={classes!("caution", props.grade.class(), props.class.clone())}
            role={props.role.clone()}
            data-testid={props.testid.clone()}
        >
            <span class="caution-sign"><Icon shape={props.grade.shape()} /></span>
            <div class="caution-text">
                <strong class="caution-title">{ heading }</strong>
                { props.children.clone() }
            </div>
        </div>
    }
}
