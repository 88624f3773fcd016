//! Settings: units of measure, theme, the instruments of the shop, the data, and what this app is.

mod about;
mod archive;
pub mod data;
mod draft;
pub mod import;
mod instrument_form;
mod instruments;
pub mod measures;

use yew::{Callback, Html, Properties, component, html};

use self::about::About;
use self::data::Data;
use self::instruments::Instruments;
use self::measures::Measures;
use crate::app::deed::{Deed, Snapshot};
use crate::app::parts::{Choice, Opt, Section};
use crate::app::route::Route;
use crate::app::state::Action;
use crate::record::{Settings, Theme};

/// Properties of [`SettingsScreen`] and of its parts.
#[derive(Clone, PartialEq, Properties)]
pub struct SettingsProps {
    /// The state.
    pub state: Snapshot,
    /// Wishes.
    pub deed: Callback<Deed>,
}

impl SettingsProps {
    /// A callback that changes a copy of the settings and hands it on.
    pub fn change<T: 'static>(&self, change: impl Fn(&mut Settings, T) + 'static) -> Callback<T> {
        let (settings, deed) = (self.state.settings.clone(), self.deed.clone());
        Callback::from(move |value: T| {
            let mut next = (*settings).clone();
            change(&mut next, value);
            deed.emit(Deed::Put(Action::PutSettings(next)));
        })
    }
}

fn theme_words(theme: Theme) -> &'static str {
    match theme {
        Theme::System => "As the device",
        Theme::Light => "Light",
        Theme::Dark => "Dark",
        Theme::Sun => "Sun",
    }
}

/// The screen.
#[component]
pub fn SettingsScreen(props: &SettingsProps) -> Html {
    let themes = Theme::ALL
        .into_iter()
        .map(|theme| Opt::new(theme, theme_words(theme), theme.code()))
        .collect::<Vec<_>>();
    html! {
        <main class="page" id="main" data-testid="settings-screen">
            <h1 id="title" tabindex="-1">{ "Settings" }</h1>
            <div class="columns">
                <div class="stack">
                    <Measures ..props.clone() />
                    <Section id="screen" title="Screen" state={theme_words(props.state.settings.theme)}>
                        <Choice<Theme>
                            name="theme"
                            label="Theme"
                            hint="Sun: black on white with heavy lines."
                            options={themes}
                            value={props.state.settings.theme}
                            on_change={props.change(|settings, theme| settings.theme = theme)}
                        />
                        <Choice<bool>
                            name="own-keys"
                            label="Keys for figures"
                            hint="Large keys here: for gloves, and where the device’s own keypad has no minus or no comma."
                            options={vec![
                                Opt::new(false, "The device’s own", "device"),
                                Opt::new(true, "Large keys here", "here"),
                            ]}
                            value={Some(props.state.settings.own_keys)}
                            on_change={props.change(|settings, on| settings.own_keys = on)}
                        />
                    </Section>
                    <Section id="learning" title="Learned from closed calls" state={match props.state.cases.len() {
                        0 => "nothing yet".to_owned(),
                        1 => "1 case".to_owned(),
                        cases => format!("{cases} cases"),
                    }}>
                        <p>{ "Closed calls with a cause move how often each cause is expected. See which, leave cases out, or switch it off." }</p>
                        <div class="actions">
                            <a class="button" href={Route::Learned.href()} data-testid="open-learned">{ "What was learned" }</a>
                        </div>
                    </Section>
                    <Data state={props.state.clone()} deed={props.deed.clone()} />
                    <About ..props.clone() />
                </div>
                <div class="stack">
                    <Instruments ..props.clone() />
                </div>
            </div>
        </main>
    }
}
