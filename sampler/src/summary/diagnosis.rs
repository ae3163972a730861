//! The draws of one scalar, judged: where they lie, how sure that is, and whether the chains agree.
//!
//! The method is that of Vehtari, Gelman, Simpson, Carpenter and Bürkner (2021), "Rank-normalization,
//! folding, and localization: an improved R-hat for assessing convergence of MCMC", Bayesian Analysis 16(2).

use std::fmt;

use serde::Serialize;

use super::indicator::Indicator;
use super::precision::{mean_error, quantile_error, sd_error};
use super::rank::{NormalScores, Sorted, split_rhat};
use super::series::{Layout, Series};

/// The probabilities of the quantiles of a [`Diagnosis`], in their order.
pub const PROBABILITIES: [f64; 5] = [0.025, 0.25, 0.5, 0.75, 0.975];

/// The fewest draws of a chain for which the two halves of a chain have a variance each.
const FEWEST_DRAWS: usize = 4;

/// What the draws of one scalar say.
///
/// `None` stands for "not defined", never for zero or for a bad value:
/// - fewer than 4 draws a chain: no errors, no R-hat, no effective sizes; with one draw in all, no sd;
/// - all draws equal ([`Diagnosis::is_constant`]): no R-hat and no effective sizes, as there is no variation
///   to compare; the sd and all Monte Carlo errors are 0. A given or a derived constant looks so.
///
/// Chains that stand still at different values have an infinite R-hat.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Diagnosis {
    /// How many chains.
    pub chains: usize,
    /// Draws of each chain.
    pub draws: usize,
    /// Mean of all draws.
    pub mean: f64,
    /// Monte Carlo standard error of the mean: sd / sqrt(effective size of the draws themselves).
    pub mean_mcse: Option<f64>,
    /// Sample standard deviation of all draws (divisor: draws - 1).
    pub sd: Option<f64>,
    /// Monte Carlo standard error of the sd, by the delta method from the mean of the squared deviations.
    pub sd_mcse: Option<f64>,
    /// 2.5 % quantile of all draws together; all quantiles are of type 7 of Hyndman and Fan (1996): linear
    /// between the order statistics, with the k-th of S at probability (k - 1) / (S - 1).
    pub q2_5: f64,
    /// 25 % quantile.
    pub q25: f64,
    /// Median.
    pub q50: f64,
    /// 75 % quantile.
    pub q75: f64,
    /// 97.5 % quantile.
    pub q97_5: f64,
    /// Monte Carlo standard errors of the five quantiles, in the order of [`PROBABILITIES`]. 0 where the
    /// neighbouring draws are equal, as in a discrete scalar.
    pub quantile_mcse: Option<[f64; 5]>,
    /// Split R-hat of the rank-normalised draws or of their folded distances from the median, whichever is
    /// larger.
    pub split_rhat: Option<f64>,
    /// Effective size of the rank-normalised draws: how well the bulk is known.
    pub bulk_ess: Option<f64>,
    /// The smaller effective size of being at most the 5 % and the 95 % quantile: how well the tails are
    /// known.
    pub tail_ess: Option<f64>,
}

impl Diagnosis {
    /// Whether all draws of all chains, two or more, are equal.
    pub fn is_constant(&self) -> bool {
        self.sd == Some(0.0)
    }

    /// Whether the chains have fewer draws than it takes to judge them.
    pub fn is_short(&self) -> bool {
        self.draws < FEWEST_DRAWS
    }

    /// The five quantiles, in the order of [`PROBABILITIES`].
    pub fn quantiles(&self) -> [f64; 5] {
        [self.q2_5, self.q25, self.q50, self.q75, self.q97_5]
    }
}

/// Why draws cannot be judged.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum DrawsError {
    /// There are no chains, or they have no draws.
    NoDraws,
    /// A chain has another number of draws than the first one.
    UnequalChains {
        /// The chain, from 0.
        chain: usize,
        /// Its draws.
        draws: usize,
        /// The draws of the first chain.
        first: usize,
    },
    /// A draw is infinite or not a number.
    NonFinite {
        /// The chain, from 0.
        chain: usize,
        /// The draw, from 0.
        draw: usize,
        /// What stands there.
        value: f64,
    },
}

impl fmt::Display for DrawsError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            DrawsError::NoDraws => write!(f, "there are no draws to judge"),
            DrawsError::UnequalChains { chain, draws, first } => {
                write!(f, "chain {} has {draws} draws, the first chain {first}", chain + 1)
            }
            DrawsError::NonFinite { chain, draw, value } => {
                write!(f, "draw {} of chain {} is {value}", draw + 1, chain + 1)
            }
        }
    }
}

impl std::error::Error for DrawsError {}

/// Judges the draws of one scalar, a slice for each chain in the order of sampling.
///
/// The chains have the same number of draws, all finite; otherwise a [`DrawsError`] says what is wrong.
pub fn diagnose(chains: &[&[f64]]) -> Result<Diagnosis, DrawsError> {
    let layout = check(chains)?;
    let values = chains.concat();
    let sorted = Sorted::new(&values);
    let standard = Standard::new(&values, sorted.median());
    let quantiles = PROBABILITIES.map(|p| sorted.quantile(p));
    let [q2_5, q25, q50, q75, q97_5] = quantiles;

    let mut diagnosis = Diagnosis {
        chains: layout.chains,
        draws: layout.draws,
        mean: standard.restored_mean(),
        mean_mcse: None,
        sd: standard.sd.map(|sd| sd * standard.scale),
        sd_mcse: None,
        q2_5,
        q25,
        q50,
        q75,
        q97_5,
        quantile_mcse: None,
        split_rhat: None,
        bulk_ess: None,
        tail_ess: None,
    };
    let Some(sd) = standard.sd.filter(|_| !diagnosis.is_short()) else {
        return Ok(diagnosis);
    };
    if sd == 0.0 {
        diagnosis.mean_mcse = Some(0.0);
        diagnosis.sd_mcse = Some(0.0);
        diagnosis.quantile_mcse = Some([0.0; 5]);
        return Ok(diagnosis);
    }
    diagnosis.mean_mcse = Some(standard.scale * mean_error(&standard.deviations, sd, layout));
    diagnosis.sd_mcse = Some(standard.scale * sd_error(&standard.deviations, standard.mean, sd, layout));
    let effective_below = |q: f64| Indicator::new(&values, layout, sorted.event(q)).effective_size();
    diagnosis.quantile_mcse = Some(std::array::from_fn(|i| match effective_below(quantiles[i]) {
        Some(effective) => quantile_error(&sorted, PROBABILITIES[i], effective),
        None => 0.0,
    }));
    let scores = NormalScores::new(sorted.len());
    let bulk = Series::new(&sorted.normal_scores(&scores), layout);
    let folded = Series::new(&sorted.folded_normal_scores(&scores), layout);
    diagnosis.split_rhat = split_rhat(&bulk.spread(), &folded.spread());
    diagnosis.bulk_ess = bulk.effective_size();
    let tails = [0.05, 0.95].map(|p| effective_below(sorted.quantile(p)));
    diagnosis.tail_ess = tails[0].zip(tails[1]).map(|(low, high)| low.min(high));
    Ok(diagnosis)
}

fn check(chains: &[&[f64]]) -> Result<Layout, DrawsError> {
    let first = chains.first().map_or(0, |chain| chain.len());
    if first == 0 {
        return Err(DrawsError::NoDraws);
    }
    for (chain, values) in chains.iter().enumerate() {
        if values.len() != first {
            return Err(DrawsError::UnequalChains { chain, draws: values.len(), first });
        }
        if let Some(draw) = values.iter().position(|x| !x.is_finite()) {
            return Err(DrawsError::NonFinite { chain, draw, value: values[draw] });
        }
    }
    Ok(Layout { chains: chains.len(), draws: first })
}

/// The draws as deviations from their median in a unit of their own size, so that no square overflows or
/// vanishes and a constant has deviations of exactly zero.
struct Standard {
    deviations: Vec<f64>,
    median: f64,
    scale: f64,
    mean: f64,
    sd: Option<f64>,
}

impl Standard {
    fn new(values: &[f64], median: f64) -> Standard {
        // Halving keeps the difference of the largest numbers finite; the scale, a power of two, is exact.
        let half_deviation = |x: &f64| 0.5 * x - 0.5 * median;
        let widest = values.iter().map(|x| half_deviation(x).abs()).fold(0.0, f64::max);
        let half_scale = power_of_two_below(widest);
        let deviations: Vec<f64> = values.iter().map(|x| half_deviation(x) / half_scale).collect();
        let count = deviations.len() as f64;
        let mean = deviations.iter().sum::<f64>() / count;
        let squares = deviations.iter().map(|y| (y - mean) * (y - mean)).sum::<f64>();
        let sd = (count > 1.0).then(|| (squares / (count - 1.0)).sqrt());
        Standard { deviations, median, scale: 2.0 * half_scale, mean, sd }
    }

    fn restored_mean(&self) -> f64 {
        self.median + self.mean * self.scale
    }
}

/// The largest power of two that is at most `x`, held so far inside the range of doubles that twice it is one
/// too.
fn power_of_two_below(x: f64) -> f64 {
    const EXPONENT_BITS: u64 = 0x7ff0_0000_0000_0000;
    const LARGEST: f64 = f64::from_bits(2045 << 52);
    f64::from_bits(x.to_bits() & EXPONENT_BITS).clamp(f64::MIN_POSITIVE, LARGEST)
}
