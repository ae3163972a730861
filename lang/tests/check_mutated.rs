//! The checker on mutated models: whatever stands in the file, it ends, and says something where it gives no model.
#![allow(missing_docs, clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::fmt::Write;
use std::fs;

use proptest::prelude::*;
use proptest::test_runner::{Config, RngAlgorithm, TestRng, TestRunner};
use stook_lang::check::check_text;

/// The right models, and the wrong ones as further material.
fn corpus() -> Vec<String> {
    let root = concat!(env!("CARGO_MANIFEST_DIR"), "/tests/models");
    let mut texts = Vec::new();
    for folder in ["right", "check"] {
        let mut files: Vec<_> =
            fs::read_dir(format!("{root}/{folder}")).unwrap().map(|entry| entry.unwrap().path()).collect();
        files.sort();
        texts.extend(files.iter().map(|path| fs::read_to_string(path).unwrap()));
    }
    texts
}

/// Words, numbers, quoted texts and signs, with the blanks between them left out.
fn tokens(text: &str) -> Vec<String> {
    let mut tokens: Vec<String> = Vec::new();
    let mut joins = false;
    for c in text.chars() {
        let word = c.is_alphanumeric() || "_.\"".contains(c);
        match tokens.last_mut() {
            Some(last) if word && joins => last.push(c),
            _ if !c.is_whitespace() => tokens.push(c.to_string()),
            _ => {}
        }
        joins = word;
    }
    tokens
}

#[derive(Clone, Debug)]
enum Change {
    Drop(usize),
    Repeat(usize),
    Swap(usize, usize),
    Take(usize, usize, usize),
}

fn change(at: impl Strategy<Value = usize>) -> impl Strategy<Value = Change> {
    (at, any::<usize>(), any::<usize>(), 0..4usize).prop_map(|(a, b, c, kind)| match kind {
        0 => Change::Drop(a),
        1 => Change::Repeat(a),
        2 => Change::Swap(a, b),
        _ => Change::Take(a, b, c),
    })
}

fn apply(tokens: &mut Vec<String>, change: &Change, corpus: &[Vec<String>]) {
    if tokens.is_empty() {
        return;
    }
    let count = tokens.len();
    match *change {
        Change::Drop(at) => {
            tokens.remove(at % count);
        }
        Change::Repeat(at) => {
            let token = tokens[at % count].clone();
            tokens.insert(at % count, token);
        }
        Change::Swap(a, b) => tokens.swap(a % count, b % count),
        Change::Take(at, from, which) => {
            let other = &corpus[from % corpus.len()];
            tokens[at % count].clone_from(&other[which % other.len()]);
        }
    }
}

#[test]
fn mutated_models_end_with_a_model_or_a_reason() {
    let corpus: Vec<Vec<String>> = corpus().iter().map(|text| tokens(text)).collect();
    let config = Config { cases: 3000, failure_persistence: None, ..Config::default() };
    let mut runner = TestRunner::new_with_rng(config, TestRng::from_seed(RngAlgorithm::ChaCha, &[7; 32]));
    let strategy = (any::<usize>(), prop::collection::vec(change(any::<usize>()), 1..6));
    runner
        .run(&strategy, |(which, changes)| {
            let mut tokens = corpus[which % corpus.len()].clone();
            changes.iter().for_each(|change| apply(&mut tokens, change, &corpus));
            let text = tokens.join(" ");
            let (model, problems) = check_text(&text);
            prop_assert_eq!(model.is_none(), problems.has_errors());
            for report in problems.reports() {
                prop_assert!(!report.labels.is_empty() && !report.help.is_empty());
            }
            Ok(())
        })
        .unwrap();
}

#[test]
fn long_sums_and_long_chains_do_not_exhaust_the_stack() {
    let mut text =
        String::from("table harvest { honey : real }\nunknown a0 : real follows normal(mean: 0, sd: 1)\n");
    for at in 1..20_000 {
        let _ = writeln!(text, "let a{at} = a{} + 1", at - 1);
    }
    let sum = vec!["a1"; 100_000].join(" + ");
    let _ = writeln!(text, "let long = {sum}\nlet back = a19999");
    let constant = vec!["1"; 100_000].join(" + ");
    let _ = writeln!(text, "given many : positive = {constant}");
    let (_, problems) = check_text(&text);
    let codes: Vec<&str> = problems.reports().iter().map(|report| report.code.0).collect();
    assert!(!codes.iter().any(|code| "NGHU".contains(&code[..1])), "{codes:?}");
}

#[test]
fn a_dense_graph_of_tables_ends() {
    // Each group has a row in a table that leads to every other group: the number of ways grows like a factorial.
    let mut text = String::new();
    for at in 0..14 {
        let _ = writeln!(text, "group g{at}");
        let columns: Vec<String> = (0..14).filter(|to| *to != at).map(|to| format!("g{to}")).collect();
        let _ = writeln!(text, "table t{at} per g{at} {{ {}, v{at} : real }}", columns.join(", "));
    }
    text += "group apart\ntable last per g13 { apart }\n";
    text += "unknown x : real per apart follows normal(mean: 0, sd: 1)\nresponse v0 follows normal(mean: x, sd: 1)\n";
    let (_, problems) = check_text(&text);
    let codes: Vec<&str> = problems.reports().iter().map(|report| report.code.0).collect();
    assert_eq!(codes, ["G102"]);
}
