//! `sources.csv`: a row for each rung, response and source of variation.

use std::path::Path;

use stook_sampler::answer::Sources;

use super::{number, write_rows};
use crate::report::Failure;

const HEADINGS: [&str; 11] = [
    "rung",
    "response",
    "source",
    "sd",
    "sd_q2_5",
    "sd_q97_5",
    "share",
    "share_q2_5",
    "share_q97_5",
    "finite_sd",
    "p_largest",
];

pub(super) fn write(path: &Path, rungs: &[(&str, &[Sources])]) -> Result<(), Failure> {
    let mut rows = vec![];
    for (rung, responses) in rungs {
        for response in *responses {
            for source in &response.sources {
                rows.push(vec![
                    rung.to_string(),
                    response.response.clone(),
                    source.name.clone(),
                    number(source.sd.mean),
                    number(source.sd.low),
                    number(source.sd.high),
                    number(source.share.mean),
                    number(source.share.low),
                    number(source.share.high),
                    number(source.finite_sd),
                    number(source.p_largest),
                ]);
            }
        }
    }
    write_rows(path, &HEADINGS, rows)
}
