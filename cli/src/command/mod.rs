//! The commands, a file for each.

mod check;
mod climb;
mod explain;
mod fit;
mod plan;
mod session;
mod simulate;

use crate::arguments::{Arguments, Command};
use crate::outcome::Outcome;

/// Carries out a command.
pub(crate) fn run(arguments: Arguments) -> Outcome {
    match arguments.command {
        Command::Check(arguments) => check::run(&arguments),
        Command::Plan(arguments) => plan::run(&arguments),
        Command::Fit(arguments) => fit::run(&arguments),
        Command::Climb(arguments) => climb::run(&arguments),
        Command::Explain(arguments) => explain::run(&arguments),
        Command::Simulate(arguments) => simulate::run(&arguments),
    }
}
