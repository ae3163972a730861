//! Means, variances and supports.

use stook_lang::distribution::Law;

use super::link;
use crate::numeric::special::{ln_gamma, ln_gamma_ratio};

/// The mean; NaN where there is none.
pub fn mean(law: Law, p: &[f64]) -> f64 {
    match law {
        Law::Normal | Law::Laplace => p[0],
        Law::StudentT => exists(p[0] > 1.0, p[1]),
        Law::Cauchy | Law::HalfCauchy => f64::NAN,
        Law::Lognormal => libm::exp(p[0] + 0.5 * p[1] * p[1]),
        Law::Gamma => p[0] / p[1],
        Law::InverseGamma => exists(p[0] > 1.0, p[1] / (p[0] - 1.0)),
        Law::Exponential => 1.0 / p[0],
        Law::Weibull => p[1] * weibull_moment(p[0], 1.0),
        Law::Beta => p[0] / (p[0] + p[1]),
        Law::Uniform => 0.5 * (p[0] + p[1]),
        Law::HalfNormal => p[0] * std::f64::consts::FRAC_2_PI.sqrt(),
        Law::HalfStudentT => exists(p[0] > 1.0, half_student_mean(p[0], p[1])),
        Law::Bernoulli => p[0],
        Law::BernoulliLogOdds => link::from_log_odds(p[0]),
        Law::BernoulliProbit => link::from_probit(p[0]),
        Law::Binomial => p[0] * p[1],
        Law::BinomialLogOdds => p[0] * link::from_log_odds(p[1]),
        Law::BinomialProbit => p[0] * link::from_probit(p[1]),
        Law::Poisson | Law::NegativeBinomial => p[0],
        Law::PoissonLog | Law::NegativeBinomialLog => libm::exp(p[0]),
    }
}

/// The variance; infinite or NaN where there is none.
pub fn variance(law: Law, p: &[f64]) -> f64 {
    let of_share = |n: f64, share: f64| n * share * (1.0 - share);
    match law {
        Law::Normal => p[1] * p[1],
        Law::StudentT => student_variance(p[0], p[2]),
        Law::Laplace => 2.0 * p[1] * p[1],
        Law::Cauchy | Law::HalfCauchy => f64::NAN,
        Law::Lognormal => libm::expm1(p[1] * p[1]) * libm::exp(2.0 * p[0] + p[1] * p[1]),
        Law::Gamma => p[0] / (p[1] * p[1]),
        Law::InverseGamma => {
            let less = p[0] - 1.0;
            if p[0] > 2.0 { p[1] * p[1] / (less * less * (p[0] - 2.0)) } else { f64::INFINITY }
        }
        Law::Exponential => 1.0 / (p[0] * p[0]),
        Law::Weibull => {
            let first = weibull_moment(p[0], 1.0);
            p[1] * p[1] * (weibull_moment(p[0], 2.0) - first * first)
        }
        Law::Beta => {
            let total = p[0] + p[1];
            p[0] * p[1] / (total * total * (total + 1.0))
        }
        Law::Uniform => (p[1] - p[0]) * (p[1] - p[0]) / 12.0,
        Law::HalfNormal => p[0] * p[0] * (1.0 - std::f64::consts::FRAC_2_PI),
        Law::HalfStudentT => {
            let mean = half_student_mean(p[0], p[1]);
            if p[0] > 2.0 { student_variance(p[0], p[1]) - mean * mean } else { f64::INFINITY }
        }
        Law::Bernoulli => of_share(1.0, p[0]),
        Law::BernoulliLogOdds => of_share(1.0, link::from_log_odds(p[0])),
        Law::BernoulliProbit => of_share(1.0, link::from_probit(p[0])),
        Law::Binomial => of_share(p[0], p[1]),
        Law::BinomialLogOdds => of_share(p[0], link::from_log_odds(p[1])),
        Law::BinomialProbit => of_share(p[0], link::from_probit(p[1])),
        Law::Poisson => p[0],
        Law::PoissonLog => libm::exp(p[0]),
        Law::NegativeBinomial => p[0] + p[0] * p[0] / p[1],
        Law::NegativeBinomialLog => {
            let mean = libm::exp(p[0]);
            mean + mean * mean / p[1]
        }
    }
}

/// The smallest and largest value that a law can give.
pub fn support(law: Law, p: &[f64]) -> (f64, f64) {
    match law {
        Law::Normal | Law::StudentT | Law::Laplace | Law::Cauchy => (f64::NEG_INFINITY, f64::INFINITY),
        Law::Lognormal
        | Law::Gamma
        | Law::InverseGamma
        | Law::Exponential
        | Law::Weibull
        | Law::HalfNormal
        | Law::HalfCauchy
        | Law::HalfStudentT
        | Law::Poisson
        | Law::PoissonLog
        | Law::NegativeBinomial
        | Law::NegativeBinomialLog => (0.0, f64::INFINITY),
        Law::Beta | Law::Bernoulli | Law::BernoulliLogOdds | Law::BernoulliProbit => (0.0, 1.0),
        Law::Uniform => (p[0], p[1]),
        Law::Binomial | Law::BinomialLogOdds | Law::BinomialProbit => (0.0, p[0]),
    }
}

fn exists(exists: bool, value: f64) -> f64 {
    if exists { value } else { f64::NAN }
}

fn student_variance(df: f64, scale: f64) -> f64 {
    if df > 2.0 { scale * scale * df / (df - 2.0) } else { f64::INFINITY }
}

fn half_student_mean(df: f64, scale: f64) -> f64 {
    let ratio = ln_gamma_ratio(0.5 * df, 0.5);
    2.0 * scale * (df / std::f64::consts::PI).sqrt() * libm::exp(ratio) / (df - 1.0)
}

/// E (x / scale)^k = gamma(1 + k / shape).
fn weibull_moment(shape: f64, k: f64) -> f64 {
    libm::exp(ln_gamma(1.0 + k / shape))
}
