//! The wear of a unit over its hours.

use std::rc::Rc;
use yew::{Html, Properties, component, html, use_memo};

use super::entry::next_words;
use super::plot::{WearPlot, axis};
use super::screen::Others;
use crate::app::parts::{Icon, Section, Shape};
use crate::app::platform::clock;
use crate::app::route::Route;
use crate::quantity::UnitPrefs;
use crate::readings::instrument::Instrument;
use crate::record::Visit;
use crate::unit::Unit;
use crate::yard::trend::Axis;
use crate::yard::{Break, Series, outlook, value_words};

/// Properties of [`WearScreen`].
#[derive(Clone, PartialEq, Properties)]
pub struct WearScreenProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// Its visits.
    pub visits: Others,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units of measure.
    pub prefs: UnitPrefs,
}

/// The screen.
#[component]
pub fn WearScreen(props: &WearScreenProps) -> Html {
    let made = use_memo(
        (props.unit.clone(), props.visits.clone()),
        |(unit, visits)| {
            let visits: Vec<&Visit> = visits.0.iter().map(|visit| &**visit).collect();
            outlook(unit, &visits, &props.instruments)
        },
    );
    html! {
        <main class="page yard" id="main" data-testid="wear-screen">
            <div class="page-head">
                <h1 id="title" tabindex="-1">{ format!("Wear, {}", props.unit.name) }</h1>
                <a class="button is-quiet" href={Route::Unit(props.unit.id.clone()).href()} data-testid="back-to-unit">
                    <Icon shape={Shape::Back} />{ "To the unit" }
                </a>
            </div>
            <p>
                { format!("Each reading is brought to one oil and one engine speed, as if it were always taken with the oil at {:.0} °C \
                           and at high idle: what moves here is wear and not weather. Bars and bands hold 95 %.", made.reference_celsius) }
            </p>
            if made.series.is_empty() {
                <p class="panel" data-testid="no-wear">
                    { "Nothing to draw yet. Slip, charge at low idle, the knee and the neutral drain come from yard checks, and from \
                       calls in which they were read, each with its oil temperature." }
                </p>
            } else {
                <p class="panel" data-testid="wear-next">{ next_words(made.next.hours, made.next.day, made.next.why) }</p>
            }
            <div class="yard-series">
                { for made.series.iter().map(|series| html! {
                    <SeriesPart key={series.of.code()} series={series.clone()} prefs={props.prefs.clone()} />
                }) }
            </div>
        </main>
    }
}

#[derive(Clone, PartialEq, Properties)]
struct SeriesProps {
    series: Series,
    prefs: UnitPrefs,
}

#[component]
fn SeriesPart(props: &SeriesProps) -> Html {
    let (series, prefs) = (&props.series, &props.prefs);
    let warm = series
        .history
        .points
        .iter()
        .filter(|g| g.point.is.is_ok())
        .count();
    let state = match warm {
        1 => "1 point".to_owned(),
        n => format!("{n} points"),
    };
    html! {
        <Section id={format!("wear-{}", series.of.code())} title={series.of.words()} {state} is_open=true>
            <p class="soft">{ series.of.tells() }</p>
            <WearPlot series={series.clone()} prefs={prefs.clone()} />
            <p data-testid={format!("trend-{}", series.of.code())}>{ trend_words(series, prefs) }</p>
            <p data-testid={format!("projection-{}", series.of.code())}>{ projection_words(series) }</p>
            <p class="soft small">{ limit_words(series, prefs) }</p>
            { table(series, prefs) }
        </Section>
    }
}

fn trend_words(series: &Series, prefs: &UnitPrefs) -> String {
    let trend = match &series.trend {
        Ok(trend) => trend,
        Err(why) => return why.words(),
    };
    let (per, of) = match trend.axis {
        Axis::Hours => (100.0, "100 h"),
        Axis::Days => (30.0, "30 days"),
    };
    let print = |value: f64| {
        let sign = if value < 0.0 { "\u{2212}" } else { "+" };
        format!(
            "{sign}{}",
            value_words(series.of, (per * value).abs(), prefs)
        )
    };
    let slope = trend.slope;
    let sure = if slope.low > 0.0 {
        "It rises."
    } else if slope.high < 0.0 {
        "It falls."
    } else {
        "Whether it rises at all is not certain."
    };
    let now = trend.at(trend.span.1, series.level);
    let off = trend.weights.iter().flatten().filter(|w| **w < 0.5).count();
    let off = match off {
        0 => String::new(),
        1 => " One point stands off the line and counts less.".to_owned(),
        n => format!(" {n} points stand off the line and count less."),
    };
    format!(
        "Now {} ({} to {}). {} per {of} ({} to {}). {sure}{off}",
        value_words(series.of, now.value, prefs),
        value_words(series.of, now.low.max(0.0), prefs),
        value_words(series.of, now.high, prefs),
        print(slope.value),
        print(slope.low),
        print(slope.high),
    )
}

fn projection_words(series: &Series) -> String {
    match &series.projection {
        Ok(found) => {
            let latest = found
                .latest
                .map_or("later than the points can tell".to_owned(), |h| {
                    format!("{h:.0} h")
                });
            format!(
                "If it goes on like this, the limit to stop is reached at {:.0} h on the meter (95 %: {:.0} h to {latest}). That is no \
                 promise until then: check before.",
                found.middle, found.earliest
            )
        }
        Err(why) => why.words(),
    }
}

fn limit_words(series: &Series, prefs: &UnitPrefs) -> String {
    match series.limits {
        Some((watch, stop)) => format!(
            "Limits: {} to watch, {} to stop, as at the reference oil. From {}.",
            value_words(series.of, watch, prefs),
            value_words(series.of, stop, prefs),
            series.limits_from
        ),
        None => format!("{}.", series.limits_from),
    }
}

/// The points as a table, with what was not drawn.
fn table(series: &Series, prefs: &UnitPrefs) -> Html {
    let axis = axis(series);
    html! {
        <details class="yard-table">
            <summary>{ "The points as a table" }</summary>
            <div class="yard-scroll" role="region" aria-label={format!("Points of {}", series.of.words())} tabindex="0">
                <table>
                    <thead><tr>
                        <th scope="col">{ "When" }</th>
                        <th scope="col">{ "Hours" }</th>
                        <th scope="col">{ "As at the reference oil" }</th>
                        <th scope="col">{ "Before it" }</th>
                    </tr></thead>
                    <tbody>
                        { for series.history.points.iter().rev().map(|g| {
                            let value = match &g.point.is {
                                Ok(c) => format!(
                                    "{}{} ± {}",
                                    if c.at_most { "at most " } else { "" },
                                    value_words(series.of, c.is.value, prefs),
                                    value_words(series.of, 2.0 * c.is.own, prefs),
                                ),
                                Err(why) => why.words(),
                            };
                            let before = match &g.after {
                                Some(Break::Repair(_)) => "repair",
                                Some(Break::OtherInstrument) => "other instrument, place or ramp",
                                None => "",
                            };
                            let missing = axis == Axis::Hours && g.point.hours.is_none();
                            html! {
                                <tr>
                                    <td><a href={Route::Call(g.point.visit.clone()).href()}>{ clock::tell(&g.point.opened) }</a></td>
                                    <td>{ g.point.hours.map_or(if missing { "not read, not drawn" } else { "not read" }.to_owned(), |h| format!("{h:.0} h")) }</td>
                                    <td>{ value }</td>
                                    <td>{ before }</td>
                                </tr>
                            }
                        }) }
                    </tbody>
                </table>
            </div>
        </details>
    }
}
