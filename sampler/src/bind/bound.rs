//! The bound model: labels interned, columns as typed arrays.

use std::collections::HashMap;
use std::sync::Arc;

use stook_lang::arena::Id;
use stook_lang::model::{Column, Group, Index, Model, Table};

/// A checked model with its data.
#[derive(Clone, Debug)]
pub struct Bound {
    /// The model.
    pub model: Model,
    /// The value of each setting, by position.
    pub givens: Vec<f64>,
    /// The labels of each group, by position.
    pub groups: Vec<GroupLabels>,
    /// The rows of each table, by position.
    pub tables: Vec<TableRows>,
    /// The cells of each column, by position.
    pub columns: Vec<Cells>,
}

/// The labels of a group in their order.
#[derive(Clone, Debug, Default)]
pub struct GroupLabels {
    /// Each label with its parents': `Heath/3`.
    pub titles: Vec<String>,
    /// For a nested group, the position of each label's parent; else empty.
    pub parents: Vec<u32>,
    /// The position of each title.
    pub positions: HashMap<String, u32>,
}

/// The rows of a table.
#[derive(Clone, Debug, Default)]
pub struct TableRows {
    /// How many.
    pub count: usize,
    /// For a table `per` a group, the row of each label; else empty.
    pub row_of_label: Vec<u32>,
}

/// The cells of a column.
#[derive(Clone, Debug)]
pub enum Cells {
    /// For each row the position of its label.
    Labels(Arc<[u32]>),
    /// For each row its value (NaN where it is missing), and the rows that miss one, ascending.
    Values {
        /// The values.
        values: Arc<[f64]>,
        /// The rows without one.
        missing: Arc<[u32]>,
    },
}

impl Bound {
    /// The labels of a group.
    pub fn group(&self, group: Id<Group>) -> &GroupLabels {
        &self.groups[group.position()]
    }

    /// The rows of a table.
    pub fn table(&self, table: Id<Table>) -> &TableRows {
        &self.tables[table.position()]
    }

    /// How many elements an index set has.
    pub fn size(&self, index: Index) -> usize {
        match index {
            Index::Group(group) => self.group(group).titles.len(),
            Index::Table(table) => self.table(table).count,
        }
    }

    /// The title of an element: a label, or a row number from 1.
    pub fn title(&self, index: Index, element: usize) -> String {
        match index {
            Index::Group(group) => self.group(group).titles[element].clone(),
            Index::Table(_) => (element + 1).to_string(),
        }
    }

    /// The label positions of a label column (empty for a column of values).
    pub fn labels(&self, column: Id<Column>) -> &[u32] {
        match &self.columns[column.position()] {
            Cells::Labels(labels) => labels,
            Cells::Values { .. } => &[],
        }
    }

    /// The values of a column and its missing rows (both empty for a column of labels).
    pub fn values(&self, column: Id<Column>) -> (Arc<[f64]>, Arc<[u32]>) {
        match &self.columns[column.position()] {
            Cells::Labels(_) => (Arc::from([]), Arc::from([])),
            Cells::Values { values, missing } => (Arc::clone(values), Arc::clone(missing)),
        }
    }
}
