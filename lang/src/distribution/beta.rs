//! `beta`: shares.
//!
//! Density x^(a - 1) (1 - x)^(b - 1) / B(a, b).

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `beta`.
pub(super) const BETA: Family = Family {
    name: "beta",
    meaning: "shares",
    forms: &[
        Form {
            arguments: &[
                Argument { name: "a", domain: Domain::Positive, default: None },
                Argument { name: "b", domain: Domain::Positive, default: None },
            ],
            law: Law::Beta,
            lower: |_, a| a.to_vec(),
        },
        Form {
            arguments: &[
                Argument { name: "mean", domain: Domain::Fraction, default: None },
                Argument { name: "size", domain: Domain::Positive, default: None },
            ],
            law: Law::Beta,
            lower: |l, a| {
                let one = l.number(1.0);
                let rest = l.minus(one, a[0]);
                vec![l.times(a[0], a[1]), l.times(rest, a[1])]
            },
        },
    ],
};
