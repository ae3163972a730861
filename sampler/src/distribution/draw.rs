//! Draws, whole and truncated.

use stook_lang::distribution::Law;

use super::tails::searched;
use super::{cdf, link, quantile, sf, support};
use crate::numeric::special;
use crate::numeric::stream::Stream;

/// A draw from a law whose parameters are in their domain.
pub fn draw(law: Law, stream: &mut Stream, p: &[f64]) -> f64 {
    match law {
        Law::Normal => p[0] + p[1] * stream.normal(),
        Law::StudentT => p[1] + p[2] * student(stream, p[0]),
        Law::Laplace => {
            let size = p[1] * stream.exponential();
            if stream.uniform() < 0.5 { p[0] - size } else { p[0] + size }
        }
        Law::Cauchy => p[0] + p[1] * special::cauchy_quantile(stream.uniform()),
        Law::Lognormal => libm::exp(p[0] + p[1] * stream.normal()),
        Law::Gamma => stream.gamma(p[0]) / p[1],
        Law::InverseGamma => p[1] / stream.gamma(p[0]),
        Law::Exponential => stream.exponential() / p[0],
        Law::Weibull => p[1] * libm::pow(stream.exponential(), 1.0 / p[0]),
        Law::Beta => stream.beta(p[0], p[1]),
        Law::Uniform => p[0] + (p[1] - p[0]) * stream.uniform(),
        Law::HalfNormal => p[0] * stream.normal().abs(),
        Law::HalfCauchy => p[0] * special::cauchy_quantile(stream.uniform()).abs(),
        Law::HalfStudentT => p[1] * student(stream, p[0]).abs(),
        Law::Bernoulli => stream.binomial(1.0, p[0]),
        Law::BernoulliLogOdds => stream.binomial(1.0, link::from_log_odds(p[0])),
        Law::BernoulliProbit => stream.binomial(1.0, link::from_probit(p[0])),
        Law::Binomial => stream.binomial(p[0], p[1]),
        Law::BinomialLogOdds => stream.binomial(p[0], link::from_log_odds(p[1])),
        Law::BinomialProbit => stream.binomial(p[0], link::from_probit(p[1])),
        Law::Poisson => stream.poisson(p[0]),
        Law::PoissonLog => stream.poisson(libm::exp(p[0])),
        Law::NegativeBinomial => mixed_poisson(stream, p[0], p[1]),
        Law::NegativeBinomialLog => mixed_poisson(stream, libm::exp(p[0]), p[1]),
    }
}

fn student(stream: &mut Stream, df: f64) -> f64 {
    stream.normal() / (stream.gamma(0.5 * df) / (0.5 * df)).sqrt()
}

/// A negative binomial is a Poisson whose mean is a gamma.
fn mixed_poisson(stream: &mut Stream, mean: f64, size: f64) -> f64 {
    let mean = mean * stream.gamma(size) / size;
    stream.poisson(mean)
}

/// A draw from a law between two ends, both included; NaN where the interval holds no mass that a double can tell.
pub fn draw_between(law: Law, stream: &mut Stream, low: f64, high: f64, p: &[f64]) -> f64 {
    let (first, last) = support(law, p);
    let (low, high) = (low.max(first), high.min(last));
    if low > high {
        return f64::NAN;
    }
    match law {
        Law::Normal => {
            return (p[0] + p[1] * stream.normal_between((low - p[0]) / p[1], (high - p[0]) / p[1]))
                .clamp(low, high);
        }
        Law::HalfNormal => return (p[0] * stream.normal_between(low / p[0], high / p[0])).clamp(low, high),
        Law::Lognormal => {
            let end = |x: f64| (libm::log(x) - p[0]) / p[1];
            return libm::exp(p[0] + p[1] * stream.normal_between(end(low), end(high))).clamp(low, high);
        }
        Law::Uniform => return low + (high - low) * stream.uniform(),
        _ => {}
    }
    by_inversion(law, stream, low, high, p)
}

/// Inversion in the tail in which the interval lies, where the tail's probability keeps its digits.
fn by_inversion(law: Law, stream: &mut Stream, low: f64, high: f64, p: &[f64]) -> f64 {
    let below = if law.is_discrete() { low.ceil() - 1.0 } else { low };
    let u = stream.uniform();
    let (upper_low, upper_high) = (sf(law, below, p), sf(law, high, p));
    if upper_low < 0.5 {
        let wanted = upper_high + u * (upper_low - upper_high);
        if upper_low <= upper_high {
            return f64::NAN;
        }
        if law.is_discrete() {
            return smallest_whole(below, high, |x| sf(law, x, p) <= wanted);
        }
        return searched(low, high, |x| sf(law, x, p) <= wanted).clamp(low, high);
    }
    let (lower_low, lower_high) = (cdf(law, below, p), cdf(law, high, p));
    if lower_low >= lower_high {
        return f64::NAN;
    }
    let wanted = lower_low + u * (lower_high - lower_low);
    if law.is_discrete() {
        return smallest_whole(below, high, |x| cdf(law, x, p) >= wanted);
    }
    quantile(law, wanted, p).clamp(low, high)
}

/// The smallest whole number above `below` at which a monotone condition holds, at most `high`.
fn smallest_whole(below: f64, high: f64, holds: impl Fn(f64) -> bool) -> f64 {
    let mut step = 1.0;
    let (mut below, mut above) = (below, below + 1.0);
    while above < high && !holds(above) {
        below = above;
        step *= 2.0;
        above += step;
    }
    above = above.min(high.floor());
    while above - below > 1.0 {
        let middle = ((below + above) / 2.0).floor();
        if holds(middle) {
            above = middle;
        } else {
            below = middle;
        }
    }
    above
}
