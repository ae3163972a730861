//! How a command ends.

use std::process::ExitCode;

/// How a command ends, as its exit status.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Outcome {
    /// Done, and converged where something was fitted.
    Done,
    /// A mistake in the model or the data, or a file that cannot be read or written. It has been reported.
    Mistake,
    /// Fitted, and not converged.
    NotConverged,
}

impl From<Outcome> for ExitCode {
    fn from(outcome: Outcome) -> ExitCode {
        match outcome {
            Outcome::Done => ExitCode::SUCCESS,
            Outcome::Mistake => ExitCode::from(1),
            Outcome::NotConverged => ExitCode::from(3),
        }
    }
}
