//! `weibull`: lifetimes whose risk rises or falls with age.
//!
//! (x / scale)^shape is exponential of rate 1.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `weibull`.
pub(super) const WEIBULL: Family = Family {
    name: "weibull",
    meaning: "lifetimes whose risk rises or falls with age",
    forms: &[Form {
        arguments: &[
            Argument { name: "shape", domain: Domain::Positive, default: None },
            Argument { name: "scale", domain: Domain::Positive, default: None },
        ],
        law: Law::Weibull,
        lower: |_, a| a.to_vec(),
    }],
};
