//! Bernoulli, binomial, Poisson and negative binomial laws with their links.
//!
//! Binomial: C(n, x) p^x (1 - p)^(n - x); Bernoulli: n = 1. Poisson: mean^x exp(-mean) / x!. Negative binomial:
//! C(x + size - 1, x) (size / (size + mean))^size (mean / (size + mean))^x, variance mean + mean^2 / size.

use crate::numeric::saddle::{ln_binomial, ln_poisson};
use crate::numeric::special::{
    incomplete_beta_between, incomplete_gamma, ln_beta, ln_choose, ln_gamma, ln_normal_cdf, log1p_exp,
    logistic, normal_cdf,
};

/// From this count on the terms of the plain formulas are so large that their sum loses digits.
const MANY: f64 = 256.0;

/// Whether x is a count from 0 to n.
fn is_count(x: f64, n: f64) -> bool {
    x >= 0.0 && x <= n && x.fract() == 0.0
}

/// k times a log probability, where 0 times anything is 0.
fn times(k: f64, log: f64) -> f64 {
    if k == 0.0 { 0.0 } else { k * log }
}

/// log probability of the binomial.
#[inline]
pub(super) fn binomial(x: f64, n: f64, p: f64) -> f64 {
    if !is_count(x, n) {
        return f64::NEG_INFINITY;
    }
    if is_large(x, n, p, 1.0 - p) {
        return ln_binomial(x, n - x, p, 1.0 - p);
    }
    choose(n, x) + times(x, libm::log(p)) + times(n - x, libm::log1p(-p))
}

/// log probability of the binomial by its log-odds.
#[inline]
pub(super) fn binomial_log_odds(x: f64, n: f64, log_odds: f64) -> f64 {
    if !is_count(x, n) {
        return f64::NEG_INFINITY;
    }
    if x == n {
        return -times(n, log1p_exp(-log_odds));
    }
    if n >= MANY {
        let (p, q) = (logistic(log_odds), logistic(-log_odds));
        if is_large(x, n, p, q) {
            return ln_binomial(x, n - x, p, q);
        }
    }
    choose(n, x) + times(x, log_odds) - times(n, log1p_exp(log_odds))
}

/// log probability of the binomial by its probit.
#[inline]
pub(super) fn binomial_probit(x: f64, n: f64, probit: f64) -> f64 {
    if !is_count(x, n) {
        return f64::NEG_INFINITY;
    }
    if n >= MANY {
        let (p, q) = (normal_cdf(probit), normal_cdf(-probit));
        if is_large(x, n, p, q) {
            return ln_binomial(x, n - x, p, q);
        }
    }
    choose(n, x) + times(x, ln_normal_cdf(probit)) + times(n - x, ln_normal_cdf(-probit))
}

/// Whether the plain formula loses digits and Loader's applies.
fn is_large(x: f64, n: f64, p: f64, q: f64) -> bool {
    n >= MANY && x > 0.0 && x < n && p >= f64::MIN_POSITIVE && q >= f64::MIN_POSITIVE
}

fn choose(n: f64, k: f64) -> f64 {
    if k == 0.0 || k == n { 0.0 } else { ln_choose(n, k) }
}

/// log probability of the Poisson.
#[inline]
pub(super) fn poisson(x: f64, mean: f64) -> f64 {
    if !is_count(x, f64::INFINITY) {
        return f64::NEG_INFINITY;
    }
    if x >= MANY && mean >= f64::MIN_POSITIVE {
        return ln_poisson(x, mean);
    }
    times(x, libm::log(mean)) - mean - ln_gamma(x + 1.0)
}

/// log probability of the Poisson by its log mean.
#[inline]
pub(super) fn poisson_log(x: f64, log_mean: f64) -> f64 {
    if !is_count(x, f64::INFINITY) {
        return f64::NEG_INFINITY;
    }
    let mean = libm::exp(log_mean);
    if x >= MANY && mean >= f64::MIN_POSITIVE && mean.is_finite() {
        return ln_poisson(x, mean);
    }
    times(x, log_mean) - mean - ln_gamma(x + 1.0)
}

/// log probability of the negative binomial by its log mean.
#[inline]
pub(super) fn negative_binomial_log(x: f64, log_mean: f64, size: f64) -> f64 {
    if !is_count(x, f64::INFINITY) {
        return f64::NEG_INFINITY;
    }
    let log_size = libm::log(size);
    // log(1 + mean / size) and log(1 + size / mean).
    let (more, less) = (log1p_exp(log_mean - log_size), log1p_exp(log_size - log_mean));
    if x >= MANY && size >= MANY {
        let (p, q) = (libm::exp(-more), libm::exp(-less));
        if p >= f64::MIN_POSITIVE && q >= f64::MIN_POSITIVE {
            return libm::log(size / (size + x)) + ln_binomial(size, x, p, q);
        }
    }
    ln_ways(size, x) - size * more - times(x, less)
}

/// log(gamma(size + x) / (gamma(size) x!)): term by term for small counts, which keeps the digits of large sizes.
fn ln_ways(size: f64, x: f64) -> f64 {
    if x == 0.0 {
        0.0
    } else if x <= 64.0 {
        (0..x as u32).map(|k| libm::log(size + f64::from(k))).sum::<f64>() - ln_gamma(x + 1.0)
    } else {
        -libm::log(x) - ln_beta(size, x)
    }
}

/// Lower and upper tail (at most x, above x) of the binomial, from the probabilities of a success and of a failure.
pub(super) fn binomial_tails(x: f64, n: f64, (p, q): (f64, f64)) -> (f64, f64) {
    let k = x.floor();
    if k < 0.0 {
        (0.0, 1.0)
    } else if k >= n {
        (1.0, 0.0)
    } else {
        let (low, high) = incomplete_beta_between(k + 1.0, n - k, p, q);
        (high, low)
    }
}

/// Lower and upper tail of the Poisson.
pub(super) fn poisson_tails(x: f64, mean: f64) -> (f64, f64) {
    let k = x.floor();
    if k < 0.0 {
        return (0.0, 1.0);
    }
    if k == f64::INFINITY {
        return (1.0, 0.0);
    }
    let (low, high) = incomplete_gamma(k + 1.0, mean);
    (high, low)
}

/// Lower and upper tail of the negative binomial.
pub(super) fn negative_binomial_tails(x: f64, mean: f64, size: f64) -> (f64, f64) {
    let k = x.floor();
    if k < 0.0 {
        return (0.0, 1.0);
    }
    if k == f64::INFINITY {
        return (1.0, 0.0);
    }
    if mean == f64::INFINITY {
        return (0.0, 1.0);
    }
    incomplete_beta_between(size, k + 1.0, size / (size + mean), mean / (size + mean))
}
