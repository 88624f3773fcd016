//! What the shop's own closed cases taught: shown, case by case, and taken back.

use yew::{Callback, Html, MouseEvent, component, html};

use crate::app::deed::Deed;
use crate::app::parts::{Choice, Icon, Opt, Section, Shape};
use crate::app::platform::clock;
use crate::app::platform::files;
use crate::app::route::Route;
use crate::app::screens::settings::SettingsProps;
use crate::app::state::{About, Action};
use crate::faults;
use crate::record::Settings;
use crate::unit::MachineClass;
use crate::yard::learn::{self, Case, STRENGTH};
use crate::yard::number;

/// The screen.
#[component]
pub fn LearnedScreen(props: &SettingsProps) -> Html {
    let state = &props.state;
    let learning = &state.settings.learning;
    let cases = &state.cases;
    let counted = cases.iter().filter(|case| !case.is_left_out).count();
    let on_switch =
        props.change(|settings: &mut Settings, on: bool| settings.learning.is_off = !on);
    let on_all = |leave: bool| {
        let ids: Vec<String> = cases.iter().map(|case| case.visit.clone()).collect();
        props.change(move |settings: &mut Settings, _: MouseEvent| {
            if leave {
                settings.learning.left_out.extend(ids.clone());
            } else {
                settings.learning.left_out.clear();
            }
        })
    };
    let on_table = {
        let (deed, table) = (props.deed.clone(), learn::table(cases, learning));
        Callback::from(move |_: MouseEvent| {
            let name = format!("lowside-base-rates-{}.csv", clock::file_day());
            let said = match files::hand_over(&name, "text/csv", &table) {
                Ok(()) => Action::Say(format!("Handed over: {name}")),
                Err(why) => Action::Tell(
                    About::Trouble,
                    format!("The table could not be handed over: {why}"),
                ),
            };
            deed.emit(Deed::Put(said));
        })
    };
    html! {
        <main class="page yard" id="main" data-testid="learned-screen">
            <div class="page-head">
                <h1 id="title" tabindex="-1">{ "Learned from your own cases" }</h1>
                <a class="button is-quiet" href={Route::Settings.href()} data-testid="back-to-settings">
                    <Icon shape={Shape::Back} />{ "To the settings" }
                </a>
            </div>
            <p>
                { format!("How often a cause is met, before anything is read, starts from the catalogue (common practice), which counts as \
                           {STRENGTH:.0} calls. Each closed call with a proved cause adds one; one without proof, in which something was \
                           changed and the trouble was gone, counts half; one after which it was still there counts nothing. A machine’s own class counts most. Every ranking that uses it says so.") }
            </p>
            <section class="panel stack" aria-label="Learning on or off">
                <Choice<bool>
                    name="learning"
                    label="Learn from closed calls"
                    options={vec![Opt::new(true, "Yes", "on"), Opt::new(false, "No, the catalogue alone", "off")]}
                    value={Some(!learning.is_off)}
                    on_change={on_switch}
                />
                <div class="actions">
                    <button type="button" class="button" onclick={on_table} data-testid="rates-table">{ "The rates as a table (CSV)" }</button>
                    <button type="button" class="button is-quiet" disabled={counted == 0} onclick={on_all(true)} data-testid="leave-all">
                        { "Leave all cases out" }
                    </button>
                    <button type="button" class="button is-quiet" disabled={learning.left_out.is_empty()} onclick={on_all(false)} data-testid="take-all">
                        { "Take all back in" }
                    </button>
                </div>
                <p class="soft small">{ "Cases and choices go out with the record in every export." }</p>
            </section>
            { rates(props) }
            <Section id="cases" title="Cases" state={format!("{counted} of {} count", cases.len())} is_open=true>
                if cases.is_empty() {
                    <p data-testid="no-cases">{ "No closed call with a cause yet. The demo yard teaches nothing." }</p>
                }
                <ul class="rows">
                    { for cases.iter().map(|case| row(case, props)) }
                </ul>
            </Section>
        </main>
    }
}

fn row(case: &Case, props: &SettingsProps) -> Html {
    let causes: Vec<&str> = case
        .causes
        .iter()
        .filter_map(|id| faults::find(*id))
        .map(|fault| fault.title)
        .collect();
    let (id, out) = (case.visit.clone(), case.is_left_out);
    let on_switch = props.change(move |settings: &mut Settings, _: MouseEvent| {
        if !settings.learning.left_out.remove(&id) {
            settings.learning.left_out.insert(id.clone());
        }
    });
    let weight = match (out, case.is_proved) {
        (true, _) => "left out",
        (false, true) => "proved: counts 1",
        (false, false) => "not proved: counts ½",
    };
    html! {
        <li key={case.visit.clone()} class="line-item" data-testid={format!("case-{}", case.visit)}>
            <a class="call-link" href={Route::Call(case.visit.clone()).href()}>
                <span class="call-when">{ format!("{}, {}, {}", case.unit, case.class.words(), clock::tell(&case.opened)) }</span>
                <span>{ format!("{}: {weight}", causes.join(" and ")) }</span>
            </a>
            <button type="button" class="button is-quiet" onclick={on_switch} aria-pressed={out.to_string()}
                data-testid={format!("leave-{}", case.visit)}>
                { if out { "Take it in" } else { "Leave it out" } }
            </button>
        </li>
    }
}

/// Causes whose rate has moved, per hundred calls: catalogue, all classes, each class with cases.
fn rates(props: &SettingsProps) -> Html {
    let state = &props.state;
    let learning = &state.settings.learning;
    let overall = learn::rates(&state.cases, None, learning);
    if overall.is_empty() {
        return html! {
            <p class="panel" data-testid="nothing-learned">{ "Nothing is learned: the catalogue’s rates stand everywhere." }</p>
        };
    }
    let classes: Vec<MachineClass> = MachineClass::ALL
        .into_iter()
        .filter(|class| {
            state
                .cases
                .iter()
                .any(|case| case.class == *class && !case.is_left_out)
        })
        .collect();
    let by_class: Vec<_> = classes
        .iter()
        .map(|class| learn::rates(&state.cases, Some(*class), learning))
        .collect();
    let mut moved: Vec<_> = faults::all()
        .iter()
        .map(|fault| (fault, learn::counted(&state.cases, fault.id)))
        .filter(|(_, count)| *count > 0.0)
        .collect();
    moved.sort_by(|a, b| b.1.total_cmp(&a.1));
    let print = |rate: f64| number(rate, &state.settings.units);
    html! {
        <Section id="rates" title="Base rates, per 100 calls" state={format!("{} causes raised", moved.len())} is_open=true>
            <p class="soft small">{ "All other causes come down a little, so that the sum stays." }</p>
            <div class="yard-scroll" role="region" aria-label="Base rates" tabindex="0">
                <table data-testid="rates">
                    <thead><tr>
                        <th scope="col">{ "Cause" }</th>
                        <th scope="col">{ "Cases" }</th>
                        <th scope="col">{ "Catalogue" }</th>
                        <th scope="col">{ "All classes" }</th>
                        { for classes.iter().map(|class| html! { <th scope="col">{ class.words() }</th> }) }
                    </tr></thead>
                    <tbody>
                        { for moved.iter().map(|(fault, count)| html! {
                            <tr key={fault.id.code()}>
                                <th scope="row">{ fault.title }</th>
                                <td>{ print(*count) }</td>
                                <td>{ print(fault.per_hundred) }</td>
                                <td>{ print(overall.per_hundred.get(&fault.id).copied().unwrap_or_default()) }</td>
                                { for by_class.iter().map(|rates| html! {
                                    <td>{ print(rates.per_hundred.get(&fault.id).copied().unwrap_or_default()) }</td>
                                }) }
                            </tr>
                        }) }
                    </tbody>
                </table>
            </div>
        </Section>
    }
}
