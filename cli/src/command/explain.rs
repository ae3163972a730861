//! `stook explain`: the page of a code, or the list of all codes.

use stook_lang::nearest::nearest;
use stook_lang::problem::{Page, pages};

use crate::arguments::ExplainArguments;
use crate::outcome::Outcome;
use crate::report::{Failure, Reporter};
use crate::screen::{Screen, explain};

/// Carries it out.
pub(crate) fn run(arguments: &ExplainArguments) -> Outcome {
    let reporter = Reporter::for_people();
    let screen = Screen::stdout();
    let mut pages: Vec<&Page> = pages().collect();
    pages.extend(stook_sampler::table::pages());
    pages.extend(stook_sampler::bind::pages());
    pages.extend(stook_sampler::plan::pages());
    let Some(code) = &arguments.code else { return reporter.end(explain::list(&screen, &pages)) };
    match pages.iter().find(|page| page.code.0.eq_ignore_ascii_case(code)) {
        Some(page) => reporter.end(explain::page(&screen, page)),
        None => reporter.mistake(&unknown(code, &pages)),
    }
}

fn unknown(code: &str, pages: &[&Page]) -> Failure {
    let help = match nearest(&code.to_ascii_uppercase(), pages.iter().map(|page| page.code.0)) {
        Some(nearest) => format!("the nearest is {nearest}; `stook explain` without a code lists all"),
        None => "`stook explain` without a code lists all".into(),
    };
    Failure::new(format!("there is no code `{code}`"), help)
}
