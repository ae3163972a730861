//! `groups.csv`: for each label of each group its mean and a new reading of it.

use std::path::Path;

use stook_sampler::answer::GroupTable;

use super::{number, write_rows};
use crate::report::Failure;

const HEADINGS: [&str; 10] = [
    "response",
    "group",
    "label",
    "readings",
    "mean",
    "mean_q2_5",
    "mean_q97_5",
    "reading",
    "reading_q2_5",
    "reading_q97_5",
];

pub(super) fn write(path: &Path, tables: &[GroupTable]) -> Result<(), Failure> {
    let rows = tables.iter().flat_map(|table| {
        table.rows.iter().map(|row| {
            vec![
                table.response.clone(),
                table.group.clone(),
                row.label.clone(),
                row.readings.to_string(),
                number(row.mean.mean),
                number(row.mean.low),
                number(row.mean.high),
                number(row.reading.mean),
                number(row.reading.low),
                number(row.reading.high),
            ]
        })
    });
    write_rows(path, &HEADINGS, rows)
}
