//! What a child says about a quantity in closed form: its likelihood as a function of that quantity alone.
//!
//! A child statement whose parameter is a power of the quantity, `c x^p`, has a log likelihood of the form
//! `a log(x^e) - b x^e`; one whose mean is linear in it has a quadratic one; one whose probability it is, `a log x +
//! b log(1 - x)`. The conjugate rules add such messages to the prior of the same form (Gelman et al., Bayesian Data
//! Analysis, 3rd ed. 2013, chapters 2 and 3); the slice rule evaluates their sum instead of the rows.

use std::collections::BTreeSet;

use stook_lang::distribution::Law;
use stook_lang::model::BinaryOperator;

use super::gaussian::{self, Rows};

use crate::symbolic::{Graph, Leaf, Node, Quantity, Sym, System, linear, monomial};

/// A child's likelihood of one quantity.
#[derive(Clone, Debug)]
pub struct Message {
    /// The child statement.
    pub statement: usize,
    /// The element of the quantity that each of the child's elements refers to.
    pub leaf: Leaf,
    /// Its form.
    pub form: Form,
    /// The child's rows, where its sum of squares can be had from sums made once.
    pub rows: Option<Rows>,
}

/// The form of a message.
#[derive(Clone, Debug)]
pub enum Form {
    /// Quadratic: the child (or its logarithm) is normal with mean `coefficient * x + rest`.
    Mean {
        /// Factor of the quantity.
        coefficient: Sym,
        /// The mean without it.
        rest: Sym,
    },
    /// `a log(x^exponent) - b x^exponent`: the parameter is `coefficient * x^power`.
    Power {
        /// Factor of the power.
        coefficient: Sym,
        /// The exponent e.
        exponent: f64,
    },
    /// `a log x + b log(1 - x)`, or with x and 1 - x exchanged.
    Share {
        /// Whether the child's probability is 1 - x.
        complement: bool,
    },
}

/// Why a child has no closed form in a quantity.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Refusal {
    /// The child statement.
    pub statement: usize,
    /// The reason, for a reader of the plan.
    pub reason: String,
}

/// The message of every child of a quantity, or the first that has none.
pub fn messages(system: &mut System, quantity: Quantity) -> Result<Vec<Message>, Refusal> {
    system.children(quantity).into_iter().map(|statement| message(system, quantity, statement)).collect()
}

/// Notes for each message about the sd of a normal response whether the sum of its squared residuals can be had from sums
/// made once: its mean is linear in the members of the Gaussian block, with coefficients that are data.
pub fn note_rows(system: &mut System, messages: &mut [Message], members: &BTreeSet<Quantity>) {
    for message in messages {
        let Form::Power { coefficient, .. } = message.form else { continue };
        let normal = matches!(system.statements[message.statement].law, Law::Normal | Law::Lognormal);
        if normal && system.graph.is_uniform(coefficient) {
            message.rows = gaussian::squared_rows(system, message.statement, members);
        }
    }
}

fn message(system: &mut System, quantity: Quantity, statement: usize) -> Result<Message, Refusal> {
    let child = system.statements[statement].clone();
    let graph = &mut system.graph;
    let refuse = |reason: &str| Err(Refusal { statement, reason: reason.into() });
    if child.is_truncated() {
        return refuse("its law is truncated, and the normalising term depends on the quantity");
    }
    if child.quantity() == quantity {
        return refuse("it is a recursion");
    }
    let depends: Vec<usize> =
        (0..child.parameters.len()).filter(|p| graph.depends_on(child.parameters[*p], quantity)).collect();
    let [position] = depends[..] else {
        return refuse("more than one of its arguments depends on the quantity");
    };
    let parameter = child.parameters[position];
    let found = match (child.law, position) {
        (Law::Normal | Law::Lognormal, 0) => mean(graph, parameter, quantity),
        (Law::Normal | Law::Lognormal, 1) | (Law::HalfNormal, 0) => power(graph, parameter, quantity, -2.0),
        (Law::Laplace, 1) => power(graph, parameter, quantity, -1.0),
        (Law::Exponential, 0) | (Law::Poisson, 0) => power(graph, parameter, quantity, 1.0),
        (Law::Gamma | Law::InverseGamma, 1) => power(graph, parameter, quantity, 1.0),
        (Law::Weibull, 1) => match graph.as_number(child.parameters[0]) {
            Some(shape) => power(graph, parameter, quantity, -shape),
            None => None,
        },
        (Law::Bernoulli, 0) | (Law::Binomial, 1) => share(graph, parameter, quantity),
        _ => None,
    };
    match found {
        Some((leaf, form)) => Ok(Message { statement, leaf, form, rows: None }),
        None => refuse("it has no closed form in this argument"),
    }
}

fn mean(graph: &mut Graph, parameter: Sym, quantity: Quantity) -> Option<(Leaf, Form)> {
    let form = linear(graph, parameter, &|other| other == quantity)?;
    let [(leaf, coefficient)] = &form.terms[..] else {
        return None;
    };
    Some((leaf.clone(), Form::Mean { coefficient: *coefficient, rest: form.constant }))
}

/// `factor` is the exponent e for the parameter's own first power.
fn power(graph: &mut Graph, parameter: Sym, quantity: Quantity, factor: f64) -> Option<(Leaf, Form)> {
    let form = monomial(graph, parameter, quantity)?;
    let exponent = form.power * factor;
    Some((form.leaf, Form::Power { coefficient: form.coefficient, exponent }))
}

fn share(graph: &mut Graph, parameter: Sym, quantity: Quantity) -> Option<(Leaf, Form)> {
    let leaf = |sym: Sym| match graph.node(sym) {
        Node::Unknown(unknown, accesses) if quantity == Quantity::Unknown(*unknown) => {
            Some(Leaf { quantity, accesses: accesses.clone() })
        }
        _ => None,
    };
    if let Some(leaf) = leaf(parameter) {
        return Some((leaf, Form::Share { complement: false }));
    }
    match graph.node(parameter) {
        Node::Binary(BinaryOperator::Subtract, one, x) if graph.as_number(*one) == Some(1.0) => {
            Some((leaf(*x)?, Form::Share { complement: true }))
        }
        _ => None,
    }
}
