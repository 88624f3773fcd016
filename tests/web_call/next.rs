//! What to do next.

use crate::screen::{Screen, advised};
use lowside::faults::FaultId;
use lowside::next::{Advice, Foretold, Offer, RepairOffer, Would};
use lowside::readings::{Condition, Doing, Path, Port};
use lowside::record::Answer;
use wasm_bindgen_test::wasm_bindgen_test;

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
        path: Path::Left,
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
            bare("prove-the-gauges", "Prove the gauges"),
        ],
        ..Advice::default()
    })))
    .await;
    screen.touch("next-0-metal-not-seen").await;
    assert_eq!(
        screen.visit().observations.get("metal"),
        Some(&Answer::NotSeen)
    );
    // The others are folded.
    assert!(!screen.there("next-made-1"));
    screen.touch("next-open-1").await;
    screen.touch("next-made-1").await;
    assert_eq!(screen.visit().made, ["prove-the-gauges"]);
    assert!(screen.text("next-made").contains("Prove the gauges"));
    screen.touch("unmade-prove-the-gauges").await;
    assert!(screen.visit().made.is_empty());
}

#[wasm_bindgen_test]
async fn stop_checking_and_the_repair_say_what_proves_and_what_must_come_back() {
    let screen = Screen::open(Some(advised(Advice {
        stop: Some("No check that is left can change the order.".to_owned()),
        repair: Some(RepairOffer {
            id: FaultId::PumpWorn,
            path: None,
            repair: "Change the pump.".to_owned(),
            minutes: 240.0,
            probability: 0.62,
            proof: "Pump alone does not build.".to_owned(),
            now: true,
            waits: String::new(),
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
