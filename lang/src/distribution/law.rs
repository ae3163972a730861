//! The laws a checked model is made of: each distribution in one canonical set of parameters.
//!
//! The notation offers several parameterisations (`sd`, `variance`, `precision`); the checker rewrites each into the
//! arguments listed here, so that everything behind the checker knows one form only. The alternatives on the log-odds,
//! probit and log scales are laws of their own because rewriting them would lose digits in the tails.

/// A distribution in canonical parameters, in the order given at each variant.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Law {
    /// `mean`, `sd > 0`.
    Normal,
    /// `df > 0`, `centre`, `scale > 0`.
    StudentT,
    /// `centre`, `scale > 0`.
    Laplace,
    /// `centre`, `scale > 0`.
    Cauchy,
    /// `log_mean`, `log_sd > 0`.
    Lognormal,
    /// `shape > 0`, `rate > 0`.
    Gamma,
    /// `shape > 0`, `scale > 0`.
    InverseGamma,
    /// `rate > 0`.
    Exponential,
    /// `shape > 0`, `scale > 0`.
    Weibull,
    /// `a > 0`, `b > 0`.
    Beta,
    /// `low`, `high > low`.
    Uniform,
    /// `sd > 0`: the absolute value of a normal with mean 0.
    HalfNormal,
    /// `scale > 0`: the absolute value of a Cauchy with centre 0.
    HalfCauchy,
    /// `df > 0`, `scale > 0`: the absolute value of a Student-t with centre 0.
    HalfStudentT,
    /// `p` in [0, 1].
    Bernoulli,
    /// `log_odds`: log(p / (1 - p)).
    BernoulliLogOdds,
    /// `probit`: the standard normal quantile of p.
    BernoulliProbit,
    /// `trials` (a whole number from 0), `p` in [0, 1].
    Binomial,
    /// `trials`, `log_odds`.
    BinomialLogOdds,
    /// `trials`, `probit`.
    BinomialProbit,
    /// `mean >= 0` (the exposure multiplied in).
    Poisson,
    /// `log_mean` (the log exposure added).
    PoissonLog,
    /// `mean >= 0`, `size > 0`: variance mean + mean^2 / size.
    NegativeBinomial,
    /// `log_mean`, `size > 0`.
    NegativeBinomialLog,
}

impl Law {
    /// Every law, in the order of declaration.
    pub const ALL: [Law; 24] = [
        Law::Normal,
        Law::StudentT,
        Law::Laplace,
        Law::Cauchy,
        Law::Lognormal,
        Law::Gamma,
        Law::InverseGamma,
        Law::Exponential,
        Law::Weibull,
        Law::Beta,
        Law::Uniform,
        Law::HalfNormal,
        Law::HalfCauchy,
        Law::HalfStudentT,
        Law::Bernoulli,
        Law::BernoulliLogOdds,
        Law::BernoulliProbit,
        Law::Binomial,
        Law::BinomialLogOdds,
        Law::BinomialProbit,
        Law::Poisson,
        Law::PoissonLog,
        Law::NegativeBinomial,
        Law::NegativeBinomialLog,
    ];

    /// The number of canonical parameters.
    pub fn arity(self) -> usize {
        match self {
            Law::Exponential
            | Law::HalfNormal
            | Law::HalfCauchy
            | Law::Bernoulli
            | Law::BernoulliLogOdds
            | Law::BernoulliProbit
            | Law::Poisson
            | Law::PoissonLog => 1,
            Law::Normal
            | Law::Laplace
            | Law::Cauchy
            | Law::Lognormal
            | Law::Gamma
            | Law::InverseGamma
            | Law::Weibull
            | Law::Beta
            | Law::Uniform
            | Law::HalfStudentT
            | Law::Binomial
            | Law::BinomialLogOdds
            | Law::BinomialProbit
            | Law::NegativeBinomial
            | Law::NegativeBinomialLog => 2,
            Law::StudentT => 3,
        }
    }

    /// Whether the law gives whole numbers.
    pub fn is_discrete(self) -> bool {
        match self {
            Law::Bernoulli
            | Law::BernoulliLogOdds
            | Law::BernoulliProbit
            | Law::Binomial
            | Law::BinomialLogOdds
            | Law::BinomialProbit
            | Law::Poisson
            | Law::PoissonLog
            | Law::NegativeBinomial
            | Law::NegativeBinomialLog => true,
            Law::Normal
            | Law::StudentT
            | Law::Laplace
            | Law::Cauchy
            | Law::Lognormal
            | Law::Gamma
            | Law::InverseGamma
            | Law::Exponential
            | Law::Weibull
            | Law::Beta
            | Law::Uniform
            | Law::HalfNormal
            | Law::HalfCauchy
            | Law::HalfStudentT => false,
        }
    }
}
