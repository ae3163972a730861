//! A checked model and the tables it names to a bound model.

mod bound;
mod given;

mod labels;
mod page;
mod problem;
mod rows;
mod values;

pub use bound::{Bound, Cells, GroupLabels, TableRows};
pub use given::{constant, defaults};
pub use problem::{CellsWith, DataProblem, pages};

use std::collections::HashMap;

use stook_lang::arena::Id;
use stook_lang::model::{Access, Column, ColumnKind, Expression, Group, Labels, Model, Place, Table};

use crate::report::DataPlace;
use crate::table::{self, Kind, Request};

/// What a model asks of the file of one of its tables.
pub fn requests(model: &Model, table: Id<Table>) -> Vec<Request> {
    let request = |column: &Id<Column>| {
        let column = &model.columns[*column];
        let kind = match column.kind {
            ColumnKind::Labels { .. } => Kind::Labels,
            ColumnKind::Values { support: stook_lang::model::Support::YesNo, .. } => Kind::YesNo,
            ColumnKind::Values { .. } => Kind::Numbers,
        };
        Request { heading: column.heading.clone(), kind }
    };
    model.tables[table].columns.iter().map(request).collect()
}

/// Binds a model to its tables (by position of their ids) and to settings by name.
pub fn bind(
    model: Model,
    tables: Vec<table::Table>,
    settings: &[(String, f64)],
) -> Result<Bound, Vec<DataProblem>> {
    let mut problems = vec![];
    let givens = given::settings(&model, settings, &mut problems);
    let mut binder = Binder { model: &model, tables: &tables, givens: &givens, problems };
    let interned = binder.labels();
    let columns = binder.columns(&interned);
    let rows = binder.rows(&interned);
    binder.label_references(&interned.groups);
    let problems = binder.problems;
    if problems.is_empty() {
        Ok(Bound { model, givens, groups: interned.groups, tables: rows, columns })
    } else {
        Err(problems)
    }
}

/// The work of binding: what is read, and what was found wrong with it.
struct Binder<'a> {
    model: &'a Model,
    tables: &'a [table::Table],
    givens: &'a [f64],
    problems: Vec<DataProblem>,
}

impl Binder<'_> {
    /// The position of a column within its table, as requested.
    fn raw(&self, column: Id<Column>) -> &table::Column {
        let table = self.model.columns[column].table;
        let at = self.model.tables[table].columns.iter().position(|other| *other == column).unwrap_or(0);
        &self.tables[table.position()].columns[at]
    }

    /// A cell's place in its file.
    fn place(&self, column: Id<Column>, row: usize, text: impl Into<String>) -> DataPlace {
        let declared = &self.model.columns[column];
        let table = &self.tables[declared.table.position()];
        DataPlace {
            file: table.file.clone(),
            line: table.line(row),
            heading: declared.heading.clone(),
            text: text.into(),
        }
    }

    /// Labels that the text names must be there in the data.
    fn label_references(&mut self, groups: &[GroupLabels]) {
        let mut named: Vec<(Id<Group>, String, stook_lang::span::Span)> = vec![];
        let expressions = &self.model.expressions;
        for at in 0..expressions.len() {
            let id = Id::new(at);
            let span = expressions.span(id);
            let mut place = |access: &Access| {
                if let Place::Label(group, label) = &access.place {
                    named.push((*group, label.clone(), span));
                }
            };
            match &expressions[id] {
                Expression::Unknown(_, accesses) | Expression::Named(_, accesses) => {
                    accesses.iter().for_each(place)
                }
                Expression::Column(_, access) => place(access),
                Expression::LabelTest { group, label, .. } => named.push((*group, label.clone(), span)),
                _ => {}
            }
        }
        for (group, label, span) in named {
            if !groups[group.position()].positions.contains_key(&label) {
                let titles = &groups[group.position()].titles;
                self.problems.push(DataProblem::UnknownLabel {
                    group: self.model.groups[group].name.clone(),
                    nearest: stook_lang::nearest::nearest(&label, titles.iter().map(String::as_str))
                        .map(str::to_string),
                    label,
                    span,
                });
            }
        }
    }
}

/// The labels that a group may have, if they are fixed by the text.
fn fixed_labels(labels: &Labels) -> Option<Vec<String>> {
    match labels {
        Labels::Open => None,
        Labels::Range(first, last) => Some((*first..=*last).map(|label| label.to_string()).collect()),
        Labels::Closed(list) => Some(list.clone()),
    }
}

/// Positions by title.
fn positions(titles: &[String]) -> HashMap<String, u32> {
    titles.iter().cloned().zip(0u32..).collect()
}
