//! A field for one figure with its unit.
//!
//! What is typed is never reformatted while it is typed and never lost: the caller keeps [`Entry::typed`] beside the value.

use yew::{AttrValue, Callback, Classes, Event, FocusEvent, Html, InputEvent, Properties};
use yew::{MouseEvent, TargetCast, classes, component, html, use_context, use_state};

use super::OwnKeys;
use crate::quantity::strokes::{Stroke, press};
use crate::quantity::{
    DecimalMark, Decimals, Measure, Parsed, Unit, edit_text, format_with_unit, parse,
};

/// What stands in the field.
pub use crate::quantity::Typed as Entry;

/// Properties of [`MeasureField`].
#[derive(Clone, PartialEq, Properties)]
pub struct MeasureFieldProps {
    /// DOM id of the input; unique on the page.
    pub id: AttrValue,
    /// Visible label.
    pub label: AttrValue,
    /// Unit shown and taken where none is typed. It also says what kind of quantity is asked for.
    pub unit: Unit,
    /// The text as it was typed.
    #[prop_or_default]
    pub typed: AttrValue,
    /// The value that is kept; where it does not match the text (the shop's units were changed since), it is shown instead.
    #[prop_or_default]
    pub value: Option<Measure>,
    /// Lowest and highest accepted.
    #[prop_or_default]
    pub range: Option<(Measure, Measure)>,
    /// Decimal mark of printed figures. Both are taken when typed.
    #[prop_or_default]
    pub mark: DecimalMark,
    /// Where to find the figure, in a few words; stands under the label.
    #[prop_or_default]
    pub hint: AttrValue,
    /// What holds while the field is empty; stands under the field.
    #[prop_or_default]
    pub stands_in: AttrValue,
    /// Every edit.
    pub on_entry: Callback<Entry>,
    /// For the end-to-end tests.
    #[prop_or_default]
    pub testid: AttrValue,
    /// Extra classes of the outer element.
    #[prop_or_default]
    pub class: Classes,
}

/// The unit picked in this field, held together with the text it was picked for.
#[derive(Clone, Default, PartialEq)]
struct Own {
    unit: Option<Unit>,
    typed: AttrValue,
}

/// A unit other than `unit` whose symbol closes the kept text, as [`keep`] wrote it.
fn unit_in(typed: &str, unit: Unit) -> Option<Unit> {
    unit.kind()
        .units()
        .filter(|other| *other != unit && !other.symbol().is_empty())
        .filter(|other| {
            typed
                .strip_suffix(other.symbol())
                .is_some_and(|rest| rest.ends_with(' '))
        })
        .max_by_key(|other| other.symbol().len())
}

/// The text without the unit that [`keep`] put behind it.
fn without_unit(typed: &str, own: Option<Unit>) -> &str {
    own.and_then(|unit| typed.strip_suffix(unit.symbol()))
        .and_then(|rest| rest.strip_suffix(' '))
        .unwrap_or(typed)
}

/// The text to keep: with its unit where that is not the one of the field.
fn keep(text: &str, own: Option<Unit>) -> String {
    match own {
        Some(unit) if !text.trim().is_empty() => format!("{text} {}", unit.symbol()),
        _ => text.to_owned(),
    }
}

fn same(a: Measure, b: Measure) -> bool {
    a.kind() == b.kind() && (a.base() - b.base()).abs() <= 1e-7 * a.base().abs().max(1e-6)
}

/// Significant digits of a value that is shown in another unit than it was typed in.
const CONVERTED_DIGITS: usize = 5;

/// A value that was typed in another unit, with as many digits as it can mean.
fn converted_text(value: Measure, unit: Unit, mark: DecimalMark) -> String {
    let rounded = value
        .try_in_unit(unit)
        .ok()
        .and_then(|value| format!("{value:.*e}", CONVERTED_DIGITS - 1).parse().ok())
        .and_then(|value| Measure::new(value, unit).ok());
    edit_text(rounded.unwrap_or(value), unit, mark)
}

/// A line under the field: how the text was understood, or why it was not.
enum Remark {
    None,
    Read(String),
    Error(String),
}

fn remark(
    props: &MeasureFieldProps,
    text: &str,
    read: &Result<Parsed, String>,
    may_complain: bool,
) -> Remark {
    if text.trim().is_empty() {
        return Remark::None;
    }
    match read {
        Err(why) if may_complain => Remark::Error(why.clone()),
        Err(_) => Remark::None,
        Ok(_) if props.value.is_none() && may_complain => {
            Remark::Error("Not taken yet: type it again, with its unit.".to_owned())
        }
        Ok(parsed) => {
            let printed =
                |unit| format_with_unit(parsed.measure, unit, Decimals::Reading, props.mark);
            let converted =
                (parsed.unit != props.unit).then(|| format!("= {}", printed(props.unit)));
            let noted = parsed.note.map(|note| note.to_string());
            match [noted, converted].into_iter().flatten().collect::<Vec<_>>() {
                lines if lines.is_empty() => Remark::None,
                lines => Remark::Read(lines.join(" ")),
            }
        }
    }
}

/// The field.
#[component]
pub fn MeasureField(props: &MeasureFieldProps) -> Html {
    let keys = use_context::<OwnKeys>();
    let own = use_state(Own::default);
    let focused = use_state(|| false);
    let complained = use_state(|| true);

    let picked = if own.typed == props.typed && !(own.typed.is_empty() && own.unit.is_none()) {
        own.unit
    } else {
        unit_in(&props.typed, props.unit)
    };
    let unit = picked.unwrap_or(props.unit);
    let read = |text: &str, unit: Unit| {
        let range = props.range.map(|(low, high)| low..=high);
        parse(text, unit.kind(), unit, range).map_err(|why| why.message(props.mark))
    };

    let kept = without_unit(&props.typed, picked);
    let kept_read = read(kept, unit);
    let is_as_typed = match (props.value, &kept_read) {
        (Some(value), Ok(parsed)) => same(parsed.measure, value),
        (Some(_), Err(_)) => false,
        (None, _) => true,
    };
    let text = match props.value {
        Some(value) if !is_as_typed => converted_text(value, unit, props.mark),
        _ => kept.to_owned(),
    };
    let shown_unit = match &kept_read {
        Ok(parsed) if is_as_typed => parsed.unit,
        _ => unit,
    };
    let remark = if is_as_typed {
        remark(props, &text, &kept_read, *complained || !*focused)
    } else {
        // The kept value, only in another unit: it was taken long ago.
        Remark::None
    };

    let emit = {
        let (own, on_entry, range) = (own.clone(), props.on_entry.clone(), props.range);
        let field_unit = props.unit;
        move |text: String, picked: Option<Unit>| {
            let unit = picked.unwrap_or(field_unit);
            let parsed = parse(
                &text,
                unit.kind(),
                unit,
                range.map(|(low, high)| low..=high),
            )
            .ok();
            // A unit that was typed out speaks for itself.
            let behind = picked.filter(|_| !parsed.is_some_and(|parsed| parsed.unit_typed));
            let typed = keep(&text, behind);
            own.set(Own {
                unit: behind,
                typed: typed.clone().into(),
            });
            on_entry.emit(Entry {
                typed,
                value: parsed.map(|parsed| parsed.measure),
            });
            parsed.is_some()
        }
    };
    let on_input = {
        let (emit, complained) = (emit.clone(), complained.clone());
        Callback::from(move |event: InputEvent| {
            let input: web_sys::HtmlInputElement = event.target_unchecked_into();
            if emit(input.value(), picked) {
                complained.set(false);
            }
        })
    };
    let on_unit = {
        let (emit, text, field_unit) = (emit.clone(), text.clone(), props.unit);
        Callback::from(move |event: Event| {
            let select: web_sys::HtmlSelectElement = event.target_unchecked_into();
            let Some(unit) = Unit::from_code(&select.value()) else {
                return;
            };
            // The figure stays as it stands on the gauge; only its unit was wrong.
            let figure: &str = text
                .trim_end_matches(|c: char| !c.is_ascii_digit())
                .trim_end_matches(['²', '³']);
            let figure = if figure.is_empty() { &text } else { figure };
            emit(figure.to_owned(), (unit != field_unit).then_some(unit));
        })
    };
    let on_sign = {
        let (emit, text) = (emit.clone(), text.clone());
        Callback::from(move |_: MouseEvent| {
            let end = text.chars().count();
            emit(press(&text, end, end, Stroke::Sign).0, picked);
        })
    };
    let on_focus = {
        let (focused, complained) = (focused.clone(), complained.clone());
        let wrong = matches!(remark, Remark::Error(_));
        Callback::from(move |_: FocusEvent| {
            focused.set(true);
            complained.set(wrong);
        })
    };
    let on_blur = Callback::from(move |_: FocusEvent| {
        focused.set(false);
        complained.set(true);
    });

    let (hint_id, note_id) = (format!("{}-hint", props.id), format!("{}-note", props.id));
    let wrong = matches!(remark, Remark::Error(_));
    let described = [
        (!props.hint.is_empty()).then_some(hint_id.as_str()),
        Some(note_id.as_str()),
    ];
    let described: String = described
        .into_iter()
        .flatten()
        .collect::<Vec<_>>()
        .join(" ");
    let symbol = props.unit.symbol();
    let is_signed = props.range.is_some_and(|(low, _)| low.base() < 0.0);
    let inputmode = match &keys {
        Some(keys) if keys.on => "none",
        // The number pads of some phones have no minus: the key beside the field is it.
        _ if is_signed || props.range.is_some() => "decimal",
        _ => "text",
    };
    let label = if shown_unit.symbol().is_empty() {
        props.label.clone()
    } else {
        format!("{}, {}", props.label, shown_unit.symbol()).into()
    };
    let units: Vec<Unit> = props
        .unit
        .kind()
        .units()
        .filter(|unit| !unit.symbol().is_empty() || *unit == props.unit)
        .collect();
    html! {
        <div class={classes!("field", wrong.then_some("is-wrong"), props.class.clone())}>
            <label class="field-label" for={props.id.clone()}>{ props.label.clone() }</label>
            if !props.hint.is_empty() {
                <span class="field-hint" id={hint_id.clone()}>{ props.hint.clone() }</span>
            }
            <span class="field-box">
                <input
                    class="field-input"
                    id={props.id.clone()}
                    type="text"
                    {inputmode}
                    data-figure="true"
                    data-signed={is_signed.then_some("true")}
                    enterkeyhint="next"
                    autocomplete="off"
                    spellcheck="false"
                    aria-label={label}
                    aria-describedby={described}
                    aria-invalid={wrong.then_some("true")}
                    data-testid={props.testid.clone()}
                    value={text}
                    oninput={on_input}
                    onfocus={on_focus}
                    onblur={on_blur}
                />
                if is_signed {
                    <button
                        type="button"
                        class="field-sign"
                        aria-label={format!("Plus or minus, {}", props.label)}
                        data-testid={format!("sign-{}", props.testid)}
                        onmousedown={Callback::from(|event: MouseEvent| {
                            // The field keeps the focus.
                            event.prevent_default();
                        })}
                        onclick={on_sign}
                    >{ "±" }</button>
                }
                if let Some(keys) = &keys {
                    { keys.toggle(&props.label, &props.testid) }
                }
                if units.len() > 1 {
                    <select
                        class="field-unit"
                        aria-label={format!("Unit of {}", props.label)}
                        onchange={on_unit}
                    >
                        { for units.iter().map(|unit| html! {
                            <option value={unit.code()} selected={*unit == shown_unit}>
                                { if unit.symbol().is_empty() { "–" } else { unit.symbol() } }
                            </option>
                        }) }
                    </select>
                } else if !symbol.is_empty() {
                    <span class="field-suffix" aria-hidden="true">{ symbol }</span>
                }
            </span>
            <span class="field-note" id={note_id} role="status">
                { match remark {
                    Remark::Error(why) => html! { <span class="field-error" data-testid="field-error">{ why }</span> },
                    Remark::Read(how) => html! { <span class="field-read">{ how }</span> },
                    Remark::None if !props.stands_in.is_empty() => html! {
                        <span class="field-stands-in">{ props.stands_in.clone() }</span>
                    },
                    Remark::None => Html::default(),
                } }
            </span>
        </div>
    }
}
