//! Labels of all tables interned: each group's labels in their order, each label column's positions among them.

use std::collections::HashMap;
use std::sync::Arc;

use stook_lang::arena::Id;
use stook_lang::model::{Column, ColumnKind, Group};

use super::problem::{DataProblem, Examples};
use super::{Binder, GroupLabels, fixed_labels, positions};
use crate::table;

/// The code of a cell without a label.
const GAP: u32 = u32::MAX;

/// The labels of every group, and for each label column the position of each row's label.
pub(super) struct Interned {
    pub(super) groups: Vec<GroupLabels>,
    pub(super) rows: HashMap<Id<Column>, Arc<[u32]>>,
}

impl Binder<'_> {
    /// Interns the labels, parents before children.
    pub(super) fn labels(&mut self) -> Interned {
        let mut interned =
            Interned { groups: vec![GroupLabels::default(); self.model.groups.len()], rows: HashMap::new() };
        for group in self.outermost_first() {
            let columns = self.label_columns(group);
            interned.groups[group.position()] = match self.model.groups[group].parent {
                None => self.outer_group(group, &columns),
                Some(parent) => self.nested_group(group, parent, &columns, &interned),
            };
            for column in columns {
                let rows = self.rows_of(column, group, &interned);
                interned.rows.insert(column, rows.into());
            }
        }
        interned
    }

    /// The groups, each after the one that it is nested in.
    fn outermost_first(&self) -> Vec<Id<Group>> {
        let depth = |group: Id<Group>| {
            std::iter::successors(self.model.groups[group].parent, |at| self.model.groups[*at].parent).count()
        };
        let mut order: Vec<Id<Group>> = self.model.groups.ids().collect();
        order.sort_by_key(|group| depth(*group));
        order
    }

    fn label_columns(&self, wanted: Id<Group>) -> Vec<Id<Column>> {
        let holds =
            |column: &Column| matches!(column.kind, ColumnKind::Labels { group, .. } if group == wanted);
        self.model.columns.iter().filter(|(_, column)| holds(column)).map(|(id, _)| id).collect()
    }

    /// The distinct labels of a column and each row's code among them.
    fn coded(&self, column: Id<Column>) -> (&[String], &[u32]) {
        match self.raw(column) {
            table::Column::Labels { labels, codes } => (labels, codes),
            table::Column::Numbers { .. } => (&[], &[]),
        }
    }

    fn parent_column(&self, column: Id<Column>) -> Option<Id<Column>> {
        match self.model.columns[column].kind {
            ColumnKind::Labels { parent, .. } => parent,
            ColumnKind::Values { .. } => None,
        }
    }

    fn outer_group(&self, group: Id<Group>, columns: &[Id<Column>]) -> GroupLabels {
        let declared = &self.model.groups[group];
        let titles = fixed_labels(&declared.labels).unwrap_or_else(|| {
            let mut found: Vec<String> = vec![];
            let mut seen: HashMap<&str, ()> = HashMap::new();
            for column in columns {
                let new = self.coded(*column).0.iter().filter(|label| seen.insert(label, ()).is_none());
                found.extend(new.cloned());
            }
            if declared.ordered {
                sort(&mut found);
            }
            found
        });
        GroupLabels { positions: positions(&titles), titles, parents: vec![] }
    }

    /// A nested group has a label for each pair of a parent's label and an own one that occurs; with fixed labels, all of
    /// them inside each parent.
    fn nested_group(
        &self,
        group: Id<Group>,
        parent: Id<Group>,
        columns: &[Id<Column>],
        interned: &Interned,
    ) -> GroupLabels {
        let declared = &self.model.groups[group];
        let parents = &interned.groups[parent.position()].titles;
        let mut inside: Vec<Vec<String>> = match fixed_labels(&declared.labels) {
            Some(labels) => vec![labels; parents.len()],
            None => self.pairs(parents.len(), columns, interned),
        };
        if declared.ordered {
            inside.iter_mut().for_each(|labels| sort(labels));
        }
        let mut labels = GroupLabels::default();
        for (at, own) in inside.iter().enumerate() {
            for label in own {
                labels.titles.push(format!("{}/{label}", parents[at]));
                labels.parents.push(at as u32);
            }
        }
        labels.positions = positions(&labels.titles);
        labels
    }

    /// For each parent's label the own labels that occur inside it, in the order in which they are met.
    fn pairs(&self, parents: usize, columns: &[Id<Column>], interned: &Interned) -> Vec<Vec<String>> {
        let mut inside = vec![vec![]; parents];
        let mut seen: HashMap<(u32, &str), ()> = HashMap::new();
        for column in columns {
            let Some(above) = self.parent_column(*column).and_then(|above| interned.rows.get(&above)) else {
                continue;
            };
            let (labels, codes) = self.coded(*column);
            for (code, at) in codes.iter().zip(above.iter()) {
                if *code != GAP && *at != GAP {
                    let label = labels[*code as usize].as_str();
                    if seen.insert((*at, label), ()).is_none() {
                        inside[*at as usize].push(label.to_string());
                    }
                }
            }
        }
        inside
    }

    /// The position of each row's label; what is missing or not among the group's labels is a problem.
    fn rows_of(&mut self, column: Id<Column>, group: Id<Group>, interned: &Interned) -> Vec<u32> {
        let known = &interned.groups[group.position()];
        let above = self.parent_column(column).and_then(|above| interned.rows.get(&above));
        let nested = self.model.groups[group].parent.is_some();
        let (labels, codes) = self.coded(column);
        let mut found: HashMap<(u32, u32), Position> = HashMap::new();
        let mut bare: Option<HashMap<&str, Vec<u32>>> = None;
        let (mut gaps, mut strangers, mut doubles) =
            (Examples::default(), Examples::default(), Examples::default());
        let mut rows = Vec::with_capacity(codes.len());
        for (row, code) in codes.iter().enumerate() {
            let parent = above.map_or(0, |above| above[row]);
            if *code == GAP {
                gaps.add(row, String::new);
                rows.push(GAP);
                continue;
            }
            let position = *found.entry((parent, *code)).or_insert_with(|| {
                let label = &labels[*code as usize];
                match (nested, above) {
                    (false, _) => Position::of(known.positions.get(label)),
                    (true, Some(_)) if parent == GAP => Position::Unknown,
                    (true, Some(_)) => {
                        let title = interned.parent_title(self.model, group, parent);
                        Position::of(known.positions.get(&format!("{title}/{label}")))
                    }
                    (true, None) => {
                        let bare = bare.get_or_insert_with(|| known.by_own_label());
                        match bare.get(label.as_str()).map(Vec::as_slice) {
                            Some([one]) => Position::At(*one),
                            Some(_) => Position::Several,
                            None => Position::Unknown,
                        }
                    }
                }
            });
            rows.push(match position {
                Position::At(at) => at,
                Position::Several => {
                    doubles.add(row, || labels[*code as usize].clone());
                    GAP
                }
                Position::Unknown => {
                    // Under a parent that is itself missing or unknown the parent's problem is enough.
                    if parent != GAP {
                        strangers.add(row, || labels[*code as usize].clone());
                    }
                    GAP
                }
            });
        }
        self.label_problems(column, group, known, [gaps, strangers, doubles]);
        rows
    }

    fn label_problems(
        &mut self,
        column: Id<Column>,
        group: Id<Group>,
        known: &GroupLabels,
        [gaps, strangers, doubles]: [Examples; 3],
    ) {
        let name = self.model.groups[group].name.clone();
        if !gaps.is_empty() {
            let cells = gaps.cells(|row, text| self.place(column, row, text));
            self.problems.push(DataProblem::NoLabel { group: name.clone(), cells });
        }
        if !strangers.is_empty() {
            let nearest =
                stook_lang::nearest::nearest(strangers.first(), known.titles.iter().map(String::as_str));
            let nearest = nearest.map(str::to_string);
            let cells = strangers.cells(|row, text| self.place(column, row, text));
            let allowed = super::problem::label_set(&self.model.groups[group].labels);
            self.problems.push(DataProblem::StrangeLabel { group: name.clone(), allowed, nearest, cells });
        }
        if !doubles.is_empty() {
            let parent = self.model.groups[group].parent.map(|parent| self.model.groups[parent].name.clone());
            let cells = doubles.cells(|row, text| self.place(column, row, text));
            let parent = parent.unwrap_or_default();
            self.problems.push(DataProblem::TwoParents { group: name, parent, cells });
        }
    }
}

impl Interned {
    fn parent_title<'a>(&'a self, model: &stook_lang::model::Model, group: Id<Group>, at: u32) -> &'a str {
        match model.groups[group].parent {
            Some(parent) => &self.groups[parent.position()].titles[at as usize],
            None => "",
        }
    }
}

impl GroupLabels {
    /// The positions of each own label, without its parents'.
    fn by_own_label(&self) -> HashMap<&str, Vec<u32>> {
        let mut found: HashMap<&str, Vec<u32>> = HashMap::new();
        for (title, at) in self.titles.iter().zip(0u32..) {
            let own = title.rsplit_once('/').map_or(title.as_str(), |(_, own)| own);
            found.entry(own).or_default().push(at);
        }
        found
    }
}

/// DataPlace a label stands among its group's.
#[derive(Clone, Copy)]
enum Position {
    At(u32),
    Several,
    Unknown,
}

impl Position {
    fn of(found: Option<&u32>) -> Position {
        found.map_or(Position::Unknown, |at| Position::At(*at))
    }
}

/// Sorts labels as numbers where they all are numbers, as ISO 8601 dates where they all are dates, else leaves them in
/// the order of the data.
fn sort(labels: &mut [String]) {
    let number = |label: &String| label.parse::<f64>().ok().filter(|value| value.is_finite());
    if labels.iter().all(|label| number(label).is_some()) {
        labels.sort_by(|a, b| number(a).partial_cmp(&number(b)).unwrap_or(std::cmp::Ordering::Equal));
    } else if labels.iter().all(|label| is_date(label)) {
        labels.sort();
    }
}

/// `2024-05-17` or `2024-05`: sorted as text they are sorted as dates.
fn is_date(label: &str) -> bool {
    let parts: Vec<&str> = label.split('-').collect();
    let lengths: Vec<usize> = parts.iter().map(|part| part.len()).collect();
    matches!(lengths[..], [4, 2] | [4, 2, 2])
        && parts.iter().all(|part| part.bytes().all(|b| b.is_ascii_digit()))
}
