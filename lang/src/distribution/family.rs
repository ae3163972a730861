//! A distribution of the language: its arguments, its parameterisations and how each becomes a canonical law.

use super::Law;
use crate::arena::Id;
use crate::model::{Expression, Expressions};
use crate::span::Span;

/// What an argument must be.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Domain {
    /// Any number.
    Real,
    /// Above 0.
    Positive,
    /// 0 or more.
    NotNegative,
    /// Between 0 and 1.
    Fraction,
    /// A whole number from 0.
    Count,
}

/// An argument of a parameterisation.
#[derive(Clone, Copy, Debug)]
pub struct Argument {
    /// Its name.
    pub name: &'static str,
    /// What it must be.
    pub domain: Domain,
    /// Its value where it is left out, if it may be.
    pub default: Option<f64>,
}

/// Canonical parameters from the arguments of a form.
pub type Lowering = fn(&mut Lower<'_>, &[Id<Expression>]) -> Vec<Id<Expression>>;

/// A parameterisation: its arguments in the order in which they are written.
#[derive(Clone, Copy, Debug)]
pub struct Form {
    /// Its arguments.
    pub arguments: &'static [Argument],
    /// The law that it gives.
    pub law: Law,
    /// The law's canonical parameters from the arguments.
    pub lower: Lowering,
}

/// A distribution of the language.
#[derive(Clone, Copy, Debug)]
pub struct Family {
    /// Its name.
    pub name: &'static str,
    /// What it is for, in a few words.
    pub meaning: &'static str,
    /// Its parameterisations.
    pub forms: &'static [Form],
}

impl Form {
    /// The form as it is written: `normal(mean: ..., sd: ...)`.
    pub fn written(&self, name: &str) -> String {
        let arguments: Vec<String> = self
            .arguments
            .iter()
            .filter(|argument| argument.default.is_none())
            .map(|argument| format!("{}: ...", argument.name))
            .collect();
        format!("{name}({})", arguments.join(", "))
    }
}

impl Family {
    /// Every way to write the distribution.
    pub fn ways(&self) -> String {
        self.forms
            .iter()
            .map(|form| format!("`{}`", form.written(self.name)))
            .collect::<Vec<_>>()
            .join(" or ")
    }

    /// The argument names of all forms, each once.
    pub fn argument_names(&self) -> Vec<&'static str> {
        let mut names = vec![];
        for argument in self.forms.iter().flat_map(|form| form.arguments) {
            if !names.contains(&argument.name) {
                names.push(argument.name);
            }
        }
        names
    }
}

/// Builds canonical parameters: what is made of numbers alone is worked out at once.
pub struct Lower<'a> {
    /// Where the nodes go.
    pub expressions: &'a mut Expressions,
    /// The place that they stand for.
    pub span: Span,
}

impl Lower<'_> {
    fn number_of(&self, id: Id<Expression>) -> Option<f64> {
        match self.expressions[id] {
            Expression::Number(value) => Some(value),
            _ => None,
        }
    }

    /// A number.
    pub fn number(&mut self, value: f64) -> Id<Expression> {
        self.expressions.add(Expression::Number(value), self.span)
    }

    fn binary(
        &mut self,
        operator: crate::model::BinaryOperator,
        a: Id<Expression>,
        b: Id<Expression>,
        of: impl Fn(f64, f64) -> f64,
    ) -> Id<Expression> {
        match (self.number_of(a), self.number_of(b)) {
            (Some(a), Some(b)) => self.number(of(a, b)),
            _ => self.expressions.add(Expression::Binary(operator, a, b), self.span),
        }
    }

    /// a * b.
    pub fn times(&mut self, a: Id<Expression>, b: Id<Expression>) -> Id<Expression> {
        if self.number_of(b) == Some(1.0) {
            return a;
        }
        self.binary(crate::model::BinaryOperator::Multiply, a, b, |a, b| a * b)
    }

    /// a / b.
    pub fn over(&mut self, a: Id<Expression>, b: Id<Expression>) -> Id<Expression> {
        self.binary(crate::model::BinaryOperator::Divide, a, b, |a, b| a / b)
    }

    /// a + b.
    pub fn plus(&mut self, a: Id<Expression>, b: Id<Expression>) -> Id<Expression> {
        if self.number_of(b) == Some(0.0) {
            return a;
        }
        self.binary(crate::model::BinaryOperator::Add, a, b, |a, b| a + b)
    }

    /// a - b.
    pub fn minus(&mut self, a: Id<Expression>, b: Id<Expression>) -> Id<Expression> {
        self.binary(crate::model::BinaryOperator::Subtract, a, b, |a, b| a - b)
    }

    /// a ^ power: scales stay recognisable as powers of what the text declares.
    pub fn power(&mut self, a: Id<Expression>, power: f64) -> Id<Expression> {
        let exponent = self.number(power);
        // The powers that occur are exact on every machine: squares, roots and inverses.
        self.binary(crate::model::BinaryOperator::Power, a, exponent, move |a, _| match power {
            2.0 => a * a,
            0.5 => a.sqrt(),
            -0.5 => 1.0 / a.sqrt(),
            _ => 1.0 / a,
        })
    }

    /// log(a).
    pub fn log(&mut self, a: Id<Expression>) -> Id<Expression> {
        if self.number_of(a) == Some(1.0) {
            return self.number(0.0);
        }
        self.expressions.add(Expression::Call(crate::model::Function::Log, vec![a]), self.span)
    }
}
