//! Files out and in, and the demo yard.

use std::rc::Rc;

use super::hands::Hands;
use super::persist::book_of;
use super::platform::{clock, files};
use super::state::{Action, Records};
use crate::demo;
use crate::record::{Export, ImportPlan, Settings, Taken};
use crate::store::{Quarantined, RecordKey};

const JSON: &str = "application/json";

/// Hands everything over as a file, or as several where it is much.
pub fn export(hands: &Rc<Hands>) {
    hands.flush();
    let state = hands.now();
    let now = clock::now();
    let Some(count) = hand_over(hands, "lowside", &Export::of(&book_of(&state), &now)) else {
        return;
    };
    let settings = Settings {
        last_export: now,
        ..(*state.settings).clone()
    };
    hands.put(Action::PutSettings(settings));
    say_handed_over(hands, count);
}

/// Hands the closed calls opened before this year over as a file. They stay here until the person takes them away.
pub fn archive(hands: &Rc<Hands>, before: u16) {
    hands.flush();
    let book = book_of(&hands.now());
    let calls = crate::record::archive::old(&book, before);
    let export = Export::of_visits(&book, &calls, &clock::now());
    if let Some(count) = hand_over(hands, &format!("lowside-archive-before-{before}"), &export) {
        say_handed_over(hands, count);
    }
}

/// Hands an export to the browser; says how many files it takes. None, and told, where it cannot be done.
fn hand_over(hands: &Rc<Hands>, name: &str, export: &Export) -> Option<usize> {
    let texts = match export.texts() {
        Ok(texts) => texts,
        Err(why) => {
            hands.trouble(format!("The file could not be written: {why}."));
            return None;
        }
    };
    let count = texts.len();
    for (at, text) in texts.iter().enumerate() {
        let part = if count == 1 {
            String::new()
        } else {
            format!("-{}-of-{count}", at + 1)
        };
        let name = format!("{name}-{}{part}.json", clock::file_day());
        if let Err(why) = files::hand_over(&name, JSON, text) {
            hands.trouble(format!(
                "The file could not be handed to the browser: {why}."
            ));
            return None;
        }
    }
    Some(count)
}

fn say_handed_over(hands: &Rc<Hands>, count: usize) {
    hands.put(Action::Say(match count {
        1 => "The file was handed to the browser as a download.".to_owned(),
        count => {
            format!("{count} files were handed to the browser as downloads. Keep all of them.")
        }
    }));
}

/// Takes in what a file brings, all or none.
pub fn import(hands: &Rc<Hands>, plan: &ImportPlan, with_settings: bool) {
    let mut book = book_of(&hands.now());
    let taken = plan.apply(&mut book, with_settings);
    let words = format!(
        "Taken in: {}, {}.",
        count(taken.units.len(), "unit"),
        count(taken.visits.len(), "call")
    );
    take(hands, taken, book.settings, words);
}

/// Brings the demo yard in.
pub fn load_demo(hands: &Rc<Hands>) {
    let mut book = book_of(&hands.now());
    match demo::load(&mut book) {
        Ok(taken) => take(
            hands,
            taken,
            book.settings,
            "The demo yard is loaded.".to_owned(),
        ),
        Err(why) => hands.trouble(format!("The demo could not be read: {why}.")),
    }
}

/// Takes the demo yard away for good. A unit on which the person made a call of their own stays.
pub fn remove_demo(hands: &Rc<Hands>) {
    hands.flush();
    let removed = demo::remove(&mut book_of(&hands.now()));
    let visits = removed
        .visits
        .into_iter()
        .map(|visit| RecordKey::Visit(visit.id));
    let units = removed
        .units
        .into_iter()
        .map(|unit| RecordKey::Unit(unit.id));
    let keys: Vec<RecordKey> = visits.chain(units).collect();
    let actions = hands.keeper().borrow_mut().delete(&keys);
    for action in actions {
        hands.put(action);
    }
    hands.put(Action::Say(match removed.kept.len() {
        0 => "The demo was removed.".to_owned(),
        kept => format!(
            "The demo was removed. {} stayed, for the calls you made on them.",
            count(kept, "unit")
        ),
    }));
}

/// Stores new records and shows them.
fn take(hands: &Rc<Hands>, taken: Taken, settings: Settings, words: String) {
    hands.flush();
    let added = hands.keeper().borrow_mut().add(&taken.units, &taken.visits);
    if let Err(why) = added {
        return hands.trouble(format!("Nothing was taken in. {why}."));
    }
    hands.put(Action::Loaded(Box::new(Records {
        units: taken.units,
        visits: taken.visits,
        settings: None,
    })));
    if taken.settings_changed {
        hands.put(Action::PutSettings(settings));
    }
    hands.put(Action::Say(words));
}

/// "1 unit", "3 units".
pub fn count(number: usize, what: &str) -> String {
    if number == 1 {
        format!("1 {what}")
    } else {
        format!("{number} {what}s")
    }
}

/// Hands over a text that could not be read, as it was found.
pub fn hand_over_unread(hands: &Rc<Hands>, entry: &Quarantined, text: Option<String>) {
    let Some(text) = text else {
        return hands.trouble("That text is not there any more.".to_owned());
    };
    let tail: String = entry
        .was
        .chars()
        .map(|c| if c.is_ascii_alphanumeric() { c } else { '-' })
        .collect();
    if let Err(why) = files::hand_over(&format!("{tail}.txt"), "text/plain", &text) {
        hands.trouble(format!(
            "The file could not be handed to the browser: {why}."
        ));
    }
}
