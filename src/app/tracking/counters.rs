//! Counting by thumb: left, then right, each with its own watch. What was counted becomes a run.

use super::screen::Edit;
use crate::app::call::cautions;
use crate::app::parts::sound_switch::SoundSwitch;
use crate::app::parts::stopwatch::Stopwatch;
use crate::app::parts::tap_counter::TapCounter;
use crate::app::parts::{Choice, Icon, Opt, Section, Shape};
use crate::app::platform::ids;
use crate::caution::Stands;
use crate::count::Counted;
use crate::quantity::Typed;
use crate::quantity::Unit;
use crate::record::IdOf;
use crate::tracking::{Field, LINES, Lever, Line, Load, Setting, Travel, What};
use std::collections::BTreeMap;
use yew::{Callback, Html, MouseEvent, Properties, component, html, use_state};

/// Seconds of a count that ends by itself.
const LIMIT_S: f64 = 60.0;

/// Properties of [`Counters`].
#[derive(Clone, PartialEq, Properties)]
pub struct CountersProps {
    /// Edits.
    pub on_edit: Callback<Edit>,
}

/// The fields of a run from two counts.
fn fields(left: Counted, right: Counted) -> BTreeMap<Field, Typed> {
    [
        (
            Field::Left,
            Typed::shown(f64::from(left.turns), Unit::Turn, 0),
        ),
        (Field::Seconds, Typed::shown(left.seconds, Unit::Second, 1)),
        (
            Field::Right,
            Typed::shown(f64::from(right.turns), Unit::Turn, 0),
        ),
        (
            Field::SecondsRight,
            Typed::shown(right.seconds, Unit::Second, 1),
        ),
    ]
    .into()
}

/// The counters.
#[component]
pub fn Counters(props: &CountersProps) -> Html {
    let setting = use_state(|| Setting {
        load: Load::Free,
        ..Setting::default()
    });
    let left = use_state(|| None::<Counted>);
    let right = use_state(|| None::<Counted>);
    // A taken count makes way for the next: new counters.
    let round = use_state(|| 0_u32);
    let counted = |count: &Option<Counted>| count.filter(|c| c.turns > 0 && c.seconds > 0.0);
    let both = counted(&left).zip(counted(&right));
    let on_take = {
        let (on_edit, setting, round) = (props.on_edit.clone(), *setting, round.clone());
        let (left, right) = (left.clone(), right.clone());
        Callback::from(move |_: MouseEvent| {
            let Some((of_left, of_right)) = both else {
                return;
            };
            let line = Line {
                id: ids::fresh(IdOf::Reading),
                what: What::TurnsApart,
                setting,
                fields: fields(of_left, of_right),
                ..Line::default()
            };
            on_edit.emit(Box::new(move |sheet| {
                if sheet.runs.len() < LINES {
                    sheet.runs.push(line);
                }
            }));
            left.set(None);
            right.set(None);
            round.set(round.wrapping_add(1));
        })
    };
    let set = {
        let setting = setting.clone();
        move |change: fn(&mut Setting, Setting)| {
            let setting = setting.clone();
            Callback::from(move |picked: Setting| {
                let mut next = *setting;
                change(&mut next, picked);
                setting.set(next);
            })
        }
    };
    let lever = |lever| Setting { lever, ..*setting };
    let travel = |travel| Setting { travel, ..*setting };
    let counter =
        |id: &'static str, label: &'static str, state: &yew::UseStateHandle<Option<Counted>>| {
            let state = state.clone();
            html! {
                <TapCounter
                    key={format!("{id}-{}", *round)}
                    {id}
                    {label}
                    limit_s={Some(LIMIT_S)}
                    on_count={Callback::from(move |count| state.set(count))}
                />
            }
        };
    html! {
        <Section id="tracking-counters" title="Count turns by thumb" state="60 s a side">
            { cautions::at(Stands::WheelsClear) }
            <p>{ "Mark both wheels with chalk. Stand clear of wheels, tracks and hoses; tap at each pass of the mark. One side after the other, \
                 engine speed and levers not touched in between." }</p>
            <SoundSwitch />
            <Choice<Setting>
                name="count-lever"
                label="Levers"
                options={vec![
                    Opt::new(lever(Lever::Low), "Low", "low"),
                    Opt::new(lever(Lever::Half), "Half", "half"),
                    Opt::new(lever(Lever::Full), "Full", "full"),
                ]}
                value={Some(*setting)}
                on_change={set(|next, picked| next.lever = picked.lever)}
            />
            <Choice<Setting>
                name="count-travel"
                label="Direction"
                options={vec![
                    Opt::new(travel(Travel::Forward), "Forward", "forward"),
                    Opt::new(travel(Travel::Reverse), "Reverse", "reverse"),
                ]}
                value={Some(*setting)}
                on_change={set(|next, picked| next.travel = picked.travel)}
            />
            <div class="tracking-counters">
                { counter("count-left", "Left", &left) }
                { counter("count-right", "Right", &right) }
            </div>
            <div class="actions">
                <button type="button" class="button is-main" data-testid="take-counts" disabled={both.is_none()} onclick={on_take}>
                    <Icon shape={Shape::Plus} />
                    { "Take both counts as a run" }
                </button>
                if both.is_none() {
                    <span class="soft small">{ "needs a count of each side" }</span>
                }
            </div>
            <Stopwatch id="tracking-watch" label="Stopwatch, for what is read elsewhere" on_time={Callback::noop()} />
        </Section>
    }
}
