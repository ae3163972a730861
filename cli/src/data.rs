//! The tables of a model, read from their files.

use std::fs::File;
use std::io::Read;
use std::path::{Path, PathBuf};

use sha2::{Digest, Sha256};
use stook_lang::arena::Id;
use stook_lang::model::{Model, Table};
use stook_lang::nearest::nearest;
use stook_lang::span::Sources;
use stook_sampler::bind;
use stook_sampler::table::{self, Format, TableProblem};

use crate::arguments::DataArguments;
use crate::folder::DataFile;
use crate::report::{Failure, Reporter};

/// What was read.
pub(crate) struct Tables {
    /// The tables, by position of their ids; `None` where one was not asked for.
    pub(crate) tables: Vec<Option<table::Table>>,
    /// Their files.
    pub(crate) files: Vec<DataFile>,
}

/// Where a table is to be read from.
pub(crate) struct Wanted {
    /// The table.
    pub(crate) table: Id<Table>,
    /// Its file.
    pub(crate) file: PathBuf,
    /// What is asked of the file.
    pub(crate) requests: Vec<table::Request>,
}

/// The files of all tables of a model.
pub(crate) fn wanted(model: &Model, path: &Path, data: &DataArguments) -> Result<Vec<Wanted>, Failure> {
    known(model, data)?;
    let one = |(id, declared): (Id<Table>, &Table)| match file(model, id, path, data) {
        Some(file) => Ok(Wanted { table: id, file, requests: bind::requests(model, id) }),
        None => Err(Failure::new(
            format!("the model names no file for the table `{}`", declared.name),
            format!("name one: --table {}=FILE", declared.name),
        )),
    };
    model.tables.iter().map(one).collect()
}

/// The file of a table: the one named with `--table`, from the working folder, or the one that the model names, from the
/// model file's folder.
pub(crate) fn file(model: &Model, table: Id<Table>, path: &Path, data: &DataArguments) -> Option<PathBuf> {
    let declared = &model.tables[table];
    let named = data.tables.iter().rev().find(|setting| setting.name == declared.name);
    named.map(|setting| setting.value.clone()).or_else(|| {
        let file = declared.file.as_ref()?;
        Some(path.parent().unwrap_or(Path::new("")).join(file))
    })
}

/// Whether every table's file is there.
pub(crate) fn all_there(model: &Model, path: &Path, data: &DataArguments) -> bool {
    model.tables.ids().all(|table| file(model, table, path, data).is_some_and(|file| file.exists()))
}

/// That every `--table` names a table of the model.
pub(crate) fn known(model: &Model, data: &DataArguments) -> Result<(), Failure> {
    let names: Vec<&str> = model.tables.iter().map(|(_, table)| table.name.as_str()).collect();
    for setting in &data.tables {
        if !names.contains(&setting.name.as_str()) {
            return Err(strange("table", &setting.name, &names));
        }
    }
    Ok(())
}

/// That the model has no such thing, with the nearest that it has.
pub(crate) fn strange(what: &str, name: &str, names: &[&str]) -> Failure {
    let help = match (nearest(name, names.iter().copied()), names.is_empty()) {
        (_, true) => format!("it has no {what}s at all"),
        (Some(nearest), _) => format!("the nearest is `{nearest}`"),
        (None, _) => format!("its {what}s are {}", names.join(", ")),
    };
    Failure::new(format!("the model has no {what} `{name}`"), help)
}

/// Reads tables and reports what is wrong with their files; `None` where something is.
pub(crate) fn read(model: &Model, wanted: &[Wanted], gaps: &[String], reporter: &Reporter) -> Option<Tables> {
    let mut read = Tables { tables: model.tables.ids().map(|_| None).collect(), files: vec![] };
    let mut complete = true;
    for one in wanted {
        match read_one(one, gaps) {
            Ok((table, sha256)) => {
                read.tables[one.table.position()] = Some(table);
                let name = model.tables[one.table].name.clone();
                read.files.push(DataFile { table: name, file: one.file.display().to_string(), sha256 });
            }
            Err(problems) => {
                complete = false;
                let reports: Vec<_> = problems.iter().map(TableProblem::report).collect();
                reporter.data(&reports, &Sources::default());
            }
        }
    }
    complete.then_some(read)
}

/// Reads a file once: its table, and the SHA-256 of its bytes.
fn read_one(wanted: &Wanted, gaps: &[String]) -> Result<(table::Table, String), Vec<TableProblem>> {
    let name = wanted.file.display().to_string();
    let file = File::open(&wanted.file)
        .map_err(|error| vec![TableProblem::Unreadable { file: name.clone(), cause: error.to_string() }])?;
    let mut source = Hashed { inner: file, hasher: Sha256::new() };
    let table = table::read(&mut source, &name, &wanted.requests, &format(&wanted.file, gaps))?;
    Ok((table, hexadecimal(&source.hasher.finalize())))
}

/// An empty cell is always a gap; the texts of the command line take the place of the other ones.
fn format(file: &Path, gaps: &[String]) -> Format {
    let threads = std::thread::available_parallelism().map_or(1, |cores| cores.get());
    let tabs = file.extension().is_some_and(|ending| ending.eq_ignore_ascii_case("tsv"));
    let mut format = Format { threads, delimiter: tabs.then_some(b'\t'), ..Format::default() };
    if !gaps.is_empty() {
        format.gaps = std::iter::once(String::new()).chain(gaps.iter().cloned()).collect();
    }
    format
}

/// What is read from it is hashed on the way.
struct Hashed<R> {
    inner: R,
    hasher: Sha256,
}

impl<R: Read> Read for Hashed<R> {
    fn read(&mut self, buffer: &mut [u8]) -> std::io::Result<usize> {
        let length = self.inner.read(buffer)?;
        self.hasher.update(&buffer[..length]);
        Ok(length)
    }
}

/// The SHA-256 of some bytes, hexadecimal.
pub(crate) fn hash(bytes: &[u8]) -> String {
    hexadecimal(&Sha256::digest(bytes))
}

fn hexadecimal(bytes: &[u8]) -> String {
    bytes.iter().map(|byte| format!("{byte:02x}")).collect()
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    // FIPS 180-4's example (from memory; also what sha256sum prints).
    const ABC: &str = "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad";

    #[test]
    fn the_hash_is_that_of_the_standard() {
        assert_eq!(hash(b"abc"), ABC);
        let mut source = Hashed { inner: &b"abc"[..], hasher: Sha256::new() };
        source.read_to_end(&mut vec![]).unwrap();
        assert_eq!(hexadecimal(&source.hasher.finalize()), ABC);
    }
}
