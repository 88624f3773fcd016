//! A call screen on the page, and the moves that tests make on it.

use std::cell::RefCell;
use std::rc::Rc;
use std::time::Duration;

use lowside::app::call::{CallScreen, EarlierCalls};
use lowside::assessment::{Assessment, Cause, Evidence};
use lowside::faults::FaultId;
use lowside::next::Advice;
use lowside::quantity::UnitPrefs;
use lowside::readings::Seen;
use lowside::readings::instrument::{Instrument, usual_instruments};
use lowside::record::Visit;
use lowside::unit::{Paths, Unit};
use web_sys::wasm_bindgen::JsCast;
use web_sys::{Element, HtmlElement, HtmlInputElement, HtmlSelectElement};
use yew::{Callback, Html, Properties, component, html, use_state};

/// The last visit that the screen handed out.
type Last = Rc<RefCell<Visit>>;

#[derive(Clone, PartialEq, Properties)]
struct HolderProps {
    last: Kept,
    assessment: Option<Rc<Assessment>>,
    earlier: EarlierCalls,
    unit: Rc<Unit>,
}

/// [`Last`], equal to itself alone.
#[derive(Clone)]
struct Kept(Last);

impl PartialEq for Kept {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

/// A screen with a parent that keeps what it is told.
#[component]
fn Holder(props: &HolderProps) -> Html {
    let visit = use_state(|| Rc::new(props.last.0.borrow().clone()));
    let instruments = use_state(|| Rc::new(usual_instruments()));
    let on_visit = {
        let (visit, last) = (visit.clone(), props.last.0.clone());
        Callback::from(move |next: Visit| {
            last.replace(next.clone());
            visit.set(Rc::new(next));
        })
    };
    let on_instruments = {
        let instruments = instruments.clone();
        Callback::from(move |list: Vec<Instrument>| instruments.set(Rc::new(list)))
    };
    html! {
        <CallScreen
            unit={props.unit.clone()}
            visit={(*visit).clone()}
            instruments={(*instruments).clone()}
            prefs={UnitPrefs::metric()}
            assessment={props.assessment.clone()}
            earlier={props.earlier.clone()}
            updating={false}
            {on_visit}
            on_unit={Callback::noop()}
            {on_instruments}
        />
    }
}

/// A screen on the page, alone on it, so that its ids are.
pub struct Screen {
    root: Element,
    last: Last,
}

impl Screen {
    pub async fn open(assessment: Option<Assessment>) -> Screen {
        Self::open_after(assessment, Visit::default(), Vec::new()).await
    }

    /// A screen on a visit that is there already, after these earlier ones.
    pub async fn open_after(
        assessment: Option<Assessment>,
        visit: Visit,
        earlier: Vec<Visit>,
    ) -> Screen {
        Self::open_on(Unit::default(), assessment, visit, earlier).await
    }

    /// The same on a machine with left and right on one charge pump.
    pub async fn open_on_two_paths(assessment: Option<Assessment>, visit: Visit) -> Screen {
        let mut unit = Unit::default();
        unit.ticks.paths = Paths::TwoSharedCharge;
        Self::open_on(unit, assessment, visit, Vec::new()).await
    }

    async fn open_on(
        unit: Unit,
        assessment: Option<Assessment>,
        visit: Visit,
        earlier: Vec<Visit>,
    ) -> Screen {
        let document = web_sys::window()
            .and_then(|window| window.document())
            .expect("a page");
        let body = document.body().expect("a body");
        while let Some(old) = document.query_selector(".call-bench").expect("a selector") {
            old.remove();
        }
        let root = document.create_element("div").expect("an element");
        root.set_class_name("call-bench");
        body.append_child(&root).expect("room");
        let last: Last = Rc::new(RefCell::new(visit));
        let props = HolderProps {
            last: Kept(last.clone()),
            assessment: assessment.map(Rc::new),
            earlier: EarlierCalls(earlier.into_iter().map(Rc::new).collect()),
            unit: Rc::new(unit),
        };
        yew::Renderer::<Holder>::with_root_and_props(root.clone(), props).render();
        let screen = Screen { root, last };
        screen.drawn().await;
        screen
    }

    /// Lets the app draw what is due: its scheduler works in tasks of the browser, so some of them are let pass.
    pub async fn drawn(&self) {
        for _ in 0..10 {
            yew::platform::time::sleep(Duration::ZERO).await;
        }
    }

    pub fn there(&self, testid: &str) -> bool {
        self.root
            .query_selector(&format!("[data-testid='{testid}']"))
            .expect("a selector")
            .is_some()
    }

    pub fn find<T: JsCast>(&self, testid: &str) -> T {
        self.root
            .query_selector(&format!("[data-testid='{testid}']"))
            .expect("a selector")
            .unwrap_or_else(|| panic!("no {testid}"))
            .dyn_into()
            .unwrap_or_else(|_| panic!("{testid} is something else"))
    }

    pub fn text(&self, testid: &str) -> String {
        self.find::<Element>(testid)
            .text_content()
            .unwrap_or_default()
    }

    pub async fn touch(&self, testid: &str) {
        self.find::<HtmlElement>(testid).click();
        self.drawn().await;
    }

    pub async fn type_in(&self, testid: &str, text: &str) {
        let field: HtmlInputElement = self.find(testid);
        field.set_value(text);
        self.fire(&field, "input").await;
    }

    pub async fn pick(&self, testid: &str, value: &str) {
        let list: HtmlSelectElement = self.find(testid);
        list.set_value(value);
        self.fire(&list, "change").await;
    }

    pub async fn fire(&self, target: &Element, name: &str) {
        let document = target.owner_document().expect("a page");
        let event = document.create_event("Event").expect("an event");
        event.init_event_with_bubbles(name, true);
        target.dispatch_event(&event).expect("heard");
        self.drawn().await;
    }

    pub fn visit(&self) -> Visit {
        self.last.borrow().clone()
    }

    pub fn seen(&self, place: usize) -> Option<Seen> {
        self.visit().readings[place].seen.clone()
    }

    /// Ticks every precaution of a check and hands back how many there were.
    pub async fn tick_all(&self, check: &str) -> usize {
        let mut ticked = 0;
        while self.there(&format!("precaution-{check}-{ticked}")) {
            self.touch(&format!("precaution-{check}-{ticked}")).await;
            ticked += 1;
        }
        ticked
    }
}

/// The value of a plain reading, base unit.
pub fn bar(seen: Option<Seen>) -> Option<f64> {
    match seen {
        Some(Seen::Value { value }) => Some(value.base()),
        _ => None,
    }
}

/// A row of the ranking.
pub fn cause(id: FaultId, title: &str, probability: f64, weight: Option<f64>) -> Cause {
    let evidence = weight.map(|weight| Evidence {
        of: "weak-hot".to_owned(),
        words: "Good cold, weak hot".to_owned(),
        weight,
    });
    Cause {
        pair: None,
        paths: Vec::new(),
        ids: vec![id],
        title: title.to_owned(),
        probability,
        shares: vec![probability],
        action: String::new(),
        split: String::new(),
        evidence: evidence.into_iter().collect(),
        would_read: Vec::new(),
    }
}

/// An answer with this advice.
pub fn advised(advice: Advice) -> Assessment {
    Assessment {
        causes: vec![cause(FaultId::PumpWorn, "Pump worn", 0.6, Some(1.0))],
        advice: Some(advice),
        ..Assessment::default()
    }
}
