//! What can be wrong with data (codes B...): as data, with file, line and column; the prose is made in
//! [`DataProblem::report`].

use stook_lang::model::Labels;
use stook_lang::problem::{Code, Page};
use stook_lang::span::Span;

use super::page;
use crate::report::{DataPlace, DataReport};

/// Some cells with the same problem: the first few, and how many there are.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct CellsWith {
    /// The first few.
    pub first: Vec<DataPlace>,
    /// How many in all.
    pub count: usize,
}

/// Something wrong with the data of a model.
#[derive(Clone, Debug, PartialEq)]
pub enum DataProblem {
    /// A row has no label where it needs one.
    NoLabel {
        /// The group.
        group: String,
        /// The cells.
        cells: CellsWith,
    },
    /// A label that the group does not have.
    StrangeLabel {
        /// The group.
        group: String,
        /// What the group's labels are, in words.
        allowed: String,
        /// The nearest label that it has.
        nearest: Option<String>,
        /// The cells.
        cells: CellsWith,
    },
    /// A label of a nested group that occurs under several parents, in a table that does not say which.
    TwoParents {
        /// The group.
        group: String,
        /// The group that it is nested in.
        parent: String,
        /// The cells.
        cells: CellsWith,
    },
    /// A missing cell in a column that does not admit them.
    Gap {
        /// The column.
        column: String,
        /// The cells.
        cells: CellsWith,
    },
    /// A value outside the column's type.
    OutsideSupport {
        /// The column.
        column: String,
        /// The type in words.
        support: String,
        /// The cells.
        cells: CellsWith,
    },
    /// A value outside the column's `between`.
    OutsideRange {
        /// The column.
        column: String,
        /// The range in words.
        range: String,
        /// The cells.
        cells: CellsWith,
    },
    /// Two rows for one label in a table `per` its group.
    DuplicateKey {
        /// The table.
        table: String,
        /// The group.
        group: String,
        /// The later rows.
        cells: CellsWith,
    },
    /// No row for a label in a table `per` its group.
    NoRow {
        /// The table.
        table: String,
        /// Its file.
        file: String,
        /// The group.
        group: String,
        /// The first few labels.
        labels: Vec<String>,
        /// How many in all.
        count: usize,
    },
    /// A label in the model's text that the data do not have.
    UnknownLabel {
        /// The group.
        group: String,
        /// The label.
        label: String,
        /// The nearest one in the data.
        nearest: Option<String>,
        /// Where the text names it.
        span: Span,
    },
    /// A setting outside its type.
    Setting {
        /// The setting.
        name: String,
        /// Its value.
        value: f64,
        /// The type in words.
        support: String,
        /// Where it is declared.
        span: Span,
    },
    /// A value for a setting that the model does not have.
    UnknownSetting {
        /// The name.
        name: String,
        /// The nearest setting.
        nearest: Option<String>,
    },
}

/// The pages of this family.
pub fn pages() -> &'static [Page] {
    page::PAGES
}

/// The labels of a group in words.
pub(super) fn label_set(labels: &Labels) -> String {
    match labels {
        Labels::Open => "those that the data hold under its parent".into(),
        Labels::Range(first, last) => format!("the whole numbers from {first} to {last}"),
        Labels::Closed(list) => list.join(", "),
    }
}

/// Collects rows with the same problem.
#[derive(Debug, Default)]
pub(super) struct Examples {
    first: Vec<(usize, String)>,
    count: usize,
}

impl Examples {
    /// How many are shown.
    pub(super) const SHOWN: usize = 5;

    pub(super) fn add(&mut self, row: usize, text: impl FnOnce() -> String) {
        self.count += 1;
        if self.first.len() < Examples::SHOWN {
            self.first.push((row, text()));
        }
    }

    pub(super) fn is_empty(&self) -> bool {
        self.count == 0
    }

    pub(super) fn first(&self) -> &str {
        self.first.first().map_or("", |(_, text)| text)
    }

    pub(super) fn cells(self, place: impl Fn(usize, String) -> DataPlace) -> CellsWith {
        CellsWith {
            first: self.first.into_iter().map(|(row, text)| place(row, text)).collect(),
            count: self.count,
        }
    }
}

impl DataProblem {
    /// The problem as prose with its places.
    pub fn report(&self) -> DataReport {
        match self {
            DataProblem::NoLabel { group, cells } => about(
                "B001",
                format!("{} without a label of `{group}`", rows(cells.count)),
                cells,
                format!("every row needs its {group}: fill the cells, or leave these rows out of the file"),
            ),
            DataProblem::StrangeLabel { group, allowed, nearest, cells } => about(
                "B002",
                format!("{} with a label that `{group}` does not have", rows(cells.count)),
                cells,
                match nearest {
                    Some(nearest) => {
                        format!("the labels of `{group}` are {allowed}; the nearest is `{nearest}`")
                    }
                    None => {
                        format!("the labels of `{group}` are {allowed}: mend the cells or the declaration")
                    }
                },
            ),
            DataProblem::TwoParents { group, parent, cells } => about(
                "B003",
                format!("{} whose `{group}` occurs under more than one {parent}", rows(cells.count)),
                cells,
                format!(
                    "add the column of `{parent}` to this table: `{group}` is nested in it, and a label alone does not tell which one is meant"
                ),
            ),
            DataProblem::Gap { column, cells } => about(
                "B004",
                format!("`{column}` misses {}", many(cells.count, "value", "values")),
                cells,
                format!(
                    "fill the cells, or declare `{column} : ... with gaps` and give it a `response`, and they are estimated"
                ),
            ),
            DataProblem::OutsideSupport { column, support, cells } => about(
                "B005",
                format!("{} in `{column}` outside its type", many(cells.count, "value", "values")),
                cells,
                format!("each must be {support}: mend the cells, or give the column another type"),
            ),
            DataProblem::OutsideRange { column, range, cells } => about(
                "B006",
                format!("{} in `{column}` outside its range", many(cells.count, "value", "values")),
                cells,
                format!("the declaration asks for {range}: mend the cells, or the `between`"),
            ),
            DataProblem::DuplicateKey { table, group, cells } => about(
                "B007",
                format!("`{table}` has more than one row for a {group}"),
                cells,
                format!(
                    "`{table} per {group}` says one row for each: keep one, or declare the table without `per`"
                ),
            ),
            DataProblem::NoRow { table, file, group, labels, count } => DataReport {
                code: Code("B008"),
                message: format!("`{table}` has no row for {} of `{group}`", many(*count, "label", "labels")),
                places: labels
                    .iter()
                    .map(|label| DataPlace {
                        file: file.clone(),
                        line: 0,
                        heading: group.clone(),
                        text: label.clone(),
                    })
                    .collect(),
                more: count - labels.len(),
                span: None,
                help: format!("`{table} per {group}` says one row for each: add the rows"),
            },
            DataProblem::UnknownLabel { group, label, nearest, span } => DataReport {
                code: Code("B009"),
                message: format!("`{group}` has no label \"{label}\" in the data"),
                places: vec![],
                more: 0,
                span: Some(*span),
                help: match nearest {
                    Some(nearest) => format!("the nearest label is \"{nearest}\""),
                    None => "labels of a nested group are written with their parents': \"Heath/3\"".into(),
                },
            },
            DataProblem::Setting { name, value, support, span } => DataReport {
                code: Code("B010"),
                message: format!("the setting `{name}` cannot be {value}"),
                places: vec![],
                more: 0,
                span: Some(*span),
                help: format!("it must be {support}"),
            },
            DataProblem::UnknownSetting { name, nearest } => DataReport {
                code: Code("B011"),
                message: format!("the model has no setting `{name}`"),
                places: vec![],
                more: 0,
                span: None,
                help: match nearest {
                    Some(nearest) => format!("the nearest is `{nearest}`"),
                    None => "settings are what the model declares with `given`".into(),
                },
            },
        }
    }
}

fn about(code: &'static str, message: String, cells: &CellsWith, help: String) -> DataReport {
    let more = cells.count - cells.first.len();
    DataReport { code: Code(code), message, places: cells.first.clone(), more, span: None, help }
}

fn rows(count: usize) -> String {
    many(count, "row", "rows")
}

fn many(count: usize, one: &str, several: &str) -> String {
    match count {
        1 => format!("1 {one}"),
        _ => format!("{count} {several}"),
    }
}
