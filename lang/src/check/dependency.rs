//! Which declaration uses which, and circles among them.

use crate::arena::Id;
use crate::model::{Column, Named, Unknown};
use crate::problem::NameProblem;
use crate::span::Span;
use crate::syntax::tree::{self, Argument, DistributionSyntax, ExpressionKind, ModifierKind, Name};

use super::checker::{Checker, Entity};
use super::leaf::recursion;

/// A declaration with a right-hand side.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Node {
    Unknown(Id<Unknown>),
    Named(Id<Named>),
    /// A response, by its position.
    Response(usize),
}

impl<'t> Checker<'t> {
    /// Reports every circle among named expressions, priors and responses. Gives the declarations in an order in which
    /// each comes after those that it uses (circles cut open).
    pub(super) fn find_circles(&mut self) -> Vec<Node> {
        self.find_response_columns();
        let uses = self.all_uses();
        let mut order = Vec::with_capacity(uses.len());
        let mut state = vec![State::New; uses.len()];
        let mut circles = Vec::new();
        for start in 0..uses.len() {
            if state[start] != State::New {
                continue;
            }
            // Depth first with a stack of its own: a chain of lets can be as long as the text. Each entry holds the use
            // that is looked at next.
            let mut way: Vec<(usize, usize)> = vec![(start, 0)];
            state[start] = State::Open;
            while let Some((node, next)) = way.last_mut() {
                let node = *node;
                let Some((target, _)) = uses[node].get(*next) else {
                    state[node] = State::Done;
                    order.push(self.node(node));
                    way.pop();
                    continue;
                };
                *next += 1;
                match state[*target] {
                    State::New => {
                        state[*target] = State::Open;
                        way.push((*target, 0));
                    }
                    State::Open => {
                        let begin = way.iter().position(|(node, _)| node == target).unwrap_or(0);
                        circles.push(way[begin..].to_vec());
                    }
                    State::Done => {}
                }
            }
        }
        for circle in circles {
            self.report_circle(&circle, &uses);
        }
        order
    }

    fn report_circle(&mut self, circle: &[(usize, usize)], uses: &[Vec<(usize, Span)>]) {
        let steps = circle.iter().map(|(node, next)| {
            // `next` already points behind the use that was followed.
            let (target, span) = uses[*node][next - 1];
            (span, self.node_name(*node).to_string(), self.node_name(target).to_string())
        });
        let steps = steps.collect();
        self.problems.add(NameProblem::Circle { steps });
    }

    fn node(&self, at: usize) -> Node {
        let (unknowns, named) = (self.unknowns.len(), self.named.len());
        if at < unknowns {
            Node::Unknown(Id::new(at))
        } else if at < unknowns + named {
            Node::Named(Id::new(at - unknowns))
        } else {
            Node::Response(at - unknowns - named)
        }
    }

    fn node_name(&self, at: usize) -> &'t str {
        match self.node(at) {
            Node::Unknown(id) => &self.unknowns[id.position()].declaration.name.text,
            Node::Named(id) => &self.named[id.position()].declaration.name.text,
            Node::Response(at) => &self.responses[at].declaration.column.text,
        }
    }

    /// For each declaration the declarations that it uses, with the place of the use.
    fn all_uses(&self) -> Vec<Vec<(usize, Span)>> {
        let (unknowns, named) = (self.unknowns.len(), self.named.len());
        let mut response_of = std::collections::HashMap::new();
        for (at, response) in self.responses.iter().enumerate() {
            if let Some(column) = response.column {
                response_of.entry(column).or_insert(unknowns + named + at);
            }
        }
        let position = |entity: Entity| match entity {
            Entity::Unknown(id) => Some(id.position()),
            Entity::Named(id) => Some(unknowns + id.position()),
            Entity::Column(column) => response_of.get(&column).copied(),
            _ => None,
        };
        let uses_of = |roots: Vec<Id<tree::Expression>>| {
            let mut uses = Vec::new();
            self.visit_names(roots, |name| {
                if let Some(target) = self.entity(&name.text).and_then(|declared| position(declared.entity)) {
                    uses.push((target, name.span));
                }
            });
            uses
        };
        let law = |law: &Option<DistributionSyntax>| law.as_ref().map(roots).unwrap_or_default();
        let unknowns = self.unknowns.iter().map(|draft| uses_of(law(&draft.declaration.prior)));
        let named = self.named.iter().map(|draft| uses_of(vec![draft.declaration.value]));
        let responses = self.responses.iter().map(|draft| uses_of(law(&draft.declaration.law)));
        unknowns.chain(named).chain(responses).collect()
    }

    /// Calls `visit` with every name below some expressions that may stand for a quantity of the same label. A neighbour's
    /// value (`x[previous season]`) is no circle.
    fn visit_names(&self, roots: Vec<Id<tree::Expression>>, mut visit: impl FnMut(&'t Name)) {
        self.visit_below(roots, |kind| match kind {
            ExpressionKind::Name(name) => visit(name),
            ExpressionKind::Select { base, selectors } if recursion(selectors).is_none() => {
                if let ExpressionKind::Name(name) = &self.tree.expressions[*base].kind {
                    visit(name);
                }
            }
            _ => {}
        });
    }

    /// Whether a distribution uses a neighbour's value.
    pub(super) fn has_recursion(&self, law: &DistributionSyntax) -> bool {
        let mut found = false;
        self.visit_below(roots(law), |kind| {
            found |=
                matches!(kind, ExpressionKind::Select { selectors, .. } if recursion(selectors).is_some());
        });
        found
    }

    /// Calls `visit` with every part of some expressions, in the order of the text; what stands before brackets or a dot
    /// is left to the visitor.
    fn visit_below(&self, mut stack: Vec<Id<tree::Expression>>, mut visit: impl FnMut(&'t ExpressionKind)) {
        stack.reverse();
        let tree = self.tree;
        while let Some(id) = stack.pop() {
            let kind = &tree.expressions[id].kind;
            visit(kind);
            match kind {
                ExpressionKind::Number(_)
                | ExpressionKind::Text(_)
                | ExpressionKind::Name(_)
                | ExpressionKind::Select { .. }
                | ExpressionKind::Member { .. } => {}
                ExpressionKind::Unary(_, a) => stack.push(*a),
                ExpressionKind::Binary(_, a, b) => stack.extend([*b, *a]),
                ExpressionKind::If { condition, then, otherwise } => {
                    stack.extend([*otherwise, *then, *condition])
                }
                ExpressionKind::Call { arguments, .. } => {
                    stack.extend(arguments.iter().rev().filter_map(|argument| match argument {
                        Argument::Named(_, value) | Argument::Positional(value) => Some(*value),
                        Argument::Group(_) => None,
                    }))
                }
                ExpressionKind::Reduce { body, .. } => stack.push(*body),
            }
        }
    }

    /// Finds the column of each response.
    fn find_response_columns(&mut self) {
        let mut taken: std::collections::HashMap<Id<Column>, Span> = std::collections::HashMap::new();
        for at in 0..self.responses.len() {
            let name = &self.responses[at].declaration.column;
            let column = self.response_column(name);
            if let Some(column) = column {
                if let Some(first) = taken.get(&column) {
                    let (span, first, name) = (name.span, *first, name.text.clone());
                    self.problems.add(crate::problem::ShapeProblem::ResponseTwice { span, first, name });
                } else {
                    taken.insert(column, name.span);
                }
            }
            self.responses[at].column = column;
        }
    }
}

#[derive(Clone, Copy, PartialEq, Eq)]
enum State {
    New,
    Open,
    Done,
}

/// The expressions of a distribution as written.
fn roots(law: &DistributionSyntax) -> Vec<Id<tree::Expression>> {
    let mut roots = vec![law.call];
    for modifier in &law.modifiers {
        match modifier.kind {
            ModifierKind::Between(a, b)
            | ModifierKind::CensoredBelow(a, b)
            | ModifierKind::CensoredAbove(a, b)
            | ModifierKind::KnownBetween(a, b) => roots.extend([a, b]),
            ModifierKind::Above(a) | ModifierKind::Below(a) => roots.push(a),
        }
    }
    roots
}
