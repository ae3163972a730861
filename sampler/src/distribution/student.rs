//! Student-t and Cauchy laws and their halves, and the Laplace law.
//!
//! Student-t: gamma((df + 1) / 2) / (gamma(df / 2) sqrt(df pi) scale) (1 + z^2 / df)^(-(df + 1) / 2). Cauchy: df = 1.
//! Laplace: exp(-|z|) / (2 scale).

use std::f64::consts::{FRAC_1_PI, FRAC_2_PI, LN_2};

use crate::numeric::special::{LN_PI, incomplete_beta_between, ln_gamma_ratio, log1p_square};

/// log density of Student's t.
#[inline]
pub(super) fn ln_density(x: f64, df: f64, centre: f64, scale: f64) -> f64 {
    let z = (x - centre) / scale;
    ln_constant(df) - libm::log(scale) - 0.5 * (df + 1.0) * log1p_square(z / df.sqrt())
}

fn ln_constant(df: f64) -> f64 {
    ln_gamma_ratio(0.5 * df, 0.5) - 0.5 * (libm::log(df) + LN_PI)
}

/// log density of the half Student-t.
#[inline]
pub(super) fn half_ln_density(x: f64, df: f64, scale: f64) -> f64 {
    if x >= 0.0 { LN_2 + ln_density(x, df, 0.0, scale) } else { f64::NEG_INFINITY }
}

/// log density of the Cauchy.
#[inline]
pub(super) fn cauchy_ln_density(x: f64, centre: f64, scale: f64) -> f64 {
    -LN_PI - libm::log(scale) - log1p_square((x - centre) / scale)
}

/// log density of the half Cauchy.
#[inline]
pub(super) fn half_cauchy_ln_density(x: f64, scale: f64) -> f64 {
    if x >= 0.0 { LN_2 + cauchy_ln_density(x, 0.0, scale) } else { f64::NEG_INFINITY }
}

/// log density of the Laplace.
#[inline]
pub(super) fn laplace_ln_density(x: f64, centre: f64, scale: f64) -> f64 {
    -LN_2 - libm::log(scale) - ((x - centre) / scale).abs()
}

/// Lower and upper tail of Student's t (Abramowitz and Stegun 1964, 26.7.1).
pub(super) fn tails(x: f64, df: f64, centre: f64, scale: f64) -> (f64, f64) {
    let z = (x - centre) / scale;
    let outer = 0.5 * beyond(z, df).0;
    if z < 0.0 { (outer, 1.0 - outer) } else { (1.0 - outer, outer) }
}

/// The probabilities of a standard t beyond |z| on either side and within.
fn beyond(z: f64, df: f64) -> (f64, f64) {
    let square = z * z;
    let within = if square.is_finite() { square / (df + square) } else { 1.0 };
    incomplete_beta_between(0.5 * df, 0.5, df / (df + square), within)
}

/// Lower and upper tail of the half Student-t at x > 0.
pub(super) fn half_tails(x: f64, df: f64, scale: f64) -> (f64, f64) {
    let (high, low) = beyond(x / scale, df);
    (low, high)
}

/// Lower and upper tail of the half Cauchy at x > 0.
pub(super) fn half_cauchy_tails(x: f64, scale: f64) -> (f64, f64) {
    let z = x / scale;
    (FRAC_2_PI * libm::atan(z), FRAC_2_PI * libm::atan2(1.0, z))
}

/// Lower and upper tail of the Cauchy.
pub(super) fn cauchy_tails(x: f64, centre: f64, scale: f64) -> (f64, f64) {
    let z = (x - centre) / scale;
    let outer = FRAC_1_PI * libm::atan2(1.0, z.abs());
    if z < 0.0 { (outer, 1.0 - outer) } else { (1.0 - outer, outer) }
}

/// Lower and upper tail of the Laplace.
pub(super) fn laplace_tails(x: f64, centre: f64, scale: f64) -> (f64, f64) {
    let z = (x - centre) / scale;
    let outer = 0.5 * libm::exp(-z.abs());
    if z < 0.0 { (outer, 1.0 - outer) } else { (1.0 - outer, outer) }
}

/// The quantile of the Laplace.
pub(super) fn laplace_quantile(u: f64, centre: f64, scale: f64) -> f64 {
    if u < 0.5 { centre + scale * libm::log(2.0 * u) } else { centre - scale * libm::log(2.0 * (1.0 - u)) }
}
