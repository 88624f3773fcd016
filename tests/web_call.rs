//! The call screen, in the browser. Elsewhere this file is empty.
#![cfg(target_arch = "wasm32")]

use std::cell::RefCell;
use std::rc::Rc;
use std::time::Duration;

use lowside::app::call::{CallScreen, EarlierCalls};
use lowside::assessment::{Assessment, Cause, Evidence, Pair};
use lowside::faults::FaultId;
use lowside::next::{Advice, Foretold, Offer, RepairOffer, Would};
use lowside::quantity::{Kind, Measure, UnitPrefs};
use lowside::readings::instrument::{Instrument, usual_instruments};
use lowside::readings::{Condition, Doing, EngineSpeed, Port, Reading, Seen};
use lowside::record::{Answer, Visit};
use lowside::unit::Unit;
use wasm_bindgen_test::{wasm_bindgen_test, wasm_bindgen_test_configure};
use web_sys::wasm_bindgen::JsCast;
use web_sys::{Element, HtmlElement, HtmlInputElement, HtmlSelectElement};
use yew::{Callback, Html, Properties, component, html, use_state};

wasm_bindgen_test_configure!(run_in_browser);

/// The last visit that the screen handed out.
type Last = Rc<RefCell<Visit>>;

#[derive(Clone, PartialEq, Properties)]
struct HolderProps {
    last: Kept,
    assessment: Option<Rc<Assessment>>,
    earlier: EarlierCalls,
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
            unit={Rc::new(Unit::default())}
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
struct Screen {
    root: Element,
    last: Last,
}

impl Screen {
    async fn open(assessment: Option<Assessment>) -> Screen {
        Self::open_after(assessment, Visit::default(), Vec::new()).await
    }

    /// A screen on a visit that is there already, after these earlier ones.
    async fn open_after(
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
        };
        yew::Renderer::<Holder>::with_root_and_props(root.clone(), props).render();
        let screen = Screen { root, last };
        screen.drawn().await;
        screen
    }

    /// Lets the app draw what is due: its scheduler works in tasks of the browser, so some of them are let pass.
    async fn drawn(&self) {
        for _ in 0..10 {
            yew::platform::time::sleep(Duration::ZERO).await;
        }
    }

    fn there(&self, testid: &str) -> bool {
        self.root
            .query_selector(&format!("[data-testid='{testid}']"))
            .expect("a selector")
            .is_some()
    }

    fn find<T: JsCast>(&self, testid: &str) -> T {
        self.root
            .query_selector(&format!("[data-testid='{testid}']"))
            .expect("a selector")
            .unwrap_or_else(|| panic!("no {testid}"))
            .dyn_into()
            .unwrap_or_else(|_| panic!("{testid} is something else"))
    }

    fn text(&self, testid: &str) -> String {
        self.find::<Element>(testid)
            .text_content()
            .unwrap_or_default()
    }

    async fn touch(&self, testid: &str) {
        self.find::<HtmlElement>(testid).click();
        self.drawn().await;
    }

    async fn type_in(&self, testid: &str, text: &str) {
        let field: HtmlInputElement = self.find(testid);
        field.set_value(text);
        self.fire(&field, "input").await;
    }

    async fn pick(&self, testid: &str, value: &str) {
        let list: HtmlSelectElement = self.find(testid);
        list.set_value(value);
        self.fire(&list, "change").await;
    }

    async fn fire(&self, target: &Element, name: &str) {
        let document = target.owner_document().expect("a page");
        let event = document.create_event("Event").expect("an event");
        event.init_event_with_bubbles(name, true);
        target.dispatch_event(&event).expect("heard");
        self.drawn().await;
    }

    fn visit(&self) -> Visit {
        self.last.borrow().clone()
    }

    fn seen(&self, place: usize) -> Option<Seen> {
        self.visit().readings[place].seen.clone()
    }

    /// Ticks every precaution of a check and hands back how many there were.
    async fn tick_all(&self, check: &str) -> usize {
        let mut ticked = 0;
        while self.there(&format!("precaution-{check}-{ticked}")) {
            self.touch(&format!("precaution-{check}-{ticked}")).await;
            ticked += 1;
        }
        ticked
    }
}

fn bar(seen: Option<Seen>) -> Option<f64> {
    match seen {
        Some(Seen::Value { value }) => Some(value.base()),
        _ => None,
    }
}

#[wasm_bindgen_test]
async fn two_touches_and_a_figure_make_a_reading() {
    let screen = Screen::open(None).await;
    screen.touch("add-reading").await;
    screen.touch("add-Charge").await;
    screen.type_in("value-0", "350 psi").await;
    let value = bar(screen.seen(0)).expect("readable");
    assert!((value - 24.131_65).abs() < 1e-4, "{value}");
    screen.type_in("value-0", "24,5").await;
    assert_eq!(bar(screen.seen(0)), Some(24.5));
    screen.type_in("value-0", "24,5 apples").await;
    assert_eq!(screen.seen(0), None);
    assert_eq!(screen.visit().readings[0].typed, "24,5 apples");
    assert_eq!(
        screen.find::<HtmlInputElement>("value-0").value(),
        "24,5 apples"
    );
    // The next reading goes on in the same condition.
    screen.touch("add-reading").await;
    screen.touch("add-PumpCase").await;
    let readings = screen.visit().readings;
    assert_eq!(readings[0].condition, readings[1].condition);
}

#[wasm_bindgen_test]
async fn what_is_no_plain_value_takes_one_touch_and_can_be_taken_back() {
    let screen = Screen::open(None).await;
    screen.touch("quick-charge-neutral").await;
    screen.touch("nothing-0").await;
    assert_eq!(screen.seen(0), Some(Seen::Nothing));
    // No charge, no braking from the drive: it is said where it is read.
    assert!(screen.there("caution-no-braking"));
    screen.touch("nothing-0").await;
    assert_eq!(screen.seen(0), None);

    screen.touch("swing-0").await;
    screen.type_in("value-0", "22").await;
    assert_eq!(screen.seen(0), None);
    assert_eq!(screen.find::<HtmlInputElement>("value-0").value(), "22");
    screen.type_in("value-high-0", "18").await;
    match screen.seen(0) {
        Some(Seen::Swing { low, high }) => assert_eq!((low.base(), high.base()), (18.0, 22.0)),
        other => panic!("{other:?}"),
    }
    // Both fields show what was typed in them, in the order in which it was typed.
    assert_eq!(screen.find::<HtmlInputElement>("value-0").value(), "22");

    screen.touch("share-0").await;
    screen.type_in("value-0", "80").await;
    match screen.seen(0) {
        Some(Seen::ShareOf { share, .. }) => assert!((share - 0.8).abs() < 1e-12),
        other => panic!("{other:?}"),
    }
    screen.touch("not-possible-0").await;
    screen.type_in("value-0", "port seized").await;
    assert_eq!(
        screen.seen(0),
        Some(Seen::NotPossible {
            why: "port seized".to_owned()
        })
    );

    screen.touch("undo").await;
    screen.touch("undo").await;
    assert!(
        matches!(screen.seen(0), Some(Seen::ShareOf { .. })),
        "{:?}",
        screen.seen(0)
    );
}

#[wasm_bindgen_test]
async fn a_known_gauge_gives_the_top_of_its_scale_and_is_not_put_where_it_bursts() {
    let screen = Screen::open(None).await;
    screen.touch("quick-charge-neutral").await;
    screen.pick("rig-0", "gauge-60").await;
    screen.touch("off-scale-0").await;
    match screen.seen(0) {
        Some(Seen::OffScale { top }) => assert_eq!(top.base(), 60.0),
        other => panic!("{other:?}"),
    }
    // Said once, it holds for the port.
    assert!(
        screen
            .visit()
            .readings
            .iter()
            .all(|reading| reading.rigging == "g1")
    );

    screen.touch("add-reading").await;
    screen.touch("add-LoopA").await;
    screen.pick("rig-2", "gauge-60").await;
    let warning = screen.text("too-small-2");
    assert!(warning.contains("Gauge 0 to 60 bar"), "{warning}");
    screen.pick("rig-2", "gauge-600").await;
    assert!(!screen.there("too-small-2"));
}

#[wasm_bindgen_test]
async fn a_held_reading_opens_with_its_last_precaution_and_closes_with_its_condition() {
    let screen = Screen::open(None).await;
    screen.touch("quick-held-forward").await;
    assert!(!screen.there("value-0"), "closed before anybody was asked");
    screen.touch("alone-yes").await;
    assert!(
        !screen.there("precaution-pressure-build-up-0"),
        "nothing to tick for somebody alone"
    );
    assert!(screen.text("reading-row-0").contains("alone"));
    screen.touch("alone-no").await;

    let mut open_after = Vec::new();
    let mut place = 0;
    while screen.there(&format!("precaution-pressure-build-up-{place}")) {
        if screen.there("value-0") {
            open_after.push(place);
            break;
        }
        screen
            .touch(&format!("precaution-pressure-build-up-{place}"))
            .await;
        place += 1;
    }
    assert!(
        open_after.is_empty(),
        "opened with ticks missing: {open_after:?}"
    );
    assert!(place > 5 && screen.there("value-0"), "{place} ticks");
    // One round of ticks serves the whole build-up.
    assert!(screen.there("value-3"));
    screen.type_in("value-0", "160").await;

    screen.touch("condition-0").await;
    screen.touch("cond-r1-direction-reverse").await;
    assert!(
        !screen.there("value-0"),
        "the ticks lapse with the condition"
    );
    assert_eq!(bar(screen.seen(0)), Some(160.0), "what was typed stays");
    assert!(screen.text("reading-row-0").contains("160"));
}

#[wasm_bindgen_test]
async fn ordinary_precautions_open_a_reading_with_hot_oil() {
    let screen = Screen::open(None).await;
    screen.touch("quick-motor-drain").await;
    assert!(!screen.there("value-0"));
    assert!(screen.tick_all("motor-drain-in-neutral").await > 3);
    assert!(screen.there("value-0"));
    // An oil temperature put in afterwards is not another condition.
    screen.touch("condition-0").await;
    screen.type_in("cond-r1-oil", "55").await;
    assert!(screen.there("value-0"));
    screen.touch("untick-motor-drain-in-neutral").await;
    assert!(!screen.there("value-0"));
}

#[wasm_bindgen_test]
async fn a_machine_that_keeps_going_is_not_tested() {
    let screen = Screen::open(None).await;
    screen.touch("quick-charge-neutral").await;
    assert!(screen.there("value-0"));
    screen.type_in("value-1", "21").await;
    screen.touch("seen-runs-on-says").await;
    assert!(screen.there("stop-work"));
    assert!(
        !screen.there("value-0"),
        "nothing more is read on its wheels"
    );
    assert!(
        screen.there("value-1"),
        "what was read can still be put right"
    );
    // A second touch takes the answer back.
    screen.touch("seen-runs-on-says").await;
    assert!(!screen.there("stop-work") && screen.visit().observations.is_empty());
}

#[wasm_bindgen_test]
async fn a_touch_on_the_drawing_adds_a_reading_and_never_a_held_one() {
    let screen = Screen::open(None).await;
    screen.touch("quick-held-forward").await;
    let port: Element = screen.find("map-PumpCase");
    screen.fire(&port, "click").await;
    let added = screen.visit().readings.last().cloned().expect("added");
    assert_eq!(
        (added.port, added.condition.doing),
        (Port::PumpCase, Doing::Neutral)
    );
    // A second touch goes to the one that waits for its value.
    let before = screen.visit().readings.len();
    let port: Element = screen.find("map-PumpCase");
    screen.fire(&port, "click").await;
    assert_eq!(screen.visit().readings.len(), before);
}

#[wasm_bindgen_test]
async fn one_heading_serves_all_its_readings() {
    let screen = Screen::open(None).await;
    screen.touch("quick-case").await;
    screen.touch("condition-0").await;
    screen.touch("cond-r1-engine-read").await;
    screen.type_in("cond-r1-speed", "2380").await;
    screen.type_in("cond-r1-oil", "58").await;
    let readings = screen.visit().readings;
    assert_eq!(readings.len(), 2);
    for reading in &readings {
        assert_eq!(reading.condition, readings[0].condition);
        assert_eq!(
            reading.condition.oil.map(|oil| oil.value.base()),
            Some(58.0)
        );
    }
    assert!(screen.text("reading-row-0").contains("Pump case"));
    // While nothing readable stands in a field, the last reading of it holds no longer.
    screen.type_in("cond-r1-oil", "warm").await;
    assert_eq!(screen.visit().readings[0].condition.oil, None);
    assert_eq!(
        screen.find::<HtmlInputElement>("cond-r1-oil").value(),
        "warm"
    );
}

fn cause(id: FaultId, title: &str, probability: f64, weight: Option<f64>) -> Cause {
    let evidence = weight.map(|weight| Evidence {
        of: "weak-hot".to_owned(),
        words: "Good cold, weak hot".to_owned(),
        weight,
    });
    Cause {
        pair: None,
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

#[wasm_bindgen_test]
async fn causes_are_told_with_a_percentage_only_where_something_speaks_for_them() {
    let told = Assessment {
        causes: vec![
            cause(
                FaultId::ChargePumpWorn,
                "Charge pump worn",
                0.704,
                Some(1.2),
            ),
            cause(FaultId::OilLow, "Oil level low", 0.004, None),
        ],
        ..Assessment::default()
    };
    let screen = Screen::open(Some(told)).await;
    let lead = screen.text("cause-0");
    assert!(
        lead.contains("Charge pump worn") && lead.contains("70\u{202f}%"),
        "{lead}"
    );
    assert!(screen.text("cause-1").contains("<1\u{202f}%"));
    assert!(screen.text("lead-status").contains("Charge pump worn"));
    assert_eq!(screen.text("verdict"), "so far");

    let open = Assessment {
        causes: vec![cause(FaultId::OilLow, "Oil level low", 0.1, None)],
        ..Assessment::default()
    };
    let screen = Screen::open(Some(open)).await;
    assert_eq!(screen.text("verdict"), "too little to tell");
    assert!(!screen.text("cause-0").contains('%'));
}

#[wasm_bindgen_test]
async fn a_cause_that_forbids_moving_the_machine_is_told_at_the_head() {
    let grave = Assessment {
        causes: vec![cause(
            FaultId::StrokeStuck,
            "Stroke does not come back",
            0.4,
            Some(2.0),
        )],
        ..Assessment::default()
    };
    let screen = Screen::open(Some(grave)).await;
    assert!(
        screen
            .text("stop-work")
            .contains("Stroke does not come back")
    );
}

#[wasm_bindgen_test]
async fn a_cause_not_listed_asks_for_gauge_port_and_condition() {
    let unlisted = Assessment {
        causes: vec![cause(
            FaultId::NotListed,
            "Something that is not on this list",
            0.6,
            Some(1.0),
        )],
        ..Assessment::default()
    };
    let screen = Screen::open(Some(unlisted)).await;
    let text = screen.text("not-listed");
    for word in ["gauge", "port", "condition"] {
        assert!(text.contains(word), "{text}");
    }
}

#[wasm_bindgen_test]
async fn two_causes_together_stand_as_one_row_with_what_each_explains() {
    let mut pair = cause(FaultId::PumpWorn, "Pump and motor worn", 0.7, Some(1.4));
    pair.ids = vec![FaultId::PumpWorn, FaultId::MotorWorn];
    pair.shares = Vec::new();
    pair.pair = Some(Pair {
        titles: ["Pump worn".to_owned(), "Motor worn".to_owned()],
        explains: [vec!["r1".to_owned()], vec!["weak-hot".to_owned()]],
    });
    let told = Assessment {
        causes: vec![
            pair,
            cause(FaultId::OilLow, "Oil level low", 0.1, Some(-1.0)),
        ],
        ..Assessment::default()
    };
    let screen = Screen::open(Some(told)).await;
    screen.touch("add-reading").await;
    screen.touch("add-Charge").await;
    let row = screen.text("cause-0");
    for words in [
        "Two causes together",
        "Pump worn",
        "Motor worn",
        "70\u{202f}%",
    ] {
        assert!(row.contains(words), "{words}: {row}");
    }
    assert!(!row.contains("Alike in every reading"), "{row}");
    // Each explains its own: a reading by port and condition, an observation by its words.
    let sides = screen.text("pair");
    assert!(sides.contains("Charge pressure"), "{sides}");
    assert!(sides.contains("Good cold, weak hot"), "{sides}");
    // Both are proved and put right, each by itself.
    for id in [FaultId::PumpWorn, FaultId::MotorWorn] {
        let fault = lowside::faults::find(id).expect("in the catalogue");
        assert!(
            row.contains(fault.proof) && row.contains(fault.repair),
            "{id:?}"
        );
    }
    assert_eq!(screen.text("verdict"), "so far");
}

/// An offer of charge pressure both ways, wheels clear.
fn offer(id: &str, title: &str, hazard: u8) -> Offer {
    let condition = Condition {
        doing: Doing::Free,
        ..Condition::start()
    };
    let would = |id: FaultId, title: &str, low: f64, high: f64| Would {
        id,
        title: title.to_owned(),
        value: (low + high) / 2.0,
        low,
        high,
    };
    let foretold = |condition: Condition| Foretold {
        port: Port::Charge,
        condition,
        would: vec![
            would(FaultId::PumpWorn, "Pump worn", 14.0, 16.0),
            would(FaultId::MotorWorn, "Motor worn", 19.0, 22.0),
        ],
    };
    // As it comes from the worker.
    serde_json::from_value(serde_json::json!({
        "id": id,
        "title": title,
        "bits": 0.8,
        "minutes": 4.4,
        "hazard": hazard,
        "why": "Tells worn pump from worn motor.",
        "foretold": [foretold(condition), foretold(condition.reversed())],
    }))
    .expect("an offer")
}

fn advised(advice: Advice) -> Assessment {
    Assessment {
        causes: vec![cause(FaultId::PumpWorn, "Pump worn", 0.6, Some(1.0))],
        advice: Some(advice),
        ..Assessment::default()
    }
}

#[wasm_bindgen_test]
async fn the_best_check_says_why_and_what_it_would_read_and_its_readings_are_one_touch_away() {
    let screen = Screen::open(Some(advised(Advice {
        checks: vec![
            offer("charge-both-ways", "Charge both ways", 2),
            offer("pressure-build-up", "Staged build-up", 3),
        ],
        held_back: vec![("Plateau".to_owned(), "Not alone on site.".to_owned())],
        ..Advice::default()
    })))
    .await;
    let best = screen.text("next-0");
    for words in [
        "Charge both ways",
        "5\u{202f}min",
        "take care",
        "Tells worn pump from worn motor.",
        "Pump worn",
        "14.0 to 16.0\u{202f}bar",
        "19.0 to 22.0\u{202f}bar",
        "Put back",
        "must be so first",
    ] {
        assert!(best.contains(words), "{words}: {best}");
    }
    // A hazard of two is not told in the words of three.
    assert!(!best.contains("danger"), "{best}");
    assert!(screen.text("next-1").contains("danger"));
    assert!(screen.text("next-held").contains("Not alone on site."));
    screen.touch("next-add-0").await;
    let readings = screen.visit().readings;
    assert_eq!(readings.len(), 2);
    assert!(
        readings
            .iter()
            .all(|r| r.port == Port::Charge && r.condition.doing == Doing::Free)
    );
    // Its precautions stand before the field, which is closed until they are ticked.
    assert!(screen.there("gate-charge-both-ways"));
    assert!(!screen.there("value-0"));
    screen.tick_all("charge-both-ways").await;
    assert!(screen.there("value-0"));
    // A second touch adds nothing twice.
    screen.touch("next-add-0").await;
    assert_eq!(screen.visit().readings.len(), 2);
}

#[wasm_bindgen_test]
async fn a_check_without_readings_is_answered_or_marked_on_the_spot() {
    let bare = |id: &str, title: &str| Offer {
        foretold: Vec::new(),
        ..offer(id, title, 1)
    };
    let screen = Screen::open(Some(advised(Advice {
        checks: vec![
            bare("debris", "Look for debris"),
            bare("pull-the-shuttle", "Pull the shuttle"),
        ],
        ..Advice::default()
    })))
    .await;
    screen.touch("next-0-metal-not-seen").await;
    assert_eq!(
        screen.visit().observations.get("metal"),
        Some(&Answer::NotSeen)
    );
    screen.touch("next-made-1").await;
    assert_eq!(screen.visit().made, ["pull-the-shuttle"]);
    assert!(screen.text("next-made").contains("Pull the shuttle"));
    screen.touch("unmade-pull-the-shuttle").await;
    assert!(screen.visit().made.is_empty());
}

#[wasm_bindgen_test]
async fn stop_checking_and_the_repair_say_what_proves_and_what_must_come_back() {
    let screen = Screen::open(Some(advised(Advice {
        stop: Some("No check that is left can change the order.".to_owned()),
        repair: Some(RepairOffer {
            id: FaultId::PumpWorn,
            repair: "Change the pump.".to_owned(),
            minutes: 240.0,
            probability: 0.62,
            proof: "Pump alone does not build.".to_owned(),
            now: true,
            needs_manual: true,
            caution: "Chocks first.".to_owned(),
            proved_by: vec!["r1".to_owned()],
        }),
        ..Advice::default()
    })))
    .await;
    screen.touch("add-reading").await;
    screen.touch("add-Charge").await;
    assert!(screen.text("next-stop").contains("No check that is left"));
    let repair = screen.text("next-repair");
    for words in [
        "Change the pump.",
        "240\u{202f}min",
        "62\u{202f}%",
        "Pump alone does not build.",
        "Chocks first.",
        "Charge pressure",
        "manual",
    ] {
        assert!(repair.contains(words), "{words}: {repair}");
    }
}

#[wasm_bindgen_test]
async fn a_reading_that_does_not_fit_says_so_and_is_taken_again_with_one_touch() {
    let mut told = advised(Advice::default());
    told.trust.retake = vec![("r1".to_owned(), "Far from what the others say.".to_owned())];
    let screen = Screen::open(Some(told)).await;
    screen.touch("add-reading").await;
    screen.touch("add-Charge").await;
    // Nothing read yet: nothing that could not fit.
    assert!(!screen.there("does-not-fit"));
    screen.type_in("value-0", "45 bar").await;
    assert_eq!(screen.text("does-not-fit"), "does not fit");
    assert!(
        screen
            .text("retake-0")
            .contains("Far from what the others say.")
    );

    // It reads the same: the value stands, and that it was looked at again is known.
    screen.touch("same-again-0").await;
    assert_eq!(bar(screen.seen(0)), Some(45.0));
    assert_eq!(screen.visit().earlier["r1"].len(), 1);
    assert!(screen.text("retake-0").contains("second gauge"));

    // Read anew: the field is empty, what it read stands beside it.
    screen.touch("take-again-0").await;
    assert_eq!(screen.seen(0), None);
    assert_eq!(screen.find::<HtmlInputElement>("value-0").value(), "");
    assert!(
        screen.text("before-0").contains("45.0\u{202f}bar"),
        "{}",
        screen.text("before-0")
    );
    assert!(!screen.there("retake-0"));
    screen.type_in("value-0", "24").await;
    let earlier = &screen.visit().earlier["r1"];
    assert_eq!(bar(earlier[1].seen.clone()), Some(45.0));
    assert_eq!(earlier[1].typed, "45 bar");

    screen.touch("undo").await;
    screen.touch("undo").await;
    assert_eq!(bar(screen.seen(0)), Some(45.0));
}

#[wasm_bindgen_test]
async fn a_call_closes_only_when_everything_is_put_back_or_struck_out_with_a_reason() {
    let screen = Screen::open(None).await;
    assert!(!screen.there("put-back"));
    screen.touch("quick-charge-neutral").await;
    assert!(!screen.there("put-back"), "nothing was opened yet");
    screen.type_in("value-0", "24").await;
    assert!(screen.text("put-back").contains("Charge port plugged"));
    let close = || {
        screen
            .find::<HtmlElement>("close-call")
            .has_attribute("disabled")
    };
    assert!(close());
    screen.touch("put-back-0").await;
    assert!(!close());
    // The port is opened once more: the tick lapses.
    screen.type_in("value-1", "25").await;
    assert!(close());

    screen.touch("strike-0").await;
    assert!(close(), "no reason yet");
    screen
        .type_in("strike-why-0", "gauge stays for tomorrow")
        .await;
    assert!(!close());

    screen.pick("close-cause", "charge-pump-worn").await;
    screen.touch("close-proved-yes").await;
    let fill = |testid: &'static str, text: &'static str| {
        let area: web_sys::HtmlTextAreaElement = screen.find(testid);
        area.set_value(text);
        area
    };
    screen
        .fire(
            &fill("close-proof", "Return flow low at both speeds"),
            "input",
        )
        .await;
    screen
        .fire(&fill("close-done", "Charge pump changed"), "input")
        .await;
    screen.type_in("close-parts", "Charge pump, seals").await;
    assert!(
        screen.visit().closed.is_none(),
        "what is entered is kept while it is open"
    );
    screen.touch("close-call").await;
    let closed = screen.visit().closed.expect("closed");
    assert_eq!(closed.cause, "charge-pump-worn");
    assert!(closed.is_proved && !closed.when.is_empty());
    assert_eq!(closed.parts, "Charge pump, seals");
    let told = screen.text("close");
    for words in [
        "Charge pump worn",
        "proved",
        "Return flow low at both speeds",
        "Charge pump changed",
        "gauge stays for tomorrow",
    ] {
        assert!(told.contains(words), "{words}: {told}");
    }
    assert!(screen.there("call-closed"));

    screen.touch("reopen-call").await;
    assert!(screen.visit().closed.is_none());
    assert_eq!(
        screen.visit().closing.map(|closing| closing.parts),
        Some("Charge pump, seals".to_owned())
    );
}

#[wasm_bindgen_test]
async fn the_same_reading_of_an_earlier_call_stands_beside_the_field() {
    let last = Visit {
        id: "v-before".to_owned(),
        opened: "2025-03-03T08:00:00Z".to_owned(),
        readings: vec![Reading {
            id: "r1".to_owned(),
            port: Port::Charge,
            condition: Condition::start(),
            rigging: String::new(),
            seen: Measure::from_base(21.5, Kind::Pressure)
                .ok()
                .map(|value| Seen::Value { value }),
            typed: "21.5".to_owned(),
            note: String::new(),
        }],
        ..Visit::default()
    };
    let screen = Screen::open_after(None, Visit::default(), vec![last]).await;
    screen.touch("add-reading").await;
    screen.touch("add-Charge").await;
    let told = screen.text("last-time-0");
    assert!(
        told.contains("21.5\u{202f}bar") && told.contains("3 Mar 2025"),
        "{told}"
    );
    screen.type_in("value-0", "17.2").await;
    assert!(screen.text("last-time-0").contains("80\u{202f}%"));
    // As a share it cannot be entered, and it says why.
    screen.touch("share-0").await;
    assert!(screen.text("share-last-0").contains("stands in the record"));
    // Another port has no last time.
    screen.touch("add-reading").await;
    screen.touch("add-PumpCase").await;
    assert!(!screen.there("last-time-1"));
    screen.touch("share-1").await;
    assert!(screen.text("share-last-1").contains("no earlier call"));
}

#[wasm_bindgen_test]
async fn text_in_a_heading_that_is_no_figure_comes_back_after_a_reload() {
    let screen = Screen::open(None).await;
    screen.touch("quick-charge-neutral").await;
    screen.touch("condition-0").await;
    screen.touch("cond-r1-engine-read").await;
    screen.type_in("cond-r1-speed", "about 14oo").await;
    screen.type_in("cond-r1-oil", "warm").await;
    let kept = screen.visit();
    assert_eq!(kept.headings["r1"]["engine"], "about 14oo");
    assert_eq!(kept.headings["r1"]["oil"], "warm");

    let screen = Screen::open_after(None, kept, Vec::new()).await;
    assert!(screen.text("heading-engine").contains("about 14oo"));
    screen.touch("condition-0").await;
    assert_eq!(
        screen.find::<HtmlInputElement>("cond-r1-speed").value(),
        "about 14oo"
    );
    assert_eq!(
        screen.find::<HtmlInputElement>("cond-r1-oil").value(),
        "warm"
    );
    // Once they are figures, nothing is kept beside them.
    screen.type_in("cond-r1-speed", "1400").await;
    screen.type_in("cond-r1-oil", "52").await;
    assert!(screen.visit().headings.is_empty());
    assert!(matches!(
        screen.visit().readings[0].condition.engine,
        EngineSpeed::Measured(_)
    ));
}
