//! `half_student_t`: a spread that may be larger than its scale.
//!
//! The absolute value of a Student-t with centre 0.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `half_student_t`.
pub(super) const HALF_STUDENT_T: Family = Family {
    name: "half_student_t",
    meaning: "a spread that may be larger than its scale",
    forms: &[Form {
        arguments: &[
            Argument { name: "df", domain: Domain::Positive, default: None },
            Argument { name: "scale", domain: Domain::Positive, default: None },
        ],
        law: Law::HalfStudentT,
        lower: |_, a| a.to_vec(),
    }],
};
