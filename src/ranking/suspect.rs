//! What is suspected: a cause, and on a machine with two paths the side it is on.

use crate::assessment::At;
use crate::circuit::{Arrangement, Belongs};
use crate::faults::{self, Fault, FaultId};
use crate::readings::Path;

/// A cause at a place.
#[derive(Clone, Copy, Debug)]
pub struct Suspect {
    /// The cause.
    pub fault: &'static Fault,
    /// The side it is on; none where there is one path, or where the part is common to both.
    pub path: Option<Path>,
}

impl Suspect {
    /// Share of the cause's base rate: a part that there are two of is as likely on either side.
    pub fn share(&self) -> f64 {
        if self.path.is_some() { 0.5 } else { 1.0 }
    }

    /// Its name.
    pub fn at(&self) -> At {
        At {
            id: self.fault.id,
            path: self.path,
        }
    }

    /// Places of the parameters that it bends.
    pub fn bent(&self) -> impl Iterator<Item = usize> + '_ {
        let path = self.path.unwrap_or_default();
        let bends = self.fault.effects.iter().flat_map(|e| e.bends);
        bends.map(move |(p, _)| p.on(path))
    }
}

/// Everything that can be suspected on an arrangement of paths, "not listed" left out.
pub fn suspects(arrangement: Arrangement) -> Vec<Suspect> {
    faults::all()
        .iter()
        .filter(|f| f.id != FaultId::NotListed)
        .flat_map(|fault| {
            let paths = if is_sided(fault, arrangement) {
                vec![Some(Path::Left), Some(Path::Right)]
            } else {
                vec![None]
            };
            paths.into_iter().map(move |path| Suspect { fault, path })
        })
        .collect()
}

/// True where a cause sits on one side: some part that it bends is there twice.
fn is_sided(fault: &Fault, arrangement: Arrangement) -> bool {
    let twice = |b: Belongs| match arrangement {
        Arrangement::Single => false,
        Arrangement::Tandem => b == Belongs::Path,
        Arrangement::Apart => b != Belongs::Machine,
    };
    fault
        .effects
        .iter()
        .flat_map(|e| e.bends)
        .any(|(p, _)| twice(p.belongs()))
}
