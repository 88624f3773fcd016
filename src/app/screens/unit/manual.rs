//! Windows from the unit's own manual: used as given, before anything computed.

use serde::{Deserialize, Serialize};
use yew::{AttrValue, Callback, Html, MouseEvent, component, html, use_state};

use super::PartProps;
use super::ports::port_options;
use crate::app::parts::{Choice, Entry, Lay, MeasureField, Opt, Section, Select, TextField};
use crate::quantity::{Kind, Measure, Unit as MeasureUnit, UnitPrefs};
use crate::readings::{Condition, Direction, Doing, EngineSpeed, Port};
use crate::record::limits;
use crate::unit::{ManualWindow, Unit};

/// Under this name a window that is not complete yet is kept with the unit.
const DRAFT: &str = "draft_window";

/// Which engine speed, before its figure.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
enum EngineAsk {
    LowIdle,
    #[default]
    HighIdle,
    Measured,
}

/// A window while it is typed.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
struct Draft {
    port: Option<Port>,
    doing: Option<Doing>,
    direction: Direction,
    engine: EngineAsk,
    rpm: Entry,
    low: Entry,
    high: Entry,
    reference: String,
}

impl Draft {
    fn of(unit: &Unit) -> Draft {
        unit.extra
            .get(DRAFT)
            .and_then(|value| serde_json::from_value(value.clone()).ok())
            .unwrap_or_default()
    }

    fn keep(self, unit: &mut Unit) {
        match serde_json::to_value(&self) {
            Ok(value) if self != Draft::default() => unit.extra.insert(DRAFT.to_owned(), value),
            _ => unit.extra.remove(DRAFT),
        };
    }

    fn from_window(window: &ManualWindow, prefs: &UnitPrefs) -> Draft {
        let entry = |measure: Measure| Entry {
            typed: prefs.edit_text(measure),
            value: Some(measure),
        };
        let (engine, rpm) = match window.condition.engine {
            EngineSpeed::LowIdle => (EngineAsk::LowIdle, Entry::default()),
            EngineSpeed::HighIdle => (EngineAsk::HighIdle, Entry::default()),
            EngineSpeed::Measured(speed) => (EngineAsk::Measured, entry(speed)),
        };
        Draft {
            port: Some(window.port),
            doing: Some(window.condition.doing),
            direction: window.condition.direction,
            engine,
            rpm,
            low: entry(window.low),
            high: entry(window.high),
            reference: window.reference.clone(),
        }
    }

    /// The window, or what is missing.
    fn window(&self) -> Result<ManualWindow, &'static str> {
        let port = self.port.ok_or("Choose the port.")?;
        let doing = self.doing.ok_or("Choose what the machine is doing.")?;
        let engine = match (self.engine, self.rpm.value) {
            (EngineAsk::LowIdle, _) => EngineSpeed::LowIdle,
            (EngineAsk::HighIdle, _) => EngineSpeed::HighIdle,
            (EngineAsk::Measured, Some(speed)) => EngineSpeed::Measured(speed),
            (EngineAsk::Measured, None) => return Err("Type the engine speed of the window."),
        };
        let low = self.low.value.ok_or("Type the lowest value.")?;
        let high = self.high.value.ok_or("Type the highest value.")?;
        if low.kind() != port.kind() || high.kind() != port.kind() {
            return Err("Type lowest and highest again: they were typed for another port.");
        }
        if low.base() > high.base() {
            return Err("The lowest value is above the highest.");
        }
        Ok(ManualWindow {
            port,
            condition: Condition {
                doing,
                direction: self.direction,
                engine,
                ..Condition::start()
            },
            low,
            high,
            reference: self.reference.trim().to_owned(),
        })
    }
}

/// A window in one line.
fn line(window: &ManualWindow, prefs: &UnitPrefs) -> String {
    let condition = &window.condition;
    let direction = match condition.direction {
        _ if condition.doing.is_neutral() => "",
        Direction::Forward => ", forward",
        Direction::Reverse => ", reverse",
    };
    let engine = match condition.engine {
        EngineSpeed::LowIdle => "low idle".to_owned(),
        EngineSpeed::HighIdle => "high idle".to_owned(),
        EngineSpeed::Measured(speed) => prefs.print(speed),
    };
    format!("{}{direction}, {engine}", condition.doing.words())
}

/// The windows.
#[component]
pub fn Manual(props: &PartProps) -> Html {
    let missing = use_state(|| None::<&'static str>);
    let (unit, prefs) = (&props.unit, &props.prefs);
    let draft = Draft::of(unit);
    let on_add = {
        let (missing, unit, on_unit) = (missing.clone(), unit.clone(), props.on_unit.clone());
        let draft = draft.clone();
        Callback::from(move |_: MouseEvent| match draft.window() {
            Ok(window) => {
                let mut next = (*unit).clone();
                next.manual.push(window);
                Draft::default().keep(&mut next);
                on_unit.emit(next);
                missing.set(None);
            }
            Err(what) => missing.set(Some(what)),
        })
    };
    let take_out = |at: usize, to_change: bool| {
        let prefs = prefs.clone();
        props.change(move |unit: &mut Unit, _: MouseEvent| {
            if at < unit.manual.len() {
                let window = unit.manual.remove(at);
                if to_change {
                    Draft::from_window(&window, &prefs).keep(unit);
                }
            }
        })
    };
    html! {
        <Section id="manual" title="Windows from the manual" state={format!("{} given", unit.manual.len())}>
            <p class="soft small">{ "Where the unit’s manual gives one, it goes before anything computed." }</p>
            if !unit.manual.is_empty() {
                <ul class="rows">
                    { for unit.manual.iter().enumerate().map(|(at, window)| html! {
                        <li key={at} class="line-item" data-testid="manual-window">
                            <div>
                                <strong>{ window.port.words() }</strong>
                                { ", " }
                                <span class="figure">{ prefs.print_span(window.low, window.high) }</span>
                                <div class="soft small">
                                    { line(window, prefs) }
                                    if !window.reference.is_empty() { { format!(" ({})", window.reference) } }
                                </div>
                            </div>
                            <div class="actions">
                                <button type="button" class="button is-quiet" onclick={take_out(at, true)}>{ "Change" }</button>
                                <button type="button" class="button is-quiet" onclick={take_out(at, false)}>{ "Remove" }</button>
                            </div>
                        </li>
                    }) }
                </ul>
            }
            <details class="fold" open={draft != Draft::default()} data-testid="manual-add">
                <summary>{ "Add a window" }</summary>
                <div class="stack">
                    <DraftForm ..props.clone() />
                    if let Some(what) = *missing {
                        <p class="field-error" role="alert" data-testid="manual-missing">{ what }</p>
                    }
                    <div class="actions">
                        <button type="button" class="button is-main" onclick={on_add} data-testid="manual-keep">
                            { "Keep this window" }
                        </button>
                    </div>
                </div>
            </details>
        </Section>
    }
}

fn doing_options() -> Vec<Opt<Option<Doing>>> {
    let mut options = vec![Opt::new(None, "Choose…", "none")];
    options.extend(
        Doing::ALL
            .iter()
            .enumerate()
            .map(|(at, doing)| Opt::new(Some(*doing), doing.words(), at.to_string())),
    );
    options
}

/// The fields of a window that is being typed.
#[component]
fn DraftForm(props: &PartProps) -> Html {
    let draft = Draft::of(&props.unit);
    let mut ports = vec![Opt::new(None, "Choose…", "none")];
    ports.extend(
        port_options(Port::ALL.into_iter())
            .into_iter()
            .map(|option| Opt::new(Some(option.value), option.words, option.code)),
    );
    let kind = draft.port.map_or(Kind::Pressure, Port::kind);
    let measure_unit = props.prefs.unit(kind);
    let range = draft
        .port
        .map(limits::reading_span)
        .and_then(|(low, high)| {
            Measure::from_base(low, kind)
                .ok()
                .zip(Measure::from_base(high, kind).ok())
        });
    let speed_range = Measure::new(300.0, MeasureUnit::RevolutionPerMinute)
        .ok()
        .zip(Measure::new(6000.0, MeasureUnit::RevolutionPerMinute).ok());
    let end = |id: &'static str, label: &'static str, entry: &Entry, set: fn(&mut Draft, Entry)| {
        html! {
            <MeasureField
                {id}
                {label}
                unit={measure_unit}
                mark={props.prefs.mark()}
                {range}
                typed={AttrValue::from(entry.typed.clone())}
                value={entry.value.filter(|value| value.kind() == kind)}
                on_entry={edit(props, set)}
                testid={id}
            />
        }
    };
    html! {
        <>
            <Select<Option<Port>>
                id="manual-port"
                label="Port"
                options={ports}
                value={draft.port}
                on_change={edit(props, |draft, port| draft.port = port)}
                testid="manual-port"
            />
            <Select<Option<Doing>>
                id="manual-doing"
                label="Machine is doing"
                options={doing_options()}
                value={draft.doing}
                on_change={edit(props, |draft, doing| draft.doing = doing)}
                testid="manual-doing"
            />
            if draft.doing.is_some_and(|doing| !doing.is_neutral()) {
                <Choice<Direction>
                    name="manual-direction"
                    label="Direction"
                    options={vec![
                        Opt::new(Direction::Forward, "Forward", "forward"),
                        Opt::new(Direction::Reverse, "Reverse", "reverse"),
                    ]}
                    value={draft.direction}
                    on_change={edit(props, |draft, direction| draft.direction = direction)}
                />
            }
            <Choice<EngineAsk>
                name="manual-engine"
                label="Engine speed"
                options={vec![
                    Opt::new(EngineAsk::LowIdle, "Low idle", "low"),
                    Opt::new(EngineAsk::HighIdle, "High idle", "high"),
                    Opt::new(EngineAsk::Measured, "Given", "given"),
                ]}
                value={draft.engine}
                on_change={edit(props, |draft, engine| draft.engine = engine)}
                lay={Lay::Row}
            />
            if draft.engine == EngineAsk::Measured {
                <MeasureField
                    id="manual-rpm"
                    label="Engine speed given"
                    unit={props.prefs.unit(Kind::RotationalSpeed)}
                    mark={props.prefs.mark()}
                    range={speed_range}
                    typed={AttrValue::from(draft.rpm.typed.clone())}
                    value={draft.rpm.value}
                    on_entry={edit(props, |draft, rpm| draft.rpm = rpm)}
                    testid="manual-rpm"
                />
            }
            <div class="pair">
                { end("manual-low", "Lowest", &draft.low, |draft, low| draft.low = low) }
                { end("manual-high", "Highest", &draft.high, |draft, high| draft.high = high) }
            </div>
            <TextField
                id="manual-reference"
                label="Page or table"
                value={AttrValue::from(draft.reference.clone())}
                on_input={edit(props, |draft, reference| draft.reference = reference)}
                maxlength=400
                testid="manual-reference"
            />
        </>
    }
}

/// A callback that changes the draft and keeps it with the unit.
fn edit<T: 'static>(props: &PartProps, set: fn(&mut Draft, T)) -> Callback<T> {
    props.change(move |unit: &mut Unit, value: T| {
        let mut draft = Draft::of(unit);
        set(&mut draft, value);
        draft.keep(unit);
    })
}
