//! The metering layout, asked before anything else.

use super::screen::Edit;
use crate::app::parts::{Caution, Choice, Grade, Opt, Section};
use crate::bench::stand::{
    BenchSheet, Charge, Flushing, Meter, ReliefDrain, Subject, TorqueCovers,
};
use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html};

/// Properties of [`LayoutForm`].
#[derive(Clone, PartialEq, Properties)]
pub struct LayoutFormProps {
    /// The sheet.
    pub sheet: Rc<BenchSheet>,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

fn choice<T: Copy + PartialEq + 'static>(
    props: &LayoutFormProps,
    name: &'static str,
    label: &'static str,
    options: &[(T, &'static str, &'static str)],
    value: Option<T>,
    set: fn(&mut BenchSheet, T),
) -> Html {
    let options = options
        .iter()
        .map(|(value, words, code)| Opt::new(*value, *words, *code))
        .collect::<Vec<_>>();
    let on_change = props
        .on_edit
        .reform(move |value: T| -> Edit { Box::new(move |sheet| set(sheet, value)) });
    html! { <Choice<T> {name} {label} {options} {value} {on_change} /> }
}

/// The questions.
#[component]
pub fn LayoutForm(props: &LayoutFormProps) -> Html {
    let sheet = &props.sheet;
    let (subject, layout) = (sheet.subject, sheet.layout);
    let open = layout.open(subject);
    let state = if open.is_empty() {
        "stated".to_owned()
    } else {
        format!("{} to be said", open.len())
    };
    let is_pump = subject == Subject::Pump;
    let has_charge = matches!(layout.charge, Some(Charge::Own | Charge::Outside));
    html! {
        <Section id="bench-layout" title="What is metered where" {state} is_open=true>
            { choice(props, "bench-subject", "On the stand", &[
                (Subject::Pump, "Pump", "pump"),
                (Subject::Motor, "Motor", "motor"),
                (Subject::Transmission, "Whole drive", "drive"),
            ], Some(subject), |sheet, subject| sheet.subject = subject) }
            if is_pump {
                { choice(props, "bench-charge", "Charge comes from", &[
                    (Charge::Own, "Its own charge pump", "own"),
                    (Charge::Outside, "The stand", "outside"),
                    (Charge::None, "Nowhere: the inlet is fed", "none"),
                ], layout.charge, |sheet, charge| sheet.layout.charge = Some(charge)) }
            }
            if is_pump && has_charge {
                { choice(props, "bench-relief", "The charge relief drains", &[
                    (ReliefDrain::Case, "Into the metered case", "case"),
                    (ReliefDrain::Elsewhere, "Elsewhere", "elsewhere"),
                ], layout.relief, |sheet, relief| sheet.layout.relief = Some(relief)) }
            }
            if subject != Subject::Transmission {
                { choice(props, "bench-meter", "The flow meter stands in", &[
                    (Meter::High, "The high-pressure line", "high"),
                    (Meter::Low, "The low-pressure line", "low"),
                ], layout.meter, |sheet, meter| sheet.layout.meter = Some(meter)) }
            }
            if subject == Subject::Motor {
                { choice(props, "bench-flushing", "Flushing", &[
                    (Flushing::Plugged, "Plugged or not fitted", "plugged"),
                    (Flushing::Open, "Open", "open"),
                ], layout.flushing, |sheet, flushing| sheet.layout.flushing = Some(flushing)) }
            }
            if (is_pump && layout.charge == Some(Charge::Own)) || subject == Subject::Transmission {
                { choice(props, "bench-torque", "The torque covers", &[
                    (TorqueCovers::MachineOnly, "The main unit alone", "alone"),
                    (TorqueCovers::WithCharge, "The charge pump too", "charge"),
                ], layout.torque, |sheet, torque| sheet.layout.torque = Some(torque)) }
            }
            if layout.relief == Some(ReliefDrain::Case) && has_charge && is_pump {
                <Caution grade={Grade::Note} title="Case flow is not leakage here">
                    <p>{ "It holds the relief’s oil and the control’s. Lead the relief elsewhere, or add the columns charge flow and make-up flow: \
                        what charge delivers and the loop does not take is subtracted." }</p>
                </Caution>
            }
            if layout.flushing == Some(Flushing::Open) && subject == Subject::Motor {
                <Caution grade={Grade::Note} title="Case flow holds flushing oil">
                    <p>{ "Plug the flushing for the run; put the plug’s removal on the list, or the motor runs hot on the machine." }</p>
                </Caution>
            }
            <p class="soft" role="status" data-testid="bench-layout-open">
                if open.is_empty() {
                    { "Leakage and torque are corrected by this." }
                } else {
                    { format!("No loss fit yet: {}.", open.iter().map(ToString::to_string).collect::<Vec<_>>().join("; ")) }
                }
            </p>
        </Section>
    }
}
