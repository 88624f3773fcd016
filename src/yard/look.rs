//! What is looked at without an instrument: answers with what each comes to. The ids and codes stand in files that people keep.

use super::report::Grade;
use super::sheet::Leg;
use crate::caution::Stands;
use crate::unit::{Tick, Unit};

/// An answer.
#[derive(Clone, Copy, Debug)]
pub struct LookOption {
    /// Stable code.
    pub code: &'static str,
    /// Words.
    pub words: &'static str,
    /// What it comes to; none where this unit has no such thing.
    pub grade: Option<Grade>,
    /// Why, as a sentence for the verdict; empty where it is good.
    pub reason: &'static str,
}

/// A thing to look at.
#[derive(Clone, Copy)]
pub struct Look {
    /// Stable id.
    pub id: &'static str,
    /// Question.
    pub title: &'static str,
    /// Where to look.
    pub how: &'static str,
    /// Answers, the good one first.
    pub options: &'static [LookOption],
    /// On which leg only; none: on each.
    pub leg: Option<Leg>,
    /// Counts on cold oil too.
    pub cold: bool,
    /// True where a unit has it.
    pub has: fn(&Unit) -> bool,
}

impl Look {
    /// The answer of this code.
    #[must_use]
    pub fn option(&self, code: &str) -> Option<&'static LookOption> {
        self.options.iter().find(|o| o.code == code)
    }
}

impl core::fmt::Debug for Look {
    fn fmt(&self, f: &mut core::fmt::Formatter<'_>) -> core::fmt::Result {
        f.debug_struct("Look")
            .field("id", &self.id)
            .finish_non_exhaustive()
    }
}

const fn good(code: &'static str, words: &'static str) -> LookOption {
    LookOption {
        code,
        words,
        grade: Some(Grade::Good),
        reason: "",
    }
}

const fn watch(code: &'static str, words: &'static str, reason: &'static str) -> LookOption {
    LookOption {
        code,
        words,
        grade: Some(Grade::Watch),
        reason,
    }
}

const fn stop(code: &'static str, words: &'static str, reason: &'static str) -> LookOption {
    LookOption {
        code,
        words,
        grade: Some(Grade::Stop),
        reason,
    }
}

const fn none(words: &'static str) -> LookOption {
    LookOption {
        code: "none",
        words,
        grade: None,
        reason: "",
    }
}

fn every(_: &Unit) -> bool {
    true
}

fn may_have_tow_valve(unit: &Unit) -> bool {
    unit.ticks.bypass != Tick::No
}

fn has_two_paths(unit: &Unit) -> bool {
    !unit.ticks.paths.is_one()
}

fn shifts(unit: &Unit) -> bool {
    unit.ticks.two_speed != Tick::No
}

/// What most looks share.
const BASE: Look = Look {
    id: "",
    title: "",
    how: "",
    options: &[],
    leg: None,
    cold: true,
    has: every,
};

/// Everything that is looked at. Common practice.
pub const LOOKS: &[Look] = &[
    Look {
        id: "level",
        title: "Oil level",
        how: "Engine off, everything lowered, sight glass or stick.",
        options: &[
            good("good", "Right"),
            watch(
                "low",
                "Low",
                "The oil level is low: find where it went before it is filled up.",
            ),
        ],
        ..BASE
    },
    Look {
        id: "oil",
        title: "Oil in the glass",
        how: "Foam, milk, burnt smell.",
        options: &[
            good("clear", "Clear"),
            stop(
                "foam",
                "Foam or milk",
                "The oil is foamed or milky: air or water in it ruins pump and motor.",
            ),
            watch("dark", "Dark or burnt", "The oil is dark or smells burnt."),
        ],
        ..BASE
    },
    Look {
        id: "leaks",
        title: "Leaks and hoses",
        how: "All round, with the engine at idle, and under it. Card or stick along a hose, never a hand.",
        options: &[
            good("dry", "Dry, hoses whole"),
            watch(
                "weep",
                "Weeps, or a hose is chafed",
                "It weeps, or a hose is chafed.",
            ),
            stop(
                "jet",
                "Leaks under pressure",
                "It leaks under pressure: it can inject oil through skin, and it empties itself.",
            ),
        ],
        ..BASE
    },
    Look {
        id: "tow-valve",
        title: "Tow (bypass) valve",
        how: "Turned by hand to its stop, cap on. At return most of all: somebody may have towed it.",
        options: &[
            good("shut", "Shut"),
            stop(
                "open",
                "Open",
                "The tow valve is open: no drive, and no braking from the drive.",
            ),
            none("Has none"),
        ],
        has: may_have_tow_valve,
        ..BASE
    },
    Look {
        id: "interlocks",
        title: "Interlocks live",
        how: "Engine at idle, machine chocked, nobody near. Off the seat, and each other switch in turn: the drive must not take up.",
        options: &[
            good("live", "Each stops the drive"),
            stop(
                "bridged",
                "One does not: bridged or broken",
                "An interlock does not stop the drive: bridged or broken.",
            ),
        ],
        ..BASE
    },
    Look {
        id: "filter-sign",
        title: "Filter indicator",
        how: "With warm oil. Reset it and see whether it comes back.",
        options: &[
            good("good", "Not tripped"),
            watch("tripped", "Tripped", "The filter indicator is tripped."),
            none("Has none"),
        ],
        ..BASE
    },
    Look {
        id: "brake-glazed",
        title: "Brake: glazed or hot",
        how: "Burnt smell, blue hub, grey dust. Was it driven against the brake? Then try the hold on the ramp with care.",
        options: &[
            good("good", "No sign"),
            stop(
                "glazed",
                "Glazed, burnt or blue",
                "The parking brake shows that it was dragged: glazed, burnt or blue.",
            ),
        ],
        leg: Some(Leg::In),
        ..BASE
    },
    Look {
        id: "overheated",
        title: "Overheated while it was out",
        how: "Peak temperature on the display, warning lamp history, what the operator says.",
        options: &[
            good("no", "No sign"),
            watch("yes", "Yes", "It was overheated while it was out."),
            none("Nothing tells"),
        ],
        leg: Some(Leg::In),
        ..BASE
    },
    Look {
        id: "debris",
        title: "Debris",
        how: "Magnet plug or filter, where it comes out without opening the loop.",
        options: &[
            good("clean", "Clean"),
            watch("fine", "Fine grey paste", "Fine metal in the oil."),
            stop(
                "chips",
                "Chips or flakes",
                "Chips in the oil: something is breaking up, and it spoils what is downstream.",
            ),
        ],
        leg: Some(Leg::In),
        ..BASE
    },
    Look {
        id: "creep",
        title: "Stands in neutral",
        how: "High idle, 30 s on the level or with the wheels free, lever brought back from forward, then from reverse.",
        options: &[
            good("stands", "Stands, both ways"),
            stop("creeps", "Creeps", "It creeps in neutral."),
        ],
        cold: false,
        ..BASE
    },
    Look {
        id: "release",
        title: "Lever released at half speed",
        how: "On the level, nobody in front: it stops as it always did.",
        options: &[
            good("stops", "Stops"),
            stop(
                "runs-on",
                "Runs on",
                "It runs on when the lever is released: the drive does not brake.",
            ),
        ],
        cold: false,
        ..BASE
    },
    Look {
        id: "park-brake",
        title: "Parking brake",
        how: "Holds on the ramp both ways, engine off; then a gentle stroke against it at low idle. Nobody below.",
        options: &[
            good("holds", "Holds"),
            stop("moves", "Moves", "The parking brake does not hold."),
        ],
        ..BASE
    },
    Look {
        id: "track-tension",
        title: "Tracks or tyres",
        how: "Track tension both sides as the manual has it, before anything is counted; tyres: pressure and size alike.",
        options: &[
            good("good", "Even"),
            watch(
                "uneven",
                "Uneven",
                "Track tension or tyres are uneven: nothing that compares the sides counts.",
            ),
        ],
        has: has_two_paths,
        ..BASE
    },
    Look {
        id: "range-shift",
        title: "Range shift",
        how: "On the level at low speed: both sides change together.",
        options: &[
            good("together", "Both together"),
            stop(
                "one",
                "One side only",
                "Only one side changes range: it pulls round by itself.",
            ),
            none("Has none"),
        ],
        cold: false,
        has: |unit| has_two_paths(unit) && shifts(unit),
        ..BASE
    },
];

/// Where cautions stand beside a look.
#[must_use]
pub(super) fn stands(id: &str) -> &'static [Stands] {
    match id {
        "leaks" => &[Stands::Opening],
        "tow-valve" => &[Stands::NoBraking],
        "creep" => &[Stands::WheelsClear],
        _ => &[],
    }
}

/// The look of this id.
#[must_use]
pub fn look(id: &str) -> Option<&'static Look> {
    LOOKS.iter().find(|look| look.id == id)
}
