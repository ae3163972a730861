//! The pages of `explain` hold: each wrong example has its problem, each right one has none, and every code has a page and a
//! small model of its own.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::collections::BTreeSet;

use stook_lang::check::check_text;
use stook_lang::problem::{Report, pages};

fn reports(text: &str) -> Vec<Report> {
    check_text(text).1.reports()
}

#[test]
fn every_wrong_example_has_its_problem_and_every_right_one_none() {
    let mut wrongs = vec![];
    for page in pages() {
        let found: Vec<&str> = reports(page.wrong).iter().map(|report| report.code.0).collect();
        if !found.contains(&page.code.0) {
            wrongs.push(format!("{}: the wrong example gives {found:?}", page.code.0));
        }
        let right = reports(page.right);
        if !right.is_empty() {
            let found: Vec<String> = right.iter().map(|r| format!("{} {}", r.code.0, r.message)).collect();
            wrongs.push(format!("{}: the right example gives {found:?}", page.code.0));
        }
    }
    assert!(wrongs.is_empty(), "{}", wrongs.join("\n"));
}

#[test]
fn codes_are_unique() {
    let codes: Vec<&str> = pages().map(|page| page.code.0).collect();
    let distinct: BTreeSet<&str> = codes.iter().copied().collect();
    assert_eq!(codes.len(), distinct.len());
}

#[test]
fn every_code_has_a_small_model_whose_messages_are_kept() {
    let folder = concat!(env!("CARGO_MANIFEST_DIR"), "/tests/models/diagnostics");
    let mut shown = BTreeSet::new();
    for entry in std::fs::read_dir(folder).unwrap() {
        let text = std::fs::read_to_string(entry.unwrap().path()).unwrap();
        shown.extend(reports(&text).iter().map(|report| report.code.0.to_string()));
    }
    let missing: Vec<&str> = pages().map(|page| page.code.0).filter(|code| !shown.contains(*code)).collect();
    assert!(missing.is_empty(), "no model in tests/models/diagnostics shows {missing:?}");
}
