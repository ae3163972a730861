//! The stook command line: variation by source, from a model file.

mod arguments;
mod clock;
mod command;
mod data;
mod folder;
mod ladder;
mod load;
mod outcome;
mod progress;
mod report;
mod screen;
mod terminal;

use std::process::ExitCode;

use clap::Parser;

/// Stack of the thread that does the work: long sums and chains of names are followed by recursion, a frame for each term.
/// The system gives pages of it only as they are used.
const STACK: usize = 1 << 30;

fn main() -> ExitCode {
    let arguments = arguments::Arguments::parse();
    let work = || ExitCode::from(command::run(arguments));
    match std::thread::Builder::new().stack_size(STACK).spawn(work) {
        Ok(worker) => worker.join().unwrap_or(ExitCode::FAILURE),
        Err(error) => {
            terminal::complain(&format!("error: no thread could be started: {error}\n"));
            ExitCode::FAILURE
        }
    }
}
