//! `stook fit`: one fit of a model, or of a rung of its ladder.

use super::session::{Session, Stopped};
use crate::arguments::FitArguments;
use crate::folder::{self, Target};
use crate::load;
use crate::outcome::Outcome;
use crate::report::{Failure, Reporter};
use crate::screen::fit::Heading;
use crate::screen::{Screen, fit, verdict};

/// Carries it out.
pub(crate) fn run(arguments: &FitArguments) -> Outcome {
    let reporter = Reporter::new(arguments.model.messages);
    let path = &arguments.model.model;
    let target = match Target::choose(arguments.out.as_deref(), path, "fit") {
        Ok(target) => target,
        Err(failure) => return reporter.mistake(&failure),
    };
    let Some(session) = Session::open(&arguments.model, &arguments.data) else { return Outcome::Mistake };
    let rung = arguments.rung.as_ref().map(|name| load::rung(&session.loaded.model, name)).transpose();
    let rung = match rung {
        Ok(rung) => rung,
        Err(failure) => return reporter.mistake(&failure),
    };
    let options = arguments.chains.options();
    let (answer, phases) = match session.fit(rung, &options, "fit") {
        Ok(found) => found,
        Err(Stopped::Reported) => return Outcome::Mistake,
        Err(Stopped::Run(failure)) => return reporter.mistake(&failure),
    };
    let origin = session.origin("fit", arguments.rung.as_deref(), &options);
    let written = target.begin().and_then(|staging| {
        folder::write_fit(staging.path(), &answer, &origin, &phases)?;
        staging.finish()
    });
    let heading = Heading { model: session.loaded.file.file.clone(), rung: arguments.rung.clone() };
    let mut text = fit::fit(&Screen::stdout(), &heading, &answer, &options);
    if written.is_ok() {
        text.push_str(&format!("\nResults are in {}\n", target.folder().display()));
    }
    if let Err(failure) = reporter.screen(&text).and(written) {
        return reporter.mistake(&failure);
    }
    if answer.verdict.converged() {
        return Outcome::Done;
    }
    if !reporter.shows_screens() {
        let advice = verdict::advice(&answer, options.warmup);
        reporter.failure(&Failure::new(format!("not converged: {}", verdict::summary(&answer)), advice));
    }
    Outcome::NotConverged
}
