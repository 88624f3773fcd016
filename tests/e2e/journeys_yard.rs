//! Yard checks: out, back in with a change, wear over the hours from a file, and what closed calls teach.

use lowside::quantity::Typed;
use lowside::quantity::{Measure, Unit as InUnit};
use lowside::record::{Afterwards, Book, Closing, Export, Visit};
use lowside::unit::{MachineClass, Unit};
use lowside::yard::{Field, LOOKS, Leg, YardSheet};

use crate::hands::{look, open, press, type_in};
use crate::rig::{PHONE, Rig, TABLET};

/// Fills a sheet of a single-path machine: figures, then every look with its first answer.
async fn fill(rig: &Rig, figures: &[(&str, &str)], leg: Leg) {
    for (field, text) in figures {
        type_in(rig, &format!("yard-{field}"), text).await;
    }
    for look in LOOKS
        .iter()
        .filter(|l| l.leg.is_none_or(|only| only == leg))
    {
        let testid = format!("look-{}-{}", look.id, look.options[0].code);
        if rig.has(&testid).await {
            press(rig, &testid).await;
        }
    }
}

const FIGURES: [(&str, &str); 16] = [
    ("hours", "1210"),
    ("oil", "58"),
    ("low-idle", "905"),
    ("high-idle", "2390"),
    ("charge-low", "21,0"),
    ("charge-high", "23.5 bar"),
    ("knee", "900"),
    ("charge-forward", "22"),
    ("charge-reverse", "21.8"),
    ("forward-turns", "60"),
    ("forward-time", "60"),
    ("reverse-turns", "59.5"),
    ("reverse-time", "60"),
    ("engine-light", "2380"),
    ("loaded-turns", "56"),
    ("loaded-time", "60"),
];

#[tokio::test]
async fn out_and_in_are_checked_paired_and_kept() {
    let mut rig = Rig::open(TABLET).await;
    rig.wait_for_offline_copy().await;
    rig.click("load-demo").await;
    rig.wait_for_text("T-27").await;
    rig.go("/unit/demo-t-27").await;
    rig.by_id("unit-screen").await;
    press(&rig, "yard-out").await;
    rig.by_id("yard-screen").await;
    rig.wait_for_text("Nothing checked yet").await;
    // What no yard check covers stands there from the start.
    open(&rig, "not-checked").await;
    assert!(rig.text("not-checked").await.contains("Steering"));
    look(&rig, "yard-empty", TABLET).await;

    fill(&rig, &FIGURES, Leg::Out).await;
    type_in(&rig, "yard-engine-loaded", "2320").await;
    type_in(&rig, "yard-course", "yard ramp").await;
    rig.wait_for_text("Nothing found in what was checked").await;
    look(&rig, "yard-good", TABLET).await;

    // A limit, with its source; a fault that stops; what cannot be read stays as typed.
    type_in(&rig, "yard-charge-low", "17.5").await;
    rig.wait_until(
        "it is watched",
        "document.querySelector('[data-testid=verdict]').textContent.includes('Watch')",
    )
    .await;
    assert!(rig.text("reasons").await.contains("common practice"));
    press(&rig, "look-tow-valve-open").await;
    rig.wait_until(
        "it stays",
        "document.querySelector('[data-testid=verdict]').textContent.includes('Do not send out')",
    )
    .await;
    look(&rig, "yard-stop", TABLET).await;
    press(&rig, "look-tow-valve-shut").await;
    type_in(&rig, "yard-charge-low", "21,0").await;
    type_in(&rig, "yard-knee", "about 900").await;
    rig.wait_for_text("Saved").await;
    // From here on there is no network.
    rig.site.stop();
    rig.reload().await;
    rig.by_id("yard-screen").await;
    let kept = rig
        .js(
            "return document.querySelector('[data-testid=\"yard-knee\"]').value;",
            vec![],
        )
        .await;
    assert_eq!(kept.as_str(), Some("about 900"));
    type_in(&rig, "yard-knee", "900").await;
    press(&rig, "yard-finish").await;
    rig.by_id("yard-finished").await;

    // Back in: the ramp slips more.
    rig.click("back-to-unit").await;
    rig.by_id("unit-screen").await;
    press(&rig, "yard-in").await;
    rig.by_id("look-brake-glazed").await;
    fill(&rig, &FIGURES, Leg::In).await;
    type_in(&rig, "yard-hours", "1302").await;
    type_in(&rig, "yard-engine-loaded", "2320").await;
    type_in(&rig, "yard-loaded-turns", "50").await;
    rig.by_id("changes").await;
    assert!(rig.text("changes").await.contains("coming in"));
    assert!(rig.text("yard-change").await.contains("92 h on the meter"));
    look(&rig, "yard-in", TABLET).await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    rig.set_size(PHONE).await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    rig.set_size(TABLET).await;

    // What is handed over: the paper, its text, its table.
    rig.click("to-report").await;
    rig.by_id("check-report-screen").await;
    let paper = rig.text("report").await;
    assert!(paper.contains("coming in"), "{paper}");
    assert!(paper.contains("92 h on the meter"), "{paper}");
    assert!(paper.contains("Steering"), "{paper}");
    look(&rig, "yard-paper", TABLET).await;
    rig.click("report-csv").await;
    let table = rig.downloaded("lowside-T-27").await;
    assert!(table.contains("Charge, low idle (bar)"), "{table}");
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    rig.click("back-to-check").await;
    rig.by_id("yard-screen").await;
    rig.click("to-wear").await;
    rig.by_id("wear-screen").await;
    rig.wait_for_text("no line yet").await;
    let problems = rig.problems().await;
    assert!(problems.is_empty(), "{}", problems.join("\n"));
    rig.close().await;
}

fn typed(value: f64, unit: InUnit) -> Typed {
    Typed {
        typed: format!("{value}"),
        value: Some(Measure::literal(value, unit)),
    }
}

/// A roller that wears over ten checks at changing temperatures, and three closed calls.
fn yard() -> Book {
    let mut book = Book::default();
    let unit = Unit {
        id: "worn".into(),
        name: "R-8".into(),
        class: MachineClass::Roller,
        ..Unit::default()
    };
    for k in 0..10_u32 {
        let hours = 60.0 * f64::from(k);
        let oil = [46.0, 71.0, 58.0, 66.0, 50.0][k as usize % 5];
        let mu = lowside::yard::wear::viscosity_at(&unit, oil);
        let slip = 0.045 * (1.0 + 2.0 * hours / 1000.0) / mu;
        let mut sheet = YardSheet {
            leg: Leg::Between,
            course: "yard ramp".into(),
            gauge: if k < 6 { "gauge-60" } else { "gauge-16" }.into(),
            ..YardSheet::default()
        };
        let wobble = [0.0, 0.25, -0.25][k as usize % 3];
        for (field, value) in [
            (Field::Oil, oil),
            (Field::ForwardTurns, 120.0),
            (Field::ForwardTime, 60.0),
            (Field::EngineLight, 2380.0),
            (
                Field::LoadedTurns,
                (120.0 * (1.0 - slip) * 0.97 + wobble).round(),
            ),
            (Field::LoadedTime, 60.0),
            (Field::EngineLoaded, 2380.0 * 0.97),
            (Field::ChargeLow, if k < 7 { 21.0 } else { 15.0 }),
            (Field::ChargeHigh, 23.5),
            (Field::Drain, 0.4 * (1.0 + hours / 1500.0) / mu),
        ] {
            sheet.set(field, typed(value, field.asks().0));
        }
        book.put_visit(Visit {
            id: format!("check-{k}"),
            unit: unit.id.clone(),
            opened: format!("2026-{:02}-{:02}T08:00:00Z", 3 + k / 3, 1 + 9 * (k % 3)),
            hours: typed(1000.0 + hours, InUnit::Hour),
            yard: Some(sheet),
            closed: Some(Closing::default()),
            ..Visit::default()
        });
    }
    for (id, cause, is_proved, done) in [
        ("call-a", "pump-worn", true, "pump changed"),
        ("call-b", "inlet-air", true, "hose clamp"),
        ("call-c", "pump-worn", false, "pump changed, it went away"),
    ] {
        book.put_visit(Visit {
            id: id.into(),
            unit: unit.id.clone(),
            opened: "2025-11-01T08:00:00Z".into(),
            closed: Some(Closing {
                cause: cause.into(),
                is_proved,
                done: done.into(),
                afterwards: Afterwards::Gone,
                when: "2025-11-01T12:00:00Z".into(),
                ..Closing::default()
            }),
            ..Visit::default()
        });
    }
    book.put_unit(unit);
    book
}

#[tokio::test]
async fn wear_is_drawn_over_the_hours_and_closed_calls_teach_until_they_are_taken_back() {
    let rig = Rig::open(TABLET).await;
    let text = Export::of(&yard(), "2026-12-01T08:00:00Z")
        .text()
        .expect("records can be written");
    rig.go("/settings").await;
    rig.by_id("settings-screen").await;
    // The field itself is not drawn: its label is.
    let pick = "const input = document.querySelector('[data-testid=\"import-file\"]');
        const picked = new DataTransfer();
        picked.items.add(new File([arguments[0]], 'yard.json', { type: 'application/json' }));
        input.files = picked.files;
        input.dispatchEvent(new Event('change', { bubbles: true }));
        return true;";
    rig.js(pick, vec![text.into()]).await;
    rig.by_id("import-take").await;
    press(&rig, "import-take").await;
    rig.wait_for_text("Taken in").await;

    rig.go("/unit/worn/wear").await;
    rig.by_id("wear-screen").await;
    rig.by_id("plot-slip").await;
    assert!(rig.text("trend-slip").await.contains("It rises"));
    assert!(rig.text("projection-slip").await.contains("on the meter"));
    assert!(rig.text("wear-next").await.contains("Next check at"));
    assert!(
        rig.text("projection-low-idle")
            .await
            .contains("No projection")
    );
    look(&rig, "wear", TABLET).await;
    rig.set_size(PHONE).await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    rig.set_size(TABLET).await;

    // Learning: shown, case by case, taken back, switched off.
    rig.go("/settings").await;
    rig.by_id("settings-screen").await;
    press(&rig, "open-learned").await;
    rig.by_id("learned-screen").await;
    rig.wait_for_text("3 of 3 count").await;
    assert!(rig.text("rates").await.contains("1.5"));
    look(&rig, "learned", TABLET).await;
    press(&rig, "leave-call-a").await;
    rig.wait_for_text("2 of 3 count").await;
    assert!(!rig.text("rates").await.contains("1.5"));
    // A new call on the unit says what its base rates rest on.
    rig.go("/unit/worn").await;
    rig.by_id("unit-screen").await;
    press(&rig, "start-call").await;
    rig.by_id("call-screen").await;
    rig.wait_for_text("1.5 cases of your own").await;
    rig.go("/learned").await;
    rig.by_id("learned-screen").await;
    press(&rig, "learning-off").await;
    rig.by_id("nothing-learned").await;
    rig.wait_for_text("Saved").await;
    rig.reload().await;
    rig.by_id("nothing-learned").await;
    assert!(!rig.scrolls_sideways().await, "one has to scroll sideways");
    let problems = rig.problems().await;
    assert!(problems.is_empty(), "{}", problems.join("\n"));
    rig.close().await;
}
