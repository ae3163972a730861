//! From a place to the element that is meant there.

use crate::arena::Id;
use crate::model::{Access, Column, ColumnKind, Group, Index, Place, Step, Table, Variable};
use crate::problem::PathProblem;
use crate::span::Span;

use super::checker::{Checker, Scope};
use super::graph::Way;

/// Who asks for an element, for messages.
pub(super) struct Asker<'u> {
    /// The use.
    pub(super) span: Span,
    /// What is used.
    pub(super) name: &'u str,
    /// Where it is declared.
    pub(super) declared: Span,
    /// What form a role would take.
    pub(super) form: RoleForm,
}

/// How a role is written.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum RoleForm {
    /// `x[dam]`.
    Selector,
    /// `dam == "label"`.
    Test,
}

impl<'t> Checker<'t> {
    /// The way from a place to a label or row of `target`: the variables of reductions are asked first, the innermost
    /// before the others, then the dimensions of the owner, all at once.
    pub(super) fn reach(&mut self, scope: &Scope, target: Index, asker: &Asker) -> Option<Access> {
        for at in (scope.base..scope.variables.len()).rev() {
            match self.graph.way(scope.variables[at], target) {
                Way::None => {}
                way => return self.settle(at, scope.variables[at], way, target, asker),
            }
        }
        let dimensions = &scope.variables[..scope.base];
        if let Some(at) = dimensions.iter().position(|index| *index == target) {
            return Some(access(at, Vec::new()));
        }
        let mut found: Option<(usize, Way)> = None;
        for (at, index) in dimensions.iter().enumerate() {
            let way = self.graph.way(*index, target);
            match (way, found.take()) {
                (Way::None, before) => found = before,
                (way, None) => found = Some((at, way)),
                (Way::One(second), Some((before, Way::One(first)))) => {
                    let starts = [dimensions[before], dimensions[at]];
                    self.report_two_ways(starts, &[first, second], target, asker);
                    return None;
                }
                (_, Some(before)) => found = Some(before),
            }
        }
        let Some((at, way)) = found else {
            self.report_no_way(scope, target, asker);
            return None;
        };
        self.settle(at, dimensions[at], way, target, asker)
    }

    fn settle(&mut self, at: usize, from: Index, way: Way, target: Index, asker: &Asker) -> Option<Access> {
        match way {
            Way::None => None,
            Way::One(steps) => Some(access(at, steps)),
            Way::Two(a, b) => {
                self.report_two_ways([from, from], &[a, b], target, asker);
                None
            }
            Way::Roles(columns) => {
                self.report_role_needed(&columns, asker);
                None
            }
        }
    }

    /// The way from a label of one group to one of `target`, for a label or row that a selector has chosen.
    pub(super) fn onward(&mut self, from: Id<Group>, target: Index, asker: &Asker) -> Option<Vec<Step>> {
        let from = Index::Group(from);
        match self.graph.way(from, target) {
            Way::One(steps) => Some(steps),
            Way::Two(a, b) => {
                self.report_two_ways([from, from], &[a, b], target, asker);
                None
            }
            Way::Roles(columns) => {
                self.report_role_needed(&columns, asker);
                None
            }
            Way::None => None,
        }
    }

    fn report_role_needed(&mut self, columns: &[Id<Column>], asker: &Asker) {
        let roles = columns
            .iter()
            .map(|id| (self.model.columns[*id].span, self.model.columns[*id].name.clone()))
            .collect();
        let group = columns.first().and_then(|id| self.labels_of(*id));
        self.problems.add(PathProblem::RoleNeeded {
            span: asker.span,
            name: asker.name.to_string(),
            group: group.map_or_else(String::new, |group| self.model.groups[group].name.clone()),
            roles,
            test: asker.form == RoleForm::Test,
        });
    }

    fn report_no_way(&mut self, scope: &Scope, target: Index, asker: &Asker) {
        let (span, declared, place) = (asker.span, asker.declared, scope.owner);
        let has = self.place_in_words(scope);
        let wanted = self.model.index_name(target).to_string();
        if asker.form == RoleForm::Test {
            self.problems.add(PathProblem::NoLabel { span, group: wanted, declared, place, has });
            return;
        }
        let row = match scope.variables.as_slice() {
            [Index::Table(table)] => Some(self.model.tables[*table].name.clone()),
            _ => None,
        };
        let rows = matches!(target, Index::Table(_));
        let name = asker.name.to_string();
        self.problems.add(PathProblem::NoWay { span, name, wanted, declared, place, has, rows, row });
    }

    /// What a place has: "a row of `harvest`, which has season and hive".
    pub(super) fn place_in_words(&self, scope: &Scope) -> String {
        if scope.variables.is_empty() {
            return "no row and no label of a group".into();
        }
        let parts: Vec<String> = scope.variables.iter().map(|index| self.variable_in_words(*index)).collect();
        list(&parts)
    }

    fn variable_in_words(&self, index: Index) -> String {
        match index {
            Index::Group(group) => format!("one {}", self.model.groups[group].name),
            Index::Table(table) => {
                let columns = self.model.tables[table].columns.iter().map(|id| &self.model.columns[*id]);
                let labels: Vec<String> = columns
                    .filter(|column| matches!(column.kind, ColumnKind::Labels { .. }))
                    .map(|column| column.name.clone())
                    .collect();
                let name = &self.model.tables[table].name;
                if labels.is_empty() {
                    format!("a row of {name}, which has no label column")
                } else {
                    format!("a row of {name}, which has {}", list(&labels))
                }
            }
        }
    }

    fn report_two_ways(&mut self, starts: [Index; 2], ways: &[Vec<Step>; 2], target: Index, asker: &Asker) {
        let differ = ways[0].iter().zip(&ways[1]).take_while(|(a, b)| a == b).count();
        let roles = ways.iter().filter_map(|way| match way.first() {
            Some(Step::Column(id)) if Some(&self.model.columns[*id].name) != self.group_name_of(*id) => {
                Some(self.model.columns[*id].name.clone())
            }
            _ => None,
        });
        let roles: Vec<String> = roles.collect();
        let described = [0, 1].map(|at| {
            // Where one way begins with the other, the last step stands for it.
            let step = ways[at].get(differ).or(ways[at].last());
            let span = step.map_or(asker.span, |step| self.step_span(*step));
            let words: Vec<String> = ways[at].iter().map(|step| self.step_in_words(*step)).collect();
            (span, format!("from the {} {}", self.start_in_words(starts[at]), words.join(", then ")))
        });
        self.problems.add(PathProblem::TwoWays {
            span: asker.span,
            name: asker.name.to_string(),
            wanted: self.model.index_name(target).to_string(),
            ways: described,
            roles: if roles.len() == 2 && roles[0] != roles[1] { roles } else { Vec::new() },
        });
    }

    fn group_name_of(&self, column: Id<Column>) -> Option<&String> {
        self.labels_of(column).map(|group| &self.model.groups[group].name)
    }

    fn start_in_words(&self, index: Index) -> String {
        match index {
            Index::Group(group) => self.model.groups[group].name.clone(),
            Index::Table(table) => format!("row of {}", self.model.tables[table].name),
        }
    }

    fn step_span(&self, step: Step) -> Span {
        match step {
            Step::Column(column) => self.model.columns[column].span,
            Step::Parent(group) => self.model.groups[group].span,
            Step::Row(table) => self.model.tables[table].span,
        }
    }

    fn step_in_words(&self, step: Step) -> String {
        match step {
            Step::Column(column) => format!("by its {}", self.model.columns[column].name),
            Step::Parent(group) => {
                let parent = self.model.groups[group].parent;
                let parent = parent.map_or("", |parent| self.model.groups[parent].name.as_str());
                format!("to the {parent} that it lies in")
            }
            Step::Row(table) => format!("to its row of {}", self.model.tables[table].name),
        }
    }

    /// What a quantity of a table's column varies over: the rows, or the labels where there is one row for each.
    pub(super) fn rows_of(&self, table: Id<Table>) -> Index {
        self.model.tables[table].per.map_or(Index::Table(table), Index::Group)
    }
}

fn access(variable: usize, steps: Vec<Step>) -> Access {
    Access { place: Place::Variable(Variable(variable as u32)), steps }
}

/// "a, b and c".
pub(super) fn list(items: &[String]) -> String {
    match items {
        [] => String::new(),
        [only] => only.clone(),
        [first @ .., last] => format!("{} and {last}", first.join(", ")),
    }
}
