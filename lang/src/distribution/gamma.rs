//! `gamma`: positive readings, skewed.
//!
//! Density rate^shape x^(shape - 1) exp(-rate x) / gamma(shape).

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `gamma`.
pub(super) const GAMMA: Family = Family {
    name: "gamma",
    meaning: "positive readings, skewed",
    forms: &[
        Form {
            arguments: &[
                Argument { name: "shape", domain: Domain::Positive, default: None },
                Argument { name: "rate", domain: Domain::Positive, default: None },
            ],
            law: Law::Gamma,
            lower: |_, a| a.to_vec(),
        },
        Form {
            arguments: &[
                Argument { name: "shape", domain: Domain::Positive, default: None },
                Argument { name: "scale", domain: Domain::Positive, default: None },
            ],
            law: Law::Gamma,
            lower: |l, a| vec![a[0], l.power(a[1], -1.0)],
        },
        Form {
            arguments: &[
                Argument { name: "mean", domain: Domain::Positive, default: None },
                Argument { name: "sd", domain: Domain::Positive, default: None },
            ],
            law: Law::Gamma,
            lower: |l, a| {
                let variance = l.power(a[1], 2.0);
                let rate = l.over(a[0], variance);
                vec![l.times(a[0], rate), rate]
            },
        },
    ],
};
