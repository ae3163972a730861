//! `summary.csv`: a row for each scalar.

use std::path::Path;

use stook_sampler::answer::Answer;

use super::{number, optional, write_rows};
use crate::report::Failure;

const HEADINGS: [&str; 13] = [
    "quantity",
    "labels",
    "mean",
    "mean_mcse",
    "sd",
    "q2_5",
    "q25",
    "q50",
    "q75",
    "q97_5",
    "split_rhat",
    "bulk_ess",
    "tail_ess",
];

pub(super) fn write(path: &Path, answer: &Answer) -> Result<(), Failure> {
    let rows = answer.draws.scalars.iter().zip(&answer.summary).map(|(scalar, found)| {
        vec![
            scalar.quantity.clone(),
            scalar.labels.join("/"),
            number(found.mean),
            optional(found.mean_mcse),
            optional(found.sd),
            number(found.q2_5),
            number(found.q25),
            number(found.q50),
            number(found.q75),
            number(found.q97_5),
            optional(found.split_rhat),
            optional(found.bulk_ess),
            optional(found.tail_ess),
        ]
    });
    write_rows(path, &HEADINGS, rows)
}
