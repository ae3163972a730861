//! A model file, read and checked.

use std::path::Path;

use stook_lang::arena::Id;
use stook_lang::check::check_source;
use stook_lang::model::{Model, Rung};
use stook_lang::problem::{Report, Severity};
use stook_lang::span::{Source, Sources};

use crate::data::{hash, strange};
use crate::folder::DataFile;
use crate::report::{Failure, Reporter};

/// A model without errors.
pub(crate) struct Loaded {
    /// Its texts.
    pub(crate) sources: Sources,
    /// The model.
    pub(crate) model: Model,
    /// Its warnings, which have been reported.
    pub(crate) warnings: usize,
    /// Its file.
    pub(crate) file: DataFile,
}

/// Reads and checks a model file and reports its problems; `None` where it has errors.
pub(crate) fn model(path: &Path, reporter: &Reporter) -> Option<Loaded> {
    let bytes = match std::fs::read(path) {
        Ok(bytes) => bytes,
        Err(error) => {
            let help = "name the model file, such as honey.stook";
            reporter.failure(&Failure::new(format!("{} cannot be read: {error}", path.display()), help));
            return None;
        }
    };
    let sha256 = hash(&bytes);
    let text = match String::from_utf8(bytes) {
        Ok(text) => text,
        Err(error) => {
            let at = error.utf8_error().valid_up_to();
            let line = error.as_bytes()[..at].iter().filter(|byte| **byte == b'\n').count() + 1;
            reporter.failure(&Failure::new(
                format!("{}, line {line}: the text is not UTF-8", path.display()),
                "save the model file as UTF-8",
            ));
            return None;
        }
    };
    // Some editors begin a file with a byte-order mark, which is no part of the text.
    let text = text.strip_prefix('\u{feff}').map(str::to_string).unwrap_or(text);
    let mut sources = Sources::default();
    let name = path.display().to_string();
    let file = sources.add(Source::new(name.clone(), text));
    let (model, problems) = check_source(&sources, file);
    let reports = problems.reports();
    reporter.model(&reports, &sources);
    let errors = reports.iter().any(|report: &Report| report.severity == Severity::Error);
    let model = model.filter(|_| !errors)?;
    Some(Loaded {
        sources,
        model,
        warnings: reports.len(),
        file: DataFile { table: String::new(), file: name, sha256 },
    })
}

/// The rung of a name.
pub(crate) fn rung(model: &Model, name: &str) -> Result<Id<Rung>, Failure> {
    if let Some((id, _)) = model.ladder.iter().find(|(_, rung)| rung.name == name) {
        return Ok(id);
    }
    let names: Vec<&str> = model.ladder.iter().map(|(_, rung)| rung.name.as_str()).collect();
    Err(strange("rung", name, &names))
}
