//! The tap counter and the stopwatch, in the browser. Elsewhere this file is empty.
#![cfg(target_arch = "wasm32")]

use std::cell::RefCell;
use std::rc::Rc;
use std::time::Duration;

use lowside::app::parts::stopwatch::StopwatchProps;
use lowside::app::parts::tap_counter::TapCounterProps;
use lowside::app::parts::{Stopwatch, TapCounter};
use lowside::count::Counted;
use wasm_bindgen_test::{wasm_bindgen_test, wasm_bindgen_test_configure};
use web_sys::wasm_bindgen::JsCast;
use web_sys::{Element, HtmlElement};
use yew::Callback;

wasm_bindgen_test_configure!(run_in_browser);

fn mount<C>(props: C::Properties) -> Element
where
    C: yew::BaseComponent,
{
    let document = web_sys::window()
        .and_then(|window| window.document())
        .expect("a page");
    let root = document.create_element("div").expect("an element");
    let body = document.body().expect("a body");
    body.append_child(&root).expect("room");
    yew::Renderer::<C>::with_root_and_props(root.clone(), props).render();
    root
}

/// Lets the app draw what is due: its scheduler works in tasks of the browser, so some of them are let pass.
async fn drawn() {
    for _ in 0..10 {
        yew::platform::time::sleep(Duration::ZERO).await;
    }
}

fn at(root: &Element, id: &str) -> HtmlElement {
    root.query_selector(&format!("[data-testid='{id}']"))
        .expect("a selector")
        .unwrap_or_else(|| panic!("no {id}"))
        .dyn_into()
        .expect("an element of the page")
}

#[wasm_bindgen_test]
async fn two_taps_before_the_next_drawing_both_count() {
    let last = Rc::new(RefCell::new(None::<Counted>));
    let seen = last.clone();
    let root = mount::<TapCounter>(TapCounterProps {
        id: "t".into(),
        label: "Left wheel".into(),
        limit_s: None,
        on_count: Callback::from(move |counted| *seen.borrow_mut() = counted),
    });
    drawn().await;
    let area = at(&root, "t-tap");
    for _ in 0..3 {
        area.click();
    }
    drawn().await;
    assert_eq!(last.borrow().map(|counted| counted.turns), Some(2));
    assert_eq!(at(&root, "t-turns").text_content().as_deref(), Some("2"));

    at(&root, "t-undo").click();
    drawn().await;
    assert_eq!(last.borrow().map(|counted| counted.turns), Some(1));

    at(&root, "t-clear").click();
    drawn().await;
    assert_eq!(*last.borrow(), None);
    assert!(at(&root, "t-undo").has_attribute("disabled"));
}

#[wasm_bindgen_test]
async fn the_stopwatch_starts_stops_and_is_set_back() {
    let last = Rc::new(RefCell::new(None::<f64>));
    let seen = last.clone();
    let root = mount::<Stopwatch>(StopwatchProps {
        id: "s".into(),
        label: "Held".into(),
        signal_s: None,
        on_time: Callback::from(move |time| *seen.borrow_mut() = time),
    });
    drawn().await;
    let press = at(&root, "s-press");
    press.click();
    drawn().await;
    assert_eq!(*last.borrow(), None);
    press.click();
    drawn().await;
    let stopped = last.borrow().expect("a time");
    assert!(stopped >= 0.0);
    assert_eq!(press.text_content().as_deref(), Some("Set to zero"));
    press.click();
    drawn().await;
    assert_eq!(*last.borrow(), None);
}
