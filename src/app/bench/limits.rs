//! Limits of the run: of the run as a whole, at points, and along curves over pressure.

use super::codes;
use super::screen::{Edit, Told};
use crate::app::parts::{
    Choice, Confirm, Entry, Icon, MeasureField, Opt, Select, Shape, TextField,
};
use crate::app::platform::ids;
use crate::bench::stand::acceptance::{Acceptance, LIMITS, Limited, Part, Scope};
use crate::bench::stand::judge::{Measurand, TypedLimit};
use crate::bench::stand::{BenchSheet, paper};
use crate::quantity::{Measure, Unit, UnitPrefs};
use crate::record::IdOf;
use std::rc::Rc;
use yew::{Callback, Html, MouseEvent, Properties, component, html};

/// Properties of [`LimitsForm`].
#[derive(Clone, PartialEq, Properties)]
pub struct LimitsFormProps {
    /// The sheet.
    pub sheet: Rc<BenchSheet>,
    /// What it comes to.
    pub told: Told,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

/// The fields.
#[component]
pub fn LimitsForm(props: &LimitsFormProps) -> Html {
    html! { <>
        { whole_run(props) }
        { places(props) }
    </> }
}

fn whole_run(props: &LimitsFormProps) -> Html {
    let rows: [(Measurand, &str, &str); 4] = [
        (
            Measurand::Volumetric,
            "Volumetric efficiency, rated",
            "volumetric",
        ),
        (Measurand::Overall, "Best overall efficiency", "overall"),
        (Measurand::CaseLeakage, "Case leakage of rated flow", "case"),
        (
            Measurand::Displacement,
            "Displacement of the plate’s",
            "displacement",
        ),
    ];
    html! {
        <details class="advice" data-testid="bench-limits">
            <summary>{ "Limits of the run as a whole: the unit’s manual or the customer; common practice where empty" }</summary>
            <div class="stack">
                { for rows.into_iter().map(|(what, words, code)| {
                    let from = props.sheet.limits.get(&what).map(|limit| limit.from.clone()).unwrap_or_default();
                    let on_from = props.on_edit.reform(move |text: String| -> Edit {
                        Box::new(move |sheet| sheet.limits.entry(what).or_default().from = text)
                    });
                    html! {
                        <fieldset class="bench-meter" key={code}>
                            <legend>{ words }</legend>
                            <div class="bench-fields">
                                { whole_run_field(props, what, code, "low") }
                                { whole_run_field(props, what, code, "high") }
                                <TextField id={format!("bench-limit-{code}-from")} label="From" value={from} on_input={on_from} maxlength={400} />
                            </div>
                        </fieldset>
                    }
                }) }
            </div>
        </details>
    }
}

fn whole_run_field(
    props: &LimitsFormProps,
    what: Measurand,
    code: &'static str,
    side: &'static str,
) -> Html {
    let limit = props.sheet.limits.get(&what).cloned().unwrap_or_default();
    let (typed, label) = match side {
        "low" => (limit.low, "Lowest allowed"),
        _ => (limit.high, "Highest allowed"),
    };
    let on_entry = props.on_edit.reform(move |typed: Entry| -> Edit {
        Box::new(move |sheet| {
            let limit = sheet.limits.entry(what).or_default();
            if side == "low" {
                limit.low = typed;
            } else {
                limit.high = typed;
            }
            if *limit == TypedLimit::default() {
                sheet.limits.remove(&what);
            }
        })
    });
    html! {
        <MeasureField
            id={format!("bench-limit-{code}-{side}")}
            {label}
            unit={Unit::Percent}
            typed={typed.typed}
            value={typed.value}
            range={Some((Measure::literal(0.0, Unit::Percent), Measure::literal(200.0, Unit::Percent)))}
            mark={props.prefs.mark()}
            {on_entry}
            testid={format!("bench-limit-{code}-{side}")}
        />
    }
}

/// Limits at points and along curves, with what came of each.
fn places(props: &LimitsFormProps) -> Html {
    let limits = &props.sheet.acceptance;
    let on_add = props.on_edit.reform(|_: MouseEvent| -> Edit {
        let id = ids::fresh(IdOf::Reading);
        Box::new(move |sheet| {
            if sheet.acceptance.len() < LIMITS {
                // The next limit is mostly of the same kind and from the same page.
                let last = sheet.acceptance.last();
                let limit = Acceptance {
                    id,
                    of: last.map(|last| last.of).unwrap_or_default(),
                    scope: last.map(|last| last.scope).unwrap_or_default(),
                    source: last.map(|last| last.source.clone()).unwrap_or_default(),
                    ..Acceptance::default()
                };
                sheet.acceptance.push(limit);
            }
        })
    });
    html! {
        <div class="stack" data-testid="bench-accept">
            <h3>{ "Limits at points and along curves" }</h3>
            <p class="soft">{ "From the unit’s manual or the customer. Where one of these limits a figure, common practice on the same figure is silent." }</p>
            { for limits.iter().enumerate().map(|(at, limit)| limit_form(props, at, limit)) }
            <div class="actions">
                <button type="button" class="button is-quiet" data-testid="bench-accept-add" disabled={limits.len() >= LIMITS} onclick={on_add}>
                    <Icon shape={Shape::Plus} />{ "Add a limit" }
                </button>
            </div>
        </div>
    }
}

/// An edit of one limit.
fn change(props: &LimitsFormProps, id: &str, change: impl FnOnce(&mut Acceptance) + 'static) {
    let id = id.to_owned();
    props.on_edit.emit(Box::new(move |sheet| {
        if let Some(limit) = sheet.acceptance.iter_mut().find(|limit| limit.id == id) {
            change(limit);
        }
    }));
}

/// A callback that edits one limit.
fn edits<T: 'static>(
    props: &LimitsFormProps,
    limit: &Acceptance,
    apply: fn(&mut Acceptance, T),
) -> Callback<T> {
    let (props, id) = (props.clone(), limit.id.clone());
    Callback::from(move |value: T| change(&props, &id, move |limit| apply(limit, value)))
}

fn limit_form(props: &LimitsFormProps, at: usize, limit: &Acceptance) -> Html {
    let name = format!("bench-accept-{at}");
    let subject = props.sheet.subject;
    let kinds: Vec<Opt<Limited>> = Limited::ALL
        .into_iter()
        .filter(|of| of.belongs(subject) || *of == limit.of)
        .map(|of| Opt::new(of, of.words(), code_of(of)))
        .collect();
    let scopes = vec![
        Opt::new(Scope::Point, "At a point", "point"),
        Opt::new(Scope::Curve, "Over a range of pressure", "curve"),
    ];
    let is_most = limit.of.is_most(subject);
    let on_remove = {
        let id = limit.id.clone();
        props.on_edit.reform(move |()| -> Edit {
            let id = id.clone();
            Box::new(move |sheet| sheet.acceptance.retain(|limit| limit.id != id))
        })
    };
    html! {
        <fieldset class="bench-meter" key={limit.id.clone()} data-testid={name.clone()}>
            <legend>{ format!("Limit {}: {}, {}", at + 1, limit.of.words().to_lowercase(), if is_most { "at most" } else { "at least" }) }</legend>
            <div class="bench-fields">
                <Select<Limited>
                    id={format!("{name}-of")}
                    label="Of what"
                    options={kinds}
                    value={Some(limit.of)}
                    on_change={edits(props, limit, Acceptance::limit_of)}
                    testid={format!("{name}-of")}
                />
                <Choice<Scope>
                    name={format!("{name}-scope")}
                    label="Where"
                    options={scopes}
                    value={Some(limit.scope)}
                    on_change={edits(props, limit, |limit, scope| limit.scope = scope)}
                />
                if limit.scope == Scope::Point {
                    { point(props, &name, limit) }
                    { figure(props, &name, limit, Part::Limit, most_or_least(is_most)) }
                } else {
                    { figure(props, &name, limit, Part::Speed, "Speed") }
                    { figure(props, &name, limit, Part::From, "From pressure difference") }
                    { figure(props, &name, limit, Part::To, "To pressure difference") }
                    { figure(props, &name, limit, Part::Limit, if is_most { "Highest allowed at the lower pressure" } else { "Lowest allowed at the lower pressure" }) }
                    { figure(props, &name, limit, Part::LimitTo, if is_most { "Highest allowed at the higher pressure" } else { "Lowest allowed at the higher pressure" }) }
                }
                <TextField
                    id={format!("{name}-source")}
                    label="From"
                    hint="The manual with its page, or the customer"
                    value={limit.source.clone()}
                    on_input={edits(props, limit, |limit, text| limit.source = text)}
                    maxlength={400}
                    testid={format!("{name}-source")}
                />
            </div>
            { came(props, &name, limit) }
            <div class="actions">
                <Confirm
                    words={format!("Take limit {} away", at + 1)}
                    question={format!("Take limit {} away?", at + 1)}
                    yes="Take it away"
                    on_yes={on_remove}
                    testid={format!("{name}-remove")}
                />
            </div>
        </fieldset>
    }
}

const fn most_or_least(is_most: bool) -> &'static str {
    if is_most {
        "Highest allowed"
    } else {
        "Lowest allowed"
    }
}

const fn code_of(of: Limited) -> &'static str {
    match of {
        Limited::Overall => "overall",
        Limited::Volumetric => "volumetric",
        Limited::HydroMechanical => "hydro-mechanical",
        Limited::CaseLeakage => "case",
        Limited::Flow => "flow",
    }
}

const fn code_of_part(part: Part) -> &'static str {
    match part {
        Part::Speed => "speed",
        Part::From => "from",
        Part::To => "to",
        Part::Limit => "limit",
        Part::LimitTo => "limit-to",
    }
}

fn figure(
    props: &LimitsFormProps,
    name: &str,
    limit: &Acceptance,
    part: Part,
    label: &'static str,
) -> Html {
    let (base, low, high) = part.asks(limit.of);
    let typed = limit.typed(part).clone();
    let stands_in = match part {
        Part::LimitTo => "Empty: the same as at the lower pressure; else straight in between",
        Part::Speed if limit.of == Limited::CaseLeakage => "Empty: at any speed",
        _ => "",
    };
    let on_entry = {
        let (props, id) = (props.clone(), limit.id.clone());
        Callback::from(move |entry: Entry| {
            change(&props, &id, move |limit| *limit.typed_mut(part) = entry);
        })
    };
    let id = format!("{name}-{}", code_of_part(part));
    html! {
        <MeasureField
            key={code_of_part(part)}
            id={id.clone()}
            {label}
            unit={codes::shown(&props.prefs, base)}
            typed={typed.typed}
            value={typed.value}
            range={Some((Measure::literal(low, base), Measure::literal(high, base)))}
            mark={props.prefs.mark()}
            {stands_in}
            {on_entry}
            testid={id}
        />
    }
}

/// The point of a limit: those of the table, and the one it names where that is gone.
fn point(props: &LimitsFormProps, name: &str, limit: &Acceptance) -> Html {
    let report = &*props.told.0;
    let known = report.points.iter().map(|point| point.name.clone());
    let mut names: Vec<String> = known.collect();
    if !limit.point.is_empty() && !names.contains(&limit.point) {
        names.push(limit.point.clone());
    }
    let options = std::iter::once(Opt::new(String::new(), "Choose the point", ""))
        .chain(
            names
                .into_iter()
                .map(|name| Opt::new(name.clone(), format!("Point {name}"), name)),
        )
        .collect::<Vec<_>>();
    html! {
        <Select<String>
            key="point"
            id={format!("{name}-point")}
            label="Point of the table"
            {options}
            value={Some(limit.point.clone())}
            on_change={edits(props, limit, |limit, point| limit.point = point)}
            testid={format!("{name}-point")}
        />
    }
}

/// What came of it, or what is still to be entered.
fn came(props: &LimitsFormProps, name: &str, limit: &Acceptance) -> Html {
    let found = props.told.0.accepted.iter().find(|one| one.id == limit.id);
    let body = match found.map(|found| &found.judged) {
        None => html! {},
        Some(Err(missing)) => {
            let is_blank = Part::ALL
                .into_iter()
                .all(|part| limit.typed(part).is_blank())
                && limit.point.is_empty();
            let class = if is_blank { "soft" } else { "field-error" };
            html! { <span {class}>{ format!("Not judged yet: {missing}.") }</span> }
        }
        Some(Ok(judged)) => {
            let figure = paper::figure_words(judged, &props.prefs);
            html! { <>
                <strong>{ judged.decision.words() }</strong>
                { figure.map(|figure| format!(": {figure}")) }
                { judged.span.as_ref().map(|span| format!(", {}", paper::span_words(span, &props.prefs))) }
                if !judged.why.is_empty() { { format!(", because {}", judged.why) } }
            </> }
        }
    };
    html! { <p role="status" class="bench-verdict" data-testid={format!("{name}-came")}>{ body }</p> }
}
