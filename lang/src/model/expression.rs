//! Expressions of a checked model: an arena of nodes in which every reference knows its path to its element.
//!
//! An expression is evaluated at a *place*: a scope of variables, each of which stands for one label of a group or one
//! row of a table. The scope of a prior is the unknown's dimensions, that of a named expression its own dimensions, that
//! of a response the one variable of its table's row; a reduction adds one more variable behind these.

use super::Function;
use super::structure::{Column, Given, Group, Index, Named, Table, Unknown};
use crate::arena::{Arena, Id};
use crate::span::Span;

pub use crate::syntax::tree::{BinaryOperator, UnaryOperator};

/// A variable of the scope, by its position (outermost is 0).
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Variable(pub u32);

/// Where an access starts.
#[derive(Clone, Debug, PartialEq, Eq, Hash)]
pub enum Place {
    /// At the label or row that a variable stands for.
    Variable(Variable),
    /// At one label, named in the text; nested labels are written `parent/child`.
    Label(Id<Group>, String),
}

/// One step from an index set to another.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Step {
    /// From a row of a table to the label that a label column holds.
    Column(Id<Column>),
    /// From a label of a nested group to the label that it lies in.
    Parent(Id<Group>),
    /// From a label of a group to its one row in a table `per` that group.
    Row(Id<Table>),
}

/// The way from the scope to one label or row.
#[derive(Clone, Debug, PartialEq, Eq, Hash)]
pub struct Access {
    /// Where it starts.
    pub place: Place,
    /// The steps in order.
    pub steps: Vec<Step>,
}

/// What is done over a group or a table.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Reducer {
    /// Sum.
    Sum,
    /// Mean.
    Mean,
    /// Sample standard deviation (divisor n - 1).
    Sd,
    /// Smallest.
    Min,
    /// Largest.
    Max,
    /// How many are true (not 0).
    Count,
}

/// One node.
#[derive(Clone, Debug, PartialEq)]
pub enum Expression {
    /// A number. Truth is 1, falsehood 0.
    Number(f64),
    /// A setting.
    Given(Id<Given>),
    /// An element of an unknown: one access for each of its dimensions.
    Unknown(Id<Unknown>, Vec<Access>),
    /// A cell of a value column: the access leads to a row of its table.
    Column(Id<Column>, Access),
    /// An element of a let, term or derived quantity: one access for each of its dimensions.
    Named(Id<Named>, Vec<Access>),
    /// 1 where the access leads to this label of the group, else 0.
    LabelTest {
        /// Leads to a label of `group`.
        access: Access,
        /// The group.
        group: Id<Group>,
        /// The label; nested labels are written `parent/child`.
        label: String,
    },
    /// An operator before an expression.
    Unary(UnaryOperator, Id<Expression>),
    /// An operator between two expressions.
    Binary(BinaryOperator, Id<Expression>, Id<Expression>),
    /// A function; as many arguments as it takes.
    Call(Function, Vec<Id<Expression>>),
    /// The second where the first is not 0, else the third.
    If(Id<Expression>, Id<Expression>, Id<Expression>),
    /// A reduction. Its variable is the scope's length where it stands, so the body's scope is one longer.
    Reduce {
        /// What is done.
        reducer: Reducer,
        /// What it runs over.
        over: Index,
        /// What is reduced.
        body: Id<Expression>,
        /// `per`: only the elements at which the first access (from the reduction's variable) leads to the same label as
        /// the second (from the scope outside). Empty without `per`.
        matching: Vec<(Access, Access)>,
    },
}

/// The expressions of a model with their places in the text.
#[derive(Clone, Debug, Default)]
pub struct Expressions {
    nodes: Arena<Expression>,
    spans: Vec<Span>,
}

impl Expressions {
    /// Adds a node that stands for the text at `span`.
    pub fn add(&mut self, node: Expression, span: Span) -> Id<Expression> {
        self.spans.push(span);
        self.nodes.add(node)
    }

    /// The place in the text.
    pub fn span(&self, id: Id<Expression>) -> Span {
        self.spans[id.position()]
    }

    /// How many nodes there are.
    pub fn len(&self) -> usize {
        self.nodes.len()
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.nodes.is_empty()
    }

    /// Renumbers unknowns and names after some left the model; nodes that refer to one that left become unreachable and
    /// are replaced by a zero.
    pub(super) fn renumber(&mut self, unknowns: &[Option<Id<Unknown>>], named: &[Option<Id<Named>>]) {
        for id in self.nodes.ids() {
            let node = &mut self.nodes[id];
            let kept = match node {
                Expression::Unknown(unknown, _) => {
                    unknowns[unknown.position()].map(|id| *unknown = id).is_some()
                }
                Expression::Named(name, _) => named[name.position()].map(|id| *name = id).is_some(),
                _ => true,
            };
            if !kept {
                *node = Expression::Number(0.0);
            }
        }
    }

    /// Calls `visit` with each node directly below `id`.
    pub fn children(&self, id: Id<Expression>, mut visit: impl FnMut(Id<Expression>)) {
        match &self.nodes[id] {
            Expression::Number(_)
            | Expression::Given(_)
            | Expression::Unknown(..)
            | Expression::Column(..)
            | Expression::Named(..)
            | Expression::LabelTest { .. } => {}
            Expression::Unary(_, a) => visit(*a),
            Expression::Binary(_, a, b) => {
                visit(*a);
                visit(*b);
            }
            Expression::Call(_, arguments) => arguments.iter().for_each(|a| visit(*a)),
            Expression::If(a, b, c) => {
                visit(*a);
                visit(*b);
                visit(*c);
            }
            Expression::Reduce { body, .. } => visit(*body),
        }
    }
}

impl std::ops::Index<Id<Expression>> for Expressions {
    type Output = Expression;
    fn index(&self, id: Id<Expression>) -> &Expression {
        &self.nodes[id]
    }
}
