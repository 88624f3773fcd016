//! What the unit has: yes, no, don't know, in the order in which the answers matter.

use yew::{Callback, Html, component, html};

use super::PartProps;
use crate::app::parts::{Choice, Lay, Opt, Section, Select, tick_options};
use crate::unit::{
    CaseLines, ChargeSource, Control, Filter, LoopReliefTo, MachineClass, Paths, ReliefDrain,
    Shuttle, Tick, Ticks,
};

/// Answers that are not "don't know".
fn answered(ticks: &Ticks) -> usize {
    let yes_no = [
        ticks.flushing,
        ticks.limiter,
        ticks.brake_from_charge,
        ticks.shift_from_charge,
        ticks.two_speed,
        ticks.bypass,
        ticks.slipping_drive,
    ];
    yes_no.iter().filter(|tick| **tick != Tick::Unknown).count()
        + [
            ticks.control != Control::Unknown,
            ticks.filter != Filter::Unknown,
            ticks.charge_source != ChargeSource::Unknown,
            ticks.shuttle != Shuttle::Unknown,
            ticks.relief_drain != ReliefDrain::Unknown,
            ticks.loop_relief_to != LoopReliefTo::Unknown,
            ticks.case_lines != CaseLines::Unknown,
        ]
        .iter()
        .filter(|is_known| **is_known)
        .count()
}

/// Questions that can be answered "don't know".
const QUESTIONS: usize = 14;

fn options<T: Clone>(list: &[(T, &'static str, &'static str)]) -> Vec<Opt<T>> {
    list.iter()
        .map(|(value, words, code)| Opt::new(value.clone(), *words, *code))
        .collect()
}

fn path_options() -> Vec<Opt<Paths>> {
    let option = |paths: Paths| {
        let code = match paths {
            Paths::One => "one",
            Paths::TwoSharedCharge => "shared",
            Paths::TwoOwnCharge => "own",
        };
        Opt::new(paths, paths.words(), code)
    };
    Paths::ALL.map(option).to_vec()
}

/// What a new unit of a class starts with. Machines on tracks steer by two pumps, mostly on one charge pump (common practice).
pub fn usual_paths(class: MachineClass) -> Paths {
    match class {
        MachineClass::CompactTracked | MachineClass::Crawler => Paths::TwoSharedCharge,
        _ => Paths::One,
    }
}

fn control_options() -> Vec<Opt<Control>> {
    Control::ALL
        .iter()
        .enumerate()
        .map(|(at, control)| Opt::new(*control, control.words(), at.to_string()))
        .collect()
}

/// The questions.
#[component]
pub fn TicksForm(props: &PartProps) -> Html {
    let ticks = &props.unit.ticks;
    let yes_no = |name: &'static str,
                  label: &'static str,
                  hint: &'static str,
                  value: Tick,
                  set: fn(&mut Ticks, Tick)| {
        html! {
            <Choice<Tick>
                {name}
                {label}
                {hint}
                options={tick_options()}
                value={value}
                on_change={props.change(move |unit, tick| set(&mut unit.ticks, tick))}
            />
        }
    };
    let motors = options(&[(1u8, "1", "1"), (2, "2", "2"), (3, "3", "3"), (4, "4", "4")]);
    html! {
        <Section id="ticks" title="What it has" state={format!("{} of {QUESTIONS} answered", answered(ticks))}>
            <p class="soft small">{ "“Don’t know” is an answer too: both builds stay possible." }</p>
            <Choice<Paths>
                name="paths"
                label="Drive paths"
                hint="Two where left and right have a pump and a loop each, as most machines on tracks have (common practice). \
                      Readings then say their side, as seen from the seat."
                options={path_options()}
                value={ticks.paths}
                on_change={props.change(|unit, paths| unit.ticks.paths = paths)}
                lay={Lay::List}
            />
            { yes_no(
                "flushing",
                "Loop flushing",
                "A shuttle and a second, slightly lower relief, mostly on the motor: hot loop oil leaves through it to the cooler.",
                ticks.flushing,
                |ticks, tick| ticks.flushing = tick,
            ) }
            <Select<Control>
                id="control"
                label="Control of the swash plate"
                hint="How lever or pedal reach the pump."
                options={control_options()}
                value={ticks.control}
                on_change={props.change(|unit, control| unit.ticks.control = control)}
                testid="control"
            />
            { yes_no(
                "limiter",
                "Pressure limiter (cut-off)",
                "Takes the pump off stroke before the loop relief opens.",
                ticks.limiter,
                |ticks, tick| ticks.limiter = tick,
            ) }
            <Choice<Filter>
                name="filter"
                label="Charge filter and gauge port"
                hint="A gauge before a blocked filter reads good while the loop starves."
                options={options(&[
                    (Filter::Suction, "In the suction line", "suction"),
                    (Filter::PressureGaugeBefore, "Pressure filter, gauge port before it", "before"),
                    (Filter::PressureGaugeAfter, "Pressure filter, gauge port after it", "after"),
                    (Filter::Unknown, "Don’t know", "unknown"),
                ])}
                value={ticks.filter}
                on_change={props.change(|unit, filter| unit.ticks.filter = filter)}
                lay={Lay::List}
            />
            <Choice<ChargeSource>
                name="charge-source"
                label="Charge oil comes from"
                options={options(&[
                    (ChargeSource::OwnPump, "Its own charge pump", "own"),
                    (ChargeSource::Steering, "Return of the steering", "steering"),
                    (ChargeSource::Implement, "Return of the implements", "implement"),
                    (ChargeSource::Unknown, "Don’t know", "unknown"),
                ])}
                value={ticks.charge_source}
                on_change={props.change(|unit, source| unit.ticks.charge_source = source)}
                lay={Lay::List}
            />
            { yes_no(
                "brake",
                "Brake released by charge pressure",
                "Low charge then drags the brake.",
                ticks.brake_from_charge,
                |ticks, tick| ticks.brake_from_charge = tick,
            ) }
            { yes_no(
                "shift",
                "Shift or other consumers fed from charge",
                "A leak in one of them empties the gallery.",
                ticks.shift_from_charge,
                |ticks, tick| ticks.shift_from_charge = tick,
            ) }
            { yes_no(
                "two-speed",
                "Two-speed or variable motor",
                "",
                ticks.two_speed,
                |ticks, tick| ticks.two_speed = tick,
            ) }
            <Choice<u8>
                name="motors"
                label="Motors on the pump"
                hint="In parallel on one loop."
                options={motors}
                value={ticks.motors}
                on_change={props.change(|unit, motors| unit.ticks.motors = motors)}
            />
            { yes_no(
                "bypass",
                "Bypass (tow) valve",
                "Joins both sides of the loop for towing.",
                ticks.bypass,
                |ticks, tick| ticks.bypass = tick,
            ) }
            <details class="fold" data-testid="more-ticks">
                <summary>{ "Drains, dumps, shuttle and drive" }</summary>
                <div class="stack"><MoreTicks ..props.clone() /></div>
            </details>
        </Section>
    }
}

/// The questions that matter less.
#[component]
fn MoreTicks(props: &PartProps) -> Html {
    let ticks = &props.unit.ticks;
    let on_drive: Callback<Tick> = props.change(|unit, tick| unit.ticks.slipping_drive = tick);
    html! {
        <>
            <Choice<ReliefDrain>
                name="relief-drain"
                label="Charge relief drains"
                hint="Into the case: the gauge shows the setting plus case pressure."
                options={options(&[
                    (ReliefDrain::PumpCase, "Into the pump case", "case"),
                    (ReliefDrain::Tank, "To tank or the charge inlet", "tank"),
                    (ReliefDrain::Unknown, "Don’t know", "unknown"),
                ])}
                value={ticks.relief_drain}
                on_change={props.change(|unit, drain| unit.ticks.relief_drain = drain)}
                lay={Lay::List}
            />
            <Choice<LoopReliefTo>
                name="loop-relief-to"
                label="Loop reliefs dump"
                options={options(&[
                    (LoopReliefTo::Gallery, "Into the charge gallery", "gallery"),
                    (LoopReliefTo::Across, "Across, into the other side", "across"),
                    (LoopReliefTo::Case, "Into the case", "case"),
                    (LoopReliefTo::Unknown, "Don’t know: the gallery is taken", "unknown"),
                ])}
                value={ticks.loop_relief_to}
                on_change={props.change(|unit, to| unit.ticks.loop_relief_to = to)}
                lay={Lay::List}
            />
            <Choice<CaseLines>
                name="case-lines"
                label="Motor case drains"
                options={options(&[
                    (CaseLines::ThroughPump, "Through the pump case to the cooler", "through"),
                    (CaseLines::Separate, "Straight to the cooler", "separate"),
                    (CaseLines::Unknown, "Don’t know: through the pump is taken", "unknown"),
                ])}
                value={ticks.case_lines}
                on_change={props.change(|unit, lines| unit.ticks.case_lines = lines)}
                lay={Lay::List}
            />
            if ticks.flushing != Tick::No {
                <Choice<Shuttle>
                    name="shuttle"
                    label="Flushing shuttle"
                    options={options(&[
                        (Shuttle::ClosedCentre, "Three positions, closed in the middle", "closed"),
                        (Shuttle::TwoPosition, "Two positions: flushes in neutral too", "two"),
                        (Shuttle::Unknown, "Don’t know: closed in the middle is taken", "unknown"),
                    ])}
                    value={ticks.shuttle}
                    on_change={props.change(|unit, shuttle| unit.ticks.shuttle = shuttle)}
                    lay={Lay::List}
                />
            }
            <Choice<Tick>
                name="slipping-drive"
                label="Pump driven by a belt or clutch"
                hint="Or anything else that can slip."
                options={tick_options()}
                value={ticks.slipping_drive}
                on_change={on_drive}
            />
        </>
    }
}
