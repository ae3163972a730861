//! `ladder.csv`: a row for each rung.

use std::path::Path;

use stook_sampler::answer::Criteria;

use super::{number, optional, write_rows};
use crate::ladder::{Fitted, best};
use crate::report::Failure;

const HEADINGS: [&str; 9] = [
    "rung",
    "converged",
    "dic",
    "p_dic",
    "waic",
    "p_waic",
    "waic_se",
    "waic_difference",
    "waic_difference_se",
];

pub(super) fn write(path: &Path, rungs: &[Fitted]) -> Result<(), Failure> {
    let mut names: Vec<&str> = vec![];
    for unknown in rungs.iter().flat_map(|rung| &rung.unknowns) {
        if !names.contains(&unknown.name.as_str()) {
            names.push(&unknown.name);
        }
    }
    let unknowns: Vec<String> =
        names.iter().flat_map(|name| ["", "_q2_5", "_q97_5"].map(|end| format!("{name}{end}"))).collect();
    let headings: Vec<&str> = HEADINGS.into_iter().chain(unknowns.iter().map(String::as_str)).collect();
    write_rows(path, &headings, rungs.iter().map(|rung| row(rung, best(rungs), &names)))
}

fn row(rung: &Fitted, best: Option<&Fitted>, names: &[&str]) -> Vec<String> {
    let Criteria { dic, waic } = &rung.criteria;
    let difference = best.and_then(|best| rung.above(best));
    let mut cells = vec![
        rung.name.clone(),
        rung.converged.to_string(),
        number(dic.dic),
        number(dic.p_dic),
        number(waic.waic),
        number(waic.p_waic),
        optional(waic.se),
        optional(difference.map(|difference| difference.difference)),
        optional(difference.and_then(|difference| difference.se)),
    ];
    for name in names {
        match rung.unknowns.iter().find(|unknown| unknown.name == *name) {
            Some(found) => {
                let interval = &found.interval;
                cells.extend([interval.mean, interval.low, interval.high].map(number));
            }
            None => cells.extend([const { String::new() }; 3]),
        }
    }
    cells
}
