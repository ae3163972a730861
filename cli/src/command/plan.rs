//! `stook plan`: what will update each unknown, and why.

use stook_sampler::plan;

use super::session::{Session, at, tell_demands};
use crate::arguments::PlanArguments;
use crate::data;
use crate::load;
use crate::outcome::Outcome;
use crate::report::Reporter;
use crate::screen::Screen;
use crate::screen::plan as screen;

/// Carries it out.
pub(crate) fn run(arguments: &PlanArguments) -> Outcome {
    let reporter = Reporter::new(arguments.model.messages);
    let path = &arguments.model.model;
    let Some(loaded) = load::model(path, &reporter) else { return Outcome::Mistake };
    let rung = match arguments.rung.as_ref().map(|name| load::rung(&loaded.model, name)).transpose() {
        Ok(rung) => rung,
        Err(failure) => return reporter.mistake(&failure),
    };
    let file = loaded.file.file.clone();
    let found = if arguments.data.is_said() || data::all_there(&loaded.model, path, &arguments.data) {
        let Some(session) = Session::with(loaded, path, &arguments.data, reporter) else {
            return Outcome::Mistake;
        };
        let bound = session.at(rung);
        session.plan(&bound).ok()
    } else {
        let model = at(&loaded.model, rung);
        let planned = plan::plan(&model, None);
        planned.map_err(|problems| tell_demands(&problems, &loaded, &reporter)).ok()
    };
    let Some(found) = found else { return Outcome::Mistake };
    reporter.end(screen::plan(&Screen::stdout(), &file, arguments.rung.as_deref(), &found))
}
