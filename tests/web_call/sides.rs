//! A machine with two drive paths: readings say their side, and left and right are read in turn.

use crate::screen::{Screen, advised, bar, cause};
use lowside::assessment::{Assessment, At};
use lowside::faults::FaultId;
use lowside::next::{Advice, Foretold, Offer, RepairOffer, Would};
use lowside::readings::{Condition, Doing, Lever, Path, Port, Stroked};
use lowside::record::Visit;
use wasm_bindgen_test::wasm_bindgen_test;
use web_sys::{Element, HtmlInputElement};

fn places(screen: &Screen) -> Vec<(Port, Path)> {
    let readings = screen.visit().readings;
    readings.iter().map(|r| (r.port, r.path)).collect()
}

/// Wheel speeds both ways with the wheels clear, their fields open.
async fn with_speeds() -> Screen {
    let screen = Screen::open_on_two_paths(None, Visit::default()).await;
    screen.touch("quick-speeds").await;
    screen.tick_all("wheel-turns").await;
    screen
}

#[wasm_bindgen_test]
async fn a_set_reads_left_and_right_in_turn_and_the_difference_stands_under_them() {
    let screen = with_speeds().await;
    let (left, right) = ((Port::Wheel, Path::Left), (Port::Wheel, Path::Right));
    assert_eq!(places(&screen), [left, right, left, right]);
    let readings = screen.visit().readings;
    assert_eq!(readings[0].condition, readings[1].condition);
    assert_ne!(readings[1].condition, readings[2].condition);
    for (place, name) in [(0, "Left wheel speed"), (1, "Right wheel speed")] {
        let row = screen.text(&format!("reading-row-{place}"));
        assert!(row.contains(name), "{name}: {row}");
        let more: Element = screen.find(&format!("more-{place}"));
        assert_eq!(
            more.get_attribute("aria-label"),
            Some(format!("More about {name}"))
        );
    }
    screen.type_in("value-0", "43.2").await;
    assert!(!screen.there("pair-r2"), "one side alone says nothing yet");
    screen.type_in("value-1", "41.8").await;
    let pair = screen.text("pair-r2").replace('\u{202f}', " ");
    assert_eq!(pair, "Right 1.4 rpm lower (−3.2 %)");
    assert!(!screen.there("pair-r4"));

    // What is there on one side only lacks the other.
    screen.touch("more-1").await;
    screen.touch("remove-1").await;
    screen.touch("remove-1-yes").await;
    assert!(!screen.there("pair-r2"));
    screen.touch("quick-speeds").await;
    let readings = screen.visit().readings;
    assert_eq!(readings.len(), 4);
    assert_eq!(readings[3].condition, readings[0].condition);
    assert_eq!(readings[3].path, Path::Right);
}

#[wasm_bindgen_test]
async fn the_side_is_changed_taken_back_and_kept() {
    let screen = with_speeds().await;
    screen.type_in("value-0", "43").await;
    screen.touch("more-0").await;
    screen.touch("side-0-right").await;
    assert_eq!(screen.visit().readings[0].path, Path::Right);
    assert!(screen.text("reading-row-0").contains("Right wheel speed"));
    assert!(
        screen.text("undo").contains("side, now right"),
        "{}",
        screen.text("undo")
    );
    assert_eq!(bar(screen.seen(0)), Some(43.0));
    let kept = screen.visit();

    screen.touch("undo").await;
    assert_eq!(screen.visit().readings[0].path, Path::Left);

    // As it comes back from the record.
    let text = serde_json::to_string(&kept).expect("text");
    let kept: Visit = serde_json::from_str(&text).expect("a visit");
    let screen = Screen::open_on_two_paths(None, kept).await;
    assert!(screen.text("reading-row-0").contains("Right wheel speed"));
    screen.touch("more-0").await;
    assert!(screen.find::<HtmlInputElement>("side-0-right").checked());
}

#[wasm_bindgen_test]
async fn what_both_sides_share_is_read_once_and_has_no_side() {
    let screen = Screen::open_on_two_paths(None, Visit::default()).await;
    screen.touch("quick-case").await;
    assert_eq!(
        places(&screen),
        [
            (Port::PumpCase, Path::Left),
            (Port::MotorCase, Path::Left),
            (Port::MotorCase, Path::Right)
        ]
    );
    assert!(screen.text("reading-row-0").contains("Pump case pressure"));
    assert!(!screen.text("reading-row-0").contains("Left"));
    screen.touch("more-0").await;
    assert!(!screen.there("side-0"));
    // The drawing shows one side and says so; a touch on it goes to what is there.
    assert!(screen.text("map-sides").contains("left and right"));
    let port: Element = screen.find("map-MotorCase");
    screen.fire(&port, "click").await;
    assert_eq!(places(&screen).len(), 3);
    let port: Element = screen.find("map-LoopA");
    screen.fire(&port, "click").await;
    assert_eq!(
        places(&screen)[3..],
        [(Port::LoopA, Path::Left), (Port::LoopA, Path::Right)]
    );
}

#[wasm_bindgen_test]
async fn on_one_path_nothing_names_a_side() {
    let screen = Screen::open(None).await;
    assert!(!screen.there("quick-speeds") && !screen.there("map-sides"));
    screen.touch("quick-motor-drain").await;
    screen.touch("add-reading").await;
    assert!(!screen.there("add-side"));
    screen.touch("add-MotorCase").await;
    screen.touch("condition-0").await;
    assert!(!screen.there("cond-r1-stroked"));
    screen.touch("more-1").await;
    assert!(!screen.there("side-1") && !screen.there("other-side-1"));
    let all = screen.text("call");
    for word in ["Left ", "left and right", "Right "] {
        assert!(!all.contains(word), "{word}: {all}");
    }
}

#[wasm_bindgen_test]
async fn one_side_is_added_where_it_is_asked_for_and_the_other_is_a_touch_away() {
    let screen = Screen::open_on_two_paths(None, Visit::default()).await;
    screen.touch("add-reading").await;
    screen.touch("add-side-right").await;
    screen.touch("add-MotorDrain").await;
    assert_eq!(places(&screen), [(Port::MotorDrain, Path::Right)]);
    screen.touch("more-0").await;
    screen.touch("other-side-0").await;
    assert_eq!(
        places(&screen),
        [
            (Port::MotorDrain, Path::Right),
            (Port::MotorDrain, Path::Left)
        ]
    );
    assert!(!screen.there("other-side-0"));
    // The set adds nothing to it.
    assert!(
        screen
            .find::<Element>("quick-motor-drain")
            .has_attribute("disabled")
    );
}

#[wasm_bindgen_test]
async fn one_side_driven_alone_is_said_in_the_heading_and_at_the_hand() {
    let screen = Screen::open_on_two_paths(None, Visit::default()).await;
    screen.touch("quick-charge-drive").await;
    assert_eq!(places(&screen).len(), 2, "charge is common to both sides");
    assert!(!screen.there("one-side-alone"));
    screen.touch("condition-0").await;
    screen.touch("cond-r1-stroked-right").await;
    assert_eq!(screen.visit().readings[0].condition.stroked, Stroked::Right);
    assert_eq!(screen.visit().readings[1].condition.stroked, Stroked::Both);
    assert!(screen.text("call").contains("right side alone"));
    assert!(screen.text("one-side-alone").contains("on the spot"));
    // In neutral nothing is stroked, and nothing is asked.
    screen.pick("cond-r1-doing", "Neutral").await;
    assert!(!screen.there("cond-r1-stroked") && !screen.there("one-side-alone"));
    assert_eq!(screen.visit().readings[0].condition.stroked, Stroked::Both);
}

#[wasm_bindgen_test]
async fn one_gauge_goes_from_left_to_right_until_the_other_side_has_its_own() {
    let screen = Screen::open_on_two_paths(None, Visit::default()).await;
    screen.touch("quick-case").await;
    let with = |place: usize| {
        let visit = screen.visit();
        let rigging = &visit.readings[place].rigging;
        let found = visit.riggings.iter().find(|r| r.id == *rigging);
        found.map(|r| r.instrument.clone()).unwrap_or_default()
    };
    screen.pick("rig-1", "gauge-60").await;
    assert_eq!((with(1), with(2)), ("gauge-60".into(), "gauge-60".into()));
    screen.pick("rig-2", "gauge-600").await;
    assert_eq!((with(1), with(2)), ("gauge-60".into(), "gauge-600".into()));
    // A further reading stands on the gauge of its side.
    screen.touch("add-reading").await;
    screen.touch("add-MotorCase").await;
    assert_eq!((with(3), with(4)), ("gauge-60".into(), "gauge-600".into()));
}

/// A worn motor on a side.
fn on(side: Path) -> At {
    At {
        id: FaultId::MotorWorn,
        path: Some(side),
    }
}

/// Wheel speed with the wheels clear, left and right.
fn offer() -> Offer {
    let condition = Condition {
        doing: Doing::Free,
        lever: Lever::Full,
        ..Condition::start()
    };
    let would = |side: Path, low: f64| Would {
        id: FaultId::MotorWorn,
        title: on(side).title(),
        value: low + 1.0,
        low,
        high: low + 2.0,
    };
    let foretold = |path, left: f64, right: f64| Foretold {
        path,
        port: Port::Wheel,
        condition,
        would: vec![would(Path::Left, left), would(Path::Right, right)],
    };
    Offer {
        id: "wheel-turns".to_owned(),
        title: "Wheel turns".to_owned(),
        bits: 0.5,
        minutes: 4.0,
        hazard: 2,
        why: "Tells left from right.".to_owned(),
        hold: None,
        foretold: vec![
            foretold(Path::Left, 30.0, 40.0),
            foretold(Path::Right, 42.0, 32.0),
        ],
    }
}

/// The same cause on either side, the right one leading.
fn told(advice: Advice) -> Assessment {
    let row = |side: Path, probability| {
        let mut row = cause(
            FaultId::MotorWorn,
            &on(side).title(),
            probability,
            Some(1.0),
        );
        row.paths = vec![Some(side)];
        row
    };
    Assessment {
        causes: vec![row(Path::Right, 0.6), row(Path::Left, 0.3)],
        ..advised(advice)
    }
}

#[wasm_bindgen_test]
async fn the_next_check_and_the_repair_name_the_side() {
    let screen = Screen::open_on_two_paths(
        Some(told(Advice {
            checks: vec![offer()],
            repair: Some(RepairOffer {
                id: FaultId::MotorWorn,
                path: Some(Path::Right),
                repair: "Right: change the motor.".to_owned(),
                minutes: 200.0,
                probability: 0.6,
                proof: "Drain flow on the right.".to_owned(),
                now: false,
                waits: String::new(),
                needs_manual: false,
                caution: String::new(),
                proved_by: vec!["r2".to_owned()],
            }),
            ..Advice::default()
        })),
        Visit::default(),
    )
    .await;
    let best = screen.text("next-0");
    assert!(
        best.contains("Left wheel speed") || best.contains("Right wheel speed"),
        "{best}"
    );
    let add = screen.text("next-add-0");
    assert_eq!(add, "Take these 2 readings, left and right");
    screen.touch("next-add-0").await;
    assert_eq!(
        places(&screen),
        [(Port::Wheel, Path::Left), (Port::Wheel, Path::Right)]
    );
    let repair = screen.text("next-repair");
    assert!(repair.contains(&on(Path::Right).title()), "{repair}");
    assert!(repair.contains("Right wheel speed"), "{repair}");

    // One of them gone: only that one is asked for again.
    screen.touch("more-0").await;
    screen.touch("remove-0").await;
    screen.touch("remove-0-yes").await;
    assert_eq!(places(&screen), [(Port::Wheel, Path::Right)]);
    assert_eq!(screen.text("next-add-0"), "Take this reading on the left");
    screen.touch("next-add-0").await;
    assert_eq!(
        places(&screen),
        [(Port::Wheel, Path::Right), (Port::Wheel, Path::Left)]
    );
}

#[wasm_bindgen_test]
async fn the_same_cause_on_either_side_is_two_rows_each_with_its_own_words() {
    let screen = Screen::open_on_two_paths(
        Some(told(Advice {
            checks: vec![offer()],
            ..Advice::default()
        })),
        Visit::default(),
    )
    .await;
    for (place, side, would) in [
        (0, Path::Right, "32.0 to 34.0"),
        (1, Path::Left, "42.0 to 44.0"),
    ] {
        let title = on(side).title();
        screen.touch(&format!("cause-open-{place}")).await;
        let row = screen.text(&format!("cause-{place}"));
        assert!(row.contains(&title), "{title}: {row}");
        // What the right wheel would show: slow under the right motor, sound under the left one.
        let right = row.split("Right wheel speed").nth(1).unwrap_or_default();
        assert!(right.contains(would), "{would}: {row}");
    }
}
