//! Keeps the screen lit while someone counts turns with the phone in one hand. Where the browser cannot, the screen goes dark
//! as always.

use js_sys::{Function, Promise, Reflect};
use wasm_bindgen::closure::Closure;
use wasm_bindgen::{JsCast, JsValue};

use std::cell::RefCell;
use std::rc::Rc;

/// The screen stays lit until this is dropped.
pub struct Awake {
    /// What the browser handed out; it may come late.
    held: Rc<RefCell<Held>>,
}

#[derive(Default)]
struct Held {
    lock: Option<JsValue>,
    is_over: bool,
}

impl Awake {
    /// Asks for a lit screen.
    pub fn ask() -> Awake {
        let held = Rc::new(RefCell::new(Held::default()));
        if let Some(promise) = request() {
            let taker = held.clone();
            let taken = Closure::once(move |lock: JsValue| {
                let mut held = taker.borrow_mut();
                if held.is_over {
                    release(&lock);
                } else {
                    held.lock = Some(lock);
                }
            });
            // A refusal (low battery, page hidden) leaves things as they are.
            let refused = Closure::once(|_: JsValue| {});
            let _ = promise.then2(&taken, &refused);
            // The promise calls one of them, once, at a time of its own.
            taken.forget();
            refused.forget();
        }
        Awake { held }
    }
}

impl Drop for Awake {
    fn drop(&mut self) {
        let mut held = self.held.borrow_mut();
        held.is_over = true;
        if let Some(lock) = held.lock.take() {
            release(&lock);
        }
    }
}

fn request() -> Option<Promise> {
    let navigator: JsValue = web_sys::window()?.navigator().into();
    let locks = Reflect::get(&navigator, &"wakeLock".into()).ok()?;
    let ask: Function = Reflect::get(&locks, &"request".into())
        .ok()?
        .dyn_into()
        .ok()?;
    ask.call1(&locks, &"screen".into()).ok()?.dyn_into().ok()
}

fn release(lock: &JsValue) {
    let release = Reflect::get(lock, &"release".into()).ok();
    if let Some(release) = release.and_then(|release| release.dyn_into::<Function>().ok()) {
        // One that is gone already needs no release.
        let _ = release.call0(lock);
    }
}
