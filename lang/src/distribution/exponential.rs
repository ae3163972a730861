//! `exponential`: waiting times without memory.
//!
//! Density rate exp(-rate x).

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `exponential`.
pub(super) const EXPONENTIAL: Family = Family {
    name: "exponential",
    meaning: "waiting times without memory",
    forms: &[
        Form {
            arguments: &[Argument { name: "rate", domain: Domain::Positive, default: None }],
            law: Law::Exponential,
            lower: |_, a| a.to_vec(),
        },
        Form {
            arguments: &[Argument { name: "mean", domain: Domain::Positive, default: None }],
            law: Law::Exponential,
            lower: |l, a| vec![l.power(a[0], -1.0)],
        },
    ],
};
