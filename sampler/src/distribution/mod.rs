//! Densities, distribution functions and draws of the laws.
//!
//! Every entry is a `match` over [`Law`] without a wildcard: the compiler names each place that a new law needs.

mod bounded;
mod check;
mod counts;
mod density;
mod draw;
mod gamma;
mod moments;
mod normal;
mod student;
mod tails;

pub use check::{ParameterProblem, check_params};
pub use density::{ln_density, ln_density_columns};
pub use draw::{draw, draw_between};
pub use moments::{mean, support, variance};
pub use tails::{cdf, ln_interval, quantile, sf};

/// The probability behind the log-odds and probit links, and the mean behind a log link.
mod link {
    use crate::numeric::special;

    pub(super) fn from_log_odds(log_odds: f64) -> f64 {
        special::logistic(log_odds)
    }

    pub(super) fn from_probit(probit: f64) -> f64 {
        special::normal_cdf(probit)
    }
}
