//! Turns counted by thumb, into the run they belong to.

use yew::{Callback, Html, MouseEvent, Properties, component, html, use_state};

use super::screen::Edit;
use crate::app::parts::{Choice, Icon, Opt, Section, Shape, SoundSwitch, TapCounter};
use crate::count::Counted;
use crate::quantity::Typed;
use crate::quantity::Unit;
use crate::yard::Field;

/// Seconds of a count that ends by itself.
const LIMIT_S: f64 = 60.0;

/// Properties of [`Counters`].
#[derive(Clone, PartialEq, Properties)]
pub struct CountersProps {
    /// True where left and right are counted.
    pub two: bool,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

/// The counter.
#[component]
pub fn Counters(props: &CountersProps) -> Html {
    let run = use_state(|| Field::ForwardTurns);
    let count = use_state(|| None::<Counted>);
    let round = use_state(|| 0_u32);
    let counted = count.filter(|c| c.turns > 0 && c.seconds > 0.0);
    let mut options = vec![
        Opt::new(Field::ForwardTurns, "Forward", "forward"),
        Opt::new(Field::ReverseTurns, "Reverse", "reverse"),
        Opt::new(Field::LoadedTurns, "Ramp", "ramp"),
    ];
    if props.two {
        options.push(Opt::new(
            Field::ForwardTurnsRight,
            "Forward, right",
            "forward-right",
        ));
        options.push(Opt::new(
            Field::ReverseTurnsRight,
            "Reverse, right",
            "reverse-right",
        ));
    }
    let on_run = {
        let run = run.clone();
        Callback::from(move |field: Field| run.set(field))
    };
    let on_count = {
        let count = count.clone();
        Callback::from(move |made| count.set(made))
    };
    let on_take = {
        let (on_edit, turns) = (props.on_edit.clone(), *run);
        let (count, round) = (count.clone(), round.clone());
        Callback::from(move |_: MouseEvent| {
            let Some(made) = counted else { return };
            let time = match turns {
                Field::ReverseTurns | Field::ReverseTurnsRight => Field::ReverseTime,
                Field::LoadedTurns => Field::LoadedTime,
                _ => Field::ForwardTime,
            };
            on_edit.emit(Box::new(move |visit| {
                let sheet = visit.yard.get_or_insert_default();
                sheet.set(turns, Typed::shown(f64::from(made.turns), Unit::Turn, 0));
                sheet.set(time, Typed::shown(made.seconds, Unit::Second, 1));
            }));
            count.set(None);
            round.set(round.wrapping_add(1));
        })
    };
    html! {
        <Section id="yard-counters" title="Count turns by thumb" state="60 s">
            <p>{ "A second person drives. Mark the wheel with chalk, stand clear of it, tap at each pass of the mark. A minute of counting \
                  tells slip twice as sharply as half a minute." }</p>
            <SoundSwitch />
            <Choice<Field> name="yard-count" label="Goes to" {options} value={Some(*run)} on_change={on_run} />
            <TapCounter key={*round} id="yard-taps" label="Wheel" limit_s={Some(LIMIT_S)} {on_count} />
            <div class="actions">
                <button type="button" class="button is-main" data-testid="yard-take-count" disabled={counted.is_none()} onclick={on_take}>
                    <Icon shape={Shape::Plus} />
                    { "Put the count in" }
                </button>
            </div>
        </Section>
    }
}
