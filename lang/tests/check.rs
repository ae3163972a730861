//! The checker on small models: right ones give the right model, wrong ones a message that can be read aloud.
#![allow(missing_docs, clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod describe;

use std::fs;
use std::path::{Path, PathBuf};

use stook_lang::check::{check_source, check_text};
use stook_lang::problem::{Severity, pages, render};
use stook_lang::span::{Source, Sources};

fn models(folder: &str) -> Vec<PathBuf> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/models").join(folder);
    let mut files: Vec<PathBuf> = fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path()).collect();
    files.sort();
    files
}

fn stem(path: &Path) -> String {
    path.file_stem().unwrap().to_string_lossy().into_owned()
}

fn rendered(name: &str, text: &str) -> String {
    let mut sources = Sources::default();
    let file = sources.add(Source::new(name, text));
    let (_, problems) = check_source(&sources, file);
    render(&problems.reports(), &sources, false)
}

#[test]
fn right_models_give_the_right_model() {
    for path in models("right") {
        let text = fs::read_to_string(&path).unwrap();
        let (model, problems) = check_text(&text);
        let name = stem(&path);
        assert!(problems.is_empty(), "{name}:\n{}", rendered(&name, &text));
        insta::assert_snapshot!(format!("right_{name}"), describe::describe(&model.unwrap()));
    }
}

/// The wrong model of a page shows its own problem and no other.
#[test]
fn a_mistake_has_one_message() {
    let mut failures = String::new();
    for page in pages().filter(|page| "NGHU".contains(&page.code.0[..1])) {
        let (_, wrong) = check_text(page.wrong);
        let reports = wrong.reports();
        let others: Vec<&str> = reports
            .iter()
            .filter(|report| report.severity == Severity::Error && report.code != page.code)
            .map(|report| report.code.0)
            .collect();
        if !others.is_empty() || reports.iter().filter(|report| report.code == page.code).count() > 1 {
            failures += &format!("{}:\n{}", page.code.0, rendered("wrong", page.wrong));
        }
    }
    assert!(failures.is_empty(), "{failures}");
}

#[test]
fn messages_read_well() {
    for path in models("check") {
        let text = fs::read_to_string(&path).unwrap();
        let name = stem(&path);
        let shown = rendered(&format!("{name}.stook"), &text);
        assert!(!shown.is_empty(), "{name} has no problem");
        insta::assert_snapshot!(format!("wrong_{name}"), shown);
    }
}
