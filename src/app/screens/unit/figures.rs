//! The figures of the unit, the five that sharpen most first. While one is missing, common practice stands in and says how
//! wide.

use yew::{AttrValue, Callback, Html, Properties, component, html, use_state};

use super::PartProps;
use crate::app::parts::{Choice, Entry, MeasureField, Opt, Section};
use crate::quantity::{Measure, Unit as MeasureUnit, UnitPrefs};
use crate::unit::{FIGURES, Figure, FigureAsk, FigureId, MachineClass, Source, Unit};

/// So many stand open on the screen; the rest is folded away.
const FIRST: usize = 5;
/// Standard normal quantile of the central 95 %.
const TWO_SIDED_95: f64 = 1.96;

/// The unit of measure in which a figure is asked: the shop's, but a gear ratio is never asked in per cent.
pub fn unit_of(ask: &FigureAsk, prefs: &UnitPrefs) -> MeasureUnit {
    match ask.id {
        FigureId::GearRatio => MeasureUnit::Fraction,
        _ => prefs.unit(ask.kind),
    }
}

/// What holds while the figure is missing, in words.
fn stands_in(ask: &FigureAsk, class: MachineClass, prefs: &UnitPrefs) -> String {
    let spread = class.spread(ask.id);
    let factor = crate::math::exp(TWO_SIDED_95 * spread.relative);
    let unit = unit_of(ask, prefs);
    let measure = |base: f64| Measure::from_base(base.clamp(ask.low, ask.high), ask.kind).ok();
    let printed = |measure: Measure| rough(measure, unit, prefs);
    match (
        measure(spread.value),
        measure(spread.value / factor),
        measure(spread.value * factor),
    ) {
        (Some(middle), Some(low), Some(high)) => format!(
            "Until then common practice for this class: about {}, {} to {}.",
            with_symbol(printed(middle), unit),
            printed(low),
            with_symbol(printed(high), unit)
        ),
        _ => "Until then common practice for this class.".to_owned(),
    }
}

/// A practice figure with as many digits as it deserves: two.
fn rough(measure: Measure, unit: MeasureUnit, prefs: &UnitPrefs) -> String {
    let value = measure.try_in_unit(unit).unwrap_or(measure.base());
    let mut step = 1.0;
    while value.abs() >= 100.0 * step {
        step *= 10.0;
    }
    while value != 0.0 && value.abs() < 10.0 * step && step > 1e-6 {
        step /= 10.0;
    }
    let rounded = Measure::new((value / step).round() * step, unit).unwrap_or(measure);
    crate::quantity::edit_text(rounded, unit, prefs.mark())
}

fn with_symbol(figure: String, unit: MeasureUnit) -> String {
    match unit.symbol() {
        "" => figure,
        symbol => format!("{figure} {symbol}"),
    }
}

fn source_options() -> Vec<Opt<Source>> {
    Source::ALL
        .iter()
        .map(|source| {
            let (words, code) = match source {
                Source::Manual => ("Manual", "manual"),
                Source::Plate => ("Plate", "plate"),
                Source::Measured => ("Measured", "measured"),
                Source::Practice => ("Guess", "practice"),
            };
            Opt::new(*source, words, code)
        })
        .collect()
}

/// The code of a figure in ids: stable, lower case.
fn code(id: FigureId) -> String {
    serde_json::to_value(id)
        .ok()
        .and_then(|value| value.as_str().map(str::to_owned))
        .unwrap_or_default()
}

/// Properties of [`OneFigure`].
#[derive(Clone, PartialEq, Properties)]
struct OneFigureProps {
    /// Place in the list of figures.
    at: usize,
    /// What is there.
    figure: Option<Figure>,
    /// Class of the machine.
    class: MachineClass,
    /// Units of measure.
    prefs: UnitPrefs,
    /// Source that a new figure starts with.
    start_source: Source,
    /// The figure as it is from now on.
    on_figure: Callback<(FigureId, Option<Figure>)>,
    /// A source was chosen by hand.
    on_source: Callback<Source>,
}

#[component]
fn OneFigure(props: &OneFigureProps) -> Html {
    let Some(ask) = FIGURES.get(props.at) else {
        return Html::default();
    };
    let code = code(ask.id);
    let range = Measure::from_base(ask.low, ask.kind)
        .ok()
        .zip(Measure::from_base(ask.high, ask.kind).ok());
    let typed = props
        .figure
        .as_ref()
        .map_or("", |figure| figure.typed.as_str());
    let on_entry = {
        let (on_figure, id) = (props.on_figure.clone(), ask.id);
        let source = props
            .figure
            .as_ref()
            .map_or(props.start_source, |figure| figure.source);
        Callback::from(move |entry: Entry| {
            let figure = Figure {
                value: entry.value,
                typed: entry.typed,
                source,
            };
            let is_empty = figure.value.is_none() && figure.typed.is_empty();
            on_figure.emit((id, (!is_empty).then_some(figure)));
        })
    };
    let on_source = {
        let (on_figure, on_source) = (props.on_figure.clone(), props.on_source.clone());
        let (figure, id) = (props.figure.clone(), ask.id);
        Callback::from(move |source: Source| {
            on_source.emit(source);
            if let Some(figure) = &figure {
                on_figure.emit((
                    id,
                    Some(Figure {
                        source,
                        ..figure.clone()
                    }),
                ));
            }
        })
    };
    html! {
        <div class="one-figure" data-testid={format!("figure-box-{code}")}>
            <MeasureField
                id={format!("figure-{code}")}
                label={ask.words}
                hint={ask.hint}
                unit={unit_of(ask, &props.prefs)}
                mark={props.prefs.mark()}
                {range}
                typed={AttrValue::from(typed.to_owned())}
                value={props.figure.as_ref().and_then(|figure| figure.value)}
                stands_in={match &props.figure {
                    Some(figure) if figure.value.is_some() => String::new(),
                    _ => stands_in(ask, props.class, &props.prefs),
                }}
                {on_entry}
                testid={format!("figure-{code}")}
            />
            if let Some(figure) = &props.figure {
                <Choice<Source>
                    name={format!("source-{code}")}
                    class="is-small"
                    label="Where from?"
                    hint={if figure.source == Source::Practice {
                        "Taken as wide as common practice until you say where it comes from."
                    } else {
                        ""
                    }}
                    options={source_options()}
                    value={figure.source}
                    on_change={on_source}
                />
            }
        </div>
    }
}

/// The figures.
#[component]
pub fn Figures(props: &PartProps) -> Html {
    let start_source = use_state(Source::default);
    let on_figure = props.change(
        |unit: &mut Unit, (id, figure): (FigureId, Option<Figure>)| {
            match figure {
                Some(figure) => unit.figures.insert(id, figure),
                None => unit.figures.remove(&id),
            };
        },
    );
    let on_source = {
        let start_source = start_source.clone();
        Callback::from(move |source| start_source.set(source))
    };
    let one = |at: usize| {
        let ask = FIGURES.get(at)?;
        Some(html! {
            <OneFigure
                key={at}
                {at}
                figure={props.unit.figures.get(&ask.id).cloned()}
                class={props.unit.class}
                prefs={props.prefs.clone()}
                start_source={*start_source}
                on_figure={on_figure.clone()}
                on_source={on_source.clone()}
            />
        })
    };
    let more_given = FIGURES
        .iter()
        .skip(FIRST)
        .filter(|ask| props.unit.figures.contains_key(&ask.id))
        .count();
    html! {
        <Section id="figures" title="Figures" state={format!("{} given", props.unit.figures.len())}>
            <p class="soft small">
                { "The first five narrow the windows most. Any unit of measure can be typed: 2.7 cu in, 250 psi." }
            </p>
            { for (0..FIRST).filter_map(one) }
            <details class="fold" data-testid="more-figures">
                <summary>
                    { if more_given == 0 { "More figures".to_owned() } else { format!("More figures ({more_given} given)") } }
                </summary>
                <div class="stack">{ for (FIRST..FIGURES.len()).filter_map(one) }</div>
            </details>
        </Section>
    }
}
