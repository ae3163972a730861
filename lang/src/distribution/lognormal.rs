//! `lognormal`: positive readings that scatter by factors.
//!
//! The exponential of a normal.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `lognormal`.
pub(super) const LOGNORMAL: Family = Family {
    name: "lognormal",
    meaning: "positive readings that scatter by factors",
    forms: &[
        Form {
            arguments: &[
                Argument { name: "median", domain: Domain::Positive, default: None },
                Argument { name: "log_sd", domain: Domain::Positive, default: None },
            ],
            law: Law::Lognormal,
            lower: |l, a| vec![l.log(a[0]), a[1]],
        },
        Form {
            arguments: &[
                Argument { name: "log_mean", domain: Domain::Real, default: None },
                Argument { name: "log_sd", domain: Domain::Positive, default: None },
            ],
            law: Law::Lognormal,
            lower: |_, a| a.to_vec(),
        },
    ],
};
