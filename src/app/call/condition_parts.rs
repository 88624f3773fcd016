//! The parts of a condition that are typed: lever, engine speed, oil temperature. Each keeps its text while the form is open.

use super::condition_editor::ConditionEditorProps;
use crate::app::parts::{Choice, Entry, MeasureField, Opt, Select};
use crate::quantity::{Kind, Measure};
use crate::readings::{Condition, EngineSpeed, Lever, OilTemperature, Place};
use std::collections::BTreeMap;
use yew::{Callback, Html, UseStateHandle, html};

/// How the engine speed is given.
#[derive(Clone, Copy, PartialEq)]
enum Speed {
    Low,
    High,
    Read,
}

/// How the lever is given.
#[derive(Clone, Copy, PartialEq)]
enum Travel {
    Full,
    Half,
    Feathered,
    Share,
}

/// Texts of the fields, kept as typed while the form is open.
#[derive(Clone, Default, PartialEq)]
pub struct Typed {
    engine: Option<String>,
    share: Option<String>,
    oil: Option<String>,
    /// Tachometer chosen, nothing readable typed yet.
    asks_speed: bool,
    /// Share chosen, nothing readable typed yet.
    asks_share: bool,
    place: Option<Place>,
}

/// Names of the fields under which a text is kept in the record.
pub const FIELDS: [(&str, &str); 3] = [
    (SPEED, "engine speed"),
    (SHARE, "lever"),
    (OIL, "oil temperature"),
];
const SPEED: &str = "engine";
const SHARE: &str = "lever";
const OIL: &str = "oil";

impl Typed {
    /// The texts that are kept because they are no figures yet.
    pub fn kept(texts: &BTreeMap<String, String>) -> Typed {
        let text = |field: &str| texts.get(field).cloned();
        Typed {
            engine: text(SPEED),
            share: text(SHARE),
            oil: text(OIL),
            asks_speed: texts.contains_key(SPEED),
            asks_share: texts.contains_key(SHARE),
            place: None,
        }
    }
}

/// Lever travel.
pub fn lever(props: &ConditionEditorProps, typed: &UseStateHandle<Typed>) -> Html {
    let now = props.condition;
    let travel = match now.lever {
        _ if typed.asks_share => Travel::Share,
        Lever::Full => Travel::Full,
        Lever::Half => Travel::Half,
        Lever::Feathered => Travel::Feathered,
        Lever::Share(_) => Travel::Share,
    };
    let on_travel = {
        let (typed, on_change) = (typed.clone(), props.on_change.clone());
        let own = props.clone();
        Callback::from(move |travel: Travel| {
            if travel != Travel::Share {
                own.keep(SHARE, &Entry::default());
            }
            typed.set(Typed {
                share: typed.share.clone().filter(|_| travel == Travel::Share),
                asks_share: travel == Travel::Share,
                ..(*typed).clone()
            });
            let lever = match travel {
                Travel::Full => Lever::Full,
                Travel::Half => Lever::Half,
                Travel::Feathered => Lever::Feathered,
                Travel::Share => return,
            };
            on_change.emit(Condition { lever, ..now });
        })
    };
    let held = match now.lever {
        Lever::Share(share) => Measure::from_base(share, Kind::Ratio).ok(),
        _ => None,
    };
    let unit = props.prefs.unit(Kind::Ratio);
    let text = typed.share.clone().unwrap_or_else(|| {
        held.map(|held| props.prefs.edit_text(held))
            .unwrap_or_default()
    });
    let on_share = {
        let (typed, on_change) = (typed.clone(), props.on_change.clone());
        let own = props.clone();
        Callback::from(move |entry: Entry| {
            own.keep(SHARE, &entry);
            typed.set(Typed {
                share: Some(entry.typed),
                asks_share: true,
                ..(*typed).clone()
            });
            if let Some(share) = entry.value {
                on_change.emit(Condition {
                    lever: Lever::Share(share.base()),
                    ..now
                });
            }
        })
    };
    html! { <>
        <Choice<Travel>
            name={format!("{}-lever", props.name)}
            label="Lever or pedal"
            options={vec![
                Opt::new(Travel::Full, "Full", "full"),
                Opt::new(Travel::Half, "About half", "half"),
                Opt::new(Travel::Feathered, "Feathered", "feathered"),
                Opt::new(Travel::Share, "Per cent", "share"),
            ]}
            value={Some(travel)}
            on_change={on_travel}
        />
        if travel == Travel::Share {
            <MeasureField
                id={format!("{}-share", props.name)}
                label="Share of full travel"
                {unit}
                typed={text}
                value={held}
                range={Measure::from_base(0.01, Kind::Ratio).ok().zip(Measure::from_base(1.0, Kind::Ratio).ok())}
                mark={props.prefs.mark()}
                on_entry={on_share}
                testid={format!("{}-share", props.name)}
            />
        }
    </> }
}

/// Engine speed.
pub fn engine(props: &ConditionEditorProps, typed: &UseStateHandle<Typed>) -> Html {
    let now = props.condition;
    let speed = match now.engine {
        _ if typed.asks_speed => Speed::Read,
        EngineSpeed::LowIdle => Speed::Low,
        EngineSpeed::HighIdle => Speed::High,
        EngineSpeed::Measured(_) => Speed::Read,
    };
    let on_speed = {
        let (typed, on_change) = (typed.clone(), props.on_change.clone());
        let own = props.clone();
        Callback::from(move |speed: Speed| {
            if speed != Speed::Read {
                own.keep(SPEED, &Entry::default());
            }
            typed.set(Typed {
                engine: typed.engine.clone().filter(|_| speed == Speed::Read),
                asks_speed: speed == Speed::Read,
                ..(*typed).clone()
            });
            let engine = match speed {
                Speed::Low => EngineSpeed::LowIdle,
                Speed::High => EngineSpeed::HighIdle,
                Speed::Read => return,
            };
            on_change.emit(Condition { engine, ..now });
        })
    };
    let held = match now.engine {
        EngineSpeed::Measured(speed) => Some(speed),
        _ => None,
    };
    let text = typed.engine.clone().unwrap_or_else(|| {
        held.map(|held| props.prefs.edit_text(held))
            .unwrap_or_default()
    });
    let on_entry = {
        let (typed, on_change) = (typed.clone(), props.on_change.clone());
        let own = props.clone();
        Callback::from(move |entry: Entry| {
            own.keep(SPEED, &entry);
            typed.set(Typed {
                engine: Some(entry.typed),
                asks_speed: true,
                ..(*typed).clone()
            });
            if let Some(speed) = entry.value {
                on_change.emit(Condition {
                    engine: EngineSpeed::Measured(speed),
                    ..now
                });
            }
        })
    };
    let limit = |rpm| Measure::from_base(rpm, Kind::RotationalSpeed).ok();
    html! { <>
        <Choice<Speed>
            name={format!("{}-engine", props.name)}
            label="Engine"
            options={vec![
                Opt::new(Speed::Low, "Low idle", "low"),
                Opt::new(Speed::High, "High idle", "high"),
                Opt::new(Speed::Read, "Read off", "read"),
            ]}
            value={Some(speed)}
            on_change={on_speed}
        />
        if speed == Speed::Read {
            <MeasureField
                id={format!("{}-speed", props.name)}
                label="Engine speed at the reading"
                unit={props.prefs.unit(Kind::RotationalSpeed)}
                typed={text}
                value={held}
                range={limit(200.0).zip(limit(6000.0))}
                mark={props.prefs.mark()}
                on_entry={on_entry}
                testid={format!("{}-speed", props.name)}
            />
        }
    </> }
}

/// Oil temperature and its place.
pub fn oil(props: &ConditionEditorProps, typed: &UseStateHandle<Typed>) -> Html {
    let now = props.condition;
    let place = now
        .oil
        .map(|oil| oil.place)
        .or(typed.place)
        .unwrap_or_default();
    let text = typed.oil.clone().unwrap_or_else(|| {
        now.oil
            .map(|oil| props.prefs.edit_text(oil.value))
            .unwrap_or_default()
    });
    let on_entry = {
        let (typed, on_change) = (typed.clone(), props.on_change.clone());
        let own = props.clone();
        Callback::from(move |entry: Entry| {
            own.keep(OIL, &entry);
            typed.set(Typed {
                oil: Some(entry.typed),
                place: Some(place),
                ..(*typed).clone()
            });
            on_change.emit(Condition {
                oil: entry.value.map(|value| OilTemperature { value, place }),
                ..now
            });
        })
    };
    let on_place = {
        let (typed, on_change) = (typed.clone(), props.on_change.clone());
        Callback::from(move |place: Place| {
            typed.set(Typed {
                place: Some(place),
                ..(*typed).clone()
            });
            if let Some(oil) = now.oil {
                on_change.emit(Condition {
                    oil: Some(OilTemperature { place, ..oil }),
                    ..now
                });
            }
        })
    };
    let places = Place::ALL
        .into_iter()
        .map(|place| Opt::new(place, place.words(), format!("{place:?}")))
        .collect::<Vec<_>>();
    let limit = |celsius| Measure::from_base(celsius, Kind::Temperature).ok();
    html! {
        <div class="entry-pair">
            <MeasureField
                id={format!("{}-oil", props.name)}
                label="Oil temperature"
                unit={props.prefs.unit(Kind::Temperature)}
                typed={text}
                value={now.oil.map(|oil| oil.value)}
                range={limit(-40.0).zip(limit(140.0))}
                mark={props.prefs.mark()}
                on_entry={on_entry}
                stands_in="Not taken: warm is assumed, with a wide spread."
                testid={format!("{}-oil", props.name)}
            />
            <Select<Place>
                id={format!("{}-place", props.name)}
                label="Taken at"
                options={places}
                value={Some(place)}
                on_change={on_place}
                testid={format!("{}-place", props.name)}
            />
        </div>
    }
}
