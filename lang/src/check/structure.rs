//! Groups and tables: nesting, labels, columns.

use std::collections::HashMap;

use crate::arena::Id;
use crate::model::{Column, ColumnKind, Group, Labels, Support, Table};
use crate::nearest::nearest;
use crate::problem::{Feature, NameKind, NameProblem, StructureProblem, Wanted};
use crate::span::Span;
use crate::syntax::tree::{
    ColumnDeclaration, DeclarationKind, GroupDeclaration, Name, SupportKind, TableDeclaration, TypeClause,
};

use super::checker::{Checker, Declared, Entity};
use super::graph::{Graph, ancestors};
use super::types::SUPPORTS;

impl<'t> Checker<'t> {
    /// Enters every group with its labels.
    pub(super) fn collect_groups(&mut self) {
        for declaration in &self.tree.declarations {
            let DeclarationKind::Group(item) = &declaration.kind else { continue };
            let labels = self.labels(item);
            let id = self.model.groups.add(Group {
                name: item.name.text.clone(),
                span: item.name.span,
                documentation: declaration.documentation.clone(),
                parent: None,
                ordered: item.ordered.is_some() || item.range.is_some(),
                labels,
            });
            self.group_ids.entry(&item.name.text).or_insert(id);
        }
        self.find_parents();
    }

    fn labels(&mut self, item: &GroupDeclaration) -> Labels {
        if let (Some(range), Some([label, ..])) = (&item.range, item.labels.as_deref()) {
            self.problems.add(StructureProblem::RangeAndLabels { range: range.span, labels: label.span });
        }
        if let Some(range) = &item.range {
            if range.first > range.last {
                let (span, first, last) = (range.span, range.first, range.last);
                self.problems.add(StructureProblem::RangeReversed { span, first, last });
            }
            return Labels::Range(range.first, range.last);
        }
        let Some(listed) = &item.labels else { return Labels::Open };
        let mut seen: HashMap<&str, Span> = HashMap::new();
        for label in listed {
            if let Some(first) = seen.get(label.text.as_str()) {
                let (span, first, label) = (label.span, *first, label.text.clone());
                self.problems.add(StructureProblem::LabelTwice { span, first, label });
            } else {
                seen.insert(&label.text, label.span);
            }
        }
        Labels::Closed(listed.iter().map(|label| label.text.clone()).collect())
    }

    /// Links nested groups to their parents, and cuts circles open after reporting them.
    fn find_parents(&mut self) {
        let withins: Vec<Option<&Name>> =
            self.group_declarations().map(|item| item.within.as_ref()).collect();
        let parents: Vec<Option<Id<Group>>> = withins
            .iter()
            .map(|within| within.and_then(|name| self.group_ids.get(name.text.as_str()).copied()))
            .collect();
        // 0: not looked at, otherwise the round in which it was.
        let mut round = vec![0usize; parents.len()];
        let mut circles: Vec<Vec<usize>> = Vec::new();
        for start in 0..parents.len() {
            let mut way = Vec::new();
            let mut at = Some(start);
            while let Some(group) = at.filter(|group| round[*group] == 0) {
                round[group] = start + 1;
                way.push(group);
                at = parents[group].map(Id::position);
            }
            let Some(end) = at.filter(|group| round[*group] == start + 1) else { continue };
            if let Some(begin) = way.iter().position(|group| *group == end) {
                circles.push(way[begin..].to_vec());
            }
        }
        for (group, parent) in parents.iter().enumerate() {
            self.model.groups[Id::new(group)].parent = *parent;
        }
        for circle in circles {
            let step = |group: &usize| {
                let within = withins[*group]?;
                let inner = self.model.groups[Id::new(*group)].name.clone();
                Some((within.span, inner, within.text.clone()))
            };
            let steps = circle.iter().filter_map(step).collect();
            self.problems.add(StructureProblem::NestingCircle { steps });
            for group in circle {
                self.model.groups[Id::new(group)].parent = None;
            }
        }
    }

    fn group_declarations(&self) -> impl Iterator<Item = &'t GroupDeclaration> + use<'t> {
        self.tree.declarations.iter().filter_map(|declaration| match &declaration.kind {
            DeclarationKind::Group(item) => Some(item),
            _ => None,
        })
    }

    fn table_declarations(&self) -> impl Iterator<Item = &'t TableDeclaration> + use<'t> {
        self.tree.declarations.iter().filter_map(|declaration| match &declaration.kind {
            DeclarationKind::Table(item) => Some(item),
            _ => None,
        })
    }

    /// Enters a table with its columns.
    pub(super) fn collect_table(&mut self, item: &'t TableDeclaration, documentation: Option<&'t String>) {
        let id = self.model.tables.add(Table {
            name: item.name.text.clone(),
            span: item.name.span,
            documentation: documentation.cloned(),
            per: item.per.first().and_then(|name| self.group_ids.get(name.text.as_str()).copied()),
            file: item.file.as_ref().map(|file| file.text.clone()),
            columns: Vec::new(),
        });
        self.declare(&item.name, Entity::Table(id));
        let mut own: HashMap<&str, (Span, NameKind)> = HashMap::new();
        for column in &item.columns {
            self.collect_column(id, column, &mut own);
        }
    }

    fn collect_column(
        &mut self,
        table: Id<Table>,
        column: &'t ColumnDeclaration,
        own: &mut HashMap<&'t str, (Span, NameKind)>,
    ) {
        let name = column.name.text.as_str();
        let kind = match &column.kind {
            None => match self.group_ids.get(name) {
                Some(group) => ColumnKind::Labels { group: *group, parent: None },
                None => return self.bare.push(column),
            },
            Some(clause) => match self.column_kind(column, clause) {
                Some(kind) => kind,
                None => return self.declare_broken(&column.name),
            },
        };
        let labels = matches!(kind, ColumnKind::Labels { .. });
        let words = if labels && column.kind.is_some() { NameKind::Role } else { NameKind::Column };
        if let Some((first, first_kind)) = own.get(name) {
            let (span, name, first, first_kind) = (column.name.span, name.to_string(), *first, *first_kind);
            self.problems.add(NameProblem::Twice { span, name, kind: words, first, first_kind });
            return;
        }
        own.insert(name, (column.name.span, words));
        let heading =
            column.heading.as_ref().map_or_else(|| name.to_string(), |heading| heading.text.clone());
        let (span, name_text) = (column.name.span, name.to_string());
        let id = self.model.columns.add(Column { name: name_text, span, table, heading, kind });
        self.model.tables[table].columns.push(id);
        match (&column.kind, labels) {
            (Some(_), true) => self.enter_role(column, id),
            (None, true) => self.refuse_label_extras(column),
            (_, false) => {
                self.declare(&column.name, Entity::Column(id));
                self.value_columns.push((id, column));
            }
        }
    }

    /// The kind of a column with a type; `None` where the type is wrong.
    fn column_kind(&mut self, column: &ColumnDeclaration, clause: &TypeClause) -> Option<ColumnKind> {
        if let Some(over) = &clause.over {
            self.refuse(Feature::DrawnTogether, over.span);
        }
        match &clause.support.kind {
            SupportKind::Word(word) => {
                if let Some(group) = self.group_ids.get(word.text.as_str()) {
                    return Some(ColumnKind::Labels { group: *group, parent: None });
                }
                if !SUPPORTS.iter().any(|(name, _)| *name == word.text) {
                    self.report_column_type(word);
                    return None;
                }
            }
            // Bounds are read later, when every given has its name.
            SupportKind::Bounded { .. } => {}
            SupportKind::Over { .. } => {
                self.refuse(Feature::MatrixType, clause.support.span);
                return None;
            }
            SupportKind::OneOf(_) => {
                self.refuse(Feature::LatentClass, clause.support.span);
                return None;
            }
        }
        let unit = clause.unit.as_ref().map(|unit| unit.text.clone());
        Some(ColumnKind::Values { support: Support::REAL, unit, gaps: column.gaps.is_some(), between: None })
    }

    fn report_column_type(&mut self, word: &Name) {
        if self.uses || self.unread.contains(&word.text) {
            return;
        }
        let groups = self.model.groups.iter().map(|(_, group)| group.name.as_str());
        let near =
            nearest(&word.text, SUPPORTS.iter().map(|(name, _)| *name).chain(groups)).map(str::to_string);
        let nearest = near.map(|near| match self.group_ids.get(near.as_str()) {
            Some(group) => (near, NameKind::Group, Some(self.model.groups[*group].span)),
            None => (near, NameKind::Function, None),
        });
        let (span, name) = (word.span, word.text.clone());
        self.problems.add(NameProblem::Unknown { span, name, wanted: Wanted::Support, nearest });
    }

    fn enter_role(&mut self, column: &'t ColumnDeclaration, id: Id<Column>) {
        self.refuse_label_extras(column);
        let name = &column.name;
        if let Some(group) = self.group_ids.get(name.text.as_str())
            && self.labels_of(id) != Some(*group)
        {
            self.problems.add(NameProblem::Twice {
                span: name.span,
                name: name.text.clone(),
                kind: NameKind::Role,
                first: self.model.groups[*group].span,
                first_kind: NameKind::Group,
            });
            return;
        }
        self.roles.entry(&name.text).or_default().push(id);
    }

    fn refuse_label_extras(&mut self, column: &ColumnDeclaration) {
        let clause = column.kind.as_ref();
        let between = column
            .between
            .map(|(low, high)| self.tree.expressions[low].span.to(self.tree.expressions[high].span));
        let extras = [
            (column.gaps, "with gaps"),
            (between, "between"),
            (clause.and_then(|clause| clause.unit.as_ref()).map(|unit| unit.span), "in"),
            (clause.and_then(|clause| clause.per.first()).map(|name| name.span), "per"),
        ];
        for (span, words) in extras {
            let Some(span) = span else { continue };
            let (name, column) = (column.name.text.clone(), column.name.span);
            self.problems.add(StructureProblem::LabelColumnExtra { span, column, words, name });
        }
    }

    /// Enters a name whose declaration is wrong, unless it has another.
    pub(super) fn declare_broken(&mut self, name: &'t Name) {
        self.names.entry(&name.text).or_insert(Declared { span: name.span, entity: Entity::Broken });
    }

    /// Reports the names behind `within` and `per`, and bare columns, that are no groups.
    pub(super) fn link_groups(&mut self) {
        for item in self.group_declarations() {
            if let Some(within) = item.within.as_ref().filter(|name| !self.is_group(name)) {
                self.report_name(within, Wanted::Group);
            }
        }
        for column in std::mem::take(&mut self.bare) {
            self.report_bare(column);
        }
    }

    fn report_bare(&mut self, column: &'t ColumnDeclaration) {
        let name = &column.name;
        if self.uses || self.unread.contains(&name.text) {
            return self.declare_broken(name);
        }
        let other = self.entity(&name.text).filter(|declared| declared.entity != Entity::Broken);
        let other = other.map(|declared| (self.entity_kind(declared.entity), declared.span));
        let near = nearest(&name.text, self.model.groups.iter().map(|(_, group)| group.name.as_str()));
        let near = near.filter(|_| other.is_none());
        let nearest = near.and_then(|near| {
            let group = self.group_ids.get(near)?;
            Some((near.to_string(), self.model.groups[*group].span))
        });
        let (span, text) = (name.span, name.text.clone());
        self.problems.add(StructureProblem::ColumnWithoutGroup { span, name: text, other, nearest });
        self.declare_broken(name);
    }

    fn is_group(&self, name: &Name) -> bool {
        self.group_ids.contains_key(name.text.as_str())
    }

    /// Gives each table its key columns, and each column of a nested group the column of its parent.
    pub(super) fn link_tables(&mut self) {
        // Tables stand in the arena in the order of their declarations.
        for (at, item) in self.table_declarations().enumerate() {
            let table = Id::new(at);
            match item.per.as_slice() {
                [] => {}
                [name] if self.is_group(name) => self.add_keys(table, name.span),
                [name] => self.report_name(name, Wanted::Group),
                [first, .., last] => self.refuse(Feature::TablePerSeveral, first.span.to(last.span)),
            }
        }
        for column in self.model.columns.ids() {
            self.link_parent(self.model.columns[column].table, column);
        }
    }

    fn add_keys(&mut self, table: Id<Table>, span: Span) {
        let Some(group) = self.model.tables[table].per else { return };
        let mut keys = ancestors(&self.model, group);
        keys.reverse();
        keys.push(group);
        for key in keys {
            let name = self.model.groups[key].name.clone();
            let written = self.model.tables[table].columns.iter().any(|column| {
                self.labels_of(*column) == Some(key) && self.model.columns[*column].name == name
            });
            if !written {
                let kind = ColumnKind::Labels { group: key, parent: None };
                let id =
                    self.model.columns.add(Column { name: name.clone(), span, table, heading: name, kind });
                self.model.tables[table].columns.push(id);
            }
        }
    }

    fn link_parent(&mut self, table: Id<Table>, column: Id<Column>) {
        let Some(group) = self.labels_of(column) else { return };
        let Some(parent) = self.model.groups[group].parent else { return };
        let names = [group, parent].map(|id| self.model.groups[id].name.clone());
        let columns = &self.model.tables[table].columns;
        let outer: Vec<Id<Column>> =
            columns.iter().copied().filter(|other| self.labels_of(*other) == Some(parent)).collect();
        let is_bare = |id: Id<Column>, name: &str| self.model.columns[id].name == name;
        let bare =
            outer.iter().copied().find(|other| is_bare(*other, &names[1]) && is_bare(column, &names[0]));
        let span = self.model.columns[column].span;
        let [group_name, parent_name] = names;
        let chosen = match (bare, outer.as_slice()) {
            (Some(bare), _) => bare,
            (None, [only]) => *only,
            // A label alone is read where it lies under one parent: the data tell, if another table has both columns.
            (None, []) if self.stand_together(group, parent) => return,
            (None, []) => {
                self.problems.add(StructureProblem::ParentColumnMissing {
                    span,
                    group: group_name,
                    parent: parent_name,
                    nested: self.model.groups[group].span,
                    table: self.model.tables[table].name.clone(),
                });
                return;
            }
            (None, several) => {
                let place =
                    |id: &Id<Column>| (self.model.columns[*id].span, self.model.columns[*id].name.clone());
                self.problems.add(StructureProblem::ParentColumnsSeveral {
                    span,
                    group: group_name,
                    parent: parent_name,
                    columns: several.iter().map(place).collect(),
                });
                return;
            }
        };
        self.model.columns[column].kind = ColumnKind::Labels { group, parent: Some(chosen) };
    }

    /// Whether some table has columns of both groups.
    fn stand_together(&self, group: Id<Group>, parent: Id<Group>) -> bool {
        let holds = |table: &Table, wanted: Id<Group>| {
            table.columns.iter().any(|column| self.labels_of(*column) == Some(wanted))
        };
        self.model.tables.iter().any(|(_, table)| holds(table, group) && holds(table, parent))
    }

    /// Builds the index graph; groups and tables are final now.
    pub(super) fn build_graph(&mut self) {
        self.graph = Graph::new(&self.model);
    }
}
