//! Expressions, worked out at their place.

use crate::arena::Id;
use crate::distribution;
use crate::model::{BinaryOperator, Expression, Function, Group, Index, UnaryOperator};
use crate::problem::{Feature, NameKind, NameProblem, PathProblem, ShapeProblem, SyntaxProblem, Wanted};
use crate::span::Span;
use crate::syntax::tree::{self, Argument, ExpressionKind, Name};

use super::access::{Asker, RoleForm};
use super::checker::{Checker, Entity, Scope};
use super::names::{PRELUDE_PARTS, function, reducer};

/// How many levels an expression may have: a guard for the stack. The parser stops earlier, so only trees that were made
/// by other means meet it.
pub(super) const MOST_LEVELS: usize = 256;

/// A comparison of a group or role with something.
pub(super) enum Comparison<'t> {
    /// With a label.
    Label(&'t Name, &'t str, Span),
    /// With a text, but the other side is no group and no role.
    NoGroup,
    /// With a number or a name that nothing has: a label without quotes.
    Unquoted(&'t Name, Span, String),
    /// With another group or role.
    Groups,
    /// Of quantities.
    Quantities,
}

impl<'t> Checker<'t> {
    /// Works out an expression at a place. `None` where something in it is wrong; that has been reported.
    pub(super) fn expression(
        &mut self,
        id: Id<tree::Expression>,
        scope: &mut Scope,
    ) -> Option<Id<Expression>> {
        let tree = self.tree;
        if self.depth >= MOST_LEVELS {
            let span = tree.expressions[id].span;
            self.problems.add(SyntaxProblem::TooDeep { span, deepest: MOST_LEVELS });
            return None;
        }
        self.depth += 1;
        // Down the left side without recursion: a sum can have any number of terms.
        let mut rights = Vec::new();
        let mut at = id;
        while let ExpressionKind::Binary(operator, left, right) = &tree.expressions[at].kind {
            if !matches!(self.comparison(*operator, *left, *right), Comparison::Quantities) {
                break;
            }
            rights.push((at, *operator, *right));
            at = *left;
        }
        let mut value = self.operand(at, scope);
        for (whole, operator, right) in rights.into_iter().rev() {
            let right = self.expression(right, scope);
            let span = tree.expressions[whole].span;
            value = value.zip(right).map(|(left, right)| {
                self.model.expressions.add(Expression::Binary(operator, left, right), span)
            });
        }
        self.depth -= 1;
        value
    }

    fn operand(&mut self, id: Id<tree::Expression>, scope: &mut Scope) -> Option<Id<Expression>> {
        let tree = self.tree;
        let span = tree.expressions[id].span;
        let node = match &tree.expressions[id].kind {
            ExpressionKind::Number(value) => Expression::Number(*value),
            ExpressionKind::Text(text) => {
                self.problems.add(NameProblem::TextAsQuantity { span, text: text.clone() });
                return None;
            }
            ExpressionKind::Name(name) => self.name(name, scope)?,
            ExpressionKind::Select { base, selectors } => self.selection(*base, selectors, span, scope)?,
            ExpressionKind::Member { name, .. } => {
                self.refuse(Feature::Member, name.span);
                return None;
            }
            ExpressionKind::Unary(operator, a) => Expression::Unary(*operator, self.expression(*a, scope)?),
            ExpressionKind::Binary(operator, left, right) => {
                return self.label_comparison(*operator, *left, *right, span, scope);
            }
            ExpressionKind::If { condition, then, otherwise } => {
                let parts = [*condition, *then, *otherwise].map(|part| self.expression(part, scope));
                let [Some(condition), Some(then), Some(otherwise)] = parts else { return None };
                Expression::If(condition, then, otherwise)
            }
            ExpressionKind::Call { name, arguments } => self.call(name, arguments, span, scope)?,
            ExpressionKind::Reduce { name, body, over, per } => {
                self.reduction(name, *body, over, per, scope)?
            }
        };
        Some(self.model.expressions.add(node, span))
    }

    /// What a comparison compares.
    pub(super) fn comparison(
        &self,
        operator: BinaryOperator,
        left: Id<tree::Expression>,
        right: Id<tree::Expression>,
    ) -> Comparison<'t> {
        if !matches!(operator, BinaryOperator::Equal | BinaryOperator::NotEqual) {
            return Comparison::Quantities;
        }
        let tree = self.tree;
        let pair = [left, right].map(|id| &tree.expressions[id]);
        for [one, other] in [[pair[0], pair[1]], [pair[1], pair[0]]] {
            if let ExpressionKind::Text(text) = &other.kind {
                return match &one.kind {
                    ExpressionKind::Name(name) if self.has_labels(name) => {
                        Comparison::Label(name, text, other.span)
                    }
                    _ => Comparison::NoGroup,
                };
            }
        }
        for [one, other] in [[pair[0], pair[1]], [pair[1], pair[0]]] {
            let ExpressionKind::Name(group) = &one.kind else { continue };
            if !self.only_labels(group) {
                continue;
            }
            match &other.kind {
                ExpressionKind::Number(value) => {
                    return Comparison::Unquoted(group, other.span, value.to_string());
                }
                ExpressionKind::Name(name) if self.only_labels(name) => return Comparison::Groups,
                ExpressionKind::Name(name) if self.entity(&name.text).is_none() => {
                    return Comparison::Unquoted(group, other.span, name.text.clone());
                }
                _ => {}
            }
        }
        Comparison::Quantities
    }

    /// Whether a name is a group or a role.
    fn has_labels(&self, name: &Name) -> bool {
        self.roles.contains_key(name.text.as_str()) || self.group_ids.contains_key(name.text.as_str())
    }

    /// Whether a name is a group or a role and nothing else.
    fn only_labels(&self, name: &Name) -> bool {
        match self.entity(&name.text).map(|declared| declared.entity) {
            Some(Entity::Group(_)) => true,
            None => self.roles.contains_key(name.text.as_str()),
            Some(_) => false,
        }
    }

    fn label_comparison(
        &mut self,
        operator: BinaryOperator,
        left: Id<tree::Expression>,
        right: Id<tree::Expression>,
        span: Span,
        scope: &mut Scope,
    ) -> Option<Id<Expression>> {
        let spans = [left, right].map(|id| self.tree.expressions[id].span);
        match self.comparison(operator, left, right) {
            Comparison::Label(name, label, label_span) => {
                let test = self.label_test(name, label, label_span, scope)?;
                let test = self.model.expressions.add(test, span);
                if operator == BinaryOperator::Equal {
                    return Some(test);
                }
                Some(self.model.expressions.add(Expression::Unary(UnaryOperator::Not, test), span))
            }
            Comparison::NoGroup => {
                let is_text = |id| matches!(self.tree.expressions[id].kind, ExpressionKind::Text(_));
                let (label, other) = if is_text(right) { (spans[1], spans[0]) } else { (spans[0], spans[1]) };
                self.problems.add(PathProblem::LabelComparison { label, other });
                None
            }
            Comparison::Unquoted(group, span, text) => {
                if !self.unread.contains(&text) && !self.uses {
                    let group = self.group_of_name(group);
                    self.problems.add(NameProblem::Unquoted { span, text, group });
                }
                None
            }
            Comparison::Groups => {
                self.refuse(Feature::GroupComparison, span);
                None
            }
            // Only reached from `operand`, which is called where a comparison is none of quantities.
            Comparison::Quantities => None,
        }
    }

    /// The name of the group behind a group's name or a role.
    fn group_of_name(&self, name: &Name) -> String {
        let role = self.roles.get(name.text.as_str()).and_then(|columns| columns.first());
        let group = role.and_then(|column| self.labels_of(*column));
        group.map_or_else(|| name.text.clone(), |group| self.model.groups[group].name.clone())
    }

    fn label_test(&mut self, name: &Name, label: &str, span: Span, scope: &Scope) -> Option<Expression> {
        let (access, group) = if let Some(group) = self.group_of(name) {
            let declared = self.model.groups[group].span;
            let asker = Asker { span: name.span, name: &name.text, declared, form: RoleForm::Test };
            (self.reach(scope, Index::Group(group), &asker), group)
        } else {
            match self.choose_role(name, Some(scope)) {
                Ok(column) => (self.role(column, name.span, scope), self.labels_of(column)?),
                Err(problem) => {
                    self.problems.add(*problem);
                    return None;
                }
            }
        };
        let label = self.label(group, label, span);
        let (access, label) = access.zip(label)?;
        Some(Expression::LabelTest { access, group, label })
    }

    /// The group of a name in a label test, unless it is a role.
    pub(super) fn group_of(&self, name: &Name) -> Option<Id<Group>> {
        self.group_ids.get(name.text.as_str()).copied()
    }

    fn call(
        &mut self,
        name: &'t Name,
        arguments: &'t [Argument],
        span: Span,
        scope: &mut Scope,
    ) -> Option<Expression> {
        let Some(function) = function(&name.text) else {
            self.report_call(name, span);
            return None;
        };
        let mut values = Vec::with_capacity(arguments.len());
        let mut whole = true;
        for argument in arguments {
            let (value, extra) = match argument {
                Argument::Positional(value) => (Some(*value), None),
                Argument::Named(label, value) => (Some(*value), Some(label.span)),
                Argument::Group(group) => (None, Some(group.span)),
            };
            if let Some(span) = extra {
                self.problems.add(ShapeProblem::NamedArgument { span, function: name.text.clone() });
                whole = false;
            }
            match value.and_then(|value| self.expression(value, scope)) {
                Some(value) => values.push(value),
                None => whole = false,
            }
        }
        if arguments.len() != function.arity() {
            self.report_arity(name, function, arguments.len(), span);
            whole = false;
        }
        whole.then_some(Expression::Call(function, values))
    }

    fn report_arity(&mut self, name: &Name, function: Function, found: usize, span: Span) {
        // `min(x)` is a reduction that does not say over what.
        if found == 1 && reducer(&name.text).is_some() {
            self.problems.add(ShapeProblem::WithoutOver { span, name: name.text.clone() });
        } else {
            let takes = function.arity();
            self.problems.add(ShapeProblem::Arity { span, name: name.text.clone(), takes, found });
        }
    }

    /// A call of something that is no function.
    fn report_call(&mut self, name: &Name, span: Span) {
        match self.entity(&name.text) {
            // The part itself has been refused.
            Some(declared) if declared.entity == Entity::Part => {}
            Some(_) => self.report_name(name, Wanted::Function),
            None if self.roles.contains_key(name.text.as_str()) => self.report_name(name, Wanted::Function),
            None if reducer(&name.text).is_some() => {
                self.problems.add(ShapeProblem::WithoutOver { span, name: name.text.clone() });
            }
            None if self.uses => {}
            None if PRELUDE_PARTS.contains(&name.text.as_str()) => self.refuse(Feature::Part, name.span),
            None if distribution::named(&name.text).is_some() => {
                let (span, name, kind) = (name.span, name.text.clone(), NameKind::Distribution);
                self.problems.add(NameProblem::NotAQuantity { span, name, kind, declared: None });
            }
            None => self.report_unknown(name, Wanted::Function),
        }
    }
}
