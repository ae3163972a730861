//! Parameters outside their domain.

use stook_lang::distribution::Law;

/// A parameter outside its domain.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ParameterProblem {
    /// Which parameter, from 0.
    pub parameter: usize,
    /// Its value.
    pub value: f64,
    /// What it must be.
    pub must_be: &'static str,
}

/// Checks a law's parameters against their domains.
pub fn check_params(law: Law, p: &[f64]) -> Result<(), ParameterProblem> {
    let real = |at: usize| require(at, p[at], p[at].is_finite(), "a finite number");
    let positive = |at: usize| require(at, p[at], p[at] > 0.0 && p[at].is_finite(), "above 0");
    let fraction = |at: usize| require(at, p[at], (0.0..=1.0).contains(&p[at]), "between 0 and 1");
    let count = |at: usize| {
        require(at, p[at], p[at] >= 0.0 && p[at].fract() == 0.0 && p[at].is_finite(), "a whole number from 0")
    };
    let mean = |at: usize| require(at, p[at], p[at] >= 0.0 && p[at].is_finite(), "0 or more");
    match law {
        Law::Normal | Law::Laplace | Law::Cauchy | Law::Lognormal => real(0).and(positive(1)),
        Law::StudentT => positive(0).and(real(1)).and(positive(2)),
        Law::Gamma | Law::InverseGamma | Law::Weibull | Law::Beta | Law::HalfStudentT => {
            positive(0).and(positive(1))
        }
        Law::Exponential | Law::HalfNormal | Law::HalfCauchy => positive(0),
        Law::Uniform => real(0).and(real(1)).and(require(1, p[1], p[1] > p[0], "above the lower end")),
        Law::Bernoulli => fraction(0),
        Law::BernoulliLogOdds | Law::BernoulliProbit | Law::PoissonLog => real(0),
        Law::Binomial => count(0).and(fraction(1)),
        Law::BinomialLogOdds | Law::BinomialProbit => count(0).and(real(1)),
        Law::Poisson => mean(0),
        Law::NegativeBinomial => mean(0).and(positive(1)),
        Law::NegativeBinomialLog => real(0).and(positive(1)),
    }
}

fn require(parameter: usize, value: f64, holds: bool, must_be: &'static str) -> Result<(), ParameterProblem> {
    if holds { Ok(()) } else { Err(ParameterProblem { parameter, value, must_be }) }
}
