//! The large keys under a field, the sign beside it, and the way back on every screen, in the browser. Elsewhere this file is empty.
#![cfg(target_arch = "wasm32")]

use std::cell::RefCell;
use std::rc::Rc;
use std::time::Duration;

use lowside::app::keypad::Keypad;
use lowside::app::parts::{Entry, MeasureField, OwnKeys};
use lowside::app::platform::focus::Named;
use lowside::app::route::Route;
use lowside::app::state::{Action, State};
use lowside::app::undo::Undo;
use lowside::quantity::{DecimalMark, Measure, Typed, Unit as MeasureUnit};
use lowside::readings::instrument::usual_instruments;
use lowside::record::{Settings, Theme, Visit};
use lowside::unit::Unit;
use lowside::yard::YardSheet;
use wasm_bindgen_test::{wasm_bindgen_test, wasm_bindgen_test_configure};
use web_sys::wasm_bindgen::JsCast;
use web_sys::{Element, HtmlElement, HtmlInputElement};
use yew::{AttrValue, Callback, ContextProvider, Html, Properties, component, html, use_state};

wasm_bindgen_test_configure!(run_in_browser);

type Last = Rc<RefCell<Vec<Entry>>>;

#[derive(Clone)]
struct Kept(Last);

impl PartialEq for Kept {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

#[derive(Clone, PartialEq, Properties)]
struct BenchProps {
    last: Kept,
    on: bool,
}

/// Two fields, the first of which may be negative, with a parent that keeps what it is told, and the keys.
#[component]
fn Bench(props: &BenchProps) -> Html {
    let entries = use_state(|| vec![Entry::default(); 2]);
    let on = use_state(|| props.on);
    let bar = |value| Measure::new(value, MeasureUnit::Bar).expect("finite");
    let field = |place: usize, range: (Measure, Measure)| {
        let (entries, last) = (entries.clone(), props.last.0.clone());
        let on_entry = {
            let entries = entries.clone();
            Callback::from(move |entry: Entry| {
                let mut next = (*entries).clone();
                next[place] = entry;
                last.replace(next.clone());
                entries.set(next);
            })
        };
        html! {
            <MeasureField
                id={format!("bench-{place}")}
                label={format!("Figure {place}")}
                unit={MeasureUnit::Bar}
                {range}
                mark={DecimalMark::Comma}
                typed={AttrValue::from(entries[place].typed.clone())}
                value={entries[place].value}
                {on_entry}
                testid={format!("bench-{place}")}
            />
        }
    };
    let keys = OwnKeys {
        on: *on,
        on_change: {
            let on = on.clone();
            Callback::from(move |now: bool| on.set(now))
        },
    };
    html! {
        <ContextProvider<OwnKeys> context={keys}>
            { field(0, (bar(-20.0), bar(20.0))) }
            { field(1, (bar(0.0), bar(60.0))) }
            <Keypad on={*on} mark={DecimalMark::Comma} />
        </ContextProvider<OwnKeys>>
    }
}

struct Page {
    root: Element,
    last: Last,
}

impl Page {
    async fn open(on: bool) -> Page {
        let document = web_sys::window()
            .and_then(|window| window.document())
            .expect("a page");
        let body = document.body().expect("a body");
        while let Some(old) = document.query_selector(".keys-bench").expect("a selector") {
            old.remove();
        }
        let root = document.create_element("div").expect("an element");
        root.set_class_name("keys-bench");
        body.append_child(&root).expect("room");
        let last: Last = Rc::new(RefCell::new(vec![Entry::default(); 2]));
        let props = BenchProps {
            last: Kept(last.clone()),
            on,
        };
        yew::Renderer::<Bench>::with_root_and_props(root.clone(), props).render();
        let page = Page { root, last };
        page.drawn().await;
        page
    }

    /// Lets the app draw what is due: its scheduler works in tasks of the browser, so some of them are let pass.
    async fn drawn(&self) {
        for _ in 0..10 {
            yew::platform::time::sleep(Duration::ZERO).await;
        }
    }

    fn there(&self, testid: &str) -> bool {
        let found = self
            .root
            .query_selector(&format!("[data-testid='{testid}']"));
        found.expect("a selector").is_some()
    }

    fn find<T: JsCast>(&self, testid: &str) -> T {
        self.root
            .query_selector(&format!("[data-testid='{testid}']"))
            .expect("a selector")
            .unwrap_or_else(|| panic!("no {testid}"))
            .dyn_into()
            .unwrap_or_else(|_| panic!("{testid} is something else"))
    }

    async fn touch(&self, testids: &[&str]) {
        for testid in testids {
            self.find::<HtmlElement>(testid).click();
            self.drawn().await;
        }
    }

    /// As the browser does it, also in a page that is not in front.
    async fn enter(&self, testid: &str) {
        let field: HtmlInputElement = self.find(testid);
        field.focus().expect("a field");
        let document = field.owner_document().expect("a page");
        let event = document.create_event("Event").expect("an event");
        event.init_event_with_bubbles("focusin", true);
        field.dispatch_event(&event).expect("heard");
        self.drawn().await;
    }

    fn text(&self, place: usize) -> String {
        self.find::<HtmlInputElement>(&format!("bench-{place}"))
            .value()
    }

    fn entry(&self, place: usize) -> Entry {
        self.last.borrow()[place].clone()
    }
}

#[wasm_bindgen_test]
async fn a_figure_is_entered_with_the_large_keys() {
    let page = Page::open(true).await;
    assert!(!page.there("keypad"), "no field is being filled in");
    page.enter("bench-1").await;
    let field: HtmlInputElement = page.find("bench-1");
    assert_eq!(field.get_attribute("inputmode").as_deref(), Some("none"));
    page.touch(&["pad-2", "pad-4", "pad-mark", "pad-6", "pad-delete", "pad-5"])
        .await;
    assert_eq!(page.text(1), "24,5");
    assert_eq!(page.entry(1).value.map(Measure::base), Some(24.5));
    // What is typed on a keyboard goes on where the keys left off.
    assert!(!page.there("pad-sign"), "a charge pressure is not negative");

    page.touch(&["pad-unit", "pad-unit-psi"]).await;
    let value = page.entry(1).value.map(Measure::base).expect("readable");
    assert!((value - 24.5 * 0.068_947_57).abs() < 1e-5, "{value}");
    page.touch(&["pad-done"]).await;
    assert!(!page.there("keypad"));
    assert!(page.text(1).starts_with("24,5"), "nothing typed is lost");
}

#[wasm_bindgen_test]
async fn next_goes_to_the_next_field_and_the_sign_is_there_where_it_makes_sense() {
    let page = Page::open(true).await;
    page.enter("bench-0").await;
    page.touch(&["pad-1", "pad-2", "pad-sign"]).await;
    assert_eq!(page.entry(0).value.map(Measure::base), Some(-12.0));
    page.touch(&["pad-next"]).await;
    let document = web_sys::window()
        .and_then(|window| window.document())
        .expect("a page");
    let at = document.active_element().map(|element| element.id());
    assert_eq!(at.as_deref(), Some("bench-1"));
}

#[wasm_bindgen_test]
async fn the_sign_and_the_keys_stand_beside_the_field() {
    let page = Page::open(false).await;
    page.enter("bench-0").await;
    assert!(!page.there("keypad"));
    let field: HtmlInputElement = page.find("bench-0");
    assert_eq!(field.get_attribute("inputmode").as_deref(), Some("decimal"));
    field.set_value("12");
    let document = field.owner_document().expect("a page");
    let event = document.create_event("Event").expect("an event");
    event.init_event_with_bubbles("input", true);
    field.dispatch_event(&event).expect("heard");
    page.drawn().await;
    page.touch(&["sign-bench-0"]).await;
    assert_eq!(page.entry(0).value.map(Measure::base), Some(-12.0));
    page.touch(&["sign-bench-0"]).await;
    assert_eq!(page.entry(0).value.map(Measure::base), Some(12.0));
    assert!(!page.there("sign-bench-1"));

    page.touch(&["keys-bench-0"]).await;
    assert!(
        page.there("keypad"),
        "at once, on the field that has the keyboard"
    );
    page.touch(&["keys-bench-0"]).await;
    assert!(!page.there("keypad"));
}

fn typing(id: &str, name: &str) -> Option<Named> {
    Some(Named {
        id: id.to_owned(),
        name: name.to_owned(),
        is_typing: true,
    })
}

/// Makes an edit as the app does it.
fn edit(undo: &mut Undo, state: State, action: Action, at: Option<Named>) -> State {
    undo.remember(&state, &action, at);
    state.after(action)
}

#[wasm_bindgen_test]
fn an_edit_of_a_sheet_is_taken_back_and_typing_in_one_field_is_one_step() {
    let visit = |hours: &str| Visit {
        id: "v1".to_owned(),
        unit: "u1".to_owned(),
        yard: Some(YardSheet::default()),
        hours: Typed {
            typed: hours.to_owned(),
            value: None,
        },
        ..Visit::default()
    };
    let put = |hours: &str| Action::PutVisit(Box::new(visit(hours)));
    let mut undo = Undo::default();
    let mut state = State::default()
        .after(put(""))
        .after(Action::Go(Route::Yard("v1".to_owned())));
    for hours in ["4", "41", "412"] {
        state = edit(
            &mut undo,
            state,
            put(hours),
            typing("hours", "Hour meter, h"),
        );
    }
    state = edit(&mut undo, state, put("9"), typing("other", "Other"));
    assert_eq!(undo.next(&state.route).as_deref(), Some("Other"));
    let mut hours = Vec::new();
    while let Some((action, _)) = undo.back(&state) {
        state = state.after(action);
        hours.push(state.visits["v1"].hours.typed.clone());
    }
    assert_eq!(hours, ["412", ""]);
    assert_eq!(undo.next(&state.route), None);
}

#[wasm_bindgen_test]
fn units_and_settings_are_taken_back_on_their_own_screens_and_a_call_has_its_own_way_back() {
    let unit = |name: &str| Unit {
        id: "u1".to_owned(),
        name: name.to_owned(),
        ..Unit::default()
    };
    let mut undo = Undo::default();
    let mut state = State::default()
        .after(Action::PutUnit(unit("T-1")))
        .after(Action::Go(Route::Unit("u1".to_owned())));
    state = edit(&mut undo, state, Action::PutUnit(unit("T-2")), None);
    // The same once more changes nothing.
    state = edit(&mut undo, state, Action::PutUnit(unit("T-2")), None);
    let (action, words) = undo.back(&state).expect("a step");
    assert_eq!(words, "last change");
    state = state.after(action);
    assert_eq!(state.units["u1"].name, "T-1");
    assert!(undo.back(&state).is_none());

    let sun = Settings {
        theme: Theme::Sun,
        ..Settings::default()
    };
    // In passing on another screen: no edit of the settings.
    state = edit(&mut undo, state, Action::PutSettings(sun.clone()), None);
    assert_eq!(undo.next(&state.route), None);
    state = state.after(Action::Go(Route::Settings));
    state = edit(
        &mut undo,
        state,
        Action::PutSettings(Settings::default()),
        None,
    );
    // A list of instruments is an edit of the settings too.
    state = edit(
        &mut undo,
        state,
        Action::PutInstruments(usual_instruments()),
        None,
    );
    assert!(!state.settings.instruments.is_empty());
    let (action, _) = undo.back(&state).expect("a step");
    state = state.after(action);
    assert!(state.settings.instruments.is_empty());
    let (action, _) = undo.back(&state).expect("a step");
    state = state.after(action);
    assert_eq!(state.settings.theme, Theme::Sun);

    let visit = |note: &str| Visit {
        id: "v1".to_owned(),
        unit: "u1".to_owned(),
        note: note.to_owned(),
        ..Visit::default()
    };
    let put = |note: &str| Action::PutVisit(Box::new(visit(note)));
    state = state
        .after(put(""))
        .after(Action::Go(Route::Call("v1".to_owned())));
    state = edit(&mut undo, state, put("on the call"), None);
    assert_eq!(undo.next(&state.route), None);
    state = state.after(Action::Go(Route::Bench("v1".to_owned())));
    state = edit(&mut undo, state, put("on the sheet"), None);
    let (action, _) = undo.back(&state).expect("a step");
    state = state.after(action);
    assert_eq!(state.visits["v1"].note, "on the call");
    // Another screen, another list.
    assert!(undo.next(&Route::Units).is_none());
}
