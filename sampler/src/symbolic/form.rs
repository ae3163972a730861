//! Recognised forms of expressions: linear in some quantities, a power of one.

use stook_lang::model::{Access, BinaryOperator, Function, UnaryOperator};

use super::graph::{Graph, Node, Quantity, Sym};

/// An element of a quantity, as an expression refers to it.
#[derive(Clone, Debug, PartialEq, Eq, Hash)]
pub struct Leaf {
    /// The quantity.
    pub quantity: Quantity,
    /// One access for each of its dimensions (for a column's cells: the one that leads to the row).
    pub accesses: Vec<Access>,
}

/// `constant + sum of coefficient * leaf`, where neither the constant nor a coefficient depends on the quantities in
/// question.
#[derive(Clone, Debug)]
pub struct Linear {
    /// The part without them.
    pub constant: Sym,
    /// The terms, each leaf once.
    pub terms: Vec<(Leaf, Sym)>,
}

/// `coefficient * leaf ^ power`.
#[derive(Clone, Debug)]
pub struct Monomial {
    /// Does not depend on the leaf's quantity.
    pub coefficient: Sym,
    /// The leaf.
    pub leaf: Leaf,
    /// The power.
    pub power: f64,
}

/// The linear form of an expression in the quantities that `moves` admits; `None` where it is not linear in them (or not
/// seen to be).
pub fn linear(graph: &mut Graph, sym: Sym, moves: &dyn Fn(Quantity) -> bool) -> Option<Linear> {
    if !graph.depends(sym).iter().any(|quantity| moves(*quantity)) {
        return Some(Linear { constant: sym, terms: vec![] });
    }
    match graph.node(sym).clone() {
        Node::Unknown(unknown, accesses) => {
            Some(single(graph, Leaf { quantity: Quantity::Unknown(unknown), accesses }))
        }
        Node::Column(column, access) => {
            Some(single(graph, Leaf { quantity: Quantity::Cells(column), accesses: vec![access] }))
        }
        Node::Unary(UnaryOperator::Negate, a) => {
            let a = linear(graph, a, moves)?;
            let minus = graph.number(-1.0);
            Some(scaled(graph, a, minus))
        }
        Node::Binary(BinaryOperator::Add, a, b) => {
            let (a, b) = (linear(graph, a, moves)?, linear(graph, b, moves)?);
            Some(sum(graph, a, b))
        }
        Node::Binary(BinaryOperator::Subtract, a, b) => {
            let (a, b) = (linear(graph, a, moves)?, linear(graph, b, moves)?);
            let minus = graph.number(-1.0);
            let b = scaled(graph, b, minus);
            Some(sum(graph, a, b))
        }
        Node::Binary(BinaryOperator::Multiply, a, b) => {
            let (a, b) = (linear(graph, a, moves)?, linear(graph, b, moves)?);
            match (a.terms.is_empty(), b.terms.is_empty()) {
                (true, _) => Some(scaled(graph, b, a.constant)),
                (_, true) => Some(scaled(graph, a, b.constant)),
                _ => None,
            }
        }
        Node::Binary(BinaryOperator::Divide, a, b) => {
            let (a, b) = (linear(graph, a, moves)?, linear(graph, b, moves)?);
            if !b.terms.is_empty() {
                return None;
            }
            let one = graph.number(1.0);
            let inverse = graph.add(Node::Binary(BinaryOperator::Divide, one, b.constant));
            Some(scaled(graph, a, inverse))
        }
        Node::If(condition, a, b) => {
            if graph.depends(condition).iter().any(|quantity| moves(*quantity)) {
                return None;
            }
            let (a, b) = (linear(graph, a, moves)?, linear(graph, b, moves)?);
            let (one, zero) = (graph.number(1.0), graph.number(0.0));
            let holds = graph.add(Node::If(condition, one, zero));
            let fails = graph.add(Node::If(condition, zero, one));
            // The constants are chosen, not weighted: the branch that is not taken may be undefined there.
            let constant = graph.add(Node::If(condition, a.constant, b.constant));
            let a = scaled(graph, Linear { constant: zero, terms: a.terms }, holds);
            let b = scaled(graph, Linear { constant: zero, terms: b.terms }, fails);
            let both = sum(graph, a, b);
            Some(Linear { constant, terms: both.terms })
        }
        Node::Number(_)
        | Node::LabelTest(..)
        | Node::Unary(UnaryOperator::Not, _)
        | Node::Binary(..)
        | Node::Call(..)
        | Node::Reduce { .. } => None,
    }
}

fn single(graph: &mut Graph, leaf: Leaf) -> Linear {
    Linear { constant: graph.number(0.0), terms: vec![(leaf, graph.number(1.0))] }
}

fn scaled(graph: &mut Graph, form: Linear, factor: Sym) -> Linear {
    let constant = graph.add(Node::Binary(BinaryOperator::Multiply, form.constant, factor));
    let mut times = |coefficient| graph.add(Node::Binary(BinaryOperator::Multiply, coefficient, factor));
    let terms = form.terms.into_iter().map(|(leaf, coefficient)| (leaf, times(coefficient))).collect();
    Linear { constant, terms }
}

fn sum(graph: &mut Graph, a: Linear, b: Linear) -> Linear {
    let constant = graph.add(Node::Binary(BinaryOperator::Add, a.constant, b.constant));
    let mut terms = a.terms;
    for (leaf, coefficient) in b.terms {
        match terms.iter_mut().find(|(other, _)| *other == leaf) {
            Some((_, total)) => *total = graph.add(Node::Binary(BinaryOperator::Add, *total, coefficient)),
            None => terms.push((leaf, coefficient)),
        }
    }
    Linear { constant, terms }
}

/// The expression as a power of one element of `quantity` times a factor without it; `None` where it is not one.
pub fn monomial(graph: &mut Graph, sym: Sym, quantity: Quantity) -> Option<Monomial> {
    match graph.node(sym).clone() {
        Node::Unknown(unknown, accesses) if quantity == Quantity::Unknown(unknown) => {
            Some(Monomial { coefficient: graph.number(1.0), leaf: Leaf { quantity, accesses }, power: 1.0 })
        }
        Node::Binary(operator @ (BinaryOperator::Multiply | BinaryOperator::Divide), a, b) => {
            let sign = if operator == BinaryOperator::Divide { -1.0 } else { 1.0 };
            match (graph.depends_on(a, quantity), graph.depends_on(b, quantity)) {
                (true, false) => {
                    let a = monomial(graph, a, quantity)?;
                    let coefficient = graph.add(Node::Binary(operator, a.coefficient, b));
                    Some(Monomial { coefficient, ..a })
                }
                (false, true) => {
                    let b = monomial(graph, b, quantity)?;
                    let coefficient = graph.add(Node::Binary(operator, a, b.coefficient));
                    Some(Monomial { coefficient, leaf: b.leaf, power: sign * b.power })
                }
                (true, true) => {
                    let (a, b) = (monomial(graph, a, quantity)?, monomial(graph, b, quantity)?);
                    if a.leaf != b.leaf {
                        return None;
                    }
                    let coefficient = graph.add(Node::Binary(operator, a.coefficient, b.coefficient));
                    Some(Monomial { coefficient, leaf: a.leaf, power: a.power + sign * b.power })
                }
                (false, false) => None,
            }
        }
        Node::Binary(BinaryOperator::Power, a, b) => {
            let power = graph.as_number(b)?;
            raised(graph, a, power, quantity)
        }
        Node::Call(Function::Sqrt, arguments) => raised(graph, arguments[0], 0.5, quantity),
        _ => None,
    }
}

fn raised(graph: &mut Graph, base: Sym, power: f64, quantity: Quantity) -> Option<Monomial> {
    let base = monomial(graph, base, quantity)?;
    let exponent = graph.number(power);
    let coefficient = graph.add(Node::Binary(BinaryOperator::Power, base.coefficient, exponent));
    Some(Monomial { coefficient, leaf: base.leaf, power: base.power * power })
}
