//! The instruments of the shop: what a reading is worth depends on them.

use yew::{AttrValue, Callback, Html, MouseEvent, component, html, use_state};

use super::SettingsProps;
use super::draft::{AccuracyAsk, Draft, accuracy_options};
use crate::app::parts::{Choice, Confirm, Entry, MeasureField, Opt, Section, Select, TextField};
use crate::app::platform::ids;
use crate::quantity::{Kind, Measure, UnitPrefs};
use crate::readings::instrument::{
    Indication, Instrument, InstrumentKind, difference_of, usual_instruments,
};
use crate::record::{IdOf, Settings, limits};

/// Every sort, in the order in which the screen offers them, with words.
pub const SORTS: [(InstrumentKind, &str); 13] = [
    (InstrumentKind::PressureGauge, "Pressure gauge"),
    (
        InstrumentKind::PressureTransducer,
        "Pressure transducer or digital gauge",
    ),
    (InstrumentKind::VacuumGauge, "Vacuum or compound gauge"),
    (InstrumentKind::FlowMeter, "Flow meter in the line"),
    (InstrumentKind::Jug, "Jug and stopwatch"),
    (InstrumentKind::Tachometer, "Tachometer"),
    (InstrumentKind::CountedTurns, "Counted turns and stopwatch"),
    (InstrumentKind::Thermometer, "Thermometer that touches"),
    (InstrumentKind::InfraredThermometer, "Infrared thermometer"),
    (
        InstrumentKind::CurrentMeter,
        "Current meter in the coil lead",
    ),
    (InstrumentKind::Stopwatch, "Stopwatch"),
    (InstrumentKind::GroundSpeed, "Ground speed"),
    (InstrumentKind::Tape, "Tape measure"),
];

fn sort_words(what: InstrumentKind) -> &'static str {
    SORTS
        .iter()
        .find(|(sort, _)| *sort == what)
        .map_or("Instrument", |(_, words)| words)
}

/// An instrument in one line.
fn line(instrument: &Instrument, prefs: &UnitPrefs) -> String {
    let step = instrument.resolution.map_or_else(String::new, |step| {
        let what = match instrument.indication {
            Indication::Needle => "division",
            Indication::Digital => "step",
        };
        format!(", {what} {}", plain(step, prefs))
    });
    format!(
        "{}, {} to {}, {}{step}",
        sort_words(instrument.what),
        prefs.edit_text(instrument.span_low),
        plain(instrument.span_high, prefs),
        instrument.accuracy
    )
}

/// The figure as the dial has it, with its unit.
fn plain(measure: Measure, prefs: &UnitPrefs) -> String {
    format!(
        "{} {}",
        prefs.edit_text(measure),
        prefs.unit(measure.kind())
    )
}

/// The list.
#[component]
pub fn Instruments(props: &SettingsProps) -> Html {
    let settings = &props.state.settings;
    let prefs = &settings.units;
    let draft = Draft::of(settings);
    let missing = use_state(|| None::<String>);
    let on_keep = {
        let (missing, draft) = (missing.clone(), draft.clone());
        let change = props.change(|settings: &mut Settings, instrument: Instrument| {
            settings
                .instruments
                .retain(|other| other.id != instrument.id);
            settings.instruments.push(instrument);
            Draft::drop_from(settings);
        });
        Callback::from(move |_: MouseEvent| {
            match draft.instrument(|| ids::fresh(IdOf::Instrument)) {
                Ok(instrument) => {
                    missing.set(None);
                    change.emit(instrument);
                }
                Err(what) => missing.set(Some(what)),
            }
        })
    };
    let on_drop = props.change(|settings: &mut Settings, _: MouseEvent| Draft::drop_from(settings));
    let on_remove = {
        let id = draft.id.clone();
        props.change(move |settings: &mut Settings, ()| {
            settings.instruments.retain(|other| other.id != id);
            Draft::drop_from(settings);
        })
    };
    let usual_missing = usual_instruments()
        .iter()
        .any(|usual| settings.instrument(&usual.id).is_none());
    let on_usual = props.change(|settings: &mut Settings, _: MouseEvent| {
        for usual in usual_instruments() {
            if settings.instrument(&usual.id).is_none() {
                settings.instruments.push(usual);
            }
        }
    });
    html! {
        <Section
            id="instruments"
            title="Instruments of the shop"
            state={settings.instruments.len().to_string()}
            is_open={draft.is_begun()}
        >
            <p class="soft small">
                { "Span and accuracy decide what a reading can tell. The list starts with what most vans carry, common \
                   practice; put yours in its place." }
            </p>
            <ul class="rows">
                { for settings.instruments.iter().map(|instrument| {
                    let (change_id, change_prefs) = (instrument.id.clone(), prefs.clone());
                    let on_change = props.change(move |settings: &mut Settings, _: MouseEvent| {
                        if let Some(instrument) = settings.instrument(&change_id) {
                            Draft::from_instrument(instrument, &change_prefs).keep(settings);
                        }
                    });
                    html! {
                        <li key={instrument.id.clone()} class="line-item" data-testid="instrument">
                            <div>
                                <strong>{ &instrument.name }</strong>
                                <div class="soft small">{ line(instrument, prefs) }</div>
                            </div>
                            <button
                                type="button"
                                class="button is-quiet"
                                onclick={on_change}
                                aria-label={format!("Change {}", instrument.name)}
                                data-testid="change-instrument"
                            >
                                { "Change" }
                            </button>
                        </li>
                    }
                }) }
            </ul>
            if usual_missing {
                <div class="actions">
                    <button type="button" class="button is-quiet" onclick={on_usual} data-testid="usual-instruments">
                        { "Bring the usual ones back" }
                    </button>
                </div>
            }
            <details class="fold" open={draft.is_begun()} data-testid="instrument-add">
                <summary>{ if draft.is_change() { "Change an instrument" } else { "Add an instrument" } }</summary>
                <div class="stack">
                    <DraftForm ..props.clone() />
                    if let Some(what) = &*missing {
                        <p class="field-error" role="alert" data-testid="instrument-missing">{ what }</p>
                    }
                    <div class="actions">
                        <button type="button" class="button is-main" onclick={on_keep} data-testid="instrument-keep">
                            { "Keep this instrument" }
                        </button>
                        if draft.is_begun() {
                            <button type="button" class="button is-quiet" onclick={on_drop}>{ "Drop what was typed" }</button>
                        }
                    </div>
                    if draft.is_change() {
                        <Confirm
                            words="Remove this instrument"
                            question={format!("Remove {}? Readings taken with it keep their figures.", draft.name)}
                            yes="Remove"
                            on_yes={on_remove}
                            testid="remove-instrument"
                        />
                    }
                </div>
            </details>
        </Section>
    }
}

/// The fields of an instrument that is being typed.
#[component]
fn DraftForm(props: &SettingsProps) -> Html {
    let settings = &props.state.settings;
    let prefs = &settings.units;
    let draft = Draft::of(settings);
    let kind = draft.what.map_or(Kind::Pressure, InstrumentKind::measures);
    let mut sorts = vec![Opt::new(None, "Choose…", "none")];
    sorts.extend(
        SORTS
            .iter()
            .enumerate()
            .map(|(at, (sort, words))| Opt::new(Some(*sort), *words, at.to_string())),
    );
    let field = |id: &'static str,
                 label: &'static str,
                 kind: Kind,
                 entry: &Entry,
                 set: fn(&mut Draft, Entry)| {
        let (low, high) = limits::kind_span(kind);
        let range = Measure::from_base(low, kind)
            .ok()
            .zip(Measure::from_base(high, kind).ok());
        html! {
            <MeasureField
                {id}
                {label}
                unit={prefs.unit(kind)}
                mark={prefs.mark()}
                {range}
                typed={AttrValue::from(entry.typed.clone())}
                value={entry.value.filter(|value| value.kind() == kind)}
                on_entry={edit(props, set)}
                testid={id}
            />
        }
    };
    let is_needle = draft.indication == Indication::Needle;
    html! {
        <>
            <TextField
                id="instrument-name"
                label="Name"
                hint="what the shop calls it"
                value={AttrValue::from(draft.name.clone())}
                on_input={edit(props, |draft, name| draft.name = name)}
                maxlength=80
                testid="instrument-name"
            />
            <Select<Option<InstrumentKind>>
                id="instrument-what"
                label="What it is"
                options={sorts}
                value={draft.what}
                on_change={edit(props, |draft, what| draft.what = what)}
                testid="instrument-what"
            />
            <div class="pair">
                { field("instrument-low", "Foot of the scale", kind, &draft.low, |draft, low| draft.low = low) }
                { field("instrument-high", "Top of the scale", kind, &draft.high, |draft, high| draft.high = high) }
            </div>
            <Select<AccuracyAsk>
                id="instrument-accuracy"
                label="Accuracy"
                hint="On the dial or in its papers."
                options={accuracy_options(kind)}
                value={draft.accuracy}
                on_change={edit(props, |draft, accuracy| draft.accuracy = accuracy)}
                testid="instrument-accuracy"
            />
            if draft.accuracy.wants_share() {
                <MeasureField
                    id="instrument-share"
                    label="How many per cent"
                    unit={crate::quantity::Unit::Percent}
                    mark={prefs.mark()}
                    range={Measure::from_base(0.0, Kind::Ratio).ok().zip(Measure::from_base(0.5, Kind::Ratio).ok())}
                    typed={AttrValue::from(draft.share.typed.clone())}
                    value={draft.share.value}
                    on_entry={edit(props, |draft, share| draft.share = share)}
                    testid="instrument-share"
                />
            }
            if draft.accuracy == AccuracyAsk::Fixed {
                { field("instrument-limit", "Limit of error, plus or minus", difference_of(kind), &draft.limit,
                    |draft, limit| draft.limit = limit) }
            }
            <Choice<Indication>
                name="instrument-indication"
                label="Shows"
                options={vec![
                    Opt::new(Indication::Needle, "A needle", "needle"),
                    Opt::new(Indication::Digital, "Digits", "digital"),
                ]}
                value={draft.indication}
                on_change={edit(props, |draft, indication| draft.indication = indication)}
            />
            { field(
                "instrument-step",
                if is_needle { "One division" } else { "One step of the last digit" },
                difference_of(kind),
                &draft.step,
                |draft, step| draft.step = step,
            ) }
            <p class="soft small">{ "Where it is left empty, a fiftieth of the span is taken." }</p>
        </>
    }
}

/// A callback that changes the draft and keeps it with the settings.
fn edit<T: 'static>(props: &SettingsProps, set: fn(&mut Draft, T)) -> Callback<T> {
    props.change(move |settings: &mut Settings, value: T| {
        let mut draft = Draft::of(settings);
        set(&mut draft, value);
        draft.keep(settings);
    })
}
