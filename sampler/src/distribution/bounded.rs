//! Beta and uniform laws.
//!
//! Beta: x^(a - 1) (1 - x)^(b - 1) / B(a, b). Uniform: 1 / (high - low), the ends included.

use crate::numeric::saddle::ln_binomial;
use crate::numeric::special::{incomplete_beta, ln_beta};

/// log density of the beta.
#[inline]
pub(super) fn ln_density(x: f64, a: f64, b: f64) -> f64 {
    if !(0.0..=1.0).contains(&x) {
        return f64::NEG_INFINITY;
    }
    // Where both terms are large their sum loses digits: Loader's form.
    if a.min(b) >= 256.0 && (f64::MIN_POSITIVE..1.0).contains(&x) {
        return libm::log(a / x * (b / (1.0 - x)) / (a + b)) + ln_binomial(a, b, x, 1.0 - x);
    }
    // 0 log 0 is 0: a flat side has a finite density at its end.
    let times_log = |power: f64, log: f64| if power == 0.0 { 0.0 } else { power * log };
    times_log(a - 1.0, libm::log(x)) + times_log(b - 1.0, libm::log1p(-x)) - ln_beta(a, b)
}

/// log density of the uniform.
#[inline]
pub(super) fn uniform_ln_density(x: f64, low: f64, high: f64) -> f64 {
    if x >= low && x <= high { -libm::log(high - low) } else { f64::NEG_INFINITY }
}

/// Lower and upper tail of the beta.
pub(super) fn tails(x: f64, a: f64, b: f64) -> (f64, f64) {
    incomplete_beta(a, b, x)
}

/// Lower and upper tail of the uniform.
pub(super) fn uniform_tails(x: f64, low: f64, high: f64) -> (f64, f64) {
    let width = high - low;
    (((x - low) / width).clamp(0.0, 1.0), ((high - x) / width).clamp(0.0, 1.0))
}
