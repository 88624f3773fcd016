//! What is typed, pasted or scanned: figures, tables, tags, packed texts. The first character says which.
#![no_main]

#[path = "../shared.rs"]
mod shared;

use libfuzzer_sys::fuzz_target;
use shared::take;

fuzz_target!(|text: &str| {
    let Some((which, text)) = text.split_at_checked(1) else {
        return;
    };
    match which {
        "t" => {
            take::table(text);
        }
        "#" => {
            take::tag(text);
        }
        "p" => {
            take::packed(text.to_owned());
        }
        _ => {
            take::figure(text, usize::from(which.as_bytes()[0]));
        }
    }
});
