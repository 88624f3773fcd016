//! Fields of the sheet.

use std::rc::Rc;

use yew::{AttrValue, Callback, Html, Properties, component, html};

use super::edit::Edits;
use crate::app::parts::{Entry, MeasureField};
use crate::quantity::{Measure, Unit, UnitPrefs};
use crate::record::NeutralSheet;
use crate::record::neutral::Field;

/// Properties of [`SheetField`].
#[derive(Clone, PartialEq, Properties)]
pub struct SheetFieldProps {
    /// Which.
    pub field: Field,
    /// Label.
    pub label: AttrValue,
    /// Where to find it.
    #[prop_or_default]
    pub hint: AttrValue,
    /// What holds while it is empty.
    #[prop_or_default]
    pub stands_in: AttrValue,
    /// The sheet.
    pub sheet: Rc<NeutralSheet>,
    /// Units.
    pub prefs: UnitPrefs,
    /// Edits.
    pub edits: Edits,
}

/// The unit a field is asked in: the mechanic's, but turns and seconds are what a hand counts.
fn asked_in(field: Field, prefs: &UnitPrefs) -> Unit {
    match field.unit() {
        counted @ (Unit::Turn | Unit::Second) => counted,
        other => prefs.unit(other.kind()),
    }
}

/// A span in a unit, as a field takes it.
pub fn span((low, high): (f64, f64), unit: Unit) -> Option<(Measure, Measure)> {
    Measure::new(low, unit)
        .ok()
        .zip(Measure::new(high, unit).ok())
}

/// The field.
#[component]
pub fn SheetField(props: &SheetFieldProps) -> Html {
    let field = props.field;
    let kept = props.sheet.fields.get(&field).cloned().unwrap_or_default();
    let code = format!("{field:?}");
    let on_entry = {
        let edits = props.edits.clone();
        Callback::from(move |entry: Entry| {
            edits.make(|sheet| sheet.set(field, entry.clone()));
        })
    };
    html! {
        <MeasureField
            id={format!("neutral-{code}")}
            label={props.label.clone()}
            hint={props.hint.clone()}
            stands_in={props.stands_in.clone()}
            unit={asked_in(field, &props.prefs)}
            range={span(field.range(), field.unit())}
            mark={props.prefs.mark()}
            typed={AttrValue::from(kept.typed)}
            value={kept.value}
            {on_entry}
            testid={format!("neutral-{code}")}
        />
    }
}
