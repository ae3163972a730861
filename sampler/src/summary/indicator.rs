//! The effective size of an event, with its half chains as bits: 64 draws to a word, exact counts.

use super::effective::{Spread, effective_size};
use super::rank::Event;
use super::series::{Layout, Series};

/// Lags below this are counted; a chain that needs more goes to the Fourier transform of a real series. For 4
/// chains of 2,500 draws a lag was measured at 0.1 µs and the transform at 190 µs.
const COUNTED_LAGS: usize = 2048;

/// Draws in a word.
const WORD: usize = u64::BITS as usize;

/// Whether an event holds at each draw.
pub(super) struct Indicator<'a> {
    values: &'a [f64],
    layout: Layout,
    event: Event,
    parts: Vec<Part>,
}

impl<'a> Indicator<'a> {
    /// The draws at which the event holds.
    pub(super) fn new(values: &'a [f64], layout: Layout, event: Event) -> Indicator<'a> {
        let parts = layout.halves(values).map(|part| Part::new(part, event)).collect();
        Indicator { values, layout, event, parts }
    }

    /// The effective size of the share of draws at which the event holds; `None` if it holds always or never.
    pub(super) fn effective_size(mut self) -> Option<f64> {
        let half = self.layout.half();
        let n = half as f64;
        let count = self.parts.len() as f64;
        let shares: Vec<f64> = self.parts.iter().map(|part| part.share(half)).collect();
        let within = shares.iter().map(|p| p * (1.0 - p)).sum::<f64>() * n / (n - 1.0) / count;
        let spread = Spread::new(within, &shares, half);
        let mut far = Vec::new();
        let covariances = (1..half).map(|lag| {
            if lag < COUNTED_LAGS {
                return self.parts.iter_mut().map(|part| part.next_products(lag, half)).sum::<f64>()
                    / (n * count);
            }
            if far.is_empty() {
                far = all_autocovariances(self.values, self.layout, self.event);
            }
            far[lag]
        });
        effective_size(&spread, covariances)
    }
}

fn all_autocovariances(values: &[f64], layout: Layout, event: Event) -> Vec<f64> {
    let holds: Vec<f64> = values.iter().map(|x| f64::from(u8::from(event.holds(*x)))).collect();
    Series::new(&holds, layout).all_autocovariances()
}

/// A half chain.
struct Part {
    /// The draws from the lowest bit of the first word on, and a word of zeros after them.
    words: Vec<u64>,
    /// Draws at which the event holds.
    ones: usize,
    /// Of these, the draws that have a partner later by the present lag.
    early: usize,
    /// Of these, the draws that have a partner earlier by the present lag.
    late: usize,
}

impl Part {
    fn new(values: &[f64], event: Event) -> Part {
        let word = |chunk: &[f64]| {
            chunk.iter().enumerate().fold(0, |word, (bit, x)| word | u64::from(event.holds(*x)) << bit)
        };
        let words: Vec<u64> = values.chunks(WORD).map(word).chain([0]).collect();
        let ones = words.iter().map(|word| word.count_ones() as usize).sum();
        Part { words, ones, early: ones, late: ones }
    }

    fn share(&self, half: usize) -> f64 {
        self.ones as f64 / half as f64
    }

    /// The sum of the products of centred draws that are `lag` apart. The lags are asked for in turn: 1, 2
    /// and on.
    ///
    /// With the mean m, sum (x_i - m)(x_j - m) = sum x_i x_j - m (sum x_i + sum x_j) + pairs m^2.
    fn next_products(&mut self, lag: usize, half: usize) -> f64 {
        self.early -= self.bit(half - lag);
        self.late -= self.bit(lag - 1);
        let mean = self.share(half);
        let sums = (self.early + self.late) as f64;
        self.both(lag) as f64 - mean * sums + (half - lag) as f64 * mean * mean
    }

    fn bit(&self, draw: usize) -> usize {
        (self.words[draw / WORD] >> (draw % WORD) & 1) as usize
    }

    /// How many pairs of draws `lag` apart have the event at both.
    fn both(&self, lag: usize) -> u32 {
        let later = &self.words[lag / WORD..];
        let shift = lag % WORD;
        // Shifted in two steps, since a shift by a whole word is not defined.
        let partner = |pair: &[u64; 2]| pair[0] >> shift | (pair[1] << 1) << (WORD - 1 - shift);
        let pairs = later.array_windows::<2>();
        self.words.iter().zip(pairs).map(|(word, pair)| (word & partner(pair)).count_ones()).sum()
    }
}
