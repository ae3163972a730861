//! `half_cauchy`: a spread that may be much larger than its scale.
//!
//! The absolute value of a Cauchy with centre 0.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `half_cauchy`.
pub(super) const HALF_CAUCHY: Family = Family {
    name: "half_cauchy",
    meaning: "a spread that may be much larger than its scale",
    forms: &[Form {
        arguments: &[Argument { name: "scale", domain: Domain::Positive, default: None }],
        law: Law::HalfCauchy,
        lower: |_, a| a.to_vec(),
    }],
};
