//! Left and right changed over: a machine whose paths are built alike shows the mirror image of what its mirror image shows.

use super::layout::Arrangement;
use super::network::{Network, used};
use super::node::{Node, State};
use super::output::Shown;
use super::param::{Param, Params};
use crate::readings::{Path, Port};

impl Network {
    /// True where the two paths are the same circuit, so that changing them over changes nothing but names.
    pub fn is_symmetric(&self) -> bool {
        let l = self.layout();
        l.arrangement != Arrangement::Single
            && l.held[0] == l.held[1]
            && l.bridged[0] == l.bridged[1]
    }

    /// The parameters with left and right changed over; what both share stays.
    pub fn mirrored(&self, theta: &Params) -> Params {
        let mut out = *theta;
        for p in Param::ALL {
            let (left, right) = (p.on(Path::Left), p.on(Path::Right));
            // What the right path takes from the left one is common.
            if self.takes(Path::Right, *p) == right {
                out[left] = theta[right];
                out[right] = theta[left];
            }
        }
        out
    }

    /// Place of the value that a path's elements use, in this arrangement.
    fn takes(&self, path: Path, p: Param) -> usize {
        match self.layout().arrangement {
            Arrangement::Apart if p.belongs() != super::param::Belongs::Machine => p.on(path),
            _ => used(path, p),
        }
    }

    /// True where both paths have one port in common.
    pub fn at_common(&self, port: Port) -> bool {
        self.layout().arrangement == Arrangement::Tandem && port.is_common()
    }

    /// A state with left and right changed over.
    pub fn mirrored_state(&self, x: &State) -> State {
        let mut out = *x;
        for n in Node::ALL {
            let (left, right) = (self.at(Path::Left, n), self.at(Path::Right, n));
            out[left] = x[right];
            out[right] = x[left];
        }
        out
    }

    /// A reading of the mirror image: the same value, its derivatives changed over.
    pub fn mirrored_shown(&self, shown: &Shown) -> Shown {
        Shown {
            value: shown.value,
            gradient: self.mirrored(&shown.gradient),
        }
    }
}
