//! One check on offer. The order on the screen is the order of the work: why, what it would say, what must be so first, the
//! readings, how, and what to put back.

use super::{NextPanelProps, foretold};
use crate::app::call::change::Change;
use crate::app::call::gate::{self, GATED_FROM};
use crate::app::call::gate_panel::{full_stroke, rise_words};
use crate::app::call::help;
use crate::app::call::quick::alike;
use crate::app::call::side::Wanted;
use crate::app::call::steady::Fold;
use crate::app::call::taken::Taken;
use crate::app::call::{hazard, seen_keys, words};
use crate::app::parts::{Caution, Grade, Icon, Retold, Shape};
use crate::checks::{self, Check};
use crate::next::{Foretold, Hold, Offer};
use crate::observations::{self, Observation};
use crate::readings::{Doing, Path, Port};
use yew::{Callback, Html, MouseEvent, html};

/// Observations asked in the open; more stand behind a fold.
const ASKED: usize = 3;

/// The best check, in full.
pub fn best(offer: &Offer, props: &NextPanelProps) -> Html {
    html! {
        <div class="next-best" data-testid="next-0">
            <p class="next-word">{ "Best check now" }</p>
            <h3 class="next-head">
                <span class="next-name">{ offer.title.clone() }</span>
                <span class="next-minutes figure">{ words::minutes(offer.minutes) }</span>
            </h3>
            { hazard::mark(offer.hazard) }
            { body(0, offer, props) }
        </div>
    }
}

/// Another check: its line, and the rest behind it.
pub fn other(place: usize, offer: &Offer, props: &NextPanelProps) -> Html {
    let head = html! { <>
        <span class="next-head">
            <span class="next-name">{ offer.title.clone() }</span>
            <span class="next-minutes figure">{ words::minutes(offer.minutes) }</span>
        </span>
        { hazard::mark(offer.hazard) }
    </> };
    let inside = {
        let (offer, props) = (offer.clone(), props.clone());
        Callback::from(
            move |()| html! { <div class="next-folded">{ body(place, &offer, &props) }</div> },
        )
    };
    html! {
        <li class="next-check" key={offer.id.clone()} data-testid={format!("next-{place}")}>
            <Fold {head} body={inside} class="next-fold" testid={format!("next-open-{place}")} />
        </li>
    }
}

/// A check that was made, with the way back.
pub fn made(offer: &Offer, props: &NextPanelProps) -> Html {
    let id = offer.id.clone();
    let on_back = props
        .on_change
        .reform(move |_: MouseEvent| Change::Made(id.clone(), false));
    html! {
        <li key={offer.id.clone()}>
            { offer.title.clone() }{ ": made. " }
            <button type="button" class="link" onclick={on_back} data-testid={format!("unmade-{}", offer.id)}>{ "Not made after all" }</button>
        </li>
    }
}

fn body(place: usize, offer: &Offer, props: &NextPanelProps) -> Html {
    let known = checks::find(&offer.id);
    html! { <>
        if !offer.why.is_empty() {
            <p class="next-why">{ offer.why.clone() }</p>
        }
        { foretold::shown(offer, props) }
        { known.map(|known| before(known, offer)) }
        { offer.hold.map(|hold| held(hold, props)) }
        { take(place, offer, props) }
        { known.map(|known| answer(place, known, offer, props)) }
        { known.map(how) }
    </> }
}

/// What must be so first. Where it is guarded by ticks, the ticks themselves stand at the readings.
fn before(known: &'static Check, offer: &Offer) -> Html {
    let mut facts: Vec<&'static str> = Vec::new();
    let guards = offer.foretold.iter().filter_map(|foretold| {
        let guard = checks::for_reading(&foretold.condition, foretold.port)?;
        Some(checks::facts(guard, foretold.condition.doing))
    });
    let own = checks::facts(
        known,
        offer
            .foretold
            .first()
            .map_or(Doing::Neutral, |foretold| foretold.condition.doing),
    );
    for fact in guards.flatten().chain(own) {
        if !facts.contains(&fact) {
            facts.push(fact);
        }
    }
    if facts.is_empty() {
        return Html::default();
    }
    let list = html! { <ul class="plain-list">{ for facts.iter().map(|fact| html! { <li><Retold text={*fact} /></li> }) }</ul> };
    // Where readings follow, each is ticked there before its field opens.
    let is_asked_again = !offer.foretold.is_empty() && offer.hazard < gate::NEVER_ALONE;
    if offer.hazard < GATED_FROM || is_asked_again {
        let (class, ends) = if offer.hazard < GATED_FROM {
            ("advice", "to see to first")
        } else {
            ("advice first is-care", "must be so first")
        };
        return html! {
            <details {class} data-testid={format!("first-{}", offer.id)}>
                <summary>
                    if offer.hazard >= GATED_FROM {
                        <Icon shape={Shape::Warning} />
                    }
                    { format!("{} things {ends}", facts.len()) }
                </summary>
                { list }
            </details>
        };
    }
    let grade = if offer.hazard >= gate::NEVER_ALONE {
        Grade::Danger
    } else {
        Grade::Caution
    };
    html! {
        <Caution {grade} title="first, each of these" class="small-caution gate" testid={format!("first-{}", offer.id)}>
            { list }
        </Caution>
    }
}

/// For a held machine: how long, and up to where.
fn held(hold: Hold, props: &NextPanelProps) -> Html {
    html! {
        <p class="gate-hold">
            { "Stop at " }
            <strong class="figure">{ words::value(Port::LoopA, hold.stop_at, &props.prefs) }</strong>
            { ". At full stroke " }
            <strong class="figure">{ full_stroke(hold.seconds, &props.prefs) }</strong>
            { " at most: the oil heats by about " }
            <strong class="figure">{ rise_words(hold.rise, &props.prefs) }</strong>
            { " each second." }
        </p>
    }
}

/// One touch puts the readings of the check below, in its conditions.
fn take(place: usize, offer: &Offer, props: &NextPanelProps) -> Html {
    if offer.foretold.is_empty() {
        return Html::default();
    }
    let there = |foretold: &Foretold| -> Option<&Taken> {
        props.taken.iter().find(|reading| {
            (reading.port, reading.path) == (foretold.port, foretold.path)
                && alike(&reading.condition, &foretold.condition)
        })
    };
    let missing: Vec<Wanted> = offer
        .foretold
        .iter()
        .filter(|foretold| there(foretold).is_none())
        .map(|foretold| Wanted {
            path: foretold.path,
            port: foretold.port,
            condition: foretold.condition,
        })
        .collect();
    let testid = format!("next-add-{place}");
    if missing.is_empty() {
        let first = offer
            .foretold
            .iter()
            .filter_map(there)
            .find(|reading| !reading.is_read)
            .map(|reading| reading.id.clone());
        let Some(first) = first else {
            return Html::default();
        };
        let on_go = props.on_reading.reform(move |_: MouseEvent| first.clone());
        return html! {
            <button type="button" class="button is-wide" data-testid={testid} onclick={on_go}>
                { "To its readings below" }
            </button>
        };
    }
    let words = match missing.len() {
        1 => String::from("Take this reading"),
        count => format!("Take these {count} readings"),
    };
    let on = |path: Path| {
        let mut sided = missing.iter().filter(|wanted| props.sides.has(wanted.port));
        sided.any(|wanted| wanted.path == path)
    };
    let words = match (on(Path::Left), on(Path::Right)) {
        (true, true) => format!("{words}, left and right"),
        (true, false) => format!("{words} on the left"),
        (false, true) => format!("{words} on the right"),
        (false, false) => words,
    };
    let on_add = props
        .on_change
        .reform(move |_: MouseEvent| Change::Add(missing.clone()));
    html! {
        <button
            type="button"
            class={if place == 0 { "button is-main is-wide" } else { "button is-wide" }}
            data-testid={testid}
            onclick={on_add}
        >
            <Icon shape={Shape::Plus} />{ words }
        </button>
    }
}

/// A check that is looked at or asked: its answers on the spot; one that leaves neither reading nor answer: made or not.
fn answer(place: usize, known: &'static Check, offer: &Offer, props: &NextPanelProps) -> Html {
    let asked: Vec<&'static Observation> = known
        .answers
        .iter()
        .filter_map(|id| observations::find(id))
        .collect();
    if asked.is_empty() && !offer.foretold.is_empty() {
        return Html::default();
    }
    let made = {
        let id = offer.id.clone();
        let on_made = props
            .on_change
            .reform(move |_: MouseEvent| Change::Made(id.clone(), true));
        html! {
            <button type="button" class="button is-wide" data-testid={format!("next-made-{place}")} onclick={on_made}>
                <Icon shape={Shape::Done} />{ "It is made" }
            </button>
        }
    };
    if asked.is_empty() {
        return made;
    }
    let on_change = props.on_change.clone();
    let observations = props.observations.clone();
    let one = move |observation: &&'static Observation| {
        let given = observations.get(observation.id).copied();
        html! {
            <li class="next-ask" key={observation.id}>
                { seen_keys::ask(observation, given, &format!("next-{place}"), &on_change) }
            </li>
        }
    };
    let open = if known.yields.is_empty() { ASKED } else { 0 };
    let (first, rest) = asked.split_at(open.min(asked.len()));
    let more = {
        let (one, rest) = (one.clone(), rest.to_vec());
        Callback::from(move |()| html! { <ul class="next-asks">{ for rest.iter().map(&one) }</ul> })
    };
    html! { <>
        if !first.is_empty() {
            <ul class="next-asks">{ for first.iter().map(&one) }</ul>
        }
        if !rest.is_empty() {
            <Fold
                head={html! { { if open == 0 { format!("Seen at it: {} to answer", rest.len()) } else { format!("{} more to answer", rest.len()) } } }}
                body={more}
                class="advice"
            />
        }
        if offer.foretold.is_empty() && !known.yields.is_empty() {
            { made }
        }
    </> }
}

/// How it is done, with what, and what is put back.
fn how(known: &'static Check) -> Html {
    html! { <>
        if !known.how.is_empty() {
            <details class="advice" data-testid={format!("how-{}", known.id)}>
                <summary>{ "How it is done" }</summary>
                <ol class="next-how">{ for known.how.iter().map(|step| html! { <li><Retold text={*step} /></li> }) }</ol>
                { help::of_check(known.id) }
            </details>
        }
        <dl class="next-facts">
            if known.instruments != "none" {
                <div><dt>{ "Needs" }</dt><dd><Retold text={known.instruments} /></dd></div>
            }
            if !known.put_back.is_empty() {
                <div><dt>{ "Put back" }</dt><dd>{ known.put_back.join("; ") }</dd></div>
            }
        </dl>
    </> }
}
