//! The ranking on the screen.

use crate::screen::{Screen, cause};
use lowside::assessment::{Assessment, Pair};
use lowside::faults::FaultId;
use wasm_bindgen_test::wasm_bindgen_test;

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
    screen.touch("cause-open-0").await;
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
