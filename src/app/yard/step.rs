//! One step of the sheet: how, what is looked at, what is read, what it came to.

use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html};

use super::checked::Checked;
use super::screen::Edit;
use crate::app::call::cautions;
use crate::app::parts::{Choice, Entry, Lay, MeasureField, Opt, Retold, Section};
use crate::quantity::UnitPrefs;
use crate::unit::Unit;
use crate::yard::labels;
use crate::yard::{Field, Judged, Look, Step, YardSheet};

/// Properties of [`StepPart`].
#[derive(Clone, Properties)]
pub struct StepProps {
    /// Place in the order, from 1.
    pub number: usize,
    /// The step.
    pub step: &'static Step,
    /// The unit.
    pub unit: Rc<Unit>,
    /// The sheet.
    pub sheet: YardSheet,
    /// What it came to: lines of this step.
    pub judged: Vec<Judged>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

impl PartialEq for StepProps {
    fn eq(&self, other: &Self) -> bool {
        self.step.id == other.step.id
            && self.number == other.number
            && Rc::ptr_eq(&self.unit, &other.unit)
            && self.sheet == other.sheet
            && self.judged == other.judged
            && self.prefs == other.prefs
            && self.on_edit == other.on_edit
    }
}

/// The step.
#[component]
pub fn StepPart(props: &StepProps) -> Html {
    let StepProps {
        step, unit, sheet, ..
    } = props;
    let looks = step.looks_of(unit, sheet.leg);
    let open = props
        .judged
        .iter()
        .filter(|j| j.grade.is_none() && !j.why.is_empty())
        .count();
    let worst = props.judged.iter().filter_map(|j| j.grade).max();
    let state = match (worst, open) {
        (None, _) => format!("{} min", step.minutes),
        (Some(grade), 0) => grade.words().to_owned(),
        (Some(grade), open) => format!("{}; {open} open", grade.words()),
    };
    let lines: Vec<Judged> = props
        .judged
        .iter()
        .filter(|j| !j.found.is_empty() && !looks.iter().any(|look| look.title == j.what))
        .cloned()
        .collect();
    html! {
        <Section id={format!("yard-step-{}", step.id)} title={format!("{}. {}", props.number, step.title)} {state} is_open=true>
            { cautions::all(&step.cautions(unit, sheet.leg)) }
            <p><Retold text={step.how} /></p>
            if !looks.is_empty() {
                <div class="yard-looks">{ for looks.iter().map(|asked| look(asked, props)) }</div>
            }
            if !step.fields.is_empty() {
                <div class="yard-fields">{ for step.fields.iter().map(|asked| field(*asked, props)) }</div>
            }
            if step.id == "slip" {
                { course(props) }
            }
            <Checked {lines} />
        </Section>
    }
}

fn look(look: &'static Look, props: &StepProps) -> Html {
    let value = props.sheet.looks.get(look.id).cloned();
    let on_change = props.on_edit.reform(move |code: String| -> Edit {
        Box::new(move |visit| {
            let sheet = visit.yard.get_or_insert_default();
            sheet.looks.insert(look.id.to_owned(), code);
        })
    });
    let options = look
        .options
        .iter()
        .map(|option| Opt::new(option.code.to_owned(), option.words, option.code))
        .collect::<Vec<_>>();
    html! {
        <Choice<String>
            key={look.id}
            name={format!("look-{}", look.id)}
            label={look.title}
            hint={look.how}
            {options}
            {value}
            {on_change}
            lay={Lay::Row}
        />
    }
}

fn field(field: Field, props: &StepProps) -> Html {
    let (label, hint) = labels::field(field, &props.unit);
    let typed = props.sheet.fields.get(&field).cloned().unwrap_or_default();
    let on_entry = props.on_edit.reform(move |entry: Entry| -> Edit {
        Box::new(move |visit| {
            visit.yard.get_or_insert_default().set(field, entry);
        })
    });
    let code = field.code().replace('_', "-");
    html! {
        <MeasureField
            key={code.clone()}
            id={format!("yard-field-{code}")}
            {label}
            {hint}
            unit={labels::unit(field, &props.prefs)}
            typed={typed.typed}
            value={typed.value}
            range={Some(field.range())}
            mark={props.prefs.mark()}
            {on_entry}
            testid={format!("yard-{code}")}
        />
    }
}

/// Which ramp or drag: another one does not compare.
fn course(props: &StepProps) -> Html {
    let on_input = props.on_edit.reform(|text: String| -> Edit {
        Box::new(move |visit| visit.yard.get_or_insert_default().course = text)
    });
    html! {
        <crate::app::parts::TextField
            id="yard-course"
            label="Which ramp or drag"
            hint="The same words each time: another one does not compare."
            value={props.sheet.course.clone()}
            {on_input}
            maxlength=120
            testid="yard-course"
        />
    }
}
