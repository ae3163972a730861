//! Gamma, inverse-gamma, exponential and Weibull laws.
//!
//! Gamma: rate^shape x^(shape - 1) exp(-rate x) / gamma(shape). Inverse gamma: the inverse of a gamma whose rate is the
//! scale. Exponential: gamma of shape 1. Weibull: (x / scale)^shape is exponential of rate 1.

use crate::numeric::saddle::ln_poisson;
use crate::numeric::special::{incomplete_gamma, ln_gamma};

/// From this shape on the terms of the plain formulas are so large that their sum loses digits.
const LARGE: f64 = 256.0;

/// log density of the gamma.
#[inline]
pub(super) fn ln_density(x: f64, shape: f64, rate: f64) -> f64 {
    if x == f64::INFINITY {
        f64::NEG_INFINITY
    } else if shape >= LARGE && is_plain_positive(x * rate) {
        libm::log(shape / x) + ln_poisson(shape, x * rate)
    } else if x > 0.0 {
        shape * libm::log(rate) - ln_gamma(shape) + (shape - 1.0) * libm::log(x) - rate * x
    } else if x == 0.0 && shape == 1.0 {
        libm::log(rate)
    } else if x == 0.0 && shape < 1.0 {
        f64::INFINITY
    } else {
        f64::NEG_INFINITY
    }
}

/// Whether a product came out positive, with all its digits and finite.
fn is_plain_positive(x: f64) -> bool {
    x >= f64::MIN_POSITIVE && x.is_finite()
}

/// log density of the inverse gamma.
#[inline]
pub(super) fn inverse_ln_density(x: f64, shape: f64, scale: f64) -> f64 {
    if shape >= LARGE && is_plain_positive(x) && is_plain_positive(scale / x) {
        libm::log(shape / x) + ln_poisson(shape, scale / x)
    } else if x > 0.0 {
        shape * libm::log(scale) - ln_gamma(shape) - (shape + 1.0) * libm::log(x) - scale / x
    } else {
        f64::NEG_INFINITY
    }
}

/// log density of the exponential.
#[inline]
pub(super) fn exponential_ln_density(x: f64, rate: f64) -> f64 {
    if x >= 0.0 { libm::log(rate) - rate * x } else { f64::NEG_INFINITY }
}

/// log density of the Weibull.
#[inline]
pub(super) fn weibull_ln_density(x: f64, shape: f64, scale: f64) -> f64 {
    if x == f64::INFINITY {
        f64::NEG_INFINITY
    } else if x > 0.0 {
        let log = libm::log(x / scale);
        libm::log(shape / scale) + (shape - 1.0) * log - libm::exp(shape * log)
    } else if x == 0.0 && shape == 1.0 {
        -libm::log(scale)
    } else if x == 0.0 && shape < 1.0 {
        f64::INFINITY
    } else {
        f64::NEG_INFINITY
    }
}

/// Lower and upper tail of the gamma.
pub(super) fn tails(x: f64, shape: f64, rate: f64) -> (f64, f64) {
    incomplete_gamma(shape, (x * rate).max(0.0))
}

/// Lower and upper tail of the inverse gamma.
pub(super) fn inverse_tails(x: f64, shape: f64, scale: f64) -> (f64, f64) {
    if x <= 0.0 {
        return (0.0, 1.0);
    }
    let (low, high) = incomplete_gamma(shape, scale / x);
    (high, low)
}

/// Lower and upper tail of the exponential.
pub(super) fn exponential_tails(x: f64, rate: f64) -> (f64, f64) {
    let passed = (x * rate).max(0.0);
    (-libm::expm1(-passed), libm::exp(-passed))
}

/// Lower and upper tail of the Weibull.
pub(super) fn weibull_tails(x: f64, shape: f64, scale: f64) -> (f64, f64) {
    exponential_tails(libm::pow((x / scale).max(0.0), shape), 1.0)
}

/// The quantile of the Weibull.
pub(super) fn weibull_quantile(u: f64, shape: f64, scale: f64) -> f64 {
    scale * libm::pow(-libm::log1p(-u), 1.0 / shape)
}
