//! The screen of a plan: what will update each unknown, why, and what it costs.

use stook_sampler::plan::Plan;

use super::Screen;
use super::text::{hang, thousands};

/// The steps of a sweep in order.
pub(crate) fn plan(screen: &Screen, file: &str, rung: Option<&str>, found: &Plan) -> String {
    let rung = rung.map(|rung| format!(", rung {rung}")).unwrap_or_default();
    let mut out =
        format!("{}\n", screen.style.strong(&format!("{file}{rung}: what one sweep does, in order")));
    for (number, step) in (1..).zip(&found.steps) {
        out.push('\n');
        let head = format!("{number}. {}", step.names.join(", "));
        let head = hang(&head, screen.width, 0, 3);
        out.push_str(&screen.style.strong(head.trim_end()));
        out.push('\n');
        let mut line = |word: &str, text: &str| {
            out.push_str(&hang(&format!("{word:<6} {text}"), screen.width, 3, 10));
        };
        line("how", step.update.name());
        line("why", &step.reason);
        for rejected in &step.rejected {
            line("not", rejected);
        }
        let cost = match step.cost.steps {
            Some(steps) => format!("{}, here about {} steps", step.cost.formula, thousands(steps)),
            None => step.cost.formula.clone(),
        };
        line("cost", &cost);
    }
    out.push('\n');
    let steps: Option<f64> = found.steps.iter().map(|step| step.cost.steps).sum();
    let total = match steps {
        Some(steps) => {
            format!("A sweep takes about {} elementary steps with the data at hand.", thousands(steps))
        }
        None => "Costs are formulas in rows and labels; with the data at hand they are numbers, too.".into(),
    };
    out.push_str(&screen.style.faint(&hang(&total, screen.width, 0, 0)));
    out
}
