//! What does the app's deeds: the one place where state, shelf, engine and browser meet.

use std::cell::RefCell;
use std::collections::BTreeMap;
use std::rc::Rc;

use yew::UseReducerDispatcher;

use super::deed::{Deed, Snapshot};
use super::engine::client::{Engine, Told};
use super::persist::Keeper;
use super::platform::{clock, focus, ids, offline, persistence, timer::Timer};
use super::route::Route;
use super::screens::unit::usual_paths;
use super::screens::units::forget_draft;
use super::state::{About, Action, Question, Save, State, Written};
use super::undo::Undo;
use crate::record::{IdOf, Settings, Visit};
use crate::store::RecordKey;
use crate::unit::{MachineClass, Ticks, Unit};
use crate::yard::Leg;

/// From the last edit to the write.
const SAVE_AFTER_MS: i32 = 300;
/// Units of the list about which the engine is asked unbidden.
const ASKED_AT_ONCE: usize = 12;
/// From a write that failed to the next.
const RETRY_AFTER_MS: i32 = 10_000;

/// Does what screens ask for.
pub struct Hands {
    keeper: Rc<RefCell<Keeper>>,
    engine: Engine,
    dispatcher: UseReducerDispatcher<Snapshot>,
    latest: RefCell<Rc<State>>,
    /// The write to come, and whether it is the quick one.
    save: RefCell<Option<(Option<Timer>, bool)>>,
    asked: RefCell<BTreeMap<String, Question>>,
    undo: RefCell<Undo>,
}

impl Hands {
    /// Hands for this page.
    pub fn new(
        keeper: Rc<RefCell<Keeper>>,
        dispatcher: UseReducerDispatcher<Snapshot>,
        state: Rc<State>,
    ) -> Rc<Hands> {
        let telling = dispatcher.clone();
        let engine = Engine::new(move |told| {
            telling.dispatch(match told {
                Told::Answer(answer) => Action::Answered(answer),
                Told::Trouble(why) => Action::EngineFailed(why),
            });
        });
        Rc::new(Hands {
            keeper,
            engine,
            dispatcher,
            latest: RefCell::new(state),
            save: RefCell::new(None),
            asked: RefCell::new(BTreeMap::new()),
            undo: RefCell::default(),
        })
    }

    /// The shelf, for lists that the state does not hold.
    pub fn keeper(&self) -> Rc<RefCell<Keeper>> {
        self.keeper.clone()
    }

    /// The engine, for sheets that a screen wants worked out.
    pub fn engine(&self) -> Engine {
        self.engine.clone()
    }

    /// What the next step back would take back on this screen.
    pub fn undoable(&self, route: &Route) -> Option<String> {
        self.undo.borrow().next(route)
    }

    /// Sends an action to the state.
    pub fn put(&self, action: Action) {
        self.dispatcher.dispatch(action);
    }

    fn put_all(&self, actions: Vec<Action>) {
        for action in actions {
            self.put(action);
        }
    }

    fn state(&self) -> Rc<State> {
        self.latest.borrow().clone()
    }

    /// Takes note of the state as it is now; plans the write and asks the engine where something changed.
    pub fn look(self: &Rc<Self>, state: Rc<State>) {
        let before = self.latest.replace(state.clone());
        let is_failed = matches!(state.save, Save::Failed(_));
        if state.edits != before.edits {
            self.plan_write(true);
        } else if is_failed && state.is_write_due() {
            self.plan_write(false);
        }
        self.ask_engine(&state);
    }

    fn plan_write(self: &Rc<Self>, is_quick: bool) {
        let mut save = self.save.borrow_mut();
        if matches!(*save, Some((_, planned_quick)) if planned_quick || !is_quick) {
            return;
        }
        let hands = self.clone();
        let after = if is_quick {
            SAVE_AFTER_MS
        } else {
            RETRY_AFTER_MS
        };
        *save = Some((Timer::once(after, move || hands.flush()), is_quick));
    }

    /// Writes what is due, now.
    pub fn flush(self: &Rc<Self>) {
        let planned = self.save.borrow_mut().take();
        drop(planned);
        let state = self.state();
        if !state.is_write_due() {
            return;
        }
        let actions = self.keeper.borrow_mut().flush(&state);
        let wrote_a_call = actions.iter().any(|action| {
            matches!(action, Action::Saved(written) if written.iter().any(|record| {
                matches!(record, Written::Visit(visit) if !visit.readings.is_empty() || !visit.observations.is_empty())
            }))
        });
        self.put_all(actions);
        if wrote_a_call && !state.settings.first_run.keeping_asked {
            self.ask_to_keep();
        }
    }

    /// True where closing the page now would lose something that was typed.
    pub fn would_lose(&self) -> bool {
        let state = self.state();
        let is_unwritten = !state.contested.is_empty() || matches!(state.save, Save::Failed(_));
        is_unwritten || state.memory_only && !state.units.is_empty()
    }

    fn ask_engine(&self, state: &State) {
        match &state.route {
            Route::Call(id) | Route::Report(id) => {
                let is_call = |question: &Question| !question.visit.is_yard_check();
                if let Some(question) = state.question(id).filter(is_call)
                    && self.is_news(state, &question)
                {
                    self.engine.ask(question);
                }
            }
            Route::Units => {
                // Only what stands at the top of the list: nobody waits for hundreds of answers.
                for listed in state.listed("").into_iter().take(ASKED_AT_ONCE) {
                    self.ask_about(state, listed.last);
                }
            }
            Route::Unit(unit) => self.ask_about_last(state, unit),
            // The neutral, the tracking and the yard check are worked out on their own screens.
            Route::Neutral(_)
            | Route::Tracking(_)
            | Route::Bench(_)
            | Route::Yard(_)
            | Route::Wear(_)
            | Route::Learned
            | Route::Tags(_)
            | Route::Tag(_)
            | Route::Settings => {}
        }
    }

    fn ask_about_last(&self, state: &State, unit: &str) {
        self.ask_about(state, state.visits_of(unit).into_iter().next());
    }

    fn ask_about(&self, state: &State, last: Option<Rc<Visit>>) {
        let open = last.filter(|visit| visit.closed.is_none());
        let has_content = |visit: &Rc<Visit>| {
            !visit.observations.is_empty()
                || visit.readings.iter().any(|reading| reading.seen.is_some())
        };
        if let Some(visit) = open.filter(has_content)
            && let Some(question) = state.question(&visit.id)
            && self.is_news(state, &question)
        {
            self.engine.ask_later(question);
        }
    }

    /// True where this was neither asked nor answered yet; it counts as asked from now on.
    fn is_news(&self, state: &State, question: &Question) -> bool {
        let id = &question.visit.id;
        let is_answered = state
            .answers
            .get(id)
            .is_some_and(|answer| answer.asked == *question);
        let before = self.asked.borrow_mut().insert(id.clone(), question.clone());
        !is_answered && before.as_ref() != Some(question)
    }

    /// Does a deed.
    pub fn act(self: &Rc<Self>, deed: Deed) {
        match deed {
            Deed::Put(action) => {
                self.undo
                    .borrow_mut()
                    .remember(&self.state(), &action, focus::named());
                self.put(action);
            }
            Deed::OwnKeys(on) => {
                let settings = (*self.state().settings).clone();
                self.put(Action::PutSettings(Settings {
                    own_keys: on,
                    ..settings
                }));
            }
            Deed::Undo => {
                let step = self.undo.borrow_mut().back(&self.state());
                if let Some((action, words)) = step {
                    self.put(action);
                    self.put(Action::Say(format!("Undone: {words}.")));
                }
            }
            Deed::NewUnit { name, class, start } => self.new_unit(&name, class, start),
            Deed::StartCall(unit) => self.start_call(unit),
            Deed::StartYardCheck(unit, leg) => self.start_yard_check(unit, leg),
            Deed::RemoveUnit(id) => self.remove_unit(&id),
            Deed::RemoveVisit(id) => {
                self.flush();
                self.take_away(&[RecordKey::Visit(id)], "The call was removed.");
            }
            Deed::KeepMineAsCopy(key) => self.keep_mine(&key),
            Deed::LoadTheirs(key) => {
                self.put(Action::Settled(key.clone()));
                let action = self.keeper.borrow_mut().theirs(&key);
                self.put(action);
            }
            Deed::Archive(before) => super::exchange::archive(self, before),
            Deed::RemoveArchived(ids) => {
                self.flush();
                let count = super::exchange::count(ids.len(), "call");
                let keys: Vec<RecordKey> = ids.into_iter().map(RecordKey::Visit).collect();
                let actions = self.keeper.borrow_mut().delete(&keys);
                self.put_all(actions);
                self.put(Action::Say(format!(
                    "{count} removed. The archive has them."
                )));
            }
            Deed::Export => super::exchange::export(self),
            Deed::Import(plan, with_settings) => {
                super::exchange::import(self, &plan, with_settings)
            }
            Deed::Restore(trashed) => {
                let actions = self.keeper.borrow_mut().restore(&trashed);
                self.put_all(actions);
                self.put(Action::Say("Brought back.".to_owned()));
            }
            Deed::EmptyTrash => {
                let actions = self.keeper.borrow_mut().empty_trash();
                self.put_all(actions);
                self.put(Action::Say("The trash is empty.".to_owned()));
            }
            Deed::HandOverUnread(entry) => {
                let text = self.keeper.borrow().quarantined_text(&entry);
                super::exchange::hand_over_unread(self, &entry, text);
            }
            Deed::LoadDemo => super::exchange::load_demo(self),
            Deed::RemoveDemo => super::exchange::remove_demo(self),
            Deed::AskToKeep => self.ask_to_keep(),
            Deed::Update => {
                self.flush();
                offline::apply_update();
            }
        }
    }

    /// The state as it is now, and the shelf, for the exchange of files.
    pub fn now(&self) -> Rc<State> {
        self.state()
    }

    fn new_unit(self: &Rc<Self>, name: &str, class: MachineClass, start: bool) {
        let unit = Unit {
            id: ids::fresh(IdOf::Unit),
            name: free_name(name, &self.state()),
            class,
            ticks: Ticks {
                paths: usual_paths(class),
                ..Ticks::default()
            },
            ..Unit::default()
        };
        let id = unit.id.clone();
        self.put(Action::PutUnit(unit));
        forget_draft();
        if start {
            self.start_call(id);
        } else {
            go(&Route::Unit(id));
        }
    }

    fn start_call(&self, unit: String) {
        let visit = Visit {
            id: ids::fresh(IdOf::Visit),
            unit,
            opened: clock::now(),
            ..Visit::default()
        };
        let route = Route::Call(visit.id.clone());
        self.put(Action::PutVisit(Box::new(visit)));
        go(&route);
    }

    fn start_yard_check(&self, unit: String, leg: Leg) {
        let visits = self.state().visits_of(&unit);
        let last = visits.iter().find(|visit| visit.is_yard_check());
        let id = ids::fresh(IdOf::Visit);
        let visit = super::yard::start(id, unit, clock::now(), leg, last.map(|visit| &**visit));
        let route = Route::Yard(visit.id.clone());
        self.put(Action::PutVisit(Box::new(visit)));
        go(&route);
    }

    fn remove_unit(self: &Rc<Self>, id: &str) {
        // What was typed last goes to the trash with the rest.
        self.flush();
        let state = self.state();
        let mut keys: Vec<RecordKey> = state
            .visits_of(id)
            .iter()
            .map(|visit| RecordKey::Visit(visit.id.clone()))
            .collect();
        keys.push(RecordKey::Unit(id.to_owned()));
        let words = format!(
            "{} was removed. Settings keep it in the trash.",
            state.name_of(&RecordKey::Unit(id.to_owned()))
        );
        self.take_away(&keys, &words);
        go(&Route::Units);
    }

    fn take_away(&self, keys: &[RecordKey], words: &str) {
        let actions = self.keeper.borrow_mut().trash(keys);
        self.put_all(actions);
        self.put(Action::Say(words.to_owned()));
    }

    /// Mine goes on under a new id; then what stands on the shelf is shown under the old one.
    fn keep_mine(&self, key: &RecordKey) {
        let state = self.state();
        let copy = match key {
            RecordKey::Unit(id) => state.units.get(id).map(|unit| {
                Action::PutUnit(Unit {
                    id: ids::fresh(IdOf::Unit),
                    name: format!("{} (copy)", unit.name),
                    ..(**unit).clone()
                })
            }),
            RecordKey::Visit(id) => state.visits.get(id).map(|visit| {
                Action::PutVisit(Box::new(Visit {
                    id: ids::fresh(IdOf::Visit),
                    ..(**visit).clone()
                }))
            }),
            RecordKey::Settings => {
                let actions = self.keeper.borrow_mut().overwrite_settings(&state);
                self.put(Action::Settled(key.clone()));
                self.put_all(actions);
                return;
            }
        };
        let Some(copy) = copy else { return };
        let route = match &copy {
            Action::PutVisit(visit) => Some(Route::Call(visit.id.clone())),
            Action::PutUnit(unit) => Some(Route::Unit(unit.id.clone())),
            _ => None,
        };
        self.put(copy);
        self.put(Action::Settled(key.clone()));
        let theirs = self.keeper.borrow_mut().theirs(key);
        self.put(theirs);
        self.put(Action::Say("Yours is kept as a copy.".to_owned()));
        if let Some(route) = route {
            go(&route);
        }
    }

    fn ask_to_keep(&self) {
        let mut settings = (*self.state().settings).clone();
        settings.first_run.keeping_asked = true;
        self.put(Action::PutSettings(settings));
        let dispatcher = self.dispatcher.clone();
        persistence::ask(move |keeping| dispatcher.dispatch(Action::Keeping(keeping)));
    }

    /// Tells trouble in a notice.
    pub fn trouble(&self, text: String) {
        self.put(Action::Tell(About::Trouble, text));
    }
}

/// The name typed, or the next free "No. 3" where none was.
fn free_name(typed: &str, state: &State) -> String {
    let typed = typed.trim();
    if !typed.is_empty() {
        return typed.to_owned();
    }
    let is_taken = |name: &str| state.units.values().any(|unit| unit.name == name);
    let free = (1..)
        .map(|number| format!("No. {number}"))
        .find(|name| !is_taken(name));
    free.unwrap_or_else(|| "No name".to_owned())
}

/// Goes to a screen by the address, so that the back key comes back.
pub fn go(route: &Route) {
    if let Some(window) = web_sys::window()
        && let Err(error) = window.location().set_hash(&route.href())
    {
        web_sys::console::warn_1(&error);
    }
}
