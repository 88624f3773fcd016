//! Cautions in the words of the core, at the step where the hand goes. Each stands once, at the first reading that needs it:
//! what is repeated at every field is read at none.

use crate::app::parts::{self, Grade};
use crate::caution::{self, Caution, Stands, Weight};
use crate::readings::{Condition, Port, Reading};
use yew::{Html, html};

/// How a caution is shown.
pub fn grade(weight: Weight) -> Grade {
    match weight {
        Weight::Note => Grade::Note,
        Weight::Caution => Grade::Caution,
        Weight::Stop => Grade::Danger,
    }
}

/// One caution.
fn one(caution: &'static Caution) -> Html {
    html! {
        <parts::Caution key={caution.id} grade={grade(caution.weight)} class="small-caution" testid={format!("caution-{}", caution.id)}>
            <p><parts::Retold text={caution.text} /></p>
        </parts::Caution>
    }
}

/// The cautions of one place.
pub fn at(stands: Stands) -> Html {
    html! { <>{ for caution::at(stands).map(one) }</> }
}

/// The cautions of several places.
pub fn all(places: &[Stands]) -> Html {
    html! { <>{ for places.iter().flat_map(|stands| caution::at(*stands)).map(one) }</> }
}

/// Where cautions belong for these readings, each place once. A held machine's stand with its precautions.
pub fn places<'a>(condition: &Condition, ports: impl Iterator<Item = &'a Port>) -> Vec<Stands> {
    let mut places: Vec<Stands> = Vec::new();
    for stands in ports.flat_map(|port| caution::places(condition, *port)) {
        if stands != Stands::Held && !places.contains(&stands) {
            places.push(stands);
        }
    }
    places
}

/// The caution that a reading itself brings: charge at nothing means no braking from the drive.
pub fn of_reading(reading: &Reading) -> Html {
    match &reading.seen {
        Some(seen) if caution::charge_is_dead(reading.port, seen) => at(Stands::NoBraking),
        _ => Html::default(),
    }
}
