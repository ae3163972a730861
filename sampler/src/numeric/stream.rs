//! The random stream of a chain.

use rand::{Rng, SeedableRng};
use rand_distr::{Distribution, Exp1, StandardNormal};
use rand_xoshiro::Xoshiro256PlusPlus;
use serde::{Deserialize, Serialize};

/// A random stream: xoshiro256++ (Blackman and Vigna 2021), seeded and then moved by as many long jumps as the chain's
/// number, so that no two chains share a stretch of 2^192 numbers.
#[derive(Clone, Debug, PartialEq, Eq, Serialize, Deserialize)]
pub struct Stream {
    generator: Xoshiro256PlusPlus,
}

impl Stream {
    /// The stream of a chain under a seed.
    pub fn new(seed: u64, chain: u64) -> Stream {
        let mut generator = Xoshiro256PlusPlus::seed_from_u64(seed);
        for _ in 0..chain {
            generator.long_jump();
        }
        Stream { generator }
    }

    /// 64 random bits.
    pub fn bits(&mut self) -> u64 {
        self.generator.next_u64()
    }

    /// Uniform in the open interval (0, 1): the midpoints of 2^52 equal parts.
    #[inline]
    pub fn uniform(&mut self) -> f64 {
        ((self.bits() >> 12) as f64 + 0.5) * (1.0 / 4_503_599_627_370_496.0)
    }

    /// Standard normal, by the ziggurat.
    #[inline]
    pub fn normal(&mut self) -> f64 {
        StandardNormal.sample(&mut self.generator)
    }

    /// Exponential of rate 1, by the ziggurat.
    #[inline]
    pub fn exponential(&mut self) -> f64 {
        Exp1.sample(&mut self.generator)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_draws_of_a_seed_are_pinned() {
        let mut stream = Stream::new(1, 0);
        assert_eq!(stream.bits(), 14_971_601_782_005_023_387);
        let mut second = Stream::new(1, 1);
        assert_ne!(second.bits(), 14_971_601_782_005_023_387);
    }

    #[test]
    fn uniform_numbers_stay_inside_the_open_interval() {
        let mut stream = Stream::new(7, 3);
        assert!((0..100_000).map(|_| stream.uniform()).all(|u| u > 0.0 && u < 1.0));
    }
}
