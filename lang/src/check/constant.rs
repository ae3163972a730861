//! Expressions of numbers and givens only: bounds and defaults.

use crate::arena::Id;
use crate::model::{BinaryOperator, Expression, Function, Model, UnaryOperator};
use crate::problem::{ConstantPlace, NameProblem, StructureProblem};
use crate::span::Span;
use crate::syntax::tree::{self, ExpressionKind, Name};

use super::checker::{Checker, Entity, Scope};

impl<'t> Checker<'t> {
    /// Works out an expression of numbers and givens; anything else in it is reported.
    pub(super) fn constant(
        &mut self,
        id: Id<tree::Expression>,
        place: ConstantPlace,
    ) -> Option<Id<Expression>> {
        let span = self.tree.expressions[id].span;
        if !self.only_constants(id, place) {
            return None;
        }
        self.expression(id, &mut Scope::new(&[], span))
    }

    /// Looks through an expression and reports every leaf that is no number and no given.
    fn only_constants(&mut self, root: Id<tree::Expression>, place: ConstantPlace) -> bool {
        let mut whole = true;
        let mut stack = vec![root];
        while let Some(id) = stack.pop() {
            let span = self.tree.expressions[id].span;
            match &self.tree.expressions[id].kind {
                ExpressionKind::Number(_) => {}
                ExpressionKind::Name(name) => whole &= self.constant_name(name, place),
                ExpressionKind::Unary(_, a) => stack.push(*a),
                ExpressionKind::Binary(_, a, b) => stack.extend([*a, *b]),
                ExpressionKind::If { condition, then, otherwise } => {
                    stack.extend([*condition, *then, *otherwise])
                }
                ExpressionKind::Call { arguments, .. } => {
                    stack.extend(arguments.iter().filter_map(|argument| match argument {
                        tree::Argument::Named(_, value) | tree::Argument::Positional(value) => Some(*value),
                        tree::Argument::Group(_) => None,
                    }))
                }
                ExpressionKind::Text(_)
                | ExpressionKind::Select { .. }
                | ExpressionKind::Member { .. }
                | ExpressionKind::Reduce { .. } => {
                    self.problems.add(StructureProblem::BoundNotConstant { span, name: None, place });
                    whole = false;
                }
            }
        }
        whole
    }

    fn constant_name(&mut self, name: &Name, place: ConstantPlace) -> bool {
        let Some(declared) = self.entity(&name.text) else {
            self.report_no_quantity(name);
            return false;
        };
        match declared.entity {
            Entity::Given(given) => {
                // Bounds are read after all givens; a default knows only the givens above it.
                let later =
                    place == ConstantPlace::Default && self.givens[given.position()].default.is_none();
                if later {
                    self.report_later(name, declared.span);
                }
                !later
            }
            Entity::Broken => false,
            Entity::Group(_) | Entity::Table(_) | Entity::Part => {
                self.report_no_quantity(name);
                false
            }
            Entity::Column(_) | Entity::Unknown(_) | Entity::Named(_) => {
                let kind = self.entity_kind(declared.entity);
                let name_and_kind = Some((name.text.clone(), kind));
                self.problems.add(StructureProblem::BoundNotConstant {
                    span: name.span,
                    name: name_and_kind,
                    place,
                });
                false
            }
        }
    }

    /// A given without a default is either below this one or wrong itself; only the first is worth a word.
    fn report_later(&mut self, name: &Name, declared: Span) {
        if declared.start >= name.span.start || name.span.start < self.end_of_given(declared) {
            let (span, name) = (name.span, name.text.clone());
            self.problems.add(NameProblem::LaterGiven { span, name, declared });
        }
    }

    /// The end of the default of the given that is declared at a span.
    fn end_of_given(&self, declared: Span) -> u32 {
        let given = self.givens.iter().find(|given| given.declaration.name.span == declared);
        given.map_or(declared.end, |given| self.tree.expressions[given.declaration.default].span.end)
    }

    /// The value of an expression of numbers and givens at their defaults, where it is one.
    pub(super) fn constant_value(&self, id: Id<Expression>) -> Option<f64> {
        value(&self.model, id)
    }
}

/// The value of an expression of numbers and givens at their defaults, where it is one.
pub(super) fn value(model: &Model, root: Id<Expression>) -> Option<f64> {
    // Down the left side of sums and products without recursion: a sum can have any number of terms.
    let mut rights = Vec::new();
    let mut at = root;
    while let Expression::Binary(operator, left, right) = &model.expressions[at] {
        rights.push((*operator, *right));
        at = *left;
    }
    let mut found = match &model.expressions[at] {
        Expression::Number(number) => *number,
        // The type of a given may use a given that is read after it.
        Expression::Given(given) if given.position() < model.givens.len() => {
            value(model, model.givens[*given].default)?
        }
        Expression::Unary(UnaryOperator::Negate, a) => -value(model, *a)?,
        Expression::Unary(UnaryOperator::Not, a) => f64::from(value(model, *a)? == 0.0),
        Expression::If(condition, then, otherwise) => {
            let branch = if value(model, *condition)? != 0.0 { *then } else { *otherwise };
            value(model, branch)?
        }
        Expression::Call(function, arguments) => {
            let values: Option<Vec<f64>> = arguments.iter().map(|a| value(model, *a)).collect();
            apply(*function, &values?)?
        }
        _ => return None,
    };
    for (operator, right) in rights.into_iter().rev() {
        found = combine(operator, found, value(model, right)?);
    }
    Some(found)
}

fn combine(operator: BinaryOperator, a: f64, b: f64) -> f64 {
    match operator {
        BinaryOperator::Add => a + b,
        BinaryOperator::Subtract => a - b,
        BinaryOperator::Multiply => a * b,
        BinaryOperator::Divide => a / b,
        BinaryOperator::Power => a.powf(b),
        BinaryOperator::Equal => f64::from(a == b),
        BinaryOperator::NotEqual => f64::from(a != b),
        BinaryOperator::Less => f64::from(a < b),
        BinaryOperator::LessOrEqual => f64::from(a <= b),
        BinaryOperator::Greater => f64::from(a > b),
        BinaryOperator::GreaterOrEqual => f64::from(a >= b),
        BinaryOperator::And => f64::from(a != 0.0 && b != 0.0),
        BinaryOperator::Or => f64::from(a != 0.0 || b != 0.0),
    }
}

/// The functions that the standard library has; the others leave a bound unchecked until the fit.
fn apply(function: Function, values: &[f64]) -> Option<f64> {
    let x = *values.first()?;
    let value = match function {
        Function::Exp => x.exp(),
        Function::Log => x.ln(),
        Function::Log2 => x.log2(),
        Function::Log10 => x.log10(),
        Function::Sqrt => x.sqrt(),
        Function::Abs => x.abs(),
        Function::Logistic => 1.0 / (1.0 + (-x).exp()),
        Function::Logit => (x / (1.0 - x)).ln(),
        Function::Log1p => x.ln_1p(),
        Function::Expm1 => x.exp_m1(),
        Function::Floor => x.floor(),
        Function::Ceiling => x.ceil(),
        Function::Round => x.round(),
        Function::Sin => x.sin(),
        Function::Cos => x.cos(),
        Function::Tanh => x.tanh(),
        Function::Min => x.min(*values.get(1)?),
        Function::Max => x.max(*values.get(1)?),
        Function::Lgamma | Function::NormalCdf => return None,
    };
    Some(value)
}
