//! Tree to checked model.
//!
//! The way: groups and names are collected (`names`, `structure`), types are read (`types`), the shape of every named
//! expression is inferred (`dependency`, `dimension`), every expression is worked out at its place (`expression`, `access`,
//! `distribution`), and what is whole is put together (`assemble`). Each step reports what it finds and goes on; what is
//! wrong is marked as broken, and uses of it are silent.
//!
//! Units are carried into the model and not checked in this version.

mod access;
mod assemble;
mod checker;
mod constant;
mod dependency;
mod dimension;
mod distribution;
mod expression;
mod graph;
mod ladder;
mod leaf;
mod names;
mod reduction;
mod soundness;
mod structure;
mod types;

use std::collections::HashSet;

use crate::arena::Id;
use crate::distribution::{Domain, Law};
use crate::model::{Expression, Model};
use crate::problem::Problems;
use crate::span::{FileId, Source, Sources};
use crate::syntax::{Tree, parse};

use assemble::Assembled;
use checker::Checker;

/// An argument of a distribution as written: its expression, what it must be, and the law that it is for.
type WrittenArgument = (Id<Expression>, Domain, Law);

/// Checks a tree. The model is given where there is no error; warnings may stand beside it.
pub fn check(tree: &Tree, file: FileId) -> (Option<Model>, Problems) {
    check_beside(tree, file, HashSet::new())
}

/// Parses and checks a text.
pub fn check_text(text: &str) -> (Option<Model>, Problems) {
    let mut sources = Sources::default();
    let file = sources.add(Source::new("model.stook", text));
    check_source(&sources, file)
}

/// Parses and checks one of the texts of a run.
pub fn check_source(sources: &Sources, file: FileId) -> (Option<Model>, Problems) {
    let text = &sources.get(file).text;
    let (tree, mut problems) = parse(text, file);
    let unread = if problems.has_errors() { names::unread(text, &tree) } else { HashSet::new() };
    let (model, found) = check_beside(&tree, file, unread);
    problems.extend(found);
    (model.filter(|_| !problems.has_errors()), problems)
}

/// Checks a tree of which some declarations could not be read; the names in `unread` may be declared there.
fn check_beside(tree: &Tree, file: FileId, unread: HashSet<String>) -> (Option<Model>, Problems) {
    let unread: HashSet<String> = unread.into_iter().chain(tree.lost.iter().cloned()).collect();
    let lost = !unread.is_empty();
    let mut checker = Checker::new(tree, unread);
    checker.collect_groups();
    checker.collect_names();
    checker.link_groups();
    checker.link_tables();
    checker.build_graph();
    checker.read_givens();
    checker.read_column_types();
    checker.read_unknown_types();
    let order = checker.find_circles();
    checker.infer_dimensions(&order);
    checker.work_out_named();
    checker.work_out_priors();
    checker.work_out_responses();
    checker.check_gaps();
    checker.read_ladder();
    let Assembled { model, untyped, arguments, mut problems } = checker.assemble();
    let known = soundness::Known { arguments: &arguments, untyped: &untyped, lost };
    soundness::soundness(&model, file, &known, &mut problems);
    let whole = !problems.has_errors();
    (whole.then_some(model), problems)
}
