//! `negative_binomial`: counts that scatter more than a Poisson.
//!
//! A Poisson whose mean is a gamma: variance mean + mean^2 / size.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `negative_binomial`.
pub(super) const NEGATIVE_BINOMIAL: Family = Family {
    name: "negative_binomial",
    meaning: "counts that scatter more than a Poisson",
    forms: &[
        Form {
            arguments: &[
                Argument { name: "mean", domain: Domain::NotNegative, default: None },
                Argument { name: "size", domain: Domain::Positive, default: None },
                Argument { name: "exposure", domain: Domain::NotNegative, default: Some(1.0) },
            ],
            law: Law::NegativeBinomial,
            lower: |l, a| vec![l.times(a[0], a[2]), a[1]],
        },
        Form {
            arguments: &[
                Argument { name: "log_mean", domain: Domain::Real, default: None },
                Argument { name: "size", domain: Domain::Positive, default: None },
                Argument { name: "exposure", domain: Domain::Positive, default: Some(1.0) },
            ],
            law: Law::NegativeBinomialLog,
            lower: |l, a| {
                let log = l.log(a[2]);
                vec![l.plus(a[0], log), a[1]]
            },
        },
    ],
};
