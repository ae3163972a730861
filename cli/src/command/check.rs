//! `stook check`: the mistakes of a model file, and of its data where the command line speaks of data.

use super::session::Session;
use crate::arguments::CheckArguments;
use crate::load;
use crate::outcome::Outcome;
use crate::report::Reporter;
use crate::screen::{Screen, check};

/// Carries it out.
pub(crate) fn run(arguments: &CheckArguments) -> Outcome {
    let reporter = Reporter::new(arguments.model.messages);
    let path = &arguments.model.model;
    let Some(loaded) = load::model(path, &reporter) else { return Outcome::Mistake };
    if let Some(Err(failure)) = arguments.rung.as_ref().map(|name| load::rung(&loaded.model, name)) {
        return reporter.mistake(&failure);
    }
    let text = check::check(&Screen::stdout(), &loaded.file.file, &loaded.model, loaded.warnings);
    if arguments.data.is_said() && Session::with(loaded, path, &arguments.data, reporter).is_none() {
        return Outcome::Mistake;
    }
    reporter.end(text)
}
