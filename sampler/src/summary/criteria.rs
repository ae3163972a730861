//! Information criteria, on the deviance scale: WAIC from pointwise log densities, and DIC.

use std::fmt;

use libm::{exp, log};
use serde::Serialize;

/// A pointwise variance of the log density above which WAIC is doubtful (Vehtari, Gelman and Gabry 2017).
pub const DOUBTFUL_VARIANCE: f64 = 0.4;

/// Why a criterion cannot be had.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum CriteriaError {
    /// There are more or fewer log densities than observations.
    WrongLength {
        /// The observations.
        observations: usize,
        /// The log densities.
        given: usize,
    },
    /// A log density is infinite or not a number.
    NonFinite {
        /// The observation, from 0.
        observation: usize,
        /// What stands there.
        value: f64,
    },
    /// The variance of the log densities needs two draws.
    TooFewDraws,
    /// There is no observation.
    NoObservations,
}

impl fmt::Display for CriteriaError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            CriteriaError::WrongLength { observations, given } => {
                write!(f, "{given} values for {observations} observations")
            }
            CriteriaError::NonFinite { observation, value } => {
                write!(f, "the log density of observation {} is {value}", observation + 1)
            }
            CriteriaError::TooFewDraws => write!(f, "WAIC needs at least two draws"),
            CriteriaError::NoObservations => write!(f, "there are no observations"),
        }
    }
}

impl std::error::Error for CriteriaError {}

/// Log densities of every observation, gathered draw by draw in memory that does not grow with the draws.
///
/// Gather each chain by itself and merge the chains in their order: the result then does not depend on
/// threads.
#[derive(Clone, Debug, PartialEq)]
pub struct Pointwise {
    draws: u64,
    points: Vec<Point>,
}

impl Pointwise {
    /// No draws yet.
    pub fn new(observations: usize) -> Pointwise {
        Pointwise { draws: 0, points: vec![Point::NONE; observations] }
    }

    /// How many draws have been added.
    pub fn draws(&self) -> u64 {
        self.draws
    }

    /// Adds one draw: the log density of every observation, in the order of the observations. On an error
    /// nothing is added.
    pub fn add(&mut self, log_densities: &[f64]) -> Result<(), CriteriaError> {
        self.same_length(log_densities.len())?;
        if let Some(observation) = log_densities.iter().position(|x| !x.is_finite()) {
            return Err(CriteriaError::NonFinite { observation, value: log_densities[observation] });
        }
        self.draws += 1;
        let draws = self.draws as f64;
        for (point, x) in self.points.iter_mut().zip(log_densities) {
            point.add(*x, draws);
        }
        Ok(())
    }

    /// Adds the draws of another one for the same observations.
    pub fn merge(&mut self, other: &Pointwise) -> Result<(), CriteriaError> {
        self.same_length(other.points.len())?;
        if other.draws == 0 {
            return Ok(());
        }
        let (mine, theirs) = (self.draws as f64, other.draws as f64);
        for (point, added) in self.points.iter_mut().zip(&other.points) {
            point.merge(added, mine, theirs);
        }
        self.draws += other.draws;
        Ok(())
    }

    /// WAIC of the draws gathered so far (Watanabe 2010), with the effective number of parameters as the sum
    /// of the posterior variances of the log densities (Gelman, Hwang and Vehtari 2014).
    pub fn waic(&self) -> Result<Waic, CriteriaError> {
        if self.draws < 2 {
            return Err(CriteriaError::TooFewDraws);
        }
        if self.points.is_empty() {
            return Err(CriteriaError::NoObservations);
        }
        let draws = self.draws as f64;
        let variances: Vec<f64> = self.points.iter().map(|point| point.squares / (draws - 1.0)).collect();
        let pointwise: Vec<f64> = self
            .points
            .iter()
            .zip(&variances)
            .map(|(point, variance)| -2.0 * (point.log_mean_density(draws) - variance))
            .collect();
        Ok(Waic {
            waic: pointwise.iter().sum(),
            p_waic: variances.iter().sum(),
            se: error_of_sum(&pointwise),
            doubtful: variances.iter().filter(|variance| **variance > DOUBTFUL_VARIANCE).count(),
            pointwise,
        })
    }

    fn same_length(&self, given: usize) -> Result<(), CriteriaError> {
        let observations = self.points.len();
        if given == observations { Ok(()) } else { Err(CriteriaError::WrongLength { observations, given }) }
    }
}

/// The log densities of one observation.
#[derive(Clone, Copy, Debug, PartialEq)]
struct Point {
    /// The largest.
    largest: f64,
    /// The sum of the densities, relative to the largest.
    sum: f64,
    /// Their mean.
    mean: f64,
    /// The sum of squared deviations from the mean.
    squares: f64,
}

impl Point {
    const NONE: Point = Point { largest: f64::NEG_INFINITY, sum: 0.0, mean: 0.0, squares: 0.0 };

    /// Adds a finite log density, the last of `draws` (Welford 1962 for mean and squares).
    fn add(&mut self, x: f64, draws: f64) {
        self.add_density(x, 1.0);
        let before = x - self.mean;
        self.mean += before / draws;
        self.squares += before * (x - self.mean);
    }

    /// Adds another one's log densities (Chan, Golub and LeVeque 1979 for mean and squares).
    fn merge(&mut self, other: &Point, mine: f64, theirs: f64) {
        self.add_density(other.largest, other.sum);
        let apart = other.mean - self.mean;
        self.mean += apart * theirs / (mine + theirs);
        self.squares += other.squares + apart * apart * mine * theirs / (mine + theirs);
    }

    /// Adds exp(x) times a weight to the densities.
    fn add_density(&mut self, x: f64, weight: f64) {
        if x <= self.largest {
            self.sum += weight * exp(x - self.largest);
        } else {
            self.sum = self.sum * exp(self.largest - x) + weight;
            self.largest = x;
        }
    }

    fn log_mean_density(&self, draws: f64) -> f64 {
        self.largest + log(self.sum / draws)
    }
}

/// WAIC, on the deviance scale: lower is better.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Waic {
    /// -2 (log pointwise predictive density - p_waic).
    pub waic: f64,
    /// The effective number of parameters.
    pub p_waic: f64,
    /// The standard error of `waic` over the observations: sqrt(n times the variance of the pointwise
    /// values). `None` for a single observation.
    pub se: Option<f64>,
    /// Observations whose log density has a posterior variance above [`DOUBTFUL_VARIANCE`].
    pub doubtful: usize,
    /// Each observation's part of `waic`.
    pub pointwise: Vec<f64>,
}

/// How much higher (worse) the first WAIC is than the second, which is of the same observations in the same
/// order.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Difference {
    /// First minus second.
    pub difference: f64,
    /// Its standard error over the observations, from the pointwise differences. `None` for a single
    /// observation.
    pub se: Option<f64>,
}

/// Compares two models on the same observations (Vehtari, Gelman and Gabry 2017).
pub fn difference(first: &Waic, second: &Waic) -> Result<Difference, CriteriaError> {
    let (observations, given) = (first.pointwise.len(), second.pointwise.len());
    if observations != given {
        return Err(CriteriaError::WrongLength { observations, given });
    }
    let differences: Vec<f64> = first.pointwise.iter().zip(&second.pointwise).map(|(a, b)| a - b).collect();
    Ok(Difference { difference: differences.iter().sum(), se: error_of_sum(&differences) })
}

/// sqrt(n times the sample variance).
fn error_of_sum(values: &[f64]) -> Option<f64> {
    let n = values.len() as f64;
    let mean = values.iter().sum::<f64>() / n;
    let squares = values.iter().map(|x| (x - mean) * (x - mean)).sum::<f64>();
    (n > 1.0).then(|| (n * squares / (n - 1.0)).sqrt())
}

/// The deviance information criterion (Spiegelhalter, Best, Carlin and van der Linde 2002).
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Dic {
    /// Mean deviance + p_dic; lower is better.
    pub dic: f64,
    /// The effective number of parameters: mean deviance - deviance at the mean.
    pub p_dic: f64,
}

/// DIC from the posterior mean of the deviance and the deviance at the posterior mean of the unknowns.
pub fn dic(mean_deviance: f64, deviance_at_mean: f64) -> Dic {
    let p_dic = mean_deviance - deviance_at_mean;
    Dic { dic: mean_deviance + p_dic, p_dic }
}
