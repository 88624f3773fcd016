//! The unknowns of the circuit: gauge pressures at its nodes, and the motor's speed.

use crate::readings::Path;

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

/// Unknowns of one path with all that feeds it.
pub const UNKNOWNS: usize = 10;
/// Places that a tandem solves for: the left path with all that feeds both, the tank (solved as the zero that it is), and what
/// the right path has of its own.
pub const TANDEM: usize = UNKNOWNS + 1 + OWN.len();
/// Places of a state.
pub const PLACES: usize = 2 * UNKNOWNS + 1;
/// Nodes that each path of a tandem has of its own; the others are common.
pub const OWN: [Node; 6] = [
    Node::APump,
    Node::AMotor,
    Node::BPump,
    Node::BMotor,
    Node::MotorCase,
    Node::Shaft,
];

/// Values of the unknowns: the nodes of the left or only path in their order, the tank's zero, then what the right path has of
/// its own.
pub type State = [f64; PLACES];

impl Node {
    /// Every node of one path, in the order of a [`State`].
    pub const ALL: [Node; UNKNOWNS + 1] = [
        Node::Inlet,
        Node::ChargeOut,
        Node::Gallery,
        Node::APump,
        Node::AMotor,
        Node::BPump,
        Node::BMotor,
        Node::MotorCase,
        Node::PumpCase,
        Node::Shaft,
        Node::Tank,
    ];

    /// Place of the left or only path's node in a [`State`].
    #[inline(always)]
    pub const fn at(self) -> usize {
        self as usize
    }

    /// Place of a path's node in a tandem's [`State`].
    pub fn in_tandem(self, path: Path) -> usize {
        match (path, OWN.iter().position(|n| *n == self)) {
            (Path::Right, Some(own)) => Node::Tank.at() + 1 + own,
            _ => self.at(),
        }
    }
}

/// Place of the right path's shaft in a tandem.
pub const RIGHT_SHAFT: usize = TANDEM - 1;
