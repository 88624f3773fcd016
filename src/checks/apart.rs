//! Taking something apart: cheap part first, and swapping only when debris has been ruled out.

use super::{BASE, Check};

const BLED: &str = "Engine off, everything lowered, loop bled: one turn behind a rag, waited";
const NOT_ALONE: &str = "Not alone on site: a second person, named";

pub const TABLE: &[Check] = &[
    Check {
        id: "debris",
        title: "Look for debris",
        how: &[
            "Cut the filter open, look in the pleats, drain magnet, case drain screen. White cloth and magnet.",
            "Bronze: slippers, plates. Steel: bearings. Rubber: hose or seal. Before new oil goes in.",
        ],
        instruments: "knife, white cloth, magnet",
        answers: &["metal", "filter-sign"],
        minutes_first: 15.0,
        minutes_again: 15.0,
        hazard: 1,
        precautions: &["Engine off and cooled enough to handle; cutting away from the hand"],
        separates: "Wear that has begun to shed; whether parts may be swapped at all.",
        put_back: &["Filter fitted, level checked"],
        ..BASE
    },
    Check {
        id: "oil-run-down",
        title: "Run the oil down beside new oil",
        how: &[
            "Sample and new oil of the right grade, same temperature, two like bottles: which runs down faster?",
            "A drop on a hot plate, goggles on: it crackles if there is water.",
        ],
        instruments: "two bottles, stopwatch, hot plate",
        answers: &["milky", "oil-runs-thin", "oil-runs-thick"],
        minutes_first: 8.0,
        minutes_again: 8.0,
        separates: "Thin or wrong oil; water.",
        ..BASE
    },
    Check {
        id: "pull-the-shuttle",
        title: "Pull shuttle, operating relief and orifice",
        how: &[
            "Same plugs, one visit: does the spool slide by its own weight? Springs whole? Orifice clear? Is any fitted at all?",
        ],
        instruments: "spanner, magnet, rag, new seals",
        answers: &[
            "shuttle-centred",
            "shuttle-to-one-side",
            "flushing-relief-bad",
            "flushing-orifice-blocked",
        ],
        minutes_first: 25.0,
        minutes_again: 25.0,
        hazard: 2,
        precautions: &[BLED, "Face out of the line of the plug: the spring flies"],
        separates: "Shuttle, relief, orifice, or no flushing on this unit.",
        put_back: &["Shuttle and relief plugs torqued, level checked"],
        ..BASE
    },
    Check {
        id: "swap-cartridges",
        title: "Swap the loop cartridges side to side",
        how: &[
            "Mark which is which, see that both carry the same setting. Change them over, seals new, torque as the manual says.",
            "The weak direction changes over: the cartridge. It stays: look elsewhere.",
        ],
        instruments: "spanner, torque wrench, seals",
        answers: &["cartridges-change-direction"],
        minutes_first: 25.0,
        minutes_again: 15.0,
        hazard: 2,
        precautions: &[
            BLED,
            "Both settings read and alike, both marked",
            "Clean: caps on, no rag in the bore",
        ],
        separates: "A one-sided fault that moves with the part.",
        put_back: &["Cartridges on the sides noted, torqued"],
        ..BASE
    },
    Check {
        id: "swap-sides",
        title: "Swap left and right hoses",
        how: &[
            "Signals first, then gauges, hoses last and only after a clean debris check: or the good side is ruined.",
            "Steering is reversed afterwards: no travel, wheels or tracks clear only.",
        ],
        instruments: "spanners, caps",
        answers: &["hoses-change-sides"],
        minutes_first: 30.0,
        minutes_again: 30.0,
        hazard: 3,
        precautions: &[
            "Debris looked for and none found",
            BLED,
            "Every driven wheel or track clear of the ground; no travel with sides swapped",
            NOT_ALONE,
        ],
        separates: "Which side; control from hydraulics.",
        put_back: &["Hoses back on their own side, steering proved"],
        two_path: true,
        after: "debris",
        ..BASE
    },
    Check {
        id: "roll-by-hand",
        title: "Roll it by hand with the tow valve open",
        how: &[
            "Level ground, tow valve opened as the manual says, brake released as the manual says.",
            "Bar and spring scale at the wheel: what turns hard is brake, hub or gearbox, not the hydraulics.",
        ],
        instruments: "bar, spring scale",
        answers: &["turns-hard-by-hand"],
        minutes_first: 10.0,
        minutes_again: 10.0,
        hazard: 3,
        precautions: &[
            "No brake and no drive left: chocks both ways, a hand's breadth off the wheel, before the valve is touched",
            "Ground level, tow bar or second machine coupled",
            NOT_ALONE,
        ],
        separates: "Drag of brake or gearbox from the hydraulics.",
        put_back: &["Tow valve shut and torqued, brake proved"],
        ..BASE
    },
];
