//! `student_t`: readings with now and then a wild one.
//!
//! A normal whose variance is inverse gamma; heavier tails for fewer degrees of freedom.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `student_t`.
pub(super) const STUDENT_T: Family = Family {
    name: "student_t",
    meaning: "readings with now and then a wild one",
    forms: &[Form {
        arguments: &[
            Argument { name: "df", domain: Domain::Positive, default: None },
            Argument { name: "centre", domain: Domain::Real, default: None },
            Argument { name: "scale", domain: Domain::Positive, default: None },
        ],
        law: Law::StudentT,
        lower: |_, a| a.to_vec(),
    }],
};
