//! The worker's side: takes a question, answers it.

use core::cell::RefCell;

use serde::Deserialize;
use wasm_bindgen::closure::Closure;
use wasm_bindgen::{JsCast, JsValue};
use web_sys::{DedicatedWorkerGlobalScope, MessageEvent};

use super::Reply;
use crate::ranking::Session;
use crate::readings::instrument::Instrument;
use crate::record::Visit;
use crate::unit::Unit;

/// What the page asks.
#[derive(Deserialize)]
struct Request {
    seq: u32,
    unit: Unit,
    visit: Visit,
    instruments: Vec<Instrument>,
}

/// Answers every message from now on, if this is a worker.
pub fn install() {
    let Ok(scope) = js_sys::global().dyn_into::<DedicatedWorkerGlobalScope>() else {
        return;
    };
    let answering = scope.clone();
    let session = RefCell::new(Session::default());
    let on_message = Closure::wrap(Box::new(move |event: MessageEvent| {
        let text = event.data().as_string().unwrap_or_default();
        answer(&answering, &mut session.borrow_mut(), &text);
    }) as Box<dyn FnMut(MessageEvent)>);
    // As a listener, because the start-up script hands over messages that came early as events.
    if let Err(error) =
        scope.add_event_listener_with_callback("message", on_message.as_ref().unchecked_ref())
    {
        web_sys::console::warn_1(&error);
    }
    // It listens as long as the worker lives.
    on_message.forget();
    post(&scope, &Reply::READY);
}

fn post(scope: &DedicatedWorkerGlobalScope, reply: &Reply) {
    if let Ok(json) = serde_json::to_string(reply)
        && let Err(error) = scope.post_message(&JsValue::from_str(&json))
    {
        web_sys::console::warn_1(&error);
    }
}

/// Answers a question: the assessment at once, then with the advice.
fn answer(scope: &DedicatedWorkerGlobalScope, session: &mut Session, text: &str) {
    let request = match serde_json::from_str::<Request>(text) {
        Ok(request) => request,
        Err(error) => {
            let error = Some(error.to_string());
            return post(
                scope,
                &Reply {
                    error,
                    ..Reply::READY
                },
            );
        }
    };
    let Request {
        seq,
        unit,
        visit,
        instruments,
    } = request;
    let assessment = session.assess(&unit, &visit, &instruments);
    let mut reply = Reply {
        seq,
        assessment: Some(assessment),
        error: None,
        more: true,
    };
    post(scope, &reply);
    if let Some(assessment) = &mut reply.assessment {
        assessment.advice = Some(crate::next::advise(
            &unit,
            &visit,
            &instruments,
            assessment,
            session.heavy(),
        ));
    }
    reply.more = false;
    post(scope, &reply);
}
