//! What is kept beyond the value: readings taken again, the end of a call, the call before, texts that are no figures.

use crate::screen::{Screen, advised, bar};
use lowside::next::Advice;
use lowside::quantity::{Kind, Measure};
use lowside::readings::{Condition, EngineSpeed, Path, Port, Reading, Seen};
use lowside::record::Visit;
use wasm_bindgen_test::wasm_bindgen_test;
use web_sys::{HtmlElement, HtmlInputElement};

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
            path: Path::Left,
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
