//! `uniform`: anything between two ends, all alike.
//!
//! Density 1 / (high - low).

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `uniform`.
pub(super) const UNIFORM: Family = Family {
    name: "uniform",
    meaning: "anything between two ends, all alike",
    forms: &[Form {
        arguments: &[
            Argument { name: "low", domain: Domain::Real, default: None },
            Argument { name: "high", domain: Domain::Real, default: None },
        ],
        law: Law::Uniform,
        lower: |_, a| a.to_vec(),
    }],
};
