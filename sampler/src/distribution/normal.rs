//! Normal, lognormal and half-normal laws.
//!
//! Normal: exp(-z^2 / 2) / (sd sqrt(2 pi)) with z = (x - mean) / sd. Lognormal: the exponential of a normal. Half-normal:
//! the absolute value of a normal with mean 0.

use crate::numeric::special::{HALF_LN_2PI, ln_normal_cdf, normal_cdf, normal_quantile};

/// log density of the normal.
#[inline]
pub(super) fn ln_density(x: f64, mean: f64, sd: f64) -> f64 {
    let z = (x - mean) / sd;
    -0.5 * z * z - libm::log(sd) - HALF_LN_2PI
}

/// log density of the lognormal.
#[inline]
pub(super) fn lognormal_ln_density(x: f64, log_mean: f64, log_sd: f64) -> f64 {
    if x > 0.0 {
        let log = libm::log(x);
        ln_density(log, log_mean, log_sd) - log
    } else {
        f64::NEG_INFINITY
    }
}

/// log density of the half-normal.
#[inline]
pub(super) fn half_ln_density(x: f64, sd: f64) -> f64 {
    if x >= 0.0 { ln_density(x, 0.0, sd) + std::f64::consts::LN_2 } else { f64::NEG_INFINITY }
}

/// Lower and upper tail of the normal.
pub(super) fn tails(x: f64, mean: f64, sd: f64) -> (f64, f64) {
    let z = (x - mean) / sd;
    (normal_cdf(z), normal_cdf(-z))
}

/// Lower and upper tail of the half-normal at x > 0.
pub(super) fn half_tails(x: f64, sd: f64) -> (f64, f64) {
    let z = x / sd * std::f64::consts::FRAC_1_SQRT_2;
    (libm::erf(z), libm::erfc(z))
}

/// log of the mass of the normal between two ends, accurate far in the tails.
pub(super) fn ln_interval(low: f64, high: f64, mean: f64, sd: f64) -> f64 {
    let (a, b) = ((low - mean) / sd, (high - mean) / sd);
    let (middle, width) = (0.5 * (a + b), b - a);
    if width > 0.0 && width * middle.abs().max(1.0) < 1e-3 {
        // The difference of two nearly equal probabilities has few digits: the midpoint rule with its first correction.
        let bend = (middle * middle - 1.0) * width * width / 24.0;
        return libm::log(width) - 0.5 * middle * middle - HALF_LN_2PI + libm::log1p(bend);
    }
    if a > 0.0 {
        crate::numeric::special::log_difference(ln_normal_cdf(-a), ln_normal_cdf(-b))
    } else {
        crate::numeric::special::log_difference(ln_normal_cdf(b), ln_normal_cdf(a))
    }
}

/// The quantile of the normal.
pub(super) fn quantile(u: f64, mean: f64, sd: f64) -> f64 {
    mean + sd * normal_quantile(u)
}
