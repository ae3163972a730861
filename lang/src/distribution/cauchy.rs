//! `cauchy`: readings with very wild ones among them.
//!
//! Density 1 / (pi scale (1 + z^2)), z = (x - centre) / scale; no mean.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `cauchy`.
pub(super) const CAUCHY: Family = Family {
    name: "cauchy",
    meaning: "readings with very wild ones among them",
    forms: &[Form {
        arguments: &[
            Argument { name: "centre", domain: Domain::Real, default: None },
            Argument { name: "scale", domain: Domain::Positive, default: None },
        ],
        law: Law::Cauchy,
        lower: |_, a| a.to_vec(),
    }],
};
