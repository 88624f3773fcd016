//! The app bar: the name, the unit at hand, whether everything is saved.

use yew::{Html, Properties, component, html};

use crate::app::deed::Snapshot;
use crate::app::parts::{Icon, Shape};
use crate::app::route::Route;
use crate::app::state::{Save, State};

/// Properties of [`Bar`].
#[derive(Clone, PartialEq, Properties)]
pub struct BarProps {
    /// The state.
    pub state: Snapshot,
}

/// Id and name of the unit that the screen is about.
fn unit_at_hand(state: &State) -> Option<(String, String)> {
    let id = match &state.route {
        Route::Unit(id) | Route::Tags(Some(id)) => id,
        Route::Call(id)
        | Route::Neutral(id)
        | Route::Tracking(id)
        | Route::Bench(id)
        | Route::Report(id) => &state.visits.get(id)?.unit,
        Route::Units | Route::Settings | Route::Tags(None) | Route::Tag(_) => return None,
    };
    Some((id.clone(), state.units.get(id)?.name.clone()))
}

/// The bar.
#[component]
pub fn Bar(props: &BarProps) -> Html {
    let state = &props.state;
    let unit = unit_at_hand(state);
    let is_settings = state.route == Route::Settings;
    html! {
        <header class="bar">
            <a class="bar-home" href={Route::Units.href()} data-testid="home" aria-label="Lowside: to the list of units">
                <img class="bar-mark" src="icons/mark.svg" width="36" height="36" alt="" />
                <span class="bar-name">{ "Lowside" }</span>
            </a>
            <span class="bar-at">
                if let Some((id, name)) = unit {
                    <a
                        class="bar-unit"
                        href={Route::Unit(id).href()}
                        aria-label={format!("Unit {name}: profile")}
                        data-testid="current-unit"
                    >
                        <span class="bar-unit-name">{ name }</span>
                    </a>
                }
            </span>
            <SaveState state={state.clone()} />
            <a
                class="bar-link"
                href={Route::Settings.href()}
                aria-current={is_settings.then_some("page")}
                aria-label="Settings"
                data-testid="settings-link"
            >
                <Icon shape={Shape::Settings} />
                <span class="bar-link-words" aria-hidden="true">{ "Settings" }</span>
            </a>
        </header>
    }
}

/// Whether everything typed is kept.
#[component]
fn SaveState(props: &BarProps) -> Html {
    let state = &props.state;
    let (shape, words, class) = if state.memory_only {
        (Shape::Warning, "Not kept", "save-state is-failed")
    } else if !state.contested.is_empty() {
        (Shape::Warning, "Not saved", "save-state is-failed")
    } else {
        match &state.save {
            Save::Failed(_) => (Shape::Warning, "Not saved", "save-state is-failed"),
            Save::Pending => (Shape::Working, "Saving", "save-state"),
            Save::Saved if state.is_just_ready => (Shape::Done, "Ready offline", "save-state"),
            Save::Saved if state.units.is_empty() => return Html::default(),
            Save::Saved => (Shape::Done, "Saved", "save-state"),
        }
    };
    html! {
        <span {class} data-testid="save-state">
            <Icon {shape} />
            { words }
        </span>
    }
}
