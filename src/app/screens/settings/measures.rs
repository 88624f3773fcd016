//! The units of measure in which figures are shown. Any unit can be typed whatever stands here.

use yew::{Html, component, html};

use super::SettingsProps;
use crate::app::parts::{Choice, Opt, Section, Select};
use crate::assessment::upper_first;
use crate::quantity::{DecimalMark, Kind, Unit, UnitPrefs};

/// Kinds that a screen shows.
const KINDS: [Kind; 12] = [
    Kind::Pressure,
    Kind::Flow,
    Kind::RotationalSpeed,
    Kind::Temperature,
    Kind::Displacement,
    Kind::KinematicViscosity,
    Kind::GroundSpeed,
    Kind::Length,
    Kind::Volume,
    Kind::Current,
    Kind::Torque,
    Kind::Power,
];

/// A ready-made choice.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Preset {
    Metric,
    Us,
}

impl Preset {
    /// The choice, with the decimal mark that is set now.
    fn prefs(self, mark: DecimalMark) -> UnitPrefs {
        let mut prefs = match self {
            Preset::Metric => UnitPrefs::metric(),
            Preset::Us => UnitPrefs::us(),
        };
        prefs.choose_mark(mark);
        prefs
    }

    fn of(prefs: &UnitPrefs) -> Option<Preset> {
        [Preset::Metric, Preset::Us]
            .into_iter()
            .find(|preset| preset.prefs(prefs.mark()) == *prefs)
    }
}

fn unit_options(kind: Kind) -> Vec<Opt<Unit>> {
    kind.units()
        .map(|unit| Opt::new(unit, unit.symbol(), unit.code()))
        .collect()
}

/// The ready-made choices.
#[component]
pub fn Presets(props: &SettingsProps) -> Html {
    html! {
        <Choice<Preset>
            name="preset"
            label="Show figures in"
            hint="Whatever is chosen, any unit can be typed: 350 psi, 24,5 bar."
            options={vec![
                Opt::new(Preset::Metric, "Metric", "metric"),
                Opt::new(Preset::Us, "US", "us"),
            ]}
            value={Preset::of(&props.state.settings.units)}
            on_change={props.change(|settings, preset: Preset| {
                settings.units = preset.prefs(settings.units.mark());
                settings.first_run.units_chosen = true;
            })}
        />
    }
}

/// The units of measure.
#[component]
pub fn Measures(props: &SettingsProps) -> Html {
    let prefs = &props.state.settings.units;
    html! {
        <Section id="measures" title="Units of measure" state={match Preset::of(prefs) {
            Some(Preset::Metric) => "metric",
            Some(Preset::Us) => "US",
            None => "mixed",
        }}>
            <Presets ..props.clone() />
            <Choice<DecimalMark>
                name="mark"
                label="Decimal mark"
                options={vec![
                    Opt::new(DecimalMark::Point, "24.5", "point"),
                    Opt::new(DecimalMark::Comma, "24,5", "comma"),
                ]}
                value={prefs.mark()}
                on_change={props.change(|settings, mark| settings.units.choose_mark(mark))}
            />
            <details class="fold" data-testid="each-unit">
                <summary>{ "Each kind by itself" }</summary>
                <div class="stack">
                    <div class="pairs">
                        { for KINDS.into_iter().map(|kind| html! {
                            <Select<Unit>
                                key={kind.name()}
                                id={format!("unit-of-{}", kind.name().replace(' ', "-"))}
                                label={upper_first(kind.name())}
                                options={unit_options(kind)}
                                value={prefs.unit(kind)}
                                on_change={props.change(|settings, unit: Unit| choose(&mut settings.units, unit))}
                                testid={format!("unit-of-{}", kind.name().replace(' ', "-"))}
                            />
                        }) }
                        <Select<Unit>
                            id="unit-of-pull"
                            label="Pull at the charge inlet"
                            options={unit_options(Kind::Pressure)}
                            value={prefs.pull_unit()}
                            on_change={props.change(|settings, unit| settings.units.choose_pull(unit))}
                            testid="unit-of-pull"
                        />
                    </div>
                </div>
            </details>
        </Section>
    }
}

/// Chooses a unit; a difference of temperatures goes with the temperature.
fn choose(prefs: &mut UnitPrefs, unit: Unit) {
    prefs.choose(unit);
    match unit {
        Unit::DegreeCelsius => prefs.choose(Unit::Kelvin),
        Unit::DegreeFahrenheit => prefs.choose(Unit::FahrenheitDifference),
        _ => {}
    }
}
