//! The shape of a named expression: what its leaves need, less what follows from the rest.

use std::collections::BTreeSet;

use crate::arena::Id;
use crate::model::{ColumnKind, Index};
use crate::syntax::tree::{self, Argument, ExpressionKind, Name};

use super::checker::{Checker, Entity};
use super::dependency::Node;
use super::expression::{Comparison, MOST_LEVELS};
use super::leaf::{Source, recursion};

/// What an expression needs, and whether all of it is known.
#[derive(Default)]
struct Needs {
    indices: BTreeSet<Index>,
    /// Something in it is wrong or stands in a circle; it has been or will be reported.
    broken: bool,
}

impl<'t> Checker<'t> {
    /// Infers the dimensions of every named expression, in an order in which what they use comes first.
    pub(super) fn infer_dimensions(&mut self, order: &[Node]) {
        // Until it has been inferred a name counts as broken, so that circles are silent here.
        self.named.iter_mut().for_each(|draft| draft.broken = true);
        for node in order {
            let Node::Named(id) = node else { continue };
            let mut needs = Needs::default();
            self.needs(self.named[id.position()].declaration.value, &mut needs, 0);
            let dimensions = self.least(needs.indices);
            let draft = &mut self.named[id.position()];
            draft.dimensions = dimensions;
            draft.broken = needs.broken;
        }
    }

    /// Index sets without those that another of them leads to, groups before tables, in the order of the text.
    fn least(&self, indices: BTreeSet<Index>) -> Vec<Index> {
        let mut kept: Vec<Index> = indices.into_iter().collect();
        // From the back: a table per a group goes before the group that leads to its rows.
        for at in (0..kept.len()).rev() {
            let implied = kept
                .iter()
                .enumerate()
                .any(|(other, index)| other != at && self.graph.reaches(*index, kept[at]));
            if implied {
                kept.remove(at);
            }
        }
        kept
    }

    fn needs(&self, root: Id<tree::Expression>, needs: &mut Needs, level: usize) {
        if level > MOST_LEVELS {
            needs.broken = true;
            return;
        }
        let tree = self.tree;
        let mut stack = vec![root];
        while let Some(id) = stack.pop() {
            match &tree.expressions[id].kind {
                ExpressionKind::Number(_) | ExpressionKind::Text(_) => {}
                ExpressionKind::Name(name) => self.needs_of_name(name, needs),
                ExpressionKind::Select { base, selectors } => match &tree.expressions[*base].kind {
                    ExpressionKind::Name(name) if recursion(selectors).is_none() => {
                        self.needs_of_selection(name, selectors, needs)
                    }
                    _ => needs.broken = true,
                },
                ExpressionKind::Member { .. } => needs.broken = true,
                ExpressionKind::Unary(_, a) => stack.push(*a),
                ExpressionKind::Binary(operator, a, b) => match self.comparison(*operator, *a, *b) {
                    Comparison::Quantities => stack.extend([*a, *b]),
                    Comparison::Label(name, ..) => self.needs_of_label_test(name, needs),
                    Comparison::NoGroup | Comparison::Unquoted(..) | Comparison::Groups => {
                        needs.broken = true
                    }
                },
                ExpressionKind::If { condition, then, otherwise } => {
                    stack.extend([*condition, *then, *otherwise])
                }
                ExpressionKind::Call { name, arguments } => {
                    needs.broken |= super::names::function(&name.text).is_none();
                    stack.extend(arguments.iter().filter_map(|argument| match argument {
                        Argument::Named(_, value) | Argument::Positional(value) => Some(*value),
                        Argument::Group(_) => None,
                    }));
                }
                ExpressionKind::Reduce { body, over, per, .. } => {
                    self.needs_of_reduction(*body, over, per, needs, level)
                }
            }
        }
    }

    fn needs_of_name(&self, name: &Name, needs: &mut Needs) {
        match self.item(&name.text) {
            Some(item) => needs.indices.extend(item.dimensions),
            None => needs.broken = true,
        }
    }

    fn needs_of_selection(&self, name: &Name, selectors: &'t [tree::Selector], needs: &mut Needs) {
        let Some(item) = self.item(&name.text) else {
            needs.broken = true;
            return;
        };
        let Ok(sources) = self.sources(name, &item, selectors, None) else {
            needs.broken = true;
            return;
        };
        for (index, source) in item.dimensions.iter().zip(sources) {
            match source {
                Source::Here => needs.indices.extend([*index]),
                Source::Label(_) => {}
                Source::Role(column, _) => {
                    needs.indices.extend([self.rows_of(self.model.columns[column].table)])
                }
            }
        }
    }

    fn needs_of_label_test(&self, name: &Name, needs: &mut Needs) {
        if let Some(group) = self.group_of(name) {
            needs.indices.insert(Index::Group(group));
            return;
        }
        match self.choose_role(name, None) {
            Ok(column) => {
                needs.indices.insert(self.rows_of(self.model.columns[column].table));
            }
            Err(_) => needs.broken = true,
        }
    }

    fn needs_of_reduction(
        &self,
        body: Id<tree::Expression>,
        over: &Name,
        per: &[Name],
        needs: &mut Needs,
        level: usize,
    ) {
        let index = |name: &Name| match self.entity(&name.text).map(|declared| declared.entity) {
            Some(Entity::Group(group)) => Some(Index::Group(group)),
            Some(Entity::Table(table)) => Some(Index::Table(table)),
            _ => None,
        };
        let mut inner = Needs::default();
        self.needs(body, &mut inner, level + 1);
        needs.broken |= inner.broken;
        let Some(over) = index(over) else {
            needs.broken = true;
            return;
        };
        needs.indices.extend(inner.indices.into_iter().filter(|needed| !self.graph.reaches(over, *needed)));
        for name in per {
            match index(name) {
                Some(group) => needs.indices.extend([group]),
                None => needs.broken = true,
            }
        }
    }

    /// Reports columns with gaps that are used although nothing says how their missing cells arise.
    pub(super) fn check_gaps(&mut self) {
        for (column, span) in std::mem::take(&mut self.covariates) {
            let held = &self.model.columns[column];
            let gaps = matches!(held.kind, ColumnKind::Values { gaps: true, .. });
            if gaps && !self.responses.iter().any(|response| response.column == Some(column)) {
                let (name, column) = (held.name.clone(), held.span);
                self.problems.add(crate::problem::StructureProblem::GapsWithoutResponse {
                    span,
                    column,
                    name,
                });
            }
        }
    }
}
