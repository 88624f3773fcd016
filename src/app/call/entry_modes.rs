//! The fields of each kind of answer: a steady value, swings, off the scale, a share of another reading, not possible.

use super::entry::{self, Said};
use super::entry_field::{EntryFieldProps, field_id};
use super::{group, last_time, words};
use crate::app::parts::{Entry, MeasureField, Opt, Select, TextField};
use crate::quantity::{Kind, Measure, parse};
use crate::readings::Seen;
use yew::{AttrValue, Callback, Html, UseStateHandle, html};

/// What one measure field of a reading needs.
struct FieldOf {
    id: String,
    label: String,
    typed: String,
    /// The value, signed as the field shows it.
    held: Option<Measure>,
    testid: String,
    on_entry: Callback<Entry>,
}

/// A measure field in the unit of the port.
fn field(props: &EntryFieldProps, of: FieldOf) -> Html {
    let (port, unit) = (
        props.reading.port,
        words::unit_of(props.reading.port, &props.prefs),
    );
    html! {
        <MeasureField
            id={of.id}
            label={of.label}
            {unit}
            typed={AttrValue::from(of.typed)}
            value={of.held}
            range={entry::range(port)}
            mark={props.prefs.mark()}
            on_entry={of.on_entry}
            testid={of.testid}
            class="entry-value"
        />
    }
}

/// A steady value.
pub fn value(props: &EntryFieldProps, say: &Callback<Said>) -> Html {
    let port = props.reading.port;
    let on_entry = say.reform(move |typed: Entry| entry::value(port, typed));
    let unit = words::unit_of(port, &props.prefs);
    let typed_base = parse(&props.reading.typed, unit.kind(), unit, None)
        .ok()
        .map(|parsed| parsed.measure.base());
    let held = match &props.reading.seen {
        Some(Seen::Value { value }) => {
            entry::for_field(port, *value, unit.reads_vacuum(), typed_base)
        }
        _ => None,
    };
    field(
        props,
        FieldOf {
            id: field_id(&props.reading.id),
            label: props.name.to_string(),
            typed: props.reading.typed.clone(),
            held,
            testid: format!("value-{}", props.number),
            on_entry,
        },
    )
}

/// Two fields: lowest and highest.
pub fn swing(props: &EntryFieldProps, say: &Callback<Said>) -> Html {
    let port = props.reading.port;
    let (low, high) = swing_ends(props);
    let (other_low, other_high) = (low.clone(), high.clone());
    let on_low = say.reform(move |typed: Entry| entry::swing(port, &typed, &other_high));
    let on_high = say.reform(move |typed: Entry| entry::swing(port, &other_low, &typed));
    html! {
        <div class="entry-pair">
            { field(props, FieldOf {
                id: field_id(&props.reading.id),
                label: format!("{}, lowest", props.short),
                typed: low.typed,
                held: low.value,
                testid: format!("value-{}", props.number),
                on_entry: on_low,
            }) }
            { field(props, FieldOf {
                id: format!("{}-high", field_id(&props.reading.id)),
                label: String::from("Highest"),
                typed: high.typed,
                held: high.value,
                testid: format!("value-high-{}", props.number),
                on_entry: on_high,
            }) }
        </div>
    }
}

/// Both ends of a swing as they stand: the texts where they still say what is held, in whichever order they were typed;
/// the held figures where the shop's unit was changed since.
fn swing_ends(props: &EntryFieldProps) -> (Entry, Entry) {
    let port = props.reading.port;
    let unit = words::unit_of(port, &props.prefs);
    let read = |typed: &str| {
        let range = entry::range(port).map(|(low, high)| low..=high);
        let value = parse(typed, unit.kind(), unit, range)
            .ok()
            .map(|parsed| parsed.measure);
        Entry {
            typed: typed.to_owned(),
            value,
        }
    };
    let (low, high) = entry::swing_typed(&props.reading);
    let (low, high) = (read(low), read(high));
    let Some(Seen::Swing {
        low: held_low,
        high: held_high,
    }) = &props.reading.seen
    else {
        return (low, high);
    };
    if entry::swing(port, &low, &high).1 == props.reading.seen {
        return (low, high);
    }
    let shown = |held: Measure| {
        let value = entry::for_field(port, held, unit.reads_vacuum(), None);
        let typed = value.map(|value| crate::quantity::edit_text(value, unit, props.prefs.mark()));
        Entry {
            typed: typed.unwrap_or_default(),
            value,
        }
    };
    (shown(*held_low), shown(*held_high))
}

/// The top of the scale.
pub fn off_scale(props: &EntryFieldProps, say: &Callback<Said>) -> Html {
    let held = match &props.reading.seen {
        Some(Seen::OffScale { top }) => Some(*top),
        _ => None,
    };
    field(
        props,
        FieldOf {
            id: field_id(&props.reading.id),
            label: format!("{}: over the top of the scale, which ends at", props.short),
            typed: entry::off_scale_typed(&props.reading).to_owned(),
            held,
            testid: format!("value-{}", props.number),
            on_entry: say.reform(entry::off_scale),
        },
    )
}

/// A share, and what it is taken of.
pub fn share(props: &EntryFieldProps, say: &Callback<Said>, of: &UseStateHandle<usize>) -> Html {
    let others = entry::comparisons(&props.reading.condition);
    let (held, other) = match &props.reading.seen {
        Some(Seen::ShareOf { share, other }) => (Some(*share), Some(**other)),
        _ => (None, None),
    };
    let chosen = other
        .and_then(|other| {
            others
                .iter()
                .position(|(_, condition)| group::same(condition, &other))
        })
        .unwrap_or(**of);
    let Some((_, condition)) = others.get(chosen).copied() else {
        return Html::default();
    };
    let typed = entry::share_typed(&props.reading).to_owned();
    let unit = props.prefs.unit(Kind::Ratio);
    let range = Measure::from_base(0.01, Kind::Ratio)
        .ok()
        .zip(Measure::from_base(5.0, Kind::Ratio).ok());
    let kept = Entry {
        typed: typed.clone(),
        value: held.and_then(|share| Measure::from_base(share, Kind::Ratio).ok()),
    };
    let on_other = {
        let (say, others, kept, of) = (say.clone(), others.clone(), kept.clone(), of.clone());
        Callback::from(move |place: usize| {
            of.set(place);
            if let Some((_, other)) = others.get(place) {
                say.emit(entry::share(kept.clone(), *other));
            }
        })
    };
    let options = others
        .iter()
        .enumerate()
        .map(|(place, (words, _))| Opt::new(place, *words, place.to_string()));
    html! { <>
        <div class="entry-pair">
            <MeasureField
                id={field_id(&props.reading.id)}
                label={format!("{}, share", props.short)}
                {unit}
                typed={AttrValue::from(typed)}
                value={kept.value}
                {range}
                mark={props.prefs.mark()}
                on_entry={say.reform(move |typed: Entry| entry::share(typed, condition))}
                testid={format!("value-{}", props.number)}
                class="entry-value"
            />
            <Select<usize>
                id={format!("{}-of", field_id(&props.reading.id))}
                label="of the same gauge in"
                options={options.collect::<Vec<_>>()}
                value={Some(chosen)}
                on_change={on_other}
                testid={format!("share-of-{}", props.number)}
            />
        </div>
        <p class="soft small" data-testid={format!("share-last-{}", props.number)}>{ last_time::why_not(props.last.as_ref()) }</p>
    </> }
}

/// The reason.
pub fn not_possible(props: &EntryFieldProps, say: &Callback<Said>) -> Html {
    let why = match &props.reading.seen {
        Some(Seen::NotPossible { why }) => why.clone(),
        _ => String::new(),
    };
    html! {
        <TextField
            id={field_id(&props.reading.id)}
            label={format!("{} not possible, because", props.short)}
            value={why}
            on_input={say.reform(|why: String| entry::not_possible(&why))}
            maxlength={300}
            testid={format!("value-{}", props.number)}
        />
    }
}
