//! What the draws say: convergence, precision, quantiles, criteria.
//!
//! [`diagnose`] judges the draws of one scalar, [`converged`] applies a [`Rule`] to all scalars of a fit,
//! [`criteria`] compares fits, and [`mod@format`] prints numbers with the digits that their Monte Carlo error
//! bears. Everything here is a pure function of its arguments, and gives the same bits on every machine.

pub mod criteria;
mod diagnosis;
mod effective;
pub mod format;
mod fourier;
mod indicator;
mod precision;
mod rank;
mod series;
mod special;
#[cfg(test)]
mod tests;
mod verdict;

pub use diagnosis::{Diagnosis, DrawsError, PROBABILITIES, diagnose};
pub use verdict::{Failure, Rule, Verdict, converged};
