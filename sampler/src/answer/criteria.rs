//! DIC and WAIC over all responses, conditional on the unknowns of every level.

use super::Criteria;
use super::replay::{Replay, spaced};
use crate::numeric::stream::Stream;
use crate::program::{Factor, OBSERVED, Program, Values};
use crate::run::{RunProblem, share};
use crate::summary::criteria::{Pointwise, dic};
use crate::symbolic::Target;

/// The criteria from the kept draws. The plug-in of DIC is the posterior mean of each unknown as declared: an sd where
/// the text declares an sd, a precision where it declares a precision.
pub(super) fn criteria(
    program: &Program,
    replay: &Replay<'_>,
    means: &[f64],
    (chains, draws): (usize, usize),
    threads: usize,
) -> Result<Criteria, RunProblem> {
    let responses: Vec<(usize, Vec<u32>)> = program
        .factors
        .iter()
        .enumerate()
        .filter(|(_, factor)| matches!(factor.target, Target::Response(_)))
        .map(|(at, factor)| (at, observed_rows(factor)))
        .collect();
    let observations: usize = responses.iter().map(|(_, rows)| rows.len()).sum();
    let used = spaced(chains * draws, observations);
    let failed = |problem: crate::summary::criteria::CriteriaError| RunProblem::Summary(problem.to_string());
    let parts = share((0..chains).collect(), threads, |_, chain_number: usize| {
        let mut chain = replay.chain(Stream::new(0, 0));
        let mut points = Pointwise::new(observations);
        let mut deviance = 0.0;
        let mut densities = Vec::with_capacity(observations);
        let own = chain_number * draws..(chain_number + 1) * draws;
        for draw in used.iter().filter(|draw| own.contains(draw)) {
            replay.set(&mut chain, *draw);
            densities.clear();
            for (factor, rows) in &responses {
                program.pointwise(*factor, rows, &mut chain, &mut densities);
            }
            deviance += -2.0 * densities.iter().sum::<f64>();
            points.add(&densities)?;
        }
        Ok((points, deviance))
    });
    let mut points = Pointwise::new(observations);
    let mut deviance = 0.0;
    for part in parts {
        let (more, sum) = part.map_err(failed)?;
        points.merge(&more).map_err(failed)?;
        deviance += sum;
    }
    let mut chain = replay.chain(Stream::new(0, 0));
    replay.set_to_means(&mut chain, means);
    let mut densities = vec![];
    for (factor, rows) in &responses {
        program.pointwise(*factor, rows, &mut chain, &mut densities);
    }
    let at_means = -2.0 * densities.iter().sum::<f64>();
    Ok(Criteria { dic: dic(deviance / used.len() as f64, at_means), waic: points.waic().map_err(failed)? })
}

/// The rows of a response whose value is in the data.
pub(super) fn observed_rows(factor: &Factor) -> Vec<u32> {
    let rows = 0..factor.domain.len() as u32;
    match &factor.values {
        Values::Data(_, places) => rows.filter(|row| places[*row as usize] == OBSERVED).collect(),
        Values::Observed(_) | Values::State(_) => rows.collect(),
    }
}
