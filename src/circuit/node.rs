//! The unknowns of the circuit: gauge pressures at its nodes, and the motor's speed.

/// A node of the circuit. Gauge pressure in bar; tank is zero by definition.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[repr(u8)]
pub enum Node {
    /// Charge pump inlet (negative: below atmosphere).
    Inlet,
    /// Charge pump outlet, before a pressure-side filter.
    ChargeOut,
    /// Charge gallery.
    Gallery,
    /// Loop side A at the pump.
    APump,
    /// Loop side A at the motor.
    AMotor,
    /// Loop side B at the pump.
    BPump,
    /// Loop side B at the motor.
    BMotor,
    /// Motor case.
    MotorCase,
    /// Pump case.
    PumpCase,
    /// Motor shaft speed, thousands of rpm: not a pressure, but solved with them.
    Shaft,
    /// Tank: the reference.
    Tank,
}

/// Number of unknowns.
pub const UNKNOWNS: usize = 10;

/// Values of the unknowns; the last place holds the tank's zero.
pub type State = [f64; UNKNOWNS + 1];

impl Node {
    /// Place in a [`State`].
    #[inline(always)]
    pub fn at(self) -> usize {
        self as usize
    }
}
