//! The index graph: how one gets from a row or a label to another.
//!
//! A row of a table leads to the label in each of its label columns; a label of a nested group leads to its parent's; a
//! label leads to its one row in a table `per` its group.

use std::cell::RefCell;
use std::collections::HashMap;

use crate::arena::Id;
use crate::model::{Column, ColumnKind, Group, Index, Model, Step, Table};

/// The ways from one index set to another.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum Way {
    /// There is none.
    None,
    /// There is one.
    One(Vec<Step>),
    /// Only these role columns lead straight to it.
    Roles(Vec<Id<Column>>),
    /// There are two (at least).
    Two(Vec<Step>, Vec<Step>),
}

/// How many steps a search may take before it is given up as "none": more than any model that a person would read.
const SEARCH_BUDGET: usize = 4_000;

#[derive(Default)]
pub(super) struct Graph {
    groups: usize,
    edges: Vec<Vec<(Step, usize)>>,
    parents: Vec<Option<usize>>,
    /// The group that a table is per.
    per: Vec<Option<usize>>,
    /// All label columns of each table by group, bare ones first.
    columns: HashMap<(usize, usize), Vec<LabelColumn>>,
    /// Columns that hold the key of a `per` table.
    keys: Vec<Vec<Id<Column>>>,
    reach: RefCell<HashMap<usize, Vec<bool>>>,
    found: RefCell<HashMap<(usize, usize), Way>>,
}

/// A column of labels, and whether it has its group's name.
type LabelColumn = (Id<Column>, Naming);

/// Whether a label column has its group's name.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Naming {
    Bare,
    Role,
}

impl Graph {
    /// The graph of a model's groups, tables and columns.
    pub(super) fn new(model: &Model) -> Graph {
        let groups = model.groups.len();
        let mut graph = Graph {
            groups,
            edges: vec![Vec::new(); groups + model.tables.len()],
            parents: model.groups.iter().map(|(_, group)| group.parent.map(Id::position)).collect(),
            per: model.tables.iter().map(|(_, table)| table.per.map(Id::position)).collect(),
            keys: vec![Vec::new(); model.tables.len()],
            ..Graph::default()
        };
        for (at, parent) in graph.parents.iter().enumerate() {
            if let Some(parent) = parent {
                graph.edges[at].push((Step::Parent(Id::new(at)), *parent));
            }
        }
        for (id, table) in model.tables.iter() {
            for column in &table.columns {
                let ColumnKind::Labels { group, .. } = model.columns[*column].kind else { continue };
                let naming = if model.columns[*column].name == model.groups[group].name {
                    Naming::Bare
                } else {
                    Naming::Role
                };
                graph.columns.entry((id.position(), group.position())).or_default().push((*column, naming));
            }
        }
        for table in 0..model.tables.len() {
            graph.add_table(table);
        }
        graph
    }

    fn add_table(&mut self, table: usize) {
        let node = self.groups + table;
        for group in 0..self.groups {
            let Some(columns) = self.columns.get(&(table, group)) else { continue };
            // The bare column is the table's own link to the group; roles count only where there is none.
            let bare = columns.iter().find(|(_, naming)| *naming == Naming::Bare);
            let links: Vec<Id<Column>> = match bare {
                Some((column, _)) => vec![*column],
                None => columns.iter().map(|(column, _)| *column).collect(),
            };
            if bare.is_some() && self.per[table].is_some_and(|key| self.is_self_or_ancestor(group, key)) {
                self.keys[table].extend(&links);
            }
            self.edges[node].extend(links.into_iter().map(|column| (Step::Column(column), group)));
        }
        if let Some(group) = self.per[table] {
            self.edges[group].push((Step::Row(Id::new(table)), node));
        }
    }

    fn is_self_or_ancestor(&self, candidate: usize, of: usize) -> bool {
        let mut at = Some(of);
        while let Some(group) = at {
            if group == candidate {
                return true;
            }
            at = self.parents[group];
        }
        false
    }

    fn node(&self, index: Index) -> usize {
        match index {
            Index::Group(group) => group.position(),
            Index::Table(table) => self.groups + table.position(),
        }
    }

    /// Whether a way of any kind leads from one index set to another.
    pub(super) fn reaches(&self, from: Index, to: Index) -> bool {
        let (from, to) = (self.node(from), self.node(to));
        self.reachable(from, to)
    }

    fn reachable(&self, from: usize, to: usize) -> bool {
        let mut cache = self.reach.borrow_mut();
        let reached = cache.entry(from).or_insert_with(|| {
            let mut reached = vec![false; self.edges.len()];
            reached[from] = true;
            let mut stack = vec![from];
            while let Some(node) = stack.pop() {
                for (_, next) in &self.edges[node] {
                    if !reached[*next] {
                        reached[*next] = true;
                        stack.push(*next);
                    }
                }
            }
            reached
        });
        reached[to]
    }

    /// The way from a label or row of one index set to one of another.
    pub(super) fn way(&self, from: Index, to: Index) -> Way {
        let key = (self.node(from), self.node(to));
        if let Some(way) = self.found.borrow().get(&key) {
            return way.clone();
        }
        let way = self.search_way(from, to);
        self.found.borrow_mut().insert(key, way.clone());
        way
    }

    fn search_way(&self, from: Index, to: Index) -> Way {
        if from == to {
            return Way::One(Vec::new());
        }
        let target = match to {
            Index::Group(group) => group.position(),
            Index::Table(table) => return self.way_to_row(from, table),
        };
        match from {
            Index::Table(table) => {
                let columns = self.direct(table, target);
                match columns[..] {
                    [] => {}
                    [column] => return Way::One(vec![Step::Column(column)]),
                    _ => return Way::Roles(columns),
                }
            }
            Index::Group(group) => {
                if let Some(steps) = self.parent_chain(group.position(), target) {
                    return Way::One(steps);
                }
            }
        }
        self.search(self.node(from), target)
    }

    /// A table's row is reached only from its group's label, where the table is `per` that group.
    fn way_to_row(&self, from: Index, table: Id<Table>) -> Way {
        let Some(group) = self.per[table.position()] else { return Way::None };
        let onward = |mut steps: Vec<Step>| {
            steps.push(Step::Row(table));
            steps
        };
        match self.way(from, Index::Group(Id::new(group))) {
            Way::One(steps) => Way::One(onward(steps)),
            Way::Two(a, b) => Way::Two(onward(a), onward(b)),
            other => other,
        }
    }

    /// The columns of a table that lead straight to a group.
    fn direct(&self, table: Id<Table>, group: usize) -> Vec<Id<Column>> {
        let links = self.edges[self.groups + table.position()].iter();
        links
            .filter_map(|(step, to)| match step {
                Step::Column(column) if *to == group => Some(*column),
                _ => None,
            })
            .collect()
    }

    fn parent_chain(&self, from: usize, to: usize) -> Option<Vec<Step>> {
        let mut steps = Vec::new();
        let mut at = from;
        while let Some(parent) = self.parents[at] {
            steps.push(Step::Parent(Id::new(at)));
            if parent == to {
                return Some(steps);
            }
            at = parent;
        }
        None
    }

    /// The simple paths, up to two.
    fn search(&self, from: usize, to: usize) -> Way {
        let mut search = Search {
            graph: self,
            to,
            visited: vec![from],
            steps: Vec::new(),
            found: Vec::new(),
            budget: SEARCH_BUDGET,
        };
        search.from(from);
        let mut found = search.found.into_iter();
        match (found.next(), found.next()) {
            (None, _) => Way::None,
            (Some(steps), None) => Way::One(steps),
            (Some(a), Some(b)) => Way::Two(a, b),
        }
    }
}

struct Search<'g> {
    graph: &'g Graph,
    to: usize,
    visited: Vec<usize>,
    steps: Vec<Step>,
    found: Vec<Vec<Step>>,
    budget: usize,
}

impl Search<'_> {
    fn from(&mut self, node: usize) {
        for (step, next) in &self.graph.edges[node] {
            if self.found.len() == 2 || self.budget == 0 {
                return;
            }
            self.budget -= 1;
            if self.visited.contains(next) || !self.allowed(*step) || !self.graph.reachable(*next, self.to) {
                continue;
            }
            self.steps.push(*step);
            if *next == self.to {
                self.found.push(self.steps.clone());
            } else {
                self.visited.push(*next);
                self.from(*next);
                self.visited.pop();
            }
            self.steps.pop();
        }
    }

    /// Two steps are never taken because another way says the same: out of a row's column into that label's parent (the
    /// row has a column of the parent), and out of a label's own row through the row's key.
    fn allowed(&self, step: Step) -> bool {
        match (self.steps.last(), step) {
            (Some(Step::Column(_)), Step::Parent(_)) => false,
            (Some(Step::Row(table)), Step::Column(column)) => {
                !self.graph.keys[table.position()].contains(&column)
            }
            _ => true,
        }
    }
}

/// The group that a group lies in, and so on outwards.
pub(super) fn ancestors(model: &Model, group: Id<Group>) -> Vec<Id<Group>> {
    let mut outward = Vec::new();
    let mut at = model.groups[group].parent;
    while let Some(parent) = at {
        outward.push(parent);
        at = model.groups[parent].parent;
    }
    outward
}
