//! The instruments of the shop: what a reading is worth depends on them.

use yew::{Callback, Html, MouseEvent, component, html};
use yew::{use_effect_with, use_mut_ref, use_state};

use super::SettingsProps;
use super::draft::Draft;
use super::instrument_form::{InstrumentForm, sort_words};
use crate::app::parts::{Confirm, Section};
use crate::app::platform::{focus, ids};
use crate::quantity::{Measure, UnitPrefs};
use crate::readings::instrument::{Indication, Instrument, usual_instruments};
use crate::record::{IdOf, Settings};

/// An instrument in one line.
fn line(instrument: &Instrument, prefs: &UnitPrefs) -> String {
    let step = instrument.resolution.map_or_else(String::new, |step| {
        let what = match instrument.indication {
            Indication::Needle => "division",
            Indication::Digital => "step",
        };
        format!(", {what} {}", plain(step, prefs))
    });
    format!(
        "{}, {} to {}, {}{step}",
        sort_words(instrument.what),
        prefs.edit_text(instrument.span_low),
        plain(instrument.span_high, prefs),
        instrument.accuracy
    )
}

/// The figure as the dial has it, with its unit.
fn plain(measure: Measure, prefs: &UnitPrefs) -> String {
    format!(
        "{} {}",
        prefs.edit_text(measure),
        prefs.unit(measure.kind())
    )
}

/// The list.
#[component]
pub fn Instruments(props: &SettingsProps) -> Html {
    let settings = &props.state.settings;
    let prefs = &settings.units;
    let draft = Draft::of(settings);
    let tried = use_state(|| false);
    let missing = draft.instrument(String::new).err().filter(|_| *tried);
    {
        let is_first = use_mut_ref(|| true);
        use_effect_with(draft.id.clone(), move |id| {
            // The form stands below the list: the focus goes there, but not when the screen has just come up.
            if !std::mem::take(&mut *is_first.borrow_mut()) && !id.is_empty() {
                focus::to("instrument-name");
            }
        });
    }
    let on_keep = {
        let (tried, draft) = (tried.clone(), draft.clone());
        let change = props.change(|settings: &mut Settings, instrument: Instrument| {
            let mut places = settings.instruments.iter_mut();
            match places.find(|other| other.id == instrument.id) {
                Some(place) => *place = instrument,
                None => settings.instruments.push(instrument),
            }
            Draft::drop_from(settings);
        });
        Callback::from(move |_: MouseEvent| {
            let instrument = draft.instrument(|| ids::fresh(IdOf::Instrument));
            tried.set(instrument.is_err());
            if let Ok(instrument) = instrument {
                change.emit(instrument);
            }
        })
    };
    let on_drop = props.change(|settings: &mut Settings, _: MouseEvent| Draft::drop_from(settings));
    let on_remove = {
        let id = draft.id.clone();
        props.change(move |settings: &mut Settings, ()| {
            settings.instruments.retain(|other| other.id != id);
            Draft::drop_from(settings);
        })
    };
    let usual_missing = usual_instruments()
        .iter()
        .any(|usual| settings.instrument(&usual.id).is_none());
    let on_usual = props.change(|settings: &mut Settings, _: MouseEvent| {
        for usual in usual_instruments() {
            if settings.instrument(&usual.id).is_none() {
                settings.instruments.push(usual);
            }
        }
    });
    html! {
        <Section
            id="instruments"
            title="Instruments of the shop"
            state={settings.instruments.len().to_string()}
            is_open={draft.is_begun()}
        >
            <p class="soft small">
                { "Span and accuracy decide what a reading can tell. The list starts with what most vans carry, common \
                   practice; put yours in its place." }
            </p>
            <ul class="rows">
                { for settings.instruments.iter().map(|instrument| {
                    let (change_id, change_prefs) = (instrument.id.clone(), prefs.clone());
                    let on_change = props.change(move |settings: &mut Settings, _: MouseEvent| {
                        if let Some(instrument) = settings.instrument(&change_id) {
                            Draft::from_instrument(instrument, &change_prefs).keep(settings);
                        }
                    });
                    html! {
                        <li key={instrument.id.clone()} class="line-item" data-testid="instrument">
                            <div>
                                <strong>{ &instrument.name }</strong>
                                <div class="soft small">{ line(instrument, prefs) }</div>
                            </div>
                            <button
                                type="button"
                                class="button is-quiet"
                                onclick={on_change}
                                aria-label={format!("Change {}", instrument.name)}
                                data-testid="change-instrument"
                            >
                                { "Change" }
                            </button>
                        </li>
                    }
                }) }
            </ul>
            if usual_missing {
                <div class="actions">
                    <button type="button" class="button is-quiet" onclick={on_usual} data-testid="usual-instruments">
                        { "Bring the usual ones back" }
                    </button>
                </div>
            }
            <details class="fold" open={draft.is_begun()} data-testid="instrument-add">
                <summary>{ if draft.is_change() { "Change an instrument" } else { "Add an instrument" } }</summary>
                <div class="stack">
                    <InstrumentForm ..props.clone() />
                    if let Some(what) = missing {
                        <p class="field-error" role="alert" data-testid="instrument-missing">{ what }</p>
                    }
                    <div class="actions">
                        <button type="button" class="button is-main" onclick={on_keep} data-testid="instrument-keep">
                            { "Keep this instrument" }
                        </button>
                        if draft.is_begun() {
                            <button type="button" class="button is-quiet" onclick={on_drop}>{ "Drop what was typed" }</button>
                        }
                    </div>
                    if draft.is_change() {
                        <Confirm
                            words="Remove this instrument"
                            question={format!("Remove {}? Readings taken with it keep their figures.", draft.name)}
                            yes="Remove"
                            on_yes={on_remove}
                            testid="remove-instrument"
                        />
                    }
                </div>
            </details>
        </Section>
    }
}
