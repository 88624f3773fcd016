//! The watch view and its hold timer, the jug, help at a reading, and what makes ticks lapse.

use crate::screen::{Screen, bar};
use lowside::assessment::{Assessment, Standing, Window, WindowSource};
use lowside::checks;
use lowside::quantity::Kind;
use lowside::readings::{Condition, Direction, Doing, Lever, Path, Port, Reading, Seen};
use lowside::record::Visit;
use wasm_bindgen_test::wasm_bindgen_test;
use web_sys::{Element, HtmlInputElement};

/// Lets the page's clock, that stopwatches and holds run on, jump ahead.
fn skip(seconds: u32) {
    let script = format!(
        "(() => {{ const p = performance, then = p.now.bind(p); p.now = () => then() + {seconds} * 1000; }})()"
    );
    js_sys::eval(&script).expect("a page with a clock");
}

/// Draws until something is there; the app's own timers run meanwhile.
async fn until(screen: &Screen, testid: &str) {
    for _ in 0..200 {
        if screen.there(testid) {
            return;
        }
        screen.drawn().await;
    }
    panic!("{testid} did not come");
}

/// Where the keyboard stands.
fn focused() -> String {
    let document = web_sys::window().and_then(|window| window.document());
    let element = document.and_then(|document| document.active_element());
    element.map(|element| element.id()).unwrap_or_default()
}

fn window(reading: &str, low: f64, high: f64) -> Window {
    Window {
        reading: reading.to_owned(),
        low,
        middle: f64::midpoint(low, high),
        high,
        read: None,
        instrument: 0.3,
        source: WindowSource::Practice,
        widest: String::new(),
        basis: String::new(),
        standing: Standing::Open,
        remark: None,
        swings: false,
        since_bench: None,
    }
}

#[wasm_bindgen_test]
async fn the_watch_view_opens_after_the_ticks_and_leads_to_the_fields() {
    let told = Assessment {
        windows: vec![window("r1", 18.2, 23.9), window("r2", 20.9, 24.8)],
        ..Assessment::default()
    };
    let screen = Screen::open(Some(told)).await;
    // Forward and reverse, wheels clear: two groups, one round of ticks.
    screen.touch("quick-charge-drive").await;
    assert!(!screen.there("watch-0"), "nothing is ticked yet");
    assert!(screen.tick_all("charge-both-ways").await > 5);
    screen.touch("watch-0").await;
    assert_eq!(focused(), "watch-title");
    assert!(screen.text("watch").contains("Charge pressure"));
    assert!(screen.text("watch-condition").contains("forward"));
    assert!(screen.text("watch-words").contains("18.2 to 23.9"));
    assert!(screen.text("watch-words").contains("common practice"));
    assert_eq!(screen.text("watch-count"), "1 of 2");
    assert!(screen.there("watch-band") && !screen.there("watch-needle"));
    assert!(screen.text("watch-safety").contains("Hands off"));
    let watch: Element = screen.find("watch");
    assert!(
        watch.query_selector("input").expect("a selector").is_none(),
        "nothing is typed in it"
    );
    assert!(!screen.there("hold-timer"), "nothing is held here");

    screen.touch("watch-next").await;
    assert!(screen.text("watch-condition").starts_with("Change to: "));
    assert!(screen.text("watch-words").contains("20.9 to 24.8"));

    screen.touch("watch-write").await;
    assert!(!screen.there("watch"));
    assert_eq!(focused(), "reading-r1");
    screen.type_in("value-0", "21").await;
    assert_eq!(bar(screen.seen(0)), Some(21.0));
}

#[wasm_bindgen_test]
async fn a_hold_ends_by_itself_and_rests_for_all_readings() {
    let screen = Screen::open(None).await;
    screen.touch("quick-held-forward").await;
    screen.touch("alone-no").await;
    screen.tick_all("pressure-build-up").await;
    screen.touch("watch-0").await;
    assert_eq!(screen.text("watch-count"), "1 of 4");
    assert!(screen.there("watch-stop"));
    // A profile without figures: it says so, and gives what is common practice.
    assert!(screen.text("hold-basis").contains("no figure of this unit"));
    screen.touch("hold-start").await;
    assert!(screen.there("hold-left"));
    skip(6);
    until(&screen, "hold-rest").await;
    assert!(!screen.there("hold-start"));

    // The oil rests whatever is read next.
    screen.touch("watch-next").await;
    assert_eq!(screen.text("watch-count"), "2 of 4");
    assert!(screen.there("hold-rest") && !screen.there("hold-start"));
    // Also behind the closed view.
    screen.touch("watch-close").await;
    assert_eq!(focused(), "row-r2");
    screen.touch("watch-0").await;
    assert!(screen.there("hold-rest"));
    skip(61);
    until(&screen, "hold-start").await;

    // A lever that is back early rests from then.
    screen.touch("hold-start").await;
    screen.touch("hold-back").await;
    assert!(screen.there("hold-rest"));
}

#[wasm_bindgen_test]
async fn a_restart_in_one_touch_takes_every_tick_back() {
    let screen = Screen::open(None).await;
    assert!(!screen.there("engine-restarted"));
    screen.touch("quick-motor-drain").await;
    screen.touch("quick-charge-drive").await;
    screen.tick_all("motor-drain-in-neutral").await;
    screen.tick_all("charge-both-ways").await;
    assert!(screen.there("value-0") && screen.there("value-1"));
    screen.touch("engine-restarted").await;
    assert!(!screen.there("value-0") && !screen.there("value-1"));
    assert!(screen.visit().precautions.is_empty());
    screen.touch("undo").await;
    assert!(screen.there("value-0") && screen.there("value-1"));

    // From within the watch view too: it says why nothing is read now.
    screen.touch("watch-0").await;
    screen.touch("watch-restarted").await;
    assert!(screen.there("watch-closed") && !screen.there("watch-words"));
    screen.touch("watch-close").await;
    assert!(!screen.there("value-0"));
}

fn reading(condition: Condition, port: Port) -> Reading {
    Reading {
        id: "r1".to_owned(),
        port,
        path: Path::Left,
        condition,
        rigging: String::new(),
        seen: None,
        typed: String::new(),
        note: String::new(),
    }
}

/// A visit whose ticks were all set at a moment, for a code of what the machine did.
fn ticked(condition: Condition, port: Port, moment: &str, code: &str) -> Visit {
    let check = checks::for_reading(&condition, port).expect("a check");
    let mut facts = vec![format!("Ticked {moment} for {code}")];
    facts.extend(
        checks::facts(check, condition.doing)
            .iter()
            .map(|fact| (*fact).to_owned()),
    );
    Visit {
        alone: Some(false),
        readings: vec![reading(condition, port)],
        precautions: [(check.id.to_owned(), facts)].into(),
        ..Visit::default()
    }
}

#[wasm_bindgen_test]
async fn ticks_of_a_quarter_of_an_hour_ago_and_of_another_condition_open_nothing() {
    let before = |minutes: f64| {
        let moment = js_sys::Date::new(&(js_sys::Date::now() - minutes * 60_000.0).into());
        String::from(moment.to_iso_string())
    };
    let free = Condition {
        doing: Doing::Free,
        lever: Lever::Half,
        ..Condition::start()
    };
    for (minutes, opens) in [(14.0, true), (15.1, false)] {
        let visit = ticked(free, Port::Charge, &before(minutes), "Free");
        let screen = Screen::open_after(None, visit, Vec::new()).await;
        assert_eq!(screen.there("value-0"), opens, "{minutes} min");
        if !opens {
            assert!(screen.text("reading-row-0").contains("15 minutes"));
        }
    }
    let visit = ticked(free, Port::Charge, &before(1.0), "Travel");
    let screen = Screen::open_after(None, visit, Vec::new()).await;
    assert!(
        !screen.there("value-0"),
        "ticked while it did something else"
    );
    // What holds it forward does not hold it in reverse.
    let held = |direction| Condition {
        doing: Doing::Held,
        direction,
        lever: Lever::Share(0.1),
        ..Condition::start()
    };
    for (direction, opens) in [(Direction::Forward, true), (Direction::Reverse, false)] {
        let visit = ticked(held(direction), Port::LoopA, &before(1.0), "Held");
        let screen = Screen::open_after(None, visit, Vec::new()).await;
        assert_eq!(screen.there("value-0"), opens, "{direction:?}");
    }
}

#[wasm_bindgen_test]
async fn a_jug_makes_a_flow_with_its_spread_and_refuses_what_overflows() {
    let screen = Screen::open(None).await;
    screen.touch("quick-motor-drain").await;
    screen.tick_all("motor-drain-in-neutral").await;
    screen.type_in("jug-volume-0", "2").await;
    assert_eq!(screen.seen(0), None);
    screen.type_in("jug-time-0", "31 s").await;
    let flow = bar(screen.seen(0)).expect("a flow");
    assert!((flow - 3.87).abs() < 1e-9, "{flow}");
    assert_eq!(screen.find::<HtmlInputElement>("value-0").value(), "3.87");
    assert!(screen.text("jug-result-0").contains('±'));
    assert_eq!(screen.visit().caught["r1"].volume.typed, "2");

    // Mixed units; then too much: the figure of the jug goes, its litres stay.
    screen.type_in("jug-volume-0", "1 US gal").await;
    assert!((bar(screen.seen(0)).expect("a flow") - 7.33).abs() < 1e-9);
    screen.type_in("jug-time-0", "0:10").await;
    assert_eq!(screen.seen(0), None);
    assert!(screen.text("jug-error-0").contains("flow meter"));
    assert_eq!(screen.visit().caught["r1"].time.typed, "0:10");
    screen.touch("jug-over-0").await;
    match screen.seen(0) {
        Some(Seen::OffScale { top }) => assert_eq!(top.base(), 10.0),
        other => panic!("{other:?}"),
    }
    screen.touch("undo").await;
    screen.touch("undo").await;
    assert!(screen.visit().caught.is_empty() && screen.seen(0).is_none());
}

#[wasm_bindgen_test]
async fn the_watch_of_the_jug_gives_the_seconds() {
    let screen = Screen::open(None).await;
    screen.touch("quick-motor-drain").await;
    screen.tick_all("motor-drain-in-neutral").await;
    screen.type_in("jug-volume-0", "2 l").await;
    screen.touch("jug-r1-watch-press").await;
    skip(31);
    screen.touch("jug-r1-watch-press").await;
    let time = screen.visit().caught["r1"].time.value.expect("a time");
    let seconds = time.base_of(Kind::Time).expect("a time");
    assert!(seconds >= 31.0, "{seconds}");
    let flow = bar(screen.seen(0)).expect("a flow");
    assert!(
        (flow - 120.0 / seconds).abs() < 0.006 * flow,
        "{flow} L/min"
    );
    // A figure typed over it is kept, and it is told.
    screen.type_in("value-0", "5").await;
    assert_eq!(bar(screen.seen(0)), Some(5.0));
    assert!(screen.text("jug-result-0").contains("Another figure"));
}

#[wasm_bindgen_test]
async fn help_is_one_touch_away_at_the_reading() {
    let screen = Screen::open(None).await;
    screen.touch("quick-charge-neutral").await;
    let fold: Element = screen.find("help-0");
    let details = fold.parent_element().expect("a fold");
    screen.touch("help-0").await;
    // The fold opens in a task of the browser.
    for _ in 0..200 {
        if details
            .text_content()
            .unwrap_or_default()
            .contains("Watch for")
        {
            break;
        }
        screen.drawn().await;
    }
    let text = details.text_content().unwrap_or_default();
    assert!(
        text.contains(Port::Charge.help().place) && text.contains("manual comes first"),
        "{text}"
    );
}
