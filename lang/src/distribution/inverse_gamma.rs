//! `inverse_gamma`: variances.
//!
//! The inverse of a gamma whose rate is the scale.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `inverse_gamma`.
pub(super) const INVERSE_GAMMA: Family = Family {
    name: "inverse_gamma",
    meaning: "variances",
    forms: &[Form {
        arguments: &[
            Argument { name: "shape", domain: Domain::Positive, default: None },
            Argument { name: "scale", domain: Domain::Positive, default: None },
        ],
        law: Law::InverseGamma,
        lower: |_, a| a.to_vec(),
    }],
};
