//! The page itself.

use crate::app::call::mark;
use crate::app::parts::{Icon, Shape};
use crate::call::words;
use crate::report::{Group, Report, Row, Section, Sure};
use yew::{Html, html};

/// The report as a page.
pub fn sheet(report: &Report) -> Html {
    html! {
        <article class="report" data-testid="report" aria-label={report.title.clone()}>
            <header class="report-head">
                <h2>{ &report.title }</h2>
                { finding(report) }
            </header>
            <dl class="report-facts">
                { for report.facts.iter().map(|fact| html! {
                    <div key={fact.name}><dt>{ fact.name }</dt><dd>{ &fact.words }</dd></div>
                }) }
            </dl>
            { readings(&report.groups) }
            <div class="report-rest">
                { causes(report) }
                { for report.sections.iter().map(section) }
            </div>
            <section class="report-cautions" data-testid="report-cautions">
                <h3><Icon shape={Shape::Warning} />{ "Cautions" }</h3>
                <ul>{ for report.cautions.iter().map(|words| html! { <li key={words.clone()}>{ words }</li> }) }</ul>
            </section>
            <footer class="report-basis">
                <h3>{ "What this rests on" }</h3>
                <ul>{ for report.basis.iter().map(|words| html! { <li key={words.clone()}>{ words }</li> }) }</ul>
            </footer>
        </article>
    }
}

fn finding(report: &Report) -> Html {
    let (shape, class) = match report.finding.sure {
        Sure::Proved => (Shape::Done, "is-proved"),
        Sure::NotProved | Sure::Leads => (Shape::Note, "is-open"),
        Sure::NoCause | Sure::Uncertain | Sure::TooLittle => (Shape::Warning, "is-unsure"),
    };
    html! {
        <p class={format!("report-finding {class}")} data-testid="report-finding">
            <Icon {shape} /><span>{ &report.finding.words }</span>
        </p>
    }
}

fn readings(groups: &[Group]) -> Html {
    if groups.is_empty() {
        return Html::default();
    }
    html! {
        <table class="report-readings" data-testid="report-readings">
            <caption>{ "Readings" }</caption>
            <thead>
                <tr>
                    <th scope="col">{ "No." }</th>
                    <th scope="col">{ "What" }</th>
                    <th scope="col">{ "Read" }</th>
                    <th scope="col">{ "Stands" }</th>
                    <th scope="col">{ "Expected" }</th>
                    <th scope="col">{ "Instrument" }</th>
                </tr>
            </thead>
            { for groups.iter().enumerate().map(|(at, group)| html! {
                <tbody key={at}>
                    <tr class="report-condition">
                        <th scope="rowgroup" colspan="6">{ format!("{}; {}", group.condition, group.oil) }</th>
                    </tr>
                    { for group.rows.iter().map(reading) }
                </tbody>
            }) }
        </table>
    }
}

fn reading(row: &Row) -> Html {
    let expected = match (&row.expected, row.source) {
        (Some(expected), Some(source)) => html! { <>
            <span class="figure">{ expected }</span>
            { ", " }<span class="report-source">{ words::source(source) }</span>
        </> },
        _ => html! { "no window" },
    };
    let before =
        (!row.before.is_empty()).then(|| format!("read before: {}", row.before.join(", ")));
    let remarks: Vec<String> = before.into_iter().chain(row.remarks.clone()).collect();
    html! {
        <tr key={row.number} class="report-reading">
            <td class="report-number">{ row.number }</td>
            <th scope="row">
                { &row.what }
                if !remarks.is_empty() { <span class="report-remark">{ remarks.join(". ") }</span> }
            </th>
            <td class="figure report-read">{ &row.read }</td>
            <td class="report-stands">{ mark::badge(row.standing) }</td>
            <td>{ expected }</td>
            <td>{ &row.instrument }</td>
        </tr>
    }
}

fn causes(report: &Report) -> Html {
    if report.causes.is_empty() {
        return Html::default();
    }
    html! {
        <section data-testid="report-causes">
            <h3>{ "Causes by chance" }</h3>
            <ol>
                { for report.causes.iter().map(|cause| html! {
                    <li key={cause.title.clone()}>
                        <strong>{ &cause.title }</strong>{ ": " }<span class="figure">{ &cause.chance }</span>
                        if !cause.reasons_for.is_empty() {
                            <span class="report-why">{ format!("For: {}", cause.reasons_for.join("; ")) }</span>
                        }
                        if !cause.reasons_against.is_empty() {
                            <span class="report-why">{ format!("Against: {}", cause.reasons_against.join("; ")) }</span>
                        }
                    </li>
                }) }
            </ol>
        </section>
    }
}

fn section(section: &Section) -> Html {
    html! {
        <section key={section.id} data-testid={format!("report-{}", section.id)}>
            <h3>{ section.heading }</h3>
            <ul>{ for section.lines.iter().map(|line| html! { <li key={line.clone()}>{ line }</li> }) }</ul>
        </section>
    }
}
