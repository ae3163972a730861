//! What a fit answers: each scalar's summary, the variance by source, the groups' means and new readings, the criteria.

pub(crate) mod clock;
mod criteria;
mod effect;
mod groups;
mod replay;
mod sources;

use serde::Serialize;

use crate::bind::Bound;
use crate::draws::Draws;
use crate::plan::Plan;
use crate::program::Program;
use crate::run::{Options, RunProblem, share};
use crate::summary::{self, Diagnosis, Rule};

/// A point with a central 95 % interval.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct Interval {
    /// The posterior mean.
    pub mean: f64,
    /// Its Monte Carlo standard error.
    pub mcse: f64,
    /// The 2.5 % quantile.
    pub low: f64,
    /// The 97.5 % quantile.
    pub high: f64,
}

/// The scale on which a response's variation is added up.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Scale {
    /// The response's own scale.
    Response,
    /// Its natural logarithm.
    Log,
    /// The log-odds.
    LogOdds,
    /// The probit.
    Probit,
}

/// One source of variation of a response.
#[derive(Clone, Debug, Serialize)]
pub struct Source {
    /// The name of the term or unknown, or `residual`.
    pub name: String,
    /// The group (or groups, or table) that it varies over; `None` for the residual.
    pub over: Option<String>,
    /// Its superpopulation sd: the spread of the distribution that its labels are drawn from.
    pub sd: Interval,
    /// Its share of the sum of the sources' variances, 0 to 1.
    pub share: Interval,
    /// The sd among the labels (or rows) at hand (Gelman 2005), posterior mean.
    pub finite_sd: f64,
    /// The probability that its sd is the largest of all sources.
    pub p_largest: f64,
}

/// The variance by source of one response.
#[derive(Clone, Debug, Serialize)]
pub struct Sources {
    /// The response column.
    pub response: String,
    /// Its unit.
    pub unit: Option<String>,
    /// The scale on which the sources add up.
    pub scale: Scale,
    /// The sources in the order of the model, the residual last.
    pub sources: Vec<Source>,
}

/// One label of a group: its mean and a new reading of it.
#[derive(Clone, Debug, Serialize)]
pub struct GroupRow {
    /// The label; nested labels are `parent/child`.
    pub label: String,
    /// Readings at hand.
    pub readings: usize,
    /// The mean of the label: what is common to all, its own part and its parents' parts; the other groupings at zero
    /// and covariates at their mean over the rows.
    pub mean: Interval,
    /// A new reading of the label: its mean, the other groupings drawn anew from their spread, and the residual.
    pub reading: Interval,
}

/// The means and new readings of a group's labels for one response.
#[derive(Clone, Debug, Serialize)]
pub struct GroupTable {
    /// The response column.
    pub response: String,
    /// Its unit.
    pub unit: Option<String>,
    /// The group.
    pub group: String,
    /// Its labels in their order.
    pub rows: Vec<GroupRow>,
}

/// Wall and CPU seconds of one phase.
#[derive(Clone, Copy, Debug, Default, PartialEq, Serialize)]
pub struct Seconds {
    /// Wall-clock seconds.
    pub wall: f64,
    /// CPU seconds of all threads.
    pub cpu: f64,
}

/// Everything that a fit answers.
#[derive(Clone, Debug)]
pub struct Answer {
    /// The draws.
    pub draws: Draws,
    /// One for each scalar of the draws, in the same order.
    pub summary: Vec<crate::summary::Diagnosis>,
    /// Whether the chains agree, and what does not.
    pub verdict: crate::summary::Verdict,
    /// One for each response.
    pub sources: Vec<Sources>,
    /// One for each response and group that its mean varies over.
    pub groups: Vec<GroupTable>,
    /// The information criteria over all responses.
    pub criteria: Criteria,
    /// Seconds of each phase of the sampler: `warmup`, `draws`, `summary`.
    pub seconds: Vec<(&'static str, Seconds)>,
}

/// The information criteria of a fit: on the deviance scale, conditional on the group effects.
#[derive(Clone, Debug)]
pub struct Criteria {
    /// DIC with the posterior mean of each unknown as declared for its plug-in (Spiegelhalter et al. 2002).
    pub dic: crate::summary::criteria::Dic,
    /// WAIC with its pointwise values (Watanabe 2010).
    pub waic: crate::summary::criteria::Waic,
}

impl Interval {
    /// The interval of a column of draws.
    fn of(draws: &[f64]) -> Result<Interval, RunProblem> {
        let found =
            summary::diagnose(&[draws]).map_err(|problem| RunProblem::Summary(problem.to_string()))?;
        Ok(Interval {
            mean: found.mean,
            mcse: found.mean_mcse.unwrap_or(0.0),
            low: found.q2_5,
            high: found.q97_5,
        })
    }
}

/// Answers from the draws of a program.
pub(crate) fn answer(
    bound: &Bound,
    plan: &Plan,
    program: &Program,
    draws: Draws,
    options: &Options,
    [warmup, kept]: [Seconds; 2],
) -> Result<Answer, RunProblem> {
    let (found, seconds) = clock::timed(|| {
        let summary = diagnoses(&draws, options.threads)?;
        let verdict = summary::converged(&summary, &Rule::default());
        let replay = replay::Replay::new(program, &draws);
        let means: Vec<f64> = summary.iter().map(|diagnosis| diagnosis.mean).collect();
        let size = (draws.chains, draws.draws);
        let criteria = criteria::criteria(program, &replay, &means, size, options.threads)?;
        let question = sources::Question {
            bound,
            plan,
            program,
            replay: &replay,
            draws: draws.chains * draws.draws,
            seed: options.seed,
            stream: draws.chains as u64,
        };
        let (sources, groups) = question.answer()?;
        Ok((summary, verdict, criteria, sources, groups))
    });
    let (summary, verdict, criteria, sources, groups) = found?;
    let seconds = vec![("warmup", warmup), ("draws", kept), ("summary", seconds)];
    Ok(Answer { draws, summary, verdict, sources, groups, criteria, seconds })
}

/// The diagnosis of every scalar.
fn diagnoses(draws: &Draws, threads: usize) -> Result<Vec<Diagnosis>, RunProblem> {
    let scalars = (0..draws.scalars.len()).collect();
    let found = share(scalars, threads, |_, scalar: usize| summary::diagnose(&draws.by_chain(scalar)));
    let titled = found.into_iter().zip(&draws.scalars).map(|(found, scalar)| {
        found.map_err(|problem| RunProblem::Summary(format!("{}: {problem}", scalar.title())))
    });
    titled.collect()
}
