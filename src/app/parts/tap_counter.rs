//! Turns counted by tapping: one tap at each pass of the mark, on a target for a thumb in a glove. The watch starts with the
//! first tap, which counts no turn. At the set time it signals and counts no further.

use yew::{
    AttrValue, Callback, Html, KeyboardEvent, MouseEvent, PointerEvent, Properties, component,
    html, use_effect_with, use_mut_ref, use_state,
};

use crate::app::platform::awake::Awake;
use crate::app::platform::timer::Timer;
use crate::app::platform::{clock, sound};
use crate::count::{Counted, Taps};

/// How often the running time is shown anew, ms.
const SHOW_MS: i32 = 100;

/// Properties of [`TapCounter`].
#[derive(Clone, PartialEq, Properties)]
pub struct TapCounterProps {
    /// Start of the test ids and of the DOM ids; unique on the page.
    pub id: AttrValue,
    /// What is counted: "Left wheel".
    pub label: AttrValue,
    /// The count ends so long after the first tap, s; none: when the person ends it.
    #[prop_or_default]
    pub limit_s: Option<f64>,
    /// Every change of the count, at the end of the set time too; none after it was cleared.
    pub on_count: Callback<Option<Counted>>,
}

/// The counter.
#[component]
pub fn TapCounter(props: &TapCounterProps) -> Html {
    let taps = use_state(|| Taps::until(props.limit_s));
    // What the taps are at this moment: two taps may come before the next drawing.
    let latest = use_mut_ref(|| Taps::until(props.limit_s));
    let now = use_state(clock::running_ms);
    let awake = use_mut_ref(|| None::<Awake>);
    let runs = taps.is_started() && !taps.is_over(*now);
    {
        let (now, awake, latest) = (now.clone(), awake.clone(), latest.clone());
        let on_count = props.on_count.clone();
        use_effect_with((*now, runs), move |(_, runs)| {
            let runs = *runs;
            if runs {
                awake.borrow_mut().get_or_insert_with(Awake::ask);
            } else {
                awake.take();
            }
            let timer = runs.then(|| {
                Timer::once(SHOW_MS, move || {
                    let moment = clock::running_ms();
                    if latest.borrow().is_over(moment) {
                        sound::end();
                        on_count.emit(latest.borrow().counted(moment));
                    }
                    now.set(moment);
                })
            });
            move || drop(timer)
        });
    }
    let change = {
        let (taps, latest, now) = (taps.clone(), latest.clone(), now.clone());
        let on_count = props.on_count.clone();
        move |edit: &dyn Fn(&mut Taps, f64) -> bool| {
            let moment = clock::running_ms();
            let done = edit(&mut latest.borrow_mut(), moment);
            if done {
                let after = latest.borrow().clone();
                on_count.emit(after.counted(moment));
                taps.set(after);
            }
            now.set(moment);
            done
        }
    };
    let tap = {
        let change = change.clone();
        move || {
            if change(&|taps, moment| taps.tap(moment)) {
                sound::tick();
            }
        }
    };
    // The finger down is the moment; a click without a finger is a keyboard's or a screen reader's.
    let down = use_mut_ref(|| false);
    let on_down = {
        let (tap, down) = (tap.clone(), down.clone());
        Callback::from(move |event: PointerEvent| {
            if event.is_primary() && event.button() == 0 {
                down.replace(true);
                tap();
            }
        })
    };
    let forget = {
        let down = down.clone();
        move || {
            down.replace(false);
        }
    };
    let (on_cancel, on_key) = (forget.clone(), forget);
    let on_cancel = Callback::from(move |_: PointerEvent| on_cancel());
    let on_key = Callback::from(move |_: KeyboardEvent| on_key());
    let on_click = Callback::from(move |_: MouseEvent| {
        if !down.replace(false) {
            tap();
        }
    });
    let on_undo = {
        let change = change.clone();
        Callback::from(move |_: MouseEvent| {
            if change(&|taps, _| taps.undo()) {
                sound::undone();
            }
        })
    };
    let on_clear = {
        let limit = props.limit_s;
        Callback::from(move |_: MouseEvent| {
            change(&|taps, _| {
                *taps = Taps::until(limit);
                true
            });
        })
    };
    let counted = taps.counted(*now);
    let (turns, is_over) = counted.map_or((0, false), |counted| (counted.turns, counted.is_over));
    let said = match counted {
        None => "Tap when the mark passes: the watch starts".to_owned(),
        Some(_) if is_over => "Time. The count stands".to_owned(),
        Some(_) => "Tap at each pass of the mark".to_owned(),
    };
    let id = &props.id;
    html! {
        <div class="tap-counter" role="group" aria-label={format!("Count turns: {}", props.label)} data-testid={id.clone()}>
            <p class="tap-label">{ props.label.clone() }</p>
            <button
                type="button"
                class={if is_over { "tap-area is-over" } else { "tap-area" }}
                aria-disabled={is_over.then_some("true")}
                data-testid={format!("{id}-tap")}
                onpointerdown={on_down}
                onpointercancel={on_cancel}
                onkeydown={on_key}
                onclick={on_click}
            >
                <span class="tap-turns" data-testid={format!("{id}-turns")}>{ turns }</span>
                <span class="tap-unit">{ if turns == 1 { "turn" } else { "turns" } }</span>
                <span class="tap-said">{ said }</span>
            </button>
            <p class="tap-time">
                <span data-testid={format!("{id}-seconds")}>{ format!("{:.1} s", taps.elapsed_s(*now)) }</span>
                if let Some(limit) = props.limit_s {
                    <span class="tap-of">{ format!(" of {limit:.0} s") }</span>
                }
            </p>
            <p class="tap-result" role="status" data-testid={format!("{id}-result")}>{ counted.map(result).unwrap_or_default() }</p>
            <div class="actions">
                <button type="button" class="button" disabled={!taps.is_started()} data-testid={format!("{id}-undo")} onclick={on_undo}>
                    { "Undo last tap" }
                </button>
                <button type="button" class="button is-quiet" disabled={!taps.is_started()} data-testid={format!("{id}-clear")} onclick={on_clear}>
                    { "Start again" }
                </button>
            </div>
        </div>
    }
}

/// What a count comes to, in words.
fn result(counted: Counted) -> String {
    if let Some(speed) = counted.speed() {
        let wide = 2.0 * speed.combined();
        return format!(
            "{} {} in {:.1} s: {} rpm ± {} rpm",
            counted.turns,
            if counted.turns == 1 { "turn" } else { "turns" },
            counted.seconds,
            short(speed.value.base(), wide),
            short(wide, wide),
        );
    }
    match counted.under() {
        Some(under) if counted.is_over => format!(
            "No whole turn in {:.0} s: under {:.1} rpm",
            counted.seconds,
            under.base()
        ),
        _ => String::new(),
    }
}

/// With the places that its uncertainty leaves.
fn short(value: f64, wide: f64) -> String {
    match wide {
        wide if wide >= 1.0 => format!("{value:.0}"),
        wide if wide >= 0.1 => format!("{value:.1}"),
        wide if wide >= 0.01 => format!("{value:.2}"),
        _ => format!("{value:.3}"),
    }
}
