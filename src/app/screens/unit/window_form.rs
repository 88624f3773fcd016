//! The fields of a window from the manual.

use yew::{AttrValue, Callback, Html, component, html};

use super::PartProps;
use super::ports::port_options;
use super::window_draft::{Draft, EngineAsk};
use crate::app::parts::{Choice, Entry, Lay, MeasureField, Opt, Select, TextField};
use crate::quantity::{Kind, Measure, Unit as MeasureUnit};
use crate::readings::{Direction, Doing, Port};
use crate::record::limits;
use crate::unit::Unit;

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
pub fn WindowForm(props: &PartProps) -> Html {
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
