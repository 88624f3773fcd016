//! Solved states kept from one assessment to the next: the same parameters in the same network show the same, so that one more
//! reading costs only what it brings anew.

use crate::circuit::{Shown, State};
use crate::readings::{Path, Port};
use core::cell::RefCell;
use std::collections::HashMap;
use std::rc::Rc;

/// Most states that are kept; beyond it all are forgotten. A state with one port takes about 2 kB.
const MOST: usize = 12_000;

/// A kept state and what its ports show.
#[derive(Clone, Debug)]
pub struct Kept {
    /// The state.
    pub state: State,
    /// Ports read so far, with their derivatives.
    pub ports: Vec<(Path, Port, Shown)>,
}

/// States by their parameters; none where there is no steady state.
#[derive(Clone, Debug, Default)]
pub struct Memo(Rc<RefCell<HashMap<u64, Option<Kept>>>>);

impl Memo {
    /// What is kept under a key, if anything.
    pub fn get<T>(&self, key: u64, read: impl FnOnce(&mut Option<Kept>) -> T) -> Option<T> {
        self.0.borrow_mut().get_mut(&key).map(read)
    }

    /// Keeps a state.
    pub fn put(&self, key: u64, kept: Option<Kept>) {
        let mut map = self.0.borrow_mut();
        if map.len() >= MOST {
            map.clear();
        }
        map.insert(key, kept);
    }
}

/// Key of parameters in a network (`network`: key of its layout). Two different sets share one with a chance of about one in
/// 10¹⁰ for all that is ever kept at once.
pub fn key(network: u64, theta: &[f64]) -> u64 {
    theta.iter().fold(network, |h, v| mix(h, v.to_bits()))
}

/// Key of a text.
pub fn text_key(text: &str) -> u64 {
    text.bytes()
        .fold(0x9E37_79B9_7F4A_7C15, |h, b| mix(h, u64::from(b)))
}

/// One round of a multiply-and-fold hash.
fn mix(h: u64, v: u64) -> u64 {
    let wide =
        u128::from(h ^ v.rotate_left(23)).wrapping_mul(0x9E37_79B9_7F4A_7C15_F39C_C060_5CED_C835);
    (wide as u64) ^ ((wide >> 64) as u64)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::circuit::{Param, healthy};

    #[test]
    fn any_parameter_makes_another_key() {
        let theta = healthy();
        let own = key(1, &theta);
        assert_ne!(own, key(2, &theta));
        for p in Param::ALL {
            let mut other = theta;
            other[*p as usize] += 1e-9;
            assert_ne!(own, key(1, &other), "{p:?}");
        }
    }

    #[test]
    fn a_full_memo_forgets_and_goes_on() {
        let memo = Memo::default();
        for k in 0..=MOST as u64 {
            memo.put(k, None);
        }
        assert_eq!(memo.get(0, |_| ()), None);
        assert_eq!(memo.get(MOST as u64, |k| k.is_none()), Some(true));
    }
}
