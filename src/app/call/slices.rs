//! What would hold the page too long at one go is done a slice at a time: a long list that grows is drawn part by part, and not
//! within the touch that made it grow.

use crate::app::platform::timer::Timer;
use yew::{Callback, hook, use_effect_with, use_force_update, use_memo, use_mut_ref};

/// From one part to the next, ms: about one frame, so that what was drawn is also laid out before more comes.
const NEXT_MS: i32 = 16;

/// How many of `total` parts are drawn now: those that were, one more at a time, but never fewer than `at_least` where so many
/// are there. Everything is drawn at the start, and what goes away goes at once.
#[hook]
pub fn use_slices(total: usize, at_least: usize) -> usize {
    let drawn = use_mut_ref(|| total);
    let more = use_force_update();
    let now = next_slice(*drawn.borrow(), total, at_least);
    use_effect_with((now, total), move |(now, total)| {
        let now = *now;
        let timer = if now < *total {
            Timer::once(NEXT_MS, move || {
                drawn.replace(now);
                more.force_update();
            })
        } else {
            drawn.replace(now);
            None
        };
        move || drop(timer)
    });
    now
}

/// One more than `drawn`, or `at_least`, as far as there are so many.
fn next_slice(drawn: usize, total: usize, at_least: usize) -> usize {
    drawn.saturating_add(1).max(at_least).min(total)
}

/// The same callback at every drawing. What `is_long` goes to `call` right after the event that asked for it, so that the event
/// is not held until all has been drawn and laid out; what else comes goes at once. A second long one before that is the same
/// finger touching twice. `call` has to be the same at every drawing.
#[hook]
pub fn use_apart<In: 'static>(call: Callback<In>, is_long: fn(&In) -> bool) -> Callback<In> {
    let waiting = use_mut_ref(|| None::<Timer>);
    let apart = use_memo((), move |()| {
        Callback::from(move |input: In| {
            if !is_long(&input) {
                return call.emit(input);
            }
            if waiting.borrow().is_some() {
                return;
            }
            let (call, done) = (call.clone(), waiting.clone());
            let timer = Timer::once(0, move || {
                drop(done.take());
                call.emit(input);
            });
            waiting.replace(timer);
        })
    });
    (*apart).clone()
}
