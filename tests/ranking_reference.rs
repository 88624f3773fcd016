//! The same readings give the same ranking on every target. `web_ranking.rs` holds wasm against the same file.
//! After a change of the model that is meant: `LOWSIDE_WRITE_REFERENCE=1 cargo test --test ranking_reference`, and look at the
//! difference before it is committed.

mod support;
use support::reference;

const KEPT: &str = "tests/fixtures/ranking_reference.json";

#[test]
fn ranking_is_as_it_was_kept() {
    if std::env::var_os("LOWSIDE_WRITE_REFERENCE").is_some() {
        let text = serde_json::to_string_pretty(&reference::ranked()).expect("writes");
        std::fs::write(KEPT, text + "\n").expect("kept");
    }
    reference::compare(&std::fs::read_to_string(KEPT).expect("the kept file is there"));
}
