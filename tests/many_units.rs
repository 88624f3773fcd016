//! A yard of 500 units and 5,000 calls: it fits what every browser gives, comes back whole, and can be handed over.
#![cfg(not(target_arch = "wasm32"))]

mod yard_support;

use lowside::record::{Book, Export};
use lowside::store::{MemoryStore, PackedStore, Shelf, Store, Usage};
use yard_support::yard;

const NOW: &str = "2026-03-18T17:00:00Z";

fn stored(book: &Book, store: &impl Store) -> Usage {
    let mut shelf = Shelf::new(store, "tab");
    shelf.load(NOW);
    let units: Vec<_> = book.units.values().cloned().collect();
    let visits: Vec<_> = book.visits.values().cloned().collect();
    shelf.add(&units, &visits, NOW).expect("there is room");
    assert!(shelf.save_settings(&book.settings, NOW).is_safe());
    shelf.usage().expect("it can be counted")
}

#[test]
fn five_thousand_calls_fit_what_every_browser_gives() {
    let book = yard(500, 5_000);
    let store = PackedStore::new(MemoryStore::new());
    let usage = stored(&book, &store);
    println!(
        "packed: {} characters, {:.2} of the budget",
        usage.characters,
        usage.share()
    );
    assert!(usage.share() <= 1.0, "{usage:?}");
    let mut other = Shelf::new(&store, "other");
    let loaded = other.load(NOW);
    assert!(loaded.problems.is_empty(), "{:?}", loaded.problems);
    assert!(loaded.book == book, "something else came back");
}

#[test]
fn packing_makes_room_for_five_times_as_much() {
    let book = yard(40, 400);
    let plain = stored(&book, &MemoryStore::new()).characters;
    let packed = stored(&book, &PackedStore::new(MemoryStore::new())).characters;
    println!(
        "plain {plain}, packed {packed}: {:.1} times",
        plain as f64 / packed as f64
    );
    assert!(packed * 5 <= plain, "plain {plain}, packed {packed}");
}

#[test]
fn a_large_yard_is_handed_over_in_files_that_are_read_again() {
    let book = yard(100, 1_200);
    let texts = Export::of(&book, NOW).texts().expect("texts");
    assert!(texts.len() > 1);
    let mut visits = 0;
    for text in &texts {
        let part = Export::read(text.as_bytes()).expect("it reads");
        assert!(part.remarks.is_empty(), "{:?}", part.remarks);
        visits += part.visits.len();
    }
    assert_eq!(visits, book.visits.len());
}
