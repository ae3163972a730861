//! `laplace`: readings around a median with long tails.
//!
//! Density exp(-|x - centre| / scale) / (2 scale).

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `laplace`.
pub(super) const LAPLACE: Family = Family {
    name: "laplace",
    meaning: "readings around a median with long tails",
    forms: &[Form {
        arguments: &[
            Argument { name: "centre", domain: Domain::Real, default: None },
            Argument { name: "scale", domain: Domain::Positive, default: None },
        ],
        law: Law::Laplace,
        lower: |_, a| a.to_vec(),
    }],
};
