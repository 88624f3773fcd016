//! The circuit's parameters: every number that an element law uses, in one flat table.
//!
//! A unit profile and a condition set them, the unit's scatter moves them, a fault bends one or two of them, and the
//! solver's sensitivities are taken with respect to them. Units inside the circuit are the gauge's own: bar (gauge), L/min,
//! rpm, cm³/rev, seconds; viscosity is relative to 27.5 mPa·s (32 mm²/s at 860 kg/m³). Conversion happens once, at the edge.

use crate::readings::Path;

/// How scatter and severity act on a parameter.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Scale {
    /// By a factor: positive numbers.
    Log,
    /// By a sum: numbers that can be zero or change sign.
    Linear,
}

macro_rules! params {
    ($($(#[$doc:meta])* $name:ident, $scale:ident, $healthy:expr, $words:expr;)*) => {
        /// A parameter of the circuit.
        #[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
        #[repr(usize)]
        pub enum Param { $($(#[$doc])* $name,)* }

        impl Param {
            /// Every parameter in table order.
            pub const ALL: &'static [Param] = &[$(Param::$name,)*];
            /// Number of parameters.
            pub const COUNT: usize = Self::ALL.len();
            /// How it is scattered and bent.
            pub fn scale(self) -> Scale { match self { $(Param::$name => Scale::$scale,)* } }
            /// A neutral value of a healthy medium machine; the profile overwrites most of them.
            pub fn healthy(self) -> f64 { match self { $(Param::$name => $healthy,)* } }
            /// What it is, in the mechanic's words ("the input that widens this window most").
            pub fn words(self) -> &'static str { match self { $(Param::$name => $words,)* } }
        }
    };
}

params! {
    /// Engine speed, rpm.
    Speed, Log, 2400.0, "engine speed";
    /// Pump shaft speed over engine speed (1: no slip).
    InputGrip, Log, 1.0, "slip in the pump drive";
    /// Power that the engine can give before it is pulled down, kW.
    EnginePower, Log, 60.0, "engine power";
    /// Viscosity of the oil where it leaks, relative to 27.5 mPa·s.
    Viscosity, Log, 1.0, "oil viscosity";
    /// Command: signed share of full stroke asked, −1 to 1 (forward positive).
    Lever, Linear, 0.0, "lever travel";
    /// Resistance at the wheels as loop difference at large displacement, bar: it opposes whatever motion there is.
    Load, Linear, 0.0, "load on the wheels";
    /// Push of the wheels on the motor (grade, overrun), bar: positive holds back going forward, whatever the motion.
    Push, Linear, 0.0, "push of the wheels";
    /// Atmospheric pressure, bar absolute.
    Atmosphere, Log, 1.0, "altitude";

    /// Charge pump displacement, cm³/rev.
    ChargeDisp, Log, 15.0, "charge pump displacement";
    /// Charge pump slip at viscosity 1, L/min per bar.
    ChargeSlip, Log, 0.04, "charge pump wear within limits";
    /// Share of the charge pump's drive that is whole (1; 0: sheared).
    ChargeDrive, Linear, 1.0, "charge pump drive";
    /// Share of the feeding circuit's flow that reaches the charge gallery (1; less while another function takes it).
    ChargeFeed, Linear, 1.0, "flow from the feeding circuit";
    /// Suction line, hose and filter at viscosity 1, bar per L/min.
    SuctionLaminar, Log, 0.0025, "suction line and filter";
    /// Suction line, turbulent, bar per (L/min)².
    SuctionTurbulent, Log, 0.00004, "suction line bore";
    /// Share of the charge pump's intake that is air.
    Air, Linear, 0.0, "air in the intake";
    /// Pressure filter at viscosity 1, bar per L/min.
    FilterLaminar, Log, 0.012, "charge filter";
    /// Neutral charge relief: cracking pressure above its drain, bar.
    ReliefSet, Log, 22.0, "charge relief setting";
    /// Neutral charge relief: L/min per bar above cracking.
    ReliefGain, Log, 17.0, "charge relief override";
    /// Neutral charge relief held off its seat: orifice, L/min per √bar.
    ReliefHeld, Linear, 0.0, "charge relief seat";
    /// Consumers fed from charge (brake, shift, pilot), healthy, orifice L/min per √bar.
    Consumers, Log, 0.08, "consumers fed from charge";
    /// Leaking consumer, orifice L/min per √bar.
    ConsumerLeak, Linear, 0.0, "leak of a consumer";
    /// Control and servo leakage at viscosity 1, L/min per bar.
    ControlLeak, Log, 0.025, "control leakage";
    /// Extra servo piston leakage when stroked, L/min per bar.
    ServoLeak, Linear, 0.0, "servo leakage";

    /// Operating (flushing) relief: cracking pressure above motor case, bar.
    OperatingSet, Log, 20.3, "operating relief setting";
    /// Operating relief: L/min per bar above cracking.
    OperatingGain, Log, 14.0, "operating relief override";
    /// Flushing orifice, L/min per √bar.
    FlushOrifice, Log, 20.0, "flushing orifice";
    /// Flushing fitted (1) or blocked or not fitted (0); free travel of the shuttle.
    ShuttleTravel, Linear, 1.0, "flushing shuttle";
    /// Difference that shifts the shuttle, bar.
    ShuttleSpring, Log, 4.0, "shuttle spring";
    /// Share of the path from side A to the operating relief that stays open whatever the sides do.
    ShuttleStuckA, Linear, 0.0, "shuttle stuck to side A";
    /// As `ShuttleStuckA`, for side B.
    ShuttleStuckB, Linear, 0.0, "shuttle stuck to side B";

    /// Make-up check of side A, L/min per √bar.
    CheckA, Log, 80.0, "make-up check A";
    /// Make-up check of side B, L/min per √bar.
    CheckB, Log, 80.0, "make-up check B";
    /// Leak of side A's cartridge (check or relief seat) into the gallery, L/min per √bar.
    CheckLeakA, Linear, 0.0, "seat of cartridge A";
    /// As `CheckLeakA`, side B.
    CheckLeakB, Linear, 0.0, "seat of cartridge B";
    /// Loop relief A: cracking pressure over where it dumps, bar.
    LoopReliefA, Log, 380.0, "loop relief setting A";
    /// Loop relief B.
    LoopReliefB, Log, 380.0, "loop relief setting B";
    /// Loop relief: rise from cracking to full pump flow, share of the setting.
    LoopOverride, Log, 0.10, "loop relief override";
    /// Bypass (tow) valve or other turbulent leak from side to side, L/min per √bar.
    Bypass, Linear, 0.0, "bypass valve";
    /// Pressure limiter of side A, bar; far above the relief where none is fitted.
    LimiterA, Log, 2000.0, "pressure limiter A";
    /// Pressure limiter of side B.
    LimiterB, Log, 2000.0, "pressure limiter B";
    /// Line of side A at viscosity 1, bar per L/min.
    LineALaminar, Log, 0.006, "loop hose A";
    /// Line of side A, bar per (L/min)².
    LineATurbulent, Log, 0.00005, "loop hose A";
    /// Line of side B at viscosity 1, bar per L/min.
    LineBLaminar, Log, 0.006, "loop hose B";
    /// Line of side B, bar per (L/min)².
    LineBTurbulent, Log, 0.00005, "loop hose B";

    /// Main pump displacement, cm³/rev.
    PumpDisp, Log, 75.0, "pump displacement";
    /// Pump leakage of each side to its case at viscosity 1, L/min per bar.
    PumpLeak, Log, 0.0065, "pump leakage";
    /// Pump leakage from side to side at viscosity 1, L/min per bar.
    PumpAcross, Log, 0.004, "pump leakage across";
    /// Motor displacement at large position, all motors of the path together, cm³/rev.
    MotorDisp, Log, 75.0, "motor displacement";
    /// Motor displacement in use over large displacement (1; about 0.5 in the small position).
    MotorShift, Log, 1.0, "motor position";
    /// Motor leakage of each side to its case at viscosity 1, L/min per bar.
    MotorLeak, Log, 0.0065, "motor leakage";
    /// Motor leakage from side to side at viscosity 1, L/min per bar.
    MotorAcross, Log, 0.004, "motor leakage across";
    /// Dry friction and breakaway of motor and driveline, bar of loop difference.
    Friction, Log, 12.0, "driveline friction";
    /// Viscous drag of motor and driveline at viscosity 1, bar per 1000 motor rpm.
    Drag, Log, 6.0, "driveline drag";
    /// Dragging brake, bar of loop difference.
    BrakeDrag, Linear, 0.0, "brake drag";
    /// Share of the motor's turns that reaches the wheel (1; less where the driveline slips).
    DriveGrip, Linear, 1.0, "driveline slip";
    /// Motor turns per wheel turn.
    GearRatio, Log, 20.0, "gear ratio";
    /// Rolling circumference, m.
    Rolling, Log, 2.4, "rolling circumference";

    /// Neutral offset that sits in the control, share of stroke.
    NullControl, Linear, 0.0, "control null";
    /// Neutral offset that sits in the servo piston or the swash itself, share of stroke.
    NullServo, Linear, 0.0, "servo null";
    /// Stroke reached at full lever forward (1).
    GainForward, Log, 1.0, "full stroke forward";
    /// Stroke reached at full lever in reverse (1).
    GainReverse, Log, 1.0, "full stroke reverse";
    /// Control signal forward over what it should be (1; 0: lost).
    SignalForward, Linear, 1.0, "control signal forward";
    /// Control signal in reverse over what it should be.
    SignalReverse, Linear, 1.0, "control signal reverse";
    /// Pilot or control pressure supply over what it should be (1).
    PilotSupply, Linear, 1.0, "pilot supply";
    /// Servo pressure over case at which the swash starts, bar.
    ServoStart, Log, 3.5, "servo start pressure";
    /// Servo pressure over case for full stroke, bar.
    ServoFull, Log, 11.0, "servo full-stroke pressure";
    /// Loop pressure feedback on the servo: bar of servo pressure per 100 bar of loop difference (no-feedback controls).
    ServoLoad, Linear, 0.0, "load feedback of the control";
    /// Engine speed at which a speed-sensing control starts to stroke, rpm.
    SenseStart, Log, 1100.0, "speed at which stroke starts";
    /// Engine speed at which a speed-sensing control is at full stroke, rpm.
    SenseFull, Log, 2000.0, "speed at full stroke";
    /// Share of the speed-sensing control pressure that is left (1; less: inching bleeds it).
    Inching, Linear, 1.0, "inching valve";
    /// Time from lever full to full speed, healthy and warm, s.
    ResponseOut, Log, 1.4, "control orifice";
    /// Time from lever back to stop, s.
    ResponseBack, Log, 1.1, "control orifice";
    /// Coil current at full stroke, mA.
    CurrentFull, Log, 1000.0, "coil current at full stroke";
    /// Pilot pressure at full stroke, bar.
    PilotFull, Log, 18.0, "pilot pressure at full stroke";

    /// Motor case line to where it drains at viscosity 1, bar per L/min.
    MotorCaseLine, Log, 0.02, "motor case hose";
    /// Pump case to tank through cooler and return at viscosity 1, bar per L/min.
    PumpCaseLine, Log, 0.02, "return line and cooler";
    /// Return line, bar per (L/min)².
    PumpCaseTurbulent, Log, 0.0004, "return line and cooler";
    /// Brake release pressure over charge pressure (1).
    ReleaseShare, Linear, 1.0, "brake release feed";
    /// Shift pressure over charge pressure (1).
    ShiftShare, Linear, 1.0, "shift feed";
    /// Settled rise of the tank over the air at ordinary work, K.
    HeatRise, Log, 38.0, "heat balance";
    /// Air temperature, °C.
    AirTemperature, Linear, 20.0, "air temperature";
}

/// What a parameter belongs to on a machine with two paths.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Belongs {
    /// The machine: one engine, one oil, one weather.
    Machine,
    /// The charge side: common where one charge pump feeds both paths.
    Charge,
    /// Each path has its own.
    Path,
}

impl Param {
    /// What it belongs to.
    #[inline(always)]
    pub const fn belongs(self) -> Belongs {
        use Param::*;
        match self {
            Speed | InputGrip | Viscosity | Atmosphere | AirTemperature | HeatRise
            | PilotSupply | Inching => Belongs::Machine,
            ChargeDisp | ChargeSlip | ChargeDrive | ChargeFeed | SuctionLaminar
            | SuctionTurbulent | Air | FilterLaminar | ReliefSet | ReliefGain | ReliefHeld
            | Consumers | ConsumerLeak | PumpCaseLine | PumpCaseTurbulent | ReleaseShare
            | ShiftShare => Belongs::Charge,
            _ => Belongs::Path,
        }
    }

    /// Place of a path's own value in [`Params`], whether or not the circuit looks at it.
    #[inline(always)]
    pub const fn on(self, path: Path) -> usize {
        match path {
            Path::Left => self as usize,
            Path::Right => Param::COUNT + self as usize,
        }
    }
}

/// Number of values: every parameter of the left or only path, then of the right one.
pub const VALUES: usize = 2 * Param::COUNT;

/// The values of all parameters of both paths. What two paths share is taken from the left one.
pub type Params = [f64; VALUES];

/// A table of healthy neutral values.
pub fn healthy() -> Params {
    let mut values = [0.0; VALUES];
    for p in Param::ALL {
        for path in Path::BOTH {
            values[p.on(path)] = p.healthy();
        }
    }
    values
}
