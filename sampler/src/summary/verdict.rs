//! Whether a fit has converged: one rule applied to all its scalars.

use serde::Serialize;

use super::diagnosis::Diagnosis;

/// What every scalar of a converged fit satisfies.
///
/// The default is the advice of Vehtari, Gelman, Simpson, Carpenter and Bürkner (2021, from memory):
/// R-hat of at most 1.01, and effective sizes above 50 for each half chain, which is 100 for each chain and
/// 400 for four: below that the estimates of the effective sizes, the errors and R-hat itself are not to be
/// relied on.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Rule {
    /// The largest split R-hat.
    pub split_rhat: f64,
    /// The smallest bulk effective size for each chain.
    pub bulk_ess_per_chain: f64,
    /// The smallest tail effective size for each chain.
    pub tail_ess_per_chain: f64,
}

impl Default for Rule {
    fn default() -> Rule {
        Rule { split_rhat: 1.01, bulk_ess_per_chain: 100.0, tail_ess_per_chain: 100.0 }
    }
}

/// A scalar that breaks the rule, with what breaks it.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Failure {
    /// The place of the scalar among the diagnoses.
    pub scalar: usize,
    /// Its R-hat, if too large.
    pub split_rhat: Option<f64>,
    /// Its bulk effective size, if too small.
    pub bulk_ess: Option<f64>,
    /// Its tail effective size, if too small.
    pub tail_ess: Option<f64>,
    /// Whether its chains are too short to be judged at all; the three numbers are then `None`.
    pub too_few_draws: bool,
    /// How many times the worst of them misses its bound: above 1, and infinite if not to be judged.
    pub excess: f64,
}

/// What the rule says of a fit.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Verdict {
    /// The rule.
    pub rule: Rule,
    /// Scalars that were judged: all but the constant ones.
    pub judged: usize,
    /// Scalars whose draws are all equal: no evidence for or against convergence, and no failure.
    pub constant: usize,
    /// The scalars that break the rule, the worst first, equally bad ones in their order.
    pub failures: Vec<Failure>,
}

impl Verdict {
    /// Whether no scalar breaks the rule.
    pub fn converged(&self) -> bool {
        self.failures.is_empty()
    }
}

/// Applies the rule to every scalar of a fit.
///
/// # False alarms
///
/// A rule that is asked of hundreds of scalars must all but never fail one whose chains have converged. Let
/// there be H half chains of n draws, and let t draws be worth one independent draw. For converged chains the
/// variance of the half-chain means is by chance chi-squared over its H - 1 degrees times its expectation, so
/// R-hat exceeds 1.01 about when that chi-squared exceeds (H - 1) (0.0201 n + 1) / t. Measured on 4,000
/// scalars with 4 chains of 2,500 draws of first-order autoregressions, in fits of 100 scalars:
///
/// | t | effective size | scalars failed | fits with a failure |
/// | --- | --- | --- | --- |
/// | 1, 3, 5, 7 | 10,000 to 1,430 | 0 of 4,000 each | 0 of 40 each |
/// | 10 | 1,000 | 1.2 % | 28 of 40 |
/// | 20 | 500 | 27 % | 40 of 40 |
///
/// So near-independent draws raise no alarm, however many the scalars (for t = 1 the probability is below
/// 1e-30), and effective sizes of about 2,000 (6e-6 a scalar) keep hundreds of scalars free of them. At the
/// effective sizes of 400 that the rule asks for, R-hat is the stricter demand: a fit that barely has them
/// fails by R-hat. More draws are the right answer to that too.
pub fn converged(diagnoses: &[Diagnosis], rule: &Rule) -> Verdict {
    let mut failures: Vec<Failure> = diagnoses
        .iter()
        .enumerate()
        .filter_map(|(scalar, diagnosis)| rule.failure(scalar, diagnosis))
        .collect();
    failures.sort_by(|a, b| b.excess.total_cmp(&a.excess));
    let constant =
        diagnoses.iter().filter(|diagnosis| !diagnosis.is_short() && diagnosis.is_constant()).count();
    Verdict { rule: *rule, judged: diagnoses.len() - constant, constant, failures }
}

impl Rule {
    fn failure(&self, scalar: usize, diagnosis: &Diagnosis) -> Option<Failure> {
        if diagnosis.is_short() {
            let nothing = Failure {
                scalar,
                split_rhat: None,
                bulk_ess: None,
                tail_ess: None,
                too_few_draws: true,
                excess: f64::INFINITY,
            };
            return Some(nothing);
        }
        let chains = diagnosis.chains as f64;
        let (bulk_bound, tail_bound) = (chains * self.bulk_ess_per_chain, chains * self.tail_ess_per_chain);
        let split_rhat = diagnosis.split_rhat.filter(|rhat| *rhat > self.split_rhat);
        let bulk_ess = diagnosis.bulk_ess.filter(|size| *size < bulk_bound);
        let tail_ess = diagnosis.tail_ess.filter(|size| *size < tail_bound);
        let excesses = [
            split_rhat.map(|rhat| (rhat - 1.0) / (self.split_rhat - 1.0)),
            bulk_ess.map(|size| bulk_bound / size),
            tail_ess.map(|size| tail_bound / size),
        ];
        let excess = excesses.into_iter().flatten().reduce(f64::max)?;
        Some(Failure { scalar, split_rhat, bulk_ess, tail_ess, too_few_draws: false, excess })
    }
}
