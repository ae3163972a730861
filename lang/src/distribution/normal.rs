//! `normal`: readings that scatter evenly around a mean.
//!
//! Density exp(-z^2 / 2) / (sd sqrt(2 pi)), z = (x - mean) / sd.

use super::Law;
use super::family::{Argument, Domain, Family, Form};

/// The distribution `normal`.
pub(super) const NORMAL: Family = Family {
    name: "normal",
    meaning: "readings that scatter evenly around a mean",
    forms: &[
        Form {
            arguments: &[
                Argument { name: "mean", domain: Domain::Real, default: None },
                Argument { name: "sd", domain: Domain::Positive, default: None },
            ],
            law: Law::Normal,
            lower: |_, a| a.to_vec(),
        },
        Form {
            arguments: &[
                Argument { name: "mean", domain: Domain::Real, default: None },
                Argument { name: "variance", domain: Domain::Positive, default: None },
            ],
            law: Law::Normal,
            lower: |l, a| vec![a[0], l.power(a[1], 0.5)],
        },
        Form {
            arguments: &[
                Argument { name: "mean", domain: Domain::Real, default: None },
                Argument { name: "precision", domain: Domain::Positive, default: None },
            ],
            law: Law::Normal,
            lower: |l, a| vec![a[0], l.power(a[1], -0.5)],
        },
    ],
};
