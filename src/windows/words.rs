//! What a window was computed for, in words.

use crate::machine::Warmth;
use crate::readings::{Condition, Direction, EngineSpeed, Lever};
use crate::unit::Unit;

/// Speed, oil and lever that a window holds for.
pub fn basis(unit: &Unit, condition: &Condition, rpm: f64) -> String {
    let warmth = Warmth::of(unit, condition);
    let speed = match condition.engine {
        EngineSpeed::LowIdle => format!("low idle, about {rpm:.0} rpm"),
        EngineSpeed::HighIdle => format!("high idle, about {rpm:.0} rpm"),
        EngineSpeed::Measured(_) => format!("{rpm:.0} rpm"),
    };
    let oil = if warmth.taken {
        format!(
            "leaking oil at about {:.0} °C ({:.0} mm²/s)",
            warmth.celsius, warmth.kinematic
        )
    } else {
        format!(
            "oil not measured, taken as {:.0} ± {:.0} °C",
            warmth.celsius, warmth.spread
        )
    };
    let mut out = format!("{speed}; {oil}");
    if !condition.doing.is_neutral() {
        let way = match condition.direction {
            Direction::Forward => "forward",
            Direction::Reverse => "reverse",
        };
        let lever = match condition.lever {
            Lever::Full => "full lever".to_string(),
            Lever::Half => "about half lever".to_string(),
            Lever::Feathered => "feathered".to_string(),
            Lever::Share(s) => format!("{:.0} % lever", 100.0 * s),
        };
        out.push_str(&format!("; {lever} {way}"));
    }
    out
}
