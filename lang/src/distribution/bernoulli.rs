//! `bernoulli`: yes or no.
//!
//! 1 with probability p, else 0.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `bernoulli`.
pub(super) const BERNOULLI: Family = Family {
    name: "bernoulli",
    meaning: "yes or no",
    forms: &[
        Form {
            arguments: &[Argument { name: "p", domain: Domain::Fraction, default: None }],
            law: Law::Bernoulli,
            lower: |_, a| a.to_vec(),
        },
        Form {
            arguments: &[Argument { name: "log_odds", domain: Domain::Real, default: None }],
            law: Law::BernoulliLogOdds,
            lower: |_, a| a.to_vec(),
        },
        Form {
            arguments: &[Argument { name: "probit", domain: Domain::Real, default: None }],
            law: Law::BernoulliProbit,
            lower: |_, a| a.to_vec(),
        },
    ],
};
