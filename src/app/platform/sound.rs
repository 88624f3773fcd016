//! Sound loud enough for beside a running engine, and a buzz where the device can. Off until a person switches it on: a
//! browser gives sound only after a touch, and nobody is startled.

use std::cell::{Cell, RefCell};

use js_sys::{Function, Reflect};
use wasm_bindgen::{JsCast, JsValue};
use web_sys::{AudioContext, OscillatorType};

/// Pitch of the signals, Hz: the small loudspeaker of a phone is loudest at 2 to 4 kHz, above most of an engine's noise.
const PITCH_HZ: f32 = 2600.0;
/// Pitch of the tick at each tap, Hz.
const TICK_HZ: f32 = 3200.0;
/// Full scale of what the device gives.
const LOUD: f32 = 1.0;

thread_local! {
    static WANTED: Cell<bool> = const { Cell::new(false) };
    static CONTEXT: RefCell<Option<AudioContext>> = const { RefCell::new(None) };
}

/// True where a person switched it on.
pub fn is_on() -> bool {
    WANTED.with(Cell::get)
}

/// Switches it on, with a signal to judge the loudness by, or off. To be called from a touch. False where the device gives
/// no sound: then it stays off.
pub fn switch(on: bool) -> bool {
    if !on {
        WANTED.with(|wanted| wanted.set(false));
        return true;
    }
    let has = CONTEXT.with(|context| {
        let mut context = context.borrow_mut();
        if context.is_none() {
            *context = AudioContext::new().ok();
        }
        context.is_some()
    });
    WANTED.with(|wanted| wanted.set(has));
    if has {
        play(&[(0.0, 0.25, PITCH_HZ)]);
    }
    has
}

/// A tap was counted.
pub fn tick() {
    buzz(30);
    play(&[(0.0, 0.06, TICK_HZ)]);
}

/// A tap was taken back: lower.
pub fn undone() {
    play(&[(0.0, 0.12, 1300.0)]);
}

/// The set time is over: five long beeps.
pub fn end() {
    buzz(800);
    let beeps: Vec<_> = (0_u8..5)
        .map(|at| (f64::from(at) * 0.45, 0.3, PITCH_HZ))
        .collect();
    play(&beeps);
}

/// Plays tones: start from now in s, length in s, pitch in Hz. Silent where sound is off or the device will not.
fn play(tones: &[(f64, f64, f32)]) {
    if !is_on() {
        return;
    }
    CONTEXT.with(|context| {
        if let Some(context) = context.borrow().as_ref() {
            // A device that woke from sleep holds its sound back until it is asked again; the answer does not matter.
            let _ = context.resume();
            for (after, length, pitch) in tones {
                let _ = tone(context, *after, *length, *pitch);
            }
        }
    });
}

fn tone(context: &AudioContext, after: f64, length: f64, pitch: f32) -> Result<(), JsValue> {
    let from = context.current_time() + after;
    let gain = context.create_gain()?;
    gain.gain().set_value(LOUD);
    gain.connect_with_audio_node(&context.destination())?;
    let source = context.create_oscillator()?;
    source.set_type(OscillatorType::Square);
    source.frequency().set_value(pitch);
    source.connect_with_audio_node(&gain)?;
    source.start_with_when(from)?;
    source.stop_with_when(from + length)
}

/// Buzzes for so many ms where the device can and sound is on.
fn buzz(milliseconds: u32) {
    if !is_on() {
        return;
    }
    let Some(navigator) = web_sys::window().map(|window| JsValue::from(window.navigator())) else {
        return;
    };
    // Looked for first: many devices have none, and a call of what is not there stops the app.
    let vibrate = Reflect::get(&navigator, &"vibrate".into()).ok();
    if let Some(vibrate) = vibrate.and_then(|vibrate| vibrate.dyn_into::<Function>().ok()) {
        let _ = vibrate.call1(&navigator, &milliseconds.into());
    }
}
