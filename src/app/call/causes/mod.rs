//! The causes, most probable first: a strip that stays in sight on a phone and opens into the full list; the list itself
//! where there is room for it.

mod detail;
mod pair;
mod row;

use super::side::Sides;
use super::steady::Answer;
use super::words::{self, Verdict};
use crate::app::parts::{Caution, Grade};
use crate::app::platform::media::use_media;
use crate::assessment::{Assessment, Cause};
use crate::faults::FaultId;
use crate::quantity::UnitPrefs;
use crate::readings::Reading;
use row::CauseRow;
use yew::{Callback, Html, MouseEvent, Properties, component, html, use_state};

/// From this width on the list stands beside the readings (`call.css`).
const BESIDE: &str = "(min-width: 47.5rem)";
/// Causes named in the strip.
const IN_STRIP: usize = 3;
/// Causes listed before "show all".
const LISTED: usize = 6;

/// Properties of [`Causes`].
#[derive(Clone, PartialEq, Properties)]
pub struct CausesProps {
    /// Last answer of the engine.
    pub assessment: Option<Answer>,
    /// True while a newer one is being worked out.
    pub updating: bool,
    /// Readings of the visit.
    pub readings: Vec<Reading>,
    /// Ports that are there twice.
    pub sides: Sides,
    /// Units.
    pub prefs: UnitPrefs,
    /// Opens a reading, by id.
    pub on_reading: Callback<String>,
}

/// Strip and list.
#[component]
pub fn Causes(props: &CausesProps) -> Html {
    let open = use_state(|| false);
    // On a phone the list lies behind the strip: it is made when it is opened, not at every answer.
    let is_beside = use_media(BESIDE);
    let on_toggle = {
        let open = open.clone();
        Callback::from(move |_: MouseEvent| open.set(!*open))
    };
    let on_reading = {
        let (open, on_reading) = (open.clone(), props.on_reading.clone());
        Callback::from(move |id: String| {
            open.set(false);
            on_reading.emit(id);
        })
    };
    let verdict = props.assessment.as_deref().map(words::verdict);
    html! {
        <section class={if *open { "causes is-open" } else { "causes" }} aria-labelledby="causes-title">
            <div class="causes-strip">
                <h2 class="causes-title" id="causes-title">
                    { "Causes" }
                    { verdict.map(|verdict| html! { <span class="causes-verdict" data-testid="verdict">{ verdict.words() }</span> }) }
                    if props.updating {
                        <span class="causes-updating">{ "updating…" }</span>
                    }
                </h2>
                <ol class="causes-lead">
                    { for lead(props.assessment.as_deref(), verdict) }
                </ol>
                <button
                    type="button"
                    class="causes-toggle"
                    aria-expanded={if *open { "true" } else { "false" }}
                    aria-controls="causes-list"
                    data-testid="causes-toggle"
                    onclick={on_toggle}
                >
                    { if *open { "Close" } else { "Why" } }
                    <span class="hidden-text">{ ": full list of causes" }</span>
                </button>
            </div>
            <div class={if props.updating { "causes-list is-updating" } else { "causes-list" }} id="causes-list">
                { match &props.assessment {
                    _ if !*open && !is_beside => Html::default(),
                    Some(assessment) => html! {
                        <List
                            assessment={assessment.clone()}
                            readings={props.readings.clone()}
                            sides={props.sides}
                            prefs={props.prefs.clone()}
                            {on_reading}
                        />
                    },
                    None => html! { <p class="soft">{ "The first answer is being worked out." }</p> },
                } }
            </div>
        </section>
    }
}

/// The leading causes in one line each.
fn lead(assessment: Option<&Assessment>, verdict: Option<Verdict>) -> Vec<Html> {
    let Some(assessment) = assessment else {
        return vec![
            html! { <li class="causes-line"><span class="causes-name is-ask">{ "Working out the first answer…" }</span></li> },
        ];
    };
    if verdict == Some(Verdict::TooLittle) {
        let ask = if words::is_informed(assessment) {
            "Not settled yet: another reading will tell."
        } else {
            "Tick what was seen, or take a reading."
        };
        return vec![html! {
            <li class="causes-line"><span class="causes-name is-ask">{ ask }</span></li>
        }];
    }
    let line = |cause: &Cause| {
        html! {
            <li class="causes-line" key={cause.key()}>
                <span class="causes-name">{ words::cause_title(cause) }</span>
                <span class="causes-share">{ words::chance(cause.probability, &assessment.trust) }</span>
            </li>
        }
    };
    assessment.causes.iter().take(IN_STRIP).map(line).collect()
}

/// Properties of [`List`].
#[derive(Clone, PartialEq, Properties)]
struct ListProps {
    assessment: Answer,
    readings: Vec<Reading>,
    sides: Sides,
    prefs: UnitPrefs,
    on_reading: Callback<String>,
}

/// What stands before the ranking, and the ranking.
#[component]
fn List(props: &ListProps) -> Html {
    let all = use_state(|| false);
    let assessment = &props.assessment;
    let verdict = words::verdict(assessment);
    let shown = if *all {
        assessment.causes.len()
    } else {
        LISTED
    };
    let rest = assessment.causes.len().saturating_sub(LISTED);
    let on_all = {
        let all = all.clone();
        Callback::from(move |_: MouseEvent| all.set(!*all))
    };
    html! { <>
        { not_listed(assessment, verdict) }
        if !assessment.withheld.is_empty() {
            <Caution grade={Grade::Caution} title="Held back" class="small-caution" testid="withheld">
                { lines(&assessment.withheld) }
            </Caution>
        }
        if !assessment.trust.retake.is_empty() {
            <Caution grade={Grade::Caution} title="Take again: does not fit the rest" class="small-caution" testid="retake">
                <ul class="plain-list">
                    { for assessment.trust.retake.iter().map(|(id, why)| retake(props, id, why)) }
                </ul>
            </Caution>
        }
        if verdict == Verdict::TooLittle {
            <p class="causes-start">{ start(assessment) }</p>
        }
        <ol class="cause-list">
            { for assessment.causes.iter().take(shown).enumerate().map(|(place, cause)| html! {
                <CauseRow
                    key={cause.key()}
                    {place}
                    assessment={assessment.clone()}
                    {verdict}
                    readings={props.readings.clone()}
                    sides={props.sides}
                    prefs={props.prefs.clone()}
                    on_reading={props.on_reading.clone()}
                />
            }) }
        </ol>
        if rest > 0 {
            <button type="button" class="button is-quiet is-wide" data-testid="causes-all" onclick={on_all}>
                { if *all { String::from("Show fewer") } else { format!("Show {rest} more, less likely") } }
            </button>
        }
        if !assessment.notes.is_empty() {
            <Caution grade={Grade::Note} title="To know" class="small-caution" testid="notes">
                { lines(&assessment.notes) }
            </Caution>
        }
        <p class="soft small">
            { "A percentage is not a proof. Prove the cause on the machine before a part is ordered. The unit’s manual, local \
               rules and licensed practice come first." }
        </p>
    </> }
}

/// What the order is worth while it bears no percentages.
fn start(assessment: &Assessment) -> &'static str {
    if words::is_informed(assessment) {
        "Too little to tell: the percentages have not settled. This is the best order so far."
    } else {
        "Too little to tell. In the order in which they are met on such machines (common practice), before any reading counts:"
    }
}

/// One sentence as it is, several as a list.
fn lines(texts: &[String]) -> Html {
    match texts {
        [only] => html! { <p>{ only.clone() }</p> },
        texts => html! {
            <ul class="plain-list">{ for texts.iter().map(|text| html! { <li>{ text.clone() }</li> }) }</ul>
        },
    }
}

/// Nothing on the list explains the readings: says so, and what to look at before anything else.
fn not_listed(assessment: &Assessment, verdict: Verdict) -> Html {
    let leads = assessment
        .causes
        .first()
        .filter(|cause| cause.ids.contains(&FaultId::NotListed));
    let Some(lead) = leads.filter(|_| verdict != Verdict::TooLittle) else {
        return Html::default();
    };
    let title = if lead.probability >= 0.5 {
        "No listed cause explains these readings"
    } else {
        "No listed cause stands out"
    };
    let wrong = assessment.trust.wrong_reading;
    html! {
        <Caution grade={Grade::Caution} {title} class="small-caution" testid="not-listed">
            <p>{ "Check each reading again first. The gauge: zero with the engine off and the line bled, or a second gauge beside \
                  it. The port: by the drawing. The condition: direction, lever, engine speed." }</p>
            if wrong >= 0.05 {
                <p>{ format!("Chance that a gauge, port or direction is wrong: {}.", words::percent(wrong)) }</p>
            }
        </Caution>
    }
}

fn retake(props: &ListProps, id: &str, why: &str) -> Html {
    let Some(reading) = props.readings.iter().find(|reading| reading.id == id) else {
        return html! { <li>{ why.to_owned() }</li> };
    };
    let (on_reading, target) = (props.on_reading.clone(), id.to_owned());
    html! {
        <li>
            <button
                type="button"
                class="link"
                onclick={Callback::from(move |_: MouseEvent| on_reading.emit(target.clone()))}
            >
                { props.sides.name(reading) }
            </button>
            // Why stands at the reading.
            { ", " }{ words::condition(&reading.condition, &props.prefs) }
        </li>
    }
}
