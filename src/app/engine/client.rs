//! The page's side: one worker, the latest question about the open call first, the others after it one by one.

use std::cell::RefCell;
use std::collections::{BTreeMap, VecDeque};
use std::rc::Rc;

use serde::Serialize;
use wasm_bindgen::JsValue;
use web_sys::{MessageEvent, Worker, WorkerOptions, WorkerType};

use super::{Asked, Reply};
use crate::app::platform::listen::Listener;
use crate::app::platform::timer::Timer;
use crate::app::state::{Answer, Question};
use crate::neutral::report::{Report, report};
use crate::record::NeutralSheet;
use crate::unit::Unit;

/// A worker that dies is started again so many times.
const RESTARTS: u32 = 1;
/// Edits that follow each other faster than this are asked about once.
const SETTLE_MS: i32 = 120;

/// What the engine tells the app.
pub enum Told {
    /// An answer.
    Answer(Box<Answer>),
    /// There will be none, and why.
    Trouble(String),
}

#[derive(Serialize)]
struct Request<'a> {
    seq: u32,
    unit: &'a crate::unit::Unit,
    visit: &'a crate::record::Visit,
    instruments: &'a [crate::readings::instrument::Instrument],
    rates: &'a crate::yard::learn::Rates,
}

#[derive(Serialize)]
struct SheetRequest<'a> {
    seq: u32,
    unit: &'a Unit,
    sheet: &'a NeutralSheet,
}

/// A neutral sheet that is being worked out.
struct Sheet {
    unit: Rc<Unit>,
    sheet: Rc<NeutralSheet>,
    tell: Box<dyn FnOnce(Report)>,
}

impl Sheet {
    /// Works it out on the page, where there is no worker.
    fn on_page(self) {
        (self.tell)(report(&self.unit, &self.sheet));
    }
}

enum Place {
    /// Nothing started yet.
    Idle,
    /// In a worker.
    Worker(Running),
    /// On the page itself: the browser has no module workers.
    Page,
}

struct Running {
    worker: Worker,
    _listeners: Vec<Option<Listener>>,
}

impl Drop for Running {
    fn drop(&mut self) {
        self.worker.terminate();
    }
}

struct Inner {
    place: Place,
    /// The worker at hand has said that it is there.
    ready: bool,
    restarts: u32,
    seq: u32,
    asked: Option<(u32, Question)>,
    open: Option<Question>,
    others: VecDeque<Question>,
    sheets: BTreeMap<u32, Sheet>,
    settle: Option<Timer>,
    /// Answers that were read and not yet handed on, and the turn for the first of them.
    read: VecDeque<Reply>,
    turn: Option<Timer>,
    tell: Rc<dyn Fn(Told)>,
}

/// Asks the engine. Cloning it gives another handle on the same worker.
#[derive(Clone)]
pub struct Engine(Rc<RefCell<Inner>>);

impl PartialEq for Engine {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

impl Engine {
    /// An engine that tells its answers to `tell`. The worker starts with the first question.
    pub fn new(tell: impl Fn(Told) + 'static) -> Engine {
        Engine(Rc::new(RefCell::new(Inner {
            place: Place::Idle,
            ready: false,
            restarts: 0,
            seq: 0,
            asked: None,
            open: None,
            others: VecDeque::new(),
            sheets: BTreeMap::new(),
            settle: None,
            read: VecDeque::new(),
            turn: None,
            tell: Rc::new(tell),
        })))
    }

    /// Asks about the open call. An older question about it is dropped, also where it was begun.
    pub fn ask(&self, question: Question) {
        let engine = self.clone();
        let mut inner = self.0.borrow_mut();
        inner.open = Some(question);
        inner.settle = Timer::once(SETTLE_MS, move || engine.next());
    }

    /// Asks about another call, when there is nothing else to do.
    pub fn ask_later(&self, question: Question) {
        {
            let mut inner = self.0.borrow_mut();
            let is_same = |other: &Question| other.visit.id == question.visit.id;
            inner.others.retain(|other| !is_same(other));
            inner.others.push_back(question);
        }
        self.next();
    }

    /// Works a neutral sheet out and tells what it says. Sheets and calls do not wait for one another's turn on the page.
    pub fn neutral(
        &self,
        unit: Rc<Unit>,
        sheet: Rc<NeutralSheet>,
        tell: impl FnOnce(Report) + 'static,
    ) {
        let seq = self.number();
        let json = serde_json::to_string(&Asked::<(), _>::Neutral(SheetRequest {
            seq,
            unit: &unit,
            sheet: &sheet,
        }));
        let asked = Sheet {
            unit,
            sheet,
            tell: Box::new(tell),
        };
        if json.is_ok_and(|json| self.post(&json)) {
            self.0.borrow_mut().sheets.insert(seq, asked);
        } else {
            asked.on_page();
        }
    }

    fn number(&self) -> u32 {
        let mut inner = self.0.borrow_mut();
        // 0 is the worker's own sign that it is there.
        inner.seq = inner.seq.wrapping_add(1).max(1);
        inner.seq
    }

    /// Begins the next question if none is being worked on.
    fn next(&self) {
        let request = {
            let mut inner = self.0.borrow_mut();
            let open = inner.open.take();
            if open.is_some()
                && let Some((_, begun)) = inner.asked.take()
                && open.as_ref().is_none_or(|o| o.visit.id != begun.visit.id)
            {
                // Called off in the worker, so it has to be asked again.
                inner.others.push_front(begun);
            }
            if inner.asked.is_some() {
                return;
            }
            let Some(question) = open.or_else(|| inner.others.pop_front()) else {
                return;
            };
            question
        };
        let seq = self.number();
        self.0.borrow_mut().asked = Some((seq, request.clone()));
        self.send(seq, &request);
    }

    fn send(&self, seq: u32, question: &Question) {
        let json = serde_json::to_string(&Asked::<_, ()>::Call(Request {
            seq,
            unit: &question.unit,
            visit: &question.visit,
            instruments: &question.instruments,
            rates: &question.rates,
        }));
        let Ok(json) = json else {
            return self.give_up("The unit could not be handed to the calculation.");
        };
        if !self.post(&json) {
            self.on_page(seq, question.clone());
        }
    }

    /// Hands a message to the worker, which is started first where there is none; false where there can be none.
    fn post(&self, json: &str) -> bool {
        if matches!(self.0.borrow().place, Place::Idle) {
            let place = self.start().map_or(Place::Page, Place::Worker);
            self.0.borrow_mut().place = place;
        }
        match &self.0.borrow().place {
            Place::Worker(running) => running
                .worker
                .post_message(&JsValue::from_str(json))
                .is_ok(),
            _ => false,
        }
    }

    /// Calculates on the page, after what was just typed has been drawn.
    fn on_page(&self, seq: u32, question: Question) {
        let engine = self.clone();
        let timer = Timer::once(SETTLE_MS, move || {
            let mut session = crate::ranking::Session::default();
            session.learn((*question.rates).clone());
            let mut assessment =
                session.assess(&question.unit, &question.visit, &question.instruments);
            assessment.advice = Some(crate::next::advise(
                &question.unit,
                &question.visit,
                &question.instruments,
                &assessment,
                session.heavy(),
            ));
            engine.take(Reply {
                seq,
                assessment: Some(assessment),
                ..Reply::READY
            });
        });
        self.0.borrow_mut().settle = timer;
    }

    fn start(&self) -> Option<Running> {
        let root = web_sys::window()?.document()?.document_element()?;
        if root.get_attribute("data-worker").as_deref() == Some("no") {
            return None;
        }
        let encode = |name: &str| {
            let address = root.get_attribute(name)?;
            Some(String::from(js_sys::encode_uri_component(&address)))
        };
        let address = format!(
            "worker.js?js={}&wasm={}",
            encode("data-js")?,
            encode("data-wasm")?
        );
        let options = WorkerOptions::new();
        options.set_type(WorkerType::Module);
        let worker = Worker::new_with_options(&address, &options).ok()?;
        let (heard, died) = (self.clone(), self.clone());
        let listeners = vec![
            Listener::at(worker.clone(), "message", move |event| heard.hear(&event)),
            Listener::at(worker.clone(), "error", move |_| died.revive()),
        ];
        Some(Running {
            worker,
            _listeners: listeners,
        })
    }

    fn hear(&self, event: &web_sys::Event) {
        let event: &MessageEvent = wasm_bindgen::JsCast::unchecked_ref(event);
        let text = event.data().as_string().unwrap_or_default();
        match serde_json::from_str::<Reply>(&text) {
            Ok(reply) if reply.is_ready() => self.0.borrow_mut().ready = true,
            Ok(reply) => self.read(reply),
            Err(_) => self.give_up("The answer of the calculation could not be read."),
        }
    }

    /// Lays an answer on the pile. Reading a long one takes as long as drawing it: a turn for each, with keys heard in between.
    fn read(&self, reply: Reply) {
        self.0.borrow_mut().read.push_back(reply);
        self.next_turn();
    }

    fn next_turn(&self) {
        let engine = self.clone();
        let mut inner = self.0.borrow_mut();
        if inner.turn.is_none() && !inner.read.is_empty() {
            inner.turn = Timer::once(0, move || engine.take_turn());
        }
    }

    fn take_turn(&self) {
        let reply = {
            let mut inner = self.0.borrow_mut();
            inner.turn = None;
            inner.read.pop_front()
        };
        if let Some(mut reply) = reply {
            match reply.neutral.take() {
                Some(found) => self.worked_out(reply.seq, *found),
                None => self.take(reply),
            }
        }
        self.next_turn();
    }

    fn worked_out(&self, seq: u32, found: Report) {
        let asked = self.0.borrow_mut().sheets.remove(&seq);
        if let Some(asked) = asked {
            (asked.tell)(found);
        }
    }

    fn take(&self, reply: Reply) {
        let (asked, tell) = {
            let mut inner = self.0.borrow_mut();
            let is_of_now = inner.asked.as_ref().is_some_and(|a| a.0 == reply.seq);
            // Until the advice has come too, the question stays open.
            let asked = match (is_of_now, reply.more) {
                (false, _) => None,
                (true, true) => inner.asked.clone(),
                (true, false) => inner.asked.take(),
            };
            if reply.error.is_some() {
                inner.asked = None;
            }
            (asked, inner.tell.clone())
        };
        match (asked, reply.assessment, reply.error) {
            (Some((_, question)), Some(assessment), _) => {
                self.0.borrow_mut().restarts = 0;
                tell(Told::Answer(Box::new(Answer {
                    asked: question,
                    assessment: Rc::new(assessment),
                })));
            }
            (_, _, Some(error)) => tell(Told::Trouble(format!(
                "The calculation did not understand what was asked: {error}"
            ))),
            _ => {}
        }
        self.next();
    }

    /// The worker stopped: it is started once more and asked the same again. One that cannot even be loaded is replaced by
    /// the page.
    fn revive(&self) {
        // Whatever it died of, a sheet is worked out: here.
        let sheets = std::mem::take(&mut self.0.borrow_mut().sheets);
        for sheet in sheets.into_values() {
            sheet.on_page();
        }
        let (again, was_ready) = {
            let mut inner = self.0.borrow_mut();
            inner.restarts += 1;
            let was_ready = std::mem::take(&mut inner.ready);
            inner.place = if was_ready { Place::Idle } else { Place::Page };
            let again = if inner.restarts > RESTARTS {
                None
            } else {
                inner.asked.clone()
            };
            (again, was_ready)
        };
        match again {
            Some((seq, question)) => self.send(seq, &question),
            None if !was_ready => self.next(),
            None => self.give_up(
                "The calculation stopped twice on these readings. What you typed is kept. Change or remove the last reading, \
                 or reload the page.",
            ),
        }
    }

    fn give_up(&self, why: &str) {
        let tell = {
            let mut inner = self.0.borrow_mut();
            inner.asked = None;
            // The next edit may be the cure: it starts anew.
            inner.place = Place::Idle;
            inner.restarts = 0;
            inner.tell.clone()
        };
        tell(Told::Trouble(why.to_owned()));
    }
}
