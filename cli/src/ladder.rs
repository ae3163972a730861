//! What is kept of each rung of a climb, and how rungs compare.

use stook_lang::model::{Model, Rung};
use stook_sampler::answer::{Answer, Criteria, Interval, Sources};
use stook_sampler::draws::ScalarKind;
use stook_sampler::summary::criteria::{Difference, difference};

/// A rung that was fitted.
#[derive(Clone, Debug)]
pub(crate) struct Fitted {
    /// Its name.
    pub(crate) name: String,
    /// Its terms.
    pub(crate) terms: Vec<String>,
    /// Whether its chains agree.
    pub(crate) converged: bool,
    /// Its criteria.
    pub(crate) criteria: Criteria,
    /// The unknowns without labels.
    pub(crate) unknowns: Vec<Shared>,
    /// The variance by source.
    pub(crate) sources: Vec<Sources>,
}

/// An unknown without labels, which can be compared from rung to rung.
#[derive(Clone, Debug)]
pub(crate) struct Shared {
    /// Its name.
    pub(crate) name: String,
    /// Its unit.
    pub(crate) unit: Option<String>,
    /// Where it lies.
    pub(crate) interval: Interval,
}

impl Fitted {
    /// What is kept of a rung's fit.
    pub(crate) fn new(model: &Model, rung: &Rung, answer: &Answer) -> Fitted {
        let scalars = answer.draws.scalars.iter().zip(&answer.summary);
        let unknowns = scalars
            .filter(|(scalar, _)| scalar.kind == ScalarKind::Unknown && scalar.labels.is_empty())
            .map(|(scalar, found)| Shared {
                name: scalar.quantity.clone(),
                unit: scalar.unit.clone(),
                interval: Interval {
                    mean: found.mean,
                    mcse: found.mean_mcse.unwrap_or(f64::NAN),
                    low: found.q2_5,
                    high: found.q97_5,
                },
            });
        Fitted {
            name: rung.name.clone(),
            terms: rung.terms.iter().map(|term| model.named[*term].name.clone()).collect(),
            converged: answer.verdict.converged(),
            criteria: answer.criteria.clone(),
            unknowns: unknowns.collect(),
            sources: answer.sources.clone(),
        }
    }

    /// How much its WAIC lies above another rung's; `None` where they cannot be compared.
    pub(crate) fn above(&self, other: &Fitted) -> Option<Difference> {
        difference(&self.criteria.waic, &other.criteria.waic).ok()
    }

    /// Whether another rung has other sources of a response.
    pub(crate) fn differs(&self, other: &Fitted, response: &str) -> bool {
        let names = |rung: &Fitted| {
            let found = rung.sources.iter().filter(|sources| sources.response == response);
            let names = found.flat_map(|sources| &sources.sources).map(|source| source.name.clone());
            names.collect::<Vec<String>>()
        };
        names(self) != names(other)
    }

    /// The sd of a source of a response.
    pub(crate) fn sd(&self, response: &str, source: &str) -> Option<Interval> {
        let sources = self.sources.iter().find(|sources| sources.response == response)?;
        sources.sources.iter().find(|found| found.name == source).map(|found| found.sd)
    }
}

/// The converged rung with the lowest WAIC.
pub(crate) fn best(rungs: &[Fitted]) -> Option<&Fitted> {
    let converged = rungs.iter().filter(|rung| rung.converged);
    converged.min_by(|a, b| a.criteria.waic.waic.total_cmp(&b.criteria.waic.waic))
}

/// The fitted rungs that a rung is set against: those with most of its terms and none besides, itself left out.
pub(crate) fn simpler<'a>(rungs: &'a [Fitted], rung: &Fitted) -> Vec<&'a Fitted> {
    let inside = |other: &&Fitted| {
        other.terms.len() < rung.terms.len() && other.terms.iter().all(|term| rung.terms.contains(term))
    };
    let most = rungs.iter().filter(inside).map(|other| other.terms.len()).max();
    rungs.iter().filter(inside).filter(|other| Some(other.terms.len()) == most).collect()
}
