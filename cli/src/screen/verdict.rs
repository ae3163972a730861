//! The verdict of a fit that has not converged: what, why, and what to do.

use stook_sampler::answer::Answer;
use stook_sampler::summary::Failure;

use super::Screen;
use super::text::{counted, hang, thousands, wrap};

/// The worst quantities that are named.
const NAMED: usize = 4;

/// The verdict; empty for a fit that has converged.
pub(crate) fn verdict(screen: &Screen, answer: &Answer, warmup: usize) -> String {
    let verdict = &answer.verdict;
    if verdict.converged() {
        return String::new();
    }
    let mut out = format!("{}\n", screen.style.alarm("NOT CONVERGED"));
    out.push_str(&wrap(&summary(answer), screen.width, 2));
    out.push_str(&worst(screen, answer));
    out.push_str(&wrap(&format!("What to do: {}", advice(answer, warmup)), screen.width, 2));
    out
}

/// One sentence for programs and for the middle of a climb.
pub(crate) fn summary(answer: &Answer) -> String {
    let verdict = &answer.verdict;
    let all = counted(verdict.judged, "quantity", "quantities");
    let failed = thousands(verdict.failures.len() as f64);
    if verdict.failures.iter().any(|failure| failure.too_few_draws) {
        return format!("The chains are too short to be judged ({all}): no number is to be relied on.");
    }
    format!("The chains do not bear out {failed} of {all}: the numbers are not to be relied on.")
}

fn worst(screen: &Screen, answer: &Answer) -> String {
    let rule = &answer.verdict.rule;
    let chains = answer.draws.chains as f64;
    let mut out = String::new();
    for failure in answer.verdict.failures.iter().take(NAMED) {
        let mut why = vec![];
        if let Some(rhat) = failure.split_rhat {
            why.push(format!("the chains differ: R-hat {} (at most {})", short(rhat), rule.split_rhat));
        }
        if let Some(size) = failure.bulk_ess {
            let needed = chains * rule.bulk_ess_per_chain;
            why.push(format!("worth {} draws (at least {})", thousands(size), thousands(needed)));
        } else if let Some(size) = failure.tail_ess {
            let needed = chains * rule.tail_ess_per_chain;
            why.push(format!(
                "in the tails worth {} draws (at least {})",
                thousands(size),
                thousands(needed)
            ));
        }
        if failure.too_few_draws {
            why.push("fewer than 4 draws a chain".into());
        }
        let name = answer.draws.scalars[failure.scalar].title();
        out.push_str(&hang(&format!("{name}: {}", why.join("; ")), screen.width, 4, 6));
    }
    let more = answer.verdict.failures.len().saturating_sub(NAMED);
    if more > 0 {
        out.push_str(&format!(
            "    {}\n",
            screen.style.faint(&format!("... and {more} more, see summary.csv"))
        ));
    }
    out
}

fn short(rhat: f64) -> String {
    if rhat.is_finite() { format!("{rhat:.3}") } else { "infinite".into() }
}

/// What to do: more draws where that will do, else a look at the model.
pub(crate) fn advice(answer: &Answer, warmup: usize) -> String {
    let failures = &answer.verdict.failures;
    let draws = answer.draws.draws;
    if failures.iter().any(|failure| failure.too_few_draws) {
        return "ask for more draws, such as --draws 2500.".into();
    }
    let apart = failures.iter().filter_map(|failure| failure.split_rhat).reduce(f64::max);
    let longer = thousand_up(draws as f64 * failures.iter().map(factor).fold(2.0, f64::max));
    match apart {
        Some(rhat) if rhat > 1.1 => format!(
            "the chains are in different places. Try a longer run (--warmup {} --draws {}); if they stay apart, look for \
             two terms that say the same thing, or a prior that is far too wide.",
            thousand_up(4.0 * warmup.max(500) as f64),
            thousand_up(2.0 * draws as f64)
        ),
        _ => format!(
            "run longer, with about --draws {longer} --warmup {}; if that does not do, a narrower prior often does.",
            thousand_up(2.0 * warmup.max(500) as f64)
        ),
    }
}

/// How many times as many draws it would take, at most 20: R-hat - 1 falls as 1 / draws, the effective size rises with them.
fn factor(failure: &Failure) -> f64 {
    (1.2 * failure.excess).min(20.0)
}

fn thousand_up(number: f64) -> usize {
    ((number / 1000.0).ceil() * 1000.0) as usize
}
