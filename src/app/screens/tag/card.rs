//! One tag as it comes out of the printer.

use crate::tag::tag;
use crate::unit::Unit;
use std::rc::Rc;
use yew::{Html, Properties, component, html, use_memo};

/// Properties of [`TagCard`].
#[derive(Clone, PartialEq, Properties)]
pub struct TagCardProps {
    /// The unit.
    pub unit: Rc<Unit>,
    /// Address of the app, up to `#`.
    pub address: String,
    /// Side of the code with its margin, mm.
    pub millimetres: u32,
}

/// The tag.
#[component]
pub fn TagCard(props: &TagCardProps) -> Html {
    let made = use_memo(
        (props.unit.clone(), props.address.clone()),
        |(unit, address)| tag(unit, address),
    );
    let (unit, side) = (&props.unit, format!("{}mm", props.millimetres));
    match &*made {
        Ok(made) => {
            let whole = made.symbol.whole();
            html! {
                <figure class="tag-card" data-testid="tag-card" data-link={made.link.clone()}>
                    <svg
                        class="tag-code"
                        width={side.clone()}
                        height={side}
                        viewBox={format!("0 0 {whole} {whole}")}
                        role="img"
                        aria-label={format!("QR code with the profile of {}", unit.name)}
                        shape-rendering="crispEdges"
                    >
                        <rect width={whole.to_string()} height={whole.to_string()} fill="#ffffff" />
                        <path d={made.symbol.path()} fill="#000000" />
                    </svg>
                    <figcaption>
                        <strong class="tag-name">{ &unit.name }</strong>
                        <span>{ unit.class.words() }</span>
                        <span class="small">{ format!("Lowside, {} mm", props.millimetres) }</span>
                        if !made.shortened.words().is_empty() {
                            <span class="small no-print" data-testid="tag-shortened">{ made.shortened.words() }</span>
                        }
                    </figcaption>
                </figure>
            }
        }
        Err(why) => html! {
            <p class="tag-card no-print" role="alert" data-testid="tag-unfit">{ format!("{}: {why}.", unit.name) }</p>
        },
    }
}
