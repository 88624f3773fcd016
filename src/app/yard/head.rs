//! The head of the sheet: out or in, hour meter, and the instruments, which decide what compares.

use std::rc::Rc;
use yew::{Callback, Html, Properties, component, html};

use super::screen::Edit;
use crate::app::parts::{Choice, Entry, MeasureField, Opt, Section, Select};
use crate::quantity::{Measure, Unit, UnitPrefs};
use crate::readings::Place;
use crate::readings::instrument::{Instrument, InstrumentKind};
use crate::record::{Visit, limits};
use crate::yard::{ABOUT_COUPLINGS, ABOUT_LIMITS, Leg, YardSheet};

/// Properties of [`Head`].
#[derive(Clone, PartialEq, Properties)]
pub struct HeadProps {
    /// The visit.
    pub visit: Rc<Visit>,
    /// Instruments of the shop.
    pub instruments: Rc<Vec<Instrument>>,
    /// Units of measure.
    pub prefs: UnitPrefs,
    /// Edits.
    pub on_edit: Callback<Edit>,
}

/// The head.
#[component]
pub fn Head(props: &HeadProps) -> Html {
    let empty = YardSheet::default();
    let sheet = props.visit.yard.as_ref().unwrap_or(&empty);
    let on_leg = props.on_edit.reform(|leg: Leg| -> Edit {
        Box::new(move |visit| visit.yard.get_or_insert_default().leg = leg)
    });
    let on_hours = props.on_edit.reform(|entry: Entry| -> Edit {
        Box::new(move |visit| {
            visit.hours = entry;
        })
    });
    let on_place = props.on_edit.reform(|place: Place| -> Edit {
        Box::new(move |visit| visit.yard.get_or_insert_default().place = place)
    });
    let legs = Leg::ALL
        .into_iter()
        .map(|leg| Opt::new(leg, leg.words(), leg.code()))
        .collect::<Vec<_>>();
    let places = Place::ALL
        .into_iter()
        .map(|place| Opt::new(place, place.words(), format!("{place:?}")))
        .collect::<Vec<_>>();
    let hours = (
        Measure::literal(0.0, Unit::Hour),
        Measure::literal(limits::MOST_HOURS, Unit::Hour),
    );
    let gauges = |kinds: &[InstrumentKind]| -> Vec<Opt<String>> {
        let mut options = vec![Opt::new(String::new(), "Not said", "none")];
        options.extend(
            props
                .instruments
                .iter()
                .filter(|i| kinds.contains(&i.what))
                .map(|i| Opt::new(i.id.clone(), i.name.clone(), i.id.clone())),
        );
        options
    };
    let pick = |set: fn(&mut YardSheet, String)| {
        props.on_edit.reform(move |id: String| -> Edit {
            Box::new(move |visit| set(visit.yard.get_or_insert_default(), id))
        })
    };
    html! { <>
        <section class="panel stack" aria-label="Out or in">
            <Choice<Leg> name="yard-leg" label="This check is for the machine" options={legs} value={Some(sheet.leg)} on_change={on_leg} />
            <MeasureField
                id="yard-hours"
                label="Hour meter"
                hint="Wear is drawn over hours; without them over days, and nothing is projected."
                unit={Unit::Hour}
                typed={props.visit.hours.typed.clone()}
                value={props.visit.hours.value}
                range={Some(hours)}
                mark={props.prefs.mark()}
                on_entry={on_hours}
                testid="yard-hours"
            />
        </section>
        <Section id="yard-instruments" title="Instruments and limits" state={if sheet.gauge.is_empty() { "not said" } else { "chosen" }}>
            <p class="soft">{ "The same ones each time: another gauge, place or tachometer steps the series." }</p>
            <div class="yard-fields">
                <Select<Place>
                    id="yard-place"
                    label="Oil temperature taken at"
                    options={places}
                    value={Some(sheet.place)}
                    on_change={on_place}
                    testid="yard-place"
                />
                <Select<String>
                    id="yard-gauge"
                    label="Gauge on charge"
                    options={gauges(&[InstrumentKind::PressureGauge, InstrumentKind::PressureTransducer])}
                    value={Some(sheet.gauge.clone())}
                    on_change={pick(|sheet, id| sheet.gauge = id)}
                    testid="yard-gauge"
                />
                <Select<String>
                    id="yard-tachometer"
                    label="Tachometer"
                    options={gauges(&[InstrumentKind::Tachometer])}
                    value={Some(sheet.tachometer.clone())}
                    on_change={pick(|sheet, id| sheet.tachometer = id)}
                    testid="yard-tachometer"
                />
                <Select<String>
                    id="yard-meter"
                    label="Drain measured with"
                    options={gauges(&[InstrumentKind::Jug, InstrumentKind::FlowMeter])}
                    value={Some(sheet.meter.clone())}
                    on_change={pick(|sheet, id| sheet.meter = id)}
                    testid="yard-meter"
                />
            </div>
            <p class="soft">{ ABOUT_LIMITS }</p>
            <p class="soft">{ ABOUT_COUPLINGS }</p>
        </Section>
    </> }
}
