//! The worker's side: takes a question, answers it in steps. Between two steps it hears what else was asked: a newer question
//! calls the older one off.

use core::cell::RefCell;
use std::rc::Rc;

use serde::Deserialize;
use wasm_bindgen::closure::Closure;
use wasm_bindgen::{JsCast, JsValue};
use web_sys::{DedicatedWorkerGlobalScope, MessageEvent};

use super::{Asked, Reply};
use crate::assessment::Assessment;
use crate::neutral::report::report;
use crate::ranking::Session;
use crate::readings::instrument::Instrument;
use crate::record::{NeutralSheet, Visit};
use crate::unit::Unit;
use crate::yard::learn::Rates;

/// What the page asks of a call.
#[derive(Deserialize)]
struct Request {
    seq: u32,
    unit: Unit,
    visit: Visit,
    instruments: Vec<Instrument>,
    #[serde(default)]
    rates: Rates,
}

/// A neutral sheet that the page wants worked out.
#[derive(Deserialize)]
struct Sheet {
    seq: u32,
    unit: Unit,
    sheet: NeutralSheet,
}

/// What is to be done next about the question at hand.
enum Step {
    /// A first look.
    Look(Request),
    /// The full assessment.
    Assess(Request),
    /// The advice.
    Advise(Request, Box<Assessment>),
}

#[derive(Default)]
struct Desk {
    session: Session,
    step: Option<Step>,
}

impl Desk {
    /// Does one step; returns what to say and puts the step after it on the desk.
    fn work(&mut self) -> Option<Reply> {
        match self.step.take()? {
            Step::Look(r) => {
                self.session.learn(r.rates.clone());
                let look = self.session.look(&r.unit, &r.visit, &r.instruments);
                let reply = look.map(|look| answer(r.seq, look, true));
                self.step = Some(Step::Assess(r));
                reply
            }
            Step::Assess(r) => {
                let full = self.session.assess(&r.unit, &r.visit, &r.instruments);
                let reply = answer(r.seq, full.clone(), true);
                self.step = Some(Step::Advise(r, Box::new(full)));
                Some(reply)
            }
            Step::Advise(r, mut full) => {
                full.advice = Some(crate::next::advise(
                    &r.unit,
                    &r.visit,
                    &r.instruments,
                    &full,
                    self.session.heavy(),
                ));
                Some(answer(r.seq, *full, false))
            }
        }
    }
}

fn answer(seq: u32, assessment: Assessment, more: bool) -> Reply {
    Reply {
        seq,
        assessment: Some(assessment),
        more,
        ..Reply::READY
    }
}

fn work_out(asked: &Sheet) -> Reply {
    Reply {
        seq: asked.seq,
        neutral: Some(Box::new(report(&asked.unit, &asked.sheet))),
        ..Reply::READY
    }
}

/// Answers every message from now on, if this is a worker.
pub fn install() {
    let Ok(scope) = js_sys::global().dyn_into::<DedicatedWorkerGlobalScope>() else {
        return;
    };
    let desk = Rc::new(RefCell::new(Desk::default()));
    let on_turn = turns(&scope, desk.clone());
    let hearing = scope.clone();
    let on_message = Closure::wrap(Box::new(move |event: MessageEvent| {
        let text = event.data().as_string().unwrap_or_default();
        match serde_json::from_str::<Asked<Request, Sheet>>(&text) {
            Ok(Asked::Neutral(sheet)) => post(&hearing, &work_out(&sheet)),
            Ok(Asked::Call(request)) => {
                let step = desk.borrow_mut().step.replace(Step::Look(request));
                // One turn is on its way already where a step lay on the desk.
                if step.is_none() {
                    take_turn(&hearing, &on_turn);
                }
            }
            Err(error) => {
                let error = Some(error.to_string());
                post(
                    &hearing,
                    &Reply {
                        error,
                        ..Reply::READY
                    },
                );
            }
        }
    }) as Box<dyn FnMut(MessageEvent)>);
    // As a listener, because the start-up script hands over messages that came early as events.
    if let Err(error) =
        scope.add_event_listener_with_callback("message", on_message.as_ref().unchecked_ref())
    {
        web_sys::console::warn_1(&error);
    }
    // It listens as long as the worker lives.
    on_message.forget();
    crate::app::call_script("lowsideListens", "");
    post(&scope, &Reply::READY);
}

/// The function that does one step and asks for its next turn while there is more to do.
fn turns(scope: &DedicatedWorkerGlobalScope, desk: Rc<RefCell<Desk>>) -> js_sys::Function {
    let scope = scope.clone();
    let own: Rc<RefCell<Option<js_sys::Function>>> = Rc::default();
    let again = own.clone();
    let turn = Closure::wrap(Box::new(move || {
        let mut desk = desk.borrow_mut();
        if let Some(reply) = desk.work() {
            post(&scope, &reply);
        }
        if let (Some(_), Some(turn)) = (&desk.step, &*again.borrow()) {
            take_turn(&scope, turn);
        }
    }) as Box<dyn FnMut()>)
    .into_js_value()
    .unchecked_into::<js_sys::Function>();
    *own.borrow_mut() = Some(turn.clone());
    turn
}

/// Runs a step after the messages that have come meanwhile.
fn take_turn(scope: &DedicatedWorkerGlobalScope, turn: &js_sys::Function) {
    if let Err(error) = scope.set_timeout_with_callback(turn) {
        web_sys::console::warn_1(&error);
    }
}

fn post(scope: &DedicatedWorkerGlobalScope, reply: &Reply) {
    if let Ok(json) = serde_json::to_string(reply)
        && let Err(error) = scope.post_message(&JsValue::from_str(&json))
    {
        web_sys::console::warn_1(&error);
    }
}
