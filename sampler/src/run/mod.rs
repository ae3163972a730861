//! A run: chains over a plan, to draws and answers.

mod chains;
mod options;
mod problem;
mod start;
mod threads;

pub use options::{Options, Phase, Progress, Watch};
pub use problem::RunProblem;

use crate::answer::Answer;
use crate::bind::Bound;
use crate::plan;
use crate::program::Program;

pub(crate) use chains::titles;
pub(crate) use threads::share;

/// Fits a bound model: plans, compiles, runs the chains and answers.
pub fn fit(bound: &Bound, options: &Options, watch: &dyn Watch) -> Result<Answer, RunProblem> {
    let plan = plan::plan(&bound.model, Some(bound)).map_err(RunProblem::Plan)?;
    if plan.steps.is_empty() {
        return Err(RunProblem::Nothing);
    }
    let program = Program::new(bound, &plan);
    let (draws, [warmup, kept]) = chains::run(bound, &program, options, watch)?;
    crate::answer::answer(bound, &plan, &program, draws, options, [warmup, kept])
}
