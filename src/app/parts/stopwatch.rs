//! A stopwatch for one hand: start and stop on one target for a thumb in a glove.

use yew::{
    AttrValue, Callback, Html, KeyboardEvent, MouseEvent, PointerEvent, Properties, component,
    html, use_effect_with, use_mut_ref, use_state,
};

use crate::app::platform::awake::Awake;
use crate::app::platform::timer::Timer;
use crate::app::platform::{clock, sound};

/// How often the running time is shown anew, ms.
const SHOW_MS: i32 = 100;
/// Milliseconds in a second.
const MS: f64 = 1000.0;

/// Properties of [`Stopwatch`].
#[derive(Clone, PartialEq, Properties)]
pub struct StopwatchProps {
    /// Start of the test ids; unique on the page.
    pub id: AttrValue,
    /// What is timed: "Held".
    pub label: AttrValue,
    /// Signals once it has run so long, s; it runs on.
    #[prop_or_default]
    pub signal_s: Option<f64>,
    /// It was stopped: time in s. None: it was set back.
    pub on_time: Callback<Option<f64>>,
}

/// How it stands.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Watch {
    Idle,
    Runs { since_ms: f64 },
    Stopped { seconds: f64 },
}

impl Watch {
    fn seconds(self, now_ms: f64) -> f64 {
        match self {
            Watch::Idle => 0.0,
            Watch::Runs { since_ms } => ((now_ms - since_ms) / MS).max(0.0),
            Watch::Stopped { seconds } => seconds,
        }
    }
}

/// The stopwatch.
#[component]
pub fn Stopwatch(props: &StopwatchProps) -> Html {
    let watch = use_state(|| Watch::Idle);
    let now = use_state(clock::running_ms);
    let awake = use_mut_ref(|| None::<Awake>);
    let signalled = use_mut_ref(|| false);
    {
        let (now, signal_s) = (now.clone(), props.signal_s);
        use_effect_with((*now, *watch), move |(_, watch)| {
            let watch = *watch;
            let runs = matches!(watch, Watch::Runs { .. });
            if runs {
                awake.borrow_mut().get_or_insert_with(Awake::ask);
            } else {
                awake.take();
                signalled.replace(false);
            }
            let timer = runs.then(|| {
                Timer::once(SHOW_MS, move || {
                    let moment = clock::running_ms();
                    let is_due = signal_s.is_some_and(|due| watch.seconds(moment) >= due);
                    if is_due && !signalled.replace(true) {
                        sound::end();
                    }
                    now.set(moment);
                })
            });
            move || drop(timer)
        });
    }
    let press = {
        let (watch, now, on_time) = (watch.clone(), now.clone(), props.on_time.clone());
        move || {
            let moment = clock::running_ms();
            sound::tick();
            now.set(moment);
            match *watch {
                Watch::Idle => watch.set(Watch::Runs { since_ms: moment }),
                Watch::Runs { .. } => {
                    let seconds = watch.seconds(moment);
                    watch.set(Watch::Stopped { seconds });
                    on_time.emit(Some(seconds));
                }
                Watch::Stopped { .. } => {
                    watch.set(Watch::Idle);
                    on_time.emit(None);
                }
            }
        }
    };
    // The finger down is the moment; a click without a finger is a keyboard's or a screen reader's.
    let down = use_mut_ref(|| false);
    let on_down = {
        let (press, down) = (press.clone(), down.clone());
        Callback::from(move |event: PointerEvent| {
            if event.is_primary() && event.button() == 0 {
                down.replace(true);
                press();
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
            press();
        }
    });
    let word = match *watch {
        Watch::Idle => "Start",
        Watch::Runs { .. } => "Stop",
        Watch::Stopped { .. } => "Set to zero",
    };
    let seconds = watch.seconds(*now);
    let is_late = props.signal_s.is_some_and(|due| seconds >= due);
    let id = &props.id;
    html! {
        <div class="stopwatch" role="group" aria-label={format!("Stopwatch: {}", props.label)} data-testid={id.clone()}>
            <p class="tap-label">{ props.label.clone() }</p>
            <p class="stopwatch-time" data-testid={format!("{id}-seconds")}>
                { format!("{seconds:.1} s") }
                if let Some(due) = props.signal_s {
                    <span class="tap-of">{ if is_late { format!(" past {due:.0} s") } else { format!(" of {due:.0} s") } }</span>
                }
            </p>
            <button
                type="button"
                class="tap-area is-short"
                data-testid={format!("{id}-press")}
                onpointerdown={on_down}
                onpointercancel={on_cancel}
                onkeydown={on_key}
                onclick={on_click}
            >{ word }</button>
        </div>
    }
}
