//! The draws in order: quantiles, average ranks, normal scores.

use super::effective::Spread;
use super::special::normal_quantile;

/// An event whose share of the draws a quantile stands for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Event {
    /// Being at most this.
    AtMost(f64),
    /// Being below this.
    Below(f64),
}

impl Event {
    /// Whether the event holds at a draw.
    pub(super) fn holds(self, x: f64) -> bool {
        match self {
            Event::AtMost(bound) => x <= bound,
            Event::Below(bound) => x < bound,
        }
    }
}

/// Draws in ascending order, each with its place in the order of sampling.
pub(super) struct Sorted {
    entries: Vec<(f64, u32)>,
}

impl Sorted {
    /// Sorts finite values.
    pub(super) fn new(values: &[f64]) -> Sorted {
        let mut entries: Vec<(f64, u32)> = values.iter().copied().zip(0..).collect();
        entries.sort_unstable_by(|a, b| a.0.total_cmp(&b.0));
        Sorted { entries }
    }

    /// How many draws.
    pub(super) fn len(&self) -> usize {
        self.entries.len()
    }

    /// The draw at a place of the ascending order, from 0.
    pub(super) fn at(&self, place: usize) -> f64 {
        self.entries[place].0
    }

    /// The quantile of type 7 of Hyndman and Fan (1996).
    pub(super) fn quantile(&self, p: f64) -> f64 {
        let place = (self.len() - 1) as f64 * p;
        let below = place as usize;
        let above = (below + 1).min(self.len() - 1);
        between(self.at(below), self.at(above), place - below as f64)
    }

    /// The median.
    pub(super) fn median(&self) -> f64 {
        self.quantile(0.5)
    }

    /// The event that the effective size of a quantile is taken from: being at most the quantile or, where
    /// that is sure because the highest value repeats down to the quantile, being below it. It is never sure
    /// unless all draws are equal.
    pub(super) fn event(&self, quantile: f64) -> Event {
        if quantile >= self.at(self.len() - 1) { Event::Below(quantile) } else { Event::AtMost(quantile) }
    }

    /// The normal scores of the average ranks, in the order of sampling.
    pub(super) fn normal_scores(&self, of: &NormalScores) -> Vec<f64> {
        of.in_order(&self.entries)
    }

    /// The same for the distances from the median (Vehtari et al. 2021).
    pub(super) fn folded_normal_scores(&self, of: &NormalScores) -> Vec<f64> {
        of.in_order(&self.folded())
    }

    /// The distances from the median in ascending order, merged from the two sides of the median.
    fn folded(&self) -> Vec<(f64, u32)> {
        let median = self.median();
        // Halved, so that the distance of the largest numbers stays finite.
        let distance = |entry: &(f64, u32)| ((0.5 * entry.0 - 0.5 * median).abs(), entry.1);
        let split = self.entries.partition_point(|entry| entry.0 <= median);
        let mut lower = self.entries[..split].iter().rev().map(distance).peekable();
        let mut upper = self.entries[split..].iter().map(distance).peekable();
        let mut folded = Vec::with_capacity(self.len());
        loop {
            let lower_first = match (lower.peek(), upper.peek()) {
                (Some(a), Some(b)) => a.0 <= b.0,
                (Some(_), None) => true,
                (None, Some(_)) => false,
                (None, None) => return folded,
            };
            folded.extend(if lower_first { lower.next() } else { upper.next() });
        }
    }
}

/// The point a share of the way from one number to a higher one.
fn between(low: f64, high: f64, share: f64) -> f64 {
    if low < 0.0 && high > 0.0 {
        // The difference could overflow.
        low * (1.0 - share) + high * share
    } else {
        low + (high - low) * share
    }
}

/// The normal scores of the ranks of so many draws: the standard normal quantile of (r - 3/8) / (S + 1/4) for
/// the rank r of S (Blom 1958; Vehtari et al. 2021).
pub(super) struct NormalScores {
    count: usize,
    /// Of the ranks from 1 to the middle; those above mirror them.
    lower: Vec<f64>,
}

impl NormalScores {
    /// For `count` draws.
    pub(super) fn new(count: usize) -> NormalScores {
        let lower = (1..=count.div_ceil(2)).map(|rank| score(rank as f64, count)).collect();
        NormalScores { count, lower }
    }

    /// The scores of entries in ascending order, laid in the order of sampling. Equal values have the mean of
    /// their ranks.
    fn in_order(&self, entries: &[(f64, u32)]) -> Vec<f64> {
        let mut scores = vec![0.0; entries.len()];
        let mut below = 0;
        for equal in entries.chunk_by(|a, b| a.0 == b.0) {
            let shared = match equal {
                [_] => self.next_after(below),
                // Their ranks run from below + 1 to below + their number.
                _ => score(below as f64 + 0.5 * (equal.len() + 1) as f64, self.count),
            };
            for (_, place) in equal {
                scores[*place as usize] = shared;
            }
            below += equal.len();
        }
        scores
    }

    /// The score of the rank below + 1.
    fn next_after(&self, below: usize) -> f64 {
        if below < self.lower.len() { self.lower[below] } else { -self.lower[self.count - 1 - below] }
    }
}

fn score(rank: f64, count: usize) -> f64 {
    normal_quantile((rank - 0.375) / (count as f64 + 0.25))
}

/// The larger R-hat of two spreads; one that does not vary says nothing.
pub(super) fn split_rhat(bulk: &Spread, folded: &Spread) -> Option<f64> {
    match (bulk.rhat(), folded.rhat()) {
        (Some(a), Some(b)) => Some(a.max(b)),
        (a, b) => a.or(b),
    }
}
