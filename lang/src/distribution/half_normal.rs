//! `half_normal`: a spread that is probably not much larger than sd.
//!
//! The absolute value of a normal with mean 0.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `half_normal`.
pub(super) const HALF_NORMAL: Family = Family {
    name: "half_normal",
    meaning: "a spread that is probably not much larger than sd",
    forms: &[Form {
        arguments: &[Argument { name: "sd", domain: Domain::Positive, default: None }],
        law: Law::HalfNormal,
        lower: |_, a| a.to_vec(),
    }],
};
