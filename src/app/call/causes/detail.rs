//! Behind a cause: what speaks for and against it, what the gauges would read under it, its proof and its repair.

use super::row::Told;
use crate::app::call::quick::alike;
use crate::app::call::side::named;
use crate::app::call::{cautions, words};
use crate::app::parts::{Caution, Grade};
use crate::assessment::{At, Cause, Evidence};
use crate::caution;
use crate::faults;
use crate::next::{Advice, Foretold, Would};
use crate::quantity::UnitPrefs;
use crate::readings::{Path, Port, Reading, Seen};
use yew::{Html, html};

/// Marks in a row of weight.
const MARKS: usize = 4;
/// Ports not read yet that are told.
const OTHERS: usize = 4;

/// What serves every member of a set, and what splits them.
pub fn set(cause: &Cause) -> Html {
    if cause.ids.len() < 2
        || cause.pair.is_some()
        || (cause.action.is_empty() && cause.split.is_empty())
    {
        return Html::default();
    }
    html! {
        <dl class="member-facts">
            if !cause.action.is_empty() {
                <dt>{ "Serves them all" }</dt><dd>{ cause.action.clone() }</dd>
            }
            if !cause.split.is_empty() {
                <dt>{ "Splits them" }</dt><dd>{ cause.split.clone() }</dd>
            }
        </dl>
    }
}

/// For and against, heaviest first.
pub fn evidence(cause: &Cause, told: &Told) -> Html {
    let weighty = cause
        .evidence
        .iter()
        .filter(|item| words::weight(item.weight).0 > 0);
    let (favour, against): (Vec<&Evidence>, Vec<&Evidence>) =
        weighty.partition(|item| item.weight > 0.0);
    if favour.is_empty() && against.is_empty() {
        return html! { <p class="soft">{ "Nothing taken so far speaks clearly for or against it." }</p> };
    }
    let list = |title: &'static str, items: Vec<&Evidence>, way: &'static str| {
        if items.is_empty() {
            return Html::default();
        }
        html! {
            <div class="evidence">
                <h3>{ title }</h3>
                <ul class="evidence-list">
                    { for items.into_iter().map(|item| piece(item, way, told)) }
                </ul>
            </div>
        }
    };
    html! { <>
        { list("Speaks for it", favour, "for") }
        { list("Speaks against it", against, "against") }
    </> }
}

fn piece(item: &Evidence, way: &str, told: &Told) -> Html {
    let (filled, how) = words::weight(item.weight);
    let text = match told.reading(&item.of) {
        Some(reading) => told.link(reading),
        None => html! { { item.words.clone() } },
    };
    html! {
        <li class={format!("evidence-piece is-{way}")} key={item.of.clone()}>
            <span class="weight-of">
            <svg class="weight" viewBox="0 0 60 14" width="60" height="14" aria-hidden="true" focusable="false">
                { for (0..MARKS).map(|place| html! {
                    <circle
                        cx={(7 + 15 * place).to_string()} cy="7" r="5.2"
                        class={if place < filled { "weight-filled" } else { "weight-empty" }}
                    />
                }) }
            </svg>
                <span class="evidence-how">{ how }</span>
            </span>
            <span>{ text }</span>
        </li>
    }
}

/// What the readings would be under the cause, beside what they are.
pub fn would_read(cause: &Cause, told: &Told) -> Html {
    let prefs = told.prefs;
    let rows = cause
        .would_read
        .iter()
        .filter_map(|would| Some((would, told.reading(&would.reading)?)));
    let rows: Vec<_> = rows.collect();
    if rows.is_empty() {
        return Html::default();
    }
    html! {
        <div class="would">
            <h3>{ "Under it the gauges would read" }</h3>
            <ul class="would-list">
                { for rows.into_iter().map(|(would, reading)| html! {
                    <li class="would-row" key={would.reading.clone()}>
                        <span class="would-what">
                            { short(told, reading.port, reading.path) }
                            <span class="soft">{ " · " }{ words::condition(&reading.condition, prefs) }</span>
                        </span>
                        <span class="would-value figure">
                            { words::rough(reading.port, would.value, would.spread, prefs) }
                        </span>
                        <span class="would-read soft">{ read(reading, prefs) }</span>
                    </li>
                }) }
            </ul>
        </div>
    }
}

/// A port in a word or two, with its side.
fn short(told: &Told, port: Port, path: Path) -> String {
    named(told.sides.side(port, path), words::port_short(port))
}

fn read(reading: &Reading, prefs: &UnitPrefs) -> String {
    match &reading.seen {
        Some(Seen::NotPossible { .. }) | None => String::from("not taken"),
        Some(seen) => format!("read: {}", words::seen(reading.port, seen, prefs)),
    }
}

/// What the ports that are not read yet would show under the cause: those of the checks on offer.
pub fn others(cause: &Cause, advice: Option<&Advice>, told: &Told) -> Html {
    let (prefs, sides) = (told.prefs, told.sides);
    let offers = advice.iter().flat_map(|advice| &advice.checks);
    let open = offers.flat_map(|offer| &offer.foretold).filter(|foretold| {
        !told.readings.iter().any(|reading| {
            reading.port == foretold.port
                && sides.path(reading.port, reading.path) == foretold.path
                && reading.seen.is_some()
                && alike(&reading.condition, &foretold.condition)
        })
    });
    let rows: Vec<(&Foretold, &Would)> = open
        .filter_map(|foretold| {
            let of = |would: &&Would| {
                let mut members = cause.members();
                // On two paths the same cause stands there for either side, and says so in its title.
                members.any(|m| m.id == would.id && (m.path.is_none() || m.title() == would.title))
            };
            Some((foretold, foretold.would.iter().find(of)?))
        })
        .take(OTHERS)
        .collect();
    if rows.is_empty() || cause.pair.is_some() {
        return Html::default();
    }
    html! {
        <div class="would">
            <h3>{ "Not read yet: it would show" }</h3>
            <ul class="would-list">
                { for rows.into_iter().map(|(foretold, would)| {
                    let (low, high) = words::ends(foretold.port, would.low, would.high, prefs);
                    html! {
                        <li class="would-row">
                            <span class="would-what">
                                { short(told, foretold.port, foretold.path) }
                                <span class="soft">{ " · " }{ words::condition(&foretold.condition, prefs) }</span>
                            </span>
                            <span class="would-value figure">{ format!("{low} to {high}") }</span>
                        </li>
                    }
                }) }
            </ul>
        </div>
    }
}

/// The catalogue's word on one member of the row.
pub fn member(member: At, cause: &Cause) -> Html {
    let id = member.id;
    let Some(fault) = faults::find(id) else {
        return Html::default();
    };
    let share = cause
        .members()
        .position(|other| other == member)
        .and_then(|place| cause.shares.get(place));
    html! {
        <div class="member" key={member.key()}>
            if cause.ids.len() > 1 {
                <h3>
                    { member.title() }
                    { share.map(|share| html! { <span class="soft">{ format!(" ({} by itself)", words::percent(*share)) }</span> }) }
                </h3>
            }
            if !fault.explains.is_empty() {
                <p>{ fault.explains }</p>
            }
            if fault.stop_work {
                <Caution grade={Grade::Danger} title="stop work">
                    <p>{ "Do not drive or test this machine. Engine off, chock both ways." }</p>
                </Caution>
            }
            { caution::of_cause(id).map(cautions::at) }
            if !fault.caution.is_empty() {
                <Caution grade={Grade::Caution}><p>{ fault.caution }</p></Caution>
            }
            <dl class="member-facts">
                if !fault.proof.is_empty() {
                    <dt>{ "Proved by" }</dt><dd>{ fault.proof }</dd>
                }
                if !fault.repair.is_empty() {
                    <dt>{ "Repair" }</dt>
                    <dd>
                        { fault.repair }
                        if fault.minutes > 0.0 {
                            <span class="soft">{ format!(" About {:.0} min (common practice).", fault.minutes) }</span>
                        }
                    </dd>
                }
            </dl>
            if fault.destroys_evidence || fault.needs_manual {
                <ul class="flags">
                    if fault.destroys_evidence {
                        <li>{ "Destroys evidence: look at oil, filter and drain magnet first, and keep what you find." }</li>
                    }
                    if fault.needs_manual {
                        <li>{ "Only after the unit’s manual." }</li>
                    }
                </ul>
            }
        </div>
    }
}
