//! Distribution functions, masses of intervals and quantiles.

use stook_lang::distribution::Law;

use super::{bounded, counts, gamma, link, normal, student};
use crate::numeric::special;

/// The probabilities of at most x and of more than x, each accurate where it is small.
fn tails(law: Law, x: f64, p: &[f64]) -> (f64, f64) {
    match law {
        Law::Normal => normal::tails(x, p[0], p[1]),
        Law::StudentT => student::tails(x, p[0], p[1], p[2]),
        Law::Laplace => student::laplace_tails(x, p[0], p[1]),
        Law::Cauchy => student::cauchy_tails(x, p[0], p[1]),
        Law::Lognormal if x > 0.0 => normal::tails(libm::log(x), p[0], p[1]),
        Law::Lognormal => (0.0, 1.0),
        Law::Gamma => gamma::tails(x, p[0], p[1]),
        Law::InverseGamma => gamma::inverse_tails(x, p[0], p[1]),
        Law::Exponential => gamma::exponential_tails(x, p[0]),
        Law::Weibull => gamma::weibull_tails(x, p[0], p[1]),
        Law::Beta => bounded::tails(x, p[0], p[1]),
        Law::Uniform => bounded::uniform_tails(x, p[0], p[1]),
        Law::HalfNormal | Law::HalfCauchy | Law::HalfStudentT if x <= 0.0 => (0.0, 1.0),
        Law::HalfNormal => normal::half_tails(x, p[0]),
        Law::HalfCauchy => student::half_cauchy_tails(x, p[0]),
        Law::HalfStudentT => student::half_tails(x, p[0], p[1]),
        Law::Bernoulli => counts::binomial_tails(x, 1.0, (p[0], 1.0 - p[0])),
        Law::BernoulliLogOdds => counts::binomial_tails(x, 1.0, both(link::from_log_odds, p[0])),
        Law::BernoulliProbit => counts::binomial_tails(x, 1.0, both(link::from_probit, p[0])),
        Law::Binomial => counts::binomial_tails(x, p[0], (p[1], 1.0 - p[1])),
        Law::BinomialLogOdds => counts::binomial_tails(x, p[0], both(link::from_log_odds, p[1])),
        Law::BinomialProbit => counts::binomial_tails(x, p[0], both(link::from_probit, p[1])),
        Law::Poisson => counts::poisson_tails(x, p[0]),
        Law::PoissonLog => counts::poisson_tails(x, libm::exp(p[0])),
        Law::NegativeBinomial => counts::negative_binomial_tails(x, p[0], p[1]),
        Law::NegativeBinomialLog => counts::negative_binomial_tails(x, libm::exp(p[0]), p[1]),
    }
}

/// The probabilities of a success and of a failure behind a symmetric link, each with its digits.
fn both(probability: fn(f64) -> f64, location: f64) -> (f64, f64) {
    (probability(location), probability(-location))
}

/// The probability of at most x.
pub fn cdf(law: Law, x: f64, p: &[f64]) -> f64 {
    match x {
        f64::INFINITY => 1.0,
        f64::NEG_INFINITY => 0.0,
        _ => tails(law, x, p).0,
    }
}

/// The probability of more than x.
pub fn sf(law: Law, x: f64, p: &[f64]) -> f64 {
    match x {
        f64::INFINITY => 0.0,
        f64::NEG_INFINITY => 1.0,
        _ => tails(law, x, p).1,
    }
}

/// The log of the probability of `low <= x <= high`: what a truncated density is divided by.
pub fn ln_interval(law: Law, low: f64, high: f64, p: &[f64]) -> f64 {
    if low == f64::NEG_INFINITY && high == f64::INFINITY {
        return 0.0;
    }
    if low > high {
        return f64::NEG_INFINITY;
    }
    match law {
        Law::Normal => return normal::ln_interval(low, high, p[0], p[1]),
        Law::Lognormal => {
            let end = |x: f64| libm::log(x.max(0.0));
            return normal::ln_interval(end(low), end(high), p[0], p[1]);
        }
        Law::HalfNormal => {
            return std::f64::consts::LN_2 + normal::ln_interval(low.max(0.0), high, 0.0, p[0]);
        }
        _ => {}
    }
    // The lower end of a discrete law is included.
    let below = if law.is_discrete() { low.ceil() - 1.0 } else { low };
    let (upper_low, upper_high) = (sf(law, below, p), sf(law, high, p));
    let mass = if upper_low < 0.5 { upper_low - upper_high } else { cdf(law, high, p) - cdf(law, below, p) };
    libm::log(mass)
}

/// The smallest x whose probability of at most x reaches u.
pub fn quantile(law: Law, u: f64, p: &[f64]) -> f64 {
    match law {
        Law::Normal => return normal::quantile(u, p[0], p[1]),
        Law::Lognormal => return libm::exp(normal::quantile(u, p[0], p[1])),
        Law::HalfNormal if u > 0.25 => return -normal::quantile(0.5 * (1.0 - u), 0.0, p[0]),
        Law::Laplace => return student::laplace_quantile(u, p[0], p[1]),
        Law::Cauchy => return p[0] + p[1] * special::cauchy_quantile(u),
        Law::HalfCauchy => return p[0] * special::half_cauchy_quantile(u),
        Law::Uniform => return p[0] + u * (p[1] - p[0]),
        Law::Exponential => return -libm::log1p(-u) / p[0],
        Law::Weibull => return gamma::weibull_quantile(u, p[0], p[1]),
        _ => {}
    }
    let (low, high) = super::support(law, p);
    if law.is_discrete() {
        return whole_quantile(law, u, low, high, p);
    }
    searched(low, high, |x| cdf(law, x, p) >= u)
}

/// The smallest number between two ends at which a monotone condition holds: bisection on the order of the doubles.
pub(super) fn searched(low: f64, high: f64, holds: impl Fn(f64) -> bool) -> f64 {
    let (mut below, mut above) = (ordered(low.max(f64::MIN)), ordered(high.min(f64::MAX)));
    while above - below > 1 {
        let middle = below + (above - below) / 2;
        if holds(unordered(middle)) {
            above = middle;
        } else {
            below = middle;
        }
    }
    unordered(above)
}

/// The position of a double among all doubles.
fn ordered(x: f64) -> i128 {
    let bits = x.to_bits();
    if bits >> 63 == 0 { i128::from(bits) } else { -i128::from(bits & !(1 << 63)) }
}

fn unordered(position: i128) -> f64 {
    if position >= 0 { f64::from_bits(position as u64) } else { -f64::from_bits((-position) as u64) }
}

fn whole_quantile(law: Law, u: f64, low: f64, high: f64, p: &[f64]) -> f64 {
    let (mut below, mut above) = (low - 1.0, low.max(1.0));
    while above < high && cdf(law, above, p) < u {
        below = above;
        above *= 2.0;
    }
    above = above.min(high);
    while above - below > 1.0 {
        let middle = ((below + above) / 2.0).floor();
        if cdf(law, middle, p) >= u {
            above = middle;
        } else {
            below = middle;
        }
    }
    above
}
