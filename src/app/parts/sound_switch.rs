//! Switches loud sound on and off. Nobody looks at a screen beside turning wheels, so the count and its end can be heard.

use yew::{Callback, Html, MouseEvent, component, html, use_state};

use crate::app::platform::sound;

/// The switch.
#[component]
pub fn SoundSwitch() -> Html {
    let on = use_state(sound::is_on);
    let failed = use_state(|| false);
    let on_click = {
        let (on, failed) = (on.clone(), failed.clone());
        Callback::from(move |_: MouseEvent| {
            let wanted = !*on;
            failed.set(!sound::switch(wanted));
            on.set(sound::is_on());
        })
    };
    html! {
        <div class="sound-switch">
            <button
                type="button"
                class="button"
                aria-pressed={if *on { "true" } else { "false" }}
                data-testid="sound-switch"
                onclick={on_click}
            >
                <svg class="icon" viewBox="0 0 24 24" aria-hidden="true" focusable="false">
                    <path class="stroke" d="M3 9.5h4L12 5v14l-5-4.5H3Z" />
                    if *on {
                        <path class="stroke" d="M15.5 8.5a5 5 0 0 1 0 7M18.5 5.5a9 9 0 0 1 0 13" />
                    } else {
                        <path class="stroke" d="M16 9l6 6M22 9l-6 6" />
                    }
                </svg>
                { if *on { "Loud sound is on" } else { "Loud sound is off" } }
            </button>
            <span class="field-hint" role="status">
                { match (*failed, *on) {
                    (true, _) => "This device gives no sound here.",
                    (false, true) => "You heard a tone? If not, turn the volume up and the silent switch off.",
                    (false, false) => "On: a beep at every tap and a loud signal at the end.",
                } }
            </span>
        </div>
    }
}
