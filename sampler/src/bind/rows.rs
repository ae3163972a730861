//! Tables as index sets: how many rows, and for a table `per` a group the one row of each label.

use stook_lang::arena::Id;
use stook_lang::model::{ColumnKind, Table};

use super::labels::Interned;
use super::problem::{DataProblem, Examples};
use super::{Binder, TableRows};

/// No row, or no label.
const NONE: u32 = u32::MAX;

impl Binder<'_> {
    /// The rows of every table, by position.
    pub(super) fn rows(&mut self, interned: &Interned) -> Vec<TableRows> {
        let tables: Vec<Id<Table>> = self.model.tables.ids().collect();
        tables.into_iter().map(|table| self.table_rows(table, interned)).collect()
    }

    fn table_rows(&mut self, table: Id<Table>, interned: &Interned) -> TableRows {
        let count = self.tables[table.position()].rows;
        let declared = &self.model.tables[table];
        let Some(group) = declared.per else {
            return TableRows { count, row_of_label: vec![] };
        };
        let is_key = |column: &&Id<_>| {
            let column = &self.model.columns[**column];
            matches!(column.kind, ColumnKind::Labels { group: of, .. } if of == group)
                && column.name == self.model.groups[group].name
        };
        let Some(key) = declared.columns.iter().find(is_key).copied() else {
            return TableRows { count, row_of_label: vec![] };
        };
        let titles = &interned.groups[group.position()].titles;
        let mut row_of_label = vec![NONE; titles.len()];
        let mut doubles = Examples::default();
        for (row, label) in interned.rows[&key].iter().enumerate() {
            match row_of_label.get_mut(*label as usize) {
                Some(first) if *first == NONE => *first = row as u32,
                Some(first) => {
                    let line = self.tables[table.position()].line(*first as usize);
                    doubles.add(row, || format!("{} (first in line {line})", titles[*label as usize]));
                }
                None => {}
            }
        }
        let missing: Vec<String> = row_of_label
            .iter()
            .zip(titles)
            .filter(|(row, _)| **row == NONE)
            .map(|(_, t)| t.clone())
            .collect();
        let name = self.model.groups[group].name.clone();
        if !doubles.is_empty() {
            let cells = doubles.cells(|row, text| self.place(key, row, text));
            self.problems.push(DataProblem::DuplicateKey {
                table: declared.name.clone(),
                group: name,
                cells,
            });
        } else if !missing.is_empty() {
            self.problems.push(DataProblem::NoRow {
                table: declared.name.clone(),
                file: self.tables[table.position()].file.clone(),
                group: name,
                count: missing.len(),
                labels: missing.into_iter().take(Examples::SHOWN).collect(),
            });
        }
        TableRows { count, row_of_label }
    }
}
