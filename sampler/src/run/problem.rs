//! What can stop a run.

use std::fmt;

/// A run that stopped without draws.
#[derive(Clone, Debug, PartialEq)]
pub enum RunProblem {
    /// No start with a finite density was found.
    NoStart {
        /// The statement without a finite density.
        what: String,
        /// Its element, from 0 (a row of the response's table).
        element: usize,
        /// The value there.
        value: f64,
    },
    /// An update met a number that is none.
    NotFinite {
        /// The scalar that was being moved.
        unknown: String,
        /// Its value.
        value: f64,
        /// What was not finite.
        what: &'static str,
        /// The chain, from 1.
        chain: usize,
        /// The sweep, from 1, warm-up included.
        sweep: usize,
        /// The scalar unknowns at that moment.
        state: Vec<(String, f64)>,
    },
    /// The model has nothing to estimate.
    Nothing,
    /// The draws could not be summarised.
    Summary(String),
    /// The plan could not be made.
    Plan(Vec<crate::plan::PlanProblem>),
}

impl fmt::Display for RunProblem {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            RunProblem::NoStart { what, element, value } => write!(
                f,
                "no start was found: {what} has no finite density at element {} (value {value}), whatever was drawn \
                 from the priors\n  help: narrow the priors, or look for a value that the distribution cannot give",
                element + 1
            ),
            RunProblem::NotFinite { unknown, value, what, chain, sweep, state } => {
                write!(
                    f,
                    "chain {chain} stopped in sweep {sweep}: {what} of `{unknown}` is not finite at {value}"
                )?;
                let shown: Vec<String> =
                    state.iter().map(|(name, value)| format!("{name} = {value}")).collect();
                if !shown.is_empty() {
                    write!(f, "\n  state: {}", shown.join(", "))?;
                }
                write!(f, "\n  help: a prior that reaches extreme values is the usual cause: narrow it")
            }
            RunProblem::Nothing => write!(f, "the model has nothing to estimate"),
            RunProblem::Summary(problem) => write!(f, "the draws cannot be summarised: {problem}"),
            RunProblem::Plan(problems) => {
                let texts: Vec<String> = problems.iter().map(|problem| problem.report().message).collect();
                write!(f, "{}", texts.join("\n"))
            }
        }
    }
}

impl std::error::Error for RunProblem {}
