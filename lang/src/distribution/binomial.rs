//! `binomial`: how many of some trials.
//!
//! C(n, x) p^x (1 - p)^(n - x).

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `binomial`.
pub(super) const BINOMIAL: Family = Family {
    name: "binomial",
    meaning: "how many of some trials",
    forms: &[
        Form {
            arguments: &[
                Argument { name: "trials", domain: Domain::Count, default: None },
                Argument { name: "p", domain: Domain::Fraction, default: None },
            ],
            law: Law::Binomial,
            lower: |_, a| a.to_vec(),
        },
        Form {
            arguments: &[
                Argument { name: "trials", domain: Domain::Count, default: None },
                Argument { name: "log_odds", domain: Domain::Real, default: None },
            ],
            law: Law::BinomialLogOdds,
            lower: |_, a| a.to_vec(),
        },
        Form {
            arguments: &[
                Argument { name: "trials", domain: Domain::Count, default: None },
                Argument { name: "probit", domain: Domain::Real, default: None },
            ],
            law: Law::BinomialProbit,
            lower: |_, a| a.to_vec(),
        },
    ],
};
