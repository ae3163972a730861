//! The draws of a seed: the same for every number of threads, and pinned.
//!
//! A pinned hash changes whenever the draws of a seed change. That may be meant (another rule, another order of updates):
//! then the new hash goes in, and the change is told to users, because a run can no longer be repeated from its seed.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod common;

use common::with_tables;
use stook_sampler::bind::Bound;
use stook_sampler::draws::Draws;
use stook_sampler::run::{Options, Progress, Watch, fit};

struct Silent;

impl Watch for Silent {
    fn progress(&self, _: Progress) {}
}

/// Normal readings in groups: a joint block, a scale by slice, interweaving.
const NORMAL: &str = "group hive
table harvest { hive, honey : real }
unknown level : real follows normal(mean: 20, sd: 10)
unknown spread : positive follows half_normal(sd: 5)
unknown noise : positive follows half_normal(sd: 5)
unknown dev : real per hive follows normal(mean: 0, sd: spread)
response honey follows normal(mean: level + dev, sd: noise)
";

const HARVEST: &str =
    "hive,honey\nA,18.2\nA,19.9\nA,21.1\nB,24.0\nB,25.3\nC,15.8\nC,14.9\nC,17.0\nD,20.4\nD,22.6\n";

/// Counts: a conjugate update, updates by slice, a missing reading.
const COUNTS: &str = "group hive
table boards { hive, fallen : count with gaps, alive : yesno }
unknown rate : positive per hive follows gamma(shape: 2, rate: 0.5)
unknown odds : real follows student_t(df: 4, centre: 0, scale: 2)
response fallen follows poisson(mean: rate)
response alive follows bernoulli(log_odds: odds)
";

const BOARDS: &str = "hive,fallen,alive\nA,3,1\nA,5,1\nB,0,0\nB,,1\nC,9,1\nC,12,0\n";

fn draws(bound: &Bound, threads: usize) -> Draws {
    let options = Options { seed: 17, chains: 4, warmup: 200, draws: 250, threads };
    fit(bound, &options, &Silent).unwrap().draws
}

/// FNV-1a over the bits of all draws (Fowler, Noll and Vo; constants from memory).
fn hash(draws: &Draws) -> u64 {
    let bytes = draws.values.iter().flatten().flat_map(|value| value.to_bits().to_le_bytes());
    bytes.fold(0xcbf2_9ce4_8422_2325, |hash, byte| {
        (hash ^ u64::from(byte)).wrapping_mul(0x0000_0100_0000_01b3)
    })
}

#[test]
fn draws_do_not_depend_on_the_threads() {
    for (text, table) in [(NORMAL, HARVEST), (COUNTS, BOARDS)] {
        let (bound, _) = with_tables(text, &[table]);
        let one = draws(&bound, 1);
        for threads in [2, 4] {
            let other = draws(&bound, threads);
            for (scalar, (a, b)) in one.scalars.iter().zip(one.values.iter().zip(&other.values)) {
                let same = a.len() == b.len() && a.iter().zip(b).all(|(a, b)| a.to_bits() == b.to_bits());
                assert!(same, "{} with {threads} threads", scalar.title());
            }
        }
    }
}

#[test]
fn chains_and_seeds_give_other_draws() {
    let (bound, _) = with_tables(NORMAL, &[HARVEST]);
    let found = draws(&bound, 2);
    let chains = found.by_chain(0);
    assert!((1..4).all(|chain| chains[chain] != chains[0]));
    let options = Options { seed: 18, chains: 4, warmup: 200, draws: 250, threads: 2 };
    assert_ne!(hash(&fit(&bound, &options, &Silent).unwrap().draws), hash(&found));
}

#[test]
fn the_draws_of_a_seed_are_pinned() {
    let found = |text, table| hash(&draws(&with_tables(text, &[table]).0, 2));
    assert_eq!(
        [found(NORMAL, HARVEST), found(COUNTS, BOARDS)],
        [1_869_841_851_313_149_220, 8_730_753_792_034_520_855],
        "the draws of a seed changed: see the head of this file"
    );
}
