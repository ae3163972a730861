//! The distributions of the language: their arguments and parameterisations, and the canonical laws behind them.
//!
//! One file for each distribution; `ALL` below is the one list of them.

mod bernoulli;
mod beta;
mod binomial;
mod cauchy;
mod choice;
mod exponential;
mod family;
mod gamma;
mod half_cauchy;
mod half_normal;
mod half_student_t;
mod inverse_gamma;
mod laplace;
mod law;
mod lognormal;
mod negative_binomial;
mod normal;
mod poisson;
mod student_t;
mod uniform;
mod weibull;

pub use choice::{Choice, Refused, choose};
pub use family::{Argument, Domain, Family, Form, Lower, Lowering};
pub use law::Law;

/// Every distribution, in the order of the language's table.
pub const ALL: &[Family] = &[
    normal::NORMAL,
    student_t::STUDENT_T,
    laplace::LAPLACE,
    cauchy::CAUCHY,
    lognormal::LOGNORMAL,
    gamma::GAMMA,
    inverse_gamma::INVERSE_GAMMA,
    exponential::EXPONENTIAL,
    weibull::WEIBULL,
    beta::BETA,
    uniform::UNIFORM,
    half_normal::HALF_NORMAL,
    half_cauchy::HALF_CAUCHY,
    half_student_t::HALF_STUDENT_T,
    bernoulli::BERNOULLI,
    binomial::BINOMIAL,
    poisson::POISSON,
    negative_binomial::NEGATIVE_BINOMIAL,
];

/// Names of the notation that this version cannot fit yet.
const LATER: &[&str] = &[
    "logistic_dist",
    "beta_binomial",
    "categorical",
    "ordinal",
    "multinomial",
    "dirichlet",
    "multivariate_normal",
    "wishart",
    "inverse_wishart",
    "lkj",
    "neighbours",
    "zero_inflated",
    "hurdle",
    "mixture",
];

/// The distribution of a name.
pub fn named(name: &str) -> Option<&'static Family> {
    ALL.iter().find(|family| family.name == name)
}

/// Whether a name is a distribution of the notation that this version cannot fit yet.
pub fn is_later(name: &str) -> bool {
    LATER.contains(&name)
}
