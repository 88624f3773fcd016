//! The office command: exports in, one line of JSON for each visit out.
#![cfg(not(target_arch = "wasm32"))]

mod record_support;

use lowside::record::{Book, Export, Settings, Visit};
use lowside::unit::Unit;
use proptest::prelude::*;
use record_support::Dice;
use serde_json::Value;
use std::io::{Read, Write};
use std::process::{Command, Output, Stdio};

const NOW: &str = "2025-03-18T17:00:00Z";

fn command() -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_assess"));
    command
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped());
    command
}

fn assess(input: &[u8]) -> Output {
    let mut child = command().spawn().expect("it starts");
    let mut stdin = child.stdin.take().expect("a pipe");
    let input = input.to_vec();
    // Written beside the reading: neither side can block the other. A refused file may close the pipe early.
    let writer = std::thread::spawn(move || drop(stdin.write_all(&input)));
    let output = child.wait_with_output().expect("it ends");
    writer.join().expect("written");
    output
}

fn lines(output: &Output) -> Vec<Value> {
    let text = std::str::from_utf8(&output.stdout).expect("UTF-8");
    text.lines()
        .map(|line| serde_json::from_str(line).expect("a line of JSON"))
        .collect()
}

fn words(output: &Output) -> String {
    String::from_utf8_lossy(&output.stderr).into_owned()
}

#[track_caller]
fn refused(input: &[u8], says: &str) {
    let output = assess(input);
    assert_eq!(output.status.code(), Some(2), "{}", words(&output));
    assert!(output.stdout.is_empty());
    assert!(
        words(&output).starts_with("assess: ") && words(&output).contains(says),
        "{}",
        words(&output)
    );
}

#[test]
fn the_demo_yard_gives_its_three_causes() {
    let output = assess(lowside::demo::TAMARISK.as_bytes());
    assert_eq!(output.status.code(), Some(0), "{}", words(&output));
    let lines = lines(&output);
    // Calls have causes, yard checks a verdict.
    let (calls, checks): (Vec<_>, Vec<_>) =
        lines.iter().partition(|line| line.get("causes").is_some());
    assert_eq!(checks.len(), 8);
    for check in checks {
        let verdict = check["verdict"].as_str().expect("a verdict");
        assert!(
            ["Nothing found in what was checked", "Watch"].contains(&verdict),
            "{check}"
        );
        assert!(!check["not_checked"].as_array().expect("a list").is_empty());
    }
    let told: Vec<(&str, &str, &str)> = calls
        .iter()
        .map(|line| {
            let text = |pointer: &str| {
                line.pointer(pointer)
                    .and_then(Value::as_str)
                    .unwrap_or("none")
            };
            (text("/visit"), text("/unit_name"), text("/causes/0/ids/0"))
        })
        .collect();
    assert_eq!(
        told,
        [
            ("demo-v-14", "T-14", "check-a-leaking"),
            ("demo-v-27", "T-27", "charge-pump-worn"),
            ("demo-v-33", "T-33", "control-null-off"),
        ]
    );
}

#[test]
fn each_line_holds_windows_causes_reasons_and_remarks() {
    let output = assess(lowside::demo::TAMARISK.as_bytes());
    let yard = Export::read(lowside::demo::TAMARISK.as_bytes()).expect("the demo");
    for (line, visit) in lines(&output).iter().zip(&yard.visits) {
        if visit.is_yard_check() {
            assert!(line["causes"].is_null() && line["reasons"].is_array());
            continue;
        }
        let windows = line["windows"].as_array().expect("windows");
        let ids: Vec<&str> = windows
            .iter()
            .filter_map(|window| window["reading"].as_str())
            .collect();
        assert_eq!(
            ids,
            visit
                .readings
                .iter()
                .map(|reading| reading.id.as_str())
                .collect::<Vec<_>>()
        );
        for window in windows {
            let at = |field: &str| window[field].as_f64().expect("a figure");
            assert!(
                at("low") <= at("middle") && at("middle") <= at("high"),
                "{window}"
            );
            assert!(!window["basis"].as_str().expect("a basis").is_empty());
        }
        let causes = line["causes"].as_array().expect("causes");
        let shares: Vec<f64> = causes
            .iter()
            .map(|cause| cause["probability"].as_f64().expect("a share"))
            .collect();
        assert!(
            (shares.iter().sum::<f64>() - 1.0).abs() < 1e-6,
            "{shares:?}"
        );
        assert!(shares.is_sorted_by(|a, b| *a >= b - 1e-9));
        assert!(
            causes
                .iter()
                .all(|cause| !cause["title"].as_str().expect("a title").is_empty())
        );
        assert!(
            !causes[0]["evidence"]
                .as_array()
                .expect("evidence")
                .is_empty()
        );
        for list in ["notes", "withheld"] {
            assert!(line[list].is_array(), "{list}");
        }
        assert!(line["trust"].is_object() && line.get("error").is_none());
    }
}

#[test]
fn what_is_no_export_ends_with_two_and_its_place() {
    refused(b"", "standard input is empty");
    refused(b"{\"units\":[]}", "no Lowside export");
    refused(b"\xff\xfe", "not UTF-8");
    refused(b"{\"lowside_export\":1,", "line 1");
    refused(b"{\"lowside_export\":99}", "newer version");
    refused(&vec![b' '; 3_000_000], "up to 2000000");
    let broken =
        lowside::demo::TAMARISK.replacen("\"port\": \"charge\"", "\"port\": \"ash_tray\"", 1);
    refused(broken.as_bytes(), "unknown variant `ash_tray`");
    let far = lowside::demo::TAMARISK.replacen("\"value\": 45.0", "\"value\": -45.0", 1);
    refused(far.as_bytes(), "units[0].figures.pump_displacement.value");
}

#[test]
fn a_visit_without_its_unit_ends_with_three_and_the_others_are_told() {
    let mut yard = Export::read(lowside::demo::TAMARISK.as_bytes()).expect("the demo");
    yard.units.remove(1);
    let output = assess(yard.text().expect("written").as_bytes());
    assert_eq!(output.status.code(), Some(3));
    let lines = lines(&output);
    assert_eq!(lines.len(), yard.visits.len());
    assert!(
        lines[1]["error"]
            .as_str()
            .expect("a reason")
            .contains("demo-t-27")
    );
    assert!(lines[1].get("causes").is_none());
    assert!(lines[0]["causes"].is_array() && lines[2]["causes"].is_array());
    assert!(words(&output).contains("visit demo-v-27"));
}

#[test]
fn nothing_to_assess_is_no_fault() {
    let output = assess(b"{\"lowside_export\":1}");
    assert_eq!((output.status.code(), output.stdout.len()), (Some(0), 0));
}

#[test]
fn help_version_and_what_is_neither() {
    let told = |arguments: &[&str]| {
        let output = command()
            .args(arguments)
            .stdin(Stdio::null())
            .output()
            .expect("it runs");
        (
            output.status.code(),
            String::from_utf8(output.stdout).expect("UTF-8"),
            String::from_utf8(output.stderr).expect("UTF-8"),
        )
    };
    let (code, out, _) = told(&["--help"]);
    assert_eq!(code, Some(0));
    assert!(out.contains("Usage: assess < export.json") && out.contains("Exit codes"));
    assert_eq!(
        told(&["--version"]).1,
        format!("assess {}\n", env!("CARGO_PKG_VERSION"))
    );
    for arguments in [&["--helf"][..], &["file.json"], &["--help", "--version"]] {
        let (code, out, error) = told(arguments);
        assert_eq!((code, out.as_str()), (Some(2), ""), "{arguments:?}");
        assert!(error.contains("--help"), "{error}");
    }
}

#[test]
fn a_reader_that_goes_away_is_no_fault() {
    // Far more lines than a pipe holds.
    let mut yard = Export::read(lowside::demo::TAMARISK.as_bytes()).expect("the demo");
    let visit = yard.visits[1].clone();
    for n in 0..40 {
        yard.visits.push(Visit {
            id: format!("v{n}"),
            ..visit.clone()
        });
    }
    let mut child = command().spawn().expect("it starts");
    let mut stdin = child.stdin.take().expect("a pipe");
    stdin
        .write_all(yard.text().expect("written").as_bytes())
        .expect("taken");
    drop(stdin);
    let mut out = child.stdout.take().expect("a pipe");
    let mut first = [0; 10];
    out.read_exact(&mut first).expect("a beginning");
    drop(out);
    let output = child.wait_with_output().expect("it ends");
    assert_eq!(output.status.code(), Some(0));
    assert_eq!(words(&output), "");
}

#[test]
fn whatever_the_app_can_hold_is_assessed() {
    for seed in 0..6 {
        let book = Dice(seed).book();
        let text = Export::of(&book, NOW).text().expect("written");
        let output = assess(text.as_bytes());
        let orphans = book.without_unit().count();
        assert_eq!(
            output.status.code(),
            Some(if orphans == 0 { 0 } else { 3 }),
            "seed {seed}: {}",
            words(&output)
        );
        let failed = lines(&output)
            .iter()
            .filter(|line| line.get("error").is_some())
            .count();
        assert_eq!(
            (lines(&output).len(), failed),
            (book.visits.len(), orphans),
            "seed {seed}"
        );
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 12, failure_persistence: None, ..ProptestConfig::default() })]

    /// A half-filled call: any figures, any readings, nothing refused, nothing that is no figure.
    #[test]
    fn any_call_gives_figures(seed in any::<u64>()) {
        let mut dice = Dice(seed);
        let unit: Unit = dice.unit();
        let instruments = Settings::start().instruments;
        let visit = dice.visit(&unit.id, &instruments);
        let mut book = Book { settings: Settings::start(), ..Book::default() };
        book.put_unit(unit);
        book.put_visit(visit);
        let output = assess(Export::of(&book, NOW).text().expect("written").as_bytes());
        prop_assert_eq!(output.status.code(), Some(0), "{}", words(&output));
        let line = &lines(&output)[0];
        let total: f64 = line["causes"].as_array().expect("causes").iter().filter_map(|c| c["probability"].as_f64()).sum();
        prop_assert!((total - 1.0).abs() < 1e-6, "{}", total);
    }
}
