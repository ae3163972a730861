//! Runs the program in a folder of its own.

#![allow(clippy::unwrap_used, dead_code)]

use std::path::{Path, PathBuf};
use std::process::{Command, Output};

/// The model of the tests, and its table.
pub(crate) const HONEY: &str = include_str!("../fixtures/honey.stook");
/// Its table.
pub(crate) const HARVEST: &str = include_str!("../fixtures/harvest.csv");

/// A working folder that goes away with the test.
pub(crate) struct Place(tempfile::TempDir);

/// What a run said and how it ended.
pub(crate) struct Run {
    /// The exit status.
    pub(crate) status: i32,
    /// Standard output.
    pub(crate) out: String,
    /// Standard error.
    pub(crate) err: String,
}

impl Place {
    /// An empty folder.
    pub(crate) fn empty() -> Place {
        Place(tempfile::tempdir().unwrap())
    }

    /// A folder with the model and its table.
    pub(crate) fn with_honey() -> Place {
        let place = Place::empty();
        place.write("honey.stook", HONEY);
        place.write("harvest.csv", HARVEST);
        place
    }

    /// A path in the folder.
    pub(crate) fn path(&self, name: &str) -> PathBuf {
        self.0.path().join(name)
    }

    /// Writes a file.
    pub(crate) fn write(&self, name: &str, text: &str) {
        std::fs::write(self.path(name), text).unwrap();
    }

    /// Reads a file.
    pub(crate) fn read(&self, name: &str) -> String {
        std::fs::read_to_string(self.path(name)).unwrap()
    }

    /// The names in a folder of the folder, sorted.
    pub(crate) fn names(&self, name: &str) -> Vec<String> {
        let entries = std::fs::read_dir(self.path(name)).unwrap();
        let mut names: Vec<String> =
            entries.map(|entry| entry.unwrap().file_name().into_string().unwrap()).collect();
        names.sort();
        names
    }

    /// Runs the program here with arguments that are separated by spaces.
    pub(crate) fn stook(&self, arguments: &str) -> Run {
        let output = command(self.0.path()).args(arguments.split_whitespace()).output().unwrap();
        Run::from(output)
    }

    /// Runs a shell command here in which `$STOOK` is the program.
    pub(crate) fn shell(&self, line: &str) -> Run {
        let mut shell = Command::new("sh");
        shell.args(["-c", line]).current_dir(self.0.path()).env("STOOK", env!("CARGO_BIN_EXE_stook"));
        Run::from(shell.output().unwrap())
    }
}

impl From<Output> for Run {
    fn from(output: Output) -> Run {
        Run {
            status: output.status.code().unwrap_or(-1),
            out: String::from_utf8(output.stdout).unwrap(),
            err: String::from_utf8(output.stderr).unwrap(),
        }
    }
}

fn command(folder: &Path) -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_stook"));
    command.current_dir(folder).env_remove("NO_COLOR").env_remove("COLUMNS");
    command
}

/// The cells of a row of comma-separated values without quotes.
pub(crate) fn cells(line: &str) -> Vec<&str> {
    line.split(',').collect()
}
