//! The call screen, in the browser. Elsewhere this file is empty.
#![cfg(target_arch = "wasm32")]

#[path = "web_call/causes.rs"]
mod causes;
#[path = "web_call/end.rs"]
mod end;
#[path = "web_call/next.rs"]
mod next;
#[path = "web_call/screen.rs"]
mod screen;
#[path = "web_call/sides.rs"]
mod sides;
#[path = "web_call/watch.rs"]
mod watch;

use lowside::readings::{Doing, Port, Seen};
use screen::{Screen, bar};
use wasm_bindgen_test::{wasm_bindgen_test, wasm_bindgen_test_configure};
use web_sys::{Element, HtmlInputElement};

wasm_bindgen_test_configure!(run_in_browser);

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
