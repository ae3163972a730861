//! Shared helpers of the end-to-end tests.

use std::collections::BTreeMap;
use std::io;
use std::path::{Path, PathBuf};
use std::process::Command;

/// The program under test, ready for arguments, without colours.
///
/// It stands beside the folder of the test executable: `target/PROFILE/deps/TEST` runs `target/PROFILE/stook`. Cargo builds it when the
/// whole workspace is tested (`cargo test --workspace`); a test of this crate alone runs the program that was built last.
///
/// # Errors
/// Where the test executable's own place cannot be found, or no program has been built.
pub fn stook() -> io::Result<Command> {
    let test = std::env::current_exe()?;
    let program = test
        .ancestors()
        .skip(1)
        .map(|folder| folder.join(format!("stook{}", std::env::consts::EXE_SUFFIX)))
        .find(|path| path.is_file())
        .ok_or_else(|| {
            io::Error::new(io::ErrorKind::NotFound, "no stook beside the test: run `cargo build` first")
        })?;
    let mut command = Command::new(program);
    command.env("NO_COLOR", "1");
    Ok(command)
}

/// The folder of this crate, where the cases and their data lie.
pub fn crate_folder() -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR"))
}

/// A row of a table by heading.
pub type Row = BTreeMap<String, String>;

/// The rows of a comma-separated table that the program wrote. Quotes around a cell are taken off; a comma inside a cell is not
/// expected, because the cases have none in their labels.
///
/// # Errors
/// Where the file cannot be read, or a row has not as many cells as the first line.
pub fn read_table(path: &Path) -> io::Result<Vec<Row>> {
    let text = std::fs::read_to_string(path)
        .map_err(|e| io::Error::new(e.kind(), format!("{}: {e}", path.display())))?;
    let mut lines = text.lines();
    let headings = cells(lines.next().unwrap_or_default());
    lines
        .map(|line| {
            let row = cells(line);
            if row.len() != headings.len() {
                let message = format!(
                    "{}: {} cells under {} headings: {line}",
                    path.display(),
                    row.len(),
                    headings.len()
                );
                return Err(io::Error::new(io::ErrorKind::InvalidData, message));
            }
            Ok(headings.iter().cloned().zip(row).collect())
        })
        .collect()
}

fn cells(line: &str) -> Vec<String> {
    line.split(',').map(|cell| cell.trim().trim_matches('"').to_owned()).collect()
}
