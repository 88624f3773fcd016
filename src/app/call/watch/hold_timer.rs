//! The timer of a held reading: one touch as the lever goes out, the seconds that are left, a loud signal at their end, then the rest. It
//! stops by itself and is not made longer by anybody.

use crate::app::call::gate_panel::{rise_words, seconds_words};
use crate::app::parts::{Icon, Shape, SoundSwitch};
use crate::app::platform::timer::Timer;
use crate::app::platform::{clock, sound};
use crate::call::hold::{Plan, Refused};
use crate::call::hold_clock::{HoldClock, Phase};
use crate::quantity::UnitPrefs;
use std::cell::RefCell;
use std::rc::Rc;
use yew::{
    AttrValue, Callback, Html, MouseEvent, Properties, component, html, use_effect_with,
    use_mut_ref, use_state,
};

/// How often the time that is left is shown anew, ms.
const SHOW_MS: i32 = 100;

/// The clock of a visit, equal to itself alone.
#[derive(Clone, Debug, Default)]
pub struct Kept(pub Rc<RefCell<HoldClock>>);

impl PartialEq for Kept {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

/// Properties of [`HoldTimer`].
#[derive(Clone, PartialEq, Properties)]
pub struct HoldTimerProps {
    /// What is held: the side and the stroke count their tries by it.
    pub name: AttrValue,
    /// How long, or why not at all.
    pub plan: Result<Plan, Refused>,
    /// The clock.
    pub clock: Kept,
    /// Units.
    pub prefs: UnitPrefs,
}

/// Which phase it is, without its seconds.
fn kind(phase: Phase) -> u8 {
    match phase {
        Phase::Ready => 0,
        Phase::Holds { .. } => 1,
        Phase::Rests { .. } => 2,
        Phase::Spent => 3,
    }
}

/// The timer.
#[component]
pub fn HoldTimer(props: &HoldTimerProps) -> Html {
    let now = use_state(clock::running_ms);
    let before = use_mut_ref(|| None::<u8>);
    let phase = match &props.plan {
        Ok(plan) => props.clock.0.borrow().phase(&props.name, plan, *now),
        Err(_) => Phase::Spent,
    };
    {
        let now = now.clone();
        use_effect_with((*now, kind(phase)), move |(_, kind)| {
            let kind = *kind;
            let was = before.replace(Some(kind));
            if was == Some(1) && kind != 1 {
                sound::end();
            } else if was == Some(2) && kind == 0 {
                sound::tick();
            }
            let runs = matches!(kind, 1 | 2);
            let timer = runs.then(|| Timer::once(SHOW_MS, move || now.set(clock::running_ms())));
            move || drop(timer)
        });
    }
    let plan = match &props.plan {
        Ok(plan) => plan,
        Err(why) => {
            return html! {
                <p class="watch-refused" data-testid="hold-refused"><Icon shape={Shape::Danger} /><span>{ format!("Do not hold: {why}.") }</span></p>
            };
        }
    };
    let on_out = {
        let (clock_, name, plan, now) = (
            props.clock.clone(),
            props.name.clone(),
            plan.clone(),
            now.clone(),
        );
        Callback::from(move |_: MouseEvent| {
            let moment = clock::running_ms();
            if clock_.0.borrow_mut().begin(&name, &plan, moment) {
                sound::tick();
            }
            now.set(moment);
        })
    };
    let on_back = {
        let (clock_, now) = (props.clock.clone(), now.clone());
        Callback::from(move |_: MouseEvent| {
            let moment = clock::running_ms();
            clock_.0.borrow_mut().back(moment);
            now.set(moment);
        })
    };
    let longest = seconds_words(plan.seconds, &props.prefs);
    html! {
        <div class={format!("hold-timer is-{}", ["ready", "holds", "rests", "spent"][usize::from(kind(phase).min(3))])} data-testid="hold-timer">
            { match phase {
                Phase::Ready => html! {
                    <button type="button" class="tap-area is-short" onclick={on_out} data-testid="hold-start">
                        <span>{ "Lever out: start" }</span>
                        <span class="tap-said">{ format!("{longest} at most") }</span>
                    </button>
                },
                Phase::Holds { left } => html! {
                    <button type="button" class="tap-area is-short is-holding" onclick={on_back} data-testid="hold-back">
                        <span class="hold-left" data-testid="hold-left">{ format!("{:.1} s", tenths_up(left)) }</span>
                        <span class="tap-said">{ "Touch when the lever is back" }</span>
                    </button>
                },
                Phase::Rests { left } => html! {
                    <p class="hold-rest">
                        <strong>{ "Lever back. Rest." }</strong>
                        <span class="hold-left" data-testid="hold-rest">{ format!("{:.0} s", left.ceil()) }</span>
                    </p>
                },
                Phase::Spent => html! {
                    <p class="hold-rest"><strong>{ format!("Held {} times: that is all for this side.", plan.tries.unwrap_or_default()) }</strong></p>
                },
            } }
            <p class="hold-basis" data-testid="hold-basis">
                { format!("{longest} at most: {}. ", plan.source()) }
                if let Some(rest) = plan.rest {
                    { format!("Then rest {rest:.0} s (common practice). ") }
                }
                if let Some(rise) = plan.rise {
                    { format!("The oil heats by up to {} each second.", rise_words(rise, &props.prefs)) }
                }
            </p>
            <p class="hidden-text" role="status" data-testid="hold-said">
                { match phase {
                    Phase::Ready => "",
                    Phase::Holds { .. } => "The time runs.",
                    Phase::Rests { .. } => "Lever back. Rest.",
                    Phase::Spent => "No more holds on this side.",
                } }
            </p>
            <SoundSwitch />
        </div>
    }
}

/// To a tenth, up: a nought stands only once the time is over.
fn tenths_up(seconds: f64) -> f64 {
    (seconds * 10.0).ceil() / 10.0
}
