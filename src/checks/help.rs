//! Where a check is made and what to watch for. How it is done stands with the check itself. *Common practice*: the unit's own manual
//! comes first.

/// Help for a check, each part a sentence or two.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct CheckHelp {
    /// Where on the machine, as a rule.
    pub place: &'static str,
    /// What to watch for.
    pub watch: &'static str,
}

/// Help for a check; none for an id that this version does not know.
#[must_use]
pub fn help(id: &str) -> Option<CheckHelp> {
    let (_, place, watch) = TABLE.iter().find(|(check, ..)| *check == id)?;
    Some(CheckHelp { place, watch })
}

/// Check id, place, what to watch for.
const TABLE: &[(&str, &str, &str)] = &[
    (
        "ask-the-operator",
        "Beside the machine, engine off.",
        "What he says is half of what you see yourself. “Since the repair” is worth more than any gauge.",
    ),
    (
        "walk-round",
        "Tank and its sight glass, filter head, cooler, suction hose, hubs, the tow valve on the pump.",
        "Hot oil under a tank cap, and a pinhole that nobody sees: a card along the hoses, never a hand.",
    ),
    (
        "prove-the-gauges",
        "On the bench of the van, then on any one port.",
        "A needle that rests beside its zero is wrong by that much all along the dial.",
    ),
    (
        "temperatures-by-place",
        "Tank, drain hose of the motor, both housings, cooler in and out, the cartridges, the hubs.",
        "Fan and belts beside the probe. Shiny metal cheats an infrared gun: black tape.",
    ),
    (
        "true-rpm",
        "Crank pulley and the pump's own shaft.",
        "Two shafts that part under load: belt, clutch or coupling, and no hydraulic fault.",
    ),
    (
        "interlock-and-codes",
        "Display in the cab; switches under the seat, at door, brake and lever.",
        "A code kept from last week. Clear it, and see whether it comes back.",
    ),
    (
        "coil-current",
        "The plugs on the pump's control.",
        "Water or green in the plug. A coil that is weak only when hot passes every cold test.",
    ),
    (
        "swap-plugs",
        "The two plugs on the pump's control.",
        "The machine answers the other way: everybody round it must know.",
    ),
    (
        "swap-side-signals",
        "Plugs or pilot lines of the left and of the right pump.",
        "Left asks right until they are back. Mark them before they come off.",
    ),
    (
        "stroke-arm-by-hand",
        "The arm on the pump's control, with rod or cable taken off.",
        "The arm can jump when the servo takes over: spanner and fingers out of its swing.",
    ),
    (
        "charge-two-speeds",
        "The charge port: mostly the charge pump's cover, or the head of the charge filter.",
        "Low idle tells more than high idle: a worn charge pump shows there first.",
    ),
    (
        "charge-knee",
        "Charge gauge and tachometer side by side.",
        "A throttle raised in one go hides the knee.",
    ),
    (
        "charge-both-ways",
        "The charge port, gauge read from the seat or filmed.",
        "More than half stroke or a hard pull mixes leakage in: light and half is enough.",
    ),
    (
        "charge-one-side-alone",
        "The charge port that both sides share.",
        "One side alone turns the machine on the spot.",
    ),
    (
        "cap-a-consumer",
        "Feed lines of brake, shift, pilot and fan, at their valve.",
        "A feed and a drain can lie side by side. A drain is never capped.",
    ),
    (
        "work-another-function",
        "The charge port, from the seat.",
        "Arms and articulation move: nobody within their reach.",
    ),
    (
        "inlet-pull",
        "The suction line at the charge pump.",
        "A tee that is not tight makes air, noise and a wrong answer.",
    ),
    (
        "wheel-turns",
        "Every driven wheel, drum or sprocket.",
        "Count both sides of an open differential; stones fly off turning tracks.",
    ),
    (
        "slip-light-to-loaded",
        "The same wheel, on the flat and on the grade.",
        "Another lever or throttle makes another reading. Wheel spin is not slip of the drive.",
    ),
    (
        "response-time",
        "The driven wheel, clear of the ground.",
        "The second and third try count: the first one moves cold oil.",
    ),
    (
        "free-run-difference",
        "Both big gauge ports of the pump.",
        "A brake that drags needs pressure to turn nothing: feel the hubs afterwards, from outside.",
    ),
    (
        "servo-two-gauges",
        "The two small ports at the ends of the servo.",
        "Prove them on the drawing by two signs: a loop port beside them bursts the gauge.",
    ),
    (
        "release-and-shift-pressure",
        "Brake and shift lines, at brake and motor.",
        "The brake lets go while you read: chocks first, both ways.",
    ),
    (
        "slope-hold",
        "A gentle slope with a run-out that may be reached.",
        "It may roll at once and not slowly. Somebody at the service brake.",
    ),
    (
        "hold-back",
        "A gentle slope, or lever released at walking pace.",
        "Charge that falls here lets the machine run away: stop, and chock.",
    ),
    (
        "pressure-build-up",
        "Both big gauge ports, the motor blocked by caps or by something that cannot move.",
        "The shape of the first steps tells. Stop at the pressure shown, lever back at the second shown.",
    ),
    (
        "plateau",
        "As for the staged build-up.",
        "Seconds only: all the engine's power goes into a few litres of oil.",
    ),
    (
        "isolate-the-pump",
        "The pump's two big ports, hoses off, full-pressure plugs in.",
        "The machine has no drive and no braking now.",
    ),
    (
        "bridge-the-servo",
        "The two small servo ports.",
        "Across the loop ports it fails with injection force: two signs on the drawing.",
    ),
    (
        "case-pressures",
        "Drain lines of pump and motor, close to the housings.",
        "Cold oil and a half-shut coupling read alike: warm it, push the couplings home.",
    ),
    (
        "return-flow-two-speeds",
        "The common return, before cooler or tank.",
        "The tank falls while the hose is off. Never throttle it to read it.",
    ),
    (
        "motor-drain-in-neutral",
        "The drain hose of the motor.",
        "Creep in neutral puts flushing oil into the jug: neutral first.",
    ),
    (
        "motor-drain-no-flushing",
        "The drain hose of the motor, flushing blocked at its own plug.",
        "Without flushing the loop heats: 2 minutes, then stop and put the plug back.",
    ),
    (
        "debris",
        "Filter, drain magnet, screen of the case drain.",
        "Look before the oil is changed: new oil takes the evidence with it.",
    ),
    (
        "oil-run-down",
        "On a bench, two bottles at one temperature.",
        "Ten degrees between the bottles says more than the oil does.",
    ),
    (
        "pull-the-shuttle",
        "Two or three plugs in the motor's end cover, or in the pump's.",
        "Springs fly; a nick in the spool makes a fault that was not there.",
    ),
    (
        "swap-cartridges",
        "The two cartridges in the pump's end cover.",
        "Different settings on the two sides are often meant: read the stamps first.",
    ),
    (
        "swap-sides",
        "The loop hoses of the left and of the right pump.",
        "Debris goes across with the oil. Only after a clean debris check.",
    ),
    (
        "roll-by-hand",
        "Driven wheel or drum, tow valve open, level ground.",
        "Nothing holds it now: chocks a hand's breadth off, both ways.",
    ),
];

#[cfg(test)]
mod tests {
    use super::*;
    use crate::checks::all;
    use std::collections::BTreeSet;

    #[test]
    fn every_check_has_its_place_and_what_to_watch_for() {
        for check in all() {
            let help = help(check.id).unwrap_or_else(|| panic!("{}: no help", check.id));
            for text in [help.place, help.watch] {
                assert!(
                    text.ends_with('.') && !text.contains("  ") && text.chars().count() <= 200,
                    "{}: {text}",
                    check.id
                );
            }
        }
        assert_eq!(
            TABLE.len(),
            all().count(),
            "one line a check, and none over"
        );
        let said: BTreeSet<&str> = TABLE.iter().map(|(_, _, watch)| *watch).collect();
        assert_eq!(said.len(), TABLE.len());
        assert_eq!(help("no-such-check"), None);
    }
}
