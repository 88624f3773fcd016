//! Make safe, ask, look: half of all calls end here (common practice).

use super::{BASE, Check};
use super::{Idle, Yield};
use crate::readings::{Direction, Doing, Lever, Port};

pub const TABLE: &[Check] = &[
    Check {
        id: "ask-the-operator",
        title: "Ask the operator",
        how: &[
            "Engine off. Let nobody show you before the walk-round is done.",
            "Warm or cold? One way or both? Since when? What was done to it last? Does it hold on a slope?",
            "Does it keep going with the lever in neutral? Then stop work: nobody starts it.",
        ],
        instruments: "paper",
        answers: &[
            "runs-on",
            "weak-both-ways",
            "one-direction",
            "no-drive",
            "creeps",
            "surges",
            "slow-to-answer",
            "top-speed-low",
            "fast-in-low",
            "rolls-in-neutral",
            "hooks",
            "pulls-left",
            "pulls-right",
            "weak-hot",
            "bad-cold",
            "worse-tilted",
            "worse-with-other-function",
            "engine-pulls-down",
            "engine-not-loaded",
            "jerks-off-late",
        ],
        minutes_first: 3.0,
        minutes_again: 3.0,
        separates: "Hot or cold trouble, one direction, a fresh repair, and what must not be tried at all.",
        ..BASE
    },
    Check {
        id: "walk-round",
        title: "Walk round it",
        how: &[
            "Engine off, key out. Level, colour, foam, smell; filter sign; cooler fins and fan; suction hose and clamps.",
            "Drain couplings pushed home, tow valve shut, hubs and seals dry, rods and cables whole, plugs tight.",
            "Open the tank cap slowly: it may be under pressure. No bare hand along a hose; use a card.",
        ],
        instruments: "lamp, rag, gloves, card",
        answers: &[
            "level-low",
            "foam",
            "milky",
            "dark-or-burnt",
            "filter-sign",
            "seal-weeps",
            "suction-joint-bad",
            "cooler-clogged",
            "tow-valve-open",
            "drain-coupling-shut",
            "linkage-loose",
            "plug-or-earth-bad",
            "belt-slips",
        ],
        minutes_first: 5.0,
        minutes_again: 5.0,
        separates: "Low oil, air, water, a dirty cooler, an open tow valve, a drain coupling left shut.",
        ..BASE
    },
    Check {
        id: "prove-the-gauges",
        title: "Prove the gauges",
        how: &[
            "Engine off and pressure bled: every gauge reads zero.",
            "Later, two gauges on one port at the same time: note both. A gauge that lies is a fault of its own.",
        ],
        instruments: "the gauges themselves",
        minutes_first: 2.0,
        minutes_again: 1.0,
        separates: "A wrong gauge from a wrong machine.",
        ..BASE
    },
    Check {
        id: "temperatures-by-place",
        title: "Temperatures by place",
        how: &[
            "After ordinary work, standing: tank, motor drain hose, motor case, pump case, cooler in and out, each loop cartridge, hubs.",
            "Contact probe; an infrared gun only on black tape.",
            "Leakage is judged at the drain hose: the loop runs hotter than the tank (common practice: by 5 to 25 K).",
        ],
        instruments: "contact probe, or infrared gun and black tape",
        yields: &[Yield::neutral(Port::SettledTemperature, Idle::High)],
        answers: &[
            "cartridge-hot",
            "motor-case-hot",
            "hub-hot",
            "cooler-stays-cool",
        ],
        minutes_first: 4.0,
        minutes_again: 2.0,
        hazard: 2,
        precautions: &[
            "Sleeves and leads clear of fan, belts and shafts",
            "Gloves on: surfaces burn",
        ],
        separates: "Where power is lost: cooler, leaking cartridge, motor, brake.",
        ..BASE
    },
    Check {
        id: "true-rpm",
        title: "True engine and pump speed",
        how: &[
            "Reflecting tape on crank pulley and on the pump shaft, stuck on at standstill.",
            "Low idle, high idle, then loaded: both shafts. Without speed and temperature no pressure is worth writing down.",
        ],
        instruments: "optical tachometer, ±1 %",
        yields: &[
            Yield::neutral(Port::EngineSpeed, Idle::High),
            Yield::neutral(Port::PumpShaft, Idle::High),
            Yield::driven(
                Port::EngineSpeed,
                Doing::Loaded,
                Direction::Forward,
                Lever::Full,
            ),
            Yield::driven(
                Port::PumpShaft,
                Doing::Loaded,
                Direction::Forward,
                Lever::Full,
            ),
        ],
        answers: &["engine-pulls-down", "belt-slips"],
        minutes_first: 3.0,
        minutes_again: 1.0,
        hazard: 1,
        precautions: &[
            "No loose sleeves; tape stuck on at standstill; guards on",
            "Loaded: tachometer fixed to the machine or read from a seat",
        ],
        separates: "A tired engine from a belt, clutch or coupling that slips.",
        ..BASE
    },
];
