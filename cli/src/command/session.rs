//! What fit, climb and plan have in common: a model bound to its data, and one fit of it.

use std::path::Path;

use stook_lang::arena::Id;
use stook_lang::model::{Model, Rung};
use stook_sampler::answer::Answer;
use stook_sampler::bind::{self, Bound, DataProblem};
use stook_sampler::plan::{self, Plan, PlanProblem};
use stook_sampler::run::{self, Options};

use crate::arguments::{DataArguments, ModelArguments};
use crate::clock::timed;
use crate::data;
use crate::folder::{DataFile, Origin, Phases};
use crate::load::{self, Loaded};
use crate::progress::Bar;
use crate::report::{Failure, Reporter};

/// A model bound to its data.
pub(super) struct Session {
    /// How problems are told.
    pub(super) reporter: Reporter,
    /// The model.
    pub(super) loaded: Loaded,
    /// The model with its data.
    pub(super) bound: Bound,
    /// The files of the data.
    files: Vec<DataFile>,
    gaps: Vec<String>,
    /// Seconds so far.
    pub(super) phases: Phases,
}

impl Session {
    /// Reads, checks and binds, and reports every problem; `None` where there is one.
    pub(super) fn open(model: &ModelArguments, data: &DataArguments) -> Option<Session> {
        let reporter = Reporter::new(model.messages);
        let (loaded, seconds) = timed(|| load::model(&model.model, &reporter));
        let mut session = Session::with(loaded?, &model.model, data, reporter)?;
        session.phases.read.wall += seconds.wall;
        session.phases.read.cpu += seconds.cpu;
        Some(session)
    }

    /// Binds a model from a path to its tables, and reports every problem; `None` where there is one.
    pub(super) fn with(
        loaded: Loaded,
        path: &Path,
        data: &DataArguments,
        reporter: Reporter,
    ) -> Option<Session> {
        let (tables, read) = timed(|| tables(&loaded, path, data, &reporter));
        let tables = tables?;
        let complete: Vec<_> = tables.tables.into_iter().flatten().collect();
        let (bound, bind) = timed(|| bind::bind(loaded.model.clone(), complete, &data.settings()));
        match bound {
            Ok(bound) => {
                let phases = Phases { read, bind, ..Phases::default() };
                Some(Session {
                    reporter,
                    loaded,
                    bound,
                    files: tables.files,
                    gaps: data.gaps.clone(),
                    phases,
                })
            }
            Err(problems) => {
                tell(&problems, &loaded, &reporter);
                None
            }
        }
    }

    /// The model of a rung (or the whole one) with the data.
    pub(super) fn at(&self, rung: Option<Id<Rung>>) -> Bound {
        let model = at(&self.loaded.model, rung);
        Bound { model, ..self.bound.clone() }
    }

    /// The plan of a bound model; a demand that cannot be met is reported.
    pub(super) fn plan(&self, bound: &Bound) -> Result<Plan, Stopped> {
        plan::plan(&bound.model, Some(bound)).map_err(|problems| {
            tell_demands(&problems, &self.loaded, &self.reporter);
            Stopped::Reported
        })
    }

    /// Fits a rung (or the whole model), with a progress bar under a title.
    pub(super) fn fit(
        &self,
        rung: Option<Id<Rung>>,
        options: &Options,
        title: &str,
    ) -> Result<(Answer, Phases), Stopped> {
        let bound = self.at(rung);
        let (planned, seconds) = timed(|| self.plan(&bound).map(drop));
        planned?;
        let bar = Bar::new(title, options, self.reporter.shows_screens());
        let answer = run::fit(&bound, options, &bar);
        bar.clear();
        let answer = answer.map_err(|problem| Stopped::Run(Failure::from_text(&problem.to_string())))?;
        Ok((answer, Phases { plan: seconds, ..self.phases }))
    }

    /// Where results come from.
    pub(super) fn origin(&self, command: &'static str, rung: Option<&str>, options: &Options) -> Origin {
        let givens = self.bound.model.givens.iter().zip(&self.bound.givens);
        Origin {
            command,
            model: self.loaded.file.clone(),
            rung: rung.map(str::to_string),
            data: self.files.clone(),
            settings: givens.map(|((_, given), value)| (given.name.clone(), *value)).collect(),
            gaps: self.gaps.clone(),
            options: options.clone(),
        }
    }
}

/// Why there is no answer.
pub(super) enum Stopped {
    /// It has been reported.
    Reported,
    /// A chain stopped.
    Run(Failure),
}

/// The model of a rung, or the whole one.
pub(super) fn at(model: &Model, rung: Option<Id<Rung>>) -> Model {
    rung.map_or_else(|| model.clone(), |rung| model.at_rung(rung).0)
}

/// Reports problems of the data.
pub(super) fn tell(problems: &[DataProblem], loaded: &Loaded, reporter: &Reporter) {
    let reports: Vec<_> = problems.iter().map(DataProblem::report).collect();
    reporter.data(&reports, &loaded.sources);
}

/// Reports demands that cannot be met.
pub(super) fn tell_demands(problems: &[PlanProblem], loaded: &Loaded, reporter: &Reporter) {
    let reports: Vec<_> = problems.iter().map(PlanProblem::report).collect();
    reporter.model(&reports, &loaded.sources);
}

fn tables(loaded: &Loaded, path: &Path, data: &DataArguments, reporter: &Reporter) -> Option<data::Tables> {
    match data::wanted(&loaded.model, path, data) {
        Ok(wanted) => data::read(&loaded.model, &wanted, &data.gaps, reporter),
        Err(failure) => {
            reporter.failure(&failure);
            None
        }
    }
}
