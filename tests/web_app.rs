//! The app's state and parts, in the browser. Elsewhere this file is empty.
#![cfg(target_arch = "wasm32")]

use std::cell::RefCell;
use std::rc::Rc;
use std::time::Duration;

use lowside::app::parts::{Choice, Entry, MeasureField, tick_options};
use lowside::app::route::Route;
use lowside::app::state::{About, Action, Records, Save, State, Written};
use lowside::quantity::{Measure, Unit as MeasureUnit};
use lowside::record::{Settings, UnitOrder, Visit};
use lowside::store::RecordKey;
use lowside::unit::{Tick, Unit};
use wasm_bindgen_test::{wasm_bindgen_test, wasm_bindgen_test_configure};
use web_sys::wasm_bindgen::JsCast;
use web_sys::{Element, HtmlInputElement, HtmlSelectElement};
use yew::{AttrValue, Callback, Html, Properties, component, html, use_state};

wasm_bindgen_test_configure!(run_in_browser);

fn unit(id: &str, name: &str) -> Unit {
    Unit {
        id: id.into(),
        name: name.into(),
        ..Unit::default()
    }
}

fn visit(id: &str, unit: &str, opened: &str) -> Visit {
    Visit {
        id: id.into(),
        unit: unit.into(),
        opened: opened.into(),
        ..Visit::default()
    }
}

fn with(actions: impl IntoIterator<Item = Action>) -> State {
    actions
        .into_iter()
        .fold(State::default(), |state, action| state.after(action))
}

#[wasm_bindgen_test]
fn addresses_lead_back_to_their_screens() {
    for route in [
        Route::Units,
        Route::Settings,
        Route::Unit("u1".into()),
        Route::Call("demo-v.1".into()),
        Route::Neutral("demo-v.1".into()),
    ] {
        assert_eq!(Route::read(&route.href()), route);
    }
    for slip in [
        "",
        "#",
        "#/",
        "#/unit/",
        "#/unit/a/b",
        "#/call/<x>",
        "#/call/<x>/neutral",
        "#/call/a/elsewhere",
        "#/elsewhere",
    ] {
        assert_eq!(Route::read(slip), Route::Units, "{slip}");
    }
}

#[wasm_bindgen_test]
fn an_edit_during_a_write_is_still_to_be_written() {
    let before = with([Action::PutUnit(unit("u1", "T-9"))]);
    assert_eq!(before.save, Save::Pending);
    let written = Written::Unit(before.units["u1"].clone());
    let edited = before.after(Action::PutUnit(unit("u1", "T-90")));

    let late = edited.after(Action::Saved(vec![written.clone()]));
    assert!(late.dirty.contains(&RecordKey::Unit("u1".into())));
    assert_eq!(late.save, Save::Pending);

    let in_time = before.after(Action::Saved(vec![written]));
    assert!(in_time.dirty.is_empty());
    assert_eq!(in_time.save, Save::Saved);
}

#[wasm_bindgen_test]
fn a_failed_write_stays_failed_until_one_goes_well() {
    let state = with([
        Action::PutUnit(unit("u1", "T-9")),
        Action::SaveFailed("full".into()),
        Action::PutUnit(unit("u1", "T-90")),
    ]);
    assert_eq!(state.save, Save::Failed("full".into()));
    let written = Written::Unit(state.units["u1"].clone());
    assert_eq!(state.after(Action::Saved(vec![written])).save, Save::Saved);
}

#[wasm_bindgen_test]
fn a_contested_record_waits_for_the_person() {
    let key = RecordKey::Unit("u1".into());
    let state = with([
        Action::PutUnit(unit("u1", "T-9")),
        Action::Contested(key.clone(), "changed elsewhere".into()),
        Action::Contested(key.clone(), "changed elsewhere".into()),
    ]);
    assert!(!state.is_write_due());
    let conflicts = state
        .notices
        .iter()
        .filter(|notice| notice.about == About::Conflict(key.clone()));
    assert_eq!(conflicts.count(), 1);

    let theirs = state
        .after(Action::Settled(key))
        .after(Action::Loaded(Box::new(Records {
            units: vec![unit("u1", "theirs")],
            ..Records::default()
        })));
    assert!(theirs.notices.is_empty() && theirs.contested.is_empty() && theirs.dirty.is_empty());
    assert_eq!(theirs.units["u1"].name, "theirs");
}

#[wasm_bindgen_test]
fn a_theme_does_not_make_new_instruments() {
    let state = with([Action::PutSettings(Settings::start())]);
    let themed = state.after(Action::PutSettings(Settings {
        theme: lowside::record::Theme::Sun,
        ..Settings::start()
    }));
    assert!(Rc::ptr_eq(&state.instruments, &themed.instruments));
}

#[wasm_bindgen_test]
fn units_stand_in_the_order_that_was_chosen() {
    let order = |unit_order| {
        Action::PutSettings(Settings {
            unit_order,
            ..Settings::start()
        })
    };
    let state = with([
        Action::PutUnit(unit("a", "never called")),
        Action::PutUnit(unit("b", "long ago")),
        Action::PutUnit(unit("c", "lately")),
        Action::PutVisit(Box::new(visit("v1", "b", "2024-01-01T08:00:00Z"))),
        Action::PutVisit(Box::new(visit("v2", "c", "2025-01-01T08:00:00Z"))),
    ]);
    let names = |state: &State| -> Vec<String> {
        let listed = state.listed("");
        listed.iter().map(|one| one.unit.name.clone()).collect()
    };
    let by_call = state.after(order(UnitOrder::LastCall));
    assert_eq!(names(&by_call), ["lately", "long ago", "never called"]);
    let by_name = by_call.after(order(UnitOrder::Name));
    assert_eq!(names(&by_name), ["lately", "long ago", "never called"]);
    // Settled calls press least, whenever they were.
    let mut closed = visit("v2", "c", "2025-01-01T08:00:00Z");
    closed.closed = Some(lowside::record::Closing::default());
    let pressing = by_name
        .after(Action::PutVisit(Box::new(closed)))
        .after(order(UnitOrder::Attention));
    assert_eq!(names(&pressing), ["long ago", "lately", "never called"]);
    let found = pressing.listed("ago");
    assert_eq!(found.len(), 1);
    assert_eq!(found[0].last.as_ref().map(|v| v.id.as_str()), Some("v1"));
}

fn document() -> web_sys::Document {
    web_sys::window()
        .expect("a window")
        .document()
        .expect("a page")
}

/// Where the components under test are put.
fn mount<C>(props: C::Properties) -> Element
where
    C: yew::BaseComponent,
{
    let document = document();
    let root = document.create_element("div").expect("an element");
    document
        .body()
        .expect("a body")
        .append_child(&root)
        .expect("room");
    yew::Renderer::<C>::with_root_and_props(root.clone(), props).render();
    root
}

/// Lets the app draw what is due: its scheduler works in tasks of the browser, so some of them are let pass.
async fn drawn() {
    for _ in 0..10 {
        yew::platform::time::sleep(Duration::ZERO).await;
    }
}

fn find<T: JsCast>(root: &Element, selector: &str) -> T {
    root.query_selector(selector)
        .expect("a selector")
        .unwrap_or_else(|| panic!("no {selector} in {}", root.inner_html()))
        .dyn_into()
        .unwrap_or_else(|_| panic!("{selector} is something else"))
}

fn fire(target: &Element, name: &str) {
    let event = document().create_event("Event").expect("an event");
    event.init_event_with_bubbles(name, true);
    target.dispatch_event(&event).expect("heard");
}

async fn type_in(root: &Element, text: &str) {
    let input: HtmlInputElement = find(root, "input");
    input.set_value(text);
    fire(&input, "input");
    drawn().await;
}

#[derive(Clone, PartialEq, Properties)]
struct BenchProps {
    unit: MeasureUnit,
    start: Entry,
    last: Callback<Entry>,
}

/// A field with a parent that keeps what it is told, as a screen does.
#[component]
fn Bench(props: &BenchProps) -> Html {
    let entry = use_state(|| props.start.clone());
    let on_entry = {
        let (entry, last) = (entry.clone(), props.last.clone());
        Callback::from(move |next: Entry| {
            last.emit(next.clone());
            entry.set(next);
        })
    };
    let bar = |value| Measure::new(value, MeasureUnit::Bar).expect("finite");
    html! {
        <MeasureField
            id="bench"
            label="Charge"
            unit={props.unit}
            range={(bar(2.0), bar(60.0))}
            typed={AttrValue::from(entry.typed.clone())}
            value={entry.value}
            {on_entry}
        />
    }
}

fn bench(unit: MeasureUnit, start: Entry) -> (Element, Rc<RefCell<Entry>>) {
    let last = Rc::new(RefCell::new(start.clone()));
    let seen = last.clone();
    let last_entry = Callback::from(move |entry| *seen.borrow_mut() = entry);
    let root = mount::<Bench>(BenchProps {
        unit,
        start,
        last: last_entry,
    });
    (root, last)
}

fn base(entry: &Entry) -> Option<f64> {
    entry.value.map(Measure::base)
}

#[wasm_bindgen_test]
async fn a_field_keeps_what_cannot_be_read_and_says_why() {
    let (root, last) = bench(MeasureUnit::Bar, Entry::default());
    drawn().await;
    type_in(&root, "2x4").await;
    assert_eq!(last.borrow().typed, "2x4");
    assert_eq!(base(&last.borrow()), None);
    assert_eq!(find::<HtmlInputElement>(&root, "input").value(), "2x4");
    let error: Element = find(&root, ".field-error");
    assert!(error.text_content().unwrap_or_default().contains("x4"));

    type_in(&root, "24,5").await;
    assert_eq!(base(&last.borrow()), Some(24.5));
    assert_eq!(find::<HtmlInputElement>(&root, "input").value(), "24,5");
    assert!(
        root.query_selector(".field-error")
            .expect("a selector")
            .is_none()
    );
}

#[wasm_bindgen_test]
async fn a_figure_out_of_range_is_told_the_range() {
    let (root, last) = bench(MeasureUnit::Bar, Entry::default());
    drawn().await;
    type_in(&root, "600").await;
    assert_eq!(base(&last.borrow()), None);
    let error: Element = find(&root, ".field-error");
    assert!(
        error
            .text_content()
            .unwrap_or_default()
            .contains("2 to 60 bar")
    );
}

#[wasm_bindgen_test]
async fn a_unit_picked_in_the_field_goes_with_the_text() {
    let (root, last) = bench(MeasureUnit::Bar, Entry::default());
    drawn().await;
    type_in(&root, "350").await;
    let select: HtmlSelectElement = find(&root, "select");
    select.set_value("psi");
    fire(&select, "change");
    drawn().await;
    assert_eq!(last.borrow().typed, "350 psi");
    let value = base(&last.borrow()).expect("readable");
    assert!((value - 24.13).abs() < 0.01, "{value} bar");
    assert_eq!(find::<HtmlInputElement>(&root, "input").value(), "350");

    // As after a reload: the text alone comes back.
    let (again, _) = bench(MeasureUnit::Bar, last.borrow().clone());
    drawn().await;
    assert_eq!(find::<HtmlInputElement>(&again, "input").value(), "350");
    assert_eq!(find::<HtmlSelectElement>(&again, "select").value(), "psi");
}

#[wasm_bindgen_test]
async fn other_units_of_the_shop_never_change_a_kept_value() {
    let kept = Entry {
        typed: "20".into(),
        value: Measure::new(20.0, MeasureUnit::Bar).ok(),
    };
    let (root, last) = bench(MeasureUnit::Psi, kept.clone());
    drawn().await;
    assert_eq!(find::<HtmlInputElement>(&root, "input").value(), "290.08");
    assert!(
        root.query_selector(".field-error")
            .expect("a selector")
            .is_none()
    );
    assert_eq!(*last.borrow(), kept);
}

#[derive(Clone, PartialEq, Properties)]
struct TickBenchProps {
    last: Callback<Tick>,
}

#[component]
fn TickBench(props: &TickBenchProps) -> Html {
    html! {
        <Choice<Tick>
            name="flushing"
            label="Flushing"
            options={tick_options()}
            value={Tick::Unknown}
            on_change={props.last.clone()}
        />
    }
}

#[wasm_bindgen_test]
async fn a_choice_is_a_group_of_radio_buttons_with_a_name() {
    let chosen = Rc::new(RefCell::new(None));
    let seen = chosen.clone();
    let root = mount::<TickBench>(TickBenchProps {
        last: Callback::from(move |tick| *seen.borrow_mut() = Some(tick)),
    });
    drawn().await;
    let legend: Element = find(&root, "fieldset > legend");
    assert_eq!(legend.text_content().as_deref(), Some("Flushing"));
    let unknown: HtmlInputElement = find(&root, "[data-testid=flushing-unknown]");
    assert!(unknown.checked());
    let yes: HtmlInputElement = find(&root, "[data-testid=flushing-yes]");
    yes.click();
    drawn().await;
    assert_eq!(*chosen.borrow(), Some(Tick::Yes));
}
