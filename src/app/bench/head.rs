//! Identity, oil, rated state, instruments.

use super::codes;
use super::screen::Edit;
use crate::app::parts::{Choice, Entry, MeasureField, Opt, Section, Select, TextField};
use crate::bench::stand::channel::MeasuringClass;
use crate::bench::stand::sheet::{Head, Meter, Of, TextId};
use crate::bench::stand::{BenchSheet, Channel, Subject};
use crate::quantity::Typed;
use crate::quantity::{Decimals, Measure, Unit, UnitPrefs, format_with_unit};
use crate::readings::Path;
use crate::unit::{FigureId, Unit as Machine};
use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html};

/// Properties of [`HeadForm`].
#[derive(Clone, PartialEq, Properties)]
pub struct HeadFormProps {
    /// The sheet.
    pub sheet: Rc<BenchSheet>,
    /// The unit.
    pub unit: Rc<Machine>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

/// Keeps what was typed, or nothing where the field is empty.
pub fn keep<K: Ord>(map: &mut std::collections::BTreeMap<K, Typed>, key: K, typed: Entry) {
    if typed.is_blank() {
        map.remove(&key);
    } else {
        map.insert(key, typed);
    }
}

/// What the profile says, where the sheet is silent.
fn stands_in(props: &HeadFormProps, head: Head) -> String {
    let id = match (head, props.sheet.subject) {
        (Head::Displacement, Subject::Motor) => FigureId::MotorDisplacement,
        (Head::Displacement, _) => FigureId::PumpDisplacement,
        (Head::ChargeDisplacement, _) => FigureId::ChargeDisplacement,
        (Head::Index, _) => return "Empty: 100, a mineral oil (common practice)".to_owned(),
        (Head::Stroke, _) => return "Empty: full stroke".to_owned(),
        (Head::HeatLost, _) => return "Empty: none".to_owned(),
        _ => return String::new(),
    };
    props
        .unit
        .figures
        .get(&id)
        .and_then(|figure| figure.value)
        .map_or(String::new(), |value| {
            let unit = codes::shown(&props.prefs, head.asks().0);
            let text = format_with_unit(value, unit, Decimals::Reading, props.prefs.mark());
            format!("Empty: {text} from the profile")
        })
}

fn figure(props: &HeadFormProps, head: Head) -> Html {
    let (base, low, high) = head.asks();
    let typed = props.sheet.head.get(&head).cloned().unwrap_or_default();
    let code = codes::head(head);
    let on_entry = props.on_edit.reform(move |entry: Entry| -> Edit {
        Box::new(move |sheet| keep(&mut sheet.head, head, entry))
    });
    html! {
        <MeasureField
            key={code}
            id={format!("bench-{code}")}
            label={head.words()}
            unit={codes::shown(&props.prefs, base)}
            typed={typed.typed}
            value={typed.value}
            range={Some((Measure::literal(low, base), Measure::literal(high, base)))}
            mark={props.prefs.mark()}
            stands_in={stands_in(props, head)}
            {on_entry}
            testid={format!("bench-{code}")}
        />
    }
}

/// The fields.
#[component]
pub fn HeadForm(props: &HeadFormProps) -> Html {
    let sheet = &props.sheet;
    let heads = Head::ALL.into_iter().filter(|head| match head {
        Head::ChargeDisplacement => sheet.subject != Subject::Motor,
        Head::Displacement | Head::Stroke => sheet.subject != Subject::Transmission,
        _ => true,
    });
    let texts = TextId::ALL.into_iter().map(|id| {
        let code = codes::text(id);
        let on_input = props.on_edit.reform(move |text: String| -> Edit {
            Box::new(move |sheet| {
                if text.is_empty() {
                    sheet.texts.remove(&id);
                } else {
                    sheet.texts.insert(id, text);
                }
            })
        });
        html! {
            <TextField
                key={code}
                id={format!("bench-{code}")}
                label={id.words()}
                value={sheet.texts.get(&id).cloned().unwrap_or_default()}
                lines={matches!(id, TextId::Customer | TextId::Note)}
                {on_input}
                testid={format!("bench-{code}")}
            />
        }
    });
    let on_measured = props.on_edit.reform(|is_measured: bool| -> Edit {
        Box::new(move |sheet| sheet.is_viscosity_measured = is_measured)
    });
    let measured = vec![
        Opt::new(false, "Off the drum", "drum"),
        Opt::new(true, "Measured", "measured"),
    ];
    let on_path = props
        .on_edit
        .reform(|path: Option<Path>| -> Edit { Box::new(move |sheet| sheet.path = path) });
    let paths = vec![
        Opt::new(None, "Not said", "none"),
        Opt::new(Some(Path::Left), "Left", "left"),
        Opt::new(Some(Path::Right), "Right", "right"),
    ];
    html! {
        <Section
            id="bench-head"
            title="Identity, oil, instruments"
            state={sheet.texts.get(&TextId::Serial).cloned().unwrap_or_else(|| "no serial number".to_owned())}
        >
            if !props.unit.ticks.paths.is_one() {
                <Choice<Option<Path>> name="bench-path" label="Of which side" options={paths} value={Some(sheet.path)} on_change={on_path} />
            }
            <div class="bench-fields">{ for heads.map(|head| figure(props, head)) }</div>
            <Choice<bool>
                name="bench-viscosity-from"
                label="The viscosity is"
                options={measured}
                value={Some(sheet.is_viscosity_measured)}
                on_change={on_measured}
            />
            <div class="bench-fields">{ for texts }</div>
            { instruments(props) }
        </Section>
    }
}

fn instruments(props: &HeadFormProps) -> Html {
    let sheet = &props.sheet;
    let classes = MeasuringClass::ALL
        .map(|class| {
            let (words, code) = match class {
                MeasuringClass::A => ("A: laboratory", "a"),
                MeasuringClass::B => ("B: good stand", "b"),
                MeasuringClass::C => ("C: workshop", "c"),
            };
            Opt::new(class, words, code)
        })
        .to_vec();
    let on_class = props
        .on_edit
        .reform(|class: MeasuringClass| -> Edit { Box::new(move |sheet| sheet.class = class) });
    let own = sheet
        .table_columns()
        .into_iter()
        .map(|channel| instrument(props, channel));
    html! { <>
        <Choice<MeasuringClass>
            name="bench-class"
            label="Measuring class of the stand (limits after ISO 4409, from memory)"
            options={classes}
            value={Some(sheet.class)}
            on_change={on_class}
        />
        <details class="advice" data-testid="bench-meters">
            <summary>{ "Instruments with their own limits and calibration dates" }</summary>
            <div class="stack">{ for own }</div>
        </details>
    </> }
}

fn instrument(props: &HeadFormProps, channel: Channel) -> Html {
    let sheet = &props.sheet;
    let meter = sheet.meters.get(&channel).cloned().unwrap_or_default();
    let code = codes::channel(channel);
    let label = channel.words(sheet.subject);
    let edit = move |change: fn(&mut Meter, Entry)| {
        props.on_edit.reform(move |entry: Entry| -> Edit {
            Box::new(move |sheet| change(sheet.meters.entry(channel).or_default(), entry))
        })
    };
    let text = move |change: fn(&mut Meter, String)| {
        props.on_edit.reform(move |text: String| -> Edit {
            Box::new(move |sheet| change(sheet.meters.entry(channel).or_default(), text))
        })
    };
    let on_of = props.on_edit.reform(move |of: Of| -> Edit {
        Box::new(move |sheet| sheet.meters.entry(channel).or_default().of = of)
    });
    let (unit, _, high) = channel.asks();
    let percent = Measure::literal(0.0, Unit::Percent)..=Measure::literal(20.0, Unit::Percent);
    html! {
        <fieldset class="bench-meter" key={code}>
            <legend>{ label }</legend>
            <div class="bench-fields">
                <Select<Of>
                    id={format!("bench-meter-{code}-of")}
                    label="Limit of error"
                    options={vec![
                        Opt::new(Of::Class, "By the class of the stand", "class"),
                        Opt::new(Of::Reading, "Per cent of the reading", "reading"),
                        Opt::new(Of::Span, "Per cent of the span", "span"),
                    ]}
                    value={Some(meter.of)}
                    on_change={on_of}
                />
                if meter.of != Of::Class {
                    <MeasureField
                        id={format!("bench-meter-{code}-limit")}
                        label="±"
                        unit={Unit::Percent}
                        typed={meter.limit.typed.clone()}
                        value={meter.limit.value}
                        range={Some(percent.into_inner())}
                        mark={props.prefs.mark()}
                        on_entry={edit(|meter, entry| meter.limit = entry)}
                    />
                }
                if meter.of == Of::Span {
                    <MeasureField
                        id={format!("bench-meter-{code}-span")}
                        label="Span"
                        unit={codes::shown(&props.prefs, unit)}
                        typed={meter.span.typed.clone()}
                        value={meter.span.value}
                        range={Some((Measure::literal(0.001, unit), Measure::literal(10.0 * high, unit)))}
                        mark={props.prefs.mark()}
                        on_entry={edit(|meter, entry| meter.span = entry)}
                    />
                }
                <TextField id={format!("bench-meter-{code}-mark")} label="Mark or number" value={meter.mark.clone()} on_input={text(|meter, text| meter.mark = text)} />
                <TextField id={format!("bench-meter-{code}-date")} label="Calibrated on" value={meter.calibrated.clone()} on_input={text(|meter, text| meter.calibrated = text)} />
            </div>
        </fieldset>
    }
}
