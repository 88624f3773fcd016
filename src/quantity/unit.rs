//! Units of measure: one line a unit. Adding a unit is adding a line.

use serde::{Deserialize, Serialize};
use std::fmt;

use super::Kind;
use super::factor as f;

/// What is known of one unit: `base = (value + shift) × scale`.
struct Facts {
    kind: Kind,
    code: &'static str,
    symbol: &'static str,
    scale: f64,
    shift: f64,
    /// Most decimals that are ever worth showing as a reading.
    decimals: u8,
    /// Spellings in the folded form of [`super::spelling::fold`].
    spellings: &'static [&'static str],
}

macro_rules! units {
    ($( $kind:ident { $( $variant:ident $code:literal $symbol:literal ($scale:expr, $shift:expr) $decimals:literal
        [ $( $spelling:literal ),* ]; )+ } )+) => {
        /// A unit of measure. The serde codes ([`Unit::code`]) stand in files that people keep: they never change.
        #[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
        pub enum Unit {
            $( $(
                #[doc = concat!("`", $code, "`, printed as ", $symbol, ".")]
                #[serde(rename = $code)]
                $variant,
            )+ )+
        }

        impl Unit {
            /// Every unit, grouped by kind, base unit of the kind first.
            pub const ALL: &'static [Unit] = &[ $( $( Unit::$variant, )+ )+ ];

            const fn facts(self) -> &'static Facts {
                match self {
                    $( $( Unit::$variant => const { &Facts {
                        kind: Kind::$kind, code: $code, symbol: $symbol, scale: $scale, shift: $shift,
                        decimals: $decimals, spellings: &[ $( $spelling ),* ],
                    } }, )+ )+
                }
            }
        }
    };
}

units! {
    Pressure {
        Bar "bar" "bar" (1.0, 0.0) 2 ["bar", "bars", "barg", "bar(g)"];
        Psi "psi" "psi" (f::PSI_BAR, 0.0) 1 ["psi", "psig", "psi(g)", "lb/in2", "lbf/in2", "lbs", "pounds", "#"];
        Kilopascal "kPa" "kPa" (0.01, 0.0) 0 ["kpa", "kpag"];
        Megapascal "MPa" "MPa" (10.0, 0.0) 3 ["mpa", "mpag"];
        Millibar "mbar" "mbar" (0.001, 0.0) 0 ["mbar", "hpa"];
        KilogramForcePerSquareCentimetre "kgf/cm2" "kgf/cm²" (f::KGF_CM2_BAR, 0.0) 2
            ["kgf/cm2", "kg/cm2", "kp/cm2", "at"];
        InchOfMercuryVacuum "inHg_vacuum" "inHg vacuum" (-f::INCH_MERCURY_BAR, 0.0) 1
            ["inhg", "inhgvacuum", "inhgvac", "\"hg", "inchhg", "inchofmercury", "inchesofmercury"];
        MillimetreOfMercuryVacuum "mmHg_vacuum" "mmHg vacuum" (-f::MM_MERCURY_BAR, 0.0) 0
            ["mmhg", "mmhgvacuum", "mmhgvac", "torr"];
    }
    Flow {
        LitrePerMinute "L/min" "L/min" (1.0, 0.0) 2
            ["l/min", "lpm", "lmin", "l/m", "litre/min", "liter/min", "litres/min", "liters/min", "dm3/min"];
        MillilitrePerMinute "mL/min" "mL/min" (0.001, 0.0) 0 ["ml/min", "cm3/min", "cc/min"];
        LitrePerHour "L/h" "L/h" (1.0 / 60.0, 0.0) 1 ["l/h", "lph"];
        LitrePerSecond "L/s" "L/s" (60.0, 0.0) 3 ["l/s"];
        CubicMetrePerHour "m3/h" "m³/h" (1000.0 / 60.0, 0.0) 3 ["m3/h"];
        UsGallonPerMinute "gpm_US" "US gpm" (f::US_GALLON_L, 0.0) 2
            ["usgpm", "gpm", "gpm(us)", "gpmus", "usgal/min", "gal/min", "gallon/min", "gallons/min"];
        ImperialGallonPerMinute "gpm_imperial" "imp gpm" (f::IMPERIAL_GALLON_L, 0.0) 2
            ["impgpm", "ukgpm", "igpm", "gpm(uk)", "gpm(imp)", "impgal/min", "ukgal/min"];
    }
    RotationalSpeed {
        RevolutionPerMinute "rpm" "rpm" (1.0, 0.0) 1
            ["rpm", "r/min", "rev/min", "1/min", "/min", "min-1", "min^-1", "u/min", "revs"];
        RevolutionPerSecond "1/s" "1/s" (60.0, 0.0) 3 ["1/s", "/s", "s-1", "s^-1", "rps", "r/s", "rev/s"];
        RadianPerSecond "rad/s" "rad/s" (1.0 / f::RPM_RAD_S, 0.0) 2 ["rad/s"];
    }
    Temperature {
        DegreeCelsius "degC" "°C" (1.0, 0.0) 1
            ["°c", "c", "degc", "deg.c", "celsius", "°celsius", "°", "deg", "degrees", "oc"];
        DegreeFahrenheit "degF" "°F" (1.0 / 1.8, -32.0) 1
            ["°f", "f", "degf", "deg.f", "fahrenheit", "°fahrenheit", "°", "deg", "degrees", "of"];
    }
    TemperatureDifference {
        Kelvin "K" "K" (1.0, 0.0) 1 ["k", "°c", "c", "°", "deg", "degc", "kelvin", "°k", "celsius", "degrees"];
        FahrenheitDifference "degF_difference" "°F" (1.0 / 1.8, 0.0) 1
            ["°f", "f", "°", "deg", "degf", "degrees", "fahrenheit"];
    }
    Displacement {
        CubicCentimetrePerRevolution "cm3/rev" "cm³/rev" (1.0, 0.0) 2
            ["cm3/rev", "cm3", "cc/rev", "cc", "ccm", "ccrev", "cm3/r", "cc/r", "ml/rev", "ml", "ml/r", "cm3/u", "cm3/turn"];
        CubicInchPerRevolution "in3/rev" "in³/rev" (f::CUBIC_INCH_CM3, 0.0) 3
            ["in3/rev", "in3", "cuin", "cuin/rev", "cu.in", "cu.in/rev", "cir", "ci", "in3/r", "cid", "cubicinches"];
    }
    KinematicViscosity {
        SquareMillimetrePerSecond "mm2/s" "mm²/s" (1.0, 0.0) 1 ["mm2/s"];
        Centistokes "cSt" "cSt" (1.0, 0.0) 1 ["cst", "centistoke", "centistokes"];
    }
    Torque {
        NewtonMetre "N.m" "N·m" (1.0, 0.0) 1 ["n.m", "nm", "n-m"];
        PoundForceFoot "lbf.ft" "lbf·ft" (f::POUND_FOOT_NM, 0.0) 1
            ["lbf.ft", "lbfft", "lb.ft", "lbft", "lb-ft", "ft.lb", "ftlb", "ft-lb", "ft.lbf", "ftlbf", "ft-lbf",
             "lbf-ft", "footpound", "footpounds", "ftlbs", "ft.lbs", "ft-lbs"];
        PoundForceInch "lbf.in" "lbf·in" (f::POUND_INCH_NM, 0.0) 0
            ["lbf.in", "lbfin", "lb.in", "lbin", "lb-in", "in.lb", "inlb", "in-lb", "in.lbf", "inlbf", "in-lbf",
             "lbf-in", "inlbs", "in.lbs", "in-lbs", "inchpounds"];
        KilogramForceMetre "kgf.m" "kgf·m" (f::GRAVITY_M_S2, 0.0) 2
            ["kgf.m", "kgfm", "kg.m", "kgm", "kg-m", "kp.m", "kpm", "mkg", "mkp", "m.kg"];
    }
    Power {
        Kilowatt "kW" "kW" (1.0, 0.0) 2 ["kw", "kilowatt", "kilowatts"];
        Watt "W" "W" (0.001, 0.0) 0 ["w", "watt", "watts"];
        Horsepower "hp" "hp" (f::HORSEPOWER_KW, 0.0) 2 ["hp", "bhp", "horsepower"];
        MetricHorsepower "hp_metric" "metric hp" (f::METRIC_HORSEPOWER_KW, 0.0) 2
            ["metrichp", "hpmetric", "hp(m)", "ps", "cv", "ch", "pk", "hp"];
    }
    GroundSpeed {
        KilometrePerHour "km/h" "km/h" (1.0, 0.0) 2 ["km/h", "kmh", "kph", "kmph", "k/h"];
        MilePerHour "mph" "mph" (f::MILE_M * 1e-3, 0.0) 2 ["mph", "mi/h", "mile/h", "miles/h"];
        MetrePerSecond "m/s" "m/s" (3.6, 0.0) 3 ["m/s", "mps"];
        MetrePerMinute "m/min" "m/min" (0.06, 0.0) 1 ["m/min"];
        FootPerMinute "ft/min" "ft/min" (f::FOOT_M * 0.06, 0.0) 1 ["ft/min", "fpm"];
    }
    Length {
        Metre "m" "m" (1.0, 0.0) 3 ["m", "metre", "meter", "metres", "meters"];
        Millimetre "mm" "mm" (0.001, 0.0) 2 ["mm", "millimetre", "millimeter", "millimetres", "millimeters"];
        Centimetre "cm" "cm" (0.01, 0.0) 1 ["cm", "centimetre", "centimeter", "centimetres", "centimeters"];
        Foot "ft" "ft" (f::FOOT_M, 0.0) 2 ["ft", "foot", "feet", "'"];
        Inch "in" "in" (f::INCH_M, 0.0) 3 ["in", "inch", "inches", "\""];
    }
    Time {
        Second "s" "s" (1.0, 0.0) 2 ["s", "sec", "secs", "second", "seconds"];
        Minute "min" "min" (60.0, 0.0) 2 ["min", "mins", "minute", "minutes"];
        Millisecond "ms" "ms" (0.001, 0.0) 0 ["ms", "msec", "millisecond", "milliseconds"];
        Hour "h" "h" (3600.0, 0.0) 2 ["h", "hr", "hrs", "hour", "hours"];
    }
    Current {
        Milliampere "mA" "mA" (1.0, 0.0) 0 ["ma", "milliamp", "milliamps"];
        Ampere "A" "A" (1000.0, 0.0) 3 ["a", "amp", "amps", "ampere", "amperes"];
    }
    Ratio {
        Fraction "fraction" "" (1.0, 0.0) 4 ["", ":1", "to1"];
        Percent "percent" "%" (0.01, 0.0) 2 ["%", "percent", "pct", "prozent", "percents"];
    }
    Mass {
        Kilogram "kg" "kg" (1.0, 0.0) 2 ["kg", "kgs", "kilogram", "kilograms"];
        Gram "g" "g" (0.001, 0.0) 0 ["g", "gram", "grams"];
        Tonne "t" "t" (1000.0, 0.0) 3 ["t", "tonne", "tonnes"];
        Pound "lb" "lb" (f::POUND_KG, 0.0) 1 ["lb", "lbs", "pound", "pounds"];
    }
    Angle {
        Degree "deg" "°" (1.0, 0.0) 1 ["°", "deg", "degree", "degrees"];
        Turn "turn" "turn" (360.0, 0.0) 3 ["turn", "turns", "rev", "revs"];
        Radian "rad" "rad" (360.0 / core::f64::consts::TAU, 0.0) 4 ["rad"];
    }
    Volume {
        Litre "L" "L" (1.0, 0.0) 3 ["l", "litre", "liter", "litres", "liters", "dm3"];
        Millilitre "mL" "mL" (0.001, 0.0) 0 ["ml", "cm3", "cc", "ccm"];
        CubicInch "in3" "in³" (f::CUBIC_INCH_CM3 * 1e-3, 0.0) 2 ["in3", "cuin", "cu.in", "ci"];
        UsGallon "gal_US" "US gal" (f::US_GALLON_L, 0.0) 3
            ["usgal", "gal", "gallon", "gallons", "gal(us)", "usgallon", "usgallons"];
        UsQuart "qt_US" "US qt" (f::US_GALLON_L / 4.0, 0.0) 3 ["usqt", "qt", "quart", "quarts", "qts"];
        UsFluidOunce "floz_US" "US fl oz" (f::US_GALLON_L / 128.0, 0.0) 1 ["usfloz", "floz", "oz", "fl.oz"];
        ImperialGallon "gal_imperial" "imp gal" (f::IMPERIAL_GALLON_L, 0.0) 3 ["impgal", "ukgal", "gal(uk)", "gal(imp)"];
        ImperialPint "pt_imperial" "imp pt" (f::IMPERIAL_GALLON_L / 8.0, 0.0) 3 ["imppt", "ukpt", "imppint"];
    }
    Density {
        KilogramPerCubicMetre "kg/m3" "kg/m³" (1.0, 0.0) 1 ["kg/m3", "g/l"];
        KilogramPerLitre "kg/L" "kg/L" (1000.0, 0.0) 4 ["kg/l", "g/cm3", "g/cc", "g/ml", "kg/dm3"];
        PoundPerUsGallon "lb/gal_US" "lb/US gal" (f::POUND_KG / f::US_GALLON_L * 1000.0, 0.0) 3
            ["lb/usgal", "lb/gal", "ppg"];
        PoundPerCubicFoot "lb/ft3" "lb/ft³" (f::POUND_KG / f::CUBIC_FOOT_L * 1000.0, 0.0) 2 ["lb/ft3", "pcf"];
    }
}

impl Unit {
    /// What this unit measures.
    #[must_use]
    pub const fn kind(self) -> Kind {
        self.facts().kind
    }

    /// The stable code under which files hold this unit: ASCII, e.g. `"cm3/rev"`.
    #[must_use]
    pub const fn code(self) -> &'static str {
        self.facts().code
    }

    /// The unit with this stable code, if there is one.
    #[must_use]
    pub fn from_code(code: &str) -> Option<Unit> {
        Unit::ALL.iter().copied().find(|unit| unit.code() == code)
    }

    /// The symbol that stands behind a printed figure. Empty for [`Unit::Fraction`] alone.
    #[must_use]
    pub const fn symbol(self) -> &'static str {
        self.facts().symbol
    }

    /// The spellings taken when typed, in folded form: lower case, no spaces, `2` and `3` for raised digits.
    #[must_use]
    pub const fn spellings(self) -> &'static [&'static str] {
        self.facts().spellings
    }

    /// True for the vacuum units: a positive figure is a pressure *under* the air's.
    #[must_use]
    pub const fn reads_vacuum(self) -> bool {
        matches!(
            self,
            Unit::InchOfMercuryVacuum | Unit::MillimetreOfMercuryVacuum
        )
    }

    /// Most decimals that are ever worth showing of a reading in this unit.
    pub(super) const fn reading_decimals(self) -> u8 {
        self.facts().decimals
    }

    /// A value in this unit, in the base unit of its kind. Not checked for infinities.
    pub(super) const fn base_of_value(self, value: f64) -> f64 {
        let facts = self.facts();
        (value + facts.shift) * facts.scale
    }

    /// A value in the base unit of the kind, in this unit.
    pub(super) const fn value_of_base(self, base: f64) -> f64 {
        let facts = self.facts();
        base / facts.scale - facts.shift
    }
}

impl fmt::Display for Unit {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.symbol())
    }
}
