//! What the runs come to: what to do, how sure, what is open and which run would tell.

use super::plan_view::{PlanView, props_of};
use super::screen::Told;
use super::words;
use crate::app::call::cautions;
use crate::app::parts::{Caution, Grade, Icon, Section, Shape};
use crate::caution::Stands;
use crate::quantity::UnitPrefs;
use crate::tracking::{
    Adjustment, Agreement, Alone, Found, Kind, Load, Outcome, Pair, Setting, TrackingSheet,
    Verdict, What,
};
use yew::{Callback, Html, MouseEvent, Properties, component, html};

/// Least share of an account that is shown.
const SHOWN: f64 = 0.05;

/// Properties of [`Results`].
#[derive(Clone, PartialEq, Properties)]
pub struct ResultsProps {
    /// What the runs come to.
    pub told: Told,
    /// The sheet.
    pub sheet: TrackingSheet,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// A run is to be added.
    pub on_add: Callback<(What, Setting)>,
}

/// The results.
#[component]
pub fn Results(props: &ResultsProps) -> Html {
    let outcome = &*props.told.0;
    let used = props.told.1.len();
    if used == 0 {
        return html! {
            <section class="panel stack" data-testid="tracking-results">
                <h2>{ "What to do" }</h2>
                <p>{ "No run counts yet, so nothing is said about either side." }</p>
                { advice(props, outcome) }
            </section>
        };
    }
    html! {
        <section class="panel stack" data-testid="tracking-results">
            <h2>{ "What to do" }</h2>
            { headline(outcome, &props.prefs) }
            { agreement(props, outcome) }
            <ol class="tracking-do">
                { for outcome.adjustments.iter().map(|one| adjustment(one, &props.prefs)) }
            </ol>
            { for outcome.pairs.iter().map(|pair| open_pair(pair, &props.prefs)) }
            { advice(props, outcome) }
            <PlanView ..props_of(outcome, &props.prefs) />
            if outcome.plans.is_empty() {
                <p class="soft">{ "The path is drawn once the track width is known (under Machine)." }</p>
            }
            <Section id="tracking-table" title="Each mismatch" state={format!("from {used} {}", if used == 1 { "run" } else { "runs" })}>
                { table(outcome, &props.prefs) }
                { alone(outcome, &props.prefs) }
            </Section>
        </section>
    }
}

/// One sentence on top.
fn headline(outcome: &Outcome, prefs: &UnitPrefs) -> Html {
    let lead = outcome.alone.first();
    let text = if !outcome.adjustments.is_empty() {
        let off: Vec<String> = outcome
            .adjustments
            .iter()
            .map(|one| one.kind.words().to_lowercase())
            .collect();
        format!(
            "These runs show a difference in: {}. In this order:",
            off.join(", ")
        )
    } else if matches!(outcome.agreement, Agreement::Disagree { .. }) {
        "The runs contradict each other: nothing to adjust on them.".to_owned()
    } else if outcome
        .found
        .iter()
        .filter(|f| f.is_seen)
        .all(|f| f.verdict == Verdict::Equal)
    {
        "What was measured is equal within 1 %: nothing to adjust there.".to_owned()
    } else {
        match lead {
            Some(Alone {
                kind: Some(kind),
                share,
                value,
                half,
                ..
            }) if *share > 0.5 => format!(
                "Nothing is proved yet. If only one thing is off, it is likeliest the {} ({}).",
                kind.words().to_lowercase(),
                words::share(value.abs(), *half, prefs.mark())
            ),
            _ => "Nothing is proved yet: these runs leave several things open.".to_owned(),
        }
    };
    html! { <p class="tracking-headline" role="status" data-testid="tracking-headline">{ text }</p> }
}

fn agreement(props: &ResultsProps, outcome: &Outcome) -> Html {
    let place = |at: usize| props.told.1.get(at).copied().unwrap_or(at);
    let agreement = match outcome.agreement {
        Agreement::Disagree { worst } => Agreement::Disagree {
            worst: place(worst),
        },
        other => other,
    };
    let Some(text) = words::agreement(agreement, outcome.fit.widening(), props.prefs.mark()) else {
        return Html::default();
    };
    if matches!(agreement, Agreement::Disagree { .. }) {
        html! {
            <Caution grade={Grade::Caution} title="Runs disagree" testid="runs-disagree"><p>{ text }</p></Caution>
        }
    } else {
        html! { <p class="soft" data-testid="runs-agree">{ text }</p> }
    }
}

fn adjustment(one: &Adjustment, prefs: &UnitPrefs) -> Html {
    let mark = prefs.mark();
    let side = if one.is_right { "right" } else { "left" };
    let by = words::share(one.share, one.half, mark);
    let turns = one.turns.map(|(turns, half)| {
        let places = if half < 0.05 { 2 } else { 1 };
        format!(
            "That is {turns:.places$} ± {half:.places$} turns of its screw. Turn half of it first, lock, count again."
        )
    });
    let kind = if one.is_adjusted {
        "Adjust"
    } else {
        "Find the fault"
    };
    html! {
        <li data-testid={format!("do-{:?}", one.kind)}>
            <strong>{ format!("{kind}: {}, {side} faster by {by} {}", one.kind.words().to_lowercase(), one.kind.share_of()) }</strong>
            <p>{ &one.words }</p>
            if let Some(turns) = turns {
                <p>{ turns }</p>
            }
        </li>
    }
}

fn open_pair(pair: &Pair, prefs: &UnitPrefs) -> Html {
    let other = pair.other.map_or("camber of the lane".to_owned(), |kind| {
        kind.words().to_lowercase()
    });
    let one = pair.one.words();
    let text = if pair.each_alone {
        format!("{one} or {other}: either alone would explain these runs.")
    } else {
        let together = words::figure(
            pair.correlation,
            crate::quantity::Unit::Fraction,
            2,
            prefs.mark(),
        );
        format!("{one} and {other}: these runs cannot tell them apart (correlation {together}).")
    };
    html! { <p class="tracking-open" data-testid="open-pair"><Icon shape={Shape::Note} />{ text }</p> }
}

fn advice(props: &ResultsProps, outcome: &Outcome) -> Html {
    let Some(advice) = outcome.advice else {
        return html! { <p class="soft" data-testid="no-advice">{ "No further run would tell much more." }</p> };
    };
    let what = words::what_of(&advice.run);
    let setting = advice.run.setting;
    let on_add = {
        let on_add = props.on_add.clone();
        Callback::from(move |_: MouseEvent| on_add.emit((what, setting)))
    };
    // The caution for wheels clear stands on top of the screen already.
    let drives = what == What::Path || (what != What::RollOut && setting.load != Load::Free);
    let takes = words::percent(advice.takes, 1.0, props.prefs.mark());
    let minutes = format!("{:.0} min", advice.run.minutes);
    let why = match (props.told.1.is_empty(), advice.pair) {
        (true, _) => "First in the order of the work".to_owned(),
        (_, Some(_)) => {
            format!(
                "Computed from these runs: it should take away about {takes} of the variance between the two"
            )
        }
        (_, None) => {
            format!("Computed from these runs: it should take away about {takes} of what is open")
        }
    };
    html! {
        <div class="tracking-next" data-testid="next-run">
            <p><strong>{ "Next run: " }</strong>{ words::candidate(&advice.run) }</p>
            <p class="soft small">{ format!("{why}; about {minutes} (common practice).") }</p>
            if drives {
                { cautions::at(Stands::Driving) }
            }
            <button type="button" class="button" data-testid="add-next-run" onclick={on_add}>
                <Icon shape={Shape::Plus} />{ "Add this run" }
            </button>
        </div>
    }
}

fn verdict(found: &Found) -> (&'static str, &'static str) {
    match (found.kind, found.verdict) {
        (Kind::Null | Kind::OneWay, Verdict::RightFaster) => ("right faster in forward", "is-off"),
        (Kind::Null | Kind::OneWay, Verdict::LeftFaster) => ("left faster in forward", "is-off"),
        (Kind::Loss, Verdict::RightFaster) => ("left loses more", "is-off"),
        (Kind::Loss, Verdict::LeftFaster) => ("right loses more", "is-off"),
        (_, verdict) => words::verdict(verdict, found.is_seen),
    }
}

fn table(outcome: &Outcome, prefs: &UnitPrefs) -> Html {
    html! { <>
        <ul class="tracking-table">
            { for outcome.found.iter().map(|found| {
                let (words_of, class) = verdict(found);
                let shape = match class {
                    "is-off" => Shape::Warning,
                    "is-even" => Shape::Done,
                    _ => Shape::Note,
                };
                html! {
                    <li key={found.kind.words()} data-testid={format!("found-{:?}", found.kind)}>
                        <span class="tracking-kind">{ found.kind.words() }</span>
                        <span class={format!("tracking-verdict {class}")}><Icon {shape} />{ words_of }</span>
                        if found.is_seen {
                            <span class="tracking-value">
                                { format!("right over left {} {}", words::share(found.value, found.half, prefs.mark()), found.kind.share_of()) }
                            </span>
                        }
                        <span class="soft small">{ format!("Shows: {}.", found.kind.shows()) }</span>
                    </li>
                }
            }) }
        </ul>
        <p class="soft small">{ "± is a 95 % interval: least squares on the exact arc of two sides, with usual widths for what was not measured (common practice)." }</p>
    </> }
}

fn alone(outcome: &Outcome, prefs: &UnitPrefs) -> Html {
    let shown = outcome.alone.iter().filter(|one| one.share >= SHOWN);
    html! { <>
        <h3>{ "If one thing explains all runs" }</h3>
        <ul class="tracking-alone" data-testid="accounts">
            { for shown.map(|one| {
                let what = match (one.kind, one.is_several) {
                    (Some(kind), _) => format!(
                        "{}, {}",
                        kind.words(),
                        words::share(one.value, one.half, prefs.mark())
                    ),
                    (None, true) => "Several things at once".to_owned(),
                    (None, false) => "Nothing: only what no two sides are without".to_owned(),
                };
                html! { <li>{ format!("{}: {what}", words::percent(one.share, 1.0, prefs.mark())) }</li> }
            }) }
        </ul>
    </> }
}
