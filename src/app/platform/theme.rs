//! Light, dark, or for the sun: one attribute of the root element; the style sheet does the rest.

/// The person's choice.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub enum Theme {
    /// As the device is set.
    #[default]
    System,
    /// Dark on light.
    Light,
    /// Light on dark.
    Dark,
    /// Black on white with heavy lines, for a screen in the sun.
    Sun,
}

impl Theme {
    /// Every theme, in the order in which the screen offers them.
    pub const ALL: [Theme; 4] = [Theme::System, Theme::Light, Theme::Dark, Theme::Sun];

    /// The code under which it is kept.
    pub fn code(self) -> &'static str {
        match self {
            Theme::System => "system",
            Theme::Light => "light",
            Theme::Dark => "dark",
            Theme::Sun => "sun",
        }
    }

    /// The theme of this code; the device's own for any other text.
    pub fn from_code(code: &str) -> Theme {
        Theme::ALL
            .into_iter()
            .find(|theme| theme.code() == code)
            .unwrap_or_default()
    }

    /// Words for the screen.
    pub fn words(self) -> &'static str {
        match self {
            Theme::System => "As the device",
            Theme::Light => "Light",
            Theme::Dark => "Dark",
            Theme::Sun => "Sun",
        }
    }
}

/// Shows the page in this theme.
pub fn show(theme: Theme) {
    let root = web_sys::window()
        .and_then(|window| window.document())
        .and_then(|document| document.document_element());
    let Some(root) = root else { return };
    // An attribute that cannot be set leaves the page in the theme it has.
    let _ = match theme {
        Theme::System => root.remove_attribute("data-theme"),
        other => root.set_attribute("data-theme", other.code()),
    };
}
