//! One run: what is measured, in which setting, what was seen.

use super::screen::{Edit, line_id};
use super::words;
use crate::app::parts::{Choice, Entry, MeasureField, Opt, Select};
use crate::quantity::{Measure, Unit, UnitPrefs};
use crate::tracking::{
    Facing, Field, Gear, Hand, Lever, Line, LineProblem, Load, Setting, TrackingSheet, Travel, What,
};
use yew::{Callback, Html, MouseEvent, Properties, component, html};

/// Properties of [`LineCard`].
#[derive(Clone, PartialEq, Properties)]
pub struct LineCardProps {
    /// Its place among the runs.
    pub at: usize,
    /// The run as it stands on the sheet.
    pub line: Line,
    /// Why it does not count.
    pub problem: Option<LineProblem>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

fn code(field: Field) -> &'static str {
    match field {
        Field::Left => "left",
        Field::Right => "right",
        Field::Seconds => "seconds",
        Field::SecondsRight => "seconds-right",
        Field::Distance => "distance",
        Field::Aside => "aside",
        Field::Uncertainty => "uncertainty",
    }
}

/// An edit of the run of this id.
fn of(id: &str, change: impl FnOnce(&mut Line) + 'static) -> Edit {
    let id = id.to_owned();
    Box::new(move |sheet: &mut TrackingSheet| {
        if let Some(line) = sheet.runs.iter_mut().find(|line| line.id == id) {
            change(line);
        }
    })
}

/// The run.
#[component]
pub fn LineCard(props: &LineCardProps) -> Html {
    let (line, at) = (&props.line, props.at);
    let title = format!(
        "Run {}: {}",
        at + 1,
        words::setting(line.what, line.setting)
    );
    let (needed, may) = line.what.fields();
    let on_out = edit(props, |line, ()| line.is_left_out = !line.is_left_out);
    let on_remove = {
        let (id, on_edit) = (line.id.clone(), props.on_edit.clone());
        Callback::from(move |_: MouseEvent| {
            let id = id.clone();
            on_edit.emit(Box::new(move |sheet| {
                sheet.runs.retain(|line| line.id != id)
            }));
        })
    };
    let hands = vec![
        Opt::new(Hand::Left, "To the left", "left"),
        Opt::new(Hand::Right, "To the right", "right"),
    ];
    html! {
        <section class="tracking-line" id={line_id(&line.id)} tabindex="-1" aria-label={title.clone()} data-testid={format!("run-{at}")}>
            <h3>{ title }</h3>
            <details class="advice" data-testid={format!("run-{at}-setting")}>
                <summary>{ format!("{} · change", words::what(line.what)) }</summary>
                <div class="stack">{ setting(props) }</div>
            </details>
            <div class="tracking-fields">
                { for needed.iter().map(|of| field(props, *of)) }
            </div>
            if line.what == What::Path {
                <Choice<Hand>
                    name={format!("run-{at}-hand")}
                    label="To which side, by the seat"
                    options={hands}
                    value={line.hand}
                    on_change={edit(props, |line, hand| line.hand = Some(hand))}
                />
            }
            <details class="advice">
                <summary>{ "More about this run" }</summary>
                <div class="stack">
                    { for may.iter().map(|of| field(props, *of)) }
                    <div class="actions">
                        <button
                            type="button"
                            class="button is-quiet"
                            aria-pressed={if line.is_left_out { "true" } else { "false" }}
                            onclick={on_out.reform(|_: MouseEvent| ())}
                        >{ if line.is_left_out { "Count it again" } else { "Leave it out" } }</button>
                        <button type="button" class="button is-quiet" data-testid={format!("run-{at}-remove")} onclick={on_remove}>
                            { "Remove this run" }
                        </button>
                    </div>
                </div>
            </details>
            <p class="tracking-problem" role="status" data-testid={format!("run-{at}-problem")}>
                if let Some(problem) = props.problem {
                    { format!("Does not count: {problem}.") }
                }
            </p>
        </section>
    }
}

/// A callback that changes this run.
fn edit<T: 'static>(
    props: &LineCardProps,
    change: impl Fn(&mut Line, T) + Clone + 'static,
) -> Callback<T> {
    let id = props.line.id.clone();
    props.on_edit.reform(move |value: T| {
        let change = change.clone();
        of(&id, move |line| change(line, value))
    })
}

fn field(props: &LineCardProps, field: Field) -> Html {
    let (line, at) = (&props.line, props.at);
    let (base, high) = line.what.asks(field);
    let unit = match base {
        Unit::Metre if line.what == What::RollOut || field == Field::Uncertainty => {
            props.prefs.unit(Unit::Metre.kind())
        }
        Unit::Metre => words::length(&props.prefs),
        Unit::Turn | Unit::Second | Unit::RevolutionPerMinute => base,
        other => props.prefs.unit(other.kind()),
    };
    let typed = line.fields.get(&field).cloned().unwrap_or_default();
    let on_entry = edit(props, move |line, typed: Entry| {
        if typed.is_blank() {
            line.fields.remove(&field);
        } else {
            line.fields.insert(field, typed);
        }
    });
    html! {
        <MeasureField
            key={code(field)}
            id={format!("run-{at}-{}", code(field))}
            label={words::field(line.what, field)}
            {unit}
            typed={typed.typed}
            value={typed.value}
            range={Some((Measure::literal(0.0, base), Measure::literal(high, base)))}
            mark={props.prefs.mark()}
            {on_entry}
            testid={format!("run-{at}-{}", code(field))}
        />
    }
}

fn setting(props: &LineCardProps) -> Html {
    let (line, at) = (&props.line, props.at);
    let now = line.setting;
    let whats = What::ALL.map(|what| Opt::new(what, words::what(what), format!("{what:?}")));
    let choice = |name: &str, label: &'static str, options: Vec<(Setting, &'static str)>| {
        let options = options
            .into_iter()
            .map(|(setting, words)| {
                Opt::new(setting, words, words.to_lowercase().replace(' ', "-"))
            })
            .collect::<Vec<_>>();
        html! {
            <Choice<Setting>
                name={format!("run-{at}-{name}")}
                {label}
                {options}
                value={Some(now)}
                on_change={edit(props, |line, setting| line.setting = setting)}
            />
        }
    };
    html! { <>
        <Select<What>
            id={format!("run-{at}-what")}
            label="What is measured"
            options={whats.to_vec()}
            value={Some(line.what)}
            on_change={edit(props, |line: &mut Line, what| line.choose(what))}
            testid={format!("run-{at}-what")}
        />
        if line.what != What::RollOut {
            { choice("lever", "Levers", vec![
                (Setting { lever: Lever::Low, ..now }, "Low"),
                (Setting { lever: Lever::Half, ..now }, "Half"),
                (Setting { lever: Lever::Full, ..now }, "Full"),
            ]) }
            { choice("travel", "Direction", vec![
                (Setting { travel: Travel::Forward, ..now }, "Forward"),
                (Setting { travel: Travel::Reverse, ..now }, "Reverse"),
            ]) }
            { choice("load", "The sides push", vec![
                (Setting { load: Load::Free, ..now }, "Nothing: wheels clear"),
                (Setting { load: Load::Level, ..now }, "Level ground"),
                (Setting { load: Load::Loaded, ..now }, "Drawbar or grade"),
            ]) }
            { choice("gear", "Range", vec![
                (Setting { gear: Gear::One, ..now }, "1, or the only one"),
                (Setting { gear: Gear::Two, ..now }, "2"),
            ]) }
        }
        if line.what == What::Path {
            { choice("facing", "The front looks", vec![
                (Setting { facing: Facing::Out, ..now }, "As in the first run"),
                (Setting { facing: Facing::Back, ..now }, "Turned round"),
            ]) }
        }
    </> }
}
