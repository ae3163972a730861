//! Settings and constant expressions.

use stook_lang::arena::Id;
use stook_lang::model::{Expression, Model};

use super::problem::DataProblem;
use crate::program::scalar;

/// The default of every setting, by position.
pub fn defaults(model: &Model) -> Vec<f64> {
    let mut givens = vec![];
    for (_, given) in model.givens.iter() {
        let value = constant(model, &givens, given.default);
        givens.push(value);
    }
    givens
}

/// The value of an expression of numbers and settings (of those whose values are given); NaN for anything else, which
/// the checker refuses.
pub fn constant(model: &Model, givens: &[f64], id: Id<Expression>) -> f64 {
    let of = |id: &Id<Expression>| constant(model, givens, *id);
    match &model.expressions[id] {
        Expression::Number(value) => *value,
        Expression::Given(given) => givens.get(given.position()).copied().unwrap_or(f64::NAN),
        Expression::Unary(operator, a) => scalar::unary(*operator, of(a)),
        Expression::Binary(operator, a, b) => scalar::binary(*operator, of(a), of(b)),
        Expression::Call(function, arguments) => {
            scalar::call(*function, &arguments.iter().map(of).collect::<Vec<_>>())
        }
        Expression::If(c, a, b) => {
            if of(c) != 0.0 {
                of(a)
            } else {
                of(b)
            }
        }
        Expression::Unknown(..)
        | Expression::Column(..)
        | Expression::Named(..)
        | Expression::LabelTest { .. }
        | Expression::Reduce { .. } => f64::NAN,
    }
}

/// The values of the settings: those given from outside, the defaults of the rest.
pub(super) fn settings(
    model: &Model,
    settings: &[(String, f64)],
    problems: &mut Vec<DataProblem>,
) -> Vec<f64> {
    let mut givens: Vec<f64> = vec![];
    for (_, given) in model.givens.iter() {
        let set = settings.iter().rev().find(|(name, _)| *name == given.name);
        let value = match set {
            Some((_, value)) => *value,
            None => constant(model, &givens, given.default),
        };
        let bounds = super::values::bounds(model, &givens, given.support);
        if !bounds.holds(value) {
            problems.push(DataProblem::Setting {
                name: given.name.clone(),
                value,
                support: bounds.to_string(),
                span: given.span,
            });
        }
        givens.push(value);
    }
    for (name, _) in settings {
        if !model.givens.iter().any(|(_, given)| given.name == *name) {
            let names: Vec<&str> = model.givens.iter().map(|(_, given)| given.name.as_str()).collect();
            problems.push(DataProblem::UnknownSetting {
                nearest: stook_lang::nearest::nearest(name, names.iter().copied()).map(str::to_string),
                name: name.clone(),
            });
        }
    }
    givens
}
