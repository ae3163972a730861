//! The folders that results are written to.
//!
//! Everything is written to a folder beside the final one, which takes the final name when it is complete: a run that
//! is killed or that fails leaves neither half a folder under the final name nor destroys an earlier one.

mod draws;
mod groups;
mod ladder;
mod run;
mod simulated;
mod sources;
mod summary;
mod target;

pub(crate) use run::{DataFile, Origin, Phases};
pub(crate) use target::{Staging, Target};

use std::fs::File;
use std::io::{BufWriter, Write};
use std::path::Path;

use stook_sampler::answer::Answer;
use stook_sampler::simulate::Simulated;

use crate::ladder::Fitted;
use crate::report::Failure;

/// Writes the files of one fit into a folder that exists.
pub(crate) fn write_fit(
    folder: &Path,
    answer: &Answer,
    origin: &Origin,
    phases: &Phases,
) -> Result<(), Failure> {
    let rung = origin.rung.as_deref().unwrap_or("");
    summary::write(&folder.join("summary.csv"), answer)?;
    draws::write(&folder.join("draws.parquet"), &answer.draws)?;
    sources::write(&folder.join("sources.csv"), &[(rung, &answer.sources)])?;
    groups::write(&folder.join("groups.csv"), &answer.groups)?;
    run::write(&folder.join("run.json"), answer, origin, phases)
}

/// Writes the files of a climb that set its rungs side by side.
pub(crate) fn write_ladder(folder: &Path, rungs: &[Fitted]) -> Result<(), Failure> {
    ladder::write(&folder.join("ladder.csv"), rungs)?;
    let sources: Vec<_> = rungs.iter().map(|rung| (rung.name.as_str(), rung.sources.as_slice())).collect();
    sources::write(&folder.join("sources.csv"), &sources)
}

/// Writes drawn tables and what they were drawn from; `files` has a file name for each table.
pub(crate) fn write_simulated(
    folder: &Path,
    simulated: &Simulated,
    files: &[String],
    origin: &Origin,
) -> Result<(), Failure> {
    simulated::write(folder, simulated, files)?;
    run::write_simulated(&folder.join("run.json"), files, origin)
}

/// Writes a file through a buffer; the error names the file and the cause.
fn write_file(
    path: &Path,
    content: impl FnOnce(&mut BufWriter<File>) -> std::io::Result<()>,
) -> Result<(), Failure> {
    let written = File::create(path).and_then(|file| {
        let mut buffer = BufWriter::new(file);
        content(&mut buffer)?;
        buffer.flush()
    });
    written.map_err(|error| unwritable(path, &error))
}

/// Writes rows as comma-separated values.
fn write_rows(
    path: &Path,
    headings: &[&str],
    rows: impl IntoIterator<Item = Vec<String>>,
) -> Result<(), Failure> {
    write_file(path, |file| {
        let mut writer = csv::Writer::from_writer(file);
        writer.write_record(headings)?;
        for row in rows {
            writer.write_record(&row)?;
        }
        writer.flush()
    })
}

/// That a file or folder cannot be written, and why.
fn unwritable(path: &Path, error: &dyn std::fmt::Display) -> Failure {
    Failure::new(
        format!("{} cannot be written: {error}", path.display()),
        "nothing was left under the final name; make room or choose another folder with --out",
    )
}

/// A number with as many digits as it takes to read back the same number.
fn number(value: f64) -> String {
    format!("{value:?}")
}

/// As [`number`]; an empty cell where there is none.
fn optional(value: Option<f64>) -> String {
    value.map(number).unwrap_or_default()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_read_back_the_same() {
        for value in [0.1 + 0.2, 1e-300, 123456789012345680.0, -0.0, 5e-324] {
            assert_eq!(number(value).parse::<f64>().map(f64::to_bits), Ok(value.to_bits()));
        }
    }
}
