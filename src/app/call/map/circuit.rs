//! The drawing of the loop itself: lines and symbols, from what the unit is said to have.

use super::plan;
use super::symbols::{self, at};
use crate::readings::Port;
use crate::unit::{CaseLines, ChargeSource, Filter, Fitted, ReliefDrain, Shuttle, Tick, Ticks};
use yew::{Html, html};

/// Everything but the ports. Hidden from screen readers: the ports say what matters.
pub fn draw(ticks: &Ticks) -> Html {
    html! {
        <g aria-hidden="true">
            { drains(ticks) }
            { loop_lines() }
            { charge(ticks) }
            { flushing(ticks) }
            { at(187.0, 588.0, symbols::tank()) }
            { pump(ticks) }
            { motor(ticks) }
        </g>
    }
}

/// A query beside what is not known.
fn query(fitted: Fitted, x: f64, y: f64) -> Html {
    if fitted == Fitted::Maybe {
        html! { <text x={x.to_string()} y={y.to_string()} class="query">{ "?" }</text> }
    } else {
        Html::default()
    }
}

fn part(fitted: Fitted, inside: Html) -> Html {
    match fitted {
        Fitted::No => Html::default(),
        fitted => html! { <g class={plan::class(fitted)}>{ inside }</g> },
    }
}

fn loop_lines() -> Html {
    html! { <>
        <path d="M118 160V96H282V160" class="line is-loop" />
        <path d="M118 232V296H282V232" class="line is-loop" />
        // Gallery, one check and one relief a side.
        <path d="M170 96V122M170 154V238M170 270V296M204 96V126M204 148V244M204 266V296M170 196H204" class="line" />
        { at(170.0, 138.0, symbols::check()) }
        <g transform="translate(170 254) scale(1 -1)">{ symbols::check() }</g>
        { at(204.0, 137.0, symbols::relief()) }
        <g transform="translate(204 255) scale(1 -1)">{ symbols::relief() }</g>
        <circle cx="170" cy="96" r="3" class="solid" /><circle cx="204" cy="96" r="3" class="solid" />
        <circle cx="170" cy="296" r="3" class="solid" /><circle cx="204" cy="296" r="3" class="solid" />
        <circle cx="187" cy="196" r="3" class="solid" />
        <text x="212" y="84" class="note">{ "high going forward" }</text>
    </> }
}

fn pump(ticks: &Ticks) -> Html {
    let servo = ticks.port(Port::Servo);
    html! { <>
        <path d="M48 193H82M48 199H82" class="line" />
        { at(30.0, 196.0, symbols::engine()) }
        { at(118.0, 196.0, symbols::pump()) }
        { part(servo, html! { <>
            if plan::has_command(ticks) {
                <path d="M60 34H92V84" class="pilot" />
            }
            <path d="M92 106V119M60 106H66V128H70" class="pilot" />
            <path d="M78 84H106V106H78ZM78 106L106 84" class="body" />
            { at(92.0, 128.0, symbols::servo()) }
            <path d="M92 137V166" class="line" />
        </> }) }
    </> }
}

fn motor(ticks: &Ticks) -> Html {
    let variable = Fitted::from(ticks.two_speed);
    html! { <>
        <path d="M318 193H336M318 199H336" class="line" />
        { at(356.0, 196.0, symbols::wheel()) }
        { at(282.0, 196.0, symbols::motor()) }
        { part(variable, html! { <>
            { at(282.0, 196.0, symbols::variable()) }
            <path d="M313 163L313 108H341" class="pilot" />
        </> }) }
        if ticks.motors > 1 {
            <text x="262" y="258" class="note">{ format!("× {}", ticks.motors) }</text>
        }
        if ticks.brake_from_charge != Tick::No {
            <path d="M320 188H330M320 204H330M325 188V176M325 204V216" class="line is-heavy" />
            <path d="M325 176V30H341" class="pilot" />
        }
    </> }
}

fn charge(ticks: &Ticks) -> Html {
    let filter = |y, fitted| part(fitted, at(187.0, y, symbols::filter()));
    let to_tank = ticks.relief_drain == ReliefDrain::Tank;
    let drain_known = if ticks.relief_drain == ReliefDrain::Unknown {
        Fitted::Maybe
    } else {
        Fitted::Yes
    };
    html! { <>
        <path d="M187 196V470M187 510V590" class="line" />
        { match ticks.filter {
            Filter::Suction => filter(556.0, Fitted::Yes),
            Filter::PressureGaugeBefore => filter(326.0, Fitted::Yes),
            Filter::PressureGaugeAfter => filter(398.0, Fitted::Yes),
            Filter::Unknown => html! { <>{ filter(398.0, Fitted::Maybe) }{ query(Fitted::Maybe, 206.0, 404.0) }</> },
        } }
        { match ticks.charge_source {
            ChargeSource::OwnPump => at(187.0, 490.0, symbols::charge_pump()),
            ChargeSource::Unknown => html! { <>
                <g class="is-maybe">{ at(187.0, 490.0, symbols::charge_pump()) }</g>
                { query(Fitted::Maybe, 214.0, 496.0) }
            </> },
            ChargeSource::Steering => html! { <text x="212" y="496" class="note">{ "from steering return" }</text> },
            ChargeSource::Implement => html! { <text x="212" y="496" class="note">{ "from implement return" }</text> },
        } }
        if matches!(ticks.charge_source, ChargeSource::Steering | ChargeSource::Implement) {
            <path d="M187 470V510M180 486L187 474 194 486" class="line" />
        } else {
            <path d="M187 528H222" class="line is-thin" />
            <circle cx="187" cy="528" r="3" class="solid" />
        }
        // Charge relief and where it drains.
        <path d="M187 448H144V459" class="line" />
        <circle cx="187" cy="448" r="3" class="solid" />
        { at(140.0, 470.0, symbols::relief()) }
        if to_tank {
            <path d="M144 481V590" class="line" />
        } else {
            <g class={plan::class(drain_known)}>
                <path d="M144 481V506H46" class="line" />
                <circle cx="46" cy="506" r="3" class="solid" />
            </g>
        }
        { query(drain_known, 106.0, 500.0) }
    </> }
}

fn flushing(ticks: &Ticks) -> Html {
    let fitted = Fitted::from(ticks.flushing);
    part(
        fitted,
        html! { <>
            <path d="M230 96V322M262 296V322M246 348V372M246 394V400H356" class="line" />
            <circle cx="230" cy="96" r="3" class="solid" /><circle cx="262" cy="296" r="3" class="solid" />
            <circle cx="356" cy="400" r="3" class="solid" />
            { at(246.0, 335.0, symbols::shuttle(ticks.shuttle != Shuttle::TwoPosition)) }
            { at(242.0, 383.0, symbols::relief()) }
            { query(fitted, 292.0, 341.0) }
        </> },
    )
}

/// Case drains to the cooler and the tank: short dashes, as the standard has them.
fn drains(ticks: &Ticks) -> Html {
    let known = if ticks.case_lines == CaseLines::Unknown {
        Fitted::Maybe
    } else {
        Fitted::Yes
    };
    html! { <>
        <path d="M87 214H46V548H78M110 548H132V590" class="drain" />
        { at(94.0, 548.0, symbols::cooler()) }
        <path d="M308 221V246H356V424H92" class="drain" />
        if ticks.case_lines == CaseLines::Separate {
            <path d="M92 424V506H46" class="drain" />
        } else {
            <path d="M92 424V221" class="drain" />
        }
        { query(known, 74.0, 416.0) }
    </> }
}
