//! The judging of draws, held against simulations and plain reference versions.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod chains;
mod criteria;
mod effective;
mod format;
mod precision;
mod rank;
mod special;
mod speed;
mod verdict;

use rand::SeedableRng;
use rand_distr::{Distribution, StandardNormal};
use rand_xoshiro::Xoshiro256PlusPlus;

use super::{Diagnosis, diagnose};

fn generator(seed: u64) -> Xoshiro256PlusPlus {
    Xoshiro256PlusPlus::seed_from_u64(seed)
}

fn normal(random: &mut Xoshiro256PlusPlus) -> f64 {
    StandardNormal.sample(random)
}

/// Stationary first-order autoregressions with correlation phi, mean 0 and sd 1.
fn autoregressions(random: &mut Xoshiro256PlusPlus, chains: usize, draws: usize, phi: f64) -> Vec<Vec<f64>> {
    let innovation = (1.0 - phi * phi).sqrt();
    let chain = |_| {
        let mut x = normal(random);
        let step = |_| {
            let now = x;
            x = phi * x + innovation * normal(random);
            now
        };
        (0..draws).map(step).collect()
    };
    (0..chains).map(chain).collect()
}

fn judged(chains: &[Vec<f64>]) -> Diagnosis {
    let slices: Vec<&[f64]> = chains.iter().map(Vec::as_slice).collect();
    diagnose(&slices).unwrap()
}
