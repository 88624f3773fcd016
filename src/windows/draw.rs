//! A fixed-seed stream of standard normal draws, the same on every target.

use crate::math;

/// Seeded generator (splitmix64; Steele, Lea and Flood, 2014) giving standard normals by inverting their distribution.
#[derive(Clone, Debug)]
pub struct Normals(u64);

impl Normals {
    /// A stream of its own for each seed.
    pub fn new(seed: u64) -> Normals {
        Normals(seed)
    }

    /// Next 53-bit fraction strictly between 0 and 1.
    pub fn unit(&mut self) -> f64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^= z >> 31;
        ((z >> 11) as f64 + 0.5) / 9_007_199_254_740_992.0
    }

    /// Next standard normal.
    pub fn normal(&mut self) -> f64 {
        math::normal_quantile(self.unit())
    }

    /// `n` standard normals.
    pub fn many(&mut self, n: usize) -> Vec<f64> {
        (0..n).map(|_| self.normal()).collect()
    }
}
