//! The field of a reading: a value, or one touch for what is not a plain value.

use super::change::Change;
use super::entry::{self, Mode, Said};
use super::entry_modes as modes;
use super::jug::JugPanel;
use super::last_time::LastTime;
use crate::app::parts::Entry;
use crate::quantity::{Kind, UnitPrefs};
use crate::readings::instrument::Instrument;
use crate::readings::{JugCatch, Port, Reading, jug};
use yew::{AttrValue, Callback, Html, MouseEvent, Properties, component, html, use_state};

/// Properties of [`EntryField`].
#[derive(Clone, PartialEq, Properties)]
pub struct EntryFieldProps {
    /// The reading.
    pub reading: Reading,
    /// What is read, with its side.
    pub name: AttrValue,
    /// The same in a word or two.
    pub short: AttrValue,
    /// Place in the list, for ids and test ids.
    pub number: usize,
    /// Instrument on the port, where one is said.
    pub instrument: Option<Instrument>,
    /// What was caught in a jug for it.
    #[prop_or_default]
    pub caught: JugCatch,
    /// The same reading on an earlier call.
    #[prop_or_default]
    pub last: Option<LastTime>,
    /// Units.
    pub prefs: UnitPrefs,
    /// An edit.
    pub on_change: Callback<Change>,
}

/// DOM id of the first field of a reading.
pub fn field_id(reading: &str) -> String {
    format!("reading-{reading}")
}

/// What the keys under the field say.
const KEYS: [(Mode, &str, &str); 5] = [
    (Mode::Nothing, "nothing", "Nothing"),
    (Mode::OffScale, "off-scale", "Off scale"),
    (Mode::Swing, "swing", "Swings"),
    (Mode::Share, "share", "Share of…"),
    (Mode::NotPossible, "not-possible", "Not possible"),
];

/// The field with its keys.
#[component]
pub fn EntryField(props: &EntryFieldProps) -> Html {
    let mode = entry::mode(&props.reading);
    // What a share is taken of, while there is no share yet to keep it with.
    let of = use_state(|| 0_usize);
    let say = {
        let (id, on_change) = (props.reading.id.clone(), props.on_change.clone());
        Callback::from(move |(typed, seen): Said| {
            on_change.emit(Change::Entry {
                id: id.clone(),
                typed,
                seen,
            });
        })
    };
    html! {
        <div class="entry">
            { match mode {
                Mode::Value => modes::value(props, &say),
                Mode::Swing => modes::swing(props, &say),
                Mode::OffScale => modes::off_scale(props, &say),
                Mode::Share => modes::share(props, &say, &of),
                Mode::NotPossible => modes::not_possible(props, &say),
                Mode::Nothing => html! {
                    <p class="entry-said" id={field_id(&props.reading.id)} tabindex="-1">{ nothing_words(props.reading.port) }</p>
                },
            } }
            { keys(props, mode, &say) }
            if mode == Mode::Value && jug::reads(props.reading.port) {
                <JugPanel
                    reading={props.reading.clone()}
                    short={props.short.clone()}
                    number={props.number}
                    caught={props.caught.clone()}
                    prefs={props.prefs.clone()}
                    on_change={props.on_change.clone()}
                />
            }
        </div>
    }
}

fn nothing_words(port: Port) -> &'static str {
    match port.kind() {
        Kind::Pressure => "Nothing: the needle stays at zero.",
        Kind::Flow => "Nothing: no oil comes.",
        Kind::Current => "Nothing: no current.",
        Kind::RotationalSpeed | Kind::GroundSpeed => "Nothing: it does not turn.",
        _ => "Nothing.",
    }
}

fn keys(props: &EntryFieldProps, mode: Mode, say: &Callback<Said>) -> Html {
    let top = props
        .instrument
        .as_ref()
        .map(|instrument| instrument.span_high);
    let port = props.reading.port;
    let kind = port.kind();
    let fits = |key: Mode| match key {
        Mode::OffScale if port == Port::InletPull => false,
        Mode::OffScale => matches!(kind, Kind::Pressure | Kind::Flow | Kind::Current),
        Mode::Nothing => !matches!(kind, Kind::Temperature | Kind::Time),
        Mode::Share => !matches!(kind, Kind::Temperature),
        _ => true,
    };
    html! {
        <div class="keys" role="group" aria-label={format!("{}: not a plain value", props.name)}>
            { for KEYS.iter().filter(|(key, ..)| fits(*key)).map(|(key, code, words)| {
                let is_on = *key == mode;
                let (say, key, prefs) = (say.clone(), *key, props.prefs.clone());
                let on_click = Callback::from(move |_: MouseEvent| {
                    say.emit(match (key, top) {
                        _ if is_on => entry::opened(Mode::Value),
                        (Mode::OffScale, Some(top)) => entry::off_scale(Entry {
                            typed: prefs.print(top),
                            value: Some(top),
                        }),
                        _ => entry::opened(key),
                    });
                });
                html! {
                    <button
                        key={*code}
                        type="button"
                        class={if is_on { "key is-on" } else { "key" }}
                        aria-pressed={if is_on { "true" } else { "false" }}
                        data-answer={*code}
                        data-testid={format!("{code}-{}", props.number)}
                        onclick={on_click}
                    >
                        { *words }
                    </button>
                }
            }) }
        </div>
    }
}
