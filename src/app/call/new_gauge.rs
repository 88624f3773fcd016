//! An instrument that is not on the shop's list yet: a name and the top of its scale are enough to go on with.

use crate::app::parts::{Entry, MeasureField, Opt, Select, TextField};
use crate::app::platform::ids;
use crate::quantity::{Kind, Measure, UnitPrefs};
use crate::readings::Port;
use crate::readings::instrument::{Accuracy, En837Class, Indication, Instrument, InstrumentKind};
use crate::record::IdOf;
use yew::{AttrValue, Callback, Html, MouseEvent, Properties, component, html, use_state};

/// Properties of [`NewGauge`].
#[derive(Clone, PartialEq, Properties)]
pub struct NewGaugeProps {
    /// Port it goes on.
    pub port: Port,
    /// Start of ids; unique on the page.
    pub name: AttrValue,
    /// Units.
    pub prefs: UnitPrefs,
    /// The instrument; none where it was given up.
    pub on_made: Callback<Option<Instrument>>,
}

/// The sort of instrument that is usual at a port.
fn usual(port: Port) -> InstrumentKind {
    match port.kind() {
        Kind::Flow => InstrumentKind::FlowMeter,
        Kind::RotationalSpeed => InstrumentKind::Tachometer,
        Kind::Temperature => InstrumentKind::Thermometer,
        Kind::Current => InstrumentKind::CurrentMeter,
        Kind::Time => InstrumentKind::Stopwatch,
        Kind::GroundSpeed => InstrumentKind::GroundSpeed,
        _ if port == Port::InletPull => InstrumentKind::VacuumGauge,
        _ => InstrumentKind::PressureGauge,
    }
}

/// The form.
#[component]
pub fn NewGauge(props: &NewGaugeProps) -> Html {
    let name = use_state(String::new);
    let end = use_state(Entry::default);
    let class = use_state(|| None::<En837Class>);
    let what = usual(props.port);
    let kind = what.measures();
    let is_vacuum = what == InstrumentKind::VacuumGauge;
    let has_class = kind == Kind::Pressure;
    let limits = if is_vacuum {
        (-1.1, -0.1)
    } else {
        (0.1, 20_000.0)
    };
    let limit = |base| Measure::from_base(base, kind).ok();
    let made = {
        let zero = limit(0.0);
        let (low, high) = if is_vacuum {
            (end.value, zero)
        } else {
            (zero, end.value)
        };
        low.zip(high).map(|(span_low, span_high)| Instrument {
            id: ids::fresh(IdOf::Instrument),
            name: match name.trim() {
                "" => format!(
                    "{} {}",
                    sort(what),
                    props.prefs.print_span(span_low, span_high)
                ),
                given => given.to_owned(),
            },
            what,
            span_low,
            span_high,
            accuracy: class.map_or(Accuracy::NotKnown, |class| Accuracy::En837 { class }),
            indication: if has_class {
                Indication::Needle
            } else {
                Indication::Digital
            },
            resolution: None,
        })
    };
    let ready = made.as_ref().is_some_and(|made| made.check().is_ok());
    let on_add = {
        let on_made = props.on_made.clone();
        Callback::from(move |_: MouseEvent| {
            if let Some(made) = made.clone().filter(|made| made.check().is_ok()) {
                on_made.emit(Some(made));
            }
        })
    };
    let on_drop = props.on_made.reform(|_: MouseEvent| None);
    let (set_name, set_end, set_class) = (name.clone(), end.clone(), class.clone());
    let mut classes = vec![Opt::new(None, "not known", "none")];
    classes.extend(En837Class::ALL.map(|class| {
        let words = format!("{}", class.percent_of_span());
        Opt::new(Some(class), words.clone(), words)
    }));
    html! {
        <div class="new-gauge stack" role="group" aria-label="New instrument">
            <div class="entry-pair">
                <MeasureField
                    id={format!("{}-end", props.name)}
                    label={if is_vacuum { "Scale goes down to" } else { "Scale ends at" }}
                    unit={props.prefs.unit(kind)}
                    typed={end.typed.clone()}
                    value={end.value}
                    range={limit(limits.0).zip(limit(limits.1))}
                    mark={props.prefs.mark()}
                    on_entry={Callback::from(move |entry| set_end.set(entry))}
                    testid={format!("{}-end", props.name)}
                />
                if has_class {
                    <Select<Option<En837Class>>
                        id={format!("{}-class", props.name)}
                        label="Class on the dial"
                        options={classes}
                        value={Some(*class)}
                        on_change={Callback::from(move |class| set_class.set(class))}
                    />
                }
            </div>
            <TextField
                id={format!("{}-name", props.name)}
                label="Name (if you like)"
                value={(*name).clone()}
                on_input={Callback::from(move |text| set_name.set(text))}
                maxlength={80}
            />
            <div class="actions">
                <button type="button" class="button is-main" disabled={!ready} onclick={on_add} data-testid={format!("{}-add", props.name)}>
                    { "Put it on the list" }
                </button>
                <button type="button" class="button is-quiet" onclick={on_drop}>{ "Cancel" }</button>
            </div>
        </div>
    }
}

fn sort(what: InstrumentKind) -> &'static str {
    match what {
        InstrumentKind::PressureGauge | InstrumentKind::PressureTransducer => "Gauge",
        InstrumentKind::VacuumGauge => "Vacuum gauge",
        InstrumentKind::FlowMeter => "Flow meter",
        InstrumentKind::Jug => "Jug",
        InstrumentKind::Tachometer => "Tachometer",
        InstrumentKind::CountedTurns => "Counted turns",
        InstrumentKind::Thermometer => "Thermometer",
        InstrumentKind::InfraredThermometer => "Infrared thermometer",
        InstrumentKind::CurrentMeter => "Current meter",
        InstrumentKind::Stopwatch => "Stopwatch",
        InstrumentKind::Tape => "Tape",
        InstrumentKind::GroundSpeed => "Speed display",
    }
}
