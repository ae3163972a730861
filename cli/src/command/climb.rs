//! `stook climb`: the rungs of a ladder, one after the other.

use stook_lang::arena::Id;
use stook_lang::model::Rung;
use stook_sampler::run::Options;

use super::session::{Session, Stopped};
use crate::arguments::ClimbArguments;
use crate::folder::{self, Staging, Target};
use crate::ladder::Fitted;
use crate::load;
use crate::outcome::Outcome;
use crate::report::{Failure, Reporter};
use crate::screen::climb::Stop;
use crate::screen::{Screen, climb, verdict};

/// Carries it out.
pub(crate) fn run(arguments: &ClimbArguments) -> Outcome {
    let reporter = Reporter::new(arguments.model.messages);
    let target = match Target::choose(arguments.out.as_deref(), &arguments.model.model, "climb") {
        Ok(target) => target,
        Err(failure) => return reporter.mistake(&failure),
    };
    let Some(session) = Session::open(&arguments.model, &arguments.data) else { return Outcome::Mistake };
    let rungs = match rungs(&session, arguments.rung.as_deref()) {
        Ok(rungs) => rungs,
        Err(failure) => return reporter.mistake(&failure),
    };
    let staging = match target.begin() {
        Ok(staging) => staging,
        Err(failure) => return reporter.mistake(&failure),
    };
    let Some(climbed) = up(&session, &rungs, &arguments.chains.options(), &staging) else {
        return Outcome::Mistake;
    };
    let written = match (&climbed.unwritten, climbed.fitted.is_empty()) {
        (Some(failure), _) => Err(failure.clone()),
        // Nothing came of it, so an earlier folder is left as it is.
        (None, true) => Ok(false),
        (None, false) => folder::write_ladder(staging.path(), &climbed.fitted)
            .and_then(|()| staging.finish())
            .map(|()| true),
    };
    let file = &session.loaded.file.file;
    let mut text = climb::climb(&Screen::stdout(), file, &climbed.fitted, climbed.stop.as_ref());
    if let Ok(true) = written {
        text.push_str(&format!("\nResults are in {}, a folder for each rung\n", target.folder().display()));
    }
    let shown = reporter.screen(&text);
    if let Some(stop) =
        climbed.stop.as_ref().filter(|_| climbed.outcome == Outcome::Mistake || !reporter.shows_screens())
    {
        let added = climb::joined(&stop.adds);
        let message = format!("stopped at rung {}, which adds {added}: {}", stop.rung, stop.why);
        reporter.failure(&Failure::new(message, stop.advice.clone()));
    }
    if let Err(failure) = shown.and(written.map(drop)) {
        return reporter.mistake(&failure);
    }
    climbed.outcome
}

/// The rungs to climb: all, or those up to one.
fn rungs(session: &Session, last: Option<&str>) -> Result<Vec<Id<Rung>>, Failure> {
    let model = &session.loaded.model;
    if model.ladder.is_empty() {
        return Err(Failure::new(
            "the model has no ladder to climb",
            "declare one, `ladder { rung plain ... }`, or fit the model as it is with `stook fit`",
        ));
    }
    let last = last.map(|name| load::rung(model, name)).transpose()?;
    Ok(model.ladder.ids().filter(|rung| last.is_none_or(|last| *rung <= last)).collect())
}

/// What came of a climb.
struct Climbed {
    fitted: Vec<Fitted>,
    stop: Option<Stop>,
    outcome: Outcome,
    /// Why a rung's folder could not be written; the climb ended there.
    unwritten: Option<Failure>,
}

/// Fits rung after rung until one does not converge; `None` where a problem was reported before the first.
fn up(session: &Session, rungs: &[Id<Rung>], options: &Options, staging: &Staging) -> Option<Climbed> {
    let model = &session.loaded.model;
    let mut climbed = Climbed { fitted: vec![], stop: None, outcome: Outcome::Done, unwritten: None };
    for (at, id) in rungs.iter().enumerate() {
        let rung = &model.ladder[*id];
        let stop = |why: String, advice: String| Stop {
            rung: rung.name.clone(),
            adds: rung.adds.iter().map(|term| model.named[*term].name.clone()).collect(),
            why,
            advice,
            untried: rungs[at + 1..].iter().map(|rung| model.ladder[*rung].name.clone()).collect(),
        };
        let title = format!("{} ({} of {})", rung.name, at + 1, rungs.len());
        let (answer, phases) = match session.fit(Some(*id), options, &title) {
            Ok(found) => found,
            Err(Stopped::Reported) => return None,
            Err(Stopped::Run(failure)) => {
                climbed.stop = Some(stop(failure.message, failure.help));
                climbed.outcome = Outcome::Mistake;
                break;
            }
        };
        let origin = session.origin("climb", Some(&rung.name), options);
        let written = staging
            .inside(&rung.name)
            .and_then(|folder| folder::write_fit(&folder, &answer, &origin, &phases));
        climbed.fitted.push(Fitted::new(model, rung, &answer));
        if !answer.verdict.converged() {
            climbed.stop = Some(stop(verdict::summary(&answer), verdict::advice(&answer, options.warmup)));
            climbed.outcome = Outcome::NotConverged;
        }
        if let Err(failure) = written {
            climbed.unwritten = Some(failure);
            break;
        }
        if climbed.stop.is_some() {
            break;
        }
    }
    Some(climbed)
}
