//! Log densities, one by one and by columns.

use stook_lang::distribution::Law;

use super::{bounded, check_params, counts, gamma, normal, student};

/// The log density (or probability) of a law at x, every normalising term included; -inf outside the support and for
/// parameters outside their domain.
#[inline]
pub fn ln_density(law: Law, x: f64, p: &[f64]) -> f64 {
    if check_params(law, p).is_err() {
        return f64::NEG_INFINITY;
    }
    unchecked(law, x, p)
}

#[inline(always)]
fn unchecked(law: Law, x: f64, p: &[f64]) -> f64 {
    match law {
        Law::Normal => normal::ln_density(x, p[0], p[1]),
        Law::StudentT => student::ln_density(x, p[0], p[1], p[2]),
        Law::Laplace => student::laplace_ln_density(x, p[0], p[1]),
        Law::Cauchy => student::cauchy_ln_density(x, p[0], p[1]),
        Law::Lognormal => normal::lognormal_ln_density(x, p[0], p[1]),
        Law::Gamma => gamma::ln_density(x, p[0], p[1]),
        Law::InverseGamma => gamma::inverse_ln_density(x, p[0], p[1]),
        Law::Exponential => gamma::exponential_ln_density(x, p[0]),
        Law::Weibull => gamma::weibull_ln_density(x, p[0], p[1]),
        Law::Beta => bounded::ln_density(x, p[0], p[1]),
        Law::Uniform => bounded::uniform_ln_density(x, p[0], p[1]),
        Law::HalfNormal => normal::half_ln_density(x, p[0]),
        Law::HalfCauchy => student::half_cauchy_ln_density(x, p[0]),
        Law::HalfStudentT => student::half_ln_density(x, p[0], p[1]),
        Law::Bernoulli => counts::binomial(x, 1.0, p[0]),
        Law::BernoulliLogOdds => counts::binomial_log_odds(x, 1.0, p[0]),
        Law::BernoulliProbit => counts::binomial_probit(x, 1.0, p[0]),
        Law::Binomial => counts::binomial(x, p[0], p[1]),
        Law::BinomialLogOdds => counts::binomial_log_odds(x, p[0], p[1]),
        Law::BinomialProbit => counts::binomial_probit(x, p[0], p[1]),
        Law::Poisson => counts::poisson(x, p[0]),
        Law::PoissonLog => counts::poisson_log(x, p[0]),
        Law::NegativeBinomial => counts::negative_binomial_log(x, libm::log(p[0]), p[1]),
        Law::NegativeBinomialLog => counts::negative_binomial_log(x, p[0], p[1]),
    }
}

/// The log density of each element: columns of equal length, those of parameters that the law does not have empty.
pub fn ln_density_columns(law: Law, x: &[f64], p: [&[f64]; 3], out: &mut [f64]) {
    // The law is the same for the whole column: naming it in each arm lets the compiler drop the inner match.
    macro_rules! columns {
        ($($law:ident)*) => {
            match law { $(Law::$law => each(Law::$law, x, p, out),)* }
        };
    }
    columns!(
        Normal StudentT Laplace Cauchy Lognormal Gamma InverseGamma Exponential Weibull Beta Uniform HalfNormal
        HalfCauchy HalfStudentT Bernoulli BernoulliLogOdds BernoulliProbit Binomial BinomialLogOdds BinomialProbit
        Poisson PoissonLog NegativeBinomial NegativeBinomialLog
    );
}

#[inline(always)]
fn each(law: Law, x: &[f64], p: [&[f64]; 3], out: &mut [f64]) {
    let at = |column: &[f64], row: usize| column.get(row).copied().unwrap_or(0.0);
    for (row, (x, out)) in x.iter().zip(out).enumerate() {
        *out = ln_density(law, *x, &[at(p[0], row), at(p[1], row), at(p[2], row)]);
    }
}
