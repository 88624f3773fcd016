//! The fields of an instrument.

use yew::{AttrValue, Callback, Html, component, html};

use super::SettingsProps;
use super::draft::{AccuracyAsk, Draft, accuracy_options};
use crate::app::parts::{Choice, Entry, MeasureField, Opt, Select, TextField};
use crate::quantity::{Kind, Measure};
use crate::readings::instrument::{Indication, InstrumentKind, difference_of};
use crate::record::{Settings, limits};

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

/// Words for a sort.
pub fn sort_words(what: InstrumentKind) -> &'static str {
    SORTS
        .iter()
        .find(|(sort, _)| *sort == what)
        .map_or("Instrument", |(_, words)| words)
}

/// The fields of an instrument that is being typed.
#[component]
pub fn InstrumentForm(props: &SettingsProps) -> Html {
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
