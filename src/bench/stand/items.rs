//! Items of a full sheet beside the efficiency run, as data: one entry an item.

use super::channel::Subject;
use crate::quantity::Unit;
use serde::{Deserialize, Serialize};

/// An item. The serde codes stand in files that people keep: they never change.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum ItemId {
    /// Case filled before the first turn, rotation checked by hand.
    Prefill,
    /// Charge pressure there within ten seconds at low speed.
    ChargeProven,
    /// Run-in steps.
    RunIn,
    /// Charge pump flow at the lower speed.
    ChargeFlowLow,
    /// Charge pump flow at the higher speed.
    ChargeFlowHigh,
    /// Charge relief at the lower speed.
    ChargeReliefLow,
    /// Charge relief at the higher speed.
    ChargeReliefHigh,
    /// Null with the servo ports bridged.
    NullBridged,
    /// Null with the control at work.
    NullControl,
    /// Signal at which side A starts.
    StartA,
    /// Signal at which side B starts.
    StartB,
    /// Signal of full stroke on side A.
    EndA,
    /// Signal of full stroke on side B.
    EndB,
    /// Hysteresis.
    Hysteresis,
    /// Back to zero when the signal is lost.
    SignalLoss,
    /// Largest displacement on side A.
    StrokeA,
    /// Largest displacement on side B.
    StrokeB,
    /// Loop relief A.
    ReliefA,
    /// Loop relief B.
    ReliefB,
    /// Pressure limiter A.
    LimiterA,
    /// Pressure limiter B.
    LimiterB,
    /// Flow at dead head.
    DeadHead,
    /// Lowest starting torque over the shaft angles.
    StartingTorque,
    /// Leakage at creeping speed.
    CreepLeakage,
    /// Shift of a two-position motor, both ways.
    Shift,
    /// Brake released fully at.
    BrakeRelease,
    /// Brake holds.
    BrakeHold,
    /// Time to full stroke.
    ResponseOut,
    /// Time back to zero.
    ResponseBack,
    /// Shaft seal under case pressure.
    SealSoak,
    /// Noise.
    Noise,
    /// Debris patch.
    Debris,
    /// Settings sealed.
    Sealed,
}

/// What the technician enters.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Entry {
    /// Done and good, or not.
    Tick,
    /// A figure in a unit.
    Figure(Unit),
}

/// Limits of common practice about a reference that the sheet or the profile gives.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Practice {
    /// None: the manual's limits only.
    None,
    /// At most, in the item's unit.
    AtMost(f64),
    /// Between, in the item's unit.
    Between(f64, f64),
    /// Shares of what the plate promises: displacement, charge flow, torque.
    OfTheory(f64, f64),
}

/// An item of the sheet.
#[derive(Clone, Copy, Debug)]
pub struct Item {
    /// Which.
    pub id: ItemId,
    /// Of which subjects.
    pub of: &'static [Subject],
    /// Label.
    pub words: &'static str,
    /// How it is done, in a line.
    pub how: &'static str,
    /// What could hurt here; empty where nothing beyond the stand's own rules.
    pub caution: &'static str,
    /// What is entered.
    pub entry: Entry,
    /// Limits of common practice.
    pub practice: Practice,
}

const PUMP: &[Subject] = &[Subject::Pump];
const MOTOR: &[Subject] = &[Subject::Motor];
const PUMP_AND_DRIVE: &[Subject] = &[Subject::Pump, Subject::Transmission];
const MOTOR_AND_DRIVE: &[Subject] = &[Subject::Motor, Subject::Transmission];
const EVERY: &[Subject] = &[Subject::Pump, Subject::Motor, Subject::Transmission];

const fn tick(
    id: ItemId,
    of: &'static [Subject],
    words: &'static str,
    how: &'static str,
    caution: &'static str,
) -> Item {
    Item {
        id,
        of,
        words,
        how,
        caution,
        entry: Entry::Tick,
        practice: Practice::None,
    }
}

const fn figure(
    id: ItemId,
    of: &'static [Subject],
    words: &'static str,
    how: &'static str,
    unit: Unit,
    practice: Practice,
) -> Item {
    Item {
        id,
        of,
        words,
        how,
        caution: "",
        entry: Entry::Figure(unit),
        practice,
    }
}

/// An item with what could hurt at it.
const fn careful(item: Item, caution: &'static str) -> Item {
    Item { caution, ..item }
}

/// At full pressure.
const FULL_PRESSURE: &str = "Full pressure: hoses tied down, guard shut, nobody beside them or in the plane of the coupling. Raise the load \
    slowly and let go within a few seconds: all of the power turns into heat.";
/// At a shaft that is held against full torque.
const LOCKED_SHAFT: &str = "The lock carries the whole torque: guard shut, nobody in its plane, pressure off before a hand goes to the shaft.";

/// Every item, in the order of the work.
pub const ITEMS: &[Item] = &[
    tick(
        ItemId::Prefill,
        EVERY,
        "Case filled, rotation proved by a jog",
        "Fill the case to its highest drain, jog once, look at the arrow and the direction of the stand.",
        "Guard over the shaft and the coupling before the jog; nobody in the plane of the coupling. Case drain open: a shut drain throws the seal or bursts the housing.",
    ),
    tick(
        ItemId::ChargeProven,
        PUMP_AND_DRIVE,
        "Charge pressure there within 10 s at low speed",
        "Low speed, no load, eyes on the charge gauge. Not there in 10 s: stop.",
        "Prove the emergency stop first.",
    ),
    tick(
        ItemId::RunIn,
        EVERY,
        "Run-in: 5 min at low load, then 25, 50, 75, 100 % pressure",
        "2 to 5 min a step, both directions; watch case temperature and case flow.",
        "Hoses under full pressure are tied down; stand clear of their ends. A pinhole you cannot feel can inject oil: card or stick, never a hand.",
    ),
    figure(
        ItemId::ChargeFlowLow,
        PUMP_AND_DRIVE,
        "Charge pump flow, lower speed",
        "At the charge setting, 1500 rpm or the lower test speed.",
        Unit::LitrePerMinute,
        Practice::None,
    ),
    figure(
        ItemId::ChargeFlowHigh,
        PUMP_AND_DRIVE,
        "Charge pump flow, higher speed",
        "At the charge setting, rated speed. Good: 85 % of theory and more.",
        Unit::LitrePerMinute,
        Practice::None,
    ),
    figure(
        ItemId::ChargeReliefLow,
        PUMP_AND_DRIVE,
        "Charge relief, lower speed",
        "Above case pressure. Good: within 0.7 bar of the setting.",
        Unit::Bar,
        Practice::None,
    ),
    figure(
        ItemId::ChargeReliefHigh,
        PUMP_AND_DRIVE,
        "Charge relief, higher speed",
        "Above case pressure. From low to high speed it may rise by 3 bar.",
        Unit::Bar,
        Practice::None,
    ),
    tick(
        ItemId::NullBridged,
        PUMP,
        "Null with the servo ports bridged",
        "Bridge the two servo ports with a hose, read A and B: no difference, no flow.",
        "Servo ports, not loop ports: a bridge hose on a loop port bursts. Compare the port numbers with the manual before the spanner.",
    ),
    tick(
        ItemId::NullControl,
        PUMP,
        "Null with the control at work",
        "Middle of the dead band from both sides; no flow at half the dead band either way.",
        "",
    ),
    figure(
        ItemId::StartA,
        PUMP,
        "Flow starts, side A",
        "Signal as the control takes it, in per cent of its full signal.",
        Unit::Percent,
        Practice::None,
    ),
    figure(
        ItemId::StartB,
        PUMP,
        "Flow starts, side B",
        "As side A. The two within 5 to 8 % of each other.",
        Unit::Percent,
        Practice::None,
    ),
    figure(
        ItemId::EndA,
        PUMP,
        "Full stroke, side A",
        "Signal at which the flow stops growing.",
        Unit::Percent,
        Practice::Between(0.9, 1.1),
    ),
    figure(
        ItemId::EndB,
        PUMP,
        "Full stroke, side B",
        "Signal at which the flow stops growing.",
        Unit::Percent,
        Practice::Between(0.9, 1.1),
    ),
    figure(
        ItemId::Hysteresis,
        PUMP,
        "Hysteresis",
        "Same flow going up and coming down: difference of the signals.",
        Unit::Percent,
        Practice::AtMost(0.06),
    ),
    tick(
        ItemId::SignalLoss,
        PUMP,
        "Back to zero when the signal is lost",
        "Pull the plug or drop the pilot pressure at half stroke.",
        "",
    ),
    figure(
        ItemId::StrokeA,
        PUMP,
        "Largest displacement, side A",
        "Flow at low pressure over speed.",
        Unit::CubicCentimetrePerRevolution,
        Practice::OfTheory(0.97, 1.03),
    ),
    figure(
        ItemId::StrokeB,
        PUMP,
        "Largest displacement, side B",
        "Flow at low pressure over speed.",
        Unit::CubicCentimetrePerRevolution,
        Practice::OfTheory(0.97, 1.03),
    ),
    careful(
        figure(
            ItemId::ReliefA,
            PUMP_AND_DRIVE,
            "Loop relief A at its stated flow",
            "Raise the load slowly; a few seconds, then let it cool. Good: the setting to 5 % over.",
            Unit::Bar,
            Practice::None,
        ),
        FULL_PRESSURE,
    ),
    careful(
        figure(
            ItemId::ReliefB,
            PUMP_AND_DRIVE,
            "Loop relief B at its stated flow",
            "As A. The two within 3 %.",
            Unit::Bar,
            Practice::None,
        ),
        FULL_PRESSURE,
    ),
    careful(
        figure(
            ItemId::LimiterA,
            PUMP,
            "Pressure limiter A",
            "Pressure at which the stroke goes back. 10 bar and more under the relief.",
            Unit::Bar,
            Practice::None,
        ),
        FULL_PRESSURE,
    ),
    careful(
        figure(
            ItemId::LimiterB,
            PUMP,
            "Pressure limiter B",
            "As A.",
            Unit::Bar,
            Practice::None,
        ),
        FULL_PRESSURE,
    ),
    careful(
        figure(
            ItemId::DeadHead,
            PUMP,
            "Flow left at dead head on the limiter",
            "A few seconds only.",
            Unit::LitrePerMinute,
            Practice::None,
        ),
        FULL_PRESSURE,
    ),
    careful(
        figure(
            ItemId::StartingTorque,
            MOTOR_AND_DRIVE,
            "Starting torque, worst of four shaft angles and more",
            "Full pressure on a locked shaft, per cent of theory. Axial piston 70 to 85 %, radial piston 85 to 95 %.",
            Unit::Percent,
            Practice::None,
        ),
        LOCKED_SHAFT,
    ),
    figure(
        ItemId::CreepLeakage,
        MOTOR,
        "Leakage at 10 to 50 rpm, rated pressure",
        "In litres a minute: a share of so small a flow says nothing.",
        Unit::LitrePerMinute,
        Practice::None,
    ),
    tick(
        ItemId::Shift,
        MOTOR_AND_DRIVE,
        "Shifts both ways",
        "Both positions under light load: the speed must change by the ratio.",
        "",
    ),
    figure(
        ItemId::BrakeRelease,
        MOTOR_AND_DRIVE,
        "Brake fully released at",
        "Raise the pressure until the shaft turns freely by hand.",
        Unit::Bar,
        Practice::None,
    ),
    tick(
        ItemId::BrakeHold,
        MOTOR_AND_DRIVE,
        "Brake holds its torque",
        "Pressure off, stated torque on the shaft, no turn.",
        "The lever on the shaft can swing: nobody in its way.",
    ),
    figure(
        ItemId::ResponseOut,
        PUMP,
        "Time to full stroke",
        "From signal to full flow.",
        Unit::Second,
        Practice::Between(0.5, 2.0),
    ),
    figure(
        ItemId::ResponseBack,
        PUMP,
        "Time back to zero",
        "From signal off to no flow.",
        Unit::Second,
        Practice::Between(0.3, 2.0),
    ),
    tick(
        ItemId::SealSoak,
        EVERY,
        "Seal dry after 10 min at 2 to 3 bar in the case",
        "Standing still, warm.",
        "Never more than the seal's own limit in the case.",
    ),
    tick(
        ItemId::Noise,
        EVERY,
        "No noise out of the ordinary",
        "Over the whole run, both directions.",
        "",
    ),
    tick(
        ItemId::Debris,
        EVERY,
        "Patch or magnet clean after the run",
        "Case drain through a patch, or the stand's filter opened.",
        "Oil over 60 °C scalds.",
    ),
    tick(
        ItemId::Sealed,
        EVERY,
        "Settings locked and sealed",
        "Lock nuts tight, caps on, paint or seal.",
        "",
    ),
];

/// Items of a subject.
pub fn of(subject: Subject) -> impl Iterator<Item = &'static Item> {
    ITEMS.iter().filter(move |item| item.of.contains(&subject))
}

/// An item by its id.
#[must_use]
pub fn item(id: ItemId) -> Option<&'static Item> {
    ITEMS.iter().find(|item| item.id == id)
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::collections::BTreeSet;

    #[test]
    fn every_item_stands_once_and_says_how() {
        let ids: BTreeSet<ItemId> = ITEMS.iter().map(|item| item.id).collect();
        assert_eq!(ids.len(), ITEMS.len());
        for item in ITEMS {
            assert!(
                !item.how.is_empty() && !item.words.ends_with('.'),
                "{:?}",
                item.id
            );
            assert!(!item.of.is_empty());
            let at_full_pressure = matches!(
                item.id,
                ItemId::ReliefA
                    | ItemId::ReliefB
                    | ItemId::LimiterA
                    | ItemId::LimiterB
                    | ItemId::DeadHead
                    | ItemId::StartingTorque
            );
            assert!(
                !at_full_pressure || !item.caution.is_empty(),
                "{:?}",
                item.id
            );
        }
    }
}
