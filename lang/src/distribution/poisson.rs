//! `poisson`: counts of things that come one by one.
//!
//! Mean^x exp(-mean) / x!, the exposure multiplied into the mean.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `poisson`.
pub(super) const POISSON: Family = Family {
    name: "poisson",
    meaning: "counts of things that come one by one",
    forms: &[
        Form {
            arguments: &[
                Argument { name: "mean", domain: Domain::NotNegative, default: None },
                Argument { name: "exposure", domain: Domain::NotNegative, default: Some(1.0) },
            ],
            law: Law::Poisson,
            lower: |l, a| vec![l.times(a[0], a[1])],
        },
        Form {
            arguments: &[
                Argument { name: "log_mean", domain: Domain::Real, default: None },
                Argument { name: "exposure", domain: Domain::Positive, default: Some(1.0) },
            ],
            law: Law::PoissonLog,
            lower: |l, a| {
                let log = l.log(a[1]);
                vec![l.plus(a[0], log)]
            },
        },
    ],
};
